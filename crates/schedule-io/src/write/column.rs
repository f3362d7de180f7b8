//! The columns of a sheet as data: heading, unit, width, number format, meaning, and where its value comes from.

use std::borrow::Cow;

use super::words;

/// What stands in a cell.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum Cell<'a> {
    Blank,
    Number(f64),
    Text(Cow<'a, str>),
    /// A live formula with the value that the design has for it.
    Formula(String, Box<Cell<'a>>),
}

impl From<f64> for Cell<'_> {
    fn from(number: f64) -> Self {
        Cell::Number(number)
    }
}

impl<'a> From<&'a str> for Cell<'a> {
    fn from(text: &'a str) -> Self {
        Cell::Text(Cow::Borrowed(text))
    }
}

impl From<String> for Cell<'_> {
    fn from(text: String) -> Self {
        Cell::Text(Cow::Owned(text))
    }
}

impl<'a, T: Into<Cell<'a>>> From<Option<T>> for Cell<'a> {
    fn from(value: Option<T>) -> Self {
        value.map_or(Cell::Blank, Into::into)
    }
}

/// How a column is printed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Kind {
    /// Text or a number as it comes, flowing over empty cells right of it.
    Free,
    /// Marks, names and words, broken into lines.
    Words,
    /// Words in the middle of a narrow column.
    Short,
    /// A number with so many decimals.
    Number(u8),
    /// A number of any magnitude, to about four figures.
    Figures,
}

/// A column without its values.
#[derive(Debug, Clone)]
pub(super) struct Head {
    /// Heading over several columns; empty where there is none.
    pub(super) group: &'static str,
    pub(super) heading: &'static str,
    pub(super) unit: &'static str,
    /// In widths of a digit.
    pub(super) width: f64,
    pub(super) kind: Kind,
    /// Where the value stands in the results file, within the row's object; empty where it does not.
    pub(super) key: Cow<'static, str>,
    pub(super) meaning: Cow<'static, str>,
}

impl Head {
    /// The heading with its unit.
    pub(super) fn title(&self) -> String {
        if self.unit.is_empty() {
            self.heading.to_owned()
        } else {
            format!("{} ({})", self.heading, words::unit(self.unit))
        }
    }
}

/// A column whose rows are made from `R`.
pub(super) struct Column<'a, R> {
    pub(super) head: Head,
    pub(super) value: Box<dyn Fn(&R) -> Cell<'a> + 'a>,
}

impl<'a, R> Column<'a, R> {
    fn new<C: Into<Cell<'a>>>(
        heading: &'static str,
        kind: Kind,
        width: f64,
        value: impl Fn(&R) -> C + 'a,
    ) -> Self {
        let head = Head {
            group: "",
            heading,
            unit: "",
            width,
            kind,
            key: Cow::Borrowed(""),
            meaning: Cow::Borrowed(""),
        };
        Column { head, value: Box::new(move |row| value(row).into()) }
    }

    /// A column of whatever the cover needs.
    pub(super) fn free<C: Into<Cell<'a>>>(heading: &'static str, value: impl Fn(&R) -> C + 'a) -> Self {
        Column::new(heading, Kind::Free, 9.0, value)
    }

    /// A column of marks and names.
    pub(super) fn mark<C: Into<Cell<'a>>>(heading: &'static str, value: impl Fn(&R) -> C + 'a) -> Self {
        Column::new(heading, Kind::Words, 9.0, value)
    }

    /// A column of words.
    pub(super) fn words<C: Into<Cell<'a>>>(
        heading: &'static str,
        width: f64,
        value: impl Fn(&R) -> C + 'a,
    ) -> Self {
        Column::new(heading, Kind::Words, width, value)
    }

    /// A narrow column of words.
    pub(super) fn short<C: Into<Cell<'a>>>(
        heading: &'static str,
        width: f64,
        value: impl Fn(&R) -> C + 'a,
    ) -> Self {
        Column::new(heading, Kind::Short, width, value)
    }

    /// A column of numbers with so many decimals.
    pub(super) fn number<C: Into<Cell<'a>>>(
        heading: &'static str,
        unit: &'static str,
        decimals: u8,
        value: impl Fn(&R) -> C + 'a,
    ) -> Self {
        let mut column = Column::new(heading, Kind::Number(decimals), 7.2, value);
        column.head.unit = unit;
        column
    }

    /// A column of numbers whose magnitudes differ from row to row.
    pub(super) fn figures<C: Into<Cell<'a>>>(heading: &'static str, value: impl Fn(&R) -> C + 'a) -> Self {
        Column::new(heading, Kind::Figures, 11.0, value)
    }

    /// Sets the width, in digits.
    pub(super) fn wide(mut self, width: f64) -> Self {
        self.head.width = width;
        self
    }

    /// Says where the value stands in the results file.
    pub(super) fn key(mut self, key: impl Into<Cow<'static, str>>) -> Self {
        self.head.key = key.into();
        self
    }

    /// Says what the column holds, for the documentation.
    pub(super) fn means(mut self, meaning: impl Into<Cow<'static, str>>) -> Self {
        self.head.meaning = meaning.into();
        self
    }

    /// Puts columns under one group heading.
    pub(super) fn group(group: &'static str, columns: Vec<Self>) -> Vec<Self> {
        let grouped = |mut column: Self| {
            column.head.group = group;
            column
        };
        columns.into_iter().map(grouped).collect()
    }
}

/// A column of a sheet, as the documentation describes it.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct ColumnDescription {
    /// Heading over several columns; empty where there is none.
    pub group: &'static str,
    /// Heading with its unit.
    pub heading: String,
    /// What it holds.
    pub meaning: String,
    /// Where the same value stands in the results file, within the row's object; empty where it does not.
    pub results_key: String,
}

impl From<&Head> for ColumnDescription {
    fn from(head: &Head) -> Self {
        ColumnDescription {
            group: head.group,
            heading: head.title(),
            meaning: head.meaning.to_string(),
            results_key: head.key.to_string(),
        }
    }
}
