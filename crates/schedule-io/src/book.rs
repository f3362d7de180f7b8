//! A floor book as read: criteria, layout, and where everything stood.

use design_engine::criteria::Criteria;
use design_engine::query::Query;
use floor_grid::layout::Layout;

pub use crate::place::{CellPlace, PlacedQuery, Places};

/// A setting that was blank or absent and took its default.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct DefaultUsed {
    /// The setting's key.
    pub key: &'static str,
}

/// A floor book as read.
#[derive(Debug, Clone)]
pub struct Book {
    /// Name of the book's file or folder, without its path.
    pub name: String,
    /// The criteria.
    pub criteria: Criteria,
    /// Settings that took their default, in the order of the table of settings; a setting whose default
    /// is blank is not among them.
    pub defaults_used: Vec<DefaultUsed>,
    /// The layout, blanks filled from the criteria.
    pub layout: Layout,
    /// Notes and warnings of the reading itself.
    pub queries: Vec<PlacedQuery>,
    /// Places of subjects: the row of each panel, each column of it, each setting, each sheet row.
    pub places: Places,
}

impl Book {
    /// A query with its place in this book.
    #[must_use]
    pub fn placed(&self, query: Query) -> PlacedQuery {
        let place = self.places.place(&query.subject);
        PlacedQuery { query, place }
    }
}
