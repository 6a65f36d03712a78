//! Where everything of a chart lies on a drawing, before anything is drawn.
//!
//! From top to bottom: title, labels of the lines that run up, frame, axis, key. Lengths are in the
//! drawing's own unit, from the upper left.

use super::axis::Axis;
use super::clip::{around, inside};
use super::model::{Chart, Shape};
use super::place::{Area, Clear, Piece, lines, over, text_width};

/// Width of the drawing.
pub(super) const WIDTH: f64 = 720.0;
/// Height of the frame.
pub(super) const HEIGHT: f64 = 360.0;
/// Size of all text but the title.
pub(super) const SIZE: f64 = 11.0;
/// Size of the title.
pub(super) const TITLE: f64 = 14.0;
/// From line to line of the title.
pub(super) const TITLE_ROW: f64 = 18.0;
/// From line to line of other text.
pub(super) const ROW: f64 = 15.0;
/// Room at the sides.
pub(super) const EDGE: f64 = 10.0;

/// The places of a chart on the drawing.
pub(super) struct Page<'a> {
    pub(super) chart: &'a Chart,
    /// Lines of the title.
    pub(super) title: Vec<String>,
    /// The frame round the curves.
    pub(super) frame: Area,
    /// The number of each series.
    pub(super) numbers: Vec<Option<usize>>,
    /// The label of each mark, over the frame.
    pub(super) over: Vec<Option<Area>>,
    /// The label of each limit, inside the frame.
    pub(super) across: Vec<Option<Area>>,
    /// The place of each series' number.
    pub(super) tags: Vec<Option<Area>>,
}

impl<'a> Page<'a> {
    pub(super) fn new(chart: &'a Chart) -> Self {
        let widest = chart.y.ticks.iter().map(|tick| text_width(&tick.text, SIZE));
        let left = EDGE + SIZE + 8.0 + widest.fold(0.0, f64::max) + 8.0;
        let last = chart.x.ticks.last().map_or(0.0, |tick| text_width(&tick.text, SIZE));
        let right = WIDTH - EDGE - last / 2.0;
        let title = lines(&chart.title, TITLE, WIDTH - 2.0 * EDGE);
        let labels: Vec<Option<(f64, f64)>> = chart
            .marks
            .iter()
            .map(|mark| {
                let x = left + chart.x.place(mark.at) * (right - left);
                chart.x.holds(mark.at).then(|| (x, text_width(&mark.text(), SIZE)))
            })
            .collect();
        let rows = over(&labels, EDGE, WIDTH - EDGE);
        let most = rows.iter().flatten().map(|(row, _)| row + 1).max().unwrap_or(0);
        let top = EDGE + title.len() as f64 * TITLE_ROW + 8.0 + most as f64 * ROW;
        let over = rows.iter().zip(&labels).map(|(place, label)| {
            let ((row, left), (_, width)) = place.zip(*label)?;
            let bottom = top - 4.0 - row as f64 * ROW;
            Some(Area { left, top: bottom - SIZE - 1.0, right: left + width, bottom })
        });
        let mut page = Self {
            chart,
            title,
            frame: Area { left, top, right, bottom: top + HEIGHT },
            numbers: chart.numbers(),
            over: over.collect(),
            across: Vec::new(),
            tags: Vec::new(),
        };
        page.place_inside();
        page
    }

    pub(super) fn x(&self, value: f64) -> f64 {
        self.pixel((self.chart.x.place(value), 0.0)).0
    }

    pub(super) fn y(&self, value: f64) -> f64 {
        self.pixel((0.0, self.chart.y.place(value))).1
    }

    /// A place from 0 to 1 on the drawing.
    pub(super) fn pixel(&self, (x, y): (f64, f64)) -> (f64, f64) {
        let Area { left, right, bottom, .. } = self.frame;
        (left + x * (right - left), bottom - y * HEIGHT)
    }

    /// What lies in the frame of a shape's lines.
    pub(super) fn paths(&self, shape: &Shape) -> Vec<Vec<(f64, f64)>> {
        let inside = shape.paths().into_iter().flat_map(|path| inside(self.chart, &path));
        inside.map(|line| line.into_iter().map(|place| self.pixel(place)).collect()).collect()
    }

    /// The lines of a series with a gap for its number.
    pub(super) fn gapped(&self, series: usize, shape: &Shape) -> Vec<Vec<(f64, f64)>> {
        let paths = self.paths(shape);
        match self.tags.get(series).copied().flatten() {
            Some(tag) => paths.iter().flat_map(|path| around(path, &tag)).collect(),
            None => paths,
        }
    }

    /// Ticks of an axis that have room beside each other: (place, text).
    pub(super) fn ticks(
        axis: &Axis,
        place: impl Fn(f64) -> f64,
        needs: impl Fn(&str) -> f64,
    ) -> Vec<(f64, &str)> {
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

    /// Labels of limits, clear of all curves; then numbers, each on its own curve.
    fn place_inside(&mut self) {
        let chart = self.chart;
        let pieces = |shape: &Shape| -> Vec<Piece> {
            let pair = |two: &[(f64, f64)]| Some((*two.first()?, *two.last()?));
            let paths = self.paths(shape);
            paths.iter().flat_map(|line| line.windows(2).filter_map(pair)).collect()
        };
        let curves: Vec<(bool, Vec<Piece>)> =
            chart.series.iter().map(|one| (one.shape.is_line(), pieces(&one.shape))).collect();
        let heights: Vec<Option<f64>> = chart
            .limits
            .iter()
            .map(|limit| chart.y.holds(limit.at).then(|| self.y(limit.at)))
            .collect();
        let across: Vec<f64> = heights.iter().flatten().copied().collect();
        let up: Vec<f64> = chart
            .marks
            .iter()
            .filter(|mark| chart.x.holds(mark.at))
            .map(|mark| self.x(mark.at))
            .collect();
        let Area { left, right, .. } = self.frame;
        let frame = self.frame;
        let all: Vec<Piece> = curves.iter().flat_map(|(_, pieces)| pieces).copied().collect();
        let mut taken = self.points();
        let clear = Clear { frame, curves: &all, across: &across, up: &up };
        let mut labels = Vec::new();
        for (limit, y) in chart.limits.iter().zip(&heights) {
            let size = (text_width(&limit.text(), SIZE), SIZE + 1.0);
            let mut candidates = Vec::new();
            for top in y.map_or(Vec::new(), |y| vec![y - size.1 - 1.5, y + 1.5]) {
                let mut start = right - 4.0 - size.0;
                while start >= left + 4.0 {
                    candidates.push((start, top));
                    start -= 12.0;
                }
            }
            let place = clear.best(candidates, size, &taken);
            taken.extend(place);
            labels.push(place);
        }
        let mut tags = Vec::new();
        for (at, number) in self.numbers.iter().enumerate() {
            let size =
                (text_width(&number.map_or(String::new(), |n| n.to_string()), SIZE), SIZE + 1.0);
            // Not on another line; the edge of a range does not matter.
            let others: Vec<Piece> = curves
                .iter()
                .enumerate()
                .filter(|(other, (line, _))| *line && *other != at)
                .flat_map(|(_, (_, pieces))| pieces)
                .copied()
                .collect();
            let clear = Clear { frame, curves: &others, across: &across, up: &up };
            // In the middle of each piece, from the cold end; that end itself stays, to be seen.
            let middle = |(a, b): &Piece| (f64::midpoint(a.0, b.0), f64::midpoint(a.1, b.1));
            let own = curves.get(at).map_or(&[][..], |(_, pieces)| pieces);
            let candidates = own
                .iter()
                .skip(usize::from(own.len() > 1))
                .map(middle)
                .map(|(x, y)| (x - size.0 / 2.0, y - size.1 / 2.0));
            let place = number.and_then(|_| clear.best(candidates, size, &taken));
            taken.extend(place);
            tags.push(place);
        }
        self.across = labels;
        self.tags = tags;
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
}
