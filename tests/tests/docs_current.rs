//! What the docs take from the code is what the code says. `cargo test -p baymat-tests --test docs_current` with
//! `UPDATE_DOCS=1` writes the generated parts anew.

#![allow(clippy::unwrap_used, reason = "what is not as it should be must fail its test")]

use std::fmt::Write as _;
use std::path::{Path, PathBuf};
use std::process::Command;

use schedule_io::{sheets, write};

const START: &str = "<!-- made from the code: start -->\n";
const END: &str = "<!-- made from the code: end -->\n";

fn root() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("..")
}

fn read(name: &str) -> String {
    std::fs::read_to_string(root().join(name)).unwrap_or_else(|e| panic!("{name}: {e}"))
}

/// The part of a page between the two marks is `generated`.
fn check(page: &str, generated: &str) {
    let text = read(page);
    let (before, rest) = text.split_once(START).unwrap_or_else(|| panic!("{page}: no start mark"));
    let (part, after) = rest.split_once(END).unwrap_or_else(|| panic!("{page}: no end mark"));
    if std::env::var_os("UPDATE_DOCS").is_some() {
        std::fs::write(root().join(page), format!("{before}{START}{generated}{END}{after}")).unwrap();
    } else {
        assert!(part == generated, "{page} is stale: run this test with UPDATE_DOCS=1");
    }
}

#[test]
fn the_floor_book_page_lists_every_sheet_column_and_criterion() {
    check("docs/floor-book.md", &sheets::describe_sheets());
}

#[test]
fn the_workbook_page_lists_every_sheet_and_column() {
    let mut text = String::new();
    for sheet in write::describe_sheets() {
        writeln!(text, "## {}\n\nA row is {}.\n", sheet.name, sheet.row).unwrap();
        text += "| group | column | what it holds | key in the results file |\n|---|---|---|---|\n";
        for column in &sheet.columns {
            let key = if column.results_key.is_empty() {
                String::new()
            } else {
                format!("`{}`", column.results_key)
            };
            let cells =
                [column.group, &column.heading, &column.meaning, &key].map(|cell| cell.replace('|', "or"));
            writeln!(text, "| {} |", cells.join(" | ")).unwrap();
        }
        text.push('\n');
    }
    check("docs/workbook.md", &text);
}

#[test]
fn every_link_of_the_pages_leads_somewhere() {
    let mut pages = vec!["README.md".to_owned(), "DEVELOPERS.md".to_owned()];
    for entry in std::fs::read_dir(root().join("docs")).unwrap() {
        let name = entry.unwrap().file_name().into_string().unwrap();
        if name.ends_with(".md") {
            pages.push(format!("docs/{name}"));
        }
    }
    for page in pages {
        let text = read(&page);
        let folder = root().join(&page).parent().unwrap().to_path_buf();
        for link in text.split("](").skip(1).filter_map(|rest| rest.split(')').next()) {
            assert!(link.starts_with("http") || folder.join(link).exists(), "{page}: {link} leads nowhere");
        }
    }
}

#[test]
fn the_readme_names_the_two_commands_and_every_exit_code() {
    let readme = read("README.md");
    assert!(readme.contains(
        "cargo run --release -p baymat -- schedule fixtures/floors/library/book.xlsx -o demo-schedule.xlsx --replace"
    ));
    assert!(readme.contains("cargo test --workspace"));
    let help = Command::new(env!("CARGO_BIN_EXE_baymat-under-test")).arg("--help").output().unwrap();
    let help = String::from_utf8(help.stdout).unwrap();
    for code in 0..=3 {
        assert!(readme.contains(&format!("| {code} | ")), "exit code {code} is not in the README");
        assert!(help.contains(&format!("{code}  ")), "exit code {code} is not in the help");
    }
}

#[test]
fn the_demo_book_matches_what_the_readme_says_of_it() {
    let reading = schedule_io::read::read_book(&root().join("fixtures/floors/library/book.xlsx")).unwrap();
    let layout = reading.book.unwrap().layout;
    let panels = layout.panels.len() + layout.loose_panels.len();
    assert!(read("README.md").contains(&format!("an invented library, {panels} panels")));
}

#[test]
fn every_floor_book_of_the_fixtures_is_marked_as_invented() {
    for entry in std::fs::read_dir(root().join("fixtures/floors")).unwrap() {
        let criteria = entry.unwrap().path().join("book/criteria.csv");
        let text = std::fs::read_to_string(&criteria).unwrap();
        assert!(text.contains("(invented example)"), "{}", criteria.display());
    }
}
