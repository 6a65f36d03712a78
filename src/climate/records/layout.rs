//! Layouts of weather records: recognised by content, read line by line.
//!
//! Sources: GHCN-Daily readme (NOAA, v3.22) and by-station readme; EnergyPlus auxiliary programs, EPW
//! data dictionary; TMY3 as distributed; ISD-Lite as distributed. Order of attributes in the
//! per-station CSV and tenths in it: memory.

use super::gather::Row;
use super::{Drop, Options};
use crate::climate::site::Place;
use crate::climate::tally::{Day, day_of, days_in};

/// A layout.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[allow(missing_docs, reason = "`words` says what each is")]
#[non_exhaustive]
pub enum Layout {
    GhcnDly,
    GhcnRows,
    GhcnStation,
    GhcnOrder,
    Epw,
    Tmy3,
    IsdLite,
    DateTmin,
}

impl Layout {
    /// The layout in words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::GhcnDly => "GHCN-Daily, fixed width (.dly), tenths of °C",
            Self::GhcnRows => "GHCN-Daily, one value a row, tenths of °C",
            Self::GhcnStation => "GHCN-Daily, per-station CSV, tenths of °C",
            Self::GhcnOrder => "GHCN-Daily, order-tool CSV, whole degrees",
            Self::Epw => "EPW, hourly, °C",
            Self::Tmy3 => "TMY3 CSV, hourly, °C",
            Self::IsdLite => "ISD-Lite, hourly in UTC, tenths of °C",
            Self::DateTmin => "CSV with date and tmin",
        }
    }
}

/// A unit of temperature.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Unit {
    /// °C.
    Celsius,
    /// °F.
    Fahrenheit,
}

/// Headers are no longer than this, lines.
pub(super) const LONGEST_HEAD: usize = 8;

/// What a header says of the place.
#[derive(Debug, Clone, Default, PartialEq)]
pub(super) struct Where {
    pub(super) title: Option<String>,
    pub(super) place: Option<Place>,
    pub(super) elevation_m: Option<f64>,
}

type Rows<'a> = dyn FnMut(Result<Row, Drop>) -> Result<(), String> + 'a;

#[derive(Debug)]
enum State {
    Dly,
    Rows,
    Columns { date: usize, tmin: usize, tmax: Option<usize>, attributes: bool, tenths: bool },
    Epw { typical: Option<(i32, u32)> },
    Tmy3 { date: usize, time: usize, dry: usize, wind: Option<usize>, typical: Option<(i32, u32)> },
    Isd { offset_h: f64 },
    DateTmin { date: usize, tmin: usize, separator: char },
}

/// A layout under way.
#[derive(Debug)]
pub(super) struct Parser {
    layout: Layout,
    state: State,
    unit: Unit,
    unit_known: bool,
    place: Where,
    last: Option<Day>,
}

impl Parser {
    /// The layout of the first lines; `None` where more lines are needed to tell.
    pub(super) fn of(head: &[String], options: &Options) -> Result<Option<Self>, String> {
        let Some(first) = head.first() else { return Ok(None) };
        let last = head.last().map_or(first.as_str(), String::as_str);
        let unit = options.unit.unwrap_or(Unit::Celsius);
        let make = |layout, state, place| {
            Ok(Some(Self {
                layout,
                state,
                unit,
                unit_known: options.unit.is_some(),
                place,
                last: None,
            }))
        };
        if let Some(rest) = first.strip_prefix("LOCATION,") {
            // Eight lines of header.
            if head.len() < 8 {
                return Ok(None);
            }
            return make(Layout::Epw, State::Epw { typical: None }, epw_place(rest));
        }
        if is_dly(first) {
            return make(Layout::GhcnDly, State::Dly, Where::default());
        }
        if is_ghcn_row(first) || (head.len() == 2 && is_ghcn_row(last)) {
            return make(Layout::GhcnRows, State::Rows, Where::default());
        }
        let isd: Vec<&str> = first.split_whitespace().collect();
        if isd.len() == 12 && isd.iter().all(|field| field.parse::<i32>().is_ok()) {
            let Some(offset_h) = options.utc_offset else {
                return Err("hours of ISD-Lite are UTC; give local standard time with --utc-offset, for example --utc-offset -9".to_owned());
            };
            return make(Layout::IsdLite, State::Isd { offset_h }, Where::default());
        }
        let separator = separator_of(last);
        let names: Vec<String> =
            fields(last, separator).iter().map(|name| name.trim().to_lowercase()).collect();
        let find = |name: &str| names.iter().position(|other| other == name);
        if let (Some(date), Some(time), Some(dry)) =
            (find("date (mm/dd/yyyy)"), find("time (hh:mm)"), find("dry-bulb (c)"))
        {
            let wind = find("wspd (m/s)");
            let state = State::Tmy3 { date, time, dry, wind, typical: None };
            let place = if head.len() > 1 { tmy3_place(first) } else { Where::default() };
            return make(Layout::Tmy3, state, place);
        }
        if head.len() > 1 {
            return Ok(None);
        }
        if let (Some(_), Some(date), Some(tmin)) = (find("station"), find("date"), find("tmin")) {
            let attributes = find("tmin_attributes").is_some();
            let state =
                State::Columns { date, tmin, tmax: find("tmax"), attributes, tenths: attributes };
            let layout = if attributes { Layout::GhcnStation } else { Layout::GhcnOrder };
            return make(layout, state, Where::default());
        }
        let tmin = ["tmin", "tmin_c", "tmin_f"].iter().find_map(|name| Some((*name, find(name)?)));
        if let (Some(date), Some((name, tmin))) = (find("date"), tmin) {
            let said = match name {
                "tmin_c" => Some(Unit::Celsius),
                "tmin_f" => Some(Unit::Fahrenheit),
                _ => None,
            };
            return Ok(Some(Self {
                layout: Layout::DateTmin,
                state: State::DateTmin { date, tmin, separator },
                unit: said.unwrap_or(unit),
                unit_known: said.is_some() || options.unit.is_some(),
                place: Where::default(),
                last: None,
            }));
        }
        Ok(None)
    }

    /// Rows of the record that stand in the lines that were read to tell the layout.
    pub(super) fn rows_in_head(&self, head: &[String]) -> Vec<String> {
        match self.layout {
            Layout::GhcnDly | Layout::IsdLite => head.to_vec(),
            Layout::GhcnRows => head.iter().filter(|line| is_ghcn_row(line)).cloned().collect(),
            _ => Vec::new(),
        }
    }

    pub(super) const fn layout(&self) -> Layout {
        self.layout
    }

    pub(super) fn place(&self) -> Where {
        self.place.clone()
    }

    /// One line: its rows, or why they are dropped.
    pub(super) fn line(&mut self, text: &str, rows: &mut Rows<'_>) -> Result<(), String> {
        if text.trim().is_empty() {
            return Ok(());
        }
        match &mut self.state {
            State::Dly => dly(text, rows),
            State::Rows => ghcn_row(text, rows),
            State::Columns { date, tmin, tmax, attributes, tenths } => {
                let row = fields(text, ',');
                let at = |column: usize| row.get(column).map(|field| field.trim());
                let Some(day) = at(*date).and_then(iso_day) else {
                    return rows(Err(Drop::NoDate));
                };
                if self.place.title.is_none() {
                    self.place.title = row.get(1).map(|name| name.trim().to_owned());
                }
                let flagged = |column: usize| {
                    *attributes
                        && at(column + 1)
                            .and_then(|flags| flags.split(',').nth(1))
                            .is_some_and(|flag| !flag.trim().is_empty())
                };
                let scale = if *tenths { 0.1 } else { 1.0 };
                let value = |column: usize| -> Result<f64, Drop> {
                    let text = at(column).filter(|text| !text.is_empty()).ok_or(Drop::Missing)?;
                    let value: f64 = text.parse().map_err(|_| Drop::CutLine)?;
                    if value <= -9999.0 {
                        return Err(Drop::Missing);
                    }
                    if flagged(column) {
                        return Err(Drop::Flagged);
                    }
                    Ok(value * scale)
                };
                let low = value(*tmin);
                let high = tmax.map(value);
                if let (Ok(low), Some(Ok(high))) = (&low, &high) {
                    if high < low {
                        return rows(Err(Drop::MaximumUnderMinimum));
                    }
                }
                let tenths = *tenths;
                match low {
                    Ok(low) => {
                        let low = self.celsius(low, tenths)?;
                        rows(Ok(Row::Minimum { day, celsius: low }))?;
                    }
                    Err(drop) => rows(Err(drop))?,
                }
                if let Some(Ok(high)) = high {
                    let high = self.celsius(high, tenths)?;
                    rows(Ok(Row::Maximum { day, celsius: high }))?;
                }
                Ok(())
            }
            State::Epw { typical } => epw(text, typical, rows),
            State::Tmy3 { date, time, dry, wind, typical } => {
                let row = fields(text, ',');
                let at = |column: usize| row.get(column).map_or("", |field| field.trim());
                let (date, time) = (at(*date), at(*time));
                let Some((month, day, year)) = us_date(date) else {
                    return rows(Err(Drop::NoDate));
                };
                let hour = time.split(':').next().and_then(|hour| hour.parse::<u32>().ok());
                let Some(hour) = hour.filter(|hour| (1..=24).contains(hour)) else {
                    return rows(Err(Drop::NoDate));
                };
                let celsius = match at(*dry).parse::<f64>() {
                    Ok(value) if value <= -9900.0 => return rows(Err(Drop::Missing)),
                    Ok(value) => value,
                    Err(_) => return rows(Err(Drop::CutLine)),
                };
                let wind = wind
                    .and_then(|column| at(column).parse::<f64>().ok())
                    .filter(|wind| (0.0..=60.0).contains(wind));
                let joined = joins(typical, year, month);
                rows(Ok(Row::Hour { year: TYPICAL_YEAR, month, day, hour, celsius, wind, joined }))
            }
            State::Isd { offset_h } => isd(text, *offset_h, rows),
            State::DateTmin { date, tmin, separator } => {
                let row = fields(text, *separator);
                let at = |column: usize| row.get(column).map_or("", |field| field.trim());
                let Some(day) = iso_day(at(*date)) else {
                    return Err(format!(
                        "`{}` is no date; write for example 1998-01-31",
                        at(*date)
                    ));
                };
                if let Some(last) = self.last {
                    if day == last {
                        return Err(format!("the day {} stands twice in a row", at(*date)));
                    }
                    if day < last {
                        return Err(format!(
                            "the day {} comes after a later one; sort the file by date",
                            at(*date)
                        ));
                    }
                }
                self.last = Some(day);
                let text = at(*tmin);
                if text.is_empty() || text.eq_ignore_ascii_case("na") {
                    return rows(Err(Drop::Missing));
                }
                let number =
                    if *separator == ',' { text.to_owned() } else { text.replace(',', ".") };
                let value: f64 = number
                    .parse()
                    .map_err(|_| format!("`{text}` is no temperature; write a plain number"))?;
                if value <= -9999.0 || (value - 99.9).abs() < 1e-9 {
                    return rows(Err(Drop::Missing));
                }
                let celsius = self.celsius(value, false)?;
                rows(Ok(Row::Minimum { day, celsius }))
            }
        }
    }

    /// A value in °C; asks where the unit is not known and the value says it is another.
    fn celsius(&self, value: f64, tenths: bool) -> Result<f64, String> {
        if tenths {
            return Ok(value);
        }
        match self.unit {
            Unit::Fahrenheit => Ok((value - 32.0) / 1.8),
            Unit::Celsius if !self.unit_known && value.abs() > 60.0 && value.abs() < 150.0 => {
                Err(format!(
                    "{value} is no minimum in °C; are these °F? say so with --units f, or --units c"
                ))
            }
            Unit::Celsius => Ok(value),
        }
    }
}

/// Months of a typical year come from different years: all are laid on this one.
pub(super) const TYPICAL_YEAR: i32 = 2001;

/// Whether a row starts a month of another year than the one before: an artificial join.
fn joins(typical: &mut Option<(i32, u32)>, year: i32, month: u32) -> bool {
    let joined = typical.is_some_and(|(y, m)| m != month && y != year);
    *typical = Some((year, month));
    joined
}

fn is_dly(line: &str) -> bool {
    line.is_ascii()
        && line.len() >= 29
        && !line.contains(',')
        && line.get(11..17).is_some_and(|t| t.bytes().all(|b| b.is_ascii_digit()))
        && line
            .get(17..21)
            .is_some_and(|t| t.bytes().all(|b| b.is_ascii_uppercase() || b.is_ascii_digit()))
}

fn is_ghcn_row(line: &str) -> bool {
    let mut fields = line.split(',');
    let (id, date, element) = (fields.next(), fields.next(), fields.next());
    id.is_some_and(|id| id.len() == 11)
        && date.is_some_and(|date| date.len() == 8 && date.bytes().all(|b| b.is_ascii_digit()))
        && element.is_some_and(|element| element.len() == 4)
}

fn dly(text: &str, rows: &mut Rows<'_>) -> Result<(), String> {
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

const fn daily(minimum: bool, day: Day, celsius: f64) -> Row {
    if minimum { Row::Minimum { day, celsius } } else { Row::Maximum { day, celsius } }
}

fn ghcn_row(text: &str, rows: &mut Rows<'_>) -> Result<(), String> {
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

fn epw(text: &str, typical: &mut Option<(i32, u32)>, rows: &mut Rows<'_>) -> Result<(), String> {
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

fn isd(text: &str, offset_h: f64, rows: &mut Rows<'_>) -> Result<(), String> {
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

/// `19470101`.
fn compact_day(text: &str) -> Option<Day> {
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
fn iso_day(text: &str) -> Option<Day> {
    let mut parts = text.trim().splitn(3, '-');
    let (year, month, day) = (parts.next()?, parts.next()?, parts.next()?);
    day_of(year.parse().ok()?, month.parse().ok()?, day.get(..2.min(day.len()))?.parse().ok()?)
}

/// `01/31/1988` as (month, day, year).
fn us_date(text: &str) -> Option<(u32, u32, i32)> {
    let mut parts = text.trim().splitn(3, '/');
    let month: u32 = parts.next()?.parse().ok()?;
    let day: u32 = parts.next()?.parse().ok()?;
    let year: i32 = parts.next()?.parse().ok()?;
    day_of(year, month, day).map(|_| (month, day, year))
}

fn number(text: Option<&str>) -> Option<f64> {
    text?.trim().parse().ok()
}

fn epw_place(rest: &str) -> Where {
    let fields: Vec<&str> = rest.split(',').collect();
    let at = |column: usize| fields.get(column).copied();
    Where {
        title: at(0).map(|name| name.trim().to_owned()),
        place: number(at(5))
            .zip(number(at(6)))
            .map(|(latitude, longitude)| Place { latitude, longitude }),
        elevation_m: number(at(8)),
    }
}

fn tmy3_place(first: &str) -> Where {
    let row = fields(first, ',');
    let at = |column: usize| row.get(column).map(String::as_str);
    Where {
        title: at(1).map(|name| name.trim().to_owned()),
        place: number(at(4))
            .zip(number(at(5)))
            .map(|(latitude, longitude)| Place { latitude, longitude }),
        elevation_m: number(at(6)),
    }
}

fn separator_of(line: &str) -> char {
    [';', '\t'].into_iter().find(|c| line.contains(*c)).unwrap_or(',')
}

/// Fields of a line; quotes may hold separators.
fn fields(line: &str, separator: char) -> Vec<String> {
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
