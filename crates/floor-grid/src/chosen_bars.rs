//! The engineer's own bars, put to the place they are for.

use std::collections::BTreeMap;

use design_engine::floor::{BarChoice, Floor, PanelId, Side, SupportId};
use design_engine::query::{Query, Severity, Subject};

use crate::layout::{ChosenBars, ChosenPosition, Layout};

/// Who chose the bars of a support: data row and panel.
type Choosers = BTreeMap<SupportId, (usize, PanelId)>;

/// Hands every row of `Chosen bars` to its panel or support.
pub(crate) fn place_chosen_bars(layout: &Layout, floor: &mut Floor, queries: &mut Vec<Query>) {
    let marks: BTreeMap<String, PanelId> =
        floor.panels.iter().enumerate().map(|(index, panel)| (panel.mark.clone(), PanelId(index))).collect();
    let mut choosers = Choosers::new();
    for (index, row) in layout.chosen_bars.iter().enumerate() {
        let Some(id) = marks.get(&row.panel).copied() else {
            let text = format!("there is no panel {}", row.panel);
            queries.push(fault(index, text, "correct the mark"));
            continue;
        };
        match row.position {
            ChosenPosition::ShortBottom => place_bottom(floor, id, 0, row, index, queries),
            ChosenPosition::LongBottom => place_bottom(floor, id, 1, row, index, queries),
            ChosenPosition::Top(side) => place_top(floor, id, side, row, index, &mut choosers, queries),
        }
    }
}

fn fault(index: usize, text: String, remedy: impl Into<String>) -> Query {
    Query::new(Severity::Error, Subject::Row { sheet: "Chosen bars", index }, text, remedy)
}

fn differ(one: BarChoice, other: BarChoice) -> bool {
    (one.bar_mm - other.bar_mm).abs() > 1e-9 || (one.spacing_mm - other.spacing_mm).abs() > 1e-9
}

fn words(bars: BarChoice) -> String {
    format!("{} at {}", bars.bar_mm, bars.spacing_mm)
}

fn place_bottom(
    floor: &mut Floor,
    id: PanelId,
    span: usize,
    row: &ChosenBars,
    index: usize,
    queries: &mut Vec<Query>,
) {
    let chosen = &mut floor.panels[id.0].chosen_bottom[span];
    match *chosen {
        Some(before) if differ(before, row.bars) => {
            let text = format!(
                "{} has two choices for one place: {} and {}",
                row.panel,
                words(before),
                words(row.bars)
            );
            queries.push(fault(index, text, "keep one row"));
        }
        _ => *chosen = Some(row.bars),
    }
}

fn place_top(
    floor: &mut Floor,
    id: PanelId,
    side: Side,
    row: &ChosenBars,
    index: usize,
    choosers: &mut Choosers,
    queries: &mut Vec<Query>,
) {
    let panel = floor.panel(id);
    let edge = panel.edge(side);
    let supports: Vec<SupportId> = edge.segments.iter().filter_map(|segment| segment.support).collect();
    if supports.is_empty() {
        let edge_word = if panel.is_loose() { "" } else { " edge" };
        let text = format!(
            "top bars are chosen for the {}{edge_word} of {}, but none run over it: {}",
            panel.side_word(side),
            row.panel,
            edge.why
        );
        queries.push(fault(index, text, "choose bars for a continuous edge, or state the edge continuous"));
        return;
    }
    for support in supports {
        match (floor.support(support).chosen, choosers.get(&support)) {
            (Some(before), Some((_, other))) if differ(before, row.bars) => {
                let other = &floor.panel(*other).mark;
                let text = if *other == row.panel {
                    format!(
                        "{other} has two choices for one support: {} and {}",
                        words(before),
                        words(row.bars)
                    )
                } else {
                    format!(
                        "{other} and {} choose differently for the support between them: {} and {}",
                        row.panel,
                        words(before),
                        words(row.bars)
                    )
                };
                queries.push(fault(index, text, "choose the same bars in both rows, or keep one"));
            }
            _ => {
                floor.supports[support.0].chosen = Some(row.bars);
                choosers.entry(support).or_insert((index, id));
            }
        }
    }
}
