//! Supports of the results file: those that two panels share.

use design_engine::floor::{Floor, SupportKind};
use design_engine::result::{SupportDesign, SupportSideDesign};
use serde::Serialize;

use super::Rows;
use crate::write::numbers::Finite;
use crate::write::{Submission, words};

#[derive(Serialize)]
pub(super) struct SupportResult<'a> {
    support: Option<&'a str>,
    gridline: Option<&'a str>,
    axis: &'static str,
    from_m: Finite,
    to_m: Finite,
    length_m: Finite,
    width_mm: Finite,
    kind: &'static str,
    panels: [&'a str; 2],
    moments_from_coefficient_knm_m: [Option<Finite>; 2],
    difference_pct: Option<Finite>,
    balanced: bool,
    moment_knm_m: Option<Finite>,
    midspans_before_knm_m: [Option<Finite>; 2],
    midspans_after_knm_m: [Option<Finite>; 2],
    load_ratio: Option<Finite>,
    span_ratio: Option<Finite>,
    layer: &'static str,
    d_mm: Finite,
    bar_mm: Finite,
    spacing_mm: Finite,
    as_bending_mm2_m: Option<Finite>,
    as_required_mm2_m: Option<Finite>,
    as_provided_mm2_m: Finite,
    bars_stated: bool,
    extension_m: [Option<Finite>; 2],
    short_extension_m: [Option<Finite>; 2],
    alternate_reversed: bool,
}

pub(super) fn each<'a>(submission: &'a Submission<'a>) -> Rows<'a, SupportResult<'a>> {
    Box::new(submission.design.supports.iter().filter_map(|design| support_result(submission.floor, design)))
}

fn support_result<'a>(floor: &'a Floor, design: &'a SupportDesign) -> Option<SupportResult<'a>> {
    let support = floor.support(design.support);
    let panels = [support.near.panel, support.far?.panel];
    let per_side = |value: fn(&SupportSideDesign) -> Option<f64>| {
        panels.map(|panel| words::side_of(design, panel).and_then(value).map(Finite))
    };
    Some(SupportResult {
        support: support.name.as_deref(),
        gridline: support.gridline.as_deref(),
        axis: words::gridline_axis(support.axis),
        from_m: support.from.m().into(),
        to_m: support.to.m().into(),
        length_m: support.length_m().into(),
        width_mm: support.width_mm.into(),
        kind: match support.kind {
            SupportKind::Hogging => "hogging",
            SupportKind::Crossing => "crossing",
        },
        panels: panels.map(|panel| words::mark(floor, panel)),
        moments_from_coefficient_knm_m: per_side(|side| side.moment_from_coefficient_knm_m),
        difference_pct: design.difference_pct.map(Finite),
        balanced: design.balanced,
        moment_knm_m: design.moment_knm_m.map(Finite),
        midspans_before_knm_m: per_side(|side| Some(side.midspan_before_knm_m)),
        midspans_after_knm_m: per_side(|side| Some(side.midspan_after_knm_m)),
        load_ratio: design.load_ratio.map(Finite),
        span_ratio: design.span_ratio.map(Finite),
        layer: design.layer.word(),
        d_mm: design.d_mm.into(),
        bar_mm: design.bars.bar_mm.into(),
        spacing_mm: design.bars.spacing_mm.into(),
        as_bending_mm2_m: design.as_bending_mm2_m.map(Finite),
        as_required_mm2_m: design.as_required_mm2_m.map(Finite),
        as_provided_mm2_m: design.as_provided_mm2_m.into(),
        bars_stated: design.stated,
        extension_m: per_side(|side| Some(side.extension_m)),
        short_extension_m: per_side(|side| Some(side.short_extension_m)),
        alternate_reversed: design.alternate_reversed,
    })
}
