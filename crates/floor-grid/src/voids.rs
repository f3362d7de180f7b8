//! Voids: holes that panels enclose, found by walking the outline of the slab.

use std::collections::BTreeMap;

use design_engine::floor::Axis;
use design_engine::query::{Query, Severity, Subject};

use crate::edge_states::Plan;
use crate::gridlines::Station;

/// Holes narrower than this are gaps, which have a warning of their own, m.
const LEAST_WIDTH_M: f64 = 0.05;

/// A corner of the outline, by stations along x and y.
type Corner = [Station; 2];

/// A straight step of the outline with the slab on its left.
#[derive(Debug, Clone, Copy)]
struct Step {
    to: Corner,
    walked: bool,
}

/// Notes every hole with its place.
pub(crate) fn note_voids(plan: &Plan<'_>, queries: &mut Vec<Query>) {
    let mut outline = outline(plan);
    let starts: Vec<Corner> = outline.keys().copied().collect();
    let mut voids = Vec::new();
    for start in starts {
        while let Some(corners) = walk(&mut outline, start) {
            if goes_round_a_hole(&corners) {
                voids.push(corners);
            }
        }
    }
    for corners in voids {
        if let Some(place) = place(plan, &corners) {
            queries.push(Query::new(
                Severity::Note,
                Subject::Floor,
                format!("panels enclose a void {place}"),
                "",
            ));
        }
    }
}

/// Steps of the outline from each corner: edges with a panel on one side only.
fn outline(plan: &Plan<'_>) -> BTreeMap<Corner, Vec<Step>> {
    let mut outline: BTreeMap<Corner, Vec<Step>> = BTreeMap::new();
    for meeting in plan.meetings {
        let slab_is_near = match (meeting.near, meeting.far) {
            (Some(_), None) => true,
            (None, Some(_)) => false,
            _ => continue,
        };
        let corner = |along: Station| match meeting.line.axis {
            Axis::X => [meeting.line.station, along],
            Axis::Y => [along, meeting.line.station],
        };
        let (low, high) = (corner(meeting.run.from), corner(meeting.run.to));
        // Northward the west is on the left; eastward the north is.
        let forward = slab_is_near == (meeting.line.axis == Axis::X);
        let (from, to) = if forward { (low, high) } else { (high, low) };
        outline.entry(from).or_default().push(Step { to, walked: false });
    }
    outline
}

/// One round of the outline from a corner, if a step from there is left to walk.
fn walk(outline: &mut BTreeMap<Corner, Vec<Step>>, start: Corner) -> Option<Vec<Corner>> {
    let mut corners = vec![start];
    let mut at = start;
    let mut heading: Option<(bool, bool)> = None;
    loop {
        let steps = outline.get_mut(&at)?;
        let next = choose(at, steps, heading)?;
        next.walked = true;
        heading = Some(direction(at, next.to));
        at = next.to;
        if at == start {
            return Some(corners);
        }
        corners.push(at);
    }
}

/// Where two panels meet at a corner only, the outline turns right, round the hole it is at.
fn choose(at: Corner, steps: &mut [Step], heading: Option<(bool, bool)>) -> Option<&mut Step> {
    let right = heading.map(|(along_x, forward)| (!along_x, forward != along_x));
    let turn_right = steps.iter().position(|step| !step.walked && Some(direction(at, step.to)) == right);
    let chosen = turn_right.or_else(|| steps.iter().position(|step| !step.walked))?;
    steps.get_mut(chosen)
}

/// Whether a step runs along x, and whether to greater coordinates.
fn direction(from: Corner, to: Corner) -> (bool, bool) {
    if from[1] == to[1] { (true, to[0] > from[0]) } else { (false, to[1] > from[1]) }
}

/// With the slab on the left the outline goes round a hole clockwise: its area comes out negative.
fn goes_round_a_hole(corners: &[Corner]) -> bool {
    let twice_area: i128 = corners
        .iter()
        .zip(corners.iter().cycle().skip(1))
        .map(|(a, b)| a[0] as i128 * b[1] as i128 - b[0] as i128 * a[1] as i128)
        .sum();
    twice_area < 0
}

/// `between gridlines 2 and 3, B and C`; none for a sliver.
fn place(plan: &Plan<'_>, corners: &[Corner]) -> Option<String> {
    let mut names = [Axis::X, Axis::Y].into_iter().map(|axis| {
        let stations = corners.iter().map(|corner| corner[axis as usize]);
        let (low, high) = (stations.clone().min()?, stations.max()?);
        let position = |station| plan.grid.position(plan.layout, axis, station);
        if (position(high) - position(low)).m() < LEAST_WIDTH_M {
            return None;
        }
        let name = |station| plan.grid.name(plan.layout, axis, station);
        Some(format!("{} to {}", name(low), name(high)))
    });
    let (x, y) = (names.next()??, names.next()??);
    Some(format!("between gridlines {x} and {y}"))
}
