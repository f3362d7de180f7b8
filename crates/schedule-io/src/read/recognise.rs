//! Telling a floor book from other workbooks, so that no output is written over one.

use std::path::Path;

use calamine::{Reader as _, Xlsx, open_workbook};

use crate::limits;
use crate::sheets;

/// True for an `.xlsx` workbook with a sheet that only a floor book has (`Criteria`, `Gridlines`, `Loose panels`) and
/// no `Cover`. False for anything that cannot be opened.
#[must_use]
pub fn is_floor_book(path: &Path) -> bool {
    let small = std::fs::metadata(path).is_ok_and(|file| file.is_file() && file.len() <= limits::FILE_BYTES);
    if !small {
        return false;
    }
    let Ok(workbook) = open_workbook::<Xlsx<_>, _>(path) else { return false };
    let names = workbook.sheet_names();
    let has = |name: &str| names.iter().any(|sheet| sheet.trim().eq_ignore_ascii_case(name));
    let ours = [sheets::CRITERIA.name, sheets::GRIDLINES.name, sheets::LOOSE_PANELS.name];
    ours.into_iter().any(has) && !has("Cover")
}
