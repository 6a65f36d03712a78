//! The JSON contract: the only place that knows its keys.

use super::units::Shown;
use crate::advice::{
    Advice, AskFor, Assessment, Bound, Choice, Cold, Confirm, Fitted, Heating, Lever, LimitResult,
    Outcome, Plan, Reason, Say, Step, WinterAhead,
};
use crate::case::{Assumption, Case, From, MinimumHow, Units};
use crate::oil::{Oil, reported};
use serde_json::{Map, Value, json};

/// Version of the JSON format: renaming or removing a key raises it.
const FORMAT: u32 = 1;

/// A number at six significant figures: the one rounding of every JSON figure.
#[must_use]
pub fn six(value: f64) -> f64 {
    if value == 0.0 || !value.is_finite() {
        return 0.0;
    }
    format!("{value:.5e}").parse().unwrap_or(value)
}

/// Rounds every number, and makes every object with a null say so in its `why`.
fn finish(value: Value) -> Value {
    match value {
        Value::Number(number) if number.is_f64() => {
            number.as_f64().map_or(Value::Null, |number| json!(six(number)))
        }
        Value::Array(list) => Value::Array(list.into_iter().map(finish).collect()),
        Value::Object(map) => {
            let mut map: Map<String, Value> =
                map.into_iter().map(|(key, value)| (key, finish(value))).collect();
            let nulls: Vec<&str> = map
                .iter()
                .filter(|(key, value)| value.is_null() && *key != "why")
                .map(|(key, _)| key.as_str())
                .collect();
            if nulls.is_empty() {
                if map.get("why").is_some_and(Value::is_null) {
                    map.remove("why");
                }
            } else {
                let missing = format!("no figure for {}", nulls.join(", "));
                let why = match map.remove("why") {
                    Some(Value::Array(mut reasons)) => {
                        reasons.push(json!({ "id": "no-figure", "text": missing }));
                        Value::Array(reasons)
                    }
                    Some(Value::String(why)) => Value::String(format!("{why} ({missing})")),
                    _ => Value::String(missing),
                };
                map.insert("why".to_owned(), why);
            }
            Value::Object(map)
        }
        other => other,
    }
}

/// The assessment of a case as JSON: `oils`, `site`, `assumptions`, `inputs`.
#[must_use]
pub fn assessment_json(case: &Case, oils: &[(&Oil, Assessment)]) -> Value {
    let mut map = head(case);
    map.insert("oils".to_owned(), oils.iter().map(|(oil, found)| oil_json(oil, found)).collect());
    let governs = |key: &str| oils.iter().any(|(_, found)| found.hangs_on(key));
    let assumptions: Value =
        case.assumptions.iter().map(|one| assumption_json(one, governs(&one.key))).collect();
    map.insert("assumptions".to_owned(), assumptions);
    map.insert("inputs".to_owned(), inputs(case));
    finish(Value::Object(map))
}

/// The advice as JSON.
#[must_use]
pub fn advice_json(case: &Case, advice: &Advice) -> Value {
    let decision = &advice.decision;
    let mut map = head(case);
    let mut put = |key: &str, value: Value| map.insert(key.to_owned(), value);
    put("oils", case.oils.iter().zip(&decision.oils).map(|(oil, f)| oil_json(oil, f)).collect());
    put(
        "plans",
        decision.plans.iter().zip(&advice.cold.winter).map(|(p, w)| plan_json(p, *w)).collect(),
    );
    put("cold", cold_json(&advice.cold));
    put("ask_for", ask_for_json(&advice.ask_for));
    put("choice", choice_json(case, advice, &decision.choice));
    put(
        "procedure",
        advice.procedure.iter().enumerate().map(|(at, step)| step_json(at, step)).collect(),
    );
    put(
        "cautions",
        advice
            .cautions
            .iter()
            .map(|caution| {
                with_figures(
                    json!({
                        "id": caution.row.id,
                        "signal": caution.row.signal().id(),
                        "stop": caution.row.stop,
                        "text": caution.row.text,
                        "because": metric(&caution.because),
                        "source": format!("{} [{}]", caution.row.source, caution.row.read.tag()),
                    }),
                    &[&caution.because],
                )
            })
            .collect(),
    );
    put("assumptions", advice.confirm.iter().map(confirm_json).collect());
    put("levers", advice.levers.iter().map(lever_json).collect());
    put(
        "evidence",
        advice
            .evidence
            .iter()
            .map(|one| {
                json!({
                    "at": one.at,
                    "method": one.method.name,
                    "source": one.method.source.to_string(),
                    "reach": one.reach,
                })
            })
            .collect(),
    );
    put("inputs", inputs(case));
    put("record", json!(advice.record));
    finish(Value::Object(map))
}

fn head(case: &Case) -> Map<String, Value> {
    let how = |how: MinimumHow| match how {
        MinimumHow::Given | MinimumHow::AsMinimum => "given",
        MinimumHow::Record => "record",
        MinimumHow::Percentile => "percentile",
        MinimumHow::ReturnLevel => "return-level",
        MinimumHow::Class => "class",
    };
    let value = json!({
        "format": FORMAT,
        "program": { "name": env!("CARGO_PKG_NAME"), "version": env!("CARGO_PKG_VERSION") },
        "title": case.title,
        "site": {
            "minimum_c": case.site.minimum.as_celsius(),
            "minimum_how": how(case.site.minimum_how),
            "heating_c": case.site.heating.as_celsius(),
            "heating_how": how(case.site.heating_how),
            "air_kpa": crate::air::atmosphere_kpa(case.site.elevation.as_m()),
            "wind_m_s": case.site.wind.as_m_per_s(),
        },
    });
    match value {
        Value::Object(map) => map,
        _ => Map::new(),
    }
}

fn inputs(case: &Case) -> Value {
    case.inputs
        .iter()
        .map(|input| {
            json!({
                "key": input.key,
                "value": input.value,
                "from": match input.from {
                    From::Given => "given",
                    From::Typical => "typical",
                    From::Policy => "policy",
                    From::Climate => "climate",
                },
            })
        })
        .collect()
}

fn assumption_json(assumption: &Assumption, governs: bool) -> Value {
    json!({
        "key": assumption.key,
        "value": assumption.value,
        "source": assumption.source,
        "ask": assumption.ask,
        "governs": governs,
    })
}

fn confirm_json(confirm: &Confirm) -> Value {
    let mut value = assumption_json(&confirm.assumption, confirm.governs);
    if let (Some(range), Value::Object(map)) = (&confirm.range, &mut value) {
        let ends = |floors: [Option<f64>; 2]| json!({ "from_c": floors[0], "to_c": floors[1] });
        map.insert(
            "range".to_owned(),
            json!({
                "from": range.from,
                "to": range.to,
                "start_floor": ends(range.start_floor_c),
                "work_floor": ends(range.work_floor_c),
            }),
        );
    }
    value
}

/// A sentence in metric units.
fn metric(say: &Say) -> String {
    Shown(Units::Metric).say(say)
}

/// Puts the figures of sentences beside them.
fn with_figures(mut value: Value, says: &[&Say]) -> Value {
    let figures: Map<String, Value> = says
        .iter()
        .flat_map(|say| say.figures())
        .map(|(key, figure)| (format!("{key}{}", figure.suffix()), json!(figure.value())))
        .collect();
    if let (false, Value::Object(map)) = (figures.is_empty(), &mut value) {
        map.insert("figures".to_owned(), Value::Object(figures));
    }
    value
}

fn reason_json(reason: &Reason) -> Value {
    with_figures(json!({ "id": reason.id, "text": metric(&reason.text) }), &[&reason.text])
}

fn cold_json(cold: &Cold) -> Value {
    with_figures(
        json!({
            "which": metric(&cold.which),
            "chance_a_winter": cold.chance_a_winter,
            "chance_ten_winters": cold.chance_ten_winters,
            "why": cold.why,
            "against": cold.against.iter().map(|one| with_figures(json!({
                "level": one.wish.to_string(),
                "temperature_c": one.celsius,
                "holds": one.holds,
                "text": metric(&one.text),
            }), &[&one.text])).collect::<Vec<_>>(),
        }),
        &[&cold.which],
    )
}

fn plan_json(plan: &Plan, winter: Option<WinterAhead>) -> Value {
    let mut value = plan_figures(plan);
    if let (Some(winter), Value::Object(map)) = (winter, &mut value) {
        map.insert(
            "winter".to_owned(),
            json!({
                "mornings": winter.mornings,
                "heater_hours": winter.heater_hours,
                "energy_kwh": winter.energy_kwh,
                "cost": winter.cost,
                "from": if winter.counted { "record" } else { "monthly-means" },
                "why": winter.cost.is_none().then_some("no tariff, or nothing to count"),
            }),
        );
    }
    value
}

fn plan_figures(plan: &Plan) -> Value {
    json!({
        "plan": plan.kind.id(),
        "oil": plan.oil,
        "heater_w": plan.heater_w,
        "elements_w": plan.elements_w,
        "hold_w": plan.hold_w,
        "energy_kwh": plan.energy_kwh,
        "ready_s": plan.ready_s,
        "allowed": plan.allowed,
        "why": plan.why.iter().map(reason_json).collect::<Vec<_>>(),
    })
}

fn ask_for_json(ask: &AskFor) -> Value {
    let grades: Vec<u32> = ask.grades.iter().map(|(number, _)| *number).collect();
    let range = grades.first().zip(grades.last()).map(|(from, to)| [*from, *to]);
    json!({
        "pour_point_max_c": ask.pour_point_max_c,
        "viscosity_max_mm2_s": ask.viscosity_max,
        "at_c": ask.at_c,
        "viscosity_min_mm2_s": ask.viscosity_min,
        "at_max_c": ask.at_max_c,
        "iso_vg": range,
        "viscosity_index_min": ask.index_min(),
        "grades": ask.grades.iter().map(|(number, index)| json!({
            "iso_vg": number, "viscosity_index_min": index,
        })).collect::<Vec<_>>(),
        "why": ask.why,
    })
}

fn choice_json(case: &Case, advice: &Advice, choice: &Choice) -> Value {
    let plan = advice.decision.chosen();
    let mut value = json!({
        "plan": choice.plan,
        "oil": plan.and_then(|plan| case.oils.get(plan.oil)).map(Oil::name),
        "heater_w": plan.and_then(|plan| plan.heater_w),
        "switch_on": choice.switch_on.map(|(clock, days)| json!({
            "clock": clock.to_string(), "days_before": days,
        })),
        "why": choice.why.iter().map(reason_json).collect::<Vec<_>>(),
    });
    if let (Some(timing), Value::Object(map)) = (advice.cold.timing, &mut value) {
        map.insert(
            "timing".to_owned(),
            json!({
                "latest_s": timing.latest_s,
                "latest_high_s": timing.latest_high_s,
                "last_minute_kwh": timing.last_minute_kwh,
                "hold_kwh": timing.hold_kwh,
                "why": timing.latest_high_s.is_none()
                    .then_some("a tank that loses more is never ready"),
            }),
        );
    }
    value
}

fn step_json(at: usize, step: &Step) -> Value {
    let mut value = json!({
        "step": at + 1,
        "phase": step.phase.id(),
        "do": metric(&step.text),
        "stop_if": step.stop_if.iter().map(metric).collect::<Vec<_>>(),
        "cautions": step.cautions,
    });
    if let Value::Object(map) = &mut value {
        if let Some(gate) = step.gate {
            let (key, bound) = match gate.bound {
                Bound::AtLeastC(v) => ("at_least_c", v),
                Bound::AtMostK(v) => ("at_most_k", v),
                Bound::AtMostKpa(v) => ("at_most_kpa", v),
                Bound::AtMostRpm(v) => ("at_most_rpm", v),
                Bound::AtLeastS(v) => ("at_least_s", v),
            };
            map.insert("gate".to_owned(), json!({ "reading": gate.reading.id(), key: bound }));
        }
        if let Some(seconds) = step.expect_s {
            map.insert("expect_s".to_owned(), json!(seconds));
        }
    }
    let mut says = vec![&step.text];
    says.extend(&step.stop_if);
    with_figures(value, &says)
}

fn lever_json(lever: &Lever) -> Value {
    let set: Map<String, Value> =
        lever.edits.iter().map(|edit| (edit.key.clone(), json!(edit.value))).collect();
    let found = lever.found();
    with_figures(
        json!({
            "id": lever.id,
            "set": set,
            "oil": lever.oil_name,
            "start_floor_c": found.and_then(|found| found.start_floor.at_c),
            "work_floor_c": found.and_then(|found| found.work_floor.at_c),
            "needed_w": found.and_then(|found| found.heating.needed_w),
            "heater_w": found.and_then(|found| found.heating.heater_w),
            "verdict": found.map(|found| found.verdict.id()),
            "text": metric(&lever.text),
        }),
        &[&lever.text],
    )
}

fn oil_json(oil: &Oil, found: &Assessment) -> Value {
    let at = &found.at_soak;
    let floor_why = found
        .start_floor
        .at_c
        .is_none()
        .then_some("start-limit-unattainable")
        .or(found.work_floor.at_c.is_none().then_some("work-limit-unattainable"));
    json!({
        "name": oil.name(),
        "class": oil.class(),
        "base": oil.base().id(),
        "in_service": oil.in_service(),
        "reference_only": oil.reference_only(),
        "verdict": found.verdict.id(),
        "reasons": found.reasons.iter().map(reason_json).collect::<Vec<_>>(),
        "viscosity_index": oil.viscosity_index(),
        "soak_c": found.soak_c,
        "tank_soak_c": found.tank_soak_c,
        "viscosity_at_soak": {
            "low_mm2_s": at.low,
            "expected_mm2_s": at.expected,
            "high_mm2_s": at.high,
            "reach": at.reach.id(),
            "why": at.high.is_none().then_some("below the pour point + 5 K the oil has no one viscosity"),
        },
        "start_floor_c": found.start_floor.at_c,
        "start_floor_set_by": found.start_floor.set_by.map(|id| id.id()),
        "start_floor_expected_c": found.start_floor_expected.at_c,
        "light_floor_c": found.light_floor.at_c,
        "light_floor_set_by": found.light_floor.set_by.map(|id| id.id()),
        "work_floor_c": found.work_floor.at_c,
        "work_floor_set_by": found.work_floor.set_by.map(|id| id.id()),
        "work_floor_expected_c": found.work_floor_expected.at_c,
        "hot_ceiling_c": found.hot_ceiling_c,
        "viscosity_at_max_low_mm2_s": found.low_at_max,
        "limits": found.limits.iter().map(limit_json).collect::<Vec<_>>(),
        "heating": heating_json(&found.heating),
        "first_turn": {
            "hose_clearing_s": found.first_turn.hose_clearing_s,
            "hose_fill": found.first_turn.hose_fill,
            "pump_difference_k": found.first_turn.pump_difference_k,
            "vacuum_at_gate_kpa": found.first_turn.vacuum_at_gate_kpa,
            "speed_max_rpm": found.first_turn.speed_max_rpm,
            "case_drain_kpa": found.first_turn.case_drain_kpa,
            "speed_ladder": found.first_turn.speed_ladder.iter().map(|step| json!({
                "oil_c": step.oil_c, "speed_max_rpm": step.speed_max_rpm,
            })).collect::<Vec<_>>(),
            "why": found.first_turn.why,
        },
        "circulation": {
            "time_s": found.circulation.time_s,
            "steady_c": found.circulation.steady_c,
            "why": found.circulation.why,
        },
        "why": floor_why,
    })
}

fn limit_json(result: &LimitResult) -> Value {
    json!({
        "limit": result.id.id(),
        "side": result.side.id(),
        "status": result.outcome.status(),
        "temperature_c": result.outcome.temperature(),
        "met_at_soak": match result.outcome {
            Outcome::NotChecked(_) => None,
            _ => result.met_at_soak,
        },
        "why": result.outcome.why().map(|why| why.to_string()),
    })
}

fn whys(whys: &[crate::advice::HeatingWhy]) -> Option<String> {
    let ids: Vec<&str> = whys.iter().map(|why| why.id()).collect();
    (!ids.is_empty()).then(|| ids.join("; "))
}

fn heating_json(heating: &Heating) -> Value {
    let mut value = json!({
        "status": heating.status.id(),
        "why": whys(&heating.whys),
        "needed_w": heating.needed_w,
        "needed_high_w": heating.needed_high_w,
        "heater_w": heating.heater_w,
        "elements_w": heating.elements_w,
        "tight": heating.tight,
        "time_s": heating.time_s,
        "time_high_s": heating.time_high_s,
        "hold_w": heating.hold_w,
        "energy_kwh": heating.energy_kwh,
        "u_value_w_m2_k": heating.u_value,
        "steady_c": heating.steady_c,
        "mean_target_c": heating.mean_target_c,
        "thermostat_c": heating.thermostat_c,
        "gate_valid_s": heating.gate_valid_s,
        "watt_density_max_w_cm2": heating.watt_density_max,
        "watt_density_w_cm2": heating.watt_density,
        "surface_cm2": heating.surface_cm2,
        "pump_warming": heating.pump_warming,
        "skin_film_c": heating.skin_film_c,
        "skin_bulk_c": heating.skin_bulk_c,
        "current_a": heating.current_a,
    });
    if let (Some(Fitted { status, whys: because }), Value::Object(map)) =
        (&heating.fitted, &mut value)
    {
        map.insert("fitted".to_owned(), json!({ "status": status.id(), "why": whys(because) }));
    }
    value
}

/// One oil over temperatures in °C, as JSON.
#[must_use]
pub fn oil_points_json(oil: &Oil, temperatures: &[f64]) -> Value {
    finish(json!({
        "format": FORMAT,
        "program": { "name": env!("CARGO_PKG_NAME"), "version": env!("CARGO_PKG_VERSION") },
        "name": oil.name(),
        "base": oil.base().id(),
        "viscosity_index": oil.viscosity_index(),
        "viscosity_index_reported": oil.viscosity_index().map(reported),
        "pour_point_c": oil.pour_point().map(|pour| pour.as_celsius()),
        "points": temperatures.iter().map(|t| {
            let at = oil.estimate(*t);
            let rho = oil.bulk().density(*t);
            json!({
                "temperature_c": t,
                "low_mm2_s": at.low,
                "expected_mm2_s": at.expected,
                "high_mm2_s": at.high,
                "dynamic_mpa_s": at.expected.map(|nu| nu * rho / 1000.0),
                "reach": at.reach.id(),
                "density_kg_m3": rho,
                "specific_heat_j_kg_k": oil.bulk().specific_heat(*t),
                "conductivity_w_m_k": oil.bulk().conductivity(*t),
                "saybolt_s": at.expected.filter(|nu| *nu >= 1.8).map(|nu| {
                    crate::oil::saybolt::seconds(nu, t * 1.8 + 32.0)
                }),
                "why": at.expected.is_none().then_some("below the pour point + 5 K the oil has no one viscosity"),
            })
        }).collect::<Vec<_>>(),
    }))
}
