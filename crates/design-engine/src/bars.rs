//! Bars as they are made: mass (BS 4449, 7850 kg/m3), bend radius and least end projection (BS 8666:2005
//! Table 2).

/// One bar size.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct BarSize {
    /// Nominal size, mm.
    pub size_mm: f64,
    /// Mass, kg/m.
    pub mass_kg_m: f64,
    /// Least radius for scheduling r, mm.
    pub radius_mm: f64,
    /// Least end projection P of a bend, mm.
    pub projection_mm: f64,
}

const fn bar(size_mm: f64, mass_kg_m: f64, radius_mm: f64, projection_mm: f64) -> BarSize {
    BarSize { size_mm, mass_kg_m, radius_mm, projection_mm }
}

/// Every size covered, least first.
pub const BAR_SIZES: [BarSize; 8] = [
    bar(6.0, 0.222, 12.0, 110.0),
    bar(8.0, 0.395, 16.0, 115.0),
    bar(10.0, 0.616, 20.0, 120.0),
    bar(12.0, 0.888, 24.0, 125.0),
    bar(16.0, 1.579, 32.0, 130.0),
    bar(20.0, 2.466, 70.0, 190.0),
    bar(25.0, 3.854, 87.0, 240.0),
    bar(32.0, 6.313, 112.0, 305.0),
];

/// The size nearest above a nominal size in mm; the largest where there is none.
#[must_use]
pub fn bar_size(size_mm: f64) -> BarSize {
    *BAR_SIZES.iter().find(|bar| bar.size_mm >= size_mm - 1e-9).unwrap_or(&BAR_SIZES[7])
}
