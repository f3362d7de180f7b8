//! Bottom bars of a panel: both layers chosen together, with deflection, shear and bond inside the choice.

use super::fixed::Fixed;
use super::section::{Trial, worst_ratio};
use crate::bs8110::anchorage::{EndAnchorage, EndAnchorageWorking, EndSpace, end_anchorage};
use crate::bs8110::curtailment::bottom_stop_share;
use crate::bs8110::flexure::{K_LIMIT, steel_area};
use crate::bs8110::spacing::BETA_B_MIDSPAN;
use crate::bs8110::{deflection, shear};
use crate::check::{Check, CheckKind, Place};
use crate::choose::{Score, best, best_pair, cost, nominal_bars};
use crate::criteria::{BottomBars, Criteria, EdgeStrips, Layering};
use crate::floor::{Axis, BarChoice, EdgeState, Panel, Side, Span};
use crate::result::{Action, BottomBarsDesign, DeflectionWorking};

/// A panel whose bottom bars are wanted.
#[derive(Clone, Copy)]
pub(crate) struct BottomTask<'a> {
    pub(crate) panel: &'a Panel,
    pub(crate) fixed: &'a Fixed,
    /// Design midspan moments, short and long span; none in a distribution direction.
    pub(crate) moments: [Option<f64>; 2],
    /// Axis of the top outer bars around this panel, for edge bars.
    pub(crate) t1_axis: Axis,
    pub(crate) criteria: &'a Criteria,
    pub(crate) candidates: &'a [BarChoice],
}

/// The bottom bars of a panel, short and long span.
pub(crate) type BottomBarsChosen = [BarChoice; 2];

impl BottomTask<'_> {
    /// The span whose bars lie outermost.
    pub(crate) fn outer_span(&self) -> Span {
        match self.criteria.layering {
            Layering::Outer(axis) if !self.panel.is_loose() => self.fixed.basis.span_along(axis),
            _ => self.fixed.basis.main_span,
        }
    }

    /// A span's bars as a section, `outer_mm` being the size of the bars outside them (0 for the outer layer).
    pub(crate) fn trial(&self, span: Span, bars: BarChoice, outer_mm: f64) -> Trial {
        let criteria = self.criteria;
        let cover_to_bars_mm = criteria.bottom_cover_mm + outer_mm;
        Trial {
            at: if span == Span::Short { Place::ShortMidspan } else { Place::LongMidspan },
            bars,
            stated: self.panel.chosen_bottom[span as usize].is_some(),
            moment_knm_m: self.moments[span as usize],
            floor_steel_mm2_m: 0.0,
            d_mm: (self.fixed.thickness_mm - cover_to_bars_mm - bars.bar_mm / 2.0).max(1.0),
            h_mm: self.fixed.thickness_mm,
            least_h_mm: self.fixed.thickness_mm,
            cover_to_bars_mm,
            nominal_cover_mm: criteria.bottom_cover_mm,
            k_limit: K_LIMIT,
            beta_b: BETA_B_MIDSPAN,
        }
    }

    /// Whether alternate bars of a trial stop short.
    fn curtailed(&self, trial: &Trial) -> bool {
        self.criteria.bottom_bars == BottomBars::AlternateCurtailed
            && trial.alternate_bars_may_stop(self.criteria)
    }

    /// Steel of a trial that reaches a discontinuous edge.
    fn steel_at_edge(&self, trial: &Trial) -> f64 {
        trial.as_provided() * if self.curtailed(trial) { 0.5 } else { 1.0 }
    }

    /// End anchorage at a discontinuous side.
    pub(crate) fn end(&self, trial: &Trial, side: Side, outer_mm: f64) -> EndAnchorageWorking {
        let criteria = self.criteria;
        let v = shear::stress(self.fixed.side_shear_kn_m[side.index()].unwrap_or(0.0), trial.d_mm);
        let vc = shear::vc(self.steel_at_edge(trial), trial.d_mm, criteria.fcu_n_mm2);
        let space = EndSpace {
            support_width_mm: self.panel.edge(side).support_width_mm,
            end_cover_mm: criteria.bottom_cover_mm,
            height_mm: self.fixed.thickness_mm
                - criteria.bottom_cover_mm
                - criteria.top_cover_mm
                - criteria.bending_deduction_mm
                - outer_mm,
        };
        end_anchorage(trial.bars.bar_mm, trial.d_mm, v, vc, space)
    }

    /// Steel and depth that resist shear at a discontinuous side (section 3.12.9.4 decides which).
    fn shear_steel(&self, trial: &Trial, side: Side, anchorage: EndAnchorage) -> (f64, f64) {
        let bottom = self.steel_at_edge(trial);
        if anchorage != EndAnchorage::ThirdOfSupport {
            return (bottom, trial.d_mm);
        }
        // Anchored to (c) only: the lesser of bottom and top steel. The edge's top bars are half the bottom
        // steel, not under the minimum; a size outside them is taken where they are the inner layer.
        let top = (trial.as_provided() / 2.0).max(trial.as_minimum(self.criteria));
        if top >= bottom {
            return (bottom, trial.d_mm);
        }
        let outside = if side.span_axis() == self.t1_axis {
            0.0
        } else {
            self.criteria.bar_sizes_mm.last().copied().unwrap_or(0.0)
        };
        let d = self.fixed.thickness_mm - self.criteria.top_cover_mm - outside - trial.bars.bar_mm / 2.0;
        (top, d.max(1.0))
    }

    /// Shear and bond at the discontinuous ends of a trial's span.
    fn end_checks(&self, span: Span, trial: &Trial, outer_mm: f64, give: &mut dyn FnMut(Check)) {
        for side in self.fixed.basis.axis_of(span).end_sides() {
            let Some(v_kn_m) = self.fixed.side_shear_kn_m[side.index()] else { continue };
            // A back-span's edge against a cantilever is continuous here: its bars run on.
            let state = self.panel.edge(side).state;
            if !matches!(state, EdgeState::Discontinuous | EdgeState::PartlyContinuous) {
                continue;
            }
            let end = self.end(trial, side, outer_mm);
            let (steel, d) = self.shear_steel(trial, side, end.kind);
            give(shear_check(self.criteria, Place::Side(side), v_kn_m, steel, d));
            give(Check::at_most(
                CheckKind::BondAtSupport,
                Place::Side(side),
                end.clause,
                end.needed_mm,
                end.available_mm,
                "mm",
            ));
        }
    }

    /// Working and check of deflection, on the span that carries.
    pub(crate) fn deflection(&self, trial: &Trial) -> (DeflectionWorking, Check) {
        deflection_check(self.criteria, self.fixed, trial)
    }

    /// Every check that a span's bottom bars decide.
    pub(crate) fn checks(&self, span: Span, bars: BarChoice, outer_mm: f64, give: &mut dyn FnMut(Check)) {
        let trial = self.trial(span, bars, outer_mm);
        trial.checks(self.criteria, give);
        if span == self.fixed.basis.main_span {
            give(self.deflection(&trial).1);
        }
        self.end_checks(span, &trial, outer_mm, give);
    }

    /// Mean length of a span's bars, m: between support centre lines, plus what passes a discontinuous
    /// support's centre line, less what alternate bars stop short.
    fn mean_length_m(&self, span: Span, trial: &Trial, outer_mm: f64) -> f64 {
        let axis = self.fixed.basis.axis_of(span);
        let length = self.panel.span_m(axis);
        let curtailed = self.curtailed(trial);
        let ends: f64 = axis
            .end_sides()
            .into_iter()
            .map(|side| {
                let continuous = self.panel.edge(side).state == EdgeState::Continuous;
                let past = if continuous {
                    0.0
                } else {
                    let end = self.end(trial, side, outer_mm);
                    (end.past_centre_line_mm + end.leg_mm) / 1000.0
                };
                if curtailed { (past - bottom_stop_share(continuous) * length) / 2.0 } else { past }
            })
            .sum();
        length + ends
    }

    fn score(&self, span: Span, bars: BarChoice, outer_mm: f64) -> Score {
        let trial = self.trial(span, bars, outer_mm);
        let width = self.panel.span_m(self.fixed.basis.axis_of(span).across());
        Score {
            worst_ratio: worst_ratio(|give| self.checks(span, bars, outer_mm, give)),
            cost_kg: cost(trial.as_provided(), self.mean_length_m(span, &trial, outer_mm), width),
        }
    }

    fn scored(&self, span: Span, outer_mm: f64) -> Vec<(BarChoice, Score)> {
        let stated = self.panel.chosen_bottom[span as usize];
        let choices: &[BarChoice] = stated.as_ref().map_or(self.candidates, std::slice::from_ref);
        choices.iter().map(|bars| (*bars, self.score(span, *bars, outer_mm))).collect()
    }

    /// What is to be made of chosen bars, short and long span.
    pub(crate) fn designs(&self, bars: BottomBarsChosen) -> [Option<BottomBarsDesign>; 2] {
        let outer_span = self.outer_span();
        [Span::Short, Span::Long].map(|span| {
            let own = bars[span as usize];
            let outer_mm = if span == outer_span { 0.0 } else { bars[outer_span as usize].bar_mm };
            let trial = self.trial(span, own, outer_mm);
            let sides = self.fixed.basis.axis_of(span).end_sides();
            Some(BottomBarsDesign {
                bars: own,
                edge_strip: self.edge_strip(&trial),
                alternate_stop: self.curtailed(&trial),
                ends: sides.map(|side| {
                    let state = self.panel.edge(side).state;
                    let ends = matches!(state, EdgeState::Discontinuous | EdgeState::PartlyContinuous);
                    ends.then(|| self.end(&trial, side, outer_mm))
                }),
            })
        })
    }

    /// Bars of the edge strips of a two-way panel, where the criteria ask for minimum steel there and it is less (3.5.3.5). No
    /// larger than the middle strip's: the layers keep their depths.
    fn edge_strip(&self, trial: &Trial) -> Option<BarChoice> {
        let two_way = self.fixed.basis.action == Action::TwoWayRestrained;
        if self.criteria.edge_strips != EdgeStrips::MinimumSteel || !two_way || trial.stated {
            return None;
        }
        let least = trial.as_minimum(self.criteria);
        let bars = nominal_bars(self.criteria, least, trial.bars.bar_mm, trial.h_mm, trial.cover_to_bars_mm)?;
        (steel_area(bars.bar_mm, bars.spacing_mm) < trial.as_provided() - 1e-9).then_some(bars)
    }

    /// Both layers, exactly.
    pub(crate) fn choose(&self) -> BottomBarsChosen {
        let outer_span = self.outer_span();
        let outer = self.scored(outer_span, 0.0);
        let pair = best_pair(&outer, |size| best(self.scored(outer_span.other(), size).into_iter()));
        let fallback = BarChoice { bar_mm: 0.0, spacing_mm: 1.0 };
        let [outer, inner] = pair.map_or([fallback; 2], |pair| pair.map(|(bars, _)| bars));
        if outer_span == Span::Short { [outer, inner] } else { [inner, outer] }
    }
}

/// Shear check at a side: v <= vc without links, and v <= min(0.8 sqrt(fcu), 5).
pub(crate) fn shear_check(criteria: &Criteria, at: Place, v_kn_m: f64, steel: f64, d_mm: f64) -> Check {
    let v = shear::stress(v_kn_m, d_mm);
    let vc = shear::vc(steel, d_mm, criteria.fcu_n_mm2);
    let greatest = shear::greatest_stress(criteria.fcu_n_mm2);
    let (clause, limit) = if vc <= greatest { ("3.5.5.3, Table 3.8", vc) } else { ("3.5.5.2", greatest) };
    Check::at_most(CheckKind::Shear, at, clause, v, limit, "N/mm2")
}

/// Working and check of deflection at the section that carries (midspan, or a cantilever's root).
pub(crate) fn deflection_check(
    criteria: &Criteria,
    fixed: &Fixed,
    trial: &Trial,
) -> (DeflectionWorking, Check) {
    let moment = trial.moment_knm_m.unwrap_or(0.0);
    // Where K exceeds K' there is no steel that would do: its stress is taken as at yield.
    let bending = trial.flexure(criteria).and_then(|f| f.as_mm2_m).unwrap_or(trial.as_provided());
    let fs_n_mm2 = deflection::service_stress(criteria.fy_n_mm2, bending, trial.as_provided());
    let modification_factor = deflection::modification_factor(fs_n_mm2, moment, trial.d_mm).max(0.01);
    let basic = fixed.basic_span_depth;
    let actual = fixed.basis.length_m(fixed.basis.main_span) * 1000.0 / trial.d_mm;
    let allowed = basic * modification_factor;
    let check =
        Check::at_most(CheckKind::Deflection, trial.at, "3.5.7, 3.4.6", actual, allowed, "span/depth");
    (DeflectionWorking { basic, fs_n_mm2, modification_factor }, check)
}
