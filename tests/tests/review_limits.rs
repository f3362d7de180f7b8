//! Limits said or held at the edges of what is designed: load factors, joints, maximum steel of
//! unlike slabs, supports that are pulled at.

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use std::f64::consts::PI;

use design_engine::check::{CheckKind, Place};
use design_engine::criteria::Value;
use design_engine::floor::{Axis, BarChoice, Side, Spanning};
use design_engine::query::{Query, Severity, Subject};
use edges_support::{Designed, N, Plan, close, criteria, plan, same};
use floor_grid::lay_out;
use floor_grid::layout::{ChosenBars, ChosenPosition, StatedEdge};

fn choose(mut floor: Plan, panel: &str, position: ChosenPosition, bar_mm: f64, spacing_mm: f64) -> Plan {
    let (panel, remark) = (panel.to_owned(), String::new());
    let bars = BarChoice { bar_mm, spacing_mm };
    floor.0.chosen_bars.push(ChosenBars { panel, position, bars, remark });
    floor
}

fn two(span_m: f64) -> Plan {
    plan(&[0.0, span_m, 2.0 * span_m], &[0.0, 6.0]).panel("P", "1-2", "A-B").panel("Q", "2-3", "A-B")
}

/// The subjects of the queries with these words.
fn about<'a>(queries: &'a [Query], severity: Severity, words: &str) -> Vec<&'a Subject> {
    let said = queries.iter().filter(|query| query.severity == severity && query.text.contains(words));
    said.map(|query| &query.subject).collect()
}

#[test]
fn load_factors_under_those_of_table_2_1_are_a_warning() {
    for (key, item, least) in
        [("dead_load_factor", "Dead load factor", 1.4), ("imposed_load_factor", "Imposed load factor", 1.6)]
    {
        let said = |factor: f64| {
            let floor = two(5.0).design_by(&criteria(key, Value::Number(factor)));
            about(&floor.queries, Severity::Warning, "Table 2.1").into_iter().cloned().collect::<Vec<_>>()
        };
        assert_eq!(said(least - 0.05), [Subject::Setting(item)]);
        assert_eq!(said(least), []);
        assert_eq!(said(least + 0.1), []);
    }
}

#[test]
fn continuous_over_a_movement_joint_is_an_error_of_the_book() {
    let errors = |floor: &Plan| {
        let (_, queries) = lay_out(&floor.0);
        about(&queries, Severity::Error, "no bar crosses a joint").into_iter().cloned().collect::<Vec<_>>()
    };
    let edge = |side| Subject::Edge { mark: "P".to_owned(), side };
    let stated = two(5.0).stated("P", Side::East, StatedEdge::Continuous);
    assert_eq!(errors(&stated), []);
    assert_eq!(errors(&stated.joint("2", "A-B")), [edge(Side::East)]);
    // Over a part of the edge, and where no panel lies beyond.
    let part = plan(&[0.0, 5.0, 10.0], &[0.0, 3.0, 6.0])
        .panel("P", "1-2", "A-C")
        .panel("Q", "2-3", "A-B")
        .panel("R", "2-3", "B-C");
    assert_eq!(
        errors(&part.stated("P", Side::East, StatedEdge::Continuous).joint("2", "A-B")),
        [edge(Side::East)]
    );
    let beyond = two(5.0).stated("P", Side::West, StatedEdge::Continuous).joint("1", "A-B");
    assert_eq!(errors(&beyond), [edge(Side::West)]);
    // Stated discontinuous, or blank, it stands.
    assert_eq!(errors(&two(5.0).stated("P", Side::East, StatedEdge::Discontinuous).joint("2", "A-B")), []);
    assert_eq!(errors(&two(5.0).joint("2", "A-B")), []);
}

#[test]
fn maximum_steel_over_a_support_is_that_of_the_thinner_slab() {
    // 25 mm at 75: 6545 mm2/m, over 4 % of 150 mm and under 4 % of 300 mm.
    let floor = |q_mm: f64| {
        let floor = two(5.0)
            .with("P", |panel| panel.data.thickness_mm = 150.0)
            .with("Q", |panel| panel.data.thickness_mm = q_mm);
        choose(floor, "P", ChosenPosition::Top(Side::East), 25.0, 75.0).design()
    };
    let unlike = floor(300.0);
    for (mark, side) in [("P", Side::East), ("Q", Side::West)] {
        let [check] = unlike.checks(mark, CheckKind::MaximumSteel, Place::Side(side))[..] else { panic!() };
        close(check.demand, PI * 625.0 / 4.0 / 0.075, 1e-6);
        same(check.limit, 6000.0);
        assert!(!check.ok);
        // Minimum steel and spacing stay those of the thicker one: 0.13 % of 300 mm.
        let [least] = unlike.checks(mark, CheckKind::MinimumSteel, Place::Side(side))[..] else { panic!() };
        same(least.demand, 390.0);
    }
    let thick = two(5.0)
        .with("P", |panel| panel.data.thickness_mm = 300.0)
        .with("Q", |panel| panel.data.thickness_mm = 300.0);
    let thick = choose(thick, "P", ChosenPosition::Top(Side::East), 25.0, 75.0).design();
    assert!(thick.checks("P", CheckKind::MaximumSteel, Place::Side(Side::East))[0].ok);
}

#[test]
fn a_support_that_a_panel_pulls_at_is_a_warning() {
    let balcony = |k_m: f64| {
        let floor =
            plan(&[0.0, 3.0, 3.0 + k_m], &[0.0, 6.0]).panel("P", "1-2", "A-B").panel("K", "2-3", "A-B");
        floor.spanning("P", Spanning::OneWay(Axis::X)).spanning("K", Spanning::Cantilever).design()
    };
    let lifted = balcony(4.0);
    // Statics: n l/2 less the root moment n k2/2 over l.
    let reaction = N * 3.0 / 2.0 - N * 16.0 / 2.0 / 3.0;
    same(lifted.panel("P").side_loads[Side::West.index()].unwrap().ultimate_kn_m, reaction);
    let about = |floor: &Designed| {
        about(&floor.queries, Severity::Warning, "below zero").into_iter().cloned().collect::<Vec<_>>()
    };
    assert_eq!(about(&lifted), [Subject::Edge { mark: "P".to_owned(), side: Side::West }]);
    assert!(lifted.says("P", Severity::Warning, &format!("{reaction:.2} kN/m")));
    assert_eq!(about(&balcony(2.0)), []);
}
