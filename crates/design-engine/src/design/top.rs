//! Top bars over a support: one choice that serves both panels.

use super::balance::{SupportMoment, balanced_midspans, new_side_moments};
use super::bottom::{deflection_check, shear_check};
use super::fixed::Fixed;
use super::roots::greatest_moment_knm_m;
use super::section::{Trial, worst_ratio};
use super::view::View;
use crate::bs8110::curtailment::{contraflexure, round_up_50, top_extents};
use crate::bs8110::flexure::minimum_steel;
use crate::check::{Check, Place};
use crate::choose::{Score, best, cost, nominal_bars};
use crate::criteria::TopBars;
use crate::floor::{BarChoice, Layer, PanelId, Support, SupportId, SupportKind, SupportSide};
use crate::result::{Action, SupportDesign, SupportSideDesign};

/// A new moment this much above the table's lengthens the top bars (3.5.3.6 e; decision: 10 %).
const RISE_THAT_LENGTHENS: f64 = 1.10;
/// Reach of crossing bars past each face as a share of the lesser lx of the two panels (decision).
const CROSSING_SHARE: f64 = 0.3;
/// Spans within this of each other allow alternate reversed bars.
const REVERSED_SPAN_VARIATION: f64 = 0.15;

/// One side of a support being designed.
#[derive(Clone, Copy)]
pub(crate) struct SideTask<'a> {
    pub(crate) at: SupportSide,
    pub(crate) fixed: &'a Fixed,
    /// Span across the support, m.
    pub(crate) l_m: f64,
    /// Moments of the panel's span after balancing: at this support, at the far end, midspan.
    near_knm_m: f64,
    far_knm_m: f64,
    midspan_after_knm_m: f64,
    clear_span_mm: f64,
    /// Greatest final moment at the far end, cantilevers counted, kNm/m.
    far_hogging_knm_m: f64,
}

/// A support whose top bars are wanted.
pub(crate) struct TopTask<'a> {
    view: View<'a>,
    id: SupportId,
    support: &'a Support,
    moment: SupportMoment,
    sides: Vec<SideTask<'a>>,
    layer: Layer,
    /// Size of the largest T1 bar that crosses the panels, for a T2 support, mm.
    outer_mm: f64,
    /// Steel that crossing bars must have, mm2/m.
    crossing_steel_mm2_m: f64,
    candidates: &'a [BarChoice],
}

/// Reach of top bars past the face on one side, mm.
#[derive(Clone, Copy)]
struct Reach {
    long: f64,
    short: f64,
    from_contraflexure: bool,
}

impl<'a> TopTask<'a> {
    /// A support with at least one designed side; `moments` gives the moment of any support.
    pub(crate) fn new(
        view: View<'a>,
        id: SupportId,
        layer: Layer,
        outer_mm: f64,
        crossing_steel_mm2_m: f64,
        candidates: &'a [BarChoice],
        moments: &dyn Fn(SupportId) -> Option<SupportMoment>,
    ) -> Option<TopTask<'a>> {
        let support = view.floor.support(id);
        let moment = moments(id)?;
        let sides = support
            .sides()
            .filter_map(|at| Some(side_task(&view, at, view.fixed(at.panel)?, moment, moments)))
            .collect();
        Some(TopTask { view, id, support, moment, sides, layer, outer_mm, crossing_steel_mm2_m, candidates })
    }

    /// Effective depth, mm: bars level below the lower top, the lesser of the two sides governs.
    fn depth(&self, bar_mm: f64) -> f64 {
        let panels = || self.sides.iter().map(|side| (self.view.floor.panel(side.at.panel), side.fixed));
        let lower_top = panels().map(|(p, _)| p.top_level_mm).fold(f64::INFINITY, f64::min);
        let level = lower_top - self.view.criteria.top_cover_mm - self.outer_mm - bar_mm / 2.0;
        panels()
            .map(|(panel, fixed)| level - (panel.top_level_mm - fixed.thickness_mm))
            .fold(f64::INFINITY, f64::min)
            .max(1.0)
    }

    /// The section at a place with these bars.
    pub(crate) fn trial(&self, at: Place, bars: BarChoice) -> Trial {
        let criteria = self.view.criteria;
        let greatest = |value: fn(&SideTask<'_>) -> f64| self.sides.iter().map(value).fold(0.0, f64::max);
        let least =
            |value: fn(&SideTask<'_>) -> f64| self.sides.iter().map(value).fold(f64::INFINITY, f64::min);
        let moment =
            (self.support.kind == SupportKind::Hogging).then_some(self.moment.moment_knm_m).flatten();
        Trial {
            at,
            bars,
            stated: self.support.chosen.is_some(),
            moment_knm_m: moment,
            floor_steel_mm2_m: self.crossing_steel_mm2_m,
            d_mm: self.depth(bars.bar_mm),
            h_mm: greatest(|side| side.fixed.thickness_mm),
            least_h_mm: least(|side| side.fixed.thickness_mm),
            cover_to_bars_mm: criteria.top_cover_mm + self.outer_mm,
            nominal_cover_mm: criteria.top_cover_mm,
            k_limit: least(|side| side.fixed.support_k_limit),
            beta_b: least(|side| side.fixed.support_beta_b),
        }
    }

    /// Checks of these bars seen from one side.
    fn side_checks(&self, side: &SideTask<'_>, bars: BarChoice, give: &mut dyn FnMut(Check)) {
        let place = Place::Side(side.at.side);
        let trial = self.trial(place, bars);
        trial.checks(self.view.criteria, give);
        let shear = side.fixed.side_shear_kn_m[side.at.side.index()];
        if let (Some(v), SupportKind::Hogging) = (shear, self.support.kind) {
            give(shear_check(self.view.criteria, place, v, trial.as_provided(), trial.d_mm));
        }
        if side.fixed.basis.action == Action::Cantilever {
            give(deflection_check(self.view.criteria, side.fixed, &trial).1);
        }
    }

    /// Reach past the face into each panel, and whether alternate bars are reversed.
    fn reaches(&self, bars: BarChoice) -> (Vec<Reach>, bool) {
        if self.support.kind == SupportKind::Crossing {
            let lx_m = self.sides.iter().map(|side| side.fixed.basis.lx_m).fold(f64::INFINITY, f64::min);
            let long = round_up_50(CROSSING_SHARE * lx_m * 1000.0);
            return (vec![Reach { long, short: long, from_contraflexure: false }; self.sides.len()], false);
        }
        let trial = self.trial(Place::Panel, bars);
        let l_mm = self.sides.iter().map(|side| side.l_m).fold(0.0, f64::max) * 1000.0;
        let simplified = top_extents(l_mm, bars.bar_mm);
        let mut reaches: Vec<Reach> =
            self.sides.iter().map(|side| self.reach(side, &trial, simplified)).collect();
        if let Some(cantilever) = self.cantilever() {
            // Half the bars stop short in the back-span, where the rest still meet the rules; none in the cantilever.
            let may_stop = trial.alternate_bars_may_stop(self.view.criteria);
            for (side, reach) in self.sides.iter().zip(&mut reaches) {
                *reach = if side.at == cantilever.at {
                    self.whole_cantilever(side)
                } else {
                    self.reach_in_back_span(side, cantilever, &trial)
                };
                if !may_stop {
                    reach.short = reach.long;
                }
            }
            return (reaches, false);
        }
        let least_l = self.sides.iter().map(|side| side.l_m).fold(f64::INFINITY, f64::min) * 1000.0;
        let reversed = self.view.criteria.top_bars == TopBars::AlternateReversed
            && self.sides.len() == 2
            && (l_mm - least_l) / l_mm <= REVERSED_SPAN_VARIATION + 1e-9
            && reaches.iter().all(|reach| !reach.from_contraflexure)
            && trial.alternate_bars_may_stop(self.view.criteria);
        if !reversed {
            for reach in &mut reaches {
                reach.short = reach.long;
            }
        }
        (reaches, reversed)
    }

    fn reach(&self, side: &SideTask<'_>, trial: &Trial, simplified: (f64, f64)) -> Reach {
        let fixed = side.fixed;
        let plain = Reach {
            long: round_up_50(simplified.1),
            short: round_up_50(simplified.0),
            from_contraflexure: false,
        };
        let run_through = Reach { long: round_up_50(side.clear_span_mm), from_contraflexure: true, ..plain };
        if side.midspan_after_knm_m < 0.0 {
            return run_through;
        }
        let table = fixed.side(side.at.side);
        let in_strip = 1000.0 * fixed.hogging_reach_m[side.at.side.index()];
        if in_strip >= side.l_m * 1000.0 * (1.0 - 1e-9) {
            return run_through;
        }
        let rose = side.near_knm_m > RISE_THAT_LENGTHENS * table * (1.0 + 1e-9);
        let Some(x0) = (if rose { self.contraflexure(side) } else { Some(0.0) }) else {
            return run_through;
        };
        let past = x0.max(in_strip) + trial.d_mm.max(12.0 * trial.bars.bar_mm);
        let to_face = self.support.width_mm / 2.0;
        let long = round_up_50(simplified.1.max(past - to_face)).min(run_through.long);
        if !rose && long <= plain.long {
            return plain;
        }
        Reach {
            long,
            short: round_up_50(simplified.0.max(past / 2.0 - to_face)).min(run_through.long),
            from_contraflexure: true,
        }
    }

    /// Point of contraflexure of a side's span with its final moments (3.5.3.6 e), mm from the support's centre line;
    /// none where the span hogs throughout.
    fn contraflexure(&self, side: &SideTask<'_>) -> Option<f64> {
        let fixed = side.fixed;
        let span = fixed.basis.span_along(side.at.side.span_axis());
        let free = if fixed.basis.action == Action::OneWay {
            // A strip's greatest sagging need not be at midspan.
            fixed.unit_moment_knm_m[span as usize] / 8.0
        } else {
            let ends = [side.at.side, side.at.side.opposite()].map(|end| fixed.side_counted(end));
            fixed.midspan(span) + (ends[0] + ends[1]) / 2.0
        };
        contraflexure(free, side.near_knm_m, side.far_knm_m, side.l_m * 1000.0)
    }

    /// The side that is a cantilever, if one is.
    pub(crate) fn cantilever(&self) -> Option<&SideTask<'a>> {
        self.sides.iter().find(|side| side.fixed.basis.action == Action::Cantilever)
    }

    /// Every bar reaches the tip, less the cover.
    fn whole_cantilever(&self, side: &SideTask<'_>) -> Reach {
        let to_tip = side.l_m * 1000.0 - self.support.width_mm / 2.0 - self.view.criteria.top_cover_mm;
        let long = (to_tip / 5.0).floor() * 5.0;
        Reach { long, short: long, from_contraflexure: false }
    }

    /// Bars of a cantilever of length k in its back-span of length l, from the face: all to max(0.75 k, 0.15 l, 45
    /// sizes), half to max(1.5 k, 0.3 l), and to max(d, 12 sizes) past the contraflexure under the cantilever fully
    /// loaded, the back-span with 1.0 gk and the far support with its greatest moment; all of them to max(d, 12 sizes)
    /// past half of that, where the moment has fallen to half (3.12.9.1). No contraflexure: all run the whole back-span.
    fn reach_in_back_span(&self, side: &SideTask<'_>, cantilever: &SideTask<'_>, trial: &Trial) -> Reach {
        let (k, l) = (cantilever.l_m * 1000.0, side.l_m * 1000.0);
        let bar = trial.bars.bar_mm;
        let all = (0.75 * k).max(0.15 * l).max(45.0 * bar);
        let whole = round_up_50(side.clear_span_mm + self.support.width_mm / 2.0);
        let free = side.fixed.loads.dead_kn_m2 * side.l_m * side.l_m / 8.0;
        let root = cantilever.fixed.side(cantilever.at.side);
        let x0 = contraflexure(free, root, side.far_hogging_knm_m, l);
        let Some(x0) = x0.filter(|x0| *x0 < l * (1.0 - 1e-9)) else {
            return Reach { long: whole, short: whole, from_contraflexure: true };
        };
        let past = |x: f64| x + trial.d_mm.max(12.0 * bar) - self.support.width_mm / 2.0;
        let all = all.max(past(x0 / 2.0));
        let half = (1.5 * k).max(0.3 * l).max(past(x0)).max(all);
        Reach {
            long: round_up_50(half).min(whole),
            short: round_up_50(all).min(whole),
            from_contraflexure: true,
        }
    }

    fn score(&self, bars: BarChoice) -> Score {
        let worst = worst_ratio(|give| {
            for side in &self.sides {
                self.side_checks(side, bars, give);
            }
        });
        let (reaches, _) = self.reaches(bars);
        let reach: f64 = reaches.iter().map(|reach| (reach.long + reach.short) / 2.0).sum();
        let length = (reach + self.support.width_mm) / 1000.0;
        let area = self.trial(Place::Panel, bars).as_provided();
        Score { worst_ratio: worst, cost_kg: cost(area, length, self.support.length_m()) }
    }

    /// The bars and everything said of the support.
    pub(crate) fn choose(&self) -> Option<SupportDesign> {
        let choices: &[BarChoice] =
            self.support.chosen.as_ref().map_or(self.candidates, std::slice::from_ref);
        let (bars, _) = best(choices.iter().map(|bars| (*bars, self.score(*bars))))?;
        self.with_bars(bars)
    }

    /// Everything said of the support with given bars.
    pub(crate) fn with_bars(&self, bars: BarChoice) -> Option<SupportDesign> {
        let criteria = self.view.criteria;
        let trial = self.trial(Place::Panel, bars);
        let flexure = trial.flexure(criteria);
        let (reaches, alternate_reversed) = self.reaches(bars);
        Some(SupportDesign {
            support: self.id,
            sides: self
                .sides
                .iter()
                .zip(&reaches)
                .map(|(side, reach)| self.side_design(side, reach, bars))
                .collect(),
            balanced: self.moment.balanced,
            moment_knm_m: self.moment.moment_knm_m,
            difference_pct: self.moment.difference_pct,
            load_ratio: self.moment.load_ratio,
            span_ratio: self.moment.span_ratio,
            layer: self.layer,
            outside_mm: self.outer_mm,
            d_mm: trial.d_mm,
            as_bending_mm2_m: flexure.and_then(|f| f.as_mm2_m),
            as_required_mm2_m: trial.as_required(criteria),
            bars,
            as_provided_mm2_m: trial.as_provided(),
            alternate_reversed,
            stated: self.support.chosen.is_some(),
        })
    }

    fn side_design(&self, side: &SideTask<'_>, reach: &Reach, mains: BarChoice) -> SupportSideDesign {
        let fixed = side.fixed;
        let outermost = self.layer == Layer::T2;
        let criteria = self.view.criteria;
        // In the outer layer they are not larger than the bars that d was taken under.
        let greatest = if outermost { self.outer_mm } else { mains.bar_mm };
        let cover = criteria.top_cover_mm + if outermost { 0.0 } else { mains.bar_mm };
        let least = minimum_steel(fixed.thickness_mm, criteria.fy_n_mm2);
        let span = fixed.basis.span_along(side.at.side.span_axis());
        SupportSideDesign {
            panel: side.at.panel,
            moment_from_coefficient_knm_m: (self.support.kind == SupportKind::Hogging)
                .then(|| fixed.side(side.at.side)),
            midspan_before_knm_m: fixed.midspan(span),
            midspan_after_knm_m: side.midspan_after_knm_m,
            stiffness: super::balance::side_stiffness(&self.view, side.at),
            extension_m: reach.long / 1000.0,
            short_extension_m: reach.short / 1000.0,
            from_contraflexure: reach.from_contraflexure,
            runs_through: false,
            distribution: nominal_bars(criteria, least, greatest, fixed.thickness_mm, cover),
        }
    }

    /// Clear span of the panel at a side, mm.
    pub(crate) fn clear_span_mm(&self, panel: PanelId) -> Option<f64> {
        self.sides.iter().find(|side| side.at.panel == panel).map(|side| side.clear_span_mm)
    }

    /// The checks of chosen bars seen from one panel, and the section's trial.
    pub(crate) fn seen_from(&self, at: SupportSide, bars: BarChoice, give: &mut dyn FnMut(Check)) -> Trial {
        if let Some(side) = self.sides.iter().find(|side| side.at == at) {
            self.side_checks(side, bars, give);
        }
        self.trial(Place::Side(at.side), bars)
    }
}

fn side_task<'a>(
    view: &View<'a>,
    at: SupportSide,
    fixed: &'a Fixed,
    moment: SupportMoment,
    moments: &dyn Fn(SupportId) -> Option<SupportMoment>,
) -> SideTask<'a> {
    let axis = at.side.span_axis();
    let span = fixed.basis.span_along(axis);
    let panel = view.floor.panel(at.panel);
    let bearings: f64 = axis.end_sides().iter().map(|side| panel.edge(*side).support_width_mm / 2.0).sum();
    SideTask {
        at,
        fixed,
        l_m: fixed.basis.length_m(span),
        near_knm_m: moment.moment_knm_m.unwrap_or(0.0),
        far_knm_m: new_side_moments(view, at.panel, at.side.opposite(), moments).1,
        midspan_after_knm_m: balanced_midspans(view, at.panel, moments)[span as usize],
        clear_span_mm: (panel.span_m(axis) * 1000.0 - bearings).max(0.0),
        far_hogging_knm_m: greatest_moment_knm_m(view, at.panel, at.side.opposite(), moments),
    }
}
