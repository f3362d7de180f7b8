//! What a finished design has to say: queries and printed assumptions.

use super::openings::over_quarter_alone;
use crate::check::{CheckKind, Place};
use crate::criteria::{Coefficients, Criteria, EdgeStrips, SETTINGS, Value};
use crate::floor::{Corners, EdgeState, Floor, Panel, PanelId, Side, Span, SupportKind};
use crate::query::{Query, Severity, Subject};
use crate::result::{Action, PanelDesign, SupportDesign};

/// Ratios of neighbours' loads or spans outside this and its inverse are a warning (decision).
const LEAST_NEIGHBOUR_RATIO: f64 = 0.5;
/// Partial factors on dead and imposed load, adverse (Table 2.1).
const LEAST_LOAD_FACTORS: [f64; 2] = [1.4, 1.6];
/// Settings that this version reads and does not use.
const NOT_YET_USED: [&str; 9] = [
    "thickness_options_mm",
    "concrete_rate_per_m3",
    "steel_rate_per_t",
    "formwork_rate_per_m2",
    "currency",
    "rate_source",
    "concrete_carbon_kgco2e_m3",
    "steel_carbon_kgco2e_kg",
    "carbon_source",
];

/// "Approximately the same" (3.5.3.5) for the summary note (decision).
const SIMILAR_NEIGHBOUR_RATIO: f64 = 0.8;
/// A new support moment above this multiple of a panel's table value is a warning (decision).
const GREATEST_RISE: f64 = 1.5;

/// All queries of the design, panels first in floor order, then supports.
pub(crate) fn of_design(
    floor: &Floor,
    criteria: &Criteria,
    panels: &[PanelDesign],
    supports: &[SupportDesign],
) -> Vec<Query> {
    let mut queries = Vec::new();
    for design in panels {
        of_panel(floor, design, &mut queries);
    }
    for design in supports {
        of_support(floor, panels, design, &mut queries);
    }
    negative_support_loads(floor, panels, &mut queries);
    similar_neighbours(supports, &mut queries);
    low_load_factors(criteria, &mut queries);
    settings_not_applied(criteria, &mut queries);
    queries
}

fn of_panel(floor: &Floor, design: &PanelDesign, queries: &mut Vec<Query>) {
    let panel = floor.panel(design.panel);
    let mut say = |severity, text: String, remedy: &str| {
        queries.push(Query::panel(severity, &panel.mark, None, text, remedy));
    };
    let mut failed: Vec<&str> = design.checks.iter().filter(|c| !c.ok).map(|c| c.kind.word()).collect();
    failed.dedup();
    failed.sort_unstable();
    failed.dedup();
    if !failed.is_empty() {
        let least = design
            .least_thickness_mm
            .map_or(String::new(), |h| format!("; the least thickness at which deflection passes is {h} mm"));
        say(Severity::Warning, format!("fails {}{least}", failed.join(", ")), remedy_of(design));
    }
    let Some(basis) = design.basis else { return };
    if basis.action == Action::Cantilever && panel.chosen_bottom.iter().any(Option::is_some) {
        say(
            Severity::Warning,
            "bottom bars are chosen for a cantilever, which has none designed: they are not checked"
                .to_owned(),
            "choose the top bars of its support instead",
        );
    }
    for (span, length) in [(Span::Short, basis.lx_m), (Span::Long, basis.ly_m)] {
        if length > 10.0 && (span == basis.main_span || basis.case.is_some()) {
            let text = format!(
                "{} span {length:.2} m: over 10 m the span/depth check does not protect finishes",
                span.word()
            );
            say(Severity::Note, text, "check deflection after finishes by other means (3.4.6.4)");
        }
    }
    let walls: f64 = panel.line_loads.iter().map(|wall| wall.load_kn_m * wall.length_m()).sum();
    let dead = design.loads.dead_kn_m2 * panel.area_m2();
    if walls > 0.1 * dead && basis.case.is_some() {
        let text = format!(
            "walls weigh {walls:.1} kN, {:.0} % of the panel's dead load, over 10 %: taken as an equivalent uniform load",
            100.0 * walls / dead
        );
        say(Severity::Warning, text, "check the panel by plate analysis, or put a beam under the wall");
    }
    of_openings(panel, design, &mut say);
    for span in [Span::Short, Span::Long] {
        let at = if span == Span::Short { Place::ShortMidspan } else { Place::LongMidspan };
        let hogs =
            design.sections.iter().any(|s| s.at == at && s.moment_balanced_knm_m.is_some_and(|m| m < 0.0));
        if hogs {
            let text = format!(
                "the {} span hogs throughout after balancing: top bars of both its supports run through",
                span.word()
            );
            say(
                Severity::Warning,
                text,
                "the neighbours are too unlike for the coefficient method to be relied on (3.5.3.5)",
            );
        }
    }
}

/// What to change where a panel fails: by the checks that fail.
fn remedy_of(design: &PanelDesign) -> &'static str {
    let failed = |test: fn(CheckKind) -> bool| design.checks.iter().filter(|c| !c.ok).all(|c| test(c.kind));
    let durability =
        |kind| matches!(kind, CheckKind::CoverForDurability | CheckKind::CoverForBarAndAggregate);
    let fire = |kind| matches!(kind, CheckKind::CoverForFire | CheckKind::ThicknessForFire);
    let bars = |kind| {
        matches!(
            kind,
            CheckKind::BarSpacing | CheckKind::BarGap | CheckKind::MinimumSteel | CheckKind::MaximumSteel
        )
    };
    if failed(durability) {
        "raise Bottom cover and Top cover or the cube strength, or correct Exposure"
    } else if failed(fire) {
        "raise Bottom cover or Thickness, or correct Fire resistance"
    } else if failed(bars) {
        "change the chosen bars, or the sizes and spacings allowed"
    } else if failed(|kind| kind == CheckKind::Uplift) {
        "hold the far support down, or change the spans"
    } else if failed(|kind| kind == CheckKind::LayersFit) {
        "raise the thickness, or allow smaller bars"
    } else {
        "see its rows on the Checks sheet; change the thickness, the bars allowed or the loads"
    }
}

fn of_openings(panel: &Panel, design: &PanelDesign, say: &mut dyn FnMut(Severity, String, &str)) {
    for (number, opening) in (1..).zip(&design.openings) {
        let [x, y] = opening.opening.widths_m;
        let name = format!("opening {number}, {x:.2} x {y:.2} m");
        if opening.over_quarter_of_span || opening.within_d_of_support {
            let why = if !opening.over_quarter_of_span {
                "within d of a support"
            } else if over_quarter_alone(panel, &opening.opening) {
                "wider than a quarter of a span"
            } else {
                "with others on one line across the panel wider than a quarter of a span"
            };
            say(
                Severity::Warning,
                format!("{name}: {why}: the coefficient method does not cover it"),
                "analyse the panel with its opening, or frame the opening with beams",
            );
        }
        if opening.over_quarter_of_span || opening.within_d_of_support {
            continue;
        }
        let text = if opening.displaced {
            format!("{name}: bars are moved aside, none cut")
        } else {
            format!(
                "{name}: bars are cut; half of each layer's cut steel goes on each side, with diagonal bars at the corners"
            )
        };
        say(Severity::Note, text, "");
    }
}

fn of_support(floor: &Floor, panels: &[PanelDesign], design: &SupportDesign, queries: &mut Vec<Query>) {
    let support = floor.support(design.support);
    let subject = support.name.clone().map_or_else(
        || Subject::Edge { mark: floor.panel(support.near.panel).mark.clone(), side: support.near.side },
        Subject::Support,
    );
    let mut warn = |text: String, remedy: &str| {
        queries.push(Query::new(Severity::Warning, subject.clone(), text, remedy));
    };
    if let Some(side) = support.sides().find(|side| panels[side.panel.0].not_designed.is_some()) {
        if support.kind == SupportKind::Hogging && support.far.is_some() {
            let mark = &floor.panel(side.panel).mark;
            warn(
                format!(
                    "{mark} is not designed, so this support is not balanced: its bars come from the other panel alone"
                ),
                "design the support again with both panels",
            );
        }
        return;
    }
    if support.kind == SupportKind::Crossing {
        return;
    }
    for (what, ratio) in [("ultimate loads", design.load_ratio), ("spans", design.span_ratio)] {
        if let Some(ratio) = ratio.filter(|ratio| *ratio < LEAST_NEIGHBOUR_RATIO) {
            warn(
                format!(
                    "the {what} of its two panels are in the ratio {ratio:.2}, under 0.5: not approximately the same (3.5.3.5)"
                ),
                "check these panels by analysis",
            );
        }
    }
    if let Some(moment) = design.moment_knm_m {
        for side in &design.sides {
            let table = side.moment_from_coefficient_knm_m.unwrap_or(0.0);
            if moment > GREATEST_RISE * table && table > 0.0 {
                let mark = &floor.panel(side.panel).mark;
                warn(
                    format!("the new moment {moment:.1} kNm/m is over 1.5 times the {table:.1} of {mark}"),
                    "check these panels by analysis",
                );
            }
        }
    }
}

/// Sides on which a panel's load as designed pulls at its support.
fn negative_support_loads(floor: &Floor, panels: &[PanelDesign], queries: &mut Vec<Query>) {
    for design in panels {
        let panel = floor.panel(design.panel);
        for side in Side::ALL.into_iter().filter(|side| panel.edge(*side).state != EdgeState::Free) {
            let load = design.side_loads[side.index()].map_or(0.0, |load| load.ultimate_kn_m);
            if load < -1e-9 {
                let text = format!(
                    "the load of {} on its support here is {load:.2} kN/m, below zero: the panel lifts off it",
                    panel.mark
                );
                queries.push(Query::new(
                    Severity::Warning,
                    Subject::Edge { mark: panel.mark.clone(), side },
                    text,
                    "hold the slab down there, or change the spans; design the support for the load from its other side alone",
                ));
            }
        }
    }
}

/// Factors below those of Table 2.1 are used as given, and said.
fn low_load_factors(criteria: &Criteria, queries: &mut Vec<Query>) {
    let given = [criteria.dead_load_factor, criteria.imposed_load_factor];
    let named = [("Dead load factor", "dead"), ("Imposed load factor", "imposed")];
    for ((factor, least), (item, load)) in given.into_iter().zip(LEAST_LOAD_FACTORS).zip(named) {
        if factor < least - 1e-9 {
            queries.push(Query::new(
                Severity::Warning,
                Subject::Setting(item),
                format!("{factor} is under the {least} of Table 2.1 for {load} load, and used as given"),
                "leave it blank for the factor of Table 2.1, or say in the Remark what allows less",
            ));
        }
    }
}

fn similar_neighbours(supports: &[SupportDesign], queries: &mut Vec<Query>) {
    let shared =
        supports.iter().filter(|support| support.load_ratio.is_some() && support.moment_knm_m.is_some());
    let unlike = shared
        .clone()
        .filter(|support| {
            let under = |ratio: Option<f64>| ratio.is_some_and(|r| r < SIMILAR_NEIGHBOUR_RATIO);
            under(support.load_ratio) || under(support.span_ratio)
        })
        .count();
    if unlike > 0 {
        let text = format!(
            "at {unlike} of {} shared supports the loads or spans of the two panels differ by more than 20 %; 3.5.3.5 asks that they be approximately the same",
            shared.count()
        );
        queries.push(Query::new(
            Severity::Note,
            Subject::Floor,
            text,
            "see the ratios on the Supports sheet",
        ));
    }
}

/// Settings that are read but not applied by this version are said, never passed over.
fn settings_not_applied(criteria: &Criteria, queries: &mut Vec<Query>) {
    let read_only: Vec<&str> = SETTINGS
        .iter()
        .filter(|setting| NOT_YET_USED.contains(&setting.key) && criteria.value(setting) != Value::Blank)
        .map(|setting| setting.item)
        .collect();
    if !read_only.is_empty() {
        let text = format!("read but not used by this version: {}", read_only.join(", "));
        queries.push(Query::new(
            Severity::Note,
            Subject::Floor,
            text,
            "no comparison of thicknesses, cost or carbon is made",
        ));
    }
    let mut say = |item, text: &str, remedy: &str| {
        queries.push(Query::new(Severity::Warning, Subject::Setting(item), text, remedy));
    };
    if criteria.bar_kinds_limit.is_some() {
        say(
            "Bar kinds limit",
            "the limit on kinds of bars is not applied",
            "limit Bar sizes and the spacing step instead",
        );
    }
}

/// Assumptions of this floor's design, for printing.
pub(crate) fn assumptions(floor: &Floor, criteria: &Criteria, panels: &[PanelDesign]) -> Vec<String> {
    let mut list = Vec::new();
    let any = |test: &dyn Fn(&PanelDesign) -> bool| panels.iter().any(test);
    list.push(match criteria.coefficients {
        Coefficients::Tabulated => "Two-way moments from Tables 3.13 and 3.14, linear interpolation between printed ratios, coefficients not rounded.".to_owned(),
        Coefficients::Equations => "Two-way moments from equations 12 to 18; shears from Table 3.15.".to_owned(),
    });
    list.push("The midspan moment for bottom steel and deflection is never below the table's: a neighbour may be unloaded.".to_owned());
    list.push(match criteria.edge_strips {
        EdgeStrips::MinimumSteel => "Edge strips (an eighth of the width each side) of restrained two-way panels carry minimum bottom steel; top bars over supports run over the full width.",
        EdgeStrips::AsMiddleStrip => "Bottom bars of a panel's middle strip are given over its full width.",
    }.to_owned());
    list.push("Bars of neighbouring panels meet at the centre line of their support; those that come in from both sides interleave.".to_owned());
    let restrained = |d: &PanelDesign| d.basis.is_some_and(|b| b.action == Action::TwoWayRestrained);
    if any(&restrained) {
        list.push("Corners of restrained two-way panels are held down; the torsion steel to be added there (3.5.3.5) is on the Corners sheet, its bars on the bending schedule.".to_owned());
    }
    if criteria.corners == Corners::FreeToLift && any(&restrained) {
        list.push("Corners free to lift applies only to panels discontinuous on all four edges; the others are designed with corners held down.".to_owned());
    }
    if any(&|d| d.basis.is_some_and(|b| b.action == Action::OneWay)) {
        list.push("One-way strips: Table 3.12 where its conditions hold (spans and loads within 15 %, one thickness, the panel's own area taken as the bay), else elastic analysis with support moments reduced by 20 %.".to_owned());
    }
    let stated = edges_in_words(floor, panels, &|design, side| {
        let panel = floor.panel(design.panel);
        let edge = panel.edge(side);
        let alone = edge.stated && edge.state == EdgeState::Continuous && !panel.is_loose();
        alone && shared_with_none(floor, design.panel, side)
    });
    if !stated.is_empty() {
        list.push(format!(
            "Edges stated continuous with nothing to balance against keep their coefficient moment: {}.",
            stated
        ));
    }
    let partly = edges_in_words(floor, panels, &|design, side| {
        design.edge_states[side.index()] == EdgeState::PartlyContinuous
    });
    if !partly.is_empty() {
        list.push(format!("Partly continuous edges: the panel is designed with them discontinuous; each shared stretch has the moment and shear of the case with that edge continuous: {partly}."));
    }
    let back_spans = edges_in_words(floor, panels, &|design, side| {
        let own = design.basis.map(|basis| basis.state(side));
        own.is_some_and(|own| own != design.edge_states[side.index()])
    });
    if !back_spans.is_empty() {
        list.push(format!(
            "Edges against cantilevers count as discontinuous in the back-span's own case: {back_spans}."
        ));
    }
    if panels.iter().any(|d| d.basis.is_some() && floor.panel(d.panel).is_loose()) {
        list.push("Loose panels are designed alone: no balancing at their continuous edges.".to_owned());
    }
    list
}

/// `F11 south, F12 south`: the edges of designed panels that a test picks.
fn edges_in_words(
    floor: &Floor,
    panels: &[PanelDesign],
    picks: &dyn Fn(&PanelDesign, Side) -> bool,
) -> String {
    let edges = panels.iter().filter(|design| design.not_designed.is_none()).flat_map(|design| {
        let panel = floor.panel(design.panel);
        let picked = Side::ALL.into_iter().filter(move |side| picks(design, *side));
        picked.map(move |side| format!("{} {}", panel.mark, panel.side_word(side)))
    });
    edges.collect::<Vec<_>>().join(", ")
}

fn shared_with_none(floor: &Floor, id: PanelId, side: Side) -> bool {
    floor
        .panel(id)
        .edge(side)
        .segments
        .iter()
        .filter_map(|s| s.support)
        .all(|s| floor.support(s).far.is_none())
}
