//! How a panel is taken to span: spans, short direction, two-way, one-way, and what is not designed.

use design_engine::check::{CheckKind, Place};
use design_engine::criteria::Criteria;
use design_engine::design_floor;
use design_engine::floor::{Axis, Corners, Floor, Side, Span, Spanning};
use design_engine::query::Severity;
use design_engine::result::{Action, FloorDesign, PanelDesign};

use crate::bars_and_depths::{check, section};
use crate::grid::{Grid, panel_design, support_design};
use crate::numbers::{close, same};
use crate::settings::{criteria, word};

const SHORT: Place = Place::ShortMidspan;
const LONG: Place = Place::LongMidspan;

/// n of the panels of [`Grid::new`]: 1.4 (0.15 x 24 + 2.5) + 1.6 x 2.5 kN/m2.
const N: f64 = 12.54;

fn designed(grid: &Grid) -> (Floor, FloorDesign) {
    let floor = grid.build();
    let design = design_floor(&floor, &Criteria::default());
    (floor, design)
}

fn only_panel(grid: &Grid) -> PanelDesign {
    designed(grid).1.panels.remove(0)
}

/// Why the only panel of a grid is not designed; the floor's query says the same.
fn why_not_designed(grid: &Grid) -> String {
    let (_, design) = designed(grid);
    let panel = &design.panels[0];
    let why = panel.not_designed.clone().expect("not designed");
    assert!(panel.sections.is_empty() && panel.checks.is_empty() && !panel.ok());
    assert!(design.queries.iter().any(|q| q.severity == Severity::NotDesigned && q.text == why));
    why
}

#[test]
fn loads_build_up_from_self_weight_finishes_and_partitions() {
    let loads = only_panel(&Grid::panel(4.0, 5.0, "cccc")).loads;
    same(loads.self_weight_kn_m2, 3.6);
    same(loads.dead_kn_m2, 6.1);
    same(loads.imposed_kn_m2, 2.5);
    same(loads.ultimate_kn_m2, N);
}

#[test]
fn a_panel_up_to_twice_as_long_as_wide_is_two_way_and_beyond_one_way() {
    let two_way = only_panel(&Grid::panel(3.0, 6.0, "dddd"));
    assert_eq!(two_way.basis.unwrap().action, Action::TwoWayRestrained);
    same(two_way.sections[0].coefficient.unwrap(), 0.111);
    let one_way = only_panel(&Grid::panel(3.0, 6.01, "dddd"));
    assert_eq!(one_way.basis.unwrap().action, Action::OneWay);
    let (_, design) = designed(&Grid::panel(3.0, 6.3, "dddd"));
    assert_eq!(design.panels[0].basis.unwrap().action, Action::OneWay);
}

#[test]
fn one_way_simply_supported() {
    let panel = only_panel(&Grid::panel(3.0, 7.0, "dddd"));
    let basis = panel.basis.unwrap();
    assert_eq!(
        (basis.action, basis.main_span, basis.short_along, basis.case),
        (Action::OneWay, Span::Short, Axis::X, None)
    );
    let (short, long) = (section(&panel, SHORT), section(&panel, LONG));
    same(short.moment_knm_m.unwrap(), N * 9.0 / 8.0);
    // Distribution bars: minimum steel, no moment.
    assert!(long.moment_knm_m.is_none() && long.coefficient.is_none() && long.k.is_none());
    same(long.as_required_mm2_m.unwrap(), 195.0);
    for side in [Side::West, Side::East] {
        let shear = check(&panel, CheckKind::Shear, Place::Side(side));
        // Edge bars lie at the level of the bottom bars' mirror image: covers are alike and T1 runs along x.
        same(shear.demand, N * 3.0 / 2.0 / short.d_mm);
    }
    let at_ends =
        |check: &design_engine::check::Check| matches!(check.at, Place::Side(Side::North | Side::South));
    assert!(!panel.checks.iter().any(at_ends), "no shear or bond at the sides");
    close(panel.deflection.unwrap().basic, 20.0, 0.0);
}

#[test]
fn a_stated_span_wins_over_the_shape() {
    let grid = Grid::panel(4.0, 5.0, "dddd").with_all(|cell| cell.spanning = Spanning::OneWay(Axis::Y));
    let panel = only_panel(&grid);
    let basis = panel.basis.unwrap();
    assert_eq!((basis.action, basis.main_span), (Action::OneWay, Span::Long));
    same(section(&panel, LONG).moment_knm_m.unwrap(), N * 25.0 / 8.0);
    assert!(section(&panel, SHORT).moment_knm_m.is_none());
    assert_eq!(check(&panel, CheckKind::Deflection, LONG).unit, "span/depth");
}

#[test]
fn a_panel_supported_on_two_opposite_edges_is_one_way_between_them() {
    let basis = only_panel(&Grid::panel(5.0, 4.0, "fdfd")).basis.unwrap();
    assert_eq!((basis.action, basis.main_span), (Action::OneWay, Span::Long));
}

#[test]
fn stated_two_way_beyond_ratio_2_is_not_designed() {
    let grid = Grid::panel(3.0, 6.6, "cccc").with_all(|cell| cell.spanning = Spanning::TwoWay);
    assert!(why_not_designed(&grid).contains("stated two-way with ly/lx = 2.20"));
}

#[test]
fn a_free_edge_is_outside_the_tables() {
    assert!(why_not_designed(&Grid::panel(4.0, 5.0, "fccc")).contains("two-way with a free north edge"));
    let grid = Grid::panel(4.0, 5.0, "dddf").with_all(|cell| cell.spanning = Spanning::OneWay(Axis::X));
    assert!(why_not_designed(&grid).contains("one-way towards its west edge, which has no support"));
}

#[test]
fn the_rest_of_the_floor_is_designed_beside_a_panel_that_is_not() {
    let grid = Grid::new(&[4.0, 4.0], &[5.0]).with("B1", |cell| {
        cell.stated[Side::East.index()] = Some(design_engine::floor::EdgeState::Free);
    });
    let (floor, design) = designed(&grid);
    assert!(panel_design(&floor, &design, "B1").not_designed.is_some());
    let panel = panel_design(&floor, &design, "A1");
    assert!(panel.not_designed.is_none() && !panel.checks.is_empty());
    // The support stands on A1's moment alone, with a warning.
    let support = support_design(&floor, &design, "A1", Side::East);
    assert!(support.sides.len() == 1 && support.difference_pct.is_none());
    same(support.moment_knm_m.unwrap(), support.sides[0].moment_from_coefficient_knm_m.unwrap());
    assert!(
        design
            .queries
            .iter()
            .any(|q| q.severity == Severity::Warning && q.text.contains("B1 is not designed"))
    );
    assert!(!design.ok());
}

#[test]
fn free_corners_take_table_3_13_and_half_the_load_as_shear() {
    let free = |edges: &str| Grid::panel(4.0, 5.0, edges).with_all(|cell| cell.corners = Corners::FreeToLift);
    let panel = only_panel(&free("dddd"));
    assert_eq!(panel.basis.unwrap().action, Action::TwoWaySimplySupported);
    // Ratio 1.25: between .084 and .093, .059 and .055.
    same(section(&panel, SHORT).coefficient.unwrap(), 0.0885);
    same(section(&panel, LONG).coefficient.unwrap(), 0.057);
    same(section(&panel, SHORT).moment_knm_m.unwrap(), 0.0885 * N * 16.0);
    let shear = check(&panel, CheckKind::Shear, Place::Side(Side::West));
    same(shear.demand, N * 4.0 / 2.0 / section(&panel, SHORT).d_mm);
    assert!(panel.corners.is_empty(), "no torsion steel");
    // Not where an edge is continuous: Table 3.14, and a warning.
    let (_, design) = designed(&free("dcdd"));
    assert_eq!(design.panels[0].basis.unwrap().action, Action::TwoWayRestrained);
    assert!(
        design
            .queries
            .iter()
            .any(|q| q.severity == Severity::Warning && q.text.contains("corners free to lift"))
    );
}

/// The strip of three panels that meets every condition of Table 3.12.
fn strip(columns: &[f64], row: f64) -> Grid {
    Grid::new(columns, &[row])
}

#[test]
fn a_strip_that_meets_its_conditions_takes_table_3_12() {
    let (floor, design) = designed(&strip(&[5.0, 5.0, 5.0], 12.0));
    let [end, middle] = ["A1", "B1"].map(|mark| panel_design(&floor, &design, mark));
    let f = N * 5.0;
    same(section(end, SHORT).moment_knm_m.unwrap(), 0.086 * f * 5.0);
    same(section(middle, SHORT).moment_knm_m.unwrap(), 0.063 * f * 5.0);
    let support = support_design(&floor, &design, "A1", Side::East);
    same(support.moment_knm_m.unwrap(), 0.086 * f * 5.0);
    assert!(!support.balanced);
    let shear = check(end, CheckKind::Shear, Place::Side(Side::East));
    same(shear.demand, 0.6 * f / support.d_mm);
    let shear = check(end, CheckKind::Shear, Place::Side(Side::West));
    same(shear.demand, 0.4 * f / section(end, SHORT).d_mm);
    close(middle.deflection.unwrap().basic, 26.0, 0.0);
    close(end.deflection.unwrap().basic, 26.0, 0.0);
}

#[test]
fn a_reduced_support_moment_has_its_lower_limit_of_k() {
    let heavy = strip(&[5.0, 5.0, 5.0], 12.0).with_all(|cell| {
        cell.thickness_mm = 90.0;
        cell.loads.imposed_kn_m2 = 5.0;
    });
    let (floor, design) = designed(&heavy);
    let bending = check(panel_design(&floor, &design, "B1"), CheckKind::Bending, Place::Side(Side::West));
    assert_eq!(bending.unit, "K");
    close(bending.limit, 0.132, 0.0);
}

#[test]
fn a_strip_outside_table_3_12_is_analysed_instead() {
    let coefficient = |grid: &Grid| {
        let (floor, design) = designed(grid);
        let panel = panel_design(&floor, &design, "A1");
        assert!(panel.not_designed.is_none());
        section(panel, SHORT).coefficient.unwrap()
    };
    let in_table = |grid: &Grid| (coefficient(grid) - 0.086).abs() < 1e-9;
    let strip_of = |columns: &[f64]| strip(columns, 12.0);
    assert!(in_table(&strip_of(&[5.0, 5.0, 5.0])));
    assert!(in_table(&strip_of(&[5.0, 4.25, 5.0])), "15 % is within");
    assert!(!in_table(&strip_of(&[5.0, 4.2, 5.0])), "spans differ by 16 %");
    assert!(!in_table(&strip_of(&[5.0, 5.0])), "two spans");
    let loads = strip_of(&[5.0, 5.0, 5.0]).with("B1", |cell| cell.loads.finishes_kn_m2 = 4.0);
    assert!(!in_table(&loads), "loads differ");
    let thickness = strip_of(&[5.0, 5.0, 5.0]).with("B1", |cell| cell.thickness_mm = 155.0);
    assert!(!in_table(&thickness), "thicknesses differ");
    assert!(!in_table(&strip(&[3.0, 3.0, 3.0], 10.0)), "bay of 30 m2, not over it");
    assert!(in_table(&strip(&[3.0, 3.0, 3.0], 10.1)));
    let imposed = |thickness: f64, imposed: f64| {
        strip_of(&[5.0, 5.0, 5.0]).with_all(move |cell| {
            cell.thickness_mm = thickness;
            cell.loads.partitions_kn_m2 = 0.0;
            cell.loads.imposed_kn_m2 = imposed;
        })
    };
    // gk = 2.4 + 1.5 = 3.9: 1.25 gk = 4.875 kN/m2.
    assert!(in_table(&imposed(100.0, 4.8)));
    assert!(!in_table(&imposed(100.0, 4.9)), "Qk/Gk over 1.25");
    assert!(in_table(&imposed(200.0, 5.0)));
    assert!(!in_table(&imposed(200.0, 5.1)), "imposed load over 5 kN/m2");
}

#[test]
fn a_two_span_strip_is_the_elastic_beam_with_its_support_reduced() {
    // 5 m + 5 m: elastic support moment n l2/8; 20 % less is n l2/10, span by statics 0.08 n l2 (bays of 60 m2).
    let (floor, design) = designed(&strip(&[5.0, 5.0], 12.0));
    let panel = panel_design(&floor, &design, "A1");
    same(support_design(&floor, &design, "A1", Side::East).moment_knm_m.unwrap(), 0.1 * N * 25.0);
    same(section(panel, SHORT).moment_knm_m.unwrap(), 0.08 * N * 25.0);
    let shear = check(panel, CheckKind::Shear, Place::Side(Side::East));
    same(shear.demand, 0.6 * N * 5.0 / section(panel, Place::Side(Side::East)).d_mm);
}

#[test]
fn a_strip_end_at_a_two_way_panel_is_built_in_and_then_released() {
    let (floor, design) = designed(&Grid::new(&[3.0, 5.0], &[7.0]));
    let support = support_design(&floor, &design, "A1", Side::East);
    let m_a = 0.8 * N * 9.0 / 8.0;
    same(support.sides[0].moment_from_coefficient_knm_m.unwrap(), m_a);
    let m_b = support.sides[1].moment_from_coefficient_knm_m.unwrap();
    // Both far ends discontinuous, one thickness: shares go as 1/l.
    same(support.moment_knm_m.unwrap(), (3.0 * m_a + 5.0 * m_b) / 8.0);
    // The span moment is never below that before the release.
    same(section(panel_design(&floor, &design, "A1"), SHORT).moment_knm_m.unwrap(), 0.08 * N * 9.0);
    close(panel_design(&floor, &design, "A1").deflection.unwrap().basic, 26.0, 0.0);
}

#[test]
fn a_cantilever_carries_all_its_load_at_its_root() {
    let grid = Grid::new(&[1.5, 5.0], &[6.0]).with("A1", |cell| cell.spanning = Spanning::Cantilever);
    let mut floor = grid.build();
    for side in [Side::North, Side::South, Side::West] {
        floor.panels[0].edges[side.index()].state = design_engine::floor::EdgeState::Free;
    }
    let design = design_floor(&floor, &Criteria::default());
    let root = support_design(&floor, &design, "A1", Side::East);
    let back_span = root.sides[1].moment_from_coefficient_knm_m.unwrap();
    same(root.sides[0].moment_from_coefficient_knm_m.unwrap(), N * 1.5 * 1.5 / 2.0);
    // Neither balanced nor reduced: the larger of the two. 5 x 6 with one long edge continuous: .071.
    same(back_span, 0.071 * N * 25.0);
    same(root.moment_knm_m.unwrap(), back_span);
    let cantilever = panel_design(&floor, &design, "A1");
    close(cantilever.deflection.unwrap().basic, 7.0, 0.0);
    let shear = check(cantilever, CheckKind::Shear, Place::Side(Side::East));
    same(shear.demand, N * 1.5 / root.d_mm);
    // The back-span is designed as if that edge were discontinuous.
    assert_eq!(panel_design(&floor, &design, "B1").basis.unwrap().case.unwrap().number(), 9);
}

/// The axis of the short span of a panel, and whether the note says that x was taken.
fn short_of(grid: &Grid, mark: &str) -> (Axis, bool) {
    let (floor, design) = designed(grid);
    let noted = design.queries.iter().any(|q| {
        q.severity == Severity::Note && q.panel_mark() == Some(mark) && q.text.contains("a square panel")
    });
    (panel_design(&floor, &design, mark).basis.unwrap().short_along, noted)
}

#[test]
fn the_short_span_of_a_square_panel_does_not_depend_on_how_the_floor_is_drawn() {
    // More discontinuous edges.
    assert_eq!(short_of(&Grid::panel(4.0, 4.0, "ddcc"), "A1"), (Axis::X, true), "one each way");
    assert_eq!(short_of(&Grid::panel(4.0, 4.0, "dccc"), "A1"), (Axis::Y, false));
    assert_eq!(short_of(&Grid::panel(4.0, 4.0, "cdcc"), "A1"), (Axis::X, false));
    // Within the plan tolerance of 1 mm a panel is square.
    assert_eq!(short_of(&Grid::panel(4.001, 4.0, "cdcc"), "A1"), (Axis::X, false));
    assert_eq!(short_of(&Grid::panel(4.002, 4.0, "cdcc"), "A1"), (Axis::Y, false));
    // Edges alike: the neighbours' spans.
    assert_eq!(short_of(&Grid::new(&[4.0, 5.0], &[4.0, 4.5]), "A1"), (Axis::X, false));
    assert_eq!(short_of(&Grid::new(&[4.0, 4.5], &[4.0, 5.0]), "A1"), (Axis::Y, false));
    // Neighbours alike: the direction of most short spans on the floor.
    let third =
        |columns: &[f64], rows: &[f64]| short_of(&Grid::new(columns, rows).joint("A2", Side::North), "A1");
    assert_eq!(third(&[4.0, 5.0], &[4.0, 5.0, 7.0]), (Axis::X, false));
    assert_eq!(
        short_of(&Grid::new(&[4.0, 5.0, 7.0], &[4.0, 5.0]).joint("B1", Side::East), "A1"),
        (Axis::Y, false)
    );
    // Nothing tells: x, with a note.
    assert_eq!(short_of(&Grid::new(&[4.0, 5.0], &[4.0, 5.0]), "A1"), (Axis::X, true));
}

#[test]
fn clear_span_plus_effective_depth_is_the_lesser_span_where_both_ends_are_discontinuous() {
    let clear = criteria(&[("span_basis", word("clear plus effective depth"))]);
    let spans = |grid: &Grid| {
        let basis = design_floor(&grid.build(), &clear).panels[0].basis.unwrap();
        [basis.lx_m, basis.ly_m]
    };
    // d = 150 - 25 - 10/2 = 120; 4.0 - 0.25 + 0.12 and 5.0 - 0.25 + 0.12.
    let [lx, ly] = spans(&Grid::panel(4.0, 5.0, "dddd"));
    same(lx, 3.87);
    same(ly, 4.87);
    // A span continuous at either end stays centre to centre.
    let [lx, ly] = spans(&Grid::panel(4.0, 5.0, "dcdd"));
    same(lx, 4.0);
    same(ly, 4.87);
    // A support narrower than the depth: the clear span plus depth is more than centre to centre.
    let mut narrow = Grid::panel(4.0, 5.0, "dddd");
    narrow.width_mm = 100.0;
    let [lx, ly] = spans(&narrow);
    same(lx, 4.0);
    same(ly, 5.0);
    // Supports that leave no clear span: there is nothing to measure, centre to centre stays.
    let mut wide = Grid::panel(0.8, 1.0, "dddd");
    wide.width_mm = 1000.0;
    let [lx, ly] = spans(&wide);
    same(lx, 0.8);
    same(ly, 1.0);
    // Moments follow the effective span.
    let design = design_floor(&Grid::panel(3.0, 7.0, "dddd").build(), &clear);
    same(design.panels[0].sections[0].moment_knm_m.unwrap(), N * 2.87 * 2.87 / 8.0);
}

#[test]
fn a_span_over_10_m_is_noted() {
    let (_, design) = designed(&Grid::panel(10.5, 12.0, "cccc").with_all(|cell| cell.thickness_mm = 350.0));
    let notes: Vec<&str> =
        design.queries.iter().filter(|q| q.severity == Severity::Note).map(|q| q.text.as_str()).collect();
    assert!(notes.iter().any(|text| text.starts_with("short span 10.50 m: over 10 m")));
    assert!(notes.iter().any(|text| text.starts_with("long span 12.00 m: over 10 m")));
}
