//! The working recalculated by a spreadsheet engine: every formula against the value stored with it.

#![allow(clippy::unwrap_used, reason = "a workbook that is not as it should be must fail its test")]

mod edges_support;

use std::path::Path;

use calamine::{Data, Reader as _, Xlsx};
use design_engine::criteria::Criteria;
use edges_support::random::{choices, config, floor};
use floor_grid::lay_out;
use ironcalc::base::Model;
use ironcalc::base::cell::CellValue;
use ironcalc::import::load_from_xlsx_bytes;
use proptest::prelude::*;
use schedule_io::book::Book;
use schedule_io::write::{Submission, write_workbook};

/// Within this of the greatest number of the row, or of the value.
const TOLERANCE: f64 = 1e-12;

fn workbook_of(book: &Book) -> Vec<u8> {
    let (floor, _) = lay_out(&book.layout);
    let design = design_engine::design_floor(&floor, &book.criteria);
    let bars = detailing::detail(&floor, &design, &book.criteria);
    let register = detailing::reissue::register(&floor, &bars, Vec::new(), "");
    let submission = Submission {
        book,
        floor: &floor,
        design: &design,
        bars: &bars,
        register: &register,
        changes: None,
        queries: &[],
        version: "0",
    };
    write_workbook(&submission).unwrap()
}

/// Recalculates everything and compares; gives the number of formulas and what differs.
fn compare(bytes: &[u8]) -> (usize, Vec<String>) {
    let workbook = load_from_xlsx_bytes(bytes, "working", "en", "UTC").unwrap();
    let mut model = Model::from_workbook(workbook, "en").unwrap();
    model.evaluate();
    let mut stored: Xlsx<_> = Xlsx::new(std::io::Cursor::new(bytes)).unwrap();
    let (mut compared, mut differing) = (0, Vec::new());
    for (index, name) in (0..).zip(stored.sheet_names()) {
        let formulas = stored.worksheet_formula(&name).unwrap();
        let values = stored.worksheet_range(&name).unwrap();
        let Some((r0, c0)) = formulas.start() else { continue };
        for (r, c, formula) in formulas.used_cells() {
            if formula.is_empty() {
                continue;
            }
            let (row, column) = (r0 + u32::try_from(r).unwrap(), c0 + u32::try_from(c).unwrap());
            let found = model
                .get_cell_value_by_index(
                    index,
                    i32::try_from(row + 1).unwrap(),
                    i32::try_from(column + 1).unwrap(),
                )
                .unwrap();
            compared += 1;
            let numbers =
                values.rows().nth(usize::try_from(row - values.start().unwrap().0).unwrap()).unwrap();
            let scale = numbers
                .iter()
                .filter_map(|cell| if let Data::Float(n) = cell { Some(n.abs()) } else { None })
                .fold(0.0, f64::max);
            let stored = values.get_value((row, column)).unwrap();
            let same = match (stored, &found) {
                (Data::Float(stored), CellValue::Number(found)) => {
                    (stored - found).abs() <= TOLERANCE * stored.abs().max(found.abs())
                        || (stored - found).abs() <= TOLERANCE * scale.min(1.0)
                }
                (Data::String(stored), CellValue::String(found)) => stored == found,
                _ => false,
            };
            if !same {
                differing.push(format!(
                    "{name} row {} column {}: stored {stored:?}, recalculated {found:?}: {formula}",
                    row + 1,
                    column + 1
                ));
            }
        }
    }
    (compared, differing)
}

fn read(name: &str) -> Book {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("../fixtures/floors").join(name).join("book");
    schedule_io::read::read_book(&path).unwrap().book.unwrap()
}

#[test]
fn the_fixture_floors_recalculate_to_what_is_stored() {
    let mut all = 0;
    for name in ["library", "flats", "workshop"] {
        let (compared, differing) = compare(&workbook_of(&read(name)));
        assert!(
            differing.is_empty(),
            "{name}: {} of {compared}: {:#?}",
            differing.len(),
            &differing[..differing.len().min(10)]
        );
        println!("{name}: {compared} formulas");
        all += compared;
    }
    assert!(all > 3000, "{all}");
}

proptest! {
    #![proptest_config(config(10))]

    #[test]
    fn random_floors_recalculate_to_what_is_stored(mut choices in choices()) {
        let plan = floor(&mut choices);
        let at_fault = lay_out(&plan.0).1.iter().any(|q| q.severity == design_engine::query::Severity::Error);
        prop_assume!(!at_fault);
        let book = Book { layout: plan.0.clone(), criteria: Criteria::default(), ..read("library") };
        let (compared, differing) = compare(&workbook_of(&book));
        prop_assert!(differing.is_empty(), "{} of {compared}: {:#?}", differing.len(), &differing[..differing.len().min(10)]);
    }
}

#[test]
fn a_wrong_stored_result_is_found() {
    let mut wrong = rust_xlsxwriter::Workbook::new();
    let sheet = wrong.add_worksheet();
    sheet.write_number(0, 0, 2.0).unwrap();
    sheet.write_formula(0, 1, rust_xlsxwriter::Formula::new("=A1*3").set_result("6.000000001")).unwrap();
    sheet.write_formula(0, 2, rust_xlsxwriter::Formula::new("=A1*3").set_result("6")).unwrap();
    sheet
        .write_formula(
            0,
            3,
            rust_xlsxwriter::Formula::new("=IF(A1<1,\"passes\",\"FAILS\")").set_result("passes"),
        )
        .unwrap();
    let (compared, differing) = compare(&wrong.save_to_buffer().unwrap());
    assert_eq!((compared, differing.len()), (3, 2), "{differing:?}");
}
