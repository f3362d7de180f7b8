//! The fixture floors, start to finish: both forms of each book, its summary, its chosen fields, its exit code.

#![allow(clippy::unwrap_used, reason = "what is not as it should be must fail its test")]

use std::fmt::Write as _;
use std::path::{Path, PathBuf};
use std::process::Command;

use serde_json::Value;

fn floors() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("../fixtures/floors")
}

/// A run of `schedule`: exit code, summary without the files' names, results file.
fn schedule(book: &Path) -> (i32, String, Value) {
    let out = tempfile::tempdir().unwrap();
    let (workbook, results) = (out.path().join("schedule.xlsx"), out.path().join("results.json"));
    let run = Command::new(env!("CARGO_BIN_EXE_baymat-under-test"))
        .arg("schedule")
        .arg(book)
        .arg("-o")
        .arg(&workbook)
        .arg("--json")
        .arg(&results)
        .output()
        .unwrap();
    let summary = String::from_utf8(run.stdout).unwrap();
    let summary: String = summary
        .lines()
        .filter(|line| !line.starts_with("Schedule:") && !line.starts_with("Results file:"))
        .flat_map(|line| [line.trim_end(), "\n"])
        .collect();
    assert!(workbook.exists(), "no workbook: {}", String::from_utf8_lossy(&run.stderr));
    let results = serde_json::from_slice(&std::fs::read(&results).unwrap()).unwrap();
    (run.status.code().unwrap(), summary, results)
}

fn number(value: &Value, digits: usize) -> String {
    value.as_f64().map_or_else(|| "-".to_owned(), |n| format!("{n:.digits$}"))
}

/// One line a section: place, coefficient, moments, depth, steel, bars.
fn chosen_fields(results: &Value) -> String {
    let mut text = String::new();
    for panel in results["panels"].as_array().unwrap() {
        let name = panel["panel"].as_str().unwrap();
        let action = panel["action"].as_str().unwrap_or("not designed");
        let governing = panel["governing_check"].as_str().unwrap_or("-");
        let ratio = number(&panel["governing_ratio"], 3);
        let n = number(&panel["ultimate_kn_m2"], 2);
        writeln!(text, "{name}: {action}, n {n} kN/m2, governed by {governing} {ratio}").unwrap();
        for section in panel["sections"].as_array().unwrap() {
            writeln!(
                text,
                "  {:<15} {:<9} coefficient {:<6} table {:>6} balanced {:>6} design {:>6} d {:>5} As {:>4} {}{}-{} {}",
                section["at"].as_str().unwrap(),
                section["support"].as_str().unwrap_or(""),
                number(&section["coefficient"], 4),
                number(&section["moment_from_coefficient_knm_m"], 2),
                number(&section["moment_balanced_knm_m"], 2),
                number(&section["moment_knm_m"], 2),
                number(&section["d_mm"], 1),
                number(&section["as_required_mm2_m"], 0),
                results["criteria"]["bar_type_letter"].as_str().unwrap(),
                number(&section["bar_mm"], 0),
                number(&section["spacing_mm"], 0),
                section["layer"].as_str().unwrap(),
            )
            .unwrap();
        }
    }
    text
}

fn queries(results: &Value) -> String {
    let mut text = String::new();
    for query in results["queries"].as_array().unwrap() {
        let of = |key: &str| query[key].as_str().unwrap_or("-").to_owned();
        writeln!(text, "{} | {} | {} | {}", of("severity"), of("about"), of("place"), of("text")).unwrap();
    }
    text
}

fn check(name: &str, code: i32) {
    let folder = floors().join(name);
    let (from_csv_code, from_csv_summary, from_csv) = schedule(&folder.join("book"));
    let (from_xlsx_code, from_xlsx_summary, from_xlsx) = schedule(&folder.join("book.xlsx"));
    assert_eq!((from_csv_code, from_xlsx_code), (code, code));
    // Queries name their places, which are the only difference between the two forms.
    let plain = |summary: &str| -> Vec<String> {
        let query =
            |line: &&str| ["warning:", "note:", "not designed:"].iter().any(|word| line.starts_with(word));
        summary
            .lines()
            .filter(|line| !query(line))
            .map(|line| line.replacen("book.xlsx:", "book:", 1))
            .collect()
    };
    assert_eq!(plain(&from_csv_summary), plain(&from_xlsx_summary));
    for key in from_csv.as_object().unwrap().keys().filter(|key| !["book", "queries"].contains(&key.as_str()))
    {
        assert_eq!(from_csv[key], from_xlsx[key], "{key} differs between the two forms of {name}");
    }
    let mut settings = insta::Settings::clone_current();
    settings.set_snapshot_path(folder.join("expected"));
    settings.set_prepend_module_to_snapshot(false);
    settings.set_omit_expression(true);
    settings.bind(|| {
        insta::assert_snapshot!("summary", from_csv_summary);
        insta::assert_snapshot!("sections", chosen_fields(&from_csv));
        insta::assert_snapshot!("queries", queries(&from_csv));
    });
}

#[test]
fn the_demo_library_passes_every_check() {
    check("library", 0);
}

#[test]
fn the_workshop_fails_and_says_how() {
    check("workshop", 1);
}

#[test]
fn the_flats_with_balcony_wet_areas_and_long_corridors_pass() {
    check("flats", 0);
}
