//! MAIN PATH of design: [`design_floor`].

mod balance;
mod basis;
mod bottom;
mod corners;
mod edge_bars;
mod fixed;
mod openings;
mod panel;
mod queries;
mod regions;
mod roots;
mod run_through;
mod section;
mod side_loads;
mod strips;
mod thickness;
mod top;
mod view;

use rayon::prelude::*;

pub use basis::GREATEST_TWO_WAY_RATIO;

use crate::bs8110::loads;
use crate::check::CheckKind;
use crate::choose::candidates;
use crate::criteria::Criteria;
use crate::floor::{Axis, BarChoice, EdgeState, Floor, Layer, PanelId, SupportId, SupportKind};
use crate::query::{Query, Severity};
use crate::result::{Action, FloorDesign, PanelBars, PanelDesign, SupportDesign};
use balance::{SupportMoment, support_moment};
use basis::Settled;
use bottom::BottomBarsChosen;
use fixed::Fixed;
use panel::{SupportBars, bottom_task, governing, supports_of};
use strips::StripPlace;
use thickness::PanelInPlace;
use top::TopTask;
use view::View;

/// Designs every panel and support of a floor: spans and action, coefficient moments, balancing, bottom
/// bars, top bars (outer layer first), checks. Panels and supports run in parallel; results are in the
/// floor's order and the same for any number of threads.
#[must_use]
pub fn design_floor(floor: &Floor, criteria: &Criteria) -> FloorDesign {
    let (mut settled, mut queries) = basis::settle(floor, criteria);
    let strips = one_way_strips(floor, criteria, &mut settled, &mut queries);
    let fixed: Vec<Option<Fixed>> = settled
        .par_iter()
        .enumerate()
        .map(|(index, settled)| {
            let panel = floor.panel(PanelId(index));
            let basis = *settled.as_ref().ok()?;
            Some(fixed::fix(panel, panel.thickness_mm, basis, strips[index].as_ref(), criteria))
        })
        .collect();
    let view = View { floor, criteria, fixed: &fixed, swap: None };
    let moments: Vec<Option<SupportMoment>> =
        floor.supports.par_iter().map(|support| support_moment(&view, support)).collect();
    let shears: Vec<_> = (0..fixed.len())
        .into_par_iter()
        .map(|index| roots::final_shears(&view, PanelId(index), &|id| moments[id.0]))
        .collect();
    let fixed = with_shears(&fixed, &shears);
    let view = View { fixed: &fixed, ..view };
    let most = basis::direction_of_most_short_spans(floor, criteria.plan_tolerance_mm / 1000.0);
    let t1_axes = regions::t1_axes(floor, criteria, &fixed, &moments, most);

    let stage = Stage {
        view,
        moments: &moments,
        t1_axes: &t1_axes,
        strips: &strips,
        candidates: &candidates(criteria),
    };
    let bottoms = stage.bottoms();
    let mut t1 = stage.tops(Layer::T1, &bottoms, &|_| 0.0);
    run_through::join(&stage, Layer::T1, &bottoms, &|_| 0.0, &mut t1);
    let t1_sizes = stage.t1_sizes(&bottoms, &t1);
    let outer =
        |id: SupportId| floor.support(id).sides().map(|side| t1_sizes[side.panel.0]).fold(0.0, f64::max);
    let mut t2 = stage.tops(Layer::T2, &bottoms, &outer);
    run_through::join(&stage, Layer::T2, &bottoms, &outer, &mut t2);
    let supports: Vec<Option<SupportDesign>> = t1.into_iter().zip(t2).map(|(a, b)| a.or(b)).collect();
    let panels: Vec<PanelDesign> = (0..floor.panels.len())
        .into_par_iter()
        .map(|index| stage.panel(PanelId(index), &settled[index], &bottoms, &supports, &outer))
        .collect();
    let supports: Vec<SupportDesign> = supports.into_iter().flatten().collect();
    queries.extend(queries::of_design(floor, criteria, &panels, &supports));
    let assumptions = queries::assumptions(floor, criteria, &panels);
    FloorDesign { panels, supports, queries, assumptions }
}

/// The same panels with other shears at their sides.
fn with_shears(fixed: &[Option<Fixed>], shears: &[[Option<f64>; 4]]) -> Vec<Option<Fixed>> {
    let one = |(fixed, shears): (&Option<Fixed>, &[Option<f64>; 4])| {
        fixed.map(|fixed| Fixed { side_shear_kn_m: *shears, ..fixed })
    };
    fixed.iter().zip(shears).map(one).collect()
}

/// Takes one-way panels through their strips; those of a strip that cannot be designed lose their basis.
fn one_way_strips(
    floor: &Floor,
    criteria: &Criteria,
    settled: &mut [Settled],
    queries: &mut Vec<Query>,
) -> Vec<Option<StripPlace>> {
    let places = strips::coefficients(floor, settled, criteria);
    places
        .into_iter()
        .enumerate()
        .map(|(index, place)| match place? {
            Ok(place) => Some(place),
            Err(why) => {
                let mark = &floor.panels[index].mark;
                let remedy = "design this strip by other means";
                queries.push(Query::panel(Severity::NotDesigned, mark, None, why.clone(), remedy));
                settled[index] = Err(why);
                None
            }
        })
        .collect()
}

/// What the stages of design share.
struct Stage<'a> {
    view: View<'a>,
    moments: &'a [Option<SupportMoment>],
    t1_axes: &'a [Axis],
    strips: &'a [Option<StripPlace>],
    candidates: &'a [BarChoice],
}

impl<'a> Stage<'a> {
    fn moment(&self, id: SupportId) -> Option<SupportMoment> {
        self.moments[id.0]
    }

    fn bottoms(&self) -> Vec<Option<BottomBarsChosen>> {
        (0..self.view.floor.panels.len())
            .into_par_iter()
            .map(|index| {
                let id = PanelId(index);
                let task =
                    bottom_task(&self.view, id, self.t1_axes[index], self.candidates, &|s| self.moment(s))?;
                Some(task.choose())
            })
            .collect()
    }

    fn layer_of(&self, id: SupportId) -> Layer {
        let support = self.view.floor.support(id);
        if support.axis == self.t1_axes[support.near.panel.0] { Layer::T1 } else { Layer::T2 }
    }

    /// Steel asked of crossing bars: half the midspan steel of the two-way panels beside them.
    fn crossing_steel(&self, id: SupportId, bottoms: &[Option<BottomBarsChosen>]) -> f64 {
        let support = self.view.floor.support(id);
        if support.kind == SupportKind::Hogging {
            return 0.0;
        }
        let half_midspan = |panel: PanelId| {
            let fixed = self.view.fixed(panel)?;
            let bars = bottoms[panel.0]?[fixed.basis.span_along(support.axis) as usize];
            let two_way = fixed.basis.action != Action::OneWay;
            two_way.then(|| crate::bs8110::flexure::steel_area(bars.bar_mm, bars.spacing_mm) / 2.0)
        };
        support.sides().filter_map(|side| half_midspan(side.panel)).fold(0.0, f64::max)
    }

    fn top_task(
        &self,
        id: SupportId,
        bottoms: &[Option<BottomBarsChosen>],
        outer: &dyn Fn(SupportId) -> f64,
    ) -> Option<TopTask<'a>> {
        let layer = self.layer_of(id);
        let outer_mm = if layer == Layer::T1 { 0.0 } else { outer(id) };
        let crossing = self.crossing_steel(id, bottoms);
        TopTask::new(self.view, id, layer, outer_mm, crossing, self.candidates, &|s| self.moment(s))
    }

    /// Supports of one top layer; the others are none.
    fn tops(
        &self,
        layer: Layer,
        bottoms: &[Option<BottomBarsChosen>],
        outer: &(dyn Fn(SupportId) -> f64 + Sync),
    ) -> Vec<Option<SupportDesign>> {
        (0..self.view.floor.supports.len())
            .into_par_iter()
            .map(SupportId)
            .map(
                |id| {
                    if self.layer_of(id) == layer {
                        self.top_task(id, bottoms, outer)?.choose()
                    } else {
                        None
                    }
                },
            )
            .collect()
    }

    /// Size of the largest T1 bar in each panel: over its supports in that direction, and its edge bars at
    /// discontinuous edges, which are not larger than the bottom bars they lap.
    fn t1_sizes(&self, bottoms: &[Option<BottomBarsChosen>], t1: &[Option<SupportDesign>]) -> Vec<f64> {
        (0..self.view.floor.panels.len()).map(|index| self.t1_size(index, bottoms, t1)).collect()
    }

    fn t1_size(
        &self,
        index: usize,
        bottoms: &[Option<BottomBarsChosen>],
        designs: &[Option<SupportDesign>],
    ) -> f64 {
        let floor = self.view.floor;
        let axis = self.t1_axes[index];
        let edge = |side: crate::floor::Side| {
            let edge = floor.panels[index].edge(side);
            let over = edge.segments.iter().filter_map(|segment| segment.support);
            let support =
                over.filter_map(|id| designs[id.0].as_ref()).map(|s| s.bars.bar_mm).fold(0.0, f64::max);
            let bottom = match (edge.state, bottoms[index], self.view.fixed(PanelId(index))) {
                (EdgeState::Discontinuous | EdgeState::PartlyContinuous, Some(bars), Some(fixed)) => {
                    bars[fixed.basis.span_along(axis) as usize].bar_mm
                }
                _ => 0.0,
            };
            support.max(bottom)
        };
        // Where no other bar lies outside those over a T2 support, their distribution bars do.
        let t2 = axis.across().end_sides().into_iter().any(|side| {
            floor.panels[index].edge(side).segments.iter().any(|segment| segment.support.is_some())
        });
        let distribution =
            if t2 { self.view.criteria.bar_sizes_mm.first().copied().unwrap_or(0.0) } else { 0.0 };
        axis.end_sides()
            .map(edge)
            .into_iter()
            .fold(self.outer_distribution(index).max(distribution), f64::max)
    }

    /// Size of a cantilever's distribution bars where they are the outer layer, mm; 0 elsewhere.
    fn outer_distribution(&self, index: usize) -> f64 {
        let Some(fixed) = self.view.fixed(PanelId(index)) else { return 0.0 };
        let basis = fixed.basis;
        if basis.action != Action::Cantilever || basis.axis_of(basis.main_span) == self.t1_axes[index] {
            return 0.0;
        }
        panel::distribution(&self.view, fixed, self.t1_axes[index], self.candidates, &[])
            .map_or(0.0, |(bars, _)| bars.bar_mm)
    }

    fn panel(
        &self,
        id: PanelId,
        settled: &Settled,
        bottoms: &[Option<BottomBarsChosen>],
        designs: &[Option<SupportDesign>],
        outer: &(dyn Fn(SupportId) -> f64 + Sync),
    ) -> PanelDesign {
        let panel = self.view.floor.panel(id);
        let mut design = PanelDesign {
            panel: id,
            not_designed: settled.as_ref().err().cloned(),
            basis: settled.as_ref().ok().copied(),
            edge_states: [0, 1, 2, 3].map(|side| panel.edges[side].state),
            loads: loads::build_up(panel.thickness_mm, &panel.loads, self.view.criteria),
            sections: Vec::new(),
            checks: Vec::new(),
            corners: Vec::new(),
            openings: Vec::new(),
            side_loads: side_loads::side_loads(&self.view, id, &|s| self.moment(s)),
            total_ultimate_kn: side_loads::total_ultimate_kn(&self.view, id),
            bars: PanelBars::default(),
            deflection: None,
            governing: None,
            thickness_governed_by: None,
            least_thickness_mm: None,
        };
        let moments = |s: SupportId| self.moment(s);
        let supports: Vec<SupportBars<'_>> = supports_of(&self.view, id)
            .into_iter()
            .filter_map(|(side, support)| {
                let bars = designs[support.0].as_ref()?.bars;
                let task = self.top_task(support, bottoms, outer)?;
                Some(SupportBars { task, id: support, side, layer: self.layer_of(support), bars })
            })
            .collect();
        let cantilever = design.basis.is_some_and(|basis| basis.action == Action::Cantilever);
        let assembled = if cantilever {
            panel::assemble_cantilever(&self.view, id, self.t1_axes[id.0], self.candidates, &supports)
        } else {
            let task = bottom_task(&self.view, id, self.t1_axes[id.0], self.candidates, &moments);
            task.zip(bottoms[id.0])
                .map(|(task, bottom)| panel::assemble(&self.view, id, &task, bottom, &supports, &moments))
        };
        let Some(assembled) = assembled else { return design };
        let crossing = |s: SupportId| self.crossing_steel(s, bottoms);
        let in_place = PanelInPlace {
            view: self.view,
            id,
            strip: self.strips[id.0].as_ref(),
            t1_axis: self.t1_axes[id.0],
            outer_mm: outer,
            crossing_steel: &crossing,
            moments: self.moments,
            candidates: self.candidates,
        };
        design.governing = governing(&assembled.checks);
        design.thickness_governed_by = in_place.governed_by(&assembled.checks);
        if assembled.checks.iter().any(|check| check.kind == CheckKind::Deflection && !check.ok) {
            design.least_thickness_mm = in_place.least_that_passes();
        }
        if let (Some(fixed), false) = (self.view.fixed(id), cantilever) {
            if let Some(task) = bottom_task(&self.view, id, self.t1_axes[id.0], self.candidates, &moments) {
                design.bars.bottom = task.designs(bottoms[id.0].unwrap_or_else(|| task.choose()));
            }
            let t1_mm = self.t1_size(id.0, bottoms, designs);
            design.bars.edges =
                edge_bars::edge_bars(&self.view, panel, fixed, self.t1_axes[id.0], t1_mm, &design.bars);
        }
        if let Some(basis) = &design.basis {
            let View { floor, criteria, .. } = self.view;
            design.corners = corners::corners(
                floor,
                criteria,
                panel,
                basis,
                &assembled.sections,
                &design.bars,
                &supports,
                designs,
            );
            design.openings = openings::openings(panel, basis, &assembled.sections, designs);
        }
        design.sections = assembled.sections;
        design.checks = assembled.checks;
        design.deflection = Some(assembled.deflection);
        design
    }
}
