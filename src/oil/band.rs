//! The likely range round the D341 line, and how far the line was stretched.
//!
//! The factors are this project's judgement, between what specifications allow and what typical
//! values show; every report that uses them says so. A measured cold viscosity removes most of them.
//!
//! Invariants: continuous in temperature; falls on warming; low ≤ expected ≤ high up to a published
//! limit that caps `high`; a measured point on the line never makes `high` larger.

use super::walther::ViscosityCurve;
use crate::source::{Method, Source};
use serde::{Deserialize, Serialize};

/// The likely range.
pub static LIKELY_RANGE: Method = Method {
    name: "likely range round the D341 line: input error, wax, polymer, measuring error",
    source: Source::judgement(
        "this project's judgement, between specification limits and typical values",
    ),
};

/// What an oil is made from.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Serialize, Deserialize)]
#[serde(rename_all = "kebab-case")]
#[allow(missing_docs, reason = "the names say it")]
pub enum Base {
    Mineral,
    PolymerThickened,
    Pao,
    Ester,
    NaturalEster,
    Glycol,
    Other,
}

impl Base {
    /// All bases.
    pub const ALL: [Self; 7] = [
        Self::Mineral,
        Self::PolymerThickened,
        Self::Pao,
        Self::Ester,
        Self::NaturalEster,
        Self::Glycol,
        Self::Other,
    ];

    /// The word in case files and JSON.
    #[must_use]
    pub const fn id(self) -> &'static str {
        match self {
            Self::Mineral => "mineral",
            Self::PolymerThickened => "polymer-thickened",
            Self::Pao => "pao",
            Self::Ester => "ester",
            Self::NaturalEster => "natural-ester",
            Self::Glycol => "glycol",
            Self::Other => "other",
        }
    }

    /// Typical density at 15 °C, kg/m³ (memory).
    #[must_use]
    pub const fn typical_density(self) -> f64 {
        match self {
            Self::Mineral | Self::PolymerThickened | Self::Other => 875.0,
            Self::Pao => 830.0,
            Self::Ester | Self::NaturalEster => 920.0,
            Self::Glycol => 1000.0,
        }
    }
}

impl std::fmt::Display for Base {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.write_str(self.id())
    }
}

impl std::str::FromStr for Base {
    type Err = String;

    fn from_str(text: &str) -> Result<Self, String> {
        Self::ALL.into_iter().find(|base| base.id() == text.trim()).ok_or_else(|| {
            let words: Vec<&str> = Self::ALL.iter().map(|base| base.id()).collect();
            format!("`{text}` is no base oil; write one of {}", words.join(", "))
        })
    }
}

/// The judgement figures of the likely range. Rates are per kelvin, in the logarithm of the viscosity.
#[derive(Debug, Clone, PartialEq)]
pub struct BandPolicy {
    /// Input error of mineral, natural ester and PAO oils: 5, 8, 11 % at 0, -20, -40 °C.
    pub input_error: f64,
    /// Input error of polymer-thickened and synthetic ester oils.
    pub input_error_thickened: f64,
    /// Input error where nothing usable is published (glycol, other).
    pub input_error_other: f64,
    /// Wax of mineral and natural-ester oils below the cloud point: doubles every 10 K.
    pub wax: f64,
    /// Extra thickening below 0 °C by polymers at an index of 140 and less.
    pub polymer_low: f64,
    /// The same at an index of 180 and more.
    pub polymer_high: f64,
    /// How much thinner than the line a mineral or natural-ester oil may be.
    pub thin_mineral: f64,
    /// The same, polymer-thickened.
    pub thin_polymer: f64,
    /// The same, PAO.
    pub thin_pao: f64,
    /// The same, ester, glycol and other.
    pub thin_other: f64,
    /// Measuring error, share.
    pub measuring_error: f64,
    /// Spread of a grade without a data sheet, share.
    pub grade_spread: f64,
    /// Factor on the thick edge where the pour point is not known.
    pub pour_unknown: f64,
    /// Shear in service at 100 °C, index of 140 and less.
    pub shear_low: f64,
    /// Shear in service at 100 °C, index of 180 and more.
    pub shear_high: f64,
    /// No number within so many kelvin of the pour point, K.
    pub no_number_below_k: f64,
    /// Near the pour point within so many kelvin, K.
    pub near_pour_k: f64,
    /// Cloud point assumed at the least, °C.
    pub cloud_at_least_c: f64,
    /// Cloud point assumed over the pour point, K.
    pub cloud_over_pour_k: f64,
}

impl Default for BandPolicy {
    fn default() -> Self {
        Self {
            input_error: 0.0013,
            input_error_thickened: 0.0028,
            input_error_other: 0.008,
            wax: 0.069,
            polymer_low: 0.0143,
            polymer_high: 0.0227,
            thin_mineral: 0.0036,
            thin_polymer: 0.0013,
            thin_pao: 0.0075,
            thin_other: 0.0064,
            measuring_error: 0.03,
            grade_spread: 0.10,
            pour_unknown: 1.25,
            shear_low: 0.87,
            shear_high: 0.75,
            no_number_below_k: 5.0,
            near_pour_k: 15.0,
            cloud_at_least_c: -12.0,
            cloud_over_pour_k: 10.0,
        }
    }
}

/// How far the line was stretched to get a viscosity.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum Reach {
    /// Between measured points.
    BetweenPoints,
    /// Beyond them.
    Extended,
    /// Beyond them and near the pour point.
    NearPour,
    /// So near the pour point that there is no number.
    BelowPour,
}

impl Reach {
    /// The word in JSON.
    #[must_use]
    pub const fn id(self) -> &'static str {
        match self {
            Self::BetweenPoints => "between-points",
            Self::Extended => "extended",
            Self::NearPour => "near-pour",
            Self::BelowPour => "below-pour",
        }
    }

    /// The words on screen.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::BetweenPoints => "measured",
            Self::Extended => "extended",
            Self::NearPour => "near the pour point",
            Self::BelowPour => "at or below the pour point",
        }
    }
}

/// A published cold limit of a class: it caps the thick edge down to its own temperature.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ColdLimit {
    /// Its temperature, °C.
    pub at_c: f64,
    /// Greatest viscosity allowed there, mm²/s.
    pub viscosity: f64,
}

/// Below the temperature of a published limit its effect fades out over so many kelvin: an oil does
/// not thicken by that much within a kelvin, and the range stays continuous.
const FADE_K: f64 = 5.0;

/// The likely range of one oil.
#[derive(Debug, Clone, PartialEq)]
pub struct Band {
    curve: ViscosityCurve,
    /// Coldest and hottest measured temperature, °C.
    measured: (f64, f64),
    input_error: f64,
    wax: f64,
    cloud_c: f64,
    polymer: f64,
    thin: f64,
    /// ln A at the coldest point.
    ln_a_at_measured: f64,
    high_factor: f64,
    low_factor: f64,
    /// ln of the shear factor at 100 °C.
    ln_shear: f64,
    cap: Option<Cap>,
    pour_c: Option<f64>,
    no_number_below_k: f64,
    near_pour_k: f64,
}

#[derive(Debug, Clone, PartialEq)]
struct Cap {
    line: ViscosityCurve,
    at_c: f64,
    /// ln of the reduction at `at_c`, zero or less.
    ln_reduction: f64,
}

/// What the range is made from.
#[derive(Debug, Clone)]
pub(super) struct BandInput {
    pub(super) curve: ViscosityCurve,
    pub(super) base: Base,
    pub(super) index: Option<f64>,
    pub(super) pour_c: Option<f64>,
    pub(super) cloud_c: Option<f64>,
    /// The class stands in for a data sheet: its cold limit.
    pub(super) class_only: Option<Option<ColdLimit>>,
}

impl Band {
    pub(super) fn new(input: BandInput, policy: &BandPolicy) -> Self {
        let BandInput { curve, base, index, pour_c, cloud_c, class_only } = input;
        let waxy = matches!(base, Base::Mineral | Base::NaturalEster);
        let thickened = base == Base::PolymerThickened;
        // Where the index is not defined the greater effect is the safe side.
        let toward_180 = index.map_or(1.0, |index| ((index - 140.0) / 40.0).clamp(0.0, 1.0));
        let between = |low: f64, high: f64| low + toward_180 * (high - low);
        let cloud_c = cloud_c.unwrap_or_else(|| {
            pour_c.map_or(policy.cloud_at_least_c, |pour| {
                policy.cloud_at_least_c.max(pour + policy.cloud_over_pour_k)
            })
        });
        let measured = (curve.coldest().0, curve.hottest().0);
        let mut high_factor = 1.0 + policy.measuring_error;
        let mut low_factor = 1.0 - policy.measuring_error;
        if class_only.is_some() {
            high_factor *= 1.0 + policy.grade_spread;
            low_factor *= 1.0 - policy.grade_spread;
        }
        if pour_c.is_none() {
            high_factor *= policy.pour_unknown;
        }
        let mut band = Self {
            measured,
            input_error: match base {
                Base::Mineral | Base::NaturalEster | Base::Pao => policy.input_error,
                Base::PolymerThickened | Base::Ester => policy.input_error_thickened,
                Base::Glycol | Base::Other => policy.input_error_other,
            },
            wax: if waxy { policy.wax } else { 0.0 },
            cloud_c,
            polymer: if thickened { between(policy.polymer_low, policy.polymer_high) } else { 0.0 },
            thin: match base {
                Base::Mineral | Base::NaturalEster => policy.thin_mineral,
                Base::PolymerThickened => policy.thin_polymer,
                Base::Pao => policy.thin_pao,
                Base::Ester | Base::Glycol | Base::Other => policy.thin_other,
            },
            ln_a_at_measured: 0.0,
            high_factor,
            low_factor,
            ln_shear: if thickened {
                between(policy.shear_low, policy.shear_high).ln()
            } else {
                0.0
            },
            cap: None,
            pour_c,
            no_number_below_k: policy.no_number_below_k,
            near_pour_k: policy.near_pour_k,
            curve,
        };
        band.ln_a_at_measured = band.ln_a(measured.0);
        if let Some(Some(limit)) = class_only {
            // From the limit to the thick edge at 40 °C, where the two meet.
            let top = band.uncapped(40.0);
            let line = ViscosityCurve::through(&[(limit.at_c, limit.viscosity), (40.0, top)]);
            if let Ok(line) = line {
                let ln_reduction = (limit.viscosity / band.uncapped(limit.at_c)).ln().min(0.0);
                band.cap = Some(Cap { line, at_c: limit.at_c, ln_reduction });
            }
        }
        band
    }

    fn ln_a(&self, t: f64) -> f64 {
        self.input_error * (40.0 - t)
            + self.wax * (self.cloud_c - t).max(0.0)
            + self.polymer * (-t).max(0.0)
    }

    fn uncapped(&self, t: f64) -> f64 {
        let expected = self.curve.at(t) * self.high_factor;
        if t < self.measured.0 {
            expected * (self.ln_a(t) - self.ln_a_at_measured).exp()
        } else {
            expected
        }
    }

    /// The D341 line at a temperature in °C, mm²/s.
    #[must_use]
    pub fn expected(&self, t: f64) -> f64 {
        self.curve.at(t)
    }

    /// The thick edge at a temperature in °C, mm²/s.
    #[must_use]
    pub fn high(&self, t: f64) -> f64 {
        let high = self.uncapped(t);
        match &self.cap {
            Some(cap) if t <= 40.0 && t > cap.at_c - FADE_K => {
                if t >= cap.at_c {
                    high.min(cap.line.at(t))
                } else {
                    high * (cap.ln_reduction * (1.0 - (cap.at_c - t) / FADE_K)).exp()
                }
            }
            _ => high,
        }
    }

    /// The thin edge at a temperature in °C, mm²/s: sheared where the oil holds polymer.
    #[must_use]
    pub fn low(&self, t: f64) -> f64 {
        let mut ln = 0.0;
        if t < self.measured.0 {
            ln -= self.thin * (self.measured.0 - t);
        }
        if t > 40.0 {
            ln += self.ln_shear * (t - 40.0) / 60.0;
        }
        self.curve.at(t) * self.low_factor * if ln == 0.0 { 1.0 } else { ln.exp() }
    }

    /// How far the line is stretched at a temperature in °C.
    #[must_use]
    pub fn reach(&self, t: f64) -> Reach {
        let colder = t < self.measured.0;
        match self.pour_c {
            Some(pour) if colder && t < pour + self.no_number_below_k => Reach::BelowPour,
            Some(pour) if colder && t < pour + self.near_pour_k => Reach::NearPour,
            _ if colder || t > self.measured.1 => Reach::Extended,
            _ => Reach::BetweenPoints,
        }
    }

    /// The curve the range stands round.
    #[must_use]
    pub const fn curve(&self) -> &ViscosityCurve {
        &self.curve
    }
}
