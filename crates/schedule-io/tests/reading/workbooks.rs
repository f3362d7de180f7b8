//! Wrong workbooks, and the exact words in which they are refused.

use crate::support::{C, S, check, file, read, said, workbook};

fn panels_sheet(cells: &[C]) -> Vec<S> {
    let heading = ["Panel", "X from", "X to", "Y from", "Y to", "Thickness (mm)", "Remarks"].map(C::T);
    vec![
        S::new(
            "Gridlines",
            &[
                &[C::T("Gridline"), C::T("Axis"), C::T("Position (m)")],
                &[C::T("A"), C::T("X"), C::N(0.0)],
                &[C::T("B"), C::T("X"), C::N(5.1)],
                &[C::N(1.0), C::T("Y"), C::N(0.0)],
                &[C::T("2"), C::T("Y"), C::N(6.2)],
            ],
        ),
        S::new("Panels", &[&[C::T("First floor")], &[], &heading, cells]),
    ]
}

fn of_workbook(sheets: &[S]) -> Vec<String> {
    let (_dir, path) = file("book.xlsx", &workbook(sheets));
    said(&read(&path))
}

fn thickness(cell: C) -> Vec<String> {
    of_workbook(&panels_sheet(&[C::N(101.0), C::T("A"), C::T("B"), C::T("1"), C::N(2.0), cell]))
}

#[test]
fn odd_cells_of_a_workbook_are_refused_with_their_cell() {
    for good in [C::No, C::N(150.0), C::F("100+50", 150.0), C::EmptyText("\"\""), C::T("  ")] {
        check(&thickness(good), &[]);
    }
    let place = "error: book.xlsx, sheet Panels, cell F4, Thickness (mm): ";
    for (cell, expected) in [
        (
            C::T("150 mm"),
            "read \"150 mm\"; allowed 75 to 1000; write 150 alone: the unit belongs in the heading",
        ),
        (C::T("nan"), "read \"nan\"; allowed 75 to 1000; write a number"),
        (C::N(2000.0), "read \"2000\"; allowed 75 to 1000; correct the number"),
        (C::B(true), "read the logical value TRUE; allowed 75 to 1000; write a number"),
        (
            C::E("#REF!"),
            "read the error value #REF!; allowed 75 to 1000; correct its formula or write the value",
        ),
        (
            C::NoResult("100+50"),
            "the formula has no stored result; open the book in a spreadsheet, let it compute, and save it; \
             or write the value",
        ),
        (
            C::D(150.0),
            "read the date 1900-05-29; allowed 75 to 1000; \
             give the cell a plain number format and type the number again",
        ),
        (
            C::M(150.0),
            "read the date 1900-05-29; allowed 75 to 1000; \
             give the cell a plain number format and type the number again",
        ),
    ] {
        check(&thickness(cell), &[&format!("{place}{expected}")]);
    }
    check(
        &thickness(C::T("150")),
        &["note: book.xlsx, sheet Panels, cell F4, Thickness (mm): 1 number of the column stored as text, \
             the first is \"150\"; read as numbers"],
    );
}

#[test]
fn a_mark_that_became_a_number_or_a_date_is_noticed() {
    let mark = |cell: C| of_workbook(&panels_sheet(&[cell, C::T("A"), C::T("B"), C::T("1"), C::N(2.0)]));
    check(&mark(C::N(101.0)), &[]);
    check(
        &mark(C::N(1.1)),
        &[
            "note: book.xlsx, sheet Panels, cell A4, Panel: 1 mark of the column stored as a number with decimals, \
             the first is \"1.1\"; a mark typed as 1.10 arrives as 1.1; \
             if a zero is lost, format the cell as text and type the mark again",
        ],
    );
    check(
        &mark(C::D(46054.0)),
        &["error: book.xlsx, sheet Panels, cell A4, Panel: read the date 2026-02-01; \
             allowed a name of up to 40 characters; a mark such as 1-2 may have become a date: \
             format the cell as text and type the mark again"],
    );
}

#[test]
fn a_merged_cell_is_not_taken_for_a_blank() {
    let mut sheets = panels_sheet(&[C::T("S1"), C::T("A"), C::T("B"), C::T("1"), C::N(2.0), C::N(200.0)]);
    sheets[1].rows.push(vec![C::T("S2"), C::T("A"), C::T("B"), C::T("1"), C::N(2.0)]);
    sheets[1].merged = vec!["A1:G1", "F4:F5", "G4:G5"];
    check(
        &of_workbook(&sheets),
        &["error: book.xlsx, sheet Panels, cell F5, Thickness (mm): the cell is merged with F4, \
             which alone holds a value; unmerge the cells and fill each one"],
    );
}

#[test]
fn stray_cells_and_unknown_sheets_are_named_and_not_used() {
    let mut sheets = panels_sheet(&[C::T("S1"), C::T("A"), C::T("B"), C::T("1"), C::N(2.0)]);
    sheets[0].extra_rows = r#"<row r="9"><c r="XFD9"><v>7</v></c></row>"#.to_owned();
    sheets[1].extra_rows = r#"<row r="9"><c r="J9"><v>7</v></c></row>"#.to_owned();
    sheets.push(S::new("Sketches", &[&[C::T("x")]]));
    sheets.push(S::new("Opening", &[&[C::T("x")]]));
    sheets.push(S::new("read me", &[&[C::T("x")]]));
    check(
        &of_workbook(&sheets),
        &[
            "warning: book.xlsx, sheet Opening: this is no sheet of a floor book and is not used; \
             if it is meant to be Openings, correct its name",
            "note: book.xlsx, sheet Gridlines, cell XFD9: read \"7\" beyond column IV; such cells are not used",
            "note: book.xlsx, sheet Panels, cell J9: read \"7\" under no heading; such cells are not used",
            "note: book.xlsx, sheet Sketches: this is no sheet of a floor book and is not used",
        ],
    );
    sheets[1].extra_rows = r#"<row r="1048576"><c r="A1048576"><v>7</v></c></row>"#.to_owned();
    assert_eq!(
        of_workbook(&sheets)[0],
        "error: book.xlsx, sheet Panels, cell A1048576: read \"7\" here; allowed 100000 rows on a sheet and 4000000 \
         cells in a book; clear the cell if it is a stray one; otherwise split the floor into several books"
    );
}

#[test]
fn a_sheet_that_breaks_off_is_refused() {
    let mut sheets = panels_sheet(&[C::T("S1"), C::T("A"), C::T("B"), C::T("1"), C::N(2.0)]);
    sheets[1].extra_rows = r#"<row r="5"><c r="A5" t="e"><v>#ODD!</v></c></row>"#.to_owned();
    check(
        &of_workbook(&sheets),
        &["error: book.xlsx, sheet Panels, row 4: the sheet cannot be read beyond this place \
             (Unsupported cell error value '#ODD!'); open it in a spreadsheet and save it again as .xlsx"],
    );
}

#[test]
fn the_same_sheet_twice_is_refused() {
    let mut sheets = panels_sheet(&[C::T("S1"), C::T("A"), C::T("B"), C::T("1"), C::N(2.0)]);
    sheets.push(S::new("PANELS ", &[&[C::T("x")]]));
    check(
        &of_workbook(&sheets),
        &["error: book.xlsx, sheet PANELS : the sheet Panels is there twice, first as Panels; \
             delete or rename one of the two sheets"],
    );
}
