//! A document as plain text, 80 columns, with or without colour.

use super::document::{Block, Document, Line, Span, Tone};
use owo_colors::OwoColorize;
use unicode_width::UnicodeWidthStr;

/// How the text is to look.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Look {
    /// Colour and weight.
    pub color: bool,
    /// Only ASCII characters.
    pub ascii: bool,
    /// Columns.
    pub width: usize,
}

impl Default for Look {
    fn default() -> Self {
        Self { color: false, ascii: false, width: 80 }
    }
}

/// The document as text.
#[must_use]
pub fn text(document: &Document, look: Look) -> String {
    let mut out = String::new();
    for (at, block) in document.blocks.iter().enumerate() {
        if at > 0 {
            out.push('\n');
        }
        render(&mut out, block, look);
    }
    if look.ascii { ascii(&out) } else { out }
}

fn render(out: &mut String, block: &Block, look: Look) {
    match block {
        Block::Title(line) => {
            let text = line.text();
            push_wrapped(out, line, look, 0, true);
            let rule = if look.ascii { "=" } else { "═" };
            out.push_str(&rule.repeat(text.width().min(look.width)));
            out.push('\n');
        }
        Block::Heading(line) => push_wrapped(out, line, look, 0, true),
        Block::Subheading(line) => push_wrapped(out, line, look, 1, true),
        Block::Steps(steps) => {
            for (number, lines) in steps {
                for (row, line) in lines.iter().enumerate() {
                    if row == 0 {
                        let mark = format!("{number:>4}. ");
                        out.push_str(&mark);
                        push_wrapped_from(out, line, look, mark.len(), mark.len(), false);
                    } else {
                        push_wrapped(out, line, look, 8, false);
                    }
                }
            }
        }
        Block::Text(line) => push_wrapped(out, line, look, 2, false),
        Block::Pairs(pairs) => {
            let name_width = pairs.iter().map(|(name, _)| name.width()).max().unwrap_or(0);
            for (name, line) in pairs {
                let indent = 2 + name_width + 2;
                out.push_str("  ");
                out.push_str(name);
                out.push_str(&" ".repeat(name_width - name.width() + 2));
                push_wrapped_from(out, line, look, indent, indent, false);
            }
        }
        Block::Table { head, rows } => table(out, head, rows, look),
        Block::Drawing(lines) => {
            for line in lines {
                out.push_str(line.trim_end());
                out.push('\n');
            }
        }
        Block::List(lines) => {
            for line in lines {
                out.push_str("  - ");
                push_wrapped_from(out, line, look, 4, 4, false);
            }
        }
    }
}

/// A table no wider than the page: the widest columns give way, their cells go on below.
fn table(out: &mut String, head: &[String], rows: &[Vec<Line>], look: Look) {
    let texts: Vec<Vec<String>> =
        rows.iter().map(|row| row.iter().map(Line::text).collect()).collect();
    let mut widths: Vec<usize> = head
        .iter()
        .enumerate()
        .map(|(column, name)| {
            let cells = texts.iter().filter_map(|row| row.get(column)).map(|cell| cell.width());
            cells.chain([name.width()]).max().unwrap_or(0)
        })
        .collect();
    // Two columns of space before and between.
    let most = look.width.saturating_sub(2 * widths.len());
    while widths.iter().sum::<usize>() > most {
        match widths.iter_mut().max() {
            Some(widest) if *widest > LEAST_COLUMN => *widest -= 1,
            _ => break,
        }
    }
    let mut put = |cells: &[String], tone: Tone| {
        let wrapped: Vec<Vec<String>> =
            cells.iter().zip(&widths).map(|(cell, width)| wrap(cell, *width)).collect();
        let height = wrapped.iter().map(Vec::len).max().unwrap_or(0);
        for line in 0..height {
            let mut row = String::new();
            for (column, (cell, width)) in wrapped.iter().zip(&widths).enumerate() {
                let text = cell.get(line).map_or("", String::as_str);
                let space = " ".repeat(width.saturating_sub(text.width()));
                row.push_str("  ");
                // Words to the left, figures to the right.
                if column == 0 {
                    row.push_str(text);
                    row.push_str(&space);
                } else {
                    row.push_str(&space);
                    row.push_str(text);
                }
            }
            out.push_str(&styled(row.trim_end(), tone, look));
            out.push('\n');
        }
    };
    put(head, Tone::Faint);
    for row in &texts {
        put(row, Tone::Plain);
    }
}

/// No column gets narrower than this.
const LEAST_COLUMN: usize = 6;

/// Words of a cell in lines of a width; a word longer than that is cut.
fn wrap(text: &str, width: usize) -> Vec<String> {
    let mut lines = vec![String::new()];
    for word in text.split(' ').flat_map(|word| pieces(word, width)) {
        let Some(last) = lines.last_mut() else { continue };
        if last.is_empty() {
            last.push_str(&word);
        } else if last.width() + 1 + word.width() <= width {
            last.push(' ');
            last.push_str(&word);
        } else {
            lines.push(word);
        }
    }
    lines
}

/// A word in pieces of a width at most.
fn pieces(word: &str, width: usize) -> Vec<String> {
    if word.width() <= width {
        return vec![word.to_owned()];
    }
    let mut out = vec![String::new()];
    for c in word.chars() {
        let Some(last) = out.last_mut() else { continue };
        if last.width() + c.to_string().width() > width.max(1) {
            out.push(c.to_string());
        } else {
            last.push(c);
        }
    }
    out
}

fn push_wrapped(out: &mut String, line: &Line, look: Look, indent: usize, strong: bool) {
    out.push_str(&" ".repeat(indent));
    push_wrapped_from(out, line, look, indent, indent, strong);
}

/// Words of a line, wrapped; `column` is where the pen already stands.
fn push_wrapped_from(
    out: &mut String,
    line: &Line,
    look: Look,
    mut column: usize,
    indent: usize,
    strong: bool,
) {
    let room = look.width.saturating_sub(indent).max(1);
    for (at, word) in words_of(line, room).iter().enumerate() {
        let width: usize = word.iter().map(|(text, _)| text.width()).sum();
        if at > 0 && column + 1 + width > look.width && column > indent {
            out.push('\n');
            out.push_str(&" ".repeat(indent));
            column = indent;
        } else if at > 0 {
            out.push(' ');
            column += 1;
        }
        for (text, tone) in word {
            out.push_str(&styled(text, if strong { Tone::Strong } else { *tone }, look));
        }
        column += width;
    }
    out.push('\n');
}

/// The words of a line; a word may run over spans, and then has more than one tone.
fn words_of(line: &Line, room: usize) -> Vec<Vec<(String, Tone)>> {
    let mut words: Vec<Vec<(String, Tone)>> = Vec::new();
    let mut open = false;
    for Span { text, tone, .. } in &line.0 {
        for (at, piece) in text.split(' ').enumerate() {
            if at > 0 {
                open = false;
            }
            for (cut, part) in pieces(piece, room).into_iter().enumerate() {
                if part.is_empty() {
                    continue;
                }
                match words.last_mut() {
                    Some(word) if open && cut == 0 => word.push((part, *tone)),
                    _ => words.push(vec![(part, *tone)]),
                }
                open = true;
            }
        }
    }
    words
}

fn styled(text: &str, tone: Tone, look: Look) -> String {
    match tone {
        Tone::Strong if look.color => text.bold().to_string(),
        Tone::Faint if look.color => text.dimmed().to_string(),
        _ => text.to_owned(),
    }
}

/// The same in ASCII: units and signs as they are typed on any keyboard.
#[must_use]
pub fn ascii(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '°' => out.push_str("deg "),
            '²' => out.push('2'),
            '³' => out.push('3'),
            '·' => out.push('.'),
            '×' => out.push('x'),
            '−' | '–' | '—' => out.push('-'),
            '±' => out.push_str("+/-"),
            '≤' => out.push_str("<="),
            '≥' => out.push_str(">="),
            '…' => out.push_str("..."),
            '═' => out.push('='),
            'µ' | 'μ' => out.push('u'),
            '√' => out.push_str("sqrt "),
            'ν' => out.push_str("nu"),
            'ρ' => out.push_str("rho"),
            'α' => out.push_str("alpha"),
            'Δ' => out.push('d'),
            c if c.is_ascii() => out.push(c),
            _ => out.push('?'),
        }
    }
    out.replace("deg C", "degC").replace("deg F", "degF")
}
