//! What holds of any floor, from its layout to the loads on its beams.

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use design_engine::design_floor;
use design_engine::query::Severity;
use edges_support::moved::{difference, mirrored, renumbered, shifted, shuffled, turned};
use edges_support::random::{choices, config, criteria, floor};
use floor_grid::lay_out;
use proptest::prelude::*;

/// Whether a layout has an error: it must not be designed.
fn at_fault(plan: &edges_support::Plan) -> bool {
    lay_out(&plan.0).1.iter().any(|query| query.severity == Severity::Error)
}

proptest! {
    #![proptest_config(config(150))]

    #[test]
    fn a_floor_drawn_another_way_has_the_same_steel_and_loads(mut choices in choices()) {
        let plan = floor(&mut choices);
        prop_assume!(!at_fault(&plan));
        let criteria = criteria(&mut choices);
        let design = plan.design_by(&criteria);
        let mut moves = vec![mirrored(&plan), shifted(&plan), renumbered(&plan), shuffled(&plan, &mut choices)];
        // Where nothing but the drawing tells which span of a square panel is the short one, turning it changes it.
        let by_direction = |query: &design_engine::query::Query| query.text.contains("short span is taken along x");
        if !design.queries.iter().any(by_direction) {
            moves.push(turned(&plan));
        }
        for moved in moves {
            prop_assert_eq!(difference(&design, &moved.plan.design_by(&criteria), &moved), None);
        }
    }
}

proptest! {
    #![proptest_config(config(200))]

    #[test]
    fn a_floor_is_designed_in_finite_numbers(mut choices in choices()) {
        let (floor, _) = lay_out(&floor(&mut choices).0);
        let text = format!("{:?}", design_floor(&floor, &criteria(&mut choices)));
        let words = text.split(|c: char| !c.is_alphanumeric());
        prop_assert_eq!(words.filter(|word| ["NaN", "inf"].contains(word)).count(), 0);
    }
}
