//! MAIN PATH: a floor book read, laid out and designed, with everything there is to say about it.

use std::path::Path;

use design_engine::design_floor;
use design_engine::floor::Floor;
use design_engine::query::{Query, Severity};
use design_engine::result::FloorDesign;
use detailing::detail;
use detailing::inputs::inputs;
use detailing::model::BarSchedule;
use detailing::reconcile::{ReconcileError, reconcile};
use detailing::reissue::{Change, Register, register, reissue};
use floor_grid::lay_out;
use schedule_io::book::{Book, PlacedQuery};
use schedule_io::read::read_book;
use schedule_io::write::Submission;

use crate::exit::{Exit, Stop};
use crate::message::{Message, counted};
use crate::progress::during;

/// A designed floor.
pub(crate) struct Designed {
    /// The book.
    pub(crate) book: Book,
    /// Its floor.
    pub(crate) floor: Floor,
    /// The design.
    pub(crate) design: FloorDesign,
    /// Its bars.
    pub(crate) bars: BarSchedule,
    /// Every mark ever used.
    pub(crate) register: Register,
    /// What differs from the issue before, if one was given.
    pub(crate) changes: Option<Vec<Change>>,
    /// Queries of reading, layout and design, the gravest first.
    pub(crate) queries: Vec<PlacedQuery>,
}

impl Designed {
    /// What the outputs are made from.
    pub(crate) fn submission(&self) -> Submission<'_> {
        Submission {
            book: &self.book,
            floor: &self.floor,
            design: &self.design,
            bars: &self.bars,
            register: &self.register,
            changes: self.changes.as_deref(),
            queries: &self.queries,
            version: env!("CARGO_PKG_VERSION"),
        }
    }

    /// Keeps the marks of the issue before and notes what changed.
    pub(crate) fn compare_with(&mut self, previous: &Register) -> Result<(), Stop> {
        let inputs = std::mem::take(&mut self.register.inputs);
        let revision = &self.book.criteria.revision;
        let (register, changes) = reissue(&self.floor, &mut self.bars, previous, inputs, revision)
            .map_err(|error| Stop::refused(vec![Message::error(format!("{}: {error}", self.book.name))]))?;
        reconcile(&self.bars, &self.book.criteria).map_err(|error| bars_do_not_agree(&error))?;
        (self.register, self.changes) = (register, Some(changes));
        Ok(())
    }
}

/// Reads, lays out and designs a floor book. `talkative`: also warnings are said where
/// the book is refused, since a misspelt heading is a warning that explains the error of a missing one.
pub(crate) fn design_book(path: &Path, show_progress: bool, talkative: bool) -> Result<Designed, Stop> {
    let reading = during(show_progress, "reading the floor book", || read_book(path))
        .map_err(|error| Stop::file_trouble(vec![Message::error(error.to_string())]))?;
    let mut queries = reading.queries;
    let Some(book) = reading.book else { return Err(book_is_wrong(&queries, talkative)) };

    let (floor, found) = during(show_progress, "finding edges", || lay_out(&book.layout));
    add(&mut queries, found, &book);
    refuse_errors(&queries, talkative)?;

    let doing = format!("designing {}", counted(floor.panels.len(), "panel"));
    let design = during(show_progress, &doing, || design_floor(&floor, &book.criteria));
    add(&mut queries, design.queries.clone(), &book);
    refuse_errors(&queries, talkative)?;
    let bars = during(show_progress, "detailing bars", || detail(&floor, &design, &book.criteria));
    add(&mut queries, bars.queries.clone(), &book);
    reconcile(&bars, &book.criteria).map_err(|error| bars_do_not_agree(&error))?;
    let inputs = inputs(&floor, &design, &book.criteria);
    let register = register(&floor, &bars, inputs, &book.criteria.revision);
    Ok(Designed { book, floor, design, bars, register, changes: None, queries })
}

fn bars_do_not_agree(error: &ReconcileError) -> Stop {
    let text = format!("the bars do not agree, so nothing is written: {error}");
    Stop::file_trouble(vec![Message::error(text)])
}

/// Adds queries with their places; the gravest come first, else the order of the work is kept.
fn add(queries: &mut Vec<PlacedQuery>, found: Vec<Query>, book: &Book) {
    queries.extend(found.into_iter().map(|query| {
        let place = book.places.place(&query.subject);
        PlacedQuery { query, place }
    }));
    queries.sort_by_key(|placed| placed.query.severity);
}

fn refuse_errors(queries: &[PlacedQuery], talkative: bool) -> Result<(), Stop> {
    let has_error = queries.iter().any(|placed| placed.query.severity == Severity::Error);
    if has_error { Err(book_is_wrong(queries, talkative)) } else { Ok(()) }
}

fn book_is_wrong(queries: &[PlacedQuery], talkative: bool) -> Stop {
    let errors = queries.iter().filter(|placed| placed.query.severity == Severity::Error).count();
    // Notes do not explain an error: a table of another program may bring a hundred unknown columns.
    let least = if talkative { Severity::Warning } else { Severity::Error };
    let said = |placed: &&PlacedQuery| placed.query.severity <= least;
    Stop {
        exit: Exit::WrongInput,
        messages: queries.iter().filter(said).map(Message::query).collect(),
        closing: (errors > 1).then(|| format!("{errors} errors in the floor book; nothing is designed")),
    }
}
