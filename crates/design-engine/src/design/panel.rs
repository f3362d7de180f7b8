//! A panel's sections and checks put together.

use super::balance::{SupportMoment, balanced_midspans};
use super::bottom::{BottomBarsChosen, BottomTask, deflection_check};
use super::fixed::Fixed;
use super::section::{Trial, layers_fit, worst_ratio};
use super::top::{SideTask, TopTask};
use super::view::View;
use crate::bs8110::cover::{DurabilityCover, durability, fire};
use crate::bs8110::flexure::K_LIMIT;
use crate::bs8110::spacing::BETA_B_MIDSPAN;
use crate::bs8110::strip::{StripSpan, beyond_back_span};
use crate::check::{Check, CheckKind, Place};
use crate::choose::{Score, best, cost};
use crate::criteria::Criteria;
use crate::floor::{Axis, BarChoice, EdgeState, Layer, PanelId, Side, Span, SupportId, SupportSide};
use crate::result::{Action, DeflectionWorking, Section};

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
    let fixed = view.fixed(id).filter(|fixed| fixed.basis.action != Action::Cantilever)?;
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
    support_sections(view.criteria, id, task.fixed, supports, &mut sections, &mut checks);
    hogging_midspans(task, balanced, supports, &mut sections, &mut checks);
    uplift_checks(view, id, task.fixed, supports, &mut checks);
    panel_checks(view.criteria, task.fixed, &mut checks);
    checks.push(layers_fit(&sections, task.fixed.thickness_mm, view.criteria));
    let main = task.fixed.basis.main_span;
    let outer_mm = if main == outer_span { 0.0 } else { bottom[outer_span as usize].bar_mm };
    let (deflection, _) = task.deflection(&task.trial(main, bottom[main as usize], outer_mm));
    Assembled { sections, checks, deflection }
}

/// Sections and checks at a panel's supports.
fn support_sections(
    criteria: &Criteria,
    id: PanelId,
    fixed: &Fixed,
    supports: &[SupportBars<'_>],
    sections: &mut Vec<Section>,
    checks: &mut Vec<Check>,
) {
    for support in supports {
        let at = SupportSide { panel: id, side: support.side };
        let trial = support.task.seen_from(at, support.bars, &mut |check| checks.push(check));
        let mut section = section(&trial, criteria, support.side.span_axis());
        section.support = Some(support.id);
        section.layer = support.layer;
        // Crossing bars claim no moment, whatever the edge has elsewhere.
        section.coefficient =
            fixed.side_coefficient[support.side.index()].filter(|_| trial.moment_knm_m.is_some());
        section.moment_from_coefficient_knm_m = section.coefficient.map(|_| fixed.side(support.side));
        section.moment_balanced_knm_m = section.moment_knm_m;
        sections.push(section);
    }
}

/// Sections and checks of a cantilever: its root, and distribution bars in the other top layer.
pub(crate) fn assemble_cantilever(
    view: &View<'_>,
    id: PanelId,
    t1_axis: Axis,
    candidates: &[BarChoice],
    supports: &[SupportBars<'_>],
) -> Option<Assembled> {
    let fixed = view.fixed(id)?;
    let (mut sections, mut checks) = (Vec::new(), Vec::new());
    let (bars, trial) = distribution(view, fixed, t1_axis, candidates, supports)?;
    trial.checks(view.criteria, &mut |check| checks.push(check));
    let axis = fixed.basis.axis_of(fixed.basis.main_span.other());
    let mut spread = section(&trial, view.criteria, axis);
    spread.layer = if axis == t1_axis { Layer::T1 } else { Layer::T2 };
    spread.bars = bars;
    sections.push(spread);
    support_sections(view.criteria, id, fixed, supports, &mut sections, &mut checks);
    panel_checks(view.criteria, fixed, &mut checks);
    checks.push(layers_fit(&sections, fixed.thickness_mm, view.criteria));
    let root = supports.first()?;
    let root = root.task.trial(Place::Side(root.side), root.bars);
    Some(Assembled { sections, checks, deflection: deflection_check(view.criteria, fixed, &root).0 })
}

/// Distribution bars of a cantilever: minimum steel along its root, least mass.
pub(crate) fn distribution(
    view: &View<'_>,
    fixed: &Fixed,
    t1_axis: Axis,
    candidates: &[BarChoice],
    supports: &[SupportBars<'_>],
) -> Option<(BarChoice, Trial)> {
    let criteria = view.criteria;
    let span = fixed.basis.main_span.other();
    let outermost = fixed.basis.axis_of(span) == t1_axis;
    let root_bar = supports.iter().map(|support| support.bars.bar_mm).fold(0.0, f64::max);
    let cover = criteria.top_cover_mm + if outermost { 0.0 } else { root_bar };
    let trial = |bars: BarChoice| Trial {
        at: Place::TopFace,
        bars,
        stated: false,
        moment_knm_m: None,
        floor_steel_mm2_m: 0.0,
        d_mm: (fixed.thickness_mm - cover - bars.bar_mm / 2.0).max(1.0),
        h_mm: fixed.thickness_mm,
        least_h_mm: fixed.thickness_mm,
        cover_to_bars_mm: cover,
        nominal_cover_mm: criteria.top_cover_mm,
        k_limit: K_LIMIT,
        beta_b: BETA_B_MIDSPAN,
    };
    let scored = candidates.iter().map(|bars| {
        let trial = trial(*bars);
        let worst_ratio = worst_ratio(|give| trial.checks(criteria, give));
        (*bars, Score { worst_ratio, cost_kg: cost(trial.as_provided(), 1.0, 1.0) })
    });
    best(scored).map(|(bars, _)| (bars, trial(bars)))
}

/// The cantilever across a support of a panel, if there is one.
fn cantilever_beyond<'a>(support: &SupportBars<'a>, id: PanelId) -> Option<SideTask<'a>> {
    support.task.cantilever().filter(|side| side.at.panel != id).copied()
}

/// Where a cantilever stands out from a panel, or a one-way span ends: the moment at its support against what the
/// panel's own dead load holds down at the far support, both as reactions there (statics). A cantilever on the far
/// side helps with its dead load alone; a span that goes on there by the three-moment equations, its far end simple
/// where it is discontinuous and built in elsewhere.
fn uplift_checks(
    view: &View<'_>,
    id: PanelId,
    fixed: &Fixed,
    supports: &[SupportBars<'_>],
    checks: &mut Vec<Check>,
) {
    let one_way = (fixed.basis.action == Action::OneWay).then(|| fixed.basis.axis_of(fixed.basis.main_span));
    for support in supports {
        let far = support.side.opposite();
        let moment = match cantilever_beyond(support, id) {
            Some(loaded) => Some(loaded.fixed.side(loaded.at.side)),
            // A strip's interior supports keep their dead load.
            None if one_way == Some(far.span_axis()) && fixed.basis.state(far) != EdgeState::Continuous => {
                support.task.trial(Place::Panel, support.bars).moment_knm_m
            }
            None => None,
        };
        let Some(moment) = moment else { continue };
        let l_m = fixed.basis.length_m(fixed.basis.span_along(far.span_axis()));
        let (lifts, holds) = if fixed.basis.state(far) == EdgeState::Continuous {
            uplift_at_continuous(view, id, fixed, far, moment)
        } else {
            let helps = cantilever_helps(view, id, supports, far, l_m);
            (moment / l_m, fixed.loads.dead_kn_m2 * l_m / 2.0 + helps)
        };
        checks.push(Check::at_most(CheckKind::Uplift, Place::Side(far), "statics", lifts, holds, "kN/m"));
    }
}

/// What lifts and what holds down a support that the back-span of a cantilever is continuous over, kN/m: the worst of
/// the spans that go on there.
fn uplift_at_continuous(view: &View<'_>, id: PanelId, fixed: &Fixed, far: Side, root: f64) -> (f64, f64) {
    let span = |fixed: &Fixed| StripSpan {
        l_m: fixed.basis.length_m(fixed.basis.span_along(far.span_axis())),
        h_mm: fixed.thickness_mm,
        ultimate_kn_m2: fixed.loads.ultimate_kn_m2,
        least_kn_m2: fixed.loads.dead_kn_m2,
    };
    let back = span(fixed);
    let segments = view.floor.panel(id).edge(far).segments.iter();
    let beyond: Vec<&Fixed> = segments.filter_map(|segment| view.fixed(segment.neighbour?)).collect();
    let next: Vec<Option<(StripSpan, bool)>> = if beyond.is_empty() {
        vec![None]
    } else {
        let on = |next: &&Fixed| Some((span(next), next.basis.state(far) == EdgeState::Continuous));
        beyond.iter().map(on).collect()
    };
    let reaction = |next: Option<(StripSpan, bool)>| {
        let (m1, m2) = beyond_back_span(root, back, next);
        let load = |span: &StripSpan| span.least_kn_m2 * span.l_m / 2.0;
        // Reaction at the far support from each span: w l/2 +- the moments over the span.
        let mut parts = vec![load(&back), -root / back.l_m, m1 / back.l_m];
        if let Some((next, _)) = next {
            parts.extend([load(&next), m1 / next.l_m, -m2 / next.l_m]);
        }
        let lifts: f64 = -parts.iter().filter(|part| **part < 0.0).sum::<f64>();
        (lifts, parts.iter().filter(|part| **part > 0.0).sum::<f64>())
    };
    next.into_iter()
        .map(reaction)
        .max_by(|a, b| (a.0 / a.1.max(1e-9)).total_cmp(&(b.0 / b.1.max(1e-9))))
        .unwrap_or((0.0, 0.0))
}

/// What a cantilever over the whole of a side puts on that support by its dead load, kN/m.
fn cantilever_helps(
    view: &View<'_>,
    id: PanelId,
    supports: &[SupportBars<'_>],
    side: Side,
    back_span_m: f64,
) -> f64 {
    let beyond = supports.iter().filter(|other| other.side == side);
    let weights = beyond
        .filter_map(|other| cantilever_beyond(other, id))
        .map(|far| far.fixed.loads.dead_kn_m2 * far.l_m * (1.0 + far.l_m / (2.0 * back_span_m)));
    let whole = view.floor.panel(id).edge(side).state == EdgeState::Continuous;
    weights.reduce(f64::min).filter(|_| whole).unwrap_or(0.0)
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
/// through from the support with the least steel x depth.
fn hogging_midspans(
    task: &BottomTask<'_>,
    balanced: [f64; 2],
    supports: &[SupportBars<'_>],
    sections: &mut Vec<Section>,
    checks: &mut Vec<Check>,
) {
    for span in [Span::Short, Span::Long].into_iter().filter(|span| balanced[*span as usize] < 0.0) {
        let axis = task.fixed.basis.axis_of(span);
        let at = if span == Span::Short { Place::ShortMidspan } else { Place::LongMidspan };
        // Bars that cross without a moment do not run through.
        let runs_through = |support: &&SupportBars<'_>| {
            support.side.span_axis() == axis && support.task.trial(at, support.bars).moment_knm_m.is_some()
        };
        let across = supports.iter().filter(runs_through);
        let weakest = across.min_by(|a, b| {
            let [a, b] = [a, b].map(|support| support.task.trial(at, support.bars));
            (a.as_provided() * a.d_mm).total_cmp(&(b.as_provided() * b.d_mm))
        });
        let Some(support) = weakest else { continue };
        let mut trial = support.task.trial(at, support.bars);
        trial.moment_knm_m = Some(-balanced[span as usize]);
        trial.h_mm = task.fixed.thickness_mm;
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
fn panel_checks(criteria: &Criteria, fixed: &Fixed, checks: &mut Vec<Check>) {
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
    let short_ends = fixed.basis.short_along.end_sides();
    let continuous = short_ends.iter().all(|side| fixed.basis.state(*side) == EdgeState::Continuous);
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
        fixed.thickness_mm,
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
