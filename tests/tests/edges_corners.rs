//! Torsion steel at the four corners of a panel (3.5.3.5).

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use std::collections::BTreeSet;

use design_engine::bs8110::corners::CornerState;
use design_engine::check::Place;
use design_engine::floor::{Axis, Corners, Side, Spanning};
use design_engine::result::CornerDesign;
use edges_support::{Designed, Plan, close, plan, same};

/// C, 4 x 5 m, in the middle of nine bays, with a neighbour on each of these sides.
fn with_neighbours(sides: &[Side]) -> Plan {
    let mut floor = plan(&[0.0, 4.0, 8.0, 12.0], &[0.0, 5.0, 10.0, 15.0]).panel("C", "2-3", "B-C");
    for side in sides {
        let (x, y) = match side {
            Side::North => ("2-3", "C-D"),
            Side::East => ("3-4", "B-C"),
            Side::South => ("2-3", "A-B"),
            Side::West => ("1-2", "B-C"),
        };
        floor = floor.panel(side.word(), x, y);
    }
    floor
}

fn corner<'a>(of: &'a Designed, mark: &str, sides: [Side; 2]) -> &'a CornerDesign {
    of.panel(mark).corners.iter().find(|corner| corner.sides == sides).unwrap()
}

fn bottom(of: &Designed, axis: Axis) -> f64 {
    let mut midspans = of.panel("C").sections.iter().filter(|section| section.support.is_none());
    midspans.find(|section| section.bars_along == axis).unwrap().as_provided_mm2_m
}

/// What the rules ask of one corner of C: state, steel in each layer, and what is there already.
fn expected(of: &Designed, continuous: &[Side], sides: [Side; 2]) -> (CornerState, f64, [f64; 4]) {
    let carried = sides.map(|side| continuous.contains(&side));
    let bending =
        [Place::ShortMidspan, Place::LongMidspan].map(|at| of.section("C", at).as_bending_mm2_m.unwrap());
    let greatest = bending[0].max(bending[1]);
    let (state, share) = match carried {
        [true, true] => (CornerState::BothContinuous, 0.0),
        [false, false] => (CornerState::NeitherContinuous, 0.75),
        _ => (CornerState::OneContinuous, 0.375),
    };
    // Top bars at right angles to each edge: the support's that go past lx/5, or the edge's own.
    let top = |axis: Axis| {
        let side = *sides.iter().find(|side| side.span_axis() == axis).unwrap();
        if !continuous.contains(&side) {
            // 0.13 % of 175 mm.
            return f64::max(bottom(of, axis) / 2.0, 227.5);
        }
        let support = of.support("C", side);
        let short = support.sides.iter().map(|at| at.short_extension_m).fold(f64::INFINITY, f64::min);
        support.as_provided_mm2_m * if short + 0.125 >= 4.0 / 5.0 { 1.0 } else { 0.5 }
    };
    (state, share * greatest, [bottom(of, Axis::X), bottom(of, Axis::Y), top(Axis::X), top(Axis::Y)])
}

#[test]
fn every_corner_of_all_nine_cases_has_its_state_its_steel_and_what_is_to_be_added() {
    let mut cases = BTreeSet::new();
    for pick in 0..16_u8 {
        let continuous: Vec<Side> =
            Side::ALL.into_iter().filter(|side| pick & (1 << side.index()) != 0).collect();
        // Heavy enough that bending, not the minimum, decides the bars.
        let floor = with_neighbours(&continuous).imposed("C", 8.0).design();
        cases.insert(floor.case("C"));
        let corners = &floor.panel("C").corners;
        assert_eq!(corners.len(), 4);
        for found in corners {
            let (state, required, present) = expected(&floor, &continuous, found.sides);
            assert_eq!(found.state, state, "{continuous:?} {}", found.name());
            same(found.extent_m, 0.8);
            same(found.as_required_mm2_m, required);
            for (layer, there) in present.into_iter().enumerate() {
                same(found.as_present_mm2_m[layer], there);
                same(found.as_to_add_mm2_m[layer], (required - there).max(0.0));
            }
        }
        let places: BTreeSet<String> = corners.iter().map(CornerDesign::name).collect();
        assert_eq!(places.len(), 4);
    }
    assert_eq!(cases.into_iter().collect::<Vec<_>>(), (1..=9).collect::<Vec<_>>());
}

#[test]
fn top_steel_is_to_be_added_where_the_edge_bars_are_too_few() {
    let floor = with_neighbours(&[]).imposed("C", 10.0).design();
    for corner in &floor.panel("C").corners {
        let [bottom_x, bottom_y, top_x, top_y] = corner.as_to_add_mm2_m;
        // Bottom bars run to the edges: 0.75 of their own bending steel is there.
        close(bottom_x, 0.0, 1e-9);
        assert!(top_x > 0.0 && top_y > 0.0 && bottom_y < top_y);
    }
}

#[test]
fn a_corner_of_a_partly_continuous_edge_goes_by_the_stretch_that_reaches_it() {
    // P, 6 x 5 m; M beside the southern 3 m of its west edge.
    let floor =
        plan(&[0.0, 4.0, 10.0], &[0.0, 3.0, 5.0]).panel("P", "2-3", "A-C").panel("M", "1-2", "A-B").design();
    assert_eq!(corner(&floor, "P", [Side::South, Side::West]).state, CornerState::OneContinuous);
    assert_eq!(corner(&floor, "P", [Side::North, Side::West]).state, CornerState::NeitherContinuous);
    assert_eq!(corner(&floor, "P", [Side::South, Side::East]).state, CornerState::NeitherContinuous);
}

#[test]
fn edges_beside_a_one_way_span_a_cantilever_or_a_joint_count_as_discontinuous_at_corners() {
    let beside =
        with_neighbours(&[Side::North, Side::East]).spanning("east", Spanning::OneWay(Axis::Y)).design();
    assert_eq!(corner(&beside, "C", [Side::North, Side::East]).state, CornerState::OneContinuous);
    let joint = with_neighbours(&[Side::North, Side::East]).joint("3", "B-C").design();
    assert_eq!(corner(&joint, "C", [Side::North, Side::East]).state, CornerState::OneContinuous);
    let balcony = plan(&[0.0, 4.0, 5.5], &[0.0, 5.0])
        .panel("C", "1-2", "A-B")
        .panel("K", "2-3", "A-B")
        .spanning("K", Spanning::Cantilever)
        .design();
    for found in &balcony.panel("C").corners {
        assert_eq!(found.state, CornerState::NeitherContinuous);
    }
}

#[test]
fn panels_that_are_not_restrained_two_way_have_no_torsion_steel() {
    let free = with_neighbours(&[]).with("C", |panel| panel.data.corners = Corners::FreeToLift).design();
    assert!(free.panel("C").corners.is_empty());
    let one_way = with_neighbours(&[Side::East]).spanning("C", Spanning::OneWay(Axis::X)).design();
    assert!(one_way.panel("C").corners.is_empty());
    // Corners free to lift cannot be where an edge is continuous.
    let held =
        with_neighbours(&[Side::East]).with("C", |panel| panel.data.corners = Corners::FreeToLift).design();
    assert_eq!(held.panel("C").corners.len(), 4);
}
