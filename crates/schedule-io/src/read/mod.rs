//! MAIN PATH of reading: a floor book, `.xlsx` or a folder of CSV files, to a [`Book`].

mod cells;
mod criteria;
mod csv_files;
mod gridlines;
mod headings;
mod loose_panels;
mod numbers;
mod on_panels;
mod open;
mod panels;
pub(crate) mod previous;
mod recognise;
mod report;
mod rows;
mod stretches;
mod units;
mod unpacked;
mod workbook;

pub use previous::{PreviousError, read_previous};
pub use recognise::is_floor_book;

use std::path::{Path, PathBuf};

use design_engine::floor::TenthMm;
use design_engine::query::Severity;
use floor_grid::layout::Layout;

use crate::book::{Book, PlacedQuery};
use crate::place::{CellPlace, Places, SheetPlace};
use crate::sheets::{
    CHOSEN_BARS, CRITERIA, GRIDLINES, JOINTS, LOOSE_PANELS, OPENINGS, PANELS, SUPPORTS, Sheet, WALL_LOADS,
};
use cells::{Content, Source};
use headings::Table;
use panels::Marks;
use report::Report;
use rows::{Progress, Row};

/// What reading gives: the book, unless it has errors, and everything there is to say about it.
#[derive(Debug, Clone)]
pub struct Reading {
    /// The book; none where any query is an error.
    pub book: Option<Book>,
    /// All queries, errors first, each in order of sheet and row.
    pub queries: Vec<PlacedQuery>,
}

/// A book that cannot be opened at all.
#[derive(Debug, thiserror::Error)]
#[error("{}: {what}; {remedy}", path.display())]
pub struct CannotRead {
    /// The file or folder.
    pub path: PathBuf,
    /// What is the matter.
    pub what: String,
    /// What to do.
    pub remedy: String,
}

/// Reads a floor book.
///
/// # Errors
/// Where the file or folder cannot be opened or is no floor book at all.
pub fn read_book(path: &Path) -> Result<Reading, CannotRead> {
    let report = Report::new();
    let source = open::open(path, &report)?;
    let tables = Tables::new(&source, &report);
    let mut places = tables.places();
    let (criteria, defaults_used, layout) = read_tables(&source, &tables, &mut places, &report);

    let mut queries = report.into_queries();
    let order = |place: &CellPlace| {
        let same = |raw: &cells::RawSheet| raw.file == place.file && raw.sheet == place.sheet;
        (source.sheets.iter().position(same).unwrap_or(usize::MAX), place.row, place.column)
    };
    queries.sort_by_cached_key(|placed| (placed.query.severity, placed.place.as_ref().map(order)));
    let wrong = queries.iter().any(|placed| placed.query.severity == Severity::Error);
    let book = (!wrong).then(|| Book {
        name: source.name.clone(),
        criteria,
        defaults_used,
        layout,
        queries: queries.clone(),
        places,
    });
    Ok(Reading { book, queries })
}

fn read_tables(
    source: &Source,
    tables: &Tables<'_>,
    places: &mut Places,
    report: &Report,
) -> (design_engine::criteria::Criteria, Vec<crate::book::DefaultUsed>, Layout) {
    let (criteria, defaults_used) = tables.with(&CRITERIA, report, |rows| criteria::read(rows, places));
    let (gridlines, mut names) = tables.with(&GRIDLINES, report, |rows| {
        gridlines::read(rows, tables.names_are_complete(&GRIDLINES, "Gridline"), places)
    });
    if tables.count(&PANELS) > 0 && tables.count(&GRIDLINES) == 0 && names.complete {
        names.complete = false;
        report.error(
            tables.whole(&PANELS, source),
            "the panels need gridlines, and the book has none",
            "fill the sheet Gridlines, or give the panels on the sheet Loose panels",
        );
    }
    let mut marks = Marks::new(
        [&PANELS, &LOOSE_PANELS].into_iter().all(|sheet| tables.names_are_complete(sheet, "Panel")),
    );
    let sheet = |spec: &'static Sheet| tables.index(spec);
    let panels = tables.with(&PANELS, report, |rows| {
        panels::read(rows, &criteria, &names, sheet(&PANELS), places, &mut marks)
    });
    let loose_panels = tables.with(&LOOSE_PANELS, report, |rows| {
        loose_panels::read(rows, &criteria, sheet(&LOOSE_PANELS), places, &mut marks)
    });
    if tables.count(&PANELS) + tables.count(&LOOSE_PANELS) == 0 && marks.complete {
        report.error(
            CellPlace { file: source.name.clone(), sheet: None, row: None, column: None, heading: None },
            "the book holds no panel",
            "fill a row of Panels (with Gridlines) or of Loose panels",
        );
    }
    let layout = Layout {
        joints: tables.with(&JOINTS, report, |rows| stretches::read_joints(rows, &names)),
        supports: tables.with(&SUPPORTS, report, |rows| stretches::read_supports(rows, &names, &criteria)),
        openings: tables.with(&OPENINGS, report, |rows| on_panels::read_openings(rows, &marks)),
        wall_loads: tables.with(&WALL_LOADS, report, |rows| on_panels::read_wall_loads(rows, &marks)),
        chosen_bars: tables.with(&CHOSEN_BARS, report, |rows| on_panels::read_chosen_bars(rows, &marks)),
        tolerance: TenthMm(criteria.plan_tolerance_tenths()),
        support_width_mm: criteria.support_width_mm,
        gridlines,
        panels,
        loose_panels,
    };
    (criteria, defaults_used, layout)
}

/// The sheets of a book whose headings are found.
struct Tables<'a> {
    tables: Vec<Table<'a>>,
    /// Sheets of which rows may be missing, because of a fault that is reported.
    cut: Vec<&'static str>,
}

impl<'a> Tables<'a> {
    fn new(source: &'a Source, report: &Report) -> Tables<'a> {
        let mut tables = Tables { tables: Vec::new(), cut: Vec::new() };
        for raw in &source.sheets {
            let blank = !raw.rows.iter().any(|row| row.cells.iter().any(Content::is_filled));
            let table = headings::table(raw, report);
            if raw.cut || (table.is_none() && !blank) {
                tables.cut.push(raw.spec.name);
            }
            tables.tables.extend(table);
        }
        tables
    }

    fn get(&self, spec: &Sheet) -> Option<&Table<'a>> {
        self.tables.iter().find(|table| table.raw.spec.name == spec.name)
    }

    /// Index among the tables and the places; past the end for an absent sheet.
    fn index(&self, spec: &Sheet) -> usize {
        let found = self.tables.iter().position(|table| table.raw.spec.name == spec.name);
        found.unwrap_or(self.tables.len())
    }

    fn count(&self, spec: &Sheet) -> usize {
        self.get(spec).map_or(0, |table| table.rows.len())
    }

    /// Whether every name that the book gives in a column can be read.
    fn names_are_complete(&self, spec: &Sheet, heading: &str) -> bool {
        let column = spec.columns.iter().position(|column| column.heading == heading);
        let has_column = |table: &Table<'_>| column.is_some_and(|column| table.columns[column].is_some());
        !self.cut.contains(&spec.name) && self.get(spec).is_none_or(has_column)
    }

    /// Reads the rows of a sheet; an absent sheet has none.
    fn with<T>(
        &self,
        spec: &Sheet,
        report: &Report,
        read: impl FnOnce(&mut dyn Iterator<Item = Row<'_>>) -> T,
    ) -> T {
        let Some(table) = self.get(spec) else { return read(&mut std::iter::empty()) };
        let progress = Progress::default();
        let out = read(&mut rows::rows(table, &progress, report));
        progress.finish(table, report);
        out
    }

    fn whole(&self, spec: &Sheet, source: &Source) -> CellPlace {
        match self.get(spec) {
            Some(table) => table.raw.place(None, None, None),
            None => {
                CellPlace { file: source.name.clone(), sheet: None, row: None, column: None, heading: None }
            }
        }
    }

    fn places(&self) -> Places {
        let sheet = |table: &Table<'a>| SheetPlace {
            name: table.raw.spec.name,
            file: table.raw.file.clone(),
            sheet: table.raw.sheet.clone(),
            columns: table
                .raw
                .spec
                .columns
                .iter()
                .zip(&table.columns)
                .filter_map(|(column, found)| {
                    let found = found.as_ref()?;
                    Some((column.heading, u32::try_from(found.index).ok()?, found.printed.clone()))
                })
                .collect(),
            rows: table.rows.iter().map(|(row, _)| row.number).collect(),
        };
        Places { sheets: self.tables.iter().map(sheet).collect(), ..Places::default() }
    }
}
