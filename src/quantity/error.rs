//! Why a text or number is not the quantity it should be: one message each, saying what to type.

/// Why a text or number is not the quantity it should be.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum QuantityError {
    /// Nothing was typed.
    #[error("nothing is given; write for example `{example}`")]
    Empty {
        /// What could be typed.
        example: String,
    },
    /// No number at the front, or more than one.
    #[error("`{text}` is not a number with a unit; write for example `{example}`")]
    NoNumber {
        /// What was found.
        text: String,
        /// What could be typed.
        example: String,
    },
    /// `nan`, `inf` or too large to hold.
    #[error("`{text}` is not a finite number; write for example `{example}`")]
    NotFinite {
        /// What was found.
        text: String,
        /// What could be typed.
        example: String,
    },
    /// A comma that can be a decimal comma or a thousands mark.
    #[error(
        "`{text}` can be read in two ways; write `{}` or `{}`",
        .text.replacen(',', "", 1), .text.replacen(',', ".", 1)
    )]
    AmbiguousComma {
        /// What was found.
        text: String,
    },
    /// Several numbers that do not make one, `4 h 30` or `1:30 h`.
    #[error("`{text}` is unclear; write for example `{example}`")]
    Unclear {
        /// What was found.
        text: String,
        /// What could be typed.
        example: String,
    },
    /// A number without a unit.
    #[error("`{text}` has no unit; write for example `{example}`")]
    NoUnit {
        /// What was found.
        text: String,
        /// The same number with a unit.
        example: String,
    },
    /// A unit this kind does not have.
    #[error("`{unit}` is not a unit of {noun}; write for example `{example}` (units: {known})")]
    UnknownUnit {
        /// The unit found.
        unit: String,
        /// The kind.
        noun: &'static str,
        /// What could be typed.
        example: String,
        /// The units known, joined.
        known: String,
    },
    /// A unit of another kind.
    #[error(
        "`{unit}` is a unit of {of}, but {} {noun} is needed; write for example `{example}`",
        article(.noun)
    )]
    WrongKind {
        /// The unit found.
        unit: String,
        /// What it is a unit of.
        of: &'static str,
        /// The kind needed.
        noun: &'static str,
        /// What could be typed.
        example: String,
    },
    /// Outside what the kind allows.
    #[error("{noun} must be between {least} and {greatest} {unit}, but is {found}")]
    OutOfRange {
        /// The kind.
        noun: &'static str,
        /// Least value.
        least: String,
        /// Greatest value.
        greatest: String,
        /// Unit of the range.
        unit: &'static str,
        /// What was found, as typed or with its unit.
        found: String,
    },
    /// A pressure on the wrong side of the atmosphere.
    #[error("{0}")]
    WrongPressure(String),
    /// A viscosity given with a temperature that cannot be read.
    #[error("{0}")]
    Viscosity(String),
}

fn article(noun: &str) -> &'static str {
    if noun.starts_with(['a', 'e', 'i', 'o']) { "an" } else { "a" }
}
