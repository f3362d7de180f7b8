//! What goes to which stream, in colour or not, and to a reader who stops reading.

mod command_support;

use std::process::Stdio;

use baymat_tests::{failing_book, not_designed_book, small_book, wrong_book};
use command_support::{Ended, program, run_in};

const ESCAPE: char = '\u{1b}';

#[test]
fn quiet_prints_nothing_but_errors() {
    let dir = tempfile::tempdir().unwrap();
    small_book(dir.path());
    not_designed_book(dir.path());
    wrong_book(dir.path());
    for (book, code) in [("small", 0), ("not-designed", 1)] {
        run_in(dir.path(), &["schedule", book, "--quiet"]).ends_with(code).prints_nothing().says_nothing();
        run_in(dir.path(), &["check", book, "-q"]).ends_with(code).prints_nothing().says_nothing();
    }
    let ended = run_in(dir.path(), &["schedule", "wrong", "--quiet"]).ends_with(2).prints_nothing();
    assert_eq!(ended.err().lines().filter(|line| line.starts_with("error: ")).count(), 2);
    assert!(!ended.err().contains("note: ") && !ended.err().contains("warning: "), "{}", ended.err());
}

#[test]
fn nothing_is_coloured_away_from_a_terminal() {
    let dir = tempfile::tempdir().unwrap();
    not_designed_book(dir.path());
    wrong_book(dir.path());
    for no_color in [None, Some(""), Some("1")] {
        for args in [&["check", "not-designed"][..], &["check", "wrong"], &["--help"], &["schedul"]] {
            let mut command = program();
            if let Some(value) = no_color {
                command.env("NO_COLOR", value);
            }
            let ended = Ended(command.current_dir(dir.path()).args(args).output().unwrap());
            assert!(!ended.out().contains(ESCAPE) && !ended.err().contains(ESCAPE), "{args:?}");
        }
    }
}

#[test]
fn a_reader_who_stops_reading_ends_no_run_in_a_panic() {
    let dir = tempfile::tempdir().unwrap();
    small_book(dir.path());
    failing_book(dir.path());
    for (args, code) in [
        (&["check", "small"][..], 0),
        (&["schedule", "small", "--replace"], 0),
        (&["schedule", "failing", "--replace"], 1),
        (&["starter", "new.xlsx", "--replace"], 0),
        (&["completions", "bash"], 0),
        (&["man"], 0),
        (&["--help"], 0),
        (&["--version"], 0),
    ] {
        let mut child = program()
            .current_dir(dir.path())
            .args(args)
            .stdout(Stdio::piped())
            .stderr(Stdio::piped())
            .spawn()
            .unwrap();
        drop(child.stdout.take());
        Ended(child.wait_with_output().unwrap()).ends_with(code).says_nothing();
    }
}

#[test]
fn errors_nobody_reads_end_no_run_in_a_panic() {
    let dir = tempfile::tempdir().unwrap();
    let mut child = program()
        .current_dir(dir.path())
        .args(["check", "no-such-book"])
        .stderr(Stdio::piped())
        .stdout(Stdio::null())
        .spawn()
        .unwrap();
    drop(child.stderr.take());
    assert_eq!(child.wait().unwrap().code(), Some(3));
}

#[cfg(target_os = "linux")]
#[test]
fn a_full_disk_under_standard_output_is_3() {
    let dir = tempfile::tempdir().unwrap();
    small_book(dir.path());
    let full = std::fs::OpenOptions::new().write(true).open("/dev/full").unwrap();
    let output = program().current_dir(dir.path()).args(["check", "small"]).stdout(full).output().unwrap();
    Ended(output).ends_with(3).says(&["error: standard output: cannot be written"]);
}

#[test]
fn a_cell_cannot_command_the_terminal() {
    let dir = tempfile::tempdir().unwrap();
    let panels = baymat_tests::PANELS_CSV.replace("S3,1,2,B,C,,,,", "S3,1,\u{1b}[2J,B,C,,,,");
    baymat_tests::book_with_panels(dir.path(), "hostile", &panels);
    let ended = run_in(dir.path(), &["check", "hostile"]).ends_with(2);
    assert!(!ended.out().contains(ESCAPE) && !ended.err().contains(ESCAPE), "{}", ended.err());
}

#[test]
fn a_warning_that_explains_an_error_is_said_with_it() {
    let dir = tempfile::tempdir().unwrap();
    let panels = baymat_tests::PANELS_CSV.replace("X from", "X form").replace("Remarks", "Colour");
    baymat_tests::book_with_panels(dir.path(), "misspelt", &panels);
    let quiet = run_in(dir.path(), &["check", "misspelt", "-q"]).ends_with(2);
    assert!(quiet.err().lines().all(|line| line.starts_with("error: ")), "{}", quiet.err());
    let ended = run_in(dir.path(), &["check", "misspelt"]).ends_with(2);
    let ended = ended.says(&["error: ", "X from", "warning: ", "X form"]);
    assert!(!ended.err().contains("Colour"), "what explains no error is left out: {}", ended.err());
}
