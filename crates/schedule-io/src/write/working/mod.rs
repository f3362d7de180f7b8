//! Sheet `Working`: one row per section designed, left to right the whole calculation as live formulas over the inputs of the
//! row and of the cover. Each formula is stored with the design's own value as its result.

mod columns;
mod rows;

use rust_xlsxwriter::Worksheet;

use super::column::Head;
use super::look::Tone;
use super::sink::RowSink;
use super::{Submission, WriteError, cover};

pub(super) use columns::descriptions;

pub(super) const NAME: &str = "Working";
const FROZEN_COLUMNS: u16 = 3;
/// Panels up to which every section is shown; above that none.
pub(super) const MOST_PANELS: usize = 2000;

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    let heads: Vec<Head> = columns::COLUMNS.iter().map(columns::WorkingColumn::head).collect();
    let mut sink = RowSink::with_headings(worksheet, NAME, &heads, FROZEN_COLUMNS)?;
    if submission.design.panels.len() <= MOST_PANELS {
        let rows = rows::rows(submission);
        let cells = cover::value_cells(submission)?;
        let first = sink.next_row();
        for index in 0..rows.len() {
            sink.append(Tone::Plain, columns::cells(submission, &rows, index, first, &cells))?;
        }
    }
    sink.close()?;
    Ok(())
}
