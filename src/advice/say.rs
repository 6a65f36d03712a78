//! Sentences whose figures stay figures: words are chosen here, units only when they are shown.
//!
//! Invariant: a figure of a sentence has a key of its own, so that whatever is shown of it can be
//! found beside the sentence in JSON.

/// A figure in the unit its JSON key names.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Figure {
    /// °C.
    Temperature(f64),
    /// K.
    Difference(f64),
    /// mm²/s.
    Viscosity(f64),
    /// W.
    Power(f64),
    /// kWh.
    Energy(f64),
    /// kPa under the local air.
    Vacuum(f64),
    /// kPa, gauge.
    Pressure(f64),
    /// rpm.
    Speed(f64),
    /// s.
    Time(f64),
    /// mm.
    Length(f64),
    /// m above the sea.
    Elevation(f64),
    /// W/cm².
    WattDensity(f64),
    /// cm².
    Area(f64),
    /// A.
    Current(f64),
    /// %.
    Percent(f64),
    /// A plain number.
    Number(f64),
}

impl Figure {
    /// The value.
    #[must_use]
    pub const fn value(self) -> f64 {
        match self {
            Self::Temperature(v)
            | Self::Difference(v)
            | Self::Viscosity(v)
            | Self::Power(v)
            | Self::Energy(v)
            | Self::Vacuum(v)
            | Self::Pressure(v)
            | Self::Speed(v)
            | Self::Time(v)
            | Self::Length(v)
            | Self::Elevation(v)
            | Self::WattDensity(v)
            | Self::Area(v)
            | Self::Current(v)
            | Self::Percent(v)
            | Self::Number(v) => v,
        }
    }

    /// The end of its JSON key.
    #[must_use]
    pub const fn suffix(self) -> &'static str {
        match self {
            Self::Temperature(_) => "_c",
            Self::Difference(_) => "_k",
            Self::Viscosity(_) => "_mm2_s",
            Self::Power(_) => "_w",
            Self::Energy(_) => "_kwh",
            Self::Vacuum(_) | Self::Pressure(_) => "_kpa",
            Self::Speed(_) => "_rpm",
            Self::Time(_) => "_s",
            Self::Length(_) => "_mm",
            Self::Elevation(_) => "_m",
            Self::WattDensity(_) => "_w_cm2",
            Self::Area(_) => "_cm2",
            Self::Current(_) => "_a",
            Self::Percent(_) => "_percent",
            Self::Number(_) => "",
        }
    }
}

/// What fills a place in a template.
#[derive(Debug, Clone, PartialEq)]
pub enum Fill {
    /// A figure.
    Figure(Figure),
    /// A name or other words, set in as they are.
    Words(String),
}

impl From<Figure> for Fill {
    fn from(figure: Figure) -> Self {
        Self::Figure(figure)
    }
}

impl From<&str> for Fill {
    fn from(words: &str) -> Self {
        Self::Words(words.to_owned())
    }
}

impl From<String> for Fill {
    fn from(words: String) -> Self {
        Self::Words(words)
    }
}

/// One part of a sentence.
#[derive(Debug, Clone, PartialEq)]
pub enum Part {
    /// Words.
    Words(String),
    /// A figure and its key, without the unit.
    Figure {
        /// The key.
        key: &'static str,
        /// The figure.
        figure: Figure,
    },
}

/// A sentence, or a few.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Say(pub Vec<Part>);

impl Say {
    /// Fills the places `{key}` of a template. A place without a filling stays as it is written.
    ///
    /// # Example
    /// ```
    /// use coldsump::advice::{Figure, Say};
    /// let say = Say::fill("not below {floor}", &[("floor", Figure::Temperature(-12.0).into())]);
    /// assert_eq!(say.figures().next(), Some(("floor", Figure::Temperature(-12.0))));
    /// ```
    #[must_use]
    pub fn fill(template: &str, fills: &[(&'static str, Fill)]) -> Self {
        let mut parts = Vec::new();
        let mut words = String::new();
        let mut rest = template;
        while let Some(open) = rest.find('{') {
            let (before, from) = rest.split_at(open);
            words.push_str(before);
            let found = from.find('}').and_then(|close| {
                let name = from.get(1..close)?;
                let (key, fill) = fills.iter().find(|(key, _)| *key == name)?;
                Some((close, *key, fill))
            });
            match found {
                Some((close, key, fill)) => {
                    match fill {
                        Fill::Words(text) => words.push_str(text),
                        Fill::Figure(figure) => {
                            if !words.is_empty() {
                                parts.push(Part::Words(std::mem::take(&mut words)));
                            }
                            parts.push(Part::Figure { key, figure: *figure });
                        }
                    }
                    rest = from.get(close + 1..).unwrap_or_default();
                }
                None => {
                    words.push('{');
                    rest = from.get(1..).unwrap_or_default();
                }
            }
        }
        words.push_str(rest);
        if !words.is_empty() {
            parts.push(Part::Words(words));
        }
        Self(parts)
    }

    /// Its figures with their keys, in order.
    pub fn figures(&self) -> impl Iterator<Item = (&'static str, Figure)> {
        self.0.iter().filter_map(|part| match part {
            Part::Figure { key, figure } => Some((*key, *figure)),
            Part::Words(_) => None,
        })
    }

    /// Another sentence behind this one.
    #[must_use]
    pub fn then(mut self, other: Self) -> Self {
        if !self.0.is_empty() && !other.0.is_empty() {
            self.0.push(Part::Words(" ".to_owned()));
        }
        self.0.extend(other.0);
        self
    }
}

impl From<&str> for Say {
    fn from(words: &str) -> Self {
        Self(vec![Part::Words(words.to_owned())])
    }
}

impl From<String> for Say {
    fn from(words: String) -> Self {
        Self(vec![Part::Words(words)])
    }
}

/// A reason: an id that does not change and a text that may.
#[derive(Debug, Clone, PartialEq)]
pub struct Reason {
    /// The id.
    pub id: &'static str,
    /// The text.
    pub text: Say,
}

impl Reason {
    /// A reason with figures in its text.
    #[must_use]
    pub fn new(id: &'static str, template: &str, fills: &[(&'static str, Fill)]) -> Self {
        Self { id, text: Say::fill(template, fills) }
    }
}
