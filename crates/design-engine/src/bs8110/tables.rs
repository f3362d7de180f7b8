//! The printed tables as data: `tables/*.csv`, each with its source, read once.

/// Ratios ly/lx printed at the head of Tables 3.13, 3.14 and 3.15.
pub const PRINTED_RATIOS: [f64; 8] = [1.0, 1.1, 1.2, 1.3, 1.4, 1.5, 1.75, 2.0];

/// The data rows of a table: comment lines and the heading row are passed over.
pub(crate) fn rows(csv: &'static str) -> impl Iterator<Item = Vec<&'static str>> {
    csv.lines()
        .filter(|line| !line.starts_with('#') && !line.trim().is_empty())
        .skip(1)
        .map(|line| line.split(',').collect())
}

/// A cell; blank is none.
pub(crate) fn cell(text: &str) -> Option<f64> {
    text.parse().ok()
}

/// Eight cells from `first` on, one per printed ratio, or none where they are blank.
pub(crate) fn by_ratio(row: &[&str], first: usize) -> Option<[f64; 8]> {
    let mut values = [0.0; 8];
    for (i, value) in values.iter_mut().enumerate() {
        *value = cell(row.get(first + i)?)?;
    }
    Some(values)
}

/// Linear interpolation between printed ratios; `ratio` from 1 to 2, clamped there.
pub(crate) fn interpolate(values: &[f64; 8], ratio: f64) -> f64 {
    let ratio = ratio.clamp(1.0, 2.0);
    let upper = PRINTED_RATIOS.iter().position(|r| ratio <= *r).unwrap_or(7).max(1);
    let (r0, r1) = (PRINTED_RATIOS[upper - 1], PRINTED_RATIOS[upper]);
    values[upper - 1] + (values[upper] - values[upper - 1]) * (ratio - r0) / (r1 - r0)
}
