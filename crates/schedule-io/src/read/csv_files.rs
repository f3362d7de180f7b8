//! A folder of CSV files: text in UTF-8, cells set apart by commas, semicolons or tabs.

use std::path::Path;

use csv::{ByteRecord, Reader, ReaderBuilder};

use super::cells::{Content, RawRow, RawSheet};
use super::headings;
use super::report::Report;
use crate::limits;
use crate::sheets::Sheet;

/// Separators that are tried; the first one wins where several find the same number of headings.
const SEPARATORS: [u8; 3] = [b',', b';', b'\t'];

/// Reads one CSV file from its bytes; faults of the file as a whole go to the report.
pub(crate) fn sheet(
    file: &Path,
    bytes: &[u8],
    spec: &'static Sheet,
    cells_left: &mut usize,
    report: &Report,
) -> RawSheet {
    let name = file.file_name().unwrap_or_default().to_string_lossy().into_owned();
    let mut raw =
        RawSheet { spec, file: name, sheet: None, decimal_comma: false, rows: Vec::new(), cut: false };
    if is_utf16(bytes) {
        raw.cut = true;
        report.error(
            raw.place(None, None, None),
            "the file is UTF-16 text",
            "save it again from the spreadsheet as CSV UTF-8",
        );
        return raw;
    }
    let bytes = bytes.strip_prefix(b"\xef\xbb\xbf").unwrap_or(bytes);
    let separator = separator(bytes, spec);
    raw.decimal_comma = separator != b',';
    read_rows(&mut raw, bytes, separator, cells_left, report);
    raw
}

/// Byte-order mark of UTF-16, or the zero bytes that Latin text has in it.
fn is_utf16(bytes: &[u8]) -> bool {
    let start = &bytes[..bytes.len().min(1000)];
    let zeros = start.iter().filter(|b| **b == 0).count();
    start.starts_with(b"\xff\xfe") || start.starts_with(b"\xfe\xff") || zeros * 4 > start.len()
}

fn reader(bytes: &[u8], separator: u8) -> Reader<&[u8]> {
    ReaderBuilder::new().has_headers(false).flexible(true).delimiter(separator).from_reader(bytes)
}

/// The separator with which the most known headings are found in one row.
fn separator(bytes: &[u8], spec: &Sheet) -> u8 {
    let mut best = (0, SEPARATORS[0]);
    for separator in SEPARATORS {
        let mut reader = reader(bytes, separator);
        let found = reader
            .byte_records()
            .take(limits::HEADING_ROWS)
            .map_while(Result::ok)
            .map(|record| headings::known_in(spec, record.iter().map(String::from_utf8_lossy)))
            .max()
            .unwrap_or(0);
        if found > best.0 {
            best = (found, separator);
        }
    }
    best.1
}

fn read_rows(raw: &mut RawSheet, bytes: &[u8], separator: u8, cells_left: &mut usize, report: &Report) {
    let mut reader = reader(bytes, separator);
    let mut record = ByteRecord::new();
    let mut number: u32 = 0;
    let (mut wrong_bytes_said, mut zero_bytes_said) = (false, false);
    let mut last_holds_a_line_break = false;
    loop {
        let start = usize::try_from(reader.position().byte()).unwrap_or(usize::MAX);
        if !matches!(reader.read_byte_record(&mut record), Ok(true)) {
            break;
        }
        number += 1 + blank_lines(bytes, start);
        if number > limits::ROWS || *cells_left < record.len() {
            raw.cut = true;
            too_many(raw, number, report);
            break;
        }
        *cells_left -= record.len();
        let mut cells = Vec::with_capacity(record.len());
        for (column, field) in record.iter().enumerate().take(limits::COLUMNS) {
            if !wrong_bytes_said && let Err(error) = std::str::from_utf8(field) {
                wrong_bytes_said = true;
                let byte = field[error.valid_up_to()];
                report.error(
                    raw.place(Some(number), Some(column), None),
                    format!("byte {byte:02X} is not UTF-8 text"),
                    "save the file again from the spreadsheet as CSV UTF-8",
                );
            }
            let holds_zero_bytes = field.contains(&0);
            if !zero_bytes_said && holds_zero_bytes {
                zero_bytes_said = true;
                report.error(
                    raw.place(Some(number), Some(column), None),
                    "the text holds a zero byte",
                    "save the file again from the spreadsheet as CSV UTF-8",
                );
            }
            let text = String::from_utf8_lossy(field);
            let text = if holds_zero_bytes { text.replace('\0', "").into() } else { text };
            cells.push(Content::text(&text));
        }
        last_holds_a_line_break = record.iter().any(|field| field.contains(&b'\n'));
        raw.rows.push(RawRow { number, cells });
    }
    if last_holds_a_line_break && bytes.iter().filter(|b| **b == b'"').count() % 2 == 1 {
        raw.cut = true;
        report.error(
            raw.place(Some(number), None, None),
            "a quotation mark is opened and not closed, so that all further rows are one cell",
            "close it or remove it",
        );
    }
}

/// Lines without any cell that the CSV reader skips before the record that starts at or after `start`.
fn blank_lines(bytes: &[u8], start: usize) -> u32 {
    let mut at = start;
    // The reader takes the carriage return for the end of a record and skips the line feed later.
    if start > 0 && bytes.get(start - 1) == Some(&b'\r') && bytes.get(start) == Some(&b'\n') {
        at += 1;
    }
    let mut lines = 0;
    loop {
        match bytes.get(at) {
            Some(b'\r') if bytes.get(at + 1) == Some(&b'\n') => at += 2,
            Some(b'\r' | b'\n') => at += 1,
            _ => return lines,
        }
        lines += 1;
    }
}

fn too_many(raw: &RawSheet, number: u32, report: &Report) {
    report.error(
        raw.place(Some(number), None, None),
        format!(
            "the file goes on; allowed {} rows on a sheet and {} cells in a book",
            limits::ROWS,
            limits::CELLS
        ),
        "split the floor into several books",
    );
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::sheets::PANELS;

    fn read(bytes: &[u8]) -> (RawSheet, Vec<String>) {
        let report = Report::new();
        let raw = sheet(Path::new("x/panels.csv"), bytes, &PANELS, &mut 1_000_000, &report);
        (raw, report.into_queries().iter().map(ToString::to_string).collect())
    }

    fn numbers(raw: &RawSheet) -> Vec<u32> {
        raw.rows.iter().map(|row| row.number).collect()
    }

    #[test]
    fn rows_are_numbered_as_a_spreadsheet_shows_them() {
        for ends in ["\n", "\r\n", "\r"] {
            let text = "\n\nPanel,X from\n\nS1,A\nS2,\"B\nstill B\"\n,\n\nS3,C\n".replace('\n', ends);
            let (raw, said) = read(text.as_bytes());
            assert_eq!(numbers(&raw), [3, 5, 6, 7, 9], "{ends:?}");
            assert!(said.is_empty(), "{said:?}");
        }
    }

    #[test]
    fn a_byte_order_mark_is_no_part_of_the_first_heading() {
        let (raw, said) = read(b"\xef\xbb\xbfPanel,X from\nS1,A\n");
        assert_eq!(raw.rows[0].cells[0], Content::text("Panel"));
        assert!(said.is_empty());
    }

    #[test]
    fn the_separator_is_found_from_the_headings() {
        for separator in [",", ";", "\t"] {
            let text = "a title; with, marks\nPanel|X from|X to\nS1|A|B\n".replace('|', separator);
            let (raw, _) = read(text.as_bytes());
            assert_eq!(raw.rows[2].cells.len(), 3, "{separator:?}");
            assert_eq!(raw.decimal_comma, separator != ",");
        }
    }

    #[test]
    fn utf16_is_refused_with_a_remedy() {
        let text: Vec<u8> = "Panel;X from".encode_utf16().flat_map(u16::to_le_bytes).collect();
        let marked = [b"\xff\xfe".to_vec(), text.clone()].concat();
        for bytes in [text, marked] {
            let (raw, said) = read(&bytes);
            assert!(raw.rows.is_empty());
            let expected =
                "error: panels.csv: the file is UTF-16 text; save it again from the spreadsheet as CSV UTF-8";
            assert_eq!(said, [expected]);
        }
    }

    #[test]
    fn bytes_that_are_no_utf8_are_said_once_with_their_row() {
        let (_, said) = read(b"Panel,Remarks\nS1,ok\nS2,caf\xe9\nS3,caf\xe9\n");
        let expected = "error: panels.csv row 3: byte E9 is not UTF-8 text; save the file again from the spreadsheet as CSV UTF-8";
        assert_eq!(said, [expected]);
    }

    #[test]
    fn a_zero_byte_is_said_once() {
        let (raw, said) = read(b"Panel,Remarks\nS\x001,ok\nS\x002,ok\n");
        assert_eq!(raw.rows[1].cells[0], Content::text("S1"));
        let expected = "error: panels.csv row 2: the text holds a zero byte; save the file again from the spreadsheet as CSV UTF-8";
        assert_eq!(said, [expected]);
    }

    #[test]
    fn an_unclosed_quotation_mark_does_not_swallow_rows_silently() {
        let (_, said) = read(b"Panel,X from\nS1,\"A\nS2,B\nS3,C\n");
        let expected = "error: panels.csv row 2: a quotation mark is opened and not closed, \
                        so that all further rows are one cell; close it or remove it";
        assert_eq!(said, [expected]);
        let (_, said) = read(b"Panel,Remarks\nS1,6\" pipe\nS2,B\n");
        assert!(said.is_empty(), "a mark inside a cell is text: {said:?}");
    }

    #[test]
    fn a_file_beyond_the_limits_is_cut_with_an_error() {
        let text = format!("Panel,X from\n{}", "S1,A\n".repeat(limits::ROWS as usize + 5));
        let (raw, said) = read(text.as_bytes());
        assert_eq!(raw.rows.len(), limits::ROWS as usize);
        assert_eq!(said.len(), 1);
        assert!(
            said[0].starts_with("error: panels.csv row 100001: the file goes on; allowed 100000 rows"),
            "{said:?}"
        );
    }
}
