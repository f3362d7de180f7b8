//! What is worth saying about a plan beyond its edges: gaps, panels on their own, voids, stated edges
//! that contradict the layout, rows that lie nowhere.

use std::collections::BTreeMap;

use design_engine::floor::{Axis, PanelId, TenthMm};
use design_engine::query::{Query, Severity, Subject};

use crate::actions::STEP_MM;
use crate::edge_states::{Party, Plan, step_words};
use crate::gridlines::{Line, list, millimetres, note_unused};
use crate::layout::StatedEdge;
use crate::panels::gridline_of;
use crate::rows_on_plan::check_rows;
use crate::shared_edges::{LineEdges, edges_by_line};
use crate::voids::note_voids;

/// Gaps from the plan tolerance up to this are warned of.
const GAP: TenthMm = TenthMm(500);

/// Says all of it. A plan with panels at fault is not looked over for holes and lone panels.
pub(crate) fn observe(plan: &Plan<'_>, queries: &mut Vec<Query>) {
    note_unused(plan.layout, queries);
    note_gaps_within_tolerance(plan, queries);
    warn_of_gaps(plan, queries);
    warn_of_contradictions(plan, queries);
    note_joints(plan, queries);
    if plan.placed.iter().all(Option::is_some) {
        note_lone_panels(plan, queries);
        note_voids(plan, queries);
        check_rows(plan, queries);
    }
}

/// One note for each pair of gridlines whose facing edges are not quite in line.
fn note_gaps_within_tolerance(plan: &Plan<'_>, queries: &mut Vec<Query>) {
    let mut gaps: BTreeMap<(Line, TenthMm), Vec<[Party; 2]>> = BTreeMap::new();
    for meeting in plan.meetings {
        if let [Some(near), Some(far)] = plan.parties(meeting)
            && plan.gap(meeting) != TenthMm(0)
        {
            gaps.entry((meeting.line, plan.gap(meeting))).or_default().push([near, far]);
        }
    }
    for ((_, gap), pairs) in gaps {
        let what = if gap.0 > 0 { "gap" } else { "overlap" };
        queries.push(Query::new(
            Severity::Note,
            gridline_subject(plan, pairs[0][1]),
            format!(
                "a {what} of {} between {} is within the plan tolerance and taken as shared",
                millimetres(TenthMm(gap.0.abs())),
                pair_words(plan, &pairs)
            ),
            "",
        ));
    }
}

fn gridline_subject(plan: &Plan<'_>, party: Party) -> Subject {
    let id = gridline_of(&plan.layout.panels[party.panel.0], party.side);
    Subject::Gridline(plan.layout.gridline(id).name.clone())
}

/// `S1 and S2 and 3 other pairs`.
fn pair_words(plan: &Plan<'_>, pairs: &[[Party; 2]]) -> String {
    let [one, other] = pairs[0].map(|party| plan.mark(party.panel));
    match pairs.len() - 1 {
        0 => format!("{one} and {other}"),
        1 => format!("{one} and {other} and one other pair"),
        more => format!("{one} and {other} and {more} other pairs"),
    }
}

/// Facing edges further apart than the tolerance and less than 50 mm: one warning for each pair of lines.
fn warn_of_gaps(plan: &Plan<'_>, queries: &mut Vec<Query>) {
    let lines = edges_by_line(plan.placed);
    for (line, edges) in &lines {
        let start = plan.grid.position(plan.layout, line.axis, line.station);
        for (other, facing) in lines.range(line..).skip(1) {
            let apart = plan.grid.position(plan.layout, other.axis, other.station) - start;
            if other.axis != line.axis || apart >= TenthMm(GAP.0 + plan.layout.tolerance.0) {
                break;
            }
            let pairs = facing_pairs(line.axis, edges, facing);
            if let Some([near, far]) = pairs.first().copied()
                && let Some(gap) = gap_between(plan, near, far)
                && gap < GAP
            {
                queries.push(Query::panel(
                    Severity::Warning,
                    plan.mark(far.panel),
                    Some(if line.axis == Axis::X { "X from" } else { "Y from" }),
                    format!("a gap of {} lies between {}", millimetres(gap), pair_words(plan, &pairs)),
                    "if the panels are meant to meet, use one gridline for both; if not, nothing need be done",
                ));
            }
        }
    }
}

fn gap_between(plan: &Plan<'_>, near: Party, far: Party) -> Option<TenthMm> {
    let (near_at, far_at) = (plan.placed[near.panel.0]?, plan.placed[far.panel.0]?);
    Some(far_at.position(far.side) - near_at.position(near.side))
}

/// Near edges of one line that face far edges of a line beyond it.
fn facing_pairs(axis: Axis, edges: &LineEdges, facing: &LineEdges) -> Vec<[Party; 2]> {
    let [lesser, greater] = axis.end_sides();
    let party = |panel: PanelId, side| Party { panel, side };
    let mut pairs = Vec::new();
    let mut beyond = facing[1].iter().peekable();
    for (run, near) in &edges[0] {
        while beyond.next_if(|(other, _)| other.to <= run.from).is_some() {}
        let mut overlapping = beyond.clone();
        while let Some((_, far)) = overlapping.next_if(|(other, _)| other.from < run.to) {
            pairs.push([party(*near, greater), party(*far, lesser)]);
        }
    }
    pairs
}

/// Edges stated continuous over a step or nothing at all: one warning an edge. Over a movement joint, which no bar
/// crosses, or against a statement from the other side it is an error: neither can win.
fn warn_of_contradictions(plan: &Plan<'_>, queries: &mut Vec<Query>) {
    let mut warned = std::collections::BTreeSet::new();
    let mut refused = std::collections::BTreeSet::new();
    for meeting in plan.meetings {
        let [near, far] = plan.parties(meeting);
        for (me, other) in [(near, far), (far, near)] {
            let Some(me) = me.filter(|me| plan.stated(*me) == Some(StatedEdge::Continuous)) else { continue };
            let denied = match other.and_then(|other| plan.stated(other).map(|stated| (other, stated))) {
                Some((other, StatedEdge::Discontinuous)) => Some((other, "discontinuous")),
                Some((other, StatedEdge::Free)) => Some((other, "free")),
                _ => None,
            };
            if let Some((other, word)) = denied {
                let mark = plan.mark(other.panel);
                queries.push(Query::new(
                    Severity::Error,
                    Subject::Edge { mark: plan.mark(me.panel).to_owned(), side: me.side },
                    format!("stated continuous, while {mark} states the same edge {word} from its side"),
                    "state the edge the same on both sides, or leave both cells blank",
                ));
                continue;
            }
            if plan.stretches.has_joint(meeting.line, meeting.run) {
                if refused.insert((me.panel, me.side)) {
                    queries.push(continuous_over_a_joint(plan, me));
                }
                continue;
            }
            let over = if other.is_none() {
                " with no panel beyond: nothing here balances its moment".to_owned()
            } else if !meeting.held {
                " over a stretch without support (Supports sheet)".to_owned()
            } else if let Some(step_mm) = other.map(|other| plan.step_mm(me.panel, other.panel))
                && step_mm > STEP_MM + 1e-9
            {
                format!(" over a level difference of {} (over {STEP_MM})", step_words(step_mm))
            } else {
                continue;
            };
            if warned.insert((me.panel, me.side)) {
                queries.push(Query::new(
                    Severity::Warning,
                    Subject::Edge { mark: plan.mark(me.panel).to_owned(), side: me.side },
                    format!("the edge is stated continuous{over}"),
                    "leave the cell blank unless the detail there carries the moment",
                ));
            }
        }
    }
}

fn continuous_over_a_joint(plan: &Plan<'_>, me: Party) -> Query {
    Query::new(
        Severity::Error,
        Subject::Edge { mark: plan.mark(me.panel).to_owned(), side: me.side },
        format!(
            "stated continuous, while a movement joint runs along it on gridline {}: no bar crosses a joint",
            plan.line_name(me)
        ),
        "leave the cell blank or state it discontinuous, or end the joint's row at a crossing gridline before the edge",
    )
}

/// One note for each gridline with a joint between panels: what its detail must give.
fn note_joints(plan: &Plan<'_>, queries: &mut Vec<Query>) {
    let mut told = std::collections::BTreeSet::new();
    for meeting in plan.meetings.iter().filter(|meeting| meeting.joint) {
        if let [Some(near), Some(_)] = plan.parties(meeting)
            && told.insert(meeting.line)
        {
            queries.push(Query::new(
                Severity::Note,
                gridline_subject(plan, near),
                "movement joint: no bar crosses, each panel bears on half of the support",
                "detail the bearing",
            ));
        }
    }
}

/// Panels that share no stretch of edge with another, on a floor of several.
fn note_lone_panels(plan: &Plan<'_>, queries: &mut Vec<Query>) {
    if plan.placed.len() < 2 {
        return;
    }
    let mut lone = vec![true; plan.placed.len()];
    for meeting in plan.meetings {
        if let (Some(near), Some(far)) = (meeting.near, meeting.far) {
            lone[near.0] = false;
            lone[far.0] = false;
        }
    }
    let lone: Vec<&str> =
        (0..lone.len()).filter(|index| lone[*index]).map(|index| plan.mark(PanelId(index))).collect();
    for mark in lone.iter().take(1) {
        let text = if lone.len() == 1 {
            format!("no other panel touches {mark}")
        } else {
            format!("no other panel touches any of {}", list(&lone))
        };
        queries.push(Query::panel(Severity::Note, mark, None, text, ""));
    }
}
