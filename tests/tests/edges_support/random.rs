//! Random floors of likely panels: voids, panels over several bays, joints, steps, cantilevers, walls, openings.

use design_engine::criteria::{Criteria, Value};
use design_engine::floor::{Axis, Corners, Spanning};
use proptest::prelude::*;
use proptest::test_runner::RngSeed;

use super::{Plan, plan};

/// A fixed number of cases from a fixed seed: the same ones every time.
pub(crate) fn config(cases: u32) -> ProptestConfig {
    ProptestConfig {
        cases,
        failure_persistence: None,
        rng_seed: RngSeed::Fixed(1997),
        max_shrink_iters: 400,
        ..ProptestConfig::default()
    }
}

/// Numbers that a floor is made from; zeros make the plainest.
#[derive(Clone)]
pub(crate) struct Choices(std::vec::IntoIter<u16>);

impl std::fmt::Debug for Choices {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "{} numbers", self.0.len())
    }
}

impl Choices {
    pub(crate) fn below(&mut self, count: u16) -> u16 {
        self.0.next().unwrap_or(0) % count
    }

    /// True once in `count` times.
    fn once_in(&mut self, count: u16) -> bool {
        self.below(count) == count - 1
    }

    /// From `least` in so many steps.
    fn stepped(&mut self, least: f64, step: f64, steps: u16) -> f64 {
        least + step * f64::from(self.below(steps))
    }
}

pub(crate) fn choices() -> impl Strategy<Value = Choices> {
    prop::collection::vec(any::<u16>(), 400).prop_map(|numbers| Choices(numbers.into_iter()))
}

/// Criteria that change how edges and supports are designed; all at their defaults half of the time.
pub(crate) fn criteria(choices: &mut Choices) -> Criteria {
    if choices.below(2) == 0 {
        return Criteria::default();
    }
    let mut word = |words: [&str; 2]| Value::Text(words[usize::from(choices.below(2))].to_owned());
    let mut values = vec![
        ("coefficients", word(["tabulated", "equations"])),
        ("span_basis", word(["centre to centre", "clear plus effective depth"])),
        ("top_bars", word(["alternate reversed", "all full length"])),
        ("bottom_bars", word(["full length", "alternate curtailed"])),
    ];
    values.push(("balance_threshold_pct", Value::Number([0.0, 10.0, 25.0][usize::from(choices.below(3))])));
    Criteria::new(&values).unwrap()
}

/// Number of a gridline: `x` 1, 2, 3, `y` A, B, C.
fn names(x: u16, y: u16) -> (String, String) {
    let letter = char::from(b'A' + u8::try_from(y).unwrap());
    ((x + 1).to_string(), letter.to_string())
}

/// A floor of two to four bays each way.
pub(crate) fn floor(choices: &mut Choices) -> Plan {
    let (columns, rows) = (2 + choices.below(3), 2 + choices.below(3));
    let balconies = choices.once_in(3);
    let mut positions = |count: u16, first_narrow: bool| {
        let mut at = vec![0.0];
        for bay in 0..count {
            let narrow = first_narrow && bay == 0;
            let span = match choices.below(4) {
                _ if narrow => choices.stepped(1.0, 0.1, 8),
                0 => choices.stepped(2.2, 0.1, 12),
                _ => choices.stepped(3.4, 0.1, 38),
            };
            at.push(at[at.len() - 1] + span);
        }
        at
    };
    let (x, y) = (positions(columns, balconies), positions(rows, false));
    let mut plan = plan(&x, &y);
    let mut taken = vec![vec![false; usize::from(columns)]; usize::from(rows)];
    for row in 0..rows {
        for column in 0..columns {
            let balcony = balconies && column == 0;
            if taken[usize::from(row)][usize::from(column)] || (!balcony && choices.once_in(8)) {
                continue;
            }
            let (mut east, mut north) = (column + 1, row + 1);
            let free = |taken: &[Vec<bool>], r: u16, c: u16| !taken[usize::from(r)][usize::from(c)];
            if !balcony && choices.once_in(6) && east < columns && free(&taken, row, east) {
                east += 1;
            }
            if choices.once_in(6) && north < rows && (column..east).all(|c| free(&taken, north, c)) {
                north += 1;
            }
            for cells in &mut taken[usize::from(row)..usize::from(north)] {
                cells[usize::from(column)..usize::from(east)].fill(true);
            }
            plan = add_panel(plan, choices, balcony, [column, east], [row, north]);
        }
    }
    lines(plan, choices, columns, rows)
}

fn add_panel(plan: Plan, choices: &mut Choices, balcony: bool, x: [u16; 2], y: [u16; 2]) -> Plan {
    let mark = format!("P{}", plan.0.panels.len());
    let ((west, south), (east, north)) = (names(x[0], y[0]), names(x[1], y[1]));
    let mut plan =
        plan.panel(&mark, &format!("{west}-{east}"), &format!("{south}-{north}")).with(&mark, |panel| {
            panel.data.thickness_mm = choices.stepped(150.0, 25.0, 4);
            panel.data.loads.finishes_kn_m2 = choices.stepped(1.0, 0.5, 4);
            panel.data.loads.imposed_kn_m2 = [1.5, 2.5, 3.0, 5.0, 7.5][usize::from(choices.below(5))];
            panel.top_level_mm = [0.0, 0.0, 0.0, 0.0, -20.0, -40.0][usize::from(choices.below(6))];
            panel.data.spanning = match choices.below(12) {
                _ if balcony => Spanning::Cantilever,
                10 => Spanning::OneWay(Axis::X),
                11 => Spanning::OneWay(Axis::Y),
                _ => Spanning::Found,
            };
            let free = choices.once_in(10);
            panel.data.corners = if free { Corners::FreeToLift } else { Corners::HeldDown };
        });
    let rect = |plan: &Plan, of: &str| {
        let line = |name: &str| plan.0.gridlines.iter().find(|line| line.name == name).unwrap().position.m();
        match of {
            "x" => line(&east) - line(&west),
            _ => line(&north) - line(&south),
        }
    };
    let (width, height) = (rect(&plan, "x"), rect(&plan, "y"));
    if choices.once_in(6) {
        let (along, length, across) =
            if balcony || choices.once_in(2) { (Axis::Y, height, width) } else { (Axis::X, width, height) };
        let offset = across * choices.stepped(0.1, 0.1, 9);
        let ends = [length * choices.stepped(0.0, 0.1, 4), length * choices.stepped(0.6, 0.1, 5)];
        plan = plan.wall(&mark, along, rounded(offset), ends.map(rounded), choices.stepped(1.0, 0.5, 8));
    }
    if choices.once_in(6) {
        let widths = [width, height].map(|span| rounded(span * choices.stepped(0.04, 0.04, 6)));
        let corner = [width, height].map(|span| rounded(span * choices.stepped(0.1, 0.1, 5)));
        plan = plan.opening(&mark, corner, widths);
    }
    plan
}

fn rounded(metres: f64) -> f64 {
    (metres * 1000.0).round() / 1000.0
}

/// Joints over part or all of a gridline, and at times a stretch without support.
fn lines(mut plan: Plan, choices: &mut Choices, columns: u16, rows: u16) -> Plan {
    for _ in 0..choices.below(3) {
        let (gridline, between) = stretch(choices, columns, rows);
        plan = plan.joint(&gridline, &between);
    }
    if choices.once_in(5) {
        let (gridline, between) = stretch(choices, columns, rows);
        plan = plan.unsupported(&gridline, &between);
    }
    plan
}

fn stretch(choices: &mut Choices, columns: u16, rows: u16) -> (String, String) {
    let north_south = choices.once_in(2);
    let (lines, crossing) = if north_south { (columns, rows) } else { (rows, columns) };
    let at = choices.below(lines + 1);
    let from = choices.below(crossing);
    let to = from + 1 + choices.below(crossing - from);
    if north_south {
        (names(at, 0).0, format!("{}-{}", names(0, from).1, names(0, to).1))
    } else {
        (names(0, at).1, format!("{}-{}", names(from, 0).0, names(to, 0).0))
    }
}
