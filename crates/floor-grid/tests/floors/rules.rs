//! Rules that a drawing does not show: widths, names, chosen bars, rows at fault.

use design_engine::floor::{Axis, EdgeState, Floor, Side, TenthMm};
use design_engine::query::{Query, Severity, Subject};
use floor_grid::lay_out;
use floor_grid::layout::{Gridline, Layout};

use crate::drawing;

/// Lays out a drawing given without its title.
fn drawn(text: &str) -> (Floor, Vec<Query>) {
    lay_out(&layout(text))
}

fn layout(text: &str) -> Layout {
    drawing::read(&format!("title\n{text}")).layout
}

/// Two panels above one: P's south edge lies against Q and R.
const T_JUNCTION: &str = "columns 4.0 4.4\nrows 4.6 4.2\nplan\n P P |\n Q R |\n";

#[test]
fn an_edge_takes_the_least_width_along_it_and_a_support_its_own() {
    let (floor, _) = drawn(&format!("support B 1 2 beam 300\nsupport B 2 3 wall 200\n{T_JUNCTION}"));
    let [p, q, r] = [0, 1, 2].map(|index| &floor.panels[index]);
    assert_eq!(p.edge(Side::South).support_width_mm, 200.0);
    assert_eq!(q.edge(Side::North).support_width_mm, 300.0);
    assert_eq!(r.edge(Side::North).support_width_mm, 200.0);
    let widths: Vec<(&str, f64)> =
        floor.supports.iter().map(|support| (support.name.as_deref().unwrap(), support.width_mm)).collect();
    assert_eq!(widths, [("2/A-B", 250.0), ("B/1-2", 300.0), ("B/2-3", 200.0)]);
}

#[test]
fn a_width_for_part_of_a_gridline_wins_over_that_of_the_whole() {
    let (floor, queries) = drawn(&format!("support B beam 225\nsupport B 1 2 beam 400\n{T_JUNCTION}"));
    assert_eq!(floor.panels[1].edge(Side::North).support_width_mm, 400.0);
    assert_eq!(floor.panels[2].edge(Side::North).support_width_mm, 225.0);
    assert!(queries.is_empty());
}

#[test]
fn where_no_row_tells_the_width_is_that_of_the_criteria() {
    let (floor, _) = drawn(&format!("support B 1 2 beam 300\n{T_JUNCTION}"));
    assert_eq!(floor.panels[0].edge(Side::South).support_width_mm, 250.0);
    assert_eq!(floor.panels[0].edge(Side::North).support_width_mm, 250.0);
}

#[test]
fn bars_chosen_for_an_edge_apply_to_each_support_along_it() {
    let (floor, queries) = drawn(&format!("choose P south top 12 150\n{T_JUNCTION}"));
    let chosen: Vec<bool> = floor.supports.iter().map(|support| support.chosen.is_some()).collect();
    assert_eq!(chosen, [false, true, true]);
    assert!(queries.is_empty());
}

#[test]
fn bars_chosen_by_both_panels_of_a_support_may_agree() {
    let (floor, queries) =
        drawn(&format!("choose P south top 12 150\nchoose R north top 12 150\n{T_JUNCTION}"));
    assert_eq!(floor.supports[2].chosen.unwrap().bar_mm, 12.0);
    assert!(queries.is_empty());
}

#[test]
fn two_choices_for_one_bottom_are_an_error() {
    let (floor, queries) =
        drawn(&format!("choose P short bottom 10 150\nchoose P short bottom 12 150\n{T_JUNCTION}"));
    assert_eq!(floor.panels[0].chosen_bottom[0].unwrap().bar_mm, 10.0);
    assert_eq!(floor.panels[0].chosen_bottom[1], None);
    assert_eq!(subjects(&queries, Severity::Error), [&Subject::Row { sheet: "Chosen bars", index: 1 }]);
}

fn subjects(queries: &[Query], severity: Severity) -> Vec<&Subject> {
    queries.iter().filter(|query| query.severity == severity).map(|query| &query.subject).collect()
}

#[test]
fn stretches_that_do_not_cross_or_have_no_length_are_errors() {
    let rows = "joint B 1 1\njoint B A 2\nsupport 2 1 2 beam 250\n";
    let (_, queries) = drawn(&format!("{rows}{T_JUNCTION}"));
    let row = |sheet, index| Subject::Row { sheet, index };
    assert_eq!(
        subjects(&queries, Severity::Error),
        [&row("Joints", 0), &row("Joints", 1), &row("Supports", 0)]
    );
}

#[test]
fn a_stretch_may_be_named_from_either_end_and_reach_from_one_end_only() {
    for joint in ["joint B 1 2", "joint B 2 1", "joint B - 2"] {
        let (floor, _) = drawn(&format!("{joint}\n{T_JUNCTION}"));
        assert_eq!(floor.panels[1].edge(Side::North).state, EdgeState::Discontinuous, "{joint}");
        assert_eq!(floor.panels[2].edge(Side::North).state, EdgeState::Continuous, "{joint}");
    }
}

#[test]
fn names_alike_by_their_dashes_are_told_apart() {
    let mut layout = layout("columns 4.0 4.2 4.4\nrows 4.6 4.2\nplan\n P Q S |\n T U V |\n");
    for (line, name) in layout.gridlines.iter_mut().zip(["1", "2-3", "1-2", "3"]) {
        line.name = name.to_owned();
    }
    let (floor, _) = lay_out(&layout);
    let names: Vec<&str> = floor.supports.iter().map(|support| support.name.as_deref().unwrap()).collect();
    assert_eq!(names[4..], ["B/1-2-3", "B/2-3-1-2", "B/1-2-3 (2)"]);
}

#[test]
fn gridlines_chained_within_tolerance_are_one_line() {
    let mut layout = layout("columns 4.0 4.2\nrows 4.6\nplan\n P Q |\n");
    for (name, position) in [("2a", 40_010), ("2b", 40_020)] {
        layout.gridlines.push(Gridline { name: name.to_owned(), axis: Axis::X, position: TenthMm(position) });
    }
    layout.panels[1].x_from = floor_grid::layout::GridlineId(layout.gridlines.len() - 1);
    let (floor, queries) = lay_out(&layout);
    assert_eq!(floor.panels[0].edge(Side::East).state, EdgeState::Continuous);
    assert_eq!(floor.panels[1].plan.unwrap().x0, TenthMm(40_020));
    assert_eq!(floor.supports[0].gridline.as_deref(), Some("2"));
    assert_eq!(subjects(&queries, Severity::Warning).len(), 2);
}

#[test]
fn a_gap_is_warned_of_from_the_tolerance_up_to_fifty_millimetres() {
    for (gap_m, warned) in [("0.0011", true), ("0.0499", true), ("0.05", false), ("0.5", false)] {
        let (_, queries) = drawn(&format!("columns 4.0 {gap_m} 4.2\nrows 4.6\nplan\n P . Q |\n"));
        assert_eq!(!subjects(&queries, Severity::Warning).is_empty(), warned, "{gap_m}");
    }
}

#[test]
fn a_loose_panel_has_its_short_span_along_x() {
    let (floor, queries) =
        drawn("loose L 3.6 4.5 continuous discontinuous discontinuous continuous\nplan\n |\n");
    let panel = &floor.panels[0];
    assert_eq!((panel.plan, panel.spans_m), (None, [3.6, 4.5]));
    let places: Vec<(Axis, Side, f64)> =
        floor.supports.iter().map(|support| (support.axis, support.near.side, support.length_m())).collect();
    assert_eq!(places, [(Axis::Y, Side::North, 3.6), (Axis::X, Side::West, 4.5)]);
    assert!(queries.is_empty());
}

#[test]
fn a_loose_short_span_above_the_long_one_is_an_error() {
    let text = "loose L 4.6 4.5 discontinuous discontinuous discontinuous discontinuous\nplan\n |\n";
    let (_, queries) = drawn(text);
    let wanted = Subject::Panel { mark: "L".to_owned(), column: Some("Short span") };
    assert_eq!(subjects(&queries, Severity::Error), [&wanted]);
}

#[test]
fn stated_one_way_with_a_free_side_is_designed_and_with_a_free_end_is_not() {
    let text = |side| format!("span P one-way x\nedge P {side} free\ncolumns 4.0\nrows 4.6\nplan\n P |\n");
    assert_eq!(drawn(&text("north")).0.panels[0].not_designed, None);
    assert!(drawn(&text("east")).0.panels[0].not_designed.is_some());
}

#[test]
fn a_slab_over_ratio_two_free_on_its_long_edges_carries_along_its_long_span() {
    // Free along north and south: the 6 m span is the one that carries, and its ends are held.
    let text = "edge P north free\nedge P south free\ncolumns 6.0 5.0\nrows 2.5\nplan\n P Q |\n";
    let (floor, queries) = drawn(text);
    assert_eq!(floor.panels[0].edge(Side::East).state, EdgeState::Continuous);
    assert_eq!(floor.panels[0].not_designed, None);
    assert!(queries.is_empty());
}

#[test]
fn an_edge_stated_continuous_over_a_joint_anywhere_along_it_is_one_error() {
    let edge = |side| Subject::Edge { mark: "P".to_owned(), side };
    let errors = |rows: &str| {
        let (_, queries) = drawn(&format!("{rows}\n{T_JUNCTION}"));
        subjects(&queries, Severity::Error).into_iter().cloned().collect::<Vec<_>>()
    };
    // Over part of the edge, over two joints along it, and where no panel lies beyond.
    assert_eq!(errors("edge P south continuous\njoint B 1 2"), [edge(Side::South)]);
    assert_eq!(errors("edge P south continuous\njoint B 1 2\njoint B 2 3"), [edge(Side::South)]);
    assert_eq!(errors("edge P north continuous\njoint C"), [edge(Side::North)]);
    assert_eq!(errors("edge P south continuous\njoint C"), []);
    assert_eq!(errors("edge P south discontinuous\njoint B"), []);
    // A step along the rest of the edge is still warned of.
    let (_, queries) = drawn(&format!("edge P south continuous\njoint B 1 2\nlevel R 40\n{T_JUNCTION}"));
    assert_eq!(subjects(&queries, Severity::Warning), [&edge(Side::South)]);
}
