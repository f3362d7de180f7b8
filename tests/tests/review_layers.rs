//! Covers and layers of bars against the thickness of the panel.

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use design_engine::check::{Check, CheckKind, Place};
use design_engine::criteria::Value;
use design_engine::floor::{BarChoice, Side, Spanning};
use design_engine::query::Severity;
use edges_support::{Designed, Plan, criteria, plan, same};
use floor_grid::layout::{ChosenBars, ChosenPosition};

fn choose(mut floor: Plan, panel: &str, position: ChosenPosition, bar_mm: f64, spacing_mm: f64) -> Plan {
    let (panel, remark) = (panel.to_owned(), String::new());
    let bars = BarChoice { bar_mm, spacing_mm };
    floor.0.chosen_bars.push(ChosenBars { panel, position, bars, remark });
    floor
}

fn two(span_m: f64) -> Plan {
    plan(&[0.0, span_m, 2.0 * span_m], &[0.0, 6.0]).panel("P", "1-2", "A-B").panel("Q", "2-3", "A-B")
}

fn layers(of: &Designed, mark: &str) -> Check {
    let [only] = of.checks(mark, CheckKind::LayersFit, Place::Panel)[..] else {
        panic!("not one check of the layers of {mark}")
    };
    only.clone()
}

#[test]
fn covers_and_layers_of_bars_must_fit_in_the_thickness() {
    let of = |thickness_mm: f64| {
        let mut floor = plan(&[0.0, 3.0, 6.0], &[0.0, 3.2, 6.4]);
        for (mark, x, y) in
            [("P", "1-2", "A-B"), ("Q", "2-3", "A-B"), ("R", "1-2", "B-C"), ("S", "2-3", "B-C")]
        {
            floor = floor.panel(mark, x, y).with(mark, |panel| panel.data.thickness_mm = thickness_mm);
        }
        floor.design_by(&criteria("bar_sizes_mm", Value::Numbers(vec![10.0])))
    };
    // Covers 25 and 25, four layers of 10 mm: 90 mm.
    let (fits, not) = (of(90.0), of(85.0));
    let check = layers(&fits, "P");
    same(check.demand, 90.0);
    same(check.limit, 90.0);
    assert!(check.ok && check.unit == "mm" && check.clause == "geometry");
    let check = layers(&not, "P");
    assert!(!check.ok && !not.panel("P").ok());
    same(check.demand, 90.0);
    assert!(not.says("P", Severity::Warning, "layers fit"));
}

#[test]
fn a_layer_takes_its_largest_bar_and_none_where_it_has_no_bars() {
    let mut floor = two(5.0);
    for (position, bar_mm) in [
        (ChosenPosition::ShortBottom, 16.0),
        (ChosenPosition::LongBottom, 12.0),
        (ChosenPosition::Top(Side::East), 20.0),
    ] {
        floor = choose(floor, "P", position, bar_mm, 150.0);
    }
    let alone = plan(&[0.0, 5.0], &[0.0, 6.0]).panel("P", "1-2", "A-B");
    let alone = choose(
        choose(alone, "P", ChosenPosition::ShortBottom, 16.0, 150.0),
        "P",
        ChosenPosition::LongBottom,
        12.0,
        150.0,
    );
    // Covers 50, bottom 16 and 12, top 20 over the only support.
    same(layers(&floor.design(), "P").demand, 98.0);
    same(layers(&alone.design(), "P").demand, 78.0);
    // A cantilever has its two top layers alone: its own bars and their distribution bars of 10 mm.
    let balcony = choose(
        two(5.0).spanning("Q", Spanning::Cantilever),
        "P",
        ChosenPosition::Top(Side::East),
        20.0,
        100.0,
    );
    same(layers(&balcony.design(), "Q").demand, 80.0);
}
