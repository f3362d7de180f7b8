//! Top bars of two supports that nearly meet in a panel run through it: one set, the heavier of the two.

use super::Stage;
use super::bottom::BottomBarsChosen;
use crate::bs8110::bond::{LapPlace, lap_mm};
use crate::floor::{BarChoice, Layer, PanelId, SupportId};
use crate::result::{Action, SupportDesign};

/// Bars from both sides that leave less than this share of the clear span between them run through (decision).
const LEAST_GAP_SHARE: f64 = 0.1;
/// Joining may lengthen bars and so join others: more rounds than a floor has needed.
const MOST_ROUNDS: usize = 8;

/// Two supports at opposite sides of a panel, over the same stretch.
#[derive(Clone, Copy)]
struct Pair {
    panel: PanelId,
    ids: [SupportId; 2],
}

/// Joins the supports of one top layer whose bars nearly meet in a panel: all of a chain take the size and spacing of its
/// heaviest, and run through. Stated bars are never changed: a pair of unlike ones stays as it is.
pub(crate) fn join(
    stage: &Stage<'_>,
    layer: Layer,
    bottoms: &[Option<BottomBarsChosen>],
    outer: &(dyn Fn(SupportId) -> f64 + Sync),
    designs: &mut [Option<SupportDesign>],
) {
    let pairs = pairs(stage, designs);
    let mut joined: Vec<Pair> = Vec::new();
    for _ in 0..MOST_ROUNDS {
        let meets = |pair: &&Pair| {
            !joined.iter().any(|known| known.ids == pair.ids)
                && nearly_meet(stage, bottoms, outer, designs, pair)
        };
        let new: Vec<Pair> = pairs.iter().filter(meets).copied().collect();
        if new.is_empty() {
            break;
        }
        joined.extend(new);
        for chain in chains(&joined) {
            let heaviest = chain.iter().filter_map(|id| designs[id.0].as_ref()).max_by(|a, b| {
                let size = |d: &SupportDesign| d.bars.bar_mm;
                a.as_provided_mm2_m.total_cmp(&b.as_provided_mm2_m).then(size(a).total_cmp(&size(b)))
            });
            let Some(bars) = heaviest.map(|design| design.bars) else { continue };
            for id in chain {
                redesign(stage, id, layer, bottoms, outer, bars, designs);
            }
        }
        mark(&joined, designs, stage, bottoms, outer);
    }
}

fn pairs(stage: &Stage<'_>, designs: &[Option<SupportDesign>]) -> Vec<Pair> {
    let floor = stage.view.floor;
    let mut pairs = Vec::new();
    for (index, panel) in floor.panels.iter().enumerate() {
        let id = PanelId(index);
        let cantilever = stage.view.fixed(id).is_none_or(|fixed| fixed.basis.action == Action::Cantilever);
        if cantilever {
            continue;
        }
        for axis in [crate::floor::Axis::X, crate::floor::Axis::Y] {
            let [low, high] = axis.end_sides();
            for near in panel.edge(low).segments.iter().filter_map(|segment| segment.support) {
                let like = |far: &SupportId| {
                    let (a, b) = (floor.support(near), floor.support(*far));
                    (a.from, a.to) == (b.from, b.to)
                };
                let far = panel.edge(high).segments.iter().filter_map(|segment| segment.support).find(like);
                let Some(far) = far else { continue };
                let (Some(a), Some(b)) = (&designs[near.0], &designs[far.0]) else { continue };
                let unlike = (a.bars.bar_mm - b.bars.bar_mm).abs() > 1e-9
                    || (a.bars.spacing_mm - b.bars.spacing_mm).abs() > 1e-9;
                if a.stated == b.stated && !(a.stated && unlike) {
                    pairs.push(Pair { panel: id, ids: [near, far] });
                }
            }
        }
    }
    pairs
}

fn nearly_meet(
    stage: &Stage<'_>,
    bottoms: &[Option<BottomBarsChosen>],
    outer: &(dyn Fn(SupportId) -> f64 + Sync),
    designs: &[Option<SupportDesign>],
    pair: &Pair,
) -> bool {
    let Some(clear) = stage.top_task(pair.ids[0], bottoms, outer).and_then(|t| t.clear_span_mm(pair.panel))
    else {
        return false;
    };
    let reach = |id: SupportId| {
        let side = designs[id.0].as_ref()?.sides.iter().find(|side| side.panel == pair.panel)?;
        Some(side.extension_m * 1000.0)
    };
    let bar = |id: SupportId| designs[id.0].as_ref().map_or(0.0, |design| design.bars.bar_mm);
    let criteria = stage.view.criteria;
    let place =
        LapPlace { top_as_cast: true, cover_mm: criteria.top_cover_mm, clear_between_mm: f64::INFINITY };
    let lap = lap_mm(bar(pair.ids[0]).max(bar(pair.ids[1])), place, criteria);
    match (reach(pair.ids[0]), reach(pair.ids[1])) {
        (Some(a), Some(b)) => clear - a - b < (LEAST_GAP_SHARE * clear).max(lap) - 1e-6,
        _ => false,
    }
}

/// Supports connected by pairs, each chain in the order of supports.
fn chains(joined: &[Pair]) -> Vec<Vec<SupportId>> {
    let mut chains: Vec<Vec<SupportId>> = Vec::new();
    for pair in joined {
        let mut merged: Vec<SupportId> = pair.ids.to_vec();
        chains.retain(|chain| {
            let touches = chain.iter().any(|id| pair.ids.contains(id));
            if touches {
                merged.extend(chain);
            }
            !touches
        });
        merged.sort_unstable();
        merged.dedup();
        chains.push(merged);
    }
    chains
}

/// Designs a support again with given bars; stated ones stay stated.
fn redesign(
    stage: &Stage<'_>,
    id: SupportId,
    layer: Layer,
    bottoms: &[Option<BottomBarsChosen>],
    outer: &(dyn Fn(SupportId) -> f64 + Sync),
    bars: BarChoice,
    designs: &mut [Option<SupportDesign>],
) {
    debug_assert_eq!(stage.layer_of(id), layer);
    if let Some(design) = stage.top_task(id, bottoms, outer).and_then(|task| task.with_bars(bars)) {
        designs[id.0] = Some(design);
    }
}

/// Joined bars all run the full extent, through the panel between them.
fn mark(
    joined: &[Pair],
    designs: &mut [Option<SupportDesign>],
    stage: &Stage<'_>,
    bottoms: &[Option<BottomBarsChosen>],
    outer: &(dyn Fn(SupportId) -> f64 + Sync),
) {
    for pair in joined {
        for id in pair.ids {
            let clear = stage.top_task(id, bottoms, outer).and_then(|task| task.clear_span_mm(pair.panel));
            let Some(design) = &mut designs[id.0] else { continue };
            design.alternate_reversed = false;
            for side in &mut design.sides {
                if side.panel == pair.panel {
                    side.runs_through = true;
                    side.extension_m = clear.unwrap_or(0.0) / 1000.0;
                }
                side.short_extension_m = side.extension_m;
            }
        }
    }
}
