//! Loose panels: edges as the book states them, each continuous one with a support of its own.

use design_engine::floor::{
    Axis, Edge, EdgeState, Panel, PanelId, Segment, Side, Support, SupportId, SupportKind, SupportSide,
    TenthMm,
};
use design_engine::query::{Query, Severity};

use crate::actions::loose_edges;
use crate::edge_states::stated_why;
use crate::layout::{Layout, LoosePanel, StatedEdge};

/// A loose panel as panel `id` of the floor; its supports are added after those there are.
pub(crate) fn loose_panel(
    layout: &Layout,
    row: &LoosePanel,
    id: PanelId,
    supports: &mut Vec<Support>,
    queries: &mut Vec<Query>,
) -> Panel {
    if row.short_span_m > row.long_span_m {
        queries.push(Query::panel(
            Severity::Error,
            &row.data.mark,
            Some("Short span"),
            format!("the short span, {} m, is above the long span, {} m", row.short_span_m, row.long_span_m),
            "exchange the two spans and their edges",
        ));
    }
    let stated = loose_edges(row);
    let edges = Side::ALL
        .map(|side| loose_edge(layout, row, stated[side.index()], SupportSide { panel: id, side }, supports));
    Panel {
        mark: row.data.mark.clone(),
        plan: None,
        spans_m: [row.short_span_m, row.long_span_m],
        thickness_mm: row.data.thickness_mm,
        loads: row.data.loads,
        spanning: row.data.spanning,
        corners: row.data.corners,
        corners_stated: row.data.corners_stated,
        top_level_mm: 0.0,
        edges,
        chosen_bottom: [None; 2],
        openings: Vec::new(),
        line_loads: Vec::new(),
        not_designed: None,
    }
}

fn loose_edge(
    layout: &Layout,
    row: &LoosePanel,
    stated: StatedEdge,
    at: SupportSide,
    supports: &mut Vec<Support>,
) -> Edge {
    let axis = at.side.span_axis();
    let length = match axis {
        Axis::X => row.long_span_m,
        Axis::Y => row.short_span_m,
    };
    let (from, to) = (TenthMm(0), TenthMm::from_m(length));
    let state = match stated {
        StatedEdge::Continuous => EdgeState::Continuous,
        StatedEdge::Discontinuous => EdgeState::Discontinuous,
        StatedEdge::Free => EdgeState::Free,
    };
    let continuous = stated == StatedEdge::Continuous;
    // A blank cell and the word `discontinuous` read alike: neither claims a moment.
    let (is_stated, why) = match stated {
        StatedEdge::Discontinuous => (false, "loose panel, not stated continuous".to_owned()),
        StatedEdge::Continuous | StatedEdge::Free => (true, stated_why(&row.data.remarks)),
    };
    let support = continuous.then(|| {
        supports.push(Support {
            name: None,
            gridline: None,
            axis,
            from,
            to,
            width_mm: layout.support_width_mm,
            kind: SupportKind::Hogging,
            near: at,
            far: None,
            chosen: None,
        });
        SupportId(supports.len() - 1)
    });
    Edge {
        state,
        stated: is_stated,
        why: why.clone(),
        segments: vec![Segment { from, to, neighbour: None, continuous, joint: false, support, why }],
        support_width_mm: layout.support_width_mm,
    }
}
