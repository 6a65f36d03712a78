//! Pressures as people write them: absolute, gauge, vacuum, difference.
//!
//! A vacuum reading in a limit is taken against the standard atmosphere at sea level, 101.325 kPa:
//! a limit of the pump does not relax with elevation.
//!
//! Invariant: a column of mercury or water is never taken for an absolute pressure unless the text
//! says so. `5 inHg` on an inlet gauge is a vacuum; read as absolute it would allow almost none of
//! the inlet pressure that is meant.

use super::error::QuantityError;
use super::kinds::Kind;
use super::number::shown;
use super::read::{convert, split};
use super::spelling::{is_blank, trim};
use super::units::Unit;

/// Standard atmosphere at sea level, kPa. ISO 2533:1975.
pub(crate) const STANDARD_ATMOSPHERE_KPA: f64 = 101.325;

/// How a pressure text says what it is measured from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Against {
    Unsaid,
    Absolute,
    Gauge,
    Vacuum,
    Difference,
}

/// Words behind the unit, a longer one before any that it ends in.
const WORDS: &[(&str, Against)] = &[
    ("vacuum", Against::Vacuum),
    ("vac", Against::Vacuum),
    ("absolute", Against::Absolute),
    ("abs", Against::Absolute),
    ("gauge", Against::Gauge),
    ("gage", Against::Gauge),
    ("differential", Against::Difference),
    ("difference", Against::Difference),
    ("diff", Against::Difference),
    ("a", Against::Absolute),
    ("g", Against::Gauge),
    ("d", Against::Difference),
];

/// The unit text without the word that says what the pressure is measured from: `psig`, `bar(a)`,
/// `kPa abs.`, `inHg of vacuum`.
fn against<'a>(kind: &Kind, text: &'a str) -> (&'a str, Against) {
    if kind.dimension.unit(text).is_some() {
        return (text, Against::Unsaid);
    }
    let stripped = text.strip_suffix('.').unwrap_or(text);
    let (body, in_brackets) = match stripped.strip_suffix([')', ']']) {
        Some(inner) => (inner.strip_suffix('.').unwrap_or(inner), true),
        None => (stripped, false),
    };
    for (word, meaning) in WORDS {
        let Some((front, tail)) =
            body.len().checked_sub(word.len()).and_then(|at| body.split_at_checked(at))
        else {
            continue;
        };
        if !tail.eq_ignore_ascii_case(word) {
            continue;
        }
        let front = if in_brackets { front.strip_suffix(['(', '[']) } else { Some(front) };
        let Some(front) = front else { continue };
        let front = front.trim_end_matches(|c: char| is_blank(c) || matches!(c, '-' | '_' | ','));
        let front = front.strip_suffix(" of").unwrap_or(front);
        if kind.dimension.unit(front).is_some() {
            return (front, *meaning);
        }
    }
    (text, Against::Unsaid)
}

pub(super) fn absolute(kind: &Kind, text: &str) -> Result<f64, QuantityError> {
    let (value, rest) = split(kind, text)?;
    let (unit, meaning) = against(kind, rest);
    match meaning {
        Against::Unsaid => match kind.dimension.unit(unit) {
            Some(_) if value < 0.0 => Err(wrong(
                text,
                &format!(
                    "is below zero, so it is no absolute pressure; write for example `{}`, or the vacuum at sea level, `5 inHg vacuum`",
                    kind.example
                ),
            )),
            Some(found) if is_column(found) => {
                let number = shown(value);
                let unit = trim(unit);
                Err(wrong(
                    text,
                    &format!(
                        "does not say what it is measured from; write `{number} {unit} vacuum` (at sea level) or `{number} {unit} abs`"
                    ),
                ))
            }
            _ => convert(kind, text, value, unit),
        },
        Against::Absolute => convert(kind, text, value, unit),
        Against::Vacuum => Ok(STANDARD_ATMOSPHERE_KPA - depth(kind, text, value, unit)?),
        Against::Gauge => Err(wrong(
            text,
            "is a gauge pressure, but an absolute one is needed; write for example `60 kPa`, or the vacuum at sea level, `5 inHg vacuum`",
        )),
        Against::Difference => Err(wrong(
            text,
            "is a pressure difference, but an absolute pressure is needed; write for example `60 kPa`",
        )),
    }
}

pub(super) fn gauge(kind: &Kind, text: &str) -> Result<f64, QuantityError> {
    let (value, rest) = split(kind, text)?;
    let (unit, meaning) = against(kind, rest);
    match meaning {
        Against::Unsaid | Against::Gauge => convert(kind, text, value, unit),
        Against::Vacuum => kind.check_read(-depth(kind, text, value, unit)?, text),
        Against::Absolute => Err(wrong(
            text,
            "is an absolute pressure, but a gauge pressure (over the air outside) is needed; write for example `25 bar`",
        )),
        Against::Difference => Err(wrong(
            text,
            "is a pressure difference, but a gauge pressure is needed; write for example `25 bar`",
        )),
    }
}

pub(super) fn difference(kind: &Kind, text: &str) -> Result<f64, QuantityError> {
    let (value, rest) = split(kind, text)?;
    let (unit, meaning) = against(kind, rest);
    match meaning {
        Against::Unsaid | Against::Difference => convert(kind, text, value, unit),
        _ => Err(wrong(
            text,
            "names what it is measured from, but a pressure difference is needed; write for example `2.5 kPa`",
        )),
    }
}

/// The depth of a vacuum in kPa: not negative, and not over the whole atmosphere at sea level.
fn depth(kind: &Kind, text: &str, value: f64, unit: &str) -> Result<f64, QuantityError> {
    let factor = kind.dimension.unit(unit).map_or(1.0, |unit| unit.factor);
    let kpa = value * factor;
    if value < 0.0 {
        return Err(wrong(
            text,
            &format!(
                "has a minus sign and says vacuum; write for example `{} {} vacuum`",
                shown(-value),
                trim(unit)
            ),
        ));
    }
    if kpa > STANDARD_ATMOSPHERE_KPA {
        return Err(wrong(
            text,
            &format!(
                "is more than the whole atmosphere at sea level, {} {}",
                shown(STANDARD_ATMOSPHERE_KPA / factor),
                trim(unit)
            ),
        ));
    }
    Ok(kpa)
}

/// A unit that is the height of a column: people read vacuum in it.
fn is_column(unit: &Unit) -> bool {
    unit.spellings.first().is_some_and(|name| name.ends_with("Hg") || name.ends_with("H2O"))
}

fn wrong(text: &str, why: &str) -> QuantityError {
    QuantityError::WrongPressure(format!("`{}` {why}", trim(text)))
}
