//! Opening a floor book: which form it has, and a refusal with a remedy for everything else.

use std::fs;
use std::io::Read as _;
use std::path::{Path, PathBuf};

use design_engine::query::{Severity, Subject};

use super::CannotRead;
use super::cells::{RawSheet, Source};
use super::headings::folded;
use super::report::Report;
use super::{csv_files, workbook};
use crate::limits;
use crate::place::CellPlace;
use crate::sheets::{READ_ME, SHEETS, Sheet};

/// Opens the book at a path and reads its known sheets.
pub(crate) fn open(path: &Path, report: &Report) -> Result<Source, CannotRead> {
    let cannot = |what: &str, remedy: &str| cannot(path, what, remedy);
    let metadata = fs::metadata(path).map_err(|error| refused(path, &error))?;
    if metadata.is_dir() {
        return folder(path, report);
    }
    let name = file_name(path);
    let extension = path.extension().unwrap_or_default().to_string_lossy().to_lowercase();
    if name.starts_with("~$") || name.starts_with(".~lock") {
        return Err(cannot("this is the lock file of a book that is open", "give the book itself"));
    }
    match extension.as_str() {
        "xlsx" => {}
        "csv" => {
            return Err(cannot("one CSV file is no floor book", "give the folder that holds the CSV files"));
        }
        "xls" | "xlsm" | "xlsb" | "xltx" | "xltm" | "ods" | "fods" | "numbers" => {
            return Err(cannot(
                &format!("a floor book is no .{extension} file"),
                "open it in a spreadsheet and save it as .xlsx",
            ));
        }
        _ => {
            return Err(cannot(
                "the file is no .xlsx workbook",
                "give an .xlsx workbook or a folder of CSV files",
            ));
        }
    }
    if !metadata.is_file() {
        return Err(cannot("this is no ordinary file", "give an .xlsx workbook or a folder of CSV files"));
    }
    let bytes = bytes(path)?;
    let sheets = workbook::sheets(path, &name, bytes, report)?;
    Ok(Source { name, sheets })
}

pub(crate) fn cannot(path: &Path, what: &str, remedy: &str) -> CannotRead {
    CannotRead { path: path.to_owned(), what: what.to_owned(), remedy: remedy.to_owned() }
}

/// What the file system says, in our own words where it is usual.
fn refused(path: &Path, error: &std::io::Error) -> CannotRead {
    match error.kind() {
        std::io::ErrorKind::NotFound => {
            cannot(path, "there is no such file or folder", "check the name and the folder")
        }
        std::io::ErrorKind::PermissionDenied => cannot(
            path,
            "the file may not be read",
            "close it where it is open, and check that you may read it",
        ),
        _ => cannot(
            path,
            &format!("the file cannot be read ({error})"),
            "close it where it is open and try again",
        ),
    }
}

/// Name of the file or folder itself, for a path such as `.` too.
fn file_name(path: &Path) -> String {
    let own = path.file_name().map(|name| name.to_string_lossy().into_owned());
    let resolved =
        || fs::canonicalize(path).ok().and_then(|p| p.file_name().map(|n| n.to_string_lossy().into_owned()));
    own.or_else(resolved).unwrap_or_else(|| "book".to_owned())
}

/// A whole file, up to the limit.
fn bytes(path: &Path) -> Result<Vec<u8>, CannotRead> {
    let file = fs::File::open(path).map_err(|error| refused(path, &error))?;
    let mut bytes = Vec::new();
    file.take(limits::FILE_BYTES + 1).read_to_end(&mut bytes).map_err(|error| refused(path, &error))?;
    if bytes.len() as u64 > limits::FILE_BYTES {
        let what = format!("the file is larger than {} MB", limits::FILE_BYTES / 1_000_000);
        return Err(cannot(
            path,
            &what,
            "remove pictures and unused sheets, or split the floor into several books",
        ));
    }
    Ok(bytes)
}

/// The sheet that a name stands for, without regard to case, spaces, hyphens and underscores.
pub(crate) fn sheet_named(name: &str) -> Option<&'static Sheet> {
    let plain = |text: &str| folded(text).replace(['-', '_'], "");
    let name = plain(name);
    SHEETS.into_iter().find(|sheet| plain(sheet.name) == name)
}

/// Whether a sheet is the one of instructions.
pub(crate) fn is_read_me(name: &str) -> bool {
    folded(name).replace(['-', '_'], "") == folded(READ_ME)
}

fn folder(path: &Path, report: &Report) -> Result<Source, CannotRead> {
    let name = file_name(path);
    let mut sheets: Vec<RawSheet> = Vec::new();
    let mut unknown = Vec::new();
    let mut cells_left = limits::CELLS;
    for file in csv_paths(path)? {
        let stem = file.file_stem().unwrap_or_default().to_string_lossy().into_owned();
        let place = CellPlace { file: file_name(&file), sheet: None, row: None, column: None, heading: None };
        let Some(spec) = sheet_named(&stem) else {
            if !is_read_me(&stem) {
                unknown.push((place.file, stem));
            }
            continue;
        };
        if let Some(first) = sheets.iter().find(|sheet| sheet.spec == spec) {
            let text = format!("the sheet {} is there twice, first as {}", spec.name, first.file);
            report.error(place, text, "keep one of the two files");
            continue;
        }
        sheets.push(csv_files::sheet(&file, &bytes(&file)?, spec, &mut cells_left, report));
    }
    if sheets.is_empty() {
        return Err(cannot(
            path,
            "the folder holds no CSV file of a floor book",
            "give a folder with criteria.csv, gridlines.csv, panels.csv and so on, or an .xlsx workbook",
        ));
    }
    for (file, stem) in &unknown {
        say_unknown_sheet(file, None, stem, &sheets, report);
    }
    sheets.sort_by_key(|raw| SHEETS.iter().position(|sheet| *sheet == raw.spec));
    Ok(Source { name, sheets })
}

/// A sheet or file that is no part of a floor book; one that is nearly a sheet which is missing weighs more
/// than any other.
pub(crate) fn say_unknown_sheet(
    file: &str,
    sheet: Option<&str>,
    name: &str,
    known: &[RawSheet],
    report: &Report,
) {
    let missing = SHEETS.iter().filter(|sheet| known.iter().all(|raw| raw.spec != **sheet));
    let (severity, remedy) = match report.nearest_name(name, missing.map(|sheet| sheet.name)) {
        Some(near) => (Severity::Warning, format!("if it is meant to be {near}, correct its name")),
        None => (Severity::Note, String::new()),
    };
    let sheet = sheet.map(str::to_owned);
    let place = CellPlace { file: file.to_owned(), sheet, row: None, column: None, heading: None };
    report.say(severity, Subject::Floor, place, "this is no sheet of a floor book and is not used", remedy);
}

/// The CSV files of a folder in order of their names.
fn csv_paths(folder: &Path) -> Result<Vec<PathBuf>, CannotRead> {
    let mut paths = Vec::new();
    for entry in fs::read_dir(folder).map_err(|error| refused(folder, &error))? {
        let path = entry.map_err(|error| refused(folder, &error))?.path();
        let extension = path.extension().unwrap_or_default().to_string_lossy().to_lowercase();
        let hidden = file_name(&path).starts_with(['.', '~']);
        if extension == "csv" && !hidden && path.is_file() {
            paths.push(path);
        }
        if paths.len() > limits::SHEETS {
            return Err(cannot(
                folder,
                &format!("the folder holds more than {} CSV files", limits::SHEETS),
                "give a folder that holds one floor book alone",
            ));
        }
    }
    paths.sort();
    Ok(paths)
}
