//! The site's cold: climate files, and what a case may ask of them.
//!
//! Invariants: a value of a site carries how it was got; what a file does not hold is "not known",
//! never filled from something near; lag of the daily wave is read from an hourly day alone.

mod built_in;
pub mod extremes;
pub mod months;
pub mod records;
mod regime;
mod site;
pub mod tally;
mod wish;

pub use built_in::{BuiltIn, Sites};
pub use regime::Regime;
pub use site::{
    Below, ColdDay, Kind, Minima, Monthly, OnceIn, Place, Reading, Site, SiteError, Spell, Wind,
    WinterMinimum,
};
pub use wish::{Found, How, Wish};
