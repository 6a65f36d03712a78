//! Unit spellings and their factors, one table a dimension.
//!
//! Sources: factors are exact by definition unless noted; NIST SP 811 (2008), appendix B, gives the
//! same figures. Spellings need not list spaces, raised digits, signs for a product, a full stop at
//! the end or a slip of case: `mm²/s` also stands for `mm2/s` and `mm^2/s`, `kW` for `kw`.

use super::spelling;

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
    /// The unit written as `spelling`, if this dimension has it. A slip of case (`kw`) is forgiven
    /// unless milli and mega would be mixed up (`mPa`, `MPa`).
    #[must_use]
    pub fn unit(&self, spelling: &str) -> Option<&'static Unit> {
        spelling::find(self, spelling)
    }
}

const fn unit(spellings: &'static [&'static str], factor: f64) -> Unit {
    Unit { spellings, factor, offset: 0.0 }
}

const fn unit_with_zero(spellings: &'static [&'static str], factor: f64, offset: f64) -> Unit {
    Unit { spellings, factor, offset }
}

/// Every dimension, the more usual first where a unit belongs to two.
#[must_use]
pub fn dimensions() -> &'static [&'static Dimension] {
    DIMENSIONS
}

static DIMENSIONS: &[&Dimension] = &[
    &TEMPERATURE,
    &TEMPERATURE_DIFFERENCE,
    &PRESSURE,
    &KINEMATIC_VISCOSITY,
    &DYNAMIC_VISCOSITY,
    &LENGTH,
    &AREA,
    &VOLUME,
    &MASS,
    &DENSITY,
    &POWER,
    &VOLTAGE,
    &CURRENT,
    &TIME,
    &ROTATION,
    &FLOW,
    &DISPLACEMENT,
    &VELOCITY,
    &THERMAL_CONDUCTIVITY,
    &HEAT_TRANSFER_COEFFICIENT,
    &HEAT_LOSS_RATE,
    &WATT_DENSITY,
];

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
        unit(&["°C", "C", "degC", "deg. C", "degrees C", "Celsius", "°Celsius"], 1.0),
        unit_with_zero(
            &["°F", "F", "degF", "deg. F", "degrees F", "Fahrenheit", "°Fahrenheit"],
            5.0 / 9.0,
            -160.0 / 9.0,
        ),
        unit_with_zero(&["K", "kelvin"], 1.0, -273.15),
        unit_with_zero(&["°R", "degR", "Rankine"], 5.0 / 9.0, -273.15),
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
        unit(&["mm²/s", "cSt", "cS", "mm²/sec", "mm²·s⁻¹", "centistoke", "centistokes"], 1.0),
        unit(&["St", "cm²/s", "stokes"], 100.0),
        unit(&["m²/s"], 1e6),
        unit(&["ft²/s"], FOOT * FOOT * 1e6),
        unit(&["in²/s"], INCH * INCH * 1e6),
    ],
};

/// Base mPa·s.
pub(crate) static DYNAMIC_VISCOSITY: Dimension = Dimension {
    name: "dynamic viscosity",
    units: &[
        unit(&["mPa·s", "mPas", "mPa-s", "cP", "cps", "centipoise"], 1.0),
        unit(&["P", "poise"], 100.0),
        unit(&["Pa·s", "Pas", "Pa-s"], 1000.0),
    ],
};

/// Base kPa. The columns of mercury and water are the conventional ones, NIST SP 811 (2008), B.8.
pub(crate) static PRESSURE: Dimension = Dimension {
    name: "pressure",
    units: &[
        unit(&["kPa"], 1.0),
        unit(&["Pa"], 1e-3),
        unit(&["hPa"], 0.1),
        unit(&["MPa", "N/mm²"], 1e3),
        unit(&["bar", "bars"], 100.0),
        unit(&["mbar", "millibar"], 0.1),
        unit(&["psi", "lbf/in²", "lb/in²", "lbs/in²"], PSI),
        unit(&["inHg", "\"Hg", "in. Hg", "in-Hg", "inches Hg", "inches of mercury"], 3.386_389),
        unit(&["mmHg", "Torr"], 0.133_322_4),
        unit(&["cmHg"], 1.333_224),
        unit(&["atm"], 101.325),
        unit(&["kgf/cm²", "kg/cm²", "kp/cm²", "at"], 98.066_5),
        unit(&["mH2O", "mWC", "mWS"], 9.806_65),
        unit(&["inH2O", "\"H2O", "in. H2O", "inWC", "inches of water"], 0.249_088_9),
        unit(&["ftH2O"], 2.989_067),
    ],
};

/// Base m.
pub(crate) static LENGTH: Dimension = Dimension {
    name: "length",
    units: &[
        unit(&["m", "metre", "metres", "meter", "meters"], 1.0),
        unit(&["mm"], 1e-3),
        unit(&["cm"], 1e-2),
        unit(&["km"], 1e3),
        unit(&["in", "inch", "inches", "\"", "''"], INCH),
        unit(&["ft", "foot", "feet", "'"], FOOT),
        unit(&["yd", "yard", "yards"], 3.0 * FOOT),
    ],
};

/// Base m².
pub(crate) static AREA: Dimension = Dimension {
    name: "area",
    units: &[
        unit(&["m²", "sq m"], 1.0),
        unit(&["cm²", "sq cm"], 1e-4),
        unit(&["mm²"], 1e-6),
        unit(&["ft²", "sq ft"], FOOT * FOOT),
        unit(&["in²", "sq in"], INCH * INCH),
    ],
};

/// Base L.
pub(crate) static VOLUME: Dimension = Dimension {
    name: "volume",
    units: &[
        unit(&["L", "ℓ", "litre", "liter", "litres", "liters", "dm³", "ltr"], 1.0),
        unit(&["mL", "cm³", "cc"], 1e-3),
        unit(&["m³"], 1e3),
        // US liquid measures; the gallon is 231 in³.
        unit(&["gal", "gals", "US gal", "U.S. gal", "gal (US)", "gallon", "gallons"], GALLON),
        unit(&["qt", "quart", "quarts"], GALLON / 4.0),
        unit(&["imp gal", "imp. gal", "gal (UK)", "UK gal", "imperial gallons"], 4.546_09),
        unit(&["ft³", "cu ft", "cu. ft"], FOOT * FOOT * FOOT * 1e3),
        unit(&["in³", "cu in", "cu. in"], INCH * INCH * INCH * 1e3),
    ],
};

/// Base cm³ per revolution.
pub(crate) static DISPLACEMENT: Dimension = Dimension {
    name: "displacement",
    units: &[
        unit(
            &["cm³", "cm³/rev", "cm³/r", "cm³/U", "cc", "cc/rev", "cc/r", "ccm", "mL", "mL/rev"],
            1.0,
        ),
        unit(
            &["in³", "in³/rev", "in³/r", "cu in", "cu in/rev", "cu. in/rev", "cir"],
            INCH * INCH * INCH * 1e6,
        ),
        unit(&["L", "L/rev"], 1000.0),
    ],
};

/// Base kg.
pub(crate) static MASS: Dimension = Dimension {
    name: "mass",
    units: &[
        unit(&["kg", "kgs"], 1.0),
        unit(&["g"], 1e-3),
        unit(&["t", "tonne", "tonnes"], 1e3),
        unit(&["lb", "lbs", "lbm"], POUND),
    ],
};

/// Base kg/m³. Weight densities are divided by standard gravity; a specific gravity is against
/// water at 60 °F.
pub(crate) static DENSITY: Dimension = Dimension {
    name: "density",
    units: &[
        unit(&["kg/m³"], 1.0),
        unit(&["kg/L", "kg/dm³", "g/cm³", "g/mL", "g/cc", "t/m³"], 1e3),
        unit(
            &["lb/ft³", "lbs/ft³", "lbm/ft³", "lbf/ft³", "lb/cu ft", "pcf"],
            POUND / (FOOT * FOOT * FOOT),
        ),
        unit(&["lb/gal", "lbs/gal", "lb/US gal", "ppg"], POUND / GALLON * 1e3),
        unit(&["N/m³"], 1.0 / GRAVITY),
        unit(&["kN/m³"], 1e3 / GRAVITY),
        unit(&["SG", "S.G", "specific gravity", "sp gr", "sp. gr"], WATER_60F),
    ],
};

/// Base W.
pub(crate) static POWER: Dimension = Dimension {
    name: "power",
    units: &[
        unit(&["W", "watt", "watts"], 1.0),
        unit(&["kW", "kilowatt", "kilowatts"], 1e3),
        // Mechanical horsepower, 550 ft·lbf/s.
        unit(&["hp", "bhp"], 550.0 * FOOT * POUND * GRAVITY),
        // Metric horsepower, 75 kgf·m/s.
        unit(&["PS"], 75.0 * GRAVITY),
        unit(&["Btu/h", "Btu/hr"], BTU / 3600.0),
    ],
};

/// Base V.
pub(crate) static VOLTAGE: Dimension = Dimension {
    name: "voltage",
    units: &[unit(&["V", "volt", "volts", "VAC", "V AC", "VDC"], 1.0), unit(&["kV"], 1e3)],
};

/// Base A.
pub(crate) static CURRENT: Dimension = Dimension {
    name: "current",
    units: &[unit(&["A", "amp", "amps", "ampere", "amperes"], 1.0), unit(&["mA"], 1e-3)],
};

/// Base h.
pub(crate) static TIME: Dimension = Dimension {
    name: "time",
    units: &[
        unit(&["h", "hr", "hrs", "hour", "hours"], 1.0),
        unit(&["min", "mins", "minute", "minutes"], 1.0 / 60.0),
        unit(&["s", "sec", "secs", "second", "seconds"], 1.0 / 3600.0),
        unit(&["d", "day", "days"], 24.0),
    ],
};

/// Base rpm.
pub(crate) static ROTATION: Dimension = Dimension {
    name: "rotational speed",
    units: &[
        unit(&["rpm", "r.p.m", "r/min", "1/min", "min⁻¹", "rev/min", "U/min", "tr/min"], 1.0),
        unit(&["1/s", "s⁻¹", "rps", "rev/s", "r/s", "Hz"], 60.0),
    ],
};

/// Base L/min.
pub(crate) static FLOW: Dimension = Dimension {
    name: "flow",
    units: &[
        unit(&["L/min", "lpm", "dm³/min"], 1.0),
        unit(&["L/s", "dm³/s"], 60.0),
        unit(&["L/h"], 1.0 / 60.0),
        unit(&["m³/h"], 1e3 / 60.0),
        unit(&["cm³/s", "mL/s", "cc/s"], 0.06),
        unit(&["cm³/min", "mL/min", "cc/min"], 1e-3),
        unit(&["gpm", "gal/min", "US gal/min", "US gpm"], GALLON),
    ],
};

/// Base m/s.
pub(crate) static VELOCITY: Dimension = Dimension {
    name: "velocity",
    units: &[
        unit(&["m/s", "m/sec", "mps"], 1.0),
        unit(&["km/h", "kph", "kmh", "kmph", "km/hr"], 1.0 / 3.6),
        unit(&["mph", "mi/h"], 0.447_04),
        unit(&["kn", "kt", "kts", "knot", "knots"], 1852.0 / 3600.0),
        unit(&["ft/s", "fps", "ft/sec"], FOOT),
        unit(&["ft/min", "fpm"], FOOT / 60.0),
    ],
};

/// Base W/(m·K).
pub(crate) static THERMAL_CONDUCTIVITY: Dimension = Dimension {
    name: "thermal conductivity",
    units: &[
        unit(&["W/(m·K)", "W/m·K", "W/mK", "W/(m·°C)", "W/m·°C"], 1.0),
        unit(&["mW/(m·K)", "mW/m·K", "mW/mK"], 1e-3),
        unit(
            &["Btu/(h·ft·°F)", "Btu/h·ft·°F", "Btu/(hr·ft·°F)", "Btu/hr·ft·°F"],
            BTU / 3600.0 / FOOT * 9.0 / 5.0,
        ),
        unit(
            &[
                "Btu·in/(h·ft²·°F)",
                "Btu·in/h·ft²·°F",
                "Btu·in/(hr·ft²·°F)",
                "Btu·in/hr·ft²·°F",
                "Btu-in/hr-ft²-°F",
            ],
            BTU / 3600.0 * INCH / (FOOT * FOOT) * 9.0 / 5.0,
        ),
    ],
};

/// Base W/(m²·K).
pub(crate) static HEAT_TRANSFER_COEFFICIENT: Dimension = Dimension {
    name: "heat transfer coefficient",
    units: &[
        unit(&["W/(m²·K)", "W/m²·K", "W/m²K", "W/(m²·°C)", "W/m²·°C"], 1.0),
        unit(
            &[
                "Btu/(h·ft²·°F)",
                "Btu/h·ft²·°F",
                "Btu/(hr·ft²·°F)",
                "Btu/hr·ft²·°F",
                "Btu/hr-ft²-°F",
            ],
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
        unit(
            &["Btu/(h·°F)", "Btu/h·°F", "Btu/(hr·°F)", "Btu/hr·°F", "Btu/hr-°F"],
            BTU / 3600.0 * 9.0 / 5.0,
        ),
    ],
};

/// Base W/cm².
pub(crate) static WATT_DENSITY: Dimension = Dimension {
    name: "watt density",
    units: &[
        unit(&["W/cm²", "W/sq cm"], 1.0),
        unit(&["W/m²"], 1e-4),
        unit(&["kW/m²"], 0.1),
        unit(&["W/in²", "W/sq in", "W/sq. in"], 1.0 / (2.54 * 2.54)),
    ],
};
