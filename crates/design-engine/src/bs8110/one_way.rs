//! One-way panels: simply supported, and Table 3.12.

use std::sync::LazyLock;

use super::tables::{cell, rows};

/// Coefficients of one panel of a strip; moments multiply n l2, shears n l. Ends: lesser coordinate first.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct OneWayCoefficients {
    /// Midspan.
    pub midspan: f64,
    /// Support moments at the two ends; 0 at a simple end.
    pub ends: [f64; 2],
    /// Shears at the two ends.
    pub shears: [f64; 2],
    /// Greatest hogging at midspan in any load case; 0 where there is none.
    pub midspan_hogging: f64,
    /// How far hogging reaches from the two ends in any load case, as a share of the span; 1 where the span hogs
    /// throughout, 0 where the simplified rules of figure 3.25 are enough (3.12.10.1).
    pub hogging_reach: [f64; 2],
}

/// A panel simply supported at both ends: n l2/8, n l/2 (statics).
pub const SIMPLY_SUPPORTED: OneWayCoefficients = OneWayCoefficients {
    midspan: 0.125,
    ends: [0.0; 2],
    shears: [0.5; 2],
    midspan_hogging: 0.0,
    hogging_reach: [0.0; 2],
};

/// Greatest variation of spans (and here of loads) for Table 3.12, as a share of the greatest (3.5.2.4, 3.4.3).
pub const GREATEST_VARIATION: f64 = 0.15;
/// Least bay area for Table 3.12 (3.5.2.3 a), m2.
pub const LEAST_BAY_M2: f64 = 30.0;
/// Greatest ratio of characteristic imposed to dead load (3.5.2.3 b).
pub const GREATEST_IMPOSED_TO_DEAD: f64 = 1.25;
/// Greatest characteristic imposed load, partitions left out (3.5.2.3 c), kN/m2.
pub const GREATEST_IMPOSED_KN_M2: f64 = 5.0;

struct Row {
    moments: [f64; 5],
    shears: [f64; 3],
}

/// Rows of Table 3.12: end support simple, end support continuous.
static TABLE_3_12: LazyLock<[Row; 2]> = LazyLock::new(|| {
    let cells: Vec<Vec<Option<f64>>> = rows(include_str!("tables/table_3_12.csv"))
        .map(|row| row[2..].iter().map(|text| cell(text)).collect())
        .collect();
    let number = |row: usize, column: usize| cells[row][column].unwrap_or(0.0);
    [0, 2].map(|row| Row {
        moments: std::array::from_fn(|column| number(row, column)),
        shears: [number(row + 1, 0), number(row + 1, 2), number(row + 1, 4)],
    })
});

/// Table 3.12 for panel `index` of a strip of `count` panels, three or more; `end_continuous` for the strip's
/// first and last support.
#[must_use]
pub fn table_3_12(index: usize, count: usize, end_continuous: [bool; 2]) -> OneWayCoefficients {
    let [first, last] = end_continuous.map(|continuous| &TABLE_3_12[usize::from(continuous)]);
    let interior = &TABLE_3_12[0];
    let (at_first, at_last) = (index == 0, index + 1 == count);
    // Counted in supports from the nearer end of the strip: 0 outer, 1 first interior, 2 interior.
    let support = |end: usize| {
        let from_first = index + end;
        let (row, place) =
            if from_first <= count - from_first { (first, from_first) } else { (last, count - from_first) };
        match place {
            0 => (row.moments[0], row.shears[0]),
            // .6F on both sides of the first interior support: the table as printed, safe for the inner span.
            1 => (row.moments[2], row.shears[1]),
            _ => (interior.moments[4], interior.shears[2]),
        }
    };
    let midspan = match (at_first, at_last) {
        (true, _) => first.moments[1],
        (_, true) => last.moments[1],
        _ => interior.moments[3],
    };
    let ends = [support(0), support(1)];
    OneWayCoefficients {
        midspan,
        ends: ends.map(|end| end.0),
        shears: ends.map(|end| end.1),
        midspan_hogging: 0.0,
        hogging_reach: [0.0; 2],
    }
}
