//! Finding the heading row of a sheet and which column stands where.

use std::borrow::Cow;

use design_engine::query::{Severity, Subject};

use super::cells::{Content, RawRow, RawSheet};
use super::report::Report;
use super::units::{self, Scale};
use crate::limits::HEADING_ROWS;
use crate::sheets::{Column, Holds, Sheet};

/// A name without case and spaces, for matching headings, items and words.
pub(crate) fn folded(text: &str) -> String {
    text.chars().filter(|c| !c.is_whitespace()).flat_map(char::to_lowercase).collect()
}

/// A heading or an item apart from the unit in brackets at its end.
pub(crate) fn apart(text: &str) -> (&str, Option<&str>) {
    let text = text.trim();
    for (open, close) in [('(', ')'), ('[', ']')] {
        if let Some(inner) = text.strip_suffix(close)
            && let Some((name, unit)) = inner.rsplit_once(open)
        {
            return (name.trim_end(), Some(unit.trim()));
        }
    }
    (text, None)
}

/// Index of the column that a heading names.
fn known(spec: &Sheet, heading: &str) -> Option<usize> {
    let name = folded(apart(heading).0);
    // `Remark` and `Remarks` are both in use.
    let same = |column: &Column| {
        let own = folded(column.heading);
        own == name || (own.starts_with("remark") && own.trim_end_matches('s') == name.trim_end_matches('s'))
    };
    if name.is_empty() { None } else { spec.columns.iter().position(same) }
}

/// How many different columns the cells of a row name.
pub(crate) fn known_in<'a>(spec: &Sheet, cells: impl Iterator<Item = Cow<'a, str>>) -> usize {
    let mut seen = vec![false; spec.columns.len()];
    for cell in cells.filter(|cell| cell.len() < 200) {
        if let Some(index) = known(spec, &cell) {
            seen[index] = true;
        }
    }
    seen.iter().filter(|seen| **seen).count()
}

fn known_in_row(spec: &Sheet, row: &RawRow) -> usize {
    let text = |cell: &'_ Content| match cell {
        Content::Text(text) => Some(Cow::Owned(text.clone())),
        _ => None,
    };
    known_in(spec, row.cells.iter().filter_map(text))
}

/// Where a column of the table of sheets stands.
#[derive(Debug, Clone)]
pub(crate) struct Found {
    /// Column from 0.
    pub(crate) index: usize,
    /// Heading as the book prints it.
    pub(crate) printed: String,
    /// Unit the heading gives, where it is not the stated one.
    pub(crate) unit: Option<String>,
    /// From the unit of the heading to the stated one.
    pub(crate) scale: Scale,
}

/// A sheet whose headings are found.
#[derive(Debug)]
pub(crate) struct Table<'a> {
    pub(crate) raw: &'a RawSheet,
    /// For each column of the table of sheets, where it stands.
    pub(crate) columns: Vec<Option<Found>>,
    /// Rows that hold something in a known column, and whether their cells can be trusted to stand under
    /// their headings.
    pub(crate) rows: Vec<(&'a RawRow, bool)>,
}

/// Finds the headings of a sheet. None where the sheet is blank or no headings are found; the report says so.
pub(crate) fn table<'a>(raw: &'a RawSheet, report: &Report) -> Option<Table<'a>> {
    let filled = raw.rows.iter().find(|row| row.cells.iter().any(Content::is_filled))?;
    let Some(at) = heading_row(raw) else {
        let must: Vec<&str> = raw.spec.columns.iter().filter(|c| c.required).map(|c| c.heading).collect();
        report.error(
            raw.place(Some(filled.number), None, None),
            format!("no row of headings is found in the first {HEADING_ROWS} rows"),
            format!("write a row of headings with at least {}", must.join(", ")),
        );
        return None;
    };
    let headings = &raw.rows[at];
    let columns = columns(raw, headings, report);
    let below = &raw.rows[at + 1..];
    say_unheaded(raw, headings, below, report);
    let in_use: Vec<usize> = columns.iter().flatten().map(|found| found.index).collect();
    let rows = below
        .iter()
        .filter(|row| in_use.iter().any(|column| row.cell(*column).is_filled()))
        .map(|row| (row, fits(raw, headings, row, report)))
        .collect();
    Some(Table { raw, columns, rows })
}

/// Index of the row with the most known headings: at least two, or one that stands alone.
fn heading_row(raw: &RawSheet) -> Option<usize> {
    let mut best = (0, None);
    for (index, row) in raw.rows.iter().enumerate().take(HEADING_ROWS) {
        let count = known_in_row(raw.spec, row);
        let alone = row.cells.iter().filter(|cell| cell.is_filled()).count() == 1;
        if count > best.0 && (count > 1 || alone) {
            best = (count, Some(index));
        }
    }
    best.1
}

fn columns(raw: &RawSheet, headings: &RawRow, report: &Report) -> Vec<Option<Found>> {
    let mut columns: Vec<Option<Found>> = vec![None; raw.spec.columns.len()];
    let mut unknown: Vec<(usize, String)> = Vec::new();
    for (index, cell) in headings.cells.iter().enumerate() {
        let Content::Text(text) = cell else {
            if cell.is_filled() {
                unknown.push((index, cell.shown().trim_matches('"').to_owned()));
            }
            continue;
        };
        let printed = super::cells::shortened(&text.split_whitespace().collect::<Vec<_>>().join(" "));
        let Some(column) = known(raw.spec, text) else {
            unknown.push((index, printed));
            continue;
        };
        if let Some(first) = &columns[column] {
            let first = raw.place(Some(headings.number), Some(first.index), None);
            let where_first = match &first.sheet {
                Some(_) => format!("column {}", crate::place::column_letters(first.column.unwrap_or(0))),
                None => format!("column {}", first.column.unwrap_or(0) + 1),
            };
            report.error(
                raw.place(Some(headings.number), Some(index), Some(&printed)),
                format!("the heading is there twice, first in {where_first}"),
                "delete or rename one of the two columns",
            );
            continue;
        }
        columns[column] = Some(found(raw, headings, index, printed, &raw.spec.columns[column], report));
    }
    say_unknown(raw, headings, &columns, &unknown, report);
    say_missing(raw, headings, &columns, &unknown, report);
    columns
}

fn found(
    raw: &RawSheet,
    headings: &RawRow,
    index: usize,
    printed: String,
    column: &Column,
    report: &Report,
) -> Found {
    let measured = matches!(column.holds, Holds::Number(_) | Holds::Above0(_) | Holds::OneOf(_));
    let (mut scale, mut own_unit) = (Scale::SAME, None);
    if measured && let Some(unit) = apart(&printed).1 {
        match units::scale(unit, column.unit) {
            Some(found) => scale = found,
            None => report.error(
                raw.place(Some(headings.number), Some(index), Some(&printed)),
                format!("the unit is \"{unit}\"; allowed {}", units::allowed(column.unit)),
                format!("write the heading as {}", column.title()),
            ),
        }
        own_unit = scale.changes().then(|| unit.to_owned());
    }
    Found { index, printed, unit: own_unit, scale }
}

/// An unknown column that is nearly a known one which is missing weighs more than any other.
fn say_unknown(
    raw: &RawSheet,
    headings: &RawRow,
    columns: &[Option<Found>],
    unknown: &[(usize, String)],
    report: &Report,
) {
    let missing =
        || raw.spec.columns.iter().zip(columns).filter(|(_, f)| f.is_none()).map(|(c, _)| c.heading);
    for (index, printed) in unknown {
        let near = report.nearest_name(apart(printed).0, missing());
        let (severity, remedy) = match near {
            Some(near) => (Severity::Warning, format!("if it is meant to be {near}, correct the heading")),
            None => (Severity::Note, String::new()),
        };
        report.say(
            severity,
            Subject::Floor,
            raw.place(Some(headings.number), Some(*index), Some(printed)),
            format!("the column is not known on {} and is not used", raw.spec.name),
            remedy,
        );
    }
}

fn say_missing(
    raw: &RawSheet,
    headings: &RawRow,
    columns: &[Option<Found>],
    unknown: &[(usize, String)],
    report: &Report,
) {
    for (column, found) in raw.spec.columns.iter().zip(columns) {
        if !column.required || found.is_some() {
            continue;
        }
        let near = report.nearest(column.heading, unknown.iter().map(|(_, printed)| apart(printed).0));
        report.error(
            raw.place(Some(headings.number), None, None),
            format!("the column {} is missing", column.title()),
            format!("add it{near}"),
        );
    }
}

/// Values under no heading are said once for the sheet. Between two headings they are an error: a heading was lost.
fn say_unheaded(raw: &RawSheet, headings: &RawRow, below: &[RawRow], report: &Report) {
    let blank = |column: usize| !headings.cell(column).is_filled();
    let width = match raw.sheet {
        // A longer row of a CSV file is an error of its own.
        None => headings.cells.len(),
        Some(_) => usize::MAX,
    };
    let first = below.iter().find_map(|row| {
        let column = (0..row.cells.len().min(width)).find(|c| blank(*c) && row.cell(*c).is_filled())?;
        Some((row, column))
    });
    if let Some((row, column)) = first {
        let place = raw.place(Some(row.number), Some(column), None);
        let shown = row.cell(column).shown();
        let inside = (column + 1..headings.cells.len()).any(|right| headings.cell(right).is_filled());
        if inside {
            let text = format!("read {shown} in a column whose heading is blank");
            report.error(place, text, "write the heading, or clear the column");
        } else {
            report.note(place, format!("read {shown} under no heading; such cells are not used"), "");
        }
    }
}

/// A row of a CSV file that is longer than the row of headings has most likely been split by a decimal
/// comma, which shifts every later cell.
fn fits(raw: &RawSheet, headings: &RawRow, row: &RawRow, report: &Report) -> bool {
    if raw.sheet.is_some() || row.cells.len() <= headings.cells.len() {
        return true;
    }
    let remedy = if raw.decimal_comma {
        "put a cell that holds the separator in quotation marks"
    } else {
        "write numbers with a decimal point, and put a cell that holds a comma in quotation marks"
    };
    report.error(
        raw.place(Some(row.number), None, None),
        format!("the row has {} cells, the headings have {}", row.cells.len(), headings.cells.len()),
        remedy,
    );
    false
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::sheets::{CHOSEN_BARS, PANELS};

    #[test]
    fn a_heading_is_taken_apart_from_its_unit() {
        for (text, expected) in [
            ("Position (m)", ("Position", Some("m"))),
            (" Imposed  [ kN/m2 ] ", ("Imposed", Some("kN/m2"))),
            ("Position", ("Position", None)),
            ("Item (a) b", ("Item (a) b", None)),
            ("(m)", ("", Some("m"))),
            ("", ("", None)),
        ] {
            assert_eq!(apart(text), expected, "{text}");
        }
    }

    #[test]
    fn headings_match_without_case_spaces_and_unit() {
        assert_eq!(known(&PANELS, "xFROM"), Some(1));
        assert_eq!(known(&PANELS, "  X\u{a0} from "), Some(1));
        assert_eq!(known(&PANELS, "Thickness(cm)"), Some(5));
        assert_eq!(known(&PANELS, "Remark"), known(&PANELS, "Remarks"));
        assert_eq!(known(&CHOSEN_BARS, "Remarks"), Some(4));
        assert_eq!(known(&PANELS, "(mm)"), None);
        assert_eq!(known(&PANELS, "Thick"), None);
    }

    #[test]
    fn a_heading_named_twice_counts_once() {
        let cells = ["Panel", "panel", "X to", "other"].map(Cow::Borrowed);
        assert_eq!(known_in(&PANELS, cells.into_iter()), 2);
    }
}
