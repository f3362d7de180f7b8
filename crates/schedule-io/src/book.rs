//! A floor book as read: criteria, layout, and where everything stood.

use std::collections::BTreeMap;

use design_engine::criteria::Criteria;
use design_engine::query::{Query, Subject};
use floor_grid::layout::Layout;

/// Where something stands in a floor book. Printed as `panels.csv row 4, Imposed (kN/m2)` or
/// `book.xlsx sheet Panels cell I4, Imposed (kN/m2)`.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
pub struct CellPlace {
    /// File name without its path.
    pub file: String,
    /// Sheet name; none for a CSV file.
    pub sheet: Option<String>,
    /// Row from 1, as the spreadsheet shows it; none for the sheet as a whole.
    pub row: Option<u32>,
    /// Column from 0; none for the row as a whole.
    pub column: Option<u32>,
    /// Heading of the column as the book prints it.
    pub heading: Option<String>,
}

/// A query with its place in the book, where it has one.
#[derive(Debug, Clone, PartialEq)]
pub struct PlacedQuery {
    /// What is said.
    pub query: Query,
    /// Where it stands.
    pub place: Option<CellPlace>,
}

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
    /// Keys of the settings that took their default.
    pub defaults_used: Vec<DefaultUsed>,
    /// The layout, blanks filled from the criteria.
    pub layout: Layout,
    /// Notes and warnings of the reading itself.
    pub queries: Vec<PlacedQuery>,
    /// Places of subjects: the row of each panel, each column of it, each setting, each sheet row.
    pub places: Places,
}

/// Turns subjects into places in the book.
#[derive(Debug, Clone, Default)]
pub struct Places {
    pub(crate) by_subject: BTreeMap<Subject, CellPlace>,
}
