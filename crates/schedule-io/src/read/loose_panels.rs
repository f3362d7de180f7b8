//! The `Loose panels` sheet.

use design_engine::criteria::Criteria;
use floor_grid::layout::{LoosePanel, StatedEdge};

use super::panels::{Marks, PanelKind, data};
use super::rows::{Reported, Row};
use crate::place::Places;
use crate::sheets::{EDGES, LOOSE_SPANNING};

/// Reads the rows of `Loose panels`; `sheet` is its index among the places.
pub(crate) fn read<'a>(
    rows: impl Iterator<Item = Row<'a>>,
    criteria: &Criteria,
    sheet: usize,
    places: &mut Places,
    marks: &mut Marks,
) -> Vec<LoosePanel> {
    rows.filter_map(|row| panel(&row, criteria, (sheet, &mut *places), marks).ok()).collect()
}

fn panel(
    row: &Row<'_>,
    criteria: &Criteria,
    places: (usize, &mut Places),
    marks: &mut Marks,
) -> Result<LoosePanel, Reported> {
    let data = data(row, PanelKind::Loose, &LOOSE_SPANNING, criteria, places, marks);
    let short = row.filled("Short span", row.number("Short span"));
    let long = row.filled("Long span", row.number("Long span"));
    let edges = ["Long edge 1", "Long edge 2", "Short edge 1", "Short edge 2"]
        .map(|heading| row.word(heading, &EDGES));
    let (short_span_m, long_span_m) = (short?, long?);
    if short_span_m > long_span_m {
        return Err(row.error(
            "Short span",
            format!("the short span, {short_span_m} m, is longer than the long span, {long_span_m} m"),
            "exchange the two spans, and the edges with them",
        ));
    }
    let edges = edges.map(|edge| edge.map(|edge| edge.unwrap_or(StatedEdge::Discontinuous)));
    let [long_1, long_2, short_1, short_2] = edges;
    Ok(LoosePanel { data: data?, short_span_m, long_span_m, edges: [long_1?, long_2?, short_1?, short_2?] })
}
