//! The figures that are judgement or trade practice: one table, each with its tag, each settable.
//!
//! The figures themselves live with the models that use them ([`BandPolicy`], [`HeatPolicy`],
//! [`InletPolicy`] and [`LimitPolicy`] here); this table gives them a key.

use super::keys::{Key, KeyKind, Need};
use crate::heat::HeatPolicy;
use crate::oil::BandPolicy;
use crate::pump::InletPolicy;
use crate::quantity::{Bore, Kind, Power, Quantity, TemperatureDifference, Temperature, TimeSpan, WattDensity, KinematicViscosity, PressureDifference, Thickness, ThermalConductivity, shown};
use crate::source::Source;

/// All policy figures of a case.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Policy {
    /// Of the limits, here.
    pub limits: LimitPolicy,
    /// Of the likely range of the viscosity.
    pub oil: BandPolicy,
    /// Of the suction line.
    pub inlet: InletPolicy,
    /// Of tank, heater and warm-up.
    pub heat: HeatPolicy,
}

/// Figures of the limits.
#[derive(Debug, Clone, PartialEq)]
pub struct LimitPolicy {
    /// Least temperature over the pour point at the pump, K.
    pub pour_margin_k: f64,
    /// Least temperature over the pour point in hoses and pilot lines, K: one step of the pour test.
    pub line_margin_k: f64,
    /// Coldest temperature searched, °C.
    pub search_from_c: f64,
    /// Hottest temperature searched for the cold limits, °C.
    pub search_to_c: f64,
    /// Hottest temperature searched for the thin edge, °C.
    pub hot_search_to_c: f64,
    /// Share of the work speed at light work.
    pub light_speed_share: f64,
    /// Thickest oil for a usual suction line at full margin, mm²/s, where no line is given.
    pub unproven_viscosity_mm2_s: f64,
    /// The same for gear and gerotor pumps, mm²/s.
    pub unproven_viscosity_gear_mm2_s: f64,
    /// The pressure drop that full margin means, kPa.
    pub unproven_drop_kpa: f64,
    /// Viscosity at which a typical work limit must be met to fit the machine, mm²/s.
    pub misfit_viscosity_mm2_s: f64,
    /// Machine colder than the air under a clear sky, K.
    pub clear_sky_k: f64,
    /// Least temperature in hand for a plain cold start, K.
    pub in_hand_k: f64,
    /// Standstill after which a vegetable oil is no longer judged by its pour point, h.
    pub standing_after_h: f64,
    /// Then the start margin is at least this temperature, °C.
    pub standing_start_c: f64,
    /// Then the oil may set in the lines below this temperature, °C.
    pub standing_line_c: f64,
}

impl Default for LimitPolicy {
    fn default() -> Self {
        Self {
            pour_margin_k: 10.0,
            line_margin_k: 3.0,
            search_from_c: -60.0,
            search_to_c: 80.0,
            hot_search_to_c: 120.0,
            light_speed_share: 0.6,
            unproven_viscosity_mm2_s: 860.0,
            unproven_viscosity_gear_mm2_s: 600.0,
            unproven_drop_kpa: 41.0,
            misfit_viscosity_mm2_s: 15.0,
            clear_sky_k: 2.0,
            in_hand_k: 3.0,
            standing_after_h: 24.0,
            standing_start_c: -5.0,
            standing_line_c: -10.0,
        }
    }
}

/// One policy figure: its key, its range, how it is read and set, and where it comes from.
#[derive(Debug)]
pub struct PolicyRow {
    /// The key, `policy.pour_margin`.
    pub path: &'static str,
    /// What it is.
    pub about: &'static str,
    /// The quantity it is, or `None` for a plain number.
    pub kind: Option<&'static Kind>,
    /// Least value allowed, in the kind's own unit.
    pub least: f64,
    /// Greatest value allowed.
    pub greatest: f64,
    /// The default as it would stand in a case file.
    pub example: &'static str,
    /// Where the default comes from.
    pub source: Source,
    /// Reads it.
    pub get: fn(&Policy) -> f64,
    /// Sets it.
    pub set: fn(&mut Policy, f64),
}

impl PolicyRow {
    /// The row as a case key.
    #[must_use]
    pub fn key(&self) -> Key {
        Key {
            path: self.path,
            kind: self.kind.map_or(KeyKind::Number(self.least, self.greatest), KeyKind::Quantity),
            need: Need::Typical,
            example: self.example,
            question: self.about,
            find: self.source.cite,
        }
    }

    /// Reads a text for this figure.
    ///
    /// # Errors
    /// What the text should be.
    pub fn read(&self, text: &str) -> Result<f64, String> {
        let value = match self.kind {
            Some(kind) => kind.read(text).map_err(|error| error.to_string())?,
            None => text
                .replace(',', ".")
                .parse::<f64>()
                .map_err(|_| format!("takes a number, for example {}, but is `{text}`", self.example))?,
        };
        if value >= self.least && value <= self.greatest {
            return Ok(value);
        }
        let unit = self.kind.map_or(String::new(), |kind| format!(" {}", kind.unit));
        Err(format!(
            "must be between {} and {}{unit}, but is {text}",
            shown(self.least),
            shown(self.greatest)
        ))
    }
}
