//! The words that both outputs print for things of the design.

use design_engine::check::{Check, CheckKind};
use design_engine::criteria::Criteria;
use design_engine::floor::{
    Axis, BarChoice, Edge, EdgeState, Floor, Layer, PanelId, Segment, Support, SupportId,
};
use design_engine::query::{Query, Subject};
use design_engine::result::{PanelDesign, SupportDesign, SupportSideDesign};

use crate::book::PlacedQuery;

/// The layers, named from the nearest face, for every sheet.
pub(super) const LAYER_KEY: [(Layer, &str); 4] = [
    (Layer::B1, "bottom outer"),
    (Layer::B2, "bottom inner"),
    (Layer::T1, "top outer"),
    (Layer::T2, "top inner"),
];

/// The layer key in one line.
pub(super) fn layer_key() -> String {
    let entries: Vec<String> =
        LAYER_KEY.iter().map(|(layer, place)| format!("{} {place}", layer.word())).collect();
    entries.join("   ")
}

/// `top` or `bottom`.
pub(super) fn face(layer: Layer) -> &'static str {
    match layer {
        Layer::B1 | Layer::B2 => "bottom",
        Layer::T1 | Layer::T2 => "top",
    }
}

/// A unit as it is printed: `mm2/m` with its power raised.
pub(super) fn unit(unit: &str) -> String {
    unit.replace("m2", "m²").replace("m3", "m³")
}

/// An edge state short enough for a narrow column.
pub(super) fn short_state(state: EdgeState) -> &'static str {
    match state {
        EdgeState::Continuous => "cont",
        EdgeState::PartlyContinuous => "part",
        EdgeState::Discontinuous => "disc",
        EdgeState::Free => "free",
    }
}

/// The state of one stretch of an edge.
pub(super) fn segment_state(edge: &Edge, segment: &Segment) -> &'static str {
    let state = match edge.state {
        EdgeState::Free => EdgeState::Free,
        _ if segment.continuous => EdgeState::Continuous,
        _ => EdgeState::Discontinuous,
    };
    state.word()
}

/// Axis of a gridline as floor books write it.
pub(super) fn gridline_axis(axis: Axis) -> &'static str {
    match axis {
        Axis::X => "X",
        Axis::Y => "Y",
    }
}

/// Bars in words, `H10-200 B1`; the engineer's own choice says so.
pub(super) fn bars(criteria: &Criteria, bars: BarChoice, layer: Layer, stated: bool) -> String {
    let letter = criteria.bar_type_letter();
    let stated = if stated { " stated" } else { "" };
    format!("{letter}{}-{} {}{stated}", bars.bar_mm, bars.spacing_mm, layer.word())
}

/// `passes` or `FAILS`.
pub(super) fn check_result(check: &Check) -> &'static str {
    if check.ok { "passes" } else { "FAILS" }
}

/// `passes`, `FAILS: deflection, shear` or `NOT DESIGNED: reason`.
pub(super) fn panel_result(panel: &PanelDesign) -> String {
    if let Some(reason) = &panel.not_designed {
        return format!("NOT DESIGNED: {reason}");
    }
    let failing: Vec<&str> = CheckKind::ALL
        .into_iter()
        .filter(|kind| panel.checks.iter().any(|check| check.kind == *kind && !check.ok))
        .map(CheckKind::word)
        .collect();
    if failing.is_empty() { "passes".to_owned() } else { format!("FAILS: {}", failing.join(", ")) }
}

/// Names in a row, at most `most` of them: `S1, S2 and 7 more`.
pub(super) fn listed(names: &[&str], most: usize) -> String {
    if names.len() <= most {
        return names.join(", ");
    }
    format!("{} and {} more", names[..most].join(", "), names.len() - most)
}

/// A support's name; where one panel alone has it, that panel's edge.
pub(super) fn support_name(floor: &Floor, support: &Support) -> String {
    support.name.clone().unwrap_or_else(|| {
        let panel = floor.panel(support.near.panel);
        let side = panel.side_word(support.near.side);
        let edge = if panel.is_loose() { side.to_owned() } else { format!("{side} edge") };
        format!("{} {edge}", panel.mark)
    })
}

/// The panels whose midspan moment across a support rose by balancing.
pub(super) fn midspans_raised<'a>(floor: &'a Floor, support: &SupportDesign) -> Vec<&'a str> {
    support
        .sides
        .iter()
        .filter(|side| side.midspan_after_knm_m > side.midspan_before_knm_m)
        .map(|side| mark(floor, side.panel))
        .collect()
}

/// A panel's side of a support, where that panel was designed.
pub(super) fn side_of(design: &SupportDesign, panel: PanelId) -> Option<&SupportSideDesign> {
    design.sides.iter().find(|side| side.panel == panel)
}

/// A panel's mark.
pub(super) fn mark(floor: &Floor, panel: PanelId) -> &str {
    &floor.panel(panel).mark
}

/// The name of a support that has one.
pub(super) fn shared_name(floor: &Floor, support: Option<SupportId>) -> Option<&str> {
    floor.support(support?).name.as_deref()
}

/// What a query is about, for a reader who has no book open.
pub(super) fn about(floor: &Floor, query: &Query) -> String {
    // Loose panels come last.
    let loose = |mark: &str| {
        floor.panels.iter().rev().take_while(|panel| panel.is_loose()).any(|panel| panel.mark == mark)
    };
    match &query.subject {
        Subject::Floor => "floor".to_owned(),
        Subject::Setting(item) => format!("criteria, {item}"),
        Subject::Panel { mark, column: None } => format!("panel {mark}"),
        Subject::Panel { mark, column: Some(column) } => format!("panel {mark}, {column}"),
        Subject::Edge { mark, side } if loose(mark) => format!("panel {mark}, {}", side.loose_word()),
        Subject::Edge { mark, side } => format!("panel {mark}, {} edge", side.word()),
        Subject::Support(name) => format!("support {name}"),
        Subject::Gridline(name) => format!("gridline {name}"),
        Subject::Row { sheet, index } => format!("{sheet}, entry {}", index + 1),
    }
}

/// A query's place in the book.
pub(super) fn query_place(query: &PlacedQuery) -> Option<String> {
    query.place.as_ref().map(ToString::to_string)
}
