//! Bars as they are bent: shapes of BS 8666:2005 (bent to centre-line lengths; the international counterpart of its shapes is
//! ISO 3766), all lengths in mm.

use std::fmt;

use design_engine::bars::{BarSize, bar_size};

/// Dimensions go to whole 5 mm (BS 8666:2005, Table 3 note).
const DIMENSION_STEP_MM: f64 = 5.0;
/// The length of a bar goes up to whole 25 mm (BS 8666:2005, 8; from memory).
const LENGTH_STEP_MM: f64 = 25.0;

/// A shape with its dimensions as scheduled.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Shape {
    /// 00: straight.
    Straight {
        /// Its length.
        a: f64,
    },
    /// 11: one bend of 90 degrees.
    Bent {
        /// Along the slab.
        a: f64,
        /// The leg.
        b: f64,
    },
    /// 13: a semi-circular bend.
    Hairpin {
        /// First leg, to the outside of the bend.
        a: f64,
        /// Outside to outside across the bend.
        b: f64,
        /// Last leg, to the outside of the bend.
        c: f64,
    },
    /// 21: two bends of 90 degrees to one side.
    Double {
        /// First leg.
        a: f64,
        /// Between the bends.
        b: f64,
        /// Last leg.
        c: f64,
    },
}

/// Why a shape cannot be bent.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ShapeFault {
    /// The dimension.
    pub dimension: char,
    /// Its value, mm.
    pub value_mm: f64,
    /// The least it may be, mm.
    pub least_mm: f64,
}

impl fmt::Display for ShapeFault {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(
            f,
            "dimension {} is {} mm, at least {} mm are needed",
            self.dimension, self.value_mm, self.least_mm
        )
    }
}

/// Down to whole 5 mm: where a bar must not grow.
#[must_use]
pub fn down_to_5(mm: f64) -> f64 {
    ((mm + 1e-6) / DIMENSION_STEP_MM).floor() * DIMENSION_STEP_MM
}

/// Up to whole 5 mm.
#[must_use]
pub fn up_to_5(mm: f64) -> f64 {
    ((mm - 1e-6) / DIMENSION_STEP_MM).ceil() * DIMENSION_STEP_MM
}

/// Up to whole 25 mm.
#[must_use]
pub fn up_to_25(mm: f64) -> f64 {
    ((mm - 1e-6) / LENGTH_STEP_MM).ceil() * LENGTH_STEP_MM
}

/// Down to whole 25 mm.
#[must_use]
pub fn down_to_25(mm: f64) -> f64 {
    ((mm + 1e-6) / LENGTH_STEP_MM).floor() * LENGTH_STEP_MM
}

impl Shape {
    /// `00`, `11`, `13` or `21`.
    #[must_use]
    pub fn code(self) -> &'static str {
        match self {
            Shape::Straight { .. } => "00",
            Shape::Bent { .. } => "11",
            Shape::Hairpin { .. } => "13",
            Shape::Double { .. } => "21",
        }
    }

    /// A, B, C, D, E/R; none where the form leaves the column blank.
    #[must_use]
    pub fn dimensions(self) -> [Option<f64>; 5] {
        match self {
            Shape::Straight { a } => [Some(a), None, None, None, None],
            Shape::Bent { a, b } => [Some(a), Some(b), None, None, None],
            Shape::Hairpin { a, b, c } | Shape::Double { a, b, c } => [Some(a), Some(b), Some(c), None, None],
        }
    }

    /// Length of the bar before rounding (BS 8666:2005, Table 3): 00 A; 11 A + B - 0.5 r - d;
    /// 13 A + 0.57 B + C - 1.6 d; 21 A + B + C - r - 2 d.
    #[must_use]
    pub fn exact_length_mm(self, size_mm: f64) -> f64 {
        let BarSize { radius_mm: r, .. } = bar_size(size_mm);
        match self {
            Shape::Straight { a } => a,
            Shape::Bent { a, b } => a + b - 0.5 * r - size_mm,
            Shape::Hairpin { a, b, c } => a + 0.57 * b + c - 1.6 * size_mm,
            Shape::Double { a, b, c } => a + b + c - r - 2.0 * size_mm,
        }
    }

    /// Length of the bar as scheduled: up to whole 25 mm; a straight bar is cut to its A, which is whole 25 mm where there is
    /// room and whole 5 mm where there is not.
    #[must_use]
    pub fn length_mm(self, size_mm: f64) -> f64 {
        match self {
            Shape::Straight { a } => a,
            _ => up_to_25(self.exact_length_mm(size_mm)),
        }
    }

    /// Whether it can be bent: 11: A and B, 13 and 21: A and C at least the end projection P of BS 8666:2005 Table 2; 13: B at
    /// least 2 (r + d), A and C at least B/2 + 5 d; 21: B at least 2 r + 6 d, so that 4 d between the bends are straight.
    ///
    /// # Errors
    /// The first dimension that is too short.
    pub fn check(self, size_mm: f64) -> Result<(), ShapeFault> {
        let BarSize { radius_mm: r, projection_mm: p, .. } = bar_size(size_mm);
        let least = |dimension, value_mm: f64, least_mm: f64| {
            if value_mm < least_mm - 1e-6 {
                Err(ShapeFault { dimension, value_mm, least_mm })
            } else {
                Ok(())
            }
        };
        match self {
            Shape::Straight { a } => least('A', a, DIMENSION_STEP_MM),
            Shape::Bent { a, b } => least('A', a, p).and_then(|()| least('B', b, p)),
            Shape::Double { a, b, c } => least('A', a, p)
                .and_then(|()| least('B', b, least_between_bends(size_mm)))
                .and_then(|()| least('C', c, p)),
            Shape::Hairpin { a, b, c } => {
                let leg = p.max(b / 2.0 + 5.0 * size_mm);
                least('A', a, leg)
                    .and_then(|()| least('B', b, 2.0 * (r + size_mm)))
                    .and_then(|()| least('C', c, leg))
            }
        }
    }
}

/// Least dimension outside to outside between two bends to one side, mm: 2 r + 6 d, of which 4 d are straight (BS 8666:2005,
/// 8; from memory).
#[must_use]
pub fn least_between_bends(size_mm: f64) -> f64 {
    2.0 * bar_size(size_mm).radius_mm + 6.0 * size_mm
}

/// Mass of a bar, kg (BS 4449, the rounded masses per metre).
#[must_use]
pub fn mass_kg(size_mm: f64, length_mm: f64) -> f64 {
    bar_size(size_mm).mass_kg_m * length_mm / 1000.0
}
