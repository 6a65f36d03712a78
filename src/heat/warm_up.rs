//! Warm-up, hold and cool-down of a tank: `C dT/dt = P - loss(T)`.
//!
//! The films are evaluated once an oil, at fixed nodes; every question of power and time is then
//! answered from that curve.

use super::tank_loss::TankLoss;
use crate::oil::Bulk;
use crate::solve;
use crate::source::{Method, Source};

/// Warm-up.
pub static WARM_UP: Method = Method {
    name: "heat balance of the tank, t = ∫ C dT/(P - loss)",
    source: Source::quoted("lumped heating of a body, Incropera et al., chapter 5"),
};

/// Heat capacity of oil and steel together.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct HeatCapacity {
    /// Heat capacity at 0 °C, J/K.
    at_zero: f64,
    /// Its rise, J/K per K.
    slope: f64,
}

impl HeatCapacity {
    /// Oil volume in L (at 15 °C) with its bulk properties, steel in kg with its specific heat in
    /// J/(kg·K).
    #[must_use]
    pub fn new(litres: f64, bulk: &Bulk, steel_kg: f64, steel_heat: f64) -> Self {
        let oil_kg = litres / 1000.0 * bulk.density_15();
        let zero = bulk.specific_heat(0.0);
        let slope = (bulk.specific_heat(100.0) - zero) / 100.0;
        Self { at_zero: oil_kg * zero + steel_kg * steel_heat, slope: oil_kg * slope }
    }

    /// Of two bodies together.
    #[must_use]
    pub fn plus(&self, other: &Self) -> Self {
        Self { at_zero: self.at_zero + other.at_zero, slope: self.slope + other.slope }
    }

    /// At a temperature in °C, J/K.
    #[must_use]
    pub fn at(&self, celsius: f64) -> f64 {
        self.at_zero + self.slope * celsius
    }
}

/// Nodes of the loss curve.
const NODES: usize = 14;
/// Pieces of a warm-up.
const PIECES: usize = 32;

/// The loss of a tank over temperature, evaluated once.
#[derive(Debug, Clone)]
pub struct LossCurve {
    air_c: f64,
    span_k: f64,
    /// Loss per kelvin, W/K, at `air + span·(i/(NODES-1))³`.
    ua: [f64; NODES],
}

impl LossCurve {
    /// Evaluates a tank's loss from its air to `top_c`.
    #[must_use]
    pub fn new(loss: &TankLoss<'_>, top_c: f64) -> Self {
        let air_c = loss.air_c();
        let span_k = (top_c - air_c).max(1.0);
        let mut ua = [0.0; NODES];
        // The film of a vanishing difference is that of a very small one. Hottest first: there the
        // films change least from node to node.
        let node = |at: usize| {
            let s = at as f64 / (NODES - 1) as f64;
            air_c + (span_k * s * s * s).max(1e-4)
        };
        loss.ua_along((0..NODES).rev().map(node), &mut ua);
        ua.reverse();
        Self { air_c, span_k, ua }
    }

    /// Air temperature, °C.
    #[must_use]
    pub const fn air_c(&self) -> f64 {
        self.air_c
    }

    /// Loss per kelvin over the air at an oil temperature in °C, W/K.
    #[must_use]
    pub fn ua(&self, celsius: f64) -> f64 {
        let x = ((celsius - self.air_c) / self.span_k).clamp(0.0, 1.0).cbrt() * (NODES - 1) as f64;
        // x lies between 0 and NODES - 1.
        #[allow(
            clippy::cast_possible_truncation,
            clippy::cast_sign_loss,
            reason = "0 to NODES - 1"
        )]
        let first = (x as usize).clamp(1, NODES - 3) - 1;
        let [a, b, c, d] =
            [self.ua[first], self.ua[first + 1], self.ua[first + 2], self.ua[first + 3]];
        let t = x - first as f64;
        // Cubic through four neighbouring nodes.
        let (t1, t2, t3) = (t - 1.0, t - 2.0, t - 3.0);
        -a * t1 * t2 * t3 / 6.0 + b * t * t2 * t3 / 2.0 - c * t * t1 * t3 / 2.0
            + d * t * t1 * t2 / 6.0
    }

    /// Loss at an oil temperature in °C, W.
    #[must_use]
    pub fn loss_w(&self, celsius: f64) -> f64 {
        if celsius <= self.air_c { 0.0 } else { self.ua(celsius) * (celsius - self.air_c) }
    }
}

/// A warm-up from one temperature to another: the loss on the way, ready for any power.
#[derive(Debug, Clone)]
pub struct WarmUp {
    /// (K from the start, heat capacity J/K, loss W) at the joints.
    joints: [(f64, f64, f64); PIECES + 1],
}

impl WarmUp {
    /// From `from_c` to `to_c`, with the loss times `loss_factor`.
    #[must_use]
    pub fn new(
        curve: &LossCurve,
        capacity: &HeatCapacity,
        from_c: f64,
        to_c: f64,
        loss_factor: f64,
    ) -> Self {
        let mut joints = [(0.0, 0.0, 0.0); PIECES + 1];
        for (at, joint) in joints.iter_mut().enumerate() {
            let t = from_c + (to_c - from_c) * at as f64 / PIECES as f64;
            *joint = (t - from_c, capacity.at(t), loss_factor * curve.loss_w(t));
        }
        Self { joints }
    }

    fn worst_loss(&self) -> f64 {
        self.joints.iter().map(|joint| joint.2).fold(0.0, f64::max)
    }

    /// Time in s that a power in W into the oil takes; `None` where the loss eats it up on the way.
    ///
    /// `t = ∫ C dT/(P - loss)`, the loss linear between the joints and integrated in closed form.
    #[must_use]
    pub fn time_s(&self, power_w: f64) -> Option<f64> {
        if power_w <= self.worst_loss() {
            return None;
        }
        let mut time = 0.0;
        for (a, b) in self.joints.iter().zip(self.joints.iter().skip(1)) {
            let step = b.0 - a.0;
            let (left, right) = (power_w - a.2, power_w - b.2);
            let capacity = f64::midpoint(a.1, b.1);
            // Mean of 1/(P - loss) over the piece.
            let x = right / left - 1.0;
            let mean = if x.abs() < 1e-4 {
                (1.0 - x / 2.0 + x * x / 3.0) / left
            } else {
                (1.0 + x).ln() / (x * left)
            };
            time += capacity * mean * step;
        }
        Some(time)
    }

    /// The smallest power in W into the oil that is through within `time_s`.
    #[must_use]
    pub fn needed_power_w(&self, time_s: f64) -> f64 {
        let worst = self.worst_loss();
        let heat: f64 = self
            .joints
            .iter()
            .zip(self.joints.iter().skip(1))
            .map(|(a, b)| f64::midpoint(a.1, b.1) * (b.0 - a.0))
            .sum();
        let bare = heat / time_s;
        if worst <= 0.0 {
            return bare;
        }
        // In 1/t the question is nearly linear in the power. Where the loss is at its worst all the
        // way the power is largest; without any loss it is smallest.
        let pace = |power: f64| self.time_s(power).map_or(0.0, f64::recip) - time_s.recip();
        let (least, most) = (bare.max(worst), bare + worst);
        solve::root(pace, least, most * (1.0 + 1e-12), 1e-7 * most).unwrap_or(most)
    }
}

/// Time in s for a tank without heat to cool from one temperature to another, °C; `None` where the
/// air is not cold enough for it.
#[must_use]
pub fn cooling_time_s(
    curve: &LossCurve,
    capacity: &HeatCapacity,
    from_c: f64,
    to_c: f64,
    loss_factor: f64,
) -> Option<f64> {
    if to_c <= curve.air_c() || from_c < to_c {
        return None;
    }
    // ∫ C dT/(UA (T - Ta)) in ln(T - Ta), where the integrand stays smooth down to the air: Simpson.
    const HALVES: usize = 16;
    let air_c = curve.air_c();
    let (from, to) = ((from_c - air_c).ln(), (to_c - air_c).ln());
    let f = |u: f64| {
        let t = air_c + u.exp();
        capacity.at(t) / (loss_factor * curve.ua(t))
    };
    let step = (from - to) / HALVES as f64;
    let mut sum = f(to) + f(from);
    for at in 1..HALVES {
        sum += f(to + step * at as f64) * if at % 2 == 1 { 4.0 } else { 2.0 };
    }
    Some(sum * step / 3.0)
}

/// The temperature, °C, at which a tank's loss eats up a power in W; `None` above 300 °C, where
/// nothing here holds.
#[must_use]
pub fn steady_c(curve: &LossCurve, loss: &TankLoss<'_>, power_w: f64) -> Option<f64> {
    let top = curve.air_c + curve.span_k;
    if curve.loss_w(top) >= power_w {
        return solve::root(|t| curve.loss_w(t) - power_w, curve.air_c, top, 1e-6);
    }
    solve::root(|t| loss.loss_w(t) - power_w, top, 300.0, 1e-3)
}
