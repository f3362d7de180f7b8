//! Where things stand in a floor book, and how a message names the place.

use std::collections::BTreeMap;
use std::fmt;

use design_engine::floor::Side;
use design_engine::query::{Query, Subject};

use crate::sheets::{CRITERIA, GRIDLINES};

/// Where something stands in a floor book. Printed as `panels.csv row 4, Imposed (kN/m2)` or
/// `book.xlsx, sheet Panels, cell I4, Imposed (kN/m2)`.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
pub struct CellPlace {
    /// File name without its path.
    pub file: String,
    /// Sheet name; none for a CSV file.
    pub sheet: Option<String>,
    /// Row from 1, as the spreadsheet shows it; none for the sheet as a whole.
    pub row: Option<u32>,
    /// Column from 0; none for the row as a whole.
    pub column: Option<u32>,
    /// Heading of the column as the book prints it; on the `Criteria` sheet the item.
    pub heading: Option<String>,
}

/// Letters of a column: `A` for 0, `AA` for 26.
pub(crate) fn column_letters(column: u32) -> String {
    let mut letters = Vec::new();
    let mut rest = u64::from(column) + 1;
    while rest > 0 {
        rest -= 1;
        letters.push(b"ABCDEFGHIJKLMNOPQRSTUVWXYZ"[(rest % 26) as usize]);
        rest /= 26;
    }
    letters.iter().rev().map(|b| char::from(*b)).collect()
}

impl fmt::Display for CellPlace {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.file)?;
        match (&self.sheet, self.row, self.column) {
            (Some(sheet), Some(row), Some(column)) => {
                write!(f, ", sheet {sheet}, cell {}{row}", column_letters(column))?;
            }
            (Some(sheet), None, Some(column)) => {
                write!(f, ", sheet {sheet}, column {}", column_letters(column))?;
            }
            (Some(sheet), Some(row), None) => write!(f, ", sheet {sheet}, row {row}")?,
            (Some(sheet), None, None) => write!(f, ", sheet {sheet}")?,
            (None, Some(row), _) => write!(f, " row {row}")?,
            (None, None, _) => {}
        }
        match &self.heading {
            Some(heading) => write!(f, ", {heading}"),
            None => Ok(()),
        }
    }
}

/// A query with its place in the book, where it has one. Printed as one line,
/// `error: panels.csv row 4, Imposed (kN/m2): read "2,5x"; allowed 0 to 50; write a number`.
#[derive(Debug, Clone, PartialEq)]
pub struct PlacedQuery {
    /// What is said.
    pub query: Query,
    /// Where it stands.
    pub place: Option<CellPlace>,
}

impl fmt::Display for PlacedQuery {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}: ", self.query.severity.word())?;
        match &self.place {
            Some(place) => write!(f, "{place}: ")?,
            None => f.write_str(&subject_in_words(&self.query.subject))?,
        }
        f.write_str(&self.query.text)?;
        if self.query.remedy.is_empty() { Ok(()) } else { write!(f, "; {}", self.query.remedy) }
    }
}

/// The subject with a colon after it; nothing for the floor as a whole.
fn subject_in_words(subject: &Subject) -> String {
    match subject {
        Subject::Floor => String::new(),
        Subject::Setting(item) => format!("{item}: "),
        Subject::Panel { mark, column: None } => format!("panel {mark}: "),
        Subject::Panel { mark, column: Some(column) } => format!("panel {mark}, {column}: "),
        Subject::Edge { mark, side } => format!("panel {mark}, {} edge: ", side.word()),
        Subject::Support(name) => format!("support {name}: "),
        Subject::Gridline(name) => format!("gridline {name}: "),
        Subject::Row { sheet, index } => format!("{sheet}, entry {}: ", index + 1),
    }
}

/// A sheet of the book that was read.
#[derive(Debug, Clone)]
pub(crate) struct SheetPlace {
    pub(crate) name: &'static str,
    pub(crate) file: String,
    pub(crate) sheet: Option<String>,
    /// Heading in the table of sheets, column from 0, heading as the book prints it.
    pub(crate) columns: Vec<(&'static str, u32, String)>,
    /// Number of each data row, as the spreadsheet shows it.
    pub(crate) rows: Vec<u32>,
}

impl SheetPlace {
    pub(crate) fn whole(&self) -> CellPlace {
        CellPlace {
            file: self.file.clone(),
            sheet: self.sheet.clone(),
            row: None,
            column: None,
            heading: None,
        }
    }

    pub(crate) fn row(&self, number: u32) -> CellPlace {
        CellPlace { row: Some(number), ..self.whole() }
    }

    fn cell(&self, number: u32, heading: &str) -> Option<CellPlace> {
        let (_, column, printed) = self.columns.iter().find(|(known, _, _)| *known == heading)?;
        Some(CellPlace { column: Some(*column), heading: Some(printed.clone()), ..self.row(number) })
    }
}

/// Turns subjects into places in the book.
#[derive(Debug, Clone, Default)]
pub struct Places {
    pub(crate) sheets: Vec<SheetPlace>,
    /// Panel marks to an index in `sheets` and a row number.
    pub(crate) panels: BTreeMap<String, (usize, u32)>,
    /// Gridline names to a row number.
    pub(crate) gridlines: BTreeMap<String, u32>,
    /// Criteria items to a row number and the item as it is printed.
    pub(crate) settings: BTreeMap<&'static str, (u32, String)>,
}

impl Places {
    /// The place of a subject: the cell, else its row; none where the subject stands nowhere in the book.
    #[must_use]
    pub fn place(&self, subject: &Subject) -> Option<CellPlace> {
        match subject {
            Subject::Floor | Subject::Support(_) => None,
            Subject::Setting(item) => self.setting(item),
            Subject::Panel { mark, column } => self.panel(mark, *column),
            Subject::Edge { mark, side } => self.edge(mark, *side),
            Subject::Gridline(name) => Some(self.sheet(GRIDLINES.name)?.row(*self.gridlines.get(name)?)),
            Subject::Row { sheet, index } => {
                let sheet = self.sheet(sheet)?;
                Some(sheet.row(*sheet.rows.get(*index)?))
            }
        }
    }

    fn sheet(&self, name: &str) -> Option<&SheetPlace> {
        self.sheets.iter().find(|sheet| sheet.name == name)
    }

    fn setting(&self, item: &str) -> Option<CellPlace> {
        let (row, printed) = self.settings.get(item)?;
        let mut place = self.sheet(CRITERIA.name)?.cell(*row, "Value")?;
        place.heading = Some(printed.clone());
        Some(place)
    }

    fn panel(&self, mark: &str, column: Option<&str>) -> Option<CellPlace> {
        let (sheet, row) = self.panels.get(mark)?;
        let sheet = self.sheets.get(*sheet)?;
        column.and_then(|heading| sheet.cell(*row, heading)).or_else(|| Some(sheet.row(*row)))
    }

    fn edge(&self, mark: &str, side: Side) -> Option<CellPlace> {
        let (sheet, row) = self.panels.get(mark)?;
        let sheet = self.sheets.get(*sheet)?;
        let on_grid = match side {
            Side::North => "North edge",
            Side::East => "East edge",
            Side::South => "South edge",
            Side::West => "West edge",
        };
        let loose = match side {
            Side::West => "Long edge 1",
            Side::East => "Long edge 2",
            Side::South => "Short edge 1",
            Side::North => "Short edge 2",
        };
        let cell = sheet.cell(*row, on_grid).or_else(|| sheet.cell(*row, loose));
        Some(cell.unwrap_or_else(|| sheet.row(*row)))
    }
}
