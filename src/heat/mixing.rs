//! How warm the tank must be, and what its warm oil comes to among the cold rest.

use super::element::ElementPlace;
use super::policy::HeatPolicy;
use crate::source::{Method, Source};

/// Target of the tank.
pub static TARGET: Method = Method {
    name: "start floor + gate margin + suction below the mean + share of the cold oil returned",
    source: Source::judgement("this project's judgement"),
};

/// What the mean tank temperature must come to, °C, for oil at the suction to stay over the start
/// floor while the cold rest of the circuit comes back.
///
/// `floor + 3 K + 3 K + 0.2 (C_rest/C_tank)(floor - soak)`; the second 3 K not where the oil is
/// circulated, the last term only where it is positive. Heat capacities in J/K, at 15 °C.
///
/// # Source
/// [`TARGET`].
#[must_use]
pub fn mean_target_c(
    floor_c: f64,
    soak_c: f64,
    tank: f64,
    rest: f64,
    place: ElementPlace,
    policy: &HeatPolicy,
) -> f64 {
    let below_mean =
        if place == ElementPlace::Circulated { 0.0 } else { policy.suction_below_mean_k };
    let returned = policy.return_share * (rest / tank) * (floor_c - soak_c);
    floor_c + policy.gate_margin_k + below_mean + returned.max(0.0)
}

/// Temperature, °C, when a tank and the rest of the circuit are mixed; heat capacities in J/K.
#[must_use]
pub fn mixed_c(tank: f64, tank_c: f64, rest: f64, rest_c: f64) -> f64 {
    (tank * tank_c + rest * rest_c) / (tank + rest)
}
