//! Test crate.
