//! Openings: bars cut in each layer, and the trimming steel beside them. What openings of one panel take together counts
//! as what one opening takes.

use crate::check::Place;
use crate::floor::{Axis, Panel, PanelOpening, Side};
use crate::result::{Basis, CutLayer, OpeningDesign, Section, SupportDesign};

/// Openings with both sides under this displace bars and cut none, mm (common practice, no source).
const DISPLACED_UNDER_MM: f64 = 300.0;
/// An opening wider than this share of a span is outside the coefficient method (decision).
const GREATEST_SHARE: f64 = 0.25;
/// Lengths and shares are compared within this: a floor drawn another way must not change a verdict.
const TIE: f64 = 1e-9;

/// The openings of a designed panel.
pub(crate) fn openings(
    panel: &Panel,
    basis: &Basis,
    sections: &[Section],
    designs: &[Option<SupportDesign>],
) -> Vec<OpeningDesign> {
    let bottom = sections.iter().filter(|s| s.support.is_none());
    let closest_mm = bottom.map(|s| s.bars.spacing_mm).fold(f64::INFINITY, f64::min);
    let clusters = clusters(&panel.openings, 2.0 * closest_mm / 1000.0);
    let strips = [Axis::X, Axis::Y].map(|axis| strips(&panel.openings, axis));
    let one = |(opening, extents): (&PanelOpening, [[f64; 2]; 2])| {
        let greatest_side_mm = 1000.0 * extents.map(|[from, to]| to - from).into_iter().fold(0.0, f64::max);
        // The safe reading: bars can be moved aside only where they have the room, in both directions.
        let displaced = greatest_side_mm < DISPLACED_UNDER_MM.min(2.0 * closest_mm) - TIE;
        let share = |axis: Axis| {
            let [from, to] = ends_m(opening, axis.across());
            let through = strips[axis as usize].iter().filter(|s| s.from < to - TIE && s.to > from + TIE);
            through.map(|strip| strip.removed_m).fold(0.0, f64::max) / panel.span_m(axis)
        };
        OpeningDesign {
            opening: *opening,
            displaced,
            layers: if displaced { Vec::new() } else { cut_layers(panel, opening, sections, designs) },
            over_quarter_of_span: share(Axis::X).max(share(Axis::Y)) > GREATEST_SHARE + TIE,
            within_d_of_support: within_d(panel, basis, opening, sections),
        }
    };
    panel.openings.iter().zip(clusters).map(one).collect()
}

/// Whether an opening by itself takes more than a quarter of a span.
pub(crate) fn over_quarter_alone(panel: &Panel, opening: &PanelOpening) -> bool {
    let share = |axis: Axis| opening.widths_m[axis as usize] / panel.span_m(axis);
    share(Axis::X).max(share(Axis::Y)) > GREATEST_SHARE + TIE
}

/// The greatest share of a span that the openings of a panel take together out of one line across it.
pub(crate) fn greatest_share_taken(panel: &Panel) -> f64 {
    let share = |axis: Axis| {
        let removed = strips(&panel.openings, axis).into_iter().map(|strip| strip.removed_m);
        removed.fold(0.0, f64::max) / panel.span_m(axis)
    };
    share(Axis::X).max(share(Axis::Y))
}

fn within_d(panel: &Panel, basis: &Basis, opening: &PanelOpening, sections: &[Section]) -> bool {
    let d_m = sections.iter().map(|s| s.d_mm).fold(0.0, f64::max) / 1000.0;
    let near = |side: Side| {
        distance_m(panel, opening, side) < panel.edge(side).support_width_mm / 2000.0 + d_m - TIE
    };
    let supported = |side: &Side| basis.state(*side) != crate::floor::EdgeState::Free;
    Side::ALL.into_iter().filter(supported).any(near)
}

/// Ends of an opening along an axis, from the west or south line, m.
fn ends_m(opening: &PanelOpening, axis: Axis) -> [f64; 2] {
    let from = match axis {
        Axis::X => opening.from_west_m,
        Axis::Y => opening.from_south_m,
    };
    [from, from + opening.widths_m[axis as usize]]
}

/// A strip of the panel along an axis, between two neighbouring ends of openings across it.
struct Strip {
    from: f64,
    to: f64,
    /// Width that openings take out of any line in it, what overlaps counted once, m.
    removed_m: f64,
}

fn strips(openings: &[PanelOpening], axis: Axis) -> Vec<Strip> {
    let across = axis.across();
    let mut cuts: Vec<f64> = openings.iter().flat_map(|opening| ends_m(opening, across)).collect();
    cuts.sort_by(f64::total_cmp);
    let mut along: Vec<&PanelOpening> = openings.iter().collect();
    along.sort_by(|a, b| ends_m(a, axis)[0].total_cmp(&ends_m(b, axis)[0]));
    let strip = |ends: &[f64]| {
        let (from, to) = (ends[0], ends[1]);
        let crosses = |opening: &&&PanelOpening| {
            let [low, high] = ends_m(opening, across);
            low < to - TIE && high > from + TIE
        };
        let mut reached = f64::NEG_INFINITY;
        let mut removed_m = 0.0;
        for [start, end] in along.iter().filter(crosses).map(|opening| ends_m(opening, axis)) {
            removed_m += (end - start.max(reached)).max(0.0);
            reached = reached.max(end);
        }
        Strip { from, to, removed_m }
    };
    // Ends that are one place but for rounding leave no strip between them.
    cuts.windows(2).filter(|ends| ends[1] - ends[0] > 3.0 * TIE).map(strip).collect()
}

/// For each opening the extents along x and y of it and all others less than `least_gap_m` away, one from the next, m.
fn clusters(openings: &[PanelOpening], least_gap_m: f64) -> Vec<[[f64; 2]; 2]> {
    let extents = |opening: &PanelOpening| [Axis::X, Axis::Y].map(|axis| ends_m(opening, axis));
    let mut found: Vec<Option<[[f64; 2]; 2]>> = vec![None; openings.len()];
    for first in 0..openings.len() {
        if found[first].is_some() {
            continue;
        }
        let mut members = vec![first];
        let mut left: Vec<usize> = (first + 1..openings.len()).filter(|i| found[*i].is_none()).collect();
        let mut next = 0;
        while let Some(member) = members.get(next).copied() {
            let near = |i: &usize| clear_m(&openings[member], &openings[*i]) < least_gap_m - TIE;
            let (joined, others): (Vec<usize>, Vec<usize>) = left.into_iter().partition(near);
            members.extend(joined);
            left = others;
            next += 1;
        }
        let around = members
            .iter()
            .map(|i| extents(&openings[*i]))
            .reduce(|a, b| [0, 1].map(|axis| [a[axis][0].min(b[axis][0]), a[axis][1].max(b[axis][1])]));
        for member in members {
            found[member] = around;
        }
    }
    found.into_iter().flatten().collect()
}

/// Clear distance between two openings on plan, m; 0 where they touch or overlap.
fn clear_m(one: &PanelOpening, other: &PanelOpening) -> f64 {
    let [x, y] = [Axis::X, Axis::Y].map(|axis| {
        let ([a, b], [c, d]) = (ends_m(one, axis), ends_m(other, axis));
        (a.max(c) - b.min(d)).max(0.0)
    });
    x.hypot(y)
}

/// Distance of an opening from a side's line, m.
fn distance_m(panel: &Panel, opening: &PanelOpening, side: Side) -> f64 {
    match side {
        Side::West => opening.from_west_m,
        Side::South => opening.from_south_m,
        Side::East => panel.span_m(Axis::X) - opening.from_west_m - opening.widths_m[0],
        Side::North => panel.span_m(Axis::Y) - opening.from_south_m - opening.widths_m[1],
    }
}

fn cut_layers(
    panel: &Panel,
    opening: &PanelOpening,
    sections: &[Section],
    designs: &[Option<SupportDesign>],
) -> Vec<CutLayer> {
    let reached = |section: &&Section| match (section.at, section.support) {
        (Place::Side(side), Some(id)) => designs[id.0].as_ref().is_some_and(|design| {
            let reach = design.sides.iter().map(|s| s.extension_m).fold(0.0, f64::max);
            distance_m(panel, opening, side) < panel.edge(side).support_width_mm / 2000.0 + reach - TIE
        }),
        _ => true,
    };
    sections
        .iter()
        .filter(reached)
        .map(|section| {
            let width_mm = 1000.0 * opening.widths_m[section.bars_along.across() as usize];
            // The most bars that a gap of this width can meet.
            let cut = (width_mm / section.bars.spacing_mm + TIE).floor() + 1.0;
            let area = section.as_provided_mm2_m * section.bars.spacing_mm / 1000.0;
            CutLayer {
                layer: section.layer,
                bars_along: section.bars_along,
                at: section.at,
                bars: section.bars,
                cut,
                each_side_mm2: cut * area / 2.0,
            }
        })
        .collect()
}
