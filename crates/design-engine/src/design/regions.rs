//! Connected regions of top bars and the direction of their outer layer.

use std::cmp::Ordering;

use super::balance::SupportMoment;
use super::fixed::Fixed;
use crate::criteria::{Criteria, Layering};
use crate::floor::{Axis, Floor, PanelId};

/// The axis of the top outer bars (T1) around each panel: one direction over each region connected by
/// supports. By `Layering` where it names an axis; else the direction with the greater sum of support moment
/// x length; on a tie the direction of most short spans, then of most spans that carry in the region, then of the
/// greater length of supports that bars cross.
pub(crate) fn t1_axes(
    floor: &Floor,
    criteria: &Criteria,
    fixed: &[Option<Fixed>],
    moments: &[Option<SupportMoment>],
    most_short_spans: Option<Axis>,
) -> Vec<Axis> {
    let mut roots = Roots::new(floor.panels.len());
    for support in &floor.supports {
        if let Some(far) = support.far {
            roots.join(support.near.panel.0, far.panel.0);
        }
    }
    let mut sums = vec![[0.0_f64; 2]; floor.panels.len()];
    let mut lengths = sums.clone();
    for (support, moment) in floor.supports.iter().zip(moments) {
        lengths[roots.find(support.near.panel.0)][support.axis as usize] += support.length_m();
        if let Some(moment) = moment.and_then(|m| m.moment_knm_m) {
            let region = roots.find(support.near.panel.0);
            sums[region][support.axis as usize] += moment * support.length_m();
        }
    }
    // Spans that carry, by axis, over each region: what decides where nothing else does.
    let mut carrying = vec![[0_usize; 2]; floor.panels.len()];
    for (index, fixed) in fixed.iter().enumerate() {
        if let Some(fixed) = fixed {
            carrying[roots.find(index)][fixed.basis.axis_of(fixed.basis.main_span) as usize] += 1;
        }
    }
    (0..floor.panels.len())
        .map(|index| {
            let panel = floor.panel(PanelId(index));
            if let (Layering::Outer(axis), false) = (criteria.layering, panel.is_loose()) {
                return axis;
            }
            let root = roots.find(index);
            if let Some(axis) = greater(sums[root]) {
                return axis;
            }
            let most_carrying = match carrying[root][0].cmp(&carrying[root][1]) {
                Ordering::Greater => Axis::X,
                Ordering::Less => Axis::Y,
                Ordering::Equal => greater(lengths[root]).unwrap_or(Axis::X),
            };
            if panel.is_loose() { most_carrying } else { most_short_spans.unwrap_or(most_carrying) }
        })
        .collect()
}

/// The axis of the greater of two sums; none where they are the same.
fn greater([x, y]: [f64; 2]) -> Option<Axis> {
    ((x - y).abs() > 1e-9 * x.max(y)).then_some(if x > y { Axis::X } else { Axis::Y })
}

/// Disjoint sets of panels.
struct Roots(Vec<usize>);

impl Roots {
    fn new(count: usize) -> Roots {
        Roots((0..count).collect())
    }

    fn find(&mut self, mut index: usize) -> usize {
        while self.0[index] != index {
            self.0[index] = self.0[self.0[index]];
            index = self.0[index];
        }
        index
    }

    fn join(&mut self, a: usize, b: usize) {
        let (a, b) = (self.find(a), self.find(b));
        self.0[a.max(b)] = a.min(b);
    }
}
