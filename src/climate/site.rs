//! A climate file: one site, or one design class, with its cold.

use serde::{Deserialize, Serialize};

/// What a file describes.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Deserialize, Serialize)]
#[serde(rename_all = "kebab-case")]
pub enum Kind {
    /// Computed from records.
    Observed,
    /// A published category of cold, not a place.
    DesignClass,
    /// Made up, for demonstration.
    Invented,
}

impl Kind {
    /// The word in files.
    #[must_use]
    pub const fn id(self) -> &'static str {
        match self {
            Self::Observed => "observed",
            Self::DesignClass => "design-class",
            Self::Invented => "invented",
        }
    }
}

/// A temperature and how it was got.
#[derive(Debug, Clone, PartialEq, Deserialize, Serialize)]
#[serde(deny_unknown_fields)]
pub struct Reading {
    /// °C.
    pub celsius: f64,
    /// How it was got.
    pub how: String,
}

/// A return level.
#[derive(Debug, Clone, PartialEq, Deserialize, Serialize)]
#[serde(deny_unknown_fields)]
pub struct OnceIn {
    /// Winters.
    pub winters: f64,
    /// °C.
    pub celsius: f64,
    /// Standard error, K.
    pub standard_error_k: f64,
    /// How it was got.
    pub how: String,
}

/// The cold side of a site.
#[derive(Debug, Clone, PartialEq, Default, Deserialize, Serialize)]
#[serde(deny_unknown_fields, default)]
pub struct Minima {
    /// Coldest on record.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub record: Option<Reading>,
    /// Colder in 0.4 % of the hours of a year.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub percent_99_6: Option<Reading>,
    /// Colder in 1 % of the hours of a year.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub percent_99: Option<Reading>,
    /// Low of the daily cycle of a design class.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub class: Option<Reading>,
    /// Coldest once in so many winters.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub once_in: Vec<OnceIn>,
}

/// Monthly means and daily ranges, January first.
#[derive(Debug, Clone, PartialEq, Deserialize, Serialize)]
#[serde(deny_unknown_fields)]
pub struct Monthly {
    /// Mean, °C.
    pub mean_c: Vec<f64>,
    /// Mean daily range, K.
    pub daily_range_k: Vec<f64>,
    /// How they were got.
    pub how: String,
}

/// A cold day, hour by hour in local standard time: the first value is that of 01:00.
#[derive(Debug, Clone, PartialEq, Deserialize, Serialize)]
#[serde(deny_unknown_fields)]
pub struct ColdDay {
    /// 24 values, °C.
    pub hours_c: Vec<f64>,
    /// How it was got.
    pub how: String,
}

/// Wind in the cold.
#[derive(Debug, Clone, PartialEq, Deserialize, Serialize)]
#[serde(deny_unknown_fields)]
pub struct Wind {
    /// With the coldest hours, m/s.
    pub deep_cold_m_s: f64,
    /// With the hours round the 99 % value, m/s.
    pub at_99_m_s: f64,
    /// How they were got.
    pub how: String,
}

/// How often it is colder.
#[derive(Debug, Clone, PartialEq, Deserialize, Serialize)]
#[serde(deny_unknown_fields)]
pub struct Below {
    /// Strictly under, °C.
    pub celsius: f64,
    /// Hours a year.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub hours: Option<f64>,
    /// Mornings a year, at the start hour.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub mornings: Option<f64>,
}

/// The coldest mean over so many hours in a row.
#[derive(Debug, Clone, Copy, PartialEq, Deserialize, Serialize)]
#[serde(deny_unknown_fields)]
pub struct Spell {
    /// Hours.
    pub hours: f64,
    /// Mean, °C.
    pub celsius: f64,
}

/// The coldest of one winter.
#[derive(Debug, Clone, Copy, PartialEq, Deserialize, Serialize)]
#[serde(deny_unknown_fields)]
pub struct WinterMinimum {
    /// The year the winter ends in.
    pub ends: i32,
    /// °C.
    pub celsius: f64,
}

/// Where it is.
#[derive(Debug, Clone, Copy, PartialEq, Deserialize, Serialize)]
#[serde(deny_unknown_fields)]
pub struct Place {
    /// Degrees north.
    pub latitude: f64,
    /// Degrees east.
    pub longitude: f64,
}

/// One climate file.
#[derive(Debug, Clone, PartialEq, Deserialize, Serialize)]
#[serde(deny_unknown_fields)]
pub struct Site {
    /// Format of the file, 1.
    pub format: u32,
    /// What a case calls it.
    pub name: String,
    /// What people call it.
    pub title: String,
    /// What it is.
    pub kind: Kind,
    /// Where the figures come from.
    pub source: String,
    /// Under which terms they may be passed on.
    pub licence: String,
    /// Years of the record.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub period: Option<String>,
    /// Height above the sea, m.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub elevation_m: Option<f64>,
    /// Hour of the morning that `mornings` are counted at.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub start_hour: Option<u32>,
    /// What to know before using it.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub note: Option<String>,
    /// Where it is.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub place: Option<Place>,
    /// Minima.
    #[serde(default)]
    pub minima: Minima,
    /// Wind.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub wind: Option<Wind>,
    /// A cold day.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub cold_day: Option<ColdDay>,
    /// Months.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub monthly: Option<Monthly>,
    /// How often it is colder, warmest threshold first.
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub below: Vec<Below>,
    /// The coldest means over hours in a row.
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub spell: Vec<Spell>,
    /// The coldest of each winter on record.
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub winter: Vec<WinterMinimum>,
}

/// What is wrong with a climate file.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum SiteError {
    /// It cannot be read as one.
    #[error("{name}:{line}:{column}: {message}")]
    Text {
        /// The file.
        name: String,
        /// Line, from 1.
        line: usize,
        /// Column, from 1.
        column: usize,
        /// What is wrong.
        message: String,
    },
    /// It reads, and a value cannot be.
    #[error("{name}: {key}: {message}")]
    Value {
        /// The file.
        name: String,
        /// The key.
        key: &'static str,
        /// What is wrong.
        message: String,
    },
}

impl Site {
    /// Reads a climate file; `file` is what messages call it.
    ///
    /// # Errors
    /// Text that is not such a file, with line and column; temperatures outside -90 to 60 °C, days
    /// without 24 hours, years without 12 months, minima in the wrong order.
    ///
    /// # Example
    /// ```
    /// use coldsump::climate::Site;
    /// let wrong = Site::read("mine.toml", "format = 1\nnam = \"x\"\n").unwrap_err();
    /// assert!(wrong.to_string().starts_with("mine.toml:2:1: unknown field `nam`"));
    /// ```
    pub fn read(file: &str, text: &str) -> Result<Self, SiteError> {
        let text = text.strip_prefix('\u{feff}').unwrap_or(text);
        let site: Self = toml::from_str(text).map_err(|error| {
            let at = error.span().map_or(0, |span| span.start);
            let before = text.get(..at).unwrap_or_default();
            SiteError::Text {
                name: file.to_owned(),
                line: before.matches('\n').count() + 1,
                column: before.rsplit('\n').next().unwrap_or_default().chars().count() + 1,
                message: error.message().trim().replace('\n', "; "),
            }
        })?;
        site.sound(file)?;
        Ok(site)
    }

    /// The file's text.
    #[must_use]
    pub fn write(&self) -> Option<String> {
        toml::to_string(self).ok()
    }

    fn sound(&self, file: &str) -> Result<(), SiteError> {
        let wrong =
            |key, message: String| Err(SiteError::Value { name: file.to_owned(), key, message });
        if self.format != 1 {
            return wrong("format", format!("this program reads format 1, not {}", self.format));
        }
        if self.name.is_empty() {
            return wrong("name", "is empty".to_owned());
        }
        let minima = &self.minima;
        let readings = [&minima.record, &minima.percent_99_6, &minima.percent_99, &minima.class];
        let mut temperatures: Vec<f64> =
            readings.into_iter().flatten().map(|reading| reading.celsius).collect();
        temperatures.extend(minima.once_in.iter().map(|level| level.celsius));
        temperatures.extend(self.winter.iter().map(|winter| winter.celsius));
        temperatures.extend(self.below.iter().map(|below| below.celsius));
        if let Some(day) = &self.cold_day {
            if day.hours_c.len() != 24 {
                return wrong(
                    "cold_day.hours_c",
                    format!("has {} values, not 24", day.hours_c.len()),
                );
            }
            temperatures.extend(&day.hours_c);
        }
        if let Some(months) = &self.monthly {
            for (key, list) in [
                ("monthly.mean_c", &months.mean_c),
                ("monthly.daily_range_k", &months.daily_range_k),
            ] {
                if list.len() != 12 {
                    return wrong(key, format!("has {} values, not 12", list.len()));
                }
            }
            temperatures.extend(&months.mean_c);
            if months.daily_range_k.iter().any(|range| !(0.0..=60.0).contains(range)) {
                return wrong("monthly.daily_range_k", "must be between 0 and 60 K".to_owned());
            }
        }
        if let Some(bad) = temperatures.iter().find(|t| !(-90.0..=60.0).contains(*t)) {
            return wrong("temperature", format!("{bad} °C is not between -90 and 60 °C"));
        }
        if let (Some(colder), Some(warmer)) = (&minima.percent_99_6, &minima.percent_99) {
            if colder.celsius > warmer.celsius {
                return wrong(
                    "minima.percent_99_6",
                    format!(
                        "{} °C is warmer than the 99 % value, {} °C; are the two swapped?",
                        colder.celsius, warmer.celsius
                    ),
                );
            }
        }
        let level = |winters: f64, celsius: f64, error: f64| {
            winters > 1.0 && winters.is_finite() && celsius.is_finite() && error >= 0.0
        };
        if minima.once_in.iter().any(|l| !level(l.winters, l.celsius, l.standard_error_k)) {
            return wrong(
                "minima.once_in",
                "needs more than 1 winter and a standard error of 0 or more".to_owned(),
            );
        }
        if let Some(wind) = &self.wind {
            if !(0.0..=60.0).contains(&wind.deep_cold_m_s)
                || !(0.0..=60.0).contains(&wind.at_99_m_s)
            {
                return wrong("wind", "must be between 0 and 60 m/s".to_owned());
            }
        }
        if self.elevation_m.is_some_and(|m| !(-430.0..=6000.0).contains(&m)) {
            return wrong("elevation_m", "must be between -430 and 6000 m".to_owned());
        }
        if self.start_hour.is_some_and(|hour| hour > 23) {
            return wrong("start_hour", "must be between 0 and 23".to_owned());
        }
        Ok(())
    }

    /// Mornings a year strictly colder than a temperature in °C at the start hour, between the
    /// thresholds counted; `None` outside them or where none were counted.
    #[must_use]
    pub fn mornings_below(&self, celsius: f64) -> Option<f64> {
        self.between(celsius, |below| below.mornings)
    }

    /// Hours a year strictly colder than a temperature in °C; as [`Self::mornings_below`].
    #[must_use]
    pub fn hours_below(&self, celsius: f64) -> Option<f64> {
        self.between(celsius, |below| below.hours)
    }

    fn between(&self, celsius: f64, of: impl Fn(&Below) -> Option<f64>) -> Option<f64> {
        let mut rows: Vec<(f64, f64)> =
            self.below.iter().filter_map(|below| Some((below.celsius, of(below)?))).collect();
        rows.sort_by(|a, b| a.0.total_cmp(&b.0));
        // Under a threshold that nothing is under there is nothing either.
        if rows.first().is_some_and(|(at, count)| celsius < *at && *count == 0.0) {
            return Some(0.0);
        }
        let above = rows.iter().position(|(at, _)| *at >= celsius)?;
        let (to, count) = *rows.get(above)?;
        if (to - celsius).abs() < 1e-9 {
            return Some(count);
        }
        let (from, fewer) = *rows.get(above.checked_sub(1)?)?;
        Some(fewer + (count - fewer) * (celsius - from) / (to - from))
    }
}
