//! Large floors lay out in a time that grows with their size, not with its square.

use design_engine::floor::{Axis, EdgeState, SupportKind};
use floor_grid::lay_out;
use floor_grid::layout::*;

use crate::rows::{empty, gridline, panel};

/// Square bays of 4 m, with a beam named on every gridline.
fn bays(columns: usize, rows: usize) -> Layout {
    let mut layout = empty();
    for (axis, bays) in [(Axis::X, columns), (Axis::Y, rows)] {
        for (bay, position) in (0..=bays).zip((0..).step_by(40_000)) {
            let name = format!("{}{bay}", axis.word());
            layout.supports.push(LineSupport {
                stretch: Stretch { gridline: GridlineId(layout.gridlines.len()), from: None, to: None },
                kind: LineSupportKind::Beam,
                width_mm: 300.0,
                remark: String::new(),
            });
            layout.gridlines.push(gridline(name, axis, position));
        }
    }
    for row in 0..rows {
        for column in 0..columns {
            let x = [column, column + 1].map(GridlineId);
            let y = [columns + 1 + row, columns + 2 + row].map(GridlineId);
            layout.panels.push(panel(&format!("P{column}-{row}"), x, y));
        }
    }
    layout
}

fn continuous_edges(columns: usize, rows: usize) -> usize {
    let (floor, queries) = lay_out(&bays(columns, rows));
    assert!(queries.is_empty());
    assert_eq!(floor.supports.len(), (columns - 1) * rows + columns * (rows - 1));
    assert!(floor.supports.iter().all(|support| support.kind == SupportKind::Hogging));
    let edges = floor.panels.iter().flat_map(|panel| &panel.edges);
    edges.filter(|edge| edge.state == EdgeState::Continuous).count()
}

#[test]
fn a_hundred_thousand_square_panels_share_all_inner_edges() {
    assert_eq!(continuous_edges(400, 250), 4 * 400 * 250 - 2 * (400 + 250));
}

#[test]
fn a_row_of_twenty_thousand_panels_is_no_slower_than_a_square_floor() {
    assert_eq!(continuous_edges(20_000, 1), 2 * 19_999);
}
