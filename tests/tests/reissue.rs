//! Reissues: marks that stay, letters, changes with their reasons, and what is refused.

#![allow(clippy::unwrap_used, reason = "what is not as it should be must fail its test")]

mod command_support;

use std::collections::BTreeMap;
use std::path::Path;

use calamine::{Data, Reader as _, Xlsx, open_workbook};
use command_support::{Ended, run_in};
use serde_json::Value;

const CRITERIA: &str = "Item,Value,Unit,Remark\nFloor,Level 3,,\nRevision,A,,\nImposed,2.5,kN/m2,\n";
const GRIDLINES: &str =
    "Gridline,Axis,Position (m)\n1,X,0\n2,X,5\n3,X,10\n4,X,15.4\n5,X,20.4\nA,Y,0\nB,Y,6\n";
const PANELS: &str =
    "Panel,X from,X to,Y from,Y to,Imposed (kN/m2)\nS1,1,2,A,B,\nS2,2,3,A,B,\nS3,3,4,A,B,\nS4,4,5,A,B,\n";

fn book(folder: &Path, criteria: &str, panels: &str) {
    let book = folder.join("book");
    std::fs::create_dir_all(&book).unwrap();
    std::fs::write(book.join("criteria.csv"), criteria).unwrap();
    std::fs::write(book.join("gridlines.csv"), GRIDLINES).unwrap();
    std::fs::write(book.join("panels.csv"), panels).unwrap();
}

fn issue(folder: &Path, name: &str, previous: Option<&str>) -> Ended {
    let (out, json) = (format!("{name}.xlsx"), format!("{name}.json"));
    let mut args = vec!["schedule", "book", "-o", &out, "--json", &json];
    if let Some(previous) = previous {
        args.extend(["--previous", previous]);
    }
    run_in(folder, &args)
}

fn sheets(path: &Path) -> BTreeMap<String, Vec<Vec<Data>>> {
    let mut workbook: Xlsx<_> = open_workbook(path).unwrap();
    let names = workbook.sheet_names();
    let rows = |name: &String, workbook: &mut Xlsx<_>| {
        let range = workbook.worksheet_range(name).unwrap();
        range.rows().map(<[Data]>::to_vec).collect()
    };
    names.iter().map(|name| (name.clone(), rows(name, &mut workbook))).collect()
}

fn results(path: &Path) -> Value {
    serde_json::from_slice(&std::fs::read(path).unwrap()).unwrap()
}

/// Marks with size, dimensions, number and panels or supports.
fn bars(results: &Value) -> BTreeMap<String, (String, u64, String)> {
    let bar = |bar: &Value| {
        let made =
            format!("{} {} {} {} {}", bar["size_mm"], bar["shape"], bar["a_mm"], bar["b_mm"], bar["c_mm"]);
        let mark = bar["mark"].as_str().unwrap().to_owned();
        (mark, (made, bar["total"].as_u64().unwrap(), bar["where"].to_string()))
    };
    results["bars"].as_array().unwrap().iter().map(bar).collect()
}

#[test]
fn a_reissue_without_a_change_is_the_same_but_for_the_revision() {
    let folder = tempfile::tempdir().unwrap();
    let at = folder.path();
    book(at, CRITERIA, PANELS);
    issue(at, "a", None).ends_with(0);
    // The letter may even stay: nothing changed.
    issue(at, "same", Some("a.xlsx")).ends_with(0);
    book(at, &CRITERIA.replace("Revision,A", "Revision,B"), PANELS);
    issue(at, "b", Some("a.xlsx")).ends_with(0);
    let (mut a, mut b) = (results(&at.join("a.json")), results(&at.join("b.json")));
    for results in [&mut a, &mut b] {
        results["criteria"]["revision"] = Value::Null;
    }
    assert_eq!(a, b);
    let (a, b) = (sheets(&at.join("a.xlsx")), sheets(&at.join("b.xlsx")));
    assert_eq!(a.keys().collect::<Vec<_>>(), b.keys().collect::<Vec<_>>());
    for (name, rows) in &a {
        if !["Cover", "Changes", "Register"].contains(&name.as_str()) {
            assert_eq!(rows, &b[name], "{name}");
        }
    }
    // The register differs in the letter of the issue alone.
    let differing: Vec<usize> =
        (0..a["Register"].len()).filter(|row| a["Register"][*row] != b["Register"][*row]).collect();
    assert_eq!(differing.len(), 1);
    assert!(b["Changes"].iter().flatten().any(|cell| cell.to_string().contains("no change")));
}

#[test]
fn a_changed_load_touches_only_the_bars_that_depend_on_it() {
    let folder = tempfile::tempdir().unwrap();
    let at = folder.path();
    book(at, CRITERIA, PANELS);
    issue(at, "a", None).ends_with(0);
    let heavier = PANELS.replace("S1,1,2,A,B,", "S1,1,2,A,B,5");
    book(at, CRITERIA, &heavier);
    // Something changed: the letter must.
    issue(at, "x", Some("a.xlsx")).ends_with(2).says(&["Revision is still `A`", "new letter"]);
    assert!(!at.join("x.xlsx").exists());
    book(at, &CRITERIA.replace("Revision,A", "Revision,"), &heavier);
    issue(at, "x", Some("a.xlsx")).ends_with(2).says(&["Revision is blank"]);
    book(at, &CRITERIA.replace("Revision,A", "Revision,B"), &heavier);
    issue(at, "b", Some("a.xlsx")).ends_with(0);
    let (a, b) = (bars(&results(&at.join("a.json"))), bars(&results(&at.join("b.json"))));
    let mut kept = 0;
    for (mark, (made, count, place)) in &a {
        match b.get(mark) {
            // A mark is one bar for good.
            Some((now, ..)) => {
                assert_eq!(now, made, "{mark}");
                kept += 1;
            }
            None => assert!(place.contains("S1") || place.contains("/A-B"), "{mark} {count} {place}"),
        }
        // Panels two supports away see nothing of it.
        if place.contains("S4") && !place.contains("S1") && !place.contains("S2") {
            assert_eq!(b.get(mark).map(|bar| (&bar.1, &bar.2)), Some((count, place)), "{mark}");
        }
    }
    assert!(kept > 0);
    let new: Vec<&String> = b.keys().filter(|mark| !a.contains_key(*mark)).collect();
    let last: u64 = a.keys().map(|mark| mark.parse::<u64>().unwrap()).max().unwrap();
    assert!(!new.is_empty() && new.iter().all(|mark| mark.parse::<u64>().unwrap() > last));
    let sheets = sheets(&at.join("b.xlsx"));
    let text = |row: &Vec<Data>| row.iter().map(ToString::to_string).collect::<Vec<_>>().join("|");
    let changes: Vec<String> = sheets["Changes"].iter().map(text).collect();
    assert!(
        changes.iter().any(|row| row.starts_with("input|S1|2.5|5|") && row.contains("imposed_kn_m2")),
        "{changes:#?}"
    );
    for mark in &new {
        let row = changes.iter().find(|row| row.starts_with(&format!("bar new|{mark}|"))).unwrap();
        assert!(row.contains("S1 imposed_kn_m2 2.5 to 5"), "{row}");
    }
    // The kilograms add up to the difference of the two issues.
    let kg = |name: &str| results(&at.join(name))["quantities"]["steel_kg"].as_f64().unwrap();
    let total: f64 = changes.last().unwrap().split('|').nth(4).unwrap().parse().unwrap();
    assert!((total - (kg("b.json") - kg("a.json"))).abs() < 1e-6);
    // Letters only where something changed, and dropped marks stay known.
    let schedule: Vec<String> = sheets["Bending schedule"].iter().map(text).collect();
    let letters = schedule.iter().filter(|row| row.split('|').nth(13) == Some("B")).count();
    assert!(letters >= new.len() && letters < b.len());
    let dropped: Vec<&String> = a.keys().filter(|mark| !b.contains_key(*mark)).collect();
    let register: Vec<String> = sheets["Register"].iter().map(text).collect();
    for mark in dropped {
        assert!(register.iter().any(|row| row.starts_with(&format!("bar|{mark}|dropped|B|"))), "{mark}");
    }
}

#[test]
fn a_dropped_mark_comes_back_with_its_bar_and_no_number_is_used_twice() {
    let folder = tempfile::tempdir().unwrap();
    let at = folder.path();
    let letter = |letter: &str| CRITERIA.replace("Revision,A", &format!("Revision,{letter}"));
    book(at, CRITERIA, PANELS);
    issue(at, "a", None).ends_with(0);
    book(at, &letter("B"), &PANELS.replace("S1,1,2,A,B,", "S1,1,2,A,B,5"));
    issue(at, "b", Some("a.xlsx")).ends_with(0);
    book(at, &letter("C"), PANELS);
    issue(at, "c", Some("b.xlsx")).ends_with(0);
    assert_eq!(bars(&results(&at.join("a.json"))), bars(&results(&at.join("c.json"))));
    book(at, &letter("D"), &PANELS.replace("S1,1,2,A,B,", "S1,1,2,A,B,4"));
    issue(at, "d", Some("c.xlsx")).ends_with(0);
    let mut bars_by_mark: BTreeMap<String, String> = BTreeMap::new();
    for name in ["a", "b", "c", "d"] {
        for (mark, (made, ..)) in bars(&results(&at.join(format!("{name}.json")))) {
            assert_eq!(bars_by_mark.entry(mark.clone()).or_insert_with(|| made.clone()), &made, "{mark}");
        }
    }
}

#[test]
fn a_workbook_that_is_not_ours_is_refused_with_a_reason() {
    let folder = tempfile::tempdir().unwrap();
    let at = folder.path();
    book(at, CRITERIA, PANELS);
    issue(at, "x", Some("nowhere.xlsx")).ends_with(3).says(&["nowhere.xlsx", "previous issue"]);
    std::fs::write(at.join("text.xlsx"), "not a workbook").unwrap();
    issue(at, "x", Some("text.xlsx")).ends_with(2).says(&["not an .xlsx workbook"]);
    let mut other = rust_xlsxwriter::Workbook::new();
    other.add_worksheet().set_name("Cover").unwrap().write_string(0, 0, "Workbook format").unwrap();
    other.save(at.join("other.xlsx")).unwrap();
    issue(at, "x", Some("other.xlsx")).ends_with(2).says(&["Workbook format"]);
    run_in(at, &["starter", "starter.xlsx"]).ends_with(0);
    issue(at, "x", Some("starter.xlsx")).ends_with(2).says(&["no sheet Cover"]);
    assert!(!at.join("x.xlsx").exists());
}

#[test]
fn a_register_with_columns_moved_and_added_is_read_all_the_same() {
    let folder = tempfile::tempdir().unwrap();
    let at = folder.path();
    book(at, CRITERIA, PANELS);
    issue(at, "a", None).ends_with(0);
    // The same sheets written anew: a note column first, the others in reverse, rows reversed below the headings.
    let sheets = sheets(&at.join("a.xlsx"));
    let mut copy = rust_xlsxwriter::Workbook::new();
    for name in ["Cover", "Register"] {
        let sheet = copy.add_worksheet();
        sheet.set_name(name).unwrap();
        let rows = &sheets[name];
        let turned: Vec<&Vec<Data>> = if name == "Register" {
            rows[..1].iter().chain(rows[1..].iter().rev()).collect()
        } else {
            rows.iter().collect()
        };
        for (r, row) in (0..).zip(turned) {
            let cells: Vec<&Data> =
                if name == "Register" { row.iter().rev().collect() } else { row.iter().collect() };
            let shift = u16::from(name == "Register");
            if shift == 1 {
                sheet.write_string(r, 0, if r == 0 { "My notes" } else { "seen" }).unwrap();
            }
            for (c, cell) in (shift..).zip(cells) {
                match cell {
                    Data::Float(number) => sheet.write_number(r, c, *number).unwrap(),
                    other => sheet.write_string(r, c, other.to_string()).unwrap(),
                };
            }
        }
    }
    copy.save(at.join("turned.xlsx")).unwrap();
    issue(at, "b", Some("turned.xlsx")).ends_with(0);
    assert_eq!(bars(&results(&at.join("a.json"))), bars(&results(&at.join("b.json"))));
}
