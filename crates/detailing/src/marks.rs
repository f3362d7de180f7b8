//! One bar, one mark over the whole floor, numbered in order of fixing.

use std::collections::BTreeMap;

use design_engine::floor::Layer;

use crate::bending::mass_kg;
use crate::drafts::SetDraft;
use crate::model::{Bar, BarSet, Run, ScheduledBar, Use};

/// What makes two bars the same: size, shape and dimensions in tenths of a millimetre.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
pub struct BarKey(i64, &'static str, [i64; 5]);

impl BarKey {
    /// The key of a bar.
    #[must_use]
    pub fn of(bar: &Bar) -> BarKey {
        #[expect(
            clippy::cast_possible_truncation,
            reason = "dimensions are far below 2^53 tenths of a millimetre"
        )]
        let tenths = |mm: f64| (mm * 10.0).round() as i64;
        let dimensions = bar.shape.dimensions().map(|dimension| tenths(dimension.unwrap_or(0.0)));
        BarKey(tenths(bar.size_mm), bar.shape.code(), dimensions)
    }
}

/// Rank of a set in order of fixing: bottom outer, bottom inner, over supports (the inner top layer is laid first), then
/// distribution, edges, corners, openings.
fn rank(set: &BarSet) -> (Use, u8) {
    let layer = match set.layer {
        Layer::B1 | Layer::T2 => 0,
        Layer::B2 | Layer::T1 => 1,
    };
    (set.for_what, layer)
}

/// Puts sets in order of fixing and gives every bar its mark.
pub(crate) fn mark(mut drafts: Vec<SetDraft>) -> (Vec<BarSet>, Vec<ScheduledBar>) {
    drafts.sort_by_key(|draft| rank(&draft.set));
    let mut known: BTreeMap<BarKey, usize> = BTreeMap::new();
    let mut bars: Vec<ScheduledBar> = Vec::new();
    let mut sets = Vec::with_capacity(drafts.len());
    for SetDraft { mut set, runs } in drafts {
        for run in runs {
            let index = *known.entry(BarKey::of(&run.bar)).or_insert_with(|| {
                bars.push(scheduled(run.bar, &set));
                bars.len() - 1
            });
            bars[index].count += run.count;
            set.runs.push(Run {
                bar: index,
                count: run.count,
                first_mm: run.first,
                pitch_mm: run.pitch,
                last_mm: run.last,
                along_mm: run.along,
                lap_mm: run.lap,
            });
        }
        if !set.runs.is_empty() {
            sets.push(set);
        }
    }
    number(&mut bars);
    (sets, bars)
}

fn scheduled(bar: Bar, set: &BarSet) -> ScheduledBar {
    ScheduledBar {
        mark: String::new(),
        bar,
        count: 0,
        length_mm: bar.shape.length_mm(bar.size_mm),
        mass_kg: 0.0,
        layer: set.layer,
        for_what: set.for_what,
        spacing_mm: set.spacing_mm,
        revision: String::new(),
    }
}

/// `01` and so on, of one width over the floor; masses from numbers and lengths.
fn number(bars: &mut [ScheduledBar]) {
    let width = bars.len().to_string().len().max(2);
    for (index, bar) in bars.iter_mut().enumerate() {
        bar.mark = format!("{:0width$}", index + 1);
        bar.mass_kg = mass_of(bar);
    }
}

/// Mass of all bars of a mark, kg.
pub(crate) fn mass_of(bar: &ScheduledBar) -> f64 {
    #[expect(clippy::cast_precision_loss, reason = "bars of a floor are far below 2^53")]
    let count = bar.count as f64;
    count * mass_kg(bar.bar.size_mm, bar.length_mm)
}
