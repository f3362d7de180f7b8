//! Bars and quantities of the results file.

use std::collections::BTreeMap;

use design_engine::floor::Layer;
use detailing::model::ScheduledBar;
use detailing::notes::{BarPlace, places, support_name};
use serde::Serialize;

use super::Rows;
use crate::write::numbers::Finite;
use crate::write::{Submission, words};

#[derive(Serialize)]
pub(super) struct BarResult<'a> {
    mark: &'a str,
    r#type: &'a str,
    size_mm: Finite,
    members: usize,
    each: usize,
    total: usize,
    length_mm: Finite,
    shape: &'static str,
    a_mm: Option<Finite>,
    b_mm: Option<Finite>,
    c_mm: Option<Finite>,
    d_mm: Option<Finite>,
    e_r_mm: Option<Finite>,
    layer: &'static str,
    #[serde(rename = "use")]
    for_what: &'static str,
    spacing_mm: Option<Finite>,
    r#where: Vec<PlaceResult<'a>>,
    mass_kg: Finite,
}

#[derive(Serialize)]
struct PlaceResult<'a> {
    panel: Option<&'a str>,
    support: Option<String>,
    count: usize,
}

pub(super) fn each<'a>(submission: &'a Submission<'a>) -> Rows<'a, BarResult<'a>> {
    let places = places(submission.bars);
    Box::new(
        submission.bars.bars.iter().zip(places).map(|(bar, places)| bar_result(submission, bar, &places)),
    )
}

fn bar_result<'a>(
    submission: &'a Submission<'a>,
    bar: &'a ScheduledBar,
    places: &[BarPlace],
) -> BarResult<'a> {
    let floor = submission.floor;
    let [a_mm, b_mm, c_mm, d_mm, e_r_mm] = bar.bar.shape.dimensions().map(|mm| mm.map(Finite));
    let place = |place: &BarPlace| PlaceResult {
        panel: place.panel.map(|panel| words::mark(floor, panel)),
        support: place.support.map(|support| support_name(floor, floor.support(support))),
        count: place.count,
    };
    BarResult {
        mark: &bar.mark,
        r#type: submission.book.criteria.bar_type_letter(),
        size_mm: bar.bar.size_mm.into(),
        members: 1,
        each: bar.count,
        total: bar.count,
        length_mm: bar.length_mm.into(),
        shape: bar.bar.shape.code(),
        a_mm,
        b_mm,
        c_mm,
        d_mm,
        e_r_mm,
        layer: Layer::word(bar.layer),
        for_what: bar.for_what.word(),
        spacing_mm: bar.spacing_mm.map(Finite),
        r#where: places.iter().map(place).collect(),
        mass_kg: bar.mass_kg.into(),
    }
}

#[derive(Serialize)]
pub(super) struct QuantitiesResult {
    concrete_m3: Finite,
    formwork_m2: Finite,
    steel_kg: Finite,
    steel_kg_by_size: BTreeMap<String, Finite>,
    steel_kg_by_use: BTreeMap<&'static str, Finite>,
    laps_kg: Finite,
    trimmers_kg: Finite,
    steel_kg_m3: Option<Finite>,
    steel_kg_m2: Option<Finite>,
}

pub(super) fn quantities(submission: &Submission<'_>) -> QuantitiesResult {
    let quantities = &submission.bars.quantities;
    QuantitiesResult {
        concrete_m3: quantities.concrete_m3.into(),
        formwork_m2: quantities.formwork_m2.into(),
        steel_kg: quantities.steel_kg.into(),
        steel_kg_by_size: quantities
            .steel_kg_by_size
            .iter()
            .map(|(size, kg)| (size.to_string(), Finite(*kg)))
            .collect(),
        steel_kg_by_use: quantities
            .steel_kg_by_use
            .iter()
            .map(|(for_what, kg)| (for_what.word(), Finite(*kg)))
            .collect(),
        laps_kg: quantities.laps_kg.into(),
        trimmers_kg: quantities.trimmers_kg.into(),
        steel_kg_m3: quantities.steel_kg_m3().map(Finite),
        steel_kg_m2: quantities.steel_kg_m2().map(Finite),
    }
}
