//! How every number of the oils was reached: method, source, reach, by JSON pointer.
//!
//! Invariant: every number under `oils` in the JSON has one entry here (a test walks them all).

use super::assess::{Assessment, Floor};
use super::decide::Decision;
use super::heating::Tank;
use super::limits::{LIMITS, LimitId};
use super::setup::Setup;
use crate::case::Case;
use crate::heat;
use crate::oil::{self, Oil};
use crate::pump;
use crate::source::{Method, Source};

/// How one number was reached.
#[derive(Debug, Clone, PartialEq)]
pub struct Evidence {
    /// JSON pointer of the number.
    pub at: String,
    /// The method, with its source.
    pub method: &'static Method,
    /// How far the viscosity line was stretched for it, or how sure it is.
    pub reach: &'static str,
}

/// The soak.
pub static SOAK: Method = Method {
    name: "the site minimum, less the clear-sky allowance: pump, hoses and lines soak through",
    source: Source::judgement("lag is never credited to small parts"),
};

/// The thermostat.
pub static THERMOSTAT: Method = Method {
    name: "target + sensor + hysteresis, up to the next 5 K",
    source: Source::judgement("sensor 3 K, hysteresis 5 K"),
};

/// Texts that name a figure of a reason.
static REASON: Method = Method {
    name: "the figure the reason names, reached as the limit, floor or heating beside it",
    source: Source::judgement("see the figure's own entry"),
};

struct Desk {
    base: String,
    out: Vec<Evidence>,
}

impl Desk {
    fn put(&mut self, path: &str, there: bool, method: &'static Method, reach: &'static str) {
        if there {
            self.out.push(Evidence { at: format!("{}/{path}", self.base), method, reach });
        }
    }
}

/// Loss of a tank is good to this only.
const LOSS: &str = "loss good to 40 %";
const GIVEN: &str = "exact";

pub(super) fn evidence(case: &Case, decision: &Decision) -> Vec<Evidence> {
    let mut out = Vec::new();
    for (at, (oil, found)) in case.oils.iter().zip(&decision.oils).enumerate() {
        let mut desk = Desk { base: format!("/oils/{at}"), out };
        one(case, oil, found, &mut desk);
        out = desk.out;
    }
    out
}

fn one(case: &Case, oil: &Oil, found: &Assessment, desk: &mut Desk) {
    let setup = Setup::new(case, oil);
    let reach_at = |t: f64| oil.estimate(t).reach.id();
    desk.put("viscosity_index", oil.viscosity_index().is_some(), &oil::D2270, GIVEN);
    desk.put("soak_c", true, &SOAK, GIVEN);
    let parked = case.duty.credit_parked_heat;
    desk.put("tank_soak_c", true, if parked { &heat::PARKED } else { &SOAK }, LOSS);
    let at_soak = &found.at_soak;
    let soak = at_soak.reach.id();
    desk.put("viscosity_at_soak/low_mm2_s", at_soak.low.is_some(), &oil::LIKELY_RANGE, soak);
    desk.put("viscosity_at_soak/expected_mm2_s", at_soak.expected.is_some(), &oil::D341, soak);
    desk.put("viscosity_at_soak/high_mm2_s", at_soak.high.is_some(), &oil::LIKELY_RANGE, soak);
    let hot = reach_at(case.duty.oil_temperature_max.as_celsius());
    desk.put("viscosity_at_max_low_mm2_s", true, &oil::LIKELY_RANGE, hot);
    let mut floor = |key: &str, floor: &Floor| {
        if let (Some(t), Some(by)) = (floor.at_c, floor.set_by) {
            desk.put(key, true, method_of(by), reach_at(t));
        }
    };
    floor("start_floor_c", &found.start_floor);
    floor("start_floor_expected_c", &found.start_floor_expected);
    floor("light_floor_c", &found.light_floor);
    floor("work_floor_c", &found.work_floor);
    floor("work_floor_expected_c", &found.work_floor_expected);
    if let Some(t) = found.hot_ceiling_c {
        desk.put("hot_ceiling_c", true, method_of(LimitId::ViscosityMin), reach_at(t));
    }
    for (row, limit) in found.limits.iter().enumerate() {
        if let Some(t) = limit.outcome.temperature() {
            desk.put(
                &format!("limits/{row}/temperature_c"),
                true,
                method_of(limit.id),
                reach_at(t),
            );
        }
    }
    for (row, reason) in found.reasons.iter().enumerate() {
        for (key, figure) in reason.text.figures() {
            let path = format!("reasons/{row}/figures/{key}{}", figure.suffix());
            desk.put(&path, true, &REASON, GIVEN);
        }
    }
    heating(case, &setup, found, desk);
    first_turn(found, desk, soak);
    let circulation = &found.circulation;
    desk.put("circulation/time_s", circulation.time_s.is_some(), &heat::CIRCULATION, LOSS);
    desk.put("circulation/steady_c", circulation.steady_c.is_some(), &heat::CIRCULATION, LOSS);
}

fn method_of(id: LimitId) -> &'static Method {
    LIMITS.iter().find(|row| row.id == id).map_or(&super::limits::VISCOSITY_LIMIT, |row| row.method)
}

fn heating(case: &Case, setup: &Setup<'_>, found: &Assessment, desk: &mut Desk) {
    let heating = &found.heating;
    let loss = Tank::new(setup).loss.method();
    let mut put = |key: &str, there: bool, method| {
        desk.put(&format!("heating/{key}"), there, method, LOSS);
    };
    put("needed_w", heating.needed_w.is_some(), &heat::WARM_UP);
    put("needed_high_w", heating.needed_high_w.is_some(), &heat::WARM_UP);
    put("time_s", heating.time_s.is_some(), &heat::WARM_UP);
    put("time_high_s", heating.time_high_s.is_some(), &heat::WARM_UP);
    put("energy_kwh", heating.energy_kwh.is_some(), &heat::WARM_UP);
    put("hold_w", heating.hold_w.is_some(), loss);
    put("u_value_w_m2_k", heating.u_value.is_some(), loss);
    put("steady_c", heating.steady_c.is_some(), loss);
    put("gate_valid_s", heating.gate_valid_s.is_some(), &heat::WARM_UP);
    let mut exact = |key: &str, there: bool, method, reach| {
        desk.put(&format!("heating/{key}"), there, method, reach);
    };
    exact("heater_w", heating.heater_w.is_some(), &heat::CIRCUIT, "smallest size that covers it");
    for row in 0..heating.elements_w.len() {
        exact(&format!("elements_w/{row}"), true, &heat::CIRCUIT, "smallest size that covers it");
    }
    exact("mean_target_c", heating.mean_target_c.is_some(), &heat::TARGET, "margins are judgement");
    exact("thermostat_c", heating.thermostat_c.is_some(), &THERMOSTAT, "margins are judgement");
    exact("current_a", heating.current_a.is_some(), &heat::CIRCUIT, GIVEN);
    let pad = case.element.kind == heat::ElementKind::Pad;
    let density = if pad { "common practice" } else { "caps are common practice" };
    exact(
        "watt_density_max_w_cm2",
        heating.watt_density_max.is_some(),
        &heat::WATT_DENSITY,
        density,
    );
    exact("watt_density_w_cm2", heating.watt_density.is_some(), &heat::WATT_DENSITY, density);
    exact("surface_cm2", heating.surface_cm2.is_some(), &heat::WATT_DENSITY, density);
    exact("skin_film_c", heating.skin_film_c.is_some(), &heat::SKIN, "estimate");
    exact("skin_bulk_c", heating.skin_bulk_c.is_some(), &heat::SKIN, "pessimistic bound");
}

fn first_turn(found: &Assessment, desk: &mut Desk, soak: &'static str) {
    let turn = &found.first_turn;
    let gate = "thick edge";
    desk.put(
        "first_turn/hose_clearing_s",
        turn.hose_clearing_s.is_some(),
        &pump::HOSE_CLEARING,
        soak,
    );
    desk.put("first_turn/hose_fill", turn.hose_fill.is_some(), &pump::HOSE_CLEARING, soak);
    desk.put(
        "first_turn/pump_difference_k",
        turn.pump_difference_k.is_some(),
        &THERMOSTAT,
        "thermostat less soak",
    );
    desk.put(
        "first_turn/vacuum_at_gate_kpa",
        turn.vacuum_at_gate_kpa.is_some(),
        &pump::INLET_BALANCE,
        gate,
    );
    desk.put("first_turn/speed_max_rpm", turn.speed_max_rpm.is_some(), &pump::INLET_BALANCE, gate);
    desk.put("first_turn/case_drain_kpa", turn.case_drain_kpa.is_some(), &pump::CASE_DRAIN, soak);
    for row in 0..turn.speed_ladder.len() {
        for key in ["oil_c", "speed_max_rpm"] {
            desk.put(
                &format!("first_turn/speed_ladder/{row}/{key}"),
                true,
                &pump::INLET_BALANCE,
                gate,
            );
        }
    }
}
