//! Books for tests: folders of CSV files, and workbooks written part by part, so that they can hold what a
//! well-behaved writer would not write.

use std::fmt::Write as _;
use std::path::{Path, PathBuf};

use schedule_io::read::{Reading, read_book};
use tempfile::TempDir;

/// A cell of a raw workbook.
#[derive(Debug, Clone, Copy)]
pub(crate) enum C {
    /// Nothing.
    No,
    /// Text.
    T(&'static str),
    /// A number.
    N(f64),
    /// A logical value.
    B(bool),
    /// An error value.
    E(&'static str),
    /// A number with a date format.
    D(f64),
    /// A number with the format `0.0 m`, where the m is not quoted.
    M(f64),
    /// A formula with its stored result, a number.
    F(&'static str, f64),
    /// A formula without a stored result.
    NoResult(&'static str),
    /// A formula whose stored result is an empty text.
    EmptyText(&'static str),
}

/// A sheet of a raw workbook: name, rows from the first on, merged ranges.
#[derive(Debug, Clone)]
pub(crate) struct S {
    pub(crate) name: &'static str,
    pub(crate) rows: Vec<Vec<C>>,
    pub(crate) merged: Vec<&'static str>,
    /// XML put in as it is after the rows.
    pub(crate) extra_rows: String,
}

impl S {
    pub(crate) fn new(name: &'static str, rows: &[&[C]]) -> S {
        S {
            name,
            rows: rows.iter().map(|row| row.to_vec()).collect(),
            merged: vec![],
            extra_rows: String::new(),
        }
    }
}

fn letters(mut column: usize) -> String {
    let mut out = String::new();
    loop {
        out.insert(0, char::from(b'A' + u8::try_from(column % 26).unwrap()));
        if column < 26 {
            return out;
        }
        column = column / 26 - 1;
    }
}

fn escaped(text: &str) -> String {
    text.replace('&', "&amp;").replace('<', "&lt;").replace('>', "&gt;")
}

fn cell_xml(reference: &str, cell: C) -> String {
    match cell {
        C::No => String::new(),
        C::T(text) => format!(
            r#"<c r="{reference}" t="inlineStr"><is><t xml:space="preserve">{}</t></is></c>"#,
            escaped(text)
        ),
        C::N(number) => format!(r#"<c r="{reference}"><v>{number}</v></c>"#),
        C::B(truth) => format!(r#"<c r="{reference}" t="b"><v>{}</v></c>"#, u8::from(truth)),
        C::E(error) => format!(r#"<c r="{reference}" t="e"><v>{error}</v></c>"#),
        C::D(number) => format!(r#"<c r="{reference}" s="1"><v>{number}</v></c>"#),
        C::M(number) => format!(r#"<c r="{reference}" s="2"><v>{number}</v></c>"#),
        C::F(formula, result) => format!(r#"<c r="{reference}"><f>{formula}</f><v>{result}</v></c>"#),
        C::NoResult(formula) => format!(r#"<c r="{reference}"><f>{formula}</f></c>"#),
        C::EmptyText(formula) => format!(r#"<c r="{reference}" t="str"><f>{formula}</f><v></v></c>"#),
    }
}

const HEAD: &str = r#"<?xml version="1.0" encoding="UTF-8" standalone="yes"?>"#;
const MAIN: &str = r#"xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main""#;
const REL: &str = "http://schemas.openxmlformats.org/officeDocument/2006/relationships";
const PACK: &str = r#"xmlns="http://schemas.openxmlformats.org/package/2006/relationships""#;

fn sheet_xml(sheet: &S) -> String {
    let mut xml = format!("{HEAD}<worksheet {MAIN}><sheetData>");
    for (row, cells) in sheet.rows.iter().enumerate() {
        let number = row + 1;
        write!(xml, r#"<row r="{number}">"#).unwrap();
        for (column, cell) in cells.iter().enumerate() {
            xml += &cell_xml(&format!("{}{number}", letters(column)), *cell);
        }
        xml += "</row>";
    }
    xml += &sheet.extra_rows;
    xml += "</sheetData>";
    if !sheet.merged.is_empty() {
        let cells: String =
            sheet.merged.iter().map(|range| format!(r#"<mergeCell ref="{range}"/>"#)).collect();
        write!(xml, "<mergeCells>{cells}</mergeCells>").unwrap();
    }
    xml + "</worksheet>"
}

/// A workbook of these sheets, as bytes.
pub(crate) fn workbook(sheets: &[S]) -> Vec<u8> {
    let mut parts = vec![
        (
            "_rels/.rels".to_owned(),
            format!(
                r#"{HEAD}<Relationships {PACK}><Relationship Id="rId1" Type="{REL}/officeDocument" Target="xl/workbook.xml"/></Relationships>"#
            ),
        ),
        (
            "xl/styles.xml".to_owned(),
            format!(
                r#"{HEAD}<styleSheet {MAIN}><numFmts count="1"><numFmt numFmtId="170" formatCode="0.0 m"/></numFmts><cellXfs count="3"><xf numFmtId="0"/><xf numFmtId="14"/><xf numFmtId="170"/></cellXfs></styleSheet>"#
            ),
        ),
    ];
    let (mut names, mut relations) = (String::new(), String::new());
    for (index, sheet) in sheets.iter().enumerate() {
        let id = index + 1;
        write!(names, r#"<sheet name="{}" sheetId="{id}" r:id="rId{id}"/>"#, escaped(sheet.name)).unwrap();
        write!(
            relations,
            r#"<Relationship Id="rId{id}" Type="{REL}/worksheet" Target="worksheets/sheet{id}.xml"/>"#
        )
        .unwrap();
        parts.push((format!("xl/worksheets/sheet{id}.xml"), sheet_xml(sheet)));
    }
    parts.push((
        "xl/workbook.xml".to_owned(),
        format!(r#"{HEAD}<workbook {MAIN} xmlns:r="{REL}"><sheets>{names}</sheets></workbook>"#),
    ));
    parts.push((
        "xl/_rels/workbook.xml.rels".to_owned(),
        format!("{HEAD}<Relationships {PACK}>{relations}</Relationships>"),
    ));
    archive(&parts)
}

/// A zip archive of stored parts.
pub(crate) fn archive(parts: &[(String, String)]) -> Vec<u8> {
    let (mut out, mut directory) = (Vec::new(), Vec::new());
    let four = |n: usize| u32::try_from(n).unwrap().to_le_bytes();
    let two = |n: usize| u16::try_from(n).unwrap().to_le_bytes();
    for (name, content) in parts {
        let offset = out.len();
        // Version 2.0, no flags, stored, no time; checksum, sizes, lengths of name and extra field.
        let mut common = vec![20, 0, 0, 0, 0, 0, 0, 0, 0x21, 0];
        common.extend(crc32(content.as_bytes()).to_le_bytes());
        common.extend([four(content.len()), four(content.len())].concat());
        common.extend([two(name.len()), two(0)].concat());
        out.extend(b"PK\x03\x04");
        out.extend(&common);
        out.extend(name.as_bytes());
        out.extend(content.as_bytes());
        directory.extend(b"PK\x01\x02\x14\x00");
        directory.extend(&common);
        directory.extend([0; 10]);
        directory.extend(four(offset));
        directory.extend(name.as_bytes());
    }
    let start = out.len();
    out.extend(&directory);
    out.extend(b"PK\x05\x06\0\0\0\0");
    out.extend([two(parts.len()), two(parts.len())].concat());
    out.extend([four(directory.len()), four(start)].concat());
    out.extend([0, 0]);
    out
}

/// Checksum of a part (CRC-32 of the zip format).
fn crc32(bytes: &[u8]) -> u32 {
    let step = |crc: u32, byte: &u8| {
        (0..8).fold(crc ^ u32::from(*byte), |crc, _| (crc >> 1) ^ (0xedb8_8320 * (crc & 1)))
    };
    !bytes.iter().fold(!0, step)
}

/// A folder `book` of CSV files.
pub(crate) fn folder(files: &[(&str, &[u8])]) -> (TempDir, PathBuf) {
    let dir = tempfile::tempdir().unwrap();
    let book = dir.path().join("book");
    std::fs::create_dir(&book).unwrap();
    for (name, content) in files {
        std::fs::write(book.join(name), content).unwrap();
    }
    (dir, book)
}

/// A file of a given name.
pub(crate) fn file(name: &str, bytes: &[u8]) -> (TempDir, PathBuf) {
    let dir = tempfile::tempdir().unwrap();
    let path = dir.path().join(name);
    std::fs::write(&path, bytes).unwrap();
    (dir, path)
}

/// What is said of a book, one line each.
pub(crate) fn said(reading: &Reading) -> Vec<String> {
    reading.queries.iter().map(ToString::to_string).collect()
}

/// Reads a book that can be opened.
pub(crate) fn read(path: &Path) -> Reading {
    read_book(path).unwrap_or_else(|error| panic!("{error}"))
}

/// Compares what is said with what should be, and shows it as a reader sees it.
#[track_caller]
pub(crate) fn check(said: &[String], expected: &[&str]) {
    assert_eq!(said, expected, "\n{}", said.join("\n"));
}
