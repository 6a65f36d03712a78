//! Where a figure or a formula comes from, and how that source was read.
//!
//! Invariant: no table row and no formula of this crate is without a [`Source`].

use serde::{Deserialize, Serialize};

/// How a source was read.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Serialize, Deserialize)]
#[serde(rename_all = "kebab-case")]
#[non_exhaustive]
pub enum Read {
    /// Read in the publication itself, or in a faithful copy of it.
    Publication,
    /// Read where another text quotes it.
    Quoted,
    /// Recalled by the authors, not re-read.
    Memory,
    /// A rule of the trade without a single source.
    CommonPractice,
    /// This project's own judgement, stated as such.
    Judgement,
}

impl Read {
    /// The tag as shown beside a source, `memory` for example.
    #[must_use]
    pub const fn tag(self) -> &'static str {
        match self {
            Self::Publication => "publication",
            Self::Quoted => "quoted",
            Self::Memory => "memory",
            Self::CommonPractice => "common practice",
            Self::Judgement => "judgement",
        }
    }
}

/// A source and how it was read.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub struct Source {
    /// Author or body, title, year, place in it.
    pub cite: &'static str,
    /// How it was read.
    pub read: Read,
}

impl Source {
    /// A source read in the publication or a faithful copy.
    #[must_use]
    pub const fn publication(cite: &'static str) -> Self {
        Self { cite, read: Read::Publication }
    }

    /// A source read where another text quotes it.
    #[must_use]
    pub const fn quoted(cite: &'static str) -> Self {
        Self { cite, read: Read::Quoted }
    }

    /// A source recalled, not re-read.
    #[must_use]
    pub const fn memory(cite: &'static str) -> Self {
        Self { cite, read: Read::Memory }
    }

    /// A rule of the trade without a single source.
    #[must_use]
    pub const fn common_practice(cite: &'static str) -> Self {
        Self { cite, read: Read::CommonPractice }
    }

    /// This project's own judgement.
    #[must_use]
    pub const fn judgement(cite: &'static str) -> Self {
        Self { cite, read: Read::Judgement }
    }
}

impl std::fmt::Display for Source {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "{} [{}]", self.cite, self.read.tag())
    }
}

/// A method of calculation: its usual name and its source. It stands beside the formula it names.
#[derive(Debug, PartialEq, Eq, Hash)]
pub struct Method {
    /// The name the trade knows the method by, with the formula in words where it is short.
    pub name: &'static str,
    /// Where it is published.
    pub source: Source,
}
