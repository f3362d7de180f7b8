//! Coefficient moments and shears of one panel: the table values before any balancing.

use super::strips::StripPlace;
use crate::bs8110::coefficients::{MomentCoefficients, PanelCase, restrained, shear, simply_supported};
use crate::bs8110::flexure::{K_LIMIT, K_LIMIT_REDISTRIBUTED};
use crate::bs8110::spacing::{BETA_B_MIDSPAN, BETA_B_REDUCED_SUPPORT, BETA_B_TWO_WAY_SUPPORT};
use crate::bs8110::{deflection, loads, wall_loads};
use crate::criteria::Criteria;
use crate::floor::{EdgeState, LineLoad, Panel, Side, Span};
use crate::result::{Action, Basis, LoadBuildUp};

/// A panel's coefficient moments and shears at one thickness.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Fixed {
    pub(crate) thickness_mm: f64,
    pub(crate) basis: Basis,
    pub(crate) loads: LoadBuildUp,
    /// Midspan coefficients, short and long span; none for the distribution direction of a one-way panel.
    pub(crate) midspan_coefficient: [Option<f64>; 2],
    /// Coefficient of each side's support moment; none where no hogging is carried.
    pub(crate) side_coefficient: [Option<f64>; 4],
    /// Shear at each side, kN/m; none at the sides of a one-way panel.
    pub(crate) side_shear_kn_m: [Option<f64>; 4],
    /// Moment per unit coefficient in the direction of each span, kNm/m: n lx2, or n l2 of a one-way panel, walls in.
    pub(crate) unit_moment_knm_m: [f64; 2],
    /// Root moment of a cantilever from walls on it, kNm/m; 0 elsewhere.
    pub(crate) wall_moment_knm_m: f64,
    /// K' at its supports.
    pub(crate) support_k_limit: f64,
    /// `beta_b` at its supports.
    pub(crate) support_beta_b: f64,
    /// Basic span/depth.
    pub(crate) basic_span_depth: f64,
    /// Greatest hogging at midspan in any load case of a strip, kNm/m; 0 where there is none.
    pub(crate) midspan_hogging_knm_m: f64,
    /// How far hogging reaches in from each side in any load case of a strip, m from the support's centre line; 0 where
    /// the simplified rules are enough.
    pub(crate) hogging_reach_m: [f64; 4],
}

impl Fixed {
    /// Table midspan moment of a span, kNm/m; 0 in the distribution direction.
    pub(crate) fn midspan(&self, span: Span) -> f64 {
        self.midspan_coefficient[span as usize].unwrap_or(0.0) * self.unit_moment_knm_m[span as usize]
    }

    /// Table support moment at a side, kNm/m; 0 where none is carried.
    pub(crate) fn side(&self, side: Side) -> f64 {
        let span = self.basis.span_along(side.span_axis());
        self.side_coefficient[side.index()].map_or(0.0, |coefficient| {
            coefficient * self.unit_moment_knm_m[span as usize] + self.wall_moment_knm_m
        })
    }

    /// The same as it counts in the midspan sum: a partly continuous edge and a cantilever's count 0.
    pub(crate) fn side_counted(&self, side: Side) -> f64 {
        if self.basis.state(side) == EdgeState::Continuous { self.side(side) } else { 0.0 }
    }
}

/// Coefficient moments and shears of a panel of a given thickness.
pub(crate) fn fix(
    panel: &Panel,
    thickness_mm: f64,
    basis: Basis,
    strip: Option<&StripPlace>,
    criteria: &Criteria,
) -> Fixed {
    let loads = loads::build_up(thickness_mm, &panel.loads, criteria);
    match (basis.case, strip) {
        (None, Some(place)) => one_way(panel, thickness_mm, basis, loads, place, criteria),
        (None, None) => cantilever(panel, thickness_mm, basis, loads, criteria),
        _ => two_way(panel, thickness_mm, basis, loads, criteria),
    }
}

fn basic(basis: &Basis) -> f64 {
    let ends = basis.axis_of(basis.main_span).end_sides();
    if ends.into_iter().any(|side| basis.state(side) == EdgeState::Continuous) {
        deflection::BASIC_CONTINUOUS
    } else {
        deflection::BASIC_SIMPLY_SUPPORTED
    }
}

fn two_way(panel: &Panel, thickness_mm: f64, basis: Basis, loads: LoadBuildUp, criteria: &Criteria) -> Fixed {
    let walls = wall_loads::two_way(&panel.line_loads, basis.short_along, basis.lx_m, basis.ly_m);
    let n = loads.ultimate_kn_m2 + criteria.dead_load_factor * walls.shear_kn_m2;
    let ratio = basis.span_ratio();
    let free_corners = basis.action == Action::TwoWaySimplySupported;
    let case = basis.case.unwrap_or(PanelCase::new(2, 2));
    let moments: MomentCoefficients = if free_corners {
        simply_supported(ratio, criteria.coefficients)
    } else {
        restrained(case, ratio, criteria.coefficients)
    };
    let shears = shear(case, ratio);
    let mut side_coefficient = [None; 4];
    let mut side_shear_kn_m = [None; 4];
    let mut raise = |side: Side, coefficient: Option<f64>| {
        // Free corners: n lx/2 for the slab's own check (common practice; Table 3.13 has no shears).
        let beta = if free_corners { Some(0.5) } else { coefficient };
        let shear = &mut side_shear_kn_m[side.index()];
        *shear = beta.map(|beta: f64| beta * n * basis.lx_m).into_iter().chain(*shear).reduce(f64::max);
    };
    for side in Side::ALL {
        let continuous = basis.state(side) == EdgeState::Continuous;
        raise(side, shears.edge(is_long(&basis, side), continuous));
        if continuous {
            side_coefficient[side.index()] = edge_moment(&moments, is_long(&basis, side));
        }
    }
    // Envelope for edges that carry hogging over a part, or from a cantilever: the case with that one edge made
    // continuous gives its own moment, and shears are the greater of the two cases.
    for side in Side::ALL.into_iter().filter(|side| carries_in_part(panel, &basis, *side)) {
        let made = made_continuous(case, is_long(&basis, side));
        let with_edge = restrained(made, ratio, criteria.coefficients);
        side_coefficient[side.index()] = edge_moment(&with_edge, is_long(&basis, side));
        let with_edge = shear(made, ratio);
        for other in Side::ALL {
            let continuous = other == side || basis.state(other) == EdgeState::Continuous;
            raise(other, with_edge.edge(is_long(&basis, other), continuous));
        }
    }
    Fixed {
        thickness_mm,
        basis,
        loads,
        midspan_coefficient: [Some(moments.short_midspan), Some(moments.long_midspan)],
        side_coefficient,
        side_shear_kn_m,
        unit_moment_knm_m: [walls.short_kn_m2, walls.long_kn_m2]
            .map(|q| (loads.ultimate_kn_m2 + criteria.dead_load_factor * q) * basis.lx_m * basis.lx_m),
        wall_moment_knm_m: 0.0,
        support_k_limit: K_LIMIT,
        support_beta_b: BETA_B_TWO_WAY_SUPPORT,
        basic_span_depth: basic(&basis),
        midspan_hogging_knm_m: 0.0,
        hogging_reach_m: [0.0; 4],
    }
}

/// Whether a side is a long edge: at an end of the short span.
fn is_long(basis: &Basis, side: Side) -> bool {
    side.span_axis() == basis.short_along
}

fn edge_moment(moments: &MomentCoefficients, long_edge: bool) -> Option<f64> {
    if long_edge { moments.long_edge } else { moments.short_edge }
}

/// Whether a side carries hogging although it does not count as continuous.
fn carries_in_part(panel: &Panel, basis: &Basis, side: Side) -> bool {
    basis.state(side) != EdgeState::Continuous && panel.edge(side).segments.iter().any(|s| s.continuous)
}

/// The case with one more long or short edge continuous.
fn made_continuous(case: PanelCase, long_edge: bool) -> PanelCase {
    let PanelCase { long_discontinuous, short_discontinuous } = case;
    if long_edge {
        PanelCase::new(long_discontinuous.saturating_sub(1), short_discontinuous)
    } else {
        PanelCase::new(long_discontinuous, short_discontinuous.saturating_sub(1))
    }
}

fn one_way(
    panel: &Panel,
    thickness_mm: f64,
    basis: Basis,
    loads: LoadBuildUp,
    place: &StripPlace,
    criteria: &Criteria,
) -> Fixed {
    let l = basis.length_m(basis.main_span);
    let n = loads.ultimate_kn_m2 + criteria.dead_load_factor * one_way_walls(panel, &basis);
    let coefficients = &place.coefficients;
    let mut midspan_coefficient = [None; 2];
    midspan_coefficient[basis.main_span as usize] = Some(coefficients.midspan);
    let mut side_coefficient = [None; 4];
    let mut side_shear_kn_m = [None; 4];
    let mut hogging_reach_m = [0.0; 4];
    for (end, side) in basis.axis_of(basis.main_span).end_sides().into_iter().enumerate() {
        let mut shear = coefficients.shears[end];
        if basis.state(side) == EdgeState::Continuous {
            side_coefficient[side.index()] = Some(coefficients.ends[end]);
            hogging_reach_m[side.index()] = coefficients.hogging_reach[end] * l;
        } else if let (true, Some(made)) = (carries_in_part(panel, &basis, side), place.made_continuous[end])
        {
            side_coefficient[side.index()] = Some(made.moment);
            hogging_reach_m[side.index()] = made.reach * l;
            shear = shear.max(made.shear);
        }
        side_shear_kn_m[side.index()] = Some(shear * n * l);
    }
    Fixed {
        thickness_mm,
        basis,
        loads,
        midspan_coefficient,
        side_coefficient,
        side_shear_kn_m,
        unit_moment_knm_m: [n * l * l; 2],
        wall_moment_knm_m: 0.0,
        support_k_limit: K_LIMIT_REDISTRIBUTED,
        support_beta_b: BETA_B_REDUCED_SUPPORT,
        basic_span_depth: basic(&basis),
        midspan_hogging_knm_m: coefficients.midspan_hogging * n * l * l,
        hogging_reach_m,
    }
}

/// Equivalent uniform load of the walls on a one-way panel, kN/m2, characteristic.
pub(crate) fn one_way_walls(panel: &Panel, basis: &Basis) -> f64 {
    let axis = basis.axis_of(basis.main_span);
    let (l, width) = (basis.length_m(basis.main_span), panel.span_m(axis.across()));
    // Walls are measured from the support's centre line, the effective span may begin inside it: half of the
    // difference at each end.
    let inside = (panel.span_m(axis) - l) / 2.0;
    let along_span = |at: f64| (at - inside).clamp(0.0, l);
    let walls: Vec<LineLoad> = panel
        .line_loads
        .iter()
        .map(|wall| {
            if wall.along == axis {
                LineLoad { from_m: along_span(wall.from_m), to_m: along_span(wall.to_m), ..*wall }
            } else {
                LineLoad { offset_m: along_span(wall.offset_m), ..*wall }
            }
        })
        .collect();
    wall_loads::one_way(&walls, axis, l, width).short_kn_m2
}

/// A cantilever of length l: n l2/2 and n l at its root, never balanced or reduced.
fn cantilever(
    panel: &Panel,
    thickness_mm: f64,
    basis: Basis,
    loads: LoadBuildUp,
    criteria: &Criteria,
) -> Fixed {
    let n = loads.ultimate_kn_m2;
    let l = basis.length_m(basis.main_span);
    // Walls along the root, each at its distance from it; a metre of wall is carried by a metre of root.
    let axis = basis.axis_of(basis.main_span);
    let root_at_lesser_end = basis.state(axis.end_sides()[0]) == EdgeState::Continuous;
    let arm = |offset: f64| if root_at_lesser_end { offset } else { panel.span_m(axis) - offset };
    let factored = |wall: &LineLoad| criteria.dead_load_factor * wall.load_kn_m;
    let wall_moment_knm_m = panel.line_loads.iter().map(|wall| factored(wall) * arm(wall.offset_m)).sum();
    let wall_shear: f64 = panel.line_loads.iter().map(factored).sum();
    let at_root =
        |value: f64| Side::ALL.map(|side| (basis.state(side) == EdgeState::Continuous).then_some(value));
    Fixed {
        thickness_mm,
        basis,
        loads,
        midspan_coefficient: [None; 2],
        side_coefficient: at_root(0.5),
        side_shear_kn_m: at_root(n * l + wall_shear),
        unit_moment_knm_m: [n * l * l; 2],
        wall_moment_knm_m,
        support_k_limit: K_LIMIT,
        support_beta_b: BETA_B_MIDSPAN,
        basic_span_depth: deflection::BASIC_CANTILEVER,
        midspan_hogging_knm_m: 0.0,
        hogging_reach_m: [0.0; 4],
    }
}
