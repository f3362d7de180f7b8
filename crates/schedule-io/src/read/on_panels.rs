//! The sheets whose rows belong to a panel: `Openings`, `Wall loads`, `Chosen bars`.

use std::collections::BTreeMap;

use design_engine::floor::BarChoice;
use floor_grid::layout::{ChosenBars, ChosenPosition, Opening, WallLoad};

use super::panels::{Marks, PanelKind};
use super::rows::{Reported, Row};
use crate::sheets::{AXES, POSITIONS};

/// Reads the rows of `Openings`.
pub(crate) fn read_openings<'a>(rows: impl Iterator<Item = Row<'a>>, marks: &Marks) -> Vec<Opening> {
    let opening = |row: Row<'_>| {
        let panel = row.filled("Panel", marks.look_up(&row, "Panel"));
        let [from_west, from_south, width_x, width_y] = ["From west", "From south", "Width x", "Width y"]
            .map(|heading| row.filled(heading, row.number(heading)));
        let remark = row.text("Remark");
        Ok::<_, Reported>(Opening {
            panel: panel?.0,
            from_west_m: from_west?,
            from_south_m: from_south?,
            width_x_m: width_x?,
            width_y_m: width_y?,
            remark: remark?,
        })
    };
    rows.filter_map(|row| opening(row).ok()).collect()
}

/// Reads the rows of `Wall loads`.
pub(crate) fn read_wall_loads<'a>(rows: impl Iterator<Item = Row<'a>>, marks: &Marks) -> Vec<WallLoad> {
    rows.filter_map(|row| wall_load(&row, marks).ok()).collect()
}

fn wall_load(row: &Row<'_>, marks: &Marks) -> Result<WallLoad, Reported> {
    let panel = row.filled("Panel", marks.look_up(row, "Panel"));
    let along = row.filled("Along", row.word("Along", &AXES));
    let [offset, from, to, load] =
        ["Offset", "From", "To", "Load"].map(|heading| row.filled(heading, row.number(heading)));
    let remark = row.text("Remark");
    let (from_m, to_m) = (from?, to?);
    if from_m >= to_m {
        let text = format!("the wall starts at {from_m} m and ends at {to_m} m");
        return Err(row.error("To", text, "let it end beyond its start"));
    }
    Ok(WallLoad {
        panel: panel?.0,
        along: along?,
        offset_m: offset?,
        from_m,
        to_m,
        load_kn_m: load?,
        remark: remark?,
    })
}

/// Reads the rows of `Chosen bars`.
pub(crate) fn read_chosen_bars<'a>(rows: impl Iterator<Item = Row<'a>>, marks: &Marks) -> Vec<ChosenBars> {
    let mut first_rows: BTreeMap<(String, &'static str), u32> = BTreeMap::new();
    rows.filter_map(|row| chosen(&row, marks, &mut first_rows).ok()).collect()
}

fn chosen(
    row: &Row<'_>,
    marks: &Marks,
    first_rows: &mut BTreeMap<(String, &'static str), u32>,
) -> Result<ChosenBars, Reported> {
    let panel = row.filled("Panel", marks.look_up(row, "Panel"));
    let position = row.filled("Position", row.word("Position", &POSITIONS));
    let size = row.filled("Size", row.number("Size"));
    let spacing = row.filled("Spacing", row.number("Spacing"));
    let remark = row.text("Remark");
    let ((panel, kind), (position, for_loose)) = (panel?, position?);
    if for_loose.is_some_and(|loose| loose != (kind == PanelKind::Loose)) {
        return Err(other_kind(row, &panel, kind));
    }
    let place = match position {
        ChosenPosition::ShortBottom => "short bottom",
        ChosenPosition::LongBottom => "long bottom",
        ChosenPosition::Top(side) => side.word(),
    };
    if let Some(first) = first_rows.insert((panel.clone(), place), row.raw.number) {
        let text = format!("bars for this place of panel {panel} are already chosen in row {first}");
        return Err(row.error("Position", text, "keep one of the two rows"));
    }
    let bars = BarChoice { bar_mm: size?, spacing_mm: spacing? };
    Ok(ChosenBars { panel, position, bars, remark: remark? })
}

/// A position on plan for a loose panel, or a loose panel's edge for one on gridlines.
fn other_kind(row: &Row<'_>, panel: &str, kind: PanelKind) -> Reported {
    let loose = kind == PanelKind::Loose;
    let fitting: Vec<&str> = POSITIONS
        .words
        .into_iter()
        .zip(POSITIONS.mean)
        .filter(|(_, (_, for_loose))| for_loose.is_none_or(|for_loose| for_loose == loose))
        .map(|(word, _)| word)
        .collect();
    let what = if loose { "a loose panel" } else { "a panel on gridlines" };
    row.refuse(
        "Position",
        &fitting.join(" | "),
        format!("panel {panel} is {what}: name one of its positions"),
    )
}
