//! Exact choice of bars for one place: every allowed size and spacing is tried.

use std::cmp::Ordering;

use crate::bs8110::flexure::steel_area;
use crate::bs8110::spacing::{BETA_B_MIDSPAN, greatest_clear, least_gap};
use crate::check::RATIO_TOLERANCE;
use crate::criteria::Criteria;
use crate::floor::BarChoice;

/// Every allowed size and spacing, sizes least first, then spacings widest first.
#[must_use]
pub fn candidates(criteria: &Criteria) -> Vec<BarChoice> {
    let spacings = criteria.spacings_mm();
    criteria
        .bar_sizes_mm
        .iter()
        .flat_map(|&bar_mm| spacings.iter().rev().map(move |&spacing_mm| BarChoice { bar_mm, spacing_mm }))
        .collect()
}

/// How good a choice is: its worst ratio and its cost.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Score {
    /// Greatest ratio among the checks that the choice decides; at most 1 passes.
    pub worst_ratio: f64,
    /// Steel as mass over the place, kg.
    pub cost_kg: f64,
}

impl Score {
    /// Whether every check passes.
    #[must_use]
    pub fn passes(&self) -> bool {
        self.worst_ratio <= 1.0 + RATIO_TOLERANCE
    }
}

/// Values within 1e-9 of each other (of the larger) are a tie.
fn tied(a: f64, b: f64) -> Ordering {
    if (a - b).abs() <= 1e-9 * a.abs().max(b.abs()) { Ordering::Equal } else { a.total_cmp(&b) }
}

fn larger_spacing_then_smaller_size(a: BarChoice, b: BarChoice) -> Ordering {
    b.spacing_mm.total_cmp(&a.spacing_mm).then(a.bar_mm.total_cmp(&b.bar_mm))
}

/// Order of preference for one place: passing before failing; among passing the least cost; among failing the
/// least worst ratio, then the least cost; ties to the larger spacing, then the smaller size.
#[must_use]
pub fn preference(a: (BarChoice, Score), b: (BarChoice, Score)) -> Ordering {
    let excess = |score: Score| if score.passes() { 1.0 } else { score.worst_ratio };
    tied(excess(a.1), excess(b.1))
        .then(tied(a.1.cost_kg, b.1.cost_kg))
        .then(larger_spacing_then_smaller_size(a.0, b.0))
}

/// The preferred of some choices; none where there are none.
pub fn best(choices: impl Iterator<Item = (BarChoice, Score)>) -> Option<(BarChoice, Score)> {
    choices.reduce(|a, b| if preference(a, b) == Ordering::Greater { b } else { a })
}

/// The two layers of a panel chosen together: `outer` scores the outer bars alone, `inner` the inner bars
/// under outer bars of a size. Exact: the inner layer depends on the outer one by its size alone. Where
/// nothing passes the least greatest ratio of the two layers wins, then the least of the other layer's
/// ratio, so that a layer that can pass does; then mass.
pub fn best_pair(
    outer: &[(BarChoice, Score)],
    mut inner: impl FnMut(f64) -> Option<(BarChoice, Score)>,
) -> Option<[(BarChoice, Score); 2]> {
    let mut by_size: Vec<(f64, Option<(BarChoice, Score)>)> = Vec::new();
    let mut chosen: Option<[(BarChoice, Score); 2]> = None;
    for &candidate in outer {
        let size = candidate.0.bar_mm;
        let under = match by_size.iter().find(|(known, _)| known.total_cmp(&size).is_eq()) {
            Some((_, under)) => *under,
            None => {
                let under = inner(size);
                by_size.push((size, under));
                under
            }
        };
        let Some(under) = under else { continue };
        let pair = [candidate, under];
        if chosen.is_none_or(|best| pair_preference(&pair, &best) == Ordering::Less) {
            chosen = Some(pair);
        }
    }
    chosen
}

fn pair_preference(a: &[(BarChoice, Score); 2], b: &[(BarChoice, Score); 2]) -> Ordering {
    let excesses = |pair: &[(BarChoice, Score); 2]| {
        let [p, q] = pair.map(|(_, s)| if s.passes() { 1.0 } else { s.worst_ratio });
        (p.max(q), p.min(q))
    };
    let cost = |pair: &[(BarChoice, Score); 2]| pair[0].1.cost_kg + pair[1].1.cost_kg;
    let ((a_worst, a_other), (b_worst, b_other)) = (excesses(a), excesses(b));
    tied(a_worst, b_worst)
        .then(tied(a_other, b_other))
        .then(tied(cost(a), cost(b)))
        .then(larger_spacing_then_smaller_size(a[0].0, b[0].0))
        .then(larger_spacing_then_smaller_size(a[1].0, b[1].0))
}

/// Bars that give an area under no moment of their own (distribution, edges, torsion): the least steel that meets the area
/// and the spacing rules, no size over `greatest_mm`; where none does, the most steel of those sizes. `h_mm` is the
/// thickness, `cover_mm` the cover to these bars.
#[must_use]
pub fn nominal_bars(
    criteria: &Criteria,
    as_required_mm2_m: f64,
    greatest_mm: f64,
    h_mm: f64,
    cover_mm: f64,
) -> Option<BarChoice> {
    let smallest = criteria.bar_sizes_mm.first().copied()?;
    let allowed = |bars: &BarChoice| bars.bar_mm <= greatest_mm.max(smallest) + 1e-9;
    let scored = candidates(criteria).into_iter().filter(allowed).map(|bars| {
        let area = steel_area(bars.bar_mm, bars.spacing_mm);
        let d = (h_mm - cover_mm - bars.bar_mm / 2.0).max(1.0);
        let clear = greatest_clear(h_mm, d, area, criteria.fy_n_mm2, BETA_B_MIDSPAN);
        let gap =
            least_gap(criteria.maximum_aggregate_mm, bars.bar_mm) / (bars.spacing_mm - bars.bar_mm).max(1.0);
        let worst_ratio = (as_required_mm2_m / area).max((bars.spacing_mm - bars.bar_mm) / clear).max(gap);
        (bars, Score { worst_ratio, cost_kg: cost(area, 1.0, 1.0) })
    });
    best(scored).map(|(bars, _)| bars)
}

/// Mass of bars over a strip of slab, kg: area per metre x mean length x width x 7850 kg/m3. The one cost used by
/// the choice of bars everywhere.
#[must_use]
pub fn cost(area_mm2_m: f64, mean_length_m: f64, width_m: f64) -> f64 {
    area_mm2_m * 1e-6 * mean_length_m * width_m * 7850.0
}
