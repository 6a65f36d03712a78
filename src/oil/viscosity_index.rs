//! Viscosity index both ways: ASTM D2270 / ISO 2909.
//!
//! Letters as in the standard: U viscosity at 40 °C, Y at 100 °C, L and H of the reference oils.

use crate::solve;
use crate::source::{Method, Read, Source};
use serde::Deserialize;
use std::sync::LazyLock;

/// The viscosity index.
pub static D2270: Method = Method {
    name: "ASTM D2270 / ISO 2909 viscosity index from 40 and 100 °C",
    source: Source::quoted("ASTM D2270-10(2016), table 1, procedures A and B"),
};

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Table {
    #[allow(dead_code, reason = "a table carries its source")]
    source: String,
    #[allow(dead_code, reason = "a table carries how its source was read")]
    read: Read,
    rows: Vec<[f64; 3]>,
}

/// Rows of (Y, L, H); empty only if the embedded table were damaged, which a test rules out.
static TABLE: LazyLock<Vec<[f64; 3]>> = LazyLock::new(|| {
    toml::from_str::<Table>(include_str!("viscosity_index.toml"))
        .map(|table| table.rows)
        .unwrap_or_default()
});

/// L and H of the reference oils for a viscosity at 100 °C in mm²/s; `None` under 2.0.
///
/// From 2 to 70 by linear interpolation in table 1, above by the equations of 5.1.2.
#[must_use]
pub fn reference_oils(y: f64) -> Option<(f64, f64)> {
    if y.is_nan() || y < 2.0 || y.is_infinite() {
        return None;
    }
    if y > 70.0 {
        return Some((0.8353 * y * y + 14.67 * y - 216.0, 0.1684 * y * y + 11.85 * y - 97.0));
    }
    let after = TABLE.partition_point(|row| row[0] < y).max(1);
    let (a, b) = (TABLE.get(after - 1)?, TABLE.get(after)?);
    let share = (y - a[0]) / (b[0] - a[0]);
    Some((a[1] + share * (b[1] - a[1]), a[2] + share * (b[2] - a[2])))
}

/// The viscosity index from the viscosities at 40 and 100 °C in mm²/s, not rounded.
///
/// A (U ≥ H): `100 (L - U)/(L - H)`. B (U < H): `((10^N - 1)/0.00715) + 100`,
/// `N = (log H - log U)/log Y`. `None` where Y is under 2.0: the index is not defined there.
///
/// # Source
/// ASTM D2270-10, sections 5 and 6.
///
/// # Example
/// ```
/// use coldsump::oil::viscosity_index;
/// assert!((viscosity_index(73.30, 8.86).unwrap() - 92.43).abs() < 0.01);
/// assert_eq!(viscosity_index(6.0, 1.99), None);
/// ```
#[must_use]
pub fn viscosity_index(u: f64, y: f64) -> Option<f64> {
    let (l, h) = reference_oils(y)?;
    if u.is_nan() || u <= 0.0 || u.is_infinite() {
        return None;
    }
    Some(if u >= h {
        100.0 * (l - u) / (l - h)
    } else {
        let n = (h.log10() - u.log10()) / y.log10();
        (10_f64.powf(n) - 1.0) / 0.00715 + 100.0
    })
}

/// An index as the standard reports it: a whole number, halves to even (ASTM E29).
#[must_use]
pub fn reported(index: f64) -> f64 {
    index.round_ties_even()
}

/// The viscosity at 100 °C in mm²/s that gives an index with a viscosity at 40 °C in mm²/s.
///
/// `None` where no viscosity from 2 mm²/s up, and under the one at 40 °C, gives that index.
///
/// # Source
/// ASTM D2270-10, inverted: the index rises with Y.
#[must_use]
pub fn viscosity_at_100(u: f64, index: f64) -> Option<f64> {
    let to = u.min(500.0);
    solve::root(|y| viscosity_index(u, y).map_or(f64::NAN, |found| found - index), 2.0, to, 1e-12)
}
