//! Warming by circulation in neutral, and mixing of warm tank oil with cold rest.

use super::warm_up::HeatCapacity;
use crate::source::{Method, Source};

/// Circulation.
pub static CIRCULATION: Method = Method {
    name: "heat of neutral flow times pressure against the loss of the whole circuit",
    source: Source::quoted("hydraulic power Q p ends as heat where no work is taken out"),
};

/// Temperature, °C, when a tank and the rest of the circuit are mixed; heat capacities in J/K.
#[must_use]
pub fn mixed_c(tank: f64, tank_c: f64, rest: f64, rest_c: f64) -> f64 {
    (tank * tank_c + rest * rest_c) / (tank + rest)
}

/// Time, s, that heat in W takes to bring a circuit from one temperature to another, °C, against a
/// loss in W/K to air in °C; `None` where it never gets there.
#[must_use]
pub fn circulation_time_s(
    capacity: &HeatCapacity,
    heat_w: f64,
    loss_w_k: f64,
    air_c: f64,
    from_c: f64,
    to_c: f64,
) -> Option<f64> {
    if from_c >= to_c {
        return Some(0.0);
    }
    let net = |t: f64| heat_w - loss_w_k * (t - air_c);
    if net(to_c) <= 0.0 || net(from_c) <= 0.0 {
        return None;
    }
    // ∫ (c0 + c1 T)/(n0 - k T) dT in pieces, each in closed form for its mean heat capacity.
    const PIECES: usize = 64;
    let step = (to_c - from_c) / PIECES as f64;
    let mut time = 0.0;
    for at in 0..PIECES {
        let (a, b) = (from_c + step * at as f64, from_c + step * (at + 1) as f64);
        let (left, right) = (net(a), net(b));
        let x = right / left - 1.0;
        let mean = if x.abs() < 1e-4 {
            (1.0 - x / 2.0 + x * x / 3.0) / left
        } else {
            (1.0 + x).ln() / (x * left)
        };
        time += capacity.at(f64::midpoint(a, b)) * mean * step;
    }
    Some(time)
}

/// Temperature, °C, at which the loss of the circuit eats up the heat.
#[must_use]
pub fn circulation_steady_c(heat_w: f64, loss_w_k: f64, air_c: f64) -> f64 {
    air_c + heat_w / loss_w_k
}
