//! Quantities: every unit recomputed with another library, what people type, what is refused.

mod messages;
mod properties;
mod reading;
mod units;
