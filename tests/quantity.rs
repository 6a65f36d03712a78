//! Every unit spelling and operator recomputed with the `uom` crate (0.38), or from the exact
//! definition where `uom` lacks the unit (NIST SP 811 (2008), appendix B); what people type; messages.

use coldsump::quantity::{
    AbsolutePressure, Density, Displacement, GaugePressure, KINDS, KinematicViscosity, Length,
    Power, PressureDifference, Quantity, Temperature, TimeSpan, Velocity, ViscosityReading, Volume,
    dimensions,
};
use proptest::prelude::*;
use uom::si::f64 as si;

const INCH: f64 = 0.0254;
const FOOT: f64 = 0.3048;
const GRAVITY: f64 = 9.80665;

/// One `uom` unit in the base unit of the dimension.
macro_rules! by_uom {
    ($quantity:ident, $module:ident, $unit:ident, $base:ident) => {{
        use uom::si::$module::{$base, $unit};
        si::$quantity::new::<$unit>(1.0).get::<$base>()
    }};
}

/// (dimension, first spelling, base units in one): every unit has a row.
fn rows() -> Vec<(&'static str, &'static str, f64)> {
    // Base units per unit by definition, NIST SP 811 (2008), B.8, where uom lacks the unit or its
    // base: named `exact`.
    let foot2 = by_uom!(Area, area, square_foot, square_meter);
    let foot3 = by_uom!(Volume, volume, cubic_foot, cubic_meter);
    let pound = by_uom!(Mass, mass, pound, kilogram);
    let gallon = by_uom!(Volume, volume, gallon, liter);
    let btu = by_uom!(Energy, energy, btu_it, joule);
    let exact = |value: f64| value;
    vec![
        ("temperature", "°C", 1.0),
        ("temperature", "°F", {
            use uom::si::thermodynamic_temperature::{degree_celsius as c, degree_fahrenheit as f};
            let at = |t: f64| si::ThermodynamicTemperature::new::<f>(t).get::<c>();
            at(1.0) - at(0.0)
        }),
        ("temperature", "K", 1.0),
        ("temperature", "°R", {
            use uom::si::thermodynamic_temperature::{degree_celsius as c, degree_rankine as r};
            let at = |t: f64| si::ThermodynamicTemperature::new::<r>(t).get::<c>();
            at(1.0) - at(0.0)
        }),
        ("temperature difference", "K", 1.0),
        (
            "temperature difference",
            "°F",
            by_uom!(TemperatureInterval, temperature_interval, degree_fahrenheit, kelvin),
        ),
        ("kinematic viscosity", "mm²/s", 1.0),
        (
            "kinematic viscosity",
            "St",
            by_uom!(KinematicViscosity, kinematic_viscosity, stokes, square_meter_per_second) * 1e6,
        ),
        ("kinematic viscosity", "m²/s", exact(1e6)),
        ("kinematic viscosity", "ft²/s", foot2 * 1e6),
        ("kinematic viscosity", "in²/s", by_uom!(Area, area, square_inch, square_meter) * 1e6),
        ("dynamic viscosity", "mPa·s", 1.0),
        (
            "dynamic viscosity",
            "P",
            by_uom!(DynamicViscosity, dynamic_viscosity, poise, pascal_second) * 1e3,
        ),
        ("dynamic viscosity", "Pa·s", 1e3),
        ("pressure", "kPa", 1.0),
        ("pressure", "Pa", by_uom!(Pressure, pressure, pascal, kilopascal)),
        ("pressure", "hPa", by_uom!(Pressure, pressure, hectopascal, kilopascal)),
        ("pressure", "MPa", by_uom!(Pressure, pressure, megapascal, kilopascal)),
        ("pressure", "bar", by_uom!(Pressure, pressure, bar, kilopascal)),
        ("pressure", "mbar", by_uom!(Pressure, pressure, millibar, kilopascal)),
        ("pressure", "psi", by_uom!(Pressure, pressure, psi, kilopascal)),
        ("pressure", "inHg", exact(3.386_389)),
        ("pressure", "mmHg", exact(0.133_322_4)),
        ("pressure", "atm", by_uom!(Pressure, pressure, atmosphere, kilopascal)),
        (
            "pressure",
            "kgf/cm²",
            by_uom!(Pressure, pressure, kilogram_force_per_square_centimeter, kilopascal),
        ),
        ("pressure", "mH2O", exact(GRAVITY)),
        ("pressure", "inH2O", exact(0.249_088_9)),
        ("length", "m", 1.0),
        ("length", "mm", by_uom!(Length, length, millimeter, meter)),
        ("length", "cm", by_uom!(Length, length, centimeter, meter)),
        ("length", "km", by_uom!(Length, length, kilometer, meter)),
        ("length", "in", by_uom!(Length, length, inch, meter)),
        ("length", "ft", by_uom!(Length, length, foot, meter)),
        ("length", "yd", by_uom!(Length, length, yard, meter)),
        ("area", "m²", 1.0),
        ("area", "cm²", by_uom!(Area, area, square_centimeter, square_meter)),
        ("area", "mm²", by_uom!(Area, area, square_millimeter, square_meter)),
        ("area", "ft²", foot2),
        ("area", "in²", by_uom!(Area, area, square_inch, square_meter)),
        ("volume", "L", 1.0),
        ("volume", "mL", by_uom!(Volume, volume, milliliter, liter)),
        ("volume", "m³", by_uom!(Volume, volume, cubic_meter, liter)),
        ("volume", "gal", gallon),
        ("volume", "qt", by_uom!(Volume, volume, quart_liquid, liter)),
        ("volume", "imp gal", by_uom!(Volume, volume, gallon_imperial, liter)),
        ("volume", "ft³", foot3 * 1e3),
        ("volume", "in³", by_uom!(Volume, volume, cubic_inch, liter)),
        ("displacement", "cm³", 1.0),
        ("displacement", "in³", by_uom!(Volume, volume, cubic_inch, cubic_centimeter)),
        ("displacement", "L", by_uom!(Volume, volume, liter, cubic_centimeter)),
        ("mass", "kg", 1.0),
        ("mass", "g", by_uom!(Mass, mass, gram, kilogram)),
        ("mass", "t", by_uom!(Mass, mass, ton, kilogram)),
        ("mass", "lb", pound),
        ("density", "kg/m³", 1.0),
        (
            "density",
            "kg/L",
            by_uom!(MassDensity, mass_density, gram_per_cubic_centimeter, kilogram_per_cubic_meter),
        ),
        (
            "density",
            "lb/ft³",
            by_uom!(MassDensity, mass_density, pound_per_cubic_foot, kilogram_per_cubic_meter),
        ),
        ("density", "lb/gal", pound / gallon * 1e3),
        ("density", "N/m³", exact(1.0 / GRAVITY)),
        ("density", "kN/m³", exact(1e3 / GRAVITY)),
        // Water at 60 °F, ASTM D1250 / API MPMS 11.1 [quoted].
        ("density", "SG", exact(999.016)),
        ("power", "W", 1.0),
        ("power", "kW", by_uom!(Power, power, kilowatt, watt)),
        ("power", "hp", exact(550.0 * FOOT * 0.453_592_37 * GRAVITY)),
        ("power", "BTU/h", btu / 3600.0),
        ("voltage", "V", 1.0),
        ("voltage", "kV", by_uom!(ElectricPotential, electric_potential, kilovolt, volt)),
        ("current", "A", 1.0),
        ("current", "mA", by_uom!(ElectricCurrent, electric_current, milliampere, ampere)),
        ("time", "h", 1.0),
        ("time", "min", by_uom!(Time, time, minute, hour)),
        ("time", "s", by_uom!(Time, time, second, hour)),
        ("time", "d", by_uom!(Time, time, day, hour)),
        ("speed", "rpm", 1.0),
        ("speed", "1/s", by_uom!(Frequency, frequency, hertz, cycle_per_minute)),
        ("flow", "L/min", 1.0),
        ("flow", "L/s", by_uom!(VolumeRate, volume_rate, liter_per_second, liter_per_minute)),
        ("flow", "m³/h", by_uom!(VolumeRate, volume_rate, cubic_meter_per_hour, liter_per_minute)),
        (
            "flow",
            "cm³/s",
            by_uom!(VolumeRate, volume_rate, cubic_centimeter_per_second, liter_per_minute),
        ),
        ("flow", "gpm", by_uom!(VolumeRate, volume_rate, gallon_per_minute, liter_per_minute)),
        ("velocity", "m/s", 1.0),
        ("velocity", "km/h", by_uom!(Velocity, velocity, kilometer_per_hour, meter_per_second)),
        ("velocity", "mph", by_uom!(Velocity, velocity, mile_per_hour, meter_per_second)),
        ("velocity", "kn", by_uom!(Velocity, velocity, knot, meter_per_second)),
        ("velocity", "ft/s", by_uom!(Velocity, velocity, foot_per_second, meter_per_second)),
        ("velocity", "ft/min", by_uom!(Velocity, velocity, foot_per_minute, meter_per_second)),
        ("thermal conductivity", "W/(m·K)", 1.0),
        ("thermal conductivity", "Btu/(h·ft·°F)", btu / 3600.0 / FOOT * 1.8),
        ("thermal conductivity", "Btu·in/(h·ft²·°F)", btu / 3600.0 * INCH / foot2 * 1.8),
        ("heat transfer coefficient", "W/(m²·K)", 1.0),
        ("heat transfer coefficient", "Btu/(h·ft²·°F)", btu / 3600.0 / foot2 * 1.8),
        ("heat loss rate", "W/K", 1.0),
        ("heat loss rate", "kW/K", 1e3),
        ("heat loss rate", "Btu/(h·°F)", btu / 3600.0 * 1.8),
        ("watt density", "W/cm²", 1.0),
        (
            "watt density",
            "W/m²",
            by_uom!(
                HeatFluxDensity,
                heat_flux_density,
                watt_per_square_meter,
                watt_per_square_centimeter
            ),
        ),
        (
            "watt density",
            "kW/m²",
            by_uom!(
                HeatFluxDensity,
                heat_flux_density,
                kilowatt_per_square_meter,
                watt_per_square_centimeter
            ),
        ),
        ("watt density", "W/in²", exact(1.0 / (2.54 * 2.54))),
    ]
}

#[test]
fn every_spelling_is_worth_what_uom_says() {
    let rows = rows();
    for dimension in dimensions() {
        for unit in dimension.units {
            let first = unit.spellings[0];
            let row = rows.iter().find(|row| row.0 == dimension.name && row.1 == first);
            let want = row.unwrap_or_else(|| panic!("no row for {first} of {}", dimension.name)).2;
            assert!(
                (unit.factor / want - 1.0).abs() < 1e-6,
                "{first} of {}: {} here, {want} there",
                dimension.name,
                unit.factor
            );
            for spelling in unit.spellings {
                let found = dimension.unit(spelling).unwrap();
                assert!(
                    std::ptr::eq(found, unit),
                    "{spelling} of {} means two units",
                    dimension.name
                );
            }
        }
    }
    for (dimension, spelling, _) in rows {
        let found = dimensions().into_iter().find(|d| d.name == dimension);
        assert!(
            found.is_some_and(|d| d.unit(spelling).is_some()),
            "{dimension}: {spelling} is gone"
        );
    }
}

#[test]
fn temperatures_and_their_difference_as_in_uom() {
    use uom::si::temperature_interval::kelvin as k;
    use uom::si::thermodynamic_temperature::{
        degree_celsius, degree_fahrenheit, degree_rankine, kelvin,
    };
    for value in [-60.0, -40.0, -36.4, 0.0, 100.0, 212.0] {
        let read = |unit: &str| {
            format!("{value} {unit}").parse::<Temperature>().map(Temperature::as_celsius)
        };
        let uom =
            si::ThermodynamicTemperature::new::<degree_fahrenheit>(value).get::<degree_celsius>();
        assert!(read("°F").is_ok_and(|t| (t - uom).abs() < 1e-9), "{value} °F");
    }
    for value in [240.0, 300.0, 450.0] {
        let read = |unit: &str| {
            format!("{value} {unit}").parse::<Temperature>().map(Temperature::as_celsius)
        };
        let uom = si::ThermodynamicTemperature::new::<kelvin>(value).get::<degree_celsius>();
        assert!(read("K").is_ok_and(|t| (t - uom).abs() < 1e-9), "{value} K");
        let uom = si::ThermodynamicTemperature::new::<degree_rankine>(value + 100.0)
            .get::<degree_celsius>();
        let found = format!("{} °R", value + 100.0).parse::<Temperature>();
        assert!(found.is_ok_and(|t| (t.as_celsius() - uom).abs() < 1e-9), "{value} °R");
    }
    let (a, b) = (Temperature::celsius(20.5).unwrap(), Temperature::celsius(-38.25).unwrap());
    let interval =
        si::TemperatureInterval::new::<k>(20.5) - si::TemperatureInterval::new::<k>(-38.25);
    assert!(((a - b).as_kelvin() - interval.get::<k>()).abs() < 1e-12);
    assert!((TimeSpan::hours(1.5).unwrap().as_seconds() - 5400.0).abs() < 1e-9);
}

#[test]
fn what_people_type() {
    fn close<Q: Quantity>(text: &str, want: f64) {
        let found = text.parse::<Q>().map(Quantity::value);
        assert!(
            found.as_ref().is_ok_and(|v| (v - want).abs() <= 1e-4 * want.abs()),
            "{text}: {found:?}"
        );
    }
    close::<Temperature>("-38 °C", -38.0);
    close::<Temperature>("-38C", -38.0);
    close::<Temperature>("−38,5 degC", -38.5);
    close::<Temperature>("-38\u{202f}°C", -38.0);
    close::<Temperature>("-36 F", -37.7778);
    close::<Temperature>("235 K", -38.15);
    close::<KinematicViscosity>("46 cSt", 46.0);
    close::<KinematicViscosity>("46 mm2/s", 46.0);
    close::<KinematicViscosity>("46 mm^2/s", 46.0);
    // 5 inHg is 16.932 kPa: NIST SP 811 (2008), B.8.
    close::<AbsolutePressure>("5 inHg vacuum", 101.325 - 16.932);
    close::<AbsolutePressure>("60 kPa abs", 60.0);
    close::<AbsolutePressure>("8.7 psia", 59.984);
    close::<AbsolutePressure>("0,6 bar(a)", 60.0);
    close::<GaugePressure>("25 barg", 2500.0);
    close::<GaugePressure>("363 psig", 2502.8);
    close::<PressureDifference>("2.5 kPa", 2.5);
    close::<Volume>("10 gal", 37.8541);
    close::<Density>("57 lb/ft³", 913.06);
    close::<Density>("0.875 SG", 874.139);
    close::<Displacement>("75 cc", 75.0);
    close::<Displacement>("4.58 in³/rev", 75.053);
    close::<Length>("2 in", 0.0508);
    close::<Length>("2\"", 0.0508);
    close::<Power>("1.5 kW", 1500.0);
    close::<Power>("2 hp", 1491.4);
    close::<TimeSpan>("90 min", 1.5);
    close::<Velocity>("10 mph", 4.4704);
    assert!(
        matches!("4100 mPa·s".parse(), Ok(ViscosityReading::Dynamic(v)) if v.as_mpa_s() == 4100.0)
    );
    assert!(
        matches!("150 SUS".parse(), Ok(ViscosityReading::Saybolt(t)) if t.seconds == 150.0 && t.at.is_none())
    );
    let at = "150 SSU at 100 °F".parse::<ViscosityReading>();
    assert!(matches!(at, Ok(ViscosityReading::Saybolt(t)) if t.at.is_some()));
}

#[test]
fn facts_of_the_trade() {
    // Common practice, no source.
    let gravity = 57.0 / 62.4;
    assert!((f64::round(gravity * 1000.0) - 913.0).abs() < 1e-9);
    for (pounds, kilonewtons) in [(56.0, 8.8), (57.0, 9.0)] {
        let density = format!("{pounds} lb/ft³").parse::<Density>().unwrap();
        let weight = density.in_unit("kN/m³").unwrap();
        assert!((weight - kilonewtons).abs() < 0.06, "{pounds} lb/ft³ is {weight} kN/m³");
    }
    let limit = "60 kPa".parse::<AbsolutePressure>().unwrap().as_kpa();
    assert!(((101.325 - limit) / 3.386_389 - 12.2).abs() < 0.05);
}

#[test]
fn messages_say_what_to_type() {
    fn message<Q: Quantity>(text: &str) -> String {
        text.parse::<Q>().err().map_or_else(String::new, |error| error.to_string())
    }
    for (found, want) in [
        (message::<Temperature>("-38"), "`-38` has no unit; write for example `-38 °C`"),
        (
            message::<Temperature>("-400 °C"),
            "temperature must be between -90 and 400 °C, but is -400 °C",
        ),
        (message::<Temperature>(""), "nothing is given; write for example `-38 °C`"),
        (
            message::<Temperature>("cold"),
            "`cold` is not a number with a unit; write for example `-38 °C`",
        ),
        (
            message::<Temperature>("nan °C"),
            "`nan °C` is not a finite number; write for example `-38 °C`",
        ),
        (
            message::<Temperature>("-inf °C"),
            "`-inf °C` is not a finite number; write for example `-38 °C`",
        ),
        (
            message::<Temperature>("1e999 °C"),
            "`1e999 °C` is not a finite number; write for example `-38 °C`",
        ),
        (
            message::<Temperature>("-38 bar"),
            "`bar` is not a unit of temperature; write for example `-38 °C` (units: °C, °F, K, °R)",
        ),
        (
            message::<Power>("1,500 W"),
            "`1,500 W` can be read in two ways; write the number without a thousands mark and with a decimal point",
        ),
        (
            message::<AbsolutePressure>("0.4 bar gauge"),
            "`0.4 bar gauge` is a gauge pressure, but an absolute one is needed; write for example `60 kPa`, or the vacuum at sea level, `5 inHg vacuum`",
        ),
        (
            message::<GaugePressure>("60 kPa abs"),
            "`60 kPa abs` is an absolute pressure, but a gauge pressure (over the air outside) is needed; write for example `25 bar`",
        ),
        (
            message::<PressureDifference>("2 kPa abs"),
            "`2 kPa abs` names what it is measured from, but a pressure difference is needed; write for example `2.5 kPa`",
        ),
        (
            message::<AbsolutePressure>("40 inHg vacuum"),
            "absolute pressure must be between 0 and 1000 kPa, but is -34.1306 kPa",
        ),
        (
            "20 SUS".parse::<ViscosityReading>().unwrap_err().to_string(),
            "`20 SUS` is outside the Saybolt Universal scale, which starts at 32 SUS",
        ),
        (
            "46 V".parse::<ViscosityReading>().unwrap_err().to_string(),
            "`V` is not a unit of viscosity; write for example `46 mm²/s` (units: mm²/s, cSt, mPa·s, cP, SUS)",
        ),
        (
            "1600 cSt at 20 °C".parse::<ViscosityReading>().unwrap_err().to_string(),
            "`1600 cSt at 20 °C` names a temperature, which only a Saybolt time needs; write for example `1600 mm²/s`",
        ),
    ] {
        assert_eq!(found, want);
    }
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn what_is_shown_reads_back(share in 0.0..1.0_f64) {
        for kind in KINDS {
            // Even over the logarithm where the range is wide.
            let value = if kind.least > 0.0 {
                kind.least * (kind.greatest / kind.least).powf(share)
            } else {
                kind.least + share * (kind.greatest - kind.least)
            };
            for unit in kind.dimension.units {
                let Some(there) = kind.in_unit(value, unit.spellings[0]) else { continue };
                let text = format!("{there:e} {}", unit.spellings[0]);
                let Ok(back) = kind.read(&text) else {
                    // Only rounding at an end of the range may throw it out.
                    prop_assert!(!(1e-9..=1.0 - 1e-9).contains(&share), "{text}");
                    continue;
                };
                prop_assert!((back - value).abs() <= 1e-9 * value.abs().max(1.0), "{text}: {back} for {value}");
            }
        }
    }

    #[test]
    fn no_text_makes_it_panic(text in "\\PC{0,24}") {
        for kind in KINDS {
            let _ = kind.read(&text);
        }
        let _ = text.parse::<ViscosityReading>();
    }

    #[test]
    fn a_decimal_comma_is_a_decimal_point(whole in 0_u32..300, part in 0_u32..100) {
        let point = format!("{whole}.{part:02} °C").parse::<Temperature>().unwrap();
        let comma = format!("{whole},{part:02} °C").parse::<Temperature>().unwrap();
        prop_assert_eq!(point, comma);
    }
}
