//! Plans: the ways to get one oil started, each with its figures, and why it is not allowed.

use super::assess::{Assessment, Verdict};
use super::heating::{self, HeatingStatus, HeatingWhy};
use super::limits::Side;
use super::say::{Figure, Reason};
use crate::case::Case;
use crate::heat::{self, Chosen, Wanted};
use crate::source::{Method, Source};
use crate::words::words;

words! {
    /// A way to get the machine started.
    PlanKind: "plan" {
        StartCold = "start-cold",
        StartWarmTank = "start-warm-tank",
        ChangeOil = "change-oil",
        Heat = "heat",
        BlanketAndHold = "blanket-and-hold",
        ChangeAndHeat = "change-and-heat",
        WholeMachineHeat = "whole-machine-heat",
        KeepRunning = "keep-running",
    }
}

impl PlanKind {
    /// The plan in words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::StartCold => "start cold",
            Self::StartWarmTank => "start, tank warm",
            Self::ChangeOil => "change oil",
            Self::Heat => "heat tank",
            Self::BlanketAndHold => "cover and hold",
            Self::ChangeAndHeat => "change oil, heat",
            Self::WholeMachineHeat => "warm it all",
            Self::KeepRunning => "keep running",
        }
    }

    /// It starts the machine by itself: warm storage and running on are always left to the user.
    #[must_use]
    pub const fn starts(self) -> bool {
        !matches!(self, Self::WholeMachineHeat | Self::KeepRunning)
    }

    /// Heat goes into the tank.
    #[must_use]
    pub const fn heats(self) -> bool {
        matches!(self, Self::Heat | Self::ChangeAndHeat | Self::BlanketAndHold)
    }
}

/// One plan. Figures that do not exist are `None`.
#[derive(Debug, Clone, PartialEq)]
pub struct Plan {
    /// What it is.
    pub kind: PlanKind,
    /// Which oil of the case, from 0.
    pub oil: usize,
    /// Rated power of the heater, W.
    pub heater_w: Option<f64>,
    /// Rated powers of its elements, W.
    pub elements_w: Vec<f64>,
    /// Power to hold the target, W.
    pub hold_w: Option<f64>,
    /// Energy of one start, kWh; 0 where nothing is heated.
    pub energy_kwh: Option<f64>,
    /// From switching on to ready, s; 0 where nothing is waited for.
    pub ready_s: Option<f64>,
    /// It may be done.
    pub allowed: bool,
    /// Why not, or what to mind.
    pub why: Vec<Reason>,
}

/// Covering a tank and holding it warm through the night.
pub static HOLD: Method = Method {
    name: "1/U' = 1/U + blanket; heater for the hold at its likely worst",
    source: Source::common_practice("a blanket and a small heater left on through the night"),
};

/// All plans of one oil. `kept`: it is the oil in the machine.
pub(super) fn plans_of(case: &Case, at: usize, found: &Assessment, kept: bool) -> Vec<Plan> {
    let mut plans = vec![start(case, at, found, kept)];
    let suited = found.verdict != Verdict::NotSuited;
    if found.reasons.iter().any(|reason| reason.id == "pump-cold") {
        plans.push(start_warm(case, at, found, suited));
    }
    let asked = !matches!(found.heating.status, HeatingStatus::NotNeeded);
    if asked && (suited || kept) {
        plans.push(heat_tank(case, at, found, kept, suited));
        if found.heating.hold_w.is_some() {
            plans.push(hold(case, at, found, suited));
        }
    }
    plans
}

fn plan(kind: PlanKind, oil: usize) -> Plan {
    Plan {
        kind,
        oil,
        heater_w: None,
        elements_w: Vec::new(),
        hold_w: None,
        energy_kwh: None,
        ready_s: None,
        allowed: true,
        why: Vec::new(),
    }
}

/// Reasons of an assessment that forbid every plan with the oil.
fn forbidding(found: &Assessment) -> impl Iterator<Item = &Reason> {
    found.reasons.iter().filter(|reason| {
        matches!(reason.id, "start-limit-unattainable" | "too-thin-hot" | "not-biodegradable")
    })
}

fn start(case: &Case, at: usize, found: &Assessment, kept: bool) -> Plan {
    let mut plan = plan(if kept { PlanKind::StartCold } else { PlanKind::ChangeOil }, at);
    plan.allowed = matches!(found.verdict, Verdict::StartsCold | Verdict::StartsColdInletUnproven);
    plan.energy_kwh = plan.allowed.then_some(0.0);
    plan.ready_s = plan.energy_kwh;
    plan.why.extend(forbidding(found).cloned());
    if let Some(floor) = found.start_floor.at_c.filter(|floor| found.soak_c < *floor) {
        plan.why.push(Reason::new(
            "too-cold",
            "{soak} at the pump is under the start floor, {floor}",
            &[
                ("soak", Figure::Temperature(found.soak_c).into()),
                ("floor", Figure::Temperature(floor).into()),
            ],
        ));
    }
    plan.why.extend(
        found
            .reasons
            .iter()
            .filter(|r| matches!(r.id, "gels" | "inlet-unproven" | "little-in-hand"))
            .cloned(),
    );
    let in_hand = found.start_floor.at_c.map(|floor| found.soak_c - floor);
    if let Some(k) = in_hand.filter(|k| plan.allowed && *k >= case.policy.limits.in_hand_k) {
        plan.why.push(Reason::new(
            "in-hand",
            "{in_hand} over its start floor at the soak",
            &[("in_hand", Figure::Difference(k).into())],
        ));
    }
    plan
}

/// The tank kept its warmth of the day, the pump did not.
fn start_warm(case: &Case, at: usize, found: &Assessment, suited: bool) -> Plan {
    let mut plan = plan(PlanKind::StartWarmTank, at);
    // The gate is what the tank must be over, as for a heated one.
    let gate = found.start_floor.at_c.map(|floor| floor + case.policy.heat.gate_margin_k);
    // Only warmth that the tank kept of the day is there on the coldest morning.
    plan.allowed = suited
        && case.duty.credit_parked_heat
        && found.verdict == Verdict::NeedsHeat
        && gate.is_some_and(|gate| found.tank_soak_c >= gate);
    plan.energy_kwh = plan.allowed.then_some(0.0);
    plan.ready_s = plan.energy_kwh;
    if !case.duty.credit_parked_heat {
        plan.why.push(Reason::new(
            "colder-than-sized-for",
            "no heater is sized: at {tank}, the heating temperature, it starts, at {soak} it does not; size for the minimum (site.heating_temperature)",
            &[
                ("tank", Figure::Temperature(found.tank_soak_c).into()),
                ("soak", Figure::Temperature(found.soak_c).into()),
            ],
        ));
        return plan;
    }
    plan.why.push(Reason::new(
        "pump-cold",
        "the tank holds {tank}, but pump and hoses are at {soak}: clear the hose and warm the pump first",
        &[
            ("tank", Figure::Temperature(found.tank_soak_c).into()),
            ("soak", Figure::Temperature(found.soak_c).into()),
        ],
    ));
    plan
}

fn heat_tank(case: &Case, at: usize, found: &Assessment, kept: bool, suited: bool) -> Plan {
    let heating = &found.heating;
    let mut plan = plan(if kept { PlanKind::Heat } else { PlanKind::ChangeAndHeat }, at);
    plan.allowed = suited && heating.status == HeatingStatus::Sized;
    plan.heater_w = heating.heater_w;
    plan.elements_w.clone_from(&heating.elements_w);
    plan.hold_w = heating.hold_w;
    plan.energy_kwh = heating.energy_kwh;
    plan.ready_s = heating.time_s;
    plan.why.extend(forbidding(found).cloned());
    let wanted = heating.heater_w.unwrap_or(0.0);
    plan.why.extend(heating.whys.iter().map(|why| because(case, *why, wanted)));
    if plan.allowed && heating.tight {
        plan.why.push(Reason {
            id: "tight",
            text: "no reserve if the tank loses more than computed".into(),
        });
    }
    plan
}

/// Why a heater of so many watts, rated, cannot be; a circuit that does not carry it with its
/// figures.
fn because(case: &Case, why: HeatingWhy, wanted_w: f64) -> Reason {
    let circuit = heating::circuit(case).filter(|_| why == HeatingWhy::CircuitTooSmall);
    let Some(circuit) = circuit else { return Reason { id: why.id(), text: why.text().into() } };
    let drawn = wanted_w * heating::delivered(case, Some(circuit));
    let carried = circuit.continuous_w(&case.policy.heat);
    let mut figures =
        vec![("drawn", Figure::Power(drawn).into()), ("carried", Figure::Power(carried).into())];
    let text = if circuit.other_w > 0.0 {
        figures.push(("other", Figure::Power(circuit.other_w).into()));
        "{drawn} are wanted, and for hours the circuit carries {carried} beside {other} of other load"
    } else {
        "{drawn} are wanted, and for hours the circuit carries {carried}"
    };
    Reason::new(why.id(), text, &figures)
}

/// A blanket, and a small heater through the night.
fn hold(case: &Case, at: usize, found: &Assessment, suited: bool) -> Plan {
    let policy = &case.policy.heat;
    let heating = &found.heating;
    let mut plan = plan(PlanKind::BlanketAndHold, at);
    let (Some(bare), Some(u)) = (heating.hold_w, heating.u_value) else {
        plan.allowed = false;
        return plan;
    };
    let covered =
        case.reservoir.insulation.is_some_and(|(there, _)| there.as_mm() >= policy.blanket_mm);
    let blanket = policy.blanket_mm / 1000.0 / policy.blanket_w_m_k;
    let held = if covered { bare } else { bare / (1.0 + u * blanket) };
    let hours = case.duty.parked_at.map_or(12.0, |at| at.hours_until(case.duty.shift_start));
    plan.hold_w = Some(held);
    plan.energy_kwh = Some(held * hours / 1000.0);
    plan.ready_s = Some(0.0);
    plan.why.extend(forbidding(found).cloned());
    let kept_out = [
        HeatingWhy::Gels,
        HeatingWhy::AboveSuction,
        HeatingWhy::TargetTooHot,
        HeatingWhy::BelowPour,
        HeatingWhy::SkinTooHot,
        HeatingWhy::StartFloorUnattainable,
    ];
    let fails: Vec<HeatingWhy> =
        heating.whys.iter().copied().filter(|why| kept_out.contains(why)).collect();
    plan.why.extend(fails.iter().map(|why| because(case, *why, 0.0)));
    plan.allowed = suited && fails.is_empty();
    let circuit = heating::circuit(case);
    let delivered = heating::delivered(case, circuit);
    let pad = case.element.kind == heat::ElementKind::Pad;
    let sizes: Vec<f64> = case.heater_sizes.iter().map(|size| size.as_watts()).collect();
    let least = policy.loss_uncertainty * held;
    let chosen = heat::choose(
        &sizes,
        Wanted {
            needed_w: least,
            needed_high_w: least,
            carried_w: circuit.map_or(f64::INFINITY, |circuit| circuit.continuous_w(policy)),
            surface_w: if pad {
                heat::pad_most_w(case.reservoir.flat_surface.as_m2(), policy)
            } else {
                f64::INFINITY
            },
            delivered,
        },
    );
    let mut fail = |why: HeatingWhy, wanted: f64| {
        plan.allowed = false;
        if !plan.why.iter().any(|reason| reason.id == why.id()) {
            plan.why.push(because(case, why, wanted));
        }
    };
    match chosen {
        Chosen::Fits { elements, .. } => {
            plan.heater_w = Some(elements.iter().sum());
            plan.elements_w = elements;
        }
        Chosen::CircuitTooSmall { elements } => {
            let wanted = elements.iter().sum();
            fail(HeatingWhy::CircuitTooSmall, wanted);
            plan.heater_w = Some(wanted);
            plan.elements_w = elements;
        }
        Chosen::SurfaceTooSmall => fail(HeatingWhy::SurfaceTooSmall, 0.0),
        Chosen::NoSize => fail(HeatingWhy::NoHeaterSize, 0.0),
    }
    if !covered {
        plan.why.push(Reason::new(
            "blanket",
            "with {blanket} of insulation round the tank",
            &[("blanket", Figure::Length(policy.blanket_mm).into())],
        ));
    }
    plan
}

/// Warm storage or a whole-machine heater: neither is sized here.
pub(super) fn whole_machine(at: usize, found: &Assessment) -> Plan {
    let mut plan = plan(PlanKind::WholeMachineHeat, at);
    plan.allowed = found.start_floor.at_c.is_some() && found.verdict != Verdict::NotSuited;
    plan.why.extend(forbidding(found).cloned());
    if let Some(floor) = found.start_floor.at_c {
        plan.why.push(Reason::new(
            "sized-elsewhere",
            "shelter or hot air until pump, hoses and tank are over {floor}; its size is outside this advice",
            &[("floor", Figure::Temperature(floor).into())],
        ));
    }
    plan
}

/// Not switching off.
pub(super) fn keep_running(case: &Case, at: usize, found: &Assessment) -> Plan {
    let mut plan = plan(PlanKind::KeepRunning, at);
    plan.why.extend(forbidding(found).cloned());
    let gate = found.start_floor.at_c.map(|floor| floor + case.policy.heat.gate_margin_k);
    let parked = case.duty.parked_oil.map(crate::quantity::Temperature::as_celsius);
    match (gate, parked) {
        (Some(gate), Some(parked)) if parked >= gate => {
            plan.allowed = found.verdict != Verdict::NotSuited;
            plan.why.push(Reason::new(
                "kept-warm",
                "parked at {parked}, it must not cool under {gate}",
                &[
                    ("parked", Figure::Temperature(parked).into()),
                    ("gate", Figure::Temperature(gate).into()),
                ],
            ));
        }
        (Some(gate), Some(parked)) => {
            plan.allowed = false;
            plan.why.push(Reason::new(
                "parked-cold",
                "parked at {parked}, it is under {gate} already",
                &[
                    ("parked", Figure::Temperature(parked).into()),
                    ("gate", Figure::Temperature(gate).into()),
                ],
            ));
        }
        (Some(_), None) => {
            plan.allowed = false;
            plan.why.push(Reason {
                id: "parked-oil-unknown",
                text: "how warm the oil is when parked is not given (duty.parked_oil)".into(),
            });
        }
        (None, _) => plan.allowed = false,
    }
    plan
}

impl Assessment {
    /// Temperature in hand over the start floor at the soak, K.
    #[must_use]
    pub fn in_hand_k(&self) -> Option<f64> {
        self.start_floor.at_c.map(|floor| self.soak_c - floor)
    }

    /// The oil sets in hoses and pilot lines at the soak.
    #[must_use]
    pub fn gels(&self) -> bool {
        self.limits.iter().any(|r| r.side == Side::Line && r.met_at_soak == Some(false))
    }
}
