//! The outputs of a small invented floor that the grid lays out and the engine designs.

use calamine::Data;
use design_engine::criteria::Criteria;
use design_engine::floor::{AreaLoads, Axis, Corners, Spanning, TenthMm};
use floor_grid::layout::{GridPanel, Gridline, GridlineId, Layout, PanelData};

use super::sample::{Sample, criteria};
use super::{read_back, results};
use crate::book::PlacedQuery;

/// Gridlines 1 to 5 at these x, A to D at these y, m.
const X: [f64; 5] = [0.0, 5.6, 10.4, 16.9, 19.3];
const Y: [f64; 4] = [0.0, 6.3, 11.5, 17.8];

fn layout(criteria: &Criteria) -> Layout {
    let lines = |names: [&'static str; 5], axis, at: &'static [f64]| {
        at.iter().zip(names).map(move |(position, name)| Gridline {
            name: name.to_owned(),
            axis,
            position: TenthMm::from_m(*position),
        })
    };
    let gridlines = lines(["1", "2", "3", "4", "5"], Axis::X, &X)
        .chain(lines(["A", "B", "C", "D", ""], Axis::Y, &Y))
        .collect();
    let mut panels = Vec::new();
    for row in 0..Y.len() - 1 {
        for column in 0..X.len() - 1 {
            let data = PanelData {
                mark: format!("P{}", panels.len() + 1),
                // One panel is too thin for its span.
                thickness_mm: if (row, column) == (2, 2) { 110.0 } else { 175.0 },
                loads: AreaLoads {
                    finishes_kn_m2: 1.4,
                    partitions_kn_m2: 0.8,
                    imposed_kn_m2: if row == 1 { 4.0 } else { 2.5 },
                },
                spanning: Spanning::Found,
                corners: Corners::HeldDown,
                corners_stated: false,
                remarks: String::new(),
            };
            panels.push(GridPanel {
                data,
                x_from: GridlineId(column),
                x_to: GridlineId(column + 1),
                y_from: GridlineId(X.len() + row),
                y_to: GridlineId(X.len() + row + 1),
                top_level_mm: 0.0,
                stated_edges: [None; 4],
                zone: String::new(),
            });
        }
    }
    Layout {
        gridlines,
        panels,
        tolerance: TenthMm(10),
        support_width_mm: criteria.support_width_mm,
        ..Layout::default()
    }
}

fn designed() -> Sample {
    let mut sample = Sample::new();
    sample.book.criteria = criteria(&[]);
    sample.book.layout = layout(&sample.book.criteria);
    let (floor, queries) = floor_grid::lay_out(&sample.book.layout);
    sample.design = design_engine::design_floor(&floor, &sample.book.criteria);
    sample.floor = floor;
    let queries = queries.into_iter().chain(sample.design.queries.clone());
    sample.queries = queries.map(|query| PlacedQuery { query, place: None }).collect();
    sample
}

#[test]
fn a_designed_floor_reads_back_equal() {
    let sample = designed();
    let workbook = read_back(&sample);
    assert_eq!(workbook.differences(&results(&sample)), Vec::<String>::new());
    assert_eq!(workbook.rows("Panels").len(), 12);
    assert!(workbook.rows("Checks").len() > 12 * 8);
    assert!(workbook.rows("Supports").len() >= 12);
    assert_eq!(workbook.cell("Panels", 10, "", "Result"), Data::String("FAILS: deflection".to_owned()));
}
