//! Corners, openings and loads on supports in the results file.

use serde::Serialize;

use super::super::numbers::Finite;
use super::super::openings::{self, OpeningRow};
use super::super::{Submission, beam_loads};
use super::Rows;

/// Four layers of steel.
#[derive(Serialize)]
pub(super) struct Layers {
    bottom_x: Finite,
    bottom_y: Finite,
    top_x: Finite,
    top_y: Finite,
}

impl From<[f64; 4]> for Layers {
    fn from(steel: [f64; 4]) -> Self {
        let [bottom_x, bottom_y, top_x, top_y] = steel.map(Finite);
        Layers { bottom_x, bottom_y, top_x, top_y }
    }
}

#[derive(Serialize)]
pub(super) struct CornerResult<'a> {
    panel: &'a str,
    corner: String,
    state: &'static str,
    extent_m: Finite,
    as_required_mm2_m: Finite,
    as_present_mm2_m: Layers,
    as_to_add_mm2_m: Layers,
}

pub(super) fn each_corner<'a>(submission: &'a Submission<'a>) -> Rows<'a, CornerResult<'a>> {
    Box::new(submission.design.panels.iter().flat_map(move |design| {
        let panel = submission.floor.panel(design.panel);
        design.corners.iter().map(move |corner| CornerResult {
            panel: &panel.mark,
            corner: corner.name(),
            state: corner.state.word(),
            extent_m: corner.extent_m.into(),
            as_required_mm2_m: corner.as_required_mm2_m.into(),
            as_present_mm2_m: corner.as_present_mm2_m.into(),
            as_to_add_mm2_m: corner.as_to_add_mm2_m.into(),
        })
    }))
}

/// One opening and one layer it cuts.
#[derive(Serialize)]
pub(super) struct OpeningResult<'a> {
    panel: &'a str,
    number: Finite,
    result: &'static str,
    displaced: bool,
    over_quarter_of_span: bool,
    within_d_of_support: bool,
    from_west_m: Finite,
    from_south_m: Finite,
    width_x_m: Finite,
    width_y_m: Finite,
    layer: Option<&'static str>,
    at: Option<&'static str>,
    bars_along: Option<&'static str>,
    bar_mm: Option<Finite>,
    spacing_mm: Option<Finite>,
    cut: Option<Finite>,
    each_side_mm2: Option<Finite>,
}

pub(super) fn each_opening<'a>(submission: &'a Submission<'a>) -> Rows<'a, OpeningResult<'a>> {
    Box::new(openings::rows(submission).map(|row: OpeningRow<'a>| OpeningResult {
        panel: &row.panel.mark,
        number: f64::from(row.number).into(),
        result: openings::result_words(row.opening),
        displaced: row.opening.displaced,
        over_quarter_of_span: row.opening.over_quarter_of_span,
        within_d_of_support: row.opening.within_d_of_support,
        from_west_m: row.opening.opening.from_west_m.into(),
        from_south_m: row.opening.opening.from_south_m.into(),
        width_x_m: row.opening.opening.widths_m[0].into(),
        width_y_m: row.opening.opening.widths_m[1].into(),
        layer: row.layer.map(|cut| cut.layer.word()),
        at: row.layer.map(|cut| cut.at.word(row.panel.is_loose())),
        bars_along: row.layer.map(|cut| cut.bars_along.word()),
        bar_mm: row.layer.map(|cut| cut.bars.bar_mm.into()),
        spacing_mm: row.layer.map(|cut| cut.bars.spacing_mm.into()),
        cut: row.layer.map(|cut| cut.cut.into()),
        each_side_mm2: row.layer.map(|cut| cut.each_side_mm2.into()),
    }))
}

#[derive(Serialize)]
pub(super) struct BeamLoadResult<'a> {
    gridline: Option<String>,
    from: Option<String>,
    to: Option<String>,
    panel: &'a str,
    side: &'static str,
    dead_kn_m: Finite,
    imposed_kn_m: Finite,
    ultimate_kn_m: Finite,
    edge_m: Finite,
    loaded_length_m: Finite,
    total_ultimate_kn: Finite,
}

pub(super) fn each_beam_load<'a>(submission: &'a Submission<'a>) -> Rows<'a, BeamLoadResult<'a>> {
    Box::new(beam_loads::loads(submission).rows.into_iter().map(|load| {
        let panel = submission.floor.panel(load.panel);
        let total = load.total_ultimate_kn();
        let (from, to) = load.between.map(|[from, to]| (from, to)).unzip();
        BeamLoadResult {
            gridline: load.gridline,
            from,
            to,
            panel: &panel.mark,
            side: panel.side_word(load.side),
            dead_kn_m: load.load.dead_kn_m.into(),
            imposed_kn_m: load.load.imposed_kn_m.into(),
            ultimate_kn_m: load.load.ultimate_kn_m.into(),
            edge_m: (load.to - load.from).m().into(),
            loaded_length_m: load.loaded_length_m.into(),
            total_ultimate_kn: total.into(),
        }
    }))
}

/// The two sums of the loads on supports, and their difference as a share of the panels' load.
#[derive(Serialize)]
pub(super) struct BeamLoadsTotal {
    on_supports_kn: Finite,
    on_panels_kn: Finite,
    difference: Finite,
}

pub(super) fn beam_loads_total(submission: &Submission<'_>) -> BeamLoadsTotal {
    let loads = beam_loads::loads(submission);
    BeamLoadsTotal {
        on_supports_kn: loads.on_supports_kn.into(),
        on_panels_kn: loads.on_panels_kn.into(),
        difference: loads.difference().into(),
    }
}
