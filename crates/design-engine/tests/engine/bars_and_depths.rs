//! Sections of a designed floor: layers and effective depths, steel, chosen bars.

use design_engine::check::{Check, CheckKind, Place};
use design_engine::criteria::Criteria;
use design_engine::design_floor;
use design_engine::floor::{
    Axis, BarChoice, EdgeState, Floor, Layer, PanelId, PlanRect, Segment, Side, Support, SupportId,
    SupportKind, SupportSide, TenthMm,
};
use design_engine::result::{PanelDesign, Section};

use crate::grid::{Grid, id_of, panel_design, support_design, support_on};
use crate::numbers::{close, same};
use crate::settings::{criteria, number, word};

const SHORT: Place = Place::ShortMidspan;
const LONG: Place = Place::LongMidspan;

pub(crate) fn section(design: &PanelDesign, at: Place) -> &Section {
    design.section(at).unwrap_or_else(|| panic!("no section at {at:?}"))
}

pub(crate) fn check(design: &PanelDesign, kind: CheckKind, at: Place) -> &Check {
    let found = design.checks.iter().find(|check| check.kind == kind && check.at == at);
    found.unwrap_or_else(|| panic!("no check {kind:?} at {at:?}"))
}

/// Two panels side by side, the east one of another thickness and top level; d and bar size over their support.
fn depth_between(east_thickness_mm: f64, east_level_mm: f64) -> (f64, f64) {
    let floor = Grid::new(&[5.0, 5.0], &[6.0])
        .with("B1", |cell| {
            cell.thickness_mm = east_thickness_mm;
            cell.top_level_mm = east_level_mm;
        })
        .build();
    let design = design_floor(&floor, &Criteria::default());
    let support = support_design(&floor, &design, "A1", Side::East);
    for (mark, side) in [("A1", Side::East), ("B1", Side::West)] {
        same(section(panel_design(&floor, &design, mark), Place::Side(side)).d_mm, support.d_mm);
    }
    assert_eq!(support.layer, Layer::T1);
    (support.d_mm, support.bars.bar_mm)
}

#[test]
fn support_bars_take_the_lesser_effective_depth() {
    // 150 mm beside 200 mm, tops level: 150 - 25 - dia/2 governs.
    let (d, bar) = depth_between(200.0, 0.0);
    same(d, 125.0 - bar / 2.0);
    // The 200 mm panel stands 25 mm higher: bars lie 25 mm + dia/2 under the lower top, which leaves the thin panel
    // its full depth, the lesser of the two.
    let (d, bar) = depth_between(200.0, 25.0);
    same(d, 125.0 - bar / 2.0);
    // The 200 mm panel lies 20 mm lower: bars drop with it and the thin panel is left with 20 mm less.
    let (d, bar) = depth_between(200.0, -20.0);
    same(d, 105.0 - bar / 2.0);
}

#[test]
fn t2_depth_is_under_the_largest_t1_bar() {
    let mut floor = Grid::new(&[4.0, 4.0], &[6.0, 6.0]).build();
    let t1 = support_on(&floor, "A1", Side::East);
    floor.supports[t1.0].chosen = Some(BarChoice { bar_mm: 16.0, spacing_mm: 200.0 });
    let design = design_floor(&floor, &Criteria::default());
    assert_eq!(support_design(&floor, &design, "A1", Side::East).layer, Layer::T1);
    // Both T2 supports cross panels that the 16 mm bars cross, the other T1 support has its own size.
    for mark in ["A1", "B1"] {
        let t2 = support_design(&floor, &design, mark, Side::North);
        assert_eq!(t2.layer, Layer::T2);
        same(t2.d_mm, 150.0 - 25.0 - 16.0 - t2.bars.bar_mm / 2.0);
    }
}

#[test]
fn t1_bars_run_across_the_supports_with_the_greater_sum_of_moment_times_length() {
    // Narrow panels in a row along y: the supports between them are crossed by bars along y.
    let floor = Grid::new(&[6.0], &[4.0, 4.0, 4.0]).build();
    let design = design_floor(&floor, &Criteria::default());
    assert_eq!(support_design(&floor, &design, "A1", Side::North).layer, Layer::T1);
    // A stated layering wins.
    let design = design_floor(&floor, &criteria(&[("layering", word("x outer"))]));
    assert_eq!(support_design(&floor, &design, "A1", Side::North).layer, Layer::T2);
}

/// Four panels of 6 x 4 m around a void of 2 x 2 m, each against the next over 4 m of its edge: whatever holds along
/// x holds along y.
pub(crate) fn pinwheel() -> Floor {
    let rectangles = [("A", 0, 6, 0, 4), ("B", 6, 10, 0, 6), ("C", 4, 10, 6, 10), ("D", 0, 4, 4, 10)];
    let mut floor = Floor::default();
    let m = |metres: i64| TenthMm(10_000 * metres);
    for (mark, x0, x1, y0, y1) in rectangles {
        let mut panel = Grid::new(&[1.0], &[1.0]).build().panels.remove(0);
        let plan = PlanRect { x0: m(x0), x1: m(x1), y0: m(y0), y1: m(y1) };
        mark.clone_into(&mut panel.mark);
        panel.spans_m = [plan.length_m(Axis::X), plan.length_m(Axis::Y)];
        panel.plan = Some(plan);
        floor.panels.push(panel);
    }
    // The lesser-coordinate panel, its side, the other, and where they meet; then whose edge goes on beside the void.
    let meetings = [
        (0, Side::East, 1, 0, 4, (1, Side::West, 4, 6)),
        (1, Side::North, 2, 6, 10, (2, Side::South, 4, 6)),
        (3, Side::East, 2, 6, 10, (3, Side::East, 4, 6)),
        (0, Side::North, 3, 0, 4, (0, Side::North, 4, 6)),
    ];
    for (near, side, far, from, to, (open, open_side, open_from, open_to)) in meetings {
        let id = SupportId(floor.supports.len());
        let at = |panel: usize, side: Side| SupportSide { panel: PanelId(panel), side };
        floor.supports.push(Support {
            name: Some(format!("{near}/{far}")),
            gridline: None,
            axis: side.span_axis(),
            from: m(from),
            to: m(to),
            width_mm: 250.0,
            kind: SupportKind::Hogging,
            near: at(near, side),
            far: Some(at(far, side.opposite())),
            chosen: None,
        });
        let segment = |neighbour: Option<usize>, from, to| Segment {
            from: m(from),
            to: m(to),
            neighbour: neighbour.map(PanelId),
            continuous: neighbour.is_some(),
            joint: false,
            support: neighbour.map(|_| id),
            why: String::new(),
        };
        for (panel, side, other) in [(near, side, far), (far, side.opposite(), near)] {
            let edge = &mut floor.panels[panel].edges[side.index()];
            edge.state = EdgeState::Continuous;
            edge.segments = vec![segment(Some(other), from, to)];
        }
        let edge = &mut floor.panels[open].edges[open_side.index()];
        edge.state = EdgeState::PartlyContinuous;
        edge.segments.push(segment(None, open_from, open_to));
        edge.segments.sort_by_key(|segment| segment.from);
    }
    floor
}

#[test]
fn one_direction_is_t1_over_a_connected_region_even_where_nothing_tells_the_two_apart() {
    let floor = pinwheel();
    let design = design_floor(&floor, &Criteria::default());
    for panel in &design.panels {
        let at_supports: Vec<&Section> = panel.sections.iter().filter(|s| s.support.is_some()).collect();
        let [one, other] = at_supports[..] else { panic!("two supports in {:?}", panel.panel) };
        assert_ne!(one.bars_along, other.bars_along);
        assert_ne!(
            one.layer, other.layer,
            "the bars of two supports cross in one layer in {:?}",
            panel.panel
        );
    }
}

#[test]
fn inner_bottom_bars_lie_on_the_outer_ones() {
    let floor = Grid::panel(4.0, 6.0, "dddd").with_all(|cell| cell.loads.imposed_kn_m2 = 6.0).build();
    let design = design_floor(&floor, &Criteria::default());
    let panel = &design.panels[0];
    let (short, long) = (section(panel, SHORT), section(panel, LONG));
    assert_eq!([short.layer, long.layer], [Layer::B1, Layer::B2]);
    same(short.d_mm, 150.0 - 25.0 - short.bars.bar_mm / 2.0);
    same(long.d_mm, 150.0 - 25.0 - short.bars.bar_mm - long.bars.bar_mm / 2.0);

    let design = design_floor(&floor, &criteria(&[("layering", word("y outer"))]));
    let panel = &design.panels[0];
    let (short, long) = (section(panel, SHORT), section(panel, LONG));
    assert_eq!([short.layer, long.layer], [Layer::B2, Layer::B1]);
    same(long.d_mm, 150.0 - 25.0 - long.bars.bar_mm / 2.0);
    same(short.d_mm, 150.0 - 25.0 - long.bars.bar_mm - short.bars.bar_mm / 2.0);
}

#[test]
fn minimum_steel_governs_a_light_panel() {
    let floor = Grid::new(&[2.5, 2.5], &[3.0]).build();
    let design = design_floor(&floor, &Criteria::default());
    for panel in &design.panels {
        for section in &panel.sections {
            // 0.13 % of 150 x 1000.
            close(section.as_minimum_mm2_m, 195.0, 1e-9);
            assert!(section.as_bending_mm2_m.unwrap() < 195.0);
            same(section.as_required_mm2_m.unwrap(), 195.0);
            assert_eq!(section.bars, BarChoice { bar_mm: 10.0, spacing_mm: 300.0 });
        }
        assert!(panel.ok());
    }
    // A support between unlike thicknesses takes the minimum of the thicker panel.
    let floor = Grid::new(&[2.5, 2.5], &[3.0]).with("B1", |cell| cell.thickness_mm = 250.0).build();
    let design = design_floor(&floor, &Criteria::default());
    same(support_design(&floor, &design, "A1", Side::East).as_required_mm2_m.unwrap(), 325.0);
}

#[test]
fn k_above_its_limit_is_a_failing_bending_check_and_bars_are_still_given() {
    let floor = Grid::panel(5.0, 6.0, "dddd")
        .with_all(|cell| {
            cell.thickness_mm = 75.0;
            cell.loads.imposed_kn_m2 = 20.0;
        })
        .build();
    let criteria = Criteria::default();
    let design = design_floor(&floor, &criteria);
    let panel = &design.panels[0];
    let short = section(panel, SHORT);
    assert!(short.k.unwrap() > 0.156);
    assert!(short.z_mm.is_none() && short.as_bending_mm2_m.is_none() && short.as_required_mm2_m.is_none());
    assert!(short.moment_knm_m.unwrap() > 0.0);
    assert!(criteria.bar_sizes_mm.contains(&short.bars.bar_mm));
    assert!(short.as_provided_mm2_m > 0.0);
    let bending = check(panel, CheckKind::Bending, SHORT);
    assert!(!bending.ok && bending.unit == "K");
    same(bending.demand, short.k.unwrap());
    close(bending.limit, 0.156, 0.0);
    assert!(!panel.ok());
}

#[test]
fn chosen_bars_are_checked_and_never_changed() {
    let mut floor = Grid::new(&[5.0, 5.0], &[6.0]).build();
    let panel = id_of(&floor, "A1");
    let stated = BarChoice { bar_mm: 8.0, spacing_mm: 325.0 };
    floor.panels[panel.0].chosen_bottom[0] = Some(stated);
    let support = support_on(&floor, "A1", Side::East);
    let over_support = BarChoice { bar_mm: 8.0, spacing_mm: 75.0 };
    floor.supports[support.0].chosen = Some(over_support);
    let design = design_floor(&floor, &Criteria::default());

    let panel = panel_design(&floor, &design, "A1");
    let short = section(panel, SHORT);
    assert_eq!((short.bars, short.stated), (stated, true));
    assert!(!section(panel, LONG).stated);
    // 8 at 325 mm: 154.7 mm2/m, under the minimum of 195 and wider than the 300 mm of the criteria.
    close(short.as_provided_mm2_m, 154.7, 0.05);
    assert!(!check(panel, CheckKind::MinimumSteel, SHORT).ok);
    let spacing = check(panel, CheckKind::BarSpacing, SHORT);
    assert!(!spacing.ok && spacing.clause == "criteria");
    close(spacing.limit, 300.0, 0.0);

    let support = support_design(&floor, &design, "A1", Side::East);
    assert_eq!((support.bars, support.stated), (over_support, true));
    // Closer than the 100 mm of the criteria.
    for (mark, side) in [("A1", Side::East), ("B1", Side::West)] {
        let gap = check(panel_design(&floor, &design, mark), CheckKind::BarGap, Place::Side(side));
        assert!(!gap.ok && gap.clause == "criteria");
        close(gap.demand, 100.0, 0.0);
        close(gap.limit, 75.0, 0.0);
    }
}

#[test]
fn steel_beyond_four_percent_fails() {
    let mut floor = Grid::panel(4.0, 5.0, "dddd").build();
    floor.panels[0].chosen_bottom[0] = Some(BarChoice { bar_mm: 32.0, spacing_mm: 100.0 });
    let design = design_floor(&floor, &Criteria::default());
    let most = check(&design.panels[0], CheckKind::MaximumSteel, SHORT);
    close(most.limit, 6000.0, 1e-9);
    assert!(!most.ok && most.demand > 8000.0);
}

#[test]
fn bars_larger_than_their_cover_fail() {
    let mut floor = Grid::panel(4.0, 5.0, "dddd").with_all(|cell| cell.thickness_mm = 200.0).build();
    floor.panels[0].chosen_bottom = [Some(BarChoice { bar_mm: 32.0, spacing_mm: 200.0 }); 2];
    let design = design_floor(&floor, &Criteria::default());
    // 32 mm bars in 25 mm of cover; the inner layer has the outer bars' 32 mm besides.
    assert!(!check(&design.panels[0], CheckKind::CoverForBarAndAggregate, SHORT).ok);
    assert!(check(&design.panels[0], CheckKind::CoverForBarAndAggregate, LONG).ok);
    // Cover under the aggregate's size.
    let design = design_floor(&floor, &criteria(&[("maximum_aggregate_mm", number(40.0))]));
    assert!(!check(&design.panels[0], CheckKind::CoverForBarAndAggregate, LONG).ok);
}
