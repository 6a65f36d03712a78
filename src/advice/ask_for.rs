//! The oil to ask for: the properties that start this machine cold here, for any supplier.

use super::setup::unproven_or_given;
use crate::air;
use crate::case::Case;
use crate::oil::grade::GRADES;
use crate::oil::{BandPolicy, ViscosityCurve, viscosity_at_100};
use crate::pump::Inlet;
use crate::source::{Method, Source};

/// How the grades and the index are found that can meet a specification.
pub static ASK_FOR: Method = Method {
    name: "least viscosity index of each grade whose D341 line meets the cold and, sheared, the hot viscosity",
    source: Source::judgement(
        "ISO 3448 grades at their edges, ASTM D341 and D2270; shear as for the likely range; up to an index of 200",
    ),
};

/// Ordinary hydraulic oils are not sold over this viscosity index.
const INDEX_MOST: f64 = 200.0;
/// Nor under this one.
const INDEX_LEAST: f64 = 80.0;
/// Over this index an oil is taken to hold polymer, which shears.
const NEAT_INDEX: f64 = 120.0;
/// Grades that hydraulic oils are sold in.
const SOLD: [u32; 6] = [10, 15, 22, 32, 46, 68];

/// The specification. Figures that do not exist are `None`.
#[derive(Debug, Clone, PartialEq)]
pub struct AskFor {
    /// Pour point at most, °C.
    pub pour_point_max_c: f64,
    /// Viscosity at the soak at most, mm²/s.
    pub viscosity_max: Option<f64>,
    /// The soak, °C.
    pub at_c: f64,
    /// Viscosity at the hottest oil at least, after shear, mm²/s.
    pub viscosity_min: f64,
    /// The hottest oil, °C.
    pub at_max_c: f64,
    /// Grades that can meet both, thinnest first, each with its least viscosity index.
    pub grades: Vec<(u32, f64)>,
    /// Why there is no figure, or no oil.
    pub why: Option<&'static str>,
}

impl AskFor {
    /// Least viscosity index of the grade that needs the least.
    #[must_use]
    pub fn index_min(&self) -> Option<f64> {
        self.grades.iter().map(|(_, index)| *index).min_by(f64::total_cmp)
    }
}

/// Works it out.
pub(super) fn ask_for(case: &Case) -> AskFor {
    let policy = &case.policy;
    let sky = if case.site.clear_sky { policy.limits.clear_sky_k } else { 0.0 };
    let soak_c = case.site.minimum.as_celsius() - sky;
    let viscosity_min = case.pump.viscosity_min.as_mm2_per_s();
    let at_max_c = case.duty.oil_temperature_max.as_celsius();
    let viscosity_max = viscosity_max(case);
    let grades = viscosity_max.map_or_else(Vec::new, |most| {
        SOLD.iter()
            .filter_map(|number| {
                let grade = GRADES.iter().find(|grade| grade.number == *number)?;
                let edges = (grade.least(), grade.greatest());
                let cold = (soak_c, most);
                let hot = (at_max_c, viscosity_min);
                Some((*number, least_index(edges, cold, hot, &policy.oil)?))
            })
            .collect()
    });
    let why = if viscosity_max.is_none() {
        Some("the air pressure or the suction line leaves nothing for any oil: no oil starts it cold")
    } else if grades.is_empty() {
        Some("no ordinary oil is thin enough in the cold and thick enough when hot")
    } else {
        None
    };
    AskFor {
        pour_point_max_c: soak_c - policy.limits.pour_margin_k,
        viscosity_max,
        at_c: soak_c,
        viscosity_min,
        at_max_c,
        grades,
        why,
    }
}

/// The smaller of the start limit and what the inlet passes at the start speed, mm²/s.
fn viscosity_max(case: &Case) -> Option<f64> {
    let limit = unproven_or_given(case);
    let (Some(line), Some(displacement)) = (&case.suction, case.pump.displacement) else {
        return (limit > 0.0).then_some(limit);
    };
    let gauge = case.reservoir.gauge_pressure.map_or(0.0, |pressure| pressure.as_kpa());
    let air = air::atmosphere_kpa(case.site.elevation.as_m());
    let q = displacement.as_cm3() * 1e-6 / 60.0 * case.pump.start_speed.as_rpm();
    let inlet = Inlet::new(line.clone(), air + gauge);
    let passes = inlet.largest_viscosity(q, COLD_DENSITY, case.pump.inlet_start_min.as_kpa())?;
    Some(passes.min(limit))
}

/// Density of a cold hydraulic oil whose data are not known, kg/m³: on the thick side, so that the
/// viscosity asked for is on the thin one.
const COLD_DENSITY: f64 = 900.0;

/// The least whole viscosity index with which some oil of a grade meets both ends.
fn least_index(
    (least, greatest): (f64, f64),
    cold: (f64, f64),
    hot: (f64, f64),
    policy: &BandPolicy,
) -> Option<f64> {
    let meets = |index: f64| {
        // The hot end asks for a thick oil of the grade, the cold end for a thin one: try the thinnest
        // that is thick enough when hot.
        let at = |kv40: f64| {
            let kv100 = viscosity_at_100(kv40, index)?;
            let curve = ViscosityCurve::through(&[(40.0, kv40), (100.0, kv100)]).ok()?;
            let sheared = curve.at(hot.0) * shear(index, hot.0, policy);
            Some((sheared - hot.1, cold.1 - curve.at(cold.0)))
        };
        let mut kv40 = least;
        let step = (greatest - least) / 40.0;
        while kv40 <= greatest + 1e-9 {
            if let Some((hot_spare, cold_spare)) = at(kv40) {
                if hot_spare >= 0.0 {
                    return cold_spare >= 0.0;
                }
            }
            kv40 += step;
        }
        false
    };
    let mut index = INDEX_LEAST;
    while index <= INDEX_MOST {
        if meets(index) {
            return Some(index);
        }
        index += 1.0;
    }
    None
}

/// Share of its viscosity a used oil keeps at a temperature, as in the likely range.
fn shear(index: f64, celsius: f64, policy: &BandPolicy) -> f64 {
    if index <= NEAT_INDEX || celsius <= 40.0 {
        return 1.0;
    }
    let share = ((index - 140.0) / 40.0).clamp(0.0, 1.0);
    let at_100 = policy.shear_low + share * (policy.shear_high - policy.shear_low);
    ((celsius - 40.0) / 60.0 * at_100.ln()).exp()
}
