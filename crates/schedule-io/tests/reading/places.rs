//! Subjects are turned into places: the cell, else the row, else words.

use design_engine::floor::Side;
use design_engine::query::{Query, Severity, Subject};
use schedule_io::book::Book;

use crate::support::{C, S, file, folder, read, workbook};

fn csv_book() -> Book {
    let (_dir, path) = folder(&[
        ("criteria.csv", b"Item,Value\nThickness (mm),175\n"),
        ("gridlines.csv", b"Gridline,Axis,Position\nA,X,0\nB,X,5\n1,Y,0\n2,Y,6\n"),
        (
            "panels.csv",
            b"Title\n\nPanel,X from,X to,Y from,Y to,Imposed (kN/m2),East edge\n\nS1,A,B,1,2,2,free\n",
        ),
        ("loose_panels.csv", b"Panel,Short span,Long span,Long edge 2\nR1,3,4,continuous\n"),
        ("joints.csv", b"Gridline\n\nA\n,\nB\n"),
    ]);
    read(&path).book.unwrap()
}

fn panel(mark: &str, column: Option<&'static str>) -> Subject {
    Subject::Panel { mark: mark.to_owned(), column }
}

#[test]
fn a_subject_is_named_by_its_place_or_else_in_words() {
    let book = csv_book();
    let edge = |mark: &str, side| Subject::Edge { mark: mark.to_owned(), side };
    for (subject, expected) in [
        (panel("S1", None), "panels.csv row 5: "),
        (panel("S1", Some("Imposed")), "panels.csv row 5, Imposed (kN/m2): "),
        (panel("S1", Some("Thickness")), "panels.csv row 5: "),
        (panel("S9", None), "panel S9: "),
        (panel("S9", Some("Thickness")), "panel S9, Thickness: "),
        (edge("S1", Side::East), "panels.csv row 5, East edge: "),
        (edge("S1", Side::North), "panels.csv row 5: "),
        (edge("R1", Side::East), "loose_panels.csv row 2, Long edge 2: "),
        (edge("R1", Side::West), "loose_panels.csv row 2: "),
        (edge("S9", Side::West), "panel S9, west edge: "),
        (Subject::Setting("Thickness"), "criteria.csv row 2, Thickness (mm): "),
        (Subject::Setting("Imposed"), "Imposed: "),
        (Subject::Gridline("2".to_owned()), "gridlines.csv row 5: "),
        (Subject::Gridline("Q".to_owned()), "gridline Q: "),
        (Subject::Row { sheet: "Joints", index: 1 }, "joints.csv row 5: "),
        (Subject::Row { sheet: "Openings", index: 1 }, "Openings, entry 2: "),
        (Subject::Support("B/1-2".to_owned()), "support B/1-2: "),
        (Subject::Floor, ""),
    ] {
        let placed = book.placed(Query::new(Severity::Warning, subject.clone(), "look at it", "do so"));
        assert_eq!(placed.to_string(), format!("warning: {expected}look at it; do so"), "{subject:?}");
        assert_eq!(placed.place, book.places.place(&subject));
    }
    let placed = book.placed(Query::new(Severity::Note, Subject::Floor, "nothing to do", ""));
    assert_eq!(placed.to_string(), "note: nothing to do");
}

#[test]
fn a_place_in_a_workbook_names_sheet_and_cell() {
    let mut heading = vec![C::No; 26];
    heading.extend(["Panel", "Short span (m)", "Long span (m)", "Short edge 1"].map(C::T));
    let mut row = vec![C::No; 26];
    row.extend([C::T("R1"), C::N(3.0), C::N(4.0), C::T("free")]);
    let (_dir, path) = file("book.xlsx", &workbook(&[S::new("Loose Panels", &[&[], &heading, &row])]));
    let book = read(&path).book.unwrap();
    let shown = |subject| book.places.place(&subject).unwrap().to_string();
    assert_eq!(
        shown(panel("R1", Some("Long span"))),
        "book.xlsx, sheet Loose Panels, cell AC3, Long span (m)"
    );
    assert_eq!(shown(panel("R1", None)), "book.xlsx, sheet Loose Panels, row 3");
    let south = Subject::Edge { mark: "R1".to_owned(), side: Side::South };
    assert_eq!(shown(south), "book.xlsx, sheet Loose Panels, cell AD3, Short edge 1");
    assert_eq!(book.name, "book.xlsx");
}
