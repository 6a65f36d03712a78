//! Oil temperature against the clock, from parking to full load.

use super::axis::{Axis, degrees};
use super::model::{Chart, Shape};
use crate::advice::{Assessment, Night};
use crate::case::{Case, Clock, Units};
use crate::report::units::Shown;

/// Oil temperature against the time of day: parked and cooling, heated, warmed by running.
///
/// Lines across are the gates: what the oil must have come to before each step. `None` where nothing
/// of the night is known; the night's own remarks say why.
#[must_use]
pub fn overnight(case: &Case, found: &Assessment, night: &Night, units: Units) -> Option<Chart> {
    if night.parts.is_empty() {
        return None;
    }
    let gate = found.start_floor.at_c.map(|floor| floor + case.policy.heat.gate_margin_k);
    let levels = [
        ("coldest air", Some(night.air_c)),
        ("first turn from", gate),
        ("light work from", found.light_floor.at_c),
        ("full load from", found.work_floor.at_c),
    ];
    let points = || night.parts.iter().flat_map(|part| &part.points);
    let hours = points().map(|(hour, _)| *hour).chain([0.0]);
    let (from, to) = hours.fold((-1.0, 1.0), |(a, b): (f64, f64), h| (a.min(h), b.max(h)));
    let warmth = points().map(|(_, t)| *t).chain(levels.iter().filter_map(|(_, at)| *at));
    let (cold, warm) =
        warmth.fold((f64::INFINITY, f64::NEG_INFINITY), |(a, b), t| (a.min(t), b.max(t)));

    let x = Axis::clock(case.duty.shift_start, from, to);
    let y =
        Axis::temperature("oil temperature", units, super::Scale::Linear, cold - 2.0, warm + 2.0);
    let mut chart = Chart::new(format!("The night before the shift: {}", night.oil), x, y);
    for (words, at) in levels {
        if let Some(at) = at {
            chart.limit(words, at, degrees(units, at));
        }
    }
    let clock = |hour: f64| time_of_day(case.duty.shift_start, hour);
    for part in &night.parts {
        let ends = (part.points.first(), part.points.last());
        if let (Some((from, a)), Some((to, b))) = ends {
            chart.says.push(format!(
                "{}: from {} at {} to {} at {}.",
                part.kind.words(),
                degrees(units, *a),
                clock(*from),
                degrees(units, *b),
                clock(*to)
            ));
        }
        chart.draw(part.kind.words(), Shape::Line(part.points.clone()));
    }
    for (words, hour) in
        [("parked", night.parked_h), ("switch on", night.switch_on_h), ("shift starts", Some(0.0))]
    {
        if let Some(hour) = hour {
            chart.mark(words, hour, clock(hour));
        }
    }
    let mixed = night.mixed_c.map(|t| (0.0, t));
    chart.draw("tank mixed with the cold rest", Shape::Points(mixed.into_iter().collect()));
    chart.notes.extend(night.remarks.iter().map(|remark| Shown(units).say(remark)));
    Some(chart)
}

/// The time of day so many hours after a clock time.
fn time_of_day(zero: Clock, hours: f64) -> String {
    let minutes = (f64::from(zero.minutes()) + 60.0 * hours).round().rem_euclid(1440.0);
    format!("{:02}:{:02}", (minutes / 60.0).floor(), minutes.rem_euclid(60.0))
}
