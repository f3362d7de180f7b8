//! Tables as CSV: the columns and rows of the sheets, numbers unrounded, units in the headings.

use super::column::{Cell, Column};
use super::{Submission, WriteError, bending_schedule, drawing_notes, quantities};

/// File and table of each, in the order that [`super::write_tables`] gives them.
pub const TABLE_NAMES: [(&str, &str); 3] = [
    ("bending_schedule.csv", "bending schedule"),
    ("drawing_notes.csv", "drawing notes"),
    ("quantities.csv", "quantities"),
];

/// The bending schedule, the drawing notes and the quantities.
pub(super) fn tables(submission: &Submission<'_>) -> Result<Vec<Vec<u8>>, WriteError> {
    let notes = drawing_notes::rows(submission);
    let quantities = quantities::rows(submission);
    Ok(vec![
        table(&bending_schedule::columns(), bending_schedule::rows(submission).iter())?,
        table(&drawing_notes::columns(), notes.iter().collect::<Vec<_>>().iter())?,
        table(&quantities::columns(), quantities.iter().collect::<Vec<_>>().iter())?,
    ])
}

fn table<'r, 'a, R: 'r>(
    columns: &[Column<'a, R>],
    rows: impl Iterator<Item = &'r R>,
) -> Result<Vec<u8>, WriteError> {
    let mut writer = csv::Writer::from_writer(Vec::new());
    writer.write_record(columns.iter().map(|column| column.head.title())).map_err(io)?;
    for row in rows {
        let fields: Vec<String> = columns.iter().map(|column| field((column.value)(row))).collect();
        writer.write_record(&fields).map_err(io)?;
    }
    writer.into_inner().map_err(|error| WriteError::Io(error.into_error()))
}

fn io(error: csv::Error) -> WriteError {
    WriteError::Io(error.into())
}

fn field(cell: Cell<'_>) -> String {
    match cell {
        Cell::Blank => String::new(),
        Cell::Number(number) => number.to_string(),
        Cell::Text(text) => harmless(&text),
        Cell::Formula(_, result) => field(*result),
    }
}

/// Text that a spreadsheet would take for a formula gets an apostrophe before it; control characters become spaces.
fn harmless(text: &str) -> String {
    let clean: String = text.chars().map(|c| if c.is_control() { ' ' } else { c }).collect();
    if clean.starts_with(['=', '+', '-', '@']) { format!("'{clean}") } else { clean }
}
