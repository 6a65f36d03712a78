//! The heating element: watt density, skin temperature, pads.

use super::film::OilFilm;
use super::policy::HeatPolicy;
use crate::pump::words;
use crate::solve;
use crate::source::{Method, Source};

words! {
    /// Heater in the oil, or a pad on the outside.
    ElementKind: "kind of element" {
        Immersion = "immersion",
        Pad = "pad",
    }
}

words! {
    /// Where an element sits against the suction pick-up.
    ElementPlace: "place of an element" {
        BelowSuction = "below-suction",
        AboveSuction = "above-suction",
        Circulated = "circulated",
    }
}

/// Greatest watt density.
pub static WATT_DENSITY: Method = Method {
    name: "cap by viscosity, skin at most 120 °C (film) and flash point - 30 K (film and bulk bound)",
    source: Source::common_practice(
        "0.6 to 1.2 W/cm² in still hydraulic oil; Machinery Lubrication, Nov-Dec 2016, p. 47: 10 W/in² still, 15 W/in² circulated",
    ),
};

/// A heating rod in oil.
#[derive(Debug, Clone, Copy)]
pub struct Rod<'a> {
    /// The oil round it.
    pub oil: OilFilm<'a>,
    /// Diameter, m.
    pub diameter: f64,
}

impl Rod<'_> {
    /// Watt density, W/cm², that holds the skin at a temperature in still oil, both in °C, with
    /// properties at the film temperature: the estimate. Zero where the skin is no hotter.
    #[must_use]
    pub fn density_film(&self, skin_c: f64, oil_c: f64) -> f64 {
        let difference = (skin_c - oil_c).max(0.0);
        self.oil.rod(f64::midpoint(skin_c, oil_c), difference, self.diameter) * difference / 1e4
    }

    /// The same with properties of the bulk oil: the pessimistic bound.
    #[must_use]
    pub fn density_bulk(&self, skin_c: f64, oil_c: f64) -> f64 {
        let difference = (skin_c - oil_c).max(0.0);
        self.oil.rod(oil_c, difference, self.diameter) * difference / 1e4
    }

    /// Skin temperature, °C, at a watt density in W/cm² in oil of a temperature in °C: the estimate.
    /// `None` over 1500 °C, where nothing here holds.
    #[must_use]
    pub fn skin_film(&self, density: f64, oil_c: f64) -> Option<f64> {
        solve::root(|skin| self.density_film(skin, oil_c) - density, oil_c, 1500.0, 1e-4)
    }

    /// The same with properties of the bulk oil: the pessimistic bound.
    #[must_use]
    pub fn skin_bulk(&self, density: f64, oil_c: f64) -> Option<f64> {
        solve::root(|skin| self.density_bulk(skin, oil_c) - density, oil_c, 1500.0, 1e-4)
    }

    /// The greatest watt density, W/cm², under a cap: film skin at `hottest_c` oil at most the skin
    /// limit; where the flash point is known, that skin and the bulk bound in `coldest_c` oil at most
    /// flash point less its margin.
    #[must_use]
    pub fn greatest_density(
        &self,
        cap: f64,
        hottest_c: f64,
        coldest_c: f64,
        flash_c: Option<f64>,
        policy: &HeatPolicy,
    ) -> f64 {
        let mut density = cap.min(self.density_film(policy.skin_max_c, hottest_c));
        if let Some(flash) = flash_c {
            let most = flash - policy.flash_margin_k;
            density = density
                .min(self.density_film(most, hottest_c))
                .min(self.density_bulk(most, coldest_c));
        }
        density
    }
}

/// Cap on the watt density, W/cm², by the thick edge of the viscosity at the soak, mm²/s (`None`:
/// no number).
#[must_use]
pub fn density_cap(viscosity: Option<f64>, place: ElementPlace, policy: &HeatPolicy) -> f64 {
    match viscosity {
        _ if place == ElementPlace::Circulated => policy.density_circulated,
        Some(nu) if nu < policy.medium_from_mm2_s => policy.density_thin,
        Some(nu) if nu <= policy.thick_from_mm2_s => policy.density_medium,
        _ => policy.density_thick,
    }
}
