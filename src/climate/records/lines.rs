//! One line of a layout whose fields stand at fixed places: its values, or why they are dropped.

use super::Drop;
use super::fields::compact_day;
use super::gather::Row;
use super::layout::Rows;
use crate::climate::tally::{Day, day_of, days_in};

/// Months of a typical year come from different years: all are laid on this one.
pub(super) const TYPICAL_YEAR: i32 = 2001;

/// Whether a row starts a month of another year than the one before: an artificial join.
pub(super) fn joins(typical: &mut Option<(i32, u32)>, year: i32, month: u32) -> bool {
    let joined = typical.is_some_and(|(y, m)| m != month && y != year);
    *typical = Some((year, month));
    joined
}

pub(super) fn is_dly(line: &str) -> bool {
    line.is_ascii()
        && line.len() >= 29
        && !line.contains(',')
        && line.get(11..17).is_some_and(|t| t.bytes().all(|b| b.is_ascii_digit()))
        && line
            .get(17..21)
            .is_some_and(|t| t.bytes().all(|b| b.is_ascii_uppercase() || b.is_ascii_digit()))
}

pub(super) fn is_ghcn_row(line: &str) -> bool {
    let mut fields = line.split(',');
    let (id, date, element) = (fields.next(), fields.next(), fields.next());
    id.is_some_and(|id| id.len() == 11)
        && date.is_some_and(|date| date.len() == 8 && date.bytes().all(|b| b.is_ascii_digit()))
        && element.is_some_and(|element| element.len() == 4)
}

pub(super) fn dly(text: &str, rows: &mut Rows<'_>) -> Result<(), String> {
    if !is_dly(text) {
        return rows(Err(Drop::CutLine));
    }
    let element = text.get(17..21).unwrap_or_default();
    let minimum = match element {
        "TMIN" => true,
        "TMAX" => false,
        _ => return Ok(()),
    };
    let (Some(year), Some(month)) = (
        text.get(11..15).and_then(|t| t.parse::<i32>().ok()),
        text.get(15..17).and_then(|t| t.parse::<u32>().ok()),
    ) else {
        return rows(Err(Drop::NoDate));
    };
    if !(1..=12).contains(&month) {
        return rows(Err(Drop::NoDate));
    }
    for day in 1..=days_in(year, month) {
        let from = 21 + 8 * (day as usize - 1);
        let Some(value) = text.get(from..from + 5) else {
            rows(Err(Drop::CutLine))?;
            continue;
        };
        let quality = text.get(from + 6..from + 7).unwrap_or(" ");
        let row = match value.trim().parse::<f64>() {
            Err(_) => Err(Drop::CutLine),
            Ok(value) if value <= -9999.0 => Err(Drop::Missing),
            Ok(_) if quality != " " => Err(Drop::Flagged),
            Ok(value) => day_of(year, month, day)
                .map(|day| daily(minimum, day, value * 0.1))
                .ok_or(Drop::NoDate),
        };
        rows(row)?;
    }
    Ok(())
}

pub(super) const fn daily(minimum: bool, day: Day, celsius: f64) -> Row {
    if minimum { Row::Minimum { day, celsius } } else { Row::Maximum { day, celsius } }
}

pub(super) fn ghcn_row(text: &str, rows: &mut Rows<'_>) -> Result<(), String> {
    let mut fields = text.split(',');
    let (_, date, element, value) = (fields.next(), fields.next(), fields.next(), fields.next());
    let minimum = match element {
        Some("TMIN") => true,
        Some("TMAX") => false,
        Some(other) if other.len() == 4 => return Ok(()),
        _ => return rows(Err(Drop::CutLine)),
    };
    let (_, quality) = (fields.next(), fields.next());
    let Some(quality) = quality else { return rows(Err(Drop::CutLine)) };
    let Some(day) = date.and_then(compact_day) else { return rows(Err(Drop::NoDate)) };
    let row = match value.map(|value| value.trim().parse::<f64>()) {
        Some(Ok(value)) if value <= -9999.0 => Err(Drop::Missing),
        Some(Ok(_)) if !quality.trim().is_empty() => Err(Drop::Flagged),
        Some(Ok(value)) => Ok(daily(minimum, day, value * 0.1)),
        _ => Err(Drop::CutLine),
    };
    rows(row)
}

/// A row of EPW has no fewer fields: a shorter one is cut.
const LEAST_EPW: usize = 32;

pub(super) fn epw(
    text: &str,
    typical: &mut Option<(i32, u32)>,
    rows: &mut Rows<'_>,
) -> Result<(), String> {
    if text.split(',').count() < LEAST_EPW {
        return rows(Err(Drop::CutLine));
    }
    let mut fields = text.split(',');
    let mut whole = || fields.next().and_then(|field| field.trim().parse::<i32>().ok());
    let (Some(year), Some(month), Some(day), Some(hour)) = (whole(), whole(), whole(), whole())
    else {
        return rows(Err(Drop::CutLine));
    };
    let unsigned = |value: i32| u32::try_from(value).unwrap_or(0);
    let (month, day, hour) = (unsigned(month), unsigned(day), unsigned(hour));
    // Minute and flags lie between; then the dry bulb.
    let Some(dry) = fields.nth(2).and_then(|field| field.trim().parse::<f64>().ok()) else {
        return rows(Err(Drop::CutLine));
    };
    if dry >= 99.9 {
        return rows(Err(Drop::Missing));
    }
    if !(1..=24).contains(&hour) {
        return rows(Err(Drop::NoDate));
    }
    // The wind speed is column 22.
    let wind = fields
        .nth(14)
        .and_then(|field| field.trim().parse::<f64>().ok())
        .filter(|wind| (0.0..=60.0).contains(wind));
    let joined = joins(typical, year, month);
    rows(Ok(Row::Hour { year: TYPICAL_YEAR, month, day, hour, celsius: dry, wind, joined }))
}

pub(super) fn isd(text: &str, offset_h: f64, rows: &mut Rows<'_>) -> Result<(), String> {
    let fields: Vec<i64> = text.split_whitespace().filter_map(|field| field.parse().ok()).collect();
    let &[year, month, day, hour, air, _, _, _, wind, ..] = fields.as_slice() else {
        return rows(Err(Drop::CutLine));
    };
    if air <= -9999 {
        return rows(Err(Drop::Missing));
    }
    let unsigned = |value: i64| u32::try_from(value).unwrap_or(0);
    let Ok(year) = i32::try_from(year) else { return rows(Err(Drop::NoDate)) };
    let (mut month, mut day) = (unsigned(month), unsigned(day));
    if day_of(year, month, day).is_none() || !(0..=23).contains(&hour) {
        return rows(Err(Drop::NoDate));
    }
    // Local standard time; the reading of 00:00 is the 24th hour of the day before.
    let mut year = year;
    #[allow(clippy::cast_possible_truncation, reason = "a day's hours")]
    let mut local = hour + offset_h.round() as i64;
    while local < 1 {
        local += 24;
        if day > 1 {
            day -= 1;
        } else {
            (year, month) = if month == 1 { (year - 1, 12) } else { (year, month - 1) };
            day = days_in(year, month);
        }
    }
    while local > 24 {
        local -= 24;
        if day < days_in(year, month) {
            day += 1;
        } else {
            (year, month, day) = if month == 12 { (year + 1, 1, 1) } else { (year, month + 1, 1) };
        }
    }
    let wind = (wind > -9999).then_some(wind as f64 / 10.0);
    rows(Ok(Row::Hour {
        year,
        month,
        day,
        hour: unsigned(local),
        celsius: air as f64 / 10.0,
        wind,
        joined: false,
    }))
}
