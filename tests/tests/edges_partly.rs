//! Partly continuous edges: the panel as if they were discontinuous, each shared stretch by itself.

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use design_engine::bs8110::coefficients::{PanelCase, restrained, shear};
use design_engine::check::{CheckKind, Place};
use design_engine::criteria::Coefficients;
use design_engine::floor::{Axis, EdgeState, Side, Spanning};
use edges_support::{Designed, N, Plan, plan, same};
use floor_grid::layout::StatedEdge;

/// P, 6 x 5 m, has M beside the southern 3 m of its west edge, S along its south edge and a void elsewhere.
fn beside_part() -> Plan {
    plan(&[0.0, 4.0, 10.0], &[0.0, 4.0, 7.0, 9.0])
        .panel("P", "2-3", "B-D")
        .panel("M", "1-2", "B-C")
        .panel("S", "2-3", "A-B")
}

fn shears(of: &Designed, mark: &str, side: Side) -> Vec<f64> {
    // kN/m: v is V over the d of the section whose bars resist it.
    let checks = of.checks(mark, CheckKind::Shear, Place::Side(side));
    let depths: Vec<f64> = of.panel(mark).sections.iter().map(|section| section.d_mm).collect();
    let shears = checks.iter().flat_map(|check| depths.iter().map(|d| check.demand * d));
    shears.collect()
}

/// Whether some shear check at a side is for V kN/m.
fn checked_for(of: &Designed, mark: &str, side: Side, v: f64) -> bool {
    shears(of, mark, side).iter().any(|shear| (shear - v).abs() < 1e-9 * v)
}

#[test]
fn the_panel_is_designed_as_if_the_edge_were_discontinuous() {
    let partly = beside_part().design();
    let without = beside_part().stated("P", Side::West, StatedEdge::Discontinuous).design();
    assert_eq!(partly.panel("P").edge_states[Side::West.index()], EdgeState::PartlyContinuous);
    // 5 m along y: three edges discontinuous, a long edge continuous.
    assert_eq!([partly.case("P"), without.case("P")], [7, 7]);
    for at in [Place::ShortMidspan, Place::LongMidspan] {
        assert_eq!(partly.section("P", at), without.section("P", at));
    }
    assert_eq!(partly.panel("P").deflection, without.panel("P").deflection);
    let (with, alone) = (partly.support("P", Side::South), without.support("P", Side::South));
    assert_eq!(with.moment_knm_m, alone.moment_knm_m);
    assert_eq!(with.sides[1], alone.sides[1]);
    let south = |of: &Designed| of.panel("P").side_loads[Side::South.index()];
    assert_eq!(south(&partly), south(&without));
    assert!(partly.design.assumptions.iter().any(|text| text.contains("P west")));
}

#[test]
fn the_shared_stretch_has_the_moment_of_the_case_with_that_edge_continuous() {
    let partly = beside_part().design();
    // West is a short edge: case 7 becomes the one with two adjacent edges discontinuous, case 4; ratio 6/5.
    let with_edge = restrained(PanelCase::new(1, 1), 1.2, Coefficients::Tabulated);
    let own = with_edge.short_edge.unwrap() * N * 25.0;
    same(own, 0.045 * N * 25.0);
    let support = partly.support("P", Side::West);
    same(partly.coefficient_moment(support, "P"), own);
    // The same as where the book states the edge continuous.
    let stated = beside_part().stated("P", Side::West, StatedEdge::Continuous).design();
    assert_eq!(stated.case("P"), 4);
    let whole = stated.supports("P", Side::West);
    for support in whole {
        same(stated.coefficient_moment(support, "P"), own);
    }
    // And then it is balanced with M's: h3/4 x 0.75 for M, and 0.75 x h3/6 for P, whose far end is discontinuous.
    let m = partly.coefficient_moment(support, "M");
    let moment = (own / 4.0 + m / 6.0) / (1.0 / 4.0 + 1.0 / 6.0);
    assert!(support.balanced);
    same(support.moment_knm_m.unwrap(), moment);
}

#[test]
fn shears_are_the_greater_of_both_cases() {
    let partly = beside_part().design();
    let [without, with] = [PanelCase::new(1, 2), PanelCase::new(1, 1)].map(|case| shear(case, 1.2));
    // West: .29 as a discontinuous short edge (case 7), .40 as a continuous one (case 4).
    same(without.edge(false, false).unwrap(), 0.29);
    same(with.edge(false, true).unwrap(), 0.40);
    assert!(checked_for(&partly, "P", Side::West, 0.40 * N * 5.0));
    // Elsewhere the case without it has the greater: south .51 and .47, north .34 and .31, east .29 and .26.
    assert!(checked_for(&partly, "P", Side::South, 0.51 * N * 5.0));
    let alone = beside_part().stated("P", Side::West, StatedEdge::Discontinuous).design();
    for side in [Side::South, Side::North, Side::East] {
        let [found, expected] =
            [&partly, &alone].map(|of| of.checks("P", CheckKind::Shear, Place::Side(side)));
        assert_eq!(found, expected);
    }
    // A shear check at the stretch that is shared and at the one that is not.
    assert_eq!(partly.checks("P", CheckKind::Shear, Place::Side(Side::West)).len(), 2);
    assert!(!partly.checks("P", CheckKind::BondAtSupport, Place::Side(Side::West)).is_empty());
}

#[test]
fn each_of_two_partly_continuous_edges_is_taken_alone() {
    // W beside part of the west edge, E beside part of the east edge, nothing else: case 9 for P, 4 x 5 m.
    let floor = plan(&[0.0, 3.0, 7.0, 10.0], &[0.0, 2.0, 3.0, 5.0])
        .panel("P", "2-3", "A-D")
        .panel("W", "1-2", "A-C")
        .panel("E", "3-4", "B-D");
    let design = floor.design();
    assert_eq!(design.case("P"), 9);
    // West and east are long edges: with one of them continuous case 7, ratio 1.25: (.071 + .076)/2, not case 5's .0555.
    for side in [Side::West, Side::East] {
        same(design.coefficient_moment(design.support("P", side), "P"), 0.0735 * N * 16.0);
    }
    // Midspans do not see them: .0775 along x, .056 along y (case 9).
    same(design.moment("P", Place::ShortMidspan), 0.0775 * N * 16.0);
    same(design.moment("P", Place::LongMidspan), 0.056 * N * 16.0);
    same(design.panel("P").deflection.unwrap().basic, 20.0);
}

#[test]
fn a_partly_continuous_end_of_a_one_way_panel_has_its_moment_and_shear_with_that_end_built_in() {
    // P, 4 x 9 m, spans along x; M beside 5 m of its west edge.
    let floor = plan(&[0.0, 4.5, 8.5], &[0.0, 5.0, 9.0]).panel("P", "2-3", "A-C").panel("M", "1-2", "A-B");
    let design = floor.design();
    assert_eq!(design.panel("P").edge_states[Side::West.index()], EdgeState::PartlyContinuous);
    let support = design.support("P", Side::West);
    same(design.coefficient_moment(support, "P"), N * 16.0 / 10.0);
    same(design.moment("P", Place::ShortMidspan), N * 16.0 / 8.0);
    same(design.panel("P").deflection.unwrap().basic, 20.0);
    // Built in at 0.1 n l2: V = 0.6 n l there; simply supported 0.5.
    assert!(checked_for(&design, "P", Side::West, 0.6 * N * 4.0));
    assert!(checked_for(&design, "P", Side::East, 0.5 * N * 4.0));
}

#[test]
fn bars_cross_without_moment_beside_the_side_of_a_one_way_panel() {
    // O, 6 x 4 m, is stated to span along y, past P, 4 x 4 m and two-way.
    let floor = plan(&[0.0, 4.0, 10.0], &[0.0, 4.0])
        .panel("P", "1-2", "A-B")
        .panel("O", "2-3", "A-B")
        .spanning("O", Spanning::OneWay(Axis::Y));
    let design = floor.design();
    let support = design.support("P", Side::East);
    assert!(support.moment_knm_m.is_none());
    assert_eq!(design.case("P"), 9);
    // Half of P's midspan steel along x, or the minimum, 0.13 % of 175 mm; 0.3 of the lesser lx each side.
    let half = design.panel("P").sections.iter().find(|s| s.bars_along == Axis::X).unwrap();
    same(support.as_required_mm2_m.unwrap(), (half.as_provided_mm2_m / 2.0).max(227.5));
    for side in &support.sides {
        same(side.extension_m, 1.2);
    }
}
