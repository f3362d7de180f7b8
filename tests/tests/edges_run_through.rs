//! Top bars of two supports that nearly meet in a short panel run through it.

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use design_engine::floor::{BarChoice, Side};
use edges_support::{plan, same};

#[test]
fn bars_that_nearly_meet_run_through_with_the_heavier_set() {
    // P, 2.0 m, between W and a heavier E, 5.5 m each: 0.3 x 5.5 = 1.65 m from both faces, in 1.75 m clear.
    let floor = plan(&[0.0, 5.5, 7.5, 13.0], &[0.0, 6.0])
        .panel("W", "1-2", "A-B")
        .panel("P", "2-3", "A-B")
        .panel("E", "3-4", "A-B")
        .imposed("E", 12.0)
        .design();
    let [west, east] = [Side::West, Side::East].map(|side| floor.support("P", side));
    assert_eq!(west.bars, east.bars);
    assert!(west.as_provided_mm2_m >= west.as_required_mm2_m.unwrap());
    assert!(east.as_provided_mm2_m >= east.as_required_mm2_m.unwrap());
    for support in [west, east] {
        for side in &support.sides {
            assert_eq!(side.runs_through, side.panel == floor.id("P"));
            if side.runs_through {
                same(side.extension_m, 1.75);
            } else {
                assert!(side.extension_m >= 0.3 * 5.5 - 1e-9);
            }
            same(side.short_extension_m, side.extension_m);
        }
        assert!(!support.alternate_reversed);
    }
}

#[test]
fn bars_that_leave_room_between_them_and_unlike_stated_ones_do_not() {
    // 6.0 m between: 1.8 m from each face leave 2.15 m.
    let room = plan(&[0.0, 5.5, 11.5, 17.0], &[0.0, 6.0]).panel("W", "1-2", "A-B").panel("P", "2-3", "A-B");
    let room = room.panel("E", "3-4", "A-B").design();
    assert!(room.design.supports.iter().flat_map(|support| &support.sides).all(|side| !side.runs_through));
    let short = plan(&[0.0, 5.5, 7.5, 13.0], &[0.0, 6.0]).panel("W", "1-2", "A-B").panel("P", "2-3", "A-B");
    let mut stated = short.panel("E", "3-4", "A-B");
    let west = BarChoice { bar_mm: 12.0, spacing_mm: 150.0 };
    stated.0.chosen_bars.push(floor_grid::layout::ChosenBars {
        panel: "P".to_owned(),
        position: floor_grid::layout::ChosenPosition::Top(Side::West),
        bars: west,
        remark: String::new(),
    });
    let stated = stated.design();
    assert_eq!(stated.support("P", Side::West).bars, west);
    assert!(stated.design.supports.iter().flat_map(|support| &support.sides).all(|side| !side.runs_through));
}
