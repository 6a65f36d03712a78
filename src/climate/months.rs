//! From monthly means to days and hours below a temperature.

use crate::source::{Method, Source};

/// The model.
pub static MONTHS: Method = Method {
    name: "distribution of daily means round the monthly mean, and the shape of the day, from monthly means",
    source: Source::memory(
        "D. G. Erbs, S. A. Klein, W. A. Beckman, ASHRAE Journal 25(6) (1983); good to the coldest 1 to 2 %, not for the extreme",
    ),
};

/// Days of the months, February with its quarter.
pub const DAYS: [f64; 12] =
    [31.0, 28.25, 31.0, 30.0, 31.0, 30.0, 31.0, 31.0, 30.0, 31.0, 30.0, 31.0];

/// Standard deviation of the monthly means over the year, divisor 12, K.
#[must_use]
pub fn yearly_deviation(means: &[f64]) -> f64 {
    let n = means.len().max(1) as f64;
    let mean = means.iter().sum::<f64>() / n;
    (means.iter().map(|t| (t - mean).powi(2)).sum::<f64>() / n).sqrt()
}

/// Standard deviation of the daily means within a month, K: never under 0.1.
#[must_use]
pub fn monthly_deviation(mean: f64, yearly: f64) -> f64 {
    (1.45 - 0.0290 * mean + 0.0664 * yearly).max(0.1)
}

/// Share of the days of a month whose mean at an hour is below a base, 0 to 1.
#[must_use]
pub fn share_below(base: f64, mean: f64, deviation: f64, days: f64) -> f64 {
    let h = (base - mean) / (deviation * days.sqrt());
    1.0 / (1.0 + (-3.396 * h).exp())
}

/// Heating degree-days of a month to a base, K·d.
#[must_use]
pub fn degree_days(base: f64, mean: f64, deviation: f64, days: f64) -> f64 {
    let h = (base - mean) / (deviation * days.sqrt());
    deviation * days.powf(1.5) * (h / 2.0 + (1.698 * h).cosh().ln() / 3.396 + 0.2041)
}

/// Mean temperature at an hour of the day over the monthly mean, as a share of the daily range; hour 1
/// to 24.
#[must_use]
pub fn hour_shape(hour: f64) -> f64 {
    let t = 2.0 * std::f64::consts::PI * (hour - 1.0) / 24.0;
    0.4632 * (t - 3.805).cos()
        + 0.0984 * (2.0 * t - 0.360).cos()
        + 0.0168 * (3.0 * t - 0.822).cos()
        + 0.0138 * (4.0 * t - 3.513).cos()
}

/// Mornings a year colder than a base at an hour of the day, from monthly means and daily ranges.
#[must_use]
pub fn mornings_below(base: f64, hour: f64, means: &[f64], ranges: &[f64]) -> f64 {
    let yearly = yearly_deviation(means);
    means
        .iter()
        .zip(ranges)
        .zip(DAYS)
        .map(|((mean, range), days)| {
            let at_hour = mean + range * hour_shape(hour);
            days * share_below(base, at_hour, monthly_deviation(*mean, yearly), days)
        })
        .sum()
}

/// Hours a year colder than a base, from monthly means and daily ranges.
#[must_use]
pub fn hours_below(base: f64, means: &[f64], ranges: &[f64]) -> f64 {
    (1..=24).map(|hour| mornings_below(base, f64::from(hour), means, ranges)).sum()
}
