//! Plans drawn in characters: reads `fixtures/plans/*.txt` into a layout and what is expected of it.
//! `fixtures/plans/README.md` says how they are written.

use std::collections::BTreeMap;

use design_engine::floor::{Axis, BarChoice, Side, Spanning, TenthMm};
use floor_grid::layout::*;

use crate::rows::{data, empty, panel};

/// A drawn plan.
pub(crate) struct Drawing {
    pub(crate) layout: Layout,
    /// Expected states by panel and side.
    pub(crate) states: BTreeMap<String, [String; 4]>,
    /// Expected reason of an edge, by `MARK side`.
    pub(crate) whys: BTreeMap<String, String>,
    /// Expected supports, in plan order.
    pub(crate) supports: Vec<String>,
    /// Expected queries, in any order.
    pub(crate) queries: Vec<String>,
}

/// The heading a line stands under.
enum Under {
    Givens,
    Plan,
    Whys,
    Supports,
    Queries,
}

/// Reads a drawing; the file's first line is its title.
pub(crate) fn read(text: &str) -> Drawing {
    let mut givens = Vec::new();
    let mut rows: Vec<Vec<&str>> = Vec::new();
    let mut drawing = Drawing {
        layout: empty(),
        states: BTreeMap::new(),
        whys: BTreeMap::new(),
        supports: Vec::new(),
        queries: Vec::new(),
    };
    let mut under = Under::Givens;
    for line in text.lines().skip(1).map(|line| line.split('#').next().unwrap_or("").trim_end()) {
        let indented = line.starts_with(' ');
        let line = line.trim();
        match (line.split_whitespace().next(), indented) {
            (None, _) => {}
            (Some("plan"), false) => under = Under::Plan,
            (Some("why"), false) => under = Under::Whys,
            (Some("supports"), false) => under = Under::Supports,
            (Some("queries"), false) => under = Under::Queries,
            (Some(_), false) => givens.push(line),
            (Some(_), true) => match under {
                Under::Givens => panic!("not under a heading: {line}"),
                Under::Plan => plan_line(line, &mut rows, &mut drawing.states),
                Under::Whys => {
                    let (edge, why) = line.split_once(": ").unwrap_or_else(|| panic!("no colon: {line}"));
                    drawing.whys.insert(edge.to_owned(), why.to_owned());
                }
                Under::Supports => drawing.supports.push(line.to_owned()),
                Under::Queries => drawing.queries.push(line.to_owned()),
            },
        }
    }
    let layout = &mut drawing.layout;
    let numbers_after = |word: &str| -> Vec<f64> {
        let found = givens.iter().find_map(|line| line.strip_prefix(word));
        found.map_or(Vec::new(), |line| line.split_whitespace().map(number).collect())
    };
    add_gridlines(layout, &numbers_after("columns"), &numbers_after("rows"));
    add_panels(layout, &rows);
    for line in givens.iter().filter(|line| !line.starts_with("columns") && !line.starts_with("rows")) {
        give(layout, line);
    }
    drawing
}

/// Drawn cells, a bar, then a panel's expected states: `A A B | A north east south west`.
fn plan_line<'a>(line: &'a str, rows: &mut Vec<Vec<&'a str>>, states: &mut BTreeMap<String, [String; 4]>) {
    let (cells, expected) = line.split_once('|').unwrap_or_else(|| panic!("no bar: {line}"));
    let cells: Vec<&str> = cells.split_whitespace().collect();
    if !cells.is_empty() {
        rows.push(cells);
    }
    let words: Vec<&str> = expected.split_whitespace().collect();
    if let [mark, north, east, south, west] = words[..] {
        states.insert(mark.to_owned(), [north, east, south, west].map(str::to_owned));
    } else {
        assert!(words.is_empty(), "a mark and four states, not {expected}");
    }
}

/// X gridlines 1, 2, 3 from the west; Y gridlines A, B, C from the south. Rows are given as drawn, the
/// north one first.
fn add_gridlines(layout: &mut Layout, columns: &[f64], rows: &[f64]) {
    let rows: Vec<f64> = rows.iter().rev().copied().collect();
    let axes = [(Axis::X, columns), (Axis::Y, &*rows)];
    for (axis, widths) in axes.into_iter().filter(|(_, widths)| !widths.is_empty()) {
        let mut position = 0.0;
        for (index, width) in std::iter::once(&0.0).chain(widths).enumerate() {
            position += width;
            let name = match axis {
                Axis::X => (index + 1).to_string(),
                Axis::Y => char::from(b'A' + u8::try_from(index).unwrap()).to_string(),
            };
            layout.gridlines.push(Gridline { name, axis, position: TenthMm::from_m(position) });
        }
    }
}

/// Panels as drawn, in the order in which their first cell is met.
fn add_panels(layout: &mut Layout, rows: &[Vec<&str>]) {
    // Of each mark: its least and greatest column, and its least and greatest row.
    let mut marks: Vec<(&str, [usize; 4])> = Vec::new();
    for (row, cells) in rows.iter().enumerate() {
        for (column, mark) in cells.iter().enumerate().filter(|(_, mark)| **mark != ".") {
            match marks.iter_mut().find(|(known, _)| known == mark) {
                Some((_, at)) => {
                    *at = [at[0].min(column), at[1].max(column), at[2].min(row), at[3].max(row)];
                }
                None => marks.push((mark, [column, column, row, row])),
            }
        }
    }
    let gridline = |axis, index: usize| {
        let of_axis = layout.gridlines.iter().enumerate().filter(|(_, line)| line.axis == axis);
        GridlineId(of_axis.map(|(id, _)| id).nth(index).unwrap_or_else(|| panic!("too few columns or rows")))
    };
    let panels: Vec<GridPanel> = marks
        .into_iter()
        .map(|(mark, [west, east, top, bottom])| {
            for cells in &rows[top..=bottom] {
                assert!(cells[west..=east].iter().all(|cell| *cell == mark), "{mark} is no rectangle");
            }
            let (south, north) = (rows.len() - 1 - bottom, rows.len() - top);
            let x = [gridline(Axis::X, west), gridline(Axis::X, east + 1)];
            panel(mark, x, [gridline(Axis::Y, south), gridline(Axis::Y, north)])
        })
        .collect();
    layout.panels = panels;
}

/// One line of what is given besides the drawing.
fn give(layout: &mut Layout, line: &str) {
    let words: Vec<&str> = line.split_whitespace().collect();
    let rest = |count: usize| words[count..].join(" ");
    match words[..] {
        ["tolerance", mm] => layout.tolerance = TenthMm::from_m(number(mm) / 1000.0),
        ["gridline", axis, name, position] => layout.gridlines.push(Gridline {
            name: name.to_owned(),
            axis: if axis == "X" { Axis::X } else { Axis::Y },
            position: TenthMm::from_m(number(position)),
        }),
        ["panel", mark, west, east, south, north] => {
            let [west, east, south, north] = [west, east, south, north].map(|name| id(layout, name));
            layout.panels.push(panel(mark, [west, east], [south, north]));
        }
        ["loose", mark, short, long, e1, e2, e3, e4] => layout.loose_panels.push(LoosePanel {
            data: data(mark),
            short_span_m: number(short),
            long_span_m: number(long),
            edges: [e1, e2, e3, e4].map(stated),
        }),
        ["joint", line, ref ends @ ..] => {
            let joint = Joint { stretch: stretch(layout, line, ends), remark: String::new() };
            layout.joints.push(joint);
        }
        ["support", line, ref ends @ .., kind, width] => {
            let support = LineSupport {
                stretch: stretch(layout, line, ends),
                kind: match kind {
                    "none" => LineSupportKind::None,
                    "wall" => LineSupportKind::Wall,
                    _ => LineSupportKind::Beam,
                },
                width_mm: number(width),
                remark: String::new(),
            };
            layout.supports.push(support);
        }
        ["level", mark, mm] => row(layout, mark).top_level_mm = number(mm),
        ["edge", mark, word, state] => {
            row(layout, mark).stated_edges[side(word).index()] = Some(stated(state))
        }
        ["remark", mark, ..] => row(layout, mark).data.remarks = rest(2),
        ["span", mark, ..] => {
            row_data(layout, mark).spanning = match &*rest(2) {
                "two-way" => Spanning::TwoWay,
                "one-way x" => Spanning::OneWay(Axis::X),
                "one-way y" => Spanning::OneWay(Axis::Y),
                "cantilever" => Spanning::Cantilever,
                other => panic!("no such spanning: {other}"),
            };
        }
        ["opening", mark, ref corner @ ..] => layout.openings.push(Opening {
            panel: mark.to_owned(),
            from_west_m: corner.first().map_or(1.0, |west| west.parse().unwrap()),
            from_south_m: corner.last().map_or(1.0, |south| south.parse().unwrap()),
            width_x_m: 0.6,
            width_y_m: 0.6,
            remark: String::new(),
        }),
        ["wall", mark] => layout.wall_loads.push(WallLoad {
            panel: mark.to_owned(),
            along: Axis::X,
            offset_m: 1.0,
            from_m: 0.0,
            to_m: 2.0,
            load_kn_m: 8.0,
            remark: String::new(),
        }),
        ["choose", mark, position, face, bar, spacing] => layout.chosen_bars.push(ChosenBars {
            panel: mark.to_owned(),
            position: match (position, face) {
                ("short", "bottom") => ChosenPosition::ShortBottom,
                ("long", "bottom") => ChosenPosition::LongBottom,
                (word, _) => ChosenPosition::Top(side(word)),
            },
            bars: BarChoice { bar_mm: number(bar), spacing_mm: number(spacing) },
            remark: String::new(),
        }),
        _ => panic!("not understood: {line}"),
    }
}

fn number(word: &str) -> f64 {
    word.parse().unwrap_or_else(|_| panic!("no number: {word}"))
}

fn side(word: &str) -> Side {
    Side::ALL.into_iter().find(|side| side.word() == word).unwrap_or_else(|| panic!("no side: {word}"))
}

fn stated(word: &str) -> StatedEdge {
    match word {
        "continuous" => StatedEdge::Continuous,
        "discontinuous" => StatedEdge::Discontinuous,
        "free" => StatedEdge::Free,
        _ => panic!("no state: {word}"),
    }
}

fn id(layout: &Layout, name: &str) -> GridlineId {
    let found = layout.gridlines.iter().position(|line| line.name == name);
    GridlineId(found.unwrap_or_else(|| panic!("no gridline: {name}")))
}

/// `2 A B`: gridline 2 from A to B; `2`: all of it; `-` for a blank end.
fn stretch(layout: &Layout, line: &str, ends: &[&str]) -> Stretch {
    let end = |index: usize| ends.get(index).filter(|name| **name != "-").map(|name| id(layout, name));
    Stretch { gridline: id(layout, line), from: end(0), to: end(1) }
}

fn row<'a>(layout: &'a mut Layout, mark: &str) -> &'a mut GridPanel {
    let found = layout.panels.iter_mut().find(|panel| panel.data.mark == mark);
    found.unwrap_or_else(|| panic!("no panel: {mark}"))
}

fn row_data<'a>(layout: &'a mut Layout, mark: &str) -> &'a mut PanelData {
    let grid = layout.panels.iter_mut().map(|panel| &mut panel.data);
    let mut all = grid.chain(layout.loose_panels.iter_mut().map(|panel| &mut panel.data));
    all.find(|data| data.mark == mark).unwrap_or_else(|| panic!("no panel: {mark}"))
}
