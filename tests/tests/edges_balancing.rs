//! Balancing at shared supports (3.5.3.6), over random floors.

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use design_engine::check::Place;
use design_engine::floor::{Axis, EdgeState, Side, Span, SupportKind};
use design_engine::query::Severity;
use design_engine::result::Action;
use edges_support::random::{choices, config, floor};
use edges_support::{Designed, N, plan, same};
use floor_grid::lay_out;
use proptest::prelude::*;

/// A floor without error, designed.
fn designed(plan: &edges_support::Plan) -> Option<Designed> {
    let at_fault = lay_out(&plan.0).1.iter().any(|query| query.severity == Severity::Error);
    (!at_fault).then(|| plan.design())
}

/// End moments of a two-way panel along an axis, before and after balancing: of several segments of an edge the least
/// new one, edges that are not wholly continuous nothing.
fn end_moments(design: &Designed, mark: &str, axis: Axis) -> [(f64, f64); 2] {
    let basis = design.panel(mark).basis.unwrap();
    axis.end_sides().map(|side| {
        if basis.state(side) != EdgeState::Continuous {
            return (0.0, 0.0);
        }
        let sections: Vec<_> =
            design.panel(mark).sections.iter().filter(|section| section.at == Place::Side(side)).collect();
        let before = sections[0].moment_from_coefficient_knm_m.unwrap();
        let after = sections.iter().map(|section| section.moment_balanced_knm_m.unwrap());
        (before, after.fold(f64::INFINITY, f64::min))
    })
}

proptest! {
    #![proptest_config(config(200))]

    #[test]
    fn midspan_plus_the_mean_of_the_supports_stays_what_the_table_gave(mut choices in choices()) {
        let Some(design) = designed(&floor(&mut choices)) else { return Ok(()) };
        for panel in &design.design.panels {
            let Some(basis) = panel.basis.filter(|basis| basis.action == Action::TwoWayRestrained) else { continue };
            let mark = &design.floor.panel(panel.panel).mark;
            for (at, span) in [(Place::ShortMidspan, Span::Short), (Place::LongMidspan, Span::Long)] {
                let section = panel.section(at).unwrap();
                let [a, b] = end_moments(&design, mark, basis.axis_of(span));
                let (table, balanced) =
                    (section.moment_from_coefficient_knm_m.unwrap(), section.moment_balanced_knm_m.unwrap());
                let (before, after) = (table + (a.0 + b.0) / 2.0, balanced + (a.1 + b.1) / 2.0);
                prop_assert!((before - after).abs() < 1e-9 * before, "{mark} {at:?}: {before} and {after}");
                prop_assert!((section.moment_knm_m.unwrap() - table.max(balanced)).abs() < 1e-12);
            }
        }
    }

    #[test]
    fn a_support_s_moment_is_the_same_from_both_panels_and_shared_by_stiffness(mut choices in choices()) {
        let Some(design) = designed(&floor(&mut choices)) else { return Ok(()) };
        for support in &design.design.supports {
            let laid = design.floor.support(support.support);
            let [a, b] = support.sides[..] else { continue };
            if laid.kind == SupportKind::Crossing {
                continue;
            }
            let [near, far] = [(laid.near, a), (laid.far.unwrap(), b)].map(|(at, side)| {
                let panel = &design.design.panels[at.panel.0];
                let basis = panel.basis.unwrap();
                // h3/l, three quarters of it where the far end is not continuous.
                let share = if basis.state(at.side.opposite()) == EdgeState::Continuous { 1.0 } else { 0.75 };
                let l = basis.length_m(basis.span_along(laid.axis));
                let k = share * design.floor.panel(at.panel).thickness_mm.powi(3) / l;
                let section = panel.sections.iter().find(|s| s.support == Some(support.support)).unwrap();
                assert_eq!(section.moment_knm_m, support.moment_knm_m);
                (side.moment_from_coefficient_knm_m.unwrap(), side.stiffness, k, basis.action)
            });
            for at in [near, far] {
                prop_assert!((at.1 - at.2).abs() < 1e-9 * at.2, "{} and {}", at.1, at.2);
            }
            let released = (near.0 * far.2 + far.0 * near.2) / (near.2 + far.2);
            let unlike = (near.0 - far.0).abs() > 0.1 * near.0.max(far.0);
            let cantilever = [near.3, far.3].contains(&Action::Cantilever);
            let one_strip = near.3 == Action::OneWay && far.3 == Action::OneWay;
            let expected = if unlike && !cantilever && !one_strip { released } else { near.0.max(far.0) };
            let moment = support.moment_knm_m.unwrap();
            prop_assert!((moment - expected).abs() < 1e-9 * expected, "{moment} and {expected}");
        }
    }
}

#[test]
fn two_panels_balanced_by_hand() {
    // 4 x 6 beside 6 x 6 m, 175 mm, n = 13.38. West: lx 4, ratio 1.5, case 7: .084 at its long edge, .063 midspan: 17.983
    // and 13.487. East: 6 x 6, three edges discontinuous; the short span is the one with more discontinuous ends, y: its
    // continuous edge is a short edge, case 8: .058, midspan along x (its long span) .044: 27.937 and 21.194.
    let floor =
        plan(&[0.0, 4.0, 10.0], &[0.0, 6.0]).panel("W", "1-2", "A-B").panel("E", "2-3", "A-B").design();
    let (west, east) = (0.084 * N * 16.0, 0.058 * N * 36.0);
    let support = floor.support("W", Side::East);
    same(floor.coefficient_moment(support, "W"), west);
    same(floor.coefficient_moment(support, "E"), east);
    // k = 0.75 h3/l on both sides: the difference goes 3 : 2 to W : E. 27.937 - 9.954 x (1/6)/(1/4 + 1/6) = 23.955.
    let moment = east - (east - west) * 0.4;
    same(support.moment_knm_m.unwrap(), moment);
    same(
        floor.section("E", Place::LongMidspan).moment_balanced_knm_m.unwrap(),
        0.044 * N * 36.0 + (east - moment) / 2.0,
    );
    same(floor.moment("E", Place::LongMidspan), 0.044 * N * 36.0 + (east - moment) / 2.0);
    same(
        floor.section("W", Place::ShortMidspan).moment_balanced_knm_m.unwrap(),
        0.063 * N * 16.0 - (moment - west) / 2.0,
    );
    same(floor.moment("W", Place::ShortMidspan), 0.063 * N * 16.0);
}
