//! Top bars at discontinuous edges: U-bars round the edge, or bars with a leg down into the support where the slab is too
//! thin for two bends.

use design_engine::bars::bar_size;
use design_engine::bs8110::anchorage::EndAnchorage;
use design_engine::bs8110::bond::anchorage_mm;
use design_engine::bs8110::flexure::steel_area;
use design_engine::choose::nominal_bars;
use design_engine::floor::{BarChoice, EdgeState, Side};
use design_engine::query::{Query, Severity};
use design_engine::result::EdgeBars;

use crate::bending::{down_to_5, up_to_5};
use crate::context::PanelContext;
use crate::drafts::{Common, SetDraft, runs};
use crate::model::Use;
use crate::placed::{End, Placed, Reach};
use crate::zones::between_faces;

/// Sets of top bars along the discontinuous stretches of a panel's sides.
pub(crate) fn sets(context: &PanelContext<'_>, queries: &mut Vec<Query>) -> Vec<SetDraft> {
    let mut sets = Vec::new();
    for side in Side::ALL {
        let edge = context.slab.panel.edge(side);
        let Some(design) = context.design.bars.edges[side.index()] else { continue };
        if edge.state == EdgeState::Free {
            continue;
        }
        let Some((bars, end)) = bars_and_end(context, side, &design) else { continue };
        if matches!(end, End::Leg(_)) {
            queries.push(leg_query(context, side, end));
        }
        for segment in edge.segments.iter().filter(|segment| segment.support.is_none()) {
            let stretch = context.slab.segment(side, segment);
            sets.push(along(context, side, stretch, &design, bars, end));
        }
    }
    sets
}

fn leg_query(context: &PanelContext<'_>, side: Side, end: End) -> Query {
    let panel = context.slab.panel;
    let leg = if let End::Leg(leg) = end { leg } else { 0.0 };
    let text = format!(
        "the slab is too thin for two bends of the top bars at its {} edge: they have a leg of {leg} mm down into the support",
        panel.side_word(side)
    );
    Query::panel(Severity::Note, &panel.mark, None, text, "see that the beam or wall has room for the leg")
}

/// Bars and outer end of the top bars at a side: the chosen size, or a smaller one that can be bent in the thickness.
pub(crate) fn bars_and_end(
    context: &PanelContext<'_>,
    side: Side,
    design: &EdgeBars,
) -> Option<(BarChoice, End)> {
    let criteria = context.criteria;
    let thickness = context.slab.panel.thickness_mm;
    let mut bars = design.bars;
    let cover = criteria.top_cover_mm + design.outside_mm;
    loop {
        let height = height_mm(context, side, design.outside_mm);
        let made = bar_size(bars.bar_mm);
        if height >= 2.0 * (made.radius_mm + bars.bar_mm) {
            return Some((
                bars,
                End::Hook { height_mm: height, back_mm: back_mm(context, side, bars, height) },
            ));
        }
        let smaller = criteria.bar_sizes_mm.iter().rev().find(|size| **size < bars.bar_mm - 1e-9);
        match smaller
            .and_then(|size| nominal_bars(criteria, design.as_required_mm2_m, *size, thickness, cover))
        {
            Some(next) if next.bar_mm < bars.bar_mm - 1e-9 && enough(next, design) => bars = next,
            _ => break,
        }
    }
    let bars = design.bars;
    let leg = anchorage_mm(bars.bar_mm, criteria) - straight_past_face(context, side);
    Some((bars, End::Leg(up_to_5(leg.max(bar_size(bars.bar_mm).projection_mm)))))
}

/// Whether bars hold the steel that the edge asks for.
fn enough(bars: BarChoice, design: &EdgeBars) -> bool {
    steel_area(bars.bar_mm, bars.spacing_mm) >= design.as_required_mm2_m - 1e-6
}

/// Height of a U-bar between the faces: thickness less covers, deduction and the bars outside it at both faces.
pub(crate) fn height_mm(context: &PanelContext<'_>, side: Side, outside_top_mm: f64) -> f64 {
    let criteria = context.criteria;
    let covers = criteria.top_cover_mm + criteria.bottom_cover_mm + criteria.bending_deduction_mm;
    let outside = outside_top_mm + context.bottom_outside_mm(side.span_axis());
    down_to_5(context.slab.panel.thickness_mm - covers - outside)
}

/// Length of a bar past the face of its support, to its end cover.
fn straight_past_face(context: &PanelContext<'_>, side: Side) -> f64 {
    let line = context.slab.side(side);
    (line.bar_limit(context.criteria.top_cover_mm) - line.face).abs()
}

/// The returning leg: the rest of the anchorage, the least projection, 12 sizes; a lap where the bottom bars lap it.
fn back_mm(context: &PanelContext<'_>, side: Side, bars: BarChoice, height: f64) -> f64 {
    let criteria = context.criteria;
    let rest = anchorage_mm(bars.bar_mm, criteria) - straight_past_face(context, side) - height;
    let least = rest.max(bar_size(bars.bar_mm).projection_mm).max(12.0 * bars.bar_mm);
    let basis = context.design.basis;
    let lapped = basis.and_then(|basis| {
        let bottom = context.design.bars.bottom[basis.span_along(side.span_axis()) as usize]?;
        let end = bottom.ends[usize::from(matches!(side, Side::North | Side::East))]?;
        (end.kind == EndAnchorage::LapsEdgeBar).then(|| {
            let layer = design_engine::floor::Layer::B1;
            let size_mm = bars.bar_mm.max(bottom.bars.bar_mm);
            let spacing_mm = bars.spacing_mm.min(bottom.bars.spacing_mm);
            Common { size_mm, spacing_mm, layer, criteria }.lap()
        })
    });
    up_to_5(lapped.map_or(least, |lap| least.max(lap)))
}

fn along(
    context: &PanelContext<'_>,
    side: Side,
    stretch: [f64; 2],
    design: &EdgeBars,
    bars: BarChoice,
    end: End,
) -> SetDraft {
    let axis = side.span_axis();
    let line = context.slab.side(side);
    let outer = line.bar_limit(context.criteria.top_cover_mm);
    let far = context.slab.side(side.opposite()).bar_limit(context.criteria.top_cover_mm);
    let zone = context.slab.between_faces(side, stretch);
    let placed: Vec<Placed> = between_faces(zone, bars.spacing_mm)
        .into_iter()
        .map(|across| {
            let needed = inner_end(context, side, design, across);
            let inner = Reach::straight(needed, far);
            let outer = Reach { needed: outer, limit: outer, end };
            Placed { across, ends: if line.outward < 0.0 { [outer, inner] } else { [inner, outer] } }
        })
        .collect();
    let common = Common {
        size_mm: bars.bar_mm,
        spacing_mm: bars.spacing_mm,
        layer: design.layer,
        criteria: context.criteria,
    };
    let mut draft = context.draft(Use::Edge, design.layer, axis, Some(bars.spacing_mm), "");
    draft.set.side = Some(side);
    draft.runs = runs(&placed, &context.holes(axis), &common);
    draft
}

/// Where a top bar at a side ends in the panel: past the face, and within a corner's torsion steel a fifth of lx from the
/// edge line.
fn inner_end(context: &PanelContext<'_>, side: Side, design: &EdgeBars, across: f64) -> f64 {
    let line = context.slab.side(side);
    let mut depth = (line.inward(design.extension_m * 1000.0) - line.line).abs();
    for corner in context.design.corners.iter().filter(|corner| corner.as_required_mm2_m > 0.0) {
        let other = corner.sides.iter().find(|other| other.span_axis() != side.span_axis());
        let extent = corner.extent_m * 1000.0;
        if corner.sides.contains(&side)
            && other.is_some_and(|other| (context.slab.side(*other).line - across).abs() <= extent + 1e-6)
        {
            depth = depth.max(extent);
        }
    }
    line.line - line.outward * depth
}
