//! A check: what, where, clause, demand, limit.

use crate::floor::Side;

/// Which check it is.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum CheckKind {
    /// Steel for bending against steel provided, or K against K' where the section is too thin.
    Bending,
    /// Shear stress against vc, or against the absolute limit.
    Shear,
    /// Span/depth.
    Deflection,
    /// End anchorage of bottom bars at a discontinuous edge.
    BondAtSupport,
    /// Minimum steel.
    MinimumSteel,
    /// Maximum steel.
    MaximumSteel,
    /// Greatest clear spacing, and the greatest spacing of the criteria.
    BarSpacing,
    /// Least clear gap between bars, and the least spacing of the criteria.
    BarGap,
    /// Cover for durability.
    CoverForDurability,
    /// Cover for fire.
    CoverForFire,
    /// Cover not less than the bar size or the aggregate.
    CoverForBarAndAggregate,
    /// Thickness for fire.
    ThicknessForFire,
    /// A cantilever lifting the far support of its back-span.
    Uplift,
    /// Covers and layers of bars within the thickness.
    LayersFit,
}

impl CheckKind {
    /// Every kind, in the order of printing.
    pub const ALL: [CheckKind; 14] = [
        CheckKind::Bending,
        CheckKind::Shear,
        CheckKind::Deflection,
        CheckKind::BondAtSupport,
        CheckKind::MinimumSteel,
        CheckKind::MaximumSteel,
        CheckKind::BarSpacing,
        CheckKind::BarGap,
        CheckKind::CoverForDurability,
        CheckKind::CoverForFire,
        CheckKind::CoverForBarAndAggregate,
        CheckKind::ThicknessForFire,
        CheckKind::Uplift,
        CheckKind::LayersFit,
    ];

    /// Its name in every output.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            CheckKind::Bending => "bending",
            CheckKind::Shear => "shear",
            CheckKind::Deflection => "deflection",
            CheckKind::BondAtSupport => "bond at support",
            CheckKind::MinimumSteel => "minimum steel",
            CheckKind::MaximumSteel => "maximum steel",
            CheckKind::BarSpacing => "bar spacing",
            CheckKind::BarGap => "bar gap",
            CheckKind::CoverForDurability => "cover for durability",
            CheckKind::CoverForFire => "cover for fire",
            CheckKind::CoverForBarAndAggregate => "cover for bar and aggregate",
            CheckKind::ThicknessForFire => "thickness for fire",
            CheckKind::Uplift => "uplift at far support",
            CheckKind::LayersFit => "layers fit",
        }
    }

    /// True for checks of strength and stiffness; the others govern only where they fail.
    #[must_use]
    pub fn may_govern_while_passing(self) -> bool {
        matches!(
            self,
            CheckKind::Bending | CheckKind::Shear | CheckKind::Deflection | CheckKind::BondAtSupport
        )
    }
}

/// Where in a panel a section or a check is.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Place {
    /// Midspan, bars along the short span.
    ShortMidspan,
    /// Midspan, bars along the long span.
    LongMidspan,
    /// At a side.
    Side(Side),
    /// The bottom face over the whole panel.
    BottomFace,
    /// The top face over the whole panel.
    TopFace,
    /// The panel as a whole.
    Panel,
}

impl Place {
    /// Its name in outputs; a loose panel names its sides as long and short edges.
    #[must_use]
    pub fn word(self, loose: bool) -> &'static str {
        match self {
            Place::ShortMidspan => "short midspan",
            Place::LongMidspan => "long midspan",
            Place::BottomFace => "bottom face",
            Place::TopFace => "top face",
            Place::Panel => "panel",
            Place::Side(side) if loose => side.loose_word(),
            Place::Side(Side::North) => "north support",
            Place::Side(Side::East) => "east support",
            Place::Side(Side::South) => "south support",
            Place::Side(Side::West) => "west support",
        }
    }
}

/// One check of a panel.
#[derive(Debug, Clone, PartialEq)]
pub struct Check {
    /// Which.
    pub kind: CheckKind,
    /// Where.
    pub at: Place,
    /// Clause or table of BS 8110-1:1997 (or book) it comes from.
    pub clause: &'static str,
    /// What the section asks or has, in `unit`.
    pub demand: f64,
    /// What is allowed, in `unit`; infinite where a thing is not allowed at all is never used: see `ratio`.
    pub limit: f64,
    /// Unit of demand and limit.
    pub unit: &'static str,
    /// Written so that at most 1 passes; none where the thing is not allowed at all.
    pub ratio: Option<f64>,
    /// Whether it passes.
    pub ok: bool,
}

/// Ratios this close above 1 still pass: the same sum taken in another order must not change a verdict.
pub const RATIO_TOLERANCE: f64 = 1e-9;

impl Check {
    /// Demand must not exceed limit.
    #[must_use]
    pub fn at_most(
        kind: CheckKind,
        at: Place,
        clause: &'static str,
        demand: f64,
        limit: f64,
        unit: &'static str,
    ) -> Check {
        let ratio = if demand <= 0.0 { 0.0 } else { demand / limit };
        Check {
            kind,
            at,
            clause,
            demand,
            limit,
            unit,
            ratio: Some(ratio),
            ok: ratio <= 1.0 + RATIO_TOLERANCE,
        }
    }

    /// A thing that is not allowed at all.
    #[must_use]
    pub fn not_allowed(
        kind: CheckKind,
        at: Place,
        clause: &'static str,
        demand: f64,
        limit: f64,
        unit: &'static str,
    ) -> Check {
        Check { kind, at, clause, demand, limit, unit, ratio: None, ok: false }
    }
}
