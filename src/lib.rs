//! Cold-start advice for hydraulic machines.

pub mod air;
pub mod heat;
pub mod oil;
pub mod pump;
pub mod quantity;
mod solve;
pub mod source;
