//! The choice of bars is exact: every candidate is tried again from outside, through the checks of a floor
//! designed with that candidate stated.

use std::cmp::Ordering;

use design_engine::bars::bar_size;
use design_engine::bs8110::flexure::steel_area;
use design_engine::check::{Check, CheckKind, Place};
use design_engine::choose::{candidates, cost};
use design_engine::criteria::{BottomBars, Criteria};
use design_engine::design_floor;
use design_engine::floor::{BarChoice, EdgeState, Floor, Side, Span, Spanning, SupportId};
use design_engine::result::{Basis, FloorDesign, PanelDesign, Section};

use crate::grid::Grid;
use crate::settings::{criteria, number, numbers, word};

/// Checks that a panel's bottom bars decide.
fn bottom_checks<'a>(floor: &'a Floor, design: &'a PanelDesign) -> impl Iterator<Item = &'a Check> {
    design.checks.iter().filter(|check| match check.at {
        Place::ShortMidspan | Place::LongMidspan => true,
        Place::Side(side) => floor.panel(design.panel).edge(side).state == EdgeState::Discontinuous,
        _ => false,
    })
}

fn worst<'a>(checks: impl Iterator<Item = &'a Check>) -> f64 {
    checks.map(|check| check.ratio.unwrap()).fold(0.0, f64::max)
}

/// Whether every second bar stops short, in a slab of up to 200 mm: those that go on keep to the greatest spacing, to
/// three effective depths and to the minimum of 0.13 %.
fn every_second_bar_stops(criteria: &Criteria, thickness_mm: f64, section: &Section) -> bool {
    assert!(thickness_mm <= 200.0);
    let spacing = 2.0 * section.bars.spacing_mm;
    criteria.bottom_bars == BottomBars::AlternateCurtailed
        && spacing <= criteria.greatest_spacing_mm
        && spacing - section.bars.bar_mm <= 3.0 * section.d_mm
        && section.as_provided_mm2_m / 2.0 >= 1.3 * thickness_mm
}

/// Mass of a span's bottom bars, kg: centre lines of supports, and what goes past that of a discontinuous edge by the
/// rule its bond check names; half of the bars stop short where that is asked for and possible.
fn bottom_mass(floor: &Floor, criteria: &Criteria, design: &PanelDesign, span: Span) -> f64 {
    let panel = floor.panel(design.panel);
    let basis: &Basis = design.basis.as_ref().unwrap();
    let axis = basis.axis_of(span);
    let place = if span == Span::Short { Place::ShortMidspan } else { Place::LongMidspan };
    let section = design.section(place).unwrap();
    let outer = if section.layer == design_engine::floor::Layer::B1 {
        0.0
    } else {
        design.sections[1 - span as usize].bars.bar_mm
    };
    let length = panel.span_m(axis);
    let curtailed = every_second_bar_stops(criteria, panel.thickness_mm, section);
    let past_centre_line = |side: Side| {
        let width = panel.edge(side).support_width_mm;
        let bond =
            design.checks.iter().find(|c| c.kind == CheckKind::BondAtSupport && c.at == Place::Side(side));
        match bond {
            None if panel.edge(side).state == EdgeState::Continuous => 0.0,
            // The side of a one-way panel: a light bar's rule (c).
            None => f64::max(width / 3.0, 30.0),
            Some(bond) if bond.clause == "3.12.9.4 (b)" => {
                let height = panel.thickness_mm
                    - criteria.bottom_cover_mm
                    - criteria.top_cover_mm
                    - criteria.bending_deduction_mm
                    - outer;
                let leg = if height >= bar_size(section.bars.bar_mm).projection_mm { height } else { 0.0 };
                width / 2.0 - criteria.bottom_cover_mm + leg
            }
            Some(bond) => bond.demand,
        }
    };
    let mut mean = length;
    for side in axis.end_sides() {
        let past = past_centre_line(side) / 1000.0;
        let stop = if panel.edge(side).state == EdgeState::Continuous { 0.2 } else { 0.1 } * length;
        mean += if curtailed { (past - stop) / 2.0 } else { past };
    }
    cost(section.as_provided_mm2_m, mean, panel.span_m(axis.across()))
}

/// Preference among choices: least mass, then the larger spacing, then the smaller size.
fn by_mass(a: &(f64, [BarChoice; 2]), b: &(f64, [BarChoice; 2])) -> Ordering {
    if (a.0 - b.0).abs() > 1e-9 * a.0.max(b.0) {
        return a.0.total_cmp(&b.0);
    }
    let key = |pair: &[BarChoice; 2]| pair.map(|bars| [-bars.spacing_mm, bars.bar_mm]);
    key(&a.1).partial_cmp(&key(&b.1)).unwrap()
}

/// Tries every pair of bottom bars of a floor's first panel, short and long span, and compares with the choice.
fn check_bottom(grid: &Grid, criteria: &Criteria) {
    let floor = grid.build();
    let chosen = design_floor(&floor, criteria);
    let chosen: [BarChoice; 2] = [0, 1].map(|span| chosen.panels[0].sections[span].bars);
    let mut stated = floor.clone();
    let mut passing = Vec::new();
    let mut least_worst = f64::INFINITY;
    let mut worst_of_chosen = 0.0;
    for short in candidates(criteria) {
        for long in candidates(criteria) {
            stated.panels[0].chosen_bottom = [Some(short), Some(long)];
            let design = design_floor(&stated, criteria);
            let panel = &design.panels[0];
            let ratio = worst(bottom_checks(&stated, panel));
            least_worst = least_worst.min(ratio);
            if [short, long] == chosen {
                worst_of_chosen = ratio;
            }
            if ratio <= 1.0 + 1e-9 {
                let mass = |span| bottom_mass(&stated, criteria, panel, span);
                // The outer layer, whose bars the tie is settled by first, is the short span's in these panels.
                passing.push((mass(Span::Short) + mass(Span::Long), [short, long]));
            }
        }
    }
    match passing.iter().copied().min_by(by_mass) {
        Some((_, best)) => assert_eq!(chosen, best),
        None => {
            assert!(worst_of_chosen <= least_worst * (1.0 + 1e-9), "{worst_of_chosen} against {least_worst}")
        }
    }
}

fn heavy(x: f64, y: f64, edges: &str, thickness_mm: f64, imposed_kn_m2: f64) -> Grid {
    Grid::panel(x, y, edges).with_all(|cell| {
        cell.thickness_mm = thickness_mm;
        cell.loads.imposed_kn_m2 = imposed_kn_m2;
    })
}

#[test]
fn no_pair_of_bottom_bars_that_passes_is_lighter_than_the_chosen_one() {
    let default = Criteria::default();
    check_bottom(&heavy(5.0, 6.0, "cccc", 150.0, 7.5), &default);
    check_bottom(&heavy(5.2, 6.3, "cdcd", 175.0, 5.0), &default);
    check_bottom(&heavy(4.2, 5.1, "dddd", 150.0, 6.0), &default);
    check_bottom(&heavy(3.4, 8.0, "dddd", 150.0, 6.0), &default);
}

#[test]
fn the_inner_layer_is_weighed_with_the_outer_size_that_moves_it() {
    // Sizes far apart: a large outer bar costs the inner layer its depth.
    let sizes = criteria(&[("bar_sizes_mm", numbers(&[8.0, 20.0])), ("top_cover_mm", number(20.0))]);
    check_bottom(&heavy(5.4, 5.8, "dccd", 140.0, 9.0), &sizes);
}

#[test]
fn where_no_pair_passes_the_least_greatest_ratio_is_chosen() {
    check_bottom(&heavy(6.0, 7.0, "dddd", 110.0, 8.0), &Criteria::default());
}

#[test]
fn short_supports_turn_bars_up_and_their_legs_are_weighed() {
    let mut grid = heavy(4.2, 5.1, "dddd", 200.0, 9.0);
    grid.width_mm = 160.0;
    check_bottom(&grid, &Criteria::default());
}

#[test]
fn curtailed_bars_are_weighed_without_what_stops_short() {
    let curtailed = criteria(&[("bottom_bars", word("alternate curtailed"))]);
    check_bottom(&heavy(5.4, 6.6, "dccd", 175.0, 10.0), &curtailed);
}

/// Checks that a support's bars decide, on both sides.
fn support_checks<'a>(
    floor: &'a Floor,
    design: &'a FloorDesign,
    id: SupportId,
) -> impl Iterator<Item = &'a Check> {
    floor.support(id).sides().flat_map(move |side| {
        design.panels[side.panel.0].checks.iter().filter(move |check| check.at == Place::Side(side.side))
    })
}

fn support_mass(floor: &Floor, design: &FloorDesign, id: SupportId) -> f64 {
    let (support, bars) = (floor.support(id), design.support(id).unwrap());
    let reach: f64 =
        bars.sides.iter().map(|side| f64::midpoint(side.extension_m, side.short_extension_m)).sum();
    let area = steel_area(bars.bars.bar_mm, bars.bars.spacing_mm);
    cost(area, reach + support.width_mm / 1000.0, support.length_m())
}

/// Tries every candidate over every support of a floor.
fn check_supports(grid: &Grid, criteria: &Criteria) {
    let floor = grid.build();
    let design = design_floor(&floor, criteria);
    assert_eq!(design.supports.len(), floor.supports.len());
    // Bars that run through take those of the heavier support.
    for support in design.supports.iter().filter(|s| s.sides.iter().all(|side| !side.runs_through)) {
        let mut passing = Vec::new();
        for bars in candidates(criteria) {
            let mut stated = floor.clone();
            stated.supports[support.support.0].chosen = Some(bars);
            let tried = design_floor(&stated, criteria);
            if worst(support_checks(&stated, &tried, support.support)) <= 1.0 + 1e-9 {
                passing.push((support_mass(&stated, &tried, support.support), [bars, bars]));
            }
        }
        let best = passing.iter().copied().min_by(by_mass).expect("some bars pass");
        assert_eq!(support.bars, best.1[0]);
    }
}

#[test]
fn no_bars_over_a_support_that_pass_are_lighter_than_the_chosen_ones() {
    let grid = Grid::new(&[4.4, 5.2], &[5.4, 6.1])
        .with_all(|cell| cell.thickness_mm = 175.0)
        .with("B2", |cell| cell.loads.imposed_kn_m2 = 7.5);
    check_supports(&grid, &Criteria::default());
    check_supports(
        &grid,
        &criteria(&[("top_bars", word("all full length")), ("bar_sizes_mm", numbers(&[8.0, 12.0, 16.0]))]),
    );
    // Crossing bars beside a one-way panel, and a strip.
    let crossing = Grid::new(&[3.0, 3.0, 5.0], &[7.0]).with("C1", |cell| cell.spanning = Spanning::TwoWay);
    check_supports(&crossing, &Criteria::default());
}
