//! The `Panels` sheet, what it has in common with `Loose panels`, and looking panels up by mark.

use std::collections::BTreeMap;

use design_engine::criteria::Criteria;
use design_engine::floor::{AreaLoads, Axis, Side, Spanning};
use floor_grid::layout::{GridPanel, PanelData};

use super::gridlines::GridlineNames;
use super::rows::{Field, Reported, Row};
use crate::place::Places;
use crate::sheets::{CORNERS, EDGES, SPANNING, Words};

/// What kind of panel a mark belongs to.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum PanelKind {
    /// Of the `Panels` sheet.
    OnGrid,
    /// Of the `Loose panels` sheet.
    Loose,
}

/// The marks of a book, those of faulty rows too.
#[derive(Debug)]
pub(crate) struct Marks {
    by_mark: BTreeMap<String, PanelKind>,
    /// False where some marks could not be read, so that an unknown mark is no new fault.
    pub(crate) complete: bool,
}

impl Marks {
    pub(crate) fn new(complete: bool) -> Marks {
        Marks { by_mark: BTreeMap::new(), complete }
    }

    /// The panel that a cell names.
    pub(crate) fn look_up(&self, row: &Row<'_>, heading: &str) -> Field<(String, PanelKind)> {
        if !row.fits {
            return Err(Reported);
        }
        let Some(mark) = row.name(heading)? else { return Ok(None) };
        if let Some(kind) = self.by_mark.get(&mark) {
            return Ok(Some((mark, *kind)));
        }
        if !self.complete {
            return Err(Reported);
        }
        let near = row.nearest(&mark, self.by_mark.keys().map(String::as_str));
        let text = format!("read {}; no panel has this mark", row.content(heading).shown());
        Err(row.error(heading, text, format!("correct the mark{near}")))
    }

    /// Registers the mark of a row of a panel sheet, which stands at `sheet` among the places.
    fn register(
        &mut self,
        row: &Row<'_>,
        kind: PanelKind,
        sheet: usize,
        places: &mut Places,
    ) -> Result<String, Reported> {
        let Ok(mark) = row.filled("Panel", row.name("Panel")) else {
            self.complete = false;
            return Err(Reported);
        };
        if let Some((first_sheet, first_row)) = places.panels.get(&mark) {
            let first = places.sheets[*first_sheet].row(*first_row);
            let text = format!("the mark {mark} is already used in {first}");
            return Err(row.error("Panel", text, "give each panel its own mark"));
        }
        places.panels.insert(mark.clone(), (sheet, row.raw.number));
        self.by_mark.insert(mark.clone(), kind);
        Ok(mark)
    }
}

/// Mark, thickness, loads and action of a row, blanks filled from the criteria.
pub(crate) fn data(
    row: &Row<'_>,
    kind: PanelKind,
    spanning: &'static Words<Spanning, 4>,
    criteria: &Criteria,
    (sheet, places): (usize, &mut Places),
    marks: &mut Marks,
) -> Result<PanelData, Reported> {
    let mark = marks.register(row, kind, sheet, places);
    let thickness = row.number("Thickness");
    let finishes = row.number("Finishes");
    let partitions = row.number("Partitions");
    let imposed = row.number("Imposed");
    let spanning = row.word("Spanning", spanning);
    let corners = row.word("Corners", &CORNERS);
    let remarks = row.text("Remarks");
    let (mark, corners) = (mark?, corners?);
    Ok(PanelData {
        mark,
        thickness_mm: thickness?.unwrap_or(criteria.thickness_mm),
        loads: AreaLoads {
            finishes_kn_m2: finishes?.unwrap_or(criteria.finishes_kn_m2),
            partitions_kn_m2: partitions?.unwrap_or(criteria.partitions_kn_m2),
            imposed_kn_m2: imposed?.unwrap_or(criteria.imposed_kn_m2),
        },
        spanning: spanning?.unwrap_or(Spanning::Found),
        corners: corners.unwrap_or(criteria.corners),
        corners_stated: corners.is_some(),
        remarks: remarks?,
    })
}

/// Reads the rows of `Panels`; `sheet` is its index among the places.
pub(crate) fn read<'a>(
    rows: impl Iterator<Item = Row<'a>>,
    criteria: &Criteria,
    gridlines: &GridlineNames,
    sheet: usize,
    places: &mut Places,
    marks: &mut Marks,
) -> Vec<GridPanel> {
    rows.filter_map(|row| panel(&row, criteria, gridlines, (sheet, &mut *places), marks).ok()).collect()
}

fn panel(
    row: &Row<'_>,
    criteria: &Criteria,
    gridlines: &GridlineNames,
    places: (usize, &mut Places),
    marks: &mut Marks,
) -> Result<GridPanel, Reported> {
    let data = data(row, PanelKind::OnGrid, &SPANNING, criteria, places, marks);
    let side = |heading: &str, axis: Axis| row.filled(heading, gridlines.look_up(row, heading, Some(axis)));
    let x_from = side("X from", Axis::X);
    let x_to = side("X to", Axis::X);
    let y_from = side("Y from", Axis::Y);
    let y_to = side("Y to", Axis::Y);
    let top_level = row.number("Top level");
    let edges = Side::ALL.map(|side| {
        let heading = match side {
            Side::North => "North edge",
            Side::East => "East edge",
            Side::South => "South edge",
            Side::West => "West edge",
        };
        row.word(heading, &EDGES)
    });
    let zone = row.name("Zone");
    let [north, east, south, west] = edges;
    Ok(GridPanel {
        data: data?,
        x_from: x_from?,
        x_to: x_to?,
        y_from: y_from?,
        y_to: y_to?,
        top_level_mm: top_level?.unwrap_or(0.0),
        stated_edges: [north?, east?, south?, west?],
        zone: zone?.unwrap_or_default(),
    })
}
