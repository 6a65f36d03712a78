//! A parked machine over the night.

use super::warm_up::{HeatCapacity, LossCurve};
use crate::source::{Method, Source};

/// Parked heat.
pub static PARKED: Method = Method {
    name: "cooling of the parked tank through the night's air temperatures",
    source: Source::quoted("lumped cooling of a body, Incropera et al., chapter 5"),
};

/// No longer than this is ever credited, h.
pub const LONGEST_CREDIT_H: f64 = 24.0;

/// Temperature, °C, of a tank parked at `from_c` after `hours`, in air that follows `air_c(hour)`.
///
/// The loss per kelvin is that of the curve at the same difference to its own air. At most 24 h are
/// credited: after that the tank counts as cold, and the last air temperature is returned.
#[must_use]
pub fn parked_c(
    curve: &LossCurve,
    capacity: &HeatCapacity,
    from_c: f64,
    hours: f64,
    loss_factor: f64,
    air_c: impl Fn(f64) -> f64,
) -> f64 {
    if hours > LONGEST_CREDIT_H {
        return air_c(hours);
    }
    let rate = |hour: f64, t: f64| {
        let air = air_c(hour);
        let ua = curve.ua(curve.air_c() + (t - air).max(0.0));
        -loss_factor * ua * (t - air) / capacity.at(t) * 3600.0
    };
    // Runge-Kutta of fourth order, steps of three minutes at the most.
    let steps = (hours * 20.0).ceil().max(1.0);
    let step = hours / steps;
    let (mut t, mut hour) = (from_c, 0.0);
    while hour < hours - step / 2.0 {
        let k1 = rate(hour, t);
        let k2 = rate(hour + step / 2.0, t + step / 2.0 * k1);
        let k3 = rate(hour + step / 2.0, t + step / 2.0 * k2);
        let k4 = rate(hour + step, t + step * k3);
        t += step / 6.0 * (k1 + 2.0 * k2 + 2.0 * k3 + k4);
        hour += step;
    }
    t
}

/// How a daily wave of the air comes through to a tank of a time constant in h: (share of its
/// amplitude, lag in h). `1/√(1 + (ωτ)²)`, `atan(ωτ)/ω`.
#[must_use]
pub fn daily_wave(time_constant_h: f64) -> (f64, f64) {
    let omega = 2.0 * std::f64::consts::PI / 24.0;
    let x = omega * time_constant_h;
    (1.0 / (1.0 + x * x).sqrt(), x.atan() / omega)
}
