//! A chart as SVG, by hand: to stand alone or inside a page, in black and white.
//!
//! Layout from top to bottom: title, labels of the lines that run up, frame, axis, key, notes.
//! Colours are the text's own, so that the chart follows the page it stands in.

use super::axis::Axis;
use super::clip::{inside, outline};
use super::model::{Chart, Level, Shape};
use super::place::{Area, Clear, Piece, lines, over, text_width};
use std::fmt::Write;

/// Width of the drawing.
const WIDTH: f64 = 720.0;
/// Height of the frame.
const HEIGHT: f64 = 360.0;
/// Size of all text but the title.
const SIZE: f64 = 11.0;
/// Size of the title.
const TITLE: f64 = 14.0;
/// From line to line of text.
const ROW: f64 = 15.0;
/// Room at the sides.
const EDGE: f64 = 10.0;
/// Length of the sample of a line in the key.
const SAMPLE: f64 = 34.0;
/// Dashes of the first line, the second, and so on; then again, with other numbers.
const DASHES: [&str; 6] = ["", "9 4", "2 3", "10 3 2 3", "16 5", "6 2 1 2 1 2"];

/// Text made safe inside SVG or HTML: the five characters with a meaning are written as entities,
/// and characters that XML 1.0 does not allow are left out.
///
/// # Example
/// ```
/// assert_eq!(coldsump::report::chart::esc("5 < 6 & \"so\""), "5 &lt; 6 &amp; &quot;so&quot;");
/// ```
#[must_use]
pub fn esc(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            '\'' => out.push_str("&#39;"),
            '\t' | '\n' | '\r' => out.push(' '),
            // Char in XML 1.0 (fifth edition), section 2.2; C1 controls, allowed there, go too.
            c if c.is_control() || matches!(c, '\u{fffe}' | '\u{ffff}') => {}
            c => out.push(c),
        }
    }
    out
}

/// The chart as one `svg` element with a title and a description.
#[must_use]
pub fn svg(chart: &Chart) -> String {
    let page = Page::new(chart);
    let mut body = String::new();
    page.axes(&mut body);
    page.series(&mut body);
    let mut key = page.levels(&mut body);
    let bottom = page.key(&mut body, &mut key);
    let mut out = String::new();
    // Writing to a String cannot fail, here and below.
    let _ = write!(
        out,
        "<svg xmlns=\"http://www.w3.org/2000/svg\" viewBox=\"0 0 {} {}\" role=\"img\" \
         font-family=\"sans-serif\" font-size=\"{}\" fill=\"currentColor\">\n\
         <title>{}</title>\n<desc>{}</desc>\n",
        n(WIDTH),
        n(bottom + EDGE),
        n(SIZE),
        esc(&chart.title),
        esc(&chart.description()),
    );
    for (row, line) in page.title.iter().enumerate() {
        let y = EDGE + TITLE + row as f64 * (TITLE + 4.0);
        let _ = writeln!(
            out,
            "<text class=\"title\" x=\"{}\" y=\"{}\" font-size=\"{}\" font-weight=\"bold\">{}</text>",
            n(EDGE),
            n(y),
            n(TITLE),
            esc(line)
        );
    }
    out.push_str(&body);
    out.push_str("</svg>\n");
    out
}

/// A length to a tenth.
fn n(value: f64) -> String {
    let text = format!("{value:.1}");
    text.strip_suffix(".0").map_or(text.clone(), str::to_owned)
}

/// The places of a chart on the drawing.
struct Page<'a> {
    chart: &'a Chart,
    title: Vec<String>,
    frame: Area,
    /// Row and left end of the label of each mark.
    over: Vec<Option<(usize, f64)>>,
    numbers: Vec<Option<usize>>,
    /// All curves in pieces.
    curves: Vec<Piece>,
}

impl<'a> Page<'a> {
    fn new(chart: &'a Chart) -> Self {
        let widest = chart.y.ticks.iter().map(|tick| text_width(&tick.text, SIZE));
        let left = EDGE + SIZE + 8.0 + widest.fold(0.0, f64::max) + 8.0;
        let last = chart.x.ticks.last().map_or(0.0, |tick| text_width(&tick.text, SIZE));
        let right = WIDTH - EDGE - last / 2.0;
        let title = lines(&chart.title, TITLE, WIDTH - 2.0 * EDGE);
        let labels: Vec<(f64, f64)> = chart
            .marks
            .iter()
            .filter(|mark| chart.x.holds(mark.at))
            .map(|mark| {
                let x = left + chart.x.place(mark.at) * (right - left);
                (x, text_width(&mark.text(), SIZE))
            })
            .collect();
        let mut found = over(&labels, EDGE, WIDTH - EDGE).into_iter();
        let over: Vec<Option<(usize, f64)>> = chart
            .marks
            .iter()
            .map(|mark| if chart.x.holds(mark.at) { found.next().flatten() } else { None })
            .collect();
        let rows = over.iter().flatten().map(|(row, _)| row + 1).max().unwrap_or(0);
        let top = EDGE + title.len() as f64 * (TITLE + 4.0) + 8.0 + rows as f64 * ROW;
        let frame = Area { left, top, right, bottom: top + HEIGHT };
        let mut page =
            Self { chart, title, frame, over, numbers: chart.numbers(), curves: Vec::new() };
        page.curves = chart
            .series
            .iter()
            .flat_map(|one| one.shape.paths())
            .flat_map(|path| page.pixels(&path))
            .flat_map(|line| line.windows(2).filter_map(pair).collect::<Vec<_>>())
            .collect();
        page
    }

    fn x(&self, value: f64) -> f64 {
        self.frame.left + self.chart.x.place(value) * (self.frame.right - self.frame.left)
    }

    fn y(&self, value: f64) -> f64 {
        self.frame.bottom - self.chart.y.place(value) * HEIGHT
    }

    /// What of a path lies in the frame.
    fn pixels(&self, path: &[(f64, f64)]) -> Vec<Vec<(f64, f64)>> {
        inside(self.chart, path)
            .into_iter()
            .map(|line| line.into_iter().map(|place| self.pixel(place)).collect())
            .collect()
    }

    /// A place from 0 to 1 on the drawing.
    fn pixel(&self, (x, y): (f64, f64)) -> (f64, f64) {
        let Area { left, right, bottom, .. } = self.frame;
        (left + x * (right - left), bottom - y * HEIGHT)
    }

    fn axes(&self, out: &mut String) {
        let Area { left, top, right, bottom } = self.frame;
        let chart = self.chart;
        let x_ticks = ticks(&chart.x, |at| self.x(at), |tick| text_width(tick, SIZE) + 6.0);
        let y_ticks = ticks(&chart.y, |at| self.y(at), |_| SIZE + 2.0);
        out.push_str("<g stroke=\"currentColor\" stroke-width=\"0.7\" opacity=\"0.35\" stroke-dasharray=\"1 5\">\n");
        for (x, _) in &x_ticks {
            let _ = writeln!(out, "<path d=\"M{0} {1}V{2}\"/>", n(*x), n(top), n(bottom));
        }
        for (y, _) in &y_ticks {
            let _ = writeln!(out, "<path d=\"M{1} {0}H{2}\"/>", n(*y), n(left), n(right));
        }
        out.push_str("</g>\n");
        let _ = writeln!(
            out,
            "<rect class=\"frame\" x=\"{}\" y=\"{}\" width=\"{}\" height=\"{}\" fill=\"none\" stroke=\"currentColor\"/>",
            n(left),
            n(top),
            n(right - left),
            n(HEIGHT)
        );
        for (x, text) in &x_ticks {
            let _ = writeln!(
                out,
                "<text class=\"x\" x=\"{}\" y=\"{}\" text-anchor=\"middle\">{}</text>",
                n(*x),
                n(bottom + SIZE + 5.0),
                esc(text)
            );
        }
        for (y, text) in &y_ticks {
            let _ = writeln!(
                out,
                "<text class=\"y\" x=\"{}\" y=\"{}\" text-anchor=\"end\">{}</text>",
                n(left - 6.0),
                n(y + 0.35 * SIZE),
                esc(text)
            );
        }
        let _ = writeln!(
            out,
            "<text class=\"axis\" x=\"{}\" y=\"{}\" text-anchor=\"middle\">{}</text>",
            n(f64::midpoint(left, right)),
            n(bottom + 2.0 * ROW + 4.0),
            esc(&chart.x.label)
        );
        let (x, y) = (n(EDGE + SIZE), n(f64::midpoint(top, bottom)));
        let _ = writeln!(
            out,
            "<text class=\"axis\" x=\"{x}\" y=\"{y}\" text-anchor=\"middle\" transform=\"rotate(-90 {x} {y})\">{}</text>",
            esc(&chart.y.label)
        );
    }

    fn series(&self, out: &mut String) {
        for (one, dash) in self.chart.series.iter().zip(dashes(self.chart)) {
            match &one.shape {
                Shape::Band(points) => self.band(out, points),
                Shape::Points(points) => {
                    for (x, y) in points {
                        if self.chart.x.holds(*x) && self.chart.y.holds(*y) {
                            let _ = writeln!(
                                out,
                                "<circle class=\"point\" cx=\"{}\" cy=\"{}\" r=\"4\" fill=\"none\" stroke=\"currentColor\" stroke-width=\"1.4\"/>",
                                n(self.x(*x)),
                                n(self.y(*y))
                            );
                        }
                    }
                }
                Shape::Line(_) | Shape::Steps(_) => {
                    for line in one.shape.paths().iter().flat_map(|path| self.pixels(path)) {
                        let _ = writeln!(
                            out,
                            "<polyline class=\"line\" points=\"{}\" {}/>",
                            points_text(&line),
                            line_style(dash)
                        );
                    }
                }
            }
        }
    }

    /// A band: lightly filled, its edges thin.
    fn band(&self, out: &mut String, points: &[(f64, f64, f64)]) {
        let place = |x: f64, y: f64| (self.chart.x.place(x), self.chart.y.place(y));
        let lower = points.iter().map(|(x, low, _)| place(*x, *low));
        let upper = points.iter().rev().map(|(x, _, high)| place(*x, *high));
        let corners = outline(&lower.chain(upper).collect::<Vec<_>>());
        let corners: Vec<(f64, f64)> = corners.into_iter().map(|place| self.pixel(place)).collect();
        let _ = writeln!(
            out,
            "<polygon class=\"band\" points=\"{}\" fill-opacity=\"0.1\" stroke=\"none\"/>",
            points_text(&corners)
        );
        for line in Shape::Band(points.to_vec()).paths().iter().flat_map(|path| self.pixels(path)) {
            let _ = writeln!(
                out,
                "<polyline class=\"edge\" points=\"{}\" fill=\"none\" stroke=\"currentColor\" stroke-width=\"0.6\"/>",
                points_text(&line)
            );
        }
    }

    /// Lines with words, and numbers of curves; returns what found no place on the chart.
    fn levels(&self, out: &mut String) -> Vec<String> {
        let Area { left, top, right, bottom } = self.frame;
        let chart = self.chart;
        let mut key = Vec::new();
        let mut up = Vec::new();
        for (mark, place) in chart.marks.iter().zip(&self.over) {
            if !chart.x.holds(mark.at) {
                key.push(format!("{}: off the chart", mark.text()));
                continue;
            }
            let x = self.x(mark.at);
            up.push(x);
            let label_bottom = |row: usize| top - 4.0 - row as f64 * ROW;
            let from = place.map_or(top, |(row, _)| label_bottom(row));
            let _ = writeln!(
                out,
                "<path class=\"mark\" d=\"M{} {}V{}\" stroke=\"currentColor\" stroke-width=\"0.9\" stroke-dasharray=\"4 2\"/>",
                n(x),
                n(from),
                n(bottom)
            );
            match place {
                Some((row, start)) => {
                    text(out, "label", *start, label_bottom(*row) - 2.5, &mark.text());
                }
                None => key.push(format!("line up at {}: {}", mark.value, mark.words)),
            }
        }
        let (on, off): (Vec<&Level>, Vec<&Level>) =
            chart.limits.iter().partition(|limit| chart.y.holds(limit.at));
        key.extend(off.iter().map(|limit| format!("{}: off the chart", limit.text())));
        let across: Vec<f64> = on.iter().map(|limit| self.y(limit.at)).collect();
        let clear = Clear { frame: self.frame, curves: &self.curves, across: &across, up: &up };
        let mut taken = self.points();
        for (limit, y) in on.iter().zip(&across) {
            let _ = writeln!(
                out,
                "<path class=\"limit\" d=\"M{} {}H{}\" stroke=\"currentColor\" stroke-width=\"0.9\"/>",
                n(left),
                n(*y),
                n(right)
            );
            let size = (text_width(&limit.text(), SIZE), SIZE + 1.0);
            let mut candidates = Vec::new();
            for top in [y - size.1 - 1.5, y + 1.5] {
                let mut start = right - 4.0 - size.0;
                while start >= left + 4.0 {
                    candidates.push((start, top));
                    start -= 12.0;
                }
            }
            match clear.best(candidates, size, &taken) {
                Some(area) => {
                    text(out, "label", area.left, area.bottom - 2.5, &limit.text());
                    taken.push(area);
                }
                None => key.push(format!("line across at {}: {}", limit.value, limit.words)),
            }
        }
        for (one, number) in chart.series.iter().zip(&self.numbers) {
            let Some(number) = number.map(|number| number.to_string()) else { continue };
            let size = (text_width(&number, SIZE), SIZE + 1.0);
            let lines: Vec<Vec<(f64, f64)>> =
                one.shape.paths().iter().flat_map(|path| self.pixels(path)).collect();
            let around = [
                (3.0, -size.1 - 1.0),
                (-size.0 - 5.0, -size.1 / 2.0),
                (-size.0 - 3.0, 1.0),
                (-size.0 / 2.0, -size.1 - 3.0),
            ];
            let candidates = lines
                .iter()
                .flatten()
                .flat_map(|(x, y)| around.iter().map(move |(dx, dy)| (x + dx, y + dy)));
            if let Some(area) = clear.best(candidates, size, &taken) {
                text(out, "label", area.left, area.bottom - 2.5, &number);
                taken.push(area);
            }
        }
        key
    }

    /// The room that single points take.
    fn points(&self) -> Vec<Area> {
        let points = self.chart.series.iter().filter_map(|one| match &one.shape {
            Shape::Points(points) => Some(points),
            _ => None,
        });
        points
            .flatten()
            .map(|(x, y)| (self.x(*x), self.y(*y)))
            .map(|(x, y)| Area { left: x - 6.0, top: y - 6.0, right: x + 6.0, bottom: y + 6.0 })
            .collect()
    }

    /// The key and the notes; returns how far down they reach.
    fn key(&self, out: &mut String, dropped: &mut Vec<String>) -> f64 {
        let mut y = self.frame.bottom + 3.0 * ROW + 10.0;
        let mut x = EDGE;
        let room = WIDTH - 2.0 * EDGE;
        let mut seen: Vec<&str> = Vec::new();
        for ((one, number), dash) in
            self.chart.series.iter().zip(&self.numbers).zip(dashes(self.chart))
        {
            let known = number.is_none() && seen.contains(&one.name.as_str());
            if known {
                continue;
            }
            seen.push(&one.name);
            let name = number.map_or(one.name.clone(), |number| format!("{number}  {}", one.name));
            let rows = lines(&name, SIZE, room - SAMPLE - 8.0);
            let width = rows.iter().map(|row| text_width(row, SIZE)).fold(0.0, f64::max);
            if x > EDGE && x + SAMPLE + 8.0 + width > WIDTH - EDGE {
                (x, y) = (EDGE, y + ROW);
            }
            sample(out, &one.shape, x, y - 0.35 * SIZE, dash);
            for (row, line) in rows.iter().enumerate() {
                text(out, "key", x + SAMPLE + 8.0, y + row as f64 * ROW, line);
            }
            y += rows.len().saturating_sub(1) as f64 * ROW;
            x += SAMPLE + 8.0 + width + 20.0;
        }
        if x > EDGE {
            y += ROW;
        }
        dropped.extend(self.chart.notes.iter().cloned());
        for line in dropped.iter().flat_map(|note| lines(note, SIZE, room)) {
            text(out, "note", EDGE, y, &line);
            y += ROW;
        }
        y - ROW + 4.0
    }
}

fn pair(two: &[(f64, f64)]) -> Option<Piece> {
    match two {
        [a, b] => Some((*a, *b)),
        _ => None,
    }
}

/// Dashes of every series; those that are no line have none.
fn dashes(chart: &Chart) -> Vec<&'static str> {
    let mut next = 0;
    chart
        .series
        .iter()
        .map(|one| {
            if !one.shape.is_line() {
                return "";
            }
            next += 1;
            DASHES.get((next - 1) % DASHES.len()).copied().unwrap_or("")
        })
        .collect()
}

fn line_style(dash: &str) -> String {
    let dash =
        if dash.is_empty() { String::new() } else { format!(" stroke-dasharray=\"{dash}\"") };
    format!("fill=\"none\" stroke=\"currentColor\" stroke-width=\"1.8\"{dash}")
}

fn points_text(points: &[(f64, f64)]) -> String {
    let texts: Vec<String> = points.iter().map(|(x, y)| format!("{},{}", n(*x), n(*y))).collect();
    texts.join(" ")
}

fn text(out: &mut String, class: &str, x: f64, y: f64, text: &str) {
    let _ =
        writeln!(out, "<text class=\"{class}\" x=\"{}\" y=\"{}\">{}</text>", n(x), n(y), esc(text));
}

/// A sample of a series, for the key.
fn sample(out: &mut String, shape: &Shape, x: f64, y: f64, dash: &str) {
    let end = n(x + SAMPLE);
    let _ = match shape {
        Shape::Line(_) | Shape::Steps(_) => {
            writeln!(out, "<path d=\"M{} {}H{end}\" {}/>", n(x), n(y), line_style(dash))
        }
        Shape::Band(_) => writeln!(
            out,
            "<rect x=\"{}\" y=\"{}\" width=\"{}\" height=\"8\" fill-opacity=\"0.1\" stroke=\"currentColor\" stroke-width=\"0.6\"/>",
            n(x),
            n(y - 4.0),
            n(SAMPLE)
        ),
        Shape::Points(_) => writeln!(
            out,
            "<circle cx=\"{}\" cy=\"{}\" r=\"4\" fill=\"none\" stroke=\"currentColor\" stroke-width=\"1.4\"/>",
            n(x + SAMPLE / 2.0),
            n(y)
        ),
    };
}

/// Ticks that have room beside each other: (place, text). `needs` is the room of a text.
fn ticks(axis: &Axis, place: impl Fn(f64) -> f64, needs: impl Fn(&str) -> f64) -> Vec<(f64, &str)> {
    let mut out: Vec<(f64, &str)> = Vec::new();
    for tick in &axis.ticks {
        let at = place(tick.at);
        let room = needs(&tick.text);
        if out.last().is_none_or(|(last, _)| (at - last).abs() >= room) {
            out.push((at, &tick.text));
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::esc;
    use proptest::prelude::*;

    /// Reads entities back, as a browser does.
    fn read(text: &str) -> String {
        text.replace("&lt;", "<")
            .replace("&gt;", ">")
            .replace("&quot;", "\"")
            .replace("&#39;", "'")
            .replace("&amp;", "&")
    }

    proptest! {
        #[test]
        fn esc_leaves_nothing_with_a_meaning(text in any::<String>()) {
            let safe = esc(&text);
            prop_assert!(!safe.contains(['<', '>', '"', '\'']));
            prop_assert!(!safe.chars().any(char::is_control));
            for (at, _) in safe.match_indices('&') {
                let rest = &safe[at..];
                prop_assert!(["&amp;", "&lt;", "&gt;", "&quot;", "&#39;"].iter().any(|e| rest.starts_with(e)));
            }
            let kept: String = text
                .chars()
                .map(|c| if matches!(c, '\t' | '\n' | '\r') { ' ' } else { c })
                .filter(|c| !c.is_control() && !matches!(c, '\u{fffe}' | '\u{ffff}'))
                .collect();
            prop_assert_eq!(read(&safe), kept);
        }
    }
}
