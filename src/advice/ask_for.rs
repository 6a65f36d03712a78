//! The oil to ask for: the properties that start this machine cold here, for any supplier.

use super::setup::unproven_or_given;
use crate::air;
use crate::case::Case;
use crate::oil::grade::GRADES;
use crate::oil::{BandPolicy, ViscosityCurve, viscosity_at_100};
use crate::pump::Inlet;
use crate::solve;
use crate::source::{Method, Source};

/// How the grades and the index are found that can meet a specification.
pub static ASK_FOR: Method = Method {
    name: "least viscosity index of each grade whose D341 line meets the cold and, sheared, the hot viscosity",
    source: Source::judgement(
        "ISO 3448 grades at their edges, ASTM D341 and D2270; shear as for the likely range; up to an index of 220",
    ),
};

/// Hydraulic oils for deep cold reach this viscosity index; over it they are special fluids.
const INDEX_MOST: f64 = 220.0;
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
        Some(
            "the air pressure or the suction line leaves nothing for any oil: no oil starts it cold",
        )
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
    edges: (f64, f64),
    cold: (f64, f64),
    hot: (f64, f64),
    policy: &BandPolicy,
) -> Option<f64> {
    let meets = |index: &f64| meets(*index, edges, cold, hot, policy);
    let steps = |from: f64, by: f64, to: f64| {
        std::iter::successors(Some(from), move |at| Some(at + by).filter(|next| *next <= to))
    };
    let coarse = steps(INDEX_LEAST, COARSE, INDEX_MOST).find(meets)?;
    steps((coarse - COARSE + 1.0).max(INDEX_LEAST), 1.0, coarse).find(meets)
}

/// First step of the search for an index.
const COARSE: f64 = 10.0;

/// Some oil of a grade with this index is thin enough in the cold and thick enough when hot: the
/// hot end asks for a thick oil of the grade, the cold end for a thin one, so the thinnest that is
/// thick enough when hot decides.
fn meets(
    index: f64,
    (least, greatest): (f64, f64),
    cold: (f64, f64),
    hot: (f64, f64),
    policy: &BandPolicy,
) -> bool {
    let curve = |kv40: f64| {
        let kv100 = viscosity_at_100(kv40, index)?;
        ViscosityCurve::through(&[(40.0, kv40), (100.0, kv100)]).ok()
    };
    let kept = shear(index, hot.0, policy);
    let spare = |kv40: f64| curve(kv40).map_or(f64::NAN, |line| line.at(hot.0) * kept - hot.1);
    let thinnest = if spare(least) >= 0.0 {
        Some(least)
    } else if spare(greatest) >= 0.0 {
        solve::root(spare, least, greatest, 1e-6)
    } else {
        None
    };
    thinnest.and_then(curve).is_some_and(|line| line.at(cold.0) <= cold.1)
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
