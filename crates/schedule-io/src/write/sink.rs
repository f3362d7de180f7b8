//! The one way to put rows on a sheet: each row below the last, each cell right of the last. So a sheet can be
//! streamed, where a cell written backwards would be lost without a word.

use rust_xlsxwriter::{Format, Formula, IgnoreError, Worksheet};

use super::WriteError;
use super::column::{Cell, Column, Head, Kind};
use super::look::{self, Tone};
use super::text;

/// Rows of a sheet, headings included.
const MOST_ROWS: u32 = 1_048_576;

/// A sheet that rows are appended to.
pub(super) struct RowSink<'w> {
    worksheet: &'w mut Worksheet,
    sheet: &'static str,
    columns: Vec<ColumnFormats>,
    next_row: u32,
    heading_rows: u32,
}

struct ColumnFormats {
    title: String,
    kind: Kind,
    width: f64,
    /// In the order of [`Tone::ALL`].
    by_tone: Vec<Format>,
}

impl<'w> RowSink<'w> {
    /// A sheet without headings.
    pub(super) fn plain(
        worksheet: &'w mut Worksheet,
        sheet: &'static str,
        heads: &[Head],
    ) -> Result<RowSink<'w>, WriteError> {
        worksheet.set_name(sheet)?;
        let mut columns = Vec::with_capacity(heads.len());
        for (index, head) in (0..).zip(heads) {
            let by_tone: Vec<Format> = Tone::ALL.map(|tone| look::cell(head.kind, tone)).into();
            worksheet.set_column_width(index, head.width)?;
            worksheet.set_column_format(index, &by_tone[Tone::Plain as usize])?;
            columns.push(ColumnFormats { title: head.title(), kind: head.kind, width: head.width, by_tone });
        }
        Ok(RowSink { worksheet, sheet, columns, next_row: 0, heading_rows: 0 })
    }

    /// A sheet with its headings in the first row, or in the second below their groups.
    pub(super) fn with_headings(
        worksheet: &'w mut Worksheet,
        sheet: &'static str,
        heads: &[Head],
        frozen_columns: u16,
    ) -> Result<RowSink<'w>, WriteError> {
        let mut sink = RowSink::plain(worksheet, sheet, heads)?;
        let opens = |index: usize| index > 0 && heads[index - 1].group != heads[index].group;
        if heads.iter().any(|head| !head.group.is_empty()) {
            for (column, (index, head)) in (0..).zip(heads.iter().enumerate()) {
                let group = if index == 0 || opens(index) { head.group } else { "" };
                let format = look::group(opens(index));
                sink.worksheet.write_string_with_format(sink.next_row, column, group, &format)?;
            }
            sink.next_row += 1;
        }
        for (column, (index, head)) in (0..).zip(heads.iter().enumerate()) {
            let format = look::heading(head.kind, opens(index));
            sink.worksheet.write_string_with_format(sink.next_row, column, head.title(), &format)?;
        }
        let lines = sink.columns.iter().map(|column| look::heading_lines(&column.title, column.width)).max();
        sink.worksheet.set_row_height(sink.next_row, look::row_height(lines.unwrap_or(1)))?;
        sink.next_row += 1;
        sink.heading_rows = sink.next_row;
        look::set_up_rows(sink.worksheet, sheet, sink.heading_rows, frozen_columns)?;
        Ok(sink)
    }

    /// Puts a row below the last.
    pub(super) fn append<'c>(
        &mut self,
        tone: Tone,
        cells: impl IntoIterator<Item = Cell<'c>>,
    ) -> Result<(), WriteError> {
        let row = self.next_row;
        if row >= MOST_ROWS {
            return Err(WriteError::TooManyRows { sheet: self.sheet, most: MOST_ROWS - self.heading_rows });
        }
        let mut lines = 1;
        for (index, cell) in (0..u16::MAX).zip(cells).take(self.columns.len()) {
            let column = &self.columns[usize::from(index)];
            if let (Cell::Text(text), Kind::Words) = (&cell, column.kind) {
                lines = lines.max(text::line_count(text, column.width));
            }
            self.put(row, index, tone, cell)?;
        }
        // Not every program finds the height of wrapped text by itself.
        if lines > 1 {
            self.worksheet.set_row_height(row, look::row_height(lines))?;
        }
        self.next_row += 1;
        Ok(())
    }

    fn put(&mut self, row: u32, index: u16, tone: Tone, cell: Cell<'_>) -> Result<(), WriteError> {
        let column = &self.columns[usize::from(index)];
        // A cell without a format of its own takes its column's.
        let format = (tone != Tone::Plain).then(|| &column.by_tone[tone as usize]);
        match (cell, format) {
            (Cell::Number(number), _) if !number.is_finite() => {
                let place = format!("sheet {} row {}, {}", self.sheet, row + 1, column.title);
                return Err(WriteError::NotFinite { place });
            }
            (Cell::Number(number), None) => self.worksheet.write_number(row, index, number)?,
            (Cell::Number(number), Some(format)) => {
                self.worksheet.write_number_with_format(row, index, number, format)?
            }
            (Cell::Text(text), None) if !text.is_empty() => {
                self.worksheet.write_string(row, index, text::for_cell(&text))?
            }
            (Cell::Text(text), Some(format)) if !text.is_empty() => {
                self.worksheet.write_string_with_format(row, index, text::for_cell(&text), format)?
            }
            (Cell::Formula(formula, result), format) => {
                let result = match *result {
                    Cell::Number(number) if number.is_finite() => number.to_string(),
                    Cell::Text(text) => text.into_owned(),
                    _ => {
                        let place = format!("sheet {} row {}, {}", self.sheet, row + 1, column.title);
                        return Err(WriteError::NotFinite { place });
                    }
                };
                let formula = Formula::new(formula).set_result(result);
                match format {
                    Some(format) => self.worksheet.write_formula_with_format(row, index, formula, format)?,
                    None => self.worksheet.write_formula(row, index, formula)?,
                }
            }
            (Cell::Text(_) | Cell::Blank, None) => return Ok(()),
            (Cell::Text(_) | Cell::Blank, Some(format)) => self.worksheet.write_blank(row, index, format)?,
        };
        Ok(())
    }

    /// The row that comes next, from 0.
    pub(super) fn next_row(&self) -> u32 {
        self.next_row
    }

    /// Ends the sheet: filters over its headings, no warnings for marks that look like numbers.
    pub(super) fn close(self) -> Result<&'w mut Worksheet, WriteError> {
        if self.next_row > self.heading_rows {
            let (first, last) = (self.heading_rows, self.next_row - 1);
            for (index, column) in (0..).zip(&self.columns) {
                if !matches!(column.kind, Kind::Number(_) | Kind::Figures) {
                    self.worksheet.ignore_error_range(
                        first,
                        index,
                        last,
                        index,
                        IgnoreError::NumberStoredAsText,
                    )?;
                }
            }
            let last_column = u16::try_from(self.columns.len()).unwrap_or(u16::MAX).saturating_sub(1);
            if self.heading_rows > 0 {
                self.worksheet.autofilter(first - 1, 0, last, last_column)?;
            }
        }
        Ok(self.worksheet)
    }
}

/// A sheet of rows: headings from its columns, then each row's values from the same columns.
pub(super) fn lay_down<'a, R>(
    worksheet: &mut Worksheet,
    sheet: &'static str,
    columns: &[Column<'a, R>],
    frozen_columns: u16,
    rows: impl Iterator<Item = (Tone, R)>,
) -> Result<(), WriteError> {
    let heads: Vec<Head> = columns.iter().map(|column| column.head.clone()).collect();
    let mut sink = RowSink::with_headings(worksheet, sheet, &heads, frozen_columns)?;
    for (tone, row) in rows {
        sink.append(tone, columns.iter().map(|column| (column.value)(&row)))?;
    }
    sink.close()?;
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_row_too_many_is_refused() {
        let mut worksheet = Worksheet::new();
        let mut sink = RowSink::plain(&mut worksheet, "Checks", &[]).unwrap();
        for _ in 0..MOST_ROWS {
            sink.append(Tone::Plain, []).unwrap();
        }
        let refusal = sink.append(Tone::Plain, []).unwrap_err();
        assert!(refusal.to_string().starts_with("sheet Checks: more than 1048576 rows"), "{refusal}");
    }
}
