//! The summary that `baymat schedule` prints: panels, what governs, what fails, what is not designed,
//! queries, and where the files are.

use std::collections::BTreeMap;

use design_engine::check::{Check, CheckKind, Place};
use design_engine::query::Severity;
use design_engine::result::PanelDesign;

use crate::console::Paint;
use crate::message::{Message, counted, one_line};
use crate::outputs::Output;
use crate::pipeline::Designed;
use crate::text_table::{Align, TextTable};

/// Panels in the table of what governs: the sheet `Panels` has them all.
const MOST_GOVERNING: usize = 10;
/// Rows in the table of failing checks, and lines of one kind of query: sheets `Checks` and `Queries` have all.
const MOST_LINES: usize = 40;

/// The summary, ready to print.
pub(crate) fn text(designed: &Designed, outputs: &[Output], paint: Paint) -> String {
    let blocks = [
        totals(designed),
        governing(designed),
        failing(designed),
        queries(designed, Severity::NotDesigned, paint),
        queries(designed, Severity::Warning, paint),
        vec![counts_of_queries(designed)],
        steel(designed),
        changes(designed),
        files(outputs),
    ];
    let mut text = String::new();
    for block in blocks.iter().filter(|block| !block.is_empty()) {
        if !text.is_empty() {
            text.push('\n');
        }
        for line in block {
            text.push_str(line);
            text.push('\n');
        }
    }
    text
}

fn totals(designed: &Designed) -> Vec<String> {
    let mut actions = BTreeMap::new();
    for panel in designed.design.panels.iter().filter(|panel| panel.not_designed.is_none()) {
        if let Some(basis) = &panel.basis {
            *actions.entry(basis.action.word()).or_insert(0_usize) += 1;
        }
    }
    let mut lines = vec![counts_of_panels(designed)];
    if !actions.is_empty() {
        let actions: Vec<String> = actions.iter().map(|(word, count)| format!("{count} {word}")).collect();
        lines.push(actions.join(", "));
    }
    match designed.book.defaults_used.len() {
        0 => {}
        1 => lines.push("1 criterion at its default: see the cover".to_owned()),
        count => lines.push(format!("{count} criteria at their default: see the cover")),
    }
    lines
}

/// The book, its panels, and how many pass, fail and are not designed.
pub(crate) fn counts_of_panels(designed: &Designed) -> String {
    let panels = &designed.design.panels;
    let not_designed = panels.iter().filter(|panel| panel.not_designed.is_some()).count();
    let passing = panels.iter().filter(|panel| panel.ok()).count();
    one_line(&format!(
        "{}: {}: {passing} pass, {} fail, {not_designed} not designed",
        designed.book.name,
        counted(panels.len(), "panel"),
        panels.len() - passing - not_designed
    ))
}

/// The panels nearest to their limits, the nearest first.
fn governing(designed: &Designed) -> Vec<String> {
    let mut panels: Vec<(&PanelDesign, &Check)> =
        designed.design.panels.iter().filter_map(|panel| Some((panel, panel.governing_check()?))).collect();
    let count = panels.len();
    if count == 0 {
        return Vec::new();
    }
    // By the ratio as printed, so that panels that look alike stay in the order of the book.
    panels.sort_by(|(_, a), (_, b)| printed_order(b).total_cmp(&printed_order(a)));
    let mut table = TextTable::new(&[
        ("Panel", Align::Left),
        ("Thickness (mm)", Align::Right),
        ("Bottom, short span", Align::Left),
        ("Bottom, long span", Align::Left),
        ("Governing check", Align::Left),
        ("Ratio", Align::Right),
    ]);
    for (panel, check) in panels.iter().take(MOST_GOVERNING) {
        let drawn = designed.floor.panel(panel.panel);
        table.row([
            drawn.mark.clone(),
            drawn.thickness_mm.to_string(),
            bars(designed, panel, Place::ShortMidspan),
            bars(designed, panel, Place::LongMidspan),
            format!("{}, {}", check.kind.word(), check.at.word(drawn.is_loose())),
            ratio(check),
        ]);
    }
    let which = if count > MOST_GOVERNING {
        format!("{MOST_GOVERNING} of {count} panels")
    } else {
        "every designed panel".into()
    };
    let mut lines = vec![format!("Nearest to the limits ({which}):")];
    lines.extend(table.lines());
    lines
}

fn printed_order(check: &Check) -> f64 {
    check.ratio.map_or(f64::INFINITY, |ratio| (ratio * 100.0).round())
}

fn bars(designed: &Designed, panel: &PanelDesign, at: Place) -> String {
    let letter = designed.book.criteria.bar_type_letter();
    panel.section(at).map_or_else(String::new, |section| {
        format!("{letter}{}-{} {}", section.bars.bar_mm, section.bars.spacing_mm, section.layer.word())
    })
}

/// Every failing check, and the least thickness that would pass where deflection fails.
fn failing(designed: &Designed) -> Vec<String> {
    let mut table = TextTable::new(&[
        ("Panel", Align::Left),
        ("Check", Align::Left),
        ("At", Align::Left),
        ("Demand", Align::Right),
        ("Limit", Align::Right),
        ("Unit", Align::Left),
        ("Ratio", Align::Right),
        ("Clause", Align::Left),
        ("Least thickness (mm)", Align::Right),
    ]);
    let mut count = 0;
    for panel in &designed.design.panels {
        let drawn = designed.floor.panel(panel.panel);
        for check in panel.checks.iter().filter(|check| !check.ok) {
            count += 1;
            if count <= MOST_LINES {
                let least = panel.least_thickness_mm.filter(|_| check.kind == CheckKind::Deflection);
                table.row(failing_row(&drawn.mark, check, drawn.is_loose(), least));
            }
        }
    }
    if count == 0 {
        return Vec::new();
    }
    let mut lines = vec![format!("{}:", counted(count, "failing check"))];
    lines.extend(table.lines());
    lines.extend(more(count));
    lines
}

fn failing_row(mark: &str, check: &Check, loose: bool, least_thickness_mm: Option<f64>) -> [String; 9] {
    [
        mark.to_owned(),
        check.kind.word().to_owned(),
        check.at.word(loose).to_owned(),
        figure(check.demand),
        figure(check.limit),
        check.unit.to_owned(),
        ratio(check),
        check.clause.to_owned(),
        least_thickness_mm.map_or_else(String::new, |least| least.to_string()),
    ]
}

/// Queries of one severity as messages. A panel that is not designed has one of its own.
fn queries(designed: &Designed, severity: Severity, paint: Paint) -> Vec<String> {
    let messages: Vec<Message> = designed
        .queries
        .iter()
        .filter(|placed| placed.query.severity == severity)
        .map(Message::query)
        .collect();
    let count = messages.len();
    let mut lines: Vec<String> =
        messages.into_iter().take(MOST_LINES).map(|message| message.line(paint)).collect();
    lines.extend(more(count));
    lines
}

fn more(count: usize) -> Option<String> {
    let left = count.checked_sub(MOST_LINES).filter(|left| *left > 0)?;
    Some(format!("  and {left} more in the workbook"))
}

fn counts_of_queries(designed: &Designed) -> String {
    let of = |severity| designed.queries.iter().filter(|placed| placed.query.severity == severity).count();
    let place = if designed.queries.is_empty() { "" } else { "; all are on the sheet Queries" };
    format!(
        "Queries: {} not designed, {}, {}{place}",
        of(Severity::NotDesigned),
        counted(of(Severity::Warning), "warning"),
        counted(of(Severity::Note), "note")
    )
}

/// Marks and steel of the floor.
fn steel(designed: &Designed) -> Vec<String> {
    let quantities = &designed.bars.quantities;
    let per_m3 =
        quantities.steel_kg_m3().map_or_else(String::new, |kg| format!(", {kg:.0} kg/m3 of concrete"));
    let marks = counted(designed.bars.bars.len(), "bar mark");
    vec![format!("Bars: {marks}, {:.0} kg{per_m3}", quantities.steel_kg)]
}

/// What differs from the issue before.
fn changes(designed: &Designed) -> Vec<String> {
    let Some(changes) = &designed.changes else { return Vec::new() };
    let bars = changes.iter().filter(|change| change.difference_kg.is_some()).count();
    let kg: f64 = changes.iter().filter_map(|change| change.difference_kg).sum();
    vec![
        format!(
            "Against the previous issue: {}, {kg:+.0} kg; inputs and reasons are on the sheet Changes",
            counted(bars, "changed bar mark")
        ),
        "Columns, notes and colours added to the previous workbook are not carried over".to_owned(),
    ]
}

fn files(outputs: &[Output]) -> Vec<String> {
    outputs
        .iter()
        .map(|output| {
            let mut what = output.what.to_owned();
            if let Some(first) = what.get_mut(..1) {
                first.make_ascii_uppercase();
            }
            one_line(&format!("{what}: {}", output.path.display()))
        })
        .collect()
}

/// A ratio to two places, or to as many as tell a failing one from 1.
fn ratio(check: &Check) -> String {
    let Some(ratio) = check.ratio else { return "not allowed".to_owned() };
    let rounds_to_pass = |places: &usize| {
        let shown = format!("{ratio:.places$}");
        !check.ok && shown.parse::<f64>().is_ok_and(|shown| shown <= 1.0)
    };
    let places = (2..9).find(|places| !rounds_to_pass(places)).unwrap_or(9);
    format!("{ratio:.places$}")
}

/// A quantity to about three figures.
fn figure(quantity: f64) -> String {
    match quantity.abs() {
        size if size >= 100.0 => format!("{quantity:.0}"),
        size if size >= 10.0 => format!("{quantity:.1}"),
        size if size >= 1.0 => format!("{quantity:.2}"),
        _ => format!("{quantity:.3}"),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn deflection(demand: f64, limit: f64) -> Check {
        Check::at_most(CheckKind::Deflection, Place::ShortMidspan, "3.4.6.3", demand, limit, "-")
    }

    #[test]
    fn a_failing_ratio_never_prints_as_one() {
        assert_eq!(ratio(&deflection(30.0, 20.0)), "1.50");
        assert_eq!(ratio(&deflection(20.004, 20.0)), "1.0002");
        assert_eq!(ratio(&deflection(19.999, 20.0)), "1.00");
        let severe =
            Check::not_allowed(CheckKind::CoverForDurability, Place::BottomFace, "3.3.4", 20.0, 40.0, "mm");
        assert_eq!(ratio(&severe), "not allowed");
    }

    #[test]
    fn figures_are_three_or_so() {
        assert_eq!([1234.56, 36.24, 4.567, 0.4567].map(figure), ["1235", "36.2", "4.57", "0.457"]);
    }
}
