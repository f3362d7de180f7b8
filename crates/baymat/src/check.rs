//! `baymat check`: every edge of a floor book with its reason, and all queries; nothing is written.

use design_engine::floor::{Axis, Edge, Panel, Side};

use crate::cli::CheckArgs;
use crate::console::{Console, Paint};
use crate::exit::{Exit, Stop};
use crate::message::{Message, one_line};
use crate::pipeline::{Designed, design_book};
use crate::summary::counts_of_panels;
use crate::text_table::{Align, TextTable};

pub(crate) fn run(args: &CheckArgs, console: &mut Console) -> Result<Exit, Stop> {
    let show_progress = console.may_show_progress() && !args.quiet;
    let designed = design_book(&args.book, show_progress, !args.quiet)?;
    if !args.quiet {
        console.print(&text(&designed, console.paint()));
    }
    Ok(if designed.design.ok() { Exit::AllPass } else { Exit::NotAllPass })
}

fn text(designed: &Designed, paint: Paint) -> String {
    let mut lines = vec![counts_of_panels(designed)];
    for panel in &designed.floor.panels {
        lines.push(String::new());
        lines.push(one_line(&heading(panel)));
        lines.extend(edges(designed, panel).lines());
    }
    if !designed.queries.is_empty() {
        lines.push(String::new());
        lines.extend(designed.queries.iter().map(|placed| Message::query(placed).line(paint)));
    }
    lines.push(String::new());
    lines.join("\n")
}

fn heading(panel: &Panel) -> String {
    let [x, y] = panel.spans_m;
    let extent = if panel.is_loose() {
        format!("short span {x:.2} m, long span {y:.2} m")
    } else {
        format!("{x:.2} m along x, {y:.2} m along y")
    };
    format!("{}: {extent}, {} mm thick", panel.mark, panel.thickness_mm)
}

/// One row per edge; where an edge has several stretches, one more for each.
fn edges(designed: &Designed, panel: &Panel) -> TextTable {
    let mut table = TextTable::new(&[("", Align::Left), ("", Align::Left), ("", Align::Left)]);
    for side in Side::ALL {
        let edge = panel.edge(side);
        table.row([panel.side_word(side).to_owned(), state(edge), edge.why.clone()]);
        if edge.segments.len() < 2 {
            continue;
        }
        let along = match side.span_axis().across() {
            Axis::X => "x",
            Axis::Y => "y",
        };
        for segment in &edge.segments {
            let stretch = format!("  {along} {:.2} to {:.2} m", segment.from.m(), segment.to.m());
            let carried = if segment.continuous { "continuous" } else { "not continuous" };
            let neighbour = segment.neighbour.map(|id| designed.floor.panel(id).mark.as_str());
            let why = match neighbour {
                Some(mark) if !segment.why.contains(mark) => format!("{mark}: {}", segment.why),
                _ => segment.why.clone(),
            };
            table.row([stretch, carried.to_owned(), why]);
        }
    }
    table
}

fn state(edge: &Edge) -> String {
    let stated = if edge.stated { ", stated" } else { "" };
    format!("{}{stated}", edge.state.word())
}
