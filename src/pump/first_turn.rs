//! The first turn: cold oil standing in the hose, and the case drain.

use crate::source::{Method, Source};

/// Cold oil in the hose.
pub static HOSE_CLEARING: Method = Method {
    name: "laminar displacement of cold oil from the hose, t = 16 µ L²/(Δp D²)",
    source: Source::judgement("Hagen-Poiseuille with the oil column shrinking as it is drawn out"),
};

/// Case drain.
pub static CASE_DRAIN: Method = Method {
    name: "laminar loss of the case drain line, 128 µ L Q/(π D⁴)",
    source: Source::quoted("Hagen-Poiseuille law"),
};

/// Time, s, to draw the cold oil out of a hose: dynamic viscosity in Pa·s, length and bore in m,
/// pressure difference in Pa. `t = 16 µ L²/(Δp D²)`.
#[must_use]
pub fn clearing_time(mu: f64, length: f64, dp: f64, bore: f64) -> f64 {
    16.0 * mu * length * length / (dp * bore * bore)
}

/// Share of its flow the pump can draw through the cold hose at first: units as
/// [`clearing_time`], velocity in m/s. `φ = Δp D²/(32 µ L V)`; 1 and more is full.
#[must_use]
pub fn initial_fill(mu: f64, length: f64, dp: f64, bore: f64, velocity: f64) -> f64 {
    dp * bore * bore / (32.0 * mu * length * velocity)
}

/// Gauge pressure, kPa, that the case drain flow builds: dynamic viscosity in Pa·s, length and bore
/// in m, flow in m³/s.
#[must_use]
pub fn case_drain_kpa(mu: f64, length: f64, bore: f64, q: f64) -> f64 {
    128.0 * mu * length * q / (std::f64::consts::PI * bore.powi(4)) / 1000.0
}
