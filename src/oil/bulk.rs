//! Density, expansion, specific heat and thermal conductivity of a hydraulic oil.

use crate::quantity::Density;
use crate::source::{Method, Source};

/// Density over temperature.
pub static DENSITY: Method = Method {
    name: "lubricating-oil group expansion from 15 °C, α = 0.6278/ρ15",
    source: Source::quoted(
        "ASTM D1250 / API MPMS chapter 11.1, lubricating-oil group (K0 = 0, K1 = 0.6278)",
    ),
};

/// Specific heat.
pub static SPECIFIC_HEAT: Method = Method {
    name: "Cragoe, c = (1684.8 + 3.3913 t)/√d",
    source: Source::quoted("C. S. Cragoe, NBS Miscellaneous Publication 97 (1929), section VII"),
};

/// Thermal conductivity.
pub static CONDUCTIVITY: Method = Method {
    name: "Cragoe, k = 0.11726 (1 - 0.00054 t)/d",
    source: Source::memory("C. S. Cragoe, NBS Miscellaneous Publication 97 (1929), section VI"),
};

/// K1 of the lubricating-oil group, kg/m³ per K.
const K1: f64 = 0.6278;
/// Density of water at 60 °F, kg/m³.
const WATER_60F: f64 = 999.016;

/// Bulk properties that follow from the density at 15 °C.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Bulk {
    rho15: f64,
    /// d, specific gravity 60/60 °F.
    d: f64,
    sqrt_d: f64,
}

impl Bulk {
    /// From the density at 15 °C.
    #[must_use]
    pub fn from_density_15(density: Density) -> Self {
        let rho15 = density.as_kg_per_m3();
        let d = rho15 / WATER_60F;
        Self { rho15, d, sqrt_d: d.sqrt() }
    }

    /// Density at 15 °C, kg/m³.
    #[must_use]
    pub const fn density_15(&self) -> f64 {
        self.rho15
    }

    /// Specific gravity 60/60 °F; the change of density from 15 °C to 60 °F, 0.04 %, is left out.
    #[must_use]
    pub const fn specific_gravity(&self) -> f64 {
        self.d
    }

    /// Density at a temperature in °C, kg/m³.
    ///
    /// `ρ = ρ15 exp(-α Δ (1 + 0.8 α Δ))`, Δ = t - 15 °C.
    ///
    /// # Source
    /// ASTM D1250 / API MPMS 11.1, lubricating-oil group.
    #[must_use]
    pub fn density(&self, celsius: f64) -> f64 {
        density_at(self.rho15, celsius)
    }

    /// Thermal expansion at a temperature in °C, 1/K: `β = α (1 + 1.6 α Δ)`.
    #[must_use]
    pub fn expansion(&self, celsius: f64) -> f64 {
        let alpha = K1 / self.rho15;
        alpha * (1.0 + 1.6 * alpha * (celsius - 15.0))
    }

    /// Specific heat at a temperature in °C, J/(kg·K). Stated for about -18 to 200 °C; below that
    /// it is a straight extension, 4 % per 20 K.
    ///
    /// # Source
    /// Cragoe, NBS Miscellaneous Publication 97 (1929).
    #[must_use]
    pub fn specific_heat(&self, celsius: f64) -> f64 {
        (1684.8 + 3.3913 * celsius) / self.sqrt_d
    }

    /// Thermal conductivity at a temperature in °C, W/(m·K). Good to about 10 %.
    ///
    /// # Source
    /// Cragoe, NBS Miscellaneous Publication 97 (1929).
    #[must_use]
    pub fn conductivity(&self, celsius: f64) -> f64 {
        0.11726 / self.d * (1.0 - 0.00054 * celsius)
    }
}

fn density_at(rho15: f64, celsius: f64) -> f64 {
    let x = K1 / rho15 * (celsius - 15.0);
    rho15 * (-x * (1.0 + 0.8 * x)).exp()
}
