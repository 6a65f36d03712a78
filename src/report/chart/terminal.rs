//! A chart in characters: curves in braille dots or in ASCII, lines by letters, a key below.

use super::axis::Axis;
use super::clip::inside;
use super::model::{Chart, Level, Shape};
use super::place;
use crate::report::text::ascii as to_ascii;
use unicode_width::{UnicodeWidthChar, UnicodeWidthStr};

/// What stands for the first curve in ASCII, the second, and so on.
const SIGNS: [char; 6] = ['*', '+', 'x', '#', '%', '@'];
/// Fewest columns and rows that make a chart.
const LEAST: (usize, usize) = (24, 8);
/// Rows that are not of the frame's inside: label, frame, ticks, label.
const OTHER_ROWS: usize = 4;

/// The chart `columns` wide; drawing with its axes is `rows` high, title and key come on top.
///
/// Less than 24 columns or 8 rows make no chart: it is drawn at that size. Text of a case is stripped
/// of control characters.
#[must_use]
pub fn terminal(chart: &Chart, columns: usize, rows: usize, ascii: bool) -> String {
    let (columns, rows) = (columns.max(LEAST.0), rows.max(LEAST.1));
    let clean = |text: &str| {
        let text = plain(text);
        if ascii { to_ascii(&text) } else { text }
    };
    let y_texts: Vec<String> = chart.y.ticks.iter().map(|tick| clean(&tick.text)).collect();
    let margin = y_texts.iter().map(|text| text.width()).max().unwrap_or(0) + 1;
    let inner = Grid::new(columns.saturating_sub(margin + 1).max(8), rows - OTHER_ROWS, ascii);
    let mut drawing = Drawing { chart, grid: inner, key: Vec::new() };
    drawing.levels();
    drawing.series();
    drawing.names();

    let mut out: Vec<String> = wrapped(&clean(&chart.title), columns, "");
    out.push(clipped(&clean(&chart.y.label), columns));
    let grid = &drawing.grid;
    let y_rows = spread(&chart.y, |at| grid.row(chart.y.place(at)), |_| 1);
    let side = if ascii { '|' } else { '│' };
    let tick = if ascii { '+' } else { '┤' };
    for row in 0..grid.rows {
        let label = y_rows.iter().find(|(_, at)| *at == row);
        let text = label.and_then(|(index, _)| y_texts.get(*index)).map_or("", String::as_str);
        let edge = if label.is_some() { tick } else { side };
        let pad = " ".repeat(margin.saturating_sub(text.width() + 1));
        out.push(format!("{pad}{text} {edge}{}", grid.line(row)).trim_end().to_owned());
    }
    let x_texts: Vec<String> = chart.x.ticks.iter().map(|tick| clean(&tick.text)).collect();
    let width = |index: usize| x_texts.get(index).map_or(0, |text| text.width());
    let x_columns = spread(&chart.x, |at| grid.column(chart.x.place(at)), |index| width(index) + 1);
    let (corner, floor, down) = if ascii { ('+', '-', '+') } else { ('└', '─', '┬') };
    let bottom: String = (0..grid.columns)
        .map(|column| if x_columns.iter().any(|(_, at)| *at == column) { down } else { floor })
        .collect();
    out.push(format!("{}{corner}{bottom}", " ".repeat(margin)));
    let mut labels = String::new();
    for (index, column) in &x_columns {
        let text = x_texts.get(*index).map_or("", String::as_str);
        let middle = margin + 1 + column;
        let start =
            middle.saturating_sub(text.width() / 2).min(columns.saturating_sub(text.width()));
        if start >= labels.width() + usize::from(!labels.is_empty()) {
            labels.push_str(&" ".repeat(start - labels.width()));
            labels.push_str(text);
        }
    }
    out.push(labels);
    let label = clipped(&clean(&chart.x.label), columns);
    let indent = (margin + 1 + grid.columns.saturating_sub(label.width()) / 2)
        .min(columns.saturating_sub(label.width()));
    out.push(format!("{}{label}", " ".repeat(indent)));

    for entry in drawing.key.iter().chain(&chart.notes) {
        out.extend(wrapped(&clean(entry), columns, "    "));
    }
    let mut text = out.join("\n");
    text.push('\n');
    text
}

/// Text without what could steer a terminal: no control characters, no marks that turn the direction
/// of writing or have no width.
fn plain(text: &str) -> String {
    text.chars()
        .map(|c| if matches!(c, '\t' | '\n' | '\r') { ' ' } else { c })
        .filter(|c| !c.is_control() && c.width().is_some_and(|width| width > 0))
        .collect()
}

/// As much of a text as so many columns hold.
fn clipped(text: &str, columns: usize) -> String {
    let mut out = String::new();
    for c in text.chars() {
        if out.width() + c.width().unwrap_or(0) > columns {
            break;
        }
        out.push(c);
    }
    out
}

/// Words in lines of so many columns; all but the first are set in.
fn wrapped(text: &str, columns: usize, indent: &str) -> Vec<String> {
    // Six tenths of a size of 1/0.6 are one column.
    let most = (columns - indent.len()) as f64;
    let lines = place::lines(text, 1.0 / 0.6, most + 1e-6);
    let set =
        |(row, line): (usize, String)| if row == 0 { line } else { format!("{indent}{line}") };
    lines.into_iter().enumerate().map(set).collect()
}

/// Ticks that have room, at an even stride: (index, cell).
fn spread(
    axis: &Axis,
    cell: impl Fn(f64) -> usize,
    room: impl Fn(usize) -> usize,
) -> Vec<(usize, usize)> {
    let all: Vec<(usize, usize)> =
        axis.ticks.iter().enumerate().map(|(index, tick)| (index, cell(tick.at))).collect();
    let fits = |stride: usize| {
        let some: Vec<&(usize, usize)> = all.iter().step_by(stride).collect();
        some.iter()
            .zip(some.iter().skip(1))
            .all(|(a, b)| a.1.abs_diff(b.1) >= room(b.0).max(room(a.0)))
    };
    // Unevenly spaced ticks: those that fit one after the other.
    if axis.scale == super::Scale::LogLog {
        let mut out: Vec<(usize, usize)> = Vec::new();
        for (index, at) in all {
            if out.last().is_none_or(|(_, last)| last.abs_diff(at) >= room(index)) {
                out.push((index, at));
            }
        }
        return out;
    }
    let stride = (1..=all.len().max(1)).find(|stride| fits(*stride)).unwrap_or(1);
    all.into_iter().step_by(stride).collect()
}

struct Drawing<'a> {
    chart: &'a Chart,
    grid: Grid,
    key: Vec<String>,
}

impl Drawing<'_> {
    /// Lines with words: drawn sparsely, so that a curve is seen over them.
    fn levels(&mut self) {
        for limit in self.chart.limits.iter().filter(|limit| self.chart.y.holds(limit.at)) {
            self.grid.across(self.chart.y.place(limit.at));
        }
        for mark in self.chart.marks.iter().filter(|mark| self.chart.x.holds(mark.at)) {
            self.grid.up(self.chart.x.place(mark.at));
        }
    }

    fn series(&mut self) {
        let mut line = 0;
        for one in &self.chart.series {
            if one.shape.is_line() {
                line += 1;
            }
            let sign = SIGNS.get((line.max(1) - 1) % SIGNS.len()).copied().unwrap_or('*');
            for path in one.shape.paths().iter().flat_map(|path| inside(self.chart, path)) {
                match one.shape {
                    Shape::Band(_) => self.grid.path(&path, '.', 3),
                    _ => self.grid.path(&path, sign, 1),
                }
            }
        }
    }

    /// Points, numbers and letters, and the key to all of them.
    fn names(&mut self) {
        let chart = self.chart;
        for one in &chart.series {
            if let Shape::Points(points) = &one.shape {
                for (x, y) in points.iter().filter(|(x, y)| chart.x.holds(*x) && chart.y.holds(*y))
                {
                    let (column, row) =
                        (self.grid.column(chart.x.place(*x)), self.grid.row(chart.y.place(*y)));
                    self.grid.put(column, row, 'o');
                }
            }
        }
        let mut seen: Vec<&str> = Vec::new();
        let mut line = 0;
        for (one, number) in chart.series.iter().zip(chart.numbers()) {
            let entry = match (&one.shape, number) {
                (Shape::Points(_), _) => format!("o {}", one.name),
                (Shape::Band(_), _) => format!(". {} (its edges, dotted)", one.name),
                (_, number) => {
                    line += 1;
                    let sign = SIGNS.get((line - 1) % SIGNS.len()).copied().unwrap_or('*');
                    let ascii = self.grid.ascii;
                    match number {
                        Some(number) => {
                            self.number(&one.shape, number);
                            let tag = digit(number);
                            if ascii {
                                format!("{tag} {sign} {}", one.name)
                            } else {
                                format!("{tag} {}", one.name)
                            }
                        }
                        None if ascii => format!("{sign} {}", one.name),
                        None => format!("⠤⠤ {}", one.name),
                    }
                }
            };
            if number.is_some() || !seen.contains(&one.name.as_str()) {
                self.key.push(entry);
            }
            seen.push(&one.name);
        }
        let mut letters = 'A'..='Z';
        for limit in &chart.limits {
            let on = chart.y.holds(limit.at);
            let row = self.grid.row(chart.y.place(limit.at));
            // From the right end of the line to the left.
            let cells = (0..self.grid.columns).rev().map(|column| (column, row)).collect();
            self.letter(&mut letters, limit, on, cells);
        }
        for mark in &chart.marks {
            let on = chart.x.holds(mark.at);
            let column = self.grid.column(chart.x.place(mark.at));
            let cells = (0..self.grid.rows).map(|row| (column, row)).collect();
            self.letter(&mut letters, mark, on, cells);
        }
    }

    fn letter(
        &mut self,
        letters: &mut impl Iterator<Item = char>,
        level: &Level,
        on: bool,
        cells: Vec<(usize, usize)>,
    ) {
        if !on {
            self.key.push(format!("{}: off the chart", level.text()));
            return;
        }
        // First where no curve runs, then anywhere without a name.
        let bare = cells.iter().find(|(column, row)| self.grid.bare(*column, *row));
        let cell =
            bare.or_else(|| cells.iter().find(|(column, row)| self.grid.unnamed(*column, *row)));
        match cell.copied().zip(letters.next()) {
            Some(((column, row), letter)) => {
                self.grid.put(column, row, letter);
                self.key.push(format!("{letter} {}", level.text()));
            }
            None => self.key.push(format!("line at {}: {}", level.value, level.words)),
        }
    }

    /// A number on its curve, near the cold end, where nothing else is named.
    fn number(&mut self, shape: &Shape, number: usize) {
        let sign = digit(number);
        let cells: Vec<(usize, usize)> = shape
            .paths()
            .iter()
            .flat_map(|path| inside(self.chart, path))
            .flatten()
            .map(|(x, y)| (self.grid.column(x), self.grid.row(y)))
            .collect();
        // Not the very end, where curves of one chart start together.
        let from = (number * 2).min(cells.len() / 2);
        let cell = cells.iter().skip(from).chain(&cells).find(|(c, r)| self.grid.unnamed(*c, *r));
        if let Some((column, row)) = cell.copied() {
            self.grid.put(column, row, sign);
        }
    }
}

/// Cells of two by four dots, and characters over them.
struct Grid {
    columns: usize,
    rows: usize,
    ascii: bool,
    /// Braille dots of curves and lines, in the bits of the character.
    dots: Vec<u8>,
    /// ASCII signs of curves and lines.
    signs: Vec<Option<char>>,
    /// Whether a curve runs through.
    curve: Vec<bool>,
    /// Letters, numbers, points.
    names: Vec<Option<char>>,
}

impl Grid {
    fn new(columns: usize, rows: usize, ascii: bool) -> Self {
        let cells = columns * rows;
        Self {
            columns,
            rows,
            ascii,
            dots: vec![0; cells],
            signs: vec![None; cells],
            curve: vec![false; cells],
            names: vec![None; cells],
        }
    }

    /// The column of a place from 0 to 1.
    fn column(&self, place: f64) -> usize {
        nearest(place, self.columns)
    }

    /// The row of a place from 0 (bottom) to 1.
    fn row(&self, place: f64) -> usize {
        nearest(1.0 - place, self.rows)
    }

    fn at(&self, column: usize, row: usize) -> usize {
        row * self.columns + column
    }

    fn put(&mut self, column: usize, row: usize, name: char) {
        let at = self.at(column, row);
        if let Some(slot) = self.names.get_mut(at) {
            *slot = Some(name);
        }
    }

    fn unnamed(&self, column: usize, row: usize) -> bool {
        self.names.get(self.at(column, row)).is_some_and(Option::is_none)
    }

    fn bare(&self, column: usize, row: usize) -> bool {
        self.unnamed(column, row)
            && self.curve.get(self.at(column, row)).is_some_and(|curve| !curve)
    }

    fn dot(&mut self, x: usize, y: usize) {
        // Unicode 15, section 21.1: dots 1 to 8 of a braille cell are bits 0 to 7.
        const BITS: [[u8; 2]; 4] = [[0x01, 0x08], [0x02, 0x10], [0x04, 0x20], [0x40, 0x80]];
        let at = self.at(x / 2, y / 4);
        let bit = BITS.get(y % 4).and_then(|row| row.get(x % 2)).copied().unwrap_or(0);
        if let Some(cell) = self.dots.get_mut(at) {
            *cell |= bit;
        }
    }

    /// A line across: every other dot, or dashes.
    fn across(&mut self, place: f64) {
        let y = nearest(1.0 - place, 4 * self.rows);
        for x in (0..2 * self.columns).step_by(2) {
            self.dot(x, y);
        }
        let row = self.row(place);
        for column in 0..self.columns {
            self.sign(column, row, '-');
        }
    }

    /// A line up: every other dot, or colons.
    fn up(&mut self, place: f64) {
        let x = nearest(place, 2 * self.columns);
        for y in (0..4 * self.rows).step_by(2) {
            self.dot(x, y);
        }
        let column = self.column(place);
        for row in 0..self.rows {
            self.sign(column, row, ':');
        }
    }

    fn sign(&mut self, column: usize, row: usize, sign: char) {
        let at = self.at(column, row);
        if let Some(slot) = self.signs.get_mut(at) {
            *slot = Some(sign);
        }
    }

    /// A path of places: every `every`-th dot of it.
    fn path(&mut self, path: &[(f64, f64)], sign: char, every: usize) {
        let mut drawn = 0;
        let mut last = None;
        for (a, b) in path.iter().zip(path.iter().skip(1)) {
            let wide = (b.0 - a.0).abs() * 2.0 * self.columns as f64;
            let high = (b.1 - a.1).abs() * 4.0 * self.rows as f64;
            let steps = (2.0 * wide.max(high)).ceil().max(1.0);
            let mut step = 0.0;
            while step <= steps {
                let share = step / steps;
                let place = (a.0 + share * (b.0 - a.0), a.1 + share * (b.1 - a.1));
                let dot =
                    (nearest(place.0, 2 * self.columns), nearest(1.0 - place.1, 4 * self.rows));
                if last != Some(dot) {
                    if drawn % every == 0 {
                        self.dot(dot.0, dot.1);
                    }
                    drawn += 1;
                    last = Some(dot);
                }
                let (column, row) = (self.column(place.0), self.row(place.1));
                let at = self.at(column, row);
                // The edge of a band gives way to a curve.
                if every == 1 || self.curve.get(at).is_some_and(|curve| !curve) {
                    self.sign(column, row, sign);
                }
                if every == 1 {
                    if let Some(curve) = self.curve.get_mut(at) {
                        *curve = true;
                    }
                }
                step += 1.0;
            }
        }
    }

    fn line(&self, row: usize) -> String {
        (0..self.columns)
            .map(|column| {
                let at = self.at(column, row);
                let name = self.names.get(at).copied().flatten();
                let drawn = if self.ascii {
                    self.signs.get(at).copied().flatten().unwrap_or(' ')
                } else {
                    let bits = u32::from(self.dots.get(at).copied().unwrap_or(0));
                    if bits == 0 { ' ' } else { char::from_u32(0x2800 + bits).unwrap_or(' ') }
                };
                name.unwrap_or(drawn)
            })
            .collect()
    }
}

/// The character for a number: 1 to 9, then small letters but for the `o` of a point; more lines than
/// that share the last.
fn digit(number: usize) -> char {
    let tags = "123456789abcdefghijklmnpqrstuvwxyz";
    tags.chars().nth(number.saturating_sub(1)).unwrap_or('z')
}

/// The cell out of `count` that a place from 0 to 1 falls in.
fn nearest(place: f64, count: usize) -> usize {
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "0 to count")]
    let at = (place * count as f64).floor().clamp(0.0, count.saturating_sub(1) as f64) as usize;
    at
}
