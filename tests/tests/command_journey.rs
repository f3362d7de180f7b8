//! The commands one after another, as a new user meets them, and what they print.

mod command_support;

use baymat_tests::{failing_book, names_in, not_designed_book, small_book};
use command_support::run_in;

#[test]
fn starter_then_check_then_schedule() {
    let dir = tempfile::tempdir().unwrap();
    run_in(dir.path(), &["starter", "floor.xlsx"])
        .ends_with(0)
        .prints(&["baymat check floor.xlsx", "baymat schedule floor.xlsx"])
        .says_nothing();
    run_in(dir.path(), &["check", "floor.xlsx"])
        .ends_with(0)
        .prints(&["floor.xlsx: 2 panels: 2 pass, 0 fail"]);
    run_in(dir.path(), &["schedule", "floor.xlsx"])
        .ends_with(0)
        .prints(&["floor.xlsx: 2 panels: 2 pass, 0 fail", "Schedule: floor-schedule.xlsx"]);
    assert_eq!(names_in(dir.path()), ["floor-schedule.xlsx", "floor.xlsx"]);
}

#[test]
fn check_prints_every_edge_with_its_reason() {
    let dir = tempfile::tempdir().unwrap();
    not_designed_book(dir.path());
    let ended = run_in(dir.path(), &["check", "not-designed"]).ends_with(1);
    insta::assert_snapshot!("check", ended.out());
}

#[test]
fn the_summary_says_what_governs_and_where_the_files_are() {
    let dir = tempfile::tempdir().unwrap();
    small_book(dir.path());
    let ended = run_in(dir.path(), &["schedule", "small", "--json", "small.json"]).ends_with(0);
    insta::assert_snapshot!("summary", ended.out());
}

#[test]
fn the_summary_says_what_fails_and_the_thickness_that_would_pass() {
    let dir = tempfile::tempdir().unwrap();
    failing_book(dir.path());
    let ended = run_in(dir.path(), &["schedule", "failing"]).ends_with(1);
    insta::assert_snapshot!("summary_of_a_failing_floor", ended.out());
}

#[test]
fn the_least_thickness_of_the_summary_really_passes_and_5_mm_less_does_not() {
    let dir = tempfile::tempdir().unwrap();
    failing_book(dir.path());
    let ended = run_in(dir.path(), &["schedule", "failing"]).ends_with(1);
    let deflection = |out: &str| {
        let row = out.lines().find(|line| line.starts_with("  S4") && line.contains("3.4.6"))?;
        row.split_whitespace().last()?.parse::<u32>().ok()
    };
    let least = deflection(ended.out()).unwrap();
    for (thickness, fails) in [(least, false), (least - 5, true)] {
        let panels = baymat_tests::PANELS_CSV.replace("S4,2,3,B,C,200", &format!("S4,2,3,B,C,{thickness}"));
        baymat_tests::book_with_panels(dir.path(), "again", &panels);
        let ended = run_in(dir.path(), &["schedule", "again", "--replace"]);
        assert_eq!(deflection(ended.out()).is_some(), fails, "{thickness}: {}", ended.out());
    }
}

#[test]
fn version_help_completions_and_manual_page_are_printed() {
    let dir = tempfile::tempdir().unwrap();
    let version = format!("baymat {}\n", env!("CARGO_PKG_VERSION"));
    assert_eq!(run_in(dir.path(), &["--version"]).ends_with(0).out(), version);
    for shell in ["bash", "zsh", "fish", "elvish", "powershell"] {
        run_in(dir.path(), &["completions", shell]).ends_with(0).prints(&["schedule", "replace"]);
    }
    run_in(dir.path(), &["man"]).ends_with(0).prints(&[".TH baymat 1", "schedule"]);
    run_in(dir.path(), &["man", "schedule"]).ends_with(0).prints(&[
        "\\-\\-replace",
        ".SH \"EXAMPLES\"",
        ".SH \"EXIT CODES\"",
    ]);
    assert!(names_in(dir.path()).is_empty(), "none of these writes a file");
}

#[test]
fn help_is_as_reviewed() {
    let dir = tempfile::tempdir().unwrap();
    insta::assert_snapshot!("help", run_in(dir.path(), &["--help"]).ends_with(0).out());
    insta::assert_snapshot!("help_schedule", run_in(dir.path(), &["schedule", "--help"]).ends_with(0).out());
    insta::assert_snapshot!("help_check_short", run_in(dir.path(), &["check", "-h"]).ends_with(0).out());
}
