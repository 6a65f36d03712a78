//! The heating element: watt density, skin temperature, pads.

use super::film::OilFilm;
use super::policy::HeatPolicy;
use crate::solve;
use crate::source::{Method, Source};
use crate::words::words;

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

/// Skin temperatures.
pub static SKIN: Method = Method {
    name: "lying rod in still oil; properties of the film: the estimate, of the bulk oil: the pessimistic bound",
    source: Source::quoted(
        "S. W. Churchill and H. H. S. Chu, Int. J. Heat Mass Transfer 18 (1975) 1049",
    ),
};

/// A heating rod in oil.
///
/// Viscosity changes a thousandfold across the film of a rod in cold oil, and with it the answer:
/// experiments favour properties near the film temperature, field experience the bulk oil's. Both
/// are given.
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
    ///
    /// # Source
    /// [`SKIN`].
    #[must_use]
    pub fn skin_film(&self, density: f64, oil_c: f64) -> Option<f64> {
        skin(density, oil_c, |skin| self.density_film(skin, oil_c))
    }

    /// The same with properties of the bulk oil: the pessimistic bound.
    ///
    /// # Source
    /// [`SKIN`].
    #[must_use]
    pub fn skin_bulk(&self, density: f64, oil_c: f64) -> Option<f64> {
        let oil = self.oil.state(oil_c);
        skin(density, oil_c, |skin| {
            let difference = skin - oil_c;
            oil.rod(difference, self.diameter) * difference / 1e4
        })
    }

    /// The greatest watt density, W/cm², under a cap: film skin at `hottest_c` oil at most the skin
    /// limit; where the flash point is known, that skin and the bulk bound in `coldest_c` oil at most
    /// flash point less its margin. Zero where a limit is at or under the oil it is judged in.
    ///
    /// # Source
    /// [`WATT_DENSITY`].
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

/// The skin that gives a watt density: heat rises with the skin like a power of its difference to the
/// oil, so the search runs on logarithms, where that is nearly a straight line.
fn skin(density: f64, oil_c: f64, at: impl Fn(f64) -> f64) -> Option<f64> {
    const TOP_C: f64 = 1500.0;
    if density <= 0.0 {
        return Some(oil_c);
    }
    let over = |y: f64| (at(oil_c + y.exp()) / density).ln();
    let y = solve::root(over, 1e-3_f64.ln(), (TOP_C - oil_c).ln(), 1e-7);
    // Under a thousandth of a kelvin there is nothing to find.
    y.map_or_else(|| (at(oil_c + 1e-3) >= density).then_some(oil_c), |y| Some(oil_c + y.exp()))
}

/// Cap on the watt density, W/cm², by the thick edge of the viscosity at the soak, mm²/s (`None`:
/// no number). No element at all belongs in oil at or below its pour point: see
/// [`immersion_allowed`].
///
/// # Source
/// [`WATT_DENSITY`].
#[must_use]
pub fn density_cap(viscosity: Option<f64>, place: ElementPlace, policy: &HeatPolicy) -> f64 {
    match viscosity {
        _ if place == ElementPlace::Circulated => policy.density_circulated,
        Some(nu) if nu < policy.medium_from_mm2_s => policy.density_thin,
        Some(nu) if nu <= policy.thick_from_mm2_s => policy.density_medium,
        _ => policy.density_thick,
    }
}

/// Whether an element may be in the oil at all: not at or below the pour point, where the oil does
/// not convect and a rod of 0.8 W/cm² heats its own skin by some 160 K in five minutes. Temperatures
/// in °C; a pour point that is not known forbids nothing.
#[must_use]
pub fn immersion_allowed(soak_c: f64, pour_c: Option<f64>) -> bool {
    pour_c.is_none_or(|pour| soak_c > pour)
}

/// Greatest electrical power, W, of pads on a flat surface in m².
#[must_use]
pub fn pad_most_w(flat_m2: f64, policy: &HeatPolicy) -> f64 {
    policy.pad_density * flat_m2 * 1e4
}

/// Power into the oil, W, of an electrical power in W.
#[must_use]
pub fn into_oil_w(kind: ElementKind, electrical_w: f64, policy: &HeatPolicy) -> f64 {
    electrical_w * oil_share(kind, policy)
}

/// Electrical power, W, that brings a power in W into the oil.
#[must_use]
pub fn electrical_w(kind: ElementKind, into_oil_w: f64, policy: &HeatPolicy) -> f64 {
    into_oil_w / oil_share(kind, policy)
}

fn oil_share(kind: ElementKind, policy: &HeatPolicy) -> f64 {
    match kind {
        ElementKind::Immersion => 1.0,
        ElementKind::Pad => policy.pad_share,
    }
}
