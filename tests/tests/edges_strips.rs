//! One-way strips on floors: which coefficients they take, and their ends beside two-way panels.

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use design_engine::bs8110::strip::{StripSpan, analyse};
use design_engine::check::{CheckKind, Place};
use design_engine::floor::Side;
use design_engine::result::Action;
use edges_support::random::config;
use edges_support::{Designed, N, Plan, plan, same};
use proptest::prelude::*;

const SPAN: Place = Place::ShortMidspan;

/// One span of a strip along x.
#[derive(Debug, Clone, Copy)]
struct Bay {
    l_m: f64,
    h_mm: f64,
    finishes: f64,
    imposed: f64,
}

impl Bay {
    fn dead(&self) -> f64 {
        24.0 * self.h_mm / 1000.0 + self.finishes + 1.0
    }

    fn ultimate(&self) -> f64 {
        1.4 * self.dead() + 1.6 * self.imposed
    }

    fn span(&self) -> StripSpan {
        StripSpan {
            l_m: self.l_m,
            h_mm: self.h_mm,
            ultimate_kn_m2: self.ultimate(),
            least_kn_m2: self.dead(),
        }
    }
}

/// Bays side by side along x, each so wide along y: P0, P1, P2.
fn strip(bays: &[Bay], width: f64) -> Plan {
    let mut x = vec![0.0];
    for bay in bays {
        x.push(x[x.len() - 1] + bay.l_m);
    }
    let mut plan = plan(&x, &[0.0, width]);
    for (i, bay) in bays.iter().enumerate() {
        let mark = format!("P{i}");
        plan = plan.panel(&mark, &format!("{}-{}", i + 1, i + 2), "A-B").with(&mark, |panel| {
            panel.data.thickness_mm = bay.h_mm;
            panel.data.loads.finishes_kn_m2 = bay.finishes;
            panel.data.loads.imposed_kn_m2 = bay.imposed;
        });
    }
    plan
}

/// The moments of a strip's coefficients as multiples of n l2: midspan, and at both ends.
fn coefficients(design: &Designed, bays: &[Bay]) -> Vec<[f64; 3]> {
    let of = |(i, bay): (usize, &Bay)| {
        let mark = format!("P{i}");
        assert_eq!(design.panel(&mark).basis.unwrap().action, Action::OneWay);
        let unit = bay.ultimate() * bay.l_m * bay.l_m;
        let end = |side| {
            let section = design.panel(&mark).section(Place::Side(side));
            section.map_or(0.0, |section| section.moment_from_coefficient_knm_m.unwrap() / unit)
        };
        let midspan = design.section(&mark, SPAN).moment_from_coefficient_knm_m.unwrap() / unit;
        [midspan, end(Side::West), end(Side::East)]
    };
    bays.iter().enumerate().map(of).collect()
}

/// Table 3.12, ends freely supported: midspan and two ends of a span.
fn table_3_12(i: usize, count: usize) -> [f64; 3] {
    let support = |place: usize| match place.min(count - place) {
        0 => 0.0,
        1 => 0.086,
        _ => 0.063,
    };
    let end_span = i == 0 || i + 1 == count;
    [if end_span { 0.086 } else { 0.063 }, support(i), support(i + 1)]
}

/// 3.5.2.3: bays over 30 m2, Qk/Gk at most 1.25, qk at most 5 kN/m2.
fn single_case_allowed(bays: &[Bay], width: f64) -> bool {
    bays.iter().all(|bay| {
        bay.l_m * width > 30.0 + 1e-9 && bay.imposed <= 1.25 * bay.dead() + 1e-9 && bay.imposed <= 5.0
    })
}

/// 3.5.2.4 besides: three or more spans, spans (and here loads) within 15 %, one thickness.
fn table_3_12_allowed(bays: &[Bay], width: f64) -> bool {
    let within = |of: fn(&Bay) -> f64, share: f64| {
        let greatest = bays.iter().map(of).fold(0.0, f64::max);
        bays.iter().all(|bay| of(bay) >= greatest * (1.0 - share) - 1e-9)
    };
    bays.len() >= 3
        && single_case_allowed(bays, width)
        && within(|bay| bay.l_m, 0.15)
        && within(Bay::ultimate, 0.15)
        && within(|bay| bay.h_mm, 0.0)
}

/// A first bay, and how many tenths of a per cent the others are from it.
fn bays() -> impl Strategy<Value = Vec<Bay>> {
    let steps = |most: i32| (-most..=most).prop_map(f64::from);
    let first = (30_u8..=60, 0_u8..3, 0_u8..4, 2_u8..=14);
    let other = (steps(2), prop::bool::weighted(0.15), steps(1));
    (first, prop::collection::vec(other, 1..=4)).prop_map(|((l, h, finishes, imposed), others)| {
        let first = Bay {
            l_m: f64::from(l) / 10.0,
            h_mm: 125.0 + 25.0 * f64::from(h),
            finishes: f64::from(finishes) / 2.0,
            imposed: f64::from(imposed) / 2.0,
        };
        let other = |(l, thicker, imposed): (f64, bool, f64)| Bay {
            l_m: first.l_m * (1.0 + 0.08 * l),
            h_mm: first.h_mm + if thicker { 25.0 } else { 0.0 },
            imposed: (first.imposed + 0.5 * imposed).max(0.0),
            ..first
        };
        let l_rounded = |bay: Bay| Bay { l_m: (bay.l_m * 100.0).round() / 100.0, ..bay };
        std::iter::once(first).chain(others.into_iter().map(other).map(l_rounded)).collect()
    })
}

proptest! {
    #![proptest_config(config(250))]

    #[test]
    fn table_3_12_and_the_single_load_case_are_used_exactly_where_their_conditions_hold(
        bays in bays(),
        narrow: bool,
    ) {
        // Just one-way by the shape, or wide enough for bays over 30 m2.
        let longest = bays.iter().map(|bay| bay.l_m).fold(0.0, f64::max);
        let width = if narrow { 2.05 * longest } else { 14.0 };
        let design = strip(&bays, width).design();
        let spans: Vec<StripSpan> = bays.iter().map(Bay::span).collect();
        let analysed = analyse(&spans, [false; 2], single_case_allowed(&bays, width));
        for (i, found) in coefficients(&design, &bays).into_iter().enumerate() {
            let expected = if table_3_12_allowed(&bays, width) {
                table_3_12(i, bays.len())
            } else {
                let unit = spans[i].ultimate_kn_m2 * spans[i].l_m * spans[i].l_m;
                let [west, east] = analysed[i].ends_knm_m;
                [analysed[i].sagging_knm_m / unit, west / unit, east / unit]
            };
            for (a, b) in found.iter().zip(expected) {
                prop_assert!((a - b).abs() < 1e-9, "P{i}: {found:?}, expected {expected:?}");
            }
        }
    }

    #[test]
    fn the_two_ends_of_a_one_way_panel_carry_its_whole_load(bays in bays()) {
        let design = strip(&bays, 14.0).design();
        for (i, bay) in bays.iter().enumerate() {
            let mark = format!("P{i}");
            let [west, east] = [Side::West, Side::East].map(|side| design.panel(&mark).side_loads[side.index()].unwrap());
            let sum = west.ultimate_kn_m + east.ultimate_kn_m;
            prop_assert!((sum - bay.ultimate() * bay.l_m).abs() < 1e-9 * sum);
        }
        prop_assert!(design.beam_loads().difference().abs() < 1e-9);
    }
}

#[test]
fn every_condition_alone_takes_a_strip_out_of_table_3_12() {
    let bay = Bay { l_m: 5.0, h_mm: 175.0, finishes: 1.5, imposed: 2.5 };
    let three = [bay; 3];
    let other_middle = |middle: Bay| [bay, middle, bay];
    assert!(table_3_12_allowed(&three, 12.0) && single_case_allowed(&three, 12.0));
    for (bays, width) in [
        (&three[..2], 12.0),
        (&other_middle(Bay { l_m: 4.2, ..bay })[..], 12.0),
        (&other_middle(Bay { h_mm: 185.0, ..bay })[..], 12.0),
        (&other_middle(Bay { finishes: 4.0, ..bay })[..], 12.0),
        (&[Bay { l_m: 2.5, ..bay }; 3][..], 12.0),
        (&[Bay { imposed: 5.5, ..bay }; 3][..], 12.0),
        (&[Bay { h_mm: 100.0, finishes: 0.0, imposed: 4.5, ..bay }; 3][..], 12.0),
    ] {
        assert!(!table_3_12_allowed(bays, width));
        let design = strip(bays, width).design();
        let found = coefficients(&design, bays)[0][0];
        assert!((found - 0.086).abs() > 1e-6, "{bays:?}");
    }
}

#[test]
fn one_way_supports_are_limited_by_their_redistribution() {
    let bay = Bay { l_m: 5.0, h_mm: 100.0, finishes: 1.0, imposed: 4.0 };
    let design = strip(&[bay; 3], 12.0).design();
    let limits =
        |at| design.checks("P1", CheckKind::Bending, at).iter().map(|check| check.limit).collect::<Vec<_>>();
    assert!(limits(Place::Side(Side::West)).iter().any(|limit| (limit - 0.132).abs() < 1e-12));
}

#[test]
fn a_strip_end_beside_a_two_way_panel_is_built_in_then_released() {
    // 3 x 7 m one-way between 5 x 7 m two-way panels: built in at both ends, n l2/15; 0.75 h3/5 against h3/3.
    let floor = plan(&[0.0, 5.0, 8.0, 13.0], &[0.0, 7.0]);
    let design = floor.panel("W", "1-2", "A-B").panel("S", "2-3", "A-B").panel("E", "3-4", "A-B").design();
    let own = N * 9.0 / 15.0;
    // Ratio 1.4, three edges discontinuous and a long edge continuous: .081.
    let two_way = 0.081 * N * 25.0;
    let (k_own, k_two_way) = (1.0 / 3.0, 0.75 / 5.0);
    let moment = (own * k_two_way + two_way * k_own) / (k_own + k_two_way);
    for side in [Side::West, Side::East] {
        let support = design.support("S", side);
        same(design.coefficient_moment(support, "S"), own);
        same(support.moment_knm_m.unwrap(), moment);
    }
    // The release raised both ends until midspan hogs; bottom steel stays that of the strip before it.
    let midspan = design.section("S", SPAN);
    same(midspan.moment_balanced_knm_m.unwrap(), N * 9.0 / 8.0 - moment);
    same(midspan.moment_knm_m.unwrap(), N * 9.0 / 8.0 - own);
    assert!(midspan.moment_balanced_knm_m.unwrap() < 0.0);
    let basic = design.panel("S").deflection.unwrap().basic;
    same(basic, 26.0);
    // Both ends carry half of the load, released or not.
    let load = |side: Side| design.panel("S").side_loads[side.index()].unwrap().ultimate_kn_m;
    same(load(Side::West), N * 1.5);
    same(load(Side::East), N * 1.5);
}

#[test]
fn a_strip_with_one_end_released_still_carries_its_whole_load() {
    let floor =
        plan(&[0.0, 3.0, 8.0], &[0.0, 7.0]).panel("S", "1-2", "A-B").panel("E", "2-3", "A-B").design();
    let load = |side: Side| floor.panel("S").side_loads[side.index()].unwrap().ultimate_kn_m;
    let moment = floor.support("S", Side::East).moment_knm_m.unwrap();
    assert!(moment > N * 9.0 / 10.0 * 1.1, "released upwards");
    same(load(Side::East), N * 1.5 + moment / 3.0);
    same(load(Side::West), N * 1.5 - moment / 3.0);
}
