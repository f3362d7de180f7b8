//! Balancing at shared supports (3.5.3.6), over random floors.

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use design_engine::check::Place;
use design_engine::floor::{Axis, EdgeState, Layer, Side, Span, Spanning, SupportKind};
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

#[test]
fn a_midspan_that_hogs_is_checked_with_the_bars_that_run_through_and_not_with_crossing_bars() {
    // P, 3.2 x 6 m, between W, 6 x 6 m, which raises its west end until it hogs throughout, and O, stated to span past it and
    // thinner: the bars over that line only cross.
    let floor = plan(&[0.0, 6.0, 9.2, 13.2], &[0.0, 6.0])
        .panel("W", "1-2", "A-B")
        .imposed("W", 10.0)
        .panel("P", "2-3", "A-B")
        .panel("O", "3-4", "A-B")
        .spanning("O", Spanning::OneWay(Axis::Y))
        .with("O", |panel| panel.data.thickness_mm = 125.0)
        .design();
    assert!(floor.support("P", Side::East).moment_knm_m.is_none());
    let west = floor.support("P", Side::West);
    let top =
        floor.panel("P").sections.iter().find(|s| s.support.is_none() && s.layer == west.layer).unwrap();
    // Ratio 1.875, case 7: .0715 midspan, .095 at the long edge.
    let (midspan, edge) = (0.0715 * N * 10.24, 0.095 * N * 10.24);
    same(top.moment_knm_m.unwrap(), (west.moment_knm_m.unwrap() - edge) / 2.0 - midspan);
    assert_eq!((top.bars, top.d_mm), (west.bars, west.d_mm));
    let reach = west.sides.iter().find(|side| side.panel == floor.id("P")).unwrap();
    same(reach.short_extension_m, 2.95);
}

#[test]
fn of_two_supports_whose_bars_run_through_the_weaker_section_is_checked() {
    // P between two like panels but for the thickness of E: the same bars lie 50 mm less deep over its line.
    let floor = plan(&[0.0, 6.5, 9.5, 16.0], &[0.0, 5.8]).panel("W", "1-2", "A-B").panel("P", "2-3", "A-B");
    let floor = floor.panel("E", "3-4", "A-B").with("P", |panel| panel.data.thickness_mm = 200.0);
    for (thin, strong) in [(Side::West, "E"), (Side::East, "W")] {
        let design = floor.clone().with(strong, |panel| panel.data.thickness_mm = 225.0).design();
        let tops: Vec<_> = [Side::West, Side::East].map(|side| design.support("P", side)).into();
        let weaker = tops.iter().map(|top| top.as_provided_mm2_m * top.d_mm).fold(f64::INFINITY, f64::min);
        let own = &design.panel("P").sections;
        let found =
            own.iter().find(|s| s.support.is_none() && [Layer::T1, Layer::T2].contains(&s.layer)).unwrap();
        same(found.as_provided_mm2_m * found.d_mm, weaker);
        assert!(design.support("P", thin).d_mm < design.support("P", thin.opposite()).d_mm);
    }
}
