//! Two designs of one floor, drawn one way and another: what differs between them.

use design_engine::check::Place;
use design_engine::floor::{Axis, Floor, Side};
use design_engine::result::{FloorDesign, PanelDesign};

/// Where the two numbers differ by more than the order of a sum can make them.
fn apart(a: f64, b: f64) -> bool {
    (a - b).abs() > 1e-6 * a.abs().max(b.abs()).max(1.0)
}

fn any_apart(a: Option<f64>, b: Option<f64>) -> bool {
    match (a, b) {
        (Some(a), Some(b)) => apart(a, b),
        (a, b) => a != b,
    }
}

fn place_to(place: Place, side_to: fn(Side) -> Side) -> Place {
    if let Place::Side(side) = place { Place::Side(side_to(side)) } else { place }
}

/// True where only the order of x and y could settle a square panel.
pub(crate) fn settled_by_direction_alone(design: &FloorDesign) -> bool {
    design.queries.iter().any(|query| query.text.contains("its short span is taken along x"))
}

/// The first difference between a floor and the same floor moved; panels keep their indices, supports their names.
pub(crate) fn difference(
    (floor, one): (&Floor, &FloorDesign),
    (moved_floor, other): (&Floor, &FloorDesign),
    side_to: fn(Side) -> Side,
    axis_to: fn(Axis) -> Axis,
) -> Option<String> {
    for (a, b) in one.panels.iter().zip(&other.panels) {
        let mark = &floor.panel(a.panel).mark;
        if a.not_designed.is_some() != b.not_designed.is_some() {
            return Some(format!("{mark}: {:?} and {:?}", a.not_designed, b.not_designed));
        }
        if let Some(what) = panels_differ(a, b, side_to, axis_to) {
            return Some(format!("{mark}: {what}"));
        }
    }
    for a in &one.supports {
        let name = &floor.support(a.support).name;
        let b =
            other.supports.iter().find(|b| moved_floor.support(b.support).name == *name && name.is_some());
        let Some(b) = b else { continue };
        let reach = |design: &design_engine::result::SupportDesign| {
            let mut sides: Vec<(usize, i64)> = design
                .sides
                .iter()
                .map(|side| (side.panel.0, design_engine::floor::TenthMm::from_m(side.extension_m).0))
                .collect();
            sides.sort_unstable();
            sides
        };
        if a.bars != b.bars
            || a.layer != b.layer
            || a.alternate_reversed != b.alternate_reversed
            || reach(a) != reach(b)
        {
            return Some(format!("{name:?}: {a:?} and {b:?}"));
        }
    }
    None
}

fn panels_differ(
    a: &PanelDesign,
    b: &PanelDesign,
    side_to: fn(Side) -> Side,
    axis_to: fn(Axis) -> Axis,
) -> Option<String> {
    if a.sections.len() != b.sections.len() || a.checks.len() != b.checks.len() {
        return Some("sections or checks missing".to_owned());
    }
    let mut left: Vec<_> = b.sections.iter().collect();
    for section in &a.sections {
        let at = place_to(section.at, side_to);
        let same = |other: &&&design_engine::result::Section| {
            other.at == at
                && other.bars_along == axis_to(section.bars_along)
                && other.layer == section.layer
                && other.bars == section.bars
                && !any_apart(other.moment_knm_m, section.moment_knm_m)
                && !any_apart(other.moment_balanced_knm_m, section.moment_balanced_knm_m)
                && !any_apart(other.as_required_mm2_m, section.as_required_mm2_m)
                && !apart(other.d_mm, section.d_mm)
        };
        let found = left.iter().position(|other| same(&other));
        let Some(found) = found else { return Some(format!("no section such as {section:?}")) };
        left.remove(found);
    }
    let mut left: Vec<_> = b.checks.iter().collect();
    for check in &a.checks {
        let at = place_to(check.at, side_to);
        let found = left.iter().position(|other| {
            (other.kind, other.at, other.clause, other.ok) == (check.kind, at, check.clause, check.ok)
                && !any_apart(other.ratio, check.ratio)
        });
        let Some(found) = found else { return Some(format!("no check such as {check:?}")) };
        left.remove(found);
    }
    (a.thickness_governed_by != b.thickness_governed_by
        || any_apart(a.least_thickness_mm, b.least_thickness_mm))
    .then(|| "thickness governed by another check".to_owned())
}
