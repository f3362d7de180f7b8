//! Reading floor books: what is refused and in which words, and that both forms give the same book.
#![expect(clippy::unwrap_used, reason = "a test that cannot set up its book fails")]

mod anything;
mod both_forms;
mod opening;
mod places;
mod support;
mod tables;
mod workbooks;
