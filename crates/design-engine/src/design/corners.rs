//! Torsion steel at the four corners of a panel: required, present, to be added.

use super::panel::SupportBars;
use crate::bs8110::corners::{CornerState, torsion_extent_m, torsion_steel};
use crate::bs8110::flexure::{minimum_steel, steel_area};
use crate::check::Place;
use crate::criteria::Criteria;
use crate::floor::{Axis, Corners, Floor, Panel, Segment, Side, Spanning};
use crate::result::{Action, Basis, CornerDesign, PanelBars, Section, SupportDesign};

/// Corners in a fixed order, by their north or south and east or west sides.
const CORNERS: [[Side; 2]; 4] = [
    [Side::North, Side::East],
    [Side::South, Side::East],
    [Side::South, Side::West],
    [Side::North, Side::West],
];

/// The corners of a restrained two-way panel held down; of any other panel none.
#[expect(clippy::too_many_arguments, reason = "everything around a panel meets at its corners")]
pub(crate) fn corners(
    floor: &Floor,
    criteria: &Criteria,
    panel: &Panel,
    basis: &Basis,
    sections: &[Section],
    bars: &PanelBars,
    supports: &[SupportBars<'_>],
    designs: &[Option<SupportDesign>],
) -> Vec<CornerDesign> {
    let free = panel.corners == Corners::FreeToLift && basis.action == Action::TwoWaySimplySupported;
    if basis.action != Action::TwoWayRestrained || free {
        return Vec::new();
    }
    let bottom = |axis: Axis| {
        let at = [Place::ShortMidspan, Place::LongMidspan];
        sections.iter().find(|s| at.contains(&s.at) && s.bars_along == axis && s.support.is_none())
    };
    let bending = [Axis::X, Axis::Y].map(|axis| bottom(axis).and_then(|s| s.as_bending_mm2_m).unwrap_or(0.0));
    let greatest = bending[0].max(bending[1]);
    // Corners lie in the edge strips, or reach into them.
    let provided = |axis: Axis| {
        let strip = bars.bottom[basis.span_along(axis) as usize].and_then(|bars| bars.edge_strip);
        strip.map_or_else(
            || bottom(axis).map_or(0.0, |s| s.as_provided_mm2_m),
            |strip| steel_area(strip.bar_mm, strip.spacing_mm),
        )
    };
    let extent_m = torsion_extent_m(basis.lx_m);
    CORNERS
        .into_iter()
        .map(|sides| {
            let ends = [0, 1].map(|i| segment_at(panel, sides[i], sides[1 - i]));
            let carried = ends.map(|segment| segment.is_some_and(|s| carries(floor, s)));
            let state = CornerState::of(carried);
            let required = torsion_steel(state, greatest);
            // Top bars at right angles to each of the two edges: of the support, or the edge's own.
            let top = |axis: Axis| {
                let i = usize::from(sides[0].span_axis() != axis);
                let over = ends[i].and_then(|segment| segment.support);
                match over.and_then(|id| supports.iter().find(|s| s.id == id)) {
                    Some(support) => over_support(panel, support, designs, extent_m),
                    None => (provided(axis) / 2.0).max(minimum_steel(panel.thickness_mm, criteria.fy_n_mm2)),
                }
            };
            let present = [provided(Axis::X), provided(Axis::Y), top(Axis::X), top(Axis::Y)];
            CornerDesign {
                sides,
                state,
                extent_m,
                as_required_mm2_m: required,
                as_present_mm2_m: present,
                as_to_add_mm2_m: present.map(|p| (required - p).max(0.0)),
            }
        })
        .collect()
}

/// The segment of a side that reaches the corner with another side.
fn segment_at(panel: &Panel, side: Side, other: Side) -> Option<&Segment> {
    let segments = &panel.edge(side).segments;
    if matches!(other, Side::North | Side::East) { segments.last() } else { segments.first() }
}

/// Whether a segment restrains its panel: a cantilever beyond does not.
fn carries(floor: &Floor, segment: &Segment) -> bool {
    let cantilever = |id| floor.panel(id).spanning == Spanning::Cantilever;
    segment.continuous && !segment.neighbour.is_some_and(cantilever)
}

/// Steel of a support's bars that reaches the extent: all of them, the half that goes furthest, or none.
fn over_support(
    panel: &Panel,
    support: &SupportBars<'_>,
    designs: &[Option<SupportDesign>],
    extent_m: f64,
) -> f64 {
    let Some(design) = &designs[support.id.0] else { return 0.0 };
    let half_width = panel.edge(support.side).support_width_mm / 2000.0;
    let short = design.sides.iter().map(|side| side.short_extension_m).fold(f64::INFINITY, f64::min);
    let long = design.sides.iter().map(|side| side.extension_m).fold(f64::INFINITY, f64::min);
    let reaches = |extension_m: f64| extension_m + half_width >= extent_m - 1e-9;
    let share = match (reaches(short), reaches(long)) {
        (true, _) => 1.0,
        (false, true) => 0.5,
        (false, false) => 0.0,
    };
    design.as_provided_mm2_m * share
}
