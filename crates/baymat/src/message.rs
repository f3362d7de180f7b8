//! Messages: `error: PLACE: text; remedy`, one line each, whatever a book's cells hold.

use design_engine::query::Severity;
use schedule_io::book::PlacedQuery;

use crate::console::Paint;

/// One thing said to the user.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(crate) struct Message {
    severity: Severity,
    /// The line after the severity word.
    text: String,
}

impl Message {
    /// An error in words, place first.
    pub(crate) fn error(text: impl AsRef<str>) -> Message {
        Message { severity: Severity::Error, text: one_line(text.as_ref()) }
    }

    /// A query of a book, at its place or else at what it is about. Below an error the panel is named
    /// too: an engineer knows it by its mark, not by its row.
    pub(crate) fn query(placed: &PlacedQuery) -> Message {
        let severity = placed.query.severity;
        let said = placed.to_string();
        let said = said.strip_prefix(severity.word()).and_then(|s| s.strip_prefix(": ")).unwrap_or(&said);
        let mark =
            placed.query.panel_mark().filter(|_| severity != Severity::Error && placed.place.is_some());
        let text = mark.map_or_else(|| said.to_owned(), |mark| format!("panel {mark}, {said}"));
        Message { severity, text: one_line(&text) }
    }

    /// The line as it is printed.
    pub(crate) fn line(&self, paint: Paint) -> String {
        format!("{}: {}", paint.severity(self.severity), self.text)
    }
}

/// Text on one line and without control characters: a cell may hold anything, also what a terminal obeys.
pub(crate) fn one_line(text: &str) -> String {
    text.chars()
        .map(|c| match c {
            '\n' | '\r' | '\t' => ' ',
            c if c.is_control() => char::REPLACEMENT_CHARACTER,
            c => c,
        })
        .collect()
}

/// `1 error`, `2 errors`.
pub(crate) fn counted(count: usize, one: &str) -> String {
    if count == 1 { format!("1 {one}") } else { format!("{count} {one}s") }
}

#[cfg(test)]
mod tests {
    use super::*;
    use design_engine::query::{Query, Subject};
    use schedule_io::book::CellPlace;

    fn place() -> CellPlace {
        CellPlace {
            file: "panels.csv".into(),
            sheet: None,
            row: Some(4),
            column: Some(8),
            heading: Some("Imposed (kN/m2)".into()),
        }
    }

    #[test]
    fn a_query_is_said_with_its_place_and_its_remedy() {
        let query =
            Query::panel(Severity::Error, "S1", None, "read \"2,5x\"; allowed 0 to 50", "write a number");
        let line = Message::query(&PlacedQuery { query, place: Some(place()) }).line(Paint::plain());
        assert_eq!(
            line,
            "error: panels.csv row 4, Imposed (kN/m2): read \"2,5x\"; allowed 0 to 50; write a number"
        );
    }

    #[test]
    fn a_panel_that_is_not_designed_is_named_by_its_mark() {
        let query = Query::panel(Severity::NotDesigned, "S1", None, "the north edge is free", "");
        let line = Message::query(&PlacedQuery { query, place: Some(place()) }).line(Paint::plain());
        assert_eq!(line, "not designed: panel S1, panels.csv row 4, Imposed (kN/m2): the north edge is free");
    }

    #[test]
    fn a_query_without_a_place_names_what_it_is_about() {
        let query = Query::new(Severity::Note, Subject::Gridline("C".into()), "no panel uses it", "");
        let line = Message::query(&PlacedQuery { query, place: None }).line(Paint::plain());
        assert_eq!(line, "note: gridline C: no panel uses it");
    }

    #[test]
    fn a_cell_cannot_break_a_line_or_command_the_terminal() {
        let line = Message::error("panel A\nB\u{1b}[31m: unknown").line(Paint::plain());
        assert_eq!(line, "error: panel A B\u{fffd}[31m: unknown");
    }
}
