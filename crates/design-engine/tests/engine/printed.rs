//! Published tables as data: `fixtures/published/*.csv`. Computed values are compared at the printed precision.

/// A table: its headings and its rows of cells.
pub(crate) struct Printed {
    headings: Vec<&'static str>,
    rows: Vec<Vec<&'static str>>,
}

/// One row of a [`Printed`].
#[derive(Clone, Copy)]
pub(crate) struct Row<'a> {
    table: &'a Printed,
    cells: &'a [&'static str],
}

/// A printed number: its value, the decimals it is printed to, and what the equation gives there where that
/// is known to deviate.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Number {
    pub(crate) value: f64,
    decimals: i32,
    deviation: Option<f64>,
}

impl Printed {
    /// Reads a fixture: `#` lines are passed over, the first other line holds the headings.
    pub(crate) fn new(csv: &'static str) -> Printed {
        let mut lines = csv.lines().filter(|line| !line.starts_with('#') && !line.trim().is_empty());
        let headings: Vec<&str> = lines.next().unwrap().split(',').collect();
        let rows: Vec<Vec<&str>> = lines.map(|line| line.split(',').collect()).collect();
        for row in &rows {
            assert_eq!(row.len(), headings.len(), "cells of {row:?}");
        }
        Printed { headings, rows }
    }

    pub(crate) fn rows(&self) -> impl Iterator<Item = Row<'_>> {
        self.rows.iter().map(|cells| Row { table: self, cells })
    }

    /// The headings that are numbers, as the table's second argument.
    pub(crate) fn numeric_headings(&self) -> impl Iterator<Item = (&'static str, f64)> {
        self.headings.iter().filter_map(|heading| Some((*heading, heading.parse().ok()?)))
    }
}

impl Row<'_> {
    pub(crate) fn text(&self, heading: &str) -> &'static str {
        let column = self.table.headings.iter().position(|known| *known == heading);
        self.cells[column.unwrap_or_else(|| panic!("no column {heading}"))]
    }

    /// A printed number; none where the cell is blank.
    pub(crate) fn number(&self, heading: &str) -> Option<Number> {
        let text = self.text(heading);
        let (printed, computed) = text.split_once('|').map_or((text, None), |(a, b)| (a, Some(b)));
        let decimals = printed.split_once('.').map_or(0, |(_, digits)| digits.len());
        Some(Number {
            value: printed.parse().ok()?,
            decimals: i32::try_from(decimals).unwrap(),
            deviation: computed.map(|text| text.parse().unwrap()),
        })
    }

    pub(crate) fn value(&self, heading: &str) -> f64 {
        self.number(heading).unwrap_or_else(|| panic!("no number in column {heading}")).value
    }
}

impl Number {
    /// Nothing where a computed value rounds (half up, to the printed decimals) to what is printed, or to the
    /// deviation that is recorded; else what differs.
    pub(crate) fn against(self, computed: f64) -> Option<String> {
        let expected = self.deviation.unwrap_or(self.value);
        let rounded = half_up(computed, self.decimals);
        let same = (rounded - expected).abs() < 1e-6;
        (!same).then(|| format!("printed {}, expected {expected}, computed {computed:.5}", self.value))
    }
}

/// Rounds half up, as printed tables are. The small term takes up what binary fractions lose.
pub(crate) fn half_up(value: f64, decimals: i32) -> f64 {
    let scale = 10_f64.powi(decimals);
    (value * scale + 0.5 + 1e-9).floor() / scale
}

/// Fails with the whole list where any cell differs.
pub(crate) fn none_differ(differing: &[String]) {
    assert!(differing.is_empty(), "{} differ:\n{}", differing.len(), differing.join("\n"));
}
