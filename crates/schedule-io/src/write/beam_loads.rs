//! Sheet `Beam loads`: what each panel puts on the supporting lines, for the designer of beams and walls.

use design_engine::floor::Floor;
use floor_grid::beam_loads::{BeamLoad, BeamLoads, beam_loads};
use rust_xlsxwriter::Worksheet;

use super::column::{Cell, Column};
use super::look::Tone;
use super::sink::lay_down;
use super::{Submission, WriteError};

pub(super) const NAME: &str = "Beam loads";
const FROZEN_COLUMNS: u16 = 1;

/// A load, or one of the closing lines: its words and its number of kilonewtons.
pub(super) enum LoadRow<'a> {
    Load(&'a Floor, BeamLoad),
    Total(String, Option<f64>),
}

impl<'a> LoadRow<'a> {
    fn load<C>(&self, value: impl Fn(&'a Floor, &BeamLoad) -> C) -> Option<C> {
        match self {
            LoadRow::Load(floor, load) => Some(value(floor, load)),
            LoadRow::Total(..) => None,
        }
    }
}

/// The loads of a submission.
pub(super) fn loads(submission: &Submission<'_>) -> BeamLoads {
    beam_loads(&submission.book.layout, submission.floor, submission.design)
}

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    let loads = loads(submission);
    let totals = totals(&loads);
    let floor = submission.floor;
    let rows = loads.rows.into_iter().map(|load| LoadRow::Load(floor, load)).chain(totals);
    lay_down(worksheet, NAME, &columns(), FROZEN_COLUMNS, rows.map(|row| (Tone::Plain, row)))
}

/// The closing lines: both sums, and what their difference comes from.
fn totals<'a>(loads: &BeamLoads) -> [LoadRow<'a>; 3] {
    let difference = 100.0 * loads.difference();
    [
        LoadRow::Total("Total on supports".to_owned(), Some(loads.on_supports_kn)),
        LoadRow::Total("Total on designed panels".to_owned(), Some(loads.on_panels_kn)),
        LoadRow::Total(
            format!(
                "Difference {difference:.2} %: the coefficients of Table 3.15 are printed to two decimals (up to 1 % a \
                 panel); one-way panels and cantilevers agree exactly"
            ),
            None,
        ),
    ]
}

pub(super) fn columns<'a>() -> Vec<Column<'a, LoadRow<'a>>> {
    let mut columns = vec![
        Column::mark("Gridline", |r: &LoadRow<'a>| match r {
            LoadRow::Load(_, load) => load.gridline.clone(),
            LoadRow::Total(words, _) => Some(words.clone()),
        })
        .wide(26.0)
        .key("gridline")
        .means("gridline that the support lies on; blank for a loose panel"),
        Column::mark("From", |r: &LoadRow<'_>| {
            r.load(|_, l| l.between.as_ref().map(|b| b[0].clone())).flatten()
        })
        .key("from")
        .means("crossing gridline at the start of the panel's edge"),
        Column::mark("To", |r: &LoadRow<'_>| {
            r.load(|_, l| l.between.as_ref().map(|b| b[1].clone())).flatten()
        })
        .key("to")
        .means("crossing gridline at its end"),
        Column::mark("Panel", |r: &LoadRow<'a>| r.load(|floor, l| floor.panel(l.panel).mark.as_str()))
            .key("panel")
            .means("panel that loads it"),
        Column::mark("Its edge", |r: &LoadRow<'_>| r.load(|floor, l| floor.panel(l.panel).side_word(l.side)))
            .wide(13.0)
            .key("side")
            .means("edge of the panel on the support"),
    ];
    columns.extend(Column::group(
        "Load per metre of the loaded length",
        vec![
            Column::number("Dead", "kN/m", 2, |r: &LoadRow<'_>| r.load(|_, l| l.load.dead_kn_m))
                .key("dead_kn_m")
                .means("characteristic dead load, walls in"),
            Column::number("Imposed", "kN/m", 2, |r: &LoadRow<'_>| r.load(|_, l| l.load.imposed_kn_m))
                .key("imposed_kn_m")
                .means("characteristic imposed load"),
            Column::number("Ultimate", "kN/m", 2, |r: &LoadRow<'_>| r.load(|_, l| l.load.ultimate_kn_m))
                .key("ultimate_kn_m")
                .means("ultimate load"),
        ],
    ));
    columns.extend([
        Column::number("Edge", "m", 3, |r: &LoadRow<'_>| r.load(|_, l| (l.to - l.from).m()))
            .key("edge_m")
            .means("length of the panel's edge"),
        Column::number("Loaded length", "m", 3, |r: &LoadRow<'_>| r.load(|_, l| l.loaded_length_m))
            .key("loaded_length_m")
            .means("length about the middle of the edge that is loaded: 0.75 of a two-way panel's (3.5.3.7)"),
        Column::number("Ultimate, whole edge", "kN", 1, |r: &LoadRow<'_>| match r {
            LoadRow::Load(_, load) => Cell::Number(load.total_ultimate_kn()),
            LoadRow::Total(_, total) => Cell::from(*total),
        })
        .wide(13.0)
        .key("total_ultimate_kn")
        .means("ultimate load of the panel on this edge"),
    ]);
    columns
}
