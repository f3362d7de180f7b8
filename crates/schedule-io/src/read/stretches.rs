//! The `Joints` and `Supports` sheets: stretches of gridlines.

use design_engine::criteria::Criteria;
use floor_grid::layout::{Joint, LineSupport, Stretch};

use super::gridlines::GridlineNames;
use super::rows::{Reported, Row};
use crate::sheets::KINDS;

fn stretch(row: &Row<'_>, gridlines: &GridlineNames) -> Result<Stretch, Reported> {
    let own = row.filled("Gridline", gridlines.find(row, "Gridline", None));
    // Without the gridline's own axis, the ends can only be looked up by name.
    let across = own.ok().map(|(_, axis)| axis.across());
    let from = gridlines.look_up(row, "From", across);
    let to = gridlines.look_up(row, "To", across);
    let ((gridline, _), from, to) = (own?, from?, to?);
    if from.is_some() && from == to {
        let text = format!("read {}; it is also the other end", row.content("To").shown());
        return Err(row.error("To", text, "name two different gridlines, or leave both ends blank"));
    }
    Ok(Stretch { gridline, from, to })
}

/// Reads the rows of `Joints`.
pub(crate) fn read_joints<'a>(rows: impl Iterator<Item = Row<'a>>, gridlines: &GridlineNames) -> Vec<Joint> {
    let joint = |row: Row<'_>| {
        let (stretch, remark) = (stretch(&row, gridlines), row.text("Remark"));
        Ok::<_, Reported>(Joint { stretch: stretch?, remark: remark? })
    };
    rows.filter_map(|row| joint(row).ok()).collect()
}

/// Reads the rows of `Supports`.
pub(crate) fn read_supports<'a>(
    rows: impl Iterator<Item = Row<'a>>,
    gridlines: &GridlineNames,
    criteria: &Criteria,
) -> Vec<LineSupport> {
    let support = |row: Row<'_>| {
        let stretch = stretch(&row, gridlines);
        let kind = row.filled("Kind", row.word("Kind", &KINDS));
        let width = row.number("Width");
        let remark = row.text("Remark");
        Ok::<_, Reported>(LineSupport {
            stretch: stretch?,
            kind: kind?,
            width_mm: width?.unwrap_or(criteria.support_width_mm),
            remark: remark?,
        })
    };
    rows.filter_map(|row| support(row).ok()).collect()
}
