//! Panels of the results file: geometry, edges, loads, sections, checks.

use design_engine::check::{Check, CheckKind};
use design_engine::floor::{Floor, Panel, Segment, Side};
use design_engine::result::{DeflectionWorking, PanelDesign, Section};
use serde::{Serialize, Serializer};

use super::Rows;
use crate::write::numbers::Finite;
use crate::write::{Submission, words};

#[derive(Serialize)]
pub(super) struct PanelResult<'a> {
    panel: &'a str,
    x0_m: Option<Finite>,
    x1_m: Option<Finite>,
    y0_m: Option<Finite>,
    y1_m: Option<Finite>,
    short_span_along: Option<&'static str>,
    lx_m: Option<Finite>,
    ly_m: Option<Finite>,
    span_ratio: Option<Finite>,
    action: Option<&'static str>,
    case_number: Option<usize>,
    case: Option<&'static str>,
    edges: Edges<'a>,
    thickness_mm: Finite,
    self_weight_kn_m2: Finite,
    finishes_kn_m2: Finite,
    partitions_kn_m2: Finite,
    dead_kn_m2: Finite,
    imposed_kn_m2: Finite,
    ultimate_kn_m2: Finite,
    sections: Vec<SectionResult<'a>>,
    checks: Vec<CheckResult>,
    deflection: Option<DeflectionResult>,
    governing_check: Option<&'static str>,
    governing_ratio: Option<Finite>,
    thickness_governed_by: Option<&'static str>,
    least_thickness_mm: Option<Finite>,
    not_designed: Option<&'a str>,
    ok: bool,
}

/// The four edges by the names of the sides.
struct Edges<'a> {
    floor: &'a Floor,
    panel: &'a Panel,
    design: &'a PanelDesign,
}

#[derive(Serialize)]
struct EdgeResult<'a> {
    state: &'static str,
    why: &'a str,
    stated: bool,
    neighbours: Vec<&'a str>,
}

impl Serialize for Edges<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.collect_map(Side::ALL.into_iter().map(|side| {
            let edge = self.panel.edge(side);
            let mut neighbours: Vec<&str> = Vec::new();
            for neighbour in edge.segments.iter().filter_map(|segment| segment.neighbour) {
                let mark = words::mark(self.floor, neighbour);
                if !neighbours.contains(&mark) {
                    neighbours.push(mark);
                }
            }
            let state = self.design.edge_states[side.index()].word();
            (
                self.panel.side_word(side),
                EdgeResult { state, why: &edge.why, stated: edge.stated, neighbours },
            )
        }))
    }
}

#[derive(Serialize)]
struct SectionResult<'a> {
    at: &'static str,
    support: Option<&'a str>,
    from_m: Option<Finite>,
    to_m: Option<Finite>,
    face: &'static str,
    layer: &'static str,
    bars_along: Option<&'static str>,
    coefficient: Option<Finite>,
    moment_from_coefficient_knm_m: Option<Finite>,
    moment_balanced_knm_m: Option<Finite>,
    moment_knm_m: Option<Finite>,
    d_mm: Finite,
    k: Option<Finite>,
    z_mm: Option<Finite>,
    as_bending_mm2_m: Option<Finite>,
    as_minimum_mm2_m: Finite,
    as_required_mm2_m: Option<Finite>,
    bar_mm: Finite,
    spacing_mm: Finite,
    as_provided_mm2_m: Finite,
    bars_stated: bool,
}

impl<'a> SectionResult<'a> {
    fn of(floor: &'a Floor, panel: &Panel, section: &Section) -> SectionResult<'a> {
        let loose = panel.is_loose();
        let support = section.support.map(|support| floor.support(support));
        SectionResult {
            at: section.at.word(loose),
            support: words::shared_name(floor, section.support),
            from_m: support.map(|support| support.from.m().into()),
            to_m: support.map(|support| support.to.m().into()),
            face: words::face(section.layer),
            layer: section.layer.word(),
            bars_along: (!loose).then(|| section.bars_along.word()),
            coefficient: section.coefficient.map(Finite),
            moment_from_coefficient_knm_m: section.moment_from_coefficient_knm_m.map(Finite),
            moment_balanced_knm_m: section.moment_balanced_knm_m.map(Finite),
            moment_knm_m: section.moment_knm_m.map(Finite),
            d_mm: section.d_mm.into(),
            k: section.k.map(Finite),
            z_mm: section.z_mm.map(Finite),
            as_bending_mm2_m: section.as_bending_mm2_m.map(Finite),
            as_minimum_mm2_m: section.as_minimum_mm2_m.into(),
            as_required_mm2_m: section.as_required_mm2_m.map(Finite),
            bar_mm: section.bars.bar_mm.into(),
            spacing_mm: section.bars.spacing_mm.into(),
            as_provided_mm2_m: section.as_provided_mm2_m.into(),
            bars_stated: section.stated,
        }
    }
}

#[derive(Serialize)]
struct CheckResult {
    check: &'static str,
    at: &'static str,
    clause: &'static str,
    demand: Finite,
    limit: Finite,
    unit: &'static str,
    ratio: Option<Finite>,
    ok: bool,
}

impl CheckResult {
    fn of(panel: &Panel, check: &Check) -> CheckResult {
        CheckResult {
            check: check.kind.word(),
            at: check.at.word(panel.is_loose()),
            clause: check.clause,
            demand: check.demand.into(),
            limit: check.limit.into(),
            unit: check.unit,
            ratio: check.ratio.map(Finite),
            ok: check.ok,
        }
    }
}

#[derive(Serialize)]
struct DeflectionResult {
    basic_span_depth: Finite,
    fs_n_mm2: Finite,
    modification_factor: Finite,
}

impl From<DeflectionWorking> for DeflectionResult {
    fn from(working: DeflectionWorking) -> Self {
        DeflectionResult {
            basic_span_depth: working.basic.into(),
            fs_n_mm2: working.fs_n_mm2.into(),
            modification_factor: working.modification_factor.into(),
        }
    }
}

pub(super) fn each<'a>(submission: &'a Submission<'a>) -> Rows<'a, PanelResult<'a>> {
    Box::new(submission.design.panels.iter().map(|design| panel_result(submission.floor, design)))
}

fn panel_result<'a>(floor: &'a Floor, design: &'a PanelDesign) -> PanelResult<'a> {
    let panel = floor.panel(design.panel);
    let loose = panel.is_loose();
    let basis = design.basis.as_ref();
    let case = basis.and_then(|basis| basis.case);
    let governing = design.governing_check();
    PanelResult {
        panel: &panel.mark,
        x0_m: panel.plan.map(|plan| plan.x0.m().into()),
        x1_m: panel.plan.map(|plan| plan.x1.m().into()),
        y0_m: panel.plan.map(|plan| plan.y0.m().into()),
        y1_m: panel.plan.map(|plan| plan.y1.m().into()),
        short_span_along: basis.filter(|_| !loose).map(|basis| basis.short_along.word()),
        lx_m: basis.map(|basis| basis.lx_m.into()),
        ly_m: basis.map(|basis| basis.ly_m.into()),
        span_ratio: basis.map(|basis| basis.span_ratio().into()),
        action: basis.map(|basis| basis.action.word()),
        case_number: case.map(|case| case.number()),
        case: case.map(|case| case.words()),
        edges: Edges { floor, panel, design },
        thickness_mm: panel.thickness_mm.into(),
        self_weight_kn_m2: design.loads.self_weight_kn_m2.into(),
        finishes_kn_m2: design.loads.finishes_kn_m2.into(),
        partitions_kn_m2: design.loads.partitions_kn_m2.into(),
        dead_kn_m2: design.loads.dead_kn_m2.into(),
        imposed_kn_m2: design.loads.imposed_kn_m2.into(),
        ultimate_kn_m2: design.loads.ultimate_kn_m2.into(),
        sections: design.sections.iter().map(|section| SectionResult::of(floor, panel, section)).collect(),
        checks: design.checks.iter().map(|check| CheckResult::of(panel, check)).collect(),
        deflection: design.deflection.map(DeflectionResult::from),
        governing_check: governing.map(|check| check.kind.word()),
        governing_ratio: governing.and_then(|check| check.ratio).map(Finite),
        thickness_governed_by: design.thickness_governed_by.map(CheckKind::word),
        least_thickness_mm: design.least_thickness_mm.map(Finite),
        not_designed: design.not_designed.as_deref(),
        ok: design.ok(),
    }
}

#[derive(Serialize)]
pub(super) struct SegmentResult<'a> {
    panel: &'a str,
    side: &'static str,
    from_m: Finite,
    to_m: Finite,
    neighbour: Option<&'a str>,
    state: &'static str,
    why: &'a str,
    stated: bool,
    support: Option<&'a str>,
}

pub(super) fn each_segment<'a>(submission: &'a Submission<'a>) -> Rows<'a, SegmentResult<'a>> {
    let floor = submission.floor;
    Box::new(floor.panels.iter().flat_map(move |panel| {
        Side::ALL.into_iter().flat_map(move |side| {
            let edge = panel.edge(side);
            let segment_result = move |segment: &'a Segment| SegmentResult {
                panel: &panel.mark,
                side: panel.side_word(side),
                from_m: segment.from.m().into(),
                to_m: segment.to.m().into(),
                neighbour: segment.neighbour.map(|neighbour| words::mark(floor, neighbour)),
                state: words::segment_state(edge, segment),
                why: &segment.why,
                stated: edge.stated,
                support: words::shared_name(floor, segment.support),
            };
            edge.segments.iter().map(segment_result)
        })
    }))
}
