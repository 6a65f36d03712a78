//! A parked machine over the night.

use super::loss_curve::LossCurve;
use super::warm_up::HeatCapacity;
use crate::source::{Method, Source};

/// Parked heat.
pub static PARKED: Method = Method {
    name: "cooling of the parked tank through the night's air temperatures",
    source: Source::quoted("lumped cooling of a body, Incropera et al., chapter 5"),
};

/// No longer than this is ever credited, h. This project's judgement.
pub const LONGEST_CREDIT_H: f64 = 24.0;

/// Steps an hour of the cooling.
const STEPS_PER_HOUR: f64 = 6.0;

/// Temperature, °C, of a tank parked at `from_c` after `hours`, in air that follows `air_c(hour)`.
///
/// As [`cooled_c`]; at most 24 h are credited: after that the tank counts as cold, and the last air
/// temperature is returned.
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
    cooled_c(curve, capacity, from_c, hours, loss_factor, air_c)
}

/// Temperature, °C, of a tank without heat, `hours` after it was at `from_c`, in air that follows
/// `air_c(hour)`.
///
/// `C dT/dt = -f UA (T - Ta)`, UA that of the curve at the same difference to its own air. No loss
/// where the air is warmer: the tank is never credited with heat from the air.
#[must_use]
pub fn cooled_c(
    curve: &LossCurve,
    capacity: &HeatCapacity,
    from_c: f64,
    hours: f64,
    loss_factor: f64,
    air_c: impl Fn(f64) -> f64,
) -> f64 {
    let steps = (hours * STEPS_PER_HOUR).ceil().max(1.0);
    let step = hours / steps;
    // Exact for fixed UA and C, which are taken at the middle of the step: of second order, and steady
    // however fast the tank cools.
    let after = |t: f64, at: f64, air: f64, step: f64| {
        if t <= air {
            return t;
        }
        let over = (at - air).max(0.0);
        let rate = loss_factor * curve.ua(curve.air_c() + over) / capacity.at(at);
        air + (t - air) * (-rate * step * 3600.0).exp()
    };
    let (mut t, mut hour) = (from_c, 0.0);
    while hour < hours - step / 2.0 {
        let air = air_c(hour + step / 2.0);
        let middle = after(t, t, air, step / 2.0);
        t = after(t, middle, air, step);
        hour += step;
    }
    t
}

/// Air that follows hourly temperatures in °C, the first at hour 0, straight between; before the
/// first and after the last they are held. `None` without any.
pub fn hourly(temperatures: &[f64]) -> Option<impl Fn(f64) -> f64 + '_> {
    let (&first, &last) = (temperatures.first()?, temperatures.last()?);
    Some(move |hour: f64| {
        if hour <= 0.0 {
            return first;
        }
        #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "over zero")]
        let at = hour as usize;
        match (temperatures.get(at), temperatures.get(at + 1)) {
            (Some(a), Some(b)) => a + (b - a) * hour.fract(),
            _ => last,
        }
    })
}

/// How a daily wave of the air comes through to a tank of a time constant in h: (share of its
/// amplitude, lag in h). `1/√(1 + (ωτ)²)`, `atan(ωτ)/ω`.
#[must_use]
pub fn daily_wave(time_constant_h: f64) -> (f64, f64) {
    let omega = 2.0 * std::f64::consts::PI / 24.0;
    let x = omega * time_constant_h;
    (1.0 / (1.0 + x * x).sqrt(), x.atan() / omega)
}
