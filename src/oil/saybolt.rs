//! Kinematic viscosity to and from Saybolt Universal seconds: ASTM D2161.

use crate::solve;
use crate::source::{Method, Source};

/// Saybolt Universal seconds.
pub static D2161: Method = Method {
    name: "ASTM D2161 kinematic viscosity to Saybolt Universal seconds, with its temperature factor",
    source: Source::quoted("ASTM D2161-17; temperature factor from memory"),
};

/// Saybolt Universal seconds of a viscosity in mm²/s, both at a temperature in °F.
///
/// At 100 °F: `4.6324 ν + (1.0 + 0.03264 ν)/((3930.2 + 262.7 ν + 23.97 ν² + 1.646 ν³)·1e-5)`; at
/// t °F times `1 + 0.000061 (t - 100)`. ν from about 1.8 mm²/s up.
///
/// # Source
/// ASTM D2161-17, section 5.
#[must_use]
pub fn seconds(nu: f64, fahrenheit: f64) -> f64 {
    let at_100 = 4.6324 * nu
        + (1.0 + 0.03264 * nu)
            / ((3930.2 + 262.7 * nu + 23.97 * nu * nu + 1.646 * nu * nu * nu) * 1e-5);
    at_100 * (1.0 + 0.000_061 * (fahrenheit - 100.0))
}

/// The viscosity in mm²/s that takes so many Saybolt Universal seconds at a temperature in °F.
///
/// `None` under about 32 s, where the scale ends (1.8 mm²/s).
#[must_use]
pub fn viscosity(seconds_found: f64, fahrenheit: f64) -> Option<f64> {
    solve::root(|nu| seconds(nu, fahrenheit) - seconds_found, 1.8, 1e8, 1e-10)
}
