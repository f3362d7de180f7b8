//! Small floor books for the end-to-end tests. Every number in them is invented.

use std::path::{Path, PathBuf};

/// Four panels between six gridlines, all of which pass: two bays of 4.80 and 4.20 m by 5.60 and 5.10 m.
pub const GRIDLINES_CSV: &str = "\
Gridline,Axis,Position (m)
1,X,0
2,X,4.8
3,X,9.0
A,Y,0
B,Y,5.6
C,Y,10.7
";

/// Criteria of the small books; what is not named takes its default.
pub const CRITERIA_CSV: &str = "\
Item,Value,Unit,Remark
Project,Invented for the tests,,
Floor,Level 1,,
Thickness,175,mm,
";

/// Panels of [`small_book`].
pub const PANELS_CSV: &str = "\
Panel,X from,X to,Y from,Y to,Thickness (mm),Imposed (kN/m2),North edge,Remarks
S1,1,2,A,B,,,,
S2,2,3,A,B,,3,,
S3,1,2,B,C,,,,
S4,2,3,B,C,200,,,
";

/// Writes a book as a folder `NAME` of CSV files into `dir`: file names and their contents.
///
/// # Panics
/// Where the folder cannot be written.
pub fn book_of(dir: &Path, name: &str, files: &[(&str, &str)]) -> PathBuf {
    let book = dir.join(name);
    std::fs::create_dir_all(&book).unwrap_or_else(|e| panic!("{}: {e}", book.display()));
    for (file, contents) in files {
        let path = book.join(file);
        std::fs::write(&path, contents).unwrap_or_else(|e| panic!("{}: {e}", path.display()));
    }
    book
}

/// A book of four panels that pass every check.
///
/// # Panics
/// Where the folder cannot be written.
pub fn small_book(dir: &Path) -> PathBuf {
    book_with_panels(dir, "small", PANELS_CSV)
}

/// The small book with S4 too thin for its deflection.
///
/// # Panics
/// Where the folder cannot be written.
pub fn failing_book(dir: &Path) -> PathBuf {
    book_with_panels(dir, "failing", &PANELS_CSV.replace("S4,2,3,B,C,200", "S4,2,3,B,C,90"))
}

/// The small book with S3 lacking a support on its north edge, which no table covers.
///
/// # Panics
/// Where the folder cannot be written.
pub fn not_designed_book(dir: &Path) -> PathBuf {
    let panels = PANELS_CSV.replace("S3,1,2,B,C,,,,", "S3,1,2,B,C,,,free,open to the atrium");
    book_with_panels(dir, "not-designed", &panels)
}

/// The small book with two faults: a number that is none, and a gridline that is not there.
///
/// # Panics
/// Where the folder cannot be written.
pub fn wrong_book(dir: &Path) -> PathBuf {
    let panels = PANELS_CSV.replace("S2,2,3,A,B,,3", "S2,2,3,A,B,,2.5x").replace("S3,1,2,B,C", "S3,1,7,B,C");
    book_with_panels(dir, "wrong", &panels)
}

/// The small book with other panels.
///
/// # Panics
/// Where the folder cannot be written.
pub fn book_with_panels(dir: &Path, name: &str, panels: &str) -> PathBuf {
    let files = [("criteria.csv", CRITERIA_CSV), ("gridlines.csv", GRIDLINES_CSV), ("panels.csv", panels)];
    book_of(dir, name, &files)
}

/// Names of everything in a folder, sorted.
///
/// # Panics
/// Where the folder cannot be read.
#[must_use]
pub fn names_in(folder: &Path) -> Vec<String> {
    let entries = std::fs::read_dir(folder).unwrap_or_else(|e| panic!("{}: {e}", folder.display()));
    let mut names: Vec<String> =
        entries.flatten().map(|entry| entry.file_name().to_string_lossy().into_owned()).collect();
    names.sort();
    names
}
