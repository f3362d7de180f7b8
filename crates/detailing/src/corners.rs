//! Torsion bars at corners, beyond what is there.

use design_engine::bars::bar_size;
use design_engine::bs8110::bond::anchorage_mm;
use design_engine::choose::nominal_bars;
use design_engine::floor::{Axis, BarChoice, Layer, Side};
use design_engine::result::CornerDesign;

use crate::bending::up_to_5;
use crate::context::PanelContext;
use crate::drafts::{Common, SetDraft, runs};
use crate::edges::height_mm;
use crate::model::Use;
use crate::placed::{End, Placed, Reach};
use crate::zones::FROM_FACE_MM;

/// Sets of torsion bars in a panel: at each corner, along each axis, in each face.
pub(crate) fn sets(context: &PanelContext<'_>) -> Vec<SetDraft> {
    let mut sets = Vec::new();
    for corner in &context.design.corners {
        for axis in [Axis::X, Axis::Y] {
            let [bottom, top] =
                [corner.as_to_add_mm2_m[axis as usize], corner.as_to_add_mm2_m[2 + axis as usize]];
            sets.extend(along(context, corner, axis, bottom, top));
        }
    }
    sets
}

fn along(
    context: &PanelContext<'_>,
    corner: &CornerDesign,
    axis: Axis,
    bottom: f64,
    top: f64,
) -> Vec<SetDraft> {
    let least = 1e-6;
    if bottom <= least && top <= least {
        return Vec::new();
    }
    let Some(&at) = corner.sides.iter().find(|side| side.span_axis() == axis) else { return Vec::new() };
    let Some(&beside) = corner.sides.iter().find(|side| side.span_axis() != axis) else { return Vec::new() };
    let over = context.support_at(at, context.slab.side(beside).line);
    if let (None, Some(set)) = (over, hooked(context, corner, at, beside, bottom, top)) {
        return vec![set];
    }
    let mut sets = Vec::new();
    for (area, is_top) in [(bottom, false), (top, true)] {
        if area > least {
            sets.extend(straight(context, corner, at, beside, area, is_top));
        }
    }
    sets
}

/// Bars for an area, no larger than the panel's bottom bars.
fn bars_for(context: &PanelContext<'_>, axis: Axis, area: f64) -> Option<BarChoice> {
    let basis = context.design.basis?;
    let size = context.design.bars.bottom[basis.span_along(axis) as usize]?.bars.bar_mm;
    let criteria = context.criteria;
    nominal_bars(criteria, area, size, context.slab.panel.thickness_mm, criteria.bottom_cover_mm)
}

/// Places across: as many as the extent holds at the spacing, from the face of the side beside on, between the bars that are
/// there: half a spacing on from where they begin.
fn places(context: &PanelContext<'_>, corner: &CornerDesign, beside: Side, spacing_mm: f64) -> Vec<f64> {
    let line = context.slab.side(beside);
    let end = line.line - line.outward * corner.extent_m * 1000.0;
    let width = (line.face - end) * line.outward;
    let mut places = Vec::new();
    let mut from_face = FROM_FACE_MM + spacing_mm / 2.0;
    while spacing_mm * number(places.len()) < width - 1e-6 {
        places.push(line.inward(from_face));
        from_face += spacing_mm;
    }
    places.sort_by(f64::total_cmp);
    places
}

#[expect(clippy::cast_precision_loss, reason = "bars of a corner are far below 2^53")]
fn number(bars: usize) -> f64 {
    bars as f64
}

/// At a discontinuous edge: U-bars, one leg in each face. None where the slab is too thin for them.
fn hooked(
    context: &PanelContext<'_>,
    corner: &CornerDesign,
    at: Side,
    beside: Side,
    bottom: f64,
    top: f64,
) -> Option<SetDraft> {
    let axis = at.span_axis();
    let design = context.design.bars.edges[at.index()]?;
    let bars = bars_for(context, axis, bottom.max(top))?;
    let height = height_mm(context, at, design.outside_mm);
    let made = bar_size(bars.bar_mm);
    if height < 2.0 * (made.radius_mm + bars.bar_mm) {
        return None;
    }
    let line = context.slab.side(at);
    let outer = line.bar_limit(context.criteria.top_cover_mm);
    let inner = line.line - line.outward * corner.extent_m * 1000.0;
    let leg = (inner - outer).abs();
    let back = if bottom > 1e-6 { leg } else { made.projection_mm.max(12.0 * bars.bar_mm) };
    let end = End::Hook { height_mm: height, back_mm: up_to_5(back) };
    let far = context.slab.side(at.opposite()).bar_limit(context.criteria.top_cover_mm);
    let outer = Reach { needed: outer, limit: outer, end };
    let inner = Reach::straight(inner, far);
    let ends = if line.outward < 0.0 { [outer, inner] } else { [inner, outer] };
    let faces = if bottom > 1e-6 && top > 1e-6 { "corner, top and bottom" } else { "corner" };
    let mut draft = context.draft(Use::Corner, design.layer, axis, Some(bars.spacing_mm), faces);
    fill(context, corner, beside, bars, ends, &mut draft);
    draft.set.side = Some(at);
    Some(draft)
}

/// Over a continuous support, or where no U-bar fits: straight bars in one face.
fn straight(
    context: &PanelContext<'_>,
    corner: &CornerDesign,
    at: Side,
    beside: Side,
    area: f64,
    top: bool,
) -> Option<SetDraft> {
    let axis = at.span_axis();
    let bars = bars_for(context, axis, area)?;
    let line = context.slab.side(at);
    let cover = context.criteria.top_cover_mm;
    let continuous = context.support_at(at, context.slab.side(beside).line).is_some();
    let inner = line.line - line.outward * corner.extent_m * 1000.0;
    let far = context.slab.side(at.opposite()).bar_limit(cover);
    let outer = if continuous {
        let past = line.line + line.outward * anchorage_mm(bars.bar_mm, context.criteria);
        Reach::straight(past, past + line.outward * 25.0)
    } else {
        Reach::at(line.bar_limit(cover))
    };
    let inner = Reach::straight(inner, far);
    let ends = if line.outward < 0.0 { [outer, inner] } else { [inner, outer] };
    let section = context.design.basis.and_then(|basis| context.midspan(basis.span_along(axis)));
    let layer = match (top, section.map(|section| section.layer)) {
        (false, Some(layer)) => layer,
        (false, None) => Layer::B1,
        (true, _) => top_layer(context, at),
    };
    let mut draft = context.draft(Use::Corner, layer, axis, Some(bars.spacing_mm), "corner");
    fill(context, corner, beside, bars, ends, &mut draft);
    draft.set.side = Some(at);
    Some(draft)
}

/// The top layer of bars at right angles to a side.
fn top_layer(context: &PanelContext<'_>, at: Side) -> Layer {
    let supports = context.slab.panel.edge(at).segments.iter().filter_map(|segment| segment.support);
    let over = supports.filter_map(|id| context.support(id)).map(|design| design.layer).next();
    over.or(context.design.bars.edges[at.index()].map(|edge| edge.layer)).unwrap_or(Layer::T1)
}

fn fill(
    context: &PanelContext<'_>,
    corner: &CornerDesign,
    beside: Side,
    bars: BarChoice,
    ends: [Reach; 2],
    draft: &mut SetDraft,
) {
    let placed: Vec<Placed> = places(context, corner, beside, bars.spacing_mm)
        .into_iter()
        .map(|across| Placed { across, ends })
        .collect();
    let common = Common {
        size_mm: bars.bar_mm,
        spacing_mm: bars.spacing_mm,
        layer: draft.set.layer,
        criteria: context.criteria,
    };
    draft.runs = runs(&placed, &context.holes(draft.set.axis), &common);
}
