//! Compares a workbook, read back cell by cell, with a results file: the columns say where in the results
//! each value stands.

use std::io::Cursor;

use calamine::{Data, Range, Reader, Xlsx};
use serde_json::Value;

use crate::write::workbook::{SheetDescription, describe_sheets};

/// A workbook as read back: its sheets by name.
pub(super) struct ReadBack {
    sheets: Vec<(SheetDescription, Range<Data>)>,
}

/// One row of headings, two where there are groups.
fn heading_rows(sheet: &SheetDescription) -> usize {
    1 + usize::from(sheet.columns.iter().any(|column| !column.group.is_empty()))
}

impl ReadBack {
    pub(super) fn of(workbook: &[u8]) -> ReadBack {
        let mut xlsx: Xlsx<_> = calamine::open_workbook_from_rs(Cursor::new(workbook)).unwrap();
        let read = |sheet: SheetDescription| {
            let range = xlsx.worksheet_range(sheet.name).unwrap();
            (sheet, range)
        };
        ReadBack { sheets: describe_sheets().into_iter().map(read).collect() }
    }

    fn find(&self, name: &str) -> &(SheetDescription, Range<Data>) {
        self.sheets.iter().find(|(sheet, _)| sheet.name == name).unwrap()
    }

    pub(super) fn sheet(&self, name: &str) -> &Range<Data> {
        &self.find(name).1
    }

    /// The data rows of a sheet under its headings.
    pub(super) fn rows(&self, name: &str) -> Vec<Vec<Data>> {
        let (sheet, range) = self.find(name);
        range.rows().skip(heading_rows(sheet)).map(<[Data]>::to_vec).collect()
    }

    /// The cell under a heading; `group` tells equal headings apart.
    pub(super) fn cell(&self, name: &str, row: usize, group: &str, heading: &str) -> Data {
        let (sheet, range) = self.find(name);
        let column = sheet
            .columns
            .iter()
            .position(|column| column.group == group && column.heading == heading)
            .unwrap_or_else(|| panic!("no column {group} {heading}"));
        range.rows().nth(heading_rows(sheet) + row).unwrap()[column].clone()
    }

    /// Everything in which the workbook and the results differ, in words.
    pub(super) fn differences(&self, results: &Value) -> Vec<String> {
        let mut differences = Vec::new();
        for (name, rows) in rows_of(results) {
            let (sheet, _) = self.find(name);
            let mut printed = self.rows(name);
            if name == "Supports" {
                // Supports of one panel alone stand on the sheet only.
                let second =
                    sheet.columns.iter().position(|column| column.results_key == "panels/1").unwrap();
                printed.retain(|row| row[second] != Data::Empty);
            }
            if name == "Beam loads" {
                // Its last three rows are the totals.
                printed.truncate(printed.len().saturating_sub(3));
            }
            if printed.len() != rows.len() {
                differences.push(format!("{name}: {} rows against {}", printed.len(), rows.len()));
                continue;
            }
            for (index, (cells, row)) in printed.iter().zip(&rows).enumerate() {
                for (column, cell) in sheet.columns.iter().zip(cells) {
                    if column.results_key.is_empty() {
                        continue;
                    }
                    let value = at(row, &column.results_key);
                    if !same(cell, value) {
                        let heading = &column.heading;
                        differences
                            .push(format!("{name} row {index}, {heading}: {cell:?} against {value:?}"));
                    }
                }
            }
        }
        differences
    }
}

/// The rows that the results file has for each sheet.
fn rows_of(results: &Value) -> [(&'static str, Vec<Value>); 8] {
    let array = |value: &Value, key: &str| value[key].as_array().unwrap().clone();
    let panels = array(results, "panels");
    let checks = panels.iter().flat_map(|panel| array(panel, "checks")).collect();
    [
        ("Panels", panels.clone()),
        ("Supports", array(results, "supports")),
        ("Edges", array(results, "edge_segments")),
        ("Checks", checks),
        ("Corners", array(results, "corners")),
        ("Openings", array(results, "openings")),
        ("Beam loads", array(results, "beam_loads")),
        ("Queries", array(results, "queries")),
    ]
}

/// For each sheet, JSON pointers to the rows that the results file has for it.
pub(super) fn row_pointers(results: &Value) -> Vec<(&'static str, Vec<String>)> {
    let count = |pointer: &str| results.pointer(pointer).and_then(Value::as_array).map_or(0, Vec::len);
    let all = |pointer: &str| (0..count(pointer)).map(|i| format!("{pointer}/{i}")).collect::<Vec<_>>();
    vec![
        ("Panels", all("/panels")),
        ("Supports", all("/supports")),
        ("Edges", all("/edge_segments")),
        ("Checks", all("/panels").iter().flat_map(|panel| all(&format!("{panel}/checks"))).collect()),
        ("Corners", all("/corners")),
        ("Openings", all("/openings")),
        ("Beam loads", all("/beam_loads")),
        ("Queries", all("/queries")),
    ]
}

/// Like [`at`], to change it; none where there is no such entry.
pub(super) fn at_mut<'a>(row: &'a mut Value, key: &str) -> Option<&'a mut Value> {
    key.split('/').try_fold(row, |value, step| match value {
        Value::Array(entries) => match step.parse::<usize>() {
            Ok(index) => entries.get_mut(index),
            Err(_) => entries.iter_mut().find(|entry| entry["at"] == step),
        },
        Value::Object(object) => object.get_mut(step),
        _ => None,
    })
}

/// The value at a key such as `sections/short midspan/d_mm`: a section is found by where it is.
fn at<'a>(row: &'a Value, key: &str) -> &'a Value {
    const NULL: &Value = &Value::Null;
    key.split('/').fold(row, |value, step| match value {
        Value::Array(entries) if step.parse::<usize>().is_ok() => {
            entries.get(step.parse::<usize>().unwrap()).unwrap_or(NULL)
        }
        Value::Array(entries) => entries.iter().find(|entry| entry["at"] == step).unwrap_or(NULL),
        Value::Object(object) => object.get(step).unwrap_or_else(|| panic!("no key {step} of {key}")),
        _ => NULL,
    })
}

/// The same `f64`, the same text; where the results have none, nothing or a word that says why.
fn same(cell: &Data, value: &Value) -> bool {
    const WORDS_FOR_NONE: [&str; 3] = ["too thin", "not allowed", "over 1000"];
    match (cell, value) {
        (Data::Empty, Value::Null) => true,
        (Data::String(text), Value::Null) => WORDS_FOR_NONE.contains(&text.as_str()),
        (Data::Empty, Value::String(text)) => text.is_empty(),
        (Data::String(text), Value::String(other)) => text.trim_end() == other.trim_end(),
        (Data::Float(number), Value::Number(other)) => {
            other.as_f64().is_some_and(|other| other.to_bits() == number.to_bits())
        }
        _ => false,
    }
}
