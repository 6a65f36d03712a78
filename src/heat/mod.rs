//! Heat: what a tank loses, what it takes to warm it, what the element may be loaded with.
//!
//! Invariants: colder air, more wind, less time or a higher target never lower the needed power;
//! time and power answers come from one loss curve; a power that the loss eats up on the way has no
//! time.

mod circulation;
mod element;
mod film;
mod policy;
mod soak;
mod supply;
mod tank_loss;
mod warm_up;

pub use circulation::{CIRCULATION, circulation_steady_c, circulation_time_s, mixed_c};
pub use element::{ElementKind, ElementPlace, Rod, WATT_DENSITY, density_cap};
pub use film::{
    OilFilm, PLATE, ROD, WIND, nusselt_plate, nusselt_rod, nusselt_wind, outside, radiation,
};
pub use policy::HeatPolicy;
pub use soak::{LONGEST_CREDIT_H, PARKED, daily_wave, parked_c};
pub use supply::{CIRCUIT, Chosen, Circuit, Wanted, choose};
pub use tank_loss::{COOLDOWN, Exposure, FILMS, GIVEN_U, TankLoss, Walls, cooldown_ua};
pub use warm_up::{HeatCapacity, LossCurve, WARM_UP, WarmUp, cooling_time_s, steady_c};
