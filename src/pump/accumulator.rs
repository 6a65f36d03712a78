//! Nitrogen precharge of an accumulator at another temperature.

use crate::solve;
use crate::source::{Method, Source};

/// Nitrogen at constant volume.
pub static PRECHARGE: Method = Method {
    name: "nitrogen at constant volume, Peng-Robinson equation of state",
    source: Source::publication(
        "D.-Y. Peng, D. B. Robinson, Ind. Eng. Chem. Fundam. 15 (1976) 59; critical point of nitrogen 126.19 K, 3.396 MPa, acentric factor 0.0372 (handbook values, memory)",
    ),
};

const GAS_CONSTANT: f64 = 8.314_462_618;
const CRITICAL_K: f64 = 126.19;
const CRITICAL_PA: f64 = 3.396e6;
const ACENTRIC: f64 = 0.0372;
/// b of the equation, m³/mol: no gas is denser than this.
const COVOLUME: f64 = 0.077_80 * GAS_CONSTANT * CRITICAL_K / CRITICAL_PA;

/// Pressure of nitrogen, Pa absolute: molar volume in m³/mol, temperature in K.
///
/// `p = RT/(v-b) - aα/(v² + 2bv - b²)`.
fn nitrogen_pa(v: f64, kelvin: f64) -> f64 {
    let b = COVOLUME;
    let a = 0.457_24 * (GAS_CONSTANT * CRITICAL_K).powi(2) / CRITICAL_PA;
    let kappa = 0.374_64 + 1.542_26 * ACENTRIC - 0.269_92 * ACENTRIC * ACENTRIC;
    let alpha = (1.0 + kappa * (1.0 - (kelvin / CRITICAL_K).sqrt())).powi(2);
    GAS_CONSTANT * kelvin / (v - b) - a * alpha / (v * v + 2.0 * b * v - b * b)
}

/// The precharge, kPa gauge, at `to_c` of gas set to `kpa` gauge at `at_c`; the gauge reads against
/// 101.325 kPa. `None` outside -60 to 120 °C or over 40 MPa, where it was not compared. Against a
/// reference equation of state: within 0.8 % where set to 10 MPa and less, 4 % to 40 MPa.
///
/// # Source
/// [`PRECHARGE`].
///
/// # Example
/// ```
/// // CoolProp 8.0.0 at constant density: 100 bar at 20 °C reads 74.31 bar at -40 °C.
/// let cold = coldsump::pump::precharge_kpa(10_000.0, 20.0, -40.0).unwrap();
/// assert!((cold - 7431.0).abs() < 80.0);
/// ```
#[must_use]
pub fn precharge_kpa(kpa: f64, at_c: f64, to_c: f64) -> Option<f64> {
    let range = -60.0..=120.0;
    if !range.contains(&at_c) || !range.contains(&to_c) || !(0.0..=40_000.0).contains(&kpa) {
        return None;
    }
    let (p, t) = (kpa * 1e3 + 101_325.0, at_c + 273.15);
    // An ideal gas is near enough to bracket the molar volume, short of the covolume.
    let ideal = GAS_CONSTANT * t / p;
    let v = solve::root(
        |ln_v: f64| nitrogen_pa(ln_v.exp(), t) / p - 1.0,
        (ideal * 0.5).max(COVOLUME * 1.001).ln(),
        (ideal * 2.5).ln(),
        1e-12,
    )?;
    Some((nitrogen_pa(v.exp(), to_c + 273.15) - 101_325.0) / 1e3)
}
