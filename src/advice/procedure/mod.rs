//! The start-up procedure of the plan chosen, computed for the case.
//!
//! Invariants: no step turns the pump before a gate that is at the start floor or over it; without an
//! allowed plan there is no step that turns it at all.

mod after;
mod before;
mod morning;

pub(super) use after::RECORD;

use super::ask_for::AskFor;
use super::assess::Assessment;
use super::decide::Decision;
use super::limits::Edge;
use super::plan::{Plan, PlanKind};
use super::say::{Fill, Say};
use super::setup::Setup;
use crate::case::Case;
use crate::oil::Oil;
use crate::words::words;

words! {
    /// A phase of the procedure.
    Phase: "phase" {
        Season = "season",
        Evening = "evening",
        WalkRound = "walk-round",
        Crank = "crank",
        FirstTurn = "first-turn",
        Circulate = "circulate",
        Functions = "functions",
        Load = "load",
        ShutDown = "shut-down",
        NotReached = "not-reached",
    }
}

impl Phase {
    /// The phase as a heading.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Season => "Before the season",
            Self::Evening => "The evening before",
            Self::WalkRound => "In the morning, before touching the key",
            Self::Crank => "Before the pump is turned",
            Self::FirstTurn => "The first turn",
            Self::Circulate => "Circulate",
            Self::Functions => "Functions",
            Self::Load => "Load",
            Self::ShutDown => "Shut down for the next cold night",
            Self::NotReached => "When a reading is not reached",
        }
    }
}

words! {
    /// What a gate reads.
    Reading: "reading" {
        OilAtSuction = "oil-at-suction",
        InletVacuum = "inlet-vacuum",
        PumpSpeed = "pump-speed",
        PumpBody = "pump-body",
        Time = "time",
    }
}

/// A bound of a gate.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Bound {
    /// At least, °C.
    AtLeastC(f64),
    /// Oil hotter than the pump by at most, K.
    AtMostK(f64),
    /// Vacuum at most, kPa under the local air.
    AtMostKpa(f64),
    /// Speed at most, rpm.
    AtMostRpm(f64),
    /// At least, s.
    AtLeastS(f64),
}

/// A reading that must be true before the next step.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Gate {
    /// What is read.
    pub reading: Reading,
    /// What it must be.
    pub bound: Bound,
}

/// One step.
#[derive(Debug, Clone, PartialEq)]
pub struct Step {
    /// Its phase.
    pub phase: Phase,
    /// What to do.
    pub text: Say,
    /// What must read true before the next step.
    pub gate: Option<Gate>,
    /// How long it should take, s.
    pub expect_s: Option<f64>,
    /// When to stop.
    pub stop_if: Vec<Say>,
    /// Cautions that belong to it, by id.
    pub cautions: Vec<&'static str>,
}

impl Step {
    fn new(phase: Phase, template: &str, fills: &[(&'static str, Fill)]) -> Self {
        Self {
            phase,
            text: Say::fill(template, fills),
            gate: None,
            expect_s: None,
            stop_if: Vec::new(),
            cautions: Vec::new(),
        }
    }

    fn gate(mut self, reading: Reading, bound: Bound) -> Self {
        self.gate = Some(Gate { reading, bound });
        self
    }

    fn expect(mut self, seconds: Option<f64>) -> Self {
        self.expect_s = seconds;
        self
    }

    fn stop(mut self, template: &str, fills: &[(&'static str, Fill)]) -> Self {
        self.stop_if.push(Say::fill(template, fills));
        self
    }

    fn mind(mut self, cautions: &[&'static str]) -> Self {
        self.cautions.extend_from_slice(cautions);
        self
    }
}

/// What the steps are written from.
pub(super) struct Scene<'a> {
    pub(super) case: &'a Case,
    pub(super) decision: &'a Decision,
    pub(super) ask_for: &'a AskFor,
    pub(super) plan: Option<&'a Plan>,
    pub(super) oil: &'a Oil,
    pub(super) found: &'a Assessment,
    pub(super) setup: Setup<'a>,
}

impl<'a> Scene<'a> {
    /// The scene of a decision; `None` where a case has no oils.
    pub(super) fn new(case: &'a Case, decision: &'a Decision, ask_for: &'a AskFor) -> Option<Self> {
        let at = decision.focus().unwrap_or(0);
        let oil = case.oils.get(at)?;
        Some(Self {
            case,
            decision,
            ask_for,
            plan: decision.chosen(),
            oil,
            found: decision.oils.get(at)?,
            setup: Setup::new(case, oil),
        })
    }

    pub(super) fn is(&self, kinds: &[PlanKind]) -> bool {
        self.plan.is_some_and(|plan| kinds.contains(&plan.kind))
    }

    /// The tank is heated by this plan.
    pub(super) fn heated(&self) -> bool {
        self.plan.is_some_and(|plan| plan.kind.heats())
    }

    /// The oil in the tank is warmer than pump and hoses.
    pub(super) fn warm_tank(&self) -> bool {
        self.heated() || self.is(&[PlanKind::StartWarmTank])
    }

    /// The plan puts another oil into the machine.
    pub(super) fn changed(&self) -> bool {
        self.plan
            .is_some_and(|plan| plan.kind.starts() && Some(plan.oil) != self.decision.in_service)
    }

    /// The machine never stops, so nothing of it soaks through.
    pub(super) fn keeps_running(&self) -> bool {
        self.is(&[PlanKind::KeepRunning])
    }

    /// Oil at the suction before the pump may be turned, °C: the start floor and the margin of the
    /// gate, or the floor alone where a cold start has less than that in hand.
    pub(super) fn gate_c(&self) -> Option<f64> {
        let floor = self.found.start_floor.at_c?;
        let margin = self.case.policy.heat.gate_margin_k;
        let cold = self.is(&[PlanKind::StartCold, PlanKind::ChangeOil]);
        let short = self.found.soak_c < floor + margin;
        Some(if cold && short { floor } else { floor + margin })
    }

    /// Oil hotter than the pump body at the first turn, K.
    pub(super) fn pump_difference_k(&self) -> f64 {
        match self.plan.map(|plan| plan.kind) {
            Some(PlanKind::StartWarmTank) => self.found.tank_soak_c - self.found.soak_c,
            Some(kind) if kind.heats() => {
                self.found.heating.thermostat_c.unwrap_or(self.found.soak_c) - self.found.soak_c
            }
            _ => 0.0,
        }
        .max(0.0)
    }

    /// Vacuum at the pump inlet that its start limit leaves here, kPa under the local air.
    pub(super) fn vacuum_limit_kpa(&self) -> f64 {
        self.setup.atmosphere_kpa - self.case.pump.inlet_start_min.as_kpa()
    }

    /// Vacuum expected at the gate at start speed, kPa; `None` where the line is not known.
    pub(super) fn vacuum_at_gate_kpa(&self) -> Option<f64> {
        let rpm = self.case.pump.start_speed.as_rpm();
        let inlet = self.setup.inlet_kpa(Edge::Thick, rpm, self.gate_c()?)?;
        Some(self.setup.atmosphere_kpa - inlet)
    }

    /// Highest speed at a temperature by the start limit, up to the work speed.
    pub(super) fn speed_max_rpm(&self, celsius: f64) -> Option<f64> {
        self.speed(celsius, self.case.pump.inlet_start_min.as_kpa())
    }

    /// Highest speed at a temperature by the work limit, up to the work speed.
    pub(super) fn work_speed_max_rpm(&self, celsius: f64) -> Option<f64> {
        self.speed(celsius, self.case.pump.inlet_work_min.as_kpa())
    }

    fn speed(&self, celsius: f64, least_kpa: f64) -> Option<f64> {
        self.setup.inlet.as_ref()?.highest_speed(
            self.setup.flow_per_rpm,
            self.setup.viscosity(Edge::Thick, celsius),
            self.setup.bulk.density(celsius),
            least_kpa,
            self.case.pump.work_speed.as_rpm(),
        )
    }
}

/// All steps, in order.
pub(super) fn procedure(scene: &Scene<'_>) -> Vec<Step> {
    let mut steps = before::season(scene);
    if scene.plan.is_some() {
        steps.extend(before::evening(scene));
        steps.extend(morning::walk_round(scene));
        steps.extend(morning::crank(scene));
        if !scene.keeps_running() {
            steps.extend(morning::first_turn(scene));
        }
        steps.extend(morning::circulate(scene));
        steps.extend(morning::functions(scene));
        steps.extend(morning::load(scene));
        steps.extend(after::shut_down(scene));
    }
    steps.extend(after::not_reached(scene));
    steps
}
