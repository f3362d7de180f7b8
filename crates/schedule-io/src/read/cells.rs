//! One neutral cell for both forms of a floor book, and the sheets made of it.

use crate::limits::SHOWN_CHARS;
use crate::place::CellPlace;
use crate::sheets::Sheet;

/// What a cell holds.
#[derive(Debug, Clone, PartialEq)]
pub(crate) enum Content {
    /// Nothing, or spaces alone.
    Blank,
    /// Text; every cell of a CSV file is text.
    Text(String),
    /// A number of a workbook.
    Number(f64),
    /// A logical value of a workbook.
    Truth(bool),
    /// A number of a workbook that its format shows as a date or a time.
    Date {
        /// The day as `YYYY-MM-DD`; none for a time or a number below 1.
        day: Option<String>,
        /// The number behind it.
        number: f64,
    },
    /// An error value such as `#REF!`.
    Fault(String),
    /// A formula whose result is not stored.
    NoResult,
    /// Covered by a merged cell whose value stands elsewhere.
    Merged {
        /// The cell that holds the value, such as `F4`.
        into: String,
    },
}

pub(crate) static BLANK: Content = Content::Blank;

impl Content {
    pub(crate) fn text(text: &str) -> Content {
        if text.chars().all(char::is_whitespace) { Content::Blank } else { Content::Text(text.to_owned()) }
    }

    pub(crate) fn is_blank(&self) -> bool {
        *self == Content::Blank
    }

    /// Whether somebody put something into this cell itself.
    pub(crate) fn is_filled(&self) -> bool {
        !matches!(self, Content::Blank | Content::Merged { .. })
    }

    /// What was read, as messages quote it.
    pub(crate) fn shown(&self) -> String {
        match self {
            Content::Blank | Content::NoResult | Content::Merged { .. } => "nothing".to_owned(),
            Content::Text(text) => format!("\"{}\"", shortened(text)),
            Content::Number(number) => format!("\"{}\"", number_text(*number)),
            Content::Truth(true) => "the logical value TRUE".to_owned(),
            Content::Truth(false) => "the logical value FALSE".to_owned(),
            Content::Date { day: Some(day), .. } => format!("the date {day}"),
            Content::Date { day: None, number } => {
                format!("\"{}\" formatted as a time", number_text(*number))
            }
            Content::Fault(fault) => format!("the error value {fault}"),
        }
    }
}

/// A number as a mark or a message shows it: 101, not 101.0.
pub(crate) fn number_text(number: f64) -> String {
    // Adding zero turns -0 into 0.
    (number + 0.0).to_string()
}

/// Text fit for a message: one line, not too long.
pub(crate) fn shortened(text: &str) -> String {
    let mut out = String::new();
    for (count, c) in text.trim_matches([' ', '\t', '\r', '\n']).chars().enumerate() {
        if count == SHOWN_CHARS {
            out.push_str("...");
            break;
        }
        match c {
            '\u{a0}' => out.push_str("\\u{a0}"),
            c if c.is_control() => out.extend(c.escape_default()),
            c => out.push(c),
        }
    }
    out
}

/// A row of a sheet.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct RawRow {
    /// Number from 1, as the spreadsheet shows it.
    pub(crate) number: u32,
    /// Cells from the first column on.
    pub(crate) cells: Vec<Content>,
}

impl RawRow {
    pub(crate) fn cell(&self, column: usize) -> &Content {
        self.cells.get(column).unwrap_or(&BLANK)
    }
}

/// A sheet as it stands in the book, before its headings are looked for.
#[derive(Debug, Clone)]
pub(crate) struct RawSheet {
    /// Which sheet it is.
    pub(crate) spec: &'static Sheet,
    /// File name without its path.
    pub(crate) file: String,
    /// Sheet name as the workbook gives it; none for a CSV file.
    pub(crate) sheet: Option<String>,
    /// Whether numbers may be written with a decimal comma: CSV files separated by `;` or tabs.
    pub(crate) decimal_comma: bool,
    /// Rows from the first on; wholly blank rows may be missing.
    pub(crate) rows: Vec<RawRow>,
    /// True where rows are missing because the file could not be read to its end; the report says why.
    pub(crate) cut: bool,
}

impl RawSheet {
    pub(crate) fn place(&self, row: Option<u32>, column: Option<usize>, heading: Option<&str>) -> CellPlace {
        CellPlace {
            file: self.file.clone(),
            sheet: self.sheet.clone(),
            row,
            column: column.and_then(|c| u32::try_from(c).ok()),
            heading: heading.map(str::to_owned),
        }
    }
}

/// What opening a book gives: its known sheets in the order of the table of sheets.
#[derive(Debug, Clone, Default)]
pub(crate) struct Source {
    /// Name of the file or folder.
    pub(crate) name: String,
    pub(crate) sheets: Vec<RawSheet>,
}
