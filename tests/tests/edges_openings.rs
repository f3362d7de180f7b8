//! Openings: bars cut and the steel beside them, bars moved aside, and what is outside the method.

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use std::f64::consts::PI;

use design_engine::check::Place;
use design_engine::floor::{Axis, BarChoice, Layer, Side};
use design_engine::query::Severity;
use design_engine::result::{CutLayer, OpeningDesign};
use edges_support::random::config;
use edges_support::{Designed, Plan, plan, same};
use floor_grid::layout::{ChosenBars, ChosenPosition};
use proptest::prelude::*;

/// P, 5 x 6 m, with E beyond its east edge; bottom bars of P 12 mm at 200 along x and 10 mm at 150 along y.
fn floor() -> Plan {
    let mut floor = plan(&[0.0, 5.0, 10.0], &[0.0, 6.0]).panel("P", "1-2", "A-B").panel("E", "2-3", "A-B");
    for (position, bar_mm, spacing_mm) in
        [(ChosenPosition::ShortBottom, 12.0, 200.0), (ChosenPosition::LongBottom, 10.0, 150.0)]
    {
        let (panel, remark) = ("P".to_owned(), String::new());
        floor.0.chosen_bars.push(ChosenBars {
            panel,
            position,
            bars: BarChoice { bar_mm, spacing_mm },
            remark,
        });
    }
    floor
}

fn opening(of: &Designed) -> &OpeningDesign {
    let [only] = &of.panel("P").openings[..] else { panic!() };
    only
}

fn layer(of: &Designed, layer: Layer) -> Option<&CutLayer> {
    opening(of).layers.iter().find(|cut| cut.layer == layer)
}

fn bar_area(bar_mm: f64) -> f64 {
    PI * bar_mm * bar_mm / 4.0
}

#[test]
fn bars_cut_are_counted_in_each_layer_and_half_their_steel_goes_on_each_side() {
    // 0.7 m along x and 1.1 m along y, away from the supports.
    let floor = floor().opening("P", [2.0, 2.4], [0.7, 1.1]).design();
    assert!(!opening(&floor).displaced);
    // Bars along x at 200 cross 1.1 m: five spaces and a half, so at most six bars; along y at 150 cross 0.7 m: five.
    let along_x = layer(&floor, Layer::B1).unwrap();
    assert_eq!((along_x.bars_along, along_x.at), (Axis::X, Place::ShortMidspan));
    same(along_x.cut, 6.0);
    same(along_x.each_side_mm2, 3.0 * bar_area(12.0));
    let along_y = layer(&floor, Layer::B2).unwrap();
    assert_eq!(along_y.bars_along, Axis::Y);
    same(along_y.cut, 5.0);
    same(along_y.each_side_mm2, 2.5 * bar_area(10.0));
    assert_eq!(opening(&floor).layers.len(), 2, "no top bars there");
    assert!(floor.says("P", Severity::Note, "half of each layer's cut steel goes on each side"));
}

#[test]
fn an_opening_as_wide_as_some_spaces_may_meet_a_bar_at_either_rim() {
    let floor = floor().opening("P", [2.0, 2.4], [0.6, 0.6]).design();
    same(layer(&floor, Layer::B1).unwrap().cut, 4.0);
    same(layer(&floor, Layer::B2).unwrap().cut, 5.0);
}

#[test]
fn top_bars_are_cut_where_they_reach_the_opening() {
    // Top bars over the east support reach 0.3 x 5.0 = 1.5 m past its face, 1.625 m from the line.
    let reaches = |from_west: f64| {
        let floor = floor().opening("P", [from_west, 2.4], [0.5, 0.5]).design();
        let support = floor.support("P", Side::East);
        same(support.sides[0].extension_m, 1.5);
        let top = opening(&floor).layers.iter().find(|cut| cut.at == Place::Side(Side::East)).copied();
        if let Some(top) = top {
            assert_eq!((top.layer, top.bars), (support.layer, support.bars));
            same(top.each_side_mm2, top.cut * bar_area(support.bars.bar_mm) / 2.0);
        }
        top.is_some()
    };
    assert!(!reaches(2.8) && reaches(2.9));
}

#[test]
fn bars_are_moved_aside_at_openings_under_300_mm_and_two_spaces() {
    let displaced = |widths| {
        let floor = floor().opening("P", [2.0, 2.4], widths).design();
        let displaced = opening(&floor).displaced;
        assert_eq!(displaced, opening(&floor).layers.is_empty());
        assert_eq!(displaced, floor.says("P", Severity::Note, "bars are moved aside, none cut"));
        displaced
    };
    assert!(displaced([0.29, 0.29]));
    assert!(!displaced([0.30, 0.30]));
    // A slot is as long as it is long: its bars cannot all be moved aside.
    assert!(!displaced([0.25, 1.1]) && !displaced([1.1, 0.25]));
}

#[test]
fn bars_closer_than_150_mm_leave_less_room_to_move_them() {
    let mut close_bars = floor();
    close_bars.0.chosen_bars[1].bars.spacing_mm = 110.0;
    let displaced =
        |width: f64| opening(&close_bars.clone().opening("P", [2.0, 2.4], [width; 2]).design()).displaced;
    assert!(displaced(0.21) && !displaced(0.23));
}

#[test]
fn an_opening_over_a_quarter_of_a_span_or_within_d_of_a_support_is_a_warning() {
    let warned = |corner, widths| {
        let floor = floor().opening("P", corner, widths).design();
        let said = floor.says("P", Severity::Warning, "the coefficient method does not cover it");
        let opening = opening(&floor);
        assert_eq!(said, opening.over_quarter_of_span || opening.within_d_of_support);
        said
    };
    // A quarter of 5 m is 1.25, of 6 m 1.5.
    assert!(!warned([1.9, 2.2], [1.25, 1.5]));
    assert!(warned([1.9, 2.2], [1.26, 1.0]) && warned([1.9, 2.2], [1.0, 1.51]));
    // Within d of the west support's face: 0.125 + 0.144 m (175 - 25 - 12/2).
    assert!(warned([0.26, 2.4], [0.4, 0.4]) && !warned([0.28, 2.4], [0.4, 0.4]));
    // And of the north one.
    assert!(warned([2.0, 5.34], [0.4, 0.4]) && !warned([2.0, 5.32], [0.4, 0.4]));
}

#[test]
fn an_opening_over_half_of_a_span_leaves_no_panel_to_design() {
    let floor = floor().opening("P", [1.0, 1.0], [2.6, 1.0]).design();
    assert!(floor.panel("P").not_designed.is_some() && floor.panel("P").sections.is_empty());
    assert!(floor.says("P", Severity::NotDesigned, "an opening takes more than half of a span"));
    assert!(floor.panel("E").not_designed.is_none());
}

proptest! {
    #![proptest_config(config(100))]

    #[test]
    fn no_bar_is_cut_without_half_of_it_on_each_side(
        corner in (5_u8..=60, 5_u8..=60),
        widths in (5_u8..=24, 5_u8..=24),
    ) {
        let metres = |n: u8| f64::from(n) / 20.0;
        let (corner, widths) = ([metres(corner.0), metres(corner.1)], [metres(widths.0), metres(widths.1)]);
        let design = floor().opening("P", corner, widths).design();
        for cut in &opening(&design).layers {
            let width = 1000.0 * widths[cut.bars_along.across() as usize];
            let spaces = width / cut.bars.spacing_mm;
            prop_assert!(cut.cut >= spaces && cut.cut <= spaces + 1.0 + 1e-9);
            prop_assert!((cut.each_side_mm2 - cut.cut * bar_area(cut.bars.bar_mm) / 2.0).abs() < 1e-9);
        }
        // Both bottom layers are cut wherever bars are not moved aside.
        let bottoms = [Layer::B1, Layer::B2].iter().filter(|at| layer(&design, **at).is_some()).count();
        prop_assert_eq!(bottoms, if opening(&design).displaced { 0 } else { 2 });
    }
}
