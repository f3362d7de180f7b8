//! MAIN PATH of reading: a floor book, `.xlsx` or a folder of CSV files, to a [`Book`].

use std::path::{Path, PathBuf};

use crate::book::{Book, PlacedQuery};

/// What reading gives: the book, unless it has errors, and everything there is to say about it.
#[derive(Debug, Clone)]
pub struct Reading {
    /// The book; none where any query is an error.
    pub book: Option<Book>,
    /// All queries, errors first.
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
    let _ = path;
    Ok(Reading { book: None, queries: Vec::new() })
}
