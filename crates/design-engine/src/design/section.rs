//! What every section has in common: bending steel and the checks that its bars decide.

use crate::bs8110::flexure::{Flexure, bending, maximum_steel, minimum_steel, steel_area};
use crate::bs8110::spacing::{greatest_clear, least_gap};
use crate::check::{Check, CheckKind, Place};
use crate::criteria::Criteria;
use crate::floor::{BarChoice, Layer};
use crate::result::Section;

/// A section with its bars chosen (or being tried).
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Trial {
    pub(crate) at: Place,
    pub(crate) bars: BarChoice,
    pub(crate) stated: bool,
    /// Design moment; none for distribution and crossing bars.
    pub(crate) moment_knm_m: Option<f64>,
    /// Steel asked for beside bending and the minimum (crossing bars), mm2/m.
    pub(crate) floor_steel_mm2_m: f64,
    pub(crate) d_mm: f64,
    /// Thickness for minimum steel and the spacing rules, mm.
    pub(crate) h_mm: f64,
    /// Thickness of the thinner slab of a support, for maximum steel, mm; elsewhere `h_mm`.
    pub(crate) least_h_mm: f64,
    /// Cover to these bars, those outside them counted, mm.
    pub(crate) cover_to_bars_mm: f64,
    /// Nominal cover to the outermost bar, mm.
    pub(crate) nominal_cover_mm: f64,
    pub(crate) k_limit: f64,
    pub(crate) beta_b: f64,
}

impl Trial {
    pub(crate) fn as_provided(&self) -> f64 {
        steel_area(self.bars.bar_mm, self.bars.spacing_mm)
    }

    pub(crate) fn flexure(&self, criteria: &Criteria) -> Option<Flexure> {
        let gamma = criteria.steel_partial_factor();
        self.moment_knm_m.map(|m| {
            bending(m.max(0.0), self.d_mm, criteria.fcu_n_mm2, criteria.fy_n_mm2, gamma, self.k_limit)
        })
    }

    /// Steel of the greatest moment the section can carry, K = K'.
    fn steel_at_k_limit(&self, criteria: &Criteria) -> f64 {
        let moment = self.k_limit * (1.0 - 1e-12) * criteria.fcu_n_mm2 * self.d_mm * self.d_mm / 1000.0;
        Trial { moment_knm_m: Some(moment), ..*self }
            .flexure(criteria)
            .and_then(|f| f.as_mm2_m)
            .unwrap_or(0.0)
    }

    pub(crate) fn as_minimum(&self, criteria: &Criteria) -> f64 {
        minimum_steel(self.h_mm, criteria.fy_n_mm2)
    }

    /// Steel required; none where K exceeds K'.
    pub(crate) fn as_required(&self, criteria: &Criteria) -> Option<f64> {
        let least = self.as_minimum(criteria).max(self.floor_steel_mm2_m);
        match self.flexure(criteria) {
            None => Some(least),
            Some(flexure) => flexure.as_mm2_m.map(|steel| steel.max(least)),
        }
    }

    /// Checks that depend on size, spacing and depth alone.
    pub(crate) fn checks(&self, criteria: &Criteria, give: &mut dyn FnMut(Check)) {
        let at = self.at;
        let provided = self.as_provided();
        if let Some(flexure) = self.flexure(criteria) {
            if flexure.as_mm2_m.is_none() {
                give(Check::at_most(CheckKind::Bending, at, "3.4.4.4", flexure.k, flexure.k_limit, "K"));
            }
            // Where K exceeds K' the bars are still chosen for what the section can carry.
            let steel = flexure.as_mm2_m.unwrap_or_else(|| self.steel_at_k_limit(criteria));
            give(Check::at_most(CheckKind::Bending, at, "3.4.4.4", steel, provided, "mm2/m"));
        }
        let least = self.as_minimum(criteria).max(self.floor_steel_mm2_m);
        give(Check::at_most(CheckKind::MinimumSteel, at, "Table 3.25", least, provided, "mm2/m"));
        let most = maximum_steel(self.least_h_mm);
        give(Check::at_most(CheckKind::MaximumSteel, at, "3.12.6.1", provided, most, "mm2/m"));
        self.spacing_checks(criteria, provided, give);
        let cover_needed = self.bars.bar_mm.max(criteria.maximum_aggregate_mm);
        let cover = if self.bars.bar_mm > criteria.maximum_aggregate_mm {
            self.cover_to_bars_mm
        } else {
            self.nominal_cover_mm
        };
        give(Check::at_most(
            CheckKind::CoverForBarAndAggregate,
            at,
            "3.3.1.2, 3.3.1.3",
            cover_needed,
            cover,
            "mm",
        ));
    }

    fn spacing_checks(&self, criteria: &Criteria, provided: f64, give: &mut dyn FnMut(Check)) {
        let BarChoice { bar_mm, spacing_mm } = self.bars;
        let clear = spacing_mm - bar_mm;
        let limit = self.greatest_clear_for(criteria, provided);
        // Stated bars alone can lie outside the criteria's spacings; what is nearer to failing is shown.
        if self.stated && spacing_mm / criteria.greatest_spacing_mm > clear / limit {
            let greatest = criteria.greatest_spacing_mm;
            give(Check::at_most(CheckKind::BarSpacing, self.at, "criteria", spacing_mm, greatest, "mm"));
        } else {
            give(Check::at_most(CheckKind::BarSpacing, self.at, "3.12.11.2.7", clear, limit, "mm"));
        }
        let gap = least_gap(criteria.maximum_aggregate_mm, bar_mm);
        if self.stated && criteria.least_spacing_mm / spacing_mm > gap / clear.max(1.0) {
            let least = criteria.least_spacing_mm;
            give(Check::at_most(CheckKind::BarGap, self.at, "criteria", least, spacing_mm, "mm"));
        } else {
            give(Check::at_most(CheckKind::BarGap, self.at, "3.12.11.1", gap, clear.max(1.0), "mm"));
        }
    }

    fn greatest_clear_for(&self, criteria: &Criteria, provided: f64) -> f64 {
        greatest_clear(self.h_mm, self.d_mm, provided, criteria.fy_n_mm2, self.beta_b)
    }

    /// Whether every second bar may stop: those that go on still meet the greatest clear spacing, the greatest
    /// spacing of the criteria, and the minimum.
    pub(crate) fn alternate_bars_may_stop(&self, criteria: &Criteria) -> bool {
        let (spacing, provided) = (2.0 * self.bars.spacing_mm, self.as_provided() / 2.0);
        let least = self.as_minimum(criteria).max(self.floor_steel_mm2_m);
        spacing <= criteria.greatest_spacing_mm + 1e-9
            && spacing - self.bars.bar_mm <= self.greatest_clear_for(criteria, provided) + 1e-9
            && provided >= least - 1e-9
    }
}

/// Whether the covers and the largest bar of each layer of a panel find room in its thickness (geometry); a layer without
/// bars takes none. Bars of one layer lie side by side, so each layer is as thick as its largest bar.
pub(crate) fn layers_fit(sections: &[Section], thickness_mm: f64, criteria: &Criteria) -> Check {
    let largest = |layer: Layer| {
        sections.iter().filter(|section| section.layer == layer).map(|s| s.bars.bar_mm).fold(0.0, f64::max)
    };
    let layers: f64 = [Layer::B1, Layer::B2, Layer::T1, Layer::T2].map(largest).iter().sum();
    let needed = criteria.bottom_cover_mm + criteria.top_cover_mm + layers;
    Check::at_most(CheckKind::LayersFit, Place::Panel, "geometry", needed, thickness_mm, "mm")
}

/// The worst ratio of a run of checks; a thing not allowed at all counts as 1e9.
pub(crate) fn worst_ratio(run: impl FnOnce(&mut dyn FnMut(Check))) -> f64 {
    let mut worst = 0.0_f64;
    run(&mut |check| worst = worst.max(check.ratio.unwrap_or(1e9)));
    worst
}
