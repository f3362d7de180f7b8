//! The layout of a floor as its book gives it: gridlines and rows, with every blank already filled from
//! the criteria. Only gridline names live here; a [`design_engine::floor::Floor`] carries plan geometry.

use design_engine::floor::{AreaLoads, Axis, BarChoice, Corners, Side, Spanning, TenthMm};

/// A gridline.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Gridline {
    /// Its name, unique among all gridlines.
    pub name: String,
    /// [`Axis::X`]: stands at one x and runs north. [`Axis::Y`]: stands at one y and runs east.
    pub axis: Axis,
    /// Where it stands.
    pub position: TenthMm,
}

/// Index of a gridline in [`Layout::gridlines`].
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub struct GridlineId(pub usize);

/// An edge state that the book states.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum StatedEdge {
    /// Continuous.
    Continuous,
    /// Discontinuous.
    Discontinuous,
    /// No support.
    Free,
}

/// What the rows of `Panels` and `Loose panels` have in common.
#[derive(Debug, Clone, PartialEq)]
pub struct PanelData {
    /// Mark, unique over both sheets.
    pub mark: String,
    /// Slab thickness, mm.
    pub thickness_mm: f64,
    /// Loads besides self-weight.
    pub loads: AreaLoads,
    /// What the book asks of its action.
    pub spanning: Spanning,
    /// Corners held down or free to lift.
    pub corners: Corners,
    /// True where the row itself states its corners.
    pub corners_stated: bool,
    /// Remark of the row; the reason of its stated edges.
    pub remarks: String,
}

/// A row of `Panels`: a rectangle between gridlines.
#[derive(Debug, Clone, PartialEq)]
pub struct GridPanel {
    /// Mark, thickness, loads, action.
    pub data: PanelData,
    /// Gridline `X from`.
    pub x_from: GridlineId,
    /// Gridline `X to`.
    pub x_to: GridlineId,
    /// Gridline `Y from`.
    pub y_from: GridlineId,
    /// Gridline `Y to`.
    pub y_to: GridlineId,
    /// Level of its top against the floor's datum, mm.
    pub top_level_mm: f64,
    /// Stated edges in the order of [`Side::ALL`].
    pub stated_edges: [Option<StatedEdge>; 4],
    /// Zone for the comparison of thicknesses; empty where none is given.
    pub zone: String,
}

/// A row of `Loose panels`: a panel without a place on plan.
#[derive(Debug, Clone, PartialEq)]
pub struct LoosePanel {
    /// Mark, thickness, loads, action. `Spanning::OneWay(Axis::X)` carries along the short span.
    pub data: PanelData,
    /// Short span, m.
    pub short_span_m: f64,
    /// Long span, m.
    pub long_span_m: f64,
    /// Long edges 1 and 2, short edges 1 and 2.
    pub edges: [StatedEdge; 4],
}

/// A stretch of a gridline between two crossing gridlines; blank ends reach to its ends.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Stretch {
    /// The gridline.
    pub gridline: GridlineId,
    /// Crossing gridline at its start.
    pub from: Option<GridlineId>,
    /// Crossing gridline at its end.
    pub to: Option<GridlineId>,
}

/// Kind of a support.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum LineSupportKind {
    /// A beam.
    Beam,
    /// A wall.
    Wall,
    /// Nothing: edges on it are free.
    None,
}

/// A row of `Supports`.
#[derive(Debug, Clone, PartialEq)]
pub struct LineSupport {
    /// Where.
    pub stretch: Stretch,
    /// Beam, wall or none.
    pub kind: LineSupportKind,
    /// Width, mm.
    pub width_mm: f64,
    /// Remark.
    pub remark: String,
}

/// A row of `Joints`.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Joint {
    /// Where.
    pub stretch: Stretch,
    /// Remark.
    pub remark: String,
}

/// A row of `Openings`.
#[derive(Debug, Clone, PartialEq)]
pub struct Opening {
    /// Mark of its panel.
    pub panel: String,
    /// Distance of its west side from the panel's west edge, m.
    pub from_west_m: f64,
    /// Distance of its south side from the panel's south edge, m.
    pub from_south_m: f64,
    /// Width along x, m.
    pub width_x_m: f64,
    /// Width along y, m.
    pub width_y_m: f64,
    /// Remark.
    pub remark: String,
}

/// A row of `Wall loads`.
#[derive(Debug, Clone, PartialEq)]
pub struct WallLoad {
    /// Mark of its panel.
    pub panel: String,
    /// Direction the wall runs along.
    pub along: Axis,
    /// Distance from the west (along y) or south (along x) edge, m.
    pub offset_m: f64,
    /// Start along the wall, m.
    pub from_m: f64,
    /// End along the wall, m.
    pub to_m: f64,
    /// Characteristic permanent load, kN/m.
    pub load_kn_m: f64,
    /// Remark.
    pub remark: String,
}

/// Place of a choice of bars.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum ChosenPosition {
    /// Bottom bars along the short span.
    ShortBottom,
    /// Bottom bars along the long span.
    LongBottom,
    /// Top bars over the support on a side.
    Top(Side),
}

/// A row of `Chosen bars`.
#[derive(Debug, Clone, PartialEq)]
pub struct ChosenBars {
    /// Mark of the panel.
    pub panel: String,
    /// Where.
    pub position: ChosenPosition,
    /// Size and spacing.
    pub bars: BarChoice,
    /// Remark.
    pub remark: String,
}

/// A floor's layout as read.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Layout {
    /// Gridlines in book order.
    pub gridlines: Vec<Gridline>,
    /// Rows of `Panels`.
    pub panels: Vec<GridPanel>,
    /// Rows of `Loose panels`.
    pub loose_panels: Vec<LoosePanel>,
    /// Rows of `Joints`.
    pub joints: Vec<Joint>,
    /// Rows of `Supports`.
    pub supports: Vec<LineSupport>,
    /// Rows of `Openings`.
    pub openings: Vec<Opening>,
    /// Rows of `Wall loads`.
    pub wall_loads: Vec<WallLoad>,
    /// Rows of `Chosen bars`.
    pub chosen_bars: Vec<ChosenBars>,
    /// Two positions this close are one.
    pub tolerance: TenthMm,
    /// Width of a beam or wall that `Supports` does not name, mm.
    pub support_width_mm: f64,
}

impl Layout {
    /// A gridline.
    #[must_use]
    pub fn gridline(&self, id: GridlineId) -> &Gridline {
        &self.gridlines[id.0]
    }
}
