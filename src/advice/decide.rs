//! The second tier: every oil of a case, all plans side by side, and the choice.

use super::assess::{Assessment, Verdict, assess};
use super::plan::{self, Plan, PlanKind};
use super::say::{Figure, Reason};
use crate::case::{Case, Clock, Prefer};
use crate::oil::{Base, Oil};
use crate::pump::PumpKind;

/// All that a case comes to, without procedure and cautions.
#[derive(Debug, Clone, PartialEq)]
pub struct Decision {
    /// One assessment an oil, in the order of the case.
    pub oils: Vec<Assessment>,
    /// The oil in the machine: the one marked so, or the only one.
    pub in_service: Option<usize>,
    /// All plans.
    pub plans: Vec<Plan>,
    /// The choice.
    pub choice: Choice,
}

/// The plan chosen.
#[derive(Debug, Clone, PartialEq)]
pub struct Choice {
    /// Its place among the plans; `None` where none is allowed.
    pub plan: Option<usize>,
    /// Switch on at, so many days before the shift's.
    pub switch_on: Option<(Clock, u32)>,
    /// Why this one.
    pub why: Vec<Reason>,
}

impl Decision {
    /// A tank heater would start it, were there a circuit that carries it.
    #[must_use]
    pub fn lacks_circuit(&self) -> bool {
        lacks_circuit(&self.plans)
    }

    /// The plan chosen.
    #[must_use]
    pub fn chosen(&self) -> Option<&Plan> {
        self.plans.get(self.choice.plan?)
    }

    /// A plan that starts the machine by itself is allowed.
    #[must_use]
    pub fn starts(&self) -> bool {
        self.plans.iter().any(|plan| plan.allowed && plan.kind.starts())
    }

    /// The oil the advice turns on: of the plan chosen, else the one in service, else the one that
    /// comes nearest.
    #[must_use]
    pub fn focus(&self) -> Option<usize> {
        self.chosen().map(|plan| plan.oil).or(self.in_service).or_else(|| nearest(&self.oils, &[]))
    }
}

/// Decides a case.
///
/// # Example
/// ```
/// use coldsump::{advice, case::CaseFile};
/// let file = CaseFile::read("loader.toml", r#"
///     format = 1
///     site.minimum_temperature = "-20 °C"
///     pump.kind = "axial-piston"
///     reservoir.oil_volume = "200 L"
///     duty.time_to_warm = "4 h"
///     [[oil]]
///     in_service = true
///     class = "HM 46"
///     viscosity = { "40 °C" = "46 cSt", "100 °C" = "6.8 cSt" }
///     pour_point = "-24 °C"
///     [[oil]]
///     class = "HV 22"
///     viscosity = { "40 °C" = "22 cSt", "100 °C" = "4.9 cSt" }
///     pour_point = "-42 °C"
/// "#);
/// let case = file.check().unwrap();
/// let decision = advice::decide(&case);
/// let chosen = decision.chosen().unwrap();
/// assert!(chosen.allowed && decision.starts());
/// ```
#[must_use]
pub fn decide(case: &Case) -> Decision {
    let oils: Vec<Assessment> = case.oils.iter().map(|oil| assess(case, oil)).collect();
    let in_service =
        case.oils.iter().position(Oil::in_service).or_else(|| (case.oils.len() == 1).then_some(0));
    let mut plans: Vec<Plan> = Vec::new();
    for (at, found) in oils.iter().enumerate() {
        plans.extend(plan::plans_of(case, at, found, in_service == Some(at)));
    }
    let stuck =
        !plans.iter().any(|plan| plan.allowed && plan.kind.starts() && may_choose(case, plan));
    let reference: Vec<bool> = case.oils.iter().map(Oil::reference_only).collect();
    let focus = in_service.or_else(|| nearest(&oils, &reference));
    if let Some((at, found)) = focus.and_then(|at| oils.get(at).map(|found| (at, found))) {
        let deep = found.soak_c < DEEP_COLD_C;
        if deep || stuck || found.verdict == Verdict::NeedsWholeMachineHeat {
            plans.push(plan::whole_machine(at, found));
            plans.push(plan::keep_running(case, at, found));
        }
    }
    let choice = choose(case, &oils, &plans, in_service);
    Decision { oils, in_service, plans, choice }
}

/// Below this soak, °C, warm storage and running on are always shown: standard hose ends here.
pub(super) const DEEP_COLD_C: f64 = -40.0;

/// The oil with the lowest start floor among those suited.
fn nearest(oils: &[Assessment], reference: &[bool]) -> Option<usize> {
    oils.iter()
        .enumerate()
        .filter(|(at, found)| {
            found.verdict != Verdict::NotSuited && !reference.get(*at).copied().unwrap_or(false)
        })
        .min_by(|a, b| {
            let floor = |found: &Assessment| found.start_floor.at_c.unwrap_or(f64::INFINITY);
            floor(a.1).total_cmp(&floor(b.1))
        })
        .map(|(at, _)| at)
}

fn may_choose(case: &Case, plan: &Plan) -> bool {
    case.oils.get(plan.oil).is_some_and(|oil| !oil.reference_only())
}

/// Least viscosity at the hottest oil, mm²/s on the thin edge, that a pump kind likes.
const fn hot_wish(kind: PumpKind) -> f64 {
    match kind {
        PumpKind::Vane => 13.0,
        PumpKind::Gerotor => 12.0,
        _ => 16.0,
    }
}

/// What a plan is ordered by: group, hot side, figure, base.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
struct Rank {
    group: u8,
    hot_side: u8,
    figure: f64,
    synthetic: bool,
}

fn rank(case: &Case, oils: &[Assessment], plan: &Plan) -> Option<Rank> {
    let (oil, found) = (case.oils.get(plan.oil)?, oils.get(plan.oil)?);
    if !plan.allowed || oil.reference_only() {
        return None;
    }
    let ample = found.in_hand_k().is_some_and(|k| k >= case.policy.limits.in_hand_k);
    let group = match plan.kind {
        PlanKind::StartCold | PlanKind::ChangeOil if ample => 1,
        PlanKind::Heat | PlanKind::ChangeAndHeat | PlanKind::StartWarmTank => 2,
        PlanKind::BlanketAndHold => 3,
        PlanKind::StartCold | PlanKind::ChangeOil => 4,
        PlanKind::KeepRunning => 5,
        PlanKind::WholeMachineHeat => 6,
    };
    let likes = found.low_at_max >= hot_wish(case.pump.kind);
    let no_caution = found.low_at_max >= case.pump.viscosity_min.as_mm2_per_s();
    let cold = matches!(group, 1 | 4);
    let hot_side = match (likes, cold, no_caution) {
        (true, ..) => 0,
        (false, true, _) | (false, false, true) => 1,
        (false, false, false) => 2,
    };
    // Rounded, so that what nobody could tell apart is a tie.
    let figure = if cold {
        if likes {
            (found.work_floor.at_c.unwrap_or(1e3) * 10.0).round()
        } else {
            -(found.low_at_max * 100.0).round()
        }
    } else {
        (plan.energy_kwh.unwrap_or(1e6) * 100.0).round()
    };
    let synthetic = !matches!(oil.base(), Base::Mineral | Base::PolymerThickened);
    Some(Rank { group, hot_side, figure, synthetic })
}

/// Saved energy that pays for a change of oil: so much of what is spent, and kWh a start.
const CHANGE_SHARE: f64 = 0.25;
const CHANGE_KWH: f64 = 1.0;

fn choose(case: &Case, oils: &[Assessment], plans: &[Plan], in_service: Option<usize>) -> Choice {
    let best = |wanted: &dyn Fn(&Plan) -> bool| {
        plans
            .iter()
            .enumerate()
            .filter(|(_, plan)| wanted(plan))
            .filter_map(|(at, plan)| Some((at, rank(case, oils, plan)?)))
            .min_by(|a, b| a.1.partial_cmp(&b.1).unwrap_or(std::cmp::Ordering::Equal))
            .map(|(at, rank)| (at, rank.group))
    };
    let Some((mut at, group)) = best(&|_| true) else {
        return Choice { plan: None, switch_on: None, why: vec![none_allowed(oils)] };
    };
    let mut why = Vec::new();
    let kept = best(&|plan| Some(plan.oil) == in_service && plan.kind.starts()).map(|(at, _)| at);
    let energy = |at: usize| plans.get(at).and_then(|plan| plan.energy_kwh);
    let oil_of = |at: usize| plans.get(at).map(|plan| plan.oil);
    if let Some(kept) = kept.filter(|kept| oil_of(*kept) != oil_of(at)) {
        let spent = energy(kept).unwrap_or(0.0);
        let saved = spent - energy(at).unwrap_or(0.0);
        let pays = group < 5 && saved > CHANGE_SHARE * spent && saved > CHANGE_KWH;
        if case.duty.prefer == Prefer::Heater {
            why.push(Reason {
                id: "heater-preferred",
                text: "the oil in service is kept, as asked for (duty.prefer)".into(),
            });
            at = kept;
        } else if pays {
            why.push(Reason::new(
                "change-saves",
                "another oil saves {saved} of {spent} a start",
                &[("saved", Figure::Energy(saved).into()), ("spent", Figure::Energy(spent).into())],
            ));
        } else {
            why.push(Reason::new(
                "kept",
                "the oil in service is kept: another would save no more than {saved} a start",
                &[("saved", Figure::Energy(saved.max(0.0)).into())],
            ));
            at = kept;
        }
    } else if in_service.is_some() && kept.is_none() && group < 5 {
        why.push(Reason {
            id: "in-service-has-no-plan",
            text: "no plan is allowed for the oil in service".into(),
        });
    }
    why.extend(because(case, oils, plans, at));
    let switch_on = plans.get(at).and_then(|plan| switch_on(case, plan));
    Choice { plan: Some(at), switch_on, why }
}

fn lacks_circuit(plans: &[Plan]) -> bool {
    plans.iter().any(|plan| {
        matches!(plan.kind, PlanKind::Heat | PlanKind::ChangeAndHeat)
            && !plan.why.is_empty()
            && plan.why.iter().all(|reason| reason.id == "circuit-too-small")
    })
}

/// Why the plan wins within its group.
fn because(case: &Case, oils: &[Assessment], plans: &[Plan], at: usize) -> Vec<Reason> {
    let Some(plan) = plans.get(at) else { return Vec::new() };
    let Some(found) = oils.get(plan.oil) else { return Vec::new() };
    let mut why = Vec::new();
    match plan.kind {
        PlanKind::StartCold | PlanKind::ChangeOil => {
            if let Some(k) = found.in_hand_k() {
                why.push(Reason::new(
                    "starts-cold",
                    "starts with {in_hand} over its floor",
                    &[("in_hand", Figure::Difference(k).into())],
                ));
            }
        }
        PlanKind::Heat | PlanKind::ChangeAndHeat | PlanKind::BlanketAndHold => {
            let colder =
                plans.iter().filter_map(|plan| rank(case, oils, plan)).any(|rank| rank.group == 1);
            if !colder {
                why.push(Reason::new(
                    "none-starts-cold",
                    "none of the oils starts cold with {in_hand} in hand",
                    &[("in_hand", Figure::Difference(case.policy.limits.in_hand_k).into())],
                ));
            }
            if let Some(energy) = plan.energy_kwh {
                why.push(Reason::new(
                    "heated",
                    "heating takes {energy} a start",
                    &[("energy", Figure::Energy(energy).into())],
                ));
            }
        }
        PlanKind::StartWarmTank => why.push(Reason {
            id: "tank-warm",
            text: "the tank keeps enough warmth of the day; only hose and pump are cold".into(),
        }),
        PlanKind::WholeMachineHeat | PlanKind::KeepRunning => why.push(Reason {
            id: "nothing-else",
            text: if lacks_circuit(plans) {
                "no oil starts it cold, and the circuit does not carry the tank heater that would"
            } else {
                "no oil and no tank heater starts it here"
            }
            .into(),
        }),
    }
    let low = found.low_at_max;
    if plan.kind.starts() && low < hot_wish(case.pump.kind) {
        why.push(Reason::new(
            "thin-at-hottest",
            "at {max} it may thin to {low}; no oil that starts this way keeps {wish}",
            &[
                ("max", Figure::Temperature(case.duty.oil_temperature_max.as_celsius()).into()),
                ("low", Figure::Viscosity(low).into()),
                ("wish", Figure::Viscosity(hot_wish(case.pump.kind)).into()),
            ],
        ));
    }
    why
}

fn none_allowed(oils: &[Assessment]) -> Reason {
    if oils.iter().all(|found| found.verdict == Verdict::NotSuited) {
        Reason { id: "no-oil-suited", text: "none of the oils suits this pump".into() }
    } else {
        Reason { id: "nothing-allowed", text: "no plan is allowed".into() }
    }
}

/// When to switch on, down to the full five minutes.
fn switch_on(case: &Case, plan: &Plan) -> Option<(Clock, u32)> {
    match plan.kind {
        PlanKind::Heat | PlanKind::ChangeAndHeat => {
            Some(case.duty.shift_start.before(plan.ready_s?))
        }
        PlanKind::BlanketAndHold => {
            let hours =
                case.duty.parked_at.map_or(12.0, |at| at.hours_until(case.duty.shift_start));
            Some(case.duty.shift_start.before(hours * 3600.0))
        }
        _ => None,
    }
}
