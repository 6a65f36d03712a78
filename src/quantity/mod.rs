//! Physical quantities, one type a kind: checked, read from text with a unit, shown with a unit.
//!
//! A pump limit cannot be handed in where a pipe length is wanted. Formulas inside this crate work
//! on plain `f64` and come back through a checked constructor.
//!
//! Invariants: a quantity is finite and inside its range; text without a unit is refused; `nan` and
//! `inf` are refused; gauge pressure, absolute pressure and a pressure difference are three types,
//! as are a temperature and a temperature difference. What is unclear is refused, and every message
//! says what to type.
//!
//! ```
//! use coldsump::quantity::{AbsolutePressure, Bore, Quantity, Temperature, TimeSpan};
//!
//! assert_eq!("−38,5 degC".parse::<Temperature>()?.as_celsius(), -38.5);
//! assert_eq!("1-1/4 in".parse::<Bore>()?.as_mm(), 31.75);
//! assert_eq!("4 h 30 min".parse::<TimeSpan>()?.as_hours(), 4.5);
//! let limit: AbsolutePressure = "5 inHg vacuum".parse()?;
//! assert_eq!(limit.to_string(), "84.3931 kPa");
//! assert!(limit.in_unit("psi").is_some_and(|psi| (psi - 12.24).abs() < 0.01));
//!
//! let error = "-38".parse::<Temperature>().unwrap_err();
//! assert_eq!(error.to_string(), "`-38` has no unit; write for example `-38 °C`");
//! # Ok::<(), coldsump::quantity::QuantityError>(())
//! ```

mod error;
mod kinds;
mod number;
mod pressure;
mod read;
mod spelling;
mod units;
mod viscosity;

pub use error::QuantityError;
pub use kinds::{
    AbsolutePressure, Area, Bore, Current, Density, Displacement, Elevation, Flow, GaugePressure,
    HeatLossRate, HeatTransferCoefficient, KINDS, Kind, KinematicViscosity, Length, Mass, Power,
    PressureDifference, Quantity, Rotation, Temperature, TemperatureDifference,
    ThermalConductivity, Thickness, TimeSpan, Velocity, Voltage, Volume, WattDensity,
};
pub use units::{Dimension, Unit, dimensions};
pub use viscosity::{DynamicViscosity, SayboltTime, ViscosityReading};

pub(crate) use number::shown;
