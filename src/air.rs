//! The atmosphere over the site, and dry air round the tank.

use crate::source::{Method, Source};

/// Local atmosphere.
pub static ATMOSPHERE: Method = Method {
    name: "standard atmosphere at the geopotential height of the site",
    source: Source::quoted(
        "ISO 2533:1975, troposphere; equal to the US Standard Atmosphere 1976 there",
    ),
};

/// Dry air.
pub static DRY_AIR: Method = Method {
    name: "ideal gas, Sutherland viscosity, US Standard Atmosphere conductivity",
    source: Source::memory("US Standard Atmosphere 1976, part 1"),
};

/// Pressure of the standard atmosphere, kPa, at a geometric height in m (-430 to 9000).
///
/// `p = 101.325 ((288.15 - 0.0065 h)/288.15)^5.25588`, h the geopotential height.
///
/// # Source
/// ISO 2533:1975.
#[must_use]
pub fn atmosphere_kpa(elevation_m: f64) -> f64 {
    const EARTH_M: f64 = 6_356_766.0;
    let h = EARTH_M * elevation_m / (EARTH_M + elevation_m);
    101.325 * ((288.15 - 0.0065 * h) / 288.15).powf(5.255_88)
}

/// Dry air at 101.325 kPa.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Air {
    /// Density, kg/m³.
    pub density: f64,
    /// Kinematic viscosity, m²/s.
    pub kinematic_viscosity: f64,
    /// Thermal conductivity, W/(m·K).
    pub conductivity: f64,
    /// Prandtl number.
    pub prandtl: f64,
    /// Thermal expansion, 1/K.
    pub expansion: f64,
}

impl Air {
    /// At a temperature in °C, about -90 to 200.
    ///
    /// # Source
    /// US Standard Atmosphere 1976 (memory): within 0.3 % (viscosity) and 1.1 % (conductivity) of a
    /// reference equation of state at -10 °C; over the whole range within 1.3 % and 2.5 %, the Prandtl
    /// number within 4.1 %.
    #[must_use]
    pub fn at(celsius: f64) -> Self {
        let t = celsius + 273.15;
        let root = t.sqrt() * t;
        let density = 101_325.0 / (287.055 * t);
        let mu = 1.458e-6 * root / (t + 110.4);
        let conductivity = 2.646_38e-3 * root / (t + 245.4 * 10_f64.powf(-12.0 / t));
        Self {
            density,
            kinematic_viscosity: mu / density,
            conductivity,
            prandtl: mu * 1006.0 / conductivity,
            expansion: 1.0 / t,
        }
    }
}
