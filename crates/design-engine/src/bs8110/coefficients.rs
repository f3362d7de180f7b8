//! Moment and shear coefficients of two-way panels (Tables 3.13, 3.14, 3.15; equations 10 to 20).

use std::sync::LazyLock;

use super::tables::{by_ratio, cell, interpolate, rows};
use crate::criteria::Coefficients;

/// Case of the two-way tables by the edges of the panel.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct PanelCase {
    /// Number of discontinuous long edges (parallel to the long span), 0 to 2.
    pub long_discontinuous: u8,
    /// Number of discontinuous short edges, 0 to 2.
    pub short_discontinuous: u8,
}

impl PanelCase {
    /// All nine cases, in the order of Table 3.14.
    pub const ALL: [PanelCase; 9] = [
        PanelCase::new(0, 0),
        PanelCase::new(0, 1),
        PanelCase::new(1, 0),
        PanelCase::new(1, 1),
        PanelCase::new(0, 2),
        PanelCase::new(2, 0),
        PanelCase::new(1, 2),
        PanelCase::new(2, 1),
        PanelCase::new(2, 2),
    ];

    /// A case from the numbers of discontinuous long and short edges, each 0 to 2.
    #[must_use]
    pub const fn new(long_discontinuous: u8, short_discontinuous: u8) -> PanelCase {
        PanelCase { long_discontinuous, short_discontinuous }
    }

    /// Number of the case in Tables 3.14 and 3.15, 1 to 9.
    #[must_use]
    pub fn number(self) -> usize {
        match (self.long_discontinuous, self.short_discontinuous) {
            (0, 0) => 1,
            (0, 1) => 2,
            (1, 0) => 3,
            (1, 1) => 4,
            (0, _) => 5,
            (_, 0) => 6,
            (1, _) => 7,
            (_, 1) => 8,
            _ => 9,
        }
    }

    /// The case in words.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self.number() {
            1 => "interior panel",
            2 => "one short edge discontinuous",
            3 => "one long edge discontinuous",
            4 => "two adjacent edges discontinuous",
            5 => "two short edges discontinuous",
            6 => "two long edges discontinuous",
            7 => "three edges discontinuous, one long edge continuous",
            8 => "three edges discontinuous, one short edge continuous",
            _ => "four edges discontinuous",
        }
    }

    /// Nd, the number of discontinuous edges.
    #[must_use]
    pub fn nd(self) -> f64 {
        f64::from(self.long_discontinuous + self.short_discontinuous)
    }
}

/// Moment coefficients of a panel; all multiply n lx2 (equations 10, 11, 14, 15).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct MomentCoefficients {
    /// Sagging, short span.
    pub short_midspan: f64,
    /// Sagging, long span.
    pub long_midspan: f64,
    /// Hogging at a continuous long edge; none where the case has no such edge.
    pub long_edge: Option<f64>,
    /// Hogging at a continuous short edge; none where the case has no such edge.
    pub short_edge: Option<f64>,
}

struct MomentRow {
    short: Option<[f64; 8]>,
    long: Option<f64>,
}

static TABLE_3_13: LazyLock<[[f64; 8]; 2]> = LazyLock::new(|| {
    let mut values = rows(include_str!("tables/table_3_13.csv")).filter_map(|row| by_ratio(&row, 1));
    [values.next().unwrap_or([0.0; 8]), values.next().unwrap_or([0.0; 8])]
});

/// Rows of a table of nine cases by two kinds of row: `[case][0]` for the first kind, `[case][1]` the other.
fn nine_cases(csv: &'static str, first_kind: &str) -> [[MomentRow; 2]; 9] {
    let mut table = std::array::from_fn(|_| {
        [MomentRow { short: None, long: None }, MomentRow { short: None, long: None }]
    });
    for row in rows(csv) {
        let Ok(case) = row[0].parse::<usize>() else { continue };
        let kind = usize::from(row[1] != first_kind);
        table[case - 1][kind] =
            MomentRow { short: by_ratio(&row, 2), long: row.get(10).and_then(|c| cell(c)) };
    }
    table
}

static TABLE_3_14: LazyLock<[[MomentRow; 2]; 9]> =
    LazyLock::new(|| nine_cases(include_str!("tables/table_3_14.csv"), "neg"));

static TABLE_3_15: LazyLock<[[MomentRow; 2]; 9]> =
    LazyLock::new(|| nine_cases(include_str!("tables/table_3_15.csv"), "cont"));

/// Table 3.13 (or equations 12 and 13): simply supported on four sides, corners free to lift.
/// `ratio` = ly/lx, 1 to 2.
#[must_use]
pub fn simply_supported(ratio: f64, how: Coefficients) -> MomentCoefficients {
    let (short_midspan, long_midspan) = match how {
        Coefficients::Tabulated => (interpolate(&TABLE_3_13[0], ratio), interpolate(&TABLE_3_13[1], ratio)),
        Coefficients::Equations => {
            let r2 = ratio * ratio;
            let r4 = r2 * r2;
            (r4 / (8.0 * (1.0 + r4)), r2 / (8.0 * (1.0 + r4)))
        }
    };
    MomentCoefficients { short_midspan, long_midspan, long_edge: None, short_edge: None }
}

/// Table 3.14 (or equations 14 to 18): restrained panels with torsion provided at corners.
/// `ratio` = ly/lx, 1 to 2.
#[must_use]
pub fn restrained(case: PanelCase, ratio: f64, how: Coefficients) -> MomentCoefficients {
    match how {
        Coefficients::Tabulated => {
            let [neg, pos] = &TABLE_3_14[case.number() - 1];
            MomentCoefficients {
                short_midspan: pos.short.as_ref().map_or(0.0, |row| interpolate(row, ratio)),
                long_midspan: pos.long.unwrap_or(0.0),
                long_edge: neg.short.as_ref().map(|row| interpolate(row, ratio)),
                short_edge: neg.long,
            }
        }
        Coefficients::Equations => by_equations(case, ratio),
    }
}

/// Equations 14 to 18 with hogging = 4/3 sagging and `beta_y` unrounded:
/// `beta_y` = (24 + 2 Nd + 1.5 Nd2)/1000;
/// gamma = (2/9)[3 - sqrt(18) (lx/ly) (sqrt(`beta_y` + `beta_1`) + sqrt(`beta_y` + `beta_2`))];
/// sqrt(gamma) = sqrt(`beta_x` + `beta_3`) + sqrt(`beta_x` + `beta_4`).
fn by_equations(case: PanelCase, ratio: f64) -> MomentCoefficients {
    const HOG: f64 = 4.0 / 3.0;
    let nd = case.nd();
    let beta_y = (24.0 + 2.0 * nd + 1.5 * nd * nd) / 1000.0;
    let (long_d, short_d) = (f64::from(case.long_discontinuous), f64::from(case.short_discontinuous));
    // An edge adds sqrt(1 + 4/3) where continuous and sqrt(1) where not.
    let edge_sum = |discontinuous: f64| discontinuous + (2.0 - discontinuous) * (1.0 + HOG).sqrt();
    let gamma = 2.0 / 9.0 * (3.0 - 18.0_f64.sqrt() / ratio * beta_y.sqrt() * edge_sum(short_d));
    let beta_x = gamma / edge_sum(long_d).powi(2);
    MomentCoefficients {
        short_midspan: beta_x,
        long_midspan: beta_y,
        long_edge: (case.long_discontinuous < 2).then_some(HOG * beta_x),
        short_edge: (case.short_discontinuous < 2).then_some(HOG * beta_y),
    }
}

/// Shear coefficients of a restrained panel (Table 3.15); all multiply n lx (equations 19, 20).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ShearCoefficients {
    /// `beta_vx` at a continuous long edge; none where the case has no such edge.
    pub long_continuous: Option<f64>,
    /// `beta_vx` at a discontinuous long edge.
    pub long_discontinuous: Option<f64>,
    /// `beta_vy` at a continuous short edge.
    pub short_continuous: Option<f64>,
    /// `beta_vy` at a discontinuous short edge.
    pub short_discontinuous: Option<f64>,
}

impl ShearCoefficients {
    /// The coefficient of a long or short edge by its continuity.
    #[must_use]
    pub fn edge(&self, long_edge: bool, continuous: bool) -> Option<f64> {
        match (long_edge, continuous) {
            (true, true) => self.long_continuous,
            (true, false) => self.long_discontinuous,
            (false, true) => self.short_continuous,
            (false, false) => self.short_discontinuous,
        }
    }
}

/// Table 3.15, linear interpolation between printed ratios; `ratio` = ly/lx, 1 to 2.
#[must_use]
pub fn shear(case: PanelCase, ratio: f64) -> ShearCoefficients {
    let [cont, disc] = &TABLE_3_15[case.number() - 1];
    ShearCoefficients {
        long_continuous: cont.short.as_ref().map(|row| interpolate(row, ratio)),
        long_discontinuous: disc.short.as_ref().map(|row| interpolate(row, ratio)),
        short_continuous: cont.long,
        short_discontinuous: disc.long,
    }
}
