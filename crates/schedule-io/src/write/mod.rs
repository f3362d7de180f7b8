//! MAIN PATH of writing: a designed floor to a workbook and a results file.

use design_engine::floor::Floor;
use design_engine::result::FloorDesign;

use crate::book::{Book, PlacedQuery};

/// Everything an output is made from.
#[derive(Debug, Clone, Copy)]
pub struct Submission<'a> {
    /// The book.
    pub book: &'a Book,
    /// The floor laid out from it.
    pub floor: &'a Floor,
    /// Its design.
    pub design: &'a FloorDesign,
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
}

/// Writes the schedule workbook.
///
/// # Errors
/// See [`WriteError`].
pub fn write_workbook(_submission: &Submission<'_>) -> Result<Vec<u8>, WriteError> {
    Ok(Vec::new())
}

/// Writes the results file (`docs/results-file.md`).
///
/// # Errors
/// See [`WriteError`].
pub fn write_results(_submission: &Submission<'_>, _out: &mut dyn std::io::Write) -> Result<(), WriteError> {
    Ok(())
}
