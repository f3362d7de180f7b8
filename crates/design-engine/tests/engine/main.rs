//! Tests of the design engine: published values, second methods, what holds of whole floors, properties.

#![expect(clippy::unwrap_used, reason = "a fixture or floor that is not as it should be must fail its test")]

mod bars_and_depths;
mod checks_of_panels;
mod grid;
mod numbers;
mod printed;
mod published;
mod scratch;
mod second_method;
mod settings;
