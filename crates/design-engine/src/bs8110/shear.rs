//! Shear (3.5.5, Table 3.8).

/// Design concrete shear stress vc, N/mm2 (Table 3.8):
/// 0.79 (100As/bd)^(1/3) (400/d)^(1/4)/1.25 x (fcu/25)^(1/3), with 100As/bd between 0.15 and 3,
/// (400/d)^(1/4) not below 0.67 and fcu not above 40. Below fcu 25 the factor is kept (decision, safe).
/// As in mm2/m, d in mm.
#[must_use]
pub fn vc(as_mm2_m: f64, d_mm: f64, fcu_n_mm2: f64) -> f64 {
    let rho = (100.0 * as_mm2_m / (1000.0 * d_mm)).clamp(0.15, 3.0);
    let depth = (400.0 / d_mm).sqrt().sqrt().max(0.67);
    0.79 * (rho * (fcu_n_mm2.min(40.0) / 25.0)).cbrt() * depth / 1.25
}

/// Design shear stress v = V/bd, N/mm2 (equation 21); V in kN/m, d in mm.
#[must_use]
pub fn stress(v_kn_m: f64, d_mm: f64) -> f64 {
    v_kn_m / d_mm
}

/// Greatest shear stress whatever the steel (3.5.5.2): the lesser of 0.8 sqrt(fcu) and 5 N/mm2.
#[must_use]
pub fn greatest_stress(fcu_n_mm2: f64) -> f64 {
    (0.8 * fcu_n_mm2.sqrt()).min(5.0)
}
