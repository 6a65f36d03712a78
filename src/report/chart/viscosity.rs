//! Viscosity against temperature on the axes of ASTM D341, with the limits of the pump.

use super::axis::{Axis, Scale, degrees, rpm};
use super::model::{Chart, Shape};
use crate::advice::{Assessment, Setup};
use crate::case::{Case, Units};
use crate::oil::{D341, Oil};
use crate::report::units::Shown;

/// Over so many oils their likely ranges are left out: nobody could tell them apart.
const MOST_BANDS: usize = 3;
/// Step between the points of a curve, K.
const STEP_K: f64 = 2.0;
/// The chart reaches to here, °C: where the second viscosity of a data sheet stands.
const HOT_END_C: f64 = 100.0;
/// A pour point so far under the soak is said in the key, not shown, K.
const FAR_BELOW_K: f64 = 25.0;

/// Viscosity against temperature of one or several oils of a case.
///
/// On these axes a line of ASTM D341 is straight. One oil has all its floors as lines; several have
/// the lowest temperature of the pump each. A curve ends at the pour point + 5 K, or at a colder
/// measured point.
#[must_use]
pub fn viscosity(case: &Case, oils: &[(&Oil, &Assessment)], units: Units) -> Chart {
    let shown = Shown(units);
    let alone = oils.len() == 1;
    let setups: Vec<Setup<'_>> = oils.iter().map(|(oil, _)| Setup::new(case, oil)).collect();
    let soak = setups.first().map_or(case.site.minimum.as_celsius(), |setup| setup.soak_c);

    let pours = oils.iter().filter_map(|(oil, _)| oil.pour_point()).map(|pour| pour.as_celsius());
    // The pour points of several oils have no line.
    let colds = pours.clone().filter(|pour| alone && *pour > soak - FAR_BELOW_K);
    let floors = oils.iter().filter_map(|(_, found)| found.start_floor.at_c);
    let coldest = colds.chain(floors).fold(soak, f64::min) - 3.0;
    let x = Axis::temperature("oil temperature", units, Scale::LogKelvin, coldest, HOT_END_C);

    let mut limits = pump_limits(case);
    if let ([setup], [(_, found)]) = (setups.as_slice(), oils) {
        limits.extend(suction_limit(setup, found.start_floor.at_c));
    }
    let reach = |at: usize| {
        let bottom = setups.get(at).map_or(coldest, |setup| setup.bottom_c);
        let measured = oils.get(at).map_or(bottom, |(oil, _)| oil.curve().coldest().0);
        bottom.min(measured)
    };
    let span: Vec<f64> = oils
        .iter()
        .enumerate()
        .flat_map(|(at, (oil, _))| [oil.high(reach(at).max(x.from)), oil.low(x.to)])
        .chain(limits.iter().map(|(_, at)| *at))
        .collect();
    let y = Axis::viscosity(
        units,
        span.iter().copied().fold(f64::INFINITY, f64::min),
        span.iter().copied().fold(0.0, f64::max),
    );

    let names: Vec<&str> = oils.iter().map(|(oil, _)| oil.name()).collect();
    let of =
        if names.len() > MOST_BANDS { format!("{} oils", names.len()) } else { names.join(", ") };
    let mut chart = Chart::new(format!("Viscosity against temperature: {of}"), x, y);
    for (words, at) in limits {
        chart.limit(words, at, shown.viscosity(at));
    }
    chart.mark("soak", soak, degrees(units, soak));
    for (at, (oil, found)) in oils.iter().enumerate() {
        let few = oils.len() <= MOST_BANDS;
        curves(&mut chart, oil, reach(at), few, name(oil, found, alone, few, units));
        let number = if alone { String::new() } else { format!("{}: ", at + 1) };
        if few {
            marks(&mut chart, oil, found, &number, alone, units);
        }
        if let (None, Some(by)) = (found.start_floor.at_c, found.start_floor.set_by) {
            chart.notes.push(format!(
                "{}: no temperature is found from which the pump may be turned ({}).",
                oil.name(),
                by.id()
            ));
        }
        say(&mut chart, oil, found, reach(at), units);
    }
    for (class_only, name) in
        [(false, "measured, or set by the viscosity index"), (true, "limits of the class")]
    {
        let given = oils.iter().filter(|(oil, _)| oil.class_only() == class_only);
        let points = given.flat_map(|(oil, _)| oil.curve().points());
        chart.draw(name, Shape::Points(points.copied().collect()));
    }
    if oils.len() > MOST_BANDS {
        chart.notes.push(format!("Likely ranges are left out with more than {MOST_BANDS} oils."));
    }
    if pours.clone().any(|pour| pour + case.policy.oil.no_number_below_k > chart.x.from) {
        chart.notes.push(format!(
            "No curve is drawn under the pour point + {}: the oil may gel there.",
            shown.difference(case.policy.oil.no_number_below_k)
        ));
    }
    chart.notes.push(format!("{}.", D341.name));
    chart
}

/// The viscosities the pump is judged by, mm²/s.
fn pump_limits(case: &Case) -> Vec<(String, f64)> {
    let pump = &case.pump;
    let mut limits = Vec::new();
    let start = pump.viscosity_start_max.as_mm2_per_s();
    match case.unproven_start_max {
        // Zero or less: no oil is thin enough, and no line stands for it.
        Some(most) if most > 0.0 && most < start => {
            limits.push(("most at a start, inlet not proven".to_owned(), most));
        }
        _ => limits.push(("most at a start".to_owned(), start)),
    }
    limits.push(("most at work".to_owned(), pump.viscosity_work_max.as_mm2_per_s()));
    limits.push(("least at work".to_owned(), pump.viscosity_min.as_mm2_per_s()));
    let short = pump.viscosity_min_short.as_mm2_per_s();
    if short < pump.viscosity_min.as_mm2_per_s() {
        limits.push(("least for a short time".to_owned(), short));
    }
    limits
}

/// The thickest oil that the suction line lets through at start speed, for the oil's density at the
/// start floor.
fn suction_limit(setup: &Setup<'_>, floor: Option<f64>) -> Option<(String, f64)> {
    let pump = &setup.case.pump;
    let speed = pump.start_speed.as_rpm();
    let rho = setup.bulk.density(floor.unwrap_or(0.0));
    let most = setup.inlet.as_ref()?.largest_viscosity(
        setup.flow_per_rpm * speed,
        rho,
        pump.inlet_start_min.as_kpa(),
    )?;
    (most < 1e7).then(|| (format!("most the suction line passes at {}", rpm(speed)), most))
}

/// The line of an oil and its likely range, from its reach up.
fn curves(chart: &mut Chart, oil: &Oil, reach: f64, band: bool, name: String) {
    let from = reach.max(chart.x.from);
    // The joints of the line stand among the points, so that every piece of it is straight.
    let mut at: Vec<f64> = oil.curve().points().iter().map(|point| point.0).collect();
    let mut t = from;
    while t < chart.x.to {
        at.push(t);
        t += STEP_K;
    }
    at.extend([chart.x.to, 40.0]);
    at.retain(|t| *t >= from && *t <= chart.x.to);
    at.sort_by(f64::total_cmp);
    at.dedup();
    let points = at.iter().filter_map(|t| {
        let found = oil.estimate(*t);
        Some((*t, found.low?, found.expected?, found.high?))
    });
    let points: Vec<(f64, f64, f64, f64)> = points.collect();
    if band {
        let range = points.iter().map(|(t, low, _, high)| (*t, *low, *high)).collect();
        chart.draw("likely range", Shape::Band(range));
    }

    chart.draw(
        name,
        Shape::Line(points.iter().map(|(t, _, expected, _)| (*t, *expected)).collect()),
    );
}

/// What an oil is called in the key. Of many oils it holds the floor too: so many lines up would be
/// read by nobody.
fn name(oil: &Oil, found: &Assessment, alone: bool, few: bool, units: Units) -> String {
    match found.start_floor.at_c {
        _ if alone => "expected".to_owned(),
        Some(floor) if !few => {
            format!("{}, do not turn the pump below {}", oil.name(), degrees(units, floor))
        }
        _ => format!("{}, expected", oil.name()),
    }
}

fn marks(
    chart: &mut Chart,
    oil: &Oil,
    found: &Assessment,
    number: &str,
    alone: bool,
    units: Units,
) {
    let mut mark = |words: &str, at: Option<f64>| {
        if let Some(at) = at {
            chart.mark(format!("{number}{words}"), at, degrees(units, at));
        }
    };
    if alone {
        mark("pour point", oil.pour_point().map(|pour| pour.as_celsius()));
    }
    mark("do not turn the pump below", found.start_floor.at_c);
    if alone {
        mark("light work from", found.light_floor.at_c);
        mark("full load from", found.work_floor.at_c);
        mark("do not run above", found.hot_ceiling_c);
    }
}

/// The oil in words: its viscosities at round places, and where its curve ends.
fn say(chart: &mut Chart, oil: &Oil, found: &Assessment, reach: f64, units: Units) {
    let shown = Shown(units);
    let places = [found.soak_c, 0.0, 40.0, 100.0];
    let texts: Vec<String> = places
        .iter()
        .map(|t| {
            let at = oil.estimate(*t);
            match (at.low, at.expected, at.high) {
                (Some(low), Some(expected), Some(high)) => format!(
                    "{} at {} (likely {} to {})",
                    shown.viscosity(expected),
                    degrees(units, *t),
                    shown.viscosity(low),
                    shown.viscosity(high)
                ),
                _ => format!("no number at {}", degrees(units, *t)),
            }
        })
        .collect();
    chart.says.push(format!(
        "{}: {}; drawn from {} up.",
        oil.name(),
        texts.join(", "),
        degrees(units, reach.max(chart.x.from))
    ));
}
