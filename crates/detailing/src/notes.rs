//! Where each mark goes, and the words beside a callout.

use std::collections::BTreeMap;

use design_engine::criteria::Criteria;
use design_engine::floor::{Floor, PanelId, Support, SupportId};
use design_engine::result::FloorDesign;

use crate::bending::Shape;
use crate::model::{BarSchedule, BarSet, Use};

/// Bars of one mark at one place.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct BarPlace {
    /// The panel; none for bars over a support.
    pub panel: Option<PanelId>,
    /// The support they run over, the first of several.
    pub support: Option<SupportId>,
    /// How many.
    pub count: usize,
}

/// The places of every mark, in the order of [`BarSchedule::bars`]; places in order of fixing.
#[must_use]
pub fn places(schedule: &BarSchedule) -> Vec<Vec<BarPlace>> {
    let mut places: Vec<Vec<BarPlace>> = vec![Vec::new(); schedule.bars.len()];
    let mut known: BTreeMap<(usize, Option<PanelId>, Option<SupportId>), usize> = BTreeMap::new();
    for set in &schedule.sets {
        let over = (set.for_what == Use::OverSupport).then(|| set.supports.first().copied()).flatten();
        let panel = if over.is_none() { Some(set.panel) } else { None };
        for run in &set.runs {
            let of_bar = &mut places[run.bar];
            let index = *known.entry((run.bar, panel, over)).or_insert_with(|| {
                of_bar.push(BarPlace { panel, support: over, count: 0 });
                of_bar.len() - 1
            });
            of_bar[index].count += run.count;
        }
    }
    places
}

/// `L01 18, L02 17`: places with their numbers; after `most` of them `and so many more`.
#[must_use]
pub fn place_words(floor: &Floor, places: &[BarPlace], most: usize) -> String {
    let name = |place: &BarPlace| match (place.panel, place.support) {
        (Some(panel), _) => floor.panel(panel).mark.clone(),
        (None, Some(support)) => support_name(floor, floor.support(support)),
        (None, None) => String::new(),
    };
    let mut words: Vec<String> =
        places.iter().take(most).map(|place| format!("{} {}", name(place), place.count)).collect();
    if places.len() > most {
        words.push(format!("and {} more", places.len() - most));
    }
    words.join(", ")
}

/// The panels that the bars of each mark depend on, in order.
#[must_use]
pub fn panels_of_bars(floor: &Floor, schedule: &BarSchedule) -> Vec<Vec<PanelId>> {
    let mut panels: Vec<Vec<PanelId>> = vec![Vec::new(); schedule.bars.len()];
    for set in &schedule.sets {
        let mut of_set = vec![set.panel];
        of_set.extend(set.supports.iter().flat_map(|id| floor.support(*id).sides().map(|side| side.panel)));
        for run in &set.runs {
            panels[run.bar].extend(&of_set);
        }
    }
    for of_bar in &mut panels {
        of_bar.sort_unstable();
        of_bar.dedup();
    }
    panels
}

/// The name of a support in notes: its own, or its only panel's edge.
#[must_use]
pub fn support_name(floor: &Floor, support: &Support) -> String {
    support.name.clone().unwrap_or_else(|| {
        let panel = floor.panel(support.near.panel);
        let side = panel.side_word(support.near.side);
        if panel.is_loose() {
            format!("{} {side}", panel.mark)
        } else {
            format!("{} {side} edge", panel.mark)
        }
    })
}

fn metres(mm: f64) -> String {
    format!("{:.2} m", mm / 1000.0)
}

/// What stands beside a set's callout: where its bars begin and end.
#[must_use]
pub fn placing(
    floor: &Floor,
    design: &FloorDesign,
    schedule: &BarSchedule,
    set: &BarSet,
    criteria: &Criteria,
) -> String {
    let panel = floor.panel(set.panel);
    let side = set.side.map_or("", |side| panel.side_word(side));
    let mut words = match set.for_what {
        Use::Bottom => bottom(floor, design, set),
        Use::OverSupport => over_support(floor, design, set),
        Use::Distribution if set.words.is_empty() => {
            let over: Vec<String> =
                set.supports.iter().map(|id| support_name(floor, floor.support(*id))).collect();
            format!(
                "under or over the bars of {}, along the {side} edge, lapping the bars that cross",
                over.join(", ")
            )
        }
        Use::Distribution => "over the whole cantilever, tied to its top bars".to_owned(),
        Use::Edge => edge(schedule, set, side),
        Use::Corner => format!("from the {side} edge, between the bars that are there"),
        Use::Trimmer => "half on each side of the opening".to_owned(),
        Use::Diagonal => "one across each corner of the opening".to_owned(),
    };
    if !set.words.is_empty() && !matches!(set.for_what, Use::Trimmer | Use::Diagonal) {
        words = format!("{}: {words}", set.words);
    }
    if set.runs.iter().any(|run| run.lap_mm > 0.0) {
        let lap = set.runs.iter().map(|run| run.lap_mm).fold(0.0, f64::max);
        words.push_str(&format!("; in pieces of at most {} m that lap {lap:.0} mm", criteria.stock_length_m));
    }
    words
}

fn bottom(floor: &Floor, design: &FloorDesign, set: &BarSet) -> String {
    let mut words = format!("along {}, across the panel from face to face", set.axis.word());
    let others: Vec<String> = set
        .axis
        .end_sides()
        .into_iter()
        .flat_map(|side| floor.panel(set.panel).edge(side).segments.iter().map(move |s| (side, s)))
        .filter(|(_, segment)| segment.continuous)
        .filter_map(|(_, segment)| unlike_neighbour(floor, design, set, segment.neighbour?))
        .collect();
    if !others.is_empty() {
        words.push_str(&format!("; interleave with {}", others.join(", ")));
    }
    words
}

/// `L02 at 175`: a neighbour whose bottom bars in the same direction have another spacing.
fn unlike_neighbour(floor: &Floor, design: &FloorDesign, set: &BarSet, other: PanelId) -> Option<String> {
    let panel = &design.panels[other.0];
    let span = panel.basis?.span_along(set.axis);
    let theirs = panel.bars.bottom[span as usize]?.bars.spacing_mm;
    ((theirs - set.spacing_mm?).abs() > 1e-6).then(|| format!("{} at {theirs}", floor.panel(other).mark))
}

fn over_support(floor: &Floor, design: &FloorDesign, set: &BarSet) -> String {
    let mut parts = Vec::new();
    if set.cantilever {
        parts.push("TOP STEEL: these bars hold the cantilever up".to_owned());
    }
    for id in &set.supports {
        let Some(support) = design.support(*id) else { continue };
        for side in &support.sides {
            let mark = &floor.panel(side.panel).mark;
            let text = if side.runs_through {
                format!("through {mark}")
            } else if (side.extension_m - side.short_extension_m).abs() > 1e-9 {
                format!("{:.2} and {:.2} m into {mark}", side.extension_m, side.short_extension_m)
            } else {
                format!("{} into {mark}", metres(side.extension_m * 1000.0))
            };
            if !parts.contains(&text) {
                parts.push(text);
            }
        }
    }
    if set.alternate_reversed {
        parts.push("alternate bars reversed".to_owned());
    }
    format!("{}, from the support faces", parts.join(", "))
}

fn edge(schedule: &BarSchedule, set: &BarSet, side: &str) -> String {
    let bent = set.runs.iter().map(|run| schedule.bars[run.bar].bar.shape);
    let down = bent.clone().any(|shape| matches!(shape, Shape::Bent { .. }));
    let how = if down { "leg down into the support" } else { "round the edge, long leg in the top" };
    format!("{side} edge, {how}")
}
