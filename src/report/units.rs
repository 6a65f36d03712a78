//! Figures as people read them, in metric or US units.

use crate::advice::{Figure, Part, Say};
use crate::case::Units;
use crate::case::keys::{self, KeyKind};
use crate::quantity::{Quantity as _, Temperature};

/// Units of a case and the US units they are shown in.
const US_UNITS: &[(&str, &str)] = &[
    ("°C", "°F"),
    ("K", "°F"),
    ("kPa", "psi"),
    ("mm", "in"),
    ("m", "ft"),
    ("m²", "ft²"),
    ("L", "gal"),
    ("cm³", "in³"),
    ("kg", "lb"),
    ("kg/m³", "lb/ft³"),
    ("L/min", "gpm"),
    ("m/s", "mph"),
    ("W/(m²·K)", "Btu/(h·ft²·°F)"),
    ("W/K", "Btu/(h·°F)"),
    ("W/cm²", "W/in²"),
];

/// Shows figures in one set of units.
#[derive(Debug, Clone, Copy)]
pub struct Shown(pub Units);

impl Shown {
    const fn us(self) -> bool {
        matches!(self.0, Units::Us)
    }

    /// A figure of a sentence.
    #[must_use]
    pub fn figure(self, figure: Figure) -> String {
        match figure {
            Figure::Temperature(v) => self.temperature(v),
            Figure::Difference(v) => self.difference(v),
            Figure::Viscosity(v) => self.viscosity(v),
            Figure::Power(v) => self.power(v),
            Figure::Energy(v) => energy(v),
            Figure::Vacuum(v) => self.vacuum(v),
            Figure::Pressure(v) => self.pressure(v),
            Figure::Speed(v) => format!("{} rpm", fixed(v, 0)),
            Figure::Time(v) => self.time(v),
            Figure::Length(v) => self.length(v),
            Figure::Elevation(v) => self.elevation(v),
            Figure::WattDensity(v) => self.watt_density(v),
            Figure::Area(v) => self.area(v),
            Figure::Current(v) => format!("{} A", fixed(v, 1)),
            Figure::Percent(v) => format!("{} %", fixed(v, 0)),
            Figure::Number(v) => fixed(v, 0),
        }
    }

    /// A sentence as plain text.
    #[must_use]
    pub fn say(self, say: &Say) -> String {
        say.0
            .iter()
            .map(|part| match part {
                Part::Words(words) => words.clone(),
                Part::Figure { figure, .. } => self.figure(*figure),
            })
            .collect()
    }

    /// The value of a case key as people read it: three figures, in the units asked for. What is
    /// not a quantity stands as it is.
    #[must_use]
    pub fn input(self, key: &str, text: &str) -> String {
        let kind = match keys::find(key).map(|key| key.kind) {
            Some(KeyKind::Quantity(kind)) => kind,
            Some(KeyKind::Minimum) => Temperature::KIND,
            _ => return text.to_owned(),
        };
        let Ok(value) = kind.read(text) else { return text.to_owned() };
        let us = US_UNITS.iter().find(|(metric, _)| self.us() && *metric == kind.unit);
        let unit = us.map_or(kind.unit, |(_, us)| *us);
        match kind.in_unit(value, unit) {
            Some(value) => format!("{} {unit}", three_figures(value)),
            None => text.to_owned(),
        }
    }

    /// A small length in mm.
    #[must_use]
    pub fn length(self, mm: f64) -> String {
        if self.us() {
            format!("{} in", trimmed(mm / 25.4, 2))
        } else {
            format!("{} mm", trimmed(mm, 1))
        }
    }

    /// A height above the sea in m.
    #[must_use]
    pub fn elevation(self, m: f64) -> String {
        if self.us() {
            format!("{} ft", fixed(m / 0.3048, 0))
        } else {
            format!("{} m", fixed(m, 0))
        }
    }

    /// A temperature in °C, to a tenth.
    #[must_use]
    pub fn temperature(self, celsius: f64) -> String {
        if self.us() {
            format!("{} °F", fixed(celsius * 1.8 + 32.0, 1))
        } else {
            format!("{} °C", fixed(celsius, 1))
        }
    }

    /// A temperature difference in K.
    #[must_use]
    pub fn difference(self, kelvin: f64) -> String {
        if self.us() {
            format!("{} °F", fixed(kelvin * 1.8, 1))
        } else {
            format!("{} K", fixed(kelvin, 1))
        }
    }

    /// A viscosity in mm²/s, to two figures: more is not known; at the hot end to a tenth.
    #[must_use]
    pub fn viscosity(self, mm2_s: f64) -> String {
        if mm2_s < 20.0 {
            return format!("{} mm²/s", trimmed(mm2_s, 1));
        }
        format!("{} mm²/s", two_figures(mm2_s))
    }

    /// A power in W.
    #[must_use]
    pub fn power(self, watts: f64) -> String {
        format!("{} W", fixed(watts, 0))
    }

    /// A pressure in kPa, in bar where it is a system pressure.
    #[must_use]
    pub fn pressure(self, kpa: f64) -> String {
        if self.us() {
            format!("{} psi", fixed(kpa / 6.894_757, 1))
        } else if kpa >= 1000.0 {
            format!("{} bar", trimmed(kpa / 100.0, 1))
        } else {
            format!("{} kPa", fixed(kpa, 1))
        }
    }

    /// A vacuum in kPa and inHg; under zero it is pressure.
    #[must_use]
    pub fn vacuum(self, kpa: f64) -> String {
        let (si, us) = (fixed(kpa.abs(), 1), fixed(kpa.abs() / 3.386_389, 1));
        let both = if self.us() {
            format!("{us} inHg ({si} kPa)")
        } else {
            format!("{si} kPa ({us} inHg)")
        };
        if kpa < 0.0 { format!("none, {both} over the air outside") } else { both }
    }

    /// A time in s, as hours and minutes.
    #[must_use]
    pub fn time(self, seconds: f64) -> String {
        if seconds < 90.0 {
            return format!("{} s", two_figures(seconds));
        }
        let minutes = (seconds / 60.0).round();
        let hours = (minutes / 60.0).floor();
        if hours >= 1.0 {
            format!("{} h {:02} min", hours, minutes - 60.0 * hours)
        } else {
            format!("{minutes} min")
        }
    }

    /// A watt density in W/cm².
    #[must_use]
    pub fn watt_density(self, w_cm2: f64) -> String {
        if self.us() {
            format!("{} W/in²", fixed(w_cm2 * 6.451_6, 1))
        } else {
            format!("{} W/cm²", fixed(w_cm2, 2))
        }
    }

    /// An area in cm².
    #[must_use]
    pub fn area(self, cm2: f64) -> String {
        if self.us() {
            format!("{} in²", two_figures(cm2 / 6.451_6))
        } else {
            format!("{} cm²", two_figures(cm2))
        }
    }

    /// A U value in W/(m²·K).
    #[must_use]
    pub fn u_value(self, w_m2_k: f64) -> String {
        if self.us() {
            format!("{} Btu/(h·ft²·°F)", fixed(w_m2_k / 5.678_263, 2))
        } else {
            format!("{} W/(m²·K)", fixed(w_m2_k, 1))
        }
    }

    /// A speed in m/s.
    #[must_use]
    pub fn wind(self, m_s: f64) -> String {
        if self.us() {
            format!("{} mph", fixed(m_s / 0.447_04, 0))
        } else {
            format!("{} m/s", fixed(m_s, 1))
        }
    }
}

/// A number with so many decimals at most.
#[must_use]
pub(super) fn trimmed(value: f64, decimals: usize) -> String {
    let text = fixed(value, decimals);
    if text.contains('.') {
        text.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        text
    }
}

/// A number to three significant figures.
fn three_figures(value: f64) -> String {
    if value == 0.0 {
        return "0".to_owned();
    }
    let after = 2 - value.abs().log10().floor() as i32;
    let unit = 10_f64.powi(-after);
    trimmed((value / unit).round() * unit, after.max(0) as usize)
}

/// An energy in kWh.
#[must_use]
pub(super) fn energy(kwh: f64) -> String {
    format!("{} kWh", fixed(kwh, 1))
}

/// A number with so many decimals, never `-0`.
#[must_use]
pub(super) fn fixed(value: f64, decimals: usize) -> String {
    let text = format!("{value:.decimals$}");
    if text.trim_start_matches('-').chars().all(|c| c == '0' || c == '.') {
        return text.trim_start_matches('-').to_owned();
    }
    text
}

/// A number to two significant figures, three from 100 000 up, thousands set apart.
#[must_use]
pub(super) fn two_figures(value: f64) -> String {
    if value <= 0.0 || !value.is_finite() {
        return fixed(value, 0);
    }
    let magnitude = value.log10().floor();
    let unit = 10_f64.powf(magnitude - 1.0);
    let rounded = (value / unit).round() * unit;
    if magnitude < 1.0 {
        let decimals = if magnitude < 0.0 { 2 } else { 1 };
        return fixed(rounded, decimals);
    }
    let digits = format!("{rounded:.0}");
    if digits.len() <= 4 {
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
