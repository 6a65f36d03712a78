//! The figures of tank, heater and warm-up that are judgement or trade practice.

/// Judgement and trade figures of the heat side. Each has a `policy` key of the same name.
#[derive(Debug, Clone, PartialEq)]
#[allow(
    missing_docs,
    reason = "the policy table of the case says what each is and where it comes from"
)]
pub struct HeatPolicy {
    pub wetted_share: f64,
    pub emissivity: f64,
    pub wind_enclosed: f64,
    pub wind_open_frame: f64,
    pub wind_exposed: f64,
    pub loss_uncertainty: f64,
    pub steel_heat_j_kg_k: f64,
    pub gate_margin_k: f64,
    pub suction_below_mean_k: f64,
    pub return_share: f64,
    pub target_max_c: f64,
    pub sensor_k: f64,
    pub hysteresis_k: f64,
    pub warming_over_floor_k: f64,
    pub warming_over_soak_k: f64,
    pub gate_fall_k: f64,
    pub circuit_loss_factor: f64,
    pub load_sensing_share: f64,
    pub blanket_mm: f64,
    pub blanket_w_m_k: f64,
    pub density_thick: f64,
    pub density_medium: f64,
    pub density_thin: f64,
    pub density_circulated: f64,
    pub thick_from_mm2_s: f64,
    pub medium_from_mm2_s: f64,
    pub skin_max_c: f64,
    pub flash_margin_k: f64,
    pub pad_density: f64,
    pub pad_share: f64,
    pub continuous_share: f64,
    pub plug_16_a: f64,
}

impl Default for HeatPolicy {
    fn default() -> Self {
        Self {
            wetted_share: 0.9,
            emissivity: 0.9,
            wind_enclosed: 0.2,
            wind_open_frame: 0.5,
            wind_exposed: 1.0,
            loss_uncertainty: 1.4,
            steel_heat_j_kg_k: 440.0,
            gate_margin_k: 3.0,
            suction_below_mean_k: 3.0,
            return_share: 0.2,
            target_max_c: 60.0,
            sensor_k: 3.0,
            hysteresis_k: 5.0,
            warming_over_floor_k: 20.0,
            warming_over_soak_k: 25.0,
            gate_fall_k: 3.0,
            circuit_loss_factor: 3.0,
            load_sensing_share: 0.05,
            blanket_mm: 25.0,
            blanket_w_m_k: 0.040,
            density_thick: 0.7,
            density_medium: 1.2,
            density_thin: 1.55,
            density_circulated: 2.3,
            thick_from_mm2_s: 5000.0,
            medium_from_mm2_s: 500.0,
            skin_max_c: 120.0,
            flash_margin_k: 30.0,
            pad_density: 0.5,
            pad_share: 0.75,
            continuous_share: 0.8,
            plug_16_a: 13.0,
        }
    }
}
