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
    /// Power it carries for hours, W, less the other load; 0 where that takes it all.
    ///
    /// # Source
    /// [`CIRCUIT`].
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
        (self.volts * amperes * self.phase_factor() - self.other_w).max(0.0)
    }

    fn phase_factor(&self) -> f64 {
        if self.three_phase { 3_f64.sqrt() } else { 1.0 }
    }

    /// Current, A, that a power in W draws: `P/V`, three-phase `P/(√3 V)`.
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

/// Delivered over rated power of an element: `(V/V_rated)²`.
#[must_use]
pub fn delivered_share(volts: f64, rated_volts: f64) -> f64 {
    (volts / rated_volts).powi(2)
}

/// Chooses: the smallest single size that covers the likely worst and is carried; else a single one
/// that covers the loss as computed; else two, then three elements, of the least total.
#[must_use]
pub fn choose(sizes: &[f64], wanted: Wanted) -> Chosen {
    let most = wanted.carried_w.min(wanted.surface_w);
    let ladder = |most: f64| {
        (1..=MOST_ELEMENTS).find_map(|count| {
            let high = smallest(sizes, count, wanted.needed_high_w, most, wanted.delivered);
            let tight = high.is_none();
            high.or_else(|| smallest(sizes, count, wanted.needed_w, most, wanted.delivered))
                .map(|elements| (elements, tight))
        })
    };
    if let Some((elements, tight)) = ladder(most) {
        return Chosen::Fits { elements, tight };
    }
    if let Some((elements, _)) = ladder(wanted.surface_w) {
        return Chosen::CircuitTooSmall { elements };
    }
    if ladder(f64::INFINITY).is_some() { Chosen::SurfaceTooSmall } else { Chosen::NoSize }
}

/// No heater has more elements than this.
const MOST_ELEMENTS: usize = 3;

/// The `count` sizes of the least total that delivers at least `least` and at most `most`, W. A size
/// may be taken more than once.
fn smallest(
    sizes: &[f64],
    count: usize,
    least: f64,
    most: f64,
    delivered: f64,
) -> Option<Vec<f64>> {
    let mut best: Option<(f64, [f64; MOST_ELEMENTS])> = None;
    each_of(sizes, count, [0.0; MOST_ELEMENTS], 0, &mut |elements| {
        let total = elements.iter().sum::<f64>();
        let fits = total * delivered >= least && total * delivered <= most;
        if fits && best.is_none_or(|(found, _)| total < found) {
            best = Some((total, *elements));
        }
    });
    best.map(|(_, elements)| elements.into_iter().take(count).collect())
}

/// Calls `found` with every choice of `count` of the sizes, in their order.
fn each_of(
    sizes: &[f64],
    count: usize,
    chosen: [f64; MOST_ELEMENTS],
    at: usize,
    found: &mut impl FnMut(&[f64; MOST_ELEMENTS]),
) {
    if at == count {
        found(&chosen);
        return;
    }
    for (i, size) in sizes.iter().enumerate() {
        let mut chosen = chosen;
        if let Some(place) = chosen.get_mut(at) {
            *place = *size;
        }
        each_of(sizes.get(i..).unwrap_or_default(), count, chosen, at + 1, found);
    }
}
