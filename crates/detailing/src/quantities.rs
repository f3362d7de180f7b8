//! Concrete, formwork and steel of a detailed floor.

use std::collections::BTreeMap;

use design_engine::floor::{Floor, PanelOpening};

use crate::bending::mass_kg;
use crate::model::{BarSet, ScheduledBar, Use};

/// Quantities of a floor. Plan area is measured between gridlines, openings taken off; beams and the half support outside
/// are not counted.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Quantities {
    /// Concrete of the slab, m3.
    pub concrete_m3: f64,
    /// Formwork of the soffit, m2.
    pub formwork_m2: f64,
    /// All steel, kg.
    pub steel_kg: f64,
    /// Steel by bar size in mm.
    pub steel_kg_by_size: Vec<(f64, f64)>,
    /// Of it: what laps a bar over the stock length, kg.
    pub laps_kg: f64,
    /// Of it: bars beside and across the corners of openings, kg.
    pub trimmers_kg: f64,
    /// Steel by what it is for, kg.
    pub steel_kg_by_use: Vec<(Use, f64)>,
}

impl Quantities {
    /// Steel per m3 of concrete, kg/m3; none where there is no concrete.
    #[must_use]
    pub fn steel_kg_m3(&self) -> Option<f64> {
        (self.concrete_m3 > 0.0).then(|| self.steel_kg / self.concrete_m3)
    }

    /// Steel per m2 of formwork, kg/m2; none where there is none.
    #[must_use]
    pub fn steel_kg_m2(&self) -> Option<f64> {
        (self.formwork_m2 > 0.0).then(|| self.steel_kg / self.formwork_m2)
    }
}

#[expect(clippy::cast_precision_loss, reason = "bars of a floor are far below 2^53")]
fn number(count: usize) -> f64 {
    count as f64
}

/// Area that openings take, what overlaps counted once, m2.
fn area_of_openings_m2(openings: &[PanelOpening]) -> f64 {
    let along = |o: &PanelOpening| [o.from_west_m, o.from_west_m + o.widths_m[0]];
    let across = |o: &PanelOpening| [o.from_south_m, o.from_south_m + o.widths_m[1]];
    let mut cuts: Vec<f64> = openings.iter().flat_map(along).collect();
    cuts.sort_by(f64::total_cmp);
    let strip = |pair: &[f64]| {
        let middle = f64::midpoint(pair[0], pair[1]);
        let over = openings.iter().filter(|o| along(o)[0] < middle && middle < along(o)[1]);
        let mut taken: Vec<[f64; 2]> = over.map(across).collect();
        taken.sort_by(|a, b| a[0].total_cmp(&b[0]));
        let mut reached = f64::NEG_INFINITY;
        let mut width = 0.0;
        for [from, to] in taken {
            width += (to - from.max(reached)).max(0.0);
            reached = reached.max(to);
        }
        width * (pair[1] - pair[0])
    };
    cuts.windows(2).map(strip).sum()
}

/// Quantities from the marks, in order of marks; laps and trimmers from the sets.
pub(crate) fn quantities(floor: &Floor, bars: &[ScheduledBar], sets: &[BarSet]) -> Quantities {
    let net = |area: f64, openings: f64| (area - openings).max(0.0);
    let mut quantities = Quantities::default();
    for panel in &floor.panels {
        let area = net(panel.area_m2(), area_of_openings_m2(&panel.openings));
        quantities.formwork_m2 += area;
        quantities.concrete_m3 += area * panel.thickness_mm / 1000.0;
    }
    let mut by_size: BTreeMap<u64, (f64, f64)> = BTreeMap::new();
    for bar in bars {
        quantities.steel_kg += bar.mass_kg;
        let entry = by_size.entry(bar.bar.size_mm.to_bits()).or_insert((bar.bar.size_mm, 0.0));
        entry.1 += bar.mass_kg;
    }
    quantities.steel_kg_by_size = by_size.into_values().collect();
    let mut by_use: BTreeMap<Use, f64> = BTreeMap::new();
    for set in sets {
        for run in &set.runs {
            let bar = &bars[run.bar];
            let mass = number(run.count) * mass_kg(bar.bar.size_mm, bar.length_mm);
            *by_use.entry(set.for_what).or_insert(0.0) += mass;
            quantities.laps_kg += number(run.count) * mass_kg(bar.bar.size_mm, run.lap_mm);
            if matches!(set.for_what, Use::Trimmer | Use::Diagonal) {
                quantities.trimmers_kg += mass;
            }
        }
    }
    quantities.steel_kg_by_use = by_use.into_iter().collect();
    quantities
}
