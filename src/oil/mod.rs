//! The oil: viscosity over temperature with its likely range, bulk properties, built-in classes.
//!
//! Invariants: no oil without a curve that falls on warming; no number at the pump below the pour
//! point + 5 K unless it was measured.

mod band;
mod bulk;
mod class;
mod data;
pub mod grade;
pub mod saybolt;
mod viscosity_index;
mod walther;

pub use band::{Band, BandPolicy, Base, ColdLimit, LIKELY_RANGE, Reach};
pub use bulk::{Bulk, CONDUCTIVITY, DENSITY, SPECIFIC_HEAT};
pub use class::{Class, typical_flash};
pub use data::{ClassGiven, Estimate, Oil, OilData, OilError};
pub use viscosity_index::{D2270, reference_oils, reported, viscosity_at_100, viscosity_index};
pub use walther::{CurveError, D341, Line, VALID, ViscosityCurve, nu, z};
