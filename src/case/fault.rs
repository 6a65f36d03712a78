//! What is wrong with a case file, and where.

/// Where a value stands.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
pub enum Place {
    /// In a file or text of this name; line and column count from 1.
    At {
        /// Name of the file as the caller gave it.
        name: String,
        /// Line, from 1.
        line: usize,
        /// Column in characters, from 1.
        column: usize,
    },
    /// In the file as a whole: a key is missing.
    Whole {
        /// Name of the file.
        name: String,
    },
    /// Set over the file by key and text; `how` is the way it is typed, `--set` for example.
    Set,
}

impl std::fmt::Display for Place {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        match self {
            Self::At { name, line, column } => write!(f, "{name}:{line}:{column}"),
            Self::Whole { name } => f.write_str(name),
            Self::Set => f.write_str("--set"),
        }
    }
}

/// One thing wrong: place, key, what was found and what would be right.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("{place}: {key}: {message}")]
pub struct Fault {
    /// Where.
    pub place: Place,
    /// Which key.
    pub key: String,
    /// What was found and what would be right.
    pub message: String,
}

/// All that is wrong with a case file, in file order.
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub struct Faults(pub Vec<Fault>);

impl std::error::Error for Faults {}

impl std::fmt::Display for Faults {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        for (at, fault) in self.0.iter().enumerate() {
            if at > 0 {
                f.write_str("\n")?;
            }
            write!(f, "{fault}")?;
        }
        Ok(())
    }
}
