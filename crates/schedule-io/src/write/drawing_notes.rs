//! Sheet `Drawing notes`: general notes, then the lines to put on the plan for each panel and each support.

use design_engine::bs8110::bond::{LapPlace, lap_mm};
use design_engine::criteria::{Criteria, Value, setting};
use detailing::callouts::callouts;
use detailing::model::{BarSet, Use};
use detailing::notes::{placing, support_name};
use rust_xlsxwriter::Worksheet;

use super::column::Column;
use super::look::Tone;
use super::sink::lay_down;
use super::{Submission, WriteError, words};

pub(super) const NAME: &str = "Drawing notes";
const FROZEN_COLUMNS: u16 = 1;

/// A line of the notes.
pub(crate) struct NoteRow {
    about: String,
    what: String,
    callout: String,
    placing: String,
}

/// Every line: general notes, panels in the order of the book, supports in plan order.
pub(super) fn rows(submission: &Submission<'_>) -> Vec<NoteRow> {
    let mut rows: Vec<NoteRow> = general(&submission.book.criteria)
        .into_iter()
        .map(|(what, text)| NoteRow {
            about: "General".to_owned(),
            what: what.to_owned(),
            callout: String::new(),
            placing: text,
        })
        .collect();
    let floor = submission.floor;
    let mut of_panels: Vec<Vec<&BarSet>> = vec![Vec::new(); floor.panels.len()];
    let over_supports = || submission.bars.sets.iter().filter(|set| set.for_what == Use::OverSupport);
    for set in submission.bars.sets.iter().filter(|set| set.for_what != Use::OverSupport) {
        of_panels[set.panel.0].push(set);
    }
    for (panel, sets) in floor.panels.iter().zip(&of_panels) {
        let about = format!("Panel {}", panel.mark);
        sets.iter().for_each(|set| lines(submission, &about, set, &mut rows));
    }
    let mut supports: Vec<&BarSet> = over_supports().collect();
    supports.sort_by_key(|set| set.supports.first().copied());
    for set in supports {
        let names: Vec<String> =
            set.supports.iter().map(|id| support_name(floor, floor.support(*id))).collect();
        lines(submission, &format!("Support {}", names.join(" and ")), set, &mut rows);
    }
    rows
}

fn lines(submission: &Submission<'_>, about: &str, set: &BarSet, rows: &mut Vec<NoteRow>) {
    let criteria = &submission.book.criteria;
    let text = placing(submission.floor, submission.design, submission.bars, set, criteria);
    for (index, callout) in callouts(submission.bars, set, criteria).into_iter().enumerate() {
        rows.push(NoteRow {
            about: about.to_owned(),
            what: set.for_what.word().to_owned(),
            callout: callout.text,
            placing: if index == 0 { text.clone() } else { with_the_line_above(set).to_owned() },
        });
    }
}

/// What a further mark of a set is.
fn with_the_line_above(set: &BarSet) -> &'static str {
    match set.for_what {
        Use::Edge => "with the line above: longer next to the corners, or cut at openings",
        Use::Bottom => "with the line above: alternate bars that stop short, or bars cut at openings",
        _ => "with the line above",
    }
}

/// The general notes of a drawing, from the criteria.
fn general(criteria: &Criteria) -> Vec<(&'static str, String)> {
    let letter = criteria.bar_type_letter();
    let exposure = match setting("exposure").map(|setting| criteria.value(setting)) {
        Some(Value::Text(text)) => text,
        _ => String::new(),
    };
    let lap = |size: f64, top: bool| {
        let cover_mm = if top { criteria.top_cover_mm } else { criteria.bottom_cover_mm };
        lap_mm(size, LapPlace { top_as_cast: top, cover_mm, clear_between_mm: f64::INFINITY }, criteria)
    };
    let laps: Vec<String> = criteria
        .bar_sizes_mm
        .iter()
        .map(|size| format!("{letter}{size} {:.0} bottom, {:.0} top", lap(*size, false), lap(*size, true)))
        .collect();
    vec![
        (
            "concrete",
            format!(
                "Cube strength {} N/mm², maximum aggregate {} mm. Exposure {}, fire resistance {} h.",
                criteria.fcu_n_mm2,
                criteria.maximum_aggregate_mm,
                exposure,
                criteria.fire_resistance_h
            ),
        ),
        ("reinforcement", format!("Type {letter}: fy = {} N/mm². Bending to BS 8666:2005.", criteria.fy_n_mm2)),
        (
            "cover",
            format!(
                "Nominal cover to the outermost bar: bottom {} mm, top {} mm, ends of bars the same.",
                criteria.bottom_cover_mm, criteria.top_cover_mm
            ),
        ),
        ("laps", format!("Laps in mm where none is given: {}.", laps.join("; "))),
        ("layers", format!("{}.", words::layer_key())),
        (
            "callouts",
            "Number, type and size, mark, spacing in mm, layer; ABR: alternate bars reversed. The first and last bar \
             of a run lie 50 mm from the faces of the supports at its ends."
                .to_owned(),
        ),
        (
            "corners",
            "Bars at corners lie between those that are there, over a fifth of the short span from both edges.".to_owned(),
        ),
        (
            "holes",
            "Holes under 300 mm: move bars aside, cut none. Larger holes: only those shown; any other to be asked for \
             before bars are cut."
                .to_owned(),
        ),
        (
            "top bars",
            "Top bars are held up at their level, on chairs spaced by the contractor, before concrete is placed.".to_owned(),
        ),
        ("review", super::title_block::CAUTION.join(" ")),
    ]
}

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    let rows = rows(submission);
    lay_down(worksheet, NAME, &columns(), FROZEN_COLUMNS, rows.iter().map(|row| (Tone::Plain, row)))
}

pub(super) fn columns<'a>() -> Vec<Column<'a, &'a NoteRow>> {
    vec![
        Column::words("About", 20.0, |r: &&'a NoteRow| r.about.as_str())
            .means("the drawing as a whole, a panel, or a support"),
        Column::words("What", 26.0, |r: &&'a NoteRow| r.what.as_str()).means("what the bars are for"),
        Column::words("Bars", 26.0, |r: &&'a NoteRow| r.callout.as_str())
            .means("callout: number, type and size, mark, spacing, layer"),
        Column::words("Placing", 120.0, |r: &&'a NoteRow| r.placing.as_str())
            .means("where the bars begin and end; the text of a general note"),
    ]
}
