//! Counting a record in constant memory: temperatures in bins, days in bits, winters in a row each.

use std::collections::BTreeMap;

/// A day, counted from 1 January 1700 (proleptic Gregorian).
pub type Day = u32;

const FIRST_YEAR: i32 = 1700;
const LAST_YEAR: i32 = 2199;

/// The day of a date; `None` for dates that are none or lie outside 1700 to 2199.
#[must_use]
pub fn day_of(year: i32, month: u32, day: u32) -> Option<Day> {
    if !(FIRST_YEAR..=LAST_YEAR).contains(&year) || !(1..=12).contains(&month) {
        return None;
    }
    if day == 0 || day > days_in(year, month) {
        return None;
    }
    // Days from civil, H. Hinnant's public algorithm, shifted to 1700.
    let y = i64::from(year) - i64::from(month <= 2);
    let era = y.div_euclid(400);
    let yoe = y.rem_euclid(400);
    let mp = (i64::from(month) + 9) % 12;
    let doy = (153 * mp + 2) / 5 + i64::from(day) - 1;
    let doe = yoe * 365 + yoe / 4 - yoe / 100 + doy;
    u32::try_from(era * 146_097 + doe - BASE).ok()
}

/// The same count at 1 January 1700.
const BASE: i64 = 620_853;

/// Days of a month.
#[must_use]
pub const fn days_in(year: i32, month: u32) -> u32 {
    match month {
        4 | 6 | 9 | 11 => 30,
        2 if (year % 4 == 0 && year % 100 != 0) || year % 400 == 0 => 29,
        2 => 28,
        _ => 31,
    }
}

/// The winter a date belongs to, by the year it ends in.
#[must_use]
pub const fn winter_of(year: i32, month: u32) -> i32 {
    if month >= 7 { year + 1 } else { year }
}

/// Which days (or hours) have been seen.
#[derive(Debug, Clone, Default)]
pub struct Seen(Vec<u64>);

impl Seen {
    /// Marks one; `false` where it was marked already.
    pub fn mark(&mut self, at: u32) -> bool {
        let (word, bit) = (at as usize / 64, at % 64);
        if word >= self.0.len() {
            self.0.resize(word + 1, 0);
        }
        match self.0.get_mut(word) {
            Some(bits) if *bits & (1 << bit) == 0 => {
                *bits |= 1 << bit;
                true
            }
            _ => false,
        }
    }
}

/// The value of each day, in hundredths of a degree: two bytes a day.
#[derive(Debug, Clone, Default)]
pub struct Values(Vec<i16>);

/// No value yet.
const EMPTY: i16 = i16::MIN;

impl Values {
    /// Sets the value of a day, °C in -300 to 300; gives the one that was there before, which stays.
    pub fn set(&mut self, day: Day, celsius: f64) -> Option<f64> {
        let at = day as usize;
        if at >= self.0.len() {
            self.0.resize(at + 1, EMPTY);
        }
        let value = self.0.get_mut(at)?;
        if *value != EMPTY {
            return Some(f64::from(*value) / 100.0);
        }
        #[allow(clippy::cast_possible_truncation, reason = "in range")]
        {
            *value = (celsius * 100.0).round() as i16;
        }
        None
    }

    /// The value of a day, °C.
    #[must_use]
    pub fn get(&self, day: Day) -> Option<f64> {
        self.0
            .get(day as usize)
            .filter(|value| **value != EMPTY)
            .map(|value| f64::from(*value) / 100.0)
    }
}

/// Temperatures counted in hundredths of a degree.
#[derive(Debug, Clone)]
pub struct Bins {
    counts: Vec<u64>,
    total: u64,
}

const COLDEST: f64 = -90.0;
const PER_KELVIN: f64 = 100.0;
const BINS: usize = 15_001;

impl Default for Bins {
    fn default() -> Self {
        Self { counts: vec![0; BINS], total: 0 }
    }
}

impl Bins {
    /// Counts one, °C; `false` outside -90 to 60 °C.
    pub fn add(&mut self, celsius: f64) -> bool {
        let at = ((celsius - COLDEST) * PER_KELVIN).round();
        if !(0.0..BINS as f64).contains(&at) {
            return false;
        }
        #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "in range")]
        match self.counts.get_mut(at as usize) {
            Some(count) => {
                *count += 1;
                self.total += 1;
                true
            }
            None => false,
        }
    }

    /// How many were counted.
    #[must_use]
    pub const fn total(&self) -> u64 {
        self.total
    }

    /// How many are strictly colder than a temperature, °C.
    #[must_use]
    pub fn below(&self, celsius: f64) -> u64 {
        self.counts
            .iter()
            .enumerate()
            .take_while(|(at, _)| self.value(*at) < celsius - 1e-9)
            .map(|(_, count)| count)
            .sum()
    }

    /// The coldest, °C.
    #[must_use]
    pub fn coldest(&self) -> Option<f64> {
        self.counts.iter().position(|count| *count > 0).map(|at| self.value(at))
    }

    /// The value that a share of all is under: sorted, linear at `p (n - 1)`.
    #[must_use]
    pub fn percentile(&self, share: f64) -> Option<f64> {
        if self.total == 0 || !(0.0..=1.0).contains(&share) {
            return None;
        }
        let at = share * (self.total - 1) as f64;
        let (lower, part) = (at.floor(), at.fract());
        let (low, high) = (self.ranked(lower)?, self.ranked(lower + 1.0).unwrap_or(0.0));
        Some(if part == 0.0 { low } else { low + part * (high - low) })
    }

    /// The value of a rank, from 0.
    fn ranked(&self, rank: f64) -> Option<f64> {
        let mut passed = 0.0;
        for (at, count) in self.counts.iter().enumerate() {
            passed += *count as f64;
            if passed > rank {
                return Some(self.value(at));
            }
        }
        None
    }

    #[allow(clippy::unused_self, reason = "the scale belongs to the bins")]
    fn value(&self, at: usize) -> f64 {
        // Exactly what a reading to a hundredth is.
        ((at as f64 + COLDEST * PER_KELVIN).round()) / PER_KELVIN
    }
}

/// One winter under way.
#[derive(Debug, Clone, Copy)]
pub struct Winter {
    /// Coldest, °C.
    pub celsius: f64,
    /// Days from November to March with a value.
    pub days: u32,
}

/// Winters by the year they end in.
pub type WinterRows = BTreeMap<i32, Winter>;

/// Winters are kept with so many days of November to March present, of 151 or 152.
pub const LEAST_DAYS: u32 = 145;

/// The coldest means over 24, 48, 72 and 96 hours in a row.
#[derive(Debug, Clone)]
pub struct Runs {
    window: Vec<f64>,
    at: usize,
    filled: usize,
    last: Option<u32>,
    coldest: [f64; 4],
}

/// Lengths of the spells, h.
pub const SPELLS: [usize; 4] = [24, 48, 72, 96];

impl Default for Runs {
    fn default() -> Self {
        Self { window: vec![0.0; 96], at: 0, filled: 0, last: None, coldest: [f64::INFINITY; 4] }
    }
}

impl Runs {
    /// What follows does not join on to what came before.
    pub const fn break_off(&mut self) {
        self.last = None;
    }

    /// One hour, counted from any start; a gap starts anew.
    pub fn add(&mut self, hour: u32, celsius: f64) {
        if self.last.is_none_or(|last| hour != last + 1) {
            self.filled = 0;
        }
        self.last = Some(hour);
        if let Some(place) = self.window.get_mut(self.at) {
            *place = celsius;
        }
        self.at = (self.at + 1) % 96;
        self.filled = (self.filled + 1).min(96);
        for (spell, coldest) in SPELLS.iter().zip(&mut self.coldest) {
            if self.filled >= *spell {
                let sum: f64 = (1..=*spell)
                    .filter_map(|back| self.window.get((self.at + 96 - back) % 96))
                    .sum();
                *coldest = coldest.min(sum / *spell as f64);
            }
        }
    }

    /// (hours, °C) of the spells that were long enough.
    pub fn coldest(&self) -> impl Iterator<Item = (usize, f64)> + '_ {
        SPELLS.iter().copied().zip(self.coldest).filter(|(_, t)| t.is_finite())
    }
}

#[cfg(test)]
mod tests {
    use super::{Bins, day_of};

    #[test]
    fn days_count_on() {
        assert_eq!(day_of(1700, 1, 1), Some(0));
        assert_eq!(day_of(1700, 12, 31), Some(364));
        assert_eq!(day_of(2000, 2, 29).map(|d| d + 1), day_of(2000, 3, 1));
        assert_eq!(day_of(1900, 2, 29), None);
        assert_eq!(day_of(2026, 4, 31), None);
        assert_eq!(day_of(1699, 12, 31), None);
    }

    #[test]
    fn percentiles_are_linear_between_ranks() {
        let mut bins = Bins::default();
        for t in [-40.0, -30.0, -20.0, -10.0, 0.0] {
            assert!(bins.add(t));
        }
        assert_eq!(bins.percentile(0.0), Some(-40.0));
        assert_eq!(bins.percentile(0.5), Some(-20.0));
        assert_eq!(bins.percentile(0.125), Some(-35.0));
        assert_eq!(bins.percentile(1.0), Some(0.0));
        assert_eq!(bins.below(-20.0), 2);
        assert!(!bins.add(-90.1) && !bins.add(f64::NAN));
    }
}
