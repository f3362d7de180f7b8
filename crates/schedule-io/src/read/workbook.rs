//! A workbook: cells are streamed, never a whole-sheet range, and formulas count by their stored results.

use std::collections::BTreeMap;
use std::io::Cursor;
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::path::Path;

use calamine::{DataRef, Dimensions, ExcelDateTime, Reader as _, SheetType, Xlsx, XlsxError};
use design_engine::query::{Severity, Subject};

use super::CannotRead;
use super::cells::{Content, RawRow, RawSheet};
use super::open::{cannot, is_read_me, say_unknown_sheet, sheet_named};
use super::report::Report;
use super::unpacked::{NoDirectory, stated_size};
use crate::limits;
use crate::place::column_letters;
use crate::sheets::{CRITERIA, GRIDLINES, SHEETS};

type Book = Xlsx<Cursor<Vec<u8>>>;

const DAMAGED: &str = "the workbook is damaged or cut short";
const SAVE_AGAIN: &str = "open it in a spreadsheet and save it again as .xlsx";

/// Reads the known sheets of a workbook from its bytes.
///
/// # Errors
/// Where the bytes are no workbook that can be read, or it holds no sheet of a floor book.
pub(crate) fn sheets(
    path: &Path,
    name: &str,
    bytes: Vec<u8>,
    report: &Report,
) -> Result<Vec<RawSheet>, CannotRead> {
    precheck(path, &bytes)?;
    // The workbook library checks less than it might: a crafted file can make it panic.
    let read = catch_unwind(AssertUnwindSafe(|| {
        let mut book = Book::new(Cursor::new(bytes)).map_err(|error| cannot_open(path, &error))?;
        known_sheets(path, name, &mut book, report)
    }));
    read.unwrap_or_else(|_| Err(cannot(path, DAMAGED, SAVE_AGAIN)))
}

/// What can be told from the bytes alone.
fn precheck(path: &Path, bytes: &[u8]) -> Result<(), CannotRead> {
    if bytes.is_empty() {
        return Err(cannot(path, "the file is empty", "copy it again or restore it"));
    }
    if bytes.starts_with(b"\xd0\xcf\x11\xe0") {
        return Err(cannot(
            path,
            "the workbook is protected by a password, or it is an old .xls file under a new name",
            "save it as .xlsx without a password",
        ));
    }
    if !bytes.starts_with(b"PK") {
        return Err(cannot(path, "the file is no .xlsx workbook", SAVE_AGAIN));
    }
    match stated_size(bytes) {
        Ok(size) if size <= limits::UNPACKED_BYTES => Ok(()),
        Ok(_) | Err(NoDirectory::Large) => {
            let what =
                format!("unpacked, the workbook is larger than {} MB", limits::UNPACKED_BYTES / 1_000_000);
            Err(cannot(path, &what, "remove what is no part of the floor book and save it again"))
        }
        Err(NoDirectory::Damaged) => Err(cannot(path, DAMAGED, "copy it again or restore it")),
    }
}

fn cannot_open(path: &Path, error: &XlsxError) -> CannotRead {
    match error {
        XlsxError::Password => {
            cannot(path, "the workbook is protected by a password", "save it without a password")
        }
        XlsxError::FileNotFound(_) | XlsxError::RelationshipNotFound => {
            cannot(path, "the file is an archive but no .xlsx workbook", SAVE_AGAIN)
        }
        _ => cannot(path, &format!("{DAMAGED} ({error})"), SAVE_AGAIN),
    }
}

fn known_sheets(
    path: &Path,
    file: &str,
    book: &mut Book,
    report: &Report,
) -> Result<Vec<RawSheet>, CannotRead> {
    let names: Vec<String> = book
        .sheets_metadata()
        .iter()
        .filter(|sheet| sheet.typ == SheetType::WorkSheet)
        .map(|sheet| sheet.name.clone())
        .collect();
    if names.len() > limits::SHEETS {
        let what = format!("the workbook holds more than {} sheets", limits::SHEETS);
        return Err(cannot(path, &what, "remove the sheets that are no part of the floor book"));
    }
    let mut sheets: Vec<RawSheet> = Vec::new();
    let mut unknown = Vec::new();
    let has = |wanted: &str| names.iter().any(|name| name.trim().eq_ignore_ascii_case(wanted));
    if has("Cover") && has("Checks") && !has(GRIDLINES.name) && !has(CRITERIA.name) {
        return Err(cannot(path, "this is a schedule workbook", "give the floor book that it was made from"));
    }
    let mut cells_left = limits::CELLS;
    for name in names {
        let Some(spec) = sheet_named(&name) else {
            if !is_read_me(&name) {
                unknown.push(name);
            }
            continue;
        };
        let mut raw = RawSheet {
            spec,
            file: file.to_owned(),
            sheet: Some(name.clone()),
            decimal_comma: false,
            rows: Vec::new(),
            cut: false,
        };
        if let Some(first) = sheets.iter().find(|sheet| sheet.spec == spec) {
            let first = first.sheet.as_deref().unwrap_or_default();
            let text = format!("the sheet {} is there twice, first as {first}", spec.name);
            report.error(raw.place(None, None, None), text, "delete or rename one of the two sheets");
            continue;
        }
        read_sheet(book, &name, &mut raw, &mut cells_left, report);
        sheets.push(raw);
    }
    if sheets.is_empty() {
        return Err(cannot(
            path,
            "the workbook holds no sheet of a floor book",
            "name its sheets Criteria, Gridlines, Panels and so on",
        ));
    }
    for name in &unknown {
        say_unknown_sheet(file, Some(name), name, &sheets, report);
    }
    sheets.sort_by_key(|raw| SHEETS.iter().position(|sheet| *sheet == raw.spec));
    Ok(sheets)
}

fn read_sheet(book: &mut Book, name: &str, raw: &mut RawSheet, cells_left: &mut usize, report: &Report) {
    let merged = book.merge_cells_by_sheet_name(name);
    let mut rows = BTreeMap::new();
    let end = merged.and_then(|merged| {
        stream(book, name, raw, &mut rows, cells_left, report)?;
        mark_merged(&mut rows, &merged, cells_left);
        Ok(())
    });
    if let Err(error) = end {
        raw.cut = true;
        let last = rows.last_key_value().map(|(row, _)| row + 1);
        report.error(
            raw.place(last, None, None),
            format!("the sheet cannot be read beyond this place ({error})"),
            SAVE_AGAIN,
        );
    }
    raw.rows = rows.into_iter().map(|(row, cells)| RawRow { number: row + 1, cells }).collect();
}

/// Streams the cells of a sheet into rows, by row number from 0.
fn stream(
    book: &mut Book,
    name: &str,
    raw: &mut RawSheet,
    rows: &mut BTreeMap<u32, Vec<Content>>,
    cells_left: &mut usize,
    report: &Report,
) -> Result<(), XlsxError> {
    let mut reader = book.worksheet_cells_reader(name)?;
    let mut stray_said = false;
    while let Some(cell) = reader.next_cell_with_formula_metadata()? {
        let content = content(&cell.value, cell.formula.is_some());
        if content.is_blank() {
            continue;
        }
        let (row, column) = (cell.pos.0, usize::try_from(cell.pos.1).unwrap_or(usize::MAX));
        if column >= limits::COLUMNS {
            if !stray_said {
                stray_said = true;
                say_stray(raw, cell.pos, &content, report);
            }
            continue;
        }
        let cells = rows.entry(row).or_default();
        let more = (column + 1).saturating_sub(cells.len());
        if row >= limits::ROWS || more > *cells_left {
            rows.remove(&row);
            raw.cut = true;
            report.error(
                raw.place(Some(row.saturating_add(1)), Some(column), None),
                format!(
                    "read {} here; allowed {} rows on a sheet and {} cells in a book",
                    content.shown(),
                    limits::ROWS,
                    limits::CELLS
                ),
                "clear the cell if it is a stray one; otherwise split the floor into several books",
            );
            return Ok(());
        }
        *cells_left -= more;
        if more > 0 {
            cells.resize(column + 1, Content::Blank);
        }
        cells[column] = content;
    }
    Ok(())
}

fn say_stray(raw: &RawSheet, (row, column): (u32, u32), content: &Content, report: &Report) {
    report.say(
        Severity::Note,
        Subject::Floor,
        raw.place(row.checked_add(1), usize::try_from(column).ok(), None),
        format!(
            "read {} beyond column {}; such cells are not used",
            content.shown(),
            column_letters(u32::try_from(limits::COLUMNS).unwrap_or(u32::MAX) - 1)
        ),
        "",
    );
}

/// Cells that a merged one covers say so, in rows that hold something: taken for blanks they would be
/// filled from the criteria.
fn mark_merged(rows: &mut BTreeMap<u32, Vec<Content>>, merged: &[Dimensions], cells_left: &mut usize) {
    for region in merged {
        let ((top, left), (bottom, right)) = (region.start, region.end);
        let (Ok(first), Ok(last)) = (usize::try_from(left), usize::try_from(right)) else { continue };
        let last = last.min(limits::COLUMNS - 1);
        let filled = rows.get(&top).and_then(|cells| cells.get(first)).is_some_and(Content::is_filled);
        if !filled || top > bottom || first > last {
            continue;
        }
        let into = format!("{}{}", column_letters(left), top.saturating_add(1));
        for (row, cells) in rows.range_mut(top..=bottom) {
            let more = (last + 1).saturating_sub(cells.len());
            if more > *cells_left {
                return;
            }
            *cells_left -= more;
            cells.resize(cells.len() + more, Content::Blank);
            for (column, cell) in cells.iter_mut().enumerate().take(last + 1).skip(first) {
                if (*row, column) != (top, first) && cell.is_blank() {
                    *cell = Content::Merged { into: into.clone() };
                }
            }
        }
    }
}

fn content(value: &DataRef<'_>, is_formula: bool) -> Content {
    match value {
        DataRef::Empty if is_formula => Content::NoResult,
        DataRef::Empty => Content::Blank,
        DataRef::String(text) => Content::text(text),
        DataRef::SharedString(text) => Content::text(text),
        DataRef::Float(number) => finite(*number),
        // The workbook library gives whole numbers as floats; a whole number of a plan is far below 2^53.
        #[expect(clippy::cast_precision_loss, reason = "marks and lengths have few digits")]
        DataRef::Int(number) => finite(*number as f64),
        DataRef::Bool(truth) => Content::Truth(*truth),
        DataRef::DateTime(date) => Content::Date { day: day(date), number: date.as_f64() },
        DataRef::DateTimeIso(text) => iso_day(text),
        DataRef::DurationIso(text) => Content::text(text),
        DataRef::Error(error) => Content::Fault(error.to_string()),
    }
}

fn finite(number: f64) -> Content {
    if number.is_finite() { Content::Number(number) } else { Content::Text(number.to_string()) }
}

/// The calendar day of a date; none for a time of day or a length of time.
fn day(date: &ExcelDateTime) -> Option<String> {
    let is_a_day = date.is_datetime() && (1.0..2_958_466.0).contains(&date.as_f64());
    let (year, month, day, ..) = date.to_ymd_hms_milli();
    is_a_day.then(|| format!("{year:04}-{month:02}-{day:02}"))
}

/// A date that the workbook stores as text in ISO 8601.
fn iso_day(text: &str) -> Content {
    match text.get(..10).filter(|day| design_engine::criteria::is_iso_date(day)) {
        Some(day) => Content::Date { day: Some(day.to_owned()), number: 0.0 },
        None => Content::text(text),
    }
}
