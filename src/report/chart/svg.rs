//! A chart as SVG, by hand: to stand alone or inside a page, in black and white.
//!
//! Colours are the text's own, so that the chart follows the page it stands in.

use super::clip::outline;
use super::layout::{EDGE, HEIGHT, Page, ROW, SIZE, TITLE, TITLE_ROW, WIDTH};
use super::model::{Chart, Shape};
use super::place::{Area, lines, text_width};
use std::fmt::Write;

/// Length of the sample of a line in the key.
const SAMPLE: f64 = 34.0;
/// Dashes of the first line, the second, and so on; then again, with other numbers.
const DASHES: [&str; 6] = ["", "9 4", "2 3", "10 3 2 3", "16 5", "6 2 1 2 1 2"];

/// Text made safe inside SVG or HTML: the five characters with a meaning are written as entities,
/// and characters that XML 1.0 does not allow, or that turn the direction of text, are left out.
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
            // What turns the direction of the text behind it.
            c if crate::report::document::turns(c) => {}
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
        let y = EDGE + TITLE + row as f64 * TITLE_ROW;
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

impl Page<'_> {
    fn axes(&self, out: &mut String) {
        let Area { left, top, right, bottom } = self.frame;
        let chart = self.chart;
        let x_ticks = Self::ticks(&chart.x, |at| self.x(at), |tick| text_width(tick, SIZE) + 6.0);
        let y_ticks = Self::ticks(&chart.y, |at| self.y(at), |_| SIZE + 2.0);
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
        for ((at, one), dash) in self.chart.series.iter().enumerate().zip(dashes(self.chart)) {
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
                    for line in self.gapped(at, &one.shape) {
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
        for line in self.paths(&Shape::Band(points.to_vec())) {
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
        for (mark, place) in chart.marks.iter().zip(&self.over) {
            if !chart.x.holds(mark.at) {
                key.push(format!("{}: off the chart", mark.text()));
                continue;
            }
            let _ = writeln!(
                out,
                "<path class=\"mark\" d=\"M{} {}V{}\" stroke=\"currentColor\" stroke-width=\"0.9\" stroke-dasharray=\"4 2\"/>",
                n(self.x(mark.at)),
                n(place.map_or(top, |area| area.bottom)),
                n(bottom)
            );
            match place {
                Some(area) => label(out, area, &mark.text()),
                None => key.push(format!("line up at {}: {}", mark.value, mark.words)),
            }
        }
        for (limit, place) in chart.limits.iter().zip(&self.across) {
            if !chart.y.holds(limit.at) {
                key.push(format!("{}: off the chart", limit.text()));
                continue;
            }
            let _ = writeln!(
                out,
                "<path class=\"limit\" d=\"M{} {}H{}\" stroke=\"currentColor\" stroke-width=\"0.9\"/>",
                n(left),
                n(self.y(limit.at)),
                n(right)
            );
            match place {
                Some(area) => label(out, area, &limit.text()),
                None => key.push(format!("line across at {}: {}", limit.value, limit.words)),
            }
        }
        let mut crowded = Vec::new();
        for (number, place) in self.numbers.iter().zip(&self.tags) {
            match (number, place) {
                (Some(number), Some(area)) => label(out, area, &number.to_string()),
                (Some(number), None) => crowded.push(number.to_string()),
                (None, _) => {}
            }
        }
        if !crowded.is_empty() {
            key.push(format!("Too close together for a number on them: {}.", crowded.join(", ")));
        }
        key
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

/// A text in the place found for it.
fn label(out: &mut String, area: &Area, words: &str) {
    text(out, "label", area.left, area.bottom - 2.5, words);
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
