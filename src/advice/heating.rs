//! Heating: how warm, how much power, which heater, how hot its skin.

use super::setup::Setup;
use crate::case::Case;
use crate::heat::{
    self, Chosen, ElementKind, ElementPlace, HeatCapacity, LossCurve, OilFilm, Rod, TankLoss,
    Walls, Wanted, WarmUp,
};
use crate::quantity::Temperature;

/// What heating comes to.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[allow(missing_docs, reason = "the names are the ids")]
#[non_exhaustive]
pub enum HeatingStatus {
    NotNeeded,
    Sized,
    CannotReach,
    CircuitTooSmall,
    ElementTooHot,
    NotChecked,
}

impl HeatingStatus {
    /// The status as it stands in JSON.
    #[must_use]
    pub const fn id(self) -> &'static str {
        match self {
            Self::NotNeeded => "not-needed",
            Self::Sized => "sized",
            Self::CannotReach => "cannot-reach",
            Self::CircuitTooSmall => "circuit-too-small",
            Self::ElementTooHot => "element-too-hot",
            Self::NotChecked => "not-checked",
        }
    }
}

/// Why heating is not needed, or fails, or wants care.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[allow(missing_docs, reason = "`text` says what each is")]
#[non_exhaustive]
pub enum HeatingWhy {
    StartsCold,
    WarmEnough,
    StartFloorUnattainable,
    Gels,
    AboveSuction,
    TargetTooHot,
    LossEatsPower,
    TooSlow,
    SurfaceTooSmall,
    NoHeaterSize,
    SkinTooHot,
    BelowPour,
    CircuitTooSmall,
    WattDensity,
    OverVoltage,
    SurfaceUnknown,
}

impl HeatingWhy {
    /// The id in JSON.
    #[must_use]
    pub const fn id(self) -> &'static str {
        match self {
            Self::StartsCold => "starts-cold",
            Self::WarmEnough => "warm-enough-at-heating-temperature",
            Self::StartFloorUnattainable => "start-floor-unattainable",
            Self::Gels => "gels",
            Self::AboveSuction => "above-suction",
            Self::TargetTooHot => "target-too-hot",
            Self::LossEatsPower => "loss-eats-power",
            Self::TooSlow => "too-slow",
            Self::SurfaceTooSmall => "pad-surface-too-small",
            Self::NoHeaterSize => "no-heater-size",
            Self::SkinTooHot => "skin-too-hot",
            Self::BelowPour => "below-pour",
            Self::CircuitTooSmall => "circuit-too-small",
            Self::WattDensity => "watt-density",
            Self::OverVoltage => "over-voltage",
            Self::SurfaceUnknown => "surface-unknown",
        }
    }

    /// What it means, in plain words.
    #[must_use]
    pub const fn text(self) -> &'static str {
        match self {
            Self::StartsCold => "starts without heat",
            Self::WarmEnough => "the tank is warm enough at the heating temperature",
            Self::StartFloorUnattainable => {
                "there is no temperature at which the pump may be started"
            }
            Self::Gels => "the oil gels in hoses and pilot lines, where tank heat does not reach",
            Self::AboveSuction => {
                "an element above the suction in still oil leaves the suction cold; move it below the suction or circulate"
            }
            Self::TargetTooHot => "the tank would have to be hotter than is allowed",
            Self::LossEatsPower => "the tank loses the heat as fast as the element gives it",
            Self::TooSlow => "it takes longer than the time there is",
            Self::SurfaceTooSmall => "the flat surface is too small for a pad of that power",
            Self::NoHeaterSize => "not even three of the largest heater size give the power",
            Self::BelowPour => "no immersion element may be used in oil at or below its pour point",
            Self::SkinTooHot => "no watt density keeps the skin under its limits in this oil",
            Self::CircuitTooSmall => "the circuit does not carry it",
            Self::WattDensity => "its watt density is over what this oil stands",
            Self::OverVoltage => {
                "the supply is more than 10 % over the voltage the element is rated at: it burns out"
            }
            Self::SurfaceUnknown => {
                "its heated surface is not given, so its watt density was not checked (element.surface)"
            }
        }
    }
}

/// A fitted element, judged.
#[derive(Debug, Clone, PartialEq)]
pub struct Fitted {
    /// What it comes to.
    pub status: HeatingStatus,
    /// Why.
    pub whys: Vec<HeatingWhy>,
}

/// Heating of one oil. Figures that do not exist are `None`.
#[derive(Debug, Clone, PartialEq)]
pub struct Heating {
    /// What it comes to.
    pub status: HeatingStatus,
    /// Why, where there is something to say.
    pub whys: Vec<HeatingWhy>,
    /// Power needed at the loss as computed, W, electrical.
    pub needed_w: Option<f64>,
    /// The same at the likely worst loss, W.
    pub needed_high_w: Option<f64>,
    /// Rated power of the heater, W.
    pub heater_w: Option<f64>,
    /// Rated powers of its elements, W.
    pub elements_w: Vec<f64>,
    /// It covers the loss as computed, not the likely worst.
    pub tight: bool,
    /// The element that is fitted already.
    pub fitted: Option<Fitted>,
    /// Time to the target with this heater at the loss as computed, s.
    pub time_s: Option<f64>,
    /// The same at the likely worst loss, s.
    pub time_high_s: Option<f64>,
    /// Power to hold the target, W, electrical.
    pub hold_w: Option<f64>,
    /// Energy of one warm-up, kWh.
    pub energy_kwh: Option<f64>,
    /// U value at the target, W/(m²·K).
    pub u_value: Option<f64>,
    /// Temperature this heater would end at, °C.
    pub steady_c: Option<f64>,
    /// Mean tank temperature to reach, °C.
    pub mean_target_c: Option<f64>,
    /// Thermostat setting, °C.
    pub thermostat_c: Option<f64>,
    /// Time after switching off for which the gate holds, s.
    pub gate_valid_s: Option<f64>,
    /// Greatest watt density in this oil, W/cm².
    pub watt_density_max: Option<f64>,
    /// Watt density used, W/cm².
    pub watt_density: Option<f64>,
    /// Element surface at that density, cm².
    pub surface_cm2: Option<f64>,
    /// The pump must be warmed too.
    pub pump_warming: bool,
    /// Skin at the thermostat's cut-out, estimate, °C.
    pub skin_film_c: Option<f64>,
    /// Skin in the coldest oil, pessimistic bound, °C.
    pub skin_bulk_c: Option<f64>,
    /// Current drawn, A.
    pub current_a: Option<f64>,
}

impl Heating {
    fn without(status: HeatingStatus, why: HeatingWhy) -> Self {
        Self {
            status,
            whys: vec![why],
            needed_w: None,
            needed_high_w: None,
            heater_w: None,
            elements_w: Vec::new(),
            tight: false,
            fitted: None,
            time_s: None,
            time_high_s: None,
            hold_w: None,
            energy_kwh: None,
            u_value: None,
            steady_c: None,
            mean_target_c: None,
            thermostat_c: None,
            gate_valid_s: None,
            watt_density_max: None,
            watt_density: None,
            surface_cm2: None,
            pump_warming: false,
            skin_film_c: None,
            skin_bulk_c: None,
            current_a: None,
        }
    }
}

/// The loss is evaluated up to here at least, °C, so that a target past what is allowed still has its
/// figures.
const CURVE_TOP_C: f64 = 90.0;

/// The tank of a case with one oil: heat capacity and loss, evaluated once.
pub(super) struct Tank<'a> {
    pub(super) capacity: HeatCapacity,
    pub(super) rest: HeatCapacity,
    pub(super) loss: TankLoss<'a>,
    pub(super) curve: LossCurve,
    pub(super) soak_c: f64,
}

impl<'a> Tank<'a> {
    pub(super) fn new(setup: &Setup<'a>) -> Self {
        let case = setup.case;
        let (tank, circuit, policy) = (&case.reservoir, &case.circuit, &case.policy.heat);
        let steel = policy.steel_heat_j_kg_k;
        let litres = tank.oil_volume.as_litres();
        let capacity = HeatCapacity::new(litres, setup.bulk, tank.steel_mass.as_kg(), steel);
        let rest = HeatCapacity::new(
            circuit.oil_volume.as_litres() - litres,
            setup.bulk,
            circuit.steel_mass.as_kg() - tank.steel_mass.as_kg(),
            steel,
        );
        let area = tank.surface.as_m2();
        let loss = if let Some(c) = &tank.cooldown {
            let (from, to) = (c.from.as_celsius(), c.to.as_celsius());
            let mean = capacity.at(f64::midpoint(from, to));
            let ua = heat::cooldown_ua(mean, from, to, c.air.as_celsius(), c.over.as_seconds());
            TankLoss::from_cooldown(ua, area, setup.air_c)
        } else if let Some(u) = tank.u_value {
            TankLoss::from_u_value(u.as_w_per_m2_k(), area, setup.air_c)
        } else {
            let walls = Walls {
                height: tank.height.as_m(),
                length: tank.length.as_m(),
                wind: case.site.wind.as_m_per_s() * tank.exposure.wind_share(policy),
                insulation: tank.insulation.map_or(0.0, |(thickness, conductivity)| {
                    thickness.as_mm() / 1000.0 / conductivity.as_w_per_m_k()
                }),
                emissivity: policy.emissivity,
            };
            let oil = OilFilm { curve: setup.oil.curve(), bulk: setup.bulk };
            TankLoss::from_films(walls, oil, policy.wetted_share, area, setup.air_c)
        };
        let parked = case.duty.parked_oil.filter(|_| case.duty.credit_parked_heat);
        let hottest = policy.target_max_c.max(CURVE_TOP_C);
        let top = parked.map_or(hottest, |oil| oil.as_celsius().max(hottest));
        let curve = LossCurve::new(&loss, top);
        let mut tank = Self { capacity, rest, loss, curve, soak_c: setup.air_c };
        if let (Some(oil), Some(at)) = (parked, case.duty.parked_at) {
            // After a weekend nothing is left of the warmth: over 24 h the standstill counts.
            let standing = case.duty.standing.as_hours();
            let hours = if standing > heat::LONGEST_CREDIT_H {
                standing
            } else {
                at.hours_until(case.duty.shift_start)
            };
            let (factor, night) = tank.parked_night(case, oil.as_celsius());
            let from = at.hours();
            let cooled = heat::parked_c(
                &tank.curve,
                &tank.capacity,
                oil.as_celsius(),
                hours,
                factor,
                |hour| night(from + hour),
            );
            tank.soak_c = cooled.max(setup.air_c);
        }
        tank
    }

    /// What a tank parked at a temperature cools by: the factor on its loss, nothing where that was
    /// measured, and the air by hours after midnight.
    pub(super) fn parked_night(
        &self,
        case: &Case,
        parked_c: f64,
    ) -> (f64, impl Fn(f64) -> f64 + use<>) {
        let measured = case.reservoir.cooldown.is_some();
        let factor = if measured { 1.0 } else { case.policy.heat.loss_uncertainty };
        // A tank that stands longer than its time constant follows the spell, not the day.
        let coldest_c = self.curve.air_c();
        let middle = f64::midpoint(parked_c, coldest_c);
        let ua = factor * self.curve.ua(middle);
        let time_constant_h = self.capacity.at(middle) / ua / 3600.0;
        let lags = case.duty.standing.as_hours() <= time_constant_h;
        (factor, night_air(case, coldest_c, lags))
    }
}

/// Air by hours after midnight: the site's cold day with its coldest hour at `coldest_c`; that
/// temperature all the time where no cold day is known, or the tank does not lag behind it.
pub(super) fn night_air(case: &Case, coldest_c: f64, lags: bool) -> impl Fn(f64) -> f64 + use<> {
    let day = case.site.climate.as_ref().filter(|_| lags).and_then(|site| site.cold_day.as_ref());
    // Two days on end, from midnight: the first value of a cold day is that of 01:00.
    let hours: Vec<f64> = day.map_or_else(
        || vec![coldest_c],
        |day| {
            let lowest = day.hours_c.iter().copied().fold(f64::INFINITY, f64::min);
            (0..=48)
                .filter_map(|hour| day.hours_c.get((hour + 23) % 24))
                .map(|celsius| celsius - lowest + coldest_c)
                .collect()
        },
    );
    move |hour| heat::hourly(&hours).map_or(coldest_c, |air| air(hour))
}

/// Heating of one oil towards its start floor, °C; `gels` where it does not flow in the lines.
pub(super) fn heating(
    setup: &Setup<'_>,
    tank: &Tank<'_>,
    floor: Option<f64>,
    gels: bool,
) -> Heating {
    let case = setup.case;
    let policy = &case.policy.heat;
    let element = &case.element;
    let Some(floor) = floor else {
        return Heating::without(HeatingStatus::CannotReach, HeatingWhy::StartFloorUnattainable);
    };
    let gate = floor + policy.gate_margin_k;
    if gate <= tank.soak_c {
        let why = if setup.soak_c < gate { HeatingWhy::WarmEnough } else { HeatingWhy::StartsCold };
        let mut heating = Heating::without(HeatingStatus::NotNeeded, why);
        // A tank that kept its warmth is as far over the pump as a heated one.
        heating.pump_warming = !case.machine.pump_heated
            && why == HeatingWhy::WarmEnough
            && (tank.soak_c > floor + policy.warming_over_floor_k
                || tank.soak_c > setup.soak_c + policy.warming_over_soak_k);
        return heating;
    }
    let target = heat::mean_target_c(
        floor,
        setup.soak_c,
        tank.capacity.at(15.0),
        tank.rest.at(15.0),
        element.place,
        policy,
    );

    let mut fails = Vec::new();
    if gels {
        fails.push(HeatingWhy::Gels);
    }
    if element.place == ElementPlace::AboveSuction {
        fails.push(HeatingWhy::AboveSuction);
    }
    if target > policy.target_max_c.min(case.duty.oil_temperature_max.as_celsius()) {
        fails.push(HeatingWhy::TargetTooHot);
    }

    let pad = element.kind == ElementKind::Pad;
    let share = heat::into_oil_w(element.kind, 1.0, policy);
    // A target past the top of the curve is past what is allowed too, and has no figures.
    let figures = target <= tank.curve.top_c();
    let way = |factor: f64| WarmUp::new(&tank.curve, &tank.capacity, tank.soak_c, target, factor);
    let (usual, worst) = (way(1.0), way(policy.loss_uncertainty));
    let seconds = case.duty.time_to_warm.as_seconds();
    let needed = usual.needed_power_w(seconds) / share;
    let needed_high = worst.needed_power_w(seconds) / share;

    let thermostat = ((target + policy.sensor_k + policy.hysteresis_k) / 5.0).ceil() * 5.0;
    let pump_warming = !case.machine.pump_heated
        && (thermostat > floor + policy.warming_over_floor_k
            || thermostat > setup.soak_c + policy.warming_over_soak_k);

    let rod = Rod {
        oil: OilFilm { curve: setup.oil.curve(), bulk: setup.bulk },
        diameter: element.diameter.as_mm() / 1000.0,
    };
    // No immersion element in oil at or below its pour point: it cannot carry the heat away.
    let pour_c = setup.oil.pour_point().map(Temperature::as_celsius);
    let solid = !pad && !heat::immersion_allowed(setup.soak_c, pour_c);
    let density_max = if pad {
        policy.pad_density
    } else {
        let high = setup.oil.estimate(setup.soak_c).high;
        let cap = heat::density_cap(high, element.place, policy);
        let flash = setup.oil.flash_point().map(|flash| flash.as_celsius());
        rod.greatest_density(cap, thermostat, setup.soak_c, flash, policy)
    };
    if solid {
        fails.push(HeatingWhy::BelowPour);
    } else if density_max <= 0.0 {
        fails.push(HeatingWhy::SkinTooHot);
    }

    let supply = circuit(case);
    let delivered = delivered(case, supply);
    let carried = supply.map_or(f64::INFINITY, |circuit| circuit.continuous_w(policy));
    let flat_m2 = case.reservoir.flat_surface.as_m2();
    let surface_w = if pad { heat::pad_most_w(flat_m2, policy) } else { f64::INFINITY };

    let mut heating = Heating::without(HeatingStatus::Sized, HeatingWhy::Gels);
    heating.whys.clear();
    heating.mean_target_c = Some(target);
    heating.thermostat_c = Some(thermostat);
    heating.pump_warming = pump_warming;
    heating.watt_density_max = (!solid).then_some(density_max);
    if figures {
        heating.needed_w = Some(needed);
        heating.needed_high_w = Some(needed_high);
        heating.hold_w = Some(tank.curve.loss_w(target) / share);
        heating.u_value = Some(tank.loss.u_value(target));
        heating.gate_valid_s = heat::cooling_time_s(
            &tank.curve,
            &tank.capacity,
            target,
            target - policy.gate_fall_k,
            1.0,
        );
    }

    if delivered > MOST_DELIVERED {
        fails.push(HeatingWhy::OverVoltage);
    }
    let mut size = None;
    let mut used_density = Some(density_max);
    if let Some(power) = element.power {
        let power = power.as_watts();
        let into_oil = power * delivered * share;
        let density = element.surface.map(|surface| power * delivered / (surface.as_m2() * 1e4));
        let fitted = judge_fitted(
            &usual,
            &fails,
            into_oil,
            seconds,
            carried < power * delivered,
            density.map(|density| density > density_max),
        );
        if matches!(fitted.status, HeatingStatus::Sized | HeatingStatus::NotChecked) {
            heating.tight = power * delivered < needed_high;
            used_density = density;
            size = Some(vec![power]);
        }
        heating.fitted = Some(fitted);
    }
    if size.is_none() && fails.is_empty() {
        let sizes: Vec<f64> = case.heater_sizes.iter().map(|size| size.as_watts()).collect();
        let wanted = Wanted {
            needed_w: needed,
            needed_high_w: needed_high,
            carried_w: carried,
            surface_w,
            delivered,
        };
        match heat::choose(&sizes, wanted) {
            Chosen::Fits { elements, tight } => {
                heating.tight = tight;
                size = Some(elements);
            }
            Chosen::CircuitTooSmall { elements } => {
                heating.status = HeatingStatus::CircuitTooSmall;
                heating.whys.push(HeatingWhy::CircuitTooSmall);
                size = Some(elements);
            }
            Chosen::SurfaceTooSmall => fails.push(HeatingWhy::SurfaceTooSmall),
            Chosen::NoSize => fails.push(HeatingWhy::NoHeaterSize),
        }
    }
    if !fails.is_empty() {
        heating.status = HeatingStatus::CannotReach;
        heating.whys = fails;
        return heating;
    }
    if let Some(elements) = size {
        let rated: f64 = elements.iter().sum();
        let power = rated * delivered;
        heating.heater_w = Some(rated);
        heating.elements_w = elements;
        heating.time_s = usual.time_s(power * share);
        heating.time_high_s = worst.time_s(power * share);
        heating.energy_kwh = heating.time_s.map(|time| power * time / 3.6e6);
        heating.steady_c = heat::steady_c(&tank.curve, &tank.loss, power * share);
        heating.current_a = supply.map(|circuit| circuit.current_a(power));
        heating.watt_density = used_density;
        heating.surface_cm2 = used_density.map(|density| power / density);
        if let Some(density) = used_density.filter(|_| !pad) {
            heating.skin_film_c = rod.skin_film(density, thermostat);
            heating.skin_bulk_c = rod.skin_bulk(density, setup.soak_c);
        }
    }
    heating
}

/// The circuit there is.
pub(super) fn circuit(case: &Case) -> Option<heat::Circuit> {
    case.supply.map(|supply| heat::Circuit {
        volts: supply.voltage.as_volts(),
        amperes: supply.current.as_amperes(),
        three_phase: supply.three_phase,
        other_w: supply.other_load.as_watts(),
    })
}

/// Delivered over rated power of the element on that circuit.
pub(super) fn delivered(case: &Case, circuit: Option<heat::Circuit>) -> f64 {
    match (circuit, case.element.rated_voltage) {
        (Some(circuit), Some(rated)) => heat::delivered_share(circuit.volts, rated.as_volts()),
        _ => 1.0,
    }
}

/// An element gives at most so many times its rated power: 10 % over its voltage.
const MOST_DELIVERED: f64 = 1.21;

fn judge_fitted(
    usual: &WarmUp,
    fails: &[HeatingWhy],
    into_oil_w: f64,
    seconds: f64,
    over_circuit: bool,
    too_dense: Option<bool>,
) -> Fitted {
    let mut whys = fails.to_vec();
    match usual.time_s(into_oil_w) {
        None => whys.push(HeatingWhy::LossEatsPower),
        Some(time) if time > seconds => whys.push(HeatingWhy::TooSlow),
        Some(_) => {}
    }
    let mut status =
        if whys.is_empty() { HeatingStatus::Sized } else { HeatingStatus::CannotReach };
    if over_circuit {
        whys.push(HeatingWhy::CircuitTooSmall);
        if status == HeatingStatus::Sized {
            status = HeatingStatus::CircuitTooSmall;
        }
    }
    if too_dense == Some(true) {
        whys.push(HeatingWhy::WattDensity);
        if status == HeatingStatus::Sized {
            status = HeatingStatus::ElementTooHot;
        }
    }
    if too_dense.is_none() {
        whys.push(HeatingWhy::SurfaceUnknown);
        if status == HeatingStatus::Sized {
            status = HeatingStatus::NotChecked;
        }
    }
    Fitted { status, whys }
}
