//! The same floor drawn another way, and what differs between the two designs.

use std::collections::BTreeMap;

use design_engine::check::Place;
use design_engine::floor::{Axis, Side, Spanning, TenthMm};
use design_engine::query::Severity;
use design_engine::result::{PanelDesign, Section};
use floor_grid::layout::{GridlineId, Layout, Stretch};

use super::random::Choices;
use super::{Designed, Plan};

/// A floor drawn another way, and where its sides, axes and marks went.
pub(crate) struct Moved {
    pub(crate) plan: Plan,
    pub(crate) how: &'static str,
    side: fn(Side) -> Side,
    axis: fn(Axis) -> Axis,
    mark: fn(&str) -> String,
}

fn moved(how: &'static str, layout: Layout) -> Moved {
    Moved { plan: Plan(layout), how, side: |side| side, axis: |axis| axis, mark: str::to_owned }
}

/// Spans of a row's panel along x and y, m.
fn spans(layout: &Layout, mark: &str) -> [f64; 2] {
    let panel = layout.panels.iter().find(|panel| panel.data.mark == mark).unwrap();
    let length = |from, to| (layout.gridline(to).position - layout.gridline(from).position).m();
    [length(panel.x_from, panel.x_to), length(panel.y_from, panel.y_to)]
}

/// Seen in a mirror that stands north to south.
pub(crate) fn mirrored(before: &Plan) -> Moved {
    let mut layout = before.0.clone();
    for line in layout.gridlines.iter_mut().filter(|line| line.axis == Axis::X) {
        line.position = TenthMm(-line.position.0);
    }
    for panel in &mut layout.panels {
        std::mem::swap(&mut panel.x_from, &mut panel.x_to);
        panel.stated_edges.swap(Side::East.index(), Side::West.index());
    }
    for opening in &mut layout.openings {
        opening.from_west_m = spans(&before.0, &opening.panel)[0] - opening.from_west_m - opening.width_x_m;
    }
    for wall in &mut layout.wall_loads {
        let width = spans(&before.0, &wall.panel)[0];
        match wall.along {
            Axis::X => (wall.from_m, wall.to_m) = (width - wall.to_m, width - wall.from_m),
            Axis::Y => wall.offset_m = width - wall.offset_m,
        }
    }
    let side: fn(Side) -> Side = |side| match side {
        Side::East => Side::West,
        Side::West => Side::East,
        other => other,
    };
    Moved { side, ..moved("mirrored", layout) }
}

/// Turned by a quarter to the left: (x, y) goes to (-y, x).
pub(crate) fn turned(before: &Plan) -> Moved {
    let side: fn(Side) -> Side = |side| match side {
        Side::North => Side::West,
        Side::East => Side::North,
        Side::South => Side::East,
        Side::West => Side::South,
    };
    let mut layout = before.0.clone();
    for line in &mut layout.gridlines {
        if line.axis == Axis::Y {
            line.position = TenthMm(-line.position.0);
        }
        line.axis = line.axis.across();
    }
    for (panel, old) in layout.panels.iter_mut().zip(&before.0.panels) {
        (panel.x_from, panel.x_to) = (old.y_to, old.y_from);
        (panel.y_from, panel.y_to) = (old.x_from, old.x_to);
        for at in Side::ALL {
            panel.stated_edges[side(at).index()] = old.stated_edges[at.index()];
        }
        if let Spanning::OneWay(axis) = old.data.spanning {
            panel.data.spanning = Spanning::OneWay(axis.across());
        }
    }
    for (opening, old) in layout.openings.iter_mut().zip(&before.0.openings) {
        let height = spans(&before.0, &old.panel)[1];
        (opening.width_x_m, opening.width_y_m) = (old.width_y_m, old.width_x_m);
        (opening.from_west_m, opening.from_south_m) =
            (height - old.from_south_m - old.width_y_m, old.from_west_m);
    }
    for (wall, old) in layout.wall_loads.iter_mut().zip(&before.0.wall_loads) {
        let height = spans(&before.0, &old.panel)[1];
        wall.along = old.along.across();
        match old.along {
            Axis::X => wall.offset_m = height - old.offset_m,
            Axis::Y => (wall.from_m, wall.to_m) = (height - old.to_m, height - old.from_m),
        }
    }
    Moved { side, axis: Axis::across, ..moved("turned", layout) }
}

/// 12.3 m east and 45.6 m south.
pub(crate) fn shifted(before: &Plan) -> Moved {
    let mut layout = before.0.clone();
    for line in &mut layout.gridlines {
        line.position = TenthMm(line.position.0 + if line.axis == Axis::X { 123_000 } else { -456_000 });
    }
    moved("shifted", layout)
}

/// Other marks, in another order: P3 becomes Q-3, and the last row comes first.
pub(crate) fn renumbered(before: &Plan) -> Moved {
    let mark: fn(&str) -> String = |mark| format!("Q-{}", &mark[1..]);
    let mut layout = before.0.clone();
    layout.panels.reverse();
    layout.panels.iter_mut().for_each(|panel| panel.data.mark = mark(&panel.data.mark));
    layout.openings.iter_mut().for_each(|opening| opening.panel = mark(&opening.panel));
    layout.wall_loads.iter_mut().for_each(|wall| wall.panel = mark(&wall.panel));
    Moved { mark, ..moved("renumbered", layout) }
}

/// The rows of every sheet in another order.
pub(crate) fn shuffled(before: &Plan, choices: &mut Choices) -> Moved {
    let mut layout = before.0.clone();
    mix(choices, &mut layout.panels);
    mix(choices, &mut layout.joints);
    mix(choices, &mut layout.supports);
    mix(choices, &mut layout.openings);
    mix(choices, &mut layout.wall_loads);
    mix(choices, &mut layout.gridlines);
    let names: Vec<String> = layout.gridlines.iter().map(|line| line.name.clone()).collect();
    let new = |id: &mut GridlineId| {
        let name = &before.0.gridline(*id).name;
        *id = GridlineId(names.iter().position(|known| known == name).unwrap());
    };
    for panel in &mut layout.panels {
        [&mut panel.x_from, &mut panel.x_to, &mut panel.y_from, &mut panel.y_to].into_iter().for_each(new);
    }
    let joints = layout.joints.iter_mut().map(|joint| &mut joint.stretch);
    for stretch in joints.chain(layout.supports.iter_mut().map(|support| &mut support.stretch)) {
        let Stretch { gridline, from, to } = stretch;
        std::iter::once(gridline).chain(from).chain(to).for_each(new);
    }
    moved("shuffled", layout)
}

fn mix<T>(choices: &mut Choices, rows: &mut [T]) {
    for last in (1..rows.len()).rev() {
        rows.swap(last, usize::from(choices.below(u16::try_from(last + 1).unwrap())));
    }
}

fn apart(a: f64, b: f64) -> bool {
    (a - b).abs() > 1e-9 * a.abs().max(b.abs()) + 1e-12
}

fn any_apart(a: Option<f64>, b: Option<f64>) -> bool {
    match (a, b) {
        (Some(a), Some(b)) => apart(a, b),
        (a, b) => a.is_some() != b.is_some(),
    }
}

/// The first thing in which a floor drawn another way was designed otherwise.
pub(crate) fn difference(one: &Designed, other: &Designed, moved: &Moved) -> Option<String> {
    for (index, a) in one.design.panels.iter().enumerate() {
        let mark = &one.floor.panels[index].mark;
        let b = other.panel(&(moved.mark)(mark));
        let differs = panels_differ(a, b, moved).or_else(|| reaches_differ(one, a, other, b, moved));
        if let Some(what) = differs {
            return Some(format!("{}: {mark}: {what}", moved.how));
        }
    }
    let weights = |of: &Designed| {
        let mut weights = BTreeMap::<Severity, usize>::new();
        of.queries.iter().for_each(|query| *weights.entry(query.severity).or_default() += 1);
        weights
    };
    if weights(one) != weights(other) {
        return Some(format!("{}: {:?} and {:?}", moved.how, one.queries, other.queries));
    }
    beam_loads_differ(one, other, moved)
}

fn panels_differ(a: &PanelDesign, b: &PanelDesign, moved: &Moved) -> Option<String> {
    if a.not_designed.is_some() != b.not_designed.is_some() || a.ok() != b.ok() {
        return Some(format!("{:?} and {:?}", a.not_designed, b.not_designed));
    }
    if a.sections.len() != b.sections.len() || a.corners.len() != b.corners.len() {
        return Some("sections or corners missing".to_owned());
    }
    let mut left: Vec<&Section> = b.sections.iter().collect();
    for section in &a.sections {
        let at =
            if let Place::Side(side) = section.at { Place::Side((moved.side)(side)) } else { section.at };
        let found = left.iter().position(|other| {
            (other.at, other.bars_along, other.layer, other.bars)
                == (at, (moved.axis)(section.bars_along), section.layer, section.bars)
                && !any_apart(other.moment_knm_m, section.moment_knm_m)
                && !any_apart(other.moment_balanced_knm_m, section.moment_balanced_knm_m)
                && !any_apart(other.as_required_mm2_m, section.as_required_mm2_m)
                && !apart(other.d_mm, section.d_mm)
        });
        let Some(found) = found else { return Some(format!("no {section:?} among {left:?}")) };
        left.remove(found);
    }
    for corner in &a.corners {
        let mut sides = corner.sides.map(moved.side);
        sides.sort_by_key(|side| side.span_axis() == Axis::X);
        let same = b.corners.iter().find(|other| other.sides == sides);
        let to_add = |corner: &[f64; 4]| corner.iter().sum::<f64>();
        let same = same.is_some_and(|other| {
            other.state == corner.state
                && !apart(other.as_required_mm2_m, corner.as_required_mm2_m)
                && !apart(to_add(&other.as_to_add_mm2_m), to_add(&corner.as_to_add_mm2_m))
        });
        if !same {
            return Some(format!("no {corner:?} among {:?}", b.corners));
        }
    }
    openings_differ(a, b)
}

/// The trimming steel of all openings of a panel together.
fn openings_differ(a: &PanelDesign, b: &PanelDesign) -> Option<String> {
    let steel = |of: &PanelDesign| {
        let layers = of.openings.iter().flat_map(|opening| &opening.layers);
        layers.map(|layer| layer.each_side_mm2).sum::<f64>()
    };
    apart(steel(a), steel(b)).then(|| format!("{:?} and {:?}", a.openings, b.openings))
}

/// How far the top bars reach into a panel, side by side, m.
fn reaches_differ(
    one: &Designed,
    a: &PanelDesign,
    other: &Designed,
    b: &PanelDesign,
    moved: &Moved,
) -> Option<String> {
    let reaches = |of: &Designed, panel: &PanelDesign, side: Side| {
        let mark = &of.floor.panel(panel.panel).mark;
        let mut reaches: Vec<i64> = of
            .supports(mark, side)
            .iter()
            .flat_map(|support| support.sides.iter().filter(|at| at.panel == panel.panel))
            .flat_map(|at| [at.extension_m, at.short_extension_m])
            .map(|metres| TenthMm::from_m(metres).0)
            .collect();
        reaches.sort_unstable();
        reaches
    };
    Side::ALL.into_iter().find_map(|side| {
        let (here, there) = (reaches(one, a, side), reaches(other, b, (moved.side)(side)));
        (here != there).then(|| format!("top bars reach {here:?} and {there:?} on the {side:?}"))
    })
}

fn beam_loads_differ(one: &Designed, other: &Designed, moved: &Moved) -> Option<String> {
    let (a, b) = (one.beam_loads(), other.beam_loads());
    if a.rows.len() != b.rows.len() || apart(a.on_supports_kn, b.on_supports_kn) {
        return Some(format!(
            "{}: loads on supports {} and {}",
            moved.how, a.on_supports_kn, b.on_supports_kn
        ));
    }
    a.rows.iter().find_map(|row| {
        let panel = other.id(&(moved.mark)(&one.floor.panel(row.panel).mark));
        let side = (moved.side)(row.side);
        let there = b.rows.iter().find(|other| other.panel == panel && other.side == side);
        let same = there.is_some_and(|there| {
            !apart(there.load.dead_kn_m, row.load.dead_kn_m)
                && !apart(there.load.imposed_kn_m, row.load.imposed_kn_m)
                && !apart(there.loaded_length_m, row.loaded_length_m)
        });
        (!same).then(|| format!("{}: {row:?} and {there:?}", moved.how))
    })
}
