//! The assessment of a case as a document: every oil with its limits, floors and heating.

use super::document::{Block, Document, Line};
use super::units::{Shown, fixed};
use crate::advice::{Assessment, Floor, HeatingStatus, LimitResult, Outcome};
use crate::case::{Assumption, Case, From, POLICY, Units};
use crate::heat::HeatPolicy;
use crate::oil::Oil;

/// Builds the document, in the case's units or others.
#[must_use]
pub fn assessment(case: &Case, oils: &[(&Oil, Assessment)], units: Units) -> Document {
    let shown = Shown(units);
    let mut blocks =
        vec![Block::Title(Line::from(case.title.clone())), Block::Pairs(site(case, shown))];
    for (index, (oil, found)) in oils.iter().enumerate() {
        one_oil(&mut blocks, case, (oil, found), &format!("/oils/{index}"), shown);
    }
    policy(&mut blocks, case, shown);
    if !case.assumptions.is_empty() {
        blocks.push(Block::Heading(Line::from("Assumed - confirm")));
        // Those that a floor hangs on first.
        let governs = |key: &str| oils.iter().any(|(_, found)| found.hangs_on(key));
        let mut rows: Vec<_> = case.assumptions.iter().enumerate().collect();
        rows.sort_by_key(|(_, assumption)| !governs(&assumption.key));
        let line = |(at, assumption): (usize, &Assumption)| {
            let mut line = Line::from(format!("{}: ", assumption.key)).figure(
                shown.input(&assumption.key, &assumption.value),
                format!("/assumptions/{at}/value"),
            );
            if governs(&assumption.key) {
                line = line.strong(", a floor hangs on it");
            }
            let find = if assumption.ask.is_empty() {
                String::new()
            } else {
                format!("; find it: {}", assumption.ask)
            };
            line.faint(format!(" ({}{find})", assumption.source))
        };
        blocks.push(Block::List(rows.into_iter().map(line).collect()));
    }
    blocks.push(Block::Text(Line::from(
        "Judged is the hydraulic system only, on the thick edge of the likely viscosity. Rates of that \
         edge are this project's judgement; one viscosity measured in the cold replaces them. The \
         machine's manual, local codes and a licensed electrician come before this page.",
    )));
    Document { blocks }
}

/// The figures of judgement that this case sets otherwise.
pub(super) fn policy(blocks: &mut Vec<Block>, case: &Case, shown: Shown) {
    let set: Vec<Line> = case
        .inputs
        .iter()
        .enumerate()
        .filter(|(_, input)| input.from == From::Policy)
        .filter_map(|(at, input)| {
            let row = POLICY.iter().find(|row| row.path == input.key)?;
            let default = shown.input(row.path, row.example.trim_matches('"'));
            Some(
                Line::from(format!("{}: ", row.path))
                    .figure(shown.input(row.path, &input.value), format!("/inputs/{at}/value"))
                    .words(format!(" instead of {default}: {}", row.about)),
            )
        })
        .collect();
    if !set.is_empty() {
        blocks.push(Block::Heading(Line::from("Judgement set by this case")));
        blocks.push(Block::List(set));
    }
}

fn site(case: &Case, shown: Shown) -> Vec<(String, Line)> {
    let site = &case.site;
    vec![
        (
            "site minimum".to_owned(),
            Line::new()
                .figure(shown.temperature(site.minimum.as_celsius()), "/site/minimum_c")
                .words(if site.clear_sky { ", open under a clear sky" } else { "" }),
        ),
        (
            "heater sized for".to_owned(),
            Line::new()
                .figure(shown.temperature(site.heating.as_celsius()), "/site/heating_c")
                .words(", wind ")
                .figure(shown.wind(site.wind.as_m_per_s()), "/site/wind_m_s"),
        ),
        (
            "local air pressure".to_owned(),
            Line::new().figure(
                shown.pressure(crate::air::atmosphere_kpa(site.elevation.as_m())),
                "/site/air_kpa",
            ),
        ),
    ]
}

fn one_oil(
    blocks: &mut Vec<Block>,
    case: &Case,
    (oil, found): (&Oil, &Assessment),
    at: &str,
    shown: Shown,
) {
    let policy = &case.policy.heat;
    let mut head = oil.name().to_owned();
    match oil.class() {
        Some(class) if class != oil.name() => head = format!("{head}, {class}"),
        _ => {}
    }
    if oil.in_service() {
        head.push_str(", in service");
    }
    if oil.reference_only() {
        head.push_str(", for comparison only");
    }
    blocks.push(Block::Heading(Line::from(format!("{head}: {}", found.verdict.words()))));
    let mut pairs =
        vec![(format!("at {}", shown.temperature(found.soak_c)), viscosity(found, at, shown))];
    pairs.push((
        "do not turn the pump below".to_owned(),
        floor(&found.start_floor, &format!("{at}/start_floor"), shown),
    ));
    pairs.push((
        "light work from".to_owned(),
        floor(&found.light_floor, &format!("{at}/light_floor"), shown),
    ));
    pairs.push((
        "full load from".to_owned(),
        floor(&found.work_floor, &format!("{at}/work_floor"), shown),
    ));
    pairs.push((
        "do not run above".to_owned(),
        found.hot_ceiling_c.map_or_else(
            || Line::from("unattainable"),
            |t| Line::new().figure(shown.temperature(t), format!("{at}/hot_ceiling_c")),
        ),
    ));
    heating(&mut pairs, found, &format!("{at}/heating"), shown, policy);
    first_turn(&mut pairs, found, at, shown, policy);
    blocks.push(Block::Pairs(pairs));
    blocks.push(Block::Table {
        head: ["limit", "met from", "met at the soak", "judged on expected"]
            .map(str::to_owned)
            .to_vec(),
        rows: found
            .limits
            .iter()
            .enumerate()
            .map(|(row, result)| limit(result, &format!("{at}/limits/{row}"), shown))
            .collect(),
    });
    let mut notes: Vec<Line> = found
        .limits
        .iter()
        .filter_map(|result| {
            result.outcome.why().map(|why| {
                Line::from(format!("{} {}: {why}", result.id.id(), words(result.outcome)))
            })
        })
        .collect();
    notes.extend(
        found.reasons.iter().enumerate().map(|(row, reason)| {
            Line::new().say(&reason.text, &format!("{at}/reasons/{row}"), shown)
        }),
    );
    if !notes.is_empty() {
        blocks.push(Block::List(notes));
    }
}

const fn words(outcome: Outcome) -> &'static str {
    match outcome {
        Outcome::At(_) => "",
        Outcome::NeverBites { .. } => "never bites",
        Outcome::Unattainable(_) => "unattainable",
        Outcome::NotChecked(_) => "not checked",
    }
}

fn viscosity(found: &Assessment, at: &str, shown: Shown) -> Line {
    let estimate = &found.at_soak;
    let pointer = |key: &str| format!("{at}/viscosity_at_soak/{key}");
    match (estimate.low, estimate.expected, estimate.high) {
        (Some(low), Some(expected), Some(high)) => Line::new()
            .figure(shown.viscosity(expected), pointer("expected_mm2_s"))
            .words(", likely ")
            .figure(shown.viscosity(low), pointer("low_mm2_s"))
            .words(" to ")
            .figure(shown.viscosity(high), pointer("high_mm2_s"))
            .faint(format!(" ({})", estimate.reach.words())),
        _ => Line::from("no number: within 5 K of the pour point or below it"),
    }
}

fn floor(floor: &Floor, pointer: &str, shown: Shown) -> Line {
    match (floor.at_c, floor.set_by) {
        (Some(t), Some(by)) => Line::new()
            .figure(shown.temperature(t), format!("{pointer}_c"))
            .words(format!(", set by {}", by.id())),
        (None, Some(by)) => Line::from(format!("unattainable ({})", by.id())),
        _ => Line::from("not known"),
    }
}

fn heating(
    pairs: &mut Vec<(String, Line)>,
    found: &Assessment,
    at: &str,
    shown: Shown,
    policy: &HeatPolicy,
) {
    let heating = &found.heating;
    let mut put = |name: &str, line: Line| pairs.push((name.to_owned(), line));
    let figure = |text: String, key: &str| Line::new().figure(text, format!("{at}/{key}"));
    let texts: Vec<&str> = heating.whys.iter().map(|why| why.text()).collect();
    let because = if texts.is_empty() { String::new() } else { format!(": {}", texts.join("; ")) };
    let what = match heating.status {
        HeatingStatus::NotNeeded => "not needed",
        HeatingStatus::Sized => "sized",
        HeatingStatus::CannotReach => "cannot reach",
        HeatingStatus::CircuitTooSmall => "circuit too small",
        HeatingStatus::ElementTooHot => "element too hot",
        HeatingStatus::NotChecked => "not checked",
    };
    put("tank heating", Line::from(format!("{what}{because}")));
    if let Some(fitted) = &heating.fitted {
        let texts: Vec<&str> = fitted.whys.iter().map(|why| why.text()).collect();
        let text = if texts.is_empty() { "does it".to_owned() } else { texts.join("; ") };
        put("element fitted", Line::from(text));
    }
    if let (Some(target), Some(thermostat)) = (heating.mean_target_c, heating.thermostat_c) {
        put(
            "heat the tank to",
            figure(shown.temperature(target), "mean_target_c")
                .words(" (mean), thermostat ")
                .figure(shown.temperature(thermostat), format!("{at}/thermostat_c")),
        );
    }
    if let (Some(needed), Some(high)) = (heating.needed_w, heating.needed_high_w) {
        put(
            "power needed",
            figure(shown.power(needed), "needed_w")
                .words(", ")
                .figure(shown.power(high), format!("{at}/needed_high_w"))
                .words(format!(
                    " if the tank loses {} % more",
                    fixed(100.0 * (policy.loss_uncertainty - 1.0), 0)
                )),
        );
    }
    if let Some(heater) = heating.heater_w {
        let mut line = figure(shown.power(heater), "heater_w");
        if heating.elements_w.len() > 1 {
            line = line.words(format!(" in {} elements", heating.elements_w.len()));
        }
        if let Some(time) = heating.time_s {
            line = line.words(", ready in ").figure(shown.time(time), format!("{at}/time_s"));
        }
        if let Some(energy) = heating.energy_kwh {
            line = line
                .words(", ")
                .figure(format!("{} kWh", fixed(energy, 1)), format!("{at}/energy_kwh"));
        }
        if let Some(current) = heating.current_a {
            line = line
                .words(", ")
                .figure(format!("{} A", fixed(current, 1)), format!("{at}/current_a"));
        }
        if heating.tight {
            line = line.words(", tight: no reserve if the tank loses more");
        }
        let name =
            if heating.status == HeatingStatus::Sized { "heater" } else { "heater it would take" };
        put(name, line);
    }
    if let (Some(hold), Some(u)) = (heating.hold_w, heating.u_value) {
        let mut line = figure(shown.power(hold), "hold_w")
            .words(" at U ")
            .figure(shown.u_value(u), format!("{at}/u_value_w_m2_k"));
        if let Some(valid) = heating.gate_valid_s {
            line = line
                .words("; start within ")
                .figure(shown.time(valid), format!("{at}/gate_valid_s"))
                .words(" of switching off");
        }
        put("to hold it", line);
    }
    if let Some(most) = heating.watt_density_max {
        let mut line =
            figure(shown.watt_density(most), "watt_density_max_w_cm2").words(" at the most");
        if let Some(surface) = heating.surface_cm2 {
            line = line.words("; ").figure(shown.area(surface), format!("{at}/surface_cm2"));
            if let Some(used) = heating.watt_density {
                line = line
                    .words(" at ")
                    .figure(shown.watt_density(used), format!("{at}/watt_density_w_cm2"));
            }
        }
        if let (Some(film), Some(bulk)) = (heating.skin_film_c, heating.skin_bulk_c) {
            line = line
                .words("; skin ")
                .figure(shown.temperature(film), format!("{at}/skin_film_c"))
                .words(" at cut-out, at worst ")
                .figure(shown.temperature(bulk), format!("{at}/skin_bulk_c"))
                .words(" in the coldest oil");
        }
        put("element", line);
    }
    if heating.pump_warming {
        put("pump", Line::from("must be warmed too: tank oil would be far hotter than the pump"));
    }
}

fn first_turn(
    pairs: &mut Vec<(String, Line)>,
    found: &Assessment,
    at: &str,
    shown: Shown,
    policy: &HeatPolicy,
) {
    let turn = &found.first_turn;
    let figure =
        |text: String, key: &str| Line::new().figure(text, format!("{at}/first_turn/{key}"));
    if let (Some(time), Some(fill)) = (turn.hose_clearing_s, turn.hose_fill) {
        pairs.push((
            "cold oil in the hose".to_owned(),
            figure(shown.time(time), "hose_clearing_s")
                .words(" to draw it out; the pump fills to ")
                .figure(
                    format!("{} %", fixed((fill * 100.0).min(100.0), 0)),
                    format!("{at}/first_turn/hose_fill"),
                )
                .words(" at first"),
        ));
    }
    if found.at_soak.high.is_none() {
        pairs.push((
            "cold oil in the hose".to_owned(),
            Line::from("may be gel: jog without fuel and warm the line; case pressure not known"),
        ));
    }
    if let (Some(vacuum), Some(speed)) = (turn.vacuum_at_gate_kpa, turn.speed_max_rpm) {
        pairs.push((
            format!("{} over that floor", shown.difference(policy.gate_margin_k).replace(".0", "")),
            Line::from("vacuum ")
                .figure(shown.vacuum(vacuum), format!("{at}/first_turn/vacuum_at_gate_kpa"))
                .words(" at start speed, no faster than ")
                .figure(
                    format!("{} rpm", fixed(speed, 0)),
                    format!("{at}/first_turn/speed_max_rpm"),
                ),
        ));
    }
    if let Some(drain) = turn.case_drain_kpa {
        pairs.push((
            "case pressure".to_owned(),
            figure(shown.pressure(drain), "case_drain_kpa").words(" gauge at the soak"),
        ));
    }
    let circulation = &found.circulation;
    let line = match (circulation.time_s, circulation.steady_c, circulation.why) {
        (Some(time), _, why) => {
            let line = Line::new()
                .figure(shown.time(time), format!("{at}/circulation/time_s"))
                .words(" to full load");
            match why {
                Some(why) => line.words(format!("; {why}")),
                None => line,
            }
        }
        (None, Some(steady), Some(why)) => Line::from("ends at ")
            .figure(shown.temperature(steady), format!("{at}/circulation/steady_c"))
            .words(format!("; {why}")),
        (None, _, why) => Line::from(format!("not checked: {}", why.unwrap_or_default())),
    };
    pairs.push(("warming at idle".to_owned(), line));
}

fn limit(result: &LimitResult, pointer: &str, shown: Shown) -> Vec<Line> {
    let temperature = |outcome: Outcome| match outcome {
        Outcome::At(t) => shown.temperature(t),
        Outcome::NeverBites { to } => format!("under {}", shown.temperature(to)),
        Outcome::Unattainable(_) => "unattainable".to_owned(),
        Outcome::NotChecked(_) => "not checked".to_owned(),
    };
    let met = match result.met_at_soak {
        Some(true) => "yes",
        Some(false) => "no",
        None => "-",
    };
    let found = match result.outcome {
        Outcome::At(_) => {
            Line::new().figure(temperature(result.outcome), format!("{pointer}/temperature_c"))
        }
        other => Line::from(temperature(other)),
    };
    let side = if result.side == crate::advice::Side::Hot { " (met up to)" } else { "" };
    vec![
        Line::from(format!("{}{side}", result.id.id())),
        found,
        Line::from(met),
        Line::from(temperature(result.expected)),
    ]
}
