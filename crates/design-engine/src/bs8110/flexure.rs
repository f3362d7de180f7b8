//! Bending and areas of steel (3.4.4.4, 3.12.5.3, 3.12.6.1).

use std::f64::consts::PI;

/// K' where moments are not reduced by redistribution (3.4.4.4).
pub const K_LIMIT: f64 = 0.156;
/// K' at supports whose moments were reduced by 20 % (3.4.4.4: 0.402(0.8 - 0.4) - 0.18(0.8 - 0.4)2).
pub const K_LIMIT_REDISTRIBUTED: f64 = 0.132;

/// Section of a metre width in bending.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Flexure {
    /// K = M/(b d2 fcu).
    pub k: f64,
    /// K'.
    pub k_limit: f64,
    /// Lever arm, mm; none where K exceeds K' (no compression steel in slabs).
    pub z_mm: Option<f64>,
    /// Steel, mm2/m; none where K exceeds K'.
    pub as_mm2_m: Option<f64>,
}

/// K, z and As of a metre width (3.4.4.4): K = M/(b d2 fcu), z = d(0.5 + sqrt(0.25 - K/0.9)) <= 0.95 d,
/// As = M/((fy/gamma) z). M in kNm/m (not below zero), d in mm (above zero), strengths in N/mm2.
///
/// ```
/// // M = 20 kNm/m on d = 120 mm: K = 0.0463, z = 0.946 d, As = 405 mm2/m
/// let section = design_engine::bs8110::flexure::bending(20.0, 120.0, 30.0, 500.0, 1.15, 0.156);
/// assert!((section.k - 0.0463).abs() < 1e-4);
/// assert!((section.as_mm2_m.unwrap() - 405.3).abs() < 0.1);
/// ```
#[must_use]
pub fn bending(
    moment_knm_m: f64,
    d_mm: f64,
    fcu_n_mm2: f64,
    fy_n_mm2: f64,
    gamma: f64,
    k_limit: f64,
) -> Flexure {
    let m = moment_knm_m * 1e6;
    let k = m / (1000.0 * d_mm * d_mm * fcu_n_mm2);
    if k > k_limit {
        return Flexure { k, k_limit, z_mm: None, as_mm2_m: None };
    }
    let z = d_mm * (0.5 + (0.25 - k / 0.9).sqrt()).min(0.95);
    Flexure { k, k_limit, z_mm: Some(z), as_mm2_m: Some(m / (fy_n_mm2 / gamma * z)) }
}

/// Minimum steel as a share of the gross section (Table 3.25): 0.24 % for fy 250, 0.13 % for 460 and 500.
#[must_use]
pub fn minimum_share(fy_n_mm2: f64) -> f64 {
    if fy_n_mm2 < 300.0 { 0.0024 } else { 0.0013 }
}

/// Minimum steel each way in a face that is in tension, mm2/m (Table 3.25).
#[must_use]
pub fn minimum_steel(thickness_mm: f64, fy_n_mm2: f64) -> f64 {
    minimum_share(fy_n_mm2) * 1000.0 * thickness_mm
}

/// Maximum steel, mm2/m: 4 % of the gross section (3.12.6.1).
#[must_use]
pub fn maximum_steel(thickness_mm: f64) -> f64 {
    0.04 * 1000.0 * thickness_mm
}

/// Area of bars per metre width, mm2/m, from size and centre-to-centre spacing in mm.
#[must_use]
pub fn steel_area(bar_mm: f64, spacing_mm: f64) -> f64 {
    PI * bar_mm * bar_mm / 4.0 * 1000.0 / spacing_mm
}
