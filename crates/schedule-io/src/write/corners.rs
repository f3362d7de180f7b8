//! Sheet `Corners`: torsion steel at the corners of restrained two-way panels.

use design_engine::floor::Panel;
use design_engine::result::CornerDesign;
use rust_xlsxwriter::Worksheet;

use super::column::Column;
use super::look::Tone;
use super::sink::lay_down;
use super::{Submission, WriteError};

pub(super) const NAME: &str = "Corners";
const FROZEN_COLUMNS: u16 = 2;

/// The four layers in the order of [`CornerDesign::as_present_mm2_m`].
const LAYERS: [&str; 4] = ["bottom along x", "bottom along y", "top along x", "top along y"];
const KEYS: [&str; 4] = ["bottom_x", "bottom_y", "top_x", "top_y"];

pub(super) struct CornerRow<'a> {
    panel: &'a Panel,
    corner: &'a CornerDesign,
}

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    let rows = submission.design.panels.iter().flat_map(|design| {
        let panel = submission.floor.panel(design.panel);
        design.corners.iter().map(move |corner| (Tone::Plain, CornerRow { panel, corner }))
    });
    lay_down(worksheet, NAME, &columns(), FROZEN_COLUMNS, rows)
}

/// What is to be added, in words.
fn to_add(corner: &CornerDesign) -> String {
    let layers: Vec<&str> = LAYERS
        .into_iter()
        .zip(corner.as_to_add_mm2_m)
        .filter(|(_, steel)| *steel > 0.0)
        .map(|(l, _)| l)
        .collect();
    if layers.is_empty() { "nothing to add".to_owned() } else { format!("add {}", layers.join(", ")) }
}

pub(super) fn columns<'a>() -> Vec<Column<'a, CornerRow<'a>>> {
    let mut columns = vec![
        Column::mark("Panel", |r: &CornerRow<'a>| r.panel.mark.as_str()).key("panel").means("mark of the panel"),
        Column::mark("Corner", |r: &CornerRow<'_>| r.corner.name())
            .wide(13.0)
            .key("corner")
            .means("which corner of the panel on plan"),
        Column::words("State", 26.0, |r: &CornerRow<'_>| r.corner.state.word())
            .key("state")
            .means("continuity of its two edges at the corner (3.5.3.5)"),
        Column::words("To be added", 46.0, |r: &CornerRow<'_>| to_add(r.corner))
            .means("layers that need torsion steel beside the bars that are there"),
        Column::number("Extent from both edges", "m", 2, |r: &CornerRow<'_>| r.corner.extent_m)
            .wide(12.0)
            .key("extent_m")
            .means("a fifth of the shorter span"),
        Column::number("Required in each layer", "mm2/m", 0, |r: &CornerRow<'_>| r.corner.as_required_mm2_m)
            .wide(12.0)
            .key("as_required_mm2_m")
            .means("0.75 of the bending steel of the greatest midspan moment, half of that with one edge continuous"),
    ];
    let steel = |group, key: &'static str, values: fn(&CornerDesign) -> [f64; 4], what: &'static str| {
        let headings = ["Bottom x", "Bottom y", "Top x", "Top y"];
        let column = move |i: usize| {
            Column::number(headings[i], "mm2/m", 0, move |r: &CornerRow<'_>| values(r.corner)[i])
                .key(format!("{key}/{}", KEYS[i]))
                .means(format!("{what}, {}", LAYERS[i]))
        };
        Column::group(group, (0..4).map(column).collect())
    };
    columns.extend(steel("Steel there", "as_present_mm2_m", |c| c.as_present_mm2_m, "steel already there"));
    columns.extend(steel("Steel to add", "as_to_add_mm2_m", |c| c.as_to_add_mm2_m, "steel to be added"));
    columns
}
