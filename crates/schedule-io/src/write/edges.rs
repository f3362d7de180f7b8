//! Sheet `Edges`: one row per stretch of a panel's edge, with the reason for its state.

use design_engine::floor::{Edge, EdgeState, Floor, Panel, Segment, Side};
use rust_xlsxwriter::Worksheet;

use super::column::Column;
use super::look::Tone;
use super::sink::lay_down;
use super::{Submission, WriteError, words};

pub(super) const NAME: &str = "Edges";
const FROZEN_COLUMNS: u16 = 2;

pub(super) struct EdgeRow<'a> {
    floor: &'a Floor,
    panel: &'a Panel,
    side: Side,
    edge: &'a Edge,
    segment: &'a Segment,
    /// State of the edge as it counts in the panel's own case; none where the panel is not designed.
    own: Option<EdgeState>,
}

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    let floor = submission.floor;
    let rows = submission.design.panels.iter().flat_map(|design| {
        let panel = floor.panel(design.panel);
        let basis = design.basis.filter(|_| design.not_designed.is_none());
        Side::ALL.into_iter().flat_map(move |side| {
            let edge = panel.edge(side);
            let own = basis.map(|basis| basis.state(side));
            edge.segments
                .iter()
                .map(move |segment| (Tone::Plain, EdgeRow { floor, panel, side, edge, segment, own }))
        })
    });
    lay_down(worksheet, NAME, &columns(), FROZEN_COLUMNS, rows)
}

/// What the design assumes of an edge beyond its state.
fn assumption(row: &EdgeRow<'_>) -> Option<&'static str> {
    match (row.own?, row.edge.state) {
        (_, EdgeState::PartlyContinuous) => Some(
            "panel designed with this edge discontinuous; each shared stretch has the moment and shear of the case \
             with it continuous",
        ),
        (EdgeState::Discontinuous | EdgeState::PartlyContinuous, EdgeState::Continuous) => {
            Some("against a cantilever: counts as discontinuous in the panel's own case")
        }
        _ if row.edge.stated => Some("as stated in the book, whatever the layout shows"),
        _ => None,
    }
}

pub(super) fn columns<'a>() -> Vec<Column<'a, EdgeRow<'a>>> {
    let mut columns = vec![
        Column::mark("Panel", |r: &EdgeRow<'a>| r.panel.mark.as_str())
            .key("panel")
            .means("mark of the panel"),
        Column::mark("Edge", |r: &EdgeRow<'_>| r.panel.side_word(r.side))
            .wide(13.0)
            .key("side")
            .means("side of the panel; long and short edges of a loose panel"),
    ];
    columns.extend(Column::group(
        "Stretch",
        vec![
            Column::number("From", "m", 3, |r: &EdgeRow<'_>| r.segment.from.m())
                .key("from_m")
                .means("start along the edge's line"),
            Column::number("To", "m", 3, |r: &EdgeRow<'_>| r.segment.to.m())
                .key("to_m")
                .means("end along the edge's line"),
            Column::mark("Neighbour", |r: &EdgeRow<'a>| {
                r.segment.neighbour.map(|neighbour| words::mark(r.floor, neighbour))
            })
            .wide(11.0)
            .key("neighbour")
            .means("panel on the other side"),
            Column::mark("State", |r: &EdgeRow<'_>| words::segment_state(r.edge, r.segment))
                .wide(15.0)
                .key("state")
                .means("whether hogging moment is carried across this stretch"),
            Column::words("Reason", 60.0, |r: &EdgeRow<'a>| r.segment.why.as_str())
                .key("why")
                .means("why, in words"),
            Column::mark("Support", |r: &EdgeRow<'a>| words::shared_name(r.floor, r.segment.support))
                .wide(12.0)
                .key("support")
                .means("support whose top bars cross it"),
        ],
    ));
    columns.extend(Column::group(
        "Whole edge",
        vec![
            Column::mark("Edge is", |r: &EdgeRow<'_>| r.edge.state.word())
                .wide(17.0)
                .means("state of the edge as a whole"),
            Column::short("Stated", 7.5, |r: &EdgeRow<'_>| if r.edge.stated { "stated" } else { "found" })
                .means("`stated` where the book states the edge, `found` where the layout gives it"),
            Column::words("Reason for the edge", 50.0, |r: &EdgeRow<'a>| {
                Some(r.edge.why.as_str()).filter(|why| *why != r.segment.why)
            })
            .means("why, in words, where it is not that of the stretch; of a stated edge the book's remark"),
            Column::words("Assumption", 44.0, |r: &EdgeRow<'_>| assumption(r).map(str::to_owned))
                .means("what the design assumes of the edge where it is not simply what the layout found"),
            Column::number("Support width", "mm", 0, |r: &EdgeRow<'_>| r.edge.support_width_mm)
                .means("width of the beam or wall under it"),
        ],
    ));
    columns
}
