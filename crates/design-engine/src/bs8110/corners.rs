//! Torsion steel at corners held down (3.5.3.5).

/// Continuity of the two edges that meet at a corner.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum CornerState {
    /// Both discontinuous: full torsion steel.
    NeitherContinuous,
    /// One continuous: half of it.
    OneContinuous,
    /// Both continuous: none.
    BothContinuous,
}

impl CornerState {
    /// From the continuity of the two edges at the corner.
    #[must_use]
    pub fn of(edges_continuous: [bool; 2]) -> CornerState {
        match edges_continuous {
            [false, false] => CornerState::NeitherContinuous,
            [true, true] => CornerState::BothContinuous,
            _ => CornerState::OneContinuous,
        }
    }

    /// The words printed for it.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            CornerState::NeitherContinuous => "both edges discontinuous",
            CornerState::OneContinuous => "one edge continuous",
            CornerState::BothContinuous => "both edges continuous",
        }
    }
}

/// Torsion steel in each of four layers (two top, two bottom), mm2/m: 0.75 of the bending steel of the greatest midspan
/// moment, half of that where one edge is continuous, none where both are (3.5.3.5).
#[must_use]
pub fn torsion_steel(state: CornerState, midspan_bending_steel_mm2_m: f64) -> f64 {
    match state {
        CornerState::NeitherContinuous => 0.75 * midspan_bending_steel_mm2_m,
        CornerState::OneContinuous => 0.375 * midspan_bending_steel_mm2_m,
        CornerState::BothContinuous => 0.0,
    }
}

/// Extent of torsion steel from both edges, m: a fifth of the shorter span.
#[must_use]
pub fn torsion_extent_m(lx_m: f64) -> f64 {
    lx_m / 5.0
}
