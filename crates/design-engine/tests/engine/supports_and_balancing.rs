//! Supports between panels: balancing, what follows at midspan, reach of top bars, warnings.

use design_engine::bs8110::shear::vc;
use design_engine::check::{CheckKind, Place};
use design_engine::criteria::Criteria;
use design_engine::design_floor;
use design_engine::floor::{Axis, Floor, Layer, Side, Spanning};
use design_engine::query::{Query, Severity, Subject};
use design_engine::result::{FloorDesign, SupportDesign};

use crate::bars_and_depths::{check, pinwheel, section};
use crate::grid::{Grid, panel_design, support_design};
use crate::numbers::{close, same};
use crate::settings::{criteria, number, word};

const SHORT: Place = Place::ShortMidspan;

fn designed(grid: &Grid) -> (Floor, FloorDesign) {
    let floor = grid.build();
    let design = design_floor(&floor, &Criteria::default());
    (floor, design)
}

fn warns(design: &FloorDesign, of: &Subject, words: &str) -> bool {
    let about = |query: &&Query| query.severity == Severity::Warning && query.subject == *of;
    design.queries.iter().filter(about).any(|query| query.text.contains(words))
}

fn at(name: &str) -> Subject {
    Subject::Support(name.to_owned())
}

#[test]
fn moments_at_a_shared_support_are_balanced_by_stiffness() {
    let (floor, design) = designed(&Grid::new(&[4.0, 5.0], &[6.0]));
    // n = 1.4 (0.15 x 24 + 2.5) + 1.6 x 2.5 = 12.54 kN/m2. Both panels: three edges discontinuous, one long edge
    // continuous (case 7). 4 x 6: .084; 5 x 6, ratio 1.2: .071.
    let (m_a, m_b) = (0.084 * 12.54 * 16.0, 0.071 * 12.54 * 25.0);
    let support = support_design(&floor, &design, "A1", Side::East);
    same(support.sides[0].moment_from_coefficient_knm_m.unwrap(), m_a);
    same(support.sides[1].moment_from_coefficient_knm_m.unwrap(), m_b);
    close(support.difference_pct.unwrap(), 100.0 * (m_b - m_a) / m_b, 1e-9);
    assert!(support.balanced);
    // k = 0.75 h3/l both: shares go as 1/l, so m = (4 mA + 5 mB)/9.
    let moment = (4.0 * m_a + 5.0 * m_b) / 9.0;
    same(support.moment_knm_m.unwrap(), moment);
    // Midspan + half the support moment stays what the table gave (.063 and .053).
    same(support.sides[0].midspan_after_knm_m, 0.063 * 12.54 * 16.0 + (m_a - moment) / 2.0);
    same(support.sides[1].midspan_after_knm_m, 0.053 * 12.54 * 25.0 + (m_b - moment) / 2.0);
    // The design midspan is the greater of the table's and the balanced one.
    let [a, b] = ["A1", "B1"].map(|mark| section(panel_design(&floor, &design, mark), SHORT).clone());
    same(a.moment_knm_m.unwrap(), 0.063 * 12.54 * 16.0);
    assert!(a.moment_balanced_knm_m.unwrap() < a.moment_knm_m.unwrap());
    same(b.moment_knm_m.unwrap(), support.sides[1].midspan_after_knm_m);
    // 3.5.3.5's ratios.
    same(support.load_ratio.unwrap(), 1.0);
    same(support.span_ratio.unwrap(), 0.8);
}

#[test]
fn within_the_threshold_the_larger_moment_governs_both() {
    let floor = Grid::new(&[4.8, 5.0], &[6.0]).build();
    let greater = |support: &SupportDesign| {
        support.sides.iter().filter_map(|s| s.moment_from_coefficient_knm_m).fold(0.0, f64::max)
    };
    let design = design_floor(&floor, &Criteria::default());
    let support = support_design(&floor, &design, "A1", Side::East);
    assert!(!support.balanced && support.difference_pct.unwrap() < 10.0);
    same(support.moment_knm_m.unwrap(), greater(support));
    // The same support is balanced where the threshold is under its difference.
    let strict = criteria(&[("balance_threshold_pct", number(0.0))]);
    let design = design_floor(&floor, &strict);
    let support = support_design(&floor, &design, "A1", Side::East);
    assert!(support.balanced);
    assert!(support.moment_knm_m.unwrap() < greater(support));
}

#[test]
fn a_span_with_a_discontinuous_far_end_has_three_quarters_of_its_stiffness() {
    let (floor, design) =
        designed(&Grid::new(&[4.0, 5.0, 6.0], &[6.0]).with("B1", |cell| cell.thickness_mm = 200.0));
    let [a, b] = [0, 1].map(|i| support_design(&floor, &design, "A1", Side::East).sides[i].stiffness);
    same(a, 0.75 * 150.0_f64.powi(3) / 4.0);
    same(b, 200.0_f64.powi(3) / 5.0);
}

#[test]
fn an_edge_stated_continuous_keeps_its_coefficient_moment() {
    let (floor, design) = designed(&Grid::panel(4.0, 5.0, "ddcd"));
    let support = support_design(&floor, &design, "A1", Side::South);
    assert_eq!(support.sides.len(), 1);
    // Case 8 at 1.25, short edge: .058.
    same(support.moment_knm_m.unwrap(), 0.058 * 12.54 * 16.0);
    assert!(!support.balanced && support.difference_pct.is_none() && support.load_ratio.is_none());
    assert!(design.assumptions.iter().any(|text| text.contains("A1 south")));
}

#[test]
fn a_joint_parts_two_panels() {
    let (floor, design) = designed(&Grid::new(&[4.0, 5.0], &[6.0]).joint("A1", Side::East));
    assert!(floor.supports.is_empty() && design.supports.is_empty());
    for panel in &design.panels {
        assert_eq!(panel.basis.unwrap().case.unwrap().number(), 9);
        assert_eq!(panel.sections.len(), 2);
    }
}

#[test]
fn top_bars_reach_to_figure_3_25_from_the_face() {
    let heavy = Grid::new(&[5.0, 5.5], &[6.5]).with_all(|cell| {
        cell.loads.imposed_kn_m2 = 8.0;
        cell.thickness_mm = 200.0;
    });
    let floor = heavy.build();
    let design = design_floor(&floor, &Criteria::default());
    let support = support_design(&floor, &design, "A1", Side::East);
    assert!(support.alternate_reversed);
    for side in &support.sides {
        assert!(!side.from_contraflexure);
        // l = 5.5, the greater: 0.3 l = 1.65; 0.15 l = 0.825, up to 50 mm (45 x 16 = 720 is less).
        same(side.extension_m, 1.65);
        same(side.short_extension_m, 0.85);
    }
    let design = design_floor(&floor, &criteria(&[("top_bars", word("all full length"))]));
    let support = support_design(&floor, &design, "A1", Side::East);
    assert!(!support.alternate_reversed);
    assert!(support.sides.iter().all(|side| (side.short_extension_m - 1.65).abs() < 1e-9));
}

#[test]
fn alternate_bars_are_reversed_only_where_spans_are_within_15_percent_and_the_rest_meets_the_minimum() {
    let reversed = |columns: &[f64], imposed: f64| {
        let grid = Grid::new(columns, &[6.8]).with_all(|cell| cell.loads.imposed_kn_m2 = imposed);
        let (floor, design) = designed(&grid);
        support_design(&floor, &design, "A1", Side::East).alternate_reversed
    };
    assert!(reversed(&[5.0, 5.0], 12.0));
    assert!(!reversed(&[4.2, 5.0], 12.0), "spans differ by 16 %");
    assert!(!reversed(&[3.6, 3.6], 1.5), "every second of bars at 300 mm cannot stop");
}

/// A support between a heavy and a light panel; the light one's side comes second.
fn unlike_panels() -> (Floor, FloorDesign) {
    designed(&Grid::new(&[5.0, 4.6], &[6.0]).with("A1", |cell| cell.loads.imposed_kn_m2 = 10.0))
}

#[test]
fn top_bars_are_longer_where_a_moment_rose_by_over_10_percent() {
    let (floor, design) = unlike_panels();
    let support = support_design(&floor, &design, "A1", Side::East);
    let [heavy, light] = [support.sides[0], support.sides[1]];
    let (moment, table) = (support.moment_knm_m.unwrap(), light.moment_from_coefficient_knm_m.unwrap());
    assert!(moment > 1.1 * table);
    assert!(!heavy.from_contraflexure && light.from_contraflexure);
    same(heavy.extension_m, 1.5);
    // Where the light panel's moment is zero, by stepping along it: F = midspan + half the table's support moment.
    let (l, free) = (4.6, light.midspan_before_knm_m + table / 2.0);
    let hogs = |x: f64| 4.0 * free * x / l * (1.0 - x / l) < moment * (1.0 - x / l);
    let x0 = (0..46_000).map(|i| f64::from(i) / 10_000.0).find(|x| !hogs(*x)).unwrap();
    let past = x0 + f64::max(support.d_mm, 12.0 * support.bars.bar_mm) / 1000.0 - 0.125;
    assert!(past > 0.3 * 5.0);
    close(light.extension_m, (past * 20.0).ceil() / 20.0, 1e-9);
    assert!(!support.alternate_reversed);
}

#[test]
fn a_partly_continuous_edge_counts_nothing_in_the_free_moment_of_its_span() {
    let mut floor = pinwheel();
    floor.panels[0].loads.imposed_kn_m2 = 40.0;
    let design = design_floor(&floor, &Criteria::default());
    // B is designed with its west edge as discontinuous: its midspan alone is the free moment along x.
    let support = support_design(&floor, &design, "B", Side::West);
    let b = support.sides[1];
    let moment = support.moment_knm_m.unwrap();
    assert!(moment > 1.1 * b.moment_from_coefficient_knm_m.unwrap() && b.from_contraflexure);
    let (l, free) = (4.0, b.midspan_before_knm_m);
    same(b.midspan_after_knm_m, free);
    // 4F (x/l)(1 - x/l) = M (1 - x/l).
    let past =
        moment * l / (4.0 * free) + f64::max(support.d_mm, 12.0 * support.bars.bar_mm) / 1000.0 - 0.125;
    assert!(past > 0.3 * 6.0, "longer than the simplified rule");
    close(b.extension_m, ((past * 20.0).ceil() / 20.0).min(3.75), 1e-9);
}

#[test]
fn a_new_moment_over_one_and_a_half_times_the_table_is_a_warning() {
    let (_, design) = unlike_panels();
    assert!(warns(&design, &at("A1/B1"), "over 1.5 times"));
    let (_, design) = designed(&Grid::new(&[5.0, 4.6], &[6.0]));
    assert!(
        !design
            .queries
            .iter()
            .any(|query| query.severity == Severity::Warning && query.subject == at("A1/B1"))
    );
}

#[test]
fn neighbours_under_half_of_each_other_are_a_warning_and_others_one_note() {
    let (floor, design) = designed(&Grid::new(&[5.0, 2.4], &[4.7]));
    close(support_design(&floor, &design, "A1", Side::East).span_ratio.unwrap(), 0.48, 1e-9);
    assert!(warns(&design, &at("A1/B1"), "the spans of its two panels are in the ratio 0.48"));
    assert!(!warns(&design, &at("A1/B1"), "ultimate loads"));

    let heavy = Grid::new(&[5.0, 5.0], &[6.0]).with("A1", |cell| cell.loads.imposed_kn_m2 = 12.0);
    let (floor, design) = designed(&heavy);
    // 8.54 + 19.2 = 27.74 against 12.54 kN/m2.
    close(support_design(&floor, &design, "A1", Side::East).load_ratio.unwrap(), 12.54 / 27.74, 1e-9);
    assert!(warns(&design, &at("A1/B1"), "the ultimate loads of its two panels are in the ratio 0.45"));

    // 4.0 beside 5.5: under 0.8, over 0.5: the note for the whole floor, no warning of its own.
    let (_, design) = designed(&Grid::new(&[4.0, 5.5, 5.5], &[6.0]));
    assert!(!warns(&design, &at("A1/B1"), "approximately the same"));
    let notes: Vec<&Query> = design.queries.iter().filter(|q| q.severity == Severity::Note).collect();
    assert!(
        notes.iter().any(|q| q.subject == Subject::Floor && q.text.contains("at 1 of 2 shared supports"))
    );
}

#[test]
fn a_negative_midspan_gives_a_top_section_bars_run_through_and_a_warning() {
    let (floor, design) = designed(&Grid::new(&[6.0, 3.0, 6.0], &[5.5]));
    let panel = panel_design(&floor, &design, "B1");
    let (bottom, top) = {
        let mut at_midspan = panel.sections.iter().filter(|section| section.at == SHORT);
        (at_midspan.next().unwrap(), at_midspan.next().unwrap())
    };
    // Bottom steel for the table's moment, never for a negative one.
    assert!(bottom.moment_balanced_knm_m.unwrap() < 0.0);
    same(bottom.moment_knm_m.unwrap(), bottom.moment_from_coefficient_knm_m.unwrap());
    assert!(bottom.k.unwrap() > 0.0 && panel.deflection.unwrap().fs_n_mm2 > 0.0);
    // Top steel for the hogging midspan.
    assert_eq!(top.layer, Layer::T1);
    same(top.moment_knm_m.unwrap(), -bottom.moment_balanced_knm_m.unwrap());
    assert!(top.as_provided_mm2_m >= top.as_required_mm2_m.unwrap());
    let at_midspan = |kind| panel.checks.iter().filter(|c| c.kind == kind && c.at == SHORT).count();
    assert_eq!([at_midspan(CheckKind::Bending), at_midspan(CheckKind::MinimumSteel)], [2, 2]);
    // Bars of both supports run the whole clear span of 3.0 - 0.25 m.
    for side in [Side::West, Side::East] {
        let support = support_design(&floor, &design, "B1", side);
        let own = support.sides.iter().find(|s| s.panel == panel.panel).unwrap();
        same(own.extension_m, 2.75);
        same(own.short_extension_m, 2.75);
    }
    let of = Subject::Panel { mark: "B1".to_owned(), column: None };
    assert!(warns(&design, &of, "the short span hogs throughout"));
}

#[test]
fn bars_run_through_a_one_way_panel_that_hogs_throughout_too() {
    // 2.8 x 6.0 between two-way panels of 6.0 x 6.0: ratio 2.14.
    let (floor, design) = designed(&Grid::new(&[6.0, 2.8, 6.0], &[6.0]));
    let panel = panel_design(&floor, &design, "B1");
    assert!(panel.sections[0].moment_balanced_knm_m.unwrap() < 0.0);
    for side in [Side::West, Side::East] {
        let support = support_design(&floor, &design, "B1", side);
        let own = support.sides.iter().find(|s| s.panel == panel.panel).unwrap();
        // Clear span 2.55 m, up to 50 mm.
        same(own.extension_m, 2.55);
        same(own.short_extension_m, 2.55);
    }
}

#[test]
fn top_bars_follow_the_contraflexure_of_a_one_way_panel_whose_moment_rose() {
    // 4.0 x 8.6 one-way beside 5.0 x 8.6, two-way and heavy: the release raises its moment well over 10 %.
    let (floor, design) =
        designed(&Grid::new(&[4.0, 5.0], &[8.6]).with("B1", |cell| cell.loads.imposed_kn_m2 = 15.0));
    let support = support_design(&floor, &design, "A1", Side::East);
    let [one_way, two_way] = [support.sides[0], support.sides[1]];
    // Built in at that end the strip gave 0.8 x n l2/8.
    let table = 0.1 * 12.54 * 16.0;
    same(one_way.moment_from_coefficient_knm_m.unwrap(), table);
    let moment = support.moment_knm_m.unwrap();
    assert!(moment > 1.1 * table && one_way.from_contraflexure && !two_way.from_contraflexure);
    // w x (l - x)/2 = M (1 - x/l): x = 2 M/(w l).
    let past =
        2.0 * moment / (12.54 * 4.0) + f64::max(support.d_mm, 12.0 * support.bars.bar_mm) / 1000.0 - 0.125;
    assert!(past > 0.3 * 5.0, "longer than the simplified rule");
    close(one_way.extension_m, ((past * 20.0).ceil() / 20.0).min(3.75), 1e-9);
}

#[test]
fn bars_cross_beside_the_side_of_a_one_way_panel_with_no_moment_claimed() {
    // A1: 6 x 5, two-way. A2 above it: 6 x 2.5 along y, one-way, stated along x: its south side is beside its span.
    let grid = Grid::new(&[6.0], &[5.0, 2.5]).with("A2", |cell| cell.spanning = Spanning::OneWay(Axis::X));
    let (floor, design) = designed(&grid);
    let support = support_design(&floor, &design, "A1", Side::North);
    assert!(support.moment_knm_m.is_none() && support.as_bending_mm2_m.is_none() && !support.balanced);
    let midspan = section(panel_design(&floor, &design, "A1"), SHORT);
    assert_eq!(midspan.bars_along, Axis::Y);
    let asked = f64::max(midspan.as_provided_mm2_m / 2.0, 195.0);
    same(support.as_required_mm2_m.unwrap(), asked);
    assert!(support.as_provided_mm2_m >= asked);
    for side in &support.sides {
        // 0.3 of the lesser lx, 2.5 m.
        same(side.extension_m, 0.75);
    }
    // Both panels are discontinuous there.
    assert_eq!(panel_design(&floor, &design, "A1").basis.unwrap().case.unwrap().number(), 9);
    let at_support = section(panel_design(&floor, &design, "A1"), Place::Side(Side::North));
    assert!(at_support.coefficient.is_none() && at_support.moment_knm_m.is_none());
    assert!(panel_design(&floor, &design, "A1").checks.iter().any(|c| c.kind == CheckKind::BondAtSupport));
}

#[test]
fn the_shear_of_each_edge_is_that_of_table_3_15_on_the_steel_that_is_anchored_there() {
    let (floor, design) = designed(&Grid::new(&[5.0, 5.0], &[6.0]));
    let panel = panel_design(&floor, &design, "A1");
    let [short, long] = [SHORT, Place::LongMidspan].map(|at| section(panel, at).clone());
    let east = section(panel, Place::Side(Side::East)).clone();
    // Case 7, ratio 1.2: long edges .51 continuous, .34 discontinuous, short edges .29; n lx = 62.7 kN/m.
    // East: top steel at the face. The others are anchored to 3.12.9.4 (c) only, so that the edge's top bars count: half
    // the bottom steel, not under the minimum of 195 mm2/m; across T1 (along x) they lie under bars of up to 16 mm.
    let edge_steel = |as_provided: f64| f64::max(as_provided / 2.0, 195.0);
    let cases = [
        (Side::East, 0.51, east.d_mm, east.as_provided_mm2_m),
        (Side::West, 0.34, 125.0 - short.bars.bar_mm / 2.0, edge_steel(short.as_provided_mm2_m)),
        (Side::North, 0.29, 109.0 - long.bars.bar_mm / 2.0, edge_steel(long.as_provided_mm2_m)),
        (Side::South, 0.29, 109.0 - long.bars.bar_mm / 2.0, edge_steel(long.as_provided_mm2_m)),
    ];
    for (side, beta, d, steel) in cases {
        let shear = check(panel, CheckKind::Shear, Place::Side(side));
        same(shear.demand, beta * 62.7 / d);
        same(shear.limit, vc(steel, d, 30.0));
        let anchored = panel.checks.iter().find(|c| c.kind == CheckKind::BondAtSupport && c.at == shear.at);
        assert!(anchored.is_none_or(|bond| bond.clause == "3.12.9.4 (c)"));
        assert_eq!(anchored.is_none(), side == Side::East);
    }
}
