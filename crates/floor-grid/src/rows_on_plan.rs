//! Rows of `Joints` and `Supports` held against the plan: those that pass through a panel, and those
//! that touch none.

use std::collections::BTreeMap;

use design_engine::floor::{Axis, PanelId};
use design_engine::query::{Query, Severity, Subject};

use crate::edge_states::Plan;
use crate::gridlines::{Station, list};
use crate::layout::LineSupportKind;
use crate::stretches::LaidRow;

/// Most panels that one row is said to pass through by name.
const MOST_NAMED: usize = 5;

/// Warns of joints and supports within a panel, which is designed as one; notes rows that lie on no edge.
pub(crate) fn check_rows(plan: &Plan<'_>, queries: &mut Vec<Query>) {
    let rows = plan.stretches.laid();
    let mut passed = vec![Vec::new(); rows.len()];
    for axis in [Axis::X, Axis::Y] {
        panels_passed(plan, rows, axis, &mut passed);
    }
    for (row, panels) in rows.iter().zip(passed) {
        let subject = Subject::Row { sheet: row.sheet, index: row.index };
        let (what, on) = if row.sheet == "Joints" {
            ("the joint", "shared edge")
        } else if plan.layout.supports[row.index].kind == LineSupportKind::None {
            ("the stretch without support", "edge")
        } else {
            ("the support", "edge")
        };
        if !panels.is_empty() {
            let names: Vec<&str> = panels
                .iter()
                .enumerate()
                .map(|(index, panel)| if index == MOST_NAMED { "others" } else { plan.mark(*panel) })
                .collect();
            queries.push(Query::new(
                Severity::Warning,
                subject,
                format!("{what} passes through {}, designed without regard to it", list(&names)),
                "end the panel at the gridline, or end the row's stretch before the panel",
            ));
        } else if !lies_on_edge(plan, row) {
            queries.push(Query::new(Severity::Note, subject, format!("{what} lies on no {on}"), ""));
        }
    }
}

/// Whether a row has an edge (a joint: an edge between two panels) somewhere along it.
fn lies_on_edge(plan: &Plan<'_>, row: &LaidRow) -> bool {
    let start =
        plan.meetings.partition_point(|meeting| (meeting.line, meeting.run.to) <= (row.line, row.run.from));
    plan.meetings[start..]
        .iter()
        .take_while(|meeting| meeting.line == row.line && meeting.run.from < row.run.to)
        .any(|meeting| row.sheet != "Joints" || meeting.joint)
}

/// Sweeps along an axis over the panels and adds, to each row on a line across it, the panels that the
/// row passes through. A stretch of no support matters only at an edge.
fn panels_passed(plan: &Plan<'_>, rows: &[LaidRow], axis: Axis, passed: &mut [Vec<PanelId>]) {
    let along = axis.across();
    let mut coming: Vec<(Station, usize)> = Vec::new();
    let mut going: Vec<(Station, usize)> = Vec::new();
    for (index, at) in plan.placed.iter().enumerate() {
        let Some([start, end]) = at.map(|at| at.stations(axis)) else { continue };
        coming.push((start, index));
        going.push((end, index));
    }
    coming.sort_unstable();
    going.sort_unstable();
    let mut order: Vec<usize> = (0..rows.len()).filter(|row| rows[*row].line.axis == axis).collect();
    order.sort_by_key(|row| rows[*row].line);
    let (mut coming, mut going) = (coming.into_iter().peekable(), going.into_iter().peekable());
    // Panels with the line within them, by their start along the line: end and panel.
    let mut within: BTreeMap<Station, (Station, PanelId)> = BTreeMap::new();
    let ends = |panel: usize| plan.placed[panel].map(|at| at.stations(along));
    for row in order {
        let station = rows[row].line.station;
        // Who leaves goes first: the next panel along may start at the same place.
        loop {
            let next_gone = going.peek().filter(|(end, _)| *end <= station).copied();
            let next_come = coming.peek().filter(|(start, _)| *start < station).copied();
            match (next_gone, next_come) {
                (Some((end, panel)), come) if come.is_none_or(|(start, _)| end <= start) => {
                    going.next();
                    if let Some([from, _]) = ends(panel) {
                        within.remove(&from);
                    }
                }
                (_, Some((_, panel))) => {
                    coming.next();
                    if let Some([from, to]) = ends(panel) {
                        within.insert(from, (to, PanelId(panel)));
                    }
                }
                _ => break,
            }
        }
        let run = rows[row].run;
        let before = within.range(..run.from).next_back().filter(|(_, (to, _))| *to > run.from);
        let panels = before.into_iter().chain(within.range(run.from..run.to));
        if !is_none_row(plan, &rows[row]) {
            passed[row].extend(panels.map(|(_, (_, panel))| *panel).take(MOST_NAMED + 1));
        }
    }
}

fn is_none_row(plan: &Plan<'_>, row: &LaidRow) -> bool {
    row.sheet == "Supports" && plan.layout.supports[row.index].kind == LineSupportKind::None
}
