//! The electric circuit, and which heater of those to be had.

use super::policy::HeatPolicy;
use crate::source::{Method, Source};

/// What a circuit carries.
pub static CIRCUIT: Method = Method {
    name: "80 % of the rating where continuous load is so limited, 13 A on a 16 A plug outlet, less what else is on it",
    source: Source::quoted(
        "NFPA 70 210.20(A), 210.23(A)(1); European plug outlets: common practice",
    ),
};

/// A circuit.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Circuit {
    /// Voltage, V.
    pub volts: f64,
    /// Breaker rating, A.
    pub amperes: f64,
    /// Three-phase.
    pub three_phase: bool,
    /// Other load on it, W.
    pub other_w: f64,
}

impl Circuit {
    /// Power it carries for hours, W, less the other load.
    #[must_use]
    pub fn continuous_w(&self, policy: &HeatPolicy) -> f64 {
        let limited = [
            (100.0, 127.0),
            (200.0, 208.0),
            (240.0, 240.0),
            (277.0, 277.0),
            (347.0, 347.0),
            (480.0, 480.0),
            (575.0, 600.0),
        ]
        .iter()
        .any(|(from, to)| self.volts >= *from && self.volts <= *to);
        let plug = !self.three_phase
            && (220.0..=230.0).contains(&self.volts)
            && (self.amperes - 16.0).abs() < 1e-9;
        let amperes = if limited {
            policy.continuous_share * self.amperes
        } else if plug {
            policy.plug_16_a
        } else {
            self.amperes
        };
        self.volts * amperes * self.phase_factor() - self.other_w
    }

    fn phase_factor(&self) -> f64 {
        if self.three_phase { 3_f64.sqrt() } else { 1.0 }
    }

    /// Current, A, that a power in W draws.
    #[must_use]
    pub fn current_a(&self, power_w: f64) -> f64 {
        power_w / (self.volts * self.phase_factor())
    }
}

/// What is needed of a heater, in W as it is delivered at the voltage there is.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Wanted {
    /// At the loss as computed.
    pub needed_w: f64,
    /// At the loss at its likely worst.
    pub needed_high_w: f64,
    /// What the circuit carries; infinite where none is given.
    pub carried_w: f64,
    /// What the surface at hand may give off; infinite where nothing limits it.
    pub surface_w: f64,
    /// Delivered over rated power: the square of the voltages' ratio.
    pub delivered: f64,
}

/// A heater chosen from the sizes to be had.
#[derive(Debug, Clone, PartialEq)]
pub enum Chosen {
    /// It fits. `tight`: it covers the loss as computed, not its likely worst.
    Fits {
        /// Rated powers of its elements, W.
        elements: Vec<f64>,
        /// Without reserve.
        tight: bool,
    },
    /// No circuit for it: the smallest that would do.
    CircuitTooSmall {
        /// Rated powers of its elements, W.
        elements: Vec<f64>,
    },
    /// Too large for the surface it may be stuck on.
    SurfaceTooSmall,
    /// Not even three of the largest give the power.
    NoSize,
}

/// Chooses: the smallest single size that covers the likely worst and is carried; else a single one
/// that covers the loss as computed; else two, then three elements.
#[must_use]
pub fn choose(sizes: &[f64], wanted: Wanted) -> Chosen {
    let pick = |counts: std::ops::RangeInclusive<usize>, least: f64, most: f64| {
        let mut best: Option<([f64; 3], usize, f64)> = None;
        combinations(sizes, counts, |elements, count| {
            let total = elements.iter().sum::<f64>() * wanted.delivered;
            let better = best.is_none_or(|(_, fewest, smallest)| {
                total < smallest || (total == smallest && count < fewest)
            });
            if total >= least && total <= most && better {
                best = Some((elements, count, total));
            }
        });
        best.map(|(elements, count, _)| elements.iter().copied().take(count).collect::<Vec<f64>>())
    };
    let most = wanted.carried_w.min(wanted.surface_w);
    let (needed, high) = (wanted.needed_w, wanted.needed_high_w);
    let ladder = [
        (1, high, false),
        (1, needed, true),
        (2, high, false),
        (2, needed, true),
        (3, high, false),
        (3, needed, true),
    ];
    for (count, least, tight) in ladder {
        if let Some(elements) = pick(count..=count, least, most) {
            return Chosen::Fits { elements, tight };
        }
    }
    if pick(1..=3, needed, f64::INFINITY).is_none() {
        return Chosen::NoSize;
    }
    if pick(1..=3, needed, wanted.surface_w).is_none() {
        return Chosen::SurfaceTooSmall;
    }
    let without_circuit =
        ladder.iter().find_map(|(count, least, _)| pick(*count..=*count, *least, wanted.surface_w));
    Chosen::CircuitTooSmall { elements: without_circuit.unwrap_or_default() }
}

/// Every one, two or three of the sizes, as the counts ask; unused places are 0.
fn combinations(
    sizes: &[f64],
    counts: std::ops::RangeInclusive<usize>,
    mut each: impl FnMut([f64; 3], usize),
) {
    for (i, a) in sizes.iter().enumerate() {
        if counts.contains(&1) {
            each([*a, 0.0, 0.0], 1);
        }
        for (j, b) in sizes.iter().enumerate().skip(i).take_while(|_| *counts.end() >= 2) {
            if counts.contains(&2) {
                each([*a, *b, 0.0], 2);
            }
            for c in sizes.iter().skip(j).take_while(|_| *counts.end() >= 3) {
                each([*a, *b, *c], 3);
            }
        }
    }
}
