//! What detailing gives: sets of bars on plan, marks, the bending schedule and quantities, all views of one list.

use design_engine::floor::{Axis, Layer, PanelId, Side, SupportId};
use design_engine::query::Query;

use crate::bending::Shape;
use crate::quantities::Quantities;

/// What a set of bars is for, in order of fixing.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Use {
    /// Bottom bars.
    Bottom,
    /// Top bars over a support.
    OverSupport,
    /// Distribution bars in the top.
    Distribution,
    /// Top bars at a discontinuous edge.
    Edge,
    /// Torsion bars at a corner.
    Corner,
    /// Bars beside an opening.
    Trimmer,
    /// Diagonal bars at the corners of an opening.
    Diagonal,
}

impl Use {
    /// The words printed for it.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Use::Bottom => "bottom bars",
            Use::OverSupport => "top bars over support",
            Use::Distribution => "top distribution bars",
            Use::Edge => "top bars at edge",
            Use::Corner => "corner bars",
            Use::Trimmer => "bars beside opening",
            Use::Diagonal => "diagonal bars at opening",
        }
    }
}

/// One kind of bar: a mark over the whole floor.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Bar {
    /// Nominal size, mm.
    pub size_mm: f64,
    /// Shape and dimensions.
    pub shape: Shape,
}

/// Equal bars side by side.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Run {
    /// Index into [`BarSchedule::bars`].
    pub bar: usize,
    /// How many.
    pub count: usize,
    /// Place across of the first bar, mm on plan.
    pub first_mm: f64,
    /// From one bar to the next, mm.
    pub pitch_mm: f64,
    /// Place across of the last bar: the last gap may be less.
    pub last_mm: f64,
    /// Extent along the bars on plan, mm.
    pub along_mm: [f64; 2],
    /// What of its length laps the next piece of a bar over the stock length, mm.
    pub lap_mm: f64,
}

impl Run {
    /// Place across of a bar, mm.
    #[must_use]
    pub fn place(&self, index: usize) -> f64 {
        #[expect(clippy::cast_precision_loss, reason = "bars of a run are far below 2^53")]
        let at = self.first_mm + self.pitch_mm * index as f64;
        if index + 1 == self.count { self.last_mm } else { at }
    }
}

/// Bars that are called up together.
#[derive(Debug, Clone, PartialEq)]
pub struct BarSet {
    /// What they are for.
    pub for_what: Use,
    /// The panel whose bars they are.
    pub panel: PanelId,
    /// The side of it they lie at, for bars at edges.
    pub side: Option<Side>,
    /// The supports they run over.
    pub supports: Vec<SupportId>,
    /// Their layer.
    pub layer: Layer,
    /// Axis they run along; diagonal bars: x.
    pub axis: Axis,
    /// Spacing as called up, mm; none for trimmers and diagonals.
    pub spacing_mm: Option<f64>,
    /// True where alternate bars are reversed.
    pub alternate_reversed: bool,
    /// True where the bars over a support hold a cantilever up.
    pub cantilever: bool,
    /// Further words for the callout, such as `edge strip`.
    pub words: String,
    /// The bars.
    pub runs: Vec<Run>,
}

impl BarSet {
    /// Number of bars.
    #[must_use]
    pub fn count(&self) -> usize {
        self.runs.iter().map(|run| run.count).sum()
    }
}

/// A bar mark with its row of the bending schedule.
#[derive(Debug, Clone, PartialEq)]
pub struct ScheduledBar {
    /// The mark: digits, unique on the floor.
    pub mark: String,
    /// The bar.
    pub bar: Bar,
    /// Number on the floor.
    pub count: usize,
    /// Length of each, mm.
    pub length_mm: f64,
    /// Mass of all, kg.
    pub mass_kg: f64,
    /// The layer it is fixed in first.
    pub layer: Layer,
    /// What it is first fixed for.
    pub for_what: Use,
    /// Spacing where it is first called up, mm.
    pub spacing_mm: Option<f64>,
    /// Revision letter; empty on a first issue.
    pub revision: String,
}

/// A detailed floor.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct BarSchedule {
    /// Every mark, in order of marks.
    pub bars: Vec<ScheduledBar>,
    /// Every set, in order of fixing.
    pub sets: Vec<BarSet>,
    /// Concrete, formwork and steel.
    pub quantities: Quantities,
    /// What detailing has to say.
    pub queries: Vec<Query>,
}
