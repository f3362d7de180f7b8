//! Openings: bars cut in each layer, and the trimming steel beside them.

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
    panel.openings.iter().map(|opening| one(panel, basis, opening, sections, designs)).collect()
}

fn one(
    panel: &Panel,
    basis: &Basis,
    opening: &PanelOpening,
    sections: &[Section],
    designs: &[Option<SupportDesign>],
) -> OpeningDesign {
    let greatest_side_mm = 1000.0 * opening.widths_m[0].max(opening.widths_m[1]);
    let closest = sections
        .iter()
        .filter(|s| s.support.is_none())
        .map(|s| s.bars.spacing_mm)
        .fold(f64::INFINITY, f64::min);
    // The safe reading: bars can be moved aside only where they have the room, in both directions.
    let displaced = greatest_side_mm < DISPLACED_UNDER_MM.min(2.0 * closest) - TIE;
    let share = |axis: Axis| opening.widths_m[axis as usize] / panel.span_m(axis);
    let d_m = sections.iter().map(|s| s.d_mm).fold(0.0, f64::max) / 1000.0;
    let near = |side: Side| {
        distance_m(panel, opening, side) < panel.edge(side).support_width_mm / 2000.0 + d_m - TIE
    };
    let supported = |side: &Side| basis.state(*side) != crate::floor::EdgeState::Free;
    OpeningDesign {
        opening: *opening,
        displaced,
        layers: if displaced { Vec::new() } else { cut_layers(panel, opening, sections, designs) },
        over_quarter_of_span: share(Axis::X).max(share(Axis::Y)) > GREATEST_SHARE + TIE,
        within_d_of_support: Side::ALL.into_iter().filter(supported).any(near),
    }
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
