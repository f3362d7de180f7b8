//! What is designed: panels with their edges, and the supports that panels share.
//!
//! Three kinds of direction are kept apart: plan directions ([`Axis`], [`Side`]), spans ([`Span`])
//! and layers ([`Layer`]). Turning one into another is always a named function.

/// Plan axis: x runs east, y runs north.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Axis {
    /// East.
    X,
    /// North.
    Y,
}

impl Axis {
    /// The other axis.
    #[must_use]
    pub fn across(self) -> Axis {
        match self {
            Axis::X => Axis::Y,
            Axis::Y => Axis::X,
        }
    }

    /// `x` or `y`.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Axis::X => "x",
            Axis::Y => "y",
        }
    }

    /// The two sides at the ends of a span along this axis, lesser coordinate first.
    #[must_use]
    pub fn end_sides(self) -> [Side; 2] {
        match self {
            Axis::X => [Side::West, Side::East],
            Axis::Y => [Side::South, Side::North],
        }
    }
}

/// A side of a panel on plan.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Side {
    /// Greater y.
    North,
    /// Greater x.
    East,
    /// Lesser y.
    South,
    /// Lesser x.
    West,
}

impl Side {
    /// All four, in the order of the `Panels` sheet.
    pub const ALL: [Side; 4] = [Side::North, Side::East, Side::South, Side::West];

    /// Position in [`Side::ALL`], for arrays kept per side.
    #[must_use]
    pub fn index(self) -> usize {
        self as usize
    }

    /// The side across the panel.
    #[must_use]
    pub fn opposite(self) -> Side {
        match self {
            Side::North => Side::South,
            Side::East => Side::West,
            Side::South => Side::North,
            Side::West => Side::East,
        }
    }

    /// The axis of the span that ends at this side: x for east and west.
    #[must_use]
    pub fn span_axis(self) -> Axis {
        match self {
            Side::East | Side::West => Axis::X,
            Side::North | Side::South => Axis::Y,
        }
    }

    /// `north`, `east`, `south` or `west`.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Side::North => "north",
            Side::East => "east",
            Side::South => "south",
            Side::West => "west",
        }
    }

    /// Name of the same side of a loose panel, whose short span is laid along x:
    /// its long edges are west and east, its short edges south and north.
    #[must_use]
    pub fn loose_word(self) -> &'static str {
        match self {
            Side::West => "long edge 1",
            Side::East => "long edge 2",
            Side::South => "short edge 1",
            Side::North => "short edge 2",
        }
    }
}

/// A panel's span by its length.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Span {
    /// lx.
    Short,
    /// ly.
    Long,
}

impl Span {
    /// The other span.
    #[must_use]
    pub fn other(self) -> Span {
        match self {
            Span::Short => Span::Long,
            Span::Long => Span::Short,
        }
    }

    /// `short` or `long`.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Span::Short => "short",
            Span::Long => "long",
        }
    }
}

/// A layer of bars: face and order from the face.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Layer {
    /// Bottom outer.
    B1,
    /// Bottom inner.
    B2,
    /// Top outer.
    T1,
    /// Top inner.
    T2,
}

impl Layer {
    /// `B1`, `B2`, `T1` or `T2`.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Layer::B1 => "B1",
            Layer::B2 => "B2",
            Layer::T1 => "T1",
            Layer::T2 => "T2",
        }
    }
}

/// A position on plan in whole tenths of a millimetre, so that equal is equal.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Default)]
pub struct TenthMm(pub i64);

impl TenthMm {
    /// The nearest tenth of a millimetre to a position in metres (finite, within ±100 km).
    #[must_use]
    #[expect(clippy::cast_possible_truncation, reason = "clamped to ±1e9 before the cast")]
    pub fn from_m(metres: f64) -> TenthMm {
        TenthMm((metres * 10_000.0).round().clamp(-1e9, 1e9) as i64)
    }

    /// In metres.
    #[must_use]
    #[expect(clippy::cast_precision_loss, reason = "positions are far below 2^53")]
    pub fn m(self) -> f64 {
        self.0 as f64 / 10_000.0
    }
}

impl std::ops::Sub for TenthMm {
    type Output = TenthMm;
    fn sub(self, other: TenthMm) -> TenthMm {
        TenthMm(self.0 - other.0)
    }
}

/// A rectangle on plan.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct PlanRect {
    /// West.
    pub x0: TenthMm,
    /// East.
    pub x1: TenthMm,
    /// South.
    pub y0: TenthMm,
    /// North.
    pub y1: TenthMm,
}

impl PlanRect {
    /// Length along an axis, m.
    #[must_use]
    pub fn length_m(&self, axis: Axis) -> f64 {
        match axis {
            Axis::X => (self.x1 - self.x0).m(),
            Axis::Y => (self.y1 - self.y0).m(),
        }
    }

    /// Plan area, m2.
    #[must_use]
    pub fn area_m2(&self) -> f64 {
        self.length_m(Axis::X) * self.length_m(Axis::Y)
    }
}

/// Characteristic loads of a panel besides its self-weight, kN/m2.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct AreaLoads {
    /// Finishes, counted as dead.
    pub finishes_kn_m2: f64,
    /// Partitions, counted as dead.
    pub partitions_kn_m2: f64,
    /// Imposed.
    pub imposed_kn_m2: f64,
}

/// What the book asks of a panel's action.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Spanning {
    /// Decided from spans and edges.
    Found,
    /// Two-way, stated.
    TwoWay,
    /// One-way along an axis, stated. For a loose panel [`Axis::X`] is the short span.
    OneWay(Axis),
    /// Cantilever, stated.
    Cantilever,
}

/// Whether the corners of a panel are prevented from lifting.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Corners {
    /// Prevented from lifting: torsion steel is provided.
    HeldDown,
    /// Free to lift.
    FreeToLift,
}

/// State of an edge (3.5.3.4).
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum EdgeState {
    /// Hogging moment is carried across the whole edge.
    Continuous,
    /// Hogging moment is carried across part of the edge.
    PartlyContinuous,
    /// Supported, no hogging moment carried.
    Discontinuous,
    /// Not supported.
    Free,
}

impl EdgeState {
    /// The words printed for it.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            EdgeState::Continuous => "continuous",
            EdgeState::PartlyContinuous => "partly continuous",
            EdgeState::Discontinuous => "discontinuous",
            EdgeState::Free => "free",
        }
    }
}

/// Index of a panel in [`Floor::panels`].
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct PanelId(pub usize);

/// Index of a support in [`Floor::supports`].
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct SupportId(pub usize);

/// A stretch of an edge that lies against one neighbour, or against none.
#[derive(Debug, Clone, PartialEq)]
pub struct Segment {
    /// Start along the edge's line (lesser coordinate); zero for a loose panel.
    pub from: TenthMm,
    /// End along the edge's line.
    pub to: TenthMm,
    /// The panel on the other side, if there is one.
    pub neighbour: Option<PanelId>,
    /// Whether hogging moment is carried across it.
    pub continuous: bool,
    /// Whether a movement joint runs along it: no bar crosses.
    pub joint: bool,
    /// The support whose top bars cross it, if any do.
    pub support: Option<SupportId>,
    /// Reason in words, for example `shared with S4 over 6.00 m; no joint; level difference 0`.
    pub why: String,
}

/// One edge of a panel.
#[derive(Debug, Clone, PartialEq)]
pub struct Edge {
    /// Its state.
    pub state: EdgeState,
    /// True where the book states it; a stated edge wins over the layout.
    pub stated: bool,
    /// Reason in words.
    pub why: String,
    /// Its segments in order of their start; together they cover the edge.
    pub segments: Vec<Segment>,
    /// Width of the beam or wall that it bears on, mm: at a movement joint, its half of it.
    pub support_width_mm: f64,
}

/// The engineer's own choice of bars for a place: checked, never changed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct BarChoice {
    /// Bar size, mm.
    pub bar_mm: f64,
    /// Centre-to-centre spacing, mm.
    pub spacing_mm: f64,
}

/// A hole through a panel, its sides along x and y.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PanelOpening {
    /// Distance of its west side from the panel's west edge line, m.
    pub from_west_m: f64,
    /// Distance of its south side from the panel's south edge line, m.
    pub from_south_m: f64,
    /// Widths along x and along y, m.
    pub widths_m: [f64; 2],
}

/// A wall or other permanent line load on a panel.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LineLoad {
    /// Axis it runs along.
    pub along: Axis,
    /// Distance from the west (along y) or south (along x) edge line, m.
    pub offset_m: f64,
    /// Start along it, from the south or west edge line, m.
    pub from_m: f64,
    /// End along it, m.
    pub to_m: f64,
    /// Characteristic load, kN/m.
    pub load_kn_m: f64,
}

impl LineLoad {
    /// Length, m.
    #[must_use]
    pub fn length_m(&self) -> f64 {
        self.to_m - self.from_m
    }
}

/// One slab panel.
#[derive(Debug, Clone, PartialEq)]
pub struct Panel {
    /// Its mark, unique on the floor.
    pub mark: String,
    /// Place on plan; none for a loose panel.
    pub plan: Option<PlanRect>,
    /// Centre-to-centre span along x and along y, m. A loose panel's short span is along x.
    pub spans_m: [f64; 2],
    /// Slab thickness, mm.
    pub thickness_mm: f64,
    /// Loads besides self-weight.
    pub loads: AreaLoads,
    /// What the book asks.
    pub spanning: Spanning,
    /// Corners held down or free to lift.
    pub corners: Corners,
    /// True where the panel's own row states its corners.
    pub corners_stated: bool,
    /// Level of the top against the floor's datum, mm.
    pub top_level_mm: f64,
    /// Edges in the order of [`Side::ALL`].
    pub edges: [Edge; 4],
    /// Stated bars of the bottom, by the span they run along: short, long.
    pub chosen_bottom: [Option<BarChoice>; 2],
    /// Holes through it.
    pub openings: Vec<PanelOpening>,
    /// Walls on it.
    pub line_loads: Vec<LineLoad>,
    /// Why this panel cannot be designed, where the layout already knows.
    pub not_designed: Option<String>,
}

impl Panel {
    /// True for a panel of the `Loose panels` sheet.
    #[must_use]
    pub fn is_loose(&self) -> bool {
        self.plan.is_none()
    }

    /// The edge on a side.
    #[must_use]
    pub fn edge(&self, side: Side) -> &Edge {
        &self.edges[side.index()]
    }

    /// Centre-to-centre span along an axis, m.
    #[must_use]
    pub fn span_m(&self, axis: Axis) -> f64 {
        self.spans_m[axis as usize]
    }

    /// The side's name in outputs: plan words, or long and short edges for a loose panel.
    #[must_use]
    pub fn side_word(&self, side: Side) -> &'static str {
        if self.is_loose() { side.loose_word() } else { side.word() }
    }

    /// Plan area between support centre lines, m2.
    #[must_use]
    pub fn area_m2(&self) -> f64 {
        self.spans_m[0] * self.spans_m[1]
    }
}

/// One panel's side of a support.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct SupportSide {
    /// The panel.
    pub panel: PanelId,
    /// Which of its sides lies on the support.
    pub side: Side,
}

/// What the top bars of a support are for.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum SupportKind {
    /// Hogging moment of both sides.
    Hogging,
    /// Bars cross beside the side of a one-way panel; no moment is claimed.
    Crossing,
}

/// A stretch of a supporting line over which one set of top bars runs.
#[derive(Debug, Clone, PartialEq)]
pub struct Support {
    /// Name from gridlines, such as `B/1-2`; none where one panel alone has it (a stated edge).
    pub name: Option<String>,
    /// Name of the gridline it lies on; none for a loose panel's edge.
    pub gridline: Option<String>,
    /// Axis of the gridline: [`Axis::X`] is a line at one x that runs north. Bars run along this axis.
    pub axis: Axis,
    /// Start along the line.
    pub from: TenthMm,
    /// End along the line.
    pub to: TenthMm,
    /// Width of the beam or wall, mm.
    pub width_mm: f64,
    /// What its bars are for.
    pub kind: SupportKind,
    /// The panel on the lesser-coordinate side (or the only one).
    pub near: SupportSide,
    /// The panel on the other side, where it is shared.
    pub far: Option<SupportSide>,
    /// Stated top bars.
    pub chosen: Option<BarChoice>,
}

impl Support {
    /// Its sides, one or two.
    pub fn sides(&self) -> impl Iterator<Item = SupportSide> + '_ {
        std::iter::once(self.near).chain(self.far)
    }

    /// Length along the line, m.
    #[must_use]
    pub fn length_m(&self) -> f64 {
        (self.to - self.from).m()
    }
}

/// A floor ready for design.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Floor {
    /// Panels in the order of the book: `Panels` first, then `Loose panels`.
    pub panels: Vec<Panel>,
    /// Supports in plan order.
    pub supports: Vec<Support>,
}

impl Floor {
    /// A panel.
    #[must_use]
    pub fn panel(&self, id: PanelId) -> &Panel {
        &self.panels[id.0]
    }

    /// A support.
    #[must_use]
    pub fn support(&self, id: SupportId) -> &Support {
        &self.supports[id.0]
    }
}
