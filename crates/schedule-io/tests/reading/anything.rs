//! Whatever a file holds, reading it ends with a book or with words, never with a panic.

use proptest::prelude::*;
use schedule_io::read::read_book;

use crate::support::{C, S, file, folder, workbook};

/// Cell texts near what books hold, so that more than the first fault is reached.
fn cell() -> impl Strategy<Value = String> {
    prop_oneof![
        Just(String::new()),
        "[A-C1-3]",
        "S[0-9]{1,2}",
        "-?[0-9]{1,4}(\\.[0-9]{1,3})?",
        "[0-9.,;eE+ -]{1,12}",
        "(two|one)[- ]way( [xy])?|continuous|free|cantilever|beam|X|Y",
        "Panel|Gridline|Axis|Position \\((m|mm|ft)\\)|X from|Item|Value|Unit|Thickness",
        "\\PC{0,12}",
        any::<String>().prop_map(|text| text.chars().take(60).collect()),
    ]
}

fn table() -> impl Strategy<Value = Vec<Vec<String>>> {
    prop::collection::vec(prop::collection::vec(cell(), 0..8), 0..8)
}

fn csv_of(head: &str, rows: &[Vec<String>]) -> Vec<u8> {
    let mut writer = csv::WriterBuilder::new().flexible(true).from_writer(head.as_bytes().to_vec());
    for row in rows.iter().filter(|row| !row.is_empty()) {
        writer.write_record(row).unwrap();
    }
    writer.into_inner().unwrap()
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 128, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn any_bytes_as_csv_are_no_panic(bytes in prop::collection::vec(any::<u8>(), 0..400)) {
        let (_dir, path) = folder(&[("panels.csv", &bytes), ("criteria.csv", &bytes)]);
        prop_assert!(read_book(&path).is_ok());
    }

    #[test]
    fn any_cells_are_no_panic(criteria in table(), gridlines in table(), panels in table(), bars in table()) {
        let (_dir, path) = folder(&[
            ("criteria.csv", &csv_of("Item,Value,Unit,Remark\n", &criteria)),
            ("gridlines.csv", &csv_of("Gridline,Axis,Position (m)\nA,X,0\nB,X,5\n1,Y,0\n2,Y,6\n", &gridlines)),
            ("panels.csv", &csv_of("Panel,X from,X to,Y from,Y to,Thickness,Imposed\n", &panels)),
            ("chosen_bars.csv", &csv_of("Panel,Position,Size,Spacing\n", &bars)),
        ]);
        let reading = read_book(&path).unwrap();
        let wrong = reading.queries.iter().any(|placed| placed.to_string().starts_with("error: "));
        prop_assert_eq!(wrong, reading.book.is_none());
        for placed in &reading.queries {
            prop_assert!(!placed.to_string().contains('\n'), "{placed}");
        }
    }

    #[test]
    fn any_bytes_after_the_mark_of_an_archive_are_no_panic(bytes in prop::collection::vec(any::<u8>(), 0..400)) {
        let (_dir, path) = file("a.xlsx", &[b"PK\x03\x04".to_vec(), bytes].concat());
        prop_assert!(read_book(&path).is_err());
    }

    #[test]
    fn a_workbook_with_a_changed_byte_is_no_panic(at in any::<prop::sample::Index>(), byte in any::<u8>()) {
        let mut bytes = workbook(&[
            S::new("Gridlines", &[&[C::T("Gridline"), C::T("Axis"), C::T("Position")], &[C::T("A"), C::T("X"), C::N(1.5)]]),
            S::new("Criteria", &[&[C::T("Item"), C::T("Value")], &[C::T("Date"), C::D(46054.0)]]),
        ]);
        let at = at.index(bytes.len());
        bytes[at] = byte;
        let (_dir, path) = file("a.xlsx", &bytes);
        // Without a panel there is never a book.
        prop_assert!(read_book(&path).map_or(true, |reading| reading.book.is_none()));
    }
}
