//! What is kept of a record while it is read, and the climate file it comes to.

use super::layout::Where;
use super::lines::TYPICAL_YEAR;
use super::{Drop, Options};
use crate::climate::extremes::Winters;
use crate::climate::site::{
    Below, ColdDay, Kind, Minima, Monthly, OnceIn, Reading, Site, Spell, Wind, WinterMinimum,
};
use crate::climate::tally::{
    Bins, Day, LEAST_DAYS, Runs, Seen, Values, Winter, WinterRows, day_of, winter_of,
};

/// One value of a record.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Row {
    /// A daily minimum.
    Minimum { day: Day, celsius: f64 },
    /// A daily maximum.
    Maximum { day: Day, celsius: f64 },
    /// An hour, 1 to 24 in local standard time; `joined`: an artificial join lies before it.
    Hour {
        year: i32,
        month: u32,
        day: u32,
        hour: u32,
        celsius: f64,
        wind: Option<f64>,
        joined: bool,
    },
}

/// Sums and counts of a month.
#[derive(Debug, Clone, Copy, Default)]
struct Sum {
    sum: f64,
    count: u64,
}

impl Sum {
    fn add(&mut self, value: f64) {
        self.sum += value;
        self.count += 1;
    }

    fn mean(self) -> Option<f64> {
        (self.count > 0).then(|| self.sum / self.count as f64)
    }
}

/// A day of hours under way.
#[derive(Debug, Clone, Copy)]
struct HourDay {
    day: Day,
    month: u32,
    hours: [Option<f64>; 24],
}

/// All that is kept.
#[derive(Debug)]
pub struct Gathered {
    start_hour: u32,
    daily: Bins,
    hourly: Bins,
    at_start: Bins,
    hours: Seen,
    minima: Values,
    maxima: Values,
    winters: WinterRows,
    winter_days: Seen,
    minimum_months: [Sum; 12],
    maximum_months: [Sum; 12],
    hour_months: [Sum; 12],
    range_months: [Sum; 12],
    /// By tenths of a degree from -90: sum of wind and count.
    wind: Vec<Sum>,
    today: Option<HourDay>,
    coldest_day: Option<(f64, [f64; 24])>,
    runs: Runs,
    years: Option<(i32, i32)>,
    typical: bool,
    place: Where,
}

impl Gathered {
    pub(super) fn new(start_hour: u32) -> Self {
        Self {
            start_hour,
            daily: Bins::default(),
            hourly: Bins::default(),
            at_start: Bins::default(),
            hours: Seen::default(),
            minima: Values::default(),
            maxima: Values::default(),
            winters: WinterRows::new(),
            winter_days: Seen::default(),
            minimum_months: [Sum::default(); 12],
            maximum_months: [Sum::default(); 12],
            hour_months: [Sum::default(); 12],
            range_months: [Sum::default(); 12],
            wind: vec![Sum::default(); 1501],
            today: None,
            coldest_day: None,
            runs: Runs::default(),
            years: None,
            typical: false,
            place: Where::default(),
        }
    }

    /// Adds one value: dropped with a reason, or an error where records are mixed.
    pub(super) fn add(&mut self, row: Row) -> Result<Result<(), Drop>, String> {
        let hourly = matches!(row, Row::Hour { .. });
        if (hourly && self.daily.total() > 0) || (!hourly && self.hourly.total() > 0) {
            return Err(
                "daily and hourly records cannot be mixed; import them one by one".to_owned()
            );
        }
        match row {
            Row::Minimum { day, celsius } => self.minimum(day, celsius),
            Row::Maximum { day, celsius } => self.maximum(day, celsius),
            Row::Hour { year, month, day, hour, celsius, wind, joined } => {
                Ok(self.hour((year, month, day, hour), celsius, wind, joined))
            }
        }
    }

    fn minimum(&mut self, day: Day, celsius: f64) -> Result<Result<(), Drop>, String> {
        if !possible(celsius) {
            return Ok(Err(Drop::Impossible));
        }
        if let Some(before) = self.minima.set(day, celsius) {
            return again(day, before, celsius);
        }
        self.daily.add(celsius);
        let (year, month, _) = civil(day);
        self.year(year);
        if let Some(sum) = self.minimum_months.get_mut(month as usize - 1) {
            sum.add(celsius);
        }
        self.winter_day(day, year, month, celsius);
        Ok(Ok(()))
    }

    fn maximum(&mut self, day: Day, celsius: f64) -> Result<Result<(), Drop>, String> {
        if !possible(celsius) {
            return Ok(Err(Drop::Impossible));
        }
        if self.minima.get(day).is_some_and(|minimum| celsius < minimum) {
            return Ok(Err(Drop::MaximumUnderMinimum));
        }
        if let Some(before) = self.maxima.set(day, celsius) {
            return again(day, before, celsius);
        }
        let (_, month, _) = civil(day);
        if let Some(sum) = self.maximum_months.get_mut(month as usize - 1) {
            sum.add(celsius);
        }
        Ok(Ok(()))
    }

    fn hour(
        &mut self,
        (year, month, day, hour): (i32, u32, u32, u32),
        celsius: f64,
        wind: Option<f64>,
        joined: bool,
    ) -> Result<(), Drop> {
        let date = day_of(year, month, day).ok_or(Drop::NoDate)?;
        if !possible(celsius) {
            return Err(Drop::Impossible);
        }
        let index = date * 24 + hour - 1;
        if !self.hours.mark(index) {
            return Err(Drop::Duplicate);
        }
        self.hourly.add(celsius);
        self.typical |= year == TYPICAL_YEAR;
        self.year(year);
        if hour == self.start_hour {
            self.at_start.add(celsius);
        }
        if let Some(sum) = self.hour_months.get_mut(month as usize - 1) {
            sum.add(celsius);
        }
        #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "in range")]
        if let (Some(wind), Some(sum)) =
            (wind, self.wind.get_mut(((celsius + 90.0) * 10.0).round() as usize))
        {
            sum.add(wind);
        }
        if joined {
            self.runs.break_off();
        }
        self.runs.add(index, celsius);
        self.winter_day(date, year, month, celsius);
        if self.today.is_none_or(|today| today.day != date) {
            self.close_day();
            self.today = Some(HourDay { day: date, month, hours: [None; 24] });
        }
        if let Some(place) =
            self.today.as_mut().and_then(|today| today.hours.get_mut(hour as usize - 1))
        {
            *place = Some(celsius);
        }
        Ok(())
    }

    /// A day of hours is over.
    fn close_day(&mut self) {
        let Some(today) = self.today.take() else { return };
        let mut hours = [0.0; 24];
        for (place, hour) in hours.iter_mut().zip(today.hours) {
            match hour {
                Some(celsius) => *place = celsius,
                None => return,
            }
        }
        let low = hours.iter().copied().fold(f64::INFINITY, f64::min);
        let high = hours.iter().copied().fold(f64::NEG_INFINITY, f64::max);
        if let Some(sum) = self.range_months.get_mut(today.month as usize - 1) {
            sum.add(high - low);
        }
        let mean = hours.iter().sum::<f64>() / 24.0;
        if self.coldest_day.is_none_or(|(coldest, _)| mean < coldest) {
            self.coldest_day = Some((mean, hours));
        }
    }

    fn winter_day(&mut self, day: Day, year: i32, month: u32, celsius: f64) {
        let counted = matches!(month, 11 | 12 | 1 | 2 | 3) && self.winter_days.mark(day);
        let winter = self
            .winters
            .entry(winter_of(year, month))
            .or_insert(Winter { celsius: f64::INFINITY, days: 0 });
        winter.celsius = winter.celsius.min(celsius);
        winter.days += u32::from(counted);
    }

    fn year(&mut self, year: i32) {
        self.years =
            Some(self.years.map_or((year, year), |(from, to)| (from.min(year), to.max(year))));
    }

    pub(super) fn end_of_file(&mut self, place: &Where) {
        self.close_day();
        if self.place == Where::default() {
            self.place = place.clone();
        }
    }

    /// Values used: daily minima or hours.
    #[must_use]
    pub const fn used(&self) -> u64 {
        self.daily.total() + self.hourly.total()
    }

    /// Strictly colder than a temperature, °C: daily minima or hours.
    #[must_use]
    pub fn below(&self, celsius: f64) -> u64 {
        self.bins().below(celsius)
    }

    /// The value a share of all is under.
    #[must_use]
    pub fn percentile(&self, share: f64) -> Option<f64> {
        self.bins().percentile(share)
    }

    const fn bins(&self) -> &Bins {
        if self.hourly.total() > 0 { &self.hourly } else { &self.daily }
    }

    /// Minima of the complete winters; and how many were left out as incomplete.
    #[must_use]
    pub fn winters(&self) -> (Vec<WinterMinimum>, usize) {
        if self.typical {
            return (Vec::new(), 0);
        }
        let complete: Vec<WinterMinimum> = self
            .winters
            .iter()
            .filter(|(_, winter)| winter.days >= LEAST_DAYS)
            .map(|(ends, winter)| WinterMinimum { ends: *ends, celsius: winter.celsius })
            .collect();
        let left_out = self.winters.len() - complete.len();
        (complete, left_out)
    }

    /// The climate file; and what to mind about it.
    ///
    /// # Errors
    /// Nothing was gathered.
    pub(super) fn site(
        &self,
        name: &str,
        options: &Options,
        source: &str,
    ) -> Result<(Site, Vec<String>), String> {
        if self.used() == 0 {
            return Err("holds no temperature that could be used".to_owned());
        }
        let mut cautions = Vec::new();
        let hourly = self.hourly.total() > 0;
        let kept = if self.typical {
            "typical year, months joined from different years"
        } else {
            "record"
        };
        let of = if hourly { "hours" } else { "daily minima, colder than that of hours" };
        let year_round = self.year_round();
        if !year_round {
            cautions.push("under a year of values, or months nearly missing: no 99.6 % and 99 % values, no counts of hours and mornings, no monthly means".to_owned());
        }
        let percent = |share: f64| {
            year_round.then_some(())?;
            Some(Reading {
                celsius: round(self.percentile(share)?),
                how: format!(
                    "{} % of the {of}, sorted, linear between ranks; {kept}",
                    100.0 * share
                ),
            })
        };
        let (minima, left_out) = self.winters();
        if left_out > 0 {
            cautions.push(format!(
                "incomplete winters left out: {left_out}, each with fewer than {LEAST_DAYS} days of November to March"
            ));
        }
        let mut once_in = Vec::new();
        match Winters::new(minima.clone()) {
            Ok(winters) => {
                for n in [2.0, 5.0, 10.0, 20.0, 50.0] {
                    let level = winters.level(n);
                    once_in.push(OnceIn {
                        winters: n,
                        celsius: round(level.celsius),
                        standard_error_k: (level.standard_error_k * 100.0).round() / 100.0,
                        how: format!(
                            "Gumbel by moments over {} winters; L-moments {:.1} °C, GEV {:.1} °C beside it",
                            winters.count(),
                            winters.gumbel_l_level(n),
                            winters.gev_level(n)
                        ),
                    });
                }
                cautions.extend(winters.cautions(20.0));
                if 50.0 > 2.0 * winters.count() as f64 {
                    cautions.push(format!(
                        "once in 50 winters is over twice the {} winters on record: an extrapolation",
                        winters.count()
                    ));
                }
            }
            Err(_) if self.typical => {
                cautions.push("a typical year holds no extremes: no return levels, and its percentiles are of this file, not of the long-term record".to_owned());
            }
            Err(few) => cautions.push(few.to_string()),
        }
        let period = match self.years {
            _ if self.typical => Some("typical year".to_owned()),
            Some((from, to)) => Some(format!("{from} to {to}")),
            None => None,
        };
        let site = Site {
            format: 1,
            name: name.to_owned(),
            title: self.place.title.clone().unwrap_or_else(|| name.to_owned()),
            kind: Kind::Observed,
            source: source.to_owned(),
            licence: "as the records it was computed from".to_owned(),
            period,
            elevation_m: self.place.elevation_m,
            start_hour: hourly.then_some(options.start_hour),
            note: (!cautions.is_empty()).then(|| cautions.join("; ")),
            place: self.place.place,
            minima: Minima {
                record: self.bins().coldest().map(|celsius| Reading {
                    celsius,
                    how: format!(
                        "coldest of {} {}; {kept}",
                        self.used(),
                        if hourly { "hours" } else { "daily minima" }
                    ),
                }),
                percent_99_6: percent(0.004),
                percent_99: percent(0.01),
                class: None,
                once_in,
            },
            wind: if year_round { self.cold_wind() } else { None },
            cold_day: self.coldest_day.map(|(_, hours)| ColdDay {
                hours_c: hours.to_vec(),
                how: format!("coldest day by its mean; {kept}"),
            }),
            monthly: if year_round { self.monthly(hourly, kept) } else { None },
            below: if year_round { self.thresholds(hourly) } else { Vec::new() },
            spell: self
                .runs
                .coldest()
                .map(|(hours, celsius)| Spell {
                    hours: hours as f64,
                    celsius: (celsius * 1000.0).round() / 1000.0,
                })
                .collect(),
            winter: minima,
        };
        Ok((site, cautions))
    }

    /// Nine tenths of a year at least, and every month with half its share.
    fn year_round(&self) -> bool {
        let hourly = self.hourly.total() > 0;
        let (months, year) =
            if hourly { (&self.hour_months, 8760.0) } else { (&self.minimum_months, 365.0) };
        let total = self.used() as f64;
        total >= 0.9 * year && months.iter().all(|month| month.count as f64 >= total / 24.0)
    }

    fn monthly(&self, hourly: bool, kept: &str) -> Option<Monthly> {
        let months = 0..12;
        let (mean, range): (Vec<f64>, Vec<f64>) = months
            .map(|month| {
                let of = |sums: &[Sum; 12]| sums.get(month).and_then(|sum| sum.mean());
                if hourly {
                    Some((of(&self.hour_months)?, of(&self.range_months)?))
                } else {
                    let (low, high) = (of(&self.minimum_months)?, of(&self.maximum_months)?);
                    Some((f64::midpoint(low, high), (high - low).max(0.0)))
                }
            })
            .collect::<Option<Vec<(f64, f64)>>>()?
            .into_iter()
            .unzip();
        Some(Monthly {
            mean_c: mean.iter().map(|t| (t * 1000.0).round() / 1000.0).collect(),
            daily_range_k: range.iter().map(|t| (t * 100.0).round() / 100.0).collect(),
            how: if hourly {
                format!("means of the hours and of the daily ranges; {kept}")
            } else {
                "half the sum of mean minimum and mean maximum, and their difference".to_owned()
            },
        })
    }

    /// Thresholds every 5 K from 20 °C down to the coldest.
    fn thresholds(&self, hourly: bool) -> Vec<Below> {
        let total = self.bins().total() as f64;
        let round = |value: f64| (value * 10.0).round() / 10.0;
        let mut rows = Vec::new();
        for step in 0..=20 {
            let celsius = 20.0 - 5.0 * f64::from(step);
            let count = self.below(celsius) as f64;
            let hours = hourly.then(|| round(count * 8760.0 / total));
            let mornings = if hourly {
                let starts = self.at_start.total() as f64;
                (starts > 0.0).then(|| round(self.at_start.below(celsius) as f64 * 365.25 / starts))
            } else {
                Some(round(count * 365.25 / total))
            };
            rows.push(Below { celsius, hours, mornings });
            if count == 0.0 {
                break;
            }
        }
        rows
    }

    /// Wind with the coldest 1 % of the hours, and with those round the 99 % value.
    fn cold_wind(&self) -> Option<Wind> {
        let mean = |from: f64, to: f64| {
            let mut all = Sum::default();
            for (at, sum) in self.wind.iter().enumerate() {
                let t = at as f64 / 10.0 - 90.0;
                if t >= from - 1e-6 && t <= to + 1e-6 {
                    all.sum += sum.sum;
                    all.count += sum.count;
                }
            }
            all.mean().map(|wind| (wind * 10.0).round() / 10.0)
        };
        let (one, two) = (self.percentile(0.01)?, self.percentile(0.02)?);
        let deep = mean(-90.0, one)?;
        Some(Wind {
            deep_cold_m_s: deep,
            at_99_m_s: mean(one, two).unwrap_or(deep),
            how: "mean of the coldest 1 % of the hours, and of those between 1 and 2 %".to_owned(),
        })
    }
}

fn round(celsius: f64) -> f64 {
    (celsius * 100.0).round() / 100.0
}

/// What a temperature of the air can be, °C.
fn possible(celsius: f64) -> bool {
    (-90.0..=60.0).contains(&celsius)
}

/// A day that has its value already: the same again is nothing new, another is a contradiction.
fn again(day: Day, before: f64, celsius: f64) -> Result<Result<(), Drop>, String> {
    if (before - celsius).abs() < 0.006 {
        return Ok(Err(Drop::Duplicate));
    }
    let (year, month, day) = civil(day);
    Err(format!(
        "{year}-{month:02}-{day:02} has two values, {before} °C and {} °C; take one of them out",
        round(celsius)
    ))
}

/// Year, month and day of the month.
fn civil(day: Day) -> (i32, u32, u32) {
    // The inverse of `day_of`: Hinnant's civil from days.
    let z = i64::from(day) + 620_853;
    let era = z.div_euclid(146_097);
    let doe = z.rem_euclid(146_097);
    let yoe = (doe - doe / 1460 + doe / 36_524 - doe / 146_096) / 365;
    let doy = doe - (365 * yoe + yoe / 4 - yoe / 100);
    let mp = (5 * doy + 2) / 153;
    let month = if mp < 10 { mp + 3 } else { mp - 9 };
    let year = yoe + era * 400 + i64::from(month <= 2);
    let day = doy - (153 * mp + 2) / 5 + 1;
    let small = |value: i64| u32::try_from(value).unwrap_or(1);
    (i32::try_from(year).unwrap_or(0), small(month), small(day))
}
