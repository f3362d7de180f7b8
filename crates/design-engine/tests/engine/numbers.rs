//! Comparing numbers.

/// Fails where two numbers differ by more than a tolerance.
#[track_caller]
pub(crate) fn close(computed: f64, expected: f64, tolerance: f64) {
    assert!((computed - expected).abs() <= tolerance, "computed {computed}, expected {expected}");
}

/// Fails where two numbers differ by more than a billionth of the larger.
#[track_caller]
pub(crate) fn same(computed: f64, expected: f64) {
    close(computed, expected, 1e-9 * computed.abs().max(expected.abs()));
}
