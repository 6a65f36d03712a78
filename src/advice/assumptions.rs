//! Assumptions to confirm: those a floor hangs on first, with the floor at both ends of their range.

use super::assess::assess;
use super::decide::Decision;
use crate::case::{Assumption, Case, Edit};
use crate::pump::Typical;

/// One assumption, and what hangs on it.
#[derive(Debug, Clone, PartialEq)]
pub struct Confirm {
    /// The assumption, as the case made it.
    pub assumption: Assumption,
    /// A floor of the oil advised on hangs on it.
    pub governs: bool,
    /// The floors at both ends of the usual range, where it governs and the range is known.
    pub range: Option<Range>,
}

/// The floors over a range of one assumption, °C; `None` where there is none.
#[derive(Debug, Clone, PartialEq)]
pub struct Range {
    /// One end, as a case file has it.
    pub from: String,
    /// The other.
    pub to: String,
    /// Start floor at both.
    pub start_floor_c: [Option<f64>; 2],
    /// Work floor at both.
    pub work_floor_c: [Option<f64>; 2],
}

/// Usual ranges of inputs that are not pump limits; common practice, no source.
const RANGES: &[(&str, &str, &str)] = &[
    ("pump.start_speed", "700 rpm", "1200 rpm"),
    ("pump.work_speed", "1800 rpm", "2400 rpm"),
    ("suction.oil_above_pump", "-0.3 m", "0.6 m"),
    ("suction.strainer.at_density", "830 kg/m³", "900 kg/m³"),
    ("site.elevation", "0 m", "1500 m"),
    ("duty.standing", "12 h", "72 h"),
];

/// All assumptions of a case, those that govern first.
pub(super) fn confirm(case: &Case, decision: &Decision) -> Vec<Confirm> {
    let at = decision.focus().unwrap_or(0);
    let Some(found) = decision.oils.get(at) else { return Vec::new() };
    let mut all: Vec<Confirm> = case
        .assumptions
        .iter()
        .map(|assumption| {
            let other_oil = assumption.key.starts_with("oil[")
                && !assumption.key.starts_with(&format!("oil[{}].", at + 1));
            let governs = !other_oil && found.hangs_on(&assumption.key);
            let range = if governs { range(case, at, &assumption.key) } else { None };
            Confirm { assumption: assumption.clone(), governs, range }
        })
        .collect();
    all.sort_by_key(|confirm| !confirm.governs);
    all
}

fn range(case: &Case, oil: usize, key: &str) -> Option<Range> {
    let (from, to) = ends(case, key)?;
    let floors = |value: &str| {
        let edited = case.with(&[Edit::new(key, value)]).ok()?;
        let found = assess(&edited, edited.oils.get(oil)?);
        Some((found.start_floor.at_c, found.work_floor.at_c))
    };
    let (one, other) = (floors(&from)?, floors(&to)?);
    Some(Range { from, to, start_floor_c: [one.0, other.0], work_floor_c: [one.1, other.1] })
}

/// Both ends of the usual range of a key, as a case file has them.
fn ends(case: &Case, key: &str) -> Option<(String, String)> {
    if let Some((_, from, to)) = RANGES.iter().find(|(at, ..)| *at == key) {
        return Some(((*from).to_owned(), (*to).to_owned()));
    }
    if key.ends_with(".base") {
        return Some(("mineral".to_owned(), "polymer-thickened".to_owned()));
    }
    let limits = case.pump.kind.limits()?;
    let (typical, unit): (Typical, &str) = match key {
        "pump.viscosity_start_max" => (limits.viscosity_start_max, "mm²/s"),
        "pump.viscosity_work_max" => (limits.viscosity_work_max, "mm²/s"),
        "pump.viscosity_min" => (limits.viscosity_min, "mm²/s"),
        "pump.viscosity_min_short" => (limits.viscosity_min_short, "mm²/s"),
        "pump.inlet_pressure_start_min" => (limits.inlet_pressure_start_min, "kPa"),
        "pump.inlet_pressure_work_min" => (limits.inlet_pressure_work_min, "kPa"),
        _ => return None,
    };
    let text = |value: f64| format!("{} {unit}", crate::quantity::shown(value));
    Some((text(typical.from), text(typical.to)))
}
