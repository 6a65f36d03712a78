//! What holds for every kind and any text.

use coldsump::quantity::*;
use proptest::prelude::*;

type Shows = fn(f64) -> String;

/// Every quantity type by its kind, and the text it shows of a value.
const TYPES: &[(&Kind, Shows)] = &[
    (Temperature::KIND, text_of::<Temperature>),
    (TemperatureDifference::KIND, text_of::<TemperatureDifference>),
    (KinematicViscosity::KIND, text_of::<KinematicViscosity>),
    (Density::KIND, text_of::<Density>),
    (AbsolutePressure::KIND, text_of::<AbsolutePressure>),
    (GaugePressure::KIND, text_of::<GaugePressure>),
    (PressureDifference::KIND, text_of::<PressureDifference>),
    (Bore::KIND, text_of::<Bore>),
    (Thickness::KIND, text_of::<Thickness>),
    (Length::KIND, text_of::<Length>),
    (Elevation::KIND, text_of::<Elevation>),
    (Area::KIND, text_of::<Area>),
    (Volume::KIND, text_of::<Volume>),
    (Displacement::KIND, text_of::<Displacement>),
    (Mass::KIND, text_of::<Mass>),
    (Power::KIND, text_of::<Power>),
    (Voltage::KIND, text_of::<Voltage>),
    (Current::KIND, text_of::<Current>),
    (TimeSpan::KIND, text_of::<TimeSpan>),
    (Rotation::KIND, text_of::<Rotation>),
    (Flow::KIND, text_of::<Flow>),
    (Velocity::KIND, text_of::<Velocity>),
    (ThermalConductivity::KIND, text_of::<ThermalConductivity>),
    (HeatTransferCoefficient::KIND, text_of::<HeatTransferCoefficient>),
    (HeatLossRate::KIND, text_of::<HeatLossRate>),
    (WattDensity::KIND, text_of::<WattDensity>),
];

fn text_of<Q: Quantity>(value: f64) -> String {
    Q::of(value).map_or_else(|e| panic!("{e}"), |quantity| quantity.to_string())
}

#[test]
fn no_kind_is_missing_here_and_every_example_reads() {
    let names = |kinds: Vec<&Kind>| kinds.iter().map(|k| (k.noun, k.example)).collect::<Vec<_>>();
    assert_eq!(names(TYPES.iter().map(|(kind, _)| *kind).collect()), names(KINDS.to_vec()));
    for kind in KINDS {
        assert!(kind.read(kind.example).is_ok(), "{}", kind.example);
        for end in [kind.least, kind.greatest] {
            assert_eq!(kind.check(end), Ok(end), "{}", kind.noun);
        }
        for beyond in [kind.least - 0.01, kind.greatest * 1.01, f64::NAN, f64::INFINITY] {
            assert!(kind.check(beyond).is_err(), "{} {beyond}", kind.noun);
        }
    }
}

#[test]
fn the_ends_of_a_range_can_be_typed_in_every_unit() {
    for kind in KINDS {
        for unit in kind.dimension.units.iter().map(|unit| unit.spellings[0]) {
            for end in [kind.least, kind.greatest] {
                let said = if kind.noun == "absolute pressure" { " abs" } else { "" };
                let text = format!("{} {unit}{said}", kind.in_unit(end, unit).unwrap());
                let read = kind.read(&text);
                let close = |back: f64| (back - end).abs() <= 1e-12 * end.abs().max(1.0);
                assert!(read.as_ref().is_ok_and(|back| close(*back)), "{text}: {read:?}");
            }
        }
    }
}

/// A value inside a kind's range: evenly spread, or near zero or the low end.
fn inside(kind: &Kind, share: f64, decades: f64) -> f64 {
    let span = (kind.greatest - kind.least) * share;
    (kind.least + span * 10_f64.powf(-decades)).clamp(kind.least, kind.greatest)
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn shown_text_reads_back_to_six_figures(share in 0.0..=1.0, decades in 0.0..18.0) {
        for (kind, text_of) in TYPES {
            let value = inside(kind, share, decades);
            let text = text_of(value);
            let back = kind.read(&text).map_err(|e| TestCaseError::fail(format!("{text}: {e}")))?;
            prop_assert!((back - value).abs() <= 5.1e-6 * value.abs(), "{value}: {text}: {back}");
        }
    }

    #[test]
    fn every_unit_goes_there_and_back(share in 0.0..=1.0, decades in 0.0..6.0) {
        for kind in KINDS {
            let value = inside(kind, share, decades);
            for unit in kind.dimension.units {
                let said = if kind.noun == "absolute pressure" { " abs" } else { "" };
                let number = kind.in_unit(value, unit.spellings[0]).unwrap();
                let text = format!("{number} {}{said}", unit.spellings[0]);
                let back = kind.read(&text).map_err(|e| TestCaseError::fail(format!("{text}: {e}")))?;
                // A temperature near 0 °C is a difference of two numbers near 500 °R.
                let close = (back - value).abs() <= 1e-11 * value.abs() + 1e-12 * kind.greatest.min(500.0);
                prop_assert!(close, "{value} {}: {text}: {back}", kind.unit);
            }
        }
    }

    #[test]
    fn viscosity_readings_show_what_they_read(seconds in 32.0..1e6, mpa_s in 0.1..2e7, at in -40.0..100.0) {
        for text in [
            format!("{seconds} SUS"),
            format!("{seconds} SUS at {at} °C"),
            format!("{mpa_s} mPa·s"),
            format!("{} mm²/s", mpa_s + 0.2),
        ] {
            let first: ViscosityReading = text.parse().unwrap();
            // Once rounded to what is shown, it stays.
            let second: ViscosityReading = first.to_string().parse().unwrap();
            prop_assert_eq!(first.to_string(), second.to_string());
            prop_assert_eq!(std::mem::discriminant(&first), std::mem::discriminant(&second));
        }
    }

    #[test]
    fn no_text_panics(text in any::<String>(), near in "[-+−–']?[0-9 .,'/¼½-]{0,8}[eE]?[0-9]{0,4} {0,2}[°a-zA-Z²³/·*^()\"'.@0-9 -]{0,10}") {
        for text in [&text, &near] {
            let _ = text.parse::<ViscosityReading>().map(|v| v.to_string());
            for kind in KINDS {
                match kind.read(text) {
                    Ok(value) => prop_assert!((kind.least..=kind.greatest).contains(&value)),
                    Err(error) => prop_assert!(!error.to_string().is_empty()),
                }
            }
        }
    }

    #[test]
    fn a_decimal_comma_equals_a_point(whole in 0_u32..5000, decimals in "[0-9]{1,6}", minus in any::<bool>()) {
        let sign = if minus { "-" } else { "" };
        let with = |mark: char| format!("{sign}{whole}{mark}{decimals} kPa").parse::<GaugePressure>();
        match with(',') {
            Err(QuantityError::AmbiguousComma { .. }) => {
                prop_assert!(decimals.len() == 3 && (1..1000).contains(&whole));
            }
            found => {
                prop_assert_eq!(found.is_ok(), with('.').is_ok());
                prop_assert_eq!(found.ok(), with('.').ok());
            }
        }
    }
}
