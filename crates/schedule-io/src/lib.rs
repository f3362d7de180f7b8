//! Floor books in, schedule workbooks and results files out.
pub mod atomic;
pub mod book;
pub mod read;
pub mod starter;
pub mod write;
