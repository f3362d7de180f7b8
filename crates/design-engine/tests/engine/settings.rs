//! Criteria for the tests.

use design_engine::criteria::{Criteria, Value};

/// Criteria with some settings other than the defaults.
pub(crate) fn criteria(values: &[(&str, Value)]) -> Criteria {
    Criteria::new(values).unwrap()
}

pub(crate) fn number(number: f64) -> Value {
    Value::Number(number)
}

pub(crate) fn numbers(list: &[f64]) -> Value {
    Value::Numbers(list.to_vec())
}

pub(crate) fn word(word: &str) -> Value {
    Value::Text(word.to_owned())
}
