//! Coefficient moments and shears of one panel: the table values before any balancing.

use super::strips::StripPlace;
use crate::bs8110::coefficients::{MomentCoefficients, PanelCase, restrained, shear, simply_supported};
use crate::bs8110::flexure::{K_LIMIT, K_LIMIT_REDISTRIBUTED};
use crate::bs8110::spacing::{BETA_B_MIDSPAN, BETA_B_REDUCED_SUPPORT, BETA_B_TWO_WAY_SUPPORT};
use crate::bs8110::{deflection, loads};
use crate::criteria::Criteria;
use crate::floor::{EdgeState, Panel, Side, Span};
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
    /// Moment per unit coefficient, kNm/m: n lx2, or n l2 of a one-way panel.
    pub(crate) unit_moment_knm_m: f64,
    /// K' at its supports.
    pub(crate) support_k_limit: f64,
    /// `beta_b` at its supports.
    pub(crate) support_beta_b: f64,
    /// Basic span/depth.
    pub(crate) basic_span_depth: f64,
    /// Greatest hogging at midspan in any load case of a strip, kNm/m; 0 where there is none.
    pub(crate) midspan_hogging_knm_m: f64,
}

impl Fixed {
    /// Table midspan moment of a span, kNm/m; 0 in the distribution direction.
    pub(crate) fn midspan(&self, span: Span) -> f64 {
        self.midspan_coefficient[span as usize].unwrap_or(0.0) * self.unit_moment_knm_m
    }

    /// Table support moment at a side, kNm/m; 0 where none is carried.
    pub(crate) fn side(&self, side: Side) -> f64 {
        self.side_coefficient[side.index()].unwrap_or(0.0) * self.unit_moment_knm_m
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
        (None, Some(place)) => one_way(panel, thickness_mm, basis, loads, place),
        (None, None) => cantilever(thickness_mm, basis, loads),
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
    let n = loads.ultimate_kn_m2;
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
        unit_moment_knm_m: n * basis.lx_m * basis.lx_m,
        support_k_limit: K_LIMIT,
        support_beta_b: BETA_B_TWO_WAY_SUPPORT,
        basic_span_depth: basic(&basis),
        midspan_hogging_knm_m: 0.0,
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

fn one_way(panel: &Panel, thickness_mm: f64, basis: Basis, loads: LoadBuildUp, place: &StripPlace) -> Fixed {
    let n = loads.ultimate_kn_m2;
    let l = basis.length_m(basis.main_span);
    let coefficients = &place.coefficients;
    let mut midspan_coefficient = [None; 2];
    midspan_coefficient[basis.main_span as usize] = Some(coefficients.midspan);
    let mut side_coefficient = [None; 4];
    let mut side_shear_kn_m = [None; 4];
    for (end, side) in basis.axis_of(basis.main_span).end_sides().into_iter().enumerate() {
        let mut shear = coefficients.shears[end];
        if basis.state(side) == EdgeState::Continuous {
            side_coefficient[side.index()] = Some(coefficients.ends[end]);
        } else if let (true, Some(made)) = (carries_in_part(panel, &basis, side), place.made_continuous[end])
        {
            side_coefficient[side.index()] = Some(made.moment);
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
        unit_moment_knm_m: n * l * l,
        support_k_limit: K_LIMIT_REDISTRIBUTED,
        support_beta_b: BETA_B_REDUCED_SUPPORT,
        basic_span_depth: basic(&basis),
        midspan_hogging_knm_m: coefficients.midspan_hogging * n * l * l,
    }
}

/// A cantilever of length l: n l2/2 and n l at its root, never balanced or reduced.
fn cantilever(thickness_mm: f64, basis: Basis, loads: LoadBuildUp) -> Fixed {
    let n = loads.ultimate_kn_m2;
    let l = basis.length_m(basis.main_span);
    let at_root =
        |value: f64| Side::ALL.map(|side| (basis.state(side) == EdgeState::Continuous).then_some(value));
    Fixed {
        thickness_mm,
        basis,
        loads,
        midspan_coefficient: [None; 2],
        side_coefficient: at_root(0.5),
        side_shear_kn_m: at_root(n * l),
        unit_moment_knm_m: n * l * l,
        support_k_limit: K_LIMIT,
        support_beta_b: BETA_B_MIDSPAN,
        basic_span_depth: deflection::BASIC_CANTILEVER,
        midspan_hogging_knm_m: 0.0,
    }
}
