//! Limits of what is read: above them a file is no floor book, and reading it would only cost memory.

/// Greatest size of a file, bytes.
pub const FILE_BYTES: u64 = 50_000_000;
/// Greatest size of a workbook's parts together when unpacked, bytes.
pub const UNPACKED_BYTES: u64 = 500_000_000;
/// Greatest row number read on a sheet.
pub const ROWS: u32 = 100_000;
/// Number of columns read on a sheet.
pub const COLUMNS: usize = 256;
/// Greatest number of cells read in a book.
pub const CELLS: usize = 4_000_000;
/// Greatest number of sheets in a workbook, or of files in a folder.
pub const SHEETS: usize = 200;
/// Greatest length of a text, characters.
pub const TEXT_CHARS: usize = 2_000;
/// Greatest length of a mark or a name, characters.
pub const NAME_CHARS: usize = 40;
/// Rows within which the headings of a sheet are looked for.
pub const HEADING_ROWS: usize = 50;
/// Characters of a cell repeated in a message.
pub const SHOWN_CHARS: usize = 60;
