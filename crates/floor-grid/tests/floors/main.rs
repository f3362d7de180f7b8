//! Tests of whole floors: drawn ones, random ones, large ones.

#![expect(clippy::unwrap_used, reason = "a fixture or floor that is not as it should be must fail its test")]
#![expect(clippy::float_cmp, reason = "widths, spans and bar sizes pass through unchanged")]

mod drawing;
mod large;
mod plans;
mod properties;
mod random;
mod rows;
mod rules;
