//! How cold the case is, as a risk: which minimum it was, how often it is colder, how the plan stands
//! against the other figures of the site, and the winter ahead.

use super::assess::{Assessment, assess};
use super::decide::Decision;
use super::heating::HeatingStatus;
use super::plan::{Plan, PlanKind};
use super::say::{Figure, Say};
use crate::case::{Case, Edit, MinimumHow};
use crate::climate::extremes::{self, Winters};
use crate::climate::{Site, Wish, months};
use crate::quantity::shown;
use crate::source::{Method, Source};

/// The winter ahead.
pub static WINTER_AHEAD: Method = Method {
    name: "mornings colder than the start floor, times a warm-up in proportion to how much colder than the target",
    source: Source::judgement("counts of the climate file, or its monthly means (Erbs 1983)"),
};

/// How cold the case is.
#[derive(Debug, Clone, PartialEq)]
pub struct Cold {
    /// Which minimum it was, in a sentence.
    pub which: Say,
    /// Chance that a winter sees colder than the minimum, 0 to 1.
    pub chance_a_winter: Option<f64>,
    /// Chance that ten winters do.
    pub chance_ten_winters: Option<f64>,
    /// Why there is no chance.
    pub why: Option<&'static str>,
    /// The plan against the other figures of the site.
    pub against: Vec<Against>,
    /// Switching on at the last minute, and holding all night.
    pub timing: Option<Timing>,
    /// The winter ahead, a plan each; `None` where the climate does not tell.
    pub winter: Vec<Option<WinterAhead>>,
}

/// The plan against one figure of the site.
#[derive(Debug, Clone, PartialEq)]
pub struct Against {
    /// Which figure.
    pub wish: Wish,
    /// It, °C.
    pub celsius: f64,
    /// The plan starts the machine then too.
    pub holds: bool,
    /// In words.
    pub text: Say,
}

/// When to plug in.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Timing {
    /// Latest switch-on before the shift, s, at the loss as computed.
    pub latest_s: f64,
    /// The same where the tank loses more.
    pub latest_high_s: Option<f64>,
    /// Energy of that, kWh.
    pub last_minute_kwh: f64,
    /// Energy of holding the target all night instead, kWh.
    pub hold_kwh: f64,
}

/// One plan over a winter.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct WinterAhead {
    /// Mornings on which the machine does not start without heat.
    pub mornings: f64,
    /// Heater on, h.
    pub heater_hours: Option<f64>,
    /// kWh.
    pub energy_kwh: Option<f64>,
    /// In the currency of the tariff.
    pub cost: Option<f64>,
    /// From counts of a record; else from monthly means.
    pub counted: bool,
}

pub(super) fn cold(case: &Case, decision: &Decision) -> Cold {
    let site = case.site.climate.as_ref();
    let minimum = case.site.minimum.as_celsius();
    let (chance, why) = match site.and_then(chances) {
        Some((mean, deviation)) => (Some(extremes::chance(mean, deviation, minimum)), None),
        None if site.is_some() => (None, Some("the climate holds no winter minima to tell it by")),
        None => (None, Some("no climate is named")),
    };
    Cold {
        which: which(case),
        chance_a_winter: chance,
        chance_ten_winters: chance.map(|chance| 1.0 - (1.0 - chance).powi(10)),
        why,
        against: site.map_or_else(Vec::new, |site| against(case, decision, site)),
        timing: decision.chosen().and_then(|plan| timing(case, decision, plan)),
        winter: decision.plans.iter().map(|plan| ahead(case, decision, plan)).collect(),
    }
}

/// Mean and standard deviation of the winter minima.
fn chances(site: &Site) -> Option<(f64, f64)> {
    if let Ok(winters) = Winters::new(site.winter.clone()) {
        return Some((winters.mean(), winters.deviation()));
    }
    let levels: Vec<(f64, f64)> =
        site.minima.once_in.iter().map(|level| (level.winters, level.celsius)).collect();
    extremes::from_levels(&levels)
}

fn which(case: &Case) -> Say {
    let place = case.site.climate.as_ref().map_or("", |site| site.title.as_str());
    let minimum = Figure::Temperature(case.site.minimum.as_celsius());
    let template = match case.site.minimum_how {
        MinimumHow::Given | MinimumHow::AsMinimum => {
            "the minimum, {minimum}, is a bare figure: it is taken as the 99.6 % value, so about 35 hours of a usual year are colder"
        }
        MinimumHow::Record | MinimumHow::Percentile | MinimumHow::ReturnLevel => {
            "the minimum, {minimum}, is the `{wish}` of {place}"
        }
        MinimumHow::Class => {
            "the minimum, {minimum}, is the low of the class {place}, not of a place"
        }
    };
    let wish = case.site.minimum_wish.map_or_else(String::new, |wish| wish.to_string());
    Say::fill(
        template,
        &[("minimum", minimum.into()), ("wish", wish.into()), ("place", place.into())],
    )
}

fn against(case: &Case, decision: &Decision, site: &Site) -> Vec<Against> {
    let Some(plan) = decision.chosen() else { return Vec::new() };
    let mut wishes = vec![Wish::Percent(99.0), Wish::Percent(99.6)];
    wishes.extend(site.minima.once_in.iter().map(|level| Wish::OnceIn(level.winters)));
    wishes.push(Wish::Record);
    wishes
        .into_iter()
        .filter_map(|wish| {
            let celsius = site.temperature(wish).ok()?.celsius;
            let (holds, text) = stands(case, decision, plan, celsius)?;
            Some(Against { wish, celsius, holds, text })
        })
        .collect()
}

/// Whether a plan starts the machine in another cold, and by how much it does or does not.
fn stands(case: &Case, decision: &Decision, plan: &Plan, celsius: f64) -> Option<(bool, Say)> {
    let sky = if case.site.clear_sky { case.policy.limits.clear_sky_k } else { 0.0 };
    let found = decision.oils.get(plan.oil)?;
    match plan.kind {
        PlanKind::StartCold | PlanKind::ChangeOil => {
            let spare = celsius - sky - found.start_floor.at_c?;
            Some((
                spare >= 0.0,
                Say::fill(
                    if spare >= 0.0 { "starts, {spare} over the floor" } else { "{short} short" },
                    &[
                        ("spare", Figure::Difference(spare).into()),
                        ("short", Figure::Difference(-spare).into()),
                    ],
                ),
            ))
        }
        PlanKind::Heat | PlanKind::ChangeAndHeat => {
            let text = format!("{} °C", shown(celsius));
            let colder = case
                .with(&[
                    Edit::new("site.minimum_temperature", &text),
                    Edit::new("site.heating_temperature", &text),
                ])
                .ok()?;
            let then = assess(&colder, colder.oils.get(plan.oil)?);
            if then.gels() {
                return Some((false, "the oil gels in hoses and lines".into()));
            }
            let heater = plan.heater_w?;
            Some(match (then.heating.status, then.heating.needed_w) {
                (HeatingStatus::NotNeeded, _) => (true, "starts without heat".into()),
                (_, Some(needed)) => (
                    needed <= heater,
                    Say::fill(
                        if needed <= heater {
                            "the heater is enough: {needed} of {heater}"
                        } else {
                            "the heater is late: it would take {needed}, it has {heater}"
                        },
                        &[
                            ("needed", Figure::Power(needed).into()),
                            ("heater", Figure::Power(heater).into()),
                        ],
                    ),
                ),
                _ => (false, "heat does not get it there".into()),
            })
        }
        _ => None,
    }
}

fn timing(case: &Case, decision: &Decision, plan: &Plan) -> Option<Timing> {
    if !matches!(plan.kind, PlanKind::Heat | PlanKind::ChangeAndHeat) {
        return None;
    }
    let heating = &decision.oils.get(plan.oil)?.heating;
    let hours = case.duty.parked_at.map_or(12.0, |at| at.hours_until(case.duty.shift_start));
    Some(Timing {
        latest_s: plan.ready_s?,
        latest_high_s: heating.time_high_s,
        last_minute_kwh: plan.energy_kwh?,
        hold_kwh: heating.hold_w? * hours / 1000.0,
    })
}

/// Colder than this nothing is counted, °C.
const COLDEST_C: f64 = -70.0;

/// A plan over the winter of the site.
fn ahead(case: &Case, decision: &Decision, plan: &Plan) -> Option<WinterAhead> {
    let site = case.site.climate.as_ref()?;
    let found: &Assessment = decision.oils.get(plan.oil)?;
    let floor = found.start_floor.at_c?;
    let hour = case.duty.shift_start.hours().max(1.0);
    let counted = site.mornings_below(floor).is_some();
    let below = |celsius: f64| {
        if counted {
            return site.mornings_below(celsius);
        }
        let months = site.monthly.as_ref()?;
        Some(months::mornings_below(celsius, hour, &months.mean_c, &months.daily_range_k))
    };
    let mornings = below(floor)?;
    let energy = match plan.kind {
        PlanKind::Heat | PlanKind::ChangeAndHeat | PlanKind::BlanketAndHold => {
            let target = found.heating.mean_target_c?;
            let design = target - found.tank_soak_c;
            let at_design = plan.energy_kwh?;
            let mut sum = 0.0;
            let mut warm = floor;
            while warm > COLDEST_C {
                let cold = (warm - 1.0).max(COLDEST_C);
                let share = (target - f64::midpoint(warm, cold)) / design;
                sum += (below(warm)? - below(cold)?).max(0.0) * at_design * share;
                warm = cold;
            }
            Some(sum)
        }
        PlanKind::StartCold | PlanKind::ChangeOil | PlanKind::StartWarmTank => Some(0.0),
        PlanKind::WholeMachineHeat | PlanKind::KeepRunning => None,
    };
    let heater_hours = match (energy, plan.heater_w) {
        (Some(_), Some(_)) if plan.kind == PlanKind::BlanketAndHold => {
            let night =
                case.duty.parked_at.map_or(12.0, |at| at.hours_until(case.duty.shift_start));
            Some(mornings * night)
        }
        (Some(energy), Some(heater)) if heater > 0.0 => Some(energy * 1000.0 / heater),
        (Some(energy), _) => Some(energy),
        _ => None,
    };
    Some(WinterAhead {
        mornings,
        heater_hours,
        energy_kwh: energy,
        cost: energy.zip(case.tariff).map(|(energy, tariff)| energy * tariff),
        counted,
    })
}
