//! What a panel's bars depend on, in words at full precision, so that an issue can be compared with the next.

use std::collections::BTreeMap;

use design_engine::criteria::{Criteria, SETTINGS, Value};
use design_engine::floor::{
    BarChoice, Corners, EdgeState, Floor, LineLoad, Panel, PanelOpening, Side, Spanning,
};
use design_engine::result::FloorDesign;

/// Settings of the title block: they change nothing.
const TITLE_BLOCK: [&str; 8] =
    ["project", "job_number", "floor", "drawing_number", "revision", "prepared_by", "checked_by", "date"];
/// Subject of the settings.
pub const CRITERIA: &str = "Criteria";

/// The item that says which check governs a panel: a result, kept for comparison.
pub const GOVERNING_CHECK: &str = "governing_check";

/// Inputs of one subject: item and value, in a fixed order.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Inputs {
    /// A panel's mark, or [`CRITERIA`].
    pub subject: String,
    /// Items with their values.
    pub items: Vec<(String, String)>,
}

/// An item that differs; a side without it is empty.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Difference {
    /// Whose item.
    pub subject: String,
    /// The item.
    pub item: String,
    /// Before.
    pub before: String,
    /// After.
    pub after: String,
}

/// The criteria, then every panel, with the check that governs it.
#[must_use]
pub fn inputs(floor: &Floor, design: &FloorDesign, criteria: &Criteria) -> Vec<Inputs> {
    let settings = SETTINGS
        .iter()
        .filter(|setting| !TITLE_BLOCK.contains(&setting.key))
        .map(|setting| (setting.key.to_owned(), value(criteria.value(setting))))
        .filter(|(_, value)| !value.is_empty())
        .collect();
    let mut all = vec![Inputs { subject: CRITERIA.to_owned(), items: settings }];
    for (panel, design) in floor.panels.iter().zip(&design.panels) {
        let mut items = of_panel(floor, panel);
        if let Some(check) = design.governing_check() {
            items.push((
                GOVERNING_CHECK.to_owned(),
                format!("{} at {}", check.kind.word(), check.at.word(panel.is_loose())),
            ));
        }
        all.push(Inputs { subject: panel.mark.clone(), items });
    }
    all
}

fn value(value: Value) -> String {
    match value {
        Value::Blank => String::new(),
        Value::Number(number) => number.to_string(),
        Value::Numbers(numbers) => numbers.iter().map(f64::to_string).collect::<Vec<_>>().join(" "),
        Value::Text(text) => text,
    }
}

fn of_panel(floor: &Floor, panel: &Panel) -> Vec<(String, String)> {
    let mut items: Vec<(String, String)> = Vec::new();
    let mut put = |item: &str, value: String| items.push((item.to_owned(), value));
    match panel.plan {
        Some(plan) => {
            put("plan_m", format!("{} {} {} {}", plan.x0.m(), plan.x1.m(), plan.y0.m(), plan.y1.m()))
        }
        None => put("spans_m", format!("{} {}", panel.spans_m[0], panel.spans_m[1])),
    }
    put("thickness_mm", panel.thickness_mm.to_string());
    put("finishes_kn_m2", panel.loads.finishes_kn_m2.to_string());
    put("partitions_kn_m2", panel.loads.partitions_kn_m2.to_string());
    put("imposed_kn_m2", panel.loads.imposed_kn_m2.to_string());
    put("spanning", spanning(panel.spanning).to_owned());
    put("corners", if panel.corners == Corners::HeldDown { "held down" } else { "free to lift" }.to_owned());
    put("top_level_mm", panel.top_level_mm.to_string());
    for side in Side::ALL {
        let edge = panel.edge(side);
        let stated = if edge.stated { " stated" } else { "" };
        let state: EdgeState = edge.state;
        put(
            &format!("{}_edge", panel.side_word(side).replace(' ', "_")),
            format!("{}{stated} {}", state.word(), edge.support_width_mm),
        );
        for segment in &edge.segments {
            if let Some(bars) = segment.support.and_then(|id| floor.support(id).chosen) {
                put(&format!("{}_top", panel.side_word(side).replace(' ', "_")), chosen(bars));
            }
        }
    }
    for (item, bars) in ["short_bottom", "long_bottom"].into_iter().zip(panel.chosen_bottom) {
        if let Some(bars) = bars {
            put(item, chosen(bars));
        }
    }
    for (number, opening) in (1..).zip(&panel.openings) {
        put(&format!("opening_{number}"), opening_words(opening));
    }
    for (number, wall) in (1..).zip(&panel.line_loads) {
        put(&format!("wall_{number}"), wall_words(wall));
    }
    items
}

fn spanning(spanning: Spanning) -> &'static str {
    use design_engine::floor::Axis;
    match spanning {
        Spanning::Found => "found",
        Spanning::TwoWay => "two-way",
        Spanning::OneWay(Axis::X) => "one-way x",
        Spanning::OneWay(Axis::Y) => "one-way y",
        Spanning::Cantilever => "cantilever",
    }
}

fn chosen(bars: BarChoice) -> String {
    format!("{} at {}", bars.bar_mm, bars.spacing_mm)
}

fn opening_words(opening: &PanelOpening) -> String {
    format!(
        "{} {} {} {}",
        opening.from_west_m, opening.from_south_m, opening.widths_m[0], opening.widths_m[1]
    )
}

fn wall_words(wall: &LineLoad) -> String {
    format!("{} {} {} {} {}", wall.along.word(), wall.offset_m, wall.from_m, wall.to_m, wall.load_kn_m)
}

/// Items that differ, in the order of the new inputs, those of subjects that went last. A subject that is new or gone is one
/// difference.
#[must_use]
pub fn differences(old: &[Inputs], new: &[Inputs]) -> Vec<Difference> {
    let before: BTreeMap<&str, &Inputs> =
        old.iter().map(|inputs| (inputs.subject.as_str(), inputs)).collect();
    let after: BTreeMap<&str, &Inputs> = new.iter().map(|inputs| (inputs.subject.as_str(), inputs)).collect();
    let whole = |subject: &str, item: &str, before: &str, after: &str| Difference {
        subject: subject.to_owned(),
        item: item.to_owned(),
        before: before.to_owned(),
        after: after.to_owned(),
    };
    let mut found = Vec::new();
    for inputs in new {
        match before.get(inputs.subject.as_str()) {
            None => found.push(whole(&inputs.subject, "panel", "", "new")),
            Some(old) => found.extend(of_items(&inputs.subject, &old.items, &inputs.items)),
        }
    }
    let gone = old.iter().filter(|inputs| !after.contains_key(inputs.subject.as_str()));
    found.extend(gone.map(|inputs| whole(&inputs.subject, "panel", "there", "gone")));
    found
}

fn of_items(subject: &str, old: &[(String, String)], new: &[(String, String)]) -> Vec<Difference> {
    let before: BTreeMap<&str, &str> =
        old.iter().map(|(item, value)| (item.as_str(), value.as_str())).collect();
    let after: BTreeMap<&str, &str> =
        new.iter().map(|(item, value)| (item.as_str(), value.as_str())).collect();
    let items = new.iter().map(|(item, _)| item.as_str());
    let gone = old.iter().map(|(item, _)| item.as_str()).filter(|item| !after.contains_key(item));
    items
        .chain(gone)
        .filter_map(|item| {
            let [a, b] = [&before, &after].map(|side| side.get(item).copied().unwrap_or(""));
            (a != b).then(|| Difference {
                subject: subject.to_owned(),
                item: item.to_owned(),
                before: a.to_owned(),
                after: b.to_owned(),
            })
        })
        .collect()
}
