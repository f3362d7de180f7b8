//! Sheet `Register`: every mark ever used and every panel's inputs, for the next issue to compare with. The last sheet.

use detailing::reissue::RegisteredBar;
use rust_xlsxwriter::Worksheet;

use super::column::{Cell, Column};
use super::look::Tone;
use super::sink::lay_down;
use super::{Submission, WriteError};
use crate::read::previous::{ITEMS_BETWEEN, PANELS_BETWEEN};

pub(super) const NAME: &str = "Register";
const FROZEN_COLUMNS: u16 = 2;

/// A row of the register.
pub(crate) enum RegisterRow<'a> {
    Issue(&'a str),
    Bar(&'a RegisteredBar),
    Inputs(&'a detailing::inputs::Inputs),
}

impl<'a> RegisterRow<'a> {
    fn bar(&self) -> Option<&'a RegisteredBar> {
        match self {
            RegisterRow::Bar(bar) => Some(bar),
            _ => None,
        }
    }
}

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    let register = submission.register;
    let issue = std::iter::once(RegisterRow::Issue(&register.revision));
    let bars = register.bars.iter().map(RegisterRow::Bar);
    let inputs = register.inputs.iter().map(RegisterRow::Inputs);
    let rows = issue.chain(bars).chain(inputs).map(|row| (Tone::Plain, row));
    lay_down(worksheet, NAME, &columns(), FROZEN_COLUMNS, rows)
}

#[expect(clippy::cast_precision_loss, reason = "bars of a floor are far below 2^53")]
fn count(number: usize) -> f64 {
    number as f64
}

pub(super) fn columns<'a>() -> Vec<Column<'a, RegisterRow<'a>>> {
    let dimension = |heading, index: usize| {
        Column::number(heading, "mm", 0, move |r: &RegisterRow<'_>| r.bar()?.bar.shape.dimensions()[index])
            .means("dimension of the bar")
    };
    vec![
        Column::words("Kind", 8.0, |r: &RegisterRow<'_>| match r {
            RegisterRow::Issue(_) => "issue",
            RegisterRow::Bar(_) => "bar",
            RegisterRow::Inputs(_) => "inputs",
        })
        .means("`issue` with the revision letter as its mark, `bar`, or `inputs`"),
        Column::words("Mark", 12.0, |r: &RegisterRow<'a>| match r {
            RegisterRow::Issue(letter) => *letter,
            RegisterRow::Bar(bar) => bar.mark.as_str(),
            RegisterRow::Inputs(inputs) => inputs.subject.as_str(),
        })
        .means("revision letter, bar mark, or panel (`Criteria`: the settings)"),
        Column::words("State", 9.0, |r: &RegisterRow<'_>| {
            r.bar().map(|bar| if bar.dropped { "dropped" } else { "current" })
        })
        .means("`current`, or `dropped`: no bar has the mark any more, and no other will"),
        Column::short("Rev letter", 6.0, |r: &RegisterRow<'a>| r.bar().map(|bar| bar.revision.as_str()))
            .means("letter of the revision that last changed the bar"),
        Column::number("Size", "mm", 0, |r: &RegisterRow<'_>| r.bar().map(|bar| bar.bar.size_mm))
            .means("nominal size"),
        Column::short("Shape code", 7.0, |r: &RegisterRow<'_>| r.bar().map(|bar| bar.bar.shape.code()))
            .means("shape by BS 8666:2005"),
        dimension("A", 0),
        dimension("B", 1),
        dimension("C", 2),
        dimension("D", 3),
        dimension("E/R", 4),
        Column::number("Total no.", "", 0, |r: &RegisterRow<'_>| r.bar().map(|bar| count(bar.count)))
            .means("number on the floor"),
        Column::number("Mass", "kg", 1, |r: &RegisterRow<'_>| r.bar().map(|bar| bar.mass_kg))
            .wide(9.0)
            .means("mass of all bars of the mark"),
        Column::words("Where", 40.0, |r: &RegisterRow<'a>| r.bar().map(|bar| bar.place.as_str()))
            .means("panels and supports with numbers"),
        Column::words("Panels", 24.0, |r: &RegisterRow<'_>| {
            r.bar().map(|bar| bar.panels.join(PANELS_BETWEEN))
        })
        .means("panels the bar depends on"),
        Column::words("Inputs", 80.0, |r: &RegisterRow<'_>| match r {
            RegisterRow::Inputs(inputs) => {
                let items: Vec<String> =
                    inputs.items.iter().map(|(item, value)| format!("{item}={value}")).collect();
                Cell::from(items.join(ITEMS_BETWEEN))
            }
            _ => Cell::Blank,
        })
        .means("what the panel's bars depend on, at full precision"),
    ]
}
