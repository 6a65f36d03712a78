//! The figures that are judgement or trade practice: one table, each with its tag, each settable.
//!
//! The figures themselves live with the models that use them ([`BandPolicy`], [`HeatPolicy`],
//! [`InletPolicy`] and [`LimitPolicy`] here); this table gives them a key.

use super::keys::{Key, KeyKind, Need};
use crate::heat::HeatPolicy;
use crate::oil::BandPolicy;
use crate::pump::InletPolicy;
use crate::quantity::{
    Current, Kind, KinematicViscosity, PressureDifference, Quantity, Temperature,
    TemperatureDifference, ThermalConductivity, Thickness, TimeSpan, WattDensity, shown,
};
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
            None => text.replace(',', ".").parse::<f64>().map_err(|_| {
                format!("takes a number, for example {}, but is `{text}`", self.example)
            })?,
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

/// The policy figures, in the order of the models.
pub static ROWS: &[PolicyRow] = &[
    PolicyRow {
        path: "policy.pour_margin",
        about: "Least temperature over the pour point at the pump",
        kind: Some(TemperatureDifference::KIND),
        least: 5.0,
        greatest: 60.0,
        example: "\"10 K\"",
        source: Source::publication("M. G. Rabie, Fluid Power Engineering (2009), p. 45"),
        get: |policy| policy.limits.pour_margin_k,
        set: |policy, value| policy.limits.pour_margin_k = value,
    },
    PolicyRow {
        path: "policy.line_margin",
        about: "Least temperature over the pour point in hoses and pilot lines",
        kind: Some(TemperatureDifference::KIND),
        least: 0.0,
        greatest: 60.0,
        example: "\"3 K\"",
        source: Source::judgement("one step of the pour test, ISO 3016"),
        get: |policy| policy.limits.line_margin_k,
        set: |policy, value| policy.limits.line_margin_k = value,
    },
    PolicyRow {
        path: "policy.search_from",
        about: "Coldest temperature searched",
        kind: Some(Temperature::KIND),
        least: -80.0,
        greatest: -20.0,
        example: "\"-60 °C\"",
        source: Source::judgement("coldest fluids in use end near -54 °C"),
        get: |policy| policy.limits.search_from_c,
        set: |policy, value| policy.limits.search_from_c = value,
    },
    PolicyRow {
        path: "policy.search_to",
        about: "Hottest temperature searched for cold limits",
        kind: Some(Temperature::KIND),
        least: 20.0,
        greatest: 100.0,
        example: "\"80 °C\"",
        source: Source::judgement("no start is heated further"),
        get: |policy| policy.limits.search_to_c,
        set: |policy, value| policy.limits.search_to_c = value,
    },
    PolicyRow {
        path: "policy.hot_search_to",
        about: "Hottest temperature searched for the thin edge",
        kind: Some(Temperature::KIND),
        least: 80.0,
        greatest: 150.0,
        example: "\"120 °C\"",
        source: Source::judgement("over any tank temperature"),
        get: |policy| policy.limits.hot_search_to_c,
        set: |policy, value| policy.limits.hot_search_to_c = value,
    },
    PolicyRow {
        path: "policy.light_speed_share",
        about: "Share of the work speed at light work",
        kind: None,
        least: 0.1,
        greatest: 1.0,
        example: "0.6",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.limits.light_speed_share,
        set: |policy, value| policy.limits.light_speed_share = value,
    },
    PolicyRow {
        path: "policy.unproven_viscosity",
        about: "Thickest oil a usual suction line passes, where none is given",
        kind: Some(KinematicViscosity::KIND),
        least: 50.0,
        greatest: 5000.0,
        example: "\"860 mm²/s\"",
        source: Source::judgement("750 mPa·s at usual density, ASTM D6080"),
        get: |policy| policy.limits.unproven_viscosity_mm2_s,
        set: |policy, value| policy.limits.unproven_viscosity_mm2_s = value,
    },
    PolicyRow {
        path: "policy.unproven_viscosity_gear",
        about: "The same for gear and gerotor pumps",
        kind: Some(KinematicViscosity::KIND),
        least: 50.0,
        greatest: 5000.0,
        example: "\"600 mm²/s\"",
        source: Source::judgement("small machines have small hoses"),
        get: |policy| policy.limits.unproven_viscosity_gear_mm2_s,
        set: |policy, value| policy.limits.unproven_viscosity_gear_mm2_s = value,
    },
    PolicyRow {
        path: "policy.unproven_drop",
        about: "Pressure drop that viscosity stands for",
        kind: Some(PressureDifference::KIND),
        least: 10.0,
        greatest: 100.0,
        example: "\"41 kPa\"",
        source: Source::judgement("101 kPa less the usual 60 kPa limit"),
        get: |policy| policy.limits.unproven_drop_kpa,
        set: |policy, value| policy.limits.unproven_drop_kpa = value,
    },
    PolicyRow {
        path: "policy.misfit_viscosity",
        about: "A typical limit that even this viscosity misses does not fit the machine",
        kind: Some(KinematicViscosity::KIND),
        least: 5.0,
        greatest: 100.0,
        example: "\"15 mm²/s\"",
        source: Source::judgement("hot oil"),
        get: |policy| policy.limits.misfit_viscosity_mm2_s,
        set: |policy, value| policy.limits.misfit_viscosity_mm2_s = value,
    },
    PolicyRow {
        path: "policy.clear_sky",
        about: "Machine colder than the air under a clear sky",
        kind: Some(TemperatureDifference::KIND),
        least: 0.0,
        greatest: 15.0,
        example: "\"2 K\"",
        source: Source::judgement("radiation to a clear night sky"),
        get: |policy| policy.limits.clear_sky_k,
        set: |policy, value| policy.limits.clear_sky_k = value,
    },
    PolicyRow {
        path: "policy.in_hand",
        about: "Least temperature in hand for a plain cold start",
        kind: Some(TemperatureDifference::KIND),
        least: 0.0,
        greatest: 20.0,
        example: "\"3 K\"",
        source: Source::judgement("reading errors at the machine"),
        get: |policy| policy.limits.in_hand_k,
        set: |policy, value| policy.limits.in_hand_k = value,
    },
    PolicyRow {
        path: "policy.standing_after",
        about: "Standstill after which a vegetable oil is not judged by its pour point",
        kind: Some(TimeSpan::KIND),
        least: 0.0,
        greatest: 1000.0,
        example: "\"24 h\"",
        source: Source::judgement("ASTM D6351 holds 7 days"),
        get: |policy| policy.limits.standing_after_h,
        set: |policy, value| policy.limits.standing_after_h = value,
    },
    PolicyRow {
        path: "policy.standing_start",
        about: "Then no start below this temperature",
        kind: Some(Temperature::KIND),
        least: -60.0,
        greatest: 40.0,
        example: "\"-5 °C\"",
        source: Source::judgement("ASTM D6351: quick tests mislead for these oils"),
        get: |policy| policy.limits.standing_start_c,
        set: |policy, value| policy.limits.standing_start_c = value,
    },
    PolicyRow {
        path: "policy.standing_line",
        about: "Then the oil may set in the lines below this temperature",
        kind: Some(Temperature::KIND),
        least: -60.0,
        greatest: 40.0,
        example: "\"-10 °C\"",
        source: Source::judgement("ASTM D6351: quick tests mislead for these oils"),
        get: |policy| policy.limits.standing_line_c,
        set: |policy, value| policy.limits.standing_line_c = value,
    },
    PolicyRow {
        path: "policy.input_error",
        about: "Input error of mineral, natural-ester and PAO oils, per K below 40 °C",
        kind: None,
        least: 0.0,
        greatest: 0.05,
        example: "0.0013",
        source: Source::judgement("0.76 % on both data-sheet viscosities, carried to the cold"),
        get: |policy| policy.oil.input_error,
        set: |policy, value| policy.oil.input_error = value,
    },
    PolicyRow {
        path: "policy.input_error_thickened",
        about: "The same for polymer-thickened and ester oils",
        kind: None,
        least: 0.0,
        greatest: 0.05,
        example: "0.0028",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.oil.input_error_thickened,
        set: |policy, value| policy.oil.input_error_thickened = value,
    },
    PolicyRow {
        path: "policy.input_error_other",
        about: "The same for glycol and other oils",
        kind: None,
        least: 0.0,
        greatest: 0.05,
        example: "0.008",
        source: Source::judgement("no usable data published"),
        get: |policy| policy.oil.input_error_other,
        set: |policy, value| policy.oil.input_error_other = value,
    },
    PolicyRow {
        path: "policy.wax",
        about: "Thickening by wax per K below the cloud point",
        kind: None,
        least: 0.0,
        greatest: 0.5,
        example: "0.069",
        source: Source::judgement("doubles every 10 K"),
        get: |policy| policy.oil.wax,
        set: |policy, value| policy.oil.wax = value,
    },
    PolicyRow {
        path: "policy.polymer_low",
        about: "Thickening by polymer per K below 0 °C, index 140 and less",
        kind: None,
        least: 0.0,
        greatest: 0.5,
        example: "0.0143",
        source: Source::judgement("between remembered specification limits"),
        get: |policy| policy.oil.polymer_low,
        set: |policy, value| policy.oil.polymer_low = value,
    },
    PolicyRow {
        path: "policy.polymer_high",
        about: "The same, index 180 and more",
        kind: None,
        least: 0.0,
        greatest: 0.5,
        example: "0.0227",
        source: Source::judgement("between remembered specification limits"),
        get: |policy| policy.oil.polymer_high,
        set: |policy, value| policy.oil.polymer_high = value,
    },
    PolicyRow {
        path: "policy.thin_mineral",
        about: "How much thinner than the line per K, mineral and natural ester",
        kind: None,
        least: 0.0,
        greatest: 0.05,
        example: "0.0036",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.oil.thin_mineral,
        set: |policy, value| policy.oil.thin_mineral = value,
    },
    PolicyRow {
        path: "policy.thin_polymer",
        about: "The same, polymer-thickened",
        kind: None,
        least: 0.0,
        greatest: 0.05,
        example: "0.0013",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.oil.thin_polymer,
        set: |policy, value| policy.oil.thin_polymer = value,
    },
    PolicyRow {
        path: "policy.thin_pao",
        about: "The same, PAO",
        kind: None,
        least: 0.0,
        greatest: 0.05,
        example: "0.0075",
        source: Source::judgement("typical values are 0.55 to 0.87 of the line at -40 °C"),
        get: |policy| policy.oil.thin_pao,
        set: |policy, value| policy.oil.thin_pao = value,
    },
    PolicyRow {
        path: "policy.thin_other",
        about: "The same, ester, glycol and other",
        kind: None,
        least: 0.0,
        greatest: 0.05,
        example: "0.0064",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.oil.thin_other,
        set: |policy, value| policy.oil.thin_other = value,
    },
    PolicyRow {
        path: "policy.measuring_error",
        about: "Measuring error of every viscosity, share",
        kind: None,
        least: 0.0,
        greatest: 0.5,
        example: "0.03",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.oil.measuring_error,
        set: |policy, value| policy.oil.measuring_error = value,
    },
    PolicyRow {
        path: "policy.grade_spread",
        about: "Spread of a grade without data sheet, share",
        kind: None,
        least: 0.0,
        greatest: 0.5,
        example: "0.10",
        source: Source::publication("ISO 3448:1992, grades are ±10 %"),
        get: |policy| policy.oil.grade_spread,
        set: |policy, value| policy.oil.grade_spread = value,
    },
    PolicyRow {
        path: "policy.pour_unknown",
        about: "Factor on the thick edge where the pour point is not known",
        kind: None,
        least: 1.0,
        greatest: 5.0,
        example: "1.25",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.oil.pour_unknown,
        set: |policy, value| policy.oil.pour_unknown = value,
    },
    PolicyRow {
        path: "policy.shear_low",
        about: "Share left at 100 °C after shear in service, index 140 and less",
        kind: None,
        least: 0.3,
        greatest: 1.0,
        example: "0.87",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.oil.shear_low,
        set: |policy, value| policy.oil.shear_low = value,
    },
    PolicyRow {
        path: "policy.shear_high",
        about: "The same, index 180 and more",
        kind: None,
        least: 0.3,
        greatest: 1.0,
        example: "0.75",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.oil.shear_high,
        set: |policy, value| policy.oil.shear_high = value,
    },
    PolicyRow {
        path: "policy.no_number_below",
        about: "No viscosity at the pump within this of the pour point",
        kind: Some(TemperatureDifference::KIND),
        least: 0.0,
        greatest: 30.0,
        example: "\"5 K\"",
        source: Source::judgement("an oil near its pour point has no one viscosity"),
        get: |policy| policy.oil.no_number_below_k,
        set: |policy, value| policy.oil.no_number_below_k = value,
    },
    PolicyRow {
        path: "policy.near_pour",
        about: "Near the pour point within this",
        kind: Some(TemperatureDifference::KIND),
        least: 0.0,
        greatest: 60.0,
        example: "\"15 K\"",
        source: Source::common_practice("common practice"),
        get: |policy| policy.oil.near_pour_k,
        set: |policy, value| policy.oil.near_pour_k = value,
    },
    PolicyRow {
        path: "policy.cloud_at_least",
        about: "Cloud point assumed at the least",
        kind: Some(Temperature::KIND),
        least: -60.0,
        greatest: 40.0,
        example: "\"-12 °C\"",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.oil.cloud_at_least_c,
        set: |policy, value| policy.oil.cloud_at_least_c = value,
    },
    PolicyRow {
        path: "policy.cloud_over_pour",
        about: "Cloud point assumed over the pour point",
        kind: Some(TemperatureDifference::KIND),
        least: 0.0,
        greatest: 60.0,
        example: "\"10 K\"",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.oil.cloud_over_pour_k,
        set: |policy, value| policy.oil.cloud_over_pour_k = value,
    },
    PolicyRow {
        path: "policy.roughness",
        about: "Roughness of the suction hose",
        kind: Some(Thickness::KIND),
        least: 0.0001,
        greatest: 1.0,
        example: "\"0.01 mm\"",
        source: Source::judgement("smooth hose"),
        get: |policy| policy.inlet.roughness_mm,
        set: |policy, value| policy.inlet.roughness_mm = value,
    },
    PolicyRow {
        path: "policy.velocity_factor",
        about: "Kinetic energy factor of the velocity head",
        kind: None,
        least: 1.0,
        greatest: 2.0,
        example: "2",
        source: Source::judgement("laminar flow, the safe side throughout"),
        get: |policy| policy.inlet.velocity_factor,
        set: |policy, value| policy.inlet.velocity_factor = value,
    },
    PolicyRow {
        path: "policy.bypass_overshoot",
        about: "Strainer loss at the most, times the bypass pressure",
        kind: None,
        least: 1.0,
        greatest: 5.0,
        example: "1.5",
        source: Source::judgement("a bypass overshoots its cracking pressure"),
        get: |policy| policy.inlet.bypass_overshoot,
        set: |policy, value| policy.inlet.bypass_overshoot = value,
    },
    PolicyRow {
        path: "policy.wetted_share",
        about: "Share of the tank surface that loses heat as a wetted wall",
        kind: None,
        least: 0.1,
        greatest: 1.0,
        example: "0.9",
        source: Source::judgement("walls 0.8 wetted, the top half"),
        get: |policy| policy.heat.wetted_share,
        set: |policy, value| policy.heat.wetted_share = value,
    },
    PolicyRow {
        path: "policy.emissivity",
        about: "Emissivity of the tank outside",
        kind: None,
        least: 0.05,
        greatest: 1.0,
        example: "0.9",
        source: Source::memory("paint 0.85 to 0.95"),
        get: |policy| policy.heat.emissivity,
        set: |policy, value| policy.heat.emissivity = value,
    },
    PolicyRow {
        path: "policy.wind_enclosed",
        about: "Share of the wind at an enclosed tank",
        kind: None,
        least: 0.0,
        greatest: 1.0,
        example: "0.2",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.heat.wind_enclosed,
        set: |policy, value| policy.heat.wind_enclosed = value,
    },
    PolicyRow {
        path: "policy.wind_open_frame",
        about: "Share of the wind in an open frame",
        kind: None,
        least: 0.0,
        greatest: 1.0,
        example: "0.5",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.heat.wind_open_frame,
        set: |policy, value| policy.heat.wind_open_frame = value,
    },
    PolicyRow {
        path: "policy.wind_exposed",
        about: "Share of the wind at an exposed tank",
        kind: None,
        least: 0.0,
        greatest: 1.0,
        example: "1.0",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.heat.wind_exposed,
        set: |policy, value| policy.heat.wind_exposed = value,
    },
    PolicyRow {
        path: "policy.loss_uncertainty",
        about: "Likely worst heat loss, times the computed one",
        kind: None,
        least: 1.0,
        greatest: 3.0,
        example: "1.4",
        source: Source::judgement("films are good to ±40 %"),
        get: |policy| policy.heat.loss_uncertainty,
        set: |policy, value| policy.heat.loss_uncertainty = value,
    },
    PolicyRow {
        path: "policy.steel_heat",
        about: "Specific heat of steel, J/(kg·K)",
        kind: None,
        least: 300.0,
        greatest: 600.0,
        example: "440",
        source: Source::memory("EN 1993-1-2 at 20 °C"),
        get: |policy| policy.heat.steel_heat_j_kg_k,
        set: |policy, value| policy.heat.steel_heat_j_kg_k = value,
    },
    PolicyRow {
        path: "policy.gate_margin",
        about: "Gate over the start floor",
        kind: Some(TemperatureDifference::KIND),
        least: 0.0,
        greatest: 20.0,
        example: "\"3 K\"",
        source: Source::judgement("reading errors at the machine"),
        get: |policy| policy.heat.gate_margin_k,
        set: |policy, value| policy.heat.gate_margin_k = value,
    },
    PolicyRow {
        path: "policy.suction_below_mean",
        about: "Suction colder than the mean of a still tank",
        kind: Some(TemperatureDifference::KIND),
        least: 0.0,
        greatest: 20.0,
        example: "\"3 K\"",
        source: Source::judgement("warm oil rises"),
        get: |policy| policy.heat.suction_below_mean_k,
        set: |policy, value| policy.heat.suction_below_mean_k = value,
    },
    PolicyRow {
        path: "policy.return_share",
        about: "Share of the cold circuit that comes back at first",
        kind: None,
        least: 0.0,
        greatest: 1.0,
        example: "0.2",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.heat.return_share,
        set: |policy, value| policy.heat.return_share = value,
    },
    PolicyRow {
        path: "policy.target_max",
        about: "Hottest mean temperature a tank is heated to",
        kind: Some(Temperature::KIND),
        least: 20.0,
        greatest: 90.0,
        example: "\"60 °C\"",
        source: Source::common_practice("common practice"),
        get: |policy| policy.heat.target_max_c,
        set: |policy, value| policy.heat.target_max_c = value,
    },
    PolicyRow {
        path: "policy.sensor",
        about: "Thermostat over the target for its sensor",
        kind: Some(TemperatureDifference::KIND),
        least: 0.0,
        greatest: 20.0,
        example: "\"3 K\"",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.heat.sensor_k,
        set: |policy, value| policy.heat.sensor_k = value,
    },
    PolicyRow {
        path: "policy.hysteresis",
        about: "Thermostat over that for its switching",
        kind: Some(TemperatureDifference::KIND),
        least: 0.0,
        greatest: 20.0,
        example: "\"5 K\"",
        source: Source::common_practice("common practice"),
        get: |policy| policy.heat.hysteresis_k,
        set: |policy, value| policy.heat.hysteresis_k = value,
    },
    PolicyRow {
        path: "policy.warming_over_floor",
        about: "Pump warming needed where the thermostat is so far over the start floor",
        kind: Some(TemperatureDifference::KIND),
        least: 0.0,
        greatest: 60.0,
        example: "\"20 K\"",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.heat.warming_over_floor_k,
        set: |policy, value| policy.heat.warming_over_floor_k = value,
    },
    PolicyRow {
        path: "policy.warming_over_soak",
        about: "Pump warming needed where the thermostat is so far over the pump",
        kind: Some(TemperatureDifference::KIND),
        least: 0.0,
        greatest: 60.0,
        example: "\"25 K\"",
        source: Source::common_practice("no published source found"),
        get: |policy| policy.heat.warming_over_soak_k,
        set: |policy, value| policy.heat.warming_over_soak_k = value,
    },
    PolicyRow {
        path: "policy.gate_fall",
        about: "Fall of the tank for which a gate reading holds",
        kind: Some(TemperatureDifference::KIND),
        least: 0.5,
        greatest: 20.0,
        example: "\"3 K\"",
        source: Source::judgement("the gate margin"),
        get: |policy| policy.heat.gate_fall_k,
        set: |policy, value| policy.heat.gate_fall_k = value,
    },
    PolicyRow {
        path: "policy.circuit_loss_factor",
        about: "Heat loss of the circuit, times the tank's",
        kind: None,
        least: 1.0,
        greatest: 20.0,
        example: "3",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.heat.circuit_loss_factor,
        set: |policy, value| policy.heat.circuit_loss_factor = value,
    },
    PolicyRow {
        path: "policy.load_sensing_share",
        about: "Share of the full flow a load-sensing pump gives in neutral",
        kind: None,
        least: 0.0,
        greatest: 1.0,
        example: "0.05",
        source: Source::judgement("a load-sensing pump destrokes"),
        get: |policy| policy.heat.load_sensing_share,
        set: |policy, value| policy.heat.load_sensing_share = value,
    },
    PolicyRow {
        path: "policy.blanket_thickness",
        about: "Thickness of a blanket",
        kind: Some(Thickness::KIND),
        least: 1.0,
        greatest: 500.0,
        example: "\"25 mm\"",
        source: Source::common_practice("common practice"),
        get: |policy| policy.heat.blanket_mm,
        set: |policy, value| policy.heat.blanket_mm = value,
    },
    PolicyRow {
        path: "policy.blanket_conductivity",
        about: "Conductivity of a blanket",
        kind: Some(ThermalConductivity::KIND),
        least: 0.01,
        greatest: 1.0,
        example: "\"0.040 W/(m·K)\"",
        source: Source::common_practice("mineral wool or foam"),
        get: |policy| policy.heat.blanket_w_m_k,
        set: |policy, value| policy.heat.blanket_w_m_k = value,
    },
    PolicyRow {
        path: "policy.density_thick",
        about: "Watt density at the most in very thick oil",
        kind: Some(WattDensity::KIND),
        least: 0.05,
        greatest: 10.0,
        example: "\"0.7 W/cm²\"",
        source: Source::common_practice("common practice"),
        get: |policy| policy.heat.density_thick,
        set: |policy, value| policy.heat.density_thick = value,
    },
    PolicyRow {
        path: "policy.density_medium",
        about: "Watt density at the most in thick oil",
        kind: Some(WattDensity::KIND),
        least: 0.05,
        greatest: 10.0,
        example: "\"1.2 W/cm²\"",
        source: Source::common_practice("common practice"),
        get: |policy| policy.heat.density_medium,
        set: |policy, value| policy.heat.density_medium = value,
    },
    PolicyRow {
        path: "policy.density_thin",
        about: "Watt density at the most in still oil",
        kind: Some(WattDensity::KIND),
        least: 0.05,
        greatest: 10.0,
        example: "\"1.55 W/cm²\"",
        source: Source::publication("Machinery Lubrication, Nov-Dec 2016, p. 47"),
        get: |policy| policy.heat.density_thin,
        set: |policy, value| policy.heat.density_thin = value,
    },
    PolicyRow {
        path: "policy.density_circulated",
        about: "Watt density at the most in circulated oil",
        kind: Some(WattDensity::KIND),
        least: 0.05,
        greatest: 10.0,
        example: "\"2.3 W/cm²\"",
        source: Source::publication("Machinery Lubrication, Nov-Dec 2016, p. 47"),
        get: |policy| policy.heat.density_circulated,
        set: |policy, value| policy.heat.density_circulated = value,
    },
    PolicyRow {
        path: "policy.thick_from",
        about: "Very thick oil from",
        kind: Some(KinematicViscosity::KIND),
        least: 100.0,
        greatest: 100000.0,
        example: "\"5000 mm²/s\"",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.heat.thick_from_mm2_s,
        set: |policy, value| policy.heat.thick_from_mm2_s = value,
    },
    PolicyRow {
        path: "policy.medium_from",
        about: "Thick oil from",
        kind: Some(KinematicViscosity::KIND),
        least: 50.0,
        greatest: 100000.0,
        example: "\"500 mm²/s\"",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.heat.medium_from_mm2_s,
        set: |policy, value| policy.heat.medium_from_mm2_s = value,
    },
    PolicyRow {
        path: "policy.skin_max",
        about: "Hottest skin of an element",
        kind: Some(Temperature::KIND),
        least: 60.0,
        greatest: 200.0,
        example: "\"120 °C\"",
        source: Source::common_practice("long oil life; no standard found"),
        get: |policy| policy.heat.skin_max_c,
        set: |policy, value| policy.heat.skin_max_c = value,
    },
    PolicyRow {
        path: "policy.flash_margin",
        about: "Skin under the flash point by",
        kind: Some(TemperatureDifference::KIND),
        least: 10.0,
        greatest: 100.0,
        example: "\"30 K\"",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.heat.flash_margin_k,
        set: |policy, value| policy.heat.flash_margin_k = value,
    },
    PolicyRow {
        path: "policy.pad_density",
        about: "Watt density of a pad",
        kind: Some(WattDensity::KIND),
        least: 0.01,
        greatest: 2.0,
        example: "\"0.5 W/cm²\"",
        source: Source::common_practice("common practice"),
        get: |policy| policy.heat.pad_density,
        set: |policy, value| policy.heat.pad_density = value,
    },
    PolicyRow {
        path: "policy.pad_share",
        about: "Share of a pad's heat that goes into the oil",
        kind: None,
        least: 0.1,
        greatest: 1.0,
        example: "0.75",
        source: Source::judgement("this project's judgement"),
        get: |policy| policy.heat.pad_share,
        set: |policy, value| policy.heat.pad_share = value,
    },
    PolicyRow {
        path: "policy.continuous_share",
        about: "Share of a breaker rating for hours, where so limited",
        kind: None,
        least: 0.3,
        greatest: 1.0,
        example: "0.8",
        source: Source::quoted("NFPA 70 210.20(A), 210.23(A)(1)"),
        get: |policy| policy.heat.continuous_share,
        set: |policy, value| policy.heat.continuous_share = value,
    },
    PolicyRow {
        path: "policy.plug_current",
        about: "Current for hours from a 16 A plug outlet",
        kind: Some(Current::KIND),
        least: 5.0,
        greatest: 16.0,
        example: "\"13 A\"",
        source: Source::common_practice("European plug outlets warm up on long loads"),
        get: |policy| policy.heat.plug_16_a,
        set: |policy, value| policy.heat.plug_16_a = value,
    },
];

#[cfg(test)]
mod tests {
    use super::{Policy, ROWS};

    #[test]
    fn every_default_is_what_its_example_says() {
        for row in ROWS {
            let default = (row.get)(&Policy::default());
            let read = row.read(row.example.trim_matches('"'));
            assert_eq!(read, Ok(default), "{}", row.path);
        }
    }

    #[test]
    fn setting_one_figure_changes_that_one_alone() {
        for row in ROWS {
            let mut policy = Policy::default();
            let value = f64::midpoint(row.least, row.greatest);
            (row.set)(&mut policy, value);
            for other in ROWS {
                let want =
                    if other.path == row.path { value } else { (other.get)(&Policy::default()) };
                assert_eq!((other.get)(&policy), want, "{} moved {}", row.path, other.path);
            }
        }
    }
}
