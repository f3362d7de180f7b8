//! Openings of one panel judged together: what they take out of one line across the panel, and those that lie close.

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use design_engine::floor::BarChoice;
use design_engine::query::Severity;
use edges_support::random::config;
use edges_support::{Designed, Plan, plan};
use floor_grid::layout::{ChosenBars, ChosenPosition};
use proptest::prelude::*;

/// P, 5 x 6 m, alone; bottom bars 12 mm at 200 along x and 10 mm at 150 along y.
fn floor(openings: &[([f64; 2], [f64; 2])]) -> Plan {
    let mut floor = plan(&[0.0, 5.0], &[0.0, 6.0]).panel("P", "1-2", "A-B");
    for (position, bar_mm, spacing_mm) in
        [(ChosenPosition::ShortBottom, 12.0, 200.0), (ChosenPosition::LongBottom, 10.0, 150.0)]
    {
        let (panel, remark) = ("P".to_owned(), String::new());
        floor.0.chosen_bars.push(ChosenBars {
            panel,
            position,
            bars: BarChoice { bar_mm, spacing_mm },
            remark,
        });
    }
    openings.iter().fold(floor, |floor, (corner, widths)| floor.opening("P", *corner, *widths))
}

fn over_quarter(of: &Designed) -> Vec<bool> {
    of.panel("P").openings.iter().map(|opening| opening.over_quarter_of_span).collect()
}

fn displaced(of: &Designed) -> Vec<bool> {
    of.panel("P").openings.iter().map(|opening| opening.displaced).collect()
}

#[test]
fn openings_on_one_line_across_the_panel_count_together() {
    // 0.7 + 0.7 m of 5 m on the lines they share: 28 %. The third is on no line with another.
    let rows = [([0.6, 1.0], [0.7, 0.7]), ([3.0, 1.3], [0.7, 0.7]), ([1.6, 4.0], [0.7, 0.7])];
    let floor = floor(&rows).design();
    assert_eq!(over_quarter(&floor), [true, true, false]);
    assert!(floor.says("P", Severity::Warning, "opening 1, 0.70 x 0.70 m: with others on one line"));
    assert!(floor.says("P", Severity::Warning, "opening 2, 0.70 x 0.70 m: with others on one line"));
    assert!(floor.says("P", Severity::Note, "opening 3, 0.70 x 0.70 m: bars are cut"));
}

#[test]
fn openings_that_pass_each_other_do_not_count_together() {
    // One ends at the line at which the other begins, along x and along y.
    let floor = floor(&[([0.8, 1.0], [0.7, 0.8]), ([3.0, 1.8], [0.7, 0.8])]).design();
    assert_eq!(over_quarter(&floor), [false, false]);
}

#[test]
fn what_overlaps_is_taken_once() {
    // 0.8 and 0.8 m that overlap by 0.4 m: 1.2 m of 5 m, under a quarter.
    let floor = floor(&[([1.0, 2.0], [0.8, 0.8]), ([1.4, 2.4], [0.8, 0.8])]).design();
    assert_eq!(over_quarter(&floor), [false, false]);
    assert!(floor.says("P", Severity::Warning, "openings of P overlap: 1 with 2"));
}

#[test]
fn openings_that_together_take_over_half_of_a_span_leave_no_panel_to_design() {
    let both = floor(&[([0.5, 1.0], [1.25, 0.8]), ([3.0, 1.0], [1.3, 0.8])]).design();
    assert!(both.panel("P").not_designed.is_some() && both.panel("P").sections.is_empty());
    assert!(both.says("P", Severity::NotDesigned, "openings take more than half of a span"));
    // Half of it to the millimetre is designed, with a warning.
    let half = floor(&[([0.5, 1.0], [1.25, 0.8]), ([3.0, 1.0], [1.25, 0.8])]).design();
    assert!(half.panel("P").not_designed.is_none());
    assert_eq!(over_quarter(&half), [true, true]);
}

#[test]
fn openings_closer_than_two_spaces_are_moved_round_as_one() {
    let row = |count: u8, side: f64, gap: f64| {
        let corner = |i: u8| [1.0 + f64::from(i) * (side + gap), 2.4];
        displaced(&floor(&(0..count).map(|i| (corner(i), [side; 2])).collect::<Vec<_>>()).design())
    };
    // The closest spacing is 150: openings under 300 mm apart are one.
    assert_eq!(row(2, 0.2, 0.29), [false, false]);
    assert_eq!(row(2, 0.2, 0.31), [true, true]);
    // Two of 100 mm with 80 between are 280 mm over all, three are 460.
    assert_eq!(row(2, 0.1, 0.08), [true, true]);
    assert_eq!(row(3, 0.1, 0.08), [false, false, false]);
    // Across a corner the straight distance counts: 200 both ways is 283 mm, 220 both ways 311.
    let corner = |gap: f64| {
        let rows = [([1.0, 2.4], [0.2, 0.2]), ([1.2 + gap, 2.6 + gap], [0.2, 0.2])];
        displaced(&floor(&rows).design())
    };
    assert_eq!(corner(0.20), [false, false]);
    assert_eq!(corner(0.22), [true, true]);
}

/// Cells of 0.25 m, 20 x 24 of them, as x and y.
const CELLS: [usize; 2] = [20, 24];

/// Second method: cells of each line marked one by one. Gives for each opening the most cells taken on a line through it,
/// along x and along y.
fn most_taken(openings: &[[[usize; 2]; 2]]) -> Vec<[usize; 2]> {
    let covers = |opening: &[[usize; 2]; 2], cell: [usize; 2]| {
        (0..2).all(|axis| (opening[axis][0]..opening[axis][1]).contains(&cell[axis]))
    };
    let taken = |axis: usize, line: usize| {
        let cell = |along: usize| if axis == 0 { [along, line] } else { [line, along] };
        (0..CELLS[axis]).filter(|along| openings.iter().any(|o| covers(o, cell(*along)))).count()
    };
    let through = |opening: &[[usize; 2]; 2], axis: usize| {
        let [from, to] = opening[1 - axis];
        (from..to).map(|line| taken(axis, line)).max().unwrap()
    };
    openings.iter().map(|opening| [through(opening, 0), through(opening, 1)]).collect()
}

proptest! {
    #![proptest_config(config(60))]

    #[test]
    fn shares_of_a_span_are_those_of_cells_counted_one_by_one(
        rows in prop::collection::vec((2_usize..=16, 2_usize..=20, 1_usize..=4, 1_usize..=4), 1..=5),
    ) {
        let cells: Vec<[[usize; 2]; 2]> = rows
            .iter()
            .map(|(x, y, wide, high)| [[*x, (x + wide).min(CELLS[0])], [*y, (y + high).min(CELLS[1])]])
            .collect();
        let metres = |cell: usize| f64::from(u8::try_from(cell).unwrap()) / 4.0;
        let opening = |[x, y]: &[[usize; 2]; 2]| {
            ([metres(x[0]), metres(y[0])], [metres(x[1] - x[0]), metres(y[1] - y[0])])
        };
        let design = floor(&cells.iter().map(opening).collect::<Vec<_>>()).design();
        let taken = most_taken(&cells);
        // Half of 20 and of 24 cells; a quarter of them.
        if taken.iter().any(|[x, y]| *x > 10 || *y > 12) {
            prop_assert!(design.panel("P").not_designed.is_some());
        } else {
            prop_assert!(design.panel("P").not_designed.is_none());
            let expected: Vec<bool> = taken.iter().map(|[x, y]| *x > 5 || *y > 6).collect();
            prop_assert_eq!(over_quarter(&design), expected);
        }
    }
}
