//! Floor books in, schedule workbooks and results files out.
pub mod atomic;
pub mod book;
pub mod limits;
mod place;
pub mod read;
pub mod sheets;
pub mod starter;
pub mod write;
