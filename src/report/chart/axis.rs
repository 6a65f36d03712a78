//! Axes: from a value to its place and back, with ticks at true places.

use crate::case::{Clock, Units};
use crate::report::units::{Shown, fixed};

/// How values lie along an axis.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Scale {
    /// Evenly.
    Linear,
    /// Temperatures in °C, evenly in `log10(T)`, T in K: the one axis of ASTM D341.
    LogKelvin,
    /// Viscosities in mm²/s, evenly in `log10(log10(ν + 0.7))`: the other axis of ASTM D341.
    LogLog,
}

/// 0 °C in kelvin.
const ZERO_C: f64 = 273.15;

impl Scale {
    fn forward(self, value: f64) -> f64 {
        match self {
            Self::Linear => value,
            Self::LogKelvin => (value + ZERO_C).log10(),
            Self::LogLog => (value + 0.7).log10().log10(),
        }
    }

    fn back(self, along: f64) -> f64 {
        match self {
            Self::Linear => along,
            Self::LogKelvin => 10_f64.powf(along) - ZERO_C,
            Self::LogLog => 10_f64.powf(10_f64.powf(along)) - 0.7,
        }
    }
}

/// A tick.
#[derive(Debug, Clone, PartialEq)]
pub struct Tick {
    /// Its value, in the unit of the data.
    pub at: f64,
    /// What stands beside it, in the unit shown.
    pub text: String,
}

/// An axis. Data are in one unit whatever unit is shown: °C, mm²/s, kPa, rpm, h.
#[derive(Debug, Clone, PartialEq)]
pub struct Axis {
    /// What it shows, with its unit.
    pub label: String,
    /// How values lie along it.
    pub scale: Scale,
    /// Value at its start.
    pub from: f64,
    /// Value at its end.
    pub to: f64,
    /// Ticks from start to end.
    pub ticks: Vec<Tick>,
}

/// Viscosities worth a tick, mm²/s.
const VISCOSITIES: [f64; 15] = [
    1.0, 1.5, 2.0, 3.0, 5.0, 10.0, 25.0, 50.0, 100.0, 500.0, 2000.0, 10_000.0, 100_000.0, 1e6, 1e7,
];

impl Axis {
    /// Where a value lies: 0 at the start, 1 at the end, beyond either outside.
    #[must_use]
    pub fn place(&self, value: f64) -> f64 {
        let (from, to) = (self.scale.forward(self.from), self.scale.forward(self.to));
        (self.scale.forward(value) - from) / (to - from)
    }

    /// The value at a place: the inverse of [`Axis::place`].
    #[must_use]
    pub fn value(&self, place: f64) -> f64 {
        let (from, to) = (self.scale.forward(self.from), self.scale.forward(self.to));
        self.scale.back(from + place * (to - from))
    }

    /// Whether a value lies on the axis.
    #[must_use]
    pub fn holds(&self, value: f64) -> bool {
        (-1e-9..=1.0 + 1e-9).contains(&self.place(value))
    }

    /// Temperatures in °C that take in `from` to `to`, labelled in °C or °F.
    pub(super) fn temperature(what: &str, units: Units, scale: Scale, from: f64, to: f64) -> Self {
        let (unit, factor, offset) = match units {
            Units::Metric => ("°C", 1.0, 0.0),
            Units::Us => ("°F", 1.8, 32.0),
        };
        Self::even(format!("{what}, {unit}"), scale, (from, to), (factor, offset), (12.0, 0.25))
    }

    /// Viscosities in mm²/s that take in `from` to `to`.
    pub(super) fn viscosity(units: Units, from: f64, to: f64) -> Self {
        let below = VISCOSITIES.iter().rev().find(|tick| **tick <= from);
        let above = VISCOSITIES.iter().find(|tick| **tick >= to);
        let (from, to) = (*below.unwrap_or(&1.0), *above.unwrap_or(&1e7));
        let ticks = VISCOSITIES.iter().filter(|at| (from..=to).contains(at));
        let ticks = ticks.map(|at| Tick { at: *at, text: viscosity_text(*at) }).collect();
        let unit = if units == Units::Us { "mm²/s (the same as cSt)" } else { "mm²/s" };
        Self { label: format!("viscosity, {unit}"), scale: Scale::LogLog, from, to, ticks }
    }

    /// Absolute pressures in kPa that take in `from` to `to`, labelled in kPa or psi.
    pub(super) fn pressure(what: &str, units: Units, from: f64, to: f64) -> Self {
        let (unit, factor) = match units {
            Units::Metric => ("kPa absolute", 1.0),
            Units::Us => ("psi absolute", 1.0 / 6.894_757),
        };
        Self::even(format!("{what}, {unit}"), Scale::Linear, (from, to), (factor, 0.0), (8.0, 1.0))
    }

    /// Speeds in rpm that take in zero to `to`.
    pub(super) fn speed(what: &str, to: f64) -> Self {
        Self::even(format!("{what}, rpm"), Scale::Linear, (0.0, to), (1.0, 0.0), (8.0, 1.0))
    }

    /// Hours from `zero`, labelled with the time of day; takes in `from` to `to`.
    pub(super) fn clock(zero: Clock, from: f64, to: f64) -> Self {
        let minutes = f64::from(zero.minutes());
        let past = minutes / 60.0;
        let steps = [0.5, 1.0, 2.0, 3.0, 4.0, 6.0, 12.0, 24.0];
        let step = *steps.iter().find(|step| (to - from) / **step <= 13.0).unwrap_or(&24.0);
        let mut axis = Self {
            label: "time of day".to_owned(),
            scale: Scale::Linear,
            from: ((from + past) / step).floor() * step - past,
            to: ((to + past) / step).ceil() * step - past,
            ticks: Vec::new(),
        };
        let mut at = axis.from;
        while at <= axis.to + 1e-9 {
            let of_day = (60.0 * (at + past)).round().rem_euclid(1440.0);
            let (hour, minute) = ((of_day / 60.0).floor(), of_day.rem_euclid(60.0));
            axis.ticks.push(Tick { at, text: format!("{hour:02}:{minute:02}") });
            at += step;
        }
        axis
    }

    /// At most so many ticks at round values of what is shown, `factor · value + offset`; both ends on
    /// `snap` of the step between ticks.
    fn even(
        label: String,
        scale: Scale,
        (from, to): (f64, f64),
        (factor, offset): (f64, f64),
        (most, snap): (f64, f64),
    ) -> Self {
        let (low, high) = (factor * from + offset, factor * to + offset);
        let span = (high - low).max(1e-6);
        let magnitude = 10_f64.powf((span / most).log10().floor());
        let steps = [1.0, 2.0, 5.0, 10.0];
        let step = steps.iter().map(|n| n * magnitude).find(|step| span / step <= most);
        let step = step.unwrap_or(10.0 * magnitude);
        let decimals = if step < 1.0 { 1 } else { 0 };
        let edge = snap * step;
        let (first, mut last) = ((low / edge).floor() * edge, (high / edge).ceil() * edge);
        if last <= first {
            last = first + edge;
        }
        let back = |shown: f64| (shown - offset) / factor;
        let mut ticks = Vec::new();
        let mut at = (first / step - 1e-9).ceil();
        while at * step <= last + 1e-9 * step {
            let shown = at * step;
            let text = if decimals == 0 { thousands(shown) } else { fixed(shown, decimals) };
            ticks.push(Tick { at: back(shown), text });
            at += 1.0;
        }
        Self { label, scale, from: back(first), to: back(last), ticks }
    }
}

/// A viscosity beside its tick.
fn viscosity_text(value: f64) -> String {
    if value.fract() > 0.0 { fixed(value, 1) } else { thousands(value) }
}

/// A whole number, its thousands set apart from 10 000 up.
fn thousands(value: f64) -> String {
    let digits = fixed(value, 0);
    if digits.len() < 5 {
        return digits;
    }
    let mut out = String::new();
    for (at, c) in digits.chars().enumerate() {
        if at > 0 && (digits.len() - at) % 3 == 0 {
            out.push(' ');
        }
        out.push(c);
    }
    out
}

/// A speed in rpm.
pub(super) fn rpm(value: f64) -> String {
    format!("{} rpm", fixed(value, 0))
}

/// A temperature, as in every report.
pub(super) fn degrees(units: Units, celsius: f64) -> String {
    Shown(units).temperature(celsius)
}
