//! Sheet `Quantities`: concrete, formwork and steel.

use rust_xlsxwriter::Worksheet;

use super::column::Column;
use super::look::Tone;
use super::sink::lay_down;
use super::{Submission, WriteError};

pub(super) const NAME: &str = "Quantities";
const FROZEN_COLUMNS: u16 = 1;

/// A quantity.
pub(crate) struct QuantityRow {
    item: String,
    value: Option<f64>,
    unit: &'static str,
    remark: &'static str,
}

/// The quantities in the order of printing.
pub(super) fn rows(submission: &Submission<'_>) -> Vec<QuantityRow> {
    let quantities = &submission.bars.quantities;
    let letter = submission.book.criteria.bar_type_letter();
    let row = |item: &str, value: f64, unit, remark| QuantityRow {
        item: item.to_owned(),
        value: Some(value),
        unit,
        remark,
    };
    let mut rows = vec![
        row(
            "Concrete",
            quantities.concrete_m3,
            "m³",
            "plan area between gridlines less openings, times thickness; beams and the half support outside are not counted",
        ),
        row("Formwork", quantities.formwork_m2, "m²", "soffit: the same area; edges are not counted"),
    ];
    for (size, kg) in &quantities.steel_kg_by_size {
        rows.push(row(
            &format!("Steel {letter}{size}"),
            *kg,
            "kg",
            "all bars of the size on the bending schedule",
        ));
    }
    rows.push(row(
        "Steel, all",
        quantities.steel_kg,
        "kg",
        "the sum of the sizes; no allowance for waste, chairs or spacers",
    ));
    for (for_what, kg) in &quantities.steel_kg_by_use {
        rows.push(row(
            &format!("of it: {}", for_what.word()),
            *kg,
            "kg",
            "the sum of these lines is all steel",
        ));
    }
    rows.push(row(
        "within it: laps",
        quantities.laps_kg,
        "kg",
        "what laps bars over the stock length; in the lines above",
    ));
    rows.push(row(
        "within it: at openings",
        quantities.trimmers_kg,
        "kg",
        "bars beside and across the corners of openings; in the lines above",
    ));
    rows.push(QuantityRow {
        item: "Steel per concrete".to_owned(),
        value: quantities.steel_kg_m3(),
        unit: "kg/m³",
        remark: "",
    });
    rows.push(QuantityRow {
        item: "Steel per area".to_owned(),
        value: quantities.steel_kg_m2(),
        unit: "kg/m²",
        remark: "",
    });
    rows
}

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    let rows = rows(submission);
    lay_down(worksheet, NAME, &columns(), FROZEN_COLUMNS, rows.iter().map(|row| (Tone::Plain, row)))
}

pub(super) fn columns<'a>() -> Vec<Column<'a, &'a QuantityRow>> {
    vec![
        Column::words("Quantity", 34.0, |r: &&'a QuantityRow| r.item.as_str()).means("what is counted"),
        Column::number("Value", "", 1, |r: &&'a QuantityRow| r.value).wide(14.0).means("how much"),
        Column::short("Unit", 10.0, |r: &&'a QuantityRow| r.unit).means("its unit"),
        Column::words("Remark", 110.0, |r: &&'a QuantityRow| r.remark).means("how it is counted"),
    ]
}
