//! From text to a value: number, then unit, then range.

use super::error::QuantityError;
use super::kinds::Kind;
use super::number::{Leading, NoNumber, leading, leading_fraction, shown};
use super::spelling::{exactly, is_blank, trim};
use super::units::{DENSITY, TIME, Unit, WATER_60F, dimensions};
use super::viscosity::is_saybolt;

/// Number, then unit: the reader of most kinds.
pub(super) fn plain(kind: &Kind, text: &str) -> Result<f64, QuantityError> {
    let (value, rest) = split(kind, text)?;
    convert(kind, text, value, rest)
}

/// As [`plain`], and the number may have a fraction: `1 1/2 gal`.
pub(super) fn fraction(kind: &Kind, text: &str) -> Result<f64, QuantityError> {
    let (value, rest) = split_by(kind, text, leading_fraction)?;
    convert(kind, text, value, rest)
}

/// As [`fraction`], or several numbers with ever smaller units: `4 h 30 min`, `5 ft 6 in`.
///
/// Refused: a part that fills one of the unit before it (`4 h 90 min`), and any but the last with
/// decimals.
pub(super) fn compound(kind: &Kind, text: &str) -> Result<f64, QuantityError> {
    let (first, rest) = split_by(kind, text, leading_fraction)?;
    let names_unit = || dimensions().iter().any(|dimension| exactly(dimension, rest).is_some());
    if !rest.contains(starts_number) || names_unit() {
        return convert(kind, text, first, rest);
    }
    let unclear = || QuantityError::Unclear {
        text: trim(text).to_owned(),
        example: match kind.noun {
            "length" => "5 ft 6 in".to_owned(),
            _ if std::ptr::eq(kind.dimension, &TIME) => "4 h 30 min".to_owned(),
            _ => kind.example.to_owned(),
        },
    };
    let mut total = 0.0;
    let mut before: Option<(f64, &Unit)> = None;
    let (mut value, mut rest) = (first.abs(), rest);
    loop {
        let end = rest.find(starts_number).unwrap_or(rest.len());
        let (unit, behind) = rest.split_at_checked(end).unwrap_or((rest, ""));
        let unit = kind.dimension.unit(unit).ok_or_else(unclear)?;
        if let Some((larger_value, larger)) = before {
            let fits = value * unit.factor < larger.factor * (1.0 - 1e-9);
            if !fits || unit.factor >= larger.factor || larger_value.fract() != 0.0 {
                return Err(unclear());
            }
        }
        total += value * unit.factor;
        before = Some((value, unit));
        if behind.is_empty() {
            break;
        }
        Leading { value, rest } = leading_fraction(behind).map_err(|_| unclear())?;
    }
    let to = kind.dimension.unit(kind.unit).map_or(1.0, |unit| unit.factor);
    kind.check_read(total.copysign(first) / to, text)
}

/// Density: also specific gravity with the words in front (`SG 0.875`), and degrees API.
pub(super) fn density(kind: &Kind, text: &str) -> Result<f64, QuantityError> {
    let trimmed = trim(text);
    if let Some((words, number)) = words_first(trimmed) {
        if let Ok(Leading { value, rest }) = leading(number) {
            if trim(rest).is_empty() && is_specific_gravity(words) {
                return convert(kind, text, value, "SG");
            }
            if trim(rest).is_empty() && is_api(words) {
                return kind.check_read(from_api(value), text);
            }
        }
    }
    let (value, rest) = split(kind, text)?;
    if is_api(rest) {
        return kind.check_read(from_api(value), text);
    }
    convert(kind, text, value, rest)
}

fn words_first(text: &str) -> Option<(&str, &str)> {
    if !text.starts_with(char::is_alphabetic) && !text.starts_with('°') {
        return None;
    }
    let digit = text.find(|c: char| c.is_ascii_digit())?;
    // `SG .875`
    let front = text.get(..digit)?;
    let at = if front.ends_with(" .") || front.ends_with("=.") { digit - 1 } else { digit };
    let (words, number) = text.split_at_checked(at)?;
    Some((words.trim_end_matches(|c: char| is_blank(c) || c == '=' || c == ':'), number))
}

fn is_specific_gravity(text: &str) -> bool {
    let named = |text: &str| DENSITY.unit(text);
    named(text).zip(named("SG")).is_some_and(|(found, gravity)| std::ptr::eq(found, gravity))
}

fn is_api(text: &str) -> bool {
    ["API", "°API", "degAPI", "API gravity", "API °"].iter().any(|s| s.eq_ignore_ascii_case(text))
}

/// Degrees API to kg/m³: `SG = 141.5/(131.5 + °API)`, both at 60 °F; ASTM D1250 (memory).
fn from_api(degrees: f64) -> f64 {
    141.5 / (131.5 + degrees) * WATER_60F
}

/// The number at the front and the text behind it.
pub(super) fn split<'a>(kind: &Kind, text: &'a str) -> Result<(f64, &'a str), QuantityError> {
    split_by(kind, text, leading)
}

fn split_by<'a>(
    kind: &Kind,
    text: &'a str,
    number: impl Fn(&'a str) -> Result<Leading<'a>, NoNumber>,
) -> Result<(f64, &'a str), QuantityError> {
    let text = trim(text);
    let example = || kind.example.to_owned();
    if text.is_empty() {
        return Err(QuantityError::Empty { example: example() });
    }
    let text_found = || text.to_owned();
    match number(text) {
        Ok(found) => Ok((found.value, trim(found.rest))),
        Err(NoNumber::Missing) => {
            Err(QuantityError::NoNumber { text: text_found(), example: example() })
        }
        Err(NoNumber::NotFinite) => {
            Err(QuantityError::NotFinite { text: text_found(), example: example() })
        }
        Err(NoNumber::AmbiguousComma) => Err(QuantityError::AmbiguousComma { text: text_found() }),
    }
}

/// A value with its unit text, converted to the kind's unit and checked.
pub(super) fn convert(
    kind: &Kind,
    text: &str,
    value: f64,
    unit_text: &str,
) -> Result<f64, QuantityError> {
    if unit_text.is_empty() {
        return Err(QuantityError::NoUnit {
            text: trim(text).to_owned(),
            example: kind.example_of(value),
        });
    }
    match (kind.dimension.unit(unit_text), kind.dimension.unit(kind.unit)) {
        (Some(from), Some(to)) => kind.check_read(between(value, from, to), text),
        _ => Err(no_unit_of(kind, text, value, unit_text)),
    }
}

/// A value in one unit expressed in another.
pub(super) fn between(value: f64, from: &Unit, to: &Unit) -> f64 {
    if std::ptr::eq(from, to) {
        return value;
    }
    (value * from.factor + from.offset - to.offset) / to.factor
}

fn no_unit_of(kind: &Kind, text: &str, value: f64, unit: &str) -> QuantityError {
    // A second number, `20 30 W` or `-20..-10 °C`: no unit is meant.
    if unit.starts_with(starts_number) || unit.starts_with(['.', ',', '/', ':', ';', '-', '–', '−'])
    {
        return QuantityError::NoNumber {
            text: trim(text).to_owned(),
            example: kind.example.to_owned(),
        };
    }
    let foreign = dimensions().iter().find(|dimension| exactly(dimension, unit).is_some());
    let foreign = foreign.map(|dimension| dimension.name);
    if let Some(of) = foreign.or_else(|| is_saybolt(unit).then_some("Saybolt time")) {
        return QuantityError::WrongKind {
            unit: unit.to_owned(),
            of,
            noun: kind.noun,
            example: kind.example.to_owned(),
        };
    }
    let known: Vec<&str> =
        kind.dimension.units.iter().filter_map(|u| u.spellings.first().copied()).collect();
    QuantityError::UnknownUnit {
        unit: unit.to_owned(),
        noun: kind.noun,
        example: kind.example_of(value),
        known: known.join(", "),
    }
}

fn starts_number(c: char) -> bool {
    c.is_ascii_digit() || "¼½¾⅛⅜⅝⅞".contains(c)
}

impl Kind {
    /// A number with the first unit in which this kind allows it; else the kind's own example.
    fn example_of(&self, value: f64) -> String {
        let own = self.dimension.unit(self.unit);
        let allowed =
            |unit: &&Unit| own.is_some_and(|own| self.check(between(value, unit, own)).is_ok());
        own.into_iter()
            .chain(self.dimension.units)
            .find(allowed)
            .and_then(|unit| unit.spellings.first())
            .map_or(self.example.to_owned(), |unit| format!("{} {unit}", shown(value)))
    }
}
