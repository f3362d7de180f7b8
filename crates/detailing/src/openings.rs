//! Bars beside openings and across their corners.

use design_engine::bs8110::bond::anchorage_mm;
use design_engine::bs8110::flexure::steel_area;
use design_engine::floor::{Axis, BarChoice, Layer};
use design_engine::result::CutLayer;

use crate::bending::{Shape, up_to_25};
use crate::context::PanelContext;
use crate::drafts::{Common, RunDraft, SetDraft, runs};
use crate::model::{Bar, Use};
use crate::placed::{Placed, Reach};

/// Clear gap between a trimming bar and the next, and past the cover of the opening, mm (common practice, no source).
const TRIMMER_STEP_MM: f64 = 50.0;

/// Sets beside the openings of a panel that cut bars.
pub(crate) fn sets(context: &PanelContext<'_>) -> Vec<SetDraft> {
    let mut sets = Vec::new();
    let cutting = context.design.openings.iter().filter(|opening| !opening.displaced);
    for (opening, rect) in cutting.zip(context.cut_openings()) {
        for cut in &opening.layers {
            sets.extend(trimmers(context, rect, cut));
        }
        for top in [false, true] {
            let is_top = |cut: &&CutLayer| matches!(cut.layer, Layer::T1 | Layer::T2) == top;
            let cut: Vec<&CutLayer> = opening.layers.iter().filter(is_top).collect();
            sets.extend(diagonals(context, rect, &cut));
        }
    }
    sets
}

/// Half of the steel cut, on each side, anchored past the opening.
fn trimmers(context: &PanelContext<'_>, rect: [[f64; 2]; 2], cut: &CutLayer) -> Option<SetDraft> {
    let size = cut.bars.bar_mm;
    let area = steel_area(size, 1000.0);
    let mut needed = 0.0;
    while needed * area < cut.each_side_mm2 - 1e-6 {
        needed += 1.0;
    }
    let axis = cut.bars_along;
    let cover = context.criteria.bottom_cover_mm;
    let past = anchorage_mm(size, context.criteria) + cover;
    let [from, to] = rect[axis as usize];
    let limits = axis.end_sides().map(|side| context.slab.side(side).bar_limit(cover));
    let ends = [Reach::straight(from - past, limits[0]), Reach::straight(to + past, limits[1])];
    let [low, high] = rect[axis.across() as usize];
    let clear = context.slab.clear(axis.across());
    let mut places = Vec::new();
    let mut index = 0.0;
    while index < needed {
        let off = cover + size / 2.0 + index * (TRIMMER_STEP_MM + size);
        places.extend([low - off, high + off]);
        index += 1.0;
    }
    places.retain(|at| (clear[0]..=clear[1]).contains(at));
    places.sort_by(f64::total_cmp);
    let placed: Vec<Placed> = places.into_iter().map(|across| Placed { across, ends }).collect();
    let common = Common {
        size_mm: size,
        spacing_mm: TRIMMER_STEP_MM + size,
        layer: cut.layer,
        criteria: context.criteria,
    };
    let mut draft = context.draft(Use::Trimmer, cut.layer, axis, None, "beside opening");
    draft.runs = runs(&placed, &[], &common);
    (!draft.runs.is_empty()).then_some(draft)
}

/// A diagonal bar at each corner in a face whose bars are cut, of the largest size cut, anchored on both sides of the corner.
fn diagonals(context: &PanelContext<'_>, rect: [[f64; 2]; 2], cut: &[&CutLayer]) -> Option<SetDraft> {
    let largest: BarChoice = cut.iter().map(|cut| cut.bars).max_by(|a, b| a.bar_mm.total_cmp(&b.bar_mm))?;
    let layer = cut.iter().map(|cut| cut.layer).max()?;
    let size_mm = largest.bar_mm;
    let a = up_to_25(2.0 * anchorage_mm(size_mm, context.criteria));
    let [x, y] = rect;
    let half = a / 2.0 / std::f64::consts::SQRT_2;
    let middle = f64::midpoint(x[0], x[1]);
    let mut draft = context.draft(Use::Diagonal, layer, Axis::X, None, "diagonal at corners of opening");
    draft.runs = vec![RunDraft {
        bar: Bar { size_mm, shape: Shape::Straight { a } },
        count: 4,
        first: y[0],
        pitch: (y[1] - y[0]) / 3.0,
        last: y[1],
        along: [middle - half, middle + half],
        lap: 0.0,
    }];
    Some(draft)
}
