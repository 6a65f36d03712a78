//! Layouts of weather records: recognised by content, read line by line.
//!
//! Sources: GHCN-Daily readme (NOAA, v3.22) and by-station readme; EnergyPlus auxiliary programs, EPW
//! data dictionary; TMY3 as distributed; ISD-Lite as distributed. Order of attributes in the
//! per-station CSV and tenths in it: memory.

use super::fields::{decimal, fields, iso_day, number, separator_of, us_date};
use super::gather::Row;
use super::lines::{TYPICAL_YEAR, daily, dly, epw, ghcn_row, is_dly, is_ghcn_row, isd, joins};
use super::{Drop, Options};
use crate::climate::site::Place;
use crate::climate::tally::Day;
use std::borrow::Cow;

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
    Hours,
}

impl Layout {
    /// The layout in words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::GhcnDly => "GHCN-Daily, fixed width (.dly), tenths of °C",
            Self::GhcnRows => "GHCN-Daily, one value a row, tenths of °C",
            Self::GhcnStation => "GHCN-Daily, one day a row with attributes",
            Self::GhcnOrder => "GHCN-Daily, order-tool CSV, whole degrees",
            Self::Epw => "EPW, hourly, °C",
            Self::Tmy3 => "TMY3 CSV, hourly, °C",
            Self::IsdLite => "ISD-Lite, hourly in UTC, tenths of °C",
            Self::DateTmin => "CSV with date and tmin",
            Self::Hours => "CSV of hours in local standard time",
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

pub(super) type Rows<'a> = dyn FnMut(Result<Row, Drop>) -> Result<(), String> + 'a;

#[derive(Debug)]
enum State {
    Dly,
    Rows,
    Columns {
        station: usize,
        date: usize,
        tmin: usize,
        tmax: Option<usize>,
        attributes: bool,
        width: usize,
    },
    Epw {
        typical: Option<(i32, u32)>,
    },
    Tmy3 {
        date: usize,
        time: usize,
        dry: usize,
        wind: Option<usize>,
        width: usize,
        typical: Option<(i32, u32)>,
    },
    Isd {
        offset_h: f64,
    },
    DateTmin {
        date: usize,
        tmin: usize,
        separator: char,
        width: usize,
    },
    Hours {
        /// Year, month, day, hour.
        time: [usize; 4],
        dry: usize,
        wind: Option<usize>,
        separator: char,
        width: usize,
        /// Months joined from different years.
        joined: bool,
        typical: Option<(i32, u32)>,
    },
}

/// A layout under way.
#[derive(Debug)]
pub(super) struct Parser {
    layout: Layout,
    state: State,
    /// The unit told or found; `None` where integers with attributes may be tenths of °C.
    unit: Option<Unit>,
    /// The number form of the values, with a decimal point or without.
    decimals: Option<bool>,
    /// The largest value without a decimal point.
    largest: f64,
    place: Where,
    last: Option<Day>,
}

impl Parser {
    /// The layout of the first lines; `None` where more lines are needed to tell.
    pub(super) fn of(head: &[String], options: &Options) -> Result<Option<Self>, String> {
        let Some(first) = head.first() else { return Ok(None) };
        let last = head.last().map_or(first.as_str(), String::as_str);
        let with = |layout, state, place, unit| {
            Ok(Some(Self { layout, state, unit, decimals: None, largest: 0.0, place, last: None }))
        };
        let make = |layout: Layout, state, place| match options.unit {
            Some(Unit::Fahrenheit) => {
                Err(format!("is read as {}, which is in °C; leave --units out", layout.words()))
            }
            _ => with(layout, state, place, Some(Unit::Celsius)),
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
            let width = names.len();
            let state = State::Tmy3 { date, time, dry, wind, width, typical: None };
            let place = if head.len() > 1 { tmy3_place(first) } else { Where::default() };
            return make(Layout::Tmy3, state, place);
        }
        if head.len() > 1 {
            return Ok(None);
        }
        let width = names.len();
        if let (Some(station), Some(date), Some(tmin)) =
            (find("station"), find("date"), find("tmin"))
        {
            let attributes = find("tmin_attributes").is_some();
            let state =
                State::Columns { station, date, tmin, tmax: find("tmax"), attributes, width };
            let layout = if attributes { Layout::GhcnStation } else { Layout::GhcnOrder };
            if !attributes && options.unit.is_none() {
                return Err(unit_not_told("TMIN"));
            }
            return with(layout, state, Where::default(), options.unit);
        }
        let tmin = ["tmin", "tmin_c", "tmin_f"].iter().find_map(|name| Some((*name, find(name)?)));
        if let (Some(date), Some((name, tmin))) = (find("date"), tmin) {
            let unit = unit_of(name, options)?;
            let state = State::DateTmin { date, tmin, separator, width };
            return with(Layout::DateTmin, state, Where::default(), Some(unit));
        }
        let hour = ["hour", "hour_ending_lst"].iter().find_map(|name| find(name));
        let year = ["year", "source_year"].iter().find_map(|name| find(name));
        let dry = ["drybulb_c", "drybulb_f"].iter().find_map(|name| Some((*name, find(name)?)));
        if let (Some(year), Some(month), Some(day), Some(hour), Some((name, dry))) =
            (year, find("month"), find("day"), hour, dry)
        {
            let unit = unit_of(name, options)?;
            let state = State::Hours {
                time: [year, month, day, hour],
                dry,
                wind: find("wind_speed_m_s"),
                separator,
                width,
                joined: find("source_year").is_some(),
                typical: None,
            };
            return with(Layout::Hours, state, Where::default(), Some(unit));
        }
        Ok(None)
    }

    /// The station a line is of, where the layout says it in every line.
    pub(super) fn station_of<'a>(&self, text: &'a str) -> Option<Cow<'a, str>> {
        let id = match &self.state {
            State::Dly => Cow::Borrowed(text.get(..11)?.trim()),
            State::Rows => Cow::Borrowed(text.split(',').next()?.trim()),
            State::Columns { station, .. } => {
                Cow::Owned(fields(text, ',').into_iter().nth(*station)?.trim().to_owned())
            }
            _ => return None,
        };
        (!id.is_empty()).then_some(id)
    }

    /// Integers with attributes are tenths of °C in some tables and whole °F in others. Where no value
    /// is too large for °F, only a word from whoever fetched the file can tell.
    ///
    /// # Errors
    /// What to say.
    pub(super) fn doubt_of_unit(&self) -> Result<(), String> {
        let tenths = self.unit.is_none() && self.decimals == Some(false);
        if tenths && self.largest <= HOTTEST_F {
            return Err(unit_not_told("TMIN"));
        }
        Ok(())
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
            State::Columns { date, tmin, tmax, attributes, width, .. } => {
                let row = fields(text, ',');
                if row.len() < *width {
                    return rows(Err(Drop::CutLine));
                }
                let at = |column: usize| row.get(column).map(|field| field.trim());
                let Some(day) = at(*date).and_then(iso_day) else {
                    return rows(Err(Drop::NoDate));
                };
                if self.place.title.is_none() {
                    self.place.title = row.get(1).map(|name| name.trim().to_owned());
                }
                let (attributes, low, high) = (*attributes, *tmin, *tmax);
                let flagged = |column: usize| {
                    attributes
                        && at(column + 1)
                            .and_then(|flags| flags.split(',').nth(1))
                            .is_some_and(|flag| !flag.trim().is_empty())
                };
                for (column, minimum) in [(Some(low), true), (high, false)] {
                    let Some(column) = column else { continue };
                    let text = at(column).unwrap_or_default();
                    let row = match text.parse::<f64>() {
                        // A day without a maximum lacks nothing that is asked for.
                        Err(_) if text.is_empty() && !minimum => continue,
                        Err(_) if text.is_empty() => Err(Drop::Missing),
                        Err(_) => Err(Drop::CutLine),
                        Ok(value) if value <= -9999.0 => Err(Drop::Missing),
                        Ok(_) if flagged(column) => Err(Drop::Flagged),
                        Ok(value) => Ok(daily(minimum, day, self.tabled(text, value, attributes)?)),
                    };
                    rows(row)?;
                }
                Ok(())
            }
            State::Epw { typical } => epw(text, typical, rows),
            State::Tmy3 { date, time, dry, wind, width, typical } => {
                let row = fields(text, ',');
                if row.len() < *width {
                    return rows(Err(Drop::CutLine));
                }
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
            State::Hours { time, dry, wind, separator, width, joined, typical } => {
                let row = fields(text, *separator);
                if row.len() < *width {
                    return rows(Err(Drop::CutLine));
                }
                let at = |column: usize| row.get(column).map_or("", |field| field.trim());
                let [year, month, day, hour] = time.map(|column| at(column).parse::<i32>().ok());
                let (Some(mut year), Some(month), Some(day), Some(hour)) = (year, month, day, hour)
                else {
                    return rows(Err(Drop::NoDate));
                };
                let unsigned = |value: i32| u32::try_from(value).unwrap_or(0);
                let (month, day, hour) = (unsigned(month), unsigned(day), unsigned(hour));
                if !(1..=24).contains(&hour) {
                    return rows(Err(Drop::NoDate));
                }
                let joins = *joined && joins(typical, year, month);
                if *joined {
                    year = TYPICAL_YEAR;
                }
                let Some(value) = decimal(at(*dry), *separator) else {
                    return rows(Err(Drop::Missing));
                };
                let wind = wind
                    .and_then(|column| decimal(at(column), *separator))
                    .filter(|wind| (0.0..=60.0).contains(wind));
                let celsius = self.celsius(value);
                rows(Ok(Row::Hour { year, month, day, hour, celsius, wind, joined: joins }))
            }
            State::DateTmin { date, tmin, separator, width } => {
                let row = fields(text, *separator);
                if row.len() < *width {
                    return rows(Err(Drop::CutLine));
                }
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
                let value = decimal(text, *separator)
                    .ok_or_else(|| format!("`{text}` is no temperature; write a plain number"))?;
                if value <= -9999.0 || (value - 99.9).abs() < 1e-9 {
                    return rows(Err(Drop::Missing));
                }
                let celsius = self.celsius(value);
                rows(Ok(Row::Minimum { day, celsius }))
            }
        }
    }

    /// A value of the unit told, in °C.
    fn celsius(&self, value: f64) -> f64 {
        match self.unit {
            Some(Unit::Fahrenheit) => (value - 32.0) / 1.8,
            _ => value,
        }
    }

    /// A value of a daily table, in °C. With attributes beside them integers are tenths of °C, or
    /// whole °F where that is told; with a decimal point they are whole degrees.
    fn tabled(&mut self, text: &str, value: f64, attributes: bool) -> Result<f64, String> {
        if !attributes {
            return Ok(self.celsius(value));
        }
        let decimals = text.contains('.');
        if self.decimals.is_some_and(|before| before != decimals) {
            return Err(format!(
                "`{text}` {} a decimal point, other than the values before it: tenths and whole degrees are mixed",
                if decimals { "has" } else { "is without" }
            ));
        }
        self.decimals = Some(decimals);
        match self.unit {
            None if decimals => Err(unit_not_told("TMIN")),
            Some(Unit::Fahrenheit) => Ok(self.celsius(value)),
            _ if decimals => Ok(value),
            _ => {
                self.largest = self.largest.max(value.abs());
                Ok(value * 0.1)
            }
        }
    }
}

/// The hottest day there can be, °F: integers beyond it are tenths of °C.
const HOTTEST_F: f64 = 134.0;

fn unit_not_told(column: &str) -> String {
    format!("the unit of `{column}` is not in the file; say --units c or --units f")
}

/// The unit of a column by its name, by what is told, or neither.
fn unit_of(column: &str, options: &Options) -> Result<Unit, String> {
    let named = if column.ends_with("_c") {
        Some(Unit::Celsius)
    } else if column.ends_with("_f") {
        Some(Unit::Fahrenheit)
    } else {
        None
    };
    match (named, options.unit) {
        (Some(named), Some(told)) if named != told => {
            Err(format!("`{column}` names another unit than --units; leave --units out"))
        }
        (Some(unit), _) | (None, Some(unit)) => Ok(unit),
        (None, None) => Err(unit_not_told(column)),
    }
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
