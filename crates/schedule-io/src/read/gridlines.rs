//! The `Gridlines` sheet, and looking gridlines up by name.

use std::collections::BTreeMap;

use design_engine::floor::{Axis, TenthMm};
use floor_grid::layout::{Gridline, GridlineId};

use super::rows::{Field, Reported, Row};
use crate::place::Places;
use crate::sheets::AXES;

/// The gridlines of a book by name.
#[derive(Debug, Default)]
pub(crate) struct GridlineNames {
    by_name: BTreeMap<String, Named>,
    /// False where some names could not be read, so that an unknown name is no new fault.
    pub(crate) complete: bool,
}

#[derive(Debug, Clone, Copy)]
struct Named {
    /// None where the row has a fault.
    id: Option<GridlineId>,
    axis: Option<Axis>,
}

/// Reads the rows of `Gridlines`.
pub(crate) fn read<'a>(
    rows: impl Iterator<Item = Row<'a>>,
    complete: bool,
    places: &mut Places,
) -> (Vec<Gridline>, GridlineNames) {
    let mut names = GridlineNames { by_name: BTreeMap::new(), complete };
    let mut gridlines = Vec::new();
    for row in rows {
        let name = row.filled("Gridline", row.name("Gridline"));
        let axis = row.filled("Axis", row.word("Axis", &AXES));
        let position = row.filled("Position", row.number("Position"));
        let Ok(name) = name else {
            names.complete = false;
            continue;
        };
        if let Some(first) = places.gridlines.get(&name) {
            let text = format!("the gridline {name} is already in row {first}");
            row.error("Gridline", text, "give each gridline its own name");
            continue;
        }
        places.gridlines.insert(name.clone(), row.raw.number);
        let id = GridlineId(gridlines.len());
        let whole = axis.is_ok() && position.is_ok();
        names.by_name.insert(name.clone(), Named { id: whole.then_some(id), axis: axis.ok() });
        if let (Ok(axis), Ok(position)) = (axis, position) {
            gridlines.push(Gridline { name, axis, position: TenthMm::from_m(position) });
        }
    }
    (gridlines, names)
}

impl GridlineNames {
    /// The gridline that a cell names, which must be of an axis where one is asked for.
    pub(crate) fn look_up(&self, row: &Row<'_>, heading: &str, axis: Option<Axis>) -> Field<GridlineId> {
        Ok(self.find(row, heading, axis)?.map(|(id, _)| id))
    }

    /// The same, with its axis.
    pub(crate) fn find(&self, row: &Row<'_>, heading: &str, axis: Option<Axis>) -> Field<(GridlineId, Axis)> {
        if !row.fits {
            return Err(Reported);
        }
        let Some(name) = row.name(heading)? else { return Ok(None) };
        let Some(named) = self.by_name.get(&name) else {
            return Err(if self.complete { self.unknown(row, heading, &name, axis) } else { Reported });
        };
        if let (Some(asked), Some(own)) = (axis, named.axis)
            && asked != own
        {
            let (asked, own) = (with_article(asked), with_article(own));
            return Err(row.error(
                heading,
                format!("read {}; it is {own} gridline", row.content(heading).shown()),
                format!("name {asked} gridline"),
            ));
        }
        match (named.id, named.axis) {
            (Some(id), Some(axis)) => Ok(Some((id, axis))),
            _ => Err(Reported),
        }
    }

    fn unknown(&self, row: &Row<'_>, heading: &str, name: &str, axis: Option<Axis>) -> Reported {
        let fitting = || {
            let fits = |named: &Named| axis.is_none() || named.axis.is_none() || named.axis == axis;
            self.by_name.iter().filter(move |(_, named)| fits(named)).map(|(name, _)| name.as_str())
        };
        // A few names are all worth showing; of many only the nearest.
        let known = if (1..=6).contains(&fitting().count()) {
            format!("; known: {}", fitting().collect::<Vec<_>>().join(", "))
        } else {
            row.nearest(name, fitting())
        };
        let text = format!("read {}; no gridline has this name", row.content(heading).shown());
        row.error(heading, text, format!("correct the name or add it to Gridlines{known}"))
    }
}

fn with_article(axis: Axis) -> &'static str {
    match axis {
        Axis::X => "an X",
        Axis::Y => "a Y",
    }
}
