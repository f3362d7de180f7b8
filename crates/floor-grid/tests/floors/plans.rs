//! Every plan of `fixtures/plans` comes out as it says beside its drawing.

use std::path::PathBuf;

use design_engine::floor::{Edge, EdgeState, Floor, Side, SupportKind};
use design_engine::query::{Query, Subject};
use floor_grid::lay_out;

use crate::drawing;

fn plans() -> Vec<(String, String)> {
    let folder = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("../../fixtures/plans");
    let mut plans: Vec<(String, String)> = std::fs::read_dir(folder)
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .filter(|path| path.extension().is_some_and(|extension| extension == "txt"))
        .map(|path| {
            (path.file_stem().unwrap().to_string_lossy().into_owned(), std::fs::read_to_string(path).unwrap())
        })
        .collect();
    plans.sort();
    plans
}

#[test]
fn every_plan_comes_out_as_drawn() {
    let plans = plans();
    assert!(plans.len() >= 25, "only {} plans", plans.len());
    let faults: Vec<String> = plans.iter().flat_map(|(name, text)| check(name, text)).collect();
    assert!(faults.is_empty(), "\n{}", faults.join("\n"));
}

/// What differs between a plan and what is expected of it.
fn check(name: &str, text: &str) -> Vec<String> {
    let drawing = drawing::read(text);
    let (floor, queries) = lay_out(&drawing.layout);
    let mut faults = Vec::new();
    let mut compare = |what: &str, expected: &str, found: &str| {
        if expected != found {
            faults.push(format!("{name}: {what}\n  expected {expected}\n  found    {found}"));
        }
    };
    for panel in &floor.panels {
        match drawing.states.get(&panel.mark) {
            Some(states) => {
                let found = panel.edges.each_ref().map(state_word).join("  ");
                compare(&panel.mark, &states.join("  "), &found);
            }
            None => compare(&panel.mark, "its states beside the drawing", "none"),
        }
    }
    for (edge, why) in &drawing.whys {
        let found = floor.panels.iter().find_map(|panel| {
            let side =
                Side::ALL.into_iter().find(|side| format!("{} {}", panel.mark, side.word()) == *edge)?;
            Some(panel.edge(side).why.as_str())
        });
        compare(edge, why, found.unwrap_or("no such edge"));
    }
    let supports: Vec<String> = support_words(&floor);
    compare("supports", &lines(&drawing.supports), &lines(&supports));
    let mut expected = drawing.queries.clone();
    let mut found: Vec<String> = queries.iter().map(query_words).collect();
    expected.sort();
    found.sort();
    compare("queries", &lines(&expected), &lines(&found));
    faults
}

fn lines(lines: &[String]) -> String {
    lines.iter().map(|line| format!("\n    {line}")).collect()
}

/// The state in one word, with a star where the book states it.
fn state_word(edge: &Edge) -> String {
    let word = match edge.state {
        EdgeState::PartlyContinuous => "partly",
        state => state.word(),
    };
    format!("{word}{}", if edge.stated { "*" } else { "" })
}

/// `2/A-B hogging P Q`, or `P east hogging` where one panel has it alone.
fn support_words(floor: &Floor) -> Vec<String> {
    let words = floor.supports.iter().map(|support| {
        let kind = match support.kind {
            SupportKind::Hogging => "hogging",
            SupportKind::Crossing => "crossing",
        };
        let near = floor.panel(support.near.panel);
        let bars =
            support.chosen.map_or(String::new(), |bars| format!(" {} at {}", bars.bar_mm, bars.spacing_mm));
        match (&support.name, support.far) {
            (Some(name), Some(far)) => {
                format!("{name} {kind} {} {}{bars}", near.mark, floor.panel(far.panel).mark)
            }
            (None, None) => format!("{} {} {kind}{bars}", near.mark, support.near.side.word()),
            other => format!("a name without a second side, or the reverse: {other:?}"),
        }
    });
    words.collect()
}

/// `warning, edge A north: text`.
fn query_words(query: &Query) -> String {
    let subject = match &query.subject {
        Subject::Floor => "floor".to_owned(),
        Subject::Setting(item) => (*item).to_owned(),
        Subject::Panel { mark, column: None } => format!("panel {mark}"),
        Subject::Panel { mark, column: Some(column) } => format!("panel {mark} ({column})"),
        Subject::Edge { mark, side } => format!("edge {mark} {}", side.word()),
        Subject::Support(name) => format!("support {name}"),
        Subject::Gridline(name) => format!("gridline {name}"),
        Subject::Row { sheet, index } => format!("{sheet} {}", index + 1),
    };
    format!("{}, {subject}: {}", query.severity.word(), query.text)
}
