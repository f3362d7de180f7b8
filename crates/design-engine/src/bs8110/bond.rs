//! Anchorage and laps of bars in tension (3.12.8.3, 3.12.8.4, 3.12.8.13, Table 3.27).

use crate::criteria::Criteria;

/// Bond coefficient beta of bars in tension (Table 3.26): plain, and ribbed of type 2.
const BETA_PLAIN: f64 = 0.28;
const BETA_RIBBED: f64 = 0.50;
/// Table 3.27 ends at `40 or more`.
const GREATEST_FCU: f64 = 40.0;
/// Steel up to this yield strength is plain, N/mm2.
const PLAIN_UP_TO: f64 = 250.0;

/// Tension anchorage and lap as a multiple of the bar size: fs/(4 beta sqrt(fcu)), fs = fy/gamma, up to a whole number. The
/// values of Table 3.27 at fcu 25, 30, 35 and 40.
#[must_use]
pub fn tension_multiple(fcu_n_mm2: f64, fy_n_mm2: f64, gamma: f64) -> f64 {
    let beta = if fy_n_mm2 <= PLAIN_UP_TO + 1e-9 { BETA_PLAIN } else { BETA_RIBBED };
    let multiple = fy_n_mm2 / gamma / (4.0 * beta * fcu_n_mm2.min(GREATEST_FCU).sqrt());
    (multiple - 1e-9).ceil()
}

/// Where two bars lap.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LapPlace {
    /// Near the top as cast.
    pub top_as_cast: bool,
    /// Cover to the lapped bars, mm.
    pub cover_mm: f64,
    /// Clear distance between one lap and the next, mm.
    pub clear_between_mm: f64,
}

/// Factor on a lap (3.12.8.13): 1.4 at the top as cast with cover under twice the size, 1.4 where laps are closer than
/// max(75 mm, 6 sizes), 2.0 where both hold; else 1.
#[must_use]
pub fn lap_factor(bar_mm: f64, place: LapPlace) -> f64 {
    let thin_cover = place.top_as_cast && place.cover_mm < 2.0 * bar_mm - 1e-9;
    let close = place.clear_between_mm < (6.0 * bar_mm).max(75.0) - 1e-9;
    match (thin_cover, close) {
        (true, true) => 2.0,
        (false, false) => 1.0,
        _ => 1.4,
    }
}

/// Tension anchorage length, mm.
#[must_use]
pub fn anchorage_mm(bar_mm: f64, criteria: &Criteria) -> f64 {
    bar_mm * tension_multiple(criteria.fcu_n_mm2, criteria.fy_n_mm2, criteria.steel_partial_factor())
}

/// Tension lap, mm: the anchorage multiple times the factor of 3.12.8.13, up to a whole multiple of the size, not under 15 sizes or 300 mm (3.12.8.11).
#[must_use]
pub fn lap_mm(bar_mm: f64, place: LapPlace, criteria: &Criteria) -> f64 {
    let multiple = anchorage_mm(bar_mm, criteria) / bar_mm * lap_factor(bar_mm, place);
    ((multiple - 1e-9).ceil() * bar_mm).max(15.0 * bar_mm).max(300.0)
}
