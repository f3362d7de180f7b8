//! Cover and thickness for durability and fire (3.3, Tables 3.3 and 3.4, figure 3.2).

use std::sync::LazyLock;

use super::tables::{cell, rows};
use crate::criteria::Exposure;

/// What Table 3.3 asks.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum DurabilityCover {
    /// Nominal cover, mm.
    Cover(f64),
    /// The concrete is below the least grade for the exposure; the grade's cube strength, N/mm2.
    NotAllowedBelow(f64),
}

static TABLE_3_3: LazyLock<Vec<(&'static str, f64, f64)>> = LazyLock::new(|| {
    rows(include_str!("tables/table_3_3.csv"))
        .filter_map(|row| Some((row[0], cell(row[1])?, cell(row[2])?)))
        .collect()
});

static TABLE_3_4: LazyLock<Vec<[f64; 4]>> = LazyLock::new(|| {
    rows(include_str!("tables/table_3_4.csv"))
        .filter_map(|row| Some([cell(row[0])?, cell(row[1])?, cell(row[2])?, cell(row[3])?]))
        .collect()
});

/// Nominal cover for durability (Table 3.3): that of the highest grade not above fcu (N/mm2).
#[must_use]
pub fn durability(exposure: Exposure, fcu_n_mm2: f64) -> DurabilityCover {
    let word = match exposure {
        Exposure::Mild => "mild",
        Exposure::Moderate => "moderate",
        Exposure::Severe => "severe",
    };
    let grades = TABLE_3_3.iter().filter(|row| row.0 == word);
    match grades.clone().rev().find(|row| row.1 <= fcu_n_mm2) {
        Some(row) => DurabilityCover::Cover(row.2),
        None => DurabilityCover::NotAllowedBelow(grades.map(|row| row.1).fold(f64::INFINITY, f64::min)),
    }
}

/// Nominal cover (mm) and least thickness (mm) of a floor for a fire resistance in hours (Table 3.4, figure
/// 3.2): the row of the period, or of the next longer one. `continuous` only where both ends of the short span are.
#[must_use]
pub fn fire(hours: f64, continuous: bool) -> (f64, f64) {
    let row = TABLE_3_4.iter().find(|row| row[0] >= hours - 1e-9).or(TABLE_3_4.last());
    row.map_or((0.0, 0.0), |row| (if continuous { row[2] } else { row[1] }, row[3]))
}
