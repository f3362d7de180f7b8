//! What cantilevers do to the panels they stand out from: moments at the root, shears and reactions that follow.

use super::balance::{SupportMoment, new_side_moments};
use super::fixed::Fixed;
use super::view::View;
use crate::floor::{PanelId, Segment, Side, SupportId};
use crate::result::Action;

/// Moment at a cantilever's root per metre of the back-span's side, characteristic and design, kNm/m.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub(crate) struct RootMoment {
    pub(crate) dead_knm_m: f64,
    pub(crate) imposed_knm_m: f64,
}

/// The cantilever across a segment of a panel's side, with the side it is rooted at.
fn cantilever_across<'a>(view: &View<'a>, id: PanelId, segment: &Segment) -> Option<(&'a Fixed, Side)> {
    let support = view.floor.support(segment.support.filter(|_| segment.continuous)?);
    let other = support.sides().find(|side| side.panel != id)?;
    let fixed = view.fixed(other.panel)?;
    (fixed.basis.action == Action::Cantilever).then_some((fixed, other.side))
}

/// The greatest design root moment along a side, kNm/m; 0 where no cantilever stands out there.
pub(crate) fn greatest_root_knm_m(view: &View<'_>, id: PanelId, side: Side) -> f64 {
    if view.fixed(id).is_some_and(|fixed| fixed.basis.action == Action::Cantilever) {
        return 0.0;
    }
    let segments = &view.floor.panel(id).edge(side).segments;
    let roots = segments.iter().filter_map(|segment| cantilever_across(view, id, segment));
    roots.map(|(fixed, side)| fixed.side(side)).fold(0.0, f64::max)
}

/// Root moments along a side, spread over the whole of it.
pub(crate) fn mean_root(view: &View<'_>, id: PanelId, side: Side) -> RootMoment {
    let panel = view.floor.panel(id);
    let length = panel.span_m(side.span_axis().across());
    let mut mean = RootMoment::default();
    for segment in &panel.edge(side).segments {
        let Some((fixed, _)) = cantilever_across(view, id, segment) else { continue };
        let share = (segment.to - segment.from).m() / length;
        let l = fixed.basis.length_m(fixed.basis.main_span);
        let walls = fixed.wall_moment_knm_m / view.criteria.dead_load_factor;
        mean.dead_knm_m += share * (fixed.loads.dead_kn_m2 * l * l / 2.0 + walls);
        mean.imposed_knm_m += share * fixed.loads.imposed_kn_m2 * l * l / 2.0;
    }
    mean
}

/// Final support moment along a side, spread over the whole of it and cantilevers left out, kNm/m.
pub(crate) fn mean_moment_knm_m(
    view: &View<'_>,
    id: PanelId,
    side: Side,
    moments: &dyn Fn(SupportId) -> Option<SupportMoment>,
) -> f64 {
    let panel = view.floor.panel(id);
    let length = panel.span_m(side.span_axis().across());
    let edge = panel.edge(side);
    let hogging = edge.segments.iter().filter(|segment| segment.continuous);
    hogging
        .filter(|segment| cantilever_across(view, id, segment).is_none())
        .map(|segment| {
            let moment = segment.support.and_then(moments).and_then(|support| support.moment_knm_m);
            moment.unwrap_or(0.0) * (segment.to - segment.from).m() / length
        })
        .sum()
}

/// The greatest final support moment along a side, kNm/m, cantilevers counted; 0 where nothing hogs there.
pub(crate) fn greatest_moment_knm_m(
    view: &View<'_>,
    id: PanelId,
    side: Side,
    moments: &dyn Fn(SupportId) -> Option<SupportMoment>,
) -> f64 {
    let segments = &view.floor.panel(id).edge(side).segments;
    let over = segments.iter().filter(|segment| segment.continuous).filter_map(|segment| segment.support);
    over.filter_map(moments).filter_map(|support| support.moment_knm_m).fold(0.0, f64::max)
}

/// Shears at the sides of a panel with its final support moments (statics), kN/m: a cantilever's moment beyond what the
/// panel's own case has there, and in one-way panels what a release changed. Never under the shears before.
pub(crate) fn final_shears(
    view: &View<'_>,
    id: PanelId,
    moments: &dyn Fn(SupportId) -> Option<SupportMoment>,
) -> [Option<f64>; 4] {
    let Some(fixed) = view.fixed(id) else { return [None; 4] };
    if fixed.basis.action == Action::Cantilever {
        return fixed.side_shear_kn_m;
    }
    Side::ALL.map(|side| {
        let shear = fixed.side_shear_kn_m[side.index()]?;
        let l = fixed.basis.length_m(fixed.basis.span_along(side.span_axis()));
        let mut rise = (greatest_root_knm_m(view, id, side) - fixed.side(side)).max(0.0);
        if fixed.basis.action == Action::OneWay {
            let change = |side: Side, new: f64| new - fixed.side_counted(side);
            let far = side.opposite();
            let near = change(side, new_side_moments(view, id, side, moments).1);
            rise = rise.max(near) - change(far, new_side_moments(view, id, far, moments).0).min(0.0);
        }
        Some(shear + rise.max(0.0) / l)
    })
}
