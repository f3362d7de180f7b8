//! Coefficient moments and shears of one panel: the table values before any balancing.

use super::strips::StripPlace;
use crate::bs8110::coefficients::{MomentCoefficients, restrained, shear, simply_supported};
use crate::bs8110::flexure::{K_LIMIT, K_LIMIT_REDISTRIBUTED};
use crate::bs8110::one_way::OneWayCoefficients;
use crate::bs8110::spacing::{BETA_B_REDUCED_SUPPORT, BETA_B_TWO_WAY_SUPPORT};
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
        (None, Some(place)) => one_way(panel, thickness_mm, basis, loads, place.coefficients),
        _ => two_way(panel, thickness_mm, basis, loads, criteria),
    }
}

fn basic(panel: &Panel, basis: &Basis) -> f64 {
    let ends = basis.axis_of(basis.main_span).end_sides();
    if ends.into_iter().any(|side| panel.edge(side).state == EdgeState::Continuous) {
        deflection::BASIC_CONTINUOUS
    } else {
        deflection::BASIC_SIMPLY_SUPPORTED
    }
}

fn two_way(panel: &Panel, thickness_mm: f64, basis: Basis, loads: LoadBuildUp, criteria: &Criteria) -> Fixed {
    let n = loads.ultimate_kn_m2;
    let ratio = basis.span_ratio();
    let free_corners = basis.action == Action::TwoWaySimplySupported;
    let case = basis.case.unwrap_or(crate::bs8110::coefficients::PanelCase::new(2, 2));
    let moments: MomentCoefficients = if free_corners {
        simply_supported(ratio, criteria.coefficients)
    } else {
        restrained(case, ratio, criteria.coefficients)
    };
    let shears = shear(case, ratio);
    let mut side_coefficient = [None; 4];
    let mut side_shear_kn_m = [None; 4];
    for side in Side::ALL {
        let long_edge = side.span_axis() == basis.short_along;
        let continuous = panel.edge(side).state == EdgeState::Continuous;
        if continuous {
            side_coefficient[side.index()] = if long_edge { moments.long_edge } else { moments.short_edge };
        }
        // Free corners: n lx/2 for the slab's own check (common practice; Table 3.13 has no shears).
        let coefficient = if free_corners { Some(0.5) } else { shears.edge(long_edge, continuous) };
        side_shear_kn_m[side.index()] = coefficient.map(|beta| beta * n * basis.lx_m);
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
        basic_span_depth: basic(panel, &basis),
    }
}

fn one_way(
    panel: &Panel,
    thickness_mm: f64,
    basis: Basis,
    loads: LoadBuildUp,
    coefficients: OneWayCoefficients,
) -> Fixed {
    let n = loads.ultimate_kn_m2;
    let l = basis.length_m(basis.main_span);
    let mut midspan_coefficient = [None; 2];
    midspan_coefficient[basis.main_span as usize] = Some(coefficients.midspan);
    let mut side_coefficient = [None; 4];
    let mut side_shear_kn_m = [None; 4];
    for (end, side) in basis.axis_of(basis.main_span).end_sides().into_iter().enumerate() {
        if panel.edge(side).state == EdgeState::Continuous {
            side_coefficient[side.index()] = Some(coefficients.ends[end]);
        }
        side_shear_kn_m[side.index()] = Some(coefficients.shears[end] * n * l);
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
        basic_span_depth: basic(panel, &basis),
    }
}
