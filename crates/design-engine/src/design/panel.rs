//! A panel's sections and checks put together.

use super::balance::{SupportMoment, balanced_midspans};
use super::bottom::{BottomBarsChosen, BottomTask};
use super::section::Trial;
use super::top::TopTask;
use super::view::View;
use crate::bs8110::cover::{DurabilityCover, durability, fire};
use crate::check::{Check, CheckKind, Place};
use crate::criteria::Criteria;
use crate::floor::{Axis, BarChoice, EdgeState, Layer, PanelId, Side, Span, SupportId, SupportSide};
use crate::result::{DeflectionWorking, Section};

/// Everything designed of one panel.
pub(crate) struct Assembled {
    pub(crate) sections: Vec<Section>,
    pub(crate) checks: Vec<Check>,
    pub(crate) deflection: DeflectionWorking,
}

/// What the supports around a panel were given.
pub(crate) struct SupportBars<'a> {
    pub(crate) task: TopTask<'a>,
    pub(crate) id: SupportId,
    pub(crate) side: Side,
    pub(crate) layer: Layer,
    pub(crate) bars: BarChoice,
}

/// Supports of a panel in the order of its sides and segments.
pub(crate) fn supports_of(view: &View<'_>, id: PanelId) -> Vec<(Side, SupportId)> {
    let panel = view.floor.panel(id);
    let mut found = Vec::new();
    for side in Side::ALL {
        for segment in &panel.edge(side).segments {
            if let Some(support) = segment.support.filter(|s| !found.contains(&(side, *s))) {
                found.push((side, support));
            }
        }
    }
    found
}

/// Bottom bars' task of a panel: design midspan = max(table, balanced).
pub(crate) fn bottom_task<'a>(
    view: &View<'a>,
    id: PanelId,
    t1_axis: Axis,
    candidates: &'a [BarChoice],
    moments: &dyn Fn(SupportId) -> Option<SupportMoment>,
) -> Option<BottomTask<'a>> {
    let fixed = view.fixed(id)?;
    let balanced = balanced_midspans(view, id, moments);
    let moments = [Span::Short, Span::Long].map(|span| {
        fixed.midspan_coefficient[span as usize].map(|_| fixed.midspan(span).max(balanced[span as usize]))
    });
    Some(BottomTask {
        panel: view.floor.panel(id),
        fixed,
        moments,
        t1_axis,
        criteria: view.criteria,
        candidates,
    })
}

/// Sections and checks of a panel from its bottom bars and the bars of its supports.
pub(crate) fn assemble(
    view: &View<'_>,
    id: PanelId,
    task: &BottomTask<'_>,
    bottom: BottomBarsChosen,
    supports: &[SupportBars<'_>],
    moments: &dyn Fn(SupportId) -> Option<SupportMoment>,
) -> Assembled {
    let balanced = balanced_midspans(view, id, moments);
    let mut sections = Vec::with_capacity(2 + supports.len());
    let mut checks = Vec::with_capacity(16 + 8 * supports.len());
    let outer_span = task.outer_span();
    for span in [Span::Short, Span::Long] {
        let outer_mm = if span == outer_span { 0.0 } else { bottom[outer_span as usize].bar_mm };
        let bars = bottom[span as usize];
        let trial = task.trial(span, bars, outer_mm);
        task.checks(span, bars, outer_mm, &mut |check| checks.push(check));
        let fixed = task.fixed;
        let table = fixed.midspan_coefficient[span as usize].map(|_| fixed.midspan(span));
        let mut section = section(&trial, view.criteria, fixed.basis.axis_of(span));
        section.layer = if span == outer_span { Layer::B1 } else { Layer::B2 };
        section.coefficient = fixed.midspan_coefficient[span as usize];
        section.moment_from_coefficient_knm_m = table;
        section.moment_balanced_knm_m = table.map(|_| balanced[span as usize]);
        sections.push(section);
    }
    for support in supports {
        let at = SupportSide { panel: id, side: support.side };
        let trial = support.task.seen_from(at, support.bars, &mut |check| checks.push(check));
        let mut section = section(&trial, view.criteria, support.side.span_axis());
        section.support = Some(support.id);
        section.layer = support.layer;
        section.coefficient = task.fixed.side_coefficient[support.side.index()];
        section.moment_from_coefficient_knm_m = section.coefficient.map(|c| c * task.fixed.unit_moment_knm_m);
        section.moment_balanced_knm_m = section.moment_knm_m;
        sections.push(section);
    }
    hogging_midspans(task, balanced, supports, &mut sections, &mut checks);
    panel_checks(task, &mut checks);
    let main = task.fixed.basis.main_span;
    let outer_mm = if main == outer_span { 0.0 } else { bottom[outer_span as usize].bar_mm };
    let (deflection, _) = task.deflection(&task.trial(main, bottom[main as usize], outer_mm));
    Assembled { sections, checks, deflection }
}

fn section(trial: &Trial, criteria: &Criteria, bars_along: Axis) -> Section {
    let flexure = trial.flexure(criteria);
    Section {
        at: trial.at,
        support: None,
        layer: Layer::B1,
        bars_along,
        coefficient: None,
        moment_from_coefficient_knm_m: None,
        moment_balanced_knm_m: None,
        moment_knm_m: trial.moment_knm_m,
        d_mm: trial.d_mm,
        k: flexure.map(|f| f.k),
        z_mm: flexure.and_then(|f| f.z_mm),
        as_bending_mm2_m: flexure.and_then(|f| f.as_mm2_m),
        as_minimum_mm2_m: trial.as_minimum(criteria),
        as_required_mm2_m: trial.as_required(criteria),
        bars: trial.bars,
        as_provided_mm2_m: trial.as_provided(),
        stated: trial.stated,
    }
}

/// Where a balanced midspan is below zero the span hogs throughout: a top section there, in the bars that run
/// through from the support with less steel.
fn hogging_midspans(
    task: &BottomTask<'_>,
    balanced: [f64; 2],
    supports: &[SupportBars<'_>],
    sections: &mut Vec<Section>,
    checks: &mut Vec<Check>,
) {
    for span in [Span::Short, Span::Long].into_iter().filter(|span| balanced[*span as usize] < 0.0) {
        let axis = task.fixed.basis.axis_of(span);
        let across = supports.iter().filter(|support| support.side.span_axis() == axis);
        let least = across.min_by(|a, b| {
            let area = |s: &SupportBars<'_>| s.bars.bar_mm * s.bars.bar_mm / s.bars.spacing_mm;
            area(a).total_cmp(&area(b))
        });
        let Some(support) = least else { continue };
        let at = if span == Span::Short { Place::ShortMidspan } else { Place::LongMidspan };
        let mut trial = support.task.trial(at, support.bars);
        trial.moment_knm_m = Some(-balanced[span as usize]);
        trial.checks(task.criteria, &mut |check| {
            if matches!(check.kind, CheckKind::Bending | CheckKind::MinimumSteel) {
                checks.push(check);
            }
        });
        let mut section = section(&trial, task.criteria, axis);
        section.layer = support.layer;
        section.moment_balanced_knm_m = Some(balanced[span as usize]);
        sections.push(section);
    }
}

/// Cover and thickness for durability and fire.
fn panel_checks(task: &BottomTask<'_>, checks: &mut Vec<Check>) {
    let criteria = task.criteria;
    for (at, cover) in
        [(Place::BottomFace, criteria.bottom_cover_mm), (Place::TopFace, criteria.top_cover_mm)]
    {
        checks.push(match durability(criteria.exposure, criteria.fcu_n_mm2) {
            DurabilityCover::Cover(needed) => {
                Check::at_most(CheckKind::CoverForDurability, at, "Table 3.3", needed, cover, "mm")
            }
            DurabilityCover::NotAllowedBelow(grade) => Check::not_allowed(
                CheckKind::CoverForDurability,
                at,
                "Table 3.3",
                grade,
                criteria.fcu_n_mm2,
                "N/mm2",
            ),
        });
    }
    let short_ends = task.fixed.basis.short_along.end_sides();
    let continuous = short_ends.iter().all(|side| task.panel.edge(*side).state == EdgeState::Continuous);
    let (cover, thickness) = fire(criteria.fire_resistance_h, continuous);
    checks.push(Check::at_most(
        CheckKind::CoverForFire,
        Place::BottomFace,
        "Table 3.4",
        cover,
        criteria.bottom_cover_mm,
        "mm",
    ));
    checks.push(Check::at_most(
        CheckKind::ThicknessForFire,
        Place::Panel,
        "figure 3.2",
        thickness,
        task.fixed.thickness_mm,
        "mm",
    ));
}

/// Index of the governing check: the greatest ratio among bending, shear, deflection and bond; the other
/// checks govern only where they fail. Ties go to the first.
pub(crate) fn governing(checks: &[Check]) -> Option<usize> {
    let weight = |check: &Check| check.ratio.unwrap_or(f64::INFINITY);
    let mut best: Option<usize> = None;
    for (index, check) in checks.iter().enumerate() {
        let counts = check.kind.may_govern_while_passing() || !check.ok;
        if counts && best.is_none_or(|b| weight(check) > weight(&checks[b]) * (1.0 + 1e-9)) {
            best = Some(index);
        }
    }
    best
}
