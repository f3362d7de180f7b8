//! Sheet `Changes`: what differs from the previous issue, why, and the difference in steel.

use detailing::reissue::Change;
use rust_xlsxwriter::Worksheet;

use super::column::Column;
use super::look::Tone;
use super::sink::lay_down;
use super::{Submission, WriteError};

pub(super) const NAME: &str = "Changes";
const FROZEN_COLUMNS: u16 = 2;

/// A change, or a line of words.
pub(crate) enum ChangeRow<'a> {
    Change(&'a Change),
    Words(&'static str, Option<f64>),
}

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    let mut rows: Vec<(Tone, ChangeRow<'_>)> = Vec::new();
    match submission.changes {
        None => {
            rows.push((Tone::Plain, ChangeRow::Words("first issue: there is nothing to compare with", None)))
        }
        Some([]) => rows.push((Tone::Plain, ChangeRow::Words("no change against the previous issue", None))),
        Some(changes) => {
            rows.extend(changes.iter().map(|change| (Tone::Plain, ChangeRow::Change(change))));
            let total: f64 = changes.iter().filter_map(|change| change.difference_kg).sum();
            rows.push((Tone::Section, ChangeRow::Words("all changes", Some(total))));
        }
    }
    lay_down(worksheet, NAME, &columns(), FROZEN_COLUMNS, rows.into_iter())
}

pub(super) fn columns<'a>() -> Vec<Column<'a, ChangeRow<'a>>> {
    let change = |row: &ChangeRow<'a>| match row {
        ChangeRow::Change(change) => Some(*change),
        ChangeRow::Words(..) => None,
    };
    vec![
        Column::words("Change", 16.0, |r: &ChangeRow<'_>| match r {
            ChangeRow::Change(change) => change.kind.word(),
            ChangeRow::Words(words, _) => words,
        })
        .means("`input`, `check`, `bar new`, `bar changed`, `bar dropped`, or `bar again`"),
        Column::words("Mark or panel", 14.0, move |r: &ChangeRow<'a>| change(r).map(|c| c.subject.as_str()))
            .means("the bar mark; the panel whose input or governing check differs"),
        Column::words("Before", 44.0, move |r: &ChangeRow<'a>| change(r).map(|c| c.before.as_str()))
            .means("in the previous issue"),
        Column::words("After", 44.0, move |r: &ChangeRow<'a>| change(r).map(|c| c.after.as_str()))
            .means("in this issue"),
        Column::number("Difference", "kg", 1, move |r: &ChangeRow<'a>| match r {
            ChangeRow::Change(change) => change.difference_kg,
            ChangeRow::Words(_, kg) => *kg,
        })
        .wide(11.0)
        .means("steel of this issue less that of the previous"),
        Column::words("Item, or why", 70.0, move |r: &ChangeRow<'a>| change(r).map(|c| c.why.as_str()))
            .means("the input that differs; for a bar, the inputs that its change follows from"),
    ]
}
