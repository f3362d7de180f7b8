//! Spacing of bars (3.12.11).

/// `beta_b` at midspan: no redistribution.
pub const BETA_B_MIDSPAN: f64 = 1.0;
/// `beta_b` at supports of two-way panels (3.12.11.2.8).
pub const BETA_B_TWO_WAY_SUPPORT: f64 = 0.85;
/// `beta_b` at supports whose moments were reduced by 20 %.
pub const BETA_B_REDUCED_SUPPORT: f64 = 0.80;

/// Greatest clear spacing, mm (3.12.11.2.7): min(3 d, 750), and unless h <= 200 (fy 460, 500), h <= 250
/// (fy 250) or 100 As/bd < 0.3: also 70000 `beta_b`/fy <= 300 (Table 3.28), divided by 100 As/bd when that is
/// under 1. As provided in mm2/m; h, d in mm.
#[must_use]
pub fn greatest_clear(h_mm: f64, d_mm: f64, as_provided_mm2_m: f64, fy_n_mm2: f64, beta_b: f64) -> f64 {
    let by_depth = (3.0 * d_mm).min(750.0);
    let thin = if fy_n_mm2 < 300.0 { 250.0 } else { 200.0 };
    let rho = 100.0 * as_provided_mm2_m / (1000.0 * d_mm);
    if h_mm <= thin || rho < 0.3 {
        return by_depth;
    }
    let table_3_28 = (70_000.0 * beta_b / fy_n_mm2).min(300.0);
    by_depth.min(if rho < 1.0 { table_3_28 / rho } else { table_3_28 })
}

/// Least clear gap between bars, mm (3.12.11.1): maximum aggregate + 5, and not less than the bar size.
#[must_use]
pub fn least_gap(maximum_aggregate_mm: f64, bar_mm: f64) -> f64 {
    (maximum_aggregate_mm + 5.0).max(bar_mm)
}
