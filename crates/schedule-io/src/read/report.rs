//! Collecting everything there is to say about a book.

use std::cell::{Cell, RefCell};

use design_engine::query::{Query, Severity, Subject};

use crate::place::{CellPlace, PlacedQuery};

/// Comparisons spent on nearest names in one book, so that a book full of unknown names stays quick.
const NEAREST_COMPARISONS: usize = 500_000;

/// Queries found so far, in order of reading.
#[derive(Debug)]
pub(crate) struct Report {
    queries: RefCell<Vec<PlacedQuery>>,
    comparisons_left: Cell<usize>,
}

impl Report {
    pub(crate) fn new() -> Report {
        Report { queries: RefCell::new(Vec::new()), comparisons_left: Cell::new(NEAREST_COMPARISONS) }
    }

    pub(crate) fn say(
        &self,
        severity: Severity,
        subject: Subject,
        place: CellPlace,
        text: impl Into<String>,
        remedy: impl Into<String>,
    ) {
        let query = Query::new(severity, subject, text, remedy);
        self.queries.borrow_mut().push(PlacedQuery { query, place: Some(place) });
    }

    /// An error about a file or a sheet as a whole.
    pub(crate) fn error(&self, place: CellPlace, text: impl Into<String>, remedy: impl Into<String>) {
        self.say(Severity::Error, Subject::Floor, place, text, remedy);
    }

    /// A note about a file or a sheet as a whole.
    pub(crate) fn note(&self, place: CellPlace, text: impl Into<String>, remedy: impl Into<String>) {
        self.say(Severity::Note, Subject::Floor, place, text, remedy);
    }

    /// All queries, the gravest first, otherwise in order of reading.
    pub(crate) fn into_queries(self) -> Vec<PlacedQuery> {
        let mut queries = self.queries.into_inner();
        queries.sort_by_key(|placed| placed.query.severity);
        queries
    }

    /// ` NAME` of the known name nearest to what was read, as `; nearest is "NAME"`; empty where none is
    /// near, or where the book has used up its comparisons.
    pub(crate) fn nearest<'a>(&self, read: &str, known: impl Iterator<Item = &'a str>) -> String {
        match self.nearest_name(read, known) {
            Some(name) => format!("; nearest is \"{name}\""),
            None => String::new(),
        }
    }

    /// The known name nearest to what was read, if one is near.
    pub(crate) fn nearest_name<'a>(
        &self,
        read: &str,
        known: impl Iterator<Item = &'a str>,
    ) -> Option<&'a str> {
        let folded = read.to_lowercase();
        let length = folded.chars().count();
        if length > 100 {
            return None;
        }
        let most = (length / 3).max(1);
        let mut best: Option<(usize, &str)> = None;
        for name in known {
            let left = self.comparisons_left.get().checked_sub(1)?;
            self.comparisons_left.set(left);
            let distance = strsim::osa_distance(&folded, &name.to_lowercase());
            if distance <= most && best.is_none_or(|(least, _)| distance < least) {
                best = Some((distance, name));
            }
        }
        best.map(|(_, name)| name)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn nearest_name_is_the_one_with_fewest_changes() {
        let report = Report::new();
        assert_eq!(report.nearest("Beem", ["Wall", "Beam"].into_iter()), "; nearest is \"Beam\"");
        assert_eq!(
            report.nearest("Thicknes", ["Thickness", "Finishes"].into_iter()),
            "; nearest is \"Thickness\""
        );
        assert_eq!(report.nearest("Quite else", ["Wall", "Beam"].into_iter()), "");
    }

    #[test]
    fn a_book_full_of_unknown_names_stops_looking_for_near_ones() {
        let report = Report::new();
        let known: Vec<String> = (0..1000).map(|n| format!("S{n}")).collect();
        let found =
            (0..1000).filter(|_| report.nearest_name("S5x", known.iter().map(String::as_str)).is_some());
        assert_eq!(found.count(), 500);
    }
}
