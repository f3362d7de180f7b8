//! The allowed range of every number a floor book may hold, in one place.

/// A closed range of numbers.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Range {
    /// Least allowed.
    pub least: f64,
    /// Greatest allowed.
    pub greatest: f64,
}

impl Range {
    /// A range from `least` to `greatest`, both allowed.
    #[must_use]
    pub const fn new(least: f64, greatest: f64) -> Range {
        Range { least, greatest }
    }

    /// Whether a number lies in it; never for NaN.
    #[must_use]
    pub fn contains(&self, number: f64) -> bool {
        number >= self.least && number <= self.greatest
    }

    /// In words: `0 to 50`.
    #[must_use]
    pub fn describe(&self) -> String {
        format!("{} to {}", self.least, self.greatest)
    }
}

/// Slab thickness, mm.
pub const THICKNESS_MM: Range = Range::new(75.0, 1000.0);
/// Finishes or partitions, kN/m2.
pub const DEAD_KN_M2: Range = Range::new(0.0, 50.0);
/// Imposed load, kN/m2.
pub const IMPOSED_KN_M2: Range = Range::new(0.0, 50.0);
/// Plan position of a gridline, m.
pub const POSITION_M: Range = Range::new(-10_000.0, 10_000.0);
/// Span of a panel, m.
pub const SPAN_M: Range = Range::new(0.3, 30.0);
/// Level of a panel's top against the floor's datum, mm.
pub const TOP_LEVEL_MM: Range = Range::new(-10_000.0, 10_000.0);
/// Width of a supporting beam or wall, mm.
pub const SUPPORT_WIDTH_MM: Range = Range::new(50.0, 2000.0);
/// Centre-to-centre spacing of bars, mm.
pub const SPACING_MM: Range = Range::new(50.0, 600.0);
/// Nominal cover, mm.
pub const COVER_MM: Range = Range::new(10.0, 100.0);
/// Line load of a wall, kN/m.
pub const LINE_LOAD_KN_M: Range = Range::new(0.0, 500.0);
/// A length or offset within a panel, m.
pub const WITHIN_PANEL_M: Range = Range::new(0.0, 30.0);
/// Bar sizes with a mass in BS 4449 and a bend radius in BS 8666:2005, mm.
pub const BAR_SIZES_MM: &[f64] = &[6.0, 8.0, 10.0, 12.0, 16.0, 20.0, 25.0, 32.0];
/// Characteristic yield strengths covered, N/mm2.
pub const FY_N_MM2: &[f64] = &[250.0, 460.0, 500.0];
/// Fire resistance periods of Table 3.4, h.
pub const FIRE_H: &[f64] = &[0.5, 1.0, 1.5, 2.0, 3.0, 4.0];
