//! Pressure at the pump inlet, and the highest speed it allows, against temperature.

use super::axis::{Axis, Scale, degrees, rpm};
use super::model::{Chart, Shape};
use crate::advice::{Assessment, Edge, LimitId, Outcome, Setup, Why};
use crate::case::{Case, Units};
use crate::oil::Oil;
use crate::pump::{INLET_BALANCE, Inlet};
use crate::report::units::Shown;

/// Step between the points of a curve, K.
const STEP_K: f64 = 1.0;
/// The charts reach at least to here, °C.
const WARM_END_C: f64 = 40.0;

/// Pressure at the pump inlet against temperature, at start and at work speed.
///
/// Lines are judged on the thick edge of the likely viscosity; from there to the expected one
/// reaches the range round each.
///
/// # Errors
/// Why there is no such chart: no suction line, or no displacement.
pub fn inlet(case: &Case, oil: &Oil, found: &Assessment, units: Units) -> Result<Chart, Why> {
    let setup = Setup::new(case, oil);
    let line = known(&setup)?;
    let shown = Shown(units);
    let pump = &case.pump;
    let x = temperatures(&setup, found, units);
    let rest =
        line.pressure_kpa(1e-9, setup.viscosity(Edge::Expected, x.to), setup.bulk.density(x.to));
    let y =
        Axis::pressure("pressure at the pump inlet", units, 0.0, rest.max(setup.atmosphere_kpa));
    let title = format!("Pressure at the pump inlet against temperature: {}", oil.name());
    let mut chart = Chart::new(title, x, y);
    for (words, speed) in [("start", pump.start_speed), ("work", pump.work_speed)] {
        let speed = speed.as_rpm();
        let points: Vec<(f64, f64, f64)> = steps(&setup, &chart.x)
            .into_iter()
            .filter_map(|t| {
                let thick = setup.inlet_kpa(Edge::Thick, speed, t)?;
                Some((t, thick, setup.inlet_kpa(Edge::Expected, speed, t)?))
            })
            .collect();
        let line = points.iter().map(|(t, thick, _)| (*t, *thick)).collect();
        chart.draw("from the thick edge to the expected viscosity", Shape::Band(points));
        chart.draw(format!("at {words} speed, {}, thick edge", rpm(speed)), Shape::Line(line));
        let places = [found.soak_c, 0.0, 20.0];
        let texts: Vec<String> = places
            .iter()
            .filter(|t| **t >= setup.bottom_c)
            .filter_map(|t| Some((t, setup.inlet_kpa(Edge::Thick, speed, *t)?)))
            .map(|(t, kpa)| {
                let pressure =
                    if kpa > 0.0 { shown.pressure(kpa) } else { "none, it starves".to_owned() };
                format!("{pressure} at {}", degrees(units, *t))
            })
            .collect();
        chart.says.push(format!("At {words} speed: {}.", texts.join(", ")));
    }
    let mut limit = |words: &str, kpa: f64| chart.limit(words, kpa, shown.pressure(kpa));
    limit("local air", setup.atmosphere_kpa);
    limit("least at a start", pump.inlet_start_min.as_kpa());
    let fits = !found.limits.iter().any(|result| {
        result.id == LimitId::InletPressureWork
            && result.outcome == Outcome::NotChecked(Why::TypicalLimitDoesNotFit)
    });
    if fits {
        limit("least at work", pump.inlet_work_min.as_kpa());
    } else {
        chart
            .notes
            .push(format!("The limit at work was not checked: {}.", Why::TypicalLimitDoesNotFit));
    }
    for (id, words) in [
        (LimitId::InletPressureStart, "enough at start speed from"),
        (LimitId::InletPressureLight, "enough at light work from"),
        (LimitId::InletPressureWork, "enough at work speed from"),
    ] {
        let result = found.limits.iter().find(|result| result.id == id);
        if let Some(Outcome::At(t)) = result.map(|result| result.outcome) {
            chart.mark(words, t, degrees(units, t));
        }
    }
    finish(&mut chart, &setup, units);
    Ok(chart)
}

/// The highest speed the inlet allows against temperature, with the ladder an operator follows.
///
/// # Errors
/// Why there is no such chart: no suction line, no displacement, or no temperature at which the pump
/// may be started.
pub fn speed(case: &Case, oil: &Oil, found: &Assessment, units: Units) -> Result<Chart, Why> {
    let setup = Setup::new(case, oil);
    let line = known(&setup)?;
    let ladder = &found.first_turn.speed_ladder;
    let Some(first) = ladder.first() else { return Err(Why::InletTooLow) };
    let pump = &case.pump;
    let (start, work) = (pump.start_speed.as_rpm(), pump.work_speed.as_rpm());
    let x = temperatures(&setup, found, units);
    let y = Axis::speed("pump speed", 1.1 * start.max(work));
    let title = format!("Highest pump speed against temperature: {}", oil.name());
    let mut chart = Chart::new(title, x, y);
    let least = pump.inlet_start_min.as_kpa();
    let highest: Vec<(f64, f64)> = steps(&setup, &chart.x)
        .into_iter()
        .filter_map(|t| {
            let (nu, rho) = (setup.viscosity(Edge::Thick, t), setup.bulk.density(t));
            Some((t, line.highest_speed(setup.flow_per_rpm, nu, rho, least, work)?))
        })
        .collect();
    chart.draw("what the inlet allows, thick edge", Shape::Line(highest));
    let mut rungs: Vec<(f64, f64)> =
        ladder.iter().map(|step| (step.oil_c, step.speed_max_rpm)).collect();
    let texts: Vec<String> = rungs
        .iter()
        .map(|(t, speed)| format!("{} from {}", rpm(*speed), degrees(units, *t)))
        .collect();
    chart.says.push(format!("Unloaded, no faster than {}.", texts.join(", ")));
    // The last rung holds from there on.
    if let Some((_, speed)) = rungs.last().copied() {
        rungs.push((chart.x.to, speed));
    }
    chart.draw("ladder: no faster than, unloaded", Shape::Steps(rungs));
    chart.limit("start speed", start, rpm(start));
    chart.limit("work speed", work, rpm(work));
    chart.mark("gate: first turn from", first.oil_c, degrees(units, first.oil_c));
    finish(&mut chart, &setup, units);
    Ok(chart)
}

fn known<'a>(setup: &'a Setup<'_>) -> Result<&'a Inlet, Why> {
    setup.inlet.as_ref().ok_or(if setup.case.suction.is_none() {
        Why::NoSuctionLine
    } else {
        Why::NoDisplacement
    })
}

/// From where the oil has a viscosity, or the soak, to where the machine works.
fn temperatures(setup: &Setup<'_>, found: &Assessment, units: Units) -> Axis {
    let from = setup.bottom_c.max(setup.soak_c - 5.0).min(setup.soak_c);
    let to = found.work_floor.at_c.map_or(WARM_END_C, |floor| WARM_END_C.max(floor + 5.0));
    Axis::temperature("oil at the suction", units, Scale::Linear, from, to)
}

/// Temperatures of a curve, from where the oil has a viscosity, °C.
fn steps(setup: &Setup<'_>, x: &Axis) -> Vec<f64> {
    let from = setup.bottom_c.max(x.from);
    let mut at = Vec::new();
    let mut t = from;
    while t < x.to {
        at.push(t);
        t += STEP_K;
    }
    at.push(x.to);
    at
}

fn finish(chart: &mut Chart, setup: &Setup<'_>, units: Units) {
    chart.mark("soak", setup.soak_c, degrees(units, setup.soak_c));
    if setup.bottom_c > chart.x.from && setup.oil.pour_point().is_some() {
        chart.notes.push(format!(
            "Nothing is drawn under {}: so near its pour point the oil has no one viscosity.",
            degrees(units, setup.bottom_c)
        ));
    }
    chart.notes.push(format!("By {}.", INLET_BALANCE.name));
}
