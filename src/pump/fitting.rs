//! Losses of fittings: the 2-K method.

use crate::source::{Method, Read, Source};
use serde::Deserialize;
use std::sync::LazyLock;

/// Losses of fittings.
pub static TWO_K: Method = Method {
    name: "2-K method, K = K1/Re + K∞ (1 + 1/D in inches); flush entrance 160/Re + 0.5",
    source: Source::quoted("W. B. Hooper, Chemical Engineering, 24 August 1981, p. 97"),
};

/// One kind of fitting.
#[derive(Debug, Clone, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Fitting {
    id: String,
    k1: f64,
    kinf: f64,
    source: String,
    read: Read,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Table {
    fitting: Vec<Fitting>,
}

static TABLE: LazyLock<Vec<Fitting>> = LazyLock::new(|| {
    toml::from_str::<Table>(include_str!("fittings.toml"))
        .map(|table| table.fitting)
        .unwrap_or_default()
});

impl Fitting {
    /// All fittings.
    #[must_use]
    pub fn all() -> &'static [Self] {
        &TABLE
    }

    /// The fitting of an id.
    #[must_use]
    pub fn named(id: &str) -> Option<&'static Self> {
        TABLE.iter().find(|fitting| fitting.id == id)
    }

    /// Its id in a case file.
    #[must_use]
    pub fn id(&self) -> &str {
        &self.id
    }

    /// K1, the share that falls with the Reynolds number.
    #[must_use]
    pub const fn k1(&self) -> f64 {
        self.k1
    }

    /// K∞, at high Reynolds numbers and a large bore.
    #[must_use]
    pub const fn kinf(&self) -> f64 {
        self.kinf
    }

    /// Where the row comes from and how it was read.
    #[must_use]
    pub fn source(&self) -> (&str, Read) {
        (&self.source, self.read)
    }
}
