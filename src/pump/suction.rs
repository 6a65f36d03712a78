//! The suction line: hose, fittings, strainer.

use super::fitting::Fitting;
use crate::quantity::{Bore, Density, Flow, KinematicViscosity, Length, PressureDifference};
use crate::source::{Method, Source};

/// Friction in the hose.
pub static CHURCHILL_1977: Method = Method {
    name: "Churchill friction factor for all flow regimes",
    source: Source::quoted("S. W. Churchill, Chemical Engineering 84 (1977) 24, p. 91"),
};

/// Strainer.
pub static STRAINER: Method = Method {
    name: "strainer loss in proportion to viscosity, density and flow, capped by its bypass",
    source: Source::judgement("Darcy flow through the mesh"),
};

/// The figures of the line that are judgement.
#[derive(Debug, Clone, PartialEq)]
pub struct InletPolicy {
    /// Roughness of hose and pipe, mm.
    pub roughness_mm: f64,
    /// Kinetic energy factor of the velocity head: 2 is laminar, the safe side throughout.
    pub velocity_factor: f64,
    /// A bypass holds the strainer loss to so many times its cracking pressure.
    pub bypass_overshoot: f64,
}

impl Default for InletPolicy {
    fn default() -> Self {
        Self { roughness_mm: 0.01, velocity_factor: 2.0, bypass_overshoot: 1.5 }
    }
}

/// A suction strainer as its data give it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Strainer {
    /// Loss when clean.
    pub loss: PressureDifference,
    /// At this flow.
    pub at_flow: Flow,
    /// At this viscosity.
    pub at_viscosity: KinematicViscosity,
    /// At this density.
    pub at_density: Density,
    /// Pressure at which a bypass opens.
    pub bypass: Option<PressureDifference>,
}

/// A suction line, ready for the balance. Lengths in m, pressures in Pa.
#[derive(Debug, Clone, PartialEq)]
pub struct SuctionLine {
    pub(super) bore: f64,
    pub(super) area: f64,
    pub(super) length: f64,
    pub(super) head: f64,
    /// Roughness over bore.
    pub(super) roughness: f64,
    /// Sum of K1, entrance included.
    pub(super) k1: f64,
    /// Sum of K∞ with its size factor, entrance included.
    pub(super) kinf: f64,
    pub(super) velocity_factor: f64,
    /// Pa per (m²/s · kg/m³ · m³/s).
    pub(super) strainer: f64,
    pub(super) strainer_most: f64,
}

/// Flush entrance from the tank, 160/Re + 0.5. Hooper 1981 (memory).
const ENTRANCE: (f64, f64) = (160.0, 0.5);

impl SuctionLine {
    /// From its measures. The entrance from the tank is always counted.
    #[must_use]
    pub fn new(
        bore: Bore,
        length: Length,
        oil_above_pump: Length,
        fittings: &[(&Fitting, u32)],
        strainer: Option<Strainer>,
        policy: &InletPolicy,
    ) -> Self {
        let d = bore.as_mm() / 1000.0;
        let inches = bore.as_mm() / 25.4;
        let (mut k1, mut kinf) = ENTRANCE;
        for (fitting, count) in fittings {
            k1 += f64::from(*count) * fitting.k1();
            kinf += f64::from(*count) * fitting.kinf() * (1.0 + 1.0 / inches);
        }
        let per_flow = strainer.map_or(0.0, |s| {
            s.loss.as_kpa() * 1000.0
                / (s.at_viscosity.as_mm2_per_s()
                    * 1e-6
                    * s.at_density.as_kg_per_m3()
                    * s.at_flow.as_litres_per_min()
                    / 60_000.0)
        });
        let most = strainer
            .and_then(|s| s.bypass)
            .map_or(f64::INFINITY, |bypass| policy.bypass_overshoot * bypass.as_kpa() * 1000.0);
        Self {
            bore: d,
            area: std::f64::consts::FRAC_PI_4 * d * d,
            length: length.as_m(),
            head: oil_above_pump.as_m(),
            roughness: policy.roughness_mm / bore.as_mm(),
            k1,
            kinf,
            velocity_factor: policy.velocity_factor,
            strainer: per_flow,
            strainer_most: most,
        }
    }

    /// A strainer sits in it.
    #[must_use]
    pub fn has_strainer(&self) -> bool {
        self.strainer > 0.0
    }

    /// Relative roughness 0.005 and less: the friction factor stays under 0.051 over Re 2000.
    #[must_use]
    pub fn is_smooth(&self) -> bool {
        self.roughness <= 0.005
    }

    /// Inside diameter, m.
    #[must_use]
    pub const fn bore_m(&self) -> f64 {
        self.bore
    }

    /// Length, m.
    #[must_use]
    pub const fn length_m(&self) -> f64 {
        self.length
    }

    /// Height of the oil over the pump, m.
    #[must_use]
    pub const fn head_m(&self) -> f64 {
        self.head
    }

    /// Flow area, m².
    #[must_use]
    pub const fn area_m2(&self) -> f64 {
        self.area
    }
}

/// The Darcy friction factor at a Reynolds number and a relative roughness, for all flow regimes.
///
/// `f = 8 [(8/Re)^12 + (A + B)^-1.5]^(1/12)`, `A = [2.457 ln(1/((7/Re)^0.9 + 0.27 ε/D))]^16`,
/// `B = (37530/Re)^16`.
///
/// # Source
/// S. W. Churchill, Chemical Engineering 84 (1977) 24, p. 91.
#[must_use]
pub fn friction_factor(re: f64, roughness: f64) -> f64 {
    // Under 800 the other term is below 1e-15 of the laminar one.
    if re < 800.0 {
        return 64.0 / re;
    }
    let sixteenth = |x: f64| {
        let x2 = x * x;
        let x4 = x2 * x2;
        let x8 = x4 * x4;
        x8 * x8
    };
    let a = sixteenth(2.457 * (1.0 / ((7.0 / re).powf(0.9) + 0.27 * roughness)).ln());
    let b = sixteenth(37_530.0 / re);
    let laminar = {
        let x = 8.0 / re;
        let x2 = x * x;
        let x4 = x2 * x2;
        x4 * x4 * x4
    };
    let sum = a + b;
    8.0 * (laminar + 1.0 / (sum * sum.sqrt())).powf(1.0 / 12.0)
}
