//! Warming by circulation in neutral.

use super::warm_up::{HeatCapacity, mean_of_inverse};
use crate::source::{Method, Source};

/// Circulation.
pub static CIRCULATION: Method = Method {
    name: "heat of neutral flow times pressure against the loss of the whole circuit",
    source: Source::quoted("hydraulic power Q p ends as heat where no work is taken out"),
};

/// Heat, W, of a flow in m³/s through a pressure in Pa, of which a share flows in neutral.
///
/// `P = share Q p`
#[must_use]
pub fn circulation_heat_w(share: f64, flow_m3_s: f64, pressure_pa: f64) -> f64 {
    share * flow_m3_s * pressure_pa
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
        time += capacity.at(f64::midpoint(a, b)) * mean_of_inverse(net(a), net(b)) * step;
    }
    Some(time)
}

/// Temperature, °C, at which the loss of the circuit eats up the heat; infinite for a circuit that
/// loses nothing and is heated, the air for one that is not heated.
#[must_use]
pub fn circulation_steady_c(heat_w: f64, loss_w_k: f64, air_c: f64) -> f64 {
    if heat_w <= 0.0 { air_c } else { air_c + heat_w / loss_w_k }
}
