//! The coldest of each winter: return levels with their standard error, and what they are worth.
//!
//! Minima are taken as maxima of -T. Winters run from July to June: a December and a January spell are
//! one winter.

use super::site::WinterMinimum;
use crate::source::{Method, Source};

/// Return levels: the answer.
pub static GUMBEL_MOMENTS: Method = Method {
    name: "Gumbel distribution of the winter minima by moments, T = M - F s",
    source: Source::quoted(
        "frequency factor F = -(√6/π)(γ + ln ln(n/(n-1))), public hydrology texts; ASHRAE Fundamentals ch. 14 uses it for annual minima",
    ),
};

/// Their standard error.
pub static STANDARD_ERROR: Method = Method {
    name: "standard error (s/√N) √(1 + 1.1396 F + 1.1 F²)",
    source: Source::memory("G. W. Kite, Frequency and Risk Analyses in Hydrology (1977)"),
};

/// The cross-check.
pub static L_MOMENTS: Method = Method {
    name: "Gumbel and generalised extreme value distribution by L-moments, beside the answer",
    source: Source::memory("J. R. M. Hosking, J. R. Wallis, Regional Frequency Analysis (1997)"),
};

const EULER: f64 = 0.577_215_664_901_532_9;
/// Fewer winters give no return level; fewer than twice that many a warning. Common practice.
const LEAST_WINTERS: usize = 10;

/// The frequency factor of once in `n` winters, `n` over 1.
#[must_use]
pub fn frequency_factor(n: f64) -> f64 {
    -(6_f64.sqrt() / std::f64::consts::PI) * (EULER + (n / (n - 1.0)).ln().ln())
}

/// Chance of at least one winter colder than the level once in `n`, in so many winters.
#[must_use]
pub fn risk(n: f64, winters: f64) -> f64 {
    1.0 - (1.0 - 1.0 / n).powf(winters)
}

/// A return level.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Level {
    /// Once in so many winters.
    pub winters: f64,
    /// °C.
    pub celsius: f64,
    /// Standard error, K.
    pub standard_error_k: f64,
}

/// The winter minima of a record and what follows from them.
#[derive(Debug, Clone, PartialEq)]
pub struct Winters {
    minima: Vec<WinterMinimum>,
    mean: f64,
    deviation: f64,
}

/// There are too few winters for a return level.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("complete winters: {found}; a return level takes {LEAST_WINTERS}")]
pub struct TooFew {
    /// Winters there are.
    pub found: usize,
}

impl Winters {
    /// From the minima of complete winters.
    ///
    /// # Errors
    /// Fewer than 10 winters.
    ///
    /// # Source
    /// [`GUMBEL_MOMENTS`].
    pub fn new(minima: Vec<WinterMinimum>) -> Result<Self, TooFew> {
        if minima.len() < LEAST_WINTERS {
            return Err(TooFew { found: minima.len() });
        }
        let n = minima.len() as f64;
        let mean = minima.iter().map(|winter| winter.celsius).sum::<f64>() / n;
        let squares: f64 = minima.iter().map(|winter| (winter.celsius - mean).powi(2)).sum();
        Ok(Self { minima, mean, deviation: (squares / (n - 1.0)).sqrt() })
    }

    /// How many.
    #[must_use]
    pub fn count(&self) -> usize {
        self.minima.len()
    }

    /// Mean of the minima, °C.
    #[must_use]
    pub const fn mean(&self) -> f64 {
        self.mean
    }

    /// Standard deviation of the minima, K.
    #[must_use]
    pub const fn deviation(&self) -> f64 {
        self.deviation
    }

    /// The coldest of all, °C.
    #[must_use]
    pub fn coldest(&self) -> f64 {
        self.minima.iter().map(|winter| winter.celsius).fold(f64::INFINITY, f64::min)
    }

    /// The level once in `n` winters, `n` over 1.
    ///
    /// # Source
    /// [`GUMBEL_MOMENTS`], [`STANDARD_ERROR`].
    #[must_use]
    pub fn level(&self, n: f64) -> Level {
        let f = frequency_factor(n);
        let count = self.minima.len() as f64;
        Level {
            winters: n,
            celsius: self.mean - f * self.deviation,
            standard_error_k: self.deviation / count.sqrt()
                * (1.0 + 1.1396 * f + 1.1 * f * f).sqrt(),
        }
    }

    /// Chance that one winter is colder than a temperature, °C.
    #[must_use]
    pub fn chance(&self, celsius: f64) -> f64 {
        chance(self.mean, self.deviation, celsius)
    }

    /// Linear trend of the minima, K a decade.
    #[must_use]
    pub fn trend_k_per_decade(&self) -> f64 {
        let n = self.minima.len() as f64;
        let year = |winter: &WinterMinimum| f64::from(winter.ends);
        let middle = self.minima.iter().map(year).sum::<f64>() / n;
        let (mut above, mut below) = (0.0, 0.0);
        for winter in &self.minima {
            above += (year(winter) - middle) * (winter.celsius - self.mean);
            below += (year(winter) - middle).powi(2);
        }
        if below > 0.0 { 10.0 * above / below } else { 0.0 }
    }

    /// First and second L-moment of -T, and the L-skewness.
    ///
    /// # Source
    /// [`L_MOMENTS`].
    #[must_use]
    pub fn l_moments(&self) -> (f64, f64, f64) {
        let mut x: Vec<f64> = self.minima.iter().map(|winter| -winter.celsius).collect();
        x.sort_by(f64::total_cmp);
        let n = x.len() as f64;
        let (mut b0, mut b1, mut b2) = (0.0, 0.0, 0.0);
        for (at, value) in x.iter().enumerate() {
            let j = at as f64;
            b0 += value / n;
            b1 += value / n * j / (n - 1.0);
            b2 += value / n * j * (j - 1.0) / ((n - 1.0) * (n - 2.0));
        }
        let (l2, l3) = (2.0 * b1 - b0, 6.0 * b2 - 6.0 * b1 + b0);
        (b0, l2, if l2 > 0.0 { l3 / l2 } else { 0.0 })
    }

    /// The level once in `n` winters by the Gumbel distribution from L-moments, °C.
    #[must_use]
    pub fn gumbel_l_level(&self, n: f64) -> f64 {
        let (l1, l2, _) = self.l_moments();
        let scale = l2 / 2_f64.ln();
        let y = -(n / (n - 1.0)).ln().ln();
        -(l1 - EULER * scale + scale * y)
    }

    /// Location, scale and shape k of the generalised extreme value distribution of -T from L-moments
    /// (k = -ξ; over 0: the cold tail is bounded).
    #[must_use]
    pub fn gev(&self) -> (f64, f64, f64) {
        let (l1, l2, skew) = self.l_moments();
        // Hosking's approximation to k, good to 9e-4 for skewness of -0.5 to 0.5.
        let c = 2.0 / (3.0 + skew) - 2_f64.ln() / 3_f64.ln();
        let k = 7.859 * c + 2.9554 * c * c;
        if k.abs() < 1e-6 {
            let scale = l2 / 2_f64.ln();
            return (l1 - EULER * scale, scale, 0.0);
        }
        let g = gamma(1.0 + k);
        let scale = l2 * k / ((1.0 - 2_f64.powf(-k)) * g);
        (l1 - scale * (1.0 - g) / k, scale, k)
    }

    /// The level once in `n` winters by that distribution, °C.
    #[must_use]
    pub fn gev_level(&self, n: f64) -> f64 {
        let (location, scale, k) = self.gev();
        let y = -(1.0 - 1.0 / n).ln();
        let x = if k == 0.0 {
            location - scale * y.ln()
        } else {
            location + scale / k * (1.0 - y.powf(k))
        };
        -x
    }

    /// What to mind about a level: few winters, a record colder than it, extrapolation, trend.
    #[must_use]
    pub fn cautions(&self, n: f64) -> Vec<String> {
        let mut cautions = Vec::new();
        let count = self.minima.len();
        if count < 2 * LEAST_WINTERS {
            cautions.push(format!("only {count} complete winters: the level is rough"));
        }
        if n > 2.0 * count as f64 {
            cautions.push(format!(
                "once in {n} winters is over twice the {count} winters on record: an extrapolation"
            ));
        }
        let level = self.level(n).celsius;
        if self.coldest() < level {
            cautions.push(format!(
                "the coldest winter on record, {:.1} °C, is colder than the level, {level:.1} °C",
                self.coldest()
            ));
        }
        let trend = self.trend_k_per_decade();
        if trend.abs() >= 0.3 {
            let word = if trend > 0.0 { "warmer" } else { "colder" };
            cautions.push(format!(
                "the winter minima got {word} by {:.1} K a decade; the level does not carry that on",
                trend.abs()
            ));
        }
        cautions
    }
}

/// Chance that one winter is colder than a temperature, °C, for mean and standard deviation of the
/// winter minima: `1 - exp(-exp(-y))`, `y = π/√6 (M - T)/s - γ... ` of -T.
///
/// # Source
/// [`GUMBEL_MOMENTS`], inverted.
#[must_use]
pub fn chance(mean: f64, deviation: f64, celsius: f64) -> f64 {
    if deviation <= 0.0 {
        return if celsius > mean { 1.0 } else { 0.0 };
    }
    let y = std::f64::consts::PI / 6_f64.sqrt() * (mean - celsius) / deviation + EULER;
    1.0 - (-(-y).exp()).exp()
}

/// Mean and standard deviation that two or more return levels stand for, by least squares over their
/// frequency factors; `None` with fewer than two.
#[must_use]
pub fn from_levels(levels: &[(f64, f64)]) -> Option<(f64, f64)> {
    if levels.len() < 2 {
        return None;
    }
    let n = levels.len() as f64;
    let factors: Vec<f64> = levels.iter().map(|(winters, _)| frequency_factor(*winters)).collect();
    let middle = factors.iter().sum::<f64>() / n;
    let mean_t = levels.iter().map(|(_, t)| t).sum::<f64>() / n;
    let (mut above, mut below) = (0.0, 0.0);
    for (f, (_, t)) in factors.iter().zip(levels) {
        above += (f - middle) * (t - mean_t);
        below += (f - middle).powi(2);
    }
    let slope = above / below;
    (below > 0.0 && slope < 0.0).then(|| (mean_t - slope * middle, -slope))
}

/// The gamma function for 0.5 to 3 (Lanczos 1964, coefficients of g = 7, n = 9: public, memory).
fn gamma(z: f64) -> f64 {
    const P: [f64; 9] = [
        0.999_999_999_999_809_9,
        676.520_368_121_885_1,
        -1_259.139_216_722_402_8,
        771.323_428_777_653_1,
        -176.615_029_162_140_6,
        12.507_343_278_686_905,
        -0.138_571_095_265_720_12,
        9.984_369_578_019_572e-6,
        1.505_632_735_149_311_6e-7,
    ];
    let z = z - 1.0;
    let mut sum = P[0];
    for (at, p) in P.iter().enumerate().skip(1) {
        sum += p / (z + at as f64);
    }
    let t = z + 7.5;
    (2.0 * std::f64::consts::PI).sqrt() * t.powf(z + 0.5) * (-t).exp() * sum
}
