//! Numbers in text: read as people type them, shown without needless digits.

use super::spelling::{is_blank, trim};

/// A number split off the front of a text, with the rest of it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Leading<'a> {
    pub(crate) value: f64,
    pub(crate) rest: &'a str,
}

/// Why no number could be split off.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum NoNumber {
    /// The text does not start with a number.
    Missing,
    /// `nan`, `inf` or a number beyond what can be held.
    NotFinite,
    /// A comma before exactly three digits: decimal comma or thousands?
    AmbiguousComma,
}

/// Splits a number off the front.
///
/// Decimal point or comma, ASCII or typographic minus with or without a space behind it, exponent,
/// thousands set apart by spaces, apostrophes, or by commas or points where these cannot be decimal.
pub(crate) fn leading(text: &str) -> Result<Leading<'_>, NoNumber> {
    let (negative, unsigned) = sign(trim(text));
    let word_end = unsigned.find(|c: char| !c.is_alphabetic()).unwrap_or(unsigned.len());
    let word = unsigned.get(..word_end).unwrap_or_default().to_ascii_lowercase();
    if ["nan", "inf", "infinity"].contains(&word.as_str()) || unsigned.starts_with('∞') {
        return Err(NoNumber::NotFinite);
    }
    let (mut figures, mut rest) = figures(unsigned)?;
    if let Some((exponent, after)) = exponent(rest) {
        figures.push('e');
        figures.push_str(&exponent);
        rest = after;
    }
    match figures.parse::<f64>() {
        Ok(value) if value.is_finite() => {
            Ok(Leading { value: if negative { -value } else { value }, rest })
        }
        Ok(_) => Err(NoNumber::NotFinite),
        Err(_) => Err(NoNumber::Missing),
    }
}

/// Splits a number off the front, which may also be written with a fraction: `3/4`, `1 1/4`,
/// `1-1/4`, `1¼`. Halves to sixty-fourths only, so that `46/7` stays no number.
pub(crate) fn leading_fraction(text: &str) -> Result<Leading<'_>, NoNumber> {
    let (negative, unsigned) = sign(trim(text));
    let (whole, after) = whole(unsigned);
    let mixed = match whole {
        None => fraction(unsigned),
        Some(whole) => fraction(unsigned).or_else(|| {
            // Blanks or one hyphen, as in `1 1/4` and `1-1/4`; nothing before a sign such as `¼`.
            let tail = after.trim_start_matches(is_blank);
            let tail = if tail.len() == after.len() {
                after.strip_prefix(['-', '–', '‐', '‑']).unwrap_or(after)
            } else {
                tail
            };
            fraction(tail).map(|(part, rest)| (whole + part, rest))
        }),
    };
    match mixed {
        Some((value, rest)) => Ok(Leading { value: if negative { -value } else { value }, rest }),
        None => leading(text),
    }
}

/// The sign, and the text behind it.
fn sign(text: &str) -> (bool, &str) {
    const MINUS: &[char] = &['-', '−', '–', '‐', '‑', '－'];
    match (text.strip_prefix(MINUS), text.strip_prefix('+')) {
        (Some(rest), _) => (true, rest.trim_start_matches(is_blank)),
        (None, Some(rest)) => (false, rest.trim_start_matches(is_blank)),
        (None, None) => (false, text),
    }
}

/// The plain digits at the front and the text behind them.
fn digits(text: &str) -> (&str, &str) {
    let end = text.find(|c: char| !c.is_ascii_digit()).unwrap_or(text.len());
    text.split_at_checked(end).unwrap_or((text, ""))
}

fn whole(text: &str) -> (Option<f64>, &str) {
    let (figures, rest) = digits(text);
    (figures.parse().ok().filter(|_| figures.len() <= 6), rest)
}

/// A proper fraction at the front: `1/4` or `¼`.
fn fraction(text: &str) -> Option<(f64, &str)> {
    const SIGNS: &[(char, f64)] = &[
        ('¼', 0.25),
        ('½', 0.5),
        ('¾', 0.75),
        ('⅛', 0.125),
        ('⅜', 0.375),
        ('⅝', 0.625),
        ('⅞', 0.875),
    ];
    let found = SIGNS.iter().find_map(|(sign, value)| Some((*value, text.strip_prefix(*sign)?)));
    if found.is_some() {
        return found;
    }
    let (Some(above), rest) = whole(text) else { return None };
    let (Some(below), rest) = whole(rest.strip_prefix(['/', '⁄', '∕'])?) else { return None };
    let proper = above > 0.0 && above < below && [2.0, 4.0, 8.0, 16.0, 32.0, 64.0].contains(&below);
    (proper && !rest.starts_with(['/', '.', ','])).then_some((above / below, rest))
}

/// The figures at the front as Rust reads them (`1500.5`), and the text behind them.
fn figures(text: &str) -> Result<(String, &str), NoNumber> {
    let (first, mut rest) = digits(text);
    let mut figures = first.to_owned();
    let mut marks = Marks::default();
    // A number may start with a thousand of one to three digits, but not with `0 500`.
    let may_be_thousands = (1..=3).contains(&first.len()) && !first.starts_with('0');
    let mut last_group = 0;
    loop {
        let mut after = rest.chars();
        let mark = match after.next() {
            Some(mark @ ('.' | ',')) => mark,
            Some('\'' | '’') => '\'',
            Some(c) if is_blank(c) => ' ',
            _ => break,
        };
        let (group, behind) = digits(after.as_str());
        let sets_thousands_apart = may_be_thousands && group.len() == 3 && !marks.has_decimal();
        match mark {
            '.' if group.is_empty() && marks.count == 0 && !first.is_empty() => {
                // `5. W`
                rest = behind;
                break;
            }
            '.' | ',' if group.is_empty() => break,
            ' ' | '\'' if !sets_thousands_apart => break,
            _ => {}
        }
        marks.add(mark, group.len());
        figures.push_str(group);
        last_group = group.len();
        rest = behind;
    }
    if figures.is_empty() {
        return Err(NoNumber::Missing);
    }
    if marks.decimal(may_be_thousands)? {
        figures.insert(figures.len() - last_group, '.');
    }
    Ok((figures, rest))
}

/// The marks between groups of digits, as far as they decide what the number is.
#[derive(Default)]
struct Marks {
    count: usize,
    first: Option<char>,
    /// A mark before the last that is not the first one again.
    mixed: bool,
    /// The last mark and the digits behind it.
    last: Option<(char, usize)>,
    /// A group before the last that has not three digits.
    short: bool,
}

impl Marks {
    fn add(&mut self, mark: char, digits: usize) {
        if let Some((before, digits)) = self.last {
            self.mixed |= self.first != Some(before);
            self.short |= digits != 3;
        }
        self.first = self.first.or(Some(mark));
        self.last = Some((mark, digits));
        self.count += 1;
    }

    /// A point or comma came last: no space or apostrophe sets thousands apart behind it.
    fn has_decimal(&self) -> bool {
        self.last.is_some_and(|(mark, _)| matches!(mark, '.' | ','))
    }

    /// Whether the last mark is the decimal one.
    fn decimal(&self, may_be_thousands: bool) -> Result<bool, NoNumber> {
        let Some((mark, digits)) = self.last else { return Ok(false) };
        let thousands_before = may_be_thousands && !self.mixed && !self.short;
        match (mark, self.count) {
            (',', 1) if digits == 3 && may_be_thousands => Err(NoNumber::AmbiguousComma),
            ('.' | ',', 1) => Ok(true),
            // `1,500.5`, `1.500,5`, `1 500,5`
            ('.' | ',', _) if self.first != Some(mark) && thousands_before => Ok(true),
            // `1 500`, `1'500`, `1,500,000`
            _ if self.first == Some(mark) && thousands_before && digits == 3 => Ok(false),
            _ => Err(NoNumber::Missing),
        }
    }
}

/// `e-3` at the front, if a digit really follows.
fn exponent(text: &str) -> Option<(String, &str)> {
    let rest = text.strip_prefix(['e', 'E'])?;
    let (sign, rest) = match rest.strip_prefix(['-', '−']) {
        Some(rest) => ("-", rest),
        None => ("", rest.strip_prefix('+').unwrap_or(rest)),
    };
    let (figures, after) = digits(rest);
    (!figures.is_empty()).then(|| (format!("{sign}{figures}"), after))
}

/// A number with six significant figures, or all before the point if these are more; no trailing
/// zeros.
pub(crate) fn shown(value: f64) -> String {
    if value == 0.0 {
        return "0".to_owned();
    }
    if !value.is_finite() {
        return value.to_string();
    }
    if value.abs() < 1e-6 {
        let text = format!("{value:.5e}");
        let (figures, exponent) = text.split_once('e').unwrap_or((&text, "0"));
        return format!("{}e{exponent}", figures.trim_end_matches('0').trim_end_matches('.'));
    }
    #[allow(clippy::cast_possible_truncation, reason = "|log10| of a finite f64 is below 400")]
    let magnitude = value.abs().log10().floor() as i32;
    let decimals = usize::try_from(5 - magnitude).unwrap_or(0);
    let text = format!("{value:.decimals$}");
    if text.contains('.') {
        return text.trim_end_matches('0').trim_end_matches('.').to_owned();
    }
    text
}
