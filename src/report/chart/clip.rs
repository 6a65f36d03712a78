//! From values to places in the unit square, cut off at its sides.

use super::model::Chart;
use super::place::Area;

/// A place on the chart.
type Place = (f64, f64);

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

/// A closed outline in places, cut off at the sides of the unit square.
///
/// One side after the other, as I. E. Sutherland and G. W. Hodgman do, Communications of the ACM 17
/// (1974) 32 (memory).
pub(super) fn outline(places: &[Place]) -> Vec<Place> {
    // How far inside a point is, from each side.
    let sides: [fn(&Place) -> f64; 4] = [|p| p.0, |p| 1.0 - p.0, |p| p.1, |p| 1.0 - p.1];
    let mut corners: Vec<Place> =
        places.iter().copied().filter(|(x, y)| x.is_finite() && y.is_finite()).collect();
    for side in sides {
        let mut kept = Vec::with_capacity(corners.len() + 4);
        for (a, b) in corners.iter().zip(corners.iter().cycle().skip(1)) {
            let (from, to) = (side(a), side(b));
            if from >= 0.0 {
                kept.push(*a);
            }
            if (from >= 0.0) != (to >= 0.0) {
                let share = from / (from - to);
                kept.push((a.0 + share * (b.0 - a.0), a.1 + share * (b.1 - a.1)));
            }
        }
        corners = kept;
    }
    corners
}

fn near(a: (f64, f64), b: (f64, f64)) -> bool {
    (a.0 - b.0).abs() < 1e-9 && (a.1 - b.1).abs() < 1e-9
}

/// A line without what lies in an area.
pub(super) fn around(line: &[Place], area: &Area) -> Vec<Vec<Place>> {
    let (width, height) = (area.right - area.left, area.bottom - area.top);
    let to = |p: &Place| ((p.0 - area.left) / width, (p.1 - area.top) / height);
    let mut out: Vec<Vec<Place>> = Vec::new();
    let mut add = |from: Place, to: Place| match out.last_mut() {
        Some(last) if last.last().is_some_and(|end| near(*end, from)) => last.push(to),
        _ => out.push(vec![from, to]),
    };
    for (a, b) in line.iter().zip(line.iter().skip(1)) {
        let at = |share: f64| (a.0 + share * (b.0 - a.0), a.1 + share * (b.1 - a.1));
        match shares(to(a), to(b)) {
            Some((enter, leave)) => {
                if enter > 0.0 {
                    add(*a, at(enter));
                }
                if leave < 1.0 {
                    add(at(leave), *b);
                }
            }
            None => add(*a, *b),
        }
    }
    out
}

/// The part of a segment inside the unit square.
fn cut(a: Place, b: Place) -> Option<(Place, Place)> {
    let at = |share: f64| (a.0 + share * (b.0 - a.0), a.1 + share * (b.1 - a.1));
    shares(a, b).map(|(enter, leave)| (at(enter), at(leave)))
}

/// Where a segment enters the unit square and leaves it, as shares of its length.
fn shares(a: Place, b: Place) -> Option<(f64, f64)> {
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
    (enter <= leave).then_some((enter, leave))
}

#[cfg(test)]
mod tests {
    use super::{cut, outline};

    #[test]
    fn an_outline_is_cut_at_each_side() {
        let diamond = [(0.5, -0.5), (1.5, 0.5), (0.5, 1.5), (-0.5, 0.5)];
        let cut = outline(&diamond);
        let inside = |at: &f64| (-1e-12..=1.0 + 1e-12).contains(at);
        assert!(cut.len() >= 4 && cut.iter().all(|(x, y)| inside(x) && inside(y)), "{cut:?}");
        // Half of it lies outside: the rest is the square itself.
        assert!((area(&cut) - 1.0).abs() < 1e-12);
        assert!((area(&diamond) - 2.0).abs() < 1e-12);
        assert!(outline(&[(2.0, 2.0), (3.0, 2.0), (3.0, 3.0)]).is_empty());
    }

    fn area(corners: &[(f64, f64)]) -> f64 {
        let next = corners.iter().cycle().skip(1);
        corners.iter().zip(next).map(|(a, b)| (a.0 * b.1 - b.0 * a.1) / 2.0).sum()
    }

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
