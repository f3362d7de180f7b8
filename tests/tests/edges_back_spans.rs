//! What a cantilever does to the spans behind it, and strips under alternate loads: numbers by hand.

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use design_engine::check::{CheckKind, Place};
use design_engine::floor::{Side, Spanning};
use edges_support::{Designed, G, N, plan, same};

fn shear(of: &Designed, mark: &str, side: Side) -> f64 {
    let [check] = of.checks(mark, CheckKind::Shear, Place::Side(side))[..] else { panic!() };
    check.demand * of.support(mark, side).d_mm
}

fn load(of: &Designed, mark: &str, side: Side) -> f64 {
    of.panel(mark).side_loads[side.index()].unwrap().ultimate_kn_m
}

#[test]
fn a_root_moment_adds_to_the_back_span_s_shear_and_reaction_and_takes_from_the_far_one() {
    // K 2.0 m out of B, 3.5 x 9 m, one-way along y: M = 13.38 x 2 = 26.76.
    let floor = plan(&[0.0, 9.0], &[0.0, 2.0, 5.5])
        .panel("K", "1-2", "A-B")
        .spanning("K", Spanning::Cantilever)
        .panel("B", "1-2", "B-C")
        .design();
    let moment = N * 2.0;
    // n l/2 + M/l at the root.
    same(shear(&floor, "B", Side::South), N * 1.75 + moment / 3.5);
    same(load(&floor, "B", Side::South), N * 1.75 + moment / 3.5);
    same(load(&floor, "B", Side::North), N * 1.75 - moment / 3.5);
    // Dead and imposed apart: gk l/2 + (gk k2/2)/l.
    let south = floor.panel("B").side_loads[Side::South.index()].unwrap();
    same(south.dead_kn_m, G * 1.75 + G * 2.0 / 3.5);
    same(south.imposed_kn_m, 2.5 * 1.75 + 2.5 * 2.0 / 3.5);
}

#[test]
fn a_far_edge_that_is_continuous_is_checked_for_uplift_by_the_three_moment_equation() {
    // K 2.6 m out of B 3.0 m; the slab goes on 4.0 m north, 9 m wide, simple at its end.
    let floor = plan(&[0.0, 9.0], &[0.0, 2.6, 5.6, 9.6])
        .panel("K", "1-2", "A-B")
        .spanning("K", Spanning::Cantilever)
        .panel("B", "1-2", "B-C")
        .panel("C", "1-2", "C-D")
        .design();
    let root = N * 2.6 * 2.6 / 2.0;
    // 2 m1 (3 + 4) = gk (27 + 64)/4 - M x 3: m1 = 1.20 kNm/m, hogging.
    let m1 = (G * (27.0 + 64.0) / 4.0 - root * 3.0) / 14.0;
    assert!(m1 > 0.0);
    let [uplift] = floor.checks("B", CheckKind::Uplift, Place::Side(Side::North))[..] else { panic!() };
    same(uplift.demand, root / 3.0);
    same(uplift.limit, G * 1.5 + m1 / 3.0 + G * 2.0 + m1 / 4.0);
    assert!(uplift.ok);
    // A longer cantilever turns the far support's moment over: it lifts as well.
    let floor = plan(&[0.0, 9.0], &[0.0, 3.6, 6.6, 9.6])
        .panel("K", "1-2", "A-B")
        .spanning("K", Spanning::Cantilever)
        .panel("B", "1-2", "B-C")
        .panel("C", "1-2", "C-D")
        .design();
    let root = N * 3.6 * 3.6 / 2.0;
    let m1 = (G * 54.0 / 4.0 - root * 3.0) / 12.0;
    assert!(m1 < 0.0);
    let [uplift] = floor.checks("B", CheckKind::Uplift, Place::Side(Side::North))[..] else { panic!() };
    same(uplift.demand, root / 3.0 - m1 * 2.0 / 3.0);
    same(uplift.limit, G * 3.0);
    assert!(!uplift.ok);
}

#[test]
fn bars_between_two_cantilevers_reach_past_the_contraflexure_of_both_root_moments() {
    // 1.3 m and 1.6 m out of B, 6.0 x 13 m, south and north.
    let floor = plan(&[0.0, 13.0], &[0.0, 1.3, 7.3, 8.9])
        .panel("K", "1-2", "A-B")
        .spanning("K", Spanning::Cantilever)
        .panel("B", "1-2", "B-C")
        .panel("C", "1-2", "C-D")
        .spanning("C", Spanning::Cantilever);
    let floor = floor.imposed("K", 12.0).imposed("C", 12.0).design();
    let [south, north] = [Side::South, Side::North].map(|side| floor.support("B", side));
    let (m, f) = (south.moment_knm_m.unwrap(), north.moment_knm_m.unwrap());
    // Stepping in from the south support until gk x (l - x)/2 - m (1 - x/l) - f x/l no longer hogs.
    let hogs = |x: f64| G * x * (6.0 - x) / 2.0 - m * (1.0 - x / 6.0) - f * x / 6.0 < 0.0;
    let x0 = (0..6000).map(|step| f64::from(step) / 1000.0).find(|x| !hogs(*x));
    let reach = south.sides.iter().find(|side| side.panel == floor.id("B")).unwrap().extension_m;
    match x0 {
        Some(x0) => {
            let needed = x0 + (south.d_mm / 1000.0).max(0.012 * south.bars.bar_mm) - 0.125;
            assert!(reach >= needed - 0.001 && reach <= needed.max(0.3 * 6.0) + 0.051, "{reach} {needed}");
            // The far moment counts: without it the hogging would end sooner.
            assert!(x0 > 2.0 * m / (G * 6.0));
        }
        None => same(reach, 5.75),
    }
}

#[test]
fn top_bars_of_a_strip_pass_the_contraflexure_of_its_lightly_loaded_span() {
    // 6, 3.5 and 6 m, 15 kN/m2 imposed: with 1.0 gk on the middle span alone it hogs throughout.
    let floor = plan(&[0.0, 6.0, 9.5, 15.5], &[0.0, 13.0]).panel("P", "1-2", "A-B").panel("Q", "2-3", "A-B");
    let floor = floor.panel("R", "3-4", "A-B");
    let floor = ["P", "Q", "R"].into_iter().fold(floor, |floor, mark| floor.imposed(mark, 15.0)).design();
    let support = floor.support("Q", Side::West);
    let of = |mark: &str| support.sides.iter().find(|side| side.panel == floor.id(mark)).unwrap();
    same(of("Q").extension_m, 3.25);
    // The outer span with 1.0 gk beside the loaded middle: 6, 3.5, 6 m, loads 6.7, n, 6.7: M = (6.7 x 216 + n x 42.875)/4/
    // (2 x 9.5 + 3.5), by symmetry; contraflexure at l - 2 M/(gk l) from the simple end.
    let n = 1.4 * G + 1.6 * 15.0;
    let moment = (G * 216.0 + n * 42.875) / 4.0 / 22.5;
    let x0 = 2.0 * moment / (G * 6.0);
    let needed = x0 + (support.d_mm / 1000.0).max(0.012 * support.bars.bar_mm) - 0.125;
    assert!(of("P").extension_m >= needed.max(1.8) - 1e-9, "{} {needed}", of("P").extension_m);
}

#[test]
fn a_release_at_a_strip_s_end_is_not_left_out_of_its_next_support() {
    // Two one-way spans, then a small two-way panel that gives way: the support between them takes the greater of the
    // strip's end built in (0.0714 n l2 x 0.8 for two equal spans) and simple (0.125 n l2 x 0.8).
    let floor = plan(&[0.0, 5.0, 10.0, 13.0], &[0.0, 5.0])
        .panel("P", "1-2", "A-B")
        .panel("Q", "2-3", "A-B")
        .panel("T", "3-4", "A-B");
    let [p, q] = ["P", "Q"].map(|_| Spanning::OneWay(design_engine::floor::Axis::X));
    let floor = floor.spanning("P", p).spanning("Q", q).design();
    let between = floor.support("Q", Side::West).moment_knm_m.unwrap();
    same(between, 0.8 * 0.125 * N * 25.0);
}

#[test]
fn shear_of_a_one_way_end_follows_its_released_moments() {
    // S one-way 6 m beside a heavy two-way panel: its released end moment is above the fixed-end value.
    let floor = plan(&[0.0, 3.0, 9.0], &[0.0, 8.0])
        .panel("S", "1-2", "A-B")
        .panel("T", "2-3", "A-B")
        .imposed("T", 10.0)
        .design();
    let support = floor.support("S", Side::East);
    let table = floor.coefficient_moment(support, "S");
    let released = support.moment_knm_m.unwrap();
    assert!(support.balanced && released > table);
    // Built in at one end with the 20 % off: n l2/10; V = n l/2 + M/l with the final moment.
    same(table, N * 9.0 / 10.0);
    same(shear(&floor, "S", Side::East), N * 1.5 + released / 3.0);
}
