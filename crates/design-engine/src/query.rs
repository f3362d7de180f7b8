//! What the program has to say about a floor: faults, panels left undesigned, warnings, notes.

use crate::floor::Side;

/// How much a query weighs. The order is the order of printing.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Severity {
    /// The book is wrong: nothing is designed and nothing is written.
    Error,
    /// One panel is outside what is designed; its row says so and the floor goes on.
    NotDesigned,
    /// Designed, but an engineer must look at it.
    Warning,
    /// Said for the record.
    Note,
}

impl Severity {
    /// The word printed for it.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Severity::Error => "error",
            Severity::NotDesigned => "not designed",
            Severity::Warning => "warning",
            Severity::Note => "note",
        }
    }
}

/// What a query is about. Only `schedule-io` turns it into a file, sheet and cell.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
pub enum Subject {
    /// The floor or the book as a whole.
    Floor,
    /// An item of the `Criteria` sheet, by its name there.
    Setting(&'static str),
    /// A panel, by its mark; `column` is the heading of the cell at fault, or none for the row.
    Panel {
        /// The panel's mark.
        mark: String,
        /// Heading of the column, as `floor-book.md` prints it without the unit.
        column: Option<&'static str>,
    },
    /// One edge of a panel.
    Edge {
        /// The panel's mark.
        mark: String,
        /// Which edge.
        side: Side,
    },
    /// A support, by its name such as `B/1-2`.
    Support(String),
    /// A gridline, by its name.
    Gridline(String),
    /// A row of another sheet: the sheet's name and the row's number among its data rows, from 0.
    Row {
        /// Sheet name as `floor-book.md` prints it.
        sheet: &'static str,
        /// Index of the data row, from 0.
        index: usize,
    },
}

/// One thing to say: how serious, about what, in words, and what to do about it.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Query {
    /// How much it weighs.
    pub severity: Severity,
    /// What it is about.
    pub subject: Subject,
    /// What is the matter, as a sentence without its full stop.
    pub text: String,
    /// What to do about it; empty where nothing needs doing.
    pub remedy: String,
}

impl Query {
    /// A query about anything.
    pub fn new(
        severity: Severity,
        subject: Subject,
        text: impl Into<String>,
        remedy: impl Into<String>,
    ) -> Self {
        Query { severity, subject, text: text.into(), remedy: remedy.into() }
    }

    /// A query about a panel's row.
    pub fn panel(
        severity: Severity,
        mark: &str,
        column: Option<&'static str>,
        text: impl Into<String>,
        remedy: impl Into<String>,
    ) -> Self {
        Query::new(severity, Subject::Panel { mark: mark.to_owned(), column }, text, remedy)
    }

    /// The mark of the panel it is about, if it is about one.
    #[must_use]
    pub fn panel_mark(&self) -> Option<&str> {
        match &self.subject {
            Subject::Panel { mark, .. } | Subject::Edge { mark, .. } => Some(mark),
            _ => None,
        }
    }
}
