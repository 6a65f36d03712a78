//! From values to places in the unit square, cut off at its sides.

use super::model::Chart;

/// Lines of a path inside the chart, in places (0 to 1, from the lower left).
///
/// Each segment is cut as Y.-D. Liang and B. A. Barsky do, ACM Transactions on Graphics 3 (1984) 1
/// (memory).
pub(super) fn inside(chart: &Chart, path: &[(f64, f64)]) -> Vec<Vec<(f64, f64)>> {
    let places: Vec<(f64, f64)> =
        path.iter().map(|(x, y)| (chart.x.place(*x), chart.y.place(*y))).collect();
    let mut out: Vec<Vec<(f64, f64)>> = Vec::new();
    for (a, b) in places.iter().zip(places.iter().skip(1)) {
        let Some((from, to)) = cut(*a, *b) else { continue };
        match out.last_mut() {
            Some(line) if line.last().is_some_and(|end| near(*end, from)) => line.push(to),
            _ => out.push(vec![from, to]),
        }
    }
    out
}

fn near(a: (f64, f64), b: (f64, f64)) -> bool {
    (a.0 - b.0).abs() < 1e-9 && (a.1 - b.1).abs() < 1e-9
}

/// The part of a segment inside the unit square.
fn cut(a: (f64, f64), b: (f64, f64)) -> Option<((f64, f64), (f64, f64))> {
    if ![a.0, a.1, b.0, b.1].iter().all(|value| value.is_finite()) {
        return None;
    }
    let (dx, dy) = (b.0 - a.0, b.1 - a.1);
    let (mut enter, mut leave) = (0.0_f64, 1.0_f64);
    for (step, room) in [(-dx, a.0), (dx, 1.0 - a.0), (-dy, a.1), (dy, 1.0 - a.1)] {
        if step == 0.0 {
            if room < 0.0 {
                return None;
            }
        } else if step < 0.0 {
            enter = enter.max(room / step);
        } else {
            leave = leave.min(room / step);
        }
    }
    let at = |share: f64| (a.0 + share * dx, a.1 + share * dy);
    (enter <= leave).then(|| (at(enter), at(leave)))
}

#[cfg(test)]
mod tests {
    use super::cut;

    #[test]
    fn cuts_at_each_side() {
        assert_eq!(cut((-1.0, 0.5), (2.0, 0.5)), Some(((0.0, 0.5), (1.0, 0.5))));
        assert_eq!(cut((0.5, -1.0), (0.5, 2.0)), Some(((0.5, 0.0), (0.5, 1.0))));
        assert_eq!(cut((0.25, 0.25), (0.75, 0.75)), Some(((0.25, 0.25), (0.75, 0.75))));
        assert_eq!(cut((-1.0, 0.5), (-0.5, 0.5)), None);
        assert_eq!(cut((-0.5, 0.9), (0.5, 1.9)), None);
        assert_eq!(cut((f64::NAN, 0.0), (1.0, 1.0)), None);
    }
}
