//! Fields of a line, and the numbers and dates in them.

use crate::climate::tally::{Day, day_of};

/// `19470101`.
pub(super) fn compact_day(text: &str) -> Option<Day> {
    if text.len() != 8 {
        return None;
    }
    day_of(
        text.get(..4)?.parse().ok()?,
        text.get(4..6)?.parse().ok()?,
        text.get(6..8)?.parse().ok()?,
    )
}

/// `1947-01-01`.
pub(super) fn iso_day(text: &str) -> Option<Day> {
    let mut parts = text.trim().splitn(3, '-');
    let (year, month, day) = (parts.next()?, parts.next()?, parts.next()?);
    day_of(year.parse().ok()?, month.parse().ok()?, day.get(..2.min(day.len()))?.parse().ok()?)
}

/// `01/31/1988` as (month, day, year).
pub(super) fn us_date(text: &str) -> Option<(u32, u32, i32)> {
    let mut parts = text.trim().splitn(3, '/');
    let month: u32 = parts.next()?.parse().ok()?;
    let day: u32 = parts.next()?.parse().ok()?;
    let year: i32 = parts.next()?.parse().ok()?;
    day_of(year, month, day).map(|_| (month, day, year))
}

pub(super) fn number(text: Option<&str>) -> Option<f64> {
    text?.trim().parse().ok()
}

pub(super) fn separator_of(line: &str) -> char {
    [';', '\t'].into_iter().find(|c| line.contains(*c)).unwrap_or(',')
}

/// Fields of a line; quotes may hold separators.
pub(super) fn fields(line: &str, separator: char) -> Vec<String> {
    let mut out = vec![String::new()];
    let mut quoted = false;
    for c in line.chars() {
        if c == '"' {
            quoted = !quoted;
        } else if c == separator && !quoted {
            out.push(String::new());
        } else if let Some(last) = out.last_mut() {
            last.push(c);
        }
    }
    out
}

/// A number; with a decimal comma where commas do not part the fields.
pub(super) fn decimal(text: &str, separator: char) -> Option<f64> {
    let number = if separator == ',' { text.to_owned() } else { text.replace(',', ".") };
    number.parse().ok().filter(|value: &f64| value.is_finite())
}
