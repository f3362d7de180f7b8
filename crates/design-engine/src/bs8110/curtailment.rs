//! Extents of bars (3.12.10.3, figure 3.25; 3.5.3.6 e for top bars where a moment rose).

/// Extents that are built go up to whole 50 mm (common practice, no source).
#[must_use]
pub fn round_up_50(length_mm: f64) -> f64 {
    ((length_mm - 1e-6) / 50.0).ceil() * 50.0
}

/// Extents of top bars past the support face, mm: `(all, half)` of figure 3.25: all bars to
/// max(0.15 l, 45 bar sizes), half of them to 0.3 l. `l_mm` is the greater of the two spans.
#[must_use]
pub fn top_extents(l_mm: f64, bar_mm: f64) -> (f64, f64) {
    let all = (0.15 * l_mm).max(45.0 * bar_mm);
    (all, (0.3 * l_mm).max(all))
}

/// Distance from a support centre line to the point of contraflexure, in the unit of `l`, under
/// M(x) = 4F(x/l)(1 - x/l) - mL(1 - x/l) - mR x/l (3.5.3.6 e); none where the span hogs throughout.
/// `free_moment` F is the midspan moment plus the average of the end moments the table gave.
#[must_use]
pub fn contraflexure(free_moment: f64, near: f64, far: f64, l: f64) -> Option<f64> {
    let b = 4.0 * free_moment + near - far;
    let discriminant = b * b - 16.0 * free_moment * near;
    if free_moment <= 0.0 || discriminant < 0.0 {
        return None;
    }
    let u = (b - discriminant.sqrt()) / (8.0 * free_moment);
    (0.0..=1.0).contains(&u).then_some(u * l)
}

/// Where alternate bottom bars stop, as a share of the span from the support centre line (figure 3.25):
/// 0.2 at a continuous end, 0.1 at a discontinuous one.
#[must_use]
pub fn bottom_stop_share(continuous: bool) -> f64 {
    if continuous { 0.2 } else { 0.1 }
}
