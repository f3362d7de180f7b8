//! Sheet `Cover`: title block beside totals, result, caution, layers, assumptions; on its second page the
//! basis of design with every default marked.

use std::collections::BTreeMap;

use design_engine::criteria::{Setting, Value, setting};
use rust_xlsxwriter::Worksheet;

use super::column::{Cell, Column, Head};
use super::look::Tone;
use super::sink::RowSink;
use super::title_block::{CAUTION, PROGRAM};
use super::totals::{Totals, queries_by_severity};
use super::{Submission, WriteError, text, words};
use crate::read::previous::{FORMAT, FORMAT_LABEL};

pub(super) const NAME: &str = "Cover";
/// Characters of a line of running text, which flows over the empty cells right of it.
const LINE_WIDTH: usize = 180;

/// At which its columns fill the width of an A3 page.
const PRINT_SCALE_PCT: u16 = 90;

/// What is assumed on every floor, besides what the design of this one adds.
const ASSUMPTIONS: [&str; 7] = [
    "Beams and walls on the gridlines do not deflect under the slab; where corners are held down, they hold them down.",
    "Moments are those of the middle strips, uniform loads over each whole panel (BS 8110-1:1997, 3.5.3).",
    "Effective depths are those of the bars shown, without an allowance for bars out of place.",
    "Top bars reach as far as stated past the face of the support, on each side.",
    "Plan area is measured between support centre lines, concrete is that area times thickness: beams and the half support outside are not counted, openings are not taken off.",
    "Not designed here: ties (3.12.3), loads during construction, vibration, openings and wall loads beyond what the queries say, and the beams, walls and columns themselves.",
    "Local codes, national rules and the review of a qualified engineer govern over everything in this workbook.",
];

/// The basis of design in parts; together with [`TITLE_BLOCK`] every setting once.
const BASIS: [(&str, &[&str]); 6] = [
    (
        "Code and method",
        &["code_of_practice", "coefficients", "span_basis", "corners", "balance_threshold_pct"],
    ),
    (
        "Materials",
        &[
            "fcu_n_mm2",
            "fy_n_mm2",
            "steel_partial_factor",
            "bar_type_letter",
            "concrete_density_kn_m3",
            "maximum_aggregate_mm",
        ],
    ),
    ("Cover, exposure and fire", &["bottom_cover_mm", "top_cover_mm", "exposure", "fire_resistance_h"]),
    (
        "Thickness, loads and supports where a panel gives none",
        &[
            "thickness_mm",
            "finishes_kn_m2",
            "partitions_kn_m2",
            "imposed_kn_m2",
            "dead_load_factor",
            "imposed_load_factor",
            "support_width_mm",
        ],
    ),
    (
        "Bars allowed",
        &[
            "bar_sizes_mm",
            "spacing_step_mm",
            "least_spacing_mm",
            "greatest_spacing_mm",
            "layering",
            "edge_strips",
            "bottom_bars",
            "top_bars",
            "bar_kinds_limit",
            "stock_length_m",
            "bending_deduction_mm",
        ],
    ),
    (
        "Layout, comparison and rates",
        &[
            "plan_tolerance_mm",
            "thickness_options_mm",
            "concrete_rate_per_m3",
            "steel_rate_per_t",
            "formwork_rate_per_m2",
            "currency",
            "rate_source",
            "concrete_carbon_kgco2e_m3",
            "steel_carbon_kgco2e_kg",
            "carbon_source",
        ],
    ),
];
const TITLE_BLOCK: [&str; 8] =
    ["project", "job_number", "floor", "drawing_number", "revision", "prepared_by", "checked_by", "date"];

/// A row of the cover.
pub(super) struct CoverRow<'a>([Cell<'a>; 5]);

impl<'a> CoverRow<'a> {
    fn of(item: impl Into<Cell<'a>>, value: impl Into<Cell<'a>>) -> CoverRow<'a> {
        CoverRow([item.into(), value.into(), Cell::Blank, Cell::Blank, Cell::Blank])
    }

    /// Puts a second item and value into the right half of the page.
    fn beside(mut self, (item, value): (Cell<'a>, Cell<'a>)) -> CoverRow<'a> {
        [self.0[3], self.0[4]] = [item, value];
        self
    }
}

pub(super) fn columns<'a>() -> Vec<Column<'a, CoverRow<'a>>> {
    let column = |heading, width, index: usize, meaning| {
        Column::free(heading, move |r: &CoverRow<'a>| r.0[index].clone()).wide(width).means(meaning)
    };
    vec![
        column("Item", 32.0, 0, "what it is; also running text"),
        column("Value", 40.0, 1, "its value"),
        column("Unit", 14.0, 2, "unit of the value"),
        column(
            "Source",
            26.0,
            3,
            "`DEFAULT` where the book is silent, `stated` where it is not; above, an item of the totals",
        ),
        column("Remark", 96.0, 4, "what the item is for; above, the value of a total"),
    ]
}

/// Where the value of a setting stands on the cover, for formulas: `Cover!$B$41`.
pub(super) fn value_cells(submission: &Submission<'_>) -> Result<BTreeMap<&'static str, String>, WriteError> {
    let rows = lay_out(submission, &mut Worksheet::new())?;
    Ok(rows.into_iter().map(|(key, row)| (key, format!("{NAME}!$B${}", row + 1))).collect())
}

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    lay_out(submission, worksheet).map(|_| ())
}

fn lay_out(
    submission: &Submission<'_>,
    worksheet: &mut Worksheet,
) -> Result<BTreeMap<&'static str, u32>, WriteError> {
    let columns = columns();
    let heads: Vec<Head> = columns.iter().map(|column| column.head.clone()).collect();
    let mut cover = Cover {
        sink: RowSink::plain(worksheet, NAME, &heads)?,
        setting_rows: BTreeMap::new(),
        columns,
        submission: *submission,
    };
    cover.title_block_and_totals()?;
    cover.result()?;
    cover.caution_and_layers()?;
    cover.assumptions()?;
    let second_page = cover.sink.next_row();
    cover.basis()?;
    let rows = std::mem::take(&mut cover.setting_rows);
    let worksheet = cover.sink.close()?;
    // Spreadsheet programs that fit a sheet to the page's width pass over its page breaks.
    worksheet.set_print_scale(PRINT_SCALE_PCT).set_page_breaks(&[second_page])?;
    worksheet.set_screen_gridlines(false);
    Ok(rows)
}

struct Cover<'w, 'a> {
    sink: RowSink<'w>,
    /// Rows of the settings, from 0.
    setting_rows: BTreeMap<&'static str, u32>,
    columns: Vec<Column<'a, CoverRow<'a>>>,
    submission: Submission<'a>,
}

impl<'a> Cover<'_, 'a> {
    fn row(&mut self, tone: Tone, row: &CoverRow<'a>) -> Result<(), WriteError> {
        self.sink.append(tone, self.columns.iter().map(|column| (column.value)(row)))
    }

    fn plain(&mut self, item: impl Into<Cell<'a>>, value: impl Into<Cell<'a>>) -> Result<(), WriteError> {
        self.row(Tone::Plain, &CoverRow::of(item, value))
    }

    fn section(&mut self, name: &'a str) -> Result<(), WriteError> {
        self.plain("", Cell::Blank)?;
        self.row(Tone::Section, &CoverRow::of(name, Cell::Blank))
    }

    fn running_text(&mut self, text: &str) -> Result<(), WriteError> {
        for line in text::lines(text, LINE_WIDTH) {
            self.row(Tone::Plain, &CoverRow::of(line, Cell::Blank))?;
        }
        Ok(())
    }

    fn title_block_and_totals(&mut self) -> Result<(), WriteError> {
        self.row(Tone::Title, &CoverRow::of("Slab reinforcement schedule", Cell::Blank))?;
        self.plain("", Cell::Blank)?;
        let heading = CoverRow::of("Title block", Cell::Blank).beside(("Totals".into(), Cell::Blank));
        self.row(Tone::Section, &heading)?;

        let criteria = &self.submission.book.criteria;
        let mut title_block: Vec<CoverRow<'a>> = TITLE_BLOCK
            .iter()
            .filter_map(|key| setting(key))
            .map(|setting| CoverRow::of(setting.item, value(criteria.value(setting))))
            .collect();
        title_block.push(CoverRow::of("Floor book", self.submission.book.name.as_str()));
        title_block.push(CoverRow::of(FORMAT_LABEL, FORMAT));
        title_block.push(CoverRow::of("Program", format!("{PROGRAM} {}", self.submission.version)));
        for (row, total) in title_block.into_iter().zip(totals(&self.submission)) {
            self.row(Tone::Plain, &row.beside(total))?;
        }
        Ok(())
    }

    fn result(&mut self) -> Result<(), WriteError> {
        self.section("Result")?;
        let tone = if self.submission.design.ok() { Tone::Plain } else { Tone::Marked };
        let result = Totals::of(&self.submission).result();
        self.row(tone, &CoverRow::of("Result of all checks", result))
    }

    fn caution_and_layers(&mut self) -> Result<(), WriteError> {
        self.section("Caution")?;
        for sentence in CAUTION {
            self.running_text(sentence)?;
        }
        self.section("Layers of bars")?;
        self.plain(words::layer_key(), Cell::Blank)
    }

    fn assumptions(&mut self) -> Result<(), WriteError> {
        self.section("Assumptions")?;
        let own = self.submission.design.assumptions.iter().map(String::as_str);
        for assumption in ASSUMPTIONS.into_iter().chain(own) {
            self.running_text(assumption)?;
        }
        Ok(())
    }

    fn basis(&mut self) -> Result<(), WriteError> {
        self.row(Tone::Title, &CoverRow::of("Basis of design", Cell::Blank))?;
        let defaults = &self.submission.book.defaults_used;
        let marked =
            format!("{} of the items below took their default; each is marked DEFAULT.", defaults.len());
        self.running_text(&marked)?;
        for (part, keys) in BASIS {
            self.section(part)?;
            for setting in keys.iter().filter_map(|key| setting(key)) {
                self.setting(setting)?;
            }
        }
        Ok(())
    }

    /// A setting that has a value; no rate, no row.
    fn setting(&mut self, setting: &'static Setting) -> Result<(), WriteError> {
        let value = value(self.submission.book.criteria.value(setting));
        if value == Cell::Blank {
            return Ok(());
        }
        let is_default = self.submission.book.defaults_used.iter().any(|default| default.key == setting.key);
        let source = if is_default { "DEFAULT" } else { "stated" };
        self.setting_rows.insert(setting.key, self.sink.next_row());
        let unit = words::unit(setting.unit);
        let row = [setting.item.into(), value, unit.into(), source.into(), setting.meaning.into()];
        self.row(Tone::Plain, &CoverRow(row))
    }
}

/// Counts and sums, as many as the title block has rows.
fn totals(submission: &Submission<'_>) -> Vec<(Cell<'static>, Cell<'static>)> {
    let totals = Totals::of(submission);
    let passing = totals.panels - totals.failing.len() - totals.not_designed.len();
    let mut rows: Vec<(Cell<'_>, Cell<'_>)> = vec![
        ("Panels".into(), count(totals.panels)),
        ("Panels that pass".into(), count(passing)),
        ("Panels that fail".into(), count(totals.failing.len())),
        ("Panels not designed".into(), count(totals.not_designed.len())),
        ("Plan area (m²)".into(), totals.area_m2.into()),
        ("Concrete (m³)".into(), submission.bars.quantities.concrete_m3.into()),
        ("Steel (kg)".into(), submission.bars.quantities.steel_kg.into()),
    ];
    for (severity, number) in queries_by_severity(submission) {
        rows.push((format!("Queries: {}", severity.word()).into(), count(number)));
    }
    rows
}

fn value(value: Value) -> Cell<'static> {
    match value {
        Value::Blank => Cell::Blank,
        Value::Number(number) => Cell::Number(number),
        Value::Numbers(numbers) => {
            let numbers: Vec<String> = numbers.iter().map(f64::to_string).collect();
            Cell::from(numbers.join(", "))
        }
        Value::Text(text) => Cell::from(text),
    }
}

#[expect(clippy::cast_precision_loss, reason = "counts of a floor's panels and queries are far below 2^53")]
fn count(number: usize) -> Cell<'static> {
    Cell::Number(number as f64)
}

#[cfg(test)]
mod tests {
    use super::*;
    use design_engine::criteria::SETTINGS;

    #[test]
    fn every_setting_stands_on_the_cover_once() {
        let mut printed: Vec<&str> = TITLE_BLOCK.to_vec();
        printed.extend(BASIS.iter().flat_map(|(_, keys)| keys.iter()));
        printed.sort_unstable();
        let mut all: Vec<&str> = SETTINGS.iter().map(|setting| setting.key).collect();
        all.sort_unstable();
        assert_eq!(printed, all);
    }
}
