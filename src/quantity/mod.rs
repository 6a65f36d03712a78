//! Physical quantities, one type a kind: checked, read from text with a unit, shown with a unit.
//!
//! A pump limit cannot be handed in where a pipe length is wanted. Formulas inside this crate work
//! on plain `f64` and come back through a checked constructor.
//!
//! Invariants: a quantity is finite and inside its range; text without a unit is refused; `nan` and
//! `inf` are refused; gauge pressure, absolute pressure and a pressure difference are three types,
//! as are a temperature and a temperature difference.

mod kinds;
mod number;
mod pressure;
mod units;
mod viscosity;

pub use kinds::{
    AbsolutePressure, Area, Bore, Current, Density, Displacement, Elevation, Flow, GaugePressure,
    HeatLossRate, HeatTransferCoefficient, KINDS, Kind, KinematicViscosity, Length, Mass, Power,
    PressureDifference, Quantity, QuantityError, Rotation, Temperature, TemperatureDifference,
    ThermalConductivity, Thickness, TimeSpan, Velocity, Voltage, Volume, WattDensity,
};
pub use units::{Dimension, Unit, dimensions};
pub use viscosity::{DynamicViscosity, SayboltTime, ViscosityReading};

pub(crate) use number::shown;
