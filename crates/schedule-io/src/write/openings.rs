//! Sheet `Openings`: bars cut at each opening, and the steel to put beside it.

use design_engine::floor::Panel;
use design_engine::result::{CutLayer, OpeningDesign};
use rust_xlsxwriter::Worksheet;

use super::column::Column;
use super::look::Tone;
use super::sink::lay_down;
use super::{Submission, WriteError};

pub(super) const NAME: &str = "Openings";
const FROZEN_COLUMNS: u16 = 2;

/// One opening and one layer it cuts; without a layer where bars are only moved.
pub(crate) struct OpeningRow<'a> {
    pub(crate) panel: &'a Panel,
    /// From 1 in each panel.
    pub(crate) number: u32,
    pub(crate) opening: &'a OpeningDesign,
    pub(crate) layer: Option<&'a CutLayer>,
}

/// Every opening, a row per layer cut.
pub(super) fn rows<'a>(submission: &'a Submission<'a>) -> impl Iterator<Item = OpeningRow<'a>> + 'a {
    submission.design.panels.iter().flat_map(|design| {
        let panel = submission.floor.panel(design.panel);
        (1..).zip(&design.openings).flat_map(move |(number, opening)| {
            let row = move |layer| OpeningRow { panel, number, opening, layer };
            let none = opening.layers.is_empty().then(|| row(None));
            none.into_iter().chain(opening.layers.iter().map(move |layer| row(Some(layer))))
        })
    })
}

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    let rows = rows(submission).map(|row| {
        let outside = row.opening.over_quarter_of_span || row.opening.within_d_of_support;
        (if outside { Tone::Marked } else { Tone::Plain }, row)
    });
    lay_down(worksheet, NAME, &columns(), FROZEN_COLUMNS, rows)
}

/// What the opening means for the bars.
pub(super) fn result_words(opening: &OpeningDesign) -> &'static str {
    match (opening.over_quarter_of_span, opening.within_d_of_support, opening.displaced) {
        (true, _, _) => "WIDER THAN A QUARTER OF A SPAN: not covered",
        (_, true, _) => "WITHIN d OF A SUPPORT: not covered",
        (_, _, true) => "bars moved aside",
        _ => "bars cut: steel beside it and diagonal bars at its corners",
    }
}

pub(super) fn columns<'a>() -> Vec<Column<'a, OpeningRow<'a>>> {
    let mut columns = vec![
        Column::mark("Panel", |r: &OpeningRow<'a>| r.panel.mark.as_str())
            .key("panel")
            .means("mark of the panel"),
        Column::number("Opening", "", 0, |r: &OpeningRow<'_>| f64::from(r.number))
            .key("number")
            .means("number of the opening in its panel, in the order of the book"),
        Column::words("Result", 42.0, |r: &OpeningRow<'_>| result_words(r.opening))
            .key("result")
            .means("what it means for the bars; in capitals where the coefficient method does not cover it"),
    ];
    columns.extend(Column::group(
        "Place in the panel",
        vec![
            Column::number("From west", "m", 3, |r: &OpeningRow<'_>| r.opening.opening.from_west_m)
                .key("from_west_m")
                .means("its west side from the panel's west gridline"),
            Column::number("From south", "m", 3, |r: &OpeningRow<'_>| r.opening.opening.from_south_m)
                .key("from_south_m")
                .means("its south side from the panel's south gridline"),
            Column::number("Width x", "m", 3, |r: &OpeningRow<'_>| r.opening.opening.widths_m[0])
                .key("width_x_m")
                .means("width along x"),
            Column::number("Width y", "m", 3, |r: &OpeningRow<'_>| r.opening.opening.widths_m[1])
                .key("width_y_m")
                .means("width along y"),
        ],
    ));
    columns.extend(Column::group(
        "Bars cut",
        vec![
            Column::mark("Layer", |r: &OpeningRow<'_>| r.layer.map(|cut| cut.layer.word()))
                .key("layer")
                .means("layer of bars cut"),
            Column::mark("Bars of", |r: &OpeningRow<'_>| r.layer.map(|cut| cut.at.word(r.panel.is_loose())))
                .wide(16.0)
                .key("at")
                .means("section whose bars they are"),
            Column::mark("Along", |r: &OpeningRow<'_>| r.layer.map(|cut| cut.bars_along.word()))
                .key("bars_along")
                .means("direction of the bars"),
            Column::number("Size", "mm", 0, |r: &OpeningRow<'_>| r.layer.map(|cut| cut.bars.bar_mm))
                .key("bar_mm")
                .means("bar size"),
            Column::number("Spacing", "mm", 0, |r: &OpeningRow<'_>| r.layer.map(|cut| cut.bars.spacing_mm))
                .key("spacing_mm")
                .means("spacing of the bars"),
            Column::number("Cut", "no.", 0, |r: &OpeningRow<'_>| r.layer.map(|cut| cut.cut))
                .key("cut")
                .means("most bars that the opening can cut"),
            Column::number("Beside it, each side", "mm2", 0, |r: &OpeningRow<'_>| {
                r.layer.map(|cut| cut.each_side_mm2)
            })
            .wide(12.0)
            .key("each_side_mm2")
            .means("steel on each side in the same layer: half of what is cut"),
        ],
    ));
    columns
}
