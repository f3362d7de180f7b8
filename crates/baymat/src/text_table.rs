//! Aligned tables of plain text.

use crate::message::one_line;

/// How a column's cells stand.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Align {
    /// Words.
    Left,
    /// Numbers.
    Right,
}

/// A table that is printed with two spaces between its columns.
pub(crate) struct TextTable {
    columns: Vec<(&'static str, Align)>,
    rows: Vec<Vec<String>>,
}

impl TextTable {
    /// A table with these headings; a table whose headings are all empty prints none.
    pub(crate) fn new(columns: &[(&'static str, Align)]) -> TextTable {
        TextTable { columns: columns.to_vec(), rows: Vec::new() }
    }

    /// Adds a row; cells that are missing are blank.
    pub(crate) fn row(&mut self, cells: impl IntoIterator<Item = String>) {
        self.rows.push(cells.into_iter().map(|cell| one_line(&cell)).collect());
    }

    /// The lines, each indented by two spaces.
    pub(crate) fn lines(&self) -> Vec<String> {
        let headings: Vec<String> = self.columns.iter().map(|(heading, _)| (*heading).to_owned()).collect();
        let headed = headings.iter().any(|heading| !heading.is_empty());
        let all: Vec<&Vec<String>> = headed.then_some(&headings).into_iter().chain(&self.rows).collect();
        let widths: Vec<usize> = (0..self.columns.len())
            .map(|i| all.iter().filter_map(|row| row.get(i)).map(|cell| width(cell)).max().unwrap_or(0))
            .collect();
        all.iter().map(|row| self.line(row, &widths)).collect()
    }

    fn line(&self, row: &[String], widths: &[usize]) -> String {
        let mut line = String::new();
        for ((cell, (_, align)), &wide) in row.iter().zip(&self.columns).zip(widths) {
            let blank = " ".repeat(wide - width(cell));
            line.push_str("  ");
            match align {
                Align::Left => line.extend([cell.as_str(), &blank]),
                Align::Right => line.extend([blank.as_str(), cell]),
            }
        }
        line.trim_end().to_owned()
    }
}

fn width(cell: &str) -> usize {
    cell.chars().count()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn words_stand_left_and_numbers_right() {
        let mut table =
            TextTable::new(&[("Panel", Align::Left), ("Ratio", Align::Right), ("At", Align::Left)]);
        table.row(["Süd-1".into(), "0.9".into(), "short midspan".into()]);
        table.row(["A".into(), "10.25".into()]);
        assert_eq!(table.lines(), ["  Panel  Ratio  At", "  Süd-1    0.9  short midspan", "  A      10.25"]);
    }

    #[test]
    fn a_table_without_headings_has_only_rows() {
        let mut table = TextTable::new(&[("", Align::Left)]);
        table.row(["north\nedge".into()]);
        assert_eq!(table.lines(), ["  north edge"]);
    }
}
