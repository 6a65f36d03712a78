//! The figures of tank, heater and warm-up that are judgement or trade practice.

/// Judgement and trade figures of the heat side. Each has a `policy` key of the same name.
///
/// The tag in brackets says how the default was come by.
#[derive(Debug, Clone, PartialEq)]
pub struct HeatPolicy {
    /// Share of the surface that loses heat as a wetted wall does: walls wetted to 0.8, half of the
    /// top \[judgement\].
    pub wetted_share: f64,
    /// Emissivity of the painted outside; paint 0.85 to 0.95, bare bright steel 0.2 to 0.4 \[memory:
    /// handbook values\].
    pub emissivity: f64,
    /// Share of the wind that reaches a tank behind panels \[judgement\].
    pub wind_enclosed: f64,
    /// Share of the wind that reaches a tank in an open frame \[judgement\].
    pub wind_open_frame: f64,
    /// Share of the wind that reaches a tank in the open \[judgement\].
    pub wind_exposed: f64,
    /// The loss at its likely worst, times the loss as computed: films are good to ±40 %
    /// \[judgement: turbulent plate, mixed plate and cylinder differ by that much\].
    pub loss_uncertainty: f64,
    /// Specific heat of steel, J/(kg·K) \[memory: EN 1993-1-2, 439.8 at 20 °C; about 410 at -30 °C,
    /// under 1 % of a full tank\].
    pub steel_heat_j_kg_k: f64,
    /// The oil at the suction must be this much over the start floor, K \[judgement\].
    pub gate_margin_k: f64,
    /// Oil at the suction under the mean of a tank heated in still oil, K \[judgement\].
    pub suction_below_mean_k: f64,
    /// Share of the cold rest of the circuit that is returned before the tank is read again
    /// \[judgement\].
    pub return_share: f64,
    /// Hottest mean temperature a tank is heated to, °C \[common practice\].
    pub target_max_c: f64,
    /// Thermostat over the target for its sensor, K \[judgement\].
    pub sensor_k: f64,
    /// Thermostat over that for its switching, K \[common practice\].
    pub hysteresis_k: f64,
    /// Pump warming needed where the thermostat is so far over the start floor, K \[judgement\].
    pub warming_over_floor_k: f64,
    /// Pump warming needed where the thermostat is so far over the pump, K \[common practice, no
    /// source: 25 to 30 K between oil and pump body\].
    pub warming_over_soak_k: f64,
    /// Fall of the tank for which a reading at the gate holds, K \[judgement: the gate margin\].
    pub gate_fall_k: f64,
    /// Heat loss of the whole circuit, times the tank's \[judgement\].
    pub circuit_loss_factor: f64,
    /// Share of the full flow a load-sensing pump gives in neutral \[judgement\].
    pub load_sensing_share: f64,
    /// Thickness of a blanket, mm \[common practice\].
    pub blanket_mm: f64,
    /// Conductivity of a blanket, W/(m·K) \[common practice: mineral wool or foam, dry\].
    pub blanket_w_m_k: f64,
    /// Greatest watt density in very thick oil, W/cm² \[common practice: 0.7 as a firm limit, 0.6 to
    /// 1.2 in hydraulic tanks\].
    pub density_thick: f64,
    /// Greatest watt density in thick oil, W/cm² \[common practice\].
    pub density_medium: f64,
    /// Greatest watt density in still oil, W/cm²: 10 W/in² \[publication: Machinery Lubrication,
    /// Nov-Dec 2016, p. 47\].
    pub density_thin: f64,
    /// Greatest watt density in circulated oil, W/cm²: 15 W/in² \[publication: the same\].
    pub density_circulated: f64,
    /// Very thick is over this, mm²/s \[judgement\].
    pub thick_from_mm2_s: f64,
    /// Thick is from this on, mm²/s \[judgement\].
    pub medium_from_mm2_s: f64,
    /// Hottest skin of an element for long oil life, °C \[common practice; no standard found\].
    pub skin_max_c: f64,
    /// Skin under the flash point by at least this, K \[judgement\].
    pub flash_margin_k: f64,
    /// Watt density of a pad on the outside, W/cm² \[common practice\].
    pub pad_density: f64,
    /// Share of a pad's heat that goes into the oil \[judgement\].
    pub pad_share: f64,
    /// Share of a breaker's rating for hours, where so limited \[quoted: NFPA 70 210.20(A) and
    /// 210.23(A)(1)\].
    pub continuous_share: f64,
    /// Current for hours from a 16 A plug outlet, A \[common practice: such outlets warm up on long
    /// loads\].
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
