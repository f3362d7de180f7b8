//! The same panel at another thickness: what governs its thickness, and the least one that would do.

use super::balance::{SupportMoment, support_moment};
use super::fixed::{Fixed, fix};
use super::panel::{SupportBars, assemble, assemble_cantilever, bottom_task, governing, supports_of};
use super::roots::final_shears;
use super::strips::StripPlace;
use super::top::TopTask;
use super::view::View;
use crate::check::{Check, CheckKind};
use crate::floor::{Axis, BarChoice, Layer, PanelId, SupportId};
use crate::result::Action;

/// Step between thicknesses tried, mm.
const STEP_MM: f64 = 5.0;
/// Thinnest and thickest tried, mm.
const LEAST_MM: f64 = 50.0;
const GREATEST_MM: f64 = 1000.0;

/// A panel in the finished floor design, to be tried at other thicknesses while its neighbours stay.
pub(crate) struct PanelInPlace<'a> {
    pub(crate) view: View<'a>,
    pub(crate) id: PanelId,
    pub(crate) strip: Option<&'a StripPlace>,
    pub(crate) t1_axis: Axis,
    /// Size of the T1 bars that cross each support, as designed, mm.
    pub(crate) outer_mm: &'a (dyn Fn(SupportId) -> f64 + Sync),
    pub(crate) crossing_steel: &'a (dyn Fn(SupportId) -> f64 + Sync),
    pub(crate) moments: &'a [Option<SupportMoment>],
    pub(crate) candidates: &'a [BarChoice],
}

impl PanelInPlace<'_> {
    /// Checks of the panel at a thickness, all bars chosen again.
    fn checks_at(&self, thickness_mm: f64) -> Vec<Check> {
        let Some(now) = self.view.fixed(self.id) else { return Vec::new() };
        let panel = self.view.floor.panel(self.id);
        let coefficients = fix(panel, thickness_mm, now.basis, self.strip, self.view.criteria);
        let view = View { swap: Some((self.id, &coefficients)), ..self.view };
        let own: Vec<(SupportId, Option<SupportMoment>)> = supports_of(&view, self.id)
            .into_iter()
            .map(|(_, id)| (id, support_moment(&view, view.floor.support(id))))
            .collect();
        let moments = |id: SupportId| {
            own.iter().find(|(known, _)| *known == id).map_or_else(|| self.moments[id.0], |(_, m)| *m)
        };
        let fixed = Fixed { side_shear_kn_m: final_shears(&view, self.id, &moments), ..coefficients };
        let view = View { swap: Some((self.id, &fixed)), ..self.view };
        let supports: Vec<SupportBars<'_>> = supports_of(&view, self.id)
            .into_iter()
            .filter_map(|(side, id)| {
                let layer = if side.span_axis() == self.t1_axis { Layer::T1 } else { Layer::T2 };
                let outer = if layer == Layer::T1 { 0.0 } else { (self.outer_mm)(id) };
                let crossing = (self.crossing_steel)(id);
                let task = TopTask::new(view, id, layer, outer, crossing, self.candidates, &moments)?;
                let bars = task.choose()?.bars;
                Some(SupportBars { task, id, side, layer, bars })
            })
            .collect();
        let assembled = if fixed.basis.action == Action::Cantilever {
            assemble_cantilever(&view, self.id, self.t1_axis, self.candidates, &supports)
        } else {
            let task = bottom_task(&view, self.id, self.t1_axis, self.candidates, &moments);
            task.map(|task| assemble(&view, self.id, &task, task.choose(), &supports, &moments))
        };
        assembled.map_or_else(Vec::new, |assembled| assembled.checks)
    }

    /// The check that fails first when the panel is made thinner in steps of 5 mm, bars chosen again.
    pub(crate) fn governed_by(&self, checks_now: &[Check]) -> Option<CheckKind> {
        let failing = |checks: &[Check]| {
            let failed: Vec<Check> = checks.iter().filter(|check| !check.ok).cloned().collect();
            governing(&failed).map(|index| failed[index].kind)
        };
        if let Some(kind) = failing(checks_now) {
            return Some(kind);
        }
        let mut thickness = self.view.fixed(self.id)?.thickness_mm - STEP_MM;
        while thickness >= LEAST_MM {
            if let Some(kind) = failing(&self.checks_at(thickness)) {
                return Some(kind);
            }
            thickness -= STEP_MM;
        }
        None
    }

    /// Least thickness in whole 5 mm above the present one at which deflection passes.
    pub(crate) fn least_that_passes(&self) -> Option<f64> {
        let mut thickness =
            ((self.view.fixed(self.id)?.thickness_mm + 1e-6) / STEP_MM).floor() * STEP_MM + STEP_MM;
        while thickness <= GREATEST_MM {
            let checks = self.checks_at(thickness);
            if checks.iter().all(|check| check.ok || check.kind != CheckKind::Deflection) {
                return Some(thickness);
            }
            thickness += STEP_MM;
        }
        None
    }
}
