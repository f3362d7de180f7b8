//! Cantilevers and their back-spans.

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use design_engine::bs8110::corners::CornerState;
use design_engine::check::{CheckKind, Place};
use design_engine::floor::{Axis, EdgeState, Layer, Side, Spanning};
use design_engine::query::Severity;
use design_engine::result::Action;
use edges_support::{Designed, G, N, Plan, plan, same};
use proptest::prelude::*;

const ROOT: Side = Side::North;

/// K stands k m out to the south of B, which spans l m to the north and is 6 m wide along x.
fn balcony(k: f64, l: f64) -> Plan {
    plan(&[0.0, 6.0], &[0.0, k, k + l])
        .panel("K", "1-2", "A-B")
        .spanning("K", Spanning::Cantilever)
        .panel("B", "1-2", "B-C")
}

fn root_shear(of: &Designed) -> f64 {
    let [shear] = of.checks("K", CheckKind::Shear, Place::Side(ROOT))[..] else { panic!() };
    shear.demand * of.support("K", ROOT).d_mm
}

fn round_up_50(mm: f64) -> f64 {
    (mm / 50.0 - 1e-9).ceil() * 50.0
}

#[test]
fn a_balcony_worked_by_hand() {
    // 1.5 m out, back-span 5.0 m; n = 13.38. A parapet of 1.2 kN/m stands 0.05 m in from the tip, 1.45 m from the root.
    let floor = balcony(1.5, 5.0).wall("K", Axis::X, 0.05, [0.0, 6.0], 1.2).design();
    let root = floor.support("K", ROOT);
    // M = 13.38 x 1.5^2/2 + 1.4 x 1.2 x 1.45 = 15.053 + 2.436 = 17.489.
    let moment = N * 1.125 + 1.4 * 1.2 * 1.45;
    same(floor.coefficient_moment(root, "K"), moment);
    // B with that edge continuous: 5 x 6 m, one long edge continuous, ratio 1.2: .071 n lx2 = 23.75, the greater.
    same(floor.coefficient_moment(root, "B"), 0.071 * N * 25.0);
    same(root.moment_knm_m.unwrap(), 0.071 * N * 25.0);
    assert!(!root.balanced && root.load_ratio.is_none() && root.span_ratio.is_none());
    // V = 13.38 x 1.5 + 1.4 x 1.2 = 21.75.
    same(root_shear(&floor), N * 1.5 + 1.68);
    same(floor.panel("K").side_loads[ROOT.index()].unwrap().ultimate_kn_m, N * 1.5 + 1.68);
    same(floor.panel("K").deflection.unwrap().basic, 7.0);
    // Contraflexure in B under 17.489 and 1.0 gk = 6.7: x = 2 x 17.489/(6.7 x 5) = 1.044 m; to max(d, 12 dia) past it, less half
    // the support, is under 1.5 k = 2.25 m: half of the bars to 2.25 m. All of them: 0.75 k = 1.125 m, up to 1.15 m.
    let [k, b] = root.sides[..] else { panic!() };
    let past = 2.0 * moment / (G * 5.0) + root.d_mm / 1000.0 - 0.125;
    assert!(past < 2.25 && root.as_provided_mm2_m / 2.0 > 227.5);
    same(b.extension_m, 2.25);
    same(b.short_extension_m, 1.15);
    // Every bar reaches the tip less the cover: 1.5 - 0.125 - 0.025.
    same(k.extension_m, 1.35);
    same(k.short_extension_m, 1.35);
}

#[test]
fn the_back_span_counts_the_edge_as_discontinuous_and_both_sides_say_continuous() {
    let floor = balcony(1.5, 5.0).design();
    assert_eq!(floor.panel("B").edge_states[Side::South.index()], EdgeState::Continuous);
    assert_eq!(floor.panel("K").edge_states[ROOT.index()], EdgeState::Continuous);
    let basis = floor.panel("B").basis.unwrap();
    assert_eq!(basis.state(Side::South), EdgeState::Discontinuous);
    assert_eq!(floor.case("B"), 9);
    // Case 9 at 1.2: .074 and .056; basic 20; four corners without a continuous edge.
    same(floor.moment("B", Place::ShortMidspan), 0.074 * N * 25.0);
    same(floor.moment("B", Place::LongMidspan), 0.056 * N * 25.0);
    same(floor.panel("B").deflection.unwrap().basic, 20.0);
    assert!(floor.panel("B").corners.iter().all(|corner| corner.state == CornerState::NeitherContinuous));
    assert!(floor.design.assumptions.iter().any(|text| text.contains("B south")));
}

#[test]
fn a_long_cantilever_governs_its_root_and_is_not_shared_out() {
    let floor = balcony(2.4, 5.0).design();
    let root = floor.support("K", ROOT);
    let moment = N * 2.4 * 2.4 / 2.0;
    assert!(moment > floor.coefficient_moment(root, "B"));
    same(root.moment_knm_m.unwrap(), moment);
    // B's midspan gains nothing from it.
    same(floor.moment("B", Place::ShortMidspan), 0.074 * N * 25.0);
    same(floor.section("B", Place::ShortMidspan).moment_balanced_knm_m.unwrap(), 0.074 * N * 25.0);
    // K' is not lowered: nothing is redistributed.
    let bending = floor.checks("K", CheckKind::Bending, Place::Side(ROOT));
    assert!(!bending.is_empty() && bending.iter().all(|check| check.unit == "mm2/m"));
}

#[test]
fn a_cantilever_beyond_a_one_way_strip_is_neither_balanced_nor_reduced() {
    // Three spans of 4 m along y, 10 m wide, under Table 3.12, and a cantilever of 1.5 m to the south.
    let floor = plan(&[0.0, 10.0], &[0.0, 1.5, 5.5, 9.5, 13.5])
        .panel("K", "1-2", "A-B")
        .spanning("K", Spanning::Cantilever)
        .panel("P", "1-2", "B-C")
        .panel("Q", "1-2", "C-D")
        .panel("R", "1-2", "D-E")
        .design();
    let root = floor.support("K", ROOT);
    same(floor.coefficient_moment(root, "K"), N * 1.125);
    // P's own with that end built in, by analysis: not above a fixed end, 0.8 x n l2/12 x 1.5 at the most.
    let own = floor.coefficient_moment(root, "P");
    assert!(own > 0.8 * N * 16.0 / 12.0 * 0.9 && own < 0.1 * N * 16.0);
    same(root.moment_knm_m.unwrap(), own.max(N * 1.125));
    // The strip itself is that of Table 3.12 with a free end.
    same(floor.moment("P", Place::ShortMidspan), 0.086 * N * 16.0);
    same(floor.support("P", Side::North).moment_knm_m.unwrap(), 0.086 * N * 16.0);
    assert_eq!(floor.panel("P").basis.unwrap().action, Action::OneWay);
}

#[test]
fn bars_of_a_heavy_cantilever_stop_in_two_lengths_in_the_back_span() {
    // 2.0 m out, 12 kN/m2 imposed: bars close enough that every second one may stop.
    let floor = balcony(2.0, 6.0).imposed("K", 12.0).with("K", |panel| panel.data.thickness_mm = 225.0);
    let floor = floor.with("B", |panel| panel.data.thickness_mm = 225.0).design();
    let root = floor.support("K", ROOT);
    let [k, b] = root.sides[..] else { panic!() };
    assert!(root.as_provided_mm2_m / 2.0 > 0.0013 * 225_000.0);
    // gk = 0.225 x 24 + 2.5 = 7.9. M = (1.4 x 7.9 + 1.6 x 12) x 2 = 60.52; x0 = 2 x 60.52/(7.9 x 6) = 2.554 m.
    let moment = (1.4 * 7.9 + 1.6 * 12.0) * 2.0;
    same(floor.coefficient_moment(root, "K"), moment);
    let past = 1000.0 * 2.0 * moment / (7.9 * 6.0) + root.d_mm.max(12.0 * root.bars.bar_mm) - 125.0;
    // Half: max(1.5 k, 0.3 l, past); all: max(0.75 k, 0.15 l, 45 dia).
    same(1000.0 * b.extension_m, round_up_50(past.max(3000.0).max(1800.0)));
    same(1000.0 * b.short_extension_m, round_up_50(f64::max(1500.0, 900.0).max(45.0 * root.bars.bar_mm)));
    assert!(b.short_extension_m < b.extension_m && !root.alternate_reversed);
    // None is stopped within the cantilever.
    same(k.extension_m, 2.0 - 0.125 - 0.025);
    same(k.short_extension_m, k.extension_m);
}

#[test]
fn bars_run_the_whole_back_span_where_it_hogs_throughout_and_its_far_support_lifts() {
    // 2.6 m out of 3.5 m: M = 13.38 x 3.38 = 45.2; 2 M/(g l) = 3.86 m, over 3.5.
    let floor = balcony(2.6, 3.5).design();
    let moment = N * 2.6 * 2.6 / 2.0;
    assert!(2.0 * moment / (G * 3.5) > 3.5);
    let [_, b] = floor.support("K", ROOT).sides[..] else { panic!() };
    // Clear span 3.25 m and the far support's half width.
    same(b.extension_m, 3.40);
    same(b.short_extension_m, 3.40);
    // Uplift: M/l = 12.9 against g l/2 = 11.7 kN/m.
    let [uplift] = floor.checks("B", CheckKind::Uplift, Place::Side(Side::North))[..] else { panic!() };
    same(uplift.demand, moment / 3.5);
    same(uplift.limit, G * 3.5 / 2.0);
    assert!(!uplift.ok && !floor.panel("B").ok());
    assert!(floor.says("B", Severity::Warning, "uplift"));
}

#[test]
fn uplift_passes_while_the_back_span_s_own_weight_holds_its_far_support_down() {
    let floor = balcony(1.5, 5.0).design();
    let [uplift] = floor.checks("B", CheckKind::Uplift, Place::Side(Side::North))[..] else { panic!() };
    same(uplift.demand, N * 1.125 / 5.0);
    assert!(uplift.ok);
}

#[test]
fn a_far_edge_that_only_a_short_cantilever_or_a_part_holds_is_checked_for_uplift_too() {
    // A canopy of 0.3 m on the far side of the back-span.
    let canopy = plan(&[0.0, 6.0], &[0.0, 2.8, 6.3, 6.6])
        .panel("K", "1-2", "A-B")
        .spanning("K", Spanning::Cantilever)
        .panel("B", "1-2", "B-C")
        .panel("C", "1-2", "C-D")
        .spanning("C", Spanning::Cantilever)
        .design();
    let failing =
        |of: &Designed| of.panel("B").checks.iter().any(|check| check.kind == CheckKind::Uplift && !check.ok);
    assert!(failing(&canopy));
    // It helps with its weight: 11.725 + 6.7 x 0.3 x (1 + 0.3/7) = 13.82 against 14.99 kN/m.
    let [far] = canopy.checks("B", CheckKind::Uplift, Place::Side(Side::North))[..] else { panic!() };
    same(far.limit, G * 1.75 + G * 0.3 * (1.0 + 0.3 / 7.0));
    // A neighbour over 2 of the 6 m.
    let part = plan(&[0.0, 2.0, 6.0], &[0.0, 2.6, 6.1, 9.0])
        .panel("K", "1-3", "A-B")
        .spanning("K", Spanning::Cantilever)
        .panel("B", "1-3", "B-C")
        .panel("C", "1-2", "C-D")
        .design();
    assert_eq!(part.panel("B").edge_states[Side::North.index()], EdgeState::PartlyContinuous);
    assert!(failing(&part));
}

#[test]
fn distribution_bars_lie_in_the_other_top_layer() {
    let floor = balcony(1.5, 5.0).design();
    let root = floor.support("K", ROOT);
    let spread = floor.panel("K").sections.iter().find(|section| section.support.is_none()).unwrap();
    assert_eq!(spread.bars_along, Axis::X);
    assert!(spread.moment_knm_m.is_none() && spread.as_provided_mm2_m >= 227.5);
    assert_eq!([root.layer, spread.layer].iter().filter(|layer| **layer == Layer::T1).count(), 1);
}

#[test]
fn a_cantilever_that_has_no_one_root_or_a_wall_along_its_span_is_not_designed() {
    let joint = balcony(1.5, 5.0).joint("B", "1-2").design();
    assert!(joint.panel("K").not_designed.is_some());
    assert!(joint.says("K", Severity::NotDesigned, "a cantilever needs one edge"));
    let step = balcony(1.5, 5.0).with("K", |panel| panel.top_level_mm = -40.0).design();
    assert!(step.says("K", Severity::NotDesigned, "a cantilever needs one edge"));
    let wall = balcony(1.5, 5.0).wall("K", Axis::Y, 3.0, [0.0, 1.5], 3.0).design();
    assert!(wall.says("K", Severity::NotDesigned, "a wall along its span"));
    assert!(wall.panel("B").not_designed.is_none());
}

proptest! {
    #![proptest_config(edges_support::random::config(100))]

    #[test]
    fn a_cantilever_has_its_statics_whatever_is_beside_it(
        tenths in (8_u8..=26, 30_u8..=80),
        imposed in 1_u8..=10,
        walls in prop::collection::vec((1_u8..=9, 1_u8..=30), 0..3),
    ) {
        let (k, l) = (f64::from(tenths.0) / 10.0, f64::from(tenths.1) / 10.0);
        let mut floor = balcony(k, l).imposed("K", f64::from(imposed));
        let (mut moment, mut shear) = (0.0, 0.0);
        for (share, load) in walls {
            let (from_tip, load) = (k * f64::from(share) / 10.0, f64::from(load) / 5.0);
            floor = floor.wall("K", Axis::X, from_tip, [0.0, 6.0], load);
            moment += 1.4 * load * (k - from_tip);
            shear += 1.4 * load;
        }
        let design = floor.design();
        let n = 1.4 * G + 1.6 * f64::from(imposed);
        let root = design.support("K", ROOT);
        let close = |a: f64, b: f64| (a - b).abs() < 1e-9 * b;
        prop_assert!(close(design.coefficient_moment(root, "K"), n * k * k / 2.0 + moment));
        let greater = design.coefficient_moment(root, "B").max(n * k * k / 2.0 + moment);
        prop_assert!(close(root.moment_knm_m.unwrap(), greater));
        prop_assert!(close(root_shear(&design), n * k + shear));
        let uplift = design.checks("B", CheckKind::Uplift, Place::Side(Side::North))[0];
        prop_assert_eq!(uplift.ok, (n * k * k / 2.0 + moment) / l <= G * l / 2.0 * (1.0 + 1e-9));
        let [_, b] = root.sides[..] else { panic!() };
        prop_assert!(b.extension_m >= (1.5 * k).max(0.3 * l).min(l - 0.25) - 1e-9);
    }
}
