//! Openings and walls put on their panels, and the faults of their places.

use std::collections::BTreeMap;

use design_engine::floor::{Axis, Floor, LineLoad, Panel, PanelOpening};
use design_engine::query::{Query, Severity, Subject};

use crate::gridlines::list;
use crate::layout::{Layout, Opening, WallLoad};

/// Slack on a place in a panel, m: rows are typed to the millimetre.
const SLACK_M: f64 = 1e-3;

/// Puts the rows of `Openings` and `Wall loads` on their panels; a row that leaves its panel is an error.
/// Rows of unknown panels are passed over: reading refuses them.
pub(crate) fn put_on_panels(layout: &Layout, floor: &mut Floor, queries: &mut Vec<Query>) {
    let indices: BTreeMap<String, usize> =
        floor.panels.iter().enumerate().map(|(index, panel)| (panel.mark.clone(), index)).collect();
    let mut rows_of: BTreeMap<usize, Vec<usize>> = BTreeMap::new();
    for (index, row) in layout.openings.iter().enumerate() {
        let Some(at) = indices.get(&row.panel).copied() else { continue };
        match opening(row, &floor.panels[at]) {
            Ok(opening) => {
                floor.panels[at].openings.push(opening);
                rows_of.entry(at).or_default().push(index);
            }
            Err(text) => queries.push(fault("Openings", index, text)),
        }
    }
    queries.extend(rows_of.iter().filter_map(|(at, rows)| overlaps(&floor.panels[*at], rows)));
    for (index, row) in layout.wall_loads.iter().enumerate() {
        let Some(panel) = indices.get(&row.panel).map(|i| &mut floor.panels[*i]) else { continue };
        match line_load(row, panel) {
            Ok(wall) => panel.line_loads.push(wall),
            Err(text) => queries.push(fault("Wall loads", index, text)),
        }
    }
}

fn fault(sheet: &'static str, index: usize, text: String) -> Query {
    let remedy = "measure from the panel's west and south gridlines, in metres";
    Query::new(Severity::Error, Subject::Row { sheet, index }, text, remedy)
}

fn opening(row: &Opening, panel: &Panel) -> Result<PanelOpening, String> {
    let opening = PanelOpening {
        from_west_m: row.from_west_m,
        from_south_m: row.from_south_m,
        widths_m: [row.width_x_m, row.width_y_m],
    };
    let ends = [row.from_west_m + row.width_x_m, row.from_south_m + row.width_y_m];
    for axis in [Axis::X, Axis::Y] {
        if opening.widths_m[axis as usize] <= 0.0 {
            return Err(format!("an opening in {} with no width along {}", panel.mark, axis.word()));
        }
        let (end, span) = (ends[axis as usize], panel.span_m(axis));
        if end > span + SLACK_M {
            return Err(format!(
                "the opening ends {end:.3} m along {} in {}, which is {span:.3} m",
                axis.word(),
                panel.mark
            ));
        }
    }
    Ok(opening)
}

/// One warning for the openings of a panel that overlap, each pair by its numbers in the panel; `rows` are their rows.
fn overlaps(panel: &Panel, rows: &[usize]) -> Option<Query> {
    let mut order: Vec<usize> = (0..panel.openings.len()).collect();
    order.sort_by(|a, b| panel.openings[*a].from_west_m.total_cmp(&panel.openings[*b].from_west_m));
    let mut pairs = Vec::new();
    for (place, one) in order.iter().copied().enumerate() {
        let opening = &panel.openings[one];
        let east = opening.from_west_m + opening.widths_m[0] - SLACK_M;
        let beyond = &order[place + 1..];
        let reached = beyond.iter().take_while(|other| panel.openings[**other].from_west_m < east);
        let meets = reached.filter(|other| overlap_along_y(opening, &panel.openings[**other]));
        pairs.extend(meets.map(|other| [one.min(*other), one.max(*other)]));
    }
    pairs.sort_unstable();
    let [_, later] = *pairs.first()?;
    let words: Vec<String> = pairs.iter().map(|[a, b]| format!("{} with {}", a + 1, b + 1)).collect();
    let words: Vec<&str> = words.iter().map(String::as_str).collect();
    Some(Query::new(
        Severity::Warning,
        Subject::Row { sheet: "Openings", index: rows[later] },
        format!("openings of {} overlap: {}", panel.mark, list(&words)),
        "give one opening for what they take together; each counts its own cut bars",
    ))
}

fn overlap_along_y(one: &PanelOpening, other: &PanelOpening) -> bool {
    let north = |of: &PanelOpening| of.from_south_m + of.widths_m[1];
    north(one).min(north(other)) - one.from_south_m.max(other.from_south_m) > SLACK_M
}

fn line_load(row: &WallLoad, panel: &Panel) -> Result<LineLoad, String> {
    let (along, across) = (panel.span_m(row.along), panel.span_m(row.along.across()));
    if row.to_m <= row.from_m {
        return Err(format!("the wall on {} runs from {:.3} to {:.3} m", panel.mark, row.from_m, row.to_m));
    }
    if row.to_m > along + SLACK_M {
        return Err(format!(
            "the wall ends {:.3} m along {} in {}, which is {along:.3} m",
            row.to_m,
            row.along.word(),
            panel.mark
        ));
    }
    if row.offset_m > across + SLACK_M {
        return Err(format!(
            "the wall stands {:.3} m in from the edge of {}, which is {across:.3} m wide there",
            row.offset_m, panel.mark
        ));
    }
    Ok(LineLoad {
        along: row.along,
        offset_m: row.offset_m.min(across),
        from_m: row.from_m,
        to_m: row.to_m.min(along),
        load_kn_m: row.load_kn_m,
    })
}
