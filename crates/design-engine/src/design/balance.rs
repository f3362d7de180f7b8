//! Moments at supports and the midspan moments that follow from them.

use super::fixed::Fixed;
use super::view::View;
use crate::bs8110::strip::greatest_sagging;
use crate::floor::{EdgeState, PanelId, Side, Span, Support, SupportId, SupportKind, SupportSide};
use crate::result::Action;
use crate::supports::{difference, shared_moment, stiffness};

/// Moment of a support, and the ratios of 3.5.3.5.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct SupportMoment {
    /// Design moment, kNm/m; none for crossing bars.
    pub(crate) moment_knm_m: Option<f64>,
    pub(crate) balanced: bool,
    pub(crate) difference_pct: Option<f64>,
    pub(crate) load_ratio: Option<f64>,
    pub(crate) span_ratio: Option<f64>,
}

/// Stiffness of a panel's span across one of its sides.
pub(crate) fn side_stiffness(view: &View<'_>, at: SupportSide) -> f64 {
    let Some(fixed) = view.fixed(at.panel) else { return 0.0 };
    let span = fixed.basis.span_along(at.side.span_axis());
    let far = fixed.basis.state(at.side.opposite());
    stiffness(fixed.thickness_mm, fixed.basis.length_m(span), far != EdgeState::Continuous)
}

/// Moment of a support from its designed sides; none where no side is designed.
pub(crate) fn support_moment(view: &View<'_>, support: &Support) -> Option<SupportMoment> {
    let sides: Vec<_> =
        support.sides().filter_map(|side| view.fixed(side.panel).map(|fixed| (side, fixed))).collect();
    let (near, near_fixed) = *sides.first()?;
    let lesser_over_greater = |a: f64, b: f64| a.min(b) / a.max(b);
    let ratios = sides.get(1).map(|(far, far_fixed)| {
        let length = |at: &SupportSide, f: &Fixed| f.basis.length_m(f.basis.span_along(at.side.span_axis()));
        (
            lesser_over_greater(near_fixed.loads.ultimate_kn_m2, far_fixed.loads.ultimate_kn_m2),
            lesser_over_greater(length(&near, near_fixed), length(far, far_fixed)),
        )
    });
    let mut result = SupportMoment {
        moment_knm_m: None,
        balanced: false,
        difference_pct: None,
        load_ratio: ratios.map(|r| r.0),
        span_ratio: ratios.map(|r| r.1),
    };
    if support.kind == SupportKind::Crossing {
        return Some(result);
    }
    let m_near = near_fixed.side(near.side);
    let Some((far, far_fixed)) = sides.get(1) else {
        result.moment_knm_m = Some(m_near);
        return Some(result);
    };
    let m_far = far_fixed.side(far.side);
    result.difference_pct = Some(100.0 * difference(m_near, m_far));
    if [near_fixed, far_fixed].iter().any(|f| f.basis.action == Action::Cantilever) {
        // A cantilever's moment is neither balanced nor reduced; the back-span's own is the least there.
        // The likeness that 3.5.3.5 asks of neighbours is not asked of it.
        result.moment_knm_m = Some(m_near.max(m_far));
        (result.load_ratio, result.span_ratio) = (None, None);
        return Some(result);
    }
    let one_way = |f: &Fixed| f.basis.action == Action::OneWay;
    // A strip is in equilibrium by its analysis or table: the greater of the two values, never a release.
    let threshold = if one_way(near_fixed) && one_way(far_fixed) {
        f64::INFINITY
    } else {
        view.criteria.balance_threshold_pct / 100.0
    };
    let (k_near, k_far) = (side_stiffness(view, near), side_stiffness(view, *far));
    let (moment, balanced) = shared_moment(m_near, k_near, m_far, k_far, threshold);
    result.moment_knm_m = Some(moment);
    result.balanced = balanced;
    Some(result)
}

/// Least and greatest new moment over the segments of a panel's side; zeros where it carries none.
pub(crate) fn new_side_moments(
    view: &View<'_>,
    id: PanelId,
    side: Side,
    moments: &dyn Fn(SupportId) -> Option<SupportMoment>,
) -> (f64, f64) {
    let panel = view.floor.panel(id);
    let Some(fixed) = view.fixed(id) else { return (0.0, 0.0) };
    if fixed.basis.state(side) != EdgeState::Continuous {
        return (0.0, 0.0);
    }
    let mut range: Option<(f64, f64)> = None;
    for segment in panel.edge(side).segments.iter().filter(|segment| segment.continuous) {
        let moment = segment
            .support
            .and_then(moments)
            .and_then(|support| support.moment_knm_m)
            .unwrap_or_else(|| fixed.side(side));
        let (least, greatest) = range.unwrap_or((moment, moment));
        range = Some((least.min(moment), greatest.max(moment)));
    }
    range.unwrap_or_else(|| (fixed.side(side), fixed.side(side)))
}

/// A panel's midspan moments after balancing, short and long span, kNm/m; below zero where the span hogs
/// throughout: (midspan + average of the two end moments) stays what the table gave (statics).
pub(crate) fn balanced_midspans(
    view: &View<'_>,
    id: PanelId,
    moments: &dyn Fn(SupportId) -> Option<SupportMoment>,
) -> [f64; 2] {
    let Some(fixed) = view.fixed(id) else { return [0.0; 2] };
    [Span::Short, Span::Long].map(|span| {
        let table = fixed.midspan(span);
        let sides = fixed.basis.axis_of(span).end_sides();
        if fixed.basis.action != Action::TwoWayRestrained {
            return one_way_midspan(view, id, fixed, span, sides, moments);
        }
        let rise: f64 = sides
            .into_iter()
            .map(|side| new_side_moments(view, id, side, moments).0 - fixed.side_counted(side))
            .sum();
        table - rise / 2.0
    })
}

/// Midspan of a one-way panel with its final end moments (statics). A span that no release touched keeps what
/// its strip gave; where some load case makes midspan hog, that hogging is given, below zero.
fn one_way_midspan(
    view: &View<'_>,
    id: PanelId,
    fixed: &Fixed,
    span: Span,
    sides: [Side; 2],
    moments: &dyn Fn(SupportId) -> Option<SupportMoment>,
) -> f64 {
    let table = fixed.midspan(span);
    if fixed.basis.action != Action::OneWay || span != fixed.basis.main_span {
        return table;
    }
    let new = sides.map(|side| new_side_moments(view, id, side, moments).0);
    let moved = sides.iter().zip(new).any(|(side, new)| (new - fixed.side_counted(*side)).abs() > 1e-9);
    let hogging = fixed.midspan_hogging_knm_m;
    if hogging > 0.0 {
        -hogging
    } else if moved {
        let l = fixed.basis.length_m(span);
        greatest_sagging(fixed.unit_moment_knm_m[span as usize] / (l * l), l, new[0], new[1])
    } else {
        table
    }
}
