//! Cold spells: how long it stays cold round a minimum.

use serde::Deserialize;
use std::sync::LazyLock;

/// One published spell: temperatures by hours from its minimum, the same before and after.
#[derive(Debug, Clone, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Regime {
    /// Its name.
    pub name: String,
    /// (h, °C), the minimum first.
    points: Vec<[f64; 2]>,
    /// Where it is published.
    pub source: String,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Table {
    regime: Vec<Regime>,
}

/// Empty only if the embedded table were damaged, which a test rules out.
static TABLE: LazyLock<Vec<Regime>> = LazyLock::new(|| {
    toml::from_str::<Table>(include_str!("regimes.toml"))
        .map(|table| table.regime)
        .unwrap_or_default()
});

impl Regime {
    /// All of them.
    #[must_use]
    pub fn all() -> &'static [Self] {
        &TABLE
    }

    /// The minimum, °C.
    #[must_use]
    pub fn minimum(&self) -> f64 {
        self.points.first().map_or(f64::NAN, |point| point[1])
    }

    /// Air so many hours before or after the minimum, °C, straight between the points; beyond the last
    /// it is held.
    #[must_use]
    pub fn air(&self, hours: f64) -> f64 {
        let at = hours.abs();
        for pair in self.points.windows(2) {
            if let [[from, warm_from], [to, warm_to]] = pair {
                if at <= *to {
                    let share = if to > from { ((at - from) / (to - from)).max(0.0) } else { 1.0 };
                    return warm_from + (warm_to - warm_from) * share;
                }
            }
        }
        self.points.last().map_or(f64::NAN, |point| point[1])
    }

    /// Mean of the air over so many hours with the minimum in their middle, °C.
    #[must_use]
    pub fn mean(&self, hours: f64) -> f64 {
        let steps = 200;
        let step = hours / f64::from(steps);
        (0..steps).map(|n| self.air(-hours / 2.0 + step * (f64::from(n) + 0.5))).sum::<f64>()
            / f64::from(steps)
    }
}

#[cfg(test)]
mod tests {
    use super::Regime;

    #[test]
    fn spells_warm_away_from_their_minimum() {
        assert_eq!(Regime::all().len(), 7);
        for regime in Regime::all() {
            assert!(regime.points.len() > 5);
            assert!(regime.points.windows(2).all(|p| p[1][0] > p[0][0] && p[1][1] >= p[0][1]));
            assert_eq!(regime.air(0.0), regime.minimum());
            assert!(regime.mean(24.0) <= regime.mean(96.0));
        }
        // MIL-HDBK-310, table III: -66 °C, two days off -59 °C; the 10-year case.
        let world = Regime::all().iter().find(|r| r.name == "worldwide, 10-year").unwrap();
        assert_eq!((world.air(0.0), world.air(-48.0), world.air(48.0)), (-66.0, -59.0, -59.0));
    }
}
