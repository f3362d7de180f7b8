//! Loads on the supports along a panel's sides (3.5.3.7).

use super::balance::SupportMoment;
use super::fixed::Fixed;
use super::roots::{RootMoment, mean_moment_knm_m, mean_root};
use super::view::View;
use crate::bs8110::coefficients::{PanelCase, shear};
use crate::floor::{EdgeState, PanelId, Side, SupportId};
use crate::result::{Action, SideLoad};

/// Share of a two-way panel's edge that is loaded (figure 3.10).
const TWO_WAY_SHARE: f64 = 0.75;

/// Weight of the walls on a panel spread over it, kN/m2, characteristic.
fn walls_kn_m2(view: &View<'_>, id: PanelId) -> f64 {
    let panel = view.floor.panel(id);
    panel.line_loads.iter().map(|wall| wall.load_kn_m * wall.length_m()).sum::<f64>() / panel.area_m2()
}

/// Ultimate load of a designed panel, walls in, between its support centre lines, kN; 0 where it is not designed.
pub(crate) fn total_ultimate_kn(view: &View<'_>, id: PanelId) -> f64 {
    view.fixed(id).map_or(0.0, |fixed| {
        let walls = view.criteria.dead_load_factor * walls_kn_m2(view, id);
        (fixed.loads.ultimate_kn_m2 + walls) * view.floor.panel(id).area_m2()
    })
}

/// Loads on the four sides. Two-way: `beta_v` n lx by the panel's own case (free corners: case 9), the true weight of
/// walls in n. One-way: statics of the span fully loaded with its final support moments, so that the two ends carry
/// the whole load. Cantilever: all of it at the root; its moment adds to the reaction of its back-span there and takes
/// the same from the far side.
pub(crate) fn side_loads(
    view: &View<'_>,
    id: PanelId,
    moments: &dyn Fn(SupportId) -> Option<SupportMoment>,
) -> [Option<SideLoad>; 4] {
    let Some(fixed) = view.fixed(id) else { return [None; 4] };
    let dead = fixed.loads.dead_kn_m2 + walls_kn_m2(view, id);
    let imposed = fixed.loads.imposed_kn_m2;
    let n = view.criteria.dead_load_factor * dead + view.criteria.imposed_load_factor * imposed;
    let share = if fixed.basis.case.is_some() { TWO_WAY_SHARE } else { 1.0 };
    let roots = Side::ALL.map(|side| match fixed.basis.action {
        Action::Cantilever => RootMoment::default(),
        _ => mean_root(view, id, side),
    });
    let lengths = lengths(view, id, fixed, n, moments);
    Side::ALL.map(|side| {
        let length = lengths[side.index()]?;
        let (own, far) = (roots[side.index()], roots[side.opposite().index()]);
        let per_metre = 1.0 / (view.floor.panel(id).span_m(side.span_axis()) * share);
        let dead_kn_m = dead * length + (own.dead_knm_m - far.dead_knm_m) * per_metre;
        let imposed_kn_m = imposed * length + (own.imposed_knm_m - far.imposed_knm_m) * per_metre;
        Some(SideLoad {
            dead_kn_m,
            imposed_kn_m,
            ultimate_kn_m: view.criteria.dead_load_factor * dead_kn_m
                + view.criteria.imposed_load_factor * imposed_kn_m,
            loaded_share: share,
        })
    })
}

/// Length of slab that each side carries, m: load per metre of side over load per square metre. All of the slab between
/// support centre lines comes down on them, whatever span the slab itself is designed for.
fn lengths(
    view: &View<'_>,
    id: PanelId,
    fixed: &Fixed,
    n: f64,
    moments: &dyn Fn(SupportId) -> Option<SupportMoment>,
) -> [Option<f64>; 4] {
    let (panel, basis) = (view.floor.panel(id), &fixed.basis);
    let l = panel.span_m(basis.axis_of(basis.main_span));
    let ends = basis.axis_of(basis.main_span).end_sides();
    Side::ALL.map(|side| match (basis.action, basis.case) {
        (Action::Cantilever, _) => (basis.state(side) == EdgeState::Continuous).then_some(l),
        (Action::OneWay, _) => ends.contains(&side).then(|| {
            let at = |side: Side| mean_moment_knm_m(view, id, side, moments);
            l / 2.0 + (at(side) - at(side.opposite())) / (l * n)
        }),
        (_, case) => {
            let case = case.unwrap_or(PanelCase::new(2, 2));
            let continuous = basis.state(side) == EdgeState::Continuous;
            let long_edge = side.span_axis() == basis.short_along;
            let lx = panel.span_m(basis.short_along);
            shear(case, basis.span_ratio()).edge(long_edge, continuous).map(|beta| beta * lx)
        }
    })
}
