//! What the design of a floor gives: panels with their sections and checks, supports with their bars.

use crate::bs8110::anchorage::EndAnchorageWorking;
use crate::bs8110::coefficients::PanelCase;
use crate::bs8110::corners::CornerState;
use crate::check::{Check, CheckKind, Place};
use crate::floor::{Axis, BarChoice, EdgeState, Layer, PanelId, PanelOpening, Side, Span, SupportId};
use crate::query::Query;

/// How a panel carries its load.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Action {
    /// Two-way, Table 3.14.
    TwoWayRestrained,
    /// Two-way, Table 3.13.
    TwoWaySimplySupported,
    /// One-way.
    OneWay,
    /// Cantilever.
    Cantilever,
}

impl Action {
    /// The words printed for it.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Action::TwoWayRestrained => "two-way restrained",
            Action::TwoWaySimplySupported => "two-way simply supported",
            Action::OneWay => "one-way",
            Action::Cantilever => "cantilever",
        }
    }
}

/// Loads of a panel, kN/m2.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LoadBuildUp {
    /// Thickness times density.
    pub self_weight_kn_m2: f64,
    /// Finishes.
    pub finishes_kn_m2: f64,
    /// Partitions.
    pub partitions_kn_m2: f64,
    /// gk: self-weight, finishes and partitions.
    pub dead_kn_m2: f64,
    /// qk.
    pub imposed_kn_m2: f64,
    /// n.
    pub ultimate_kn_m2: f64,
}

/// Geometry and action of a panel as designed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Basis {
    /// Plan axis of the short span.
    pub short_along: Axis,
    /// Effective short span, m.
    pub lx_m: f64,
    /// Effective long span, m.
    pub ly_m: f64,
    /// How it carries.
    pub action: Action,
    /// The span that carries: of a two-way panel the short one.
    pub main_span: Span,
    /// Case of the two-way tables; none for one-way action and cantilevers.
    pub case: Option<PanelCase>,
    /// Edge states as they count in the panel's own case, in the order of [`crate::floor::Side::ALL`]: an edge
    /// whose moment comes from a cantilever alone counts as discontinuous.
    pub states: [EdgeState; 4],
}

impl Basis {
    /// ly/lx.
    #[must_use]
    pub fn span_ratio(&self) -> f64 {
        self.ly_m / self.lx_m
    }

    /// Plan axis of a span.
    #[must_use]
    pub fn axis_of(&self, span: Span) -> Axis {
        match span {
            Span::Short => self.short_along,
            Span::Long => self.short_along.across(),
        }
    }

    /// State of a side as it counts in the panel's own case.
    #[must_use]
    pub fn state(&self, side: Side) -> EdgeState {
        self.states[side.index()]
    }

    /// Which span lies along a plan axis.
    #[must_use]
    pub fn span_along(&self, axis: Axis) -> Span {
        if axis == self.short_along { Span::Short } else { Span::Long }
    }

    /// Effective length of a span, m.
    #[must_use]
    pub fn length_m(&self, span: Span) -> f64 {
        match span {
            Span::Short => self.lx_m,
            Span::Long => self.ly_m,
        }
    }
}

/// One design section of a panel: the calculation from moment to bars.
#[derive(Debug, Clone, PartialEq)]
pub struct Section {
    /// Where.
    pub at: Place,
    /// The support whose bars serve it; none at midspan.
    pub support: Option<SupportId>,
    /// Layer its bars lie in; its first letter tells the face.
    pub layer: Layer,
    /// Plan axis its bars run along (a loose panel's short span is x).
    pub bars_along: Axis,
    /// Moment coefficient; none for distribution and crossing bars.
    pub coefficient: Option<f64>,
    /// Moment straight from the coefficient, kNm/m.
    pub moment_from_coefficient_knm_m: Option<f64>,
    /// Moment after balancing, kNm/m.
    pub moment_balanced_knm_m: Option<f64>,
    /// Design moment, kNm/m.
    pub moment_knm_m: Option<f64>,
    /// Effective depth, mm.
    pub d_mm: f64,
    /// K = M/(b d2 fcu).
    pub k: Option<f64>,
    /// Lever arm, mm; none where K exceeds K'.
    pub z_mm: Option<f64>,
    /// Steel for bending, mm2/m; none where K exceeds K'.
    pub as_bending_mm2_m: Option<f64>,
    /// Minimum steel, mm2/m.
    pub as_minimum_mm2_m: f64,
    /// Steel required, mm2/m; none where K exceeds K'.
    pub as_required_mm2_m: Option<f64>,
    /// Bars provided.
    pub bars: BarChoice,
    /// Steel provided, mm2/m.
    pub as_provided_mm2_m: f64,
    /// True where the book chose the bars.
    pub stated: bool,
}

/// Working of the deflection check.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct DeflectionWorking {
    /// Basic span/depth (Table 3.9).
    pub basic: f64,
    /// Service stress fs, N/mm2.
    pub fs_n_mm2: f64,
    /// Modification factor (Table 3.10).
    pub modification_factor: f64,
}

/// Load that a panel puts on the support along one of its sides (3.5.3.7), per metre of the loaded length.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SideLoad {
    /// Characteristic dead load, kN/m.
    pub dead_kn_m: f64,
    /// Characteristic imposed load, kN/m.
    pub imposed_kn_m: f64,
    /// Ultimate load, kN/m.
    pub ultimate_kn_m: f64,
    /// Share of the edge, about its middle, that is loaded: 0.75 of a two-way panel's, all of a one-way panel's.
    pub loaded_share: f64,
}

/// Torsion steel at one corner (3.5.3.5).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CornerDesign {
    /// The north or south side, and the east or west side, that meet there.
    pub sides: [Side; 2],
    /// Continuity of its edges.
    pub state: CornerState,
    /// Extent from both edges, m: lx/5.
    pub extent_m: f64,
    /// Required in each of four layers, mm2/m.
    pub as_required_mm2_m: f64,
    /// Already there: bottom along x, bottom along y, top along x, top along y, mm2/m. At a discontinuous edge the
    /// top bars are those of 3.12.10.3.2: half the bottom steel in that direction, not under the minimum.
    pub as_present_mm2_m: [f64; 4],
    /// To be added in the same four layers, mm2/m.
    pub as_to_add_mm2_m: [f64; 4],
}

impl CornerDesign {
    /// `north-east` and so on.
    #[must_use]
    pub fn name(&self) -> String {
        format!("{}-{}", self.sides[0].word(), self.sides[1].word())
    }
}

/// Bars of one layer that an opening cuts.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CutLayer {
    /// The layer.
    pub layer: Layer,
    /// Axis its bars run along.
    pub bars_along: Axis,
    /// The section whose bars they are.
    pub at: Place,
    /// The bars.
    pub bars: BarChoice,
    /// Number of bars cut, at most.
    pub cut: f64,
    /// Trimming steel on each side of the opening, mm2: half of what is cut.
    pub each_side_mm2: f64,
}

/// One opening of a designed panel.
#[derive(Debug, Clone, PartialEq)]
pub struct OpeningDesign {
    /// Where it is.
    pub opening: PanelOpening,
    /// True where bars are moved aside and none is cut.
    pub displaced: bool,
    /// Layers cut; empty where displaced.
    pub layers: Vec<CutLayer>,
    /// True where it is wider than a quarter of a span: outside the coefficient method.
    pub over_quarter_of_span: bool,
    /// True where it lies within d of a support's face: outside the coefficient method.
    pub within_d_of_support: bool,
}

/// Bottom bars along one span.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct BottomBarsDesign {
    /// The bars of the middle strip.
    pub bars: BarChoice,
    /// The bars of the edge strips where they differ (3.5.3.5).
    pub edge_strip: Option<BarChoice>,
    /// True where alternate bars stop short of the supports.
    pub alternate_stop: bool,
    /// Anchorage at the lesser and the greater end; none where the bars run to the centre line of a continuous support, or
    /// to a free edge.
    pub ends: [Option<EndAnchorageWorking>; 2],
}

/// Top bars along a discontinuous edge, at right angles to it (3.12.10.3.2).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct EdgeBars {
    /// The bars.
    pub bars: BarChoice,
    /// Half of the bottom steel in that direction, not under the minimum, mm2/m.
    pub as_required_mm2_m: f64,
    /// How far they reach past the support face, m.
    pub extension_m: f64,
    /// Their layer.
    pub layer: Layer,
    /// Size of the bars outside them, mm.
    pub outside_mm: f64,
}

/// Bars of a panel beside those over its supports.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct PanelBars {
    /// Bottom bars along the short and the long span; none in a cantilever.
    pub bottom: [Option<BottomBarsDesign>; 2],
    /// Top bars at each side, in the order of [`crate::floor::Side::ALL`]; none where the whole side is continuous or free.
    pub edges: [Option<EdgeBars>; 4],
}

/// A panel's design.
#[derive(Debug, Clone, PartialEq)]
pub struct PanelDesign {
    /// Which panel.
    pub panel: PanelId,
    /// Why it was not designed; sections and checks are then empty.
    pub not_designed: Option<String>,
    /// Geometry and action; none where not even that could be settled.
    pub basis: Option<Basis>,
    /// Edge states as designed, in the order of [`crate::floor::Side::ALL`].
    pub edge_states: [EdgeState; 4],
    /// Loads.
    pub loads: LoadBuildUp,
    /// Sections: the two midspans, then each support segment in the order of sides.
    pub sections: Vec<Section>,
    /// Checks in a fixed order.
    pub checks: Vec<Check>,
    /// Corners of a restrained two-way panel; empty for the others.
    pub corners: Vec<CornerDesign>,
    /// Openings, in book order.
    pub openings: Vec<OpeningDesign>,
    /// Loads on the supports along its sides, in the order of [`crate::floor::Side::ALL`].
    pub side_loads: [Option<SideLoad>; 4],
    /// Ultimate load of the whole panel, walls in, kN.
    pub total_ultimate_kn: f64,
    /// What is to be made of its bottom bars and of the top bars at its discontinuous edges.
    pub bars: PanelBars,
    /// Working of deflection; none where not designed.
    pub deflection: Option<DeflectionWorking>,
    /// The governing check, an index into `checks`.
    pub governing: Option<usize>,
    /// The check that fails first when the panel is made thinner.
    pub thickness_governed_by: Option<CheckKind>,
    /// Where deflection fails: the least thickness that would pass, mm, if any up to 1000 mm does.
    pub least_thickness_mm: Option<f64>,
}

impl PanelDesign {
    /// True where it is designed and every check passes.
    #[must_use]
    pub fn ok(&self) -> bool {
        self.not_designed.is_none() && self.checks.iter().all(|check| check.ok)
    }

    /// The governing check.
    #[must_use]
    pub fn governing_check(&self) -> Option<&Check> {
        self.governing.and_then(|index| self.checks.get(index))
    }

    /// The section at a place (the first, where an edge has several supports).
    #[must_use]
    pub fn section(&self, at: Place) -> Option<&Section> {
        self.sections.iter().find(|section| section.at == at)
    }
}

/// One panel's side of a support as designed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SupportSideDesign {
    /// The panel.
    pub panel: PanelId,
    /// Support moment from its own coefficient, kNm/m; none for crossing bars.
    pub moment_from_coefficient_knm_m: Option<f64>,
    /// Midspan moment across the support before balancing, kNm/m.
    pub midspan_before_knm_m: f64,
    /// Midspan moment after balancing, kNm/m; may be below zero.
    pub midspan_after_knm_m: f64,
    /// Stiffness of its span h3/l with the factor for the far end, mm3/m.
    pub stiffness: f64,
    /// How far the bars that go furthest reach past the support face into this panel, m.
    pub extension_m: f64,
    /// How far the alternate bars reach, m; equal to `extension_m` where all run the full extent.
    pub short_extension_m: f64,
    /// True where a point of contraflexure set the extension (3.5.3.6 e).
    pub from_contraflexure: bool,
    /// True where the bars run on through this panel to the support on its far side (section 10 of the rules).
    pub runs_through: bool,
    /// Distribution bars in the other top layer.
    pub distribution: Option<BarChoice>,
}

/// A support's design.
#[derive(Debug, Clone, PartialEq)]
pub struct SupportDesign {
    /// Which support.
    pub support: SupportId,
    /// Near side, then far side where it is shared and both sides are designed.
    pub sides: Vec<SupportSideDesign>,
    /// True where the two moments differed by more than the threshold and were balanced.
    pub balanced: bool,
    /// Design moment, kNm/m; none for crossing bars.
    pub moment_knm_m: Option<f64>,
    /// Difference of the two coefficient moments in percent of the larger; none with one side.
    pub difference_pct: Option<f64>,
    /// Ratio lesser/greater of the neighbours' ultimate loads and of their spans (3.5.3.5); none with one side.
    pub load_ratio: Option<f64>,
    /// See `load_ratio`.
    pub span_ratio: Option<f64>,
    /// Layer of its bars.
    pub layer: Layer,
    /// Size of the bars outside them, mm; 0 for T1.
    pub outside_mm: f64,
    /// Effective depth, mm: the lesser of the two sides.
    pub d_mm: f64,
    /// Steel for bending, mm2/m; none where K exceeds K' or no moment is claimed.
    pub as_bending_mm2_m: Option<f64>,
    /// Steel required, mm2/m; none where K exceeds K'.
    pub as_required_mm2_m: Option<f64>,
    /// Bars.
    pub bars: BarChoice,
    /// Steel provided, mm2/m.
    pub as_provided_mm2_m: f64,
    /// True where alternate bars are reversed; else all run the full extent.
    pub alternate_reversed: bool,
    /// True where the book chose the bars.
    pub stated: bool,
}

/// A floor's design.
#[derive(Debug, Clone, PartialEq)]
pub struct FloorDesign {
    /// Panels in the order of the floor.
    pub panels: Vec<PanelDesign>,
    /// Designed supports in the order of the floor; a support between undesigned panels is left out.
    pub supports: Vec<SupportDesign>,
    /// What the design has to say, in the order of panels.
    pub queries: Vec<Query>,
    /// Assumptions made for this floor, to be printed.
    pub assumptions: Vec<String>,
}

impl FloorDesign {
    /// True where every panel is designed and every check passes.
    #[must_use]
    pub fn ok(&self) -> bool {
        self.panels.iter().all(PanelDesign::ok)
    }

    /// A support's design, if it was designed.
    #[must_use]
    pub fn support(&self, id: SupportId) -> Option<&SupportDesign> {
        self.supports.binary_search_by_key(&id, |support| support.support).ok().map(|i| &self.supports[i])
    }
}
