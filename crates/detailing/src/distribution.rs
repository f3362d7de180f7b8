//! Top distribution bars under the bars over supports, and those of cantilevers.

use design_engine::check::Place;
use design_engine::floor::{Axis, BarChoice, EdgeState, Layer, Side};
use design_engine::result::{Action, SupportDesign, SupportSideDesign};

use crate::context::PanelContext;
use crate::drafts::{Common, SetDraft, runs};
use crate::model::Use;
use crate::placed::{Placed, Reach};
use crate::zones::between_faces;

/// Sets of distribution bars in a panel: along each side whose support has bars that reach into it.
pub(crate) fn sets(context: &PanelContext<'_>) -> Vec<SetDraft> {
    if context.design.basis.is_some_and(|basis| basis.action == Action::Cantilever) {
        return cantilever(context).into_iter().collect();
    }
    let mut sets = Vec::new();
    for side in Side::ALL {
        let edge = context.slab.panel.edge(side);
        for segment in &edge.segments {
            let Some(design) = segment.support.and_then(|id| context.support(id)) else { continue };
            let Some(own) = design.sides.iter().find(|own| own.panel == context.id()) else { continue };
            // Bars that run through are spread once, from the side of the lesser coordinate.
            if own.runs_through && matches!(side, Side::North | Side::East) {
                continue;
            }
            sets.extend(along_side(context, side, context.slab.segment(side, segment), design, own));
        }
    }
    sets
}

fn along_side(
    context: &PanelContext<'_>,
    side: Side,
    stretch: [f64; 2],
    design: &SupportDesign,
    own: &SupportSideDesign,
) -> Option<SetDraft> {
    let bars = own.distribution?;
    let axis = side.span_axis().across();
    let layer = if design.layer == Layer::T1 { Layer::T2 } else { Layer::T1 };
    let common = common(context, bars, layer);
    let line = context.slab.side(side);
    let ends = [0, 1].map(|end| end_of(context, side, axis.end_sides()[end], stretch[end], common.lap()));
    // Crossing bars that lap each other's laps leave nothing to distribute.
    if ends[1].needed - ends[0].needed <= 2.0 * common.lap() + 1.0 {
        return None;
    }
    let reach = line.inward(own.extension_m * 1000.0);
    let zone = [line.face.min(reach), line.face.max(reach)];
    let placed: Vec<Placed> =
        between_faces(zone, bars.spacing_mm).into_iter().map(|across| Placed { across, ends }).collect();
    let mut draft = context.draft(Use::Distribution, layer, axis, Some(bars.spacing_mm), "");
    draft.set.side = Some(side);
    draft.set.supports = vec![design.support];
    draft.runs = runs(&placed, &context.holes(axis), &common);
    Some(draft)
}

fn common<'a>(context: &PanelContext<'a>, bars: BarChoice, layer: Layer) -> Common<'a> {
    Common { size_mm: bars.bar_mm, spacing_mm: bars.spacing_mm, layer, criteria: context.criteria }
}

/// Where distribution bars along a side end: a lap into the bars that cross at the side they run to, or into the next
/// stretch's where theirs ends within the side.
fn end_of(context: &PanelContext<'_>, side: Side, to: Side, stretch_end: f64, lap: f64) -> Reach {
    let line = context.slab.side(to);
    let limit = line.bar_limit(context.criteria.top_cover_mm);
    if (stretch_end - line.line).abs() > 0.05 {
        return Reach::straight(stretch_end + line.outward * lap, limit);
    }
    match crossing_reach_mm(context, side, to) {
        Some(reach) => Reach::straight(line.inward(reach) + line.outward * lap, limit),
        None => Reach::at(limit),
    }
}

/// How far past the face the top bars reach that come in over a side, beside another side; none where there are none.
fn crossing_reach_mm(context: &PanelContext<'_>, beside: Side, over: Side) -> Option<f64> {
    let along = context.slab.side(beside).line;
    if let Some(design) = context.support_at(over, along) {
        let own = design.sides.iter().find(|own| own.panel == context.id())?;
        return Some(own.extension_m * 1000.0);
    }
    if context.slab.panel.edge(over).state == EdgeState::Free {
        return None;
    }
    context.design.bars.edges[over.index()].map(|edge| edge.extension_m * 1000.0)
}

/// Distribution bars of a cantilever: along its root, from the face to the tip.
fn cantilever(context: &PanelContext<'_>) -> Option<SetDraft> {
    let basis = context.design.basis?;
    let section = context.design.section(Place::TopFace)?;
    let axis: Axis = basis.axis_of(basis.main_span.other());
    let root =
        axis.across().end_sides().into_iter().find(|side| basis.state(*side) == EdgeState::Continuous)?;
    let (root_line, tip) = (context.slab.side(root), context.slab.side(root.opposite()));
    let cover = context.criteria.top_cover_mm;
    let ends = axis.end_sides().map(|side| Reach::at(context.slab.side(side).bar_limit(cover)));
    let zone = [root_line.face.min(tip.face), root_line.face.max(tip.face)];
    let placed: Vec<Placed> = between_faces(zone, section.bars.spacing_mm)
        .into_iter()
        .map(|across| Placed { across, ends })
        .collect();
    let common = common(context, section.bars, section.layer);
    let mut draft =
        context.draft(Use::Distribution, section.layer, axis, Some(section.bars.spacing_mm), "cantilever");
    draft.set.side = Some(root);
    draft.runs = runs(&placed, &context.holes(axis), &common);
    Some(draft)
}
