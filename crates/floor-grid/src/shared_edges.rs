//! Which panels meet along each line: a sweep over the edges of every line, so that the work grows with
//! the number of edges and not with its square.

use std::collections::BTreeMap;

use design_engine::floor::{PanelId, Side};

use crate::gridlines::{Line, Station};
use crate::panels::Placed;
use crate::stretches::{Run, Stretches, Unheld};

/// A stretch of a line with one panel, or none, on each side of it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Meeting {
    /// The line.
    pub(crate) line: Line,
    /// Where along it.
    pub(crate) run: Run,
    /// The panel on the lesser-coordinate side.
    pub(crate) near: Option<PanelId>,
    /// The panel on the other side.
    pub(crate) far: Option<PanelId>,
    /// A movement joint runs along it, between two panels.
    pub(crate) joint: bool,
    /// Something stands under it.
    pub(crate) held: bool,
}

impl Meeting {
    /// The panel on one side and its side that lies here: the near panel's greater side.
    pub(crate) fn sides(&self) -> [Option<(PanelId, Side)>; 2] {
        let [lesser, greater] = self.line.axis.end_sides();
        [self.near.map(|id| (id, greater)), self.far.map(|id| (id, lesser))]
    }

    fn continues(&self, before: &Meeting) -> bool {
        self.run.from == before.run.to
            && (self.near, self.far, self.joint, self.held)
                == (before.near, before.far, before.joint, before.held)
    }
}

/// Every stretch of line that panels lie against, in plan order: by axis, along it, then along the line.
pub(crate) fn meetings(placed: &[Option<Placed>], stretches: &Stretches) -> Vec<Meeting> {
    let mut meetings = Vec::new();
    for (line, edges) in edges_by_line(placed) {
        sweep(line, &edges, stretches, &mut meetings);
    }
    meetings
}

/// Indices of meetings along each panel's edges, in order along the edge.
pub(crate) fn by_edge(placed: &[Option<Placed>], meetings: &[Meeting]) -> Vec<[Vec<usize>; 4]> {
    let mut edges: Vec<[Vec<usize>; 4]> = vec![Default::default(); placed.len()];
    for (index, meeting) in meetings.iter().enumerate() {
        for (panel, side) in meeting.sides().into_iter().flatten() {
            edges[panel.0][side.index()].push(index);
        }
    }
    edges
}

/// Edges on a line: of the panels on its lesser side, then of those on its greater side.
pub(crate) type LineEdges = [Vec<(Run, PanelId)>; 2];

/// Edges by the line they lie on, each in order along it.
pub(crate) fn edges_by_line(placed: &[Option<Placed>]) -> BTreeMap<Line, LineEdges> {
    let mut lines: BTreeMap<Line, LineEdges> = BTreeMap::new();
    for (index, at) in placed.iter().enumerate() {
        let Some(at) = at else { continue };
        for side in Side::ALL {
            let [from, to] = at.run(side);
            let near = side.span_axis().end_sides()[1] == side;
            lines.entry(at.line(side)).or_default()[usize::from(!near)]
                .push((Run { from, to }, PanelId(index)));
        }
    }
    for edges in lines.values_mut().flatten() {
        edges.sort_unstable();
    }
    lines
}

fn sweep(line: Line, edges: &LineEdges, stretches: &Stretches, meetings: &mut Vec<Meeting>) {
    let ends = edges.iter().flatten().flat_map(|(run, _)| [run.from, run.to]);
    let mut cuts: Vec<Station> = ends.chain(stretches.cuts(line)).collect();
    cuts.sort_unstable();
    cuts.dedup();
    let [mut near, mut far] = edges.each_ref().map(|edges| edges.iter().peekable());
    let first = meetings.len();
    for ends in cuts.windows(2) {
        let run = Run { from: ends[0], to: ends[1] };
        let [near, far] = [&mut near, &mut far].map(|edges| {
            while edges.next_if(|(edge, _)| edge.to <= run.from).is_some() {}
            edges.peek().filter(|(edge, _)| edge.from <= run.from).map(|(_, panel)| *panel)
        });
        if near.is_none() && far.is_none() {
            continue;
        }
        let joint = near.is_some() && far.is_some() && stretches.has_joint(line, run);
        let held = stretches.unheld(line, run) == Unheld::Nowhere;
        let meeting = Meeting { line, run, near, far, joint, held };
        let start = meetings.len();
        match meetings.last_mut() {
            Some(last) if start > first && meeting.continues(last) => last.run.to = run.to,
            _ => meetings.push(meeting),
        }
    }
}
