//! Heat transfer coefficients of surfaces in air and oil.
//!
//! Letters as in the papers: Nu, Ra, Pr, Re; SI units.

use crate::air::Air;
use crate::oil::{Bulk, ViscosityCurve};
use crate::pump::GRAVITY;
use crate::source::{Method, Source};

/// Still oil or air at an upright wall.
pub static PLATE: Method = Method {
    name: "natural convection at an upright plate",
    source: Source::quoted(
        "S. W. Churchill and H. H. S. Chu, Int. J. Heat Mass Transfer 18 (1975) 1323",
    ),
};

/// Still oil round a lying rod.
pub static ROD: Method = Method {
    name: "natural convection round a lying cylinder, properties at the film temperature",
    source: Source::quoted(
        "S. W. Churchill and H. H. S. Chu, Int. J. Heat Mass Transfer 18 (1975) 1049",
    ),
};

/// Wind along the tank.
pub static WIND: Method = Method {
    name: "turbulent flat plate from the leading edge, Nu = 0.037 Re^0.8 Pr^(1/3)",
    source: Source::memory(
        "F. P. Incropera et al., Fundamentals of Heat and Mass Transfer, chapter 7",
    ),
};

/// Stefan-Boltzmann constant, W/(m²·K⁴). CODATA 2018.
const SIGMA: f64 = 5.670_374_419e-8;
const ZERO_C: f64 = 273.15;

/// Nusselt number of an upright plate, Ra to 1e12. Churchill and Chu 1975, p. 1323.
#[must_use]
pub fn nusselt_plate(ra: f64, pr: f64) -> f64 {
    let shape = (1.0 + (0.492 / pr).powf(9.0 / 16.0)).powf(8.0 / 27.0);
    let root = 0.825 + 0.387 * ra.powf(1.0 / 6.0) / shape;
    root * root
}

/// Nusselt number of a lying cylinder, Ra 1e-5 to 1e12. Churchill and Chu 1975, p. 1049.
#[must_use]
pub fn nusselt_rod(ra: f64, pr: f64) -> f64 {
    let shape = (1.0 + (0.559 / pr).powf(9.0 / 16.0)).powf(8.0 / 27.0);
    let root = 0.60 + 0.387 * ra.powf(1.0 / 6.0) / shape;
    root * root
}

/// Nusselt number of a flat plate in turbulent flow from the edge on. Incropera, chapter 7.
#[must_use]
pub fn nusselt_wind(re: f64, pr: f64) -> f64 {
    0.037 * re.powf(0.8) * pr.cbrt()
}

/// Radiation coefficient, W/(m²·K), between a surface and surroundings in °C.
///
/// `h = ε σ (Ts² + Ta²)(Ts + Ta)`.
#[must_use]
pub fn radiation(emissivity: f64, surface_c: f64, air_c: f64) -> f64 {
    let (ts, ta) = (surface_c + ZERO_C, air_c + ZERO_C);
    emissivity * SIGMA * (ts * ts + ta * ta) * (ts + ta)
}

/// Outside coefficient of a tank wall, W/(m²·K): wind and natural convection blended (third powers
/// add), and radiation. Temperatures in °C, wind in m/s, lengths in m.
#[must_use]
pub fn outside(
    surface_c: f64,
    air_c: f64,
    wind: f64,
    height: f64,
    length: f64,
    emissivity: f64,
) -> f64 {
    let air = Air::at(f64::midpoint(surface_c, air_c));
    let nu = air.kinematic_viscosity;
    let diffusivity = nu / air.prandtl;
    let ra =
        GRAVITY * air.expansion * (surface_c - air_c).abs() * height.powi(3) / (nu * diffusivity);
    let natural = nusselt_plate(ra, air.prandtl) * air.conductivity / height;
    let convection = if wind > 0.0 {
        let forced = nusselt_wind(wind * length / nu, air.prandtl) * air.conductivity / length;
        (forced * forced * forced + natural * natural * natural).cbrt()
    } else {
        natural
    };
    convection + radiation(emissivity, surface_c, air_c)
}

/// Oil for film formulas: expected viscosity and bulk properties at any temperature. Below the pour
/// point a gel loses less heat than the formula says, which is the safe side.
#[derive(Debug, Clone, Copy)]
pub struct OilFilm<'a> {
    /// The D341 curve.
    pub curve: &'a ViscosityCurve,
    /// Bulk properties.
    pub bulk: &'a Bulk,
}

impl OilFilm<'_> {
    /// (Ra per length³ and kelvin, Pr, conductivity) at a temperature in °C.
    fn properties(&self, celsius: f64) -> (f64, f64, f64) {
        let nu = self.curve.at(celsius) * 1e-6;
        let k = self.bulk.conductivity(celsius);
        let diffusivity = k / (self.bulk.density(celsius) * self.bulk.specific_heat(celsius));
        let ra = GRAVITY * self.bulk.expansion(celsius) / (nu * diffusivity);
        (ra, nu / diffusivity, k)
    }

    /// Coefficient at an upright wall, W/(m²·K), properties at the film temperature.
    #[must_use]
    pub fn wall(&self, oil_c: f64, wall_c: f64, height: f64) -> f64 {
        let (ra, pr, k) = self.properties(f64::midpoint(oil_c, wall_c));
        nusselt_plate(ra * (oil_c - wall_c).abs() * height.powi(3), pr) * k / height
    }

    /// Coefficient round a lying rod, W/(m²·K), properties at `at_c`.
    #[must_use]
    pub fn rod(&self, at_c: f64, difference_k: f64, diameter: f64) -> f64 {
        let (ra, pr, k) = self.properties(at_c);
        nusselt_rod(ra * difference_k * diameter.powi(3), pr) * k / diameter
    }
}
