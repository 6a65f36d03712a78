//! What the limits of one oil need, worked out once.

use super::limits::Edge;
use crate::air;
use crate::case::Case;
use crate::oil::{Bulk, Oil};
use crate::pump::Inlet;

/// One oil in one case, with what every limit asks for.
pub struct Setup<'a> {
    /// The case.
    pub case: &'a Case,
    /// The oil.
    pub oil: &'a Oil,
    /// Bulk properties of the oil.
    pub bulk: &'a Bulk,
    /// Local atmosphere, kPa.
    pub atmosphere_kpa: f64,
    /// The suction line with the tank pressure, where both line and displacement are given.
    pub inlet: Option<Inlet>,
    /// Flow per speed, m³/s per rpm; 0 where the displacement is not given.
    pub flow_per_rpm: f64,
    /// Temperature of pump, hoses and lines at shift start, °C.
    pub soak_c: f64,
    /// Air round the tank while it is heated, °C.
    pub air_c: f64,
    /// Coldest temperature searched, °C.
    pub bottom_c: f64,
}

impl<'a> Setup<'a> {
    /// Works it out.
    #[must_use]
    pub fn new(case: &'a Case, oil: &'a Oil) -> Self {
        let policy = &case.policy.limits;
        let atmosphere_kpa = air::atmosphere_kpa(case.site.elevation.as_m());
        let gauge = case.reservoir.gauge_pressure.map_or(0.0, |pressure| pressure.as_kpa());
        let displacement = case.pump.displacement.map(|displacement| displacement.as_cm3());
        let inlet = match (&case.suction, displacement) {
            (Some(line), Some(_)) => Some(Inlet::new(line.clone(), atmosphere_kpa + gauge)),
            _ => None,
        };
        let sky = if case.site.clear_sky { policy.clear_sky_k } else { 0.0 };
        let bottom_c = oil.pour_point().map_or(policy.search_from_c, |pour| {
            (pour.as_celsius() + case.policy.oil.no_number_below_k).max(policy.search_from_c)
        });
        Self {
            case,
            oil,
            bulk: oil.bulk(),
            atmosphere_kpa,
            inlet,
            flow_per_rpm: displacement.map_or(0.0, |cm3| cm3 * 1e-6 / 60.0),
            soak_c: case.site.minimum.as_celsius() - sky,
            air_c: case.site.heating.as_celsius() - sky,
            bottom_c,
        }
    }

    /// Viscosity on one edge of the likely range, mm²/s.
    #[must_use]
    pub fn viscosity(&self, edge: Edge, celsius: f64) -> f64 {
        match edge {
            Edge::Thick => self.oil.high(celsius),
            Edge::Expected => self.oil.expected(celsius),
        }
    }

    /// Inlet pressure at a speed and temperature, kPa absolute; `None` where the line is not known.
    #[must_use]
    pub fn inlet_kpa(&self, edge: Edge, rpm: f64, celsius: f64) -> Option<f64> {
        let inlet = self.inlet.as_ref()?;
        Some(inlet.pressure_kpa(
            self.flow_per_rpm * rpm,
            self.viscosity(edge, celsius),
            self.bulk.density(celsius),
        ))
    }

    /// The floor of the gel in hoses and pilot lines, °C; `None` where the pour point is not known.
    #[must_use]
    pub fn line_floor_c(&self) -> Option<f64> {
        let policy = &self.case.policy.limits;
        let least = self.oil.pour_point()?.as_celsius() + policy.line_margin_k;
        Some(if self.stands_too_long() { least.max(policy.standing_line_c) } else { least })
    }

    /// The floor of the pour margin, °C; `None` where the pour point is not known.
    #[must_use]
    pub fn pour_floor_c(&self) -> Option<f64> {
        let policy = &self.case.policy.limits;
        let least = self.oil.pour_point()?.as_celsius() + policy.pour_margin_k;
        Some(if self.stands_too_long() { least.max(policy.standing_start_c) } else { least })
    }

    /// A vegetable oil left standing for days may set solid above its pour point (ASTM D6351).
    #[must_use]
    pub fn stands_too_long(&self) -> bool {
        self.oil.base() == crate::oil::Base::NaturalEster
            && self.case.duty.standing.as_hours() > self.case.policy.limits.standing_after_h
    }
}

/// The start limit that counts, mm²/s: the pump's, or the tighter one where the inlet cannot be
/// checked. Zero or less: none is thin enough.
pub(super) fn unproven_or_given(case: &Case) -> f64 {
    case.unproven_start_max.unwrap_or_else(|| case.pump.viscosity_start_max.as_mm2_per_s())
}
