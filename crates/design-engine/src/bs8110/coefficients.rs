//! Moment and shear coefficients of two-way panels (Tables 3.13, 3.14, 3.15).

/// Case of the two-way tables by the edges of the panel.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct PanelCase {
    /// Number of discontinuous long edges (parallel to the long span), 0 to 2.
    pub long_discontinuous: u8,
    /// Number of discontinuous short edges, 0 to 2.
    pub short_discontinuous: u8,
}

impl PanelCase {
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
}
