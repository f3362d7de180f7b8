//! Gridlines gathered into stations: gridlines of one axis within the plan tolerance are one line, so
//! that everything after compares whole numbers.

use design_engine::floor::{Axis, TenthMm};
use design_engine::query::{Query, Severity, Subject};

use crate::layout::{GridlineId, Layout};

/// The gridlines of one axis within tolerance of one another, by their order along it.
pub(crate) type Station = usize;

/// A line on plan that panels' edges may lie on.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(crate) struct Line {
    /// [`Axis::X`]: stands at one x.
    pub(crate) axis: Axis,
    /// Which of its axis.
    pub(crate) station: Station,
}

/// The gridlines of a layout by station.
#[derive(Debug)]
pub(crate) struct Grid {
    /// Station of each gridline, by its [`GridlineId`].
    stations: Vec<Station>,
    /// Of each axis and station: the gridlines there, by position, then by name.
    members: [Vec<Vec<GridlineId>>; 2],
}

impl Grid {
    /// Gathers the gridlines; two within tolerance are a warning.
    pub(crate) fn new(layout: &Layout, queries: &mut Vec<Query>) -> Grid {
        let mut grid = Grid { stations: vec![0; layout.gridlines.len()], members: [Vec::new(), Vec::new()] };
        for axis in [Axis::X, Axis::Y] {
            let mut ids: Vec<GridlineId> = (0..layout.gridlines.len())
                .map(GridlineId)
                .filter(|id| layout.gridline(*id).axis == axis)
                .collect();
            ids.sort_by_key(|id| (layout.gridline(*id).position, &layout.gridline(*id).name));
            let members = &mut grid.members[axis as usize];
            let mut before: Option<GridlineId> = None;
            for id in ids {
                match (before, members.last_mut()) {
                    (Some(before), Some(last)) if apart(layout, before, id) <= layout.tolerance => {
                        queries.push(taken_as_one(layout, before, id));
                        last.push(id);
                    }
                    _ => members.push(vec![id]),
                }
                grid.stations[id.0] = members.len() - 1;
                before = Some(id);
            }
        }
        grid
    }

    /// Station of a gridline.
    pub(crate) fn station(&self, id: GridlineId) -> Station {
        self.stations[id.0]
    }

    /// Number of stations of an axis.
    pub(crate) fn len(&self, axis: Axis) -> usize {
        self.members[axis as usize].len()
    }

    /// Position of a station: of its first gridline.
    pub(crate) fn position(&self, layout: &Layout, axis: Axis, station: Station) -> TenthMm {
        layout.gridline(self.first(axis, station)).position
    }

    /// Name of a station: of its first gridline.
    pub(crate) fn name<'a>(&self, layout: &'a Layout, axis: Axis, station: Station) -> &'a str {
        &layout.gridline(self.first(axis, station)).name
    }

    fn first(&self, axis: Axis, station: Station) -> GridlineId {
        self.members[axis as usize][station][0]
    }
}

fn apart(layout: &Layout, before: GridlineId, after: GridlineId) -> TenthMm {
    layout.gridline(after).position - layout.gridline(before).position
}

fn taken_as_one(layout: &Layout, before: GridlineId, after: GridlineId) -> Query {
    let (one, two) = (layout.gridline(before), layout.gridline(after));
    Query::new(
        Severity::Warning,
        Subject::Gridline(two.name.clone()),
        format!(
            "gridlines {} and {} stand {} apart, within the plan tolerance of {}; they are taken as one line",
            one.name,
            two.name,
            millimetres(two.position - one.position),
            millimetres(layout.tolerance)
        ),
        "use one gridline, move one of them, or lessen the plan tolerance",
    )
}

/// A length in millimetres as it is printed: `0.5 mm`.
pub(crate) fn millimetres(length: TenthMm) -> String {
    let sign = if length.0 < 0 { "-" } else { "" };
    match (length.0.abs() / 10, length.0.abs() % 10) {
        (whole, 0) => format!("{sign}{whole} mm"),
        (whole, tenths) => format!("{sign}{whole}.{tenths} mm"),
    }
}

/// One note that names the gridlines nothing refers to.
pub(crate) fn note_unused(layout: &Layout, queries: &mut Vec<Query>) {
    let mut used = vec![false; layout.gridlines.len()];
    for panel in &layout.panels {
        for id in [panel.x_from, panel.x_to, panel.y_from, panel.y_to] {
            used[id.0] = true;
        }
    }
    let stretches = layout.joints.iter().map(|joint| joint.stretch);
    for stretch in stretches.chain(layout.supports.iter().map(|support| support.stretch)) {
        for id in [Some(stretch.gridline), stretch.from, stretch.to].into_iter().flatten() {
            used[id.0] = true;
        }
    }
    let unused: Vec<&str> =
        layout.gridlines.iter().zip(used).filter(|(_, used)| !used).map(|(line, _)| &*line.name).collect();
    if !unused.is_empty() {
        queries.push(Query::new(
            Severity::Note,
            Subject::Gridline(unused[0].to_owned()),
            format!("nothing uses gridline{} {}", if unused.len() > 1 { "s" } else { "" }, list(&unused)),
            "",
        ));
    }
}

/// Names as they are listed in a sentence, the first eight of them: `A, B and C`.
pub(crate) fn list(names: &[&str]) -> String {
    const MOST: usize = 8;
    match names {
        [] => String::new(),
        [only] => (*only).to_owned(),
        _ if names.len() > MOST => format!("{} and {} others", names[..MOST].join(", "), names.len() - MOST),
        [before @ .., last] => format!("{} and {last}", before.join(", ")),
    }
}
