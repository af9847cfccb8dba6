//! Surface resistances of the standards, in m²K/W.
//!
//! ISO 6946's values were recalled and reproduced from the standard's own formula, R_s = 1 / (h_c + h_r) with an
//! emissivity of 0.9; the rounded figures agree. ISO 13788's are from memory. Check them against the edition you quote.

/// External surfaces, ISO 6946. From the formula at 4 m/s of wind: 0.041.
pub const EXTERNAL_M2K_W: f64 = 0.04;

/// Internal surfaces, heat flowing upwards, ISO 6946. From the formula: 0.0986.
pub const INTERNAL_UPWARDS_M2K_W: f64 = 0.10;

/// Internal surfaces, heat flowing horizontally, ISO 6946. From the formula: 0.1309.
pub const INTERNAL_HORIZONTAL_M2K_W: f64 = 0.13;

/// Internal surfaces, heat flowing downwards, ISO 6946. From the formula: 0.1712.
pub const INTERNAL_DOWNWARDS_M2K_W: f64 = 0.17;

/// Internal opaque surfaces where mould or condensation is judged, ISO 13788. From memory.
pub const MOISTURE_OPAQUE_M2K_W: f64 = 0.25;

/// Internal surfaces of frames and glazing where condensation is judged, ISO 13788. From memory.
pub const MOISTURE_FRAME_AND_GLAZING_M2K_W: f64 = 0.13;

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    /// R_s = 1 / (h_c + 0.9 h_r0), ISO 6946 annex A; h_r0 = 4 σ T³ of a black surface.
    fn from_formula(convection_w_m2k: f64, black_radiation_w_m2k: f64) -> f64 {
        1.0 / (convection_w_m2k + 0.9 * black_radiation_w_m2k)
    }

    #[test]
    fn values_follow_from_the_standards_formula() {
        let stefan_boltzmann = 5.67e-8_f64;
        let inside = 4.0 * stefan_boltzmann * 293.15_f64.powi(3);
        let outside = 4.0 * stefan_boltzmann * 283.15_f64.powi(3);
        assert_abs_diff_eq!(INTERNAL_UPWARDS_M2K_W, from_formula(5.0, inside), epsilon = 0.005);
        assert_abs_diff_eq!(INTERNAL_HORIZONTAL_M2K_W, from_formula(2.5, inside), epsilon = 0.005);
        assert_abs_diff_eq!(INTERNAL_DOWNWARDS_M2K_W, from_formula(0.7, inside), epsilon = 0.005);
        let wind_m_s = 4.0;
        assert_abs_diff_eq!(EXTERNAL_M2K_W, from_formula(4.0 + 4.0 * wind_m_s, outside), epsilon = 0.005);
    }
}
