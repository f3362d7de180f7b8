//! Typed reading of the cells of a row: each fault is said once, with its place and what is allowed.

use std::cell::{Cell, RefCell};
use std::collections::BTreeMap;

use design_engine::query::{Severity, Subject};

use super::cells::{BLANK, Content, RawRow, number_text};
use super::headings::{Found, Table, folded};
use super::numbers::{self, Mark};
use super::report::Report;
use crate::limits::{NAME_CHARS, TEXT_CHARS};
use crate::place::CellPlace;
use crate::sheets::{Column, GRIDLINES, Holds, LOOSE_PANELS, PANELS, Words};

/// A fault that the report already holds.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) struct Reported;

/// What a cell gives: a value, a blank, or a fault that is already reported.
pub(crate) type Field<T> = Result<Option<T>, Reported>;

/// Why the text of a cell is no number here.
#[derive(Debug)]
pub(crate) struct Unfit {
    /// What is allowed, where it is not the column's own range.
    pub(crate) allowed: Option<&'static str>,
    pub(crate) remedy: String,
}

/// Things said once a column, not once a cell.
#[derive(Debug, Default)]
struct Tally {
    count: u32,
    first: Option<(u32, String)>,
}

/// What is kept while the rows of one sheet are read.
#[derive(Debug, Default)]
pub(crate) struct Progress {
    /// Numbers stored as text, by column of the table of sheets.
    text_numbers: RefCell<BTreeMap<usize, Tally>>,
    /// Marks stored as numbers with decimals, by column.
    number_marks: RefCell<BTreeMap<usize, Tally>>,
    /// Decimal mark in use in a file where both are possible.
    decimal_mark: Cell<Option<Mark>>,
}

/// A row being read.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Row<'a> {
    pub(crate) table: &'a Table<'a>,
    pub(crate) raw: &'a RawRow,
    /// Index among the data rows, from 0.
    pub(crate) index: usize,
    /// Whether its cells can be trusted to stand under their headings; if not, the report says so already.
    pub(crate) fits: bool,
    progress: &'a Progress,
    report: &'a Report,
}

/// The rows of a table, in order.
pub(crate) fn rows<'a>(
    table: &'a Table<'a>,
    progress: &'a Progress,
    report: &'a Report,
) -> impl Iterator<Item = Row<'a>> {
    let with_index = table.rows.iter().enumerate();
    with_index.map(move |(index, (raw, fits))| Row { table, raw, index, fits: *fits, progress, report })
}

impl<'a> Row<'a> {
    fn column(&self, heading: &str) -> Option<(usize, &'static Column)> {
        let columns = self.table.raw.spec.columns;
        let index = columns.iter().position(|column| column.heading == heading);
        debug_assert!(index.is_some(), "{heading} is no column of {}", self.table.raw.spec.name);
        index.map(|index| (index, &columns[index]))
    }

    fn found(&self, heading: &str) -> Option<(usize, &'static Column, &'a Found)> {
        let (index, column) = self.column(heading)?;
        self.table.columns[index].as_ref().map(|found| (index, column, found))
    }

    /// The content under a heading; blank where the column is not there.
    pub(crate) fn content(&self, heading: &str) -> &'a Content {
        self.found(heading).map_or(&BLANK, |(_, _, found)| self.raw.cell(found.index))
    }

    /// Place of the cell under a heading, or of the row where the column is not there.
    pub(crate) fn place(&self, heading: &str) -> CellPlace {
        let found = self.found(heading).map(|(_, _, found)| found);
        self.table.raw.place(
            Some(self.raw.number),
            found.map(|found| found.index),
            found.map(|found| found.printed.as_str()),
        )
    }

    fn subject(&self, heading: &str) -> Subject {
        let spec = self.table.raw.spec;
        let first = match self.content(spec.columns[0].heading) {
            Content::Text(text) => Some(text.trim().to_owned()),
            Content::Number(number) => Some(number_text(*number)),
            _ => None,
        };
        match first {
            Some(mark) if [PANELS.name, LOOSE_PANELS.name].contains(&spec.name) => {
                Subject::Panel { mark, column: self.column(heading).map(|(_, column)| column.heading) }
            }
            Some(name) if spec.name == GRIDLINES.name => Subject::Gridline(name),
            _ => Subject::Row { sheet: spec.name, index: self.index },
        }
    }

    pub(crate) fn report(&self) -> &'a Report {
        self.report
    }

    /// Says an error about the cell under a heading.
    pub(crate) fn error(
        &self,
        heading: &str,
        text: impl Into<String>,
        remedy: impl Into<String>,
    ) -> Reported {
        self.report.say(Severity::Error, self.subject(heading), self.place(heading), text, remedy);
        Reported
    }

    /// What was read and what is allowed, with a remedy.
    pub(crate) fn refuse(&self, heading: &str, allowed: &str, remedy: impl Into<String>) -> Reported {
        let read = self.content(heading).shown();
        self.error(heading, format!("read {read}; allowed {allowed}"), remedy)
    }

    /// The nearest of some names to what was read, as `; nearest is "NAME"`.
    pub(crate) fn nearest<'n>(&self, read: &str, known: impl Iterator<Item = &'n str>) -> String {
        self.report.nearest(read, known)
    }

    fn allowed(&self, heading: &str) -> String {
        self.column(heading).map_or_else(String::new, |(_, column)| {
            let allowed = column.holds.describe();
            let scaled = self.found(heading).is_some_and(|(_, _, found)| found.scale.changes());
            if scaled { format!("{allowed} {}", column.unit) } else { allowed }
        })
    }

    /// A value that must be there: a blank is an error, unless the whole column is missing, which the
    /// headings have reported.
    pub(crate) fn filled<T>(&self, heading: &str, field: Field<T>) -> Result<T, Reported> {
        match field? {
            Some(value) => Ok(value),
            None if self.found(heading).is_none() => Err(Reported),
            None => Err(self.error(
                heading,
                format!("the cell is empty; allowed {}", self.allowed(heading)),
                "fill it, or clear the whole row",
            )),
        }
    }

    fn odd(&self, heading: &str, content: &Content, retype: &str) -> Reported {
        let (text, remedy) = odd(content, &self.allowed(heading), retype);
        self.error(heading, text, remedy)
    }

    /// A remark or another free text; an absent one is empty.
    pub(crate) fn text(&self, heading: &str) -> Result<String, Reported> {
        free_text(self.content(heading)).map_err(|why| match why {
            Some((allowed, remedy)) => self.refuse(heading, allowed, remedy),
            None => self.odd(heading, self.content(heading), "write text"),
        })
    }

    /// A mark or a name.
    pub(crate) fn name(&self, heading: &str) -> Field<String> {
        let content = self.content(heading);
        let allowed = || self.allowed(heading);
        match content {
            Content::Blank => Ok(None),
            Content::Text(text) if text.chars().any(char::is_control) => {
                Err(self.refuse(heading, &allowed(), "remove the line break or control character"))
            }
            Content::Text(text) if text.trim().chars().count() > NAME_CHARS => {
                Err(self.refuse(heading, &allowed(), "shorten it"))
            }
            Content::Text(text) => Ok(Some(text.trim().to_owned())),
            Content::Number(number) => {
                if number.fract() != 0.0 {
                    self.tally(&self.progress.number_marks, heading, content);
                }
                Ok(Some(number_text(*number)))
            }
            Content::Date { .. } => Err(self.odd(
                heading,
                content,
                "a mark such as 1-2 may have become a date: format the cell as text and type the mark again",
            )),
            _ => Err(self.odd(heading, content, "format the cell as text and type it again")),
        }
    }

    /// A number in the stated unit and in its range.
    pub(crate) fn number(&self, heading: &str) -> Field<f64> {
        if !self.fits {
            return Err(Reported);
        }
        let content = self.content(heading);
        let number = match content {
            Content::Blank => return Ok(None),
            Content::Number(number) => *number,
            Content::Text(text) => self.number_from_text(heading, text)?,
            Content::Date { .. } => {
                let remedy = "give the cell a plain number format and type the number again";
                return Err(self.odd(heading, content, remedy));
            }
            _ => return Err(self.odd(heading, content, "write a number")),
        };
        let Some((_, column, found)) = self.found(heading) else { return Ok(None) };
        let value = found.scale.apply(number);
        let accepted = match column.holds {
            Holds::Number(range) => range.contains(value),
            Holds::Above0(greatest) => value > 0.0 && value <= greatest,
            Holds::OneOf(values) => values.iter().any(|v| (v - value).abs() < 1e-9),
            _ => true,
        };
        if accepted {
            return Ok(Some(value));
        }
        let allowed = self.allowed(heading);
        Err(match &found.unit {
            Some(unit) => self.error(
                heading,
                format!(
                    "read {} {unit}, that is {value} {}; allowed {allowed}",
                    content.shown(),
                    column.unit
                ),
                "correct the number, or the unit in the heading",
            ),
            None => self.refuse(heading, &allowed, "correct the number"),
        })
    }

    fn number_from_text(&self, heading: &str, text: &str) -> Result<f64, Reported> {
        self.plain_number(heading, text).map_err(|unfit| {
            let allowed = unfit.allowed.map_or_else(|| self.allowed(heading), str::to_owned);
            self.refuse(heading, &allowed, unfit.remedy)
        })
    }

    /// A number from the text under a heading, with the column's share of what is said once.
    pub(crate) fn plain_number(&self, heading: &str, text: &str) -> Result<f64, Unfit> {
        let raw = self.table.raw;
        let (number, mark) = numbers::number(text, raw.decimal_comma)
            .map_err(|why| Unfit { allowed: None, remedy: why.remedy })?;
        if raw.sheet.is_some() {
            self.tally(&self.progress.text_numbers, heading, self.content(heading));
        }
        if raw.decimal_comma && mark != Mark::None {
            let before = self.progress.decimal_mark.replace(Some(mark));
            if before.is_some_and(|before| before != mark) {
                self.progress.decimal_mark.set(before);
                return Err(Unfit {
                    allowed: Some("one decimal mark in a file, and earlier numbers use the other one"),
                    remedy: "write all numbers with a decimal point or all with a decimal comma".to_owned(),
                });
            }
        }
        Ok(number)
    }

    /// One of the words of a column.
    pub(crate) fn word<T: Copy, const N: usize>(
        &self,
        heading: &str,
        words: &'static Words<T, N>,
    ) -> Field<T> {
        Ok(self.word_index(heading, &words.words)?.map(|index| words.mean[index]))
    }

    fn word_index(&self, heading: &str, words: &'static [&'static str]) -> Field<usize> {
        if !self.fits {
            return Err(Reported);
        }
        let content = self.content(heading);
        let text = match content {
            Content::Blank => return Ok(None),
            Content::Text(text) => text,
            _ => return Err(self.odd(heading, content, "write one of these words")),
        };
        match find_word(text, words) {
            Some(index) => Ok(Some(index)),
            None => {
                let near = self.nearest(text, words.iter().copied());
                Err(self.refuse(heading, &self.allowed(heading), format!("write one of these words{near}")))
            }
        }
    }

    fn tally(&self, tallies: &RefCell<BTreeMap<usize, Tally>>, heading: &str, content: &Content) {
        if let Some((index, _)) = self.column(heading) {
            let mut tallies = tallies.borrow_mut();
            let tally = tallies.entry(index).or_default();
            tally.count += 1;
            tally.first.get_or_insert_with(|| (self.raw.number, content.shown()));
        }
    }
}

/// What to say of a cell that holds neither a number nor a text where one is needed.
pub(crate) fn odd(content: &Content, allowed: &str, retype: &str) -> (String, String) {
    match content {
        Content::NoResult => (
            "the formula has no stored result".to_owned(),
            "open the book in a spreadsheet, let it compute, and save it; or write the value".to_owned(),
        ),
        Content::Merged { into } => (
            format!("the cell is merged with {into}, which alone holds a value"),
            "unmerge the cells and fill each one".to_owned(),
        ),
        Content::Fault(_) => (
            format!("read {}; allowed {allowed}", content.shown()),
            "correct its formula or write the value".to_owned(),
        ),
        _ => (format!("read {}; allowed {allowed}", content.shown()), retype.to_owned()),
    }
}

/// Index of the word that a text is, without regard to case, spaces and hyphens.
pub(crate) fn find_word(text: &str, words: &[&str]) -> Option<usize> {
    let plain = |text: &str| folded(text).replace(['-', '_'], "");
    let text = plain(text);
    words.iter().position(|word| plain(word) == text)
}

/// Free text from a cell; `Err(Some)` tells what is allowed and the remedy, `Err(None)` that it is no text.
pub(crate) fn free_text(content: &Content) -> Result<String, Option<(&'static str, &'static str)>> {
    match content {
        Content::Blank | Content::Merged { .. } => Ok(String::new()),
        Content::Text(text) if text.chars().count() > TEXT_CHARS => {
            Err(Some(("a text of up to 2000 characters", "shorten it")))
        }
        Content::Text(text) => {
            let text = text.trim().replace("\r\n", "\n");
            let odd =
                |c: char| (c.is_control() && c != '\n' && c != '\t') || matches!(c, '\u{fffe}' | '\u{ffff}');
            if text.contains(odd) {
                return Err(Some(("a text without control characters", "remove the control character")));
            }
            Ok(text)
        }
        Content::Number(number) => Ok(number_text(*number)),
        Content::Truth(truth) => Ok(if *truth { "TRUE" } else { "FALSE" }.to_owned()),
        Content::Date { day: Some(day), .. } => Ok(day.clone()),
        Content::Date { day: None, number } => Ok(number_text(*number)),
        Content::Fault(_) | Content::NoResult => Err(None),
    }
}

impl Progress {
    /// Says what is said once a column.
    pub(crate) fn finish(self, table: &Table<'_>, report: &Report) {
        let place = |index: usize, row: u32| {
            let found = table.columns[index].as_ref();
            table.raw.place(Some(row), found.map(|f| f.index), found.map(|f| f.printed.as_str()))
        };
        for (index, tally) in self.text_numbers.into_inner() {
            let Some((row, read)) = tally.first else { continue };
            report.note(
                place(index, row),
                format!(
                    "{} of the column stored as text, the first is {read}; read as numbers",
                    counted(tally.count, "number")
                ),
                "",
            );
        }
        for (index, tally) in self.number_marks.into_inner() {
            let Some((row, read)) = tally.first else { continue };
            report.note(
                place(index, row),
                format!(
                    "{} of the column stored as a number with decimals, the first is {read}; \
                     a mark typed as 1.10 arrives as 1.1",
                    counted(tally.count, "mark")
                ),
                "if a zero is lost, format the cell as text and type the mark again",
            );
        }
    }
}

fn counted(count: u32, what: &str) -> String {
    if count == 1 { format!("1 {what}") } else { format!("{count} {what}s") }
}
