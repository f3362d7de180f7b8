//! Where outputs may go, and where they may not, whatever `--replace` says.

mod command_support;

use std::path::Path;

use baymat_tests::{names_in, small_book};
use command_support::run_in;

const REPLACE: &str = "--replace";

/// The small book's files as bytes, to see that none is touched.
fn book_bytes(book: &Path) -> Vec<(String, Vec<u8>)> {
    let read = |name: String| std::fs::read(book.join(&name)).map(|bytes| (name, bytes));
    names_in(book).into_iter().flat_map(read).collect()
}

#[test]
fn an_output_in_the_books_folder_is_refused_even_with_replace() {
    let dir = tempfile::tempdir().unwrap();
    let book = small_book(dir.path());
    let before = book_bytes(&book);
    for output in ["small/out.xlsx", "small/../small/out.xlsx", "./small/./out.xlsx"] {
        run_in(dir.path(), &["schedule", "small", "-o", output, REPLACE])
            .ends_with(2)
            .prints_nothing()
            .says(&["would be written into the floor book's folder small"]);
    }
    run_in(dir.path(), &["schedule", "small", "--json", "small/panels.csv", REPLACE])
        .ends_with(2)
        .says(&["small/panels.csv: the results file would be written into"]);
    run_in(&book, &["schedule", ".", "-o", "out.xlsx"])
        .ends_with(2)
        .says(&["out.xlsx: the schedule would be"]);
    assert_eq!(book_bytes(&book), before);
    assert_eq!(names_in(dir.path()), ["small"]);
}

#[test]
fn a_book_named_by_a_dot_has_its_schedule_beside_it() {
    let dir = tempfile::tempdir().unwrap();
    let book = small_book(dir.path());
    run_in(&book, &["schedule", "."]).ends_with(0);
    assert_eq!(names_in(dir.path()), ["small", "small-schedule.xlsx"]);
}

#[test]
fn an_output_that_is_the_book_is_refused_even_with_replace() {
    let dir = tempfile::tempdir().unwrap();
    run_in(dir.path(), &["starter", "floor.xlsx"]).ends_with(0);
    let before = std::fs::read(dir.path().join("floor.xlsx")).unwrap();
    for output in ["floor.xlsx", "./floor.xlsx"] {
        run_in(dir.path(), &["schedule", "floor.xlsx", "-o", output, REPLACE])
            .ends_with(2)
            .prints_nothing()
            .says(&["would be written over the floor book"]);
    }
    run_in(dir.path(), &["schedule", "floor.xlsx", "--json", "floor.xlsx", REPLACE]).ends_with(2);
    assert_eq!(std::fs::read(dir.path().join("floor.xlsx")).unwrap(), before);
    assert_eq!(names_in(dir.path()), ["floor.xlsx"]);
}

#[test]
fn two_outputs_that_are_one_file_are_refused() {
    let dir = tempfile::tempdir().unwrap();
    small_book(dir.path());
    run_in(dir.path(), &["schedule", "small", "-o", "a.xlsx", "--json", "./a.xlsx", REPLACE])
        .ends_with(2)
        .says(&["the schedule and the results file would be the same file"]);
    assert_eq!(names_in(dir.path()), ["small"]);
}

#[test]
fn a_schedule_is_a_workbook_by_its_name() {
    let dir = tempfile::tempdir().unwrap();
    small_book(dir.path());
    for wrong in ["out.xls", "out.csv", "out", "out.xlsx.bak"] {
        run_in(dir.path(), &["schedule", "small", "-o", wrong]).ends_with(2).says(&[wrong, "end in .xlsx"]);
        run_in(dir.path(), &["starter", wrong]).ends_with(2).says(&[wrong, "end in .xlsx"]);
    }
    run_in(dir.path(), &["schedule", "small", "-o", "OUT.XLSX"]).ends_with(0);
    assert_eq!(names_in(dir.path()), ["OUT.XLSX", "small"]);
}

#[test]
fn a_refused_second_output_keeps_the_first_from_being_written() {
    let dir = tempfile::tempdir().unwrap();
    small_book(dir.path());
    run_in(dir.path(), &["schedule", "small", "--json", "no/such/out.json"]).ends_with(3);
    assert_eq!(names_in(dir.path()), ["small"]);
}

#[test]
fn every_output_in_the_way_is_named_at_once() {
    let dir = tempfile::tempdir().unwrap();
    small_book(dir.path());
    std::fs::write(dir.path().join("a.xlsx"), "issued").unwrap();
    std::fs::write(dir.path().join("a.json"), "issued").unwrap();
    run_in(dir.path(), &["schedule", "small", "-o", "a.xlsx", "--json", "a.json"])
        .ends_with(3)
        .says(&["error: a.xlsx: ", "error: a.json: "]);
}

#[test]
fn the_same_book_gives_the_same_bytes_from_another_folder() {
    let outputs = |dir: &Path| {
        small_book(dir);
        run_in(dir, &["schedule", "small", "-o", "o.xlsx", "--json", "o.json"]).ends_with(0);
        ["o.xlsx", "o.json"].map(|name| std::fs::read(dir.join(name)).unwrap())
    };
    let (one, other) = (tempfile::tempdir().unwrap(), tempfile::tempdir().unwrap());
    assert_eq!(outputs(one.path()), outputs(other.path()));
}

#[cfg(unix)]
mod links {
    use super::*;
    use std::os::unix::fs::symlink;

    #[test]
    fn a_link_to_the_book_or_into_its_folder_is_seen_through() {
        let dir = tempfile::tempdir().unwrap();
        let book = small_book(dir.path());
        let before = book_bytes(&book);
        symlink("small", dir.path().join("alias")).unwrap();
        symlink("small/new.xlsx", dir.path().join("later.xlsx")).unwrap();
        symlink("small/panels.csv", dir.path().join("panels.json")).unwrap();
        for args in [
            &["schedule", "small", "-o", "alias/out.xlsx", REPLACE][..],
            &["schedule", "alias", "-o", "small/out.xlsx", REPLACE],
            &["schedule", "small", "-o", "later.xlsx", REPLACE],
            &["schedule", "small", "--json", "panels.json", REPLACE],
        ] {
            run_in(dir.path(), args).ends_with(2).says(&["into the floor book's folder"]);
        }
        assert_eq!(book_bytes(&book), before);
        assert_eq!(names_in(dir.path()), ["alias", "later.xlsx", "panels.json", "small"]);
    }

    #[test]
    fn a_link_to_the_workbook_is_the_workbook() {
        let dir = tempfile::tempdir().unwrap();
        run_in(dir.path(), &["starter", "floor.xlsx"]).ends_with(0);
        symlink("floor.xlsx", dir.path().join("soft.xlsx")).unwrap();
        std::fs::hard_link(dir.path().join("floor.xlsx"), dir.path().join("hard.xlsx")).unwrap();
        for output in ["soft.xlsx", "hard.xlsx"] {
            run_in(dir.path(), &["schedule", "floor.xlsx", "-o", output, REPLACE])
                .ends_with(2)
                .says(&["would be written over the floor book"]);
        }
        run_in(dir.path(), &["schedule", "soft.xlsx", "-o", "floor.xlsx", REPLACE]).ends_with(2);
    }

    #[test]
    fn two_names_of_one_file_are_one_output() {
        let dir = tempfile::tempdir().unwrap();
        small_book(dir.path());
        symlink("a.xlsx", dir.path().join("b.json")).unwrap();
        run_in(dir.path(), &["schedule", "small", "-o", "a.xlsx", "--json", "b.json", REPLACE])
            .ends_with(2)
            .says(&["would be the same file"]);
    }
}

#[test]
fn no_floor_book_is_written_over_by_another_books_schedule_or_a_starter() {
    let dir = tempfile::tempdir().unwrap();
    small_book(dir.path());
    run_in(dir.path(), &["starter", "other.xlsx"]).ends_with(0);
    run_in(dir.path(), &["starter", "other.xlsx", REPLACE]).ends_with(0);
    let filled_in = dir.path().join("filled.xlsx");
    let book = Path::new(env!("CARGO_MANIFEST_DIR")).join("../fixtures/floors/workshop/book.xlsx");
    std::fs::copy(&book, &filled_in).unwrap();
    for arguments in
        [&["schedule", "small", "-o", "filled.xlsx", REPLACE][..], &["starter", "filled.xlsx", REPLACE][..]]
    {
        run_in(dir.path(), arguments)
            .ends_with(2)
            .prints_nothing()
            .says(&["filled.xlsx: this is a floor book"]);
    }
    assert_eq!(std::fs::read(&filled_in).unwrap(), std::fs::read(&book).unwrap());
}
