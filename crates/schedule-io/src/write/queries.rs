//! Sheet `Queries`: what an engineer should look at, in order of weight.

use design_engine::floor::Floor;
use design_engine::query::Severity;
use rust_xlsxwriter::Worksheet;

use super::column::Column;
use super::look::Tone;
use super::sink::lay_down;
use super::{Submission, WriteError, words};
use crate::book::PlacedQuery;

pub(super) const NAME: &str = "Queries";
const FROZEN_COLUMNS: u16 = 1;

pub(super) struct QueryRow<'a> {
    floor: &'a Floor,
    placed: &'a PlacedQuery,
}

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    let rows = submission.queries.iter().map(|placed| {
        let row = QueryRow { floor: submission.floor, placed };
        let tone = match placed.query.severity {
            Severity::Error | Severity::NotDesigned => Tone::Marked,
            Severity::Warning | Severity::Note => Tone::Plain,
        };
        (tone, row)
    });
    lay_down(worksheet, NAME, &columns(), FROZEN_COLUMNS, rows)
}

pub(super) fn columns<'a>() -> Vec<Column<'a, QueryRow<'a>>> {
    vec![
        Column::mark("Severity", |r: &QueryRow<'_>| r.placed.query.severity.word())
            .wide(14.0)
            .key("severity")
            .means("`not designed`, `warning` or `note`"),
        Column::mark("Panel", |r: &QueryRow<'a>| r.placed.query.panel_mark())
            .wide(10.0)
            .key("panel")
            .means("mark of the panel it is about"),
        Column::words("About", 24.0, |r: &QueryRow<'_>| words::about(r.floor, &r.placed.query))
            .key("about")
            .means("panel, edge, support, gridline, setting or row it is about"),
        Column::words("Place in the book", 36.0, |r: &QueryRow<'_>| words::query_place(r.placed))
            .key("place")
            .means("file, sheet and cell"),
        Column::words("What is the matter", 70.0, |r: &QueryRow<'a>| r.placed.query.text.as_str())
            .key("text")
            .means("in words"),
        Column::words("What to do", 50.0, |r: &QueryRow<'a>| r.placed.query.remedy.as_str())
            .key("remedy")
            .means("blank where nothing needs doing"),
    ]
}
