//! Bottom bars of a panel, both ways.

use design_engine::bs8110::anchorage::{EndAnchorage, EndAnchorageWorking};
use design_engine::bs8110::curtailment::bottom_stop_share;
use design_engine::floor::{Axis, BarChoice, EdgeState, Layer, Side, Span};
use design_engine::result::{BottomBarsDesign, PanelDesign};

use crate::context::PanelContext;
use crate::drafts::{Common, SetDraft, runs};
use crate::model::Use;
use crate::placed::{End, Placed, Reach};
use crate::zones::{FROM_FACE_MM, between_faces, from_to};

/// Share of a two-way panel's width in each edge strip (3.5.3.5).
const EDGE_STRIP_SHARE: f64 = 0.125;

/// The sets of bottom bars of a panel: the outer layer first.
pub(crate) fn sets(context: &PanelContext<'_>) -> Vec<SetDraft> {
    let mut sets = Vec::new();
    for layer in [Layer::B1, Layer::B2] {
        for span in [Span::Short, Span::Long] {
            let section = context.midspan(span);
            if let (Some(bars), true) =
                (context.design.bars.bottom[span as usize], section.is_some_and(|s| s.layer == layer))
            {
                sets.extend(of_span(context, span, layer, &bars));
            }
        }
    }
    sets
}

fn of_span(context: &PanelContext<'_>, span: Span, layer: Layer, bars: &BottomBarsDesign) -> Vec<SetDraft> {
    let Some(basis) = context.design.basis else { return Vec::new() };
    let axis = basis.axis_of(span);
    let across = context.slab.clear(axis.across());
    let Some(edge) = bars.edge_strip else {
        let places = between_faces(across, bars.bars.spacing_mm);
        return vec![set(context, axis, layer, bars, bars.bars, &places, "")];
    };
    let lines = context.slab.extent(axis.across());
    let strip = EDGE_STRIP_SHARE * (lines[1] - lines[0]);
    let middle = [lines[0] + strip, lines[1] - strip];
    let s = edge.spacing_mm;
    let low: Vec<f64> = until([across[0] + FROM_FACE_MM, middle[0]], s);
    let mut high: Vec<f64> =
        until([-(across[1] - FROM_FACE_MM), -middle[1]], s).iter().map(|at| -at).collect();
    high.reverse();
    vec![
        set(context, axis, layer, bars, edge, &low, "edge strip"),
        set(context, axis, layer, bars, bars.bars, &from_to(middle, bars.bars.spacing_mm), "middle strip"),
        set(context, axis, layer, bars, edge, &high, "edge strip"),
    ]
}

/// Places from the start of a stretch on, the end left out.
fn until(stretch: [f64; 2], spacing_mm: f64) -> Vec<f64> {
    let mut places = from_to(stretch, spacing_mm);
    places.pop();
    places
}

fn set(
    context: &PanelContext<'_>,
    axis: Axis,
    layer: Layer,
    design: &BottomBarsDesign,
    bars: BarChoice,
    places: &[f64],
    words: &str,
) -> SetDraft {
    let sides = axis.end_sides();
    let full: [Reach; 2] = [0, 1].map(|end| reach(context, sides[end], design.ends[end], bars.bar_mm));
    let stops = [0, 1].map(|end| Reach::at(stop(context, sides[end])));
    let placed: Vec<Placed> = places
        .iter()
        .enumerate()
        .map(|(index, &at)| {
            // The first and the last bar go the whole way.
            let inner = index % 2 == 1 && index + 1 < places.len();
            let short = design.alternate_stop && inner && !in_corner(context, axis, at);
            Placed { across: at, ends: if short { stops } else { full } }
        })
        .collect();
    let common =
        Common { size_mm: bars.bar_mm, spacing_mm: bars.spacing_mm, layer, criteria: context.criteria };
    let mut draft = context.draft(Use::Bottom, layer, axis, Some(bars.spacing_mm), words);
    draft.runs = runs(&placed, &context.holes(axis), &common);
    draft
}

/// Where a bar ends at a side: at the centre line of a continuous support (12 sizes past the face at least), at the edge of
/// the slab, or as its anchorage asks.
fn reach(context: &PanelContext<'_>, side: Side, end: Option<EndAnchorageWorking>, size_mm: f64) -> Reach {
    let line = context.slab.side(side);
    let cover = context.criteria.bottom_cover_mm;
    let limit = line.bar_limit(cover);
    let outward = line.outward;
    let Some(end) = end else {
        if context.slab.panel.edge(side).state == EdgeState::Free {
            return Reach::at(limit);
        }
        let past_face = line.face + outward * 12.0 * size_mm;
        let needed = if outward > 0.0 { line.centre.max(past_face) } else { line.centre.min(past_face) };
        // The neighbour's slab goes on.
        let beyond = line.face + outward * 1000.0;
        return Reach::straight(needed, beyond);
    };
    match end.kind {
        EndAnchorage::ThirdOfSupport | EndAnchorage::Straight => {
            Reach::straight(line.centre + outward * end.past_centre_line_mm, limit)
        }
        EndAnchorage::Bent => Reach { needed: limit, limit, end: End::Leg(end.leg_mm) },
        EndAnchorage::LapsEdgeBar | EndAnchorage::None => Reach::at(limit),
    }
}

/// Where alternate bars stop short of a side.
fn stop(context: &PanelContext<'_>, side: Side) -> f64 {
    let line = context.slab.side(side);
    let continuous = context.slab.panel.edge(side).state == EdgeState::Continuous;
    let length = context.slab.panel.span_m(side.span_axis()) * 1000.0;
    line.line - line.outward * bottom_stop_share(continuous) * length
}

/// Whether a bar at a place across lies within the torsion steel of a corner, where none is stopped short.
fn in_corner(context: &PanelContext<'_>, axis: Axis, at: f64) -> bool {
    let design: &PanelDesign = context.design;
    design.corners.iter().filter(|corner| corner.as_required_mm2_m > 0.0).any(|corner| {
        corner
            .sides
            .iter()
            .filter(|side| side.span_axis() == axis.across())
            .any(|side| (context.slab.side(*side).line - at).abs() <= corner.extent_m * 1000.0 + 1e-6)
    })
}
