//! Sheet `Panels`: one row per panel.

use std::borrow::Cow;

use design_engine::check::{CheckKind, Place};
use design_engine::criteria::Criteria;
use design_engine::floor::{Panel, Side};
use design_engine::result::{Basis, PanelDesign, Section};
use rust_xlsxwriter::Worksheet;

use super::column::{Cell, Column};
use super::look::Tone;
use super::sink::lay_down;
use super::{Submission, WriteError, words};

pub(super) const NAME: &str = "Panels";
/// Panel and result stay in sight.
const FROZEN_COLUMNS: u16 = 2;

pub(super) struct PanelRow<'a> {
    criteria: &'a Criteria,
    panel: &'a Panel,
    design: &'a PanelDesign,
}

impl<'a> PanelRow<'a> {
    fn basis<T>(&self, value: impl FnOnce(&'a Basis) -> T) -> Option<T> {
        self.design.basis.as_ref().map(value)
    }

    fn section<T>(&self, at: Place, value: impl FnOnce(&'a Section) -> T) -> Option<T> {
        self.design.section(at).map(value)
    }
}

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    let rows = submission.design.panels.iter().map(|design| {
        let panel = submission.floor.panel(design.panel);
        let tone = if design.ok() { Tone::Plain } else { Tone::Marked };
        (tone, PanelRow { criteria: &submission.book.criteria, panel, design })
    });
    lay_down(worksheet, NAME, &columns(), FROZEN_COLUMNS, rows)
}

pub(super) fn columns<'a>() -> Vec<Column<'a, PanelRow<'a>>> {
    [
        panel_and_result(),
        geometry(),
        edges(),
        loads(),
        bottom("Short span, bottom", Place::ShortMidspan),
        bottom("Long span, bottom", Place::LongMidspan),
        governing(),
    ]
    .into_iter()
    .flatten()
    .collect()
}

fn panel_and_result<'a>() -> Vec<Column<'a, PanelRow<'a>>> {
    vec![
        Column::mark("Panel", |r: &PanelRow<'a>| r.panel.mark.as_str())
            .wide(8.0)
            .key("panel")
            .means("mark of the panel"),
        Column::words("Result", 23.0, |r: &PanelRow<'_>| words::panel_result(r.design))
            .means("`passes`, `FAILS:` and the checks that fail, or `NOT DESIGNED:` and why"),
    ]
}

fn geometry<'a>() -> Vec<Column<'a, PanelRow<'a>>> {
    let columns = vec![
        Column::number("Slab", "mm", 0, |r: &PanelRow<'_>| r.panel.thickness_mm)
            .wide(5.5)
            .key("thickness_mm")
            .means("slab thickness"),
        Column::number("Short lx", "m", 3, |r: &PanelRow<'_>| r.basis(|b| b.lx_m))
            .key("lx_m")
            .means("effective short span lx"),
        Column::number("Long ly", "m", 3, |r: &PanelRow<'_>| r.basis(|b| b.ly_m))
            .key("ly_m")
            .means("effective long span ly"),
        Column::number("ly/lx", "", 2, |r: &PanelRow<'_>| r.basis(Basis::span_ratio))
            .wide(5.5)
            .key("span_ratio")
            .means("ratio of the spans"),
        Column::words("Action", 11.0, |r: &PanelRow<'a>| r.basis(|b| b.action.word()))
            .key("action")
            .means("how the panel carries its load"),
        Column::number("Case", "", 0, |r: &PanelRow<'a>| case(r).map(|case| case.0))
            .wide(5.0)
            .key("case_number")
            .means("case of Table 3.14 by the panel's discontinuous edges, 1 to 9"),
        Column::words("Case in words", 18.5, |r: &PanelRow<'a>| case(r).map(|case| case.1))
            .key("case")
            .means("that case in words"),
    ];
    Column::group("Slab and spans", columns)
}

fn case(row: &PanelRow<'_>) -> Option<(f64, &'static str)> {
    let case = row.design.basis?.case?;
    // One of nine: the number has an exact f64.
    u8::try_from(case.number()).ok().map(|number| (f64::from(number), case.words()))
}

fn edges<'a>() -> Vec<Column<'a, PanelRow<'a>>> {
    let edge = |heading, side: Side| {
        let state = move |r: &PanelRow<'_>| words::short_state(r.design.edge_states[side.index()]);
        Column::short(heading, 5.2, state).means(format!(
            "state of the {} edge ({} of a loose panel): continuous, partly continuous, discontinuous, free",
            side.word(),
            side.loose_word()
        ))
    };
    let columns =
        vec![edge("N", Side::North), edge("E", Side::East), edge("S", Side::South), edge("W", Side::West)];
    Column::group("Edges", columns)
}

fn loads<'a>() -> Vec<Column<'a, PanelRow<'a>>> {
    const UNIT: &str = "kN/m2";
    let columns = vec![
        Column::number("Self-weight", UNIT, 2, |r: &PanelRow<'_>| r.design.loads.self_weight_kn_m2)
            .key("self_weight_kn_m2")
            .means("thickness times density"),
        Column::number("Finishes", UNIT, 2, |r: &PanelRow<'_>| r.design.loads.finishes_kn_m2)
            .wide(7.5)
            .key("finishes_kn_m2")
            .means("finishes, counted as dead"),
        Column::number("Partitions", UNIT, 2, |r: &PanelRow<'_>| r.design.loads.partitions_kn_m2)
            .wide(8.8)
            .key("partitions_kn_m2")
            .means("partitions, counted as dead"),
        Column::number("Dead gk", UNIT, 2, |r: &PanelRow<'_>| r.design.loads.dead_kn_m2)
            .key("dead_kn_m2")
            .means("characteristic dead load: self-weight, finishes and partitions"),
        Column::number("Imposed qk", UNIT, 2, |r: &PanelRow<'_>| r.design.loads.imposed_kn_m2)
            .key("imposed_kn_m2")
            .means("characteristic imposed load"),
        Column::number("Ultimate n", UNIT, 2, |r: &PanelRow<'_>| r.design.loads.ultimate_kn_m2)
            .key("ultimate_kn_m2")
            .means("design ultimate load"),
    ];
    Column::group("Loads", columns)
}

fn bottom<'a>(group: &'static str, at: Place) -> Vec<Column<'a, PanelRow<'a>>> {
    let key = move |name: &str| Cow::from(format!("sections/{}/{name}", at.word(false)));
    let columns = vec![
        Column::number("Moment", "kNm/m", 2, move |r: &PanelRow<'_>| {
            r.section(at, |s| s.moment_knm_m).flatten()
        })
        .key(key("moment_knm_m"))
        .means("design moment at midspan; blank for distribution bars"),
        Column::number("d", "mm", 1, move |r: &PanelRow<'_>| r.section(at, |s| s.d_mm))
            .wide(6.2)
            .key(key("d_mm"))
            .means("effective depth from the bars provided"),
        Column::number("Steel required", "mm2/m", 0, move |r: &PanelRow<'_>| r.section(at, required))
            .wide(8.2)
            .key(key("as_required_mm2_m"))
            .means("the greater of bending and minimum steel; `too thin` where K exceeds K'"),
        Column::words("Bars", 12.0, move |r: &PanelRow<'_>| {
            r.section(at, |s| words::bars(r.criteria, s.bars, s.layer, s.stated))
        })
        .means("bars in words: type and size, spacing, layer; `stated` where the book chose them"),
        Column::number("Size", "mm", 0, move |r: &PanelRow<'_>| r.section(at, |s| s.bars.bar_mm))
            .wide(5.0)
            .key(key("bar_mm"))
            .means("bar size"),
        Column::number("Spacing", "mm", 0, move |r: &PanelRow<'_>| r.section(at, |s| s.bars.spacing_mm))
            .key(key("spacing_mm"))
            .means("spacing centre to centre"),
        Column::number("Steel provided", "mm2/m", 0, move |r: &PanelRow<'_>| {
            r.section(at, |s| s.as_provided_mm2_m)
        })
        .wide(8.2)
        .key(key("as_provided_mm2_m"))
        .means("steel area of the bars"),
    ];
    Column::group(group, columns)
}

fn required(section: &Section) -> Cell<'static> {
    section.as_required_mm2_m.map_or(Cell::from("too thin"), Cell::Number)
}

fn governing<'a>() -> Vec<Column<'a, PanelRow<'a>>> {
    let columns = vec![
        Column::words("Check", 11.0, |r: &PanelRow<'a>| r.design.governing_check().map(|check| check.kind.word()))
            .key("governing_check")
            .means("the governing check: the greatest ratio of bending, shear, deflection and bond; others where they fail"),
        Column::number("Ratio", "", 3, |r: &PanelRow<'_>| {
            r.design.governing_check().map(|check| check.ratio.map_or(Cell::from("not allowed"), Cell::Number))
        })
        .wide(7.0)
        .key("governing_ratio")
        .means("its demand over its limit; at most 1 passes"),
        Column::words("Thickness governed by", 11.0, |r: &PanelRow<'a>| {
            r.design.thickness_governed_by.map(CheckKind::word)
        })
        .key("thickness_governed_by")
        .means("the check that fails first when the panel is made thinner"),
        Column::number("Least thickness", "mm", 0, |r: &PanelRow<'_>| least_thickness(r.design))
            .wide(9.0)
            .key("least_thickness_mm")
            .means("where deflection fails: the least thickness that would do"),
    ];
    Column::group("Governing", columns)
}

fn least_thickness(design: &PanelDesign) -> Cell<'static> {
    let fails = design.checks.iter().any(|check| check.kind == CheckKind::Deflection && !check.ok);
    match design.least_thickness_mm {
        Some(least) => Cell::Number(least),
        None if fails => Cell::from("over 1000"),
        None => Cell::Blank,
    }
}
