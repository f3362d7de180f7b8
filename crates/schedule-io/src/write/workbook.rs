//! MAIN PATH of the workbook: sheet after sheet, rows strictly in order.

use rust_xlsxwriter::{Workbook, Worksheet, XlsxError};

use super::column::{Column, ColumnDescription};
use super::{
    Submission, WriteError, beam_loads, bending_schedule, changes, checks, corners, cover, drawing_notes,
    edges, look, openings, panels, quantities, queries, register, supports, title_block, working,
};

/// How a sheet is kept until the file is saved.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Keeping {
    /// All cells in memory.
    Whole,
    /// Row by row: a cell written backwards is lost.
    #[cfg(test)]
    RowByRow,
}

type WriteSheet = fn(&Submission<'_>, &mut Worksheet) -> Result<(), WriteError>;

/// The sheets in order.
const SHEETS: [WriteSheet; 15] = [
    cover::write,
    panels::write,
    supports::write,
    edges::write,
    checks::write,
    corners::write,
    openings::write,
    beam_loads::write,
    bending_schedule::write,
    drawing_notes::write,
    quantities::write,
    working::write,
    changes::write,
    queries::write,
    register::write,
];

/// Writes the schedule workbook.
pub(super) fn write(submission: &Submission<'_>) -> Result<Vec<u8>, WriteError> {
    write_keeping(submission, Keeping::Whole)
}

pub(super) fn write_keeping(submission: &Submission<'_>, keeping: Keeping) -> Result<Vec<u8>, WriteError> {
    let mut workbook = Workbook::new();
    workbook.set_properties(&title_block::properties(submission)?);
    let footer = title_block::footer(&submission.book.criteria);
    for write_sheet in SHEETS {
        let worksheet = add_sheet(&mut workbook, keeping)?;
        look::set_up_page(worksheet, &footer);
        write_sheet(submission, worksheet)?;
    }
    Ok(workbook.save_to_buffer()?)
}

fn add_sheet(workbook: &mut Workbook, keeping: Keeping) -> Result<&mut Worksheet, XlsxError> {
    match keeping {
        Keeping::Whole => Ok(workbook.add_worksheet()),
        #[cfg(test)]
        Keeping::RowByRow => workbook.add_worksheet_with_constant_memory(),
    }
}

/// A sheet of the workbook, as the documentation describes it.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct SheetDescription {
    /// Its name.
    pub name: &'static str,
    /// What a row is.
    pub row: &'static str,
    /// Its columns in order.
    pub columns: Vec<ColumnDescription>,
}

/// The sheets of the workbook and their columns, from the tables that the sheets are written from.
#[must_use]
pub fn describe_sheets() -> Vec<SheetDescription> {
    fn described<R>(name: &'static str, row: &'static str, columns: &[Column<'_, R>]) -> SheetDescription {
        SheetDescription { name, row, columns: columns.iter().map(|column| (&column.head).into()).collect() }
    }
    vec![
        described(cover::NAME, "an item", &cover::columns()),
        described(panels::NAME, "a panel", &panels::columns()),
        described(supports::NAME, "a support with top bars", &supports::columns()),
        described(edges::NAME, "a stretch of a panel's edge", &edges::columns()),
        described(checks::NAME, "a check of a panel", &checks::columns()),
        described(corners::NAME, "a corner of a restrained two-way panel", &corners::columns()),
        described(openings::NAME, "an opening and a layer of bars it cuts", &openings::columns()),
        described(beam_loads::NAME, "a panel's edge on its support", &beam_loads::columns()),
        described(bending_schedule::NAME, "a bar mark", &bending_schedule::columns()),
        described(drawing_notes::NAME, "a line for the plan", &drawing_notes::columns()),
        described(quantities::NAME, "a quantity", &quantities::columns()),
        SheetDescription {
            name: working::NAME,
            row: "a section of a panel",
            columns: working::descriptions(),
        },
        described(changes::NAME, "a change against the previous issue", &changes::columns()),
        described(queries::NAME, "a query", &queries::columns()),
        described(register::NAME, "an issue, a mark, or a panel's inputs", &register::columns()),
    ]
}
