//! MAIN PATH of writing: a designed floor to a workbook and a results file.
//!
//! ```text
//! Submission ─▶ results::write    every number unrounded, for other programs
//!            └▶ workbook::write   cover, panels, supports, edges, checks, queries, for people
//! ```
//!
//! Each sheet is one table of columns (heading, unit, width, number format, meaning, value); all rows go
//! through one sink, strictly in order. Both outputs take the same `f64`.

mod beam_loads;
mod bending_schedule;
mod changes;
mod checks;
mod column;
mod corners;
mod cover;
mod drawing_notes;
mod edges;
mod look;
mod numbers;
mod openings;
mod panels;
mod quantities;
mod queries;
mod register;
mod results;
mod sink;
mod supports;
mod tables;
mod text;
mod title_block;
mod totals;
mod words;
mod workbook;
mod working;

#[cfg(test)]
mod tests;

use design_engine::floor::Floor;
use design_engine::result::FloorDesign;
use detailing::model::BarSchedule;
use detailing::reissue::{Change, Register};

use crate::book::{Book, PlacedQuery};

pub use column::ColumnDescription;
pub use tables::TABLE_NAMES;
pub use workbook::{SheetDescription, describe_sheets};

/// Everything an output is made from.
#[derive(Debug, Clone, Copy)]
pub struct Submission<'a> {
    /// The book.
    pub book: &'a Book,
    /// The floor laid out from it.
    pub floor: &'a Floor,
    /// Its design.
    pub design: &'a FloorDesign,
    /// Its bars.
    pub bars: &'a BarSchedule,
    /// Every mark ever used, for the next issue.
    pub register: &'a Register,
    /// What differs from the previous issue; none on a first one.
    pub changes: Option<&'a [Change]>,
    /// All queries of reading, layout and design, with their places, in order of printing.
    pub queries: &'a [PlacedQuery],
    /// Version of the program.
    pub version: &'a str,
}

/// An output that could not be written.
#[derive(Debug, thiserror::Error)]
pub enum WriteError {
    /// The file system refused.
    #[error("{0}")]
    Io(#[from] std::io::Error),
    /// The workbook writer refused.
    #[error("{0}")]
    Workbook(#[from] rust_xlsxwriter::XlsxError),
    /// The results writer refused.
    #[error("{0}")]
    Results(#[from] serde_json::Error),
    /// A number that is not finite reached an output.
    #[error("{place}: the number is not finite; nothing was written")]
    NotFinite {
        /// Sheet, row and column, or key.
        place: String,
    },
    /// More rows than a sheet holds.
    #[error("sheet {sheet}: more than {most} rows; split the floor book or use the results file alone")]
    TooManyRows {
        /// The sheet.
        sheet: &'static str,
        /// Rows that a sheet holds.
        most: u32,
    },
}

/// Writes the schedule workbook.
///
/// The same submission gives the same bytes.
///
/// # Errors
/// See [`WriteError`].
pub fn write_workbook(submission: &Submission<'_>) -> Result<Vec<u8>, WriteError> {
    workbook::write(submission)
}

/// The bending schedule, the drawing notes and the quantities as CSV, in the order of [`TABLE_NAMES`].
///
/// # Errors
/// See [`WriteError`].
pub fn write_tables(submission: &Submission<'_>) -> Result<Vec<Vec<u8>>, WriteError> {
    tables::tables(submission)
}

/// Writes the results file (`docs/results-file.md`).
///
/// # Errors
/// See [`WriteError`]. `out` may then hold a part of the file: write to memory first.
pub fn write_results(submission: &Submission<'_>, out: &mut dyn std::io::Write) -> Result<(), WriteError> {
    results::write(submission, out)
}
