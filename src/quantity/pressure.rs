//! Pressures as people write them: absolute, gauge, vacuum, difference.
//!
//! A vacuum reading in a limit is taken against the standard atmosphere at sea level, 101.325 kPa:
//! a limit of the pump does not relax with elevation.

use super::kinds::{Kind, QuantityError, convert, names_unit, split};

/// Standard atmosphere at sea level, kPa. ISO 2533:1975.
pub(crate) const STANDARD_ATMOSPHERE_KPA: f64 = 101.325;

/// How a pressure text says what it is measured from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Against {
    Unsaid,
    Absolute,
    Gauge,
    Vacuum,
}

/// The unit text without the words that say what the pressure is measured from.
fn against<'a>(kind: &Kind, unit: &'a str) -> (&'a str, Against) {
    const WORDS: &[(&str, Against)] = &[
        ("vacuum", Against::Vacuum),
        ("vac.", Against::Vacuum),
        ("vac", Against::Vacuum),
        ("absolute", Against::Absolute),
        ("(abs)", Against::Absolute),
        ("abs.", Against::Absolute),
        ("abs", Against::Absolute),
        ("(a)", Against::Absolute),
        ("gauge", Against::Gauge),
        ("(g)", Against::Gauge),
        ("a", Against::Absolute),
        ("g", Against::Gauge),
    ];
    let unit = unit.trim();
    if names_unit(kind.dimension, unit) {
        return (unit, Against::Unsaid);
    }
    for (word, meaning) in WORDS {
        if let Some(front) = unit.strip_suffix(word) {
            let front = front.trim();
            if names_unit(kind.dimension, front) {
                return (front, *meaning);
            }
        }
    }
    (unit, Against::Unsaid)
}

pub(super) fn absolute(kind: &Kind, text: &str) -> Result<f64, QuantityError> {
    let (value, rest) = split(kind, text)?;
    let (unit, meaning) = against(kind, rest);
    match meaning {
        Against::Unsaid | Against::Absolute => convert(kind, text, value, unit),
        Against::Vacuum => {
            let depth = convert(kind, text, value, unit)?;
            kind.check(STANDARD_ATMOSPHERE_KPA - depth)
        }
        Against::Gauge => Err(QuantityError::WrongPressure(format!(
            "`{}` is a gauge pressure, but an absolute one is needed; write for example `60 kPa`, or the vacuum at sea level, `5 inHg vacuum`",
            text.trim()
        ))),
    }
}

pub(super) fn gauge(kind: &Kind, text: &str) -> Result<f64, QuantityError> {
    let (value, rest) = split(kind, text)?;
    let (unit, meaning) = against(kind, rest);
    match meaning {
        Against::Unsaid | Against::Gauge => convert(kind, text, value, unit),
        Against::Vacuum => convert(kind, text, -value, unit),
        Against::Absolute => Err(QuantityError::WrongPressure(format!(
            "`{}` is an absolute pressure, but a gauge pressure (over the air outside) is needed; write for example `25 bar`",
            text.trim()
        ))),
    }
}

pub(super) fn difference(kind: &Kind, text: &str) -> Result<f64, QuantityError> {
    let (value, rest) = split(kind, text)?;
    let (unit, meaning) = against(kind, rest);
    match meaning {
        Against::Unsaid => convert(kind, text, value, unit),
        _ => Err(QuantityError::WrongPressure(format!(
            "`{}` names what it is measured from, but a pressure difference is needed; write for example `2.5 kPa`",
            text.trim()
        ))),
    }
}
