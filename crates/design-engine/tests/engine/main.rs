//! Tests of the design engine: published values, second methods, what holds of whole floors, properties.

#![expect(clippy::unwrap_used, reason = "a fixture or floor that is not as it should be must fail its test")]

mod bars_and_depths;
mod checks_of_panels;
mod choice;
mod grid;
mod moved;
mod numbers;
mod printed;
mod properties;
mod published;
mod random;
mod second_method;
mod settings;
mod spans_and_actions;
mod supports_and_balancing;
