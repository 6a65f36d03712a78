//! Every unit spelling and every operator recomputed with another library, uom 0.38; a spelling
//! without a row fails.

use coldsump::quantity::{
    AbsolutePressure, Dimension, KINDS, Kind, Temperature, TimeSpan, dimensions,
};
use uom::si::f64 as si;
use uom::si::{
    area, dynamic_viscosity, electric_current, electric_potential, energy, force, frequency,
    heat_flux_density, heat_transfer, kinematic_viscosity, length, mass, mass_density, power,
    pressure, temperature_interval, thermal_conductance, thermal_conductivity,
    thermodynamic_temperature, time, velocity, volume, volume_rate,
};

/// uom 0.38: a number of one unit in another.
macro_rules! by_uom {
    ($quantity:ident in $module:ident: $from:ident => $to:ident) => {
        |x| si::$quantity::new::<$module::$from>(x).get::<$module::$to>()
    };
}

/// uom 0.38: what one of a unit is in SI base units.
macro_rules! si_of {
    ($quantity:ident in $module:ident: $unit:ident) => {
        si::$quantity::new::<$module::$unit>(1.0).value
    };
}

fn btu_per_hour() -> f64 {
    si_of!(Energy in energy: btu_it) / si_of!(Time in time: hour)
}

fn fahrenheit() -> f64 {
    si_of!(TemperatureInterval in temperature_interval: degree_fahrenheit)
}

fn foot() -> f64 {
    si_of!(Length in length: foot)
}

/// Spellings, and what a number of them is in the first unit of the dimension.
struct Row(&'static [&'static str], fn(f64) -> f64, Figures);

/// How exact the other figure is.
#[derive(Clone, Copy)]
enum Figures {
    /// uom 0.38 holds the definition.
    Exact,
    /// uom 0.38 holds the seven figures of NIST SP 811 (2008), B.8.
    Seven,
    /// uom 0.38 has no such unit: the definition, from the source named.
    Defined(&'static str),
}
use Figures::{Defined, Exact, Seven};

const SP811: Figures = Defined("NIST SP 811 (2008), B.8");

/// One row a unit: dimension, then its rows.
fn rows() -> Vec<(&'static str, Vec<Row>)> {
    vec![
        (
            "temperature",
            vec![
                Row(
                    &["°C", "C", "degC", "deg. C", "degrees C", "Celsius", "°Celsius"],
                    by_uom!(ThermodynamicTemperature in thermodynamic_temperature: degree_celsius => degree_celsius),
                    Exact,
                ),
                Row(
                    &["°F", "F", "degF", "deg. F", "degrees F", "Fahrenheit", "°Fahrenheit"],
                    by_uom!(ThermodynamicTemperature in thermodynamic_temperature: degree_fahrenheit => degree_celsius),
                    Exact,
                ),
                Row(
                    &["K", "kelvin"],
                    by_uom!(ThermodynamicTemperature in thermodynamic_temperature: kelvin => degree_celsius),
                    Exact,
                ),
                Row(
                    &["°R", "degR", "Rankine"],
                    by_uom!(ThermodynamicTemperature in thermodynamic_temperature: degree_rankine => degree_celsius),
                    Exact,
                ),
            ],
        ),
        (
            "temperature difference",
            vec![
                Row(
                    &["K", "°C", "C", "degC", "kelvin"],
                    by_uom!(TemperatureInterval in temperature_interval: degree_celsius => kelvin),
                    Exact,
                ),
                Row(
                    &["°F", "F", "degF", "°R", "degR"],
                    by_uom!(TemperatureInterval in temperature_interval: degree_fahrenheit => kelvin),
                    Exact,
                ),
            ],
        ),
        (
            "kinematic viscosity",
            vec![
                Row(
                    &["mm²/s", "cSt", "cS", "mm²/sec", "mm²·s⁻¹", "centistoke", "centistokes"],
                    by_uom!(KinematicViscosity in kinematic_viscosity: centistokes => square_millimeter_per_second),
                    Exact,
                ),
                Row(
                    &["St", "cm²/s", "stokes"],
                    by_uom!(KinematicViscosity in kinematic_viscosity: stokes => square_millimeter_per_second),
                    Exact,
                ),
                Row(
                    &["m²/s"],
                    by_uom!(KinematicViscosity in kinematic_viscosity: square_meter_per_second => square_millimeter_per_second),
                    Exact,
                ),
                // NIST SP 811 (2008), B.8: 9.290 304 E-02 and 6.451 6 E-04 m²/s.
                Row(&["ft²/s"], |x| x * 9.290_304e4, SP811),
                Row(
                    &["in²/s"],
                    |x| x * 6.451_6e2,
                    Defined("inch = 25.4 mm: NIST SP 811 (2008), B.8"),
                ),
            ],
        ),
        (
            "dynamic viscosity",
            vec![
                Row(
                    &["mPa·s", "mPas", "mPa-s", "cP", "cps", "centipoise"],
                    by_uom!(DynamicViscosity in dynamic_viscosity: centipoise => millipascal_second),
                    Exact,
                ),
                Row(
                    &["P", "poise"],
                    by_uom!(DynamicViscosity in dynamic_viscosity: poise => millipascal_second),
                    Exact,
                ),
                Row(
                    &["Pa·s", "Pas", "Pa-s"],
                    by_uom!(DynamicViscosity in dynamic_viscosity: pascal_second => millipascal_second),
                    Exact,
                ),
            ],
        ),
        (
            "pressure",
            vec![
                Row(&["kPa"], by_uom!(Pressure in pressure: kilopascal => kilopascal), Exact),
                Row(&["Pa"], by_uom!(Pressure in pressure: pascal => kilopascal), Exact),
                Row(&["hPa"], by_uom!(Pressure in pressure: hectopascal => kilopascal), Exact),
                Row(
                    &["MPa", "N/mm²"],
                    by_uom!(Pressure in pressure: newton_per_square_millimeter => kilopascal),
                    Exact,
                ),
                Row(&["bar", "bars"], by_uom!(Pressure in pressure: bar => kilopascal), Exact),
                Row(
                    &["mbar", "millibar"],
                    by_uom!(Pressure in pressure: millibar => kilopascal),
                    Exact,
                ),
                Row(
                    &["psi", "lbf/in²", "lb/in²", "lbs/in²"],
                    by_uom!(Pressure in pressure: pound_force_per_square_inch => kilopascal),
                    Seven,
                ),
                Row(
                    &["inHg", "\"Hg", "in. Hg", "in-Hg", "inches Hg", "inches of mercury"],
                    by_uom!(Pressure in pressure: inch_of_mercury => kilopascal),
                    Exact,
                ),
                Row(
                    &["mmHg", "Torr"],
                    by_uom!(Pressure in pressure: millimeter_of_mercury => kilopascal),
                    Exact,
                ),
                Row(
                    &["cmHg"],
                    by_uom!(Pressure in pressure: centimeter_of_mercury => kilopascal),
                    Exact,
                ),
                Row(&["atm"], by_uom!(Pressure in pressure: atmosphere => kilopascal), Exact),
                Row(
                    &["kgf/cm²", "kg/cm²", "kp/cm²", "at"],
                    by_uom!(Pressure in pressure: atmosphere_technical => kilopascal),
                    Exact,
                ),
                Row(
                    &["mH2O", "mWC", "mWS"],
                    |x| 100.0 * si::Pressure::new::<pressure::centimeter_of_water>(x).value / 1e3,
                    Exact,
                ),
                Row(
                    &["inH2O", "\"H2O", "in. H2O", "inWC", "inches of water"],
                    by_uom!(Pressure in pressure: inch_of_water => kilopascal),
                    Exact,
                ),
                Row(&["ftH2O"], by_uom!(Pressure in pressure: foot_of_water => kilopascal), Exact),
            ],
        ),
        (
            "length",
            vec![
                Row(
                    &["m", "metre", "metres", "meter", "meters"],
                    by_uom!(Length in length: meter => meter),
                    Exact,
                ),
                Row(&["mm"], by_uom!(Length in length: millimeter => meter), Exact),
                Row(&["cm"], by_uom!(Length in length: centimeter => meter), Exact),
                Row(&["km"], by_uom!(Length in length: kilometer => meter), Exact),
                Row(
                    &["in", "inch", "inches", "\"", "''"],
                    by_uom!(Length in length: inch => meter),
                    Exact,
                ),
                Row(&["ft", "foot", "feet", "'"], by_uom!(Length in length: foot => meter), Exact),
                Row(&["yd", "yard", "yards"], by_uom!(Length in length: yard => meter), Exact),
            ],
        ),
        (
            "area",
            vec![
                Row(&["m²", "sq m"], by_uom!(Area in area: square_meter => square_meter), Exact),
                Row(
                    &["cm²", "sq cm"],
                    by_uom!(Area in area: square_centimeter => square_meter),
                    Exact,
                ),
                Row(&["mm²"], by_uom!(Area in area: square_millimeter => square_meter), Exact),
                Row(&["ft²", "sq ft"], by_uom!(Area in area: square_foot => square_meter), Exact),
                Row(&["in²", "sq in"], by_uom!(Area in area: square_inch => square_meter), Exact),
            ],
        ),
        (
            "volume",
            vec![
                Row(
                    &["L", "ℓ", "litre", "liter", "litres", "liters", "dm³", "ltr"],
                    by_uom!(Volume in volume: cubic_decimeter => liter),
                    Exact,
                ),
                Row(
                    &["mL", "cm³", "cc"],
                    by_uom!(Volume in volume: cubic_centimeter => liter),
                    Exact,
                ),
                Row(&["m³"], by_uom!(Volume in volume: cubic_meter => liter), Exact),
                Row(
                    &["gal", "gals", "US gal", "U.S. gal", "gal (US)", "gallon", "gallons"],
                    by_uom!(Volume in volume: gallon => liter),
                    Seven,
                ),
                Row(
                    &["qt", "quart", "quarts"],
                    by_uom!(Volume in volume: quart_liquid => liter),
                    Seven,
                ),
                Row(
                    &["imp gal", "imp. gal", "gal (UK)", "UK gal", "imperial gallons"],
                    by_uom!(Volume in volume: gallon_imperial => liter),
                    Exact,
                ),
                Row(
                    &["ft³", "cu ft", "cu. ft"],
                    by_uom!(Volume in volume: cubic_foot => liter),
                    Seven,
                ),
                Row(
                    &["in³", "cu in", "cu. in"],
                    by_uom!(Volume in volume: cubic_inch => liter),
                    Seven,
                ),
            ],
        ),
        (
            "mass",
            vec![
                Row(&["kg", "kgs"], by_uom!(Mass in mass: kilogram => kilogram), Exact),
                Row(&["g"], by_uom!(Mass in mass: gram => kilogram), Exact),
                Row(&["t", "tonne", "tonnes"], by_uom!(Mass in mass: ton => kilogram), Exact),
                Row(&["lb", "lbs", "lbm"], by_uom!(Mass in mass: pound => kilogram), Seven),
            ],
        ),
        (
            "density",
            vec![
                Row(
                    &["kg/m³"],
                    by_uom!(MassDensity in mass_density: kilogram_per_cubic_meter => kilogram_per_cubic_meter),
                    Exact,
                ),
                Row(
                    &["kg/L", "kg/dm³", "g/cm³", "g/mL", "g/cc", "t/m³"],
                    by_uom!(MassDensity in mass_density: gram_per_cubic_centimeter => kilogram_per_cubic_meter),
                    Exact,
                ),
                // Pound-force per cubic foot at standard gravity is the same number of pounds.
                Row(
                    &["lb/ft³", "lbs/ft³", "lbm/ft³", "lbf/ft³", "lb/cu ft", "pcf"],
                    by_uom!(MassDensity in mass_density: pound_per_cubic_foot => kilogram_per_cubic_meter),
                    Seven,
                ),
                Row(
                    &["lb/gal", "lbs/gal", "lb/US gal", "ppg"],
                    by_uom!(MassDensity in mass_density: pound_per_gallon => kilogram_per_cubic_meter),
                    Seven,
                ),
                // Divided by standard gravity: kgf/N.
                Row(&["N/m³"], |x| x / si_of!(Force in force: kilogram_force), Exact),
                Row(
                    &["kN/m³"],
                    |x| {
                        x * si_of!(Force in force: kilonewton)
                            / si_of!(Force in force: kilogram_force)
                    },
                    Exact,
                ),
                Row(
                    &["SG", "S.G", "specific gravity", "sp gr", "sp. gr"],
                    |x| x * 999.016,
                    Defined("water at 60 °F, 999.016 kg/m³: ASTM D1250 / API MPMS 11.1 (quoted)"),
                ),
            ],
        ),
        (
            "power",
            vec![
                Row(&["W", "watt", "watts"], by_uom!(Power in power: watt => watt), Exact),
                Row(
                    &["kW", "kilowatt", "kilowatts"],
                    by_uom!(Power in power: kilowatt => watt),
                    Exact,
                ),
                Row(&["hp", "bhp"], by_uom!(Power in power: horsepower => watt), Seven),
                Row(&["PS"], by_uom!(Power in power: horsepower_metric => watt), Seven),
                Row(&["Btu/h", "Btu/hr"], |x| x * btu_per_hour(), Seven),
            ],
        ),
        (
            "voltage",
            vec![
                Row(
                    &["V", "volt", "volts", "VAC", "V AC", "VDC"],
                    by_uom!(ElectricPotential in electric_potential: volt => volt),
                    Exact,
                ),
                Row(
                    &["kV"],
                    by_uom!(ElectricPotential in electric_potential: kilovolt => volt),
                    Exact,
                ),
            ],
        ),
        (
            "current",
            vec![
                Row(
                    &["A", "amp", "amps", "ampere", "amperes"],
                    by_uom!(ElectricCurrent in electric_current: ampere => ampere),
                    Exact,
                ),
                Row(
                    &["mA"],
                    by_uom!(ElectricCurrent in electric_current: milliampere => ampere),
                    Exact,
                ),
            ],
        ),
        (
            "time",
            vec![
                Row(
                    &["h", "hr", "hrs", "hour", "hours"],
                    by_uom!(Time in time: hour => hour),
                    Exact,
                ),
                Row(
                    &["min", "mins", "minute", "minutes"],
                    by_uom!(Time in time: minute => hour),
                    Exact,
                ),
                Row(
                    &["s", "sec", "secs", "second", "seconds"],
                    by_uom!(Time in time: second => hour),
                    Exact,
                ),
                Row(&["d", "day", "days"], by_uom!(Time in time: day => hour), Exact),
            ],
        ),
        (
            "rotational speed",
            vec![
                Row(
                    &["rpm", "r.p.m", "r/min", "1/min", "min⁻¹", "rev/min", "U/min", "tr/min"],
                    by_uom!(Frequency in frequency: cycle_per_minute => cycle_per_minute),
                    Exact,
                ),
                Row(
                    &["1/s", "s⁻¹", "rps", "rev/s", "r/s", "Hz"],
                    by_uom!(Frequency in frequency: hertz => cycle_per_minute),
                    Exact,
                ),
            ],
        ),
        (
            "flow",
            vec![
                Row(
                    &["L/min", "lpm", "dm³/min"],
                    by_uom!(VolumeRate in volume_rate: liter_per_minute => liter_per_minute),
                    Exact,
                ),
                Row(
                    &["L/s", "dm³/s"],
                    by_uom!(VolumeRate in volume_rate: liter_per_second => liter_per_minute),
                    Exact,
                ),
                Row(
                    &["L/h"],
                    |x| {
                        x * si_of!(Volume in volume: liter)
                            / si_of!(Time in time: hour)
                            / si_of!(VolumeRate in volume_rate: liter_per_minute)
                    },
                    Exact,
                ),
                Row(
                    &["m³/h"],
                    by_uom!(VolumeRate in volume_rate: cubic_meter_per_hour => liter_per_minute),
                    Exact,
                ),
                Row(
                    &["cm³/s", "mL/s", "cc/s"],
                    by_uom!(VolumeRate in volume_rate: cubic_centimeter_per_second => liter_per_minute),
                    Exact,
                ),
                Row(
                    &["cm³/min", "mL/min", "cc/min"],
                    |x| {
                        x * si_of!(Volume in volume: cubic_centimeter)
                            / si_of!(Time in time: minute)
                            / si_of!(VolumeRate in volume_rate: liter_per_minute)
                    },
                    Exact,
                ),
                Row(
                    &["gpm", "gal/min", "US gal/min", "US gpm"],
                    by_uom!(VolumeRate in volume_rate: gallon_per_minute => liter_per_minute),
                    Seven,
                ),
            ],
        ),
        (
            "displacement",
            vec![
                Row(
                    &[
                        "cm³", "cm³/rev", "cm³/r", "cm³/U", "cc", "cc/rev", "cc/r", "ccm", "mL",
                        "mL/rev",
                    ],
                    by_uom!(Volume in volume: milliliter => cubic_centimeter),
                    Exact,
                ),
                Row(
                    &["in³", "in³/rev", "in³/r", "cu in", "cu in/rev", "cu. in/rev", "cir"],
                    by_uom!(Volume in volume: cubic_inch => cubic_centimeter),
                    Seven,
                ),
                Row(&["L", "L/rev"], by_uom!(Volume in volume: liter => cubic_centimeter), Exact),
            ],
        ),
        (
            "velocity",
            vec![
                Row(
                    &["m/s", "m/sec", "mps"],
                    by_uom!(Velocity in velocity: meter_per_second => meter_per_second),
                    Exact,
                ),
                Row(
                    &["km/h", "kph", "kmh", "kmph", "km/hr"],
                    by_uom!(Velocity in velocity: kilometer_per_hour => meter_per_second),
                    Exact,
                ),
                Row(
                    &["mph", "mi/h"],
                    by_uom!(Velocity in velocity: mile_per_hour => meter_per_second),
                    Exact,
                ),
                Row(
                    &["kn", "kt", "kts", "knot", "knots"],
                    by_uom!(Velocity in velocity: knot => meter_per_second),
                    Exact,
                ),
                Row(
                    &["ft/s", "fps", "ft/sec"],
                    by_uom!(Velocity in velocity: foot_per_second => meter_per_second),
                    Exact,
                ),
                Row(
                    &["ft/min", "fpm"],
                    by_uom!(Velocity in velocity: foot_per_minute => meter_per_second),
                    Exact,
                ),
            ],
        ),
        (
            "thermal conductivity",
            vec![
                Row(
                    &["W/(m·K)", "W/m·K", "W/mK", "W/(m·°C)", "W/m·°C"],
                    by_uom!(ThermalConductivity in thermal_conductivity: watt_per_meter_degree_celsius => watt_per_meter_kelvin),
                    Exact,
                ),
                Row(
                    &["mW/(m·K)", "mW/m·K", "mW/mK"],
                    by_uom!(ThermalConductivity in thermal_conductivity: milliwatt_per_meter_kelvin => watt_per_meter_kelvin),
                    Exact,
                ),
                Row(
                    &["Btu/(h·ft·°F)", "Btu/h·ft·°F", "Btu/(hr·ft·°F)", "Btu/hr·ft·°F"],
                    |x| x * btu_per_hour() / foot() / fahrenheit(),
                    Seven,
                ),
                Row(
                    &[
                        "Btu·in/(h·ft²·°F)",
                        "Btu·in/h·ft²·°F",
                        "Btu·in/(hr·ft²·°F)",
                        "Btu·in/hr·ft²·°F",
                        "Btu-in/hr-ft²-°F",
                    ],
                    |x| {
                        x * btu_per_hour() * si_of!(Length in length: inch)
                            / si_of!(Area in area: square_foot)
                            / fahrenheit()
                    },
                    Seven,
                ),
            ],
        ),
        (
            "heat transfer coefficient",
            vec![
                Row(
                    &["W/(m²·K)", "W/m²·K", "W/m²K", "W/(m²·°C)", "W/m²·°C"],
                    by_uom!(HeatTransfer in heat_transfer: watt_per_square_meter_degree_celsius => watt_per_square_meter_kelvin),
                    Exact,
                ),
                Row(
                    &[
                        "Btu/(h·ft²·°F)",
                        "Btu/h·ft²·°F",
                        "Btu/(hr·ft²·°F)",
                        "Btu/hr·ft²·°F",
                        "Btu/hr-ft²-°F",
                    ],
                    by_uom!(HeatTransfer in heat_transfer: btu_it_per_hour_square_foot_degree_fahrenheit => watt_per_square_meter_kelvin),
                    Seven,
                ),
            ],
        ),
        (
            "heat loss rate",
            vec![
                Row(
                    &["W/K", "W/°C"],
                    by_uom!(ThermalConductance in thermal_conductance: watt_per_kelvin => watt_per_kelvin),
                    Exact,
                ),
                Row(
                    &["kW/K"],
                    by_uom!(ThermalConductance in thermal_conductance: kilowatt_per_kelvin => watt_per_kelvin),
                    Exact,
                ),
                Row(
                    &["Btu/(h·°F)", "Btu/h·°F", "Btu/(hr·°F)", "Btu/hr·°F", "Btu/hr-°F"],
                    |x| x * btu_per_hour() / fahrenheit(),
                    Seven,
                ),
            ],
        ),
        (
            "watt density",
            vec![
                Row(
                    &["W/cm²", "W/sq cm"],
                    by_uom!(HeatFluxDensity in heat_flux_density: watt_per_square_centimeter => watt_per_square_centimeter),
                    Exact,
                ),
                Row(
                    &["W/m²"],
                    by_uom!(HeatFluxDensity in heat_flux_density: watt_per_square_meter => watt_per_square_centimeter),
                    Exact,
                ),
                Row(
                    &["kW/m²"],
                    by_uom!(HeatFluxDensity in heat_flux_density: kilowatt_per_square_meter => watt_per_square_centimeter),
                    Exact,
                ),
                Row(
                    &["W/in²", "W/sq in", "W/sq. in"],
                    |x| {
                        x * si_of!(Area in area: square_centimeter)
                            / si_of!(Area in area: square_inch)
                    },
                    Exact,
                ),
            ],
        ),
    ]
}

impl Row {
    fn source(&self) -> &'static str {
        match self.2 {
            Exact | Seven => "uom 0.38",
            Defined(source) => source,
        }
    }

    fn close(&self, found: f64, want: f64) -> bool {
        let relative = match self.2 {
            Exact | Defined(_) => 1e-12,
            Seven => 5e-7,
        };
        // Temperatures are summed in K, whose last place is 6e-14.
        (found - want).abs() <= relative * want.abs() + 2e-13
    }
}

fn row<'a>(rows: &'a [(&str, Vec<Row>)], dimension: &Dimension, spelling: &str) -> &'a Row {
    let (_, rows) = rows
        .iter()
        .find(|(name, _)| *name == dimension.name)
        .unwrap_or_else(|| panic!("no rows for {}", dimension.name));
    rows.iter()
        .find(|row| row.0.contains(&spelling))
        .unwrap_or_else(|| panic!("no row for `{spelling}` of {}", dimension.name))
}

#[test]
fn every_spelling_is_recomputed_with_another_library() {
    let rows = rows();
    for dimension in dimensions() {
        for unit in dimension.units {
            for spelling in unit.spellings {
                let row = row(&rows, dimension, spelling);
                assert!(unit.factor.is_normal(), "{spelling}");
                for x in [1.0, 37.5, 1e3] {
                    let (found, want) = (x * unit.factor + unit.offset, (row.1)(x));
                    assert!(
                        row.close(found, want),
                        "{x} {spelling} of {}: {found}, but {want} by {}",
                        dimension.name,
                        row.source()
                    );
                }
            }
        }
    }
    // No row without a spelling.
    for (name, rows) in &rows {
        let dimension = dimensions().iter().find(|d| d.name == *name).expect(name);
        for spelling in rows.iter().flat_map(|row| row.0) {
            let known = dimension.units.iter().any(|unit| unit.spellings.contains(spelling));
            assert!(known, "`{spelling}` of {name} is no longer a unit");
        }
    }
}

#[test]
fn every_kind_reads_every_spelling_of_its_dimension() {
    let rows = rows();
    for kind in KINDS {
        let own = row(&rows, kind.dimension, kind.unit);
        let own = |base: f64| (base - (own.1)(0.0)) / ((own.1)(1.0) - (own.1)(0.0));
        // Somewhere inside the range, away from zero.
        let want = kind.least + 0.37 * (kind.greatest.min(1e4) - kind.least);
        for spelling in kind.dimension.units.iter().flat_map(|unit| unit.spellings) {
            let row = row(&rows, kind.dimension, spelling);
            let base_of_own = row_base(&rows, kind, want);
            let slope = (row.1)(1.0) - (row.1)(0.0);
            let x = (base_of_own - (row.1)(0.0)) / slope;
            let said = if kind.noun == "absolute pressure" { " abs" } else { "" };
            for space in [" ", "\u{202F}", "\u{A0}"] {
                let text = format!("{x}{space}{spelling}{said}");
                let found =
                    kind.read(&text).unwrap_or_else(|e| panic!("{}: {text}: {e}", kind.noun));
                let want = own((row.1)(x));
                let close = (found - want).abs() <= 1e-6 * want.abs() + 1e-12;
                assert!(close, "{}: {text}: {found}, but {want} by {}", kind.noun, row.source());
            }
        }
    }
}

fn row_base(rows: &[(&str, Vec<Row>)], kind: &Kind, value: f64) -> f64 {
    (row(rows, kind.dimension, kind.unit).1)(value)
}

#[test]
fn operators_are_recomputed_with_another_library() {
    let kelvin = |t: f64| {
        si::ThermodynamicTemperature::new::<thermodynamic_temperature::degree_celsius>(t)
            .get::<thermodynamic_temperature::kelvin>()
    };
    for (a, b) in [(-38.0, 40.0), (400.0, -90.0), (0.1, 0.3)] {
        let found = Temperature::celsius(a).unwrap() - Temperature::celsius(b).unwrap();
        let want =
            si::TemperatureInterval::new::<temperature_interval::kelvin>(kelvin(a) - kelvin(b))
                .get::<temperature_interval::kelvin>();
        assert!((found.as_kelvin() - want).abs() < 1e-9, "{a} - {b} °C, uom 0.38");
    }
    let span = TimeSpan::hours(4.3).unwrap();
    let want = si::Time::new::<time::hour>(4.3).get::<time::second>();
    assert!((span.as_seconds() - want).abs() < 1e-9, "uom 0.38");
    // A vacuum is below the standard atmosphere: ISO 2533.
    let vacuum = si::Pressure::new::<pressure::atmosphere>(1.0)
        - si::Pressure::new::<pressure::inch_of_mercury>(5.0);
    let found: AbsolutePressure = "5 inHg vacuum".parse().unwrap();
    assert!((found.as_kpa() - vacuum.get::<pressure::kilopascal>()).abs() < 1e-9, "uom 0.38");
}
