//! The outputs of a small floor, read back.

mod contents;
mod engine;
mod read_back;
mod results_file;
mod sample;

use std::time::Duration;

use calamine::Data;
use serde_json::Value;

use super::workbook::{Keeping, describe_sheets, write_keeping};
use super::{WriteError, write_results, write_workbook};
use read_back::ReadBack;
use sample::Sample;

fn results_text(sample: &Sample) -> String {
    let mut out = Vec::new();
    write_results(&sample.submission(), &mut out).unwrap();
    String::from_utf8(out).unwrap()
}

fn results(sample: &Sample) -> Value {
    serde_json::from_str(&results_text(sample)).unwrap()
}

fn read_back(sample: &Sample) -> ReadBack {
    ReadBack::of(&write_workbook(&sample.submission()).unwrap())
}

#[test]
fn the_workbook_holds_the_numbers_of_the_results_file() {
    let sample = Sample::new();
    assert_eq!(read_back(&sample).differences(&results(&sample)), Vec::<String>::new());
}

/// The next number or another word: the least change that must be noticed.
fn spoilt(value: &Value) -> Value {
    match value {
        Value::Number(number) => Value::from(number.as_f64().unwrap().next_up()),
        Value::String(text) => Value::from(format!("{text}x")),
        _ => Value::from(1.0),
    }
}

#[test]
fn any_one_wrong_value_is_found() {
    let sample = Sample::new();
    let (workbook, right) = (read_back(&sample), results(&sample));
    let mut planted = 0;
    for (sheet, pointer_of_rows) in read_back::row_pointers(&right) {
        for column in describe_sheets().into_iter().find(|s| s.name == sheet).unwrap().columns {
            if column.results_key.is_empty() {
                continue;
            }
            for row in &pointer_of_rows {
                let mut wrong = right.clone();
                let row = wrong.pointer_mut(row).unwrap();
                let Some(value) = read_back::at_mut(row, &column.results_key) else { continue };
                *value = spoilt(value);
                let found = workbook.differences(&wrong);
                assert_eq!(found.len(), 1, "{sheet}, {}: {found:?}", column.heading);
                planted += 1;
            }
        }
    }
    assert!(planted > 400, "{planted} values planted");
}

#[test]
fn a_row_too_few_is_found() {
    let sample = Sample::new();
    let (workbook, right) = (read_back(&sample), results(&sample));
    for array in ["panels", "supports", "edge_segments", "queries"] {
        let mut wrong = right.clone();
        wrong[array].as_array_mut().unwrap().pop();
        assert!(!workbook.differences(&wrong).is_empty(), "{array}");
    }
}

#[test]
fn the_same_floor_gives_the_same_bytes() {
    let sample = Sample::new();
    let first = (write_workbook(&sample.submission()).unwrap(), results_text(&sample));
    // A creation time taken from the clock would differ by a second.
    std::thread::sleep(Duration::from_millis(1100));
    let second = (write_workbook(&sample.submission()).unwrap(), results_text(&sample));
    assert!(first == second);
}

#[test]
fn no_cell_is_written_backwards() {
    let sample = Sample::new();
    let whole = ReadBack::of(&write_keeping(&sample.submission(), Keeping::Whole).unwrap());
    let streamed = ReadBack::of(&write_keeping(&sample.submission(), Keeping::RowByRow).unwrap());
    for sheet in describe_sheets() {
        let (whole, streamed) = (whole.sheet(sheet.name), streamed.sheet(sheet.name));
        assert!(whole.used_cells().count() > 0, "{}", sheet.name);
        assert!(whole.used_cells().eq(streamed.used_cells()), "{}", sheet.name);
    }
}

#[test]
fn a_number_that_is_not_finite_is_refused_by_name() {
    let mut sample = Sample::new();
    sample.design.panels[1].sections[0].d_mm = f64::NAN;
    match write_workbook(&sample.submission()).unwrap_err() {
        WriteError::NotFinite { place } => assert_eq!(place, "sheet Panels row 4, d (mm)"),
        other => panic!("{other}"),
    }
    match write_results(&sample.submission(), &mut Vec::new()).unwrap_err() {
        WriteError::NotFinite { place } => assert_eq!(place, "results.panels[1].sections[0].d_mm"),
        other => panic!("{other}"),
    }
}

#[test]
fn every_column_says_what_it_holds() {
    for sheet in describe_sheets() {
        for column in &sheet.columns {
            assert!(!column.meaning.is_empty(), "{} {}", sheet.name, column.heading);
        }
        let mut names: Vec<_> = sheet.columns.iter().map(|column| (column.group, &column.heading)).collect();
        let count = names.len();
        names.sort_unstable();
        names.dedup();
        assert_eq!(names.len(), count, "{}: two columns of one name", sheet.name);
    }
}

fn text(cell: &Data) -> &str {
    match cell {
        Data::String(text) => text,
        Data::Empty => "",
        other => panic!("{other:?} is no text"),
    }
}
