//! Charts in every renderer: values lie where the axes say, lines of ASTM D341 are straight, nothing
//! is drawn past its reach, labels keep clear of each other, text does no harm.
//!
//! What a chart shows is read back from the drawing itself, by its own ticks.

#![cfg(feature = "cli")]

use coldsump::advice::{self, Assessment, LimitId, Outcome};
use coldsump::case::{Case, CaseFile, Units};
use coldsump::heat::{HeatCapacity, LossCurve, TankLoss, WarmUp};
use coldsump::oil::{Bulk, Oil};
use coldsump::quantity::Density;
use coldsump::report::chart::{self, Axis, Chart, Scale, Shape, Tick};
use proptest::prelude::*;
use unicode_width::UnicodeWidthStr;

const EXAMPLES: [(&str, &str); 3] = [
    ("skarn-loader", include_str!("../examples/skarn-loader.toml")),
    ("hollow-skid", include_str!("../examples/hollow-skid.toml")),
    ("north-bench-classes", include_str!("../examples/north-bench-classes.toml")),
];

fn case(text: &str) -> Case {
    CaseFile::read("case.toml", text).check().unwrap()
}

fn skarn() -> Case {
    case(EXAMPLES[0].1)
}

fn assessed(case: &Case) -> Vec<(&Oil, Assessment)> {
    case.oils.iter().map(|oil| (oil, advice::assess(case, oil))).collect()
}

/// Viscosity of the n-th oil alone.
fn of_one(case: &Case, at: usize, units: Units) -> Chart {
    let oils = assessed(case);
    let (oil, found) = &oils[at];
    chart::viscosity(case, &[(oil, found)], units)
}

/// Every chart of a case, with what it is.
fn all(case: &Case, units: Units) -> Vec<(String, Chart)> {
    let oils = assessed(case);
    let together: Vec<(&Oil, &Assessment)> =
        oils.iter().map(|(oil, found)| (*oil, found)).collect();
    let mut charts = vec![("all oils".to_owned(), chart::viscosity(case, &together, units))];
    for (oil, found) in &oils {
        let name = oil.name();
        charts.push((format!("{name}, viscosity"), chart::viscosity(case, &[(oil, found)], units)));
        let night = advice::night(case, oil, found);
        let drawn = [
            ("inlet", chart::inlet(case, oil, found, units).ok()),
            ("speed", chart::speed(case, oil, found, units).ok()),
            ("night", chart::overnight(case, found, &night, units)),
        ];
        charts.extend(
            drawn.into_iter().filter_map(|(what, c)| Some((format!("{name}, {what}"), c?))),
        );
    }
    charts
}

/// Every chart of the three examples, in both sets of units.
fn every() -> Vec<(String, Chart)> {
    let mut charts = Vec::new();
    for (example, text) in EXAMPLES {
        let case = case(text);
        for units in [Units::Metric, Units::Us] {
            let named = all(&case, units).into_iter();
            charts.extend(named.map(|(name, c)| (format!("{example}, {name}, {units:?}"), c)));
        }
    }
    assert!(charts.len() > 80, "{}", charts.len());
    charts
}

// Reading SVG.

/// Elements of a name as (attributes, text).
fn elements<'a>(svg: &'a str, name: &str) -> Vec<(&'a str, &'a str)> {
    let open = format!("<{name} ");
    svg.split(&open)
        .skip(1)
        .map(|rest| {
            let (attributes, after) = rest.split_once('>').unwrap();
            (attributes, after.split('<').next().unwrap())
        })
        .collect()
}

fn attribute<'a>(attributes: &'a str, name: &str) -> Option<&'a str> {
    let at = format!("{name}=\"");
    let start =
        if attributes.starts_with(&at) { 0 } else { attributes.find(&format!(" {at}"))? + 1 };
    attributes[start + at.len()..].split('"').next()
}

fn number(attributes: &str, name: &str) -> f64 {
    let text = attribute(attributes, name).unwrap_or_else(|| panic!("{name} in {attributes}"));
    text.parse().unwrap()
}

fn points(text: &str) -> Vec<(f64, f64)> {
    text.split_whitespace()
        .map(|pair| {
            let (x, y) = pair.split_once(',').unwrap();
            (x.parse().unwrap(), y.parse().unwrap())
        })
        .collect()
}

fn unescaped(text: &str) -> String {
    text.replace("&lt;", "<")
        .replace("&gt;", ">")
        .replace("&quot;", "\"")
        .replace("&#39;", "'")
        .replace("&amp;", "&")
}

/// The frame as left, top, right, bottom.
fn frame(svg: &str) -> [f64; 4] {
    let rects = elements(svg, "rect");
    let (a, _) = rects.iter().find(|(a, _)| attribute(a, "class") == Some("frame")).unwrap();
    let (x, y) = (number(a, "x"), number(a, "y"));
    [x, y, x + number(a, "width"), y + number(a, "height")]
}

/// Texts of a class: (x, y, text).
fn texts(svg: &str, class: &str) -> Vec<(f64, f64, String)> {
    elements(svg, "text")
        .into_iter()
        .filter(|(a, _)| attribute(a, "class") == Some(class))
        .map(|(a, text)| (number(a, "x"), number(a, "y"), unescaped(text)))
        .collect()
}

fn circles(svg: &str) -> Vec<(f64, f64)> {
    elements(svg, "circle")
        .into_iter()
        .filter(|(a, _)| attribute(a, "class") == Some("point"))
        .map(|(a, _)| (number(a, "cx"), number(a, "cy")))
        .collect()
}

fn polylines(svg: &str, class: &str) -> Vec<Vec<(f64, f64)>> {
    elements(svg, "polyline")
        .into_iter()
        .filter(|(a, _)| attribute(a, "class") == Some(class))
        .map(|(a, _)| points(attribute(a, "points").unwrap()))
        .collect()
}

/// A tick as (place, value), for the value its text shows.
fn tick(ticks: &[(f64, f64, String)], across: bool, text: &str) -> (f64, f64) {
    let (x, y, _) = ticks.iter().find(|(_, _, shown)| shown == text).unwrap_or_else(|| {
        panic!("no tick {text} in {ticks:?}");
    });
    (if across { *x } else { *y }, text.replace(' ', "").parse().unwrap())
}

/// Where a value lies between two ticks on a scale.
fn between(a: (f64, f64), b: (f64, f64), scale: fn(f64) -> f64, value: f64) -> f64 {
    let share = (scale(value) - scale(a.1)) / (scale(b.1) - scale(a.1));
    a.0 + share * (b.0 - a.0)
}

// ASTM D341-20, section 5: log log Z against log T, Z = ν + 0.7 from 2 mm²/s up.
fn log_log(nu: f64) -> f64 {
    (nu + 0.7).log10().log10()
}

fn log_kelvin(celsius: f64) -> f64 {
    (celsius + 273.15).log10()
}

fn log_kelvin_of_fahrenheit(fahrenheit: f64) -> f64 {
    log_kelvin((fahrenheit - 32.0) / 1.8)
}

#[test]
fn a_measured_point_lies_where_the_ticks_say() {
    let case = skarn();
    for (units, ticks, at, scale) in [
        (Units::Metric, ["0", "80"], [40.0, 100.0], log_kelvin as fn(f64) -> f64),
        // 40 and 100 °C are 104 and 212 °F.
        (Units::Us, ["0", "200"], [104.0, 212.0], log_kelvin_of_fahrenheit as fn(f64) -> f64),
    ] {
        let svg = chart::svg(&of_one(&case, 0, units));
        let (xs, ys) = (texts(&svg, "x"), texts(&svg, "y"));
        let (a, b) = (tick(&xs, true, ticks[0]), tick(&xs, true, ticks[1]));
        // The lowest and the highest tick stand at the ends of the frame.
        let [_, top, _, bottom] = frame(&svg);
        let (low, high) = (tick(&ys, false, "5"), tick(&ys, false, "10 000"));
        assert!((high.0 - low.0 - (top - bottom)).abs() < 0.15);
        let (low, high) = ((bottom, low.1), (top, high.1));
        let circles = circles(&svg);
        for (celsius, nu) in at.into_iter().zip([46.0, 6.8]) {
            let x = between(a, b, scale, celsius);
            let y = between(low, high, log_log, nu);
            assert!(
                circles.iter().any(|(cx, cy)| (cx - x).abs() < 0.2 && (cy - y).abs() < 0.2),
                "{nu} at {celsius}: {x} {y} not in {circles:?}"
            );
        }
    }
}

#[test]
fn a_limit_lies_where_the_ticks_say() {
    let case = skarn();
    let (oil, found) = &assessed(&case)[0];
    // 60 kPa is 8.7023 psi (1 psi = 6.894757 kPa, NIST SP 811, B.8).
    for (units, from, to, value) in
        [(Units::Metric, "40", "80", 60.0), (Units::Us, "8", "10", 60.0 / 6.894_757)]
    {
        let svg = chart::svg(&chart::inlet(&case, oil, found, units).unwrap());
        let ys = texts(&svg, "y");
        let zero = tick(&ys, false, "0").0 - frame(&svg)[3];
        let place = between(tick(&ys, false, from), tick(&ys, false, to), |v| v, value) - zero;
        let limits: Vec<f64> = elements(&svg, "path")
            .into_iter()
            .filter(|(a, _)| attribute(a, "class") == Some("limit"))
            .map(|(a, _)| {
                let d = attribute(a, "d").unwrap();
                d.split([' ', 'H']).nth(1).unwrap().parse().unwrap()
            })
            .collect();
        assert!(limits.iter().any(|y| (y - place).abs() < 0.2), "{place} not in {limits:?}");
        let text = if units == Units::Us { "8.7 psi" } else { "60.0 kPa" };
        assert!(svg.contains(&format!("least at a start {text}")), "{svg}");
    }
}

fn axis(scale: Scale, from: f64, to: f64) -> Axis {
    Axis { label: String::new(), scale, from, to, ticks: Vec::<Tick>::new() }
}

proptest! {
    #[test]
    fn an_axis_goes_there_and_back(share in -0.2..1.2_f64, from in -60.0..0.0_f64, span in 5.0..150.0_f64, low in 1.0..20.0_f64, times in 3.0..1e6_f64) {
        for axis in [
            axis(Scale::Linear, from, from + span),
            axis(Scale::LogKelvin, from, from + span),
            axis(Scale::LogLog, low, low * times),
        ] {
            prop_assert!((axis.place(axis.from)).abs() < 1e-12 && (axis.place(axis.to) - 1.0).abs() < 1e-12);
            // Under 0.3 mm²/s there is no place on the double logarithm.
            if axis.scale == Scale::LogLog && share < 0.0 {
                continue;
            }
            let back = axis.place(axis.value(share));
            prop_assert!((back - share).abs() < 1e-9, "{axis:?} {share} {back}");
        }
    }
}

/// Greatest distance of points from the line through the first and the last.
fn bend(points: &[(f64, f64)]) -> f64 {
    let ((x0, y0), (x1, y1)) = (points[0], points[points.len() - 1]);
    let length = (x1 - x0).hypot(y1 - y0);
    let off =
        points.iter().map(|(x, y)| ((x - x0) * (y1 - y0) - (y - y0) * (x1 - x0)).abs() / length);
    off.fold(0.0, f64::max)
}

/// A chart of its lines alone.
fn lines_alone(mut chart: Chart) -> Chart {
    chart.limits.clear();
    chart.marks.clear();
    chart.series.retain(|one| matches!(one.shape, Shape::Line(_)));
    chart
}

/// Rows of the drawing without its axes.
fn inside(text: &str, edge: [char; 2]) -> Vec<Vec<char>> {
    let rows = text.lines().filter_map(|line| {
        let at = line.find(edge)?;
        Some(line[at..].chars().skip(1).collect())
    });
    rows.collect()
}

/// Dots of the braille cells, from the upper left; order by column.
fn dots(text: &str) -> Vec<(f64, f64)> {
    // Unicode 15, section 21.1: bits 0 to 7 are the dots of columns 1, 1, 1, 2, 2, 2, 1, 2.
    const PLACES: [(usize, usize); 8] =
        [(0, 0), (0, 1), (0, 2), (1, 0), (1, 1), (1, 2), (0, 3), (1, 3)];
    let mut dots = Vec::new();
    for (row, cells) in inside(text, ['│', '┤']).iter().enumerate() {
        for (column, cell) in cells.iter().enumerate() {
            let bits = (*cell as u32).wrapping_sub(0x2800);
            for (bit, (x, y)) in PLACES.iter().enumerate() {
                if bits < 256 && bits >> bit & 1 == 1 {
                    dots.push(((2 * column + x) as f64, (4 * row + y) as f64));
                }
            }
        }
    }
    dots.sort_by(|a, b| a.0.total_cmp(&b.0).then(a.1.total_cmp(&b.1)));
    dots
}

#[test]
fn a_line_of_d341_is_straight_in_every_renderer() {
    let case = skarn();
    for units in [Units::Metric, Units::Us] {
        // Two measured points: one line. From here to 5 mm²/s the form with Z = ν + 0.7 is exact to
        // a thousandth of a unit.
        let alone = lines_alone(of_one(&case, 0, units));
        let mut linear = alone.clone();
        linear.y.scale = Scale::Linear;

        let drawn = |chart: &Chart| -> Vec<(f64, f64)> {
            polylines(&chart::svg(chart), "line").into_iter().flatten().collect()
        };
        assert!(drawn(&alone).len() > 40);
        assert!(bend(&drawn(&alone)) < 0.12, "{}", bend(&drawn(&alone)));
        assert!(bend(&drawn(&linear)) > 50.0, "a test that cannot fail");

        for (columns, rows) in [(80, 20), (40, 12)] {
            let found = dots(&chart::terminal(&alone, columns, rows, false));
            assert!(found.len() >= columns, "{}", found.len());
            assert!(bend(&found) <= 1.2, "{}", bend(&found));
            assert!(bend(&dots(&chart::terminal(&linear, columns, rows, false))) > 4.0);

            let text = chart::terminal(&alone, columns, rows, true);
            let mut cells = Vec::new();
            for (row, line) in inside(&text, ['|', '+']).iter().enumerate() {
                let signs = line.iter().enumerate().filter(|(_, c)| **c == '*');
                cells.extend(signs.map(|(column, _)| (column as f64, row as f64)));
            }
            cells.sort_by(|a, b| a.0.total_cmp(&b.0).then(a.1.total_cmp(&b.1)));
            assert!(cells.len() >= columns / 2, "{text}");
            assert!(bend(&cells) <= 1.2, "{}\n{text}", bend(&cells));
        }
    }
}

#[test]
fn nothing_is_drawn_past_its_reach() {
    for (example, text) in EXAMPLES {
        let case = case(text);
        for (at, oil) in case.oils.iter().enumerate() {
            let chart = of_one(&case, at, Units::Metric);
            // DESIGN: no number below the pour point + 5 K, unless it was measured.
            let pour = oil.pour_point().unwrap().as_celsius() + 5.0;
            let reach = pour.min(oil.curve().coldest().0);
            let svg = chart::svg(&chart);
            let [left, top, right, bottom] = frame(&svg);
            let least = left + chart.x.place(reach) * (right - left);
            let mut drawn = polylines(&svg, "line");
            drawn.extend(polylines(&svg, "edge"));
            for (a, _) in elements(&svg, "polygon") {
                drawn.push(points(attribute(a, "points").unwrap()));
            }
            assert!(drawn.len() >= 4, "{example} {}", oil.name());
            for (x, y) in drawn.iter().flatten() {
                assert!(*x >= least - 0.1, "{example} {}: {x} under {least}", oil.name());
                assert!((left - 0.1..=right + 0.1).contains(x), "{x}");
                assert!((top - 0.1..=bottom + 0.1).contains(y), "{y}");
            }
            let first = drawn.iter().flatten().map(|(x, _)| *x).fold(f64::INFINITY, f64::min);
            assert!(first <= least.max(left) + 0.1, "it is drawn as far as it reaches");

            let alone = lines_alone(chart);
            let columns = dots(&chart::terminal(&alone, 80, 20, false));
            let width = inside(&chart::terminal(&alone, 80, 20, false), ['│', '┤'])
                .iter()
                .map(Vec::len)
                .max()
                .unwrap();
            let cell = alone.x.place(reach).max(0.0) * 2.0 * width as f64;
            assert!(columns[0].0 >= cell.floor() - 1.0, "{} {cell}", columns[0].0);
        }
    }
}

#[test]
fn a_point_measured_in_the_cold_is_drawn_to() {
    // Hollow pit: measured at -20 °C, pour point -39 °C; with a pour point of -22 °C the measured
    // point lies under pour + 5 K and the curve reaches it.
    let text = EXAMPLES[1].1.replace("pour_point = \"-39 °C\"", "pour_point = \"-22 °C\"");
    let case = case(&text);
    let chart = of_one(&case, 0, Units::Metric);
    let line = chart.series.iter().find(|one| one.name == "expected").unwrap();
    let Shape::Line(points) = &line.shape else { panic!("a line") };
    assert_eq!(points[0].0, -20.0);
}

#[test]
fn charts_fit_their_columns_and_rows() {
    for (name, chart) in every() {
        for (columns, rows) in [(80, 20), (40, 12)] {
            for ascii in [false, true] {
                let text = chart::terminal(&chart, columns, rows, ascii);
                for line in text.lines() {
                    assert!(line.width() <= columns, "{name}: {} {line:?}", line.width());
                    assert_eq!(line, line.trim_end(), "{name}");
                }
                assert!(!ascii || text.is_ascii(), "{name}");
                let edge = if ascii { ['|', '+'] } else { ['│', '┤'] };
                // The frame's inside; in ASCII its floor begins with the same sign.
                let inner = inside(&text, edge).len() - usize::from(ascii);
                assert!(inner >= rows - 4, "{name}: {inner}\n{text}");
            }
        }
    }
}

#[test]
fn every_line_with_words_is_in_the_terminal_s_key() {
    for (name, chart) in every() {
        let text = chart::terminal(&chart, 200, 20, false);
        for level in chart.limits.iter().chain(&chart.marks) {
            let found = text.contains(&level.text())
                || text.contains(&format!("line at {}: {}", level.value, level.words));
            assert!(found, "{name}: {} in\n{text}", level.text());
        }
        for one in &chart.series {
            assert!(text.contains(&one.name), "{name}: {}", one.name);
        }
    }
}

// Advance widths of a wide sans-serif face, from space to tilde, in 2048ths of the size:
// DejaVu Sans 2.37, table hmtx.
#[rustfmt::skip]
const WIDTHS: [u16; 95] = [
    651, 821, 942, 1716, 1303, 1946, 1597, 563, 799, 799, 1024, 1716, 651, 739, 651, 690, 1303, 1303,
    1303, 1303, 1303, 1303, 1303, 1303, 1303, 1303, 690, 690, 1716, 1716, 1716, 1087, 2048, 1401,
    1405, 1430, 1577, 1294, 1178, 1587, 1540, 604, 604, 1343, 1141, 1767, 1532, 1612, 1235, 1612,
    1423, 1300, 1251, 1499, 1401, 2025, 1403, 1251, 1403, 799, 690, 799, 1716, 1024, 1024, 1255,
    1300, 1126, 1300, 1260, 721, 1300, 1298, 569, 569, 1186, 569, 1995, 1298, 1253, 1300, 1300, 842,
    1067, 803, 1298, 1212, 1675, 1212, 1212, 1075, 1303, 690, 1303, 1716,
];

fn real_width(text: &str, size: f64) -> f64 {
    let units: u32 = text
        .chars()
        .map(|c| match (c as usize).checked_sub(32).and_then(|at| WIDTHS.get(at)) {
            Some(width) => u32::from(*width),
            // ° 1024, ² and ³ 821, · 651; anything else is taken as wide.
            None => match c {
                '²' | '³' => 821,
                '·' => 651,
                '°' => 1024,
                _ => 2048,
            },
        })
        .sum();
    f64::from(units) / 2048.0 * size
}

/// Boxes of all texts as drawn: (left, top, right, bottom, class, text).
fn boxes(svg: &str) -> Vec<([f64; 4], String, String)> {
    const SIZE: f64 = 11.0;
    elements(svg, "text")
        .into_iter()
        .map(|(a, text)| {
            let text = unescaped(text);
            let size = attribute(a, "font-size").map_or(SIZE, |size| size.parse().unwrap());
            let bold = if attribute(a, "font-weight").is_some() { 1.12 } else { 1.0 };
            let width = bold * real_width(&text, size);
            let (x, y) = (number(a, "x"), number(a, "y"));
            let left = match attribute(a, "text-anchor") {
                Some("middle") => x - width / 2.0,
                Some("end") => x - width,
                _ => x,
            };
            let class = attribute(a, "class").unwrap().to_owned();
            // From the top of a capital to the lowest reach of a letter.
            let area = if attribute(a, "transform").is_some() {
                [x - 0.75 * size, y - width / 2.0, x + 0.2 * size, y + width / 2.0]
            } else {
                [left, y - 0.75 * size, left + width, y + 0.2 * size]
            };
            (area, class, text)
        })
        .collect()
}

fn overlap(a: &[f64; 4], b: &[f64; 4]) -> bool {
    a[0] < b[2] && b[0] < a[2] && a[1] < b[3] && b[1] < a[3]
}

#[test]
fn no_text_lies_over_another_or_over_an_axis() {
    for (name, chart) in every() {
        let svg = chart::svg(&chart);
        let boxes = boxes(&svg);
        let view: Vec<f64> = attribute(svg.split('>').next().unwrap(), "viewBox")
            .unwrap()
            .split(' ')
            .map(|n| n.parse().unwrap())
            .collect();
        let [left, top, right, bottom] = frame(&svg);
        for (at, (a, class, text)) in boxes.iter().enumerate() {
            let inside_view = a[0] >= 0.0 && a[1] >= 0.0 && a[2] <= view[2] && a[3] <= view[3];
            assert!(inside_view, "{name}: {text} {a:?} leaves {view:?}");
            for (b, _, other) in boxes.iter().skip(at + 1) {
                assert!(!overlap(a, b), "{name}: {text} {a:?} over {other} {b:?}");
            }
            if class != "label" {
                continue;
            }
            for side in [
                [left, top, right, top],
                [left, bottom, right, bottom],
                [left, top, left, bottom],
                [right, top, right, bottom],
            ] {
                assert!(!overlap(a, &side), "{name}: {text} over the frame");
            }
            for circle in circles(&svg) {
                let dot = [circle.0 - 4.0, circle.1 - 4.0, circle.0 + 4.0, circle.1 + 4.0];
                assert!(!overlap(a, &dot), "{name}: {text} over a point");
            }
        }
        // Words are never lost: on the line or under the chart.
        let said: Vec<&str> = boxes.iter().map(|(_, _, text)| text.as_str()).collect();
        let said = said.join(" ");
        for level in chart.limits.iter().chain(&chart.marks) {
            let found = said.contains(&level.text())
                || said.contains(&format!("at {}: {}", level.value, level.words));
            assert!(found, "{name}: {} not in {said}", level.text());
        }
    }
}

#[test]
fn a_label_over_the_frame_is_not_crossed_by_a_line() {
    for (name, chart) in every() {
        let svg = chart::svg(&chart);
        let top = frame(&svg)[1];
        let marks: Vec<[f64; 4]> = elements(&svg, "path")
            .into_iter()
            .filter(|(a, _)| attribute(a, "class") == Some("mark"))
            .map(|(a, _)| {
                let d = attribute(a, "d").unwrap().trim_start_matches('M');
                let n: Vec<f64> = d.split([' ', 'V']).map(|n| n.parse().unwrap()).collect();
                [n[0], n[1], n[0], top]
            })
            .collect();
        for (area, _, text) in
            boxes(&svg).iter().filter(|(a, class, _)| class == "label" && a[3] < top)
        {
            assert!(!marks.iter().any(|mark| overlap(area, mark)), "{name}: {text} {area:?}");
        }
    }
}

#[test]
fn the_inlet_is_enough_where_the_mark_says() {
    for (example, text) in &EXAMPLES[..2] {
        let case = case(text);
        let mut checked = 0;
        for (oil, found) in &assessed(&case) {
            let chart = chart::inlet(&case, oil, found, Units::Metric).unwrap();
            for (id, series, least) in [
                (LimitId::InletPressureStart, "at start speed", case.pump.inlet_start_min),
                (LimitId::InletPressureWork, "at work speed", case.pump.inlet_work_min),
            ] {
                let limit = found.limits.iter().find(|limit| limit.id == id).unwrap();
                let Outcome::At(t) = limit.outcome else { continue };
                let line = chart.series.iter().find(|one| one.name.starts_with(series)).unwrap();
                let Shape::Line(points) = &line.shape else { panic!("a line") };
                let pair = points.windows(2).find(|two| two[0].0 <= t && t <= two[1].0).unwrap();
                let share = (t - pair[0].0) / (pair[1].0 - pair[0].0);
                let kpa = pair[0].1 + share * (pair[1].1 - pair[0].1);
                // Straight between points a kelvin apart.
                assert!((kpa - least.as_kpa()).abs() < 0.5, "{example} {}: {kpa}", oil.name());
                checked += 1;
            }
        }
        assert!(checked >= 3, "{checked}");
    }
}

#[test]
fn no_suction_line_no_inlet_chart() {
    let case = case(EXAMPLES[2].1);
    let (oil, found) = &assessed(&case)[0];
    let why = chart::inlet(&case, oil, found, Units::Metric).unwrap_err();
    assert_eq!(why.to_string(), "the suction line is not given");
    assert!(chart::speed(&case, oil, found, Units::Metric).is_err());
}

#[test]
fn the_way_of_a_warm_up_is_that_of_its_heat_balance() {
    // U = 7 W/(m²·K) on 2 m²: 14 W/K. Stepped by hand: dT/dt = (P - UA (T - Ta))/C(T), fourth order
    // (W. Kutta, Z. Math. Phys. 46 (1901) 435).
    let loss = TankLoss::from_u_value(7.0, 2.0, -30.0);
    let bulk = Bulk::from_density_15(Density::kg_per_m3(870.0).unwrap());
    let capacity = HeatCapacity::new(200.0, &bulk, 40.0, 440.0);
    let curve = LossCurve::new(&loss, 60.0);
    let power = 900.0;
    let path = WarmUp::new(&curve, &capacity, -30.0, 20.0, 1.0).path(power).unwrap();
    let rate = |t: f64| (power - 14.0 * (t + 30.0)) / capacity.at(t);
    let (mut t, mut time) = (-30.0_f64, 0.0);
    for (until, want) in &path {
        let steps = 200.0;
        let h = (until - time) / steps;
        for _ in 0..200 {
            let k1 = rate(t);
            let k2 = rate(t + h / 2.0 * k1);
            let k3 = rate(t + h / 2.0 * k2);
            let k4 = rate(t + h * k3);
            t += h / 6.0 * (k1 + 2.0 * k2 + 2.0 * k3 + k4);
        }
        time = *until;
        assert!((t - want).abs() < 1e-3, "after {until} s {t}, drawn {want}");
    }
    assert!(path.len() > 20 && path[path.len() - 1].1 == 20.0);
    assert!(WarmUp::new(&curve, &capacity, -30.0, 40.0, 1.0).path(power).is_none());
}

#[test]
fn the_night_is_drawn_by_the_clock() {
    let text = include_str!("../examples/parked-warm-loader.toml");
    // Sized heating and a parked tank at once: not credited.
    let text = text.replace("credit_parked_heat = true", "credit_parked_heat = false");
    let case = case(&text);
    let (oil, found) = &assessed(&case)[0];
    let night = advice::night(&case, oil, found);
    let chart = chart::overnight(&case, found, &night, Units::Metric).unwrap();
    let svg = chart::svg(&chart);
    let xs = texts(&svg, "x");
    let place = |clock: &str| xs.iter().find(|(_, _, text)| text == clock).unwrap().0;
    assert!(svg.contains("parked 18:00") && svg.contains("shift starts 06:00"), "{svg}");
    // Parked at 18:00 with 50 °C: the first point of the first line.
    let lines = polylines(&svg, "line");
    assert!((lines[0][0].0 - place("18:00")).abs() < 0.1);
    let ys = texts(&svg, "y");
    let offset = 0.35 * 11.0;
    assert!((lines[0][0].1 + offset - tick(&ys, false, "50").0).abs() < 0.2);
    // Every stretch goes on no earlier than the one before ends, and the mix is at the shift.
    let names: Vec<&str> = chart.series.iter().map(|one| one.name.as_str()).collect();
    assert_eq!(
        names,
        [
            "parked, cooling",
            "heated in the tank",
            "running in neutral, whole circuit",
            "tank mixed with the cold rest"
        ]
    );
    assert!((circles(&svg)[0].0 - place("06:00")).abs() < 0.1);
    let cooled = night.parts[0].points.windows(2).all(|two| two[1].1 < two[0].1);
    let heated = night.parts[1].points.windows(2).all(|two| two[1].1 > two[0].1);
    assert!(cooled && heated);
    for gate in ["first turn from", "light work from", "full load from", "coldest air -30.0 °C"] {
        assert!(chart.description().contains(gate), "{gate}");
    }
}

#[test]
fn nothing_known_of_a_night_is_no_chart() {
    let case = skarn();
    let (oil, found) = &assessed(&case)[0];
    let night = advice::night(&case, oil, found);
    assert!(chart::overnight(&case, found, &night, Units::Metric).is_none());
    let remarks: Vec<String> =
        night.remarks.iter().map(|say| coldsump::report::Shown(Units::Metric).say(say)).collect();
    assert!(remarks.iter().any(|remark| remark.contains("duty.parked_oil")), "{remarks:?}");
    assert!(remarks.iter().any(|remark| remark.contains("needs the whole machine heated")));
}

#[test]
fn the_description_says_what_is_drawn() {
    let case = skarn();
    let chart = of_one(&case, 0, Units::Metric);
    let text = chart.description();
    for said in [
        "oil temperature, °C",
        "viscosity, mm²/s",
        "46 mm²/s at 40.0 °C",
        "no number at -38.0 °C",
        "drawn from -19.0 °C up",
        "most at a start 1600 mm²/s",
        "pour point -24.0 °C",
        "do not turn the pump below",
    ] {
        assert!(text.contains(said), "{said}: {text}");
    }
    let svg = chart::svg(&chart);
    let (_, after) = svg.split_once("<title>").unwrap();
    assert!(after.starts_with("Viscosity against temperature: oil in service</title>\n<desc>"));
    assert!(svg.contains(&chart::esc(&text)));
    assert!(svg.starts_with("<svg ") && svg.ends_with("</svg>\n"));
    // Black and white: no colour but the text's own.
    assert!(!svg.contains("fill=\"#") && !svg.contains("rgb"), "{svg}");
}

/// Whether tags are balanced, attributes closed and entities known: enough of XML to be parsed.
fn well_formed(svg: &str) -> Result<(), String> {
    let mut open: Vec<&str> = Vec::new();
    let mut rest = svg;
    while let Some(at) = rest.find('<') {
        let (text, from) = rest.split_at(at);
        entities(text)?;
        let end = from.find('>').ok_or("an open tag")?;
        let tag = &from[1..end];
        if tag.contains('<') || tag.matches('"').count() % 2 == 1 {
            return Err(format!("tag {tag}"));
        }
        if let Some(name) = tag.strip_prefix('/') {
            if open.pop() != Some(name) {
                return Err(format!("closes {name}"));
            }
        } else if !tag.ends_with('/') {
            open.push(tag.split(' ').next().unwrap_or_default());
        }
        rest = &from[end + 1..];
    }
    if open.is_empty() && rest.trim().is_empty() { Ok(()) } else { Err(format!("left {open:?}")) }
}

fn entities(text: &str) -> Result<(), String> {
    for (at, _) in text.match_indices('&') {
        let known = ["&amp;", "&lt;", "&gt;", "&quot;", "&#39;"];
        if !known.iter().any(|one| text[at..].starts_with(one)) {
            return Err(text[at..].chars().take(10).collect());
        }
    }
    if text.contains('>') { Err(format!("> in {text}")) } else { Ok(()) }
}

#[test]
fn names_of_a_case_do_no_harm() {
    let evil = r#"</title><script>alert('x')</script> & "\u001B[2J\u0007\u202Eback\u200B""#;
    let name = evil.replace('"', "\\\"");
    let text = EXAMPLES[0].1.replace("name = \"winter multigrade\"", &format!("name = \"{name}\""));
    assert_ne!(text, EXAMPLES[0].1);
    let case = case(&text);
    for (name, chart) in all(&case, Units::Metric) {
        let svg = chart::svg(&chart);
        assert_eq!(well_formed(&svg), Ok(()), "{name}");
        assert!(!svg.contains("<script"), "{name}");
        for ascii in [false, true] {
            let text = chart::terminal(&chart, 80, 20, ascii);
            let harm =
                |c: char| c != '\n' && (c.is_control() || matches!(c, '\u{202E}' | '\u{200B}'));
            assert!(!text.contains(harm), "{name}: {text:?}");
        }
    }
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 64, failure_persistence: None, ..ProptestConfig::default() })]
    #[test]
    fn any_words_make_a_sound_chart(title in any::<String>(), name in any::<String>(), words in any::<String>(), columns in 0_usize..100, rows in 0_usize..30) {
        thread_local!(static CHART: Chart = {
            let case = skarn();
            of_one(&case, 0, Units::Metric)
        });
        let mut chart = CHART.with(Clone::clone);
        chart.title = title;
        chart.series[1].name = name.clone();
        chart.marks[0].words = words.clone();
        chart.limits[0].words = words;
        chart.notes.push(name);
        let svg = chart::svg(&chart);
        prop_assert_eq!(well_formed(&svg), Ok(()));
        prop_assert!(!svg.contains(|c: char| c != '\n' && c.is_control()));
        for ascii in [false, true] {
            let text = chart::terminal(&chart, columns, rows, ascii);
            prop_assert!(!text.contains(|c: char| c != '\n' && c.is_control()));
            prop_assert!(!ascii || text.is_ascii());
            prop_assert!(text.lines().all(|line| line.width() <= columns.max(24)), "{}", text);
        }
    }
}
