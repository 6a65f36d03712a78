//! A document: what is said, without how it looks. Words and units are chosen when it is built;
//! renderers know no physics.
//!
//! Invariant: a figure in a document carries the JSON pointer of the value it shows.

use super::units::Shown;
use crate::advice::{Part, Say};

/// A whole document.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Document {
    /// Its parts in reading order.
    pub blocks: Vec<Block>,
}

/// One part of a document.
#[derive(Debug, Clone, PartialEq)]
pub enum Block {
    /// The title of the whole.
    Title(Line),
    /// A heading inside it.
    Heading(Line),
    /// A heading inside a heading.
    Subheading(Line),
    /// A paragraph.
    Text(Line),
    /// Name and value, one a line.
    Pairs(Vec<(String, Line)>),
    /// A table; the first column is text, the others are set to the right.
    Table {
        /// Column heads.
        head: Vec<String>,
        /// Rows, each as long as the head.
        rows: Vec<Vec<Line>>,
    },
    /// Lines set as they are: a chart in characters.
    Drawing(Vec<String>),
    /// A list.
    List(Vec<Line>),
    /// Numbered steps: number, what to do, and lines that belong to it.
    Steps(Vec<(usize, Vec<Line>)>),
}

/// A run of words and figures.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Line(pub Vec<Span>);

/// Words, or one figure.
#[derive(Debug, Clone, PartialEq)]
pub struct Span {
    /// What is shown.
    pub text: String,
    /// JSON pointer of the figure shown.
    pub pointer: Option<String>,
    /// What it is, for a renderer with styles.
    pub tone: Tone,
}

/// What a span is.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Tone {
    /// Plain words.
    #[default]
    Plain,
    /// What matters most.
    Strong,
    /// Beside the point.
    Faint,
}

impl Line {
    /// An empty line to add to.
    #[must_use]
    pub const fn new() -> Self {
        Self(Vec::new())
    }

    /// Adds plain words.
    #[must_use]
    pub fn words(mut self, text: impl Into<String>) -> Self {
        self.0.push(Span { text: clean(text.into()), pointer: None, tone: Tone::Plain });
        self
    }

    /// Adds words that matter.
    #[must_use]
    pub fn strong(mut self, text: impl Into<String>) -> Self {
        self.0.push(Span { text: clean(text.into()), pointer: None, tone: Tone::Strong });
        self
    }

    /// Adds words beside the point.
    #[must_use]
    pub fn faint(mut self, text: impl Into<String>) -> Self {
        self.0.push(Span { text: clean(text.into()), pointer: None, tone: Tone::Faint });
        self
    }

    /// Adds a figure with the pointer of its JSON value.
    #[must_use]
    pub fn figure(mut self, text: impl Into<String>, pointer: impl Into<String>) -> Self {
        self.0.push(Span {
            text: clean(text.into()),
            pointer: Some(pointer.into()),
            tone: Tone::Plain,
        });
        self
    }

    /// Adds a sentence; its figures lie under `pointer/figures`.
    #[must_use]
    pub fn say(mut self, say: &Say, pointer: &str, shown: Shown) -> Self {
        for part in &say.0 {
            self = match part {
                Part::Words(words) => self.words(words.clone()),
                Part::Figure { key, figure } => self.figure(
                    shown.figure(*figure),
                    format!("{pointer}/figures/{key}{}", figure.suffix()),
                ),
            };
        }
        self
    }

    /// The text alone.
    #[must_use]
    pub fn text(&self) -> String {
        self.0.iter().map(|span| span.text.as_str()).collect()
    }
}

impl<T: Into<String>> From<T> for Line {
    fn from(text: T) -> Self {
        Self::new().words(text)
    }
}

impl Document {
    /// Every JSON pointer the document shows a figure of.
    pub fn pointers(&self) -> impl Iterator<Item = &str> {
        self.blocks
            .iter()
            .flat_map(Block::lines)
            .flat_map(|line| &line.0)
            .filter_map(|span| span.pointer.as_deref())
    }
}

impl Block {
    /// Its lines, in reading order.
    #[must_use]
    pub fn lines(&self) -> Vec<&Line> {
        match self {
            Self::Title(line) | Self::Heading(line) | Self::Subheading(line) | Self::Text(line) => {
                vec![line]
            }
            Self::Pairs(pairs) => pairs.iter().map(|(_, line)| line).collect(),
            Self::Table { rows, .. } => rows.iter().flatten().collect(),
            Self::Drawing(_) => Vec::new(),
            Self::List(lines) => lines.iter().collect(),
            Self::Steps(steps) => steps.iter().flat_map(|(_, lines)| lines).collect(),
        }
    }
}

/// Control characters, terminal escapes among them, are no words: they become spaces. What turns the
/// direction of text is left out.
fn clean(text: String) -> String {
    if text.chars().any(|c| c.is_control() || turns(c)) {
        text.chars().filter(|c| !turns(*c)).map(|c| if c.is_control() { ' ' } else { c }).collect()
    } else {
        text
    }
}

/// A text safe to show on a terminal: control characters, escape sequences among them, written out
/// (`\u{1b}`), what turns the direction of text left out; line ends and tabs stay.
#[must_use]
pub fn printable(text: &str) -> String {
    text.chars()
        .filter(|c| !turns(*c))
        .map(|c| match c {
            '\n' | '\t' => c.to_string(),
            c if c.is_control() => c.escape_unicode().to_string(),
            c => c.to_string(),
        })
        .collect()
}

/// A character that turns the direction of text: Unicode Bidirectional Algorithm, UAX #9.
pub(super) const fn turns(c: char) -> bool {
    matches!(c, '\u{200e}' | '\u{200f}' | '\u{202a}'..='\u{202e}' | '\u{2066}'..='\u{2069}')
}
