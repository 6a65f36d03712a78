//! Unit spellings and their factors, one table a dimension.
//!
//! Sources: factors are exact by definition unless noted; NIST SP 811 (2008), appendix B, gives the
//! same figures. Spellings are compared after folding (see [`fold`]): `mm²/s` also stands for
//! `mm2/s` and `mm^2/s`, `W/(m·K)` for `W/(m*K)`.

/// One unit: how it may be written and what it is worth.
#[derive(Debug)]
pub struct Unit {
    /// Accepted spellings; the first is the one shown.
    pub spellings: &'static [&'static str],
    /// Base units in one of this unit.
    pub factor: f64,
    /// Added after the factor to reach the base unit (temperatures only, else 0).
    pub offset: f64,
}

/// All units of one dimension.
#[derive(Debug)]
pub struct Dimension {
    /// What is measured, as named in messages.
    pub name: &'static str,
    /// The units; the first is the base unit with factor 1.
    pub units: &'static [Unit],
}

impl Dimension {
    /// The unit written as `spelling`, if this dimension has it.
    #[must_use]
    pub fn unit(&self, spelling: &str) -> Option<&'static Unit> {
        let wanted = fold(spelling);
        self.units.iter().find(|u| u.spellings.iter().any(|s| fold(s) == wanted))
    }
}

const fn unit(spellings: &'static [&'static str], factor: f64) -> Unit {
    Unit { spellings, factor, offset: 0.0 }
}

const fn unit_with_zero(spellings: &'static [&'static str], factor: f64, offset: f64) -> Unit {
    Unit { spellings, factor, offset }
}

/// One spelling for all ways to type it: no spaces, plain digits for raised ones, one sign for a product.
pub(crate) fn fold(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            c if c.is_whitespace() => {}
            '²' => out.push('2'),
            '³' => out.push('3'),
            '¹' => out.push('1'),
            '⁻' | '−' => out.push('-'),
            '^' => {}
            '·' | '⋅' | '*' | '×' => out.push('.'),
            'º' | '˚' => out.push('°'),
            '℃' => out.push_str("°C"),
            '℉' => out.push_str("°F"),
            '\u{212A}' => out.push('K'),
            c => out.push(c),
        }
    }
    out
}

const INCH: f64 = 0.0254;
const FOOT: f64 = 0.3048;
const POUND: f64 = 0.453_592_37;
const GRAVITY: f64 = 9.806_65;
/// Density of water at 60 °F, kg/m³: the reference of specific gravity 60/60 °F.
/// ASTM D1250 / API MPMS 11.1 (quoted).
pub(crate) const WATER_60F: f64 = 999.016;
const PSI: f64 = POUND * GRAVITY / (INCH * INCH) / 1000.0;
const BTU: f64 = 1_055.055_852_62;
const GALLON: f64 = 3.785_411_784;

/// Base °C. Exact: t/°C = (t/°F - 32) × 5/9. NIST SP 811 (2008), B.8.
pub(crate) static TEMPERATURE: Dimension = Dimension {
    name: "temperature",
    units: &[
        unit(&["°C", "C", "degC", "deg C", "celsius"], 1.0),
        unit_with_zero(&["°F", "F", "degF", "deg F", "fahrenheit"], 5.0 / 9.0, -160.0 / 9.0),
        unit_with_zero(&["K", "kelvin"], 1.0, -273.15),
        unit_with_zero(&["°R", "degR"], 5.0 / 9.0, -273.15),
    ],
};

/// Base K.
pub(crate) static TEMPERATURE_DIFFERENCE: Dimension = Dimension {
    name: "temperature difference",
    units: &[
        unit(&["K", "°C", "C", "degC", "kelvin"], 1.0),
        unit(&["°F", "F", "degF", "°R", "degR"], 5.0 / 9.0),
    ],
};

/// Base mm²/s.
pub(crate) static KINEMATIC_VISCOSITY: Dimension = Dimension {
    name: "kinematic viscosity",
    units: &[
        unit(&["mm²/s", "cSt", "cst", "cS"], 1.0),
        unit(&["St", "cm²/s"], 100.0),
        unit(&["m²/s"], 1e6),
        unit(&["ft²/s"], FOOT * FOOT * 1e6),
        unit(&["in²/s"], INCH * INCH * 1e6),
    ],
};

/// Base mPa·s.
pub(crate) static DYNAMIC_VISCOSITY: Dimension = Dimension {
    name: "dynamic viscosity",
    units: &[
        unit(&["mPa·s", "mPas", "mPa s", "cP", "cp", "cps"], 1.0),
        unit(&["P", "poise"], 100.0),
        unit(&["Pa·s", "Pas", "Pa s"], 1000.0),
    ],
};

/// Base kPa.
pub(crate) static PRESSURE: Dimension = Dimension {
    name: "pressure",
    units: &[
        unit(&["kPa"], 1.0),
        unit(&["Pa"], 1e-3),
        unit(&["hPa"], 0.1),
        unit(&["MPa"], 1e3),
        unit(&["bar"], 100.0),
        unit(&["mbar"], 0.1),
        unit(&["psi", "PSI", "lbf/in²", "lb/in²"], PSI),
        // Conventional inch of mercury, 3386.389 Pa: NIST SP 811 (2008), B.8.
        unit(&["inHg", "in Hg", "\"Hg", "in. Hg", "inHG"], 3.386_389),
        unit(&["mmHg", "mm Hg", "Torr", "torr"], 0.133_322_4),
        unit(&["atm"], 101.325),
        unit(&["kgf/cm²", "at"], 98.066_5),
        unit(&["mH2O", "m H2O", "mWC", "mWS"], 9.806_65),
        unit(&["inH2O", "in H2O"], 0.249_088_9),
    ],
};

/// Base m.
pub(crate) static LENGTH: Dimension = Dimension {
    name: "length",
    units: &[
        unit(&["m", "metre", "meter"], 1.0),
        unit(&["mm"], 1e-3),
        unit(&["cm"], 1e-2),
        unit(&["km"], 1e3),
        unit(&["in", "inch", "inches", "\"", "″", "in."], INCH),
        unit(&["ft", "foot", "feet", "'", "′", "ft."], FOOT),
        unit(&["yd"], 3.0 * FOOT),
    ],
};

/// Base m².
pub(crate) static AREA: Dimension = Dimension {
    name: "area",
    units: &[
        unit(&["m²", "sq m"], 1.0),
        unit(&["cm²", "sq cm"], 1e-4),
        unit(&["mm²"], 1e-6),
        unit(&["ft²", "sq ft", "sqft"], FOOT * FOOT),
        unit(&["in²", "sq in", "sqin"], INCH * INCH),
    ],
};

/// Base L.
pub(crate) static VOLUME: Dimension = Dimension {
    name: "volume",
    units: &[
        unit(&["L", "l", "ℓ", "litre", "liter", "litres", "liters", "dm³", "ltr"], 1.0),
        unit(&["mL", "ml", "cm³", "cc"], 1e-3),
        unit(&["m³"], 1e3),
        // US liquid measures.
        unit(&["gal", "US gal", "gallon", "gallons", "usgal"], GALLON),
        unit(&["qt", "quart", "quarts"], GALLON / 4.0),
        unit(&["imp gal", "gal UK", "UK gal"], 4.546_09),
        unit(&["ft³", "cu ft"], FOOT * FOOT * FOOT * 1e3),
        unit(&["in³", "cu in"], INCH * INCH * INCH * 1e3),
    ],
};

/// Base cm³ per revolution.
pub(crate) static DISPLACEMENT: Dimension = Dimension {
    name: "displacement",
    units: &[
        unit(
            &["cm³", "cm³/rev", "cm³/r", "cc", "cc/rev", "ccm", "mL", "mL/rev", "ml", "ml/rev"],
            1.0,
        ),
        unit(&["in³", "in³/rev", "in³/r", "cu in", "cu in/rev", "cir"], INCH * INCH * INCH * 1e6),
        unit(&["L", "l", "L/rev"], 1000.0),
    ],
};

/// Base kg.
pub(crate) static MASS: Dimension = Dimension {
    name: "mass",
    units: &[
        unit(&["kg"], 1.0),
        unit(&["g"], 1e-3),
        unit(&["t", "tonne"], 1e3),
        unit(&["lb", "lbs", "lbm"], POUND),
    ],
};

/// Base kg/m³. Weight densities are divided by standard gravity; a specific gravity is against
/// water at 60 °F.
pub(crate) static DENSITY: Dimension = Dimension {
    name: "density",
    units: &[
        unit(&["kg/m³"], 1.0),
        unit(&["kg/L", "kg/l", "kg/dm³", "g/cm³", "g/mL", "g/ml", "t/m³"], 1e3),
        unit(&["lb/ft³", "lbm/ft³", "lbf/ft³", "pcf"], POUND / (FOOT * FOOT * FOOT)),
        unit(&["lb/gal", "lb/US gal", "ppg"], POUND / GALLON * 1e3),
        unit(&["N/m³"], 1.0 / GRAVITY),
        unit(&["kN/m³"], 1e3 / GRAVITY),
        unit(&["SG", "sg", "specific gravity", "sp gr", "sp.gr."], WATER_60F),
    ],
};

/// Base W.
pub(crate) static POWER: Dimension = Dimension {
    name: "power",
    units: &[
        unit(&["W", "w", "watt", "watts"], 1.0),
        unit(&["kW", "kw"], 1e3),
        // Mechanical horsepower, 550 ft·lbf/s.
        unit(&["hp", "HP"], 550.0 * FOOT * POUND * GRAVITY),
        unit(&["BTU/h", "Btu/h", "Btu/hr", "BTU/hr"], BTU / 3600.0),
    ],
};

/// Base V.
pub(crate) static VOLTAGE: Dimension = Dimension {
    name: "voltage",
    units: &[unit(&["V", "v", "volt", "volts", "VAC", "Vac", "VDC"], 1.0), unit(&["kV"], 1e3)],
};

/// Base A.
pub(crate) static CURRENT: Dimension = Dimension {
    name: "current",
    units: &[unit(&["A", "a", "amp", "amps", "ampere"], 1.0), unit(&["mA"], 1e-3)],
};

/// Base h.
pub(crate) static TIME: Dimension = Dimension {
    name: "time",
    units: &[
        unit(&["h", "hr", "hrs", "hour", "hours"], 1.0),
        unit(&["min", "minute", "minutes"], 1.0 / 60.0),
        unit(&["s", "sec", "second", "seconds"], 1.0 / 3600.0),
        unit(&["d", "day", "days"], 24.0),
    ],
};

/// Base rpm.
pub(crate) static ROTATION: Dimension = Dimension {
    name: "speed",
    units: &[
        unit(&["rpm", "RPM", "r/min", "1/min", "min⁻¹", "rev/min", "U/min"], 1.0),
        unit(&["1/s", "s⁻¹", "rps", "rev/s", "r/s", "Hz"], 60.0),
    ],
};

/// Base L/min.
pub(crate) static FLOW: Dimension = Dimension {
    name: "flow",
    units: &[
        unit(&["L/min", "l/min", "lpm", "LPM", "dm³/min"], 1.0),
        unit(&["L/s", "l/s", "dm³/s"], 60.0),
        unit(&["m³/h"], 1e3 / 60.0),
        unit(&["cm³/s", "mL/s"], 0.06),
        unit(&["gpm", "GPM", "gal/min", "US gal/min"], GALLON),
    ],
};

/// Base m/s.
pub(crate) static VELOCITY: Dimension = Dimension {
    name: "velocity",
    units: &[
        unit(&["m/s"], 1.0),
        unit(&["km/h", "kph", "kmh"], 1.0 / 3.6),
        unit(&["mph", "mi/h"], 0.447_04),
        unit(&["kn", "kt", "knot", "knots"], 1852.0 / 3600.0),
        unit(&["ft/s", "fps"], FOOT),
        unit(&["ft/min", "fpm"], FOOT / 60.0),
    ],
};

/// Base W/(m·K).
pub(crate) static THERMAL_CONDUCTIVITY: Dimension = Dimension {
    name: "thermal conductivity",
    units: &[
        unit(&["W/(m·K)", "W/m·K", "W/mK", "W/m K", "W/(m·°C)"], 1.0),
        unit(&["Btu/(h·ft·°F)", "Btu/h·ft·°F"], BTU / 3600.0 / FOOT * 9.0 / 5.0),
        unit(
            &["Btu·in/(h·ft²·°F)", "Btu·in/h·ft²·°F"],
            BTU / 3600.0 * INCH / (FOOT * FOOT) * 9.0 / 5.0,
        ),
    ],
};

/// Base W/(m²·K).
pub(crate) static HEAT_TRANSFER_COEFFICIENT: Dimension = Dimension {
    name: "heat transfer coefficient",
    units: &[
        unit(&["W/(m²·K)", "W/m²·K", "W/m²K", "W/m² K", "W/(m²·°C)"], 1.0),
        unit(
            &["Btu/(h·ft²·°F)", "Btu/h·ft²·°F", "BTU/(hr·ft²·°F)"],
            BTU / 3600.0 / (FOOT * FOOT) * 9.0 / 5.0,
        ),
    ],
};

/// Base W/K.
pub(crate) static HEAT_LOSS_RATE: Dimension = Dimension {
    name: "heat loss rate",
    units: &[
        unit(&["W/K", "W/°C"], 1.0),
        unit(&["kW/K"], 1e3),
        unit(&["Btu/(h·°F)", "Btu/h·°F", "BTU/(hr·°F)"], BTU / 3600.0 * 9.0 / 5.0),
    ],
};

/// Base W/cm².
pub(crate) static WATT_DENSITY: Dimension = Dimension {
    name: "watt density",
    units: &[
        unit(&["W/cm²"], 1.0),
        unit(&["W/m²"], 1e-4),
        unit(&["kW/m²"], 0.1),
        unit(&["W/in²"], 1.0 / (2.54 * 2.54)),
    ],
};

/// All dimensions there are.
#[must_use]
pub fn dimensions() -> [&'static Dimension; 22] {
    [
        &TEMPERATURE,
        &TEMPERATURE_DIFFERENCE,
        &KINEMATIC_VISCOSITY,
        &DYNAMIC_VISCOSITY,
        &PRESSURE,
        &LENGTH,
        &AREA,
        &VOLUME,
        &DISPLACEMENT,
        &MASS,
        &DENSITY,
        &POWER,
        &VOLTAGE,
        &CURRENT,
        &TIME,
        &ROTATION,
        &FLOW,
        &VELOCITY,
        &THERMAL_CONDUCTIVITY,
        &HEAT_TRANSFER_COEFFICIENT,
        &HEAT_LOSS_RATE,
        &WATT_DENSITY,
    ]
}
