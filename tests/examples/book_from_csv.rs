//! Makes the workbook form of a floor book from its CSV form:
//! `cargo run -p baymat-tests --example book_from_csv -- FOLDER OUT.xlsx`.

use std::error::Error;
use std::path::Path;

use rust_xlsxwriter::{DocProperties, ExcelDateTime, Format, Workbook};

/// Sheets in the order of the floor book, beside their CSV files.
const SHEETS: [(&str, &str); 9] = [
    ("Criteria", "criteria.csv"),
    ("Gridlines", "gridlines.csv"),
    ("Panels", "panels.csv"),
    ("Joints", "joints.csv"),
    ("Supports", "supports.csv"),
    ("Openings", "openings.csv"),
    ("Loose panels", "loose_panels.csv"),
    ("Chosen bars", "chosen_bars.csv"),
    ("Wall loads", "wall_loads.csv"),
];

fn main() -> Result<(), Box<dyn Error>> {
    let mut arguments = std::env::args().skip(1);
    let (Some(folder), Some(out)) = (arguments.next(), arguments.next()) else {
        return Err("give the folder of CSV files and the workbook to write".into());
    };
    let mut workbook = Workbook::new();
    let created = ExcelDateTime::from_ymd(2000, 1, 1)?;
    workbook.set_properties(&DocProperties::new().set_creation_datetime(&created));
    let bold = Format::new().set_bold();
    for (name, file) in SHEETS {
        let path = Path::new(&folder).join(file);
        if !path.exists() {
            continue;
        }
        let sheet = workbook.add_worksheet().set_name(name)?;
        let mut reader = csv::ReaderBuilder::new().has_headers(false).flexible(true).from_path(&path)?;
        let mut numeric: Vec<bool> = Vec::new();
        for (row, record) in reader.records().enumerate() {
            let record = record?;
            for (column, text) in record.iter().enumerate().filter(|(_, text)| !text.is_empty()) {
                let (at, across) = (u32::try_from(row)?, u16::try_from(column)?);
                let number = text.parse::<f64>().ok().filter(|_| numeric.get(column) == Some(&true));
                match number {
                    Some(number) => sheet.write_number(at, across, number)?,
                    None if row == 0 => sheet.write_string_with_format(at, across, text, &bold)?,
                    None => sheet.write_string(at, across, text)?,
                };
            }
            if row == 0 {
                // Columns with a unit hold numbers; so do the values of Criteria. Marks and names stay text.
                numeric = record.iter().map(|h| h.ends_with(')') || h == "Value").collect();
                for column in 0..record.len() {
                    sheet.set_column_width(u16::try_from(column)?, 16.0)?;
                }
            }
        }
        sheet.set_freeze_panes(1, 0)?;
    }
    workbook.save(&out)?;
    Ok(())
}
