//! Random floors for property tests, and the same floor turned, mirrored, shifted and shuffled.

use design_engine::floor::{Axis, Side, Spanning, TenthMm};
use floor_grid::layout::*;

use crate::rows::{empty, gridline, panel};

/// Numbers that a floor is made from; proptest shrinks them towards the plainest floor.
pub(crate) struct Choices {
    numbers: std::vec::IntoIter<u16>,
}

impl Choices {
    pub(crate) fn new(numbers: Vec<u16>) -> Choices {
        Choices { numbers: numbers.into_iter() }
    }

    /// A number below `count`; zero when all are used.
    pub(crate) fn below(&mut self, count: u16) -> u16 {
        self.numbers.next().unwrap_or(0) % count
    }

    /// True once in `count` times.
    pub(crate) fn once_in(&mut self, count: u16) -> bool {
        self.below(count) == count - 1
    }
}

/// Cells of a floor by row and column: the panel over each, if any.
pub(crate) type Cells = Vec<Vec<Option<usize>>>;

/// A floor of panels over one or more cells, with voids, steps, joints, lines without support and stated
/// edges. `twins` gives every gridline a second one half a millimetre on, used here and there.
pub(crate) fn floor(choices: &mut Choices, twins: bool) -> (Layout, Cells) {
    let (columns, rows) = (2 + choices.below(5), 2 + choices.below(5));
    let mut layout = empty();
    let x = add_gridlines(&mut layout, choices, Axis::X, columns, twins);
    let y = add_gridlines(&mut layout, choices, Axis::Y, rows, twins);
    let (extents, cells) = fill(choices, columns.into(), rows.into());
    for (index, [west, east, south, north]) in extents.into_iter().enumerate() {
        let mut pick = |lines: &[[GridlineId; 2]], at: usize| lines[at][usize::from(choices.once_in(4))];
        let ends = [pick(&x, west), pick(&x, east), pick(&y, south), pick(&y, north)];
        layout.panels.push(any_panel(choices, index, ends));
    }
    for _ in 0..choices.below(4) {
        let stretch = stretch(choices, &x, &y);
        layout.joints.push(Joint { stretch, remark: String::new() });
    }
    for _ in 0..choices.below(4) {
        let stretch = stretch(choices, &x, &y);
        let kind = [LineSupportKind::Beam, LineSupportKind::None][usize::from(choices.below(2))];
        let width_mm = 200.0 + 50.0 * f64::from(choices.below(4));
        layout.supports.push(LineSupport { stretch, kind, width_mm, remark: String::new() });
    }
    (layout, cells)
}

/// Pairs of gridlines: the line and its twin, or the line twice.
fn add_gridlines(
    layout: &mut Layout,
    choices: &mut Choices,
    axis: Axis,
    bays: u16,
    twins: bool,
) -> Vec<[GridlineId; 2]> {
    let mut position = 0;
    let mut pairs = Vec::new();
    for bay in 0..=bays {
        let mut add = |name: String, position| {
            layout.gridlines.push(gridline(name, axis, position));
            GridlineId(layout.gridlines.len() - 1)
        };
        let name = format!("{}{bay}", axis.word());
        let line = add(name.clone(), position);
        let twin = if twins { add(format!("{name}b"), position + 5) } else { line };
        pairs.push([line, twin]);
        position += 20_000 + 1_000 * i64::from(choices.below(30));
    }
    pairs
}

/// Rectangles over whole cells, by column and row: west, east, south, north; some cells are left empty.
fn fill(choices: &mut Choices, columns: usize, rows: usize) -> (Vec<[usize; 4]>, Cells) {
    let mut cells: Cells = vec![vec![None; columns]; rows];
    let mut extents = Vec::new();
    for row in 0..rows {
        for column in 0..columns {
            if cells[row][column].is_some() || choices.once_in(7) {
                continue;
            }
            let (mut east, mut north) = (column + 1, row + 1);
            while choices.once_in(3) && east < columns && cells[row][east].is_none() {
                east += 1;
            }
            while choices.once_in(3) && north < rows && (column..east).all(|c| cells[north][c].is_none()) {
                north += 1;
            }
            for cells in &mut cells[row..north] {
                cells[column..east].fill(Some(extents.len()));
            }
            extents.push([column, east, row, north]);
        }
    }
    (extents, cells)
}

fn any_panel(choices: &mut Choices, index: usize, [west, east, south, north]: [GridlineId; 4]) -> GridPanel {
    let mut panel = panel(&format!("P{index}"), [west, east], [south, north]);
    panel.data.spanning = match choices.below(12) {
        8 => Spanning::TwoWay,
        9 => Spanning::OneWay(Axis::X),
        10 => Spanning::OneWay(Axis::Y),
        11 => Spanning::Cantilever,
        _ => Spanning::Found,
    };
    panel.stated_edges = [(); 4].map(|()| match choices.below(20) {
        17 => Some(StatedEdge::Continuous),
        18 => Some(StatedEdge::Discontinuous),
        19 => Some(StatedEdge::Free),
        _ => None,
    });
    panel.top_level_mm = [0.0, 0.0, 0.0, 20.0, -10.0, 40.0][usize::from(choices.below(6))];
    panel
}

fn stretch(choices: &mut Choices, x: &[[GridlineId; 2]], y: &[[GridlineId; 2]]) -> Stretch {
    let (along, crossing) = if choices.once_in(2) { (y, x) } else { (x, y) };
    let any = |choices: &mut Choices, lines: &[[GridlineId; 2]]| {
        lines[usize::from(choices.below(u16::try_from(lines.len()).unwrap()))][0]
    };
    let gridline = any(choices, along);
    let (from, to) = (any(choices, crossing), any(choices, crossing));
    let whole = from == to;
    Stretch { gridline, from: (!whole).then_some(from), to: (!whole).then_some(to) }
}

/// How a floor is moved: where each side goes.
pub(crate) type SideMap = fn(Side) -> Side;

/// The floor seen in a mirror that stands north to south.
pub(crate) fn mirrored(layout: &Layout) -> (Layout, SideMap) {
    let to: SideMap = |side| match side {
        Side::East => Side::West,
        Side::West => Side::East,
        other => other,
    };
    let mut layout = layout.clone();
    for line in layout.gridlines.iter_mut().filter(|line| line.axis == Axis::X) {
        line.position = TenthMm(-line.position.0);
    }
    for panel in &mut layout.panels {
        std::mem::swap(&mut panel.x_from, &mut panel.x_to);
        panel.stated_edges.swap(Side::East.index(), Side::West.index());
    }
    (layout, to)
}

/// The floor turned by a quarter to the left: (x, y) goes to (-y, x).
pub(crate) fn turned(layout: &Layout) -> (Layout, SideMap) {
    let to: SideMap = |side| match side {
        Side::North => Side::West,
        Side::East => Side::North,
        Side::South => Side::East,
        Side::West => Side::South,
    };
    let mut turned = layout.clone();
    for line in &mut turned.gridlines {
        if line.axis == Axis::Y {
            line.position = TenthMm(-line.position.0);
        }
        line.axis = line.axis.across();
    }
    for (panel, before) in turned.panels.iter_mut().zip(&layout.panels) {
        (panel.x_from, panel.x_to) = (before.y_to, before.y_from);
        (panel.y_from, panel.y_to) = (before.x_from, before.x_to);
        for side in Side::ALL {
            panel.stated_edges[to(side).index()] = before.stated_edges[side.index()];
        }
        if let Spanning::OneWay(axis) = before.data.spanning {
            panel.data.spanning = Spanning::OneWay(axis.across());
        }
    }
    (turned, to)
}

/// The floor moved off, by 12.3 m east and 45.6 m south.
pub(crate) fn shifted(layout: &Layout) -> (Layout, SideMap) {
    let mut layout = layout.clone();
    for line in &mut layout.gridlines {
        let by = if line.axis == Axis::X { 123_000 } else { -456_000 };
        line.position = TenthMm(line.position.0 + by);
    }
    (layout, |side| side)
}

/// The floor with the rows of every sheet in another order.
pub(crate) fn shuffled(layout: &Layout, choices: &mut Choices) -> (Layout, SideMap) {
    let mut mixed = layout.clone();
    mix(choices, &mut mixed.panels);
    mix(choices, &mut mixed.joints);
    mix(choices, &mut mixed.supports);
    mix(choices, &mut mixed.gridlines);
    let names: Vec<&str> = mixed.gridlines.iter().map(|line| &*line.name).collect();
    let new = |id: &mut GridlineId| {
        let name = &layout.gridline(*id).name;
        *id = GridlineId(names.iter().position(|known| known == name).unwrap());
    };
    for panel in &mut mixed.panels {
        let ends = [&mut panel.x_from, &mut panel.x_to, &mut panel.y_from, &mut panel.y_to];
        ends.into_iter().for_each(new);
    }
    let joints = mixed.joints.iter_mut().map(|joint| &mut joint.stretch);
    for stretch in joints.chain(mixed.supports.iter_mut().map(|support| &mut support.stretch)) {
        new(&mut stretch.gridline);
        stretch.from.iter_mut().chain(&mut stretch.to).for_each(new);
    }
    (mixed, |side| side)
}

fn mix<T>(choices: &mut Choices, rows: &mut [T]) {
    for last in (1..rows.len()).rev() {
        rows.swap(last, usize::from(choices.below(u16::try_from(last + 1).unwrap())));
    }
}
