//! The starter floor book: every sheet with its headings, drop-down lists and input notes, the criteria with
//! their defaults beside them, and two sample panels to overwrite.

use design_engine::criteria::{Allowed, SETTINGS, Setting, Value};
use rust_xlsxwriter::{
    Color, DataValidation, DataValidationErrorStyle, DataValidationRule, DocProperties, ExcelDateTime,
    Format, FormatAlign, FormatBorder, Formula, Workbook, Worksheet, XlsxError,
};

use crate::sheets::{CRITERIA, Column, GRIDLINES, Holds, PANELS, READ_ME, SHEETS, Sheet};
use crate::write::WriteError;

/// Row of the headings, from 0: a line about the sheet stands above them.
const HEADINGS: u32 = 1;
/// Last row, from 0, that has drop-down lists and input notes.
const LAST_ROW: u32 = 1000;
/// A list in a data validation holds at most 255 characters.
const LONGEST_LIST: usize = 255;
const SAMPLE: &str = "sample: overwrite";

const DARK: Color = Color::RGB(0x0040_4040);
const LIGHT: Color = Color::RGB(0x00E4_E4E4);
const A4: u8 = 9;

const READ_ME_LINES: &[(&str, bool)] = &[
    ("Floor book", true),
    (
        "A floor book describes one floor: its criteria, gridlines and slab panels. The schedule is made from it.",
        false,
    ),
    ("", false),
    ("How to fill it", true),
    (
        "1. Criteria: fill in the values that differ from the defaults named beside them; the schedule says which were left.",
        false,
    ),
    (
        "2. Gridlines: overwrite the sample with your own. X lines stand at an x and run north; Y lines stand at a y and run east.",
        false,
    ),
    (
        "3. Panels: one row is one rectangle between two X gridlines and two Y gridlines. Overwrite the two sample rows.",
        false,
    ),
    (
        "4. Supports, Joints, Openings, Wall loads, Chosen bars: only where the floor has them. A sheet may stay empty or be deleted.",
        false,
    ),
    (
        "5. Loose panels: for a list of panels without gridlines; Panels and Gridlines may then stay empty.",
        false,
    ),
    ("", false),
    ("What to know", true),
    (
        "Headings on dark must be filled in every row; headings on light may stay blank. Select a cell to see what it takes.",
        false,
    ),
    ("Plan: x runs east, y runs north. Short and long span are found from the plan, never asked.", false),
    ("Units stand in brackets in the headings. Write numbers alone, without units.", false),
    (
        "Columns and sheets may be added: they are named in a note and not used. Rows above the headings are not read.",
        false,
    ),
    ("", false),
    ("Caution", true),
    (
        "Results are for review by a qualified engineer before use. Local codes, national rules and licensed practice govern.",
        false,
    ),
    ("No warranty of any kind is given.", false),
];

/// A value as the starter and the documents print it.
pub(crate) fn value_text(value: &Value) -> String {
    match value {
        Value::Blank => String::new(),
        Value::Number(number) => number.to_string(),
        Value::Numbers(list) => list.iter().map(f64::to_string).collect::<Vec<_>>().join(", "),
        Value::Text(text) => text.clone(),
    }
}

/// A starter floor book as `.xlsx` bytes; the same bytes each time.
///
/// # Errors
/// Where the workbook writer refuses; see [`WriteError`].
pub fn starter_book() -> Result<Vec<u8>, WriteError> {
    let mut book = Workbook::new();
    let properties = DocProperties::new()
        .set_title("Floor book")
        .set_creation_datetime(&ExcelDateTime::from_ymd(2000, 1, 1)?);
    book.set_properties(&properties);
    read_me(book.add_worksheet())?;
    for spec in SHEETS {
        let sheet = book.add_worksheet();
        frame(sheet, spec)?;
        if spec.name == CRITERIA.name {
            criteria(sheet)?;
        } else {
            columns(sheet, spec)?;
            samples(sheet, spec)?;
        }
    }
    Ok(book.save_to_buffer()?)
}

fn read_me(sheet: &mut Worksheet) -> Result<(), XlsxError> {
    sheet.set_name(READ_ME)?.set_screen_gridlines(false).set_column_width(0, 110)?;
    set_up_page(sheet);
    let plain = Format::new().set_text_wrap().set_align(FormatAlign::Top);
    let title = Format::new().set_bold().set_font_size(13).set_font_color(DARK);
    for (row, (line, is_title)) in (0..).zip(READ_ME_LINES) {
        sheet.write_string_with_format(row, 0, *line, if *is_title { &title } else { &plain })?;
    }
    Ok(())
}

fn set_up_page(sheet: &mut Worksheet) {
    sheet
        .set_landscape()
        .set_paper_size(A4)
        .set_print_fit_to_pages(1, 0)
        .set_margins(0.4, 0.4, 0.5, 0.5, 0.3, 0.3);
}

/// Name, line about the sheet, headings, widths, print set-up.
fn frame(sheet: &mut Worksheet, spec: &Sheet) -> Result<(), XlsxError> {
    sheet.set_name(spec.name)?.set_freeze_panes(HEADINGS + 1, u16::from(spec.columns[0].required))?;
    sheet.set_repeat_rows(HEADINGS, HEADINGS)?.set_print_gridlines(true);
    set_up_page(sheet);
    let about = Format::new().set_italic().set_font_color(DARK);
    let sample = if [GRIDLINES.name, PANELS.name].contains(&spec.name) {
        " These rows are a sample: overwrite them."
    } else {
        ""
    };
    sheet.write_string_with_format(0, 0, format!("One row is {}.{sample}", spec.about), &about)?;
    sheet.set_row_height(HEADINGS, 32)?;
    let heading = Format::new()
        .set_bold()
        .set_text_wrap()
        .set_align(FormatAlign::VerticalCenter)
        .set_border_bottom(FormatBorder::Thin)
        .set_border_bottom_color(DARK);
    let must = heading.clone().set_background_color(DARK).set_font_color(Color::White);
    let may = heading.set_background_color(LIGHT);
    for (index, column) in (0..).zip(spec.columns) {
        let format = if column.every_row() { &must } else { &may };
        let format = if is_number(column) {
            &format.clone().set_align(FormatAlign::Right).set_indent(1)
        } else {
            format
        };
        sheet.write_string_with_format(HEADINGS, index, column.title(), format)?;
        sheet.set_column_width(index, width(column))?;
        if let Some(format) = column_format(column) {
            sheet.set_column_format(index, &format)?;
        }
    }
    Ok(())
}

fn is_number(column: &Column) -> bool {
    matches!(column.holds, Holds::Number(_) | Holds::Above0(_) | Holds::OneOf(_))
}

fn width(column: &Column) -> f64 {
    match column.holds {
        Holds::Text if column.heading == "Unit" => 12.0,
        Holds::Text => 36.0,
        Holds::ItemValue => 26.0,
        Holds::Name if column.heading == "Item" => 24.0,
        Holds::Words(words) => words
            .iter()
            .map(|word| word.len())
            .max()
            .map_or(8.0, |most| f64::from(u32::try_from(most.max(6)).unwrap_or(6)) + 2.0),
        Holds::Gridline(_) => 8.5,
        _ => 11.5,
    }
}

/// Marks and names are text: a spreadsheet makes a date of 1-2 and 1.1 of 1.10 otherwise.
fn column_format(column: &Column) -> Option<Format> {
    let is_name = matches!(column.holds, Holds::Name | Holds::Mark | Holds::Gridline(_));
    is_name.then(|| Format::new().set_num_format("@"))
}

/// Drop-down lists and input notes of a sheet's columns.
fn columns(sheet: &mut Worksheet, spec: &Sheet) -> Result<(), XlsxError> {
    for (index, column) in (0..).zip(spec.columns) {
        let rule = match column.holds {
            Holds::Words(words) => list(words)?,
            Holds::OneOf(values) => list(&values.iter().map(f64::to_string).collect::<Vec<_>>())?,
            Holds::Number(range) => decimal(range.least, range.greatest),
            Holds::Above0(greatest) => decimal(0.0, greatest),
            Holds::Gridline(_) => {
                let names = format!("={}!$A${}:$A${}", GRIDLINES.name, HEADINGS + 2, LAST_ROW + 1);
                DataValidation::new().allow_list_formula(Formula::new(names))
            }
            Holds::Name | Holds::Mark | Holds::Text | Holds::ItemValue => {
                DataValidation::new().allow_any_value()
            }
        };
        let must = if column.every_row() { "must be filled" } else { "may stay blank" };
        let note =
            [must, column.note].into_iter().filter(|part| !part.is_empty()).collect::<Vec<_>>().join("; ");
        let rule = noted(rule, &column.title(), &column.holds.describe(), &note)?;
        sheet.add_data_validation(HEADINGS + 1, index, LAST_ROW, index, &rule)?;
    }
    Ok(())
}

fn list(values: &[impl AsRef<str>]) -> Result<DataValidation, XlsxError> {
    let values: Vec<&str> = values.iter().map(AsRef::as_ref).collect();
    if values.join(",").len() > LONGEST_LIST {
        return Ok(DataValidation::new().allow_any_value());
    }
    DataValidation::new().allow_list_strings(&values)
}

fn decimal(least: f64, greatest: f64) -> DataValidation {
    DataValidation::new().allow_decimal_number(DataValidationRule::Between(least, greatest))
}

/// Shows title, what is allowed and a note beside the selected cell; a value outside is asked about.
fn noted(rule: DataValidation, title: &str, allowed: &str, note: &str) -> Result<DataValidation, XlsxError> {
    let short = |text: &str, most: usize| text.chars().take(most).collect::<String>();
    let message = if note.is_empty() { allowed.to_owned() } else { format!("{allowed}\n{note}") };
    rule.set_input_title(short(title, 32))?
        .set_input_message(short(&message, 255))?
        .set_error_title("Outside what is allowed")?
        .set_error_message(short(&format!("Allowed: {allowed}"), 225))
        .map(|rule| rule.set_error_style(DataValidationErrorStyle::Warning))
}

/// The items of the criteria, blank: the default and the meaning as remark. What is filled in is then stated, and the
/// cover tells it from what was left at its default.
fn criteria(sheet: &mut Worksheet) -> Result<(), XlsxError> {
    let text = Format::new().set_num_format("@").set_align(FormatAlign::Left);
    let number = Format::new().set_align(FormatAlign::Left);
    let date = Format::new().set_num_format("yyyy-mm-dd").set_align(FormatAlign::Left);
    sheet.set_column_width(3, 90)?;
    for (row, setting) in (HEADINGS + 1..).zip(SETTINGS) {
        sheet.write_string(row, 0, setting.item)?;
        match setting.allowed {
            Allowed::Date => sheet.write_blank(row, 1, &date)?,
            Allowed::Number(_) | Allowed::OneOf(_) => sheet.write_blank(row, 1, &number)?,
            _ => sheet.write_blank(row, 1, &text)?,
        };
        sheet.write_string(row, 2, setting.unit)?;
        sheet.write_string(row, 3, remark(setting))?;
        let rule = noted(item_rule(setting)?, setting.item, &setting.allowed.describe(), setting.meaning)?;
        sheet.add_data_validation(row, 1, row, 1, &rule)?;
    }
    Ok(())
}

/// What the starter says of an item: its default, where it has one, and its meaning.
fn remark(setting: &Setting) -> String {
    // The defaults of these follow from fy, which the meaning says.
    let follows = ["steel_partial_factor", "bar_type_letter"].contains(&setting.key);
    match setting.default_value() {
        Value::Blank => setting.meaning.to_owned(),
        _ if follows => setting.meaning.to_owned(),
        value => format!("default {}; {}", value_text(&value), setting.meaning),
    }
}

fn item_rule(setting: &Setting) -> Result<DataValidation, XlsxError> {
    match setting.allowed {
        Allowed::Words(words) => list(words),
        Allowed::OneOf(values) if values.iter().all(|v| v.fract() == 0.0) => {
            list(&values.iter().map(f64::to_string).collect::<Vec<_>>())
        }
        Allowed::Number(range) => Ok(decimal(range.least, range.greatest)),
        _ => Ok(DataValidation::new().allow_any_value()),
    }
}

/// Two invented panels side by side, and the gridlines under them.
fn samples(sheet: &mut Worksheet, spec: &Sheet) -> Result<(), XlsxError> {
    const LINES: [(&str, &str, f64); 5] =
        [("A", "X", 0.0), ("B", "X", 4.8), ("C", "X", 9.9), ("1", "Y", 0.0), ("2", "Y", 6.1)];
    let mark = Format::new().set_num_format("@");
    let first = HEADINGS + 1;
    if spec.name == GRIDLINES.name {
        for (row, (name, axis, position)) in (first..).zip(LINES) {
            sheet.write_string_with_format(row, 0, name, &mark)?;
            sheet.write_string(row, 1, axis)?;
            sheet.write_number(row, 2, position)?;
        }
    }
    if spec.name == PANELS.name {
        for (row, cells) in (first..).zip([["S1", "A", "B", "1", "2"], ["S2", "B", "C", "1", "2"]]) {
            for (column, cell) in (0..).zip(cells) {
                sheet.write_string_with_format(row, column, cell, &mark)?;
            }
            if let Some(remarks) = (0..).zip(spec.columns).find(|(_, column)| column.heading == "Remarks") {
                sheet.write_string(row, remarks.0, SAMPLE)?;
            }
        }
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::read::read_book;

    fn on_disk(bytes: &[u8]) -> (tempfile::TempDir, std::path::PathBuf) {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("starter.xlsx");
        std::fs::write(&path, bytes).unwrap();
        (folder, path)
    }

    #[test]
    fn the_starter_reads_back_without_a_word() {
        let (_folder, path) = on_disk(&starter_book().unwrap());
        let reading = read_book(&path).unwrap();
        let said: Vec<String> = reading.queries.iter().map(ToString::to_string).collect();
        assert!(said.is_empty(), "{said:#?}");
        let book = reading.book.unwrap();
        assert_eq!(book.criteria, design_engine::criteria::Criteria::default());
        assert_eq!(book.layout.panels.len(), 2);
        assert_eq!(book.layout.gridlines.len(), 5);
        assert!(book.layout.panels.iter().all(|panel| panel.data.remarks == SAMPLE));
        let defaults: Vec<&str> = book.defaults_used.iter().map(|default| default.key).collect();
        assert!(
            ["fcu_n_mm2", "thickness_mm", "bar_sizes_mm", "layering"]
                .iter()
                .all(|key| defaults.contains(key))
        );
    }

    #[test]
    fn the_starter_is_the_same_each_time() {
        assert_eq!(starter_book().unwrap(), starter_book().unwrap());
    }

    #[test]
    fn every_sheet_and_heading_of_the_table_is_in_the_starter() {
        let mut book = calamine::Xlsx::new(std::io::Cursor::new(starter_book().unwrap())).unwrap();
        let names = calamine::Reader::sheet_names(&book);
        let expected: Vec<&str> = std::iter::once(READ_ME).chain(SHEETS.map(|sheet| sheet.name)).collect();
        assert_eq!(names, expected);
        for spec in SHEETS {
            let mut reader = book.worksheet_cells_reader(spec.name).unwrap();
            let mut headings = Vec::new();
            while let Some(cell) = reader.next_cell().unwrap() {
                if cell.get_position().0 == HEADINGS {
                    headings.push(calamine::Data::from(cell.get_value().clone()).to_string());
                }
            }
            assert_eq!(headings, spec.columns.iter().map(Column::title).collect::<Vec<_>>(), "{}", spec.name);
        }
    }

    use calamine::Reader as _;
}
