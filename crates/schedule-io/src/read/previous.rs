//! The issue before: what a schedule workbook tells the next issue. Only the format cell of `Cover` and the sheet `Register`
//! are read, columns by their headings in any order; whatever else was added does no harm.

use std::collections::BTreeMap;
use std::io::Cursor;
use std::path::Path;

use calamine::{Data, Reader as _, Xlsx};
use detailing::bending::Shape;
use detailing::inputs::Inputs;
use detailing::model::Bar;
use detailing::reissue::{Register, RegisteredBar};

use super::unpacked::stated_size;
use crate::limits;

/// Between the panels of a bar.
pub(crate) const PANELS_BETWEEN: &str = " | ";
/// Between the items of a panel's inputs.
pub(crate) const ITEMS_BETWEEN: &str = "; ";
/// Label and value of the cell on `Cover` that says whose workbook it is.
pub(crate) const FORMAT_LABEL: &str = "Workbook format";
/// See [`FORMAT_LABEL`].
pub(crate) const FORMAT: &str = "baymat 1";
const REGISTER: &str = "Register";
/// Greatest size of a workbook that is read, bytes.
const MOST_BYTES: u64 = 200_000_000;

/// Why a workbook is not the previous issue.
#[derive(Debug, thiserror::Error)]
pub enum PreviousError {
    /// It cannot be opened.
    #[error("{0}")]
    CannotOpen(String),
    /// It was not written by this program.
    #[error("{0}")]
    NotOurs(String),
}

fn not_ours(text: impl Into<String>) -> PreviousError {
    PreviousError::NotOurs(text.into())
}

/// Reads the register of a schedule workbook.
///
/// # Errors
/// Where the file cannot be opened, was not written by this program, or its register was changed so that a row cannot be
/// read.
pub fn read_previous(path: &Path) -> Result<Register, PreviousError> {
    let cannot = |error: std::io::Error| PreviousError::CannotOpen(error.to_string());
    if std::fs::metadata(path).map_err(cannot)?.len() > MOST_BYTES {
        return Err(not_ours("it is larger than any schedule workbook of this program"));
    }
    let bytes = std::fs::read(path).map_err(cannot)?;
    match stated_size(&bytes) {
        Ok(size) if size <= limits::UNPACKED_BYTES => {}
        Ok(_) => return Err(not_ours("unpacked it is larger than any schedule workbook of this program")),
        Err(_) => return Err(not_ours("it is not an .xlsx workbook, or it is damaged")),
    }
    let mut workbook = Xlsx::new(Cursor::new(bytes))
        .map_err(|_| not_ours("it is not an .xlsx workbook, or it is damaged"))?;
    let cover = rows(&mut workbook, "Cover")
        .ok_or_else(|| not_ours("it has no sheet Cover: not a schedule workbook of this program"))?;
    check_format(&cover)?;
    let rows = rows(&mut workbook, REGISTER)
        .ok_or_else(|| not_ours("its sheet Register is gone: without it marks cannot be kept"))?;
    let head = rows
        .iter()
        .position(|row| {
            row.iter().any(|cell| text(cell) == "Kind") && row.iter().any(|cell| text(cell) == "Mark")
        })
        .ok_or_else(|| not_ours("its sheet Register has no headings Kind and Mark"))?;
    let columns = Columns::new(&rows[head]);
    let mut register = Register::default();
    for row in &rows[head + 1..] {
        columns.read(row, &mut register)?;
    }
    Ok(register)
}

/// The rows of a sheet, streamed: a cell far away costs nothing. None where the sheet cannot be read.
fn rows(workbook: &mut Xlsx<Cursor<Vec<u8>>>, name: &str) -> Option<Vec<Vec<Data>>> {
    let mut reader = workbook.worksheet_cells_reader(name).ok()?;
    let mut rows: BTreeMap<u32, Vec<Data>> = BTreeMap::new();
    let mut cells = 0;
    while let Some(cell) = reader.next_cell().ok()? {
        let (row, column) = cell.get_position();
        let column = usize::try_from(column).unwrap_or(usize::MAX);
        if column >= limits::COLUMNS || cells >= limits::CELLS {
            continue;
        }
        cells += 1;
        let row = rows.entry(row).or_default();
        if row.len() <= column {
            row.resize(column + 1, Data::Empty);
        }
        row[column] = cell.get_value().clone().into();
    }
    Some(rows.into_values().collect())
}

fn check_format(cover: &[Vec<Data>]) -> Result<(), PreviousError> {
    let found = cover.iter().find_map(|row| {
        let at = row.iter().position(|cell| text(cell) == FORMAT_LABEL)?;
        row.get(at + 1).map(text)
    });
    match found {
        Some(format) if format == FORMAT => Ok(()),
        Some(format) => {
            Err(not_ours(format!("its Workbook format is `{format}`; this program reads `{FORMAT}`")))
        }
        None => Err(not_ours("its Cover has no Workbook format: not a schedule workbook of this program")),
    }
}

fn text(cell: &Data) -> String {
    match cell {
        Data::String(text) => text.trim().to_owned(),
        Data::Empty => String::new(),
        other => other.to_string(),
    }
}

/// Where the columns of the register stand.
struct Columns<'a> {
    heads: &'a [Data],
}

impl<'a> Columns<'a> {
    fn new(heads: &'a [Data]) -> Columns<'a> {
        Columns { heads }
    }

    fn cell<'r>(&self, row: &'r [Data], heading: &str) -> Option<&'r Data> {
        let named = |cell: &Data| {
            let title = text(cell);
            title == heading || title.split(" (").next() == Some(heading)
        };
        row.get(self.heads.iter().position(named)?)
    }

    fn text(&self, row: &[Data], heading: &str) -> String {
        self.cell(row, heading).map(text).unwrap_or_default()
    }

    fn number(&self, row: &[Data], heading: &str) -> Option<f64> {
        match self.cell(row, heading)? {
            Data::Float(number) => Some(*number),
            #[expect(clippy::cast_precision_loss, reason = "whole numbers of a sheet are below 2^53")]
            Data::Int(number) => Some(*number as f64),
            other => text(other).parse().ok(),
        }
    }

    fn read(&self, row: &[Data], register: &mut Register) -> Result<(), PreviousError> {
        let mark = self.text(row, "Mark");
        match self.text(row, "Kind").as_str() {
            "issue" => register.revision = mark,
            "bar" => {
                let bar = self.bar(row, &mark);
                let unreadable = || {
                    not_ours(format!(
                        "sheet Register, bar {mark}: its size, shape or dimensions cannot be read"
                    ))
                };
                register.bars.push(bar.ok_or_else(unreadable)?);
            }
            "inputs" => {
                register.inputs.push(Inputs { subject: mark, items: items(&self.text(row, "Inputs")) })
            }
            _ => {}
        }
        Ok(())
    }

    fn bar(&self, row: &[Data], mark: &str) -> Option<RegisteredBar> {
        let dimension = |heading: &str| self.number(row, heading);
        // A number format may have cost the code its zeros.
        let shape = match self.text(row, "Shape code").trim_start_matches('0') {
            "" => Shape::Straight { a: dimension("A")? },
            "11" => Shape::Bent { a: dimension("A")?, b: dimension("B")? },
            "13" => Shape::Hairpin { a: dimension("A")?, b: dimension("B")?, c: dimension("C")? },
            "21" => Shape::Double { a: dimension("A")?, b: dimension("B")?, c: dimension("C")? },
            _ => return None,
        };
        #[expect(
            clippy::cast_possible_truncation,
            clippy::cast_sign_loss,
            reason = "counts: cut to what a floor has"
        )]
        let count = dimension("Total no.")?.clamp(0.0, 1e12) as usize;
        let panels = self.text(row, "Panels");
        Some(RegisteredBar {
            mark: mark.to_owned(),
            bar: Bar { size_mm: self.number(row, "Size")?, shape },
            count,
            mass_kg: self.number(row, "Mass")?,
            dropped: self.text(row, "State") == "dropped",
            revision: self.text(row, "Rev letter"),
            place: self.text(row, "Where"),
            panels: panels
                .split(PANELS_BETWEEN)
                .filter(|panel| !panel.is_empty())
                .map(str::to_owned)
                .collect(),
        })
    }
}

fn items(text: &str) -> Vec<(String, String)> {
    text.split(ITEMS_BETWEEN)
        .filter_map(|item| item.split_once('='))
        .map(|(item, value)| (item.to_owned(), value.to_owned()))
        .collect()
}
