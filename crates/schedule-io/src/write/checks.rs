//! Sheet `Checks`: one row per check of each panel.

use design_engine::check::Check;
use design_engine::floor::Panel;
use rust_xlsxwriter::Worksheet;

use super::column::{Cell, Column};
use super::look::Tone;
use super::sink::lay_down;
use super::{Submission, WriteError, words};

pub(super) const NAME: &str = "Checks";
const FROZEN_COLUMNS: u16 = 2;

pub(super) struct CheckRow<'a> {
    panel: &'a Panel,
    check: &'a Check,
}

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    let rows = submission.design.panels.iter().flat_map(|design| {
        let panel = submission.floor.panel(design.panel);
        design.checks.iter().map(move |check| {
            let tone = if check.ok { Tone::Plain } else { Tone::Marked };
            (tone, CheckRow { panel, check })
        })
    });
    lay_down(worksheet, NAME, &columns(), FROZEN_COLUMNS, rows)
}

pub(super) fn columns<'a>() -> Vec<Column<'a, CheckRow<'a>>> {
    vec![
        Column::mark("Panel", |r: &CheckRow<'a>| r.panel.mark.as_str()).wide(12.0).means("mark of the panel"),
        Column::mark("Check", |r: &CheckRow<'_>| r.check.kind.word())
            .wide(28.0)
            .key("check")
            .means("what is checked"),
        Column::mark("At", |r: &CheckRow<'_>| r.check.at.word(r.panel.is_loose()))
            .wide(18.0)
            .key("at")
            .means("where in the panel"),
        Column::mark("Clause", |r: &CheckRow<'_>| r.check.clause)
            .wide(30.0)
            .key("clause")
            .means("clause or table of BS 8110-1:1997 it comes from"),
        Column::figures("Demand", |r: &CheckRow<'_>| r.check.demand)
            .key("demand")
            .means("what the section asks or has"),
        Column::figures("Limit", |r: &CheckRow<'_>| r.check.limit).key("limit").means("what is allowed"),
        Column::mark("Unit", |r: &CheckRow<'_>| words::unit(r.check.unit))
            .wide(12.0)
            .means("unit of demand and limit"),
        Column::number("Ratio", "", 3, |r: &CheckRow<'_>| {
            r.check.ratio.map_or(Cell::from("not allowed"), Cell::Number)
        })
        .wide(11.0)
        .key("ratio")
        .means("at most 1 passes; `not allowed` where the code allows no such thing"),
        Column::mark("Result", |r: &CheckRow<'_>| words::check_result(r.check)).means("`passes` or `FAILS`"),
    ]
}
