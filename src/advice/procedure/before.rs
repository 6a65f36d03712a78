//! Before the season, and the evening before.

use super::{Phase, Scene, Step};
use crate::advice::decide::DEEP_COLD_C;
use crate::advice::plan::PlanKind;
use crate::advice::say::Figure::{
    Area, Length, Power, Pressure, Temperature, Time, Vacuum, Viscosity, WattDensity,
};
use crate::heat::{ElementKind, ElementPlace};
use crate::pump;

/// High limit of a heated hydraulic tank, °C: TM 55-1930-209-14&P-6, 180 °F.
const HIGH_LIMIT_C: f64 = 82.0;

pub(super) fn season(scene: &Scene<'_>) -> Vec<Step> {
    let step = |template: &str, fills: &[_]| Step::new(Phase::Season, template, fills);
    let (case, found) = (scene.case, scene.found);
    let soak = Temperature(found.soak_c);
    let mut steps = Vec::new();
    hoses(scene, &mut steps);
    oil(scene, &mut steps);
    steps.push(step(
        "Fit a vacuum gauge that reads to {vacuum} on a tee at the pump's suction port, and a probe in the oil at the tank's suction fitting that reads down to {soak} or colder. A dial that ends at freezing or a little under it is no use here.",
        &[
            ("vacuum", Vacuum((scene.vacuum_limit_kpa() * 1.5).max(30.0)).into()),
            ("soak", soak.into()),
        ],
    ));
    if found.limits.iter().any(|limit| {
        limit.id == crate::advice::LimitId::InletPressureStart && limit.met_at_soak.is_none()
    }) {
        steps.push(step(
            "The suction line was not checked. Measure the outside diameter and the length of the suction hose, count its bends and valves, note the pump's displacement, and work this case out again.",
            &[],
        ).mind(&["inlet-unproven"]));
    }
    heater(scene, &mut steps);
    if let Some((precharge, at)) = case.machine.accumulator {
        let (kpa, at_c) = (precharge.as_kpa(), at.as_celsius());
        let cold = pump::precharge_kpa(kpa, at_c, found.soak_c);
        steps.push(match cold {
            Some(cold) => step(
                "Accumulator: check the precharge with the oil pressure at zero. {precharge} set at {at} reads {cold} at {soak}; that is the cold, not a leak. Do not top it up to the warm figure.",
                &[
                    ("precharge", Pressure(kpa).into()),
                    ("at", Temperature(at_c).into()),
                    ("cold", Pressure(cold).into()),
                    ("soak", soak.into()),
                ],
            ),
            None => step(
                "Accumulator: check the precharge with the oil pressure at zero, with nitrogen only. It reads far lower in the cold; do not top it up to the warm figure.",
                &[],
            ),
        }
        .mind(&["accumulator", "stored-energy"]));
    }
    steps.push(step(
        "Drain water from the tank sump and the filter bowls, dry or change the breather, and fit new return and suction elements: in the cold the return filter passes oil unfiltered, so the oil must be clean before.",
        &[],
    ).mind(&["water-in-oil", "filter-bypass"]));
    steps.push(step(
        "Check that the cases of pump and motors are full of oil, and look over hoses and seals for cracks and leaks while they are still warm.",
        &[],
    ).mind(&["stiff-seals"]));
    steps
}

/// Hoses under their rating are a stop: first in the list.
fn hoses(scene: &Scene<'_>, steps: &mut Vec<Step>) {
    let soak = scene.found.soak_c;
    let step = match scene.case.machine.hose_rating {
        Some(rating) if rating.as_celsius() > soak => Step::new(
            Phase::Season,
            "STOP: the hoses are rated to {rating}, the soak is {soak}. Fit hoses rated to {soak} or colder, or warm the whole machine, before any start at the minimum.",
            &[
                ("rating", Temperature(rating.as_celsius()).into()),
                ("soak", Temperature(soak).into()),
            ],
        ),
        None if soak < DEEP_COLD_C => Step::new(
            Phase::Season,
            "STOP: ordinary hydraulic hose ends at {ordinary}, the soak is {soak}. Find the rating of every hose, the suction hose first, and fit hoses rated to {soak} or colder.",
            &[("ordinary", Temperature(DEEP_COLD_C).into()), ("soak", Temperature(soak).into())],
        ),
        Some(rating) => {
            steps.push(Step::new(
                Phase::Season,
                "Hoses are rated to {rating}: check that every one is, the large suction hose too.",
                &[("rating", Temperature(rating.as_celsius()).into())],
            ));
            return;
        }
        None => {
            steps.push(Step::new(
                Phase::Season,
                "Find the rating of the hoses, the large suction hose too: it must be {soak} or colder.",
                &[("soak", Temperature(soak).into())],
            ));
            return;
        }
    };
    steps.push(step.mind(&["hose-rating"]));
}

fn oil(scene: &Scene<'_>, steps: &mut Vec<Step>) {
    let (oil, found) = (scene.oil, scene.found);
    let name = match oil.class() {
        Some(class) if class != oil.name() => format!("{} ({class})", oil.name()),
        _ => oil.name().to_owned(),
    };
    let asked = scene.ask_for;
    if scene.changed() {
        let cold = scene.found.at_soak.high;
        let template = match (oil.class_only(), cold) {
            (true, Some(_)) => {
                "Change the oil to {oil} while the machine is warm, and let cylinders, lines and filters run out as far as the manual says. Known here is its class alone: have the supplier confirm at most {high} at {soak} and a pour point of {pour} or colder."
            }
            (false, Some(_)) => {
                "Change the oil to {oil} while the machine is warm, and let cylinders, lines and filters run out as far as the manual says. The advice holds for at most {high} at {soak}: have the supplier confirm it."
            }
            (_, None) => {
                "Change the oil to {oil} while the machine is warm, and let cylinders, lines and filters run out as far as the manual says."
            }
        };
        steps.push(
            Step::new(
                Phase::Season,
                template,
                &[
                    ("oil", name.into()),
                    ("high", Viscosity(cold.unwrap_or_default()).into()),
                    ("soak", Temperature(found.soak_c).into()),
                    (
                        "pour",
                        Temperature(
                            oil.pour_point().map_or(asked.pour_point_max_c, |p| p.as_celsius()),
                        )
                        .into(),
                    ),
                ],
            )
            .mind(&[
                "mixing-oils",
                "seal-compatibility",
                "ester-hoses",
                "hot-oil-burns",
            ]),
        );
    } else if scene.decision.in_service.is_none() {
        steps.push(Step::new(
            Phase::Season,
            "What oil is in the machine is not given. The figures here are for {oil}, which comes nearest: find out what is in it and work this case out again.",
            &[("oil", name.into())],
        ));
    } else {
        let mut template = "Keep {oil}. Draw a sample from the tank sump: it must be clear, without water, and the oil that the label says.".to_owned();
        if found.at_soak.reach != crate::oil::Reach::BetweenPoints {
            template.push_str(" Ask the supplier for its viscosity measured in the cold: that one figure replaces most of what is judged here.");
        }
        steps.push(Step::new(Phase::Season, &template, &[("oil", name.into())]));
    }
}

fn heater(scene: &Scene<'_>, steps: &mut Vec<Step>) {
    let Some(plan) = scene.plan.filter(|plan| plan.kind.heats()) else { return };
    let heating = &scene.found.heating;
    let element = &scene.case.element;
    let Some(watts) = plan.heater_w else { return };
    let fitted = element.power.is_some_and(|power| (power.as_watts() - watts).abs() < 0.5)
        && heating.fitted.is_some()
        && heating.elements_w.len() == 1;
    let what = match plan.elements_w.len() {
        0 | 1 => "{watts}".to_owned(),
        count => format!("{{watts}} in {count} elements"),
    };
    let (mut template, mind): (String, &[&'static str]) = if fitted {
        (format!("Use the heater that is fitted, {what}."), &["element-covered", "ground-fault"])
    } else if element.kind == ElementKind::Pad {
        (
            format!(
                "Have a licensed electrician fit a pad of {what} to the clean flat outside of the tank, at most {{density}}."
            ),
            &["ground-fault", "unattended-heating"],
        )
    } else {
        let place = match element.place {
            ElementPlace::BelowSuction => "below the suction pick-up and near it",
            ElementPlace::AboveSuction => "above the suction pick-up",
            ElementPlace::Circulated => "in the circulating loop",
        };
        (
            format!(
                "Have a licensed electrician fit {what} {place}, at most {{density}} (a heated surface of {{surface}} or more), so that the lowest oil level covers it on any slope."
            ),
            &["element-covered", "ground-fault", "flash-point"],
        )
    };
    template.push_str(" It needs a thermostat, a separate high limit of {limit} or less that is reset by hand, a low-level cut-off and ground-fault protection.");
    let density = heating.watt_density.or(heating.watt_density_max).unwrap_or_default();
    let surface = if density > 0.0 { watts / density } else { 0.0 };
    steps.push(
        Step::new(
            Phase::Season,
            &template,
            &[
                ("watts", Power(watts).into()),
                ("density", WattDensity(density).into()),
                ("surface", Area(surface).into()),
                ("limit", Temperature(HIGH_LIMIT_C).into()),
            ],
        )
        .mind(mind),
    );
    if plan.kind == PlanKind::BlanketAndHold && plan.why.iter().any(|why| why.id == "blanket") {
        steps.push(Step::new(
            Phase::Season,
            "Cover the tank with {blanket} of insulation that cannot burn, clear of exhaust and moving parts, dry and closed to wind and snow.",
            &[("blanket", Length(scene.case.policy.heat.blanket_mm).into())],
        ));
    }
}

pub(super) fn evening(scene: &Scene<'_>) -> Vec<Step> {
    let step = |template: &str, fills: &[_]| Step::new(Phase::Evening, template, fills);
    let (case, found) = (scene.case, scene.found);
    let mut steps = vec![
        step(
            "Park level and out of the wind. Rest buckets, blades and loads on blocks so that they do not freeze down; keep shoes and tracks off wet ground. Cylinders in, all levers neutral.",
            &[],
        )
        .mind(&["stored-energy", "towing"]),
    ];
    if scene.warm_tank() {
        steps.push(step("Close panels and put the cover on while the tank is still warm.", &[]));
    }
    if let Some(plan) = scene.plan.filter(|plan| plan.kind.heats()) {
        let thermostat = Temperature(found.heating.thermostat_c.unwrap_or_default());
        let (clock, days) = scene.decision.choice.switch_on.unwrap_or((case.duty.shift_start, 0));
        let day = match days {
            0 => "on the morning of the shift".to_owned(),
            1 => "on the evening or day before".to_owned(),
            more => format!("{more} days before"),
        };
        let fills = [
            ("clock", clock.to_string().into()),
            ("day", day.into()),
            ("start", case.duty.shift_start.to_string().into()),
            ("watts", Power(plan.heater_w.unwrap_or_default()).into()),
            ("thermostat", thermostat.into()),
            ("ready", Time(plan.ready_s.unwrap_or_default()).into()),
        ];
        let template = if plan.kind == PlanKind::BlanketAndHold {
            "Set the thermostat to {thermostat}, check the oil level over the element, and switch the heater ({watts}) on as soon as the machine is parked, at {clock}: it holds the warmth, it cannot bring it back. It stays on until the shift at {start}."
        } else {
            "Set the thermostat to {thermostat}, check the oil level over the element, plug in and set the timer: heater ({watts}) on at {clock} {day}, for a start at {start}. It takes {ready}."
        };
        steps.push(step(template, &fills).expect(plan.ready_s.filter(|time| *time > 0.0)).mind(&[
            "element-covered",
            "cords",
            "unattended-heating",
            "ground-fault",
        ]));
    }
    if scene.keeps_running() {
        if let Some(gate) = scene.gate_c() {
            steps.push(
                step(
                    "Do not switch off. Keep oil circulating in the open air with somebody on watch; read the oil at the suction every half hour: it must stay at {gate} or warmer. Work the functions gently where it falls.",
                    &[("gate", Temperature(gate).into())],
                )
                .mind(&["carbon-monoxide", "cold-stress"]),
            );
        }
    }
    if scene.is(&[PlanKind::WholeMachineHeat]) {
        if let Some(gate) = scene.gate_c() {
            steps.push(
                step(
                    "Bring the machine under cover, or tent it and blow in hot air from outside, until the oil at the suction, the pump body and the coldest hose all read {gate} or warmer. That takes many hours; read, do not guess.",
                    &[("gate", Temperature(gate).into())],
                )
                .mind(&["open-flame", "carbon-monoxide"]),
            );
        }
    }
    if !scene.keeps_running() {
        steps.push(step(
            "Fill a clear jar with oil from the tank sump, close it, and leave it outside next to the machine overnight.",
            &[],
        ));
    }
    steps
}
