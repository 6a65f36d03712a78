//! The checked case: what every later step works on.

use super::clock::Clock;
use super::fault::Faults;
use super::file::CaseFile;
use super::policy::Policy;
use crate::climate::{self, BuiltIn, Sites};
use crate::heat::{ElementKind, ElementPlace, Exposure};
use crate::oil::Oil;
use crate::pump::{Neutral, PumpKind, SuctionLine};
use crate::quantity::{
    AbsolutePressure, Area, Bore, Current, Displacement, Elevation, Flow, GaugePressure,
    HeatLossRate, HeatTransferCoefficient, KinematicViscosity, Length, Mass, Power, Rotation,
    Temperature, ThermalConductivity, Thickness, TimeSpan, Velocity, Voltage, Volume,
};
use std::sync::Arc;

/// One machine at one site, with the oils and the supply to choose from; checked.
///
/// Made by [`super::CaseFile::check`].
#[derive(Debug, Clone)]
pub struct Case {
    /// What the case is called.
    pub title: String,
    /// How results are to be shown.
    pub units: Units,
    /// The site and its cold.
    pub site: Site,
    /// What only sharpens cautions.
    pub machine: Machine,
    /// The pump and its limits.
    pub pump: Pump,
    /// The suction line, where it is given.
    pub suction: Option<SuctionLine>,
    /// Thickest oil at a start where the inlet cannot be checked, mm²/s: what a usual suction line
    /// passes at this elevation. Zero or less: none. `None` where the inlet is checked.
    pub unproven_start_max: Option<f64>,
    /// The case drain line, where it is given.
    pub case_drain: Option<CaseDrain>,
    /// The tank.
    pub reservoir: Reservoir,
    /// The whole circuit, tank included.
    pub circuit: Circuit,
    /// How the machine is used.
    pub duty: Duty,
    /// The circuit the heater is plugged into, where it is given.
    pub supply: Option<Supply>,
    /// Price of a kWh, where it is given.
    pub tariff: Option<f64>,
    /// Heater sizes to be had, smallest first.
    pub heater_sizes: Vec<Power>,
    /// The heating element.
    pub element: Element,
    /// The oils to compare.
    pub oils: Vec<Oil>,
    /// The figures that are judgement or trade practice.
    pub policy: Policy,
    /// Inputs that were not given and filled from a typical value.
    pub assumptions: Vec<Assumption>,
    /// Every input used, with where it came from.
    pub inputs: Vec<Input>,
    /// The file it was checked from, for changing one value and checking again.
    pub(super) file: Arc<CaseFile>,
}

/// One key set to a text: what `--set`, a lever, a sweep and an answer are.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Edit {
    /// The key.
    pub key: String,
    /// The text; `none` takes the key out.
    pub value: String,
}

impl Edit {
    /// An edit.
    #[must_use]
    pub fn new(key: &str, value: &str) -> Self {
        Self { key: key.to_owned(), value: value.to_owned() }
    }
}

/// The climate a case has already, beside the built-in ones.
struct Known<'a>(Option<&'a climate::Site>);

impl Sites for Known<'_> {
    fn site(&self, name: &str) -> Result<Option<climate::Site>, String> {
        match self.0.filter(|site| site.name == name) {
            Some(site) => Ok(Some(site.clone())),
            None => BuiltIn.site(name),
        }
    }
}

impl Case {
    /// The same case with keys set over it, checked again.
    ///
    /// # Errors
    /// An unknown key, or what [`CaseFile::check`] finds wrong.
    pub fn with(&self, edits: &[Edit]) -> Result<Self, Faults> {
        let mut file = (*self.file).clone();
        for edit in edits {
            file.set(&edit.key, &edit.value).map_err(|fault| Faults(vec![fault]))?;
        }
        file.check_in(&Known(self.site.climate.as_ref()))
    }

    /// The case lists its own oils; else the built-in classes stand in.
    #[must_use]
    pub fn lists_oils(&self) -> bool {
        self.file.oils() > 0
    }
}

/// How results are shown.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Units {
    /// °C, mm²/s, kPa, L.
    #[default]
    Metric,
    /// °F, mm²/s and SUS, psi and inHg, US gal.
    Us,
}

/// How a design temperature of the site was arrived at.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum MinimumHow {
    /// Given as a figure.
    Given,
    /// Coldest on record.
    Record,
    /// A percentile of the hours of a year.
    Percentile,
    /// Coldest once in a number of winters.
    ReturnLevel,
    /// The low of a design class.
    Class,
    /// Not given: the same as the minimum.
    AsMinimum,
}

impl MinimumHow {
    /// How a climate's figure was come by.
    #[must_use]
    pub const fn of(how: climate::How) -> Self {
        match how {
            climate::How::Record => Self::Record,
            climate::How::Percentile => Self::Percentile,
            climate::How::ReturnLevel => Self::ReturnLevel,
            climate::How::Class => Self::Class,
        }
    }
}

/// The site.
#[derive(Debug, Clone)]
pub struct Site {
    /// The climate, if one is named.
    pub climate: Option<climate::Site>,
    /// Coldest temperature the machine must start at.
    pub minimum: Temperature,
    /// How the minimum was arrived at.
    pub minimum_how: MinimumHow,
    /// Which of the climate's it is, where it is one of them.
    pub minimum_wish: Option<climate::Wish>,
    /// Air temperature the heater is sized for.
    pub heating: Temperature,
    /// How that was arrived at.
    pub heating_how: MinimumHow,
    /// Wind with the heating temperature.
    pub wind: Velocity,
    /// Height above sea level.
    pub elevation: Elevation,
    /// Open under a clear night sky: machine colder than the air.
    pub clear_sky: bool,
}

/// What only sharpens cautions.
#[derive(Debug, Clone, Default)]
pub struct Machine {
    /// `diesel`, `petrol` or `electric`.
    pub engine: Option<String>,
    /// Glow plugs or an intake heater are fitted.
    pub intake_heater: Option<bool>,
    /// Lowest temperature the hoses are rated for.
    pub hose_rating: Option<Temperature>,
    /// The pump body is heated too.
    pub pump_heated: bool,
    /// Accumulator precharge and the gas temperature it was set at.
    pub accumulator: Option<(GaugePressure, Temperature)>,
}

/// The pump.
#[derive(Debug, Clone)]
pub struct Pump {
    /// Its kind.
    pub kind: PumpKind,
    /// What the oil does in neutral.
    pub neutral: Option<Neutral>,
    /// Displacement of all that draws through the suction line.
    pub displacement: Option<Displacement>,
    /// Charge pressure of a closed loop.
    pub charge_pressure: Option<GaugePressure>,
    /// Speed right after the engine fires.
    pub start_speed: Rotation,
    /// Speed at work.
    pub work_speed: Rotation,
    /// Thickest oil at a start.
    pub viscosity_start_max: KinematicViscosity,
    /// Thickest oil at work.
    pub viscosity_work_max: KinematicViscosity,
    /// Thinnest oil for long.
    pub viscosity_min: KinematicViscosity,
    /// Thinnest oil for a short time.
    pub viscosity_min_short: KinematicViscosity,
    /// Lowest inlet pressure at a start.
    pub inlet_start_min: AbsolutePressure,
    /// Lowest inlet pressure at work.
    pub inlet_work_min: AbsolutePressure,
    /// The inlet pressure at work is a typical value, not given.
    pub inlet_work_assumed: bool,
}

/// The case drain line.
#[derive(Debug, Clone, Copy)]
pub struct CaseDrain {
    /// Inside diameter.
    pub bore: Bore,
    /// Length.
    pub length: Length,
    /// Flow.
    pub flow: Flow,
    /// Highest case pressure allowed when cold.
    pub pressure_max: Option<GaugePressure>,
}

/// The tank.
#[derive(Debug, Clone)]
pub struct Reservoir {
    /// Oil in it.
    pub oil_volume: Volume,
    /// Steel of it.
    pub steel_mass: Mass,
    /// Outside surface.
    pub surface: Area,
    /// Height wetted by oil.
    pub height: Length,
    /// Length along the wind.
    pub length: Length,
    /// How it stands in the wind.
    pub exposure: Exposure,
    /// Flat outside area for pads.
    pub flat_surface: Area,
    /// Insulation thickness and conductivity.
    pub insulation: Option<(Thickness, ThermalConductivity)>,
    /// Known heat loss per area.
    pub u_value: Option<HeatTransferCoefficient>,
    /// Cool-down readings.
    pub cooldown: Option<Cooldown>,
    /// Air pressure kept in it at a cold start.
    pub gauge_pressure: Option<GaugePressure>,
}

/// Two readings of one night.
#[derive(Debug, Clone, Copy)]
pub struct Cooldown {
    /// Oil temperature at first.
    pub from: Temperature,
    /// Oil temperature later.
    pub to: Temperature,
    /// Air temperature.
    pub air: Temperature,
    /// Time between.
    pub over: TimeSpan,
}

/// The whole circuit, tank included.
#[derive(Debug, Clone)]
pub struct Circuit {
    /// Oil in it.
    pub oil_volume: Volume,
    /// Steel that warms with the oil.
    pub steel_mass: Mass,
    /// Heat loss; typically a multiple of the tank's, which differs from oil to oil.
    pub heat_loss: Option<HeatLossRate>,
    /// Pump pressure in neutral.
    pub standby_pressure: Option<GaugePressure>,
}

/// Which oils the site allows.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum FluidKind {
    /// Any oil.
    #[default]
    Any,
    /// Biodegradable only.
    Biodegradable,
}

/// Which change is preferred.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Prefer {
    /// Rather another oil.
    #[default]
    Oil,
    /// Rather a heater.
    Heater,
}

/// How the machine is used.
#[derive(Debug, Clone)]
pub struct Duty {
    /// Hottest oil in the season.
    pub oil_temperature_max: Temperature,
    /// Hours the heater may take.
    pub time_to_warm: TimeSpan,
    /// Shift start.
    pub shift_start: Clock,
    /// When it is parked.
    pub parked_at: Option<Clock>,
    /// Oil temperature when parked.
    pub parked_oil: Option<Temperature>,
    /// Count on the warmth of the day.
    pub credit_parked_heat: bool,
    /// Longest standstill.
    pub standing: TimeSpan,
    /// Which oils are allowed.
    pub fluid: FluidKind,
    /// Which change is preferred.
    pub prefer: Prefer,
}

/// The circuit the heater is plugged into.
#[derive(Debug, Clone, Copy)]
pub struct Supply {
    /// Voltage.
    pub voltage: Voltage,
    /// Breaker rating.
    pub current: Current,
    /// Three-phase.
    pub three_phase: bool,
    /// What else is on it.
    pub other_load: Power,
}

/// The heating element.
#[derive(Debug, Clone)]
pub struct Element {
    /// Immersion or pad.
    pub kind: ElementKind,
    /// Where it sits.
    pub place: ElementPlace,
    /// Rod diameter.
    pub diameter: Bore,
    /// Power of one already fitted.
    pub power: Option<Power>,
    /// Its heated surface.
    pub surface: Option<Area>,
    /// Voltage the elements are rated at, where it differs from the supply's.
    pub rated_voltage: Option<Voltage>,
}

/// An input that was not given, filled from a typical value.
#[derive(Debug, Clone, PartialEq)]
pub struct Assumption {
    /// The key.
    pub key: String,
    /// The value used.
    pub value: String,
    /// Where the typical value comes from.
    pub source: String,
    /// How to find the true one.
    pub ask: String,
}

/// Where an input came from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum From {
    /// Given in the file or set over it.
    Given,
    /// A typical value.
    Typical,
    /// A figure of the policy that was changed.
    Policy,
    /// From the site's climate.
    Climate,
}

/// One input as used.
#[derive(Debug, Clone, PartialEq)]
pub struct Input {
    /// The key.
    pub key: String,
    /// The value, as given or as filled.
    pub value: String,
    /// Where it came from.
    pub from: From,
}
