//! What a machine of a fleet comes to.

use crate::advice::{self, Decision, Plan};
use crate::case::{Case, Clock};

/// One oil a machine can be run on.
#[derive(Debug, Clone, PartialEq)]
pub struct OilChoice {
    /// Its name; the class where it has no name of its own.
    pub oil: String,
    /// Energy of a start with the best plan allowed, kWh.
    pub energy_kwh: f64,
}

/// One machine, decided.
#[derive(Debug, Clone)]
pub struct Machine {
    /// Its name.
    pub name: String,
    /// How many alike.
    pub count: u32,
    /// Oil in service, else the one advised on.
    pub oil: String,
    /// Its verdict.
    pub verdict: &'static str,
    /// Floors, °C.
    pub start_floor_c: Option<f64>,
    /// What sets the start floor.
    pub set_by: &'static str,
    /// Light floor, °C.
    pub light_floor_c: Option<f64>,
    /// Work floor, °C.
    pub work_floor_c: Option<f64>,
    /// The plan chosen.
    pub plan: Option<&'static str>,
    /// On which oil.
    pub plan_oil: Option<String>,
    /// Heater, W.
    pub heater_w: Option<f64>,
    /// Power to hold, W.
    pub hold_w: Option<f64>,
    /// Energy a start, kWh.
    pub energy_kwh: Option<f64>,
    /// Warm-up, s.
    pub ready_s: Option<f64>,
    /// Heater on, and so many days before.
    pub switch_on: Option<(Clock, u32)>,
    /// Shift start.
    pub shift: Clock,
    /// An allowed plan starts it.
    pub starts: bool,
    /// Oils that start it by an allowed plan, with the energy of a start.
    pub oils: Vec<OilChoice>,
}

impl Machine {
    /// Decides a case.
    #[must_use]
    pub fn decide(name: &str, count: u32, case: &Case) -> Self {
        let decision = advice::decide(case);
        Self::from_decision(name, count, case, &decision)
    }

    /// From a decision.
    #[must_use]
    pub fn from_decision(name: &str, count: u32, case: &Case, decision: &Decision) -> Self {
        let at = decision.in_service.or_else(|| decision.focus()).unwrap_or(0);
        let found = decision.oils.get(at);
        let named = |at: usize| case.oils.get(at).map(oil_name);
        let chosen: Option<&Plan> = decision.chosen();
        let mut oils: Vec<OilChoice> = Vec::new();
        for plan in decision.plans.iter().filter(|plan| plan.allowed && plan.kind.starts()) {
            let Some(oil) = case.oils.get(plan.oil).filter(|oil| !oil.reference_only()) else {
                continue;
            };
            let (oil, energy) = (oil_name(oil), plan.energy_kwh.unwrap_or(0.0));
            match oils.iter_mut().find(|choice| choice.oil == oil) {
                Some(choice) => choice.energy_kwh = choice.energy_kwh.min(energy),
                None => oils.push(OilChoice { oil, energy_kwh: energy }),
            }
        }
        Self {
            name: name.to_owned(),
            count,
            oil: named(at).unwrap_or_default(),
            verdict: found.map_or("not-suited", |found| found.verdict.id()),
            start_floor_c: found.and_then(|found| found.start_floor.at_c),
            set_by: found.and_then(|found| found.start_floor.set_by).map_or("", |by| by.id()),
            light_floor_c: found.and_then(|found| found.light_floor.at_c),
            work_floor_c: found.and_then(|found| found.work_floor.at_c),
            plan: chosen.map(|plan| plan.kind.id()),
            plan_oil: chosen.and_then(|plan| named(plan.oil)),
            heater_w: chosen.and_then(|plan| plan.heater_w),
            hold_w: chosen.and_then(|plan| plan.hold_w),
            energy_kwh: chosen.and_then(|plan| plan.energy_kwh),
            ready_s: chosen.and_then(|plan| plan.ready_s),
            switch_on: decision.choice.switch_on,
            shift: case.duty.shift_start,
            starts: decision.starts(),
            oils,
        }
    }
}

/// What an oil is stocked by: its class where it has one, else its name.
fn oil_name(oil: &crate::oil::Oil) -> String {
    oil.class().unwrap_or_else(|| oil.name()).replace('-', " ")
}
