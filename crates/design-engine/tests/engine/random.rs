//! Random criteria and floors, within the ranges that a floor book allows.

use design_engine::criteria::{Allowed, Criteria, SETTINGS, Value};
use design_engine::floor::{AreaLoads, Axis, Corners, EdgeState, Side, Spanning};
use design_engine::ranges::{
    DEAD_KN_M2, IMPOSED_KN_M2, Range, SPAN_M, SUPPORT_WIDTH_MM, THICKNESS_MM, TOP_LEVEL_MM,
};
use proptest::prelude::*;
use proptest::test_runner::RngSeed;

use crate::grid::Grid;

/// A fixed number of cases from a fixed seed: the same ones every time.
pub(crate) fn config(cases: u32) -> ProptestConfig {
    ProptestConfig {
        cases,
        failure_persistence: None,
        rng_seed: RngSeed::Fixed(8110),
        max_shrink_iters: 200,
        ..ProptestConfig::default()
    }
}

/// A number of a range: its ends as often as what lies between.
pub(crate) fn number_in(range: Range) -> BoxedStrategy<f64> {
    prop_oneof![
        1 => Just(range.least),
        1 => Just(range.greatest),
        4 => range.least..=range.greatest,
    ]
    .boxed()
}

fn value_of(allowed: &'static Allowed) -> BoxedStrategy<Value> {
    match allowed {
        Allowed::Text | Allowed::Date => Just(Value::Blank).boxed(),
        Allowed::Number(range) => number_in(*range).prop_map(Value::Number).boxed(),
        Allowed::OneOf(values) => prop::sample::select(*values).prop_map(Value::Number).boxed(),
        Allowed::Words(words) => {
            prop::sample::select(*words).prop_map(|word| Value::Text(word.to_owned())).boxed()
        }
        Allowed::List(range) => {
            prop::collection::vec(number_in(*range), 1..4).prop_map(Value::Numbers).boxed()
        }
        Allowed::ListOf(values) => {
            prop::sample::subsequence(*values, 1..=values.len()).prop_map(Value::Numbers).boxed()
        }
    }
}

/// Criteria from every setting's own allowed values.
pub(crate) fn any_criteria() -> impl Strategy<Value = Criteria> {
    let values: Vec<BoxedStrategy<Value>> =
        SETTINGS.iter().map(|setting| value_of(&setting.allowed)).collect();
    values.prop_map(|values| {
        let mut values: Vec<(&str, Value)> = SETTINGS.iter().map(|setting| setting.key).zip(values).collect();
        let place = |key: &str| SETTINGS.iter().position(|setting| setting.key == key).unwrap();
        let (least, greatest) = (place("least_spacing_mm"), place("greatest_spacing_mm"));
        // The one pair of settings that can contradict each other.
        if let (Value::Number(a), Value::Number(b)) = (values[least].1.clone(), values[greatest].1.clone()) {
            values[least].1 = Value::Number(a.min(b));
            values[greatest].1 = Value::Number(a.max(b));
        }
        Criteria::new(&values).unwrap()
    })
}

/// What a random panel may be.
#[derive(Debug, Clone)]
pub(crate) struct AnyCell {
    thickness_mm: f64,
    loads: [f64; 3],
    top_level_mm: f64,
    spanning: u8,
    corners: bool,
    void: bool,
    joint: bool,
    stated: Option<(Side, EdgeState)>,
}

fn side() -> impl Strategy<Value = Side> {
    prop::sample::select(&Side::ALL[..])
}

/// A panel from anywhere in the allowed ranges.
fn any_cell() -> impl Strategy<Value = AnyCell> {
    let states = &[EdgeState::Continuous, EdgeState::Discontinuous, EdgeState::Free][..];
    (
        number_in(THICKNESS_MM),
        [number_in(DEAD_KN_M2), number_in(DEAD_KN_M2), number_in(IMPOSED_KN_M2)],
        number_in(TOP_LEVEL_MM),
        0_u8..10,
        any::<[bool; 2]>(),
        0_u8..8,
        prop::option::weighted(0.15, (side(), prop::sample::select(states))),
    )
        .prop_map(|(thickness_mm, loads, top_level_mm, spanning, [corners, joint], void, stated)| {
            AnyCell {
                thickness_mm,
                loads,
                top_level_mm,
                spanning,
                corners,
                void: void == 0,
                joint: joint && void == 1,
                stated,
            }
        })
}

/// A panel as offices and houses have them.
fn likely_cell() -> impl Strategy<Value = AnyCell> {
    (
        prop::sample::select(&[140.0, 150.0, 175.0, 200.0][..]),
        prop::sample::select(&[1.0, 1.5, 3.0][..]),
        prop::sample::select(&[1.5, 2.5, 4.0, 7.5][..]),
        prop::sample::select(&[0.0, 0.0, 0.0, -20.0, 100.0][..]),
        0_u8..12,
    )
        .prop_map(|(thickness_mm, dead, imposed, top_level_mm, kind)| AnyCell {
            thickness_mm,
            loads: [dead, 1.0, imposed],
            top_level_mm,
            spanning: 0,
            corners: kind == 2,
            void: kind == 0,
            joint: kind == 1,
            stated: (kind == 3).then_some((Side::South, EdgeState::Discontinuous)),
        })
}

fn grid_of(columns: Vec<f64>, rows: Vec<f64>, width_mm: f64, cells: Vec<AnyCell>) -> Grid {
    let mut grid = Grid::new(&columns, &rows);
    grid.width_mm = width_mm;
    let marks: Vec<String> = grid.marks();
    for (mark, any) in marks.iter().zip(cells) {
        if any.void && marks.len() > 1 {
            grid = grid.void(mark);
            continue;
        }
        grid = grid.with(mark, |cell| {
            cell.thickness_mm = any.thickness_mm;
            let [finishes_kn_m2, partitions_kn_m2, imposed_kn_m2] = any.loads;
            cell.loads = AreaLoads { finishes_kn_m2, partitions_kn_m2, imposed_kn_m2 };
            cell.top_level_mm = any.top_level_mm;
            cell.spanning = match any.spanning {
                0 => Spanning::OneWay(Axis::X),
                1 => Spanning::OneWay(Axis::Y),
                2 => Spanning::TwoWay,
                3 => Spanning::Cantilever,
                _ => Spanning::Found,
            };
            cell.corners = if any.corners { Corners::FreeToLift } else { Corners::HeldDown };
            if let Some((side, state)) = any.stated {
                cell.stated[side.index()] = Some(state);
            }
        });
        if any.joint {
            grid = grid.joint(mark, Side::East);
        }
    }
    grid
}

/// Floors of up to two by two panels, anything that is allowed.
pub(crate) fn any_floor() -> impl Strategy<Value = Grid> {
    let spans = || prop::collection::vec(number_in(SPAN_M), 1..=2);
    (spans(), spans(), number_in(SUPPORT_WIDTH_MM), prop::collection::vec(any_cell(), 4))
        .prop_map(|(columns, rows, width, cells)| grid_of(columns, rows, width, cells))
}

/// Floors of up to three by three panels such as are built, all two-way or one-way by their shape.
pub(crate) fn likely_floor() -> impl Strategy<Value = Grid> {
    let spans = || prop::collection::vec((60_u8..=130).prop_map(|n| f64::from(n) / 20.0), 1..=3);
    (spans(), spans(), prop::collection::vec(likely_cell(), 9)).prop_map(|(columns, rows, mut cells)| {
        for cell in &mut cells {
            cell.spanning = 9;
        }
        grid_of(columns, rows, 250.0, cells)
    })
}
