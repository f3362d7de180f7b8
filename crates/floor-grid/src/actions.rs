//! How each panel carries its load, as far as the state of its edges depends on it.

use design_engine::floor::{Axis, PanelId, Side, Spanning};
use design_engine::query::{Query, Severity};

use crate::layout::{GridPanel, Layout, LoosePanel, StatedEdge};
use crate::panels::Placed;
use crate::shared_edges::Meeting;
use crate::stretches::{Run, Stretches, Unheld};

/// Greatest ratio of spans of a two-way panel: the tables end there.
const TWO_WAY_RATIO: f64 = 2.0;
/// Ratios are compared within this.
const RATIO_TIE: f64 = 1e-9;
/// One-way panels up to this ratio are noted.
const NOTED_RATIO: f64 = 2.2;
/// Greatest difference of tops that top bars run across, mm.
pub(crate) const STEP_MM: f64 = 25.0;

/// A panel's action.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Action {
    /// Carries both ways.
    TwoWay,
    /// Carries along one axis.
    OneWay(Axis),
    /// Stands out from its root; none where it has no single root.
    Cantilever(Option<Side>),
}

impl Action {
    /// Whether it can carry hogging moment across one of its sides.
    pub(crate) fn hogs_across(self, side: Side) -> bool {
        match self {
            Action::TwoWay => true,
            Action::OneWay(axis) => axis == side.span_axis(),
            Action::Cantilever(root) => root == Some(side),
        }
    }

    /// Whether a side is free because the panel is a cantilever.
    pub(crate) fn frees(self, side: Side) -> bool {
        matches!(self, Action::Cantilever(root) if root != Some(side))
    }

    /// Whether a side runs along a one-way panel's span.
    pub(crate) fn beside_span(self, side: Side) -> bool {
        matches!(self, Action::OneWay(axis) if axis != side.span_axis())
    }
}

/// The action of a panel from what its row asks, its spans along x and y (m) and which of its edges, in
/// the order of [`Side::ALL`], are free over their whole length. A cantilever's root is found later.
pub(crate) fn action_of(spanning: Spanning, spans_m: [f64; 2], free: [bool; 4]) -> Action {
    match spanning {
        Spanning::TwoWay => return Action::TwoWay,
        Spanning::OneWay(axis) => return Action::OneWay(axis),
        Spanning::Cantilever => return Action::Cantilever(None),
        Spanning::Found => {}
    }
    let both_free = |axis: Axis| axis.end_sides().map(|side| free[side.index()]);
    for axis in [Axis::X, Axis::Y] {
        if both_free(axis.across()) == [true; 2] && both_free(axis) == [false; 2] {
            return Action::OneWay(axis);
        }
    }
    let (short, long) = if spans_m[0] <= spans_m[1] { (Axis::X, Axis::Y) } else { (Axis::Y, Axis::X) };
    if ratio(spans_m, short, long) > TWO_WAY_RATIO + RATIO_TIE {
        return Action::OneWay(short);
    }
    Action::TwoWay
}

fn ratio(spans_m: [f64; 2], short: Axis, long: Axis) -> f64 {
    spans_m[long as usize] / spans_m[short as usize]
}

/// Actions of the grid's panels by index; a panel without a place counts as two-way.
pub(crate) fn actions(
    layout: &Layout,
    placed: &[Option<Placed>],
    stretches: &Stretches,
    meetings: &[Meeting],
    edges: &[[Vec<usize>; 4]],
) -> Vec<Action> {
    let mut actions: Vec<Action> = layout
        .panels
        .iter()
        .zip(placed)
        .map(|(panel, at)| match at {
            Some(at) => action_of(panel.data.spanning, spans_m(at), free_edges(panel, at, stretches)),
            None => Action::TwoWay,
        })
        .collect();
    let roots: Vec<(usize, Side)> = (0..actions.len())
        .filter(|index| matches!(actions[*index], Action::Cantilever(_)))
        .filter_map(|index| match roots_of(layout, &actions, meetings, &edges[index], PanelId(index))[..] {
            [root] => Some((index, root)),
            _ => None,
        })
        .collect();
    for (index, root) in roots {
        actions[index] = Action::Cantilever(Some(root));
    }
    actions
}

/// Centre-to-centre spans along x and y, m.
pub(crate) fn spans_m(at: &Placed) -> [f64; 2] {
    [at.rect.length_m(Axis::X), at.rect.length_m(Axis::Y)]
}

/// Which edges have no support over their whole length.
fn free_edges(panel: &GridPanel, at: &Placed, stretches: &Stretches) -> [bool; 4] {
    Side::ALL.map(|side| match panel.stated_edges[side.index()] {
        Some(stated) => stated == StatedEdge::Free,
        None => {
            let [from, to] = at.run(side);
            stretches.unheld(at.line(side), Run { from, to }) == Unheld::Wholly
        }
    })
}

/// The action of a loose panel.
pub(crate) fn loose_action(panel: &LoosePanel) -> Action {
    let free = loose_edges(panel).map(|stated| stated == StatedEdge::Free);
    action_of(panel.data.spanning, [panel.short_span_m, panel.long_span_m], free)
}

/// A loose panel's edges in the order of [`Side::ALL`]: its short span is laid along x.
pub(crate) fn loose_edges(panel: &LoosePanel) -> [StatedEdge; 4] {
    let [long_1, long_2, short_1, short_2] = panel.edges;
    Side::ALL.map(|side| match side {
        Side::West => long_1,
        Side::East => long_2,
        Side::South => short_1,
        Side::North => short_2,
    })
}

/// Sides a cantilever may stand out from: held, and over their whole length against panels that carry its
/// moment on, with no joint and no step over 25 mm. Where the book states one of them continuous, that one.
pub(crate) fn roots_of(
    layout: &Layout,
    actions: &[Action],
    meetings: &[Meeting],
    edges: &[Vec<usize>; 4],
    panel: PanelId,
) -> Vec<Side> {
    let row = &layout.panels[panel.0];
    let carries_on = |side: Side, meeting: &Meeting| {
        let other = if meeting.near == Some(panel) { meeting.far } else { meeting.near };
        other.is_some_and(|other| {
            let back_span = &layout.panels[other.0];
            let back_action = actions[other.0];
            !matches!(back_action, Action::Cantilever(_))
                && back_action.hogs_across(side.opposite())
                && !matches!(
                    back_span.stated_edges[side.opposite().index()],
                    Some(StatedEdge::Discontinuous | StatedEdge::Free)
                )
                && (back_span.top_level_mm - row.top_level_mm).abs() <= STEP_MM + 1e-9
                && !meeting.joint
                && meeting.held
        })
    };
    let stated = |side: &Side| row.stated_edges[side.index()];
    let mut roots: Vec<Side> = Side::ALL
        .into_iter()
        .filter(|side| matches!(stated(side), None | Some(StatedEdge::Continuous)))
        .filter(|side| edges[side.index()].iter().all(|index| carries_on(*side, &meetings[*index])))
        .collect();
    if roots.iter().any(|side| stated(side).is_some()) {
        roots.retain(|side| stated(side).is_some());
    }
    roots
}

/// Notes the panels that are one-way by a ratio little over 2.
pub(crate) fn note_ratios(
    layout: &Layout,
    placed: &[Option<Placed>],
    actions: &[Action],
    queries: &mut Vec<Query>,
) {
    for ((panel, at), action) in layout.panels.iter().zip(placed).zip(actions) {
        let Some(at) = at else { continue };
        note_ratio(&panel.data.mark, panel.data.spanning, spans_m(at), *action, queries);
    }
    for panel in &layout.loose_panels {
        let spans_m = [panel.short_span_m, panel.long_span_m];
        note_ratio(&panel.data.mark, panel.data.spanning, spans_m, loose_action(panel), queries);
    }
}

fn note_ratio(mark: &str, spanning: Spanning, spans_m: [f64; 2], action: Action, queries: &mut Vec<Query>) {
    let Action::OneWay(short) = action else { return };
    let ratio = ratio(spans_m, short, short.across());
    if spanning == Spanning::Found && ratio > TWO_WAY_RATIO + RATIO_TIE && ratio <= NOTED_RATIO + RATIO_TIE {
        queries.push(Query::panel(
            Severity::Note,
            mark,
            None,
            format!(
                "the long span is {ratio:.2} times the short one, little over 2: one-way along the short span"
            ),
            "",
        ));
    }
}
