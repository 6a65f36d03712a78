//! Weather records in, a climate file out.
//!
//! Records are read line by line; what is kept does not grow with their number. What is dropped is
//! counted with the reason.
//!
//! Invariants: a value that failed a check of its source is never used; daily and hourly records are
//! never mixed; a day or an hour counts once.

mod fields;
mod gather;
mod layout;
mod lines;

pub use gather::Gathered;
pub use layout::{Layout, Unit};

use crate::climate::Site;
use layout::Parser;
use std::collections::BTreeMap;
use std::io::BufRead;

/// So many malformed lines are borne, if more are good.
const MOST_CUT: u64 = 1000;

/// No line of a record is longer, bytes.
const LONGEST_LINE: usize = 64 * 1024;

/// What is asked of an import.
#[derive(Debug, Clone, Default)]
pub struct Options {
    /// Local standard time less UTC, h: for records in UTC.
    pub utc_offset: Option<f64>,
    /// The unit of values whose file does not say it.
    pub unit: Option<Unit>,
    /// Hour of the morning that starts are counted at, 1 to 24.
    pub start_hour: u32,
    /// The station to take, where records hold more than one.
    pub station: Option<String>,
}

/// Why values were dropped.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
#[allow(missing_docs, reason = "`words` says what each is")]
#[non_exhaustive]
pub enum Drop {
    Missing,
    Flagged,
    Impossible,
    NoDate,
    Duplicate,
    MaximumUnderMinimum,
    CutLine,
    OtherStation,
}

impl Drop {
    /// The reason in words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Missing => "missing",
            Self::Flagged => "failed a quality check of their source",
            Self::Impossible => "not between -90 and 60 °C",
            Self::NoDate => "without a date that exists",
            Self::Duplicate => "of a day or hour seen already",
            Self::MaximumUnderMinimum => "maxima under the minimum of their day, which is kept",
            Self::CutLine => "on lines that are cut or malformed",
            Self::OtherStation => "of other stations",
        }
    }
}

/// How often, and where first.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Dropped {
    /// How many values.
    pub count: u64,
    /// The file of the first.
    pub file: String,
    /// Its line, from 1.
    pub line: u64,
}

/// What is wrong with a record.
#[derive(Debug, thiserror::Error)]
#[non_exhaustive]
pub enum RecordError {
    /// It cannot be read.
    #[error("{file}: {source}")]
    Io {
        /// The file.
        file: String,
        /// What the system says.
        source: std::io::Error,
    },
    /// It cannot be used.
    #[error("{file}:{line}: {message}")]
    Line {
        /// The file.
        file: String,
        /// Line, from 1.
        line: u64,
        /// What is wrong and what would be right.
        message: String,
    },
    /// It holds nothing to use.
    #[error("{file}: {message}")]
    File {
        /// The file.
        file: String,
        /// What is wrong and what would be right.
        message: String,
    },
}

/// An import under way.
#[derive(Debug)]
pub struct Import {
    options: Options,
    gathered: Gathered,
    dropped: BTreeMap<Drop, Dropped>,
    station: Option<String>,
    layouts: Vec<(String, Layout)>,
    lines: u64,
}

impl Import {
    /// An empty one.
    #[must_use]
    pub fn new(options: Options) -> Self {
        let start_hour = options.start_hour.clamp(1, 24);
        Self {
            station: options.station.clone(),
            options,
            gathered: Gathered::new(start_hour),
            dropped: BTreeMap::new(),
            layouts: Vec::new(),
            lines: 0,
        }
    }

    /// Reads one file; `passed` hears how many bytes were read.
    ///
    /// # Errors
    /// What cannot be read, a layout that is not known, a line over 64 KiB, hours in UTC without an
    /// offset, a unit that is not told or contradicts the file, a second station, a day with two
    /// values, daily records mixed with hourly ones, mostly malformed lines.
    pub fn file(
        &mut self,
        file: &str,
        mut reader: impl BufRead,
        mut passed: impl FnMut(u64),
    ) -> Result<Layout, RecordError> {
        let mut parser: Option<Parser> = None;
        let mut head: Vec<String> = Vec::new();
        let mut bytes = Vec::new();
        let mut number = 0_u64;
        loop {
            bytes.clear();
            let read = read_line(&mut reader, &mut bytes)
                .map_err(|source| RecordError::Io { file: file.to_owned(), source })?;
            if read == 0 {
                break;
            }
            passed(read as u64);
            number += 1;
            if bytes.len() > LONGEST_LINE {
                return Err(RecordError::Line {
                    file: file.to_owned(),
                    line: number,
                    message: "is longer than 64 KiB: this is no weather record".to_owned(),
                });
            }
            let text = String::from_utf8_lossy(&bytes);
            let mut text = text.trim_end_matches(['\n', '\r']);
            if number == 1 {
                text = text.trim_start_matches('\u{feff}');
            }
            let wrong =
                |message| RecordError::Line { file: file.to_owned(), line: number, message };
            match &mut parser {
                Some(parser) => {
                    self.line(parser, text, (file, number)).map_err(wrong)?;
                }
                None => {
                    if text.trim().is_empty() && head.is_empty() {
                        continue;
                    }
                    head.push(text.to_owned());
                    if let Some(mut found) = Parser::of(&head, &self.options).map_err(wrong)? {
                        for line in found.rows_in_head(&head) {
                            self.line(&mut found, &line, (file, number)).map_err(wrong)?;
                        }
                        parser = Some(found);
                    } else if head.len() > layout::LONGEST_HEAD {
                        break;
                    }
                }
            }
        }
        let Some(parser) = parser else {
            return Err(RecordError::File {
                file: file.to_owned(),
                message: "is in no layout known here; it takes GHCN-Daily (.dly, by-year rows, per-station CSV, order-tool CSV), EPW, TMY3 CSV, ISD-Lite, a CSV with the columns date and tmin_c, or one of hours with year, month, day, hour and drybulb_c".to_owned(),
            });
        };
        parser
            .doubt_of_unit()
            .map_err(|message| RecordError::File { file: file.to_owned(), message })?;
        self.gathered.end_of_file(&parser.place());
        self.lines += number;
        let layout = parser.layout();
        self.layouts.push((file.to_owned(), layout));
        Ok(layout)
    }

    fn line(&mut self, parser: &mut Parser, text: &str, at: (&str, u64)) -> Result<(), String> {
        if let Some(id) = parser.station_of(text) {
            match &self.station {
                Some(station) if *station == *id => {}
                Some(_) if self.options.station.is_some() => {
                    return self.drop(Drop::OtherStation, at);
                }
                Some(station) => {
                    return Err(format!(
                        "station `{id}` after station `{station}`; say which one, for example --station {station}"
                    ));
                }
                None => self.station = Some(id.into_owned()),
            }
        }
        parser.line(text, &mut |row| match row {
            Ok(row) => match self.gathered.add(row)? {
                Ok(()) => Ok(()),
                Err(why) => self.drop(why, at),
            },
            Err(why) => self.drop(why, at),
        })
    }

    fn drop(&mut self, why: Drop, (file, line): (&str, u64)) -> Result<(), String> {
        let dropped = self.dropped.entry(why).or_insert_with(|| Dropped {
            count: 0,
            file: file.to_owned(),
            line,
        });
        dropped.count += 1;
        let used = self.gathered.used();
        if why == Drop::CutLine && dropped.count > MOST_CUT && dropped.count > used {
            return Err(format!(
                "{} lines are cut or malformed and {used} values good: this is no such record",
                dropped.count
            ));
        }
        Ok(())
    }

    /// The climate file; and what to mind about it.
    ///
    /// # Errors
    /// Nothing was gathered, or too much of it cannot be a temperature of the air.
    pub fn site(&self, name: &str, source: &str) -> Result<(Site, Vec<String>), String> {
        let impossible = self.dropped.get(&Drop::Impossible).map_or(0, |dropped| dropped.count);
        let used = self.gathered.used();
        if impossible * 20 > used + impossible {
            return Err(format!(
                "{impossible} readings lie outside -90 to 60 °C, {used} inside: the unit is not what the file or --units says (tenths of a degree?)"
            ));
        }
        self.gathered.site(name, &self.options, source)
    }

    /// How many values were dropped, by reason.
    #[must_use]
    pub const fn dropped(&self) -> &BTreeMap<Drop, Dropped> {
        &self.dropped
    }

    /// Files read, with their layout.
    #[must_use]
    pub fn layouts(&self) -> &[(String, Layout)] {
        &self.layouts
    }

    /// Lines read.
    #[must_use]
    pub const fn lines(&self) -> u64 {
        self.lines
    }

    /// What was gathered.
    #[must_use]
    pub const fn gathered(&self) -> &Gathered {
        &self.gathered
    }
}

/// One line with its end, cut a little over the longest allowed.
fn read_line(reader: &mut impl BufRead, out: &mut Vec<u8>) -> std::io::Result<usize> {
    use std::io::Read as _;
    reader.by_ref().take(LONGEST_LINE as u64 + 1).read_until(b'\n', out)
}
