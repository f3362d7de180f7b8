//! Wrong input of every kind, and the exact words in which it is refused.

use crate::support::{check, folder, read, said};

const GRIDLINES: &str = "Gridline,Axis,Position (m)\nA,X,0\nB,X,5.1\nC,X,9.6\n1,Y,0\n2,Y,6.2\n";
const PANELS: &str = "Panel,X from,X to,Y from,Y to,Thickness (mm),Finishes (kN/m2),Imposed (kN/m2),Spanning,North edge,Remarks\n\
                      S1,A,B,1,2,150,1.2,2.5,,,\n\
                      S2,B,C,1,2,,,,two-way,discontinuous,stair side\n";
const LOOSE: &str = "Panel,Short span (m),Long span (m)\nR1,3.1,4.2\n";

/// What is said of the good book with some files put in or replaced.
fn of(files: &[(&str, &str)]) -> Vec<String> {
    let mut all = vec![("gridlines.csv", GRIDLINES.as_bytes()), ("panels.csv", PANELS.as_bytes())];
    for (name, content) in files {
        all.retain(|(known, _)| known != name);
        all.push((name, content.as_bytes()));
    }
    let (_dir, path) = folder(&all);
    said(&read(&path))
}

/// The same with one further row of `Panels`.
fn panel(row: &str) -> Vec<String> {
    of(&[("panels.csv", &format!("{PANELS}{row}\n"))])
}

fn item(row: &str) -> Vec<String> {
    of(&[("criteria.csv", &format!("Item,Value,Unit\n{row}\n"))])
}

#[test]
fn a_good_book_is_read_without_a_word() {
    check(&of(&[]), &[]);
    check(&of(&[("loose_panels.csv", LOOSE), ("criteria.csv", "Item,Value\nThickness (mm),175\n")]), &[]);
}

#[test]
fn wrong_numbers_are_refused() {
    let thickness = |read: &str, remedy: &str| {
        format!("error: panels.csv row 4, Thickness (mm): read \"{read}\"; allowed 75 to 1000; {remedy}")
    };
    for (cell, read, remedy) in [
        ("150x", "150x", "write a number"),
        ("nan", "nan", "write a number"),
        ("inf", "inf", "write a number"),
        ("1e999", "1e999", "write a number of ordinary size"),
        ("0x96", "0x96", "write a plain decimal number"),
        ("\"152,5\"", "152,5", "write 152.5 with a decimal point"),
        ("\"1,000.5\"", "1,000.5", "write 1000.5 without a thousands separator"),
        ("150 mm", "150 mm", "write 150 alone: the unit belongs in the heading"),
        ("\u{a0}150", "\\u{a0}150", "remove the non-breaking space and write a plain number"),
        ("15", "15", "correct the number"),
        ("1001", "1001", "correct the number"),
        ("-150", "-150", "correct the number"),
    ] {
        check(&panel(&format!("S3,A,C,1,2,{cell}")), &[&thickness(read, remedy)]);
    }
    check(
        &panel("S3,A,C,1,2,,,\"2,5x\""),
        &[r#"error: panels.csv row 4, Imposed (kN/m2): read "2,5x"; allowed 0 to 50; write a number"#],
    );
}

#[test]
fn wrong_words_and_names_are_refused_with_the_nearest_known() {
    check(
        &panel("S3,A,C,1,2,,,,twoway,Continous,"),
        &[
            "error: panels.csv row 4, North edge: read \"Continous\"; allowed continuous | discontinuous | free; \
             write one of these words; nearest is \"continuous\"",
        ],
    );
    check(
        &panel("S3,A,D,1,2"),
        &["error: panels.csv row 4, X to: read \"D\"; no gridline has this name; \
             correct the name or add it to Gridlines; known: A, B, C"],
    );
    check(
        &panel("S3,1,C,1,2"),
        &["error: panels.csv row 4, X from: read \"1\"; it is a Y gridline; name an X gridline"],
    );
    check(
        &panel("S1,A,C,1,2"),
        &["error: panels.csv row 4, Panel: the mark S1 is already used in panels.csv row 2; \
             give each panel its own mark"],
    );
    check(
        &of(&[("loose_panels.csv", "Panel,Short span,Long span\nS2,3,4\n")]),
        &["error: loose_panels.csv row 2, Panel: the mark S2 is already used in panels.csv row 3; \
             give each panel its own mark"],
    );
    check(
        &of(&[("gridlines.csv", &format!("{GRIDLINES}A,Y,3\n"))]),
        &["error: gridlines.csv row 7, Gridline: the gridline A is already in row 2; \
             give each gridline its own name"],
    );
    let long = "S".repeat(41);
    check(
        &panel(&format!("{long},A,C,1,2")),
        &[&format!(
            "error: panels.csv row 4, Panel: read \"{long}\"; allowed a name of up to 40 characters; shorten it"
        )],
    );
    check(
        &panel("\"S3\nS4\",A,C,1,2"),
        &["error: panels.csv row 4, Panel: read \"S3\\nS4\"; allowed a name of up to 40 characters; \
             remove the line break or control character"],
    );
}

#[test]
fn cells_that_must_be_filled_are_asked_for() {
    check(
        &panel("S3,A,,1,2"),
        &["error: panels.csv row 4, X to: the cell is empty; allowed the name of an X gridline; \
             fill it, or clear the whole row"],
    );
    check(
        &panel(",A,C,1,2"),
        &["error: panels.csv row 4, Panel: the cell is empty; allowed a name of up to 40 characters; \
             fill it, or clear the whole row"],
    );
    check(
        &of(&[("panels.csv", "Panel,X from,X too,Y from,Y to\nS1,A,B,1,2\n")]),
        &[
            "error: panels.csv row 1: the column X to is missing; add it; nearest is \"X too\"",
            "warning: panels.csv row 1, X too: the column is not known on Panels and is not used; \
             if it is meant to be X to, correct the heading",
        ],
    );
    check(
        &of(&[("panels.csv", "list of panels\n\nS1,A,B,1,2\n")]),
        &["error: panels.csv row 1: no row of headings is found in the first 50 rows; \
             write a row of headings with at least Panel, X from, X to, Y from, Y to"],
    );
}

#[test]
fn headings_are_checked() {
    let with = |heading: &str| of(&[("gridlines.csv", &GRIDLINES.replace("Position (m)", heading))]);
    for good in ["Position", " POSITION ( M )", "position[m]", "Position\u{a0}(m)"] {
        check(&with(good), &[]);
    }
    check(
        &with("Position (ft)"),
        &["error: gridlines.csv row 1, Position (ft): the unit is \"ft\"; allowed m, mm, cm; \
             write the heading as Position (m)"],
    );
    check(
        &of(&[("loose_panels.csv", "Panel,Short span (mm),Long span (mm)\nR1,3.1,4200\n")]),
        &["error: loose_panels.csv row 2, Short span (mm): read \"3.1\" mm, that is 0.0031 m; \
             allowed 0.3 to 30 m; correct the number, or the unit in the heading"],
    );
    check(
        &of(&[(
            "gridlines.csv",
            &GRIDLINES.replace("Axis", "Axis,axis").replace(",X,", ",X,X,").replace(",Y,", ",Y,Y,"),
        )]),
        &["error: gridlines.csv row 1, axis: the heading is there twice, first in column 2; \
             delete or rename one of the two columns"],
    );
    check(
        &of(&[("loose_panels.csv", "Panel,Short span,Long span,Thicknes,Colour,\nR1,3.1,4.2,200,red,x\n")]),
        &[
            "warning: loose_panels.csv row 1, Thicknes: the column is not known on Loose panels and is not used; \
             if it is meant to be Thickness, correct the heading",
            "note: loose_panels.csv row 1, Colour: the column is not known on Loose panels and is not used",
            "note: loose_panels.csv row 2: read \"x\" under no heading; such cells are not used",
        ],
    );
}

#[test]
fn a_row_longer_than_the_headings_is_refused() {
    check(
        &panel("S3,A,C,1,2,150,1,5,2.5,,,"),
        &[
            "error: panels.csv row 4: the row has 12 cells, the headings have 11; write numbers with a decimal \
             point, and put a cell that holds a comma in quotation marks",
        ],
    );
}

#[test]
fn wrong_criteria_are_refused() {
    for (row, expected) in [
        (
            "Cube strenght fcu,35,",
            "error: criteria.csv row 2, Item: read \"Cube strenght fcu\"; no item has this name; \
             correct the name or delete the row; nearest is \"Cube strength fcu\"",
        ),
        (
            "Cube strength fcu (N/mm2),500,",
            "error: criteria.csv row 2, Cube strength fcu (N/mm2): read \"500\"; allowed 20 to 60; \
             correct the number",
        ),
        (
            "Yield strength fy,420,",
            "error: criteria.csv row 2, Yield strength fy: read \"420\"; allowed one of 250, 460, 500 N/mm2; \
             correct the number",
        ),
        (
            "Exposure,sever,",
            "error: criteria.csv row 2, Exposure: read \"sever\"; allowed mild | moderate | severe; \
             write one of these words; nearest is \"severe\"",
        ),
        (
            "Thickness,0.15,ft",
            "error: criteria.csv row 2, Unit: the unit is \"ft\"; allowed mm, cm, m; \
             correct the unit, and the value with it",
        ),
        (
            "Thickness (m),0.15,mm",
            "error: criteria.csv row 2, Unit: read \"mm\"; the item gives another unit; give the unit once",
        ),
        (
            "Dead load factor (kN),1.4,",
            "error: criteria.csv row 2, Item: the unit is \"kN\"; allowed no unit; \
             correct the unit, and the value with it",
        ),
        (
            "Thickness options,150175,mm",
            "error: criteria.csv row 2, Thickness options: read \"150175\"; allowed a list of numbers, \
             each 75 to 1000 mm; a list typed as 150,175 may have arrived as 150175: write 150; 175",
        ),
        (
            "Bar sizes,10; 14,mm",
            "error: criteria.csv row 2, Bar sizes: read \"10; 14\"; \
             allowed a list from 6, 8, 10, 12, 16, 20, 25, 32 mm; correct the list",
        ),
        (
            "Date,31/03/2026,",
            "error: criteria.csv row 2, Date: read \"31/03/2026\"; allowed a date written as 2026-03-31; \
             write year, month and day as in 2026-03-31",
        ),
        (
            "Top cover,25,\nTop  Cover (mm),30,",
            "error: criteria.csv row 3, Top  Cover (mm): the item is already in row 2; keep one of the two rows",
        ),
        (
            "Least spacing,250,\nGreatest spacing,200,",
            "error: criteria.csv row 2, Least spacing: read \"250\"; \
             allowed not above the greatest spacing, 200 mm; correct the two values",
        ),
        (
            "Greatest spacing,75,",
            "error: criteria.csv: Least spacing (mm) takes its default, 100; \
             allowed not above the greatest spacing, 75 mm; state both values",
        ),
        (
            ",35,",
            "error: criteria.csv row 2, Item: the cell is empty; allowed a name of up to 40 characters; \
             fill it, or clear the whole row",
        ),
    ] {
        check(&item(row), &[expected]);
    }
}

#[test]
fn wrong_rows_of_the_other_sheets_are_refused() {
    let panels_and_loose =
        |name: &'static str, content: &str| of(&[("loose_panels.csv", LOOSE), (name, content)]);
    for (name, content, expected) in [
        (
            "openings.csv",
            "Panel,From west,From south,Width x,Width y\nS7,1,1,0.4,0.4\nS1,1,1,0,0.4",
            vec![
                "error: openings.csv row 2, Panel: read \"S7\"; no panel has this mark; \
                 correct the mark; nearest is \"S1\"",
                "error: openings.csv row 3, Width x: read \"0\"; allowed above 0, up to 30; correct the number",
            ],
        ),
        (
            "wall_loads.csv",
            "Panel,Along,Offset,From,To,Load\nS1,z,1,0,3,4\nS1,x,1,3,2,4",
            vec![
                "error: wall_loads.csv row 2, Along: read \"z\"; allowed X | Y; write one of these words; \
                 nearest is \"X\"",
                "error: wall_loads.csv row 3, To: the wall starts at 3 m and ends at 2 m; \
                 let it end beyond its start",
            ],
        ),
        (
            "supports.csv",
            "Gridline,From,To,Kind,Width\nB,1,C,beam,250\nB,1,1,wall,\nB,,,pillar,20",
            vec![
                "error: supports.csv row 2, To: read \"C\"; it is an X gridline; name a Y gridline",
                "error: supports.csv row 3, To: read \"1\"; it is also the other end; \
                 name two different gridlines, or leave both ends blank",
                "error: supports.csv row 4, Kind: read \"pillar\"; allowed beam | wall | none; \
                 write one of these words",
                "error: supports.csv row 4, Width: read \"20\"; allowed 50 to 2000; correct the number",
            ],
        ),
        (
            "joints.csv",
            "Gridline,From,To\n,1,2",
            vec![
                "error: joints.csv row 2, Gridline: the cell is empty; allowed the name of a gridline; \
                 fill it, or clear the whole row",
            ],
        ),
        (
            "chosen_bars.csv",
            "Panel,Position,Size (mm),Spacing (mm)\nS1,short bottom,10,150\nS1,Short Bottom,12,150\n\
             R1,north top,10,150\nS1,long edge 1 top,10,150\nS2,long bottom,14,20",
            vec![
                "error: chosen_bars.csv row 3, Position: bars for this place of panel S1 are already chosen in row 2; \
                 keep one of the two rows",
                "error: chosen_bars.csv row 4, Position: read \"north top\"; allowed short bottom | long bottom | \
                 long edge 1 top | long edge 2 top | short edge 1 top | short edge 2 top; \
                 panel R1 is a loose panel: name one of its positions",
                "error: chosen_bars.csv row 5, Position: read \"long edge 1 top\"; allowed short bottom | \
                 long bottom | north top | east top | south top | west top; \
                 panel S1 is a panel on gridlines: name one of its positions",
                "error: chosen_bars.csv row 6, Size (mm): read \"14\"; \
                 allowed one of 6, 8, 10, 12, 16, 20, 25, 32; correct the number",
                "error: chosen_bars.csv row 6, Spacing (mm): read \"20\"; allowed 50 to 600; correct the number",
            ],
        ),
    ] {
        check(&panels_and_loose(name, content), &expected);
    }
    check(
        &of(&[("loose_panels.csv", "Panel,Short span,Long span\nR1,4.2,3.1\n")]),
        &[
            "error: loose_panels.csv row 2, Short span: the short span, 4.2 m, is longer than the long span, 3.1 m; \
             exchange the two spans, and the edges with them",
        ],
    );
}

#[test]
fn all_faults_are_said_in_one_go_in_order_of_sheet_row_and_column() {
    let said = of(&[
        ("criteria.csv", "Item,Value\nExposure,damp\nThickness,20\n"),
        ("panels.csv", &format!("{PANELS}S3,A,Q,1,2,9,,99\nS3,A,B,1,2\n")),
        ("extra.csv", "x\n"),
    ]);
    let starts: Vec<&str> = said.iter().filter_map(|line| line.split(": ").nth(1)).collect();
    let expected = [
        "criteria.csv row 2, Exposure",
        "criteria.csv row 3, Thickness",
        "panels.csv row 4, X to",
        "panels.csv row 4, Thickness (mm)",
        "panels.csv row 4, Imposed (kN/m2)",
        "panels.csv row 5, Panel",
        "extra.csv",
    ];
    assert_eq!(starts, expected);
    assert_eq!(said.last().unwrap(), "note: extra.csv: this is no sheet of a floor book and is not used");
}

#[test]
fn an_unreadable_sheet_is_no_reason_to_doubt_the_others() {
    // The marks of Panels cannot be read, so the panel of the opening is not called unknown.
    let openings = ("openings.csv", "Panel,From west,From south,Width x,Width y\nS1,1,1,0.4,0.4\n");
    check(
        &of(&[("panels.csv", "Mark,X from,X to,Y from,Y to\nS1,A,B,1,2\n"), openings]),
        &[
            "error: panels.csv row 1: the column Panel is missing; add it",
            "note: panels.csv row 1, Mark: the column is not known on Panels and is not used",
        ],
    );
    check(
        &of(&[("gridlines.csv", "Name,Axis,Position\nA,X,0\n")]),
        &[
            "error: gridlines.csv row 1: the column Gridline is missing; add it",
            "note: gridlines.csv row 1, Name: the column is not known on Gridlines and is not used",
        ],
    );
}

#[test]
fn a_book_without_panels_or_gridlines_is_refused() {
    let (_dir, path) = folder(&[("criteria.csv", b"Item,Value\nFloor,First\n")]);
    check(
        &said(&read(&path)),
        &["error: book: the book holds no panel; \
             fill a row of Panels (with Gridlines) or of Loose panels"],
    );
    let (_dir, path) = folder(&[("panels.csv", PANELS.as_bytes())]);
    check(
        &said(&read(&path)),
        &["error: panels.csv: the panels need gridlines, and the book has none; \
             fill the sheet Gridlines, or give the panels on the sheet Loose panels"],
    );
}

#[test]
fn a_decimal_comma_belongs_to_files_with_semicolons_or_tabs() {
    let gridlines = GRIDLINES.replace(',', ";").replace('.', ",");
    check(&of(&[("gridlines.csv", &gridlines)]), &[]);
    check(&of(&[("gridlines.csv", &gridlines.replace(';', "\t"))]), &[]);
    check(
        &of(&[("gridlines.csv", &gridlines.replace("9,6", "9.6"))]),
        &[
            "error: gridlines.csv row 4, Position (m): read \"9.6\"; allowed one decimal mark in a file, and earlier \
             numbers use the other one; write all numbers with a decimal point or all with a decimal comma",
        ],
    );
}

#[test]
fn values_under_a_blank_heading_between_two_others_are_refused() {
    check(
        &of(&[("loose_panels.csv", "Panel,Short span,Long span,,Remarks\nR1,3.1,4.2,7.5,store\n")]),
        &["error: loose_panels.csv row 2: read \"7.5\" in a column whose heading is blank; \
             write the heading, or clear the column"],
    );
}
