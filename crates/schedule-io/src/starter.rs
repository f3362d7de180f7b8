//! The starter floor book.

use crate::write::WriteError;

/// A starter floor book as `.xlsx` bytes.
///
/// # Errors
/// See [`WriteError`].
pub fn starter_book() -> Result<Vec<u8>, WriteError> {
    Ok(Vec::new())
}
