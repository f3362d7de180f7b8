//! How the sheets look: formats, tints and the set-up of the printed page. Plain, quiet, fit for a printer
//! without colour: what a tint says, a word says too.

use rust_xlsxwriter::{Color, Format, FormatAlign, FormatBorder, Worksheet, XlsxError};

use super::column::Kind;
use super::{text, words};

const DARK: Color = Color::RGB(0x0040_4040);
const LIGHT: Color = Color::RGB(0x00E4_E4E4);
const LINE: Color = Color::RGB(0x00A6_A6A6);
/// The one accent: rows that need an engineer's eye.
const ACCENT: Color = Color::RGB(0x00F6_DFB8);
const SIZE: f64 = 11.0;
const HEADING_SIZE: f64 = 9.5;
/// Height of a line of [`SIZE`], points.
const LINE_HEIGHT: f64 = 15.0;
/// A row is at most 409 points high.
const MOST_LINES: u32 = 27;
const A3: u8 = 8;
const CM: f64 = 1.0 / 2.54;

/// What a row is, and so how it looks.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Tone {
    /// Takes the formats of its columns.
    Plain,
    /// Something fails or is not designed.
    Marked,
    /// The name of a sheet's part.
    Section,
    /// The name of the sheet.
    Title,
}

impl Tone {
    pub(super) const ALL: [Tone; 4] = [Tone::Plain, Tone::Marked, Tone::Section, Tone::Title];
}

/// Format of a cell in a column of a kind.
pub(super) fn cell(kind: Kind, tone: Tone) -> Format {
    let format = Format::new().set_font_size(SIZE);
    match tone {
        Tone::Plain => of_kind(format, kind),
        Tone::Marked => of_kind(format, kind).set_background_color(ACCENT).set_bold(),
        Tone::Section => {
            let format = if matches!(kind, Kind::Number(_)) { of_kind(format, kind) } else { format };
            format.set_bold().set_border_bottom(FormatBorder::Thin).set_border_bottom_color(LINE)
        }
        Tone::Title => format.set_bold().set_font_size(16).set_font_color(DARK),
    }
}

fn of_kind(format: Format, kind: Kind) -> Format {
    let aligned = |align| format.clone().set_align(align).set_align(FormatAlign::VerticalCenter);
    match kind {
        Kind::Free => format.set_align(FormatAlign::Left),
        Kind::Words => aligned(FormatAlign::Left).set_text_wrap(),
        Kind::Short => aligned(FormatAlign::Center),
        // `_)` keeps a number off the text right of it.
        Kind::Number(0) => aligned(FormatAlign::Right).set_num_format("0_)"),
        Kind::Number(decimals) => {
            let decimals = "0".repeat(usize::from(decimals));
            aligned(FormatAlign::Right).set_num_format(format!("0.{decimals}_)"))
        }
        Kind::Figures => aligned(FormatAlign::Right).set_num_format("[>=1000]0_);[>=10]0.0_);0.000_)"),
    }
}

/// Height of a row whose longest cell takes so many lines, points.
pub(super) fn row_height(lines: u32) -> f64 {
    f64::from(lines.clamp(1, MOST_LINES)) * LINE_HEIGHT
}

/// How many lines a heading takes; its letters are smaller than those of the rows.
pub(super) fn heading_lines(title: &str, width: f64) -> u32 {
    text::line_count(title, width * SIZE / HEADING_SIZE)
}

/// Format of a group heading; `opens` where the group begins.
pub(super) fn group(opens: bool) -> Format {
    let format = Format::new()
        .set_font_size(HEADING_SIZE)
        .set_bold()
        .set_font_color(Color::White)
        .set_background_color(DARK);
    if opens {
        format.set_border_left(FormatBorder::Thin).set_border_left_color(Color::White)
    } else {
        format
    }
}

/// Format of a heading; `opens` where its group begins.
pub(super) fn heading(kind: Kind, opens: bool) -> Format {
    let align = match kind {
        Kind::Free | Kind::Words => FormatAlign::Left,
        Kind::Short => FormatAlign::Center,
        Kind::Number(_) | Kind::Figures => FormatAlign::Right,
    };
    let format = Format::new()
        .set_font_size(HEADING_SIZE)
        .set_bold()
        .set_text_wrap()
        .set_align(align)
        .set_align(FormatAlign::Bottom)
        .set_background_color(LIGHT)
        .set_border_bottom(FormatBorder::Thin)
        .set_border_bottom_color(DARK);
    if opens { format.set_border_left(FormatBorder::Thin).set_border_left_color(LINE) } else { format }
}

/// A3 landscape, one page wide, the title block at the foot.
pub(super) fn set_up_page(worksheet: &mut Worksheet, footer: &str) {
    worksheet
        .set_paper_size(A3)
        .set_landscape()
        .set_print_fit_to_pages(1, 0)
        .set_margins(1.0 * CM, 1.0 * CM, 1.8 * CM, 2.1 * CM, 0.8 * CM, 0.8 * CM)
        .set_header_footer_scale_with_doc(false)
        .set_footer(footer);
}

/// What a sheet of rows has besides: sheet name and layer key at the head, lines between the rows, headings
/// that stay in sight on the screen and come again on each page.
pub(super) fn set_up_rows(
    worksheet: &mut Worksheet,
    sheet: &str,
    heading_rows: u32,
    frozen_columns: u16,
) -> Result<(), XlsxError> {
    worksheet
        .set_header(format!("&L&\"-,Bold\"&12{sheet}&R&9{}", words::layer_key()))
        .set_print_gridlines(true)
        .set_freeze_panes(heading_rows, frozen_columns)?
        .set_repeat_rows(0, heading_rows - 1)?;
    Ok(())
}
