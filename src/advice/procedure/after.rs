//! Shutting down, and what to do when a reading is not reached.

use super::{Phase, Scene, Step};
use crate::advice::say::Figure::{Difference, Elevation, Temperature, Time};

pub(super) fn shut_down(scene: &Scene<'_>) -> Vec<Step> {
    let step = |template: &str, fills: &[_]| Step::new(Phase::ShutDown, template, fills);
    let mut steps = vec![
        step(
            "Work every function once more so that warm oil stands in lines and cylinders, then cylinders in, attachments down on blocks, engine off, levers both ways to let pressure off.",
            &[],
        )
        .mind(&["stored-energy", "accumulator"]),
        step(
            "While it is warm: oil level, leaks, water drained from sump and air tanks, windows and breather clear. Write the day's readings on the record sheet.",
            &[],
        ),
    ];
    if scene.heated() {
        steps.push(
            step("Plug in and set timer and thermostat for the next morning as on the evening before.", &[])
                .mind(&["cords", "unattended-heating"]),
        );
    }
    steps
}

pub(super) fn not_reached(scene: &Scene<'_>) -> Vec<Step> {
    let step = |template: &str, fills: &[_]| Step::new(Phase::NotReached, template, fills);
    let found = scene.found;
    let mut steps = Vec::new();
    if scene.plan.is_none() {
        steps.push(step(
            "Do not turn the pump at the site minimum. None of the plans worked out here starts this machine; the oils table says why for each. Get another oil by the specification above, or keep the machine warm, and work the case out again.",
            &[],
        ));
    }
    if let (true, Some(time)) = (scene.heated(), found.heating.time_high_s) {
        steps.push(step(
            "Oil still under the gate at shift start: leave the heater on and the pump alone. With a tank that loses more heat than computed it takes up to {time}. Not there by then: check breaker, voltage, thermostat, level and cover; the heater is at fault or it is colder than the case.",
            &[("time", Time(time).into())],
        ).mind(&["cords", "stored-energy"]));
    } else if scene.plan.is_some() {
        steps.push(step(
            "Oil under the gate: leave the pump alone and bring warmth to the whole machine, shelter or hot air, never a flame. Reading again every half hour costs nothing; a pump does.",
            &[],
        ).mind(&["open-flame", "carbon-monoxide"]));
    }
    steps.push(step(
        "Vacuum over its limit or a scream at the first turn: off within moments, back to warming. Two tries; then the suction line is checked for a closed valve, ice, a blocked strainer or a collapsed hose.",
        &[],
    ));
    if let Some(floor) = found.start_floor.at_c {
        let margin = scene.case.policy.heat.gate_margin_k;
        let mut template = "Who may override: the person answerable for the machine, in writing, may give away the {margin} of gate margin, never more. Nobody turns the pump under {floor}".to_owned();
        let pour = scene.oil.pour_point().map(|pour| pour.as_celsius());
        if pour.is_some() {
            template.push_str(", and below the pour point, {pour}, nobody at all");
        }
        template.push('.');
        steps.push(step(
            &template,
            &[
                ("margin", Difference(margin).into()),
                ("floor", Temperature(floor).into()),
                ("pour", Temperature(pour.unwrap_or_default()).into()),
            ],
        ));
    }
    steps.push(
        step(
            "Stop altogether, engine off and key out, for any one of: a scream, vacuum over the limit, a jet or a leak, no answer of brake or steering, air colder than {minimum}, an oil or a hose that is not the one named here. Tell the person answerable; nobody is blamed for stopping.",
            &[("minimum", Temperature(scene.case.site.minimum.as_celsius()).into())],
        )
        .mind(&["fluid-injection", "manual-first"]),
    );
    steps.push(step(
        "This sheet holds for {oil}, this season, down to {minimum}, at {elevation}. Another oil, another hose or another place: work it out again.",
        &[
            ("oil", scene.oil.name().into()),
            ("minimum", Temperature(scene.case.site.minimum.as_celsius()).into()),
            ("elevation", Elevation(scene.case.site.elevation.as_m()).into()),
        ],
    ));
    steps
}

/// What is written down on each cold morning.
pub(in crate::advice) const RECORD: &[&str] = &[
    "date, machine, operator",
    "air at the machine",
    "heater on at, off at",
    "oil at the suction before cranking",
    "pump body",
    "vacuum at the first turn, and speed",
    "time and oil at the suction: light work",
    "time and oil at the suction: full load",
    "what was stopped, and why",
];
