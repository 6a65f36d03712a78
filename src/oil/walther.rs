//! Viscosity over temperature: the Walther equation as ASTM D341 gives it.
//!
//! Letters as in the standard: `Z`, `A`, `B`; `W = log10(log10(Z))`; T in K, ν in mm²/s.

use crate::quantity::shown;
use crate::source::{Method, Source};

/// ASTM D341 through the measured points.
pub static D341: Method = Method {
    name: "ASTM D341 line through the measured points, log log Z = A - B log T",
    source: Source::quoted("ASTM D341-20, section 5, one-term form of Z and its published inverse"),
};

/// 0 °C in kelvin.
const ZERO_C: f64 = 273.15;
/// Lowest and highest viscosity the one-term form is stated for, mm²/s. ASTM D341-20 (memory).
pub const VALID: std::ops::RangeInclusive<f64> = 0.21..=2e7;

/// `Z = ν + 0.7 + exp(-1.47 - 1.84 ν - 0.51 ν²)`.
///
/// ν in mm²/s, 0.21 to 2e7.
///
/// # Source
/// ASTM D341-20, section 5.
#[must_use]
pub fn z(nu: f64) -> f64 {
    nu + 0.7 + (-1.47 - 1.84 * nu - 0.51 * nu * nu).exp()
}

/// The published inverse of [`z`]; mm²/s. Round trip within 0.03 % from 0.21 mm²/s up.
///
/// # Source
/// ASTM D341-20, section 5.
#[must_use]
pub fn nu(z: f64) -> f64 {
    let x = z - 0.7;
    // Beyond 6 the correction is under 1e-20 of x, but its cubic would underflow slowly: skip it.
    if x > 6.0 {
        return x;
    }
    x - (-0.7487 - 3.295 * x + 0.6119 * x * x - 0.3193 * x * x * x).exp()
}

fn w(nu: f64) -> f64 {
    z(nu).log10().log10()
}

/// One straight piece on D341 axes: `W = a - b·log10(T)`.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Line {
    /// A of the standard.
    pub a: f64,
    /// B of the standard.
    pub b: f64,
}

impl Line {
    /// Through two points (°C, mm²/s) at different temperatures.
    fn through(first: (f64, f64), second: (f64, f64)) -> Self {
        let (l1, l2) = ((first.0 + ZERO_C).log10(), (second.0 + ZERO_C).log10());
        let (w1, w2) = (w(first.1), w(second.1));
        let b = (w1 - w2) / (l2 - l1);
        Self { a: w1 + b * l1, b }
    }

    /// Viscosity at a temperature: °C in, mm²/s out.
    #[must_use]
    pub fn at(self, celsius: f64) -> f64 {
        self.in_ln().at(celsius + ZERO_C)
    }

    fn in_ln(self) -> LnLine {
        let ln10 = std::f64::consts::LN_10;
        LnLine { a: self.a * ln10 + ln10.ln(), b: self.b }
    }

    /// Temperature, °C, at which the line reaches a viscosity in mm²/s.
    #[must_use]
    pub fn temperature_at(self, nu: f64) -> f64 {
        10_f64.powf((self.a - w(nu)) / self.b) - ZERO_C
    }
}

/// The same line in natural logarithms, `Z = exp(exp(a - b ln T))`: half the work to evaluate.
#[derive(Debug, Clone, Copy, PartialEq)]
struct LnLine {
    a: f64,
    b: f64,
}

impl LnLine {
    fn at(self, kelvin: f64) -> f64 {
        nu((self.a - self.b * kelvin.ln()).exp().exp())
    }
}

/// Why no curve can be drawn.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum CurveError {
    /// Fewer than two points.
    #[error(
        "a viscosity curve needs two temperatures; give a second viscosity, or the viscosity index beside the one at 40 °C"
    )]
    TooFewPoints,
    /// Two points at one temperature.
    #[error("two viscosities are given at {} °C; keep one", shown(*at))]
    SameTemperature {
        /// The temperature, °C.
        at: f64,
    },
    /// Viscosity does not fall on warming.
    #[error(
        "viscosity rises from {cold} mm²/s at {cold_at} °C to {warm} mm²/s at {warm_at} °C on warming; are the two values swapped?"
    )]
    Rises {
        /// Viscosity at the colder point, mm²/s.
        cold: f64,
        /// Colder temperature, °C.
        cold_at: f64,
        /// Viscosity at the warmer point, mm²/s.
        warm: f64,
        /// Warmer temperature, °C.
        warm_at: f64,
    },
    /// A point outside what the equation is stated for.
    #[error(
        "{nu} mm²/s at {at} °C is outside 0.21 to 2e7 mm²/s, which is what ASTM D341 is stated for"
    )]
    OutOfRange {
        /// The viscosity, mm²/s.
        nu: f64,
        /// Its temperature, °C.
        at: f64,
    },
}

/// A viscosity curve: D341 lines between neighbouring measured points, the end lines extended.
#[derive(Debug, Clone, PartialEq)]
pub struct ViscosityCurve {
    /// (°C, mm²/s), coldest first.
    points: Vec<(f64, f64)>,
    /// One line a gap, coldest first.
    lines: Vec<Line>,
    /// The same, ready to evaluate, with the warm end in °C.
    ready: Vec<(LnLine, f64)>,
}

impl ViscosityCurve {
    /// Draws the curve through points of (°C, mm²/s) in any order.
    ///
    /// `log10(log10(Z)) = A - B·log10(T)`, T in K, ν in mm²/s.
    ///
    /// # Errors
    /// Fewer than two points, two at one temperature, a viscosity that does not fall on warming,
    /// or one outside 0.21 to 2e7 mm²/s.
    ///
    /// # Source
    /// ASTM D341-20, section 5, one-term form of Z.
    ///
    /// # Example
    /// ```
    /// use coldsump::oil::ViscosityCurve;
    /// let curve = ViscosityCurve::through(&[(40.0, 32.0), (100.0, 5.4)])?;
    /// assert!((curve.at(-20.0) - 2291.5).abs() < 0.5);
    /// # Ok::<(), coldsump::oil::CurveError>(())
    /// ```
    pub fn through(points: &[(f64, f64)]) -> Result<Self, CurveError> {
        let mut points = points.to_vec();
        points.sort_by(|a, b| a.0.total_cmp(&b.0));
        if points.len() < 2 {
            return Err(CurveError::TooFewPoints);
        }
        if let Some(&(at, nu)) = points.iter().find(|(_, nu)| !VALID.contains(nu)) {
            return Err(CurveError::OutOfRange { nu, at });
        }
        let mut lines = Vec::with_capacity(points.len() - 1);
        for (cold, warm) in points.iter().zip(points.iter().skip(1)) {
            if warm.0 - cold.0 < 1e-9 {
                return Err(CurveError::SameTemperature { at: cold.0 });
            }
            if warm.1 >= cold.1 {
                return Err(CurveError::Rises {
                    cold: cold.1,
                    cold_at: cold.0,
                    warm: warm.1,
                    warm_at: warm.0,
                });
            }
            lines.push(Line::through(*cold, *warm));
        }
        let warm_ends = points.iter().skip(1).map(|point| point.0);
        let ready = lines.iter().map(|line| line.in_ln()).zip(warm_ends).collect();
        Ok(Self { points, lines, ready })
    }

    /// Viscosity at a temperature: °C in, mm²/s out. Extended beyond the points; how far is the
    /// business of the [band](crate::oil).
    #[must_use]
    pub fn at(&self, celsius: f64) -> f64 {
        let found = self.ready.iter().find(|(_, warm_end)| celsius <= *warm_end);
        // Invariant: a curve has at least one line.
        found.or(self.ready.last()).map_or(f64::NAN, |(line, _)| line.at(celsius + ZERO_C))
    }

    /// The coldest measured point: (°C, mm²/s).
    #[must_use]
    pub fn coldest(&self) -> (f64, f64) {
        self.points.first().copied().unwrap_or_default()
    }

    /// The hottest measured point: (°C, mm²/s).
    #[must_use]
    pub fn hottest(&self) -> (f64, f64) {
        self.points.last().copied().unwrap_or_default()
    }

    /// The measured points, coldest first: (°C, mm²/s).
    #[must_use]
    pub fn points(&self) -> &[(f64, f64)] {
        &self.points
    }

    /// The lines between the points, coldest first.
    pub fn lines(&self) -> impl Iterator<Item = Line> + '_ {
        self.lines.iter().copied()
    }
}
