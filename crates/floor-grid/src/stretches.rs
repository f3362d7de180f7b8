//! What the `Joints` and `Supports` sheets say along each line.

use std::collections::BTreeMap;

use design_engine::floor::Axis;
use design_engine::query::{Query, Severity, Subject};

use crate::gridlines::{Grid, Line, Station};
use crate::layout::{Layout, LineSupportKind, Stretch};

/// Stations from one to another along a line.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(crate) struct Run {
    pub(crate) from: Station,
    pub(crate) to: Station,
}

/// A piece of a line over which the `Supports` sheet says one thing.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Piece {
    run: Run,
    held: bool,
    width_mm: f64,
}

/// Joints and supports by line.
#[derive(Debug)]
pub(crate) struct Stretches {
    /// Joints along each line, in order and apart.
    joints: BTreeMap<Line, Vec<Run>>,
    /// What the rows of `Supports` say along each line, in order and apart.
    pieces: BTreeMap<Line, Vec<Piece>>,
    /// Every row that lies somewhere, in book order: joints, then supports.
    laid: Vec<LaidRow>,
    default_width_mm: f64,
}

/// A row of `Joints` or `Supports` and where it lies.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) struct LaidRow {
    /// `Joints` or `Supports`.
    pub(crate) sheet: &'static str,
    /// Data row, from 0.
    pub(crate) index: usize,
    pub(crate) line: Line,
    pub(crate) run: Run,
}

/// How much of an edge has nothing under it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Unheld {
    Nowhere,
    Partly,
    Wholly,
}

impl Stretches {
    /// Gathers both sheets by line; rows that cannot be are errors.
    pub(crate) fn new(layout: &Layout, grid: &Grid, queries: &mut Vec<Query>) -> Stretches {
        let mut laid = Vec::new();
        let joint_rows = layout.joints.iter().map(|row| ("Joints", &row.stretch)).enumerate();
        let support_rows = layout.supports.iter().map(|row| ("Supports", &row.stretch)).enumerate();
        for (index, (sheet, stretch)) in joint_rows.chain(support_rows) {
            match run_of(layout, grid, stretch, sheet, index) {
                Ok((line, run)) => laid.push(LaidRow { sheet, index, line, run }),
                Err(fault) => queries.push(fault),
            }
        }
        let mut joints: BTreeMap<Line, Vec<Run>> = BTreeMap::new();
        let mut rows: BTreeMap<Line, Vec<Row>> = BTreeMap::new();
        for LaidRow { sheet, index, line, run } in laid.iter().copied() {
            if sheet == "Joints" {
                joints.entry(line).or_default().push(run);
                continue;
            }
            let support = &layout.supports[index];
            rows.entry(line).or_default().push(Row {
                run,
                whole: support.stretch.from.is_none() && support.stretch.to.is_none(),
                held: support.kind != LineSupportKind::None,
                width_mm: support.width_mm,
                index,
            });
        }
        joints.values_mut().for_each(|runs| *runs = united(runs));
        let pieces =
            rows.into_iter().map(|(line, rows)| (line, pieces_of(layout, line, rows, queries))).collect();
        Stretches { joints, pieces, laid, default_width_mm: layout.support_width_mm }
    }

    /// Every row that lies somewhere, in book order: joints, then supports.
    pub(crate) fn laid(&self) -> &[LaidRow] {
        &self.laid
    }

    /// Whether a joint runs along a stretch that no end of a joint cuts.
    pub(crate) fn has_joint(&self, line: Line, run: Run) -> bool {
        let runs = self.joints.get(&line).map_or(&[][..], Vec::as_slice);
        let next = runs.partition_point(|joint| joint.to <= run.from);
        runs.get(next).is_some_and(|joint| joint.from < run.to)
    }

    /// How much of a stretch has nothing under it.
    pub(crate) fn unheld(&self, line: Line, run: Run) -> Unheld {
        let mut open = 0;
        for piece in self.pieces_over(line, run).iter().filter(|piece| !piece.held) {
            open += piece.run.to.min(run.to) - piece.run.from.max(run.from);
        }
        match open {
            0 => Unheld::Nowhere,
            _ if open == run.to - run.from => Unheld::Wholly,
            _ => Unheld::Partly,
        }
    }

    /// Least width of the supports along a stretch, mm: safe for bearing, anchorage and clear span alike.
    pub(crate) fn width_mm(&self, line: Line, run: Run) -> f64 {
        let pieces = self.pieces_over(line, run);
        let told: Station =
            pieces.iter().map(|piece| piece.run.to.min(run.to) - piece.run.from.max(run.from)).sum();
        let rest = if told < run.to - run.from { self.default_width_mm } else { f64::INFINITY };
        let least =
            pieces.iter().filter(|piece| piece.held).fold(rest, |least, piece| least.min(piece.width_mm));
        if least.is_finite() { least } else { self.default_width_mm }
    }

    /// Stations of a line at which joints or supports begin or end.
    pub(crate) fn cuts(&self, line: Line) -> impl Iterator<Item = Station> + '_ {
        let joints = self.joints.get(&line).into_iter().flatten().copied();
        let pieces = self.pieces.get(&line).into_iter().flatten().map(|piece| piece.run);
        joints.chain(pieces).flat_map(|run| [run.from, run.to])
    }

    fn pieces_over(&self, line: Line, run: Run) -> &[Piece] {
        let pieces = self.pieces.get(&line).map_or(&[][..], Vec::as_slice);
        let start = pieces.partition_point(|piece| piece.run.to <= run.from);
        let end = pieces.partition_point(|piece| piece.run.from < run.to);
        &pieces[start.min(end)..end]
    }
}

/// Where a stretch lies; a blank end reaches beyond every crossing gridline.
fn run_of(
    layout: &Layout,
    grid: &Grid,
    stretch: &Stretch,
    sheet: &'static str,
    index: usize,
) -> Result<(Line, Run), Query> {
    let along = layout.gridline(stretch.gridline);
    let crossing = along.axis.across();
    let fault = |text: String, remedy: &str| {
        Err(Query::new(Severity::Error, Subject::Row { sheet, index }, text, remedy))
    };
    for id in [stretch.from, stretch.to].into_iter().flatten() {
        let end = layout.gridline(id);
        if end.axis != crossing {
            let text = format!("gridline {} does not cross gridline {}", end.name, along.name);
            return fault(text, "name a gridline of the other axis");
        }
    }
    let from = stretch.from.map_or(0, |id| grid.station(id));
    let to = stretch.to.map_or(grid.len(crossing).max(1) - 1, |id| grid.station(id));
    if from == to && (stretch.from.is_some() || stretch.to.is_some()) {
        return fault("the stretch has no length".to_owned(), "name two gridlines that stand apart");
    }
    let line = Line { axis: along.axis, station: grid.station(stretch.gridline) };
    // A stretch named from its greater end is the same stretch.
    Ok((line, Run { from: from.min(to), to: from.max(to) }))
}

/// Runs in order, those that touch made one.
fn united(runs: &mut [Run]) -> Vec<Run> {
    runs.sort_unstable();
    let mut united: Vec<Run> = Vec::new();
    for run in runs.iter() {
        match united.last_mut() {
            Some(last) if run.from <= last.to => last.to = last.to.max(run.to),
            _ => united.push(*run),
        }
    }
    united
}

/// A row of `Supports` on a line.
struct Row {
    run: Run,
    whole: bool,
    held: bool,
    width_mm: f64,
    index: usize,
}

/// Settles the rows of one line: a row for part of a gridline wins over one for the whole of it; of rows
/// of like standing the least width counts, and a support beside none is an error.
fn pieces_of(layout: &Layout, line: Line, mut rows: Vec<Row>, queries: &mut Vec<Query>) -> Vec<Piece> {
    rows.sort_by_key(|row| (row.run, row.index));
    let mut cuts: Vec<Station> = rows.iter().flat_map(|row| [row.run.from, row.run.to]).collect();
    cuts.sort_unstable();
    cuts.dedup();
    let mut pieces: Vec<Piece> = Vec::new();
    let mut coming = rows.iter().peekable();
    let mut present: Vec<&Row> = Vec::new();
    let mut told = std::collections::BTreeSet::new();
    for ends in cuts.windows(2) {
        let run = Run { from: ends[0], to: ends[1] };
        present.retain(|row| row.run.to > run.from);
        while let Some(row) = coming.next_if(|row| row.run.from <= run.from) {
            present.push(row);
        }
        let parts = present.iter().any(|row| !row.whole);
        let winners: Vec<&Row> = present.iter().filter(|row| row.whole != parts).copied().collect();
        let Some(first) = winners.first() else { continue };
        if let Some(other) = winners.iter().find(|row| row.held != first.held)
            && told.insert((first.index, other.index))
        {
            queries.push(contradiction(layout, line, first, other));
        }
        let width_mm = winners.iter().fold(f64::INFINITY, |least, row| least.min(row.width_mm));
        pieces.push(Piece { run, held: winners.iter().all(|row| row.held), width_mm });
    }
    pieces
}

fn contradiction(layout: &Layout, line: Line, one: &Row, other: &Row) -> Query {
    let (earlier, later) = if one.index < other.index { (one, other) } else { (other, one) };
    let name = &layout.gridline(layout.supports[later.index].stretch.gridline).name;
    let axis: Axis = line.axis;
    Query::new(
        Severity::Error,
        Subject::Row { sheet: "Supports", index: later.index },
        format!(
            "{} gridline {name} has both a support and none over one stretch (rows {} and {} below the headings)",
            axis.word().to_uppercase(),
            earlier.index + 1,
            later.index + 1
        ),
        "keep one of the two rows, or end them at a crossing gridline",
    )
}
