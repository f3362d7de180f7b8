//! What holds for any floor, checked over random ones.

use std::collections::{BTreeMap, BTreeSet};

use design_engine::floor::{
    Axis, EdgeState, Floor, PanelId, PlanRect, Segment, Side, SupportId, SupportKind, TenthMm,
};
use design_engine::query::{Query, Severity};
use floor_grid::lay_out;
use floor_grid::layout::{GridlineId, Layout};
use proptest::prelude::*;

use crate::random::{self, Cells, Choices, SideMap, mirrored, shifted, shuffled, turned};
use crate::rows::{empty, gridline, panel};

fn numbers() -> impl Strategy<Value = Vec<u16>> {
    prop::collection::vec(any::<u16>(), 500)
}

/// Edge by panel and side: state, whether stated, and its segments in no order.
type EdgeRecords = BTreeMap<(String, Side), (EdgeState, bool, Vec<String>)>;

/// What must not change when a floor is moved. `exact`: lengths and reasons as well.
fn records(floor: &Floor, to: SideMap, exact: bool) -> EdgeRecords {
    let mut records = EdgeRecords::new();
    for panel in &floor.panels {
        for side in Side::ALL {
            let edge = panel.edge(side);
            let mut segments: Vec<String> =
                edge.segments.iter().map(|segment| segment_record(floor, segment, exact)).collect();
            segments.sort();
            let width = format!("{} mm", edge.support_width_mm);
            segments.push(if exact { width } else { String::new() });
            records.insert((panel.mark.clone(), to(side)), (edge.state, edge.stated, segments));
        }
    }
    records
}

fn segment_record(floor: &Floor, segment: &Segment, exact: bool) -> String {
    let neighbour = segment.neighbour.map_or("none", |id| &floor.panel(id).mark);
    let support = segment.support.map(|id| {
        let support = floor.support(id);
        (support.kind, support.far.is_some())
    });
    let record = format!("{neighbour} {} {support:?}", segment.continuous);
    if exact { format!("{record} {} {}", (segment.to - segment.from).0, segment.why) } else { record }
}

fn weights(queries: &[Query]) -> BTreeMap<Severity, usize> {
    let mut weights = BTreeMap::new();
    for query in queries {
        *weights.entry(query.severity).or_default() += 1;
    }
    weights
}

fn undesigned(floor: &Floor) -> BTreeSet<&str> {
    floor.panels.iter().filter(|panel| panel.not_designed.is_some()).map(|panel| &*panel.mark).collect()
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 200, ..ProptestConfig::default() })]

    #[test]
    fn a_floor_moved_has_the_same_edges(numbers in numbers(), twins: bool) {
        let mut choices = Choices::new(numbers);
        let (layout, _) = random::floor(&mut choices, twins);
        let (floor, queries) = lay_out(&layout);
        let moves =
            [mirrored(&layout), turned(&layout), shifted(&layout), shuffled(&layout, &mut choices)];
        for (moved, to) in moves {
            let (moved_floor, moved_queries) = lay_out(&moved);
            prop_assert_eq!(records(&floor, to, !twins), records(&moved_floor, |side| side, !twins));
            prop_assert_eq!(undesigned(&floor), undesigned(&moved_floor));
            prop_assert_eq!(weights(&queries), weights(&moved_queries));
        }
    }

    #[test]
    fn renumbering_rows_leaves_supports_and_their_names(numbers in numbers(), twins: bool) {
        let mut choices = Choices::new(numbers);
        let (layout, _) = random::floor(&mut choices, twins);
        let (mixed, _) = shuffled(&layout, &mut choices);
        let names = |layout: &Layout| -> Vec<_> {
            let (floor, _) = lay_out(layout);
            let mark = |id: PanelId| floor.panel(id).mark.clone();
            let name = |support: &design_engine::floor::Support| {
                (support.name.clone(), mark(support.near.panel), support.far.map(|far| mark(far.panel)))
            };
            floor.supports.iter().map(name).collect()
        };
        prop_assert_eq!(names(&layout), names(&mixed));
    }

    #[test]
    fn segments_cover_their_edge_exactly(numbers in numbers(), twins: bool) {
        let (layout, _) = random::floor(&mut Choices::new(numbers), twins);
        let (floor, _) = lay_out(&layout);
        for panel in &floor.panels {
            for side in Side::ALL {
                let segments = &panel.edge(side).segments;
                let ends = ends(&panel.plan.unwrap(), side.span_axis().across());
                prop_assert_eq!([segments[0].from, segments.last().unwrap().to], ends);
                prop_assert!(segments.iter().all(|segment| segment.from < segment.to));
                prop_assert!(segments.windows(2).all(|pair| pair[0].to == pair[1].from));
            }
        }
    }

    #[test]
    fn an_edge_is_what_its_segments_are(numbers in numbers()) {
        let (layout, _) = random::floor(&mut Choices::new(numbers), false);
        for edge in lay_out(&layout).0.panels.iter().flat_map(|panel| &panel.edges) {
            let continuous = edge.segments.iter().filter(|segment| segment.continuous).count();
            match edge.state {
                EdgeState::Continuous => prop_assert_eq!(continuous, edge.segments.len()),
                EdgeState::PartlyContinuous => {
                    prop_assert!(continuous > 0 && continuous < edge.segments.len());
                }
                EdgeState::Discontinuous | EdgeState::Free => prop_assert_eq!(continuous, 0),
            }
        }
    }

    #[test]
    fn both_sides_of_a_support_agree(numbers in numbers(), twins: bool) {
        let (layout, _) = random::floor(&mut Choices::new(numbers), twins);
        let (floor, _) = lay_out(&layout);
        for (index, support) in floor.supports.iter().enumerate() {
            prop_assert_eq!(support.name.is_some(), support.far.is_some());
            prop_assert!(support.from < support.to);
            for (this, other) in [(Some(support.near), support.far), (support.far, Some(support.near))] {
                let Some(this) = this else { continue };
                prop_assert_eq!(this.side.span_axis(), support.axis);
                let segments = &floor.panel(this.panel).edge(this.side).segments;
                let mine: Vec<&Segment> =
                    segments.iter().filter(|segment| segment.support == Some(SupportId(index))).collect();
                prop_assert_eq!(mine.len(), 1);
                prop_assert_eq!(mine[0].continuous, support.kind == SupportKind::Hogging);
                prop_assert!((mine[0].from - support.from).0.abs() <= 10);
                prop_assert!((mine[0].to - support.to).0.abs() <= 10);
                if support.far.is_some() {
                    prop_assert_eq!(mine[0].neighbour, other.map(|other| other.panel));
                }
            }
        }
        let with_support = floor.panels.iter().flat_map(|panel| &panel.edges).flat_map(|edge| &edge.segments);
        let with_support = with_support.filter(|segment| segment.support.is_some()).count();
        prop_assert_eq!(with_support, floor.supports.iter().map(|support| support.sides().count()).sum());
    }

    #[test]
    fn supports_are_in_plan_order_and_their_names_are_unique(numbers in numbers(), twins: bool) {
        let (layout, _) = random::floor(&mut Choices::new(numbers), twins);
        let (floor, _) = lay_out(&layout);
        let names: Vec<&String> = floor.supports.iter().filter_map(|support| support.name.as_ref()).collect();
        prop_assert_eq!(names.iter().collect::<BTreeSet<_>>().len(), names.len());
        let places: Vec<(Axis, i64, i64)> = floor.supports.iter().map(|support| {
            let rect = floor.panel(support.near.panel).plan.unwrap();
            let line = position(&rect, support.near.side);
            // Twins are one line.
            (support.axis, line.0 / 1000, support.from.0)
        }).collect();
        prop_assert!(places.is_sorted());
    }

    #[test]
    fn a_continuous_segment_is_continuous_on_both_sides_unless_stated(numbers in numbers()) {
        let (layout, _) = random::floor(&mut Choices::new(numbers), false);
        let (floor, _) = lay_out(&layout);
        for (index, panel) in floor.panels.iter().enumerate() {
            for side in Side::ALL {
                for segment in &panel.edge(side).segments {
                    let Some(other) = segment.neighbour else { continue };
                    let theirs = floor.panel(other).edge(side.opposite());
                    let same = theirs.segments.iter().find(|s| s.from == segment.from && s.to == segment.to);
                    let same = same.unwrap();
                    prop_assert_eq!(same.neighbour, Some(PanelId(index)));
                    if !panel.edge(side).stated && !theirs.stated {
                        prop_assert_eq!(segment.continuous, same.continuous);
                        prop_assert_eq!(segment.support, same.support);
                    }
                }
            }
        }
    }

    /// Against the plainest method: look for the panel over a point beyond the middle of each segment.
    #[test]
    fn the_neighbour_is_the_panel_just_beyond(numbers in numbers()) {
        let (layout, _) = random::floor(&mut Choices::new(numbers), false);
        let (floor, _) = lay_out(&layout);
        for panel in &floor.panels {
            for side in Side::ALL {
                for segment in &panel.edge(side).segments {
                    let middle = (segment.from.0 + segment.to.0) / 2;
                    let line = position(&panel.plan.unwrap(), side).0;
                    let beyond = if side == Side::North || side == Side::East { line + 100 } else { line - 100 };
                    let (x, y) = match side.span_axis() {
                        Axis::X => (beyond, middle),
                        Axis::Y => (middle, beyond),
                    };
                    let over = floor.panels.iter().position(|other| {
                        let at = other.plan.unwrap();
                        at.x0.0 < x && x < at.x1.0 && at.y0.0 < y && y < at.y1.0
                    });
                    prop_assert_eq!(segment.neighbour, over.map(PanelId));
                }
            }
        }
    }

    /// Against the plainest method: flood the empty cells from outside and count what stays dry.
    #[test]
    fn voids_are_the_holes_that_a_flood_does_not_reach(numbers in numbers()) {
        let (layout, cells) = random::floor(&mut Choices::new(numbers), false);
        let (_, queries) = lay_out(&layout);
        let noted = queries.iter().filter(|query| query.text.contains("enclose a void")).count();
        prop_assert_eq!(noted, dry_holes(&cells));
    }

    /// Against the plainest method: every pair of panels held against each other.
    #[test]
    fn overlaps_are_found_where_any_pair_overlaps(
        rects in prop::collection::vec((0_i64..12, 1_i64..5, 0_i64..12, 1_i64..5), 1..9),
    ) {
        let layout = overlapping(&rects);
        let pair_overlaps = |a: usize, b: usize| {
            let ((x0, w0, y0, h0), (x1, w1, y1, h1)) = (rects[a], rects[b]);
            x0 < x1 + w1 && x1 < x0 + w0 && y0 < y1 + h1 && y1 < y0 + h0
        };
        let any = (0..rects.len()).any(|a| (0..a).any(|b| pair_overlaps(a, b)));
        let (_, queries) = lay_out(&layout);
        let errors: Vec<&Query> = queries.iter().filter(|query| query.severity == Severity::Error).collect();
        prop_assert_eq!(!errors.is_empty(), any);
        for error in errors {
            let mark: usize = error.panel_mark().unwrap()[1..].parse().unwrap();
            let names_one = (0..rects.len())
                .filter(|other| *other != mark && pair_overlaps(mark, *other))
                .any(|other| error.text.contains(&format!("P{other}")));
            prop_assert!(names_one, "{}", error.text);
        }
    }
}

fn ends(rect: &PlanRect, axis: Axis) -> [TenthMm; 2] {
    match axis {
        Axis::X => [rect.x0, rect.x1],
        Axis::Y => [rect.y0, rect.y1],
    }
}

fn position(rect: &PlanRect, side: Side) -> TenthMm {
    match side {
        Side::North => rect.y1,
        Side::East => rect.x1,
        Side::South => rect.y0,
        Side::West => rect.x0,
    }
}

/// Groups of empty cells, side by side, that touch no border of the drawing.
fn dry_holes(cells: &Cells) -> usize {
    let (rows, columns) = (cells.len(), cells[0].len());
    let mut seen = vec![vec![false; columns]; rows];
    let mut holes = 0;
    for start in (0..rows).flat_map(|row| (0..columns).map(move |column| (row, column))) {
        let mut wet = false;
        let mut empty = 0;
        let mut waiting = vec![start];
        while let Some((row, column)) = waiting.pop() {
            if cells[row][column].is_some() || std::mem::replace(&mut seen[row][column], true) {
                continue;
            }
            empty += 1;
            wet |= row == 0 || column == 0 || row + 1 == rows || column + 1 == columns;
            let around = [
                (row.wrapping_sub(1), column),
                (row + 1, column),
                (row, column.wrapping_sub(1)),
                (row, column + 1),
            ];
            waiting.extend(around.into_iter().filter(|(row, column)| *row < rows && *column < columns));
        }
        holes += usize::from(empty > 0 && !wet);
    }
    holes
}

/// Panels anywhere on a grid of whole metres.
fn overlapping(rects: &[(i64, i64, i64, i64)]) -> Layout {
    let mut layout = empty();
    for axis in [Axis::X, Axis::Y] {
        let lines = (0..=16).map(|at| gridline(format!("{}{at}", axis.word()), axis, 10_000 * at));
        layout.gridlines.extend(lines);
    }
    let id = |axis, at: i64| GridlineId(usize::try_from(at).unwrap() + if axis == Axis::X { 0 } else { 17 });
    for (index, (x, width, y, height)) in rects.iter().enumerate() {
        let x_ends = [id(Axis::X, *x), id(Axis::X, x + width)];
        let y_ends = [id(Axis::Y, *y), id(Axis::Y, y + height)];
        layout.panels.push(panel(&format!("P{index}"), x_ends, y_ends));
    }
    layout
}
