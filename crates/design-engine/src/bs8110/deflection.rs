//! Deflection by span/depth (3.4.6, 3.5.7, Tables 3.9 and 3.10).

/// Basic span/depth of a rectangular section (Table 3.9), cantilever.
pub const BASIC_CANTILEVER: f64 = 7.0;
/// Basic span/depth, both ends of the span discontinuous.
pub const BASIC_SIMPLY_SUPPORTED: f64 = 20.0;
/// Basic span/depth, at least one end continuous.
pub const BASIC_CONTINUOUS: f64 = 26.0;

/// Estimated service stress in the tension steel, N/mm2 (Table 3.10, equation 8, `beta_b` = 1):
/// fs = 2 fy As,req/(3 As,prov). As,req is the steel for bending, not the minimum.
#[must_use]
pub fn service_stress(fy_n_mm2: f64, as_bending_mm2_m: f64, as_provided_mm2_m: f64) -> f64 {
    2.0 * fy_n_mm2 * as_bending_mm2_m / (3.0 * as_provided_mm2_m)
}

/// Modification factor for tension steel (Table 3.10, equation 7):
/// 0.55 + (477 - fs)/(120(0.9 + M/bd2)) <= 2.0. M in kNm/m, d in mm, fs in N/mm2.
#[must_use]
pub fn modification_factor(fs_n_mm2: f64, moment_knm_m: f64, d_mm: f64) -> f64 {
    let m_bd2 = moment_knm_m * 1e6 / (1000.0 * d_mm * d_mm);
    (0.55 + (477.0 - fs_n_mm2) / (120.0 * (0.9 + m_bd2))).min(2.0)
}
