//! What a chart shows: axes, series, lines with words, and the same as text.

use super::axis::Axis;

/// A chart.
#[derive(Debug, Clone, PartialEq)]
pub struct Chart {
    /// What it shows of what.
    pub title: String,
    /// From left to right.
    pub x: Axis,
    /// From bottom to top.
    pub y: Axis,
    /// What is drawn, in the order of the key.
    pub series: Vec<Series>,
    /// Lines across, each at a value of `y`.
    pub limits: Vec<Level>,
    /// Lines from bottom to top, each at a value of `x`.
    pub marks: Vec<Level>,
    /// Remarks under the chart.
    pub notes: Vec<String>,
    /// What the chart says, for who cannot see it.
    pub says: Vec<String>,
}

/// One thing drawn.
#[derive(Debug, Clone, PartialEq)]
pub struct Series {
    /// What it is, for the key. The same name twice is one entry.
    pub name: String,
    /// Its data.
    pub shape: Shape,
}

/// Data of a series: points of (x, y), x rising.
#[derive(Debug, Clone, PartialEq)]
pub enum Shape {
    /// A line through points.
    Line(Vec<(f64, f64)>),
    /// The range between two lines: (x, lower, upper).
    Band(Vec<(f64, f64, f64)>),
    /// Single points.
    Points(Vec<(f64, f64)>),
    /// Each value held up to the next point.
    Steps(Vec<(f64, f64)>),
}

/// A line across the chart at one value, with words on it.
#[derive(Debug, Clone, PartialEq)]
pub struct Level {
    /// The value.
    pub at: f64,
    /// The words.
    pub words: String,
    /// The value as it is shown.
    pub value: String,
}

impl Level {
    /// The words with the value.
    #[must_use]
    pub fn text(&self) -> String {
        format!("{} {}", self.words, self.value)
    }
}

impl Chart {
    /// A chart without content.
    pub(super) const fn new(title: String, x: Axis, y: Axis) -> Self {
        Self {
            title,
            x,
            y,
            series: Vec::new(),
            limits: Vec::new(),
            marks: Vec::new(),
            notes: Vec::new(),
            says: Vec::new(),
        }
    }

    /// Adds a series, unless it is empty.
    pub(super) fn draw(&mut self, name: impl Into<String>, shape: Shape) {
        if !shape.is_empty() {
            self.series.push(Series { name: name.into(), shape });
        }
    }

    /// Adds a line across at a value of `y`.
    pub(super) fn limit(&mut self, words: impl Into<String>, at: f64, value: String) {
        level(&mut self.limits, Level { at, words: words.into(), value });
    }

    /// Adds a line from bottom to top at a value of `x`.
    pub(super) fn mark(&mut self, words: impl Into<String>, at: f64, value: String) {
        level(&mut self.marks, Level { at, words: words.into(), value });
    }

    /// The number of each series that is a line, where there are several; `None` for all others.
    #[must_use]
    pub fn numbers(&self) -> Vec<Option<usize>> {
        let mut next = 0;
        let several = self.series.iter().filter(|one| one.shape.is_line()).count() > 1;
        self.series
            .iter()
            .map(|one| {
                (several && one.shape.is_line()).then(|| {
                    next += 1;
                    next
                })
            })
            .collect()
    }

    /// The chart in words: axes, lines with words, data.
    #[must_use]
    pub fn description(&self) -> String {
        let axis = |axis: &Axis| {
            let end =
                |tick: Option<&super::axis::Tick>| tick.map_or("", |tick| &tick.text).to_owned();
            format!("{} from {} to {}", axis.label, end(axis.ticks.first()), end(axis.ticks.last()))
        };
        let mut parts = vec![format!("Across: {}. Up: {}.", axis(&self.x), axis(&self.y))];
        parts.extend(self.says.iter().cloned());
        for (what, levels) in [("Lines across", &self.limits), ("Lines up", &self.marks)] {
            if !levels.is_empty() {
                let texts: Vec<String> = levels.iter().map(Level::text).collect();
                parts.push(format!("{what}: {}.", texts.join("; ")));
            }
        }
        parts.extend(self.notes.iter().cloned());
        parts.join(" ")
    }
}

/// One line for what lies at one value, with the words of both.
fn level(levels: &mut Vec<Level>, new: Level) {
    if !new.at.is_finite() {
        return;
    }
    match levels.iter_mut().find(|old| old.value == new.value && (old.at - new.at).abs() < 0.1) {
        Some(old) => old.words = format!("{}; {}", old.words, new.words),
        None => levels.push(new),
    }
}

impl Shape {
    fn is_empty(&self) -> bool {
        match self {
            Self::Line(points) | Self::Points(points) | Self::Steps(points) => points.is_empty(),
            Self::Band(points) => points.is_empty(),
        }
    }

    /// Whether it is told apart by its dashes and its number.
    #[must_use]
    pub const fn is_line(&self) -> bool {
        matches!(self, Self::Line(_) | Self::Steps(_))
    }

    /// Its corners as lines: of a band both edges, of single points none.
    pub(super) fn paths(&self) -> Vec<Vec<(f64, f64)>> {
        match self {
            Self::Line(points) => vec![points.clone()],
            Self::Points(_) => Vec::new(),
            Self::Band(points) => vec![
                points.iter().map(|(x, low, _)| (*x, *low)).collect(),
                points.iter().map(|(x, _, high)| (*x, *high)).collect(),
            ],
            Self::Steps(points) => {
                let mut path: Vec<(f64, f64)> = Vec::new();
                for (x, y) in points {
                    if let Some((_, held)) = path.last() {
                        path.push((*x, *held));
                    }
                    path.push((*x, *y));
                }
                vec![path]
            }
        }
    }
}
