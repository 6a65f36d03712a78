//! Heat: what a tank loses, what it takes to warm it, what the element may be loaded with.
//!
//! Invariants: less time or a higher target never lower the needed power, nor do colder air or more
//! wind down to -60 °C and 12 m/s at the tank (beyond, the oil film at a bare wall sets and the
//! correlation has it take up to 4 % less); time and power answers come from one loss curve; a power
//! that the loss eats up on the way has no time.

mod circulation;
mod element;
mod film;
mod loss_curve;
mod mixing;
mod policy;
mod soak;
mod supply;
mod tank_loss;
mod warm_up;

pub use circulation::{CIRCULATION, circulation_heat_w, circulation_steady_c, circulation_time_s};
pub use element::{
    ElementKind, ElementPlace, Rod, SKIN, WATT_DENSITY, density_cap, electrical_w,
    immersion_allowed, into_oil_w, pad_most_w,
};
pub use film::{
    BLEND, OilFilm, PLATE, RADIATION, ROD, WIND, nusselt_plate, nusselt_rod, nusselt_wind, outside,
    radiation, still_air, wind,
};
pub use loss_curve::LossCurve;
pub use mixing::{TARGET, mean_target_c, mixed_c};
pub use policy::HeatPolicy;
pub use soak::{LONGEST_CREDIT_H, PARKED, cooled_c, daily_wave, hourly, parked_c};
pub use supply::{CIRCUIT, Chosen, Circuit, Wanted, choose, delivered_share};
pub use tank_loss::{COOLDOWN, Exposure, FILMS, GIVEN_U, TankLoss, Walls, cooldown_ua};
pub use warm_up::{HeatCapacity, WARM_UP, WarmUp, cooling_time_s, steady_c};
