//! The oil: viscosity over temperature with its likely range, bulk properties, built-in classes.

pub mod bulk;
pub mod walther;

pub use bulk::Bulk;
pub use walther::{CurveError, ViscosityCurve};
