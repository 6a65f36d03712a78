//! Cold-start advice for hydraulic machines.

pub mod advice;
pub mod air;
pub mod case;
pub mod heat;
pub mod oil;
pub mod pump;
pub mod quantity;
#[cfg(feature = "cli")]
pub mod report;
mod solve;
pub mod source;
