//! From bars where they must be to runs of equal bars: openings cut them, the stock length splits them.

use std::collections::BTreeMap;

use design_engine::bs8110::bond::{LapPlace, lap_mm};
use design_engine::criteria::Criteria;
use design_engine::floor::Layer;

use crate::bending::{Shape, up_to_5, up_to_25};
use crate::model::{Bar, BarSet};
use crate::placed::{Placed, Reach, make};

/// What is left of a bar beside an opening is dropped where it is shorter than this many sizes.
const LEAST_PIECE_SIZES: f64 = 12.0;

/// A hole with its cover on all sides, mm on plan: bars within it across are cut along it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Hole {
    pub(crate) across: [f64; 2],
    pub(crate) along: [f64; 2],
}

/// A run whose bar has no mark yet.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct RunDraft {
    pub(crate) bar: Bar,
    pub(crate) count: usize,
    pub(crate) first: f64,
    pub(crate) pitch: f64,
    pub(crate) last: f64,
    pub(crate) along: [f64; 2],
    pub(crate) lap: f64,
}

/// A set whose bars have no marks yet.
#[derive(Debug, Clone)]
pub(crate) struct SetDraft {
    pub(crate) set: BarSet,
    pub(crate) runs: Vec<RunDraft>,
}

/// What the bars of a set have in common.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Common<'a> {
    pub(crate) size_mm: f64,
    pub(crate) spacing_mm: f64,
    pub(crate) layer: Layer,
    pub(crate) criteria: &'a Criteria,
}

impl Common<'_> {
    /// Lap of two bars of the set, mm, up to whole 5.
    pub(crate) fn lap(&self) -> f64 {
        let top = matches!(self.layer, Layer::T1 | Layer::T2);
        let cover_mm = if top { self.criteria.top_cover_mm } else { self.criteria.bottom_cover_mm };
        let clear_between_mm = self.spacing_mm - 2.0 * self.size_mm;
        up_to_5(lap_mm(
            self.size_mm,
            LapPlace { top_as_cast: top, cover_mm, clear_between_mm },
            self.criteria,
        ))
    }
}

/// One made bar: place across, extent, shape, what of it laps the piece before.
#[derive(Clone, Copy)]
struct Made {
    across: f64,
    along: [f64; 2],
    shape: Shape,
    lap: f64,
}

/// Runs of a set's bars.
pub(crate) fn runs(placed: &[Placed], holes: &[Hole], common: &Common<'_>) -> Vec<RunDraft> {
    let mut made = Vec::with_capacity(placed.len());
    for bar in placed {
        for ends in cut(bar, holes) {
            let Some((along, shape)) = make(ends, common.size_mm) else { continue };
            let is_piece = ends != bar.ends;
            if is_piece && along[1] - along[0] < LEAST_PIECE_SIZES * common.size_mm {
                continue;
            }
            made.extend(pieces(bar.across, along, shape, common));
        }
    }
    grouped(made, common.size_mm)
}

/// The parts of a bar that openings leave.
fn cut(bar: &Placed, holes: &[Hole]) -> Vec<[Reach; 2]> {
    let mut over: Vec<&Hole> =
        holes.iter().filter(|hole| hole.across[0] < bar.across && bar.across < hole.across[1]).collect();
    over.sort_by(|a, b| a.along[0].total_cmp(&b.along[0]));
    let mut parts = Vec::new();
    let [mut low, mut high] = bar.ends;
    for hole in over {
        // A hole beyond an end is no cut, but the bar must not grow into it.
        if hole.along[1] <= low.needed {
            low.limit = low.limit.max(hole.along[1].min(low.needed));
            continue;
        }
        if hole.along[0] >= high.needed {
            high.limit = high.limit.min(hole.along[0].max(high.needed));
            continue;
        }
        if hole.along[0] > low.limit {
            parts.push([low, Reach::at(hole.along[0])]);
        }
        low = Reach::at(hole.along[1]);
    }
    parts.push([low, high]);
    parts
}

/// A bar over the stock length in equal pieces that lap; any other bar as it is.
fn pieces(across: f64, along: [f64; 2], shape: Shape, common: &Common<'_>) -> Vec<Made> {
    let stock = common.criteria.stock_length_m * 1000.0;
    if shape.length_mm(common.size_mm) <= stock + 1e-6 {
        return vec![Made { across, along, shape, lap: 0.0 }];
    }
    let legs = match shape {
        Shape::Straight { .. } => [None, None],
        // Which end is bent is not kept in the shape: the leg stays at the first piece, where it may be either end.
        Shape::Bent { b, .. } => [Some(b), None],
        Shape::Double { a, c, .. } | Shape::Hairpin { a, c, .. } => [Some(a), Some(c)],
    };
    let lap = common.lap();
    let total = along[1] - along[0];
    let leg = legs.iter().flatten().fold(0.0_f64, |a, b| a.max(*b));
    let mut count = 2.0;
    while up_to_25((total + (count - 1.0) * lap) / count) + leg > stock && count < 1000.0 {
        count += 1.0;
    }
    let length = up_to_25((total + (count - 1.0) * lap) / count);
    let step = (total - length) / (count - 1.0);
    let mut made = Vec::new();
    let mut index = 0.0;
    while index < count {
        let start = along[0] + step * index;
        let own = if index < 0.5 { legs[0] } else { None };
        let last = if index > count - 1.5 { legs[1] } else { None };
        let shape = own.or(last).map_or(Shape::Straight { a: length }, |b| Shape::Bent { a: length, b });
        let lap = if index < 0.5 { 0.0 } else { length - step };
        made.push(Made { across, along: [start, start + length], shape, lap });
        index += 1.0;
    }
    made
}

#[expect(
    clippy::cast_possible_truncation,
    reason = "plan positions are far below 2^53 tenths of a millimetre"
)]
fn tenths(mm: f64) -> i64 {
    (mm * 10.0).round() as i64
}

/// Equal bars in arithmetic runs, in order of their first bar.
fn grouped(made: Vec<Made>, size_mm: f64) -> Vec<RunDraft> {
    type Key = ([i64; 2], &'static str, [i64; 5]);
    let mut groups: BTreeMap<Key, Vec<Made>> = BTreeMap::new();
    for bar in made {
        let dimensions = bar.shape.dimensions().map(|dimension| tenths(dimension.unwrap_or(0.0)));
        let key = (bar.along.map(tenths), bar.shape.code(), dimensions);
        groups.entry(key).or_default().push(bar);
    }
    let mut runs: Vec<RunDraft> = groups.into_values().flat_map(|bars| arithmetic(&bars, size_mm)).collect();
    runs.sort_by(|a, b| a.first.total_cmp(&b.first).then(a.along[0].total_cmp(&b.along[0])));
    runs
}

fn arithmetic(bars: &[Made], size_mm: f64) -> Vec<RunDraft> {
    let mut runs: Vec<RunDraft> = Vec::new();
    let mut closed = true;
    for bar in bars {
        if let (Some(run), false) = (runs.last_mut(), closed) {
            let gap = bar.across - run.last;
            if run.count == 1 || gap <= run.pitch + 1e-6 {
                closed = run.count > 1 && gap < run.pitch - 1e-6;
                if run.count == 1 {
                    run.pitch = gap;
                }
                run.count += 1;
                run.last = bar.across;
                continue;
            }
        }
        let Made { across, along, shape, lap } = *bar;
        let bar = Bar { size_mm, shape };
        runs.push(RunDraft { bar, count: 1, first: across, pitch: 0.0, last: across, along, lap });
        closed = false;
    }
    runs
}
