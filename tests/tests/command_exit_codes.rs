//! Each exit code of each command, and that nothing is written where nothing may be.

mod command_support;

use baymat_tests::{failing_book, names_in, not_designed_book, small_book, wrong_book};
use command_support::run_in;

#[test]
fn a_floor_that_passes_is_0() {
    let dir = tempfile::tempdir().unwrap();
    small_book(dir.path());
    run_in(dir.path(), &["check", "small"]).ends_with(0).says_nothing();
    run_in(dir.path(), &["schedule", "small", "--json", "small.json"]).ends_with(0).says_nothing();
    assert_eq!(names_in(dir.path()), ["small", "small-schedule.xlsx", "small.json"]);
}

#[test]
fn a_failing_check_is_1_and_the_schedule_is_written() {
    let dir = tempfile::tempdir().unwrap();
    failing_book(dir.path());
    run_in(dir.path(), &["schedule", "failing"])
        .ends_with(1)
        .prints(&["4 panels: 3 pass, 1 fail, 0 not designed", "3 failing checks:"])
        .says_nothing();
    run_in(dir.path(), &["check", "failing"]).ends_with(1).prints(&["3 pass, 1 fail", "panel S4"]);
    assert_eq!(names_in(dir.path()), ["failing", "failing-schedule.xlsx"]);
}

#[test]
fn a_panel_that_is_not_designed_is_1_and_the_rest_is_scheduled() {
    let dir = tempfile::tempdir().unwrap();
    not_designed_book(dir.path());
    let said = "not designed: panel S3, panels.csv row 4, North edge: ";
    run_in(dir.path(), &["check", "not-designed"]).ends_with(1).prints(&[said]);
    run_in(dir.path(), &["schedule", "not-designed"])
        .ends_with(1)
        .prints(&["4 panels: 3 pass, 0 fail, 1 not designed", said]);
    assert_eq!(names_in(dir.path()), ["not-designed", "not-designed-schedule.xlsx"]);
}

#[test]
fn a_wrong_book_is_2_with_every_error_and_nothing_is_written() {
    let dir = tempfile::tempdir().unwrap();
    wrong_book(dir.path());
    for command in ["check", "schedule"] {
        let ended = run_in(dir.path(), &[command, "wrong"]).ends_with(2).prints_nothing().says(&[
            "error: panels.csv row 3, Imposed (kN/m2): read \"2.5x\"",
            "error: panels.csv row 4, X to: ",
            "2 errors in the floor book; nothing is designed\n",
        ]);
        assert_eq!(ended.err().lines().filter(|line| line.starts_with("error: ")).count(), 2);
    }
    assert_eq!(names_in(dir.path()), ["wrong"]);
}

#[test]
fn a_wrong_layout_is_2_and_nothing_is_written() {
    let dir = tempfile::tempdir().unwrap();
    let panels = baymat_tests::PANELS_CSV.replace("S4,2,3,B,C", "S4,1,3,B,C");
    baymat_tests::book_with_panels(dir.path(), "overlap", &panels);
    run_in(dir.path(), &["schedule", "overlap"]).ends_with(2).says(&["error: ", "overlap"]);
    assert_eq!(names_in(dir.path()), ["overlap"]);
}

#[test]
fn a_wrong_command_line_is_2() {
    let dir = tempfile::tempdir().unwrap();
    for args in [
        &["schedule"][..],
        &["schedul", "small"],
        &["schedule", "small", "--jsn", "x.json"],
        &["completions", "abacus"],
        &["man", "abacus"],
    ] {
        let ended = run_in(dir.path(), args).ends_with(2).prints_nothing();
        assert!(ended.err().starts_with("error: "), "{args:?}: {}", ended.err());
    }
    run_in(dir.path(), &[""; 0]).ends_with(2).prints_nothing().says(&["Usage: baymat <COMMAND>"]);
}

#[test]
fn a_book_that_is_not_there_is_3_and_is_told_as_such() {
    let dir = tempfile::tempdir().unwrap();
    for command in ["check", "schedule"] {
        let ended = run_in(dir.path(), &[command, "no/such/floor.xlsx"]).ends_with(3).prints_nothing();
        assert!(ended.err().starts_with("error: no/such/floor.xlsx: "), "{}", ended.err());
        assert_eq!(ended.err().lines().count(), 1, "{}", ended.err());
    }
}

#[test]
fn a_folder_without_sheets_and_a_file_of_another_kind_are_told_apart_from_books() {
    let dir = tempfile::tempdir().unwrap();
    std::fs::create_dir(dir.path().join("empty")).unwrap();
    std::fs::write(dir.path().join("notes.txt"), "not a book").unwrap();
    std::fs::write(dir.path().join("torn.xlsx"), "not a workbook").unwrap();
    small_book(dir.path());
    for wrong in ["empty", "notes.txt", "torn.xlsx", "small/panels.csv"] {
        let ended = run_in(dir.path(), &["check", wrong]).prints_nothing();
        assert!([2, 3].contains(&ended.code()), "{wrong}: {}", ended.code());
        assert!(ended.err().starts_with("error: "), "{wrong}: {}", ended.err());
        assert!(ended.err().contains("; "), "{wrong}: no remedy in {}", ended.err());
    }
}

#[test]
fn an_output_that_exists_is_3_and_stays_until_replace_is_given() {
    let dir = tempfile::tempdir().unwrap();
    small_book(dir.path());
    for (existing, args) in [
        ("small-schedule.xlsx", &["schedule", "small"][..]),
        ("out.json", &["schedule", "small", "--json", "out.json"]),
        ("new.xlsx", &["starter", "new.xlsx"]),
    ] {
        let path = dir.path().join(existing);
        std::fs::write(&path, "issued").unwrap();
        let before = names_in(dir.path());
        run_in(dir.path(), args).ends_with(3).prints_nothing().says(&[existing, "--replace"]);
        assert_eq!(names_in(dir.path()), before, "{args:?}");
        assert_eq!(std::fs::read(&path).unwrap(), b"issued");

        let mut args = args.to_vec();
        args.push("--replace");
        run_in(dir.path(), &args).ends_with(0);
        assert_ne!(std::fs::read(&path).unwrap(), b"issued");
        std::fs::remove_file(path).unwrap();
        let _ = std::fs::remove_file(dir.path().join("small-schedule.xlsx"));
    }
}

#[test]
fn an_output_without_a_folder_is_3() {
    let dir = tempfile::tempdir().unwrap();
    small_book(dir.path());
    run_in(dir.path(), &["schedule", "small", "-o", "no/such/out.xlsx"])
        .ends_with(3)
        .prints_nothing()
        .says(&["error: no/such/out.xlsx: there is no folder no/such"]);
    run_in(dir.path(), &["starter", "no/such/out.xlsx"]).ends_with(3).prints_nothing();
}
