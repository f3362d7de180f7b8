//! No panel is designed outside its method without a word: each ends in a query that names it.

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use design_engine::check::{CheckKind, Place};
use design_engine::floor::{Axis, EdgeState, Side, Spanning};
use design_engine::query::{Query, Severity, Subject};
use design_engine::result::Action;
use edges_support::random::{choices, config, floor};
use edges_support::{Designed, G, N, Plan, plan, same};
use floor_grid::lay_out;
use floor_grid::layout::StatedEdge;
use proptest::prelude::*;

/// P and Q, 5 x 6 m each, side by side.
fn two() -> Plan {
    plan(&[0.0, 5.0, 10.0], &[0.0, 6.0]).panel("P", "1-2", "A-B").panel("Q", "2-3", "A-B")
}

/// Fails unless P is not designed, says so with these words and what to do, and Q is designed.
#[track_caller]
fn not_designed(floor: &Plan, words: &str) {
    let design = floor.design();
    let panel = design.panel("P");
    assert!(panel.not_designed.as_ref().is_some_and(|why| why.contains(words)), "{:?}", panel.not_designed);
    assert!(panel.sections.is_empty() && panel.checks.is_empty() && !panel.ok() && !design.design.ok());
    assert!(design.says("P", Severity::NotDesigned, words));
    let said = design.queries.iter().filter(|query| query.severity == Severity::NotDesigned);
    assert!(said.clone().all(|query| !query.remedy.is_empty()));
    assert!(design.panel("Q").not_designed.is_none());
}

#[test]
fn a_two_way_panel_with_a_free_edge_is_not_designed() {
    not_designed(&two().stated("P", Side::West, StatedEdge::Free), "free");
    not_designed(&two().unsupported("1", "A-B"), "free");
}

#[test]
fn a_one_way_panel_towards_a_free_edge_is_not_designed() {
    let floor = two().spanning("P", Spanning::OneWay(Axis::X)).stated("P", Side::West, StatedEdge::Free);
    not_designed(&floor, "free");
}

#[test]
fn an_edge_supported_over_a_part_of_it_is_not_designed() {
    let floor = plan(&[0.0, 5.0, 10.0], &[0.0, 3.0, 6.0]).panel("P", "1-2", "A-C").panel("Q", "2-3", "A-C");
    not_designed(&floor.unsupported("1", "A-B"), "has no support");
}

#[test]
fn a_panel_stated_two_way_beyond_ratio_2_is_not_designed() {
    let floor = plan(&[0.0, 5.0, 7.9], &[0.0, 6.0]).panel("Q", "1-2", "A-B").panel("P", "2-3", "A-B");
    not_designed(&floor.spanning("P", Spanning::TwoWay), "the two-way tables end at 2");
}

#[test]
fn a_strip_through_panels_of_unlike_widths_is_not_designed() {
    // P, 3 x 8 m, and R beside half of it, both one-way along x; Q by itself.
    let floor = plan(&[0.0, 3.0, 5.5, 9.0, 14.0], &[0.0, 5.5, 8.0])
        .panel("P", "1-2", "A-C")
        .panel("R", "2-3", "A-B")
        .panel("S", "2-3", "B-C")
        .spanning("S", Spanning::OneWay(Axis::X))
        .panel("Q", "4-5", "A-C");
    not_designed(&floor, "one width");
}

#[test]
fn big_openings_and_heavy_walls_are_warnings_with_what_to_do() {
    let opening = two().opening("P", [1.8, 2.0], [1.4, 0.8]).design();
    let wall = two().wall("P", Axis::Y, 2.5, [0.0, 6.0], 6.0).design();
    for (floor, words) in [(opening, "wider than a quarter of a span"), (wall, "walls weigh 36.0 kN")] {
        assert!(floor.says("P", Severity::Warning, words));
        let said: Vec<&Query> = floor.queries.iter().filter(|query| query.text.contains(words)).collect();
        assert!(said.len() == 1 && !said[0].remedy.is_empty());
        assert!(floor.panel("P").not_designed.is_none());
    }
}

#[test]
fn unlike_neighbours_are_warnings_at_their_support() {
    let support_says = |floor: &Designed, words: &str| {
        floor.queries.iter().any(|query| {
            query.severity == Severity::Warning
                && query.subject == Subject::Support("2/A-B".to_owned())
                && query.text.contains(words)
        })
    };
    let heavy = two().imposed("P", 15.0).design();
    assert!(support_says(&heavy, "ultimate loads"));
    assert!(support_says(&heavy, "over 1.5 times") && heavy.says("Q", Severity::Warning, "over 1.5 times"));
    let short =
        plan(&[0.0, 5.0, 7.4], &[0.0, 4.7]).panel("P", "1-2", "A-B").panel("Q", "2-3", "A-B").design();
    assert!(support_says(&short, "spans of its two panels"));
    assert!(!support_says(&two().design(), "approximately the same"));
}

#[test]
fn a_span_that_hogs_throughout_is_a_warning() {
    let floor = plan(&[0.0, 6.5, 9.5, 16.0], &[0.0, 5.8])
        .panel("W", "1-2", "A-B")
        .panel("P", "2-3", "A-B")
        .panel("E", "3-4", "A-B")
        .design();
    assert!(floor.says("P", Severity::Warning, "hogs throughout"));
}

#[test]
fn a_one_way_end_that_lifts_off_its_support_fails() {
    // 2.2 m beside 6.0 m, one strip 14 m wide: the long span lifts the short one's far end.
    let floor =
        plan(&[0.0, 2.2, 8.2], &[0.0, 14.0]).panel("P", "1-2", "A-B").panel("Q", "2-3", "A-B").design();
    let [uplift] = floor.checks("P", CheckKind::Uplift, Place::Side(Side::West))[..] else { panic!() };
    // 0.8 x elastic, both spans loaded: 0.8 x 13.38 (216 + 10.648)/(8 x 8.2) = 36.98 kNm/m; g l/2 = 7.37 kN/m.
    let moment = 0.8 * N * (216.0 + 10.648) / 65.6;
    same(uplift.demand, moment / 2.2);
    same(uplift.limit, G * 1.1);
    assert!(!uplift.ok && floor.says("P", Severity::Warning, "fails uplift"));
    // The load it puts on that line is below zero, and is so printed.
    same(floor.panel("P").side_loads[Side::West.index()].unwrap().ultimate_kn_m, N * 1.1 - moment / 2.2);
    let long_end = floor.checks("Q", CheckKind::Uplift, Place::Side(Side::East));
    assert!(long_end.len() == 1 && long_end[0].ok);
}

proptest! {
    #![proptest_config(config(200))]

    #[test]
    fn every_designed_panel_is_within_its_method_or_says_that_it_is_not(mut choices in choices()) {
        let plan = floor(&mut choices);
        prop_assume!(!lay_out(&plan.0).1.iter().any(|query| query.severity == Severity::Error));
        let design = plan.design();
        for panel in &design.design.panels {
            let laid = design.floor.panel(panel.panel);
            let mark = laid.mark.as_str();
            if panel.not_designed.is_some() {
                prop_assert!(design.says(mark, Severity::NotDesigned, ""), "{mark} has no query");
                continue;
            }
            let basis = panel.basis.unwrap();
            let free = |side: Side| panel.edge_states[side.index()] == EdgeState::Free;
            let two_way = [Action::TwoWayRestrained, Action::TwoWaySimplySupported].contains(&basis.action);
            if two_way {
                prop_assert!(!Side::ALL.into_iter().any(free) && basis.span_ratio() <= 2.0 + 1e-9);
                let walls: f64 = laid.line_loads.iter().map(|wall| wall.load_kn_m * wall.length_m()).sum();
                let heavy = walls > 0.1 * panel.loads.dead_kn_m2 * laid.area_m2();
                prop_assert_eq!(heavy, design.says(mark, Severity::Warning, "walls weigh"));
            }
            if basis.action == Action::OneWay {
                let ends = basis.axis_of(basis.main_span).end_sides();
                prop_assert!(!ends.into_iter().any(free));
                // Where the span goes on, the next one bears on the same line.
                let lifts = ends.into_iter().any(|side| {
                    let load = panel.side_loads[side.index()].unwrap().ultimate_kn_m;
                    load < -1e-9 && basis.state(side) != EdgeState::Continuous
                });
                prop_assert!(!lifts || design.says(mark, Severity::Warning, "uplift"));
            }
            for opening in &laid.openings {
                let share = opening.widths_m[0] / laid.spans_m[0];
                let share = share.max(opening.widths_m[1] / laid.spans_m[1]);
                prop_assert!(share <= 0.5 + 1e-9);
                let said = design.says(mark, Severity::Warning, "the coefficient method does not cover it");
                prop_assert!(share <= 0.25 + 1e-9 || said);
            }
            if panel.checks.iter().any(|check| !check.ok) {
                prop_assert!(design.says(mark, Severity::Warning, "fails"));
            }
            if panel.sections.iter().any(|section| section.moment_balanced_knm_m.is_some_and(|m| m < 0.0)) {
                prop_assert!(design.says(mark, Severity::Warning, "hogs throughout"));
            }
        }
        for support in &design.design.supports {
            let laid = design.floor.support(support.support);
            let unlike = [support.load_ratio, support.span_ratio].into_iter().flatten().any(|ratio| ratio < 0.5);
            let marks: Vec<&str> = laid.sides().map(|side| design.floor.panel(side.panel).mark.as_str()).collect();
            if unlike && support.moment_knm_m.is_some() {
                let said = design.queries.iter().any(|query| match (&query.subject, &laid.name) {
                    (Subject::Support(name), Some(own)) => name == own && query.severity == Severity::Warning,
                    _ => false,
                });
                prop_assert!(said, "{marks:?} at {:?}", laid.name);
            }
        }
    }
}
