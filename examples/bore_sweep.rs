//! How the start floor and the heater move with the bore of the suction hose: one value changed, the
//! case decided again.
//!
//! `cargo run --example bore_sweep`

use coldsump::advice;
use coldsump::case::{CaseFile, Edit, Faults};

/// Bore in mm, start floor in °C, heater in W.
pub(crate) type Row = (f64, Option<f64>, Option<f64>);

/// Start floor and heater for each bore.
///
/// # Errors
/// Everything that is wrong with the case.
pub(crate) fn sweep(text: &str, bores: &[f64]) -> Result<Vec<Row>, Faults> {
    let case = CaseFile::read("loader", text).check()?;
    bores
        .iter()
        .map(|bore| {
            let changed = case.with(&[Edit::new("suction.bore", &format!("{bore} mm"))])?;
            let decision = advice::decide(&changed);
            let oil = decision.in_service.unwrap_or(0);
            let floor = decision.oils.get(oil).and_then(|found| found.start_floor.at_c);
            let heater = decision.oils.get(oil).and_then(|found| found.heating.heater_w);
            Ok((*bore, floor, heater))
        })
        .collect()
}

#[allow(dead_code, reason = "the tests use the function alone")]
fn main() -> Result<(), Faults> {
    for (bore, floor, heater) in sweep(include_str!("hollow-skid.toml"), &[25.4, 31.8, 38.1, 50.8])?
    {
        println!("{bore} mm: turn from {floor:.1?} °C, heater {heater:.0?} W");
    }
    Ok(())
}
