//! Supports, one per stretch that top bars cross, in plan order; and the edges they belong to.

use std::collections::BTreeSet;

use design_engine::floor::{Edge, EdgeState, PanelId, Segment, Side, Support, SupportId, SupportSide};

use crate::edge_states::{Owners, Party, Plan, Verdict, segment};
use crate::panels::gridline_of;
use crate::shared_edges::Meeting;

/// Edges of the grid's panels with the verdict on each of their segments, and the supports.
#[derive(Debug, Default)]
pub(crate) struct Edges {
    /// By panel, in the order of [`Side::ALL`].
    pub(crate) edges: Vec<[Edge; 4]>,
    /// Verdicts on the segments of each edge.
    pub(crate) verdicts: Vec<[Vec<Verdict>; 4]>,
    /// In plan order.
    pub(crate) supports: Vec<Support>,
}

/// Judges every meeting, near and far side, and gathers what follows by panel.
pub(crate) fn edges_and_supports(plan: &Plan<'_>) -> Edges {
    let count = plan.placed.len();
    let mut segments: Vec<[Vec<Segment>; 4]> = vec![Default::default(); count];
    let mut verdicts: Vec<[Vec<Verdict>; 4]> = vec![Default::default(); count];
    let mut jointed = vec![[false; 4]; count];
    let mut supports = Vec::new();
    for meeting in plan.meetings {
        let parties @ [near, far] = plan.parties(meeting);
        let judged =
            [(near, far), (far, near)].map(|(me, other)| me.map(|me| plan.judge(meeting, me, other)));
        let kind = Plan::support_kind(judged.each_ref().map(|judged| judged.as_ref().map(|(v, _)| *v)));
        let support = kind.and_then(|(kind, owners)| {
            let [near, far] = match owners {
                Owners::Both => parties,
                Owners::Near => [near, None],
                Owners::Far => [far, None],
            };
            let near = near?;
            let (from, to) = plan.extent(meeting, near);
            supports.push(Support {
                name: far.map(|far| name(plan, meeting, near, far)),
                gridline: Some(plan.line_name(near).to_owned()),
                axis: meeting.line.axis,
                from,
                to,
                width_mm: plan.stretches.width_mm(meeting.line, meeting.run),
                kind,
                near: side(near),
                far: far.map(side),
                chosen: None,
            });
            Some((SupportId(supports.len() - 1), owners))
        });
        let others = [far, near];
        for (index, (me, judged)) in parties.into_iter().zip(judged).enumerate() {
            let (Some(me), Some(judged)) = (me, judged) else { continue };
            let own = support
                .filter(|(_, owners)| *owners == Owners::Both || (*owners == Owners::Near) == (index == 0));
            jointed[me.panel.0][me.side.index()] |= meeting.joint;
            verdicts[me.panel.0][me.side.index()].push(judged.0);
            segments[me.panel.0][me.side.index()].push(segment(
                plan.extent(meeting, me),
                others[index].map(|other| other.panel),
                meeting.joint,
                judged,
                own.map(|(id, _)| id),
            ));
        }
    }
    make_names_unique(&mut supports);
    let edges = segments
        .into_iter()
        .zip(&verdicts)
        .enumerate()
        .map(|(index, (mut segments, verdicts))| {
            Side::ALL.map(|side| {
                let segments = std::mem::take(&mut segments[side.index()]);
                let me = Party { panel: PanelId(index), side };
                if segments.is_empty() {
                    return off_plan(plan);
                }
                let mut edge = plan.edge(me, segments, &verdicts[side.index()]);
                if jointed[index][side.index()] {
                    // Beside a joint each panel bears on its own half of the support.
                    edge.support_width_mm /= 2.0;
                }
                edge
            })
        })
        .collect();
    Edges { edges, verdicts, supports }
}

fn side(party: Party) -> SupportSide {
    SupportSide { panel: party.panel, side: party.side }
}

/// `B/1-2`: the near panel's gridline and the crossing gridlines at the ends.
fn name(plan: &Plan<'_>, meeting: &Meeting, near: Party, far: Party) -> String {
    let along = meeting.line.axis.across();
    let end = |station, which: usize| {
        let own = [near, far].into_iter().find_map(|party| {
            let at = plan.placed[party.panel.0]?;
            let row = &plan.layout.panels[party.panel.0];
            (at.stations(along)[which] == station).then(|| gridline_of(row, along.end_sides()[which]))
        });
        match own {
            Some(id) => plan.layout.gridline(id).name.as_str(),
            None => plan.grid.name(plan.layout, along, station),
        }
    };
    format!("{}/{}-{}", plan.line_name(near), end(meeting.run.from, 0), end(meeting.run.to, 1))
}

/// Gridline names that hold a dash can make two names alike; the later one in plan order is numbered.
fn make_names_unique(supports: &mut [Support]) {
    let mut met = BTreeSet::new();
    for support in supports {
        let Some(name) = &mut support.name else { continue };
        let plain = name.clone();
        let mut number = 2;
        while !met.insert(name.clone()) {
            *name = format!("{plain} ({number})");
            number += 1;
        }
    }
}

/// The edge of a panel that its faults keep off the plan; the floor is not designed.
fn off_plan(plan: &Plan<'_>) -> Edge {
    Edge {
        state: EdgeState::Discontinuous,
        stated: false,
        why: "the panel has no place on plan; see its error".to_owned(),
        segments: Vec::new(),
        support_width_mm: plan.layout.support_width_mm,
    }
}
