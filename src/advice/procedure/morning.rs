//! The morning: walk round, crank, first turn, circulation, functions, load.

use super::{Bound, Phase, Reading, Scene, Step};
use crate::advice::plan::PlanKind;
use crate::advice::say::Figure::{
    Difference, Number, Percent, Speed, Temperature, Time, Vacuum, Viscosity,
};
use crate::pump::Neutral;

/// An infrared thermometer reads the skin, not the oil: so much more is asked of it, K.
const INFRARED_K: f64 = 3.0;
/// Longest burst of a starter and the rest after it, s; common practice, no source.
const BURST_S: f64 = 30.0;
const REST_S: f64 = 120.0;
/// Jogging without oil ends here, s: TM 5-3820-256-10.
const JOG_S: f64 = 600.0;
/// Longest idle at a stretch, s: TM 9-2320-272-10, for a truck.
const IDLE_S: f64 = 900.0;
/// Circulation shorter than this is the least there is, s: TM 9-2350-238-10.
const SHORT_S: f64 = 300.0;
/// No shorter burst is asked for, s: nobody times less.
const LEAST_JOG_S: f64 = 5.0;
/// A line that clears slower than this is warmed too, s.
const CLEARS_S: f64 = 10.0;
/// Where the pump is so much colder than the oil, it is warmed before any turn: times the jog limit.
const STOP_FACTOR: f64 = 2.0;
/// Light load at first, s: TM 5-3805-255-14.
const LIGHT_S: f64 = 300.0;

pub(super) fn walk_round(scene: &Scene<'_>) -> Vec<Step> {
    let step = |template: &str, fills: &[_]| Step::new(Phase::WalkRound, template, fills);
    let (case, found) = (scene.case, scene.found);
    let shrunk = 100.0
        * (scene.setup.bulk.density(found.soak_c)
            / scene.setup.bulk.density(case.duty.oil_temperature_max.as_celsius())
            - 1.0);
    let jar = step(
        "Tilt the jar that stood outside: the oil must run. Look for ice, a milky layer or jelly at the bottom.",
        &[],
    )
    .stop("the oil in the jar does not run, or there is ice in it", &[])
    .mind(&["water-in-oil"]);
    let mut steps = vec![
        step(
            "Read the air temperature at the machine and write it down.",
            &[],
        )
        .stop(
            "it is colder than {minimum}: this procedure does not cover it",
            &[("minimum", Temperature(case.site.minimum.as_celsius()).into())],
        )
        .mind(&["cold-metal", "cold-stress"]),
        step(
            "Tank level: cold oil takes {shrunk} less room, so it reads low. It must cover suction and heater; do not top up to the hot mark. Set the level when warm.",
            &[("shrunk", Percent(shrunk).into())],
        )
        .stop("the element or the suction is not covered", &[]),
        step(
            "Suction valve fully open, breather free of ice, hoses not bent while cold, snow and ice off boom and linkage, wheels and tracks not frozen down, nobody near the machine.",
            &[],
        )
        .mind(&["hose-rating", "stiff-seals", "stored-energy"]),
    ];
    if !scene.keeps_running() {
        steps.insert(2, jar);
    }
    if scene.heated() {
        let valid = found.heating.gate_valid_s.filter(|_| !scene.is(&[PlanKind::BlanketAndHold]));
        let template = if valid.is_some() {
            "Heater: see that it has worked (lamp, breaker, warm tank). Switch off, unplug, stow the cord before cranking. Start within {valid} of that; later, heat again."
        } else {
            "Heater: see that it has worked (lamp, breaker, warm tank). Switch off, unplug, stow the cord before cranking, and start at once."
        };
        steps.push(
            step(template, &[("valid", Time(valid.unwrap_or_default()).into())])
                .stop("the tank is cold, the cord is damaged or the breaker has tripped", &[])
                .mind(&["cords", "ground-fault"]),
        );
    }
    steps
}

pub(super) fn crank(scene: &Scene<'_>) -> Vec<Step> {
    let step = |template: &str, fills: &[_]| Step::new(Phase::Crank, template, fills);
    let (Some(gate), Some(floor)) = (scene.gate_c(), scene.found.start_floor.at_c) else {
        return Vec::new();
    };
    let policy = &scene.case.policy.heat;
    let mut steps = vec![
        step(
            "Read the oil where it leaves the tank, at the suction fitting, with a probe in the oil or strapped to the bare fitting under insulation: {gate} or warmer. An infrared thermometer must show {infrared} or more, on a dull spot of the fitting. The tank's own gauge does not count.",
            &[
                ("gate", Temperature(gate).into()),
                ("infrared", Temperature(gate + INFRARED_K).into()),
            ],
        )
        .gate(Reading::OilAtSuction, Bound::AtLeastC(gate))
        .stop(
            "it is under {floor}: nobody turns the pump",
            &[("floor", Temperature(floor).into())],
        ),
    ];
    steps.extend(cold_hose(scene));
    let difference = scene.pump_difference_k();
    let limit = policy.warming_over_soak_k;
    let heated_pump = scene.case.machine.pump_heated;
    if scene.warm_tank() && (difference > limit || scene.found.heating.pump_warming) {
        let fills =
            [("difference", Difference(difference).into()), ("limit", Difference(limit).into())];
        let template = if heated_pump {
            "Pump body: its own heater must have brought it to within {limit} of the oil. Read it with the probe on the housing."
        } else if difference > STOP_FACTOR * limit {
            "Pump body: the oil may be {difference} hotter than the pump. Warm the pump first, with warm air or a pad, never a flame, until the oil is at most {limit} hotter than its housing."
        } else {
            "Pump body: the oil may be {difference} hotter than the pump. Jog: a second or two of turning, half a minute of rest, until the oil at the suction is at most {limit} hotter than the pump housing; then go on."
        };
        steps.push(
            step(template, &fills)
                .gate(Reading::PumpBody, Bound::AtMostK(limit))
                .mind(&["hot-oil-cold-pump", "open-flame"]),
        );
    }
    if scene.keeps_running() {
        return steps;
    }
    steps.push(
        step(
            "All levers neutral, clutch or power take-off of the pump out if it has one, so that the engine fires without hydraulic load. No burst of the starter over {burst}, then {rest} of rest.",
            &[("burst", Time(BURST_S).into()), ("rest", Time(REST_S).into())],
        )
        .mind(&["starting-fluid", "frozen-battery", "towing", "carbon-monoxide"]),
    );
    steps
}

/// Cold oil in the suction hose: the tank may be warm, the hose never is.
fn cold_hose(scene: &Scene<'_>) -> Option<Step> {
    if scene.is(&[PlanKind::WholeMachineHeat, PlanKind::KeepRunning]) {
        return None;
    }
    let turn = &scene.found.first_turn;
    let step = |template: &str, fills: &[_]| Step::new(Phase::Crank, template, fills);
    let bursts = [("burst", Time(BURST_S).into()), ("rest", Time(REST_S).into())];
    let vacuum = scene.vacuum_limit_kpa();
    let Some(high) = scene.found.at_soak.high else {
        return Some(
            step(
                "The oil in the suction hose may have set. Warm the whole line with warm air or a heating tape first, never a flame; then jog without fuel, at most {burst} a time with {rest} of rest, until the vacuum gauge moves.",
                &bursts,
            )
            .gate(Reading::InletVacuum, Bound::AtMostKpa(vacuum))
            .stop(
                "no oil comes within {jog} of jogging: warm the line longer",
                &[("jog", Time(JOG_S).into())],
            )
            .mind(&["open-flame"]),
        );
    };
    let starved = turn.hose_fill.is_some_and(|fill| fill < 1.0);
    let thick = scene.warm_tank() && high > scene.case.pump.viscosity_start_max.as_mm2_per_s();
    if !starved && !scene.is(&[PlanKind::StartWarmTank]) && !thick {
        return None;
    }
    let mut template = "Cold oil stands in the suction hose, up to {high} at {soak}.".to_owned();
    if starved {
        template.push_str(" At start speed the pump would fill to {fill} only.");
    }
    let Some(clear) = turn.hose_clearing_s.map(|clear| clear.max(LEAST_JOG_S)) else {
        template.push_str(" How long it takes to draw it out was not computed, the suction line is not given: crank without fuel, or jog, in bursts of at most {burst} with {rest} of rest, until the vacuum falls.");
        let [burst, rest] = bursts;
        return Some(
            step(
                &template,
                &[
                    ("high", Viscosity(high).into()),
                    ("soak", Temperature(scene.found.soak_c).into()),
                    burst,
                    rest,
                ],
            )
            .gate(Reading::InletVacuum, Bound::AtMostKpa(vacuum)),
        );
    };
    template.push_str(" Crank without fuel, or jog, for {clear} or longer to draw it out");
    template.push_str(if clear > BURST_S {
        ", in bursts of at most {burst} with {rest} of rest."
    } else {
        "."
    });
    if clear > CLEARS_S {
        template.push_str(" Warm the line too, with warm air or a heating tape, never a flame.");
    }
    let [burst, rest] = bursts;
    Some(
        step(
            &template,
            &[
                ("high", Viscosity(high).into()),
                ("soak", Temperature(scene.found.soak_c).into()),
                ("fill", Percent(100.0 * turn.hose_fill.unwrap_or(1.0)).into()),
                ("clear", Time(clear).into()),
                burst,
                rest,
            ],
        )
        .gate(Reading::Time, Bound::AtLeastS(clear))
        .stop("the vacuum stays over {limit}", &[("limit", Vacuum(vacuum).into())])
        .mind(&["open-flame"]),
    )
}

/// When to stop, whatever the step.
fn stop_signs(step: Step, scene: &Scene<'_>) -> Step {
    step.stop("the vacuum passes {limit}", &[("limit", Vacuum(scene.vacuum_limit_kpa()).into())])
        .stop("the pump changes from a hum to a scream or a rattle: stop within moments", &[])
        .stop("a function jerks, the oil foams, or a hose or seal sprays", &[])
}

pub(super) fn first_turn(scene: &Scene<'_>) -> Vec<Step> {
    let step = |template: &str, fills: &[_]| Step::new(Phase::FirstTurn, template, fills);
    let Some(gate) = scene.gate_c() else { return Vec::new() };
    let start = scene.case.pump.start_speed.as_rpm();
    let most = scene.speed_max_rpm(gate).map_or(start, |most| most.min(start));
    let mut steps = vec![stop_signs(
        step(
            "Start and keep the pump unloaded at {most} or slower. Hands off the levers. Listen: a steady hum is right.",
            &[("most", Speed(most).into())],
        )
        .gate(Reading::PumpSpeed, Bound::AtMostRpm(most))
        .mind(&["fluid-injection", "case-pressure", "carbon-monoxide"]),
        scene,
    )];
    let limit = scene.vacuum_limit_kpa();
    let expected = scene.vacuum_at_gate_kpa();
    let template = match expected {
        Some(kpa) if kpa > 0.0 => {
            "Read the vacuum at the suction port: at most {limit} at this elevation. About {expected} or less is what the likely thickest oil gives at the gate."
        }
        Some(_) => {
            "Read the vacuum at the suction port: at most {limit} at this elevation. Here the oil column should leave none."
        }
        None => {
            "Read the vacuum at the suction port: at most {limit} at this elevation. The suction line was not given, so this reading is the only proof."
        }
    };
    steps.push(
        step(
            template,
            &[
                ("limit", Vacuum(limit).into()),
                ("expected", Vacuum(expected.unwrap_or_default()).into()),
            ],
        )
        .gate(Reading::InletVacuum, Bound::AtMostKpa(limit))
        .stop(
            "no oil pressure or flow within {jog} of jogging: give up and warm the machine",
            &[("jog", Time(JOG_S).into())],
        ),
    );
    steps
}

pub(super) fn circulate(scene: &Scene<'_>) -> Vec<Step> {
    let step = |template: &str, fills: &[_]| Step::new(Phase::Circulate, template, fills);
    let found = scene.found;
    let circulation = &found.circulation;
    let light = found.light_floor.at_c;
    let warm = matches!((light, scene.gate_c()), (Some(light), Some(gate)) if light <= gate);
    let idle = Time(IDLE_S);
    let mut steps = Vec::new();
    let first = match circulation.time_s {
        Some(time) if time <= SHORT_S => step(
            "Let it circulate in neutral for five to ten minutes; the oil is near full-load warmth once it is mixed. The filter alarm may show until it is warm: read it then.",
            &[],
        )
        .expect(Some(SHORT_S)),
        Some(time) if time <= 3600.0 => step(
            "Let it circulate in neutral. Full load is about {time} away; idle no longer than {idle} at a stretch unless the manual allows it. The filter alarm may show until the oil is warm: read it then.",
            &[("time", Time(time).into()), ("idle", idle.into())],
        )
        .expect(Some(time)),
        Some(time) => step(
            "Idling alone would take {time} to full load. After five quiet minutes go on to the functions and work them gently, one after the other; that warms it. Idle no longer than {idle} at a stretch unless the manual allows it.",
            &[("time", Time(time).into()), ("idle", idle.into())],
        ),
        None => match (circulation.steady_c, found.work_floor.at_c) {
            (Some(steady), Some(_)) => step(
                "It will not warm at idle: circulation ends at {steady}. After five quiet minutes go on to the functions and work them gently, one after the other. Never stall a function against its relief valve to make heat.",
                &[("steady", Temperature(steady).into())],
            ),
            _ => step(
                "Let it circulate in neutral for five to ten minutes. How fast it warms was not computed: go by the readings. Never stall a function against its relief valve to make heat.",
                &[],
            ),
        },
    };
    steps.push(stop_signs(first.mind(&["filter-bypass", "carbon-monoxide"]), scene));
    if let Some(ladder) = ladder(scene) {
        steps.push(ladder);
    }
    if let (Some(light), false) = (light, warm) {
        if circulation.time_s.is_some_and(|time| time <= 3600.0) {
            steps.push(
                step(
                    "Wait for {light} at the suction fitting before any function is worked with load. Oil that comes back from the cold rest of the machine can pull the reading down again.",
                    &[("light", Temperature(light).into())],
                )
                .gate(Reading::OilAtSuction, Bound::AtLeastC(light)),
            );
        }
    }
    steps
}

/// Up to four rungs of the speed ladder.
fn ladder(scene: &Scene<'_>) -> Option<Step> {
    let start = scene.case.pump.start_speed.as_rpm();
    let rungs: Vec<_> = scene
        .found
        .first_turn
        .speed_ladder
        .iter()
        .filter(|rung| rung.speed_max_rpm > start)
        .collect();
    let last = rungs.last()?;
    let first = rungs.first()?;
    let middle = rungs.get(rungs.len() / 2)?;
    let keys = [("t_one", "n_one"), ("t_two", "n_two"), ("t_three", "n_three")];
    let mut template = "Raise the speed only as the oil warms, unloaded:".to_owned();
    let mut fills = Vec::new();
    let mut said: Option<f64> = None;
    for (rung, (t, n)) in [first, middle, last].into_iter().zip(keys) {
        if said == Some(rung.oil_c) {
            continue;
        }
        template.push_str(if said.is_none() { " " } else { ", " });
        template.push_str(&format!("from {{{t}}} up to {{{n}}}"));
        said = Some(rung.oil_c);
        fills.push((t, Temperature(rung.oil_c).into()));
        fills.push((n, Speed(rung.speed_max_rpm).into()));
    }
    template.push('.');
    Some(Step::new(Phase::Circulate, &template, &fills))
}

pub(super) fn functions(scene: &Scene<'_>) -> Vec<Step> {
    let step = |template: &str, fills: &[_]| Step::new(Phase::Functions, template, fills);
    let limit = scene.vacuum_limit_kpa();
    let mut steps = vec![
        stop_signs(
            step(
                "Work one function at a time, slowly, without load, {cycles} cycles each way and not to the end of its stroke. Read the vacuum again after each: cold oil comes back with every one.",
                &[("cycles", Number(3.0).into())],
            )
            .gate(Reading::InletVacuum, Bound::AtMostKpa(limit))
            .mind(&["lifting", "stiff-seals", "fluid-injection"]),
            scene,
        ),
    ];
    let motors = if scene.case.pump.neutral == Some(Neutral::ClosedLoop) {
        "Turn travel, swing and winch motors slowly both ways before anything is asked of them: a motor that stood idle is as cold as the night. Charge pressure must stand before the machine may move."
    } else {
        "Turn travel, swing and winch motors slowly both ways before anything is asked of them: a motor that stood idle is as cold as the night."
    };
    steps.push(step(motors, &[]).mind(&["hot-oil-cold-pump", "towing"]));
    steps.push(
        step(
            "Before it moves off: service brake, parking brake and steering tried where nobody stands, then the first hundred metres at a walking pace. Lift nothing heavy before the boom has been lowered and raised empty several times.",
            &[],
        )
        .stop("a brake, the steering or a lowering valve answers late or not at all", &[])
        .mind(&["lifting"]),
    );
    steps
}

pub(super) fn load(scene: &Scene<'_>) -> Vec<Step> {
    let step = |template: &str, fills: &[_]| Step::new(Phase::Load, template, fills);
    let (case, found) = (scene.case, scene.found);
    let work = case.pump.work_speed.as_rpm();
    let light_speed = case.policy.limits.light_speed_share * work;
    let hot = case.duty.oil_temperature_max.as_celsius();
    let mut steps = Vec::new();
    match found.light_floor.at_c {
        Some(light) => steps.push(
            step(
                "Light work from {light} at the suction fitting: at most {speed}, light load for the first {first}.",
                &[
                    ("light", Temperature(light).into()),
                    ("speed", Speed(light_speed).into()),
                    ("first", Time(LIGHT_S).into()),
                ],
            )
            .gate(Reading::OilAtSuction, Bound::AtLeastC(light))
            .expect(Some(LIGHT_S)),
        ),
        None => steps.push(step(
            "There is no temperature from which even light work meets the pump's limits. Ask the maker of the machine before it is loaded at all.",
            &[],
        )),
    }
    match (found.work_floor.at_c, scene.work_speed_max_rpm(hot)) {
        (Some(floor), _) => steps.push(
            step(
                "Full load and {work} from {floor} at the suction fitting.",
                &[("floor", Temperature(floor).into()), ("work", Speed(work).into())],
            )
            .gate(Reading::OilAtSuction, Bound::AtLeastC(floor)),
        ),
        (None, Some(most)) => steps.push(
            step(
                "Full speed is never reached within the pump's inlet limit: even at {hot} run it no faster than {most}.",
                &[("hot", Temperature(hot).into()), ("most", Speed(most).into())],
            )
            .gate(Reading::PumpSpeed, Bound::AtMostRpm(most)),
        ),
        (None, None) => steps.push(step(
            "There is no temperature from which full load meets the pump's limits. Ask the maker of the machine before it is loaded fully.",
            &[],
        )),
    }
    let ceiling = found.hot_ceiling_c;
    steps.push(
        step(
            if ceiling.is_some() {
                "When warm: set the tank level, read the filter indicator at high flow, look for leaks with cardboard. Do not run above {ceiling}."
            } else {
                "When warm: set the tank level, read the filter indicator at high flow, look for leaks with cardboard. This oil is too thin for the pump over the whole range: keep it as cool as it goes."
            },
            &[("ceiling", Temperature(ceiling.unwrap_or_default()).into())],
        )
        .mind(&["thin-hot", "filter-bypass", "fluid-injection"]),
    );
    steps
}
