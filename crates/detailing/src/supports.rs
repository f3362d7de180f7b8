//! Top bars over supports: single supports, and chains whose bars run through a short panel.

use design_engine::floor::{PanelId, Side, Support, SupportId, SupportSide};
use design_engine::result::{Action, SupportDesign, SupportSideDesign};

use crate::context::{Context, PanelContext};
use crate::drafts::{Common, SetDraft, runs};
use crate::model::Use;
use crate::placed::{Placed, Reach};
use crate::zones::between_faces;

/// Sets of top bars over every designed support, in the order of supports.
pub(crate) fn sets(context: &Context<'_>) -> Vec<SetDraft> {
    let mut consumed = vec![false; context.floor.supports.len()];
    let mut sets = Vec::new();
    for design in &context.design.supports {
        if consumed[design.support.0] {
            continue;
        }
        let chain = chain(context, design.support);
        for id in &chain {
            consumed[id.0] = true;
        }
        sets.extend(set(context, &chain));
    }
    sets
}

/// The supports that one set of bars runs over, lesser coordinate first.
fn chain(context: &Context<'_>, start: SupportId) -> Vec<SupportId> {
    let mut chain = vec![start];
    for toward_greater in [false, true] {
        let mut at = start;
        while let Some(next) = next(context, at, toward_greater).filter(|next| !chain.contains(next)) {
            chain.push(next);
            at = next;
        }
    }
    let line = |id: &SupportId| line_of(context, context.floor.support(*id));
    chain.sort_by(|a, b| line(a).total_cmp(&line(b)));
    chain
}

/// The support that bars run on to through the panel on one side.
fn next(context: &Context<'_>, id: SupportId, toward_greater: bool) -> Option<SupportId> {
    let support = context.floor.support(id);
    let side = side_toward(support, toward_greater)?;
    let own = context.design.support(id)?;
    own.sides.iter().find(|s| s.panel == side.panel && s.runs_through)?;
    let far = context.floor.panel(side.panel).edge(side.side.opposite());
    far.segments.iter().filter_map(|segment| segment.support).find(|other| {
        let support_there = context.floor.support(*other);
        let through = context
            .design
            .support(*other)
            .is_some_and(|design| design.sides.iter().any(|s| s.panel == side.panel && s.runs_through));
        (support.from, support.to) == (support_there.from, support_there.to) && through
    })
}

/// The side of a support whose panel lies toward greater, or lesser, coordinates.
fn side_toward(support: &Support, greater: bool) -> Option<SupportSide> {
    support.sides().find(|at| matches!(at.side, Side::West | Side::South) == greater)
}

/// Position of a support's line, mm.
fn line_of(context: &Context<'_>, support: &Support) -> f64 {
    let slab = crate::slab::Slab::new(context.floor.panel(support.near.panel));
    slab.side(support.near.side).line
}

fn set(context: &Context<'_>, chain: &[SupportId]) -> Option<SetDraft> {
    let (first, last) = (*chain.first()?, *chain.last()?);
    let design = context.design.support(first)?;
    let support = context.floor.support(first);
    let (low_long, low_short) = end(context, first, false)?;
    let (high_long, high_short) = end(context, last, true)?;
    let alternates = if design.alternate_reversed {
        [[low_long, high_short], [low_short, high_long]]
    } else {
        [[low_long, high_long], [low_short, high_short]]
    };
    let places = between_faces(zone(context, chain), design.bars.spacing_mm);
    let placed: Vec<Placed> = places
        .iter()
        .enumerate()
        .map(|(index, &across)| Placed { across, ends: alternates[index % 2] })
        .collect();
    let owner = owner(context, design)?;
    let axis = support.axis;
    let common = Common {
        size_mm: design.bars.bar_mm,
        spacing_mm: design.bars.spacing_mm,
        layer: design.layer,
        criteria: context.criteria,
    };
    let holes: Vec<_> = panels(context, chain).iter().flat_map(|panel| panel.holes(axis)).collect();
    let mut draft = owner.draft(Use::OverSupport, design.layer, axis, Some(design.bars.spacing_mm), "");
    draft.set.supports = chain.to_vec();
    draft.set.alternate_reversed = design.alternate_reversed;
    draft.set.cantilever = panels(context, chain).iter().any(is_cantilever);
    draft.runs = runs(&placed, &holes, &common);
    Some(draft)
}

fn is_cantilever(panel: &PanelContext<'_>) -> bool {
    panel.design.basis.is_some_and(|basis| basis.action == Action::Cantilever)
}

/// Designed panels beside a chain of supports, each once.
fn panels<'a>(context: &Context<'a>, chain: &[SupportId]) -> Vec<PanelContext<'a>> {
    let mut ids: Vec<PanelId> =
        chain.iter().flat_map(|id| context.floor.support(*id).sides().map(|side| side.panel)).collect();
    ids.sort_unstable();
    ids.dedup();
    ids.into_iter().filter_map(|id| context.panel(id)).collect()
}

/// The designed panel that a support's bars are listed under: the nearer in plan order.
fn owner<'a>(context: &Context<'a>, design: &SupportDesign) -> Option<PanelContext<'a>> {
    design.sides.first().and_then(|side| context.panel(side.panel))
}

/// Where the bars end on one side of a support: those that go furthest, and the alternate ones.
fn end(context: &Context<'_>, id: SupportId, greater: bool) -> Option<(Reach, Reach)> {
    let support = context.floor.support(id);
    let cover = context.criteria.top_cover_mm;
    let designed = side_toward(support, greater).and_then(|at| {
        let panel = context.panel(at.panel)?;
        let design = context.design.support(id)?.sides.iter().find(|side| side.panel == at.panel)?;
        Some((at, panel, design))
    });
    let outward = if greater { 1.0 } else { -1.0 };
    let Some((at, panel, design)) = designed else {
        // Nothing designed beyond: to the outer face of the support.
        let place = line_of(context, support) + outward * (support.width_mm / 2.0 - cover);
        return Some((Reach::at(place), Reach::at(place)));
    };
    let face = line_of(context, support) + outward * support.width_mm / 2.0;
    let far = panel.slab.side(at.side.opposite());
    // The bar lies on the panel's own side of its far edge.
    let limit = if panel.slab.panel.edge(at.side.opposite()).segments.iter().any(|s| s.support.is_some()) {
        far.line + far.outward * panel.slab.panel.edge(at.side.opposite()).support_width_mm / 2.0
    } else {
        far.bar_limit(cover)
    };
    let reach = |extension_m: f64| Reach::straight(face + outward * extension_m * 1000.0, limit);
    let whole = |side: &SupportSideDesign| {
        if is_cantilever(&panel) { Reach::at(limit) } else { reach(side.extension_m) }
    };
    let short = if is_cantilever(&panel) { Reach::at(limit) } else { reach(design.short_extension_m) };
    Some((whole(design), short))
}

/// The stretch of a support that its bars are spread over: from face to face of the supports at its ends where all its
/// panels have a corner there, else its own length.
fn zone(context: &Context<'_>, chain: &[SupportId]) -> [f64; 2] {
    let sides = chain.iter().map(|id| context.floor.support(*id));
    let zones: Vec<[f64; 2]> = sides
        .flat_map(|support| support.sides().map(move |at| (support, at)))
        .filter_map(|(support, at)| {
            let panel = context.panel(at.panel)?;
            let stretch = if panel.slab.panel.is_loose() {
                panel.slab.extent(support.axis.across())
            } else {
                [crate::slab::mm(support.from), crate::slab::mm(support.to)]
            };
            Some(panel.slab.between_faces(at.side, stretch))
        })
        .collect();
    let low = zones.iter().map(|zone| zone[0]).fold(f64::INFINITY, f64::min);
    let high = zones.iter().map(|zone| zone[1]).fold(f64::NEG_INFINITY, f64::max);
    [low, high]
}
