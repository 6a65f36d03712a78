//! Where labels go on a drawing: greedily, and nowhere rather than over something.
//!
//! Lengths are in the drawing's own unit, from the upper left.

use unicode_width::UnicodeWidthStr;

/// A rectangle.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Area {
    pub(super) left: f64,
    pub(super) top: f64,
    pub(super) right: f64,
    pub(super) bottom: f64,
}

/// A straight piece of a line.
pub(super) type Piece = ((f64, f64), (f64, f64));

impl Area {
    pub(super) fn overlaps(&self, other: &Self) -> bool {
        self.left < other.right
            && other.left < self.right
            && self.top < other.bottom
            && other.top < self.bottom
    }

    fn lies_in(&self, outer: &Self) -> bool {
        self.left >= outer.left
            && self.right <= outer.right
            && self.top >= outer.top
            && self.bottom <= outer.bottom
    }

    fn meets(&self, (a, b): &Piece) -> bool {
        // Fine enough for pieces of a curve: a look every two units.
        let steps = ((b.0 - a.0).hypot(b.1 - a.1) / 2.0).ceil().max(1.0);
        let mut at = 0.0;
        while at <= steps {
            let share = at / steps;
            let (x, y) = (a.0 + share * (b.0 - a.0), a.1 + share * (b.1 - a.1));
            if x >= self.left && x <= self.right && y >= self.top && y <= self.bottom {
                return true;
            }
            at += 1.0;
        }
        false
    }
}

/// Width of a text at a size: six tenths of the size a column, more than usual sans-serif letters
/// take on the average.
pub(super) fn text_width(text: &str, size: f64) -> f64 {
    0.6 * size * text.width() as f64
}

/// Words in lines no wider than `most` at a size.
pub(super) fn lines(text: &str, size: f64, most: f64) -> Vec<String> {
    let mut out: Vec<String> = Vec::new();
    for word in text.split_whitespace().flat_map(|word| cut(word, size, most)) {
        match out.last_mut() {
            Some(line) if text_width(line, size) + text_width(&word, size) + 0.6 * size <= most => {
                line.push(' ');
                line.push_str(&word);
            }
            _ => out.push(word),
        }
    }
    out
}

/// A word in pieces no wider than `most`.
fn cut(word: &str, size: f64, most: f64) -> Vec<String> {
    let mut out = vec![String::new()];
    for c in word.chars() {
        match out.last_mut() {
            Some(piece)
                if piece.is_empty()
                    || text_width(piece, size) + text_width(&c.to_string(), size) <= most =>
            {
                piece.push(c);
            }
            _ => out.push(c.to_string()),
        }
    }
    out
}

/// Rows over the chart for labels of lines that run up.
const MOST_ROWS: usize = 8;

/// The row over the chart, from 0, and the left end of each label whose line stands at `x` and whose
/// text is so wide: the line runs up to its label and passes none. `None` where there is no such row,
/// or no label.
pub(super) fn over(
    labels: &[Option<(f64, f64)>],
    left: f64,
    right: f64,
) -> Vec<Option<(usize, f64)>> {
    // From the right: a label reaches to the right of its line, so that lines further left pass it.
    let mut order: Vec<(usize, f64, f64)> = labels
        .iter()
        .enumerate()
        .filter_map(|(at, label)| label.map(|(x, width)| (at, x, width)))
        .collect();
    order.sort_by(|a, b| b.1.total_cmp(&a.1));
    let mut out = vec![None; labels.len()];
    // Row, left, right and line of what is placed.
    let mut placed: Vec<(usize, f64, f64, f64)> = Vec::new();
    for (at, x, width) in order {
        let start = (x - 1.0).min(right - width);
        if start < left {
            continue;
        }
        let end = start + width;
        let row = (0..MOST_ROWS).find(|row| {
            placed.iter().all(|(other, l, r, line)| {
                let text_clear = other != row || end + 6.0 <= *l || start >= r + 6.0;
                let my_line_clear = other >= row || x < *l || x > *r;
                let its_line_clear = other <= row || *line < start || *line > end;
                text_clear && my_line_clear && its_line_clear
            })
        });
        if let Some(row) = row {
            placed.push((row, start, end, x));
            if let Some(slot) = out.get_mut(at) {
                *slot = Some((row, start));
            }
        }
    }
    out
}

/// What a label inside the chart must keep clear of.
pub(super) struct Clear<'a> {
    pub(super) frame: Area,
    /// Never lain over.
    pub(super) curves: &'a [Piece],
    /// Lines across, at these heights: never lain over.
    pub(super) across: &'a [f64],
    /// Lines up, at these places: lain over if it must be.
    pub(super) up: &'a [f64],
}

impl Clear<'_> {
    /// The least bad place of a label of a width and height among `candidates` of left and top; `None`
    /// where all lie over something.
    pub(super) fn best(
        &self,
        candidates: impl IntoIterator<Item = (f64, f64)>,
        (width, height): (f64, f64),
        taken: &[Area],
    ) -> Option<Area> {
        let mut best: Option<(usize, Area)> = None;
        for (left, top) in candidates {
            let area = Area { left, top, right: left + width, bottom: top + height };
            let free = area.lies_in(&self.frame)
                && !taken.iter().any(|other| area.overlaps(other))
                && !self.across.iter().any(|y| *y > area.top && *y < area.bottom)
                && !self.curves.iter().any(|piece| area.meets(piece));
            if free {
                let crossed =
                    self.up.iter().filter(|x| **x > area.left && **x < area.right).count();
                if best.is_none_or(|(least, _)| crossed < least) {
                    best = Some((crossed, area));
                }
                if crossed == 0 {
                    break;
                }
            }
        }
        best.map(|(_, area)| area)
    }
}

#[cfg(test)]
mod tests {
    use super::{Area, lines, over, text_width};

    #[test]
    fn labels_over_the_chart_keep_apart() {
        let labels: Vec<_> = (0..9).map(|i| Some((30.0 * f64::from(i), 100.0))).collect();
        let placed = over(&labels, 0.0, 400.0);
        assert!(placed.iter().filter(|place| place.is_some()).count() >= 7, "{placed:?}");
        for (i, a) in placed.iter().enumerate() {
            for (j, b) in placed.iter().enumerate() {
                if let (Some((row_a, left_a)), Some((row_b, left_b)), true) = (a, b, i < j) {
                    assert!(row_a != row_b || (left_a - left_b).abs() >= 100.0);
                }
            }
        }
    }

    #[test]
    fn lines_are_no_wider_than_asked() {
        let text = "words of many lengths, andonethatismuchlongerthantheroomthereisforit";
        for line in lines(text, 10.0, 100.0) {
            assert!(text_width(&line, 10.0) <= 100.0, "{line}");
        }
        assert_eq!(lines(text, 10.0, 100.0).concat().replace(' ', ""), text.replace(' ', ""));
    }

    #[test]
    fn an_area_meets_what_crosses_it() {
        let area = Area { left: 10.0, top: 10.0, right: 30.0, bottom: 20.0 };
        assert!(area.meets(&((0.0, 15.0), (40.0, 15.0))));
        assert!(!area.meets(&((0.0, 25.0), (40.0, 25.0))));
        assert!(area.overlaps(&Area { left: 29.0, top: 19.0, right: 50.0, bottom: 50.0 }));
        assert!(!area.overlaps(&Area { left: 30.0, top: 10.0, right: 50.0, bottom: 20.0 }));
    }
}
