//! Panels of the grid on plan: their rectangles, and the faults of their extents.

use design_engine::floor::{Axis, PlanRect, Side, TenthMm};
use design_engine::query::{Query, Severity};
use design_engine::ranges::SPAN_M;

use crate::gridlines::{Grid, Line, Station, list, millimetres};
use crate::layout::{GridPanel, GridlineId, Layout};

/// Most panels named in one message.
const MOST_NAMED: usize = 5;

/// A panel's place, by stations and by position.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) struct Placed {
    /// Stations west and east.
    x: [Station; 2],
    /// Stations south and north.
    y: [Station; 2],
    /// Its rectangle.
    pub(crate) rect: PlanRect,
}

impl Placed {
    /// Stations at its lesser and greater end along an axis.
    pub(crate) fn stations(&self, axis: Axis) -> [Station; 2] {
        match axis {
            Axis::X => self.x,
            Axis::Y => self.y,
        }
    }

    /// The line that a side lies on.
    pub(crate) fn line(&self, side: Side) -> Line {
        let axis = side.span_axis();
        let [lesser, greater] = self.stations(axis);
        Line { axis, station: if axis.end_sides()[0] == side { lesser } else { greater } }
    }

    /// Stations at the ends of a side's edge.
    pub(crate) fn run(&self, side: Side) -> [Station; 2] {
        self.stations(side.span_axis().across())
    }

    /// Positions at its lesser and greater end along an axis.
    pub(crate) fn ends(&self, axis: Axis) -> [TenthMm; 2] {
        match axis {
            Axis::X => [self.rect.x0, self.rect.x1],
            Axis::Y => [self.rect.y0, self.rect.y1],
        }
    }

    /// Position of a side's line.
    pub(crate) fn position(&self, side: Side) -> TenthMm {
        let axis = side.span_axis();
        self.ends(axis)[usize::from(axis.end_sides()[1] == side)]
    }
}

/// The gridline that a side of a panel lies on.
pub(crate) fn gridline_of(panel: &GridPanel, side: Side) -> GridlineId {
    match side {
        Side::North => panel.y_to,
        Side::East => panel.x_to,
        Side::South => panel.y_from,
        Side::West => panel.x_from,
    }
}

/// Rectangles of the grid's panels; a panel at fault has none and is an error.
pub(crate) fn place_panels(layout: &Layout, grid: &Grid, queries: &mut Vec<Query>) -> Vec<Option<Placed>> {
    let mut placed: Vec<Option<Placed>> =
        layout.panels.iter().map(|panel| place(layout, grid, panel, queries)).collect();
    drop_overlapping(layout, &mut placed, queries);
    placed
}

fn place(layout: &Layout, grid: &Grid, panel: &GridPanel, queries: &mut Vec<Query>) -> Option<Placed> {
    let x = extent(layout, grid, panel, Axis::X);
    let y = extent(layout, grid, panel, Axis::Y);
    let position = |id| layout.gridline(id).position;
    match (x, y) {
        (Ok(x), Ok(y)) => {
            let rect = PlanRect {
                x0: position(panel.x_from),
                x1: position(panel.x_to),
                y0: position(panel.y_from),
                y1: position(panel.y_to),
            };
            Some(Placed { x, y, rect })
        }
        (x, y) => {
            queries.extend([x.err(), y.err()].into_iter().flatten());
            None
        }
    }
}

/// Stations of a panel along an axis, or what is wrong with its extent there.
fn extent(layout: &Layout, grid: &Grid, panel: &GridPanel, axis: Axis) -> Result<[Station; 2], Query> {
    let (from, to, from_column, to_column) = match axis {
        Axis::X => (panel.x_from, panel.x_to, "X from", "X to"),
        Axis::Y => (panel.y_from, panel.y_to, "Y from", "Y to"),
    };
    let (start, end) = (layout.gridline(from), layout.gridline(to));
    let fault = |column, text: String, remedy: &str| {
        Err(Query::panel(Severity::Error, &panel.data.mark, Some(column), text, remedy))
    };
    for (line, column) in [(start, from_column), (end, to_column)] {
        if line.axis != axis {
            let text = format!("gridline {} stands on axis {}", line.name, line.axis.word().to_uppercase());
            return fault(column, text, "name a gridline of the column's axis");
        }
    }
    let span = end.position - start.position;
    if grid.station(from) == grid.station(to) {
        let text = format!("the extent from {} to {} is zero ({})", start.name, end.name, millimetres(span));
        return fault(to_column, text, "name two gridlines that stand apart");
    }
    if span.0 < 0 {
        let text = format!("the extent from {} to {} is reversed", start.name, end.name);
        return fault(to_column, text, "name the gridline of lesser position first");
    }
    if !SPAN_M.contains(span.m()) {
        let text = format!(
            "the span from {} to {} is {} m; allowed {} m",
            start.name,
            end.name,
            span.m(),
            SPAN_M.describe()
        );
        return fault(to_column, text, "check the gridlines and their positions, which are in metres");
    }
    Ok([grid.station(from), grid.station(to)])
}

/// Sweeps eastward over the panels: those that stand over one x do not overlap, so each newcomer need
/// only be held against its neighbours to the south and north. One that overlaps is an error, and is
/// taken off the plan.
fn drop_overlapping(layout: &Layout, placed: &mut [Option<Placed>], queries: &mut Vec<Query>) {
    let mut order: Vec<(Station, usize)> =
        placed.iter().enumerate().filter_map(|(index, at)| at.map(|at| (at.x[0], index))).collect();
    order.sort_unstable();
    let mut leaving: Vec<(Station, usize)> =
        order.iter().filter_map(|(_, i)| placed[*i].map(|at| (at.x[1], *i))).collect();
    leaving.sort_unstable();
    let mut leaving = leaving.into_iter().peekable();
    // Standing panels by their south station: north station and index.
    let mut standing: std::collections::BTreeMap<Station, (Station, usize)> =
        std::collections::BTreeMap::new();
    for (west, index) in order {
        while let Some((_, gone)) = leaving.next_if(|(east, _)| *east <= west) {
            if let Some(at) = placed[gone] {
                standing.remove(&at.y[0]);
            }
        }
        let Some(at) = placed[index] else { continue };
        let [south, north] = at.y;
        let below = standing.range(..south).next_back().filter(|(_, (top, _))| *top > south);
        let met = below.into_iter().chain(standing.range(south..north)).map(|(_, (_, other))| *other);
        let met: Vec<usize> = met.take(MOST_NAMED + 1).collect();
        if met.is_empty() {
            standing.insert(south, (north, index));
        } else {
            queries.push(overlap(layout, placed, index, &met));
            placed[index] = None;
        }
    }
}

fn overlap(layout: &Layout, placed: &[Option<Placed>], index: usize, met: &[usize]) -> Query {
    let shared = |axis| {
        let ends = |i: usize| placed[i].map_or([TenthMm(0); 2], |at| at.ends(axis));
        let ([a0, a1], [b0, b1]) = (ends(index), ends(met[0]));
        (a1.min(b1) - a0.max(b0)).m()
    };
    let mut names: Vec<&str> = met.iter().map(|i| layout.panels[*i].data.mark.as_str()).collect();
    if names.len() > MOST_NAMED {
        names[MOST_NAMED] = "others";
    }
    let size = if met.len() == 1 {
        format!(" by {:.2} x {:.2} m", shared(Axis::X), shared(Axis::Y))
    } else {
        String::new()
    };
    let mark = &layout.panels[index].data.mark;
    Query::panel(
        Severity::Error,
        mark,
        Some("X from"),
        format!("panel {mark} overlaps {}{size}", list(&names)),
        "correct the gridlines of one of them",
    )
}
