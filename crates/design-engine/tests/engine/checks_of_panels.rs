//! Checks of a panel as a whole: deflection, cover, fire, bond, and which check governs.

use design_engine::bs8110::deflection::{modification_factor, service_stress};
use design_engine::check::{CheckKind, Place};
use design_engine::choose::candidates;
use design_engine::criteria::Criteria;
use design_engine::design_floor;
use design_engine::floor::{BarChoice, Floor, Side};
use design_engine::result::PanelDesign;

use crate::bars_and_depths::{check, section};
use crate::grid::{Grid, panel_design};
use crate::numbers::{close, same};
use crate::settings::{criteria, number, numbers, word};

const SHORT: Place = Place::ShortMidspan;

fn deflection_passes(design: &PanelDesign) -> bool {
    check(design, CheckKind::Deflection, SHORT).ok
}

#[test]
fn a_thin_panel_fails_deflection_and_says_the_least_thickness_at_which_it_passes() {
    for edges in ["dddd", "dcdc", "cccc"] {
        let grid = Grid::panel(5.4, 6.6, edges).with_all(|cell| cell.thickness_mm = 105.0);
        let criteria = Criteria::default();
        let design = design_floor(&grid.build(), &criteria);
        assert!(!deflection_passes(&design.panels[0]));
        let least = design.panels[0].least_thickness_mm.unwrap();
        let with = |thickness: f64| {
            let floor = grid.clone().with_all(|cell| cell.thickness_mm = thickness).build();
            design_floor(&floor, &criteria)
        };
        assert!(deflection_passes(&with(least).panels[0]), "passes at {least}");
        assert!(!deflection_passes(&with(least - 5.0).panels[0]), "fails at 5 mm less than {least}");
        let said = format!("the least thickness at which deflection passes is {least} mm");
        assert!(design.queries.iter().any(|query| query.text.contains(&said)));
    }
}

#[test]
fn no_least_thickness_is_said_where_deflection_passes() {
    let design = design_floor(&Grid::panel(4.0, 5.0, "cccc").build(), &Criteria::default());
    assert!(deflection_passes(&design.panels[0]));
    assert!(design.panels[0].least_thickness_mm.is_none());
}

#[test]
fn bottom_steel_is_raised_where_deflection_asks_for_it() {
    let mut floor = Grid::panel(5.0, 6.5, "cdcd").with_all(|cell| cell.thickness_mm = 160.0).build();
    let criteria = Criteria::default();
    let design = design_floor(&floor, &criteria);
    let short = section(&design.panels[0], SHORT).clone();
    assert!(deflection_passes(&design.panels[0]));
    assert!(
        short.as_provided_mm2_m > 1.1 * short.as_required_mm2_m.unwrap(),
        "more steel than bending asks for"
    );
    // The lightest bars of that size that bending would be content with fail deflection.
    let enough = candidates(&criteria)
        .into_iter()
        .filter(|bars| (bars.bar_mm - short.bars.bar_mm).abs() < 1e-9)
        .filter(|bars| {
            design_engine::bs8110::flexure::steel_area(bars.bar_mm, bars.spacing_mm)
                >= short.as_required_mm2_m.unwrap()
        })
        .max_by(|a, b| a.spacing_mm.total_cmp(&b.spacing_mm))
        .unwrap();
    floor.panels[0].chosen_bottom[0] = Some(enough);
    let design = design_floor(&floor, &criteria);
    assert!(check(&design.panels[0], CheckKind::Bending, SHORT).ok);
    assert!(!deflection_passes(&design.panels[0]));
}

#[test]
fn basic_span_depth_depends_on_the_ends_of_the_short_span() {
    // Short span along x: its ends are east and west.
    for (edges, basic) in [("dddd", 20.0), ("cdcd", 20.0), ("dcdd", 26.0), ("dcdc", 26.0), ("cccc", 26.0)] {
        let design = design_floor(&Grid::panel(4.0, 5.0, edges).build(), &Criteria::default());
        let panel = &design.panels[0];
        let working = panel.deflection.unwrap();
        close(working.basic, basic, 0.0);
        let short = section(panel, SHORT);
        let fs = service_stress(500.0, short.as_bending_mm2_m.unwrap(), short.as_provided_mm2_m);
        same(working.fs_n_mm2, fs);
        same(working.modification_factor, modification_factor(fs, short.moment_knm_m.unwrap(), short.d_mm));
        let deflection = check(panel, CheckKind::Deflection, SHORT);
        same(deflection.demand, 4000.0 / short.d_mm);
        same(deflection.limit, basic * working.modification_factor);
    }
}

#[test]
fn concrete_below_the_grade_of_its_exposure_is_not_allowed_at_all() {
    let floor = Grid::panel(4.0, 5.0, "cccc").build();
    let design =
        design_floor(&floor, &criteria(&[("exposure", word("severe")), ("fcu_n_mm2", number(35.0))]));
    let panel = &design.panels[0];
    for at in [Place::BottomFace, Place::TopFace] {
        let cover = check(panel, CheckKind::CoverForDurability, at);
        assert!(!cover.ok && cover.ratio.is_none());
        close(cover.demand, 40.0, 0.0);
        close(cover.limit, 35.0, 0.0);
    }
    assert!(!panel.ok());
    assert_eq!(panel.governing_check().unwrap().kind, CheckKind::CoverForDurability);
}

#[test]
fn fire_cover_of_continuous_floors_asks_for_both_short_span_ends() {
    let two_hours = criteria(&[("fire_resistance_h", number(2.0))]);
    for (edges, cover) in [("dcdc", 25.0), ("cccc", 25.0), ("dcdd", 35.0), ("cdcd", 35.0), ("ccdd", 35.0)] {
        let design = design_floor(&Grid::panel(4.0, 5.0, edges).build(), &two_hours);
        close(check(&design.panels[0], CheckKind::CoverForFire, Place::BottomFace).demand, cover, 0.0);
        let thickness = check(&design.panels[0], CheckKind::ThicknessForFire, Place::Panel);
        close(thickness.demand, 125.0, 0.0);
        close(thickness.limit, 150.0, 0.0);
    }
}

/// Bond at the west edge of a simply supported panel on supports of a width.
fn bond(width_mm: f64, imposed_kn_m2: f64) -> (&'static str, f64, f64) {
    let mut grid = Grid::panel(4.0, 5.0, "dddd").with_all(|cell| {
        cell.thickness_mm = 175.0;
        cell.loads.imposed_kn_m2 = imposed_kn_m2;
    });
    grid.width_mm = width_mm;
    let mut floor = grid.build();
    floor.panels[0].chosen_bottom = [Some(BarChoice { bar_mm: 12.0, spacing_mm: 150.0 }); 2];
    let design = design_floor(&floor, &Criteria::default());
    let check = check(&design.panels[0], CheckKind::BondAtSupport, Place::Side(Side::West));
    (check.clause, check.demand, check.limit)
}

#[test]
fn bottom_bars_are_anchored_by_the_first_rule_that_fits() {
    // Light load, v < vc/2: a third of the width past the centre line, 300/2 - 25 = 125 mm there.
    let (clause, needed, there) = bond(300.0, 2.0);
    assert_eq!(clause, "3.12.9.4 (c)");
    close(needed, 100.0, 1e-9);
    close(there, 125.0, 1e-9);
    // Heavy load on a wide support: 12 sizes past the centre line.
    let (clause, needed, there) = bond(400.0, 20.0);
    assert_eq!(clause, "3.12.9.4 (a)");
    close(needed, 144.0, 1e-9);
    close(there, 175.0, 1e-9);
    // Heavy load on a narrow one: bent up, 12 sizes + d/2 from the face, d = 175 - 25 - 6.
    let (clause, needed, _) = bond(150.0, 20.0);
    assert_eq!(clause, "3.12.9.4 (b)");
    close(needed, 144.0 + 72.0, 1e-9);
}

#[test]
fn bars_that_cannot_be_anchored_fail_bond_at_the_support() {
    let mut grid = Grid::panel(4.0, 5.0, "dddd").with_all(|cell| cell.loads.imposed_kn_m2 = 10.0);
    grid.width_mm = 50.0;
    let design = design_floor(&grid.build(), &Criteria::default());
    assert!(!check(&design.panels[0], CheckKind::BondAtSupport, Place::Side(Side::West)).ok);
}

fn one_panel(floor: &Floor, criteria: &Criteria) -> PanelDesign {
    panel_design(floor, &design_floor(floor, criteria), "A1").clone()
}

#[test]
fn the_governing_check_is_the_greatest_ratio_of_strength_and_stiffness() {
    let panel = one_panel(&Grid::panel(4.5, 5.5, "cccd").build(), &Criteria::default());
    assert!(panel.ok());
    let governing = panel.governing_check().unwrap();
    let greatest = panel.checks.iter().filter(|c| c.kind.may_govern_while_passing()).filter_map(|c| c.ratio);
    same(governing.ratio.unwrap(), greatest.fold(0.0, f64::max));
    // Minimum steel and covers are nearer to their limits, and do not govern while they pass.
    let others = panel.checks.iter().filter(|c| !c.kind.may_govern_while_passing()).filter_map(|c| c.ratio);
    assert!(others.fold(0.0, f64::max) > governing.ratio.unwrap());
}

#[test]
fn a_rule_of_detail_governs_where_it_fails_by_more() {
    let floor = Grid::panel(3.0, 3.6, "cccc").build();
    let panel = one_panel(
        &floor,
        &criteria(&[("bottom_cover_mm", number(15.0)), ("maximum_aggregate_mm", number(10.0))]),
    );
    // 25 mm asked for, 15 mm there.
    let governing = panel.governing_check().unwrap();
    assert_eq!(governing.kind, CheckKind::CoverForDurability);
    same(governing.ratio.unwrap(), 25.0 / 15.0);
}

#[test]
fn what_fails_first_when_the_panel_is_made_thinner_is_named() {
    let grid = Grid::panel(5.0, 6.0, "cccc").with_all(|cell| cell.thickness_mm = 200.0);
    let criteria = Criteria::default();
    let panel = one_panel(&grid.build(), &criteria);
    let kind = panel.thickness_governed_by.unwrap();
    // Thinner by 5 mm at a time: the first failing panel fails that check.
    let mut thickness = 195.0;
    let failing = loop {
        let panel =
            one_panel(&grid.clone().with_all(|cell| cell.thickness_mm = thickness).build(), &criteria);
        if !panel.ok() {
            break panel;
        }
        thickness -= 5.0;
    };
    assert!(failing.checks.iter().any(|check| check.kind == kind && !check.ok));
}

#[test]
fn sections_always_carry_bars_even_where_nothing_passes() {
    let floor = Grid::new(&[9.0, 9.0], &[9.5])
        .with_all(|cell| {
            cell.thickness_mm = 100.0;
            cell.loads.imposed_kn_m2 = 10.0;
        })
        .build();
    let small_bars = criteria(&[("bar_sizes_mm", numbers(&[8.0])), ("least_spacing_mm", number(200.0))]);
    let design = design_floor(&floor, &small_bars);
    for panel in &design.panels {
        assert!(!panel.ok());
        assert_eq!(panel.sections.len(), 3);
        for section in &panel.sections {
            assert!((section.bars.bar_mm - 8.0).abs() < 1e-9 && section.bars.spacing_mm >= 200.0);
        }
    }
}
