//! What cannot be opened at all, and the words in which it is refused.

use crate::support::{C, S, archive, file, folder, read, said, workbook};
use schedule_io::read::read_book;

fn refused(name: &str, bytes: &[u8]) -> String {
    let (dir, path) = file(name, bytes);
    let said = read_book(&path).unwrap_err().to_string();
    said.replace(&format!("{}/", dir.path().display()), "")
}

#[test]
fn files_of_other_kinds_are_refused_with_a_remedy() {
    let good = workbook(&[S::new("Panels", &[&[C::T("Panel")]])]);
    let encrypted = b"\xd0\xcf\x11\xe0\xa1\xb1\x1a\xe1 and so on".to_vec();
    let other_archive = archive(&[("mimetype".to_owned(), "application/x".to_owned())]);
    for (name, bytes, expected) in [
        ("a.xls", &good[..], "a floor book is no .xls file; open it in a spreadsheet and save it as .xlsx"),
        ("a.ods", &good[..], "a floor book is no .ods file; open it in a spreadsheet and save it as .xlsx"),
        ("a.xlsm", &good[..], "a floor book is no .xlsm file; open it in a spreadsheet and save it as .xlsx"),
        ("a.csv", b"Panel", "one CSV file is no floor book; give the folder that holds the CSV files"),
        ("a.txt", b"Panel", "the file is no .xlsx workbook; give an .xlsx workbook or a folder of CSV files"),
        ("~$a.xlsx", b"x", "this is the lock file of a book that is open; give the book itself"),
        (".~lock.a.xlsx#", b"x", "this is the lock file of a book that is open; give the book itself"),
        ("a.xlsx", b"", "the file is empty; copy it again or restore it"),
        (
            "a.xlsx",
            b"Panel,X from",
            "the file is no .xlsx workbook; open it in a spreadsheet and save it again as .xlsx",
        ),
        (
            "a.xlsx",
            &encrypted,
            "the workbook is protected by a password, or it is an old .xls file under a new name; \
             save it as .xlsx without a password",
        ),
        (
            "a.xlsx",
            &good[..good.len() / 2],
            "the workbook is damaged or cut short; copy it again or restore it",
        ),
        (
            "a.xlsx",
            &other_archive,
            "the file is an archive but no .xlsx workbook; open it in a spreadsheet and save it again as .xlsx",
        ),
        (
            "a.xlsx",
            &workbook(&[S::new("Prices", &[&[C::T("x")]])]),
            "the workbook holds no sheet of a floor book; name its sheets Criteria, Gridlines, Panels and so on",
        ),
    ] {
        assert_eq!(refused(name, bytes), format!("{name}: {expected}"));
    }
}

#[test]
fn missing_paths_and_empty_folders_are_refused() {
    let (dir, path) = folder(&[("notes.csv", b"x")]);
    let said = read_book(&path).unwrap_err().to_string();
    assert!(
        said.ends_with(
            "the folder holds no CSV file of a floor book; give a folder with criteria.csv, gridlines.csv, \
             panels.csv and so on, or an .xlsx workbook"
        ),
        "{said}"
    );
    let said = read_book(&dir.path().join("none.xlsx")).unwrap_err().to_string();
    assert!(said.ends_with("there is no such file or folder; check the name and the folder"), "{said}");
}

#[test]
fn a_workbook_that_claims_to_unpack_to_gigabytes_is_refused_unopened() {
    let mut bytes = workbook(&[S::new("Panels", &[&[C::T("Panel")]])]);
    let entry = bytes.windows(4).position(|window| window == b"PK\x01\x02").unwrap();
    bytes[entry + 24..entry + 28].copy_from_slice(&0x7fff_ffff_u32.to_le_bytes());
    assert_eq!(
        refused("a.xlsx", &bytes),
        "a.xlsx: unpacked, the workbook is larger than 500 MB; \
         remove what is no part of the floor book and save it again"
    );
}

#[test]
fn crafted_references_are_no_panic() {
    for extra in [
        r#"<row r="5"><c r="ZZZZZZZZZZ99999999999"><v>1</v></c></row>"#,
        r#"<row r="4294967295"><c r="A4294967295"><v>1</v></c></row>"#,
        r#"<row r="x"><c r="!"><v>1</v></c></row>"#,
        r#"<row r="5"><c r="A5" t="s"><v>99</v></c></row>"#,
    ] {
        let mut sheet = S::new("Panels", &[&[C::T("Panel"), C::T("X from")]]);
        sheet.extra_rows = extra.to_owned();
        let (_dir, path) = file("a.xlsx", &workbook(&[sheet]));
        // Refused as a whole or with an error of the sheet; never taken for a good book.
        assert!(read_book(&path).map_or(true, |reading| reading.book.is_none()), "{extra}");
    }
    let mut sheet = S::new("Panels", &[&[C::T("Panel"), C::T("X from")]]);
    sheet.merged = vec!["C9:A1", "A1:XFD1048576"];
    let (_dir, path) = file("a.xlsx", &workbook(&[sheet]));
    assert!(read_book(&path).map_or(true, |reading| reading.book.is_none()));
}

#[test]
fn a_folder_takes_its_own_files_by_name_and_leaves_the_rest() {
    let files: &[(&str, &[u8])] = &[
        ("Loose Panels.CSV", b"Panel,Short span,Long span\nR1,3.1,4.2\n"),
        ("~$panels.csv", b"x"),
        (".hidden.csv", b"x"),
        ("readme.csv", b"x"),
        ("sketch.png", b"x"),
    ];
    let (_dir, path) = folder(files);
    let reading = read(&path);
    assert!(reading.queries.is_empty(), "{:?}", said(&reading));
    assert_eq!(reading.book.unwrap().layout.loose_panels.len(), 1);
}
