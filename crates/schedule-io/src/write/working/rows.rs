//! The rows of the working: every section designed, with what its formulas need.

use std::collections::BTreeMap;

use design_engine::bs8110::coefficients::{restrained, simply_supported};
use design_engine::bs8110::tables::PRINTED_RATIOS;
use design_engine::check::{CheckKind, Place};
use design_engine::criteria::Coefficients;
use design_engine::floor::{EdgeState, Layer, PanelId, Side, Span, SupportId, SupportKind};
use design_engine::result::{Action, PanelDesign, Section};

use crate::write::Submission;

/// The two cells of a table that a coefficient lies between, or one value with its source.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Coefficient {
    /// Printed ratios and values on both sides.
    Between { ratios: [f64; 2], values: [f64; 2] },
    /// From equations, an analysis, or a table without ratios.
    Value(f64),
    /// Distribution and crossing bars.
    None,
}

/// A row: a section of a panel.
pub(super) struct WorkingRow<'a> {
    pub(super) design: &'a PanelDesign,
    pub(super) section: &'a Section,
    pub(super) coefficient: Coefficient,
    pub(super) source: &'static str,
    /// Equivalent load of walls in the direction of the section, kN/m2, or root moment of walls on a cantilever, kNm/m.
    pub(super) wall: f64,
    /// Row of the other panel's section at the same support.
    pub(super) other: Option<usize>,
    /// For midspans: rows of the supports at the two ends, and whether the table counts them as continuous.
    pub(super) ends: [(Vec<usize>, bool); 2],
    /// True where the final moment is balanced by the formulas of the row.
    pub(super) balances: bool,
    /// Thickness that the depth is measured in, and the one for minimum steel, mm.
    pub(super) base_mm: f64,
    pub(super) greatest_h_mm: f64,
    /// Size of the bars outside, mm.
    pub(super) outside_mm: f64,
    pub(super) k_limit: f64,
    pub(super) beta_b: f64,
    /// Steel asked for beside bending and minimum, mm2/m.
    pub(super) asked_mm2_m: f64,
    /// Shear at the support over n times the span it is a multiple of, kN/m over kN/m.
    pub(super) shear_coefficient: Option<f64>,
    /// Basic span/depth, on the section that deflection is checked at.
    pub(super) basic: Option<f64>,
}

impl WorkingRow<'_> {
    pub(super) fn is_support(&self) -> bool {
        self.section.support.is_some()
    }

    /// The span along the section's bars, m.
    pub(super) fn span_m(&self) -> f64 {
        self.design.basis.map_or(0.0, |basis| basis.length_m(basis.span_along(self.section.bars_along)))
    }

    pub(super) fn two_way(&self) -> bool {
        let two_way = [Action::TwoWayRestrained, Action::TwoWaySimplySupported];
        self.design.basis.is_some_and(|basis| two_way.contains(&basis.action))
    }

    pub(super) fn action(&self) -> Option<Action> {
        self.design.basis.map(|basis| basis.action)
    }
}

/// Every section of every designed panel, in the order of panels.
pub(super) fn rows<'a>(submission: &'a Submission<'a>) -> Vec<WorkingRow<'a>> {
    let mut index: BTreeMap<(PanelId, Option<SupportId>, usize), usize> = BTreeMap::new();
    let mut sections: Vec<(&PanelDesign, usize)> = Vec::new();
    for design in submission.design.panels.iter().filter(|design| design.not_designed.is_none()) {
        for (at, section) in design.sections.iter().enumerate() {
            index.insert(
                (design.panel, section.support, if section.support.is_some() { 0 } else { at }),
                sections.len(),
            );
            sections.push((design, at));
        }
    }
    let support_row = |panel: PanelId, support: SupportId| index.get(&(panel, Some(support), 0)).copied();
    sections.iter().map(|(design, at)| row(submission, design, *at, &support_row)).collect()
}

fn row<'a>(
    submission: &'a Submission<'a>,
    design: &'a PanelDesign,
    at: usize,
    support_row: &dyn Fn(PanelId, SupportId) -> Option<usize>,
) -> WorkingRow<'a> {
    let section = &design.sections[at];
    let floor = submission.floor;
    let support = section.support.map(|id| floor.support(id));
    let other_side = support.and_then(|support| support.sides().find(|side| side.panel != design.panel));
    let other_design = other_side.map(|side| &submission.design.panels[side.panel.0]);
    let actions =
        || [Some(design), other_design].into_iter().flatten().filter_map(|d| d.basis).map(|b| b.action);
    let top = matches!(section.layer, Layer::T1 | Layer::T2);
    let designed = section.support.and_then(|id| submission.design.support(id));
    let (base_mm, greatest_h_mm) = depths(submission, design, section);
    let (coefficient, source) = coefficient(submission, design, section);
    let one_way_pair = actions().filter(|a| *a == Action::OneWay).count() == 2;
    let cantilever = actions().any(|a| a == Action::Cantilever);
    let other = section.support.zip(other_side).and_then(|(id, side)| support_row(side.panel, id));
    let hogging = support.is_some_and(|support| support.kind == SupportKind::Hogging);
    let k_limit =
        if section.support.is_some() && actions().any(|a| a == Action::OneWay) { 0.132 } else { 0.156 };
    let beta_b = match (section.support.is_some(), k_limit < 0.15) {
        (false, _) => 1.0,
        (true, true) => 0.80,
        (true, false) if actions().all(|a| a == Action::Cantilever) => 1.0,
        (true, false) => 0.85,
    };
    WorkingRow {
        design,
        section,
        coefficient,
        source,
        wall: wall(submission, design, section),
        other,
        ends: ends(submission, design, section, support_row),
        balances: hogging && other.is_some() && !one_way_pair && !cantilever,
        base_mm,
        greatest_h_mm,
        outside_mm: if top {
            designed.map_or_else(
                || base_mm - submission.book.criteria.top_cover_mm - section.bars.bar_mm / 2.0 - section.d_mm,
                |s| s.outside_mm,
            )
        } else {
            base_mm - submission.book.criteria.bottom_cover_mm - section.bars.bar_mm / 2.0 - section.d_mm
        },
        k_limit,
        beta_b,
        asked_mm2_m: if section.moment_knm_m.is_none() {
            section.as_required_mm2_m.unwrap_or(0.0)
        } else {
            0.0
        },
        shear_coefficient: shear_coefficient(submission, design, section, hogging),
        basic: basic(design, section),
    }
}

/// Thickness that the depth of a section is measured in (the lesser from the lower top down), and the greater thickness.
fn depths(submission: &Submission<'_>, design: &PanelDesign, section: &Section) -> (f64, f64) {
    let floor = submission.floor;
    let own = floor.panel(design.panel);
    let Some(id) = section.support else { return (own.thickness_mm, own.thickness_mm) };
    let panels: Vec<_> = floor
        .support(id)
        .sides()
        .filter(|side| {
            submission.design.panels[side.panel.0].basis.is_some()
                && submission.design.panels[side.panel.0].not_designed.is_none()
        })
        .map(|side| floor.panel(side.panel))
        .collect();
    let lower = panels.iter().map(|panel| panel.top_level_mm).fold(f64::INFINITY, f64::min);
    let base = panels
        .iter()
        .map(|panel| lower - (panel.top_level_mm - panel.thickness_mm))
        .fold(f64::INFINITY, f64::min);
    (base, panels.iter().map(|panel| panel.thickness_mm).fold(0.0, f64::max))
}

fn coefficient(
    submission: &Submission<'_>,
    design: &PanelDesign,
    section: &Section,
) -> (Coefficient, &'static str) {
    let (Some(value), Some(basis)) = (section.coefficient, design.basis) else {
        return (Coefficient::None, "minimum steel");
    };
    match basis.action {
        Action::Cantilever => return (Coefficient::Value(value), "n l2/2"),
        Action::OneWay => return (Coefficient::Value(value), "from analysis or Table 3.12"),
        Action::TwoWayRestrained | Action::TwoWaySimplySupported => {}
    }
    if submission.book.criteria.coefficients == Coefficients::Equations {
        return (Coefficient::Value(value), "equations 12 to 18");
    }
    let long_edge = match section.at {
        Place::Side(side) => side.span_axis() == basis.short_along,
        at => at == Place::ShortMidspan,
    };
    let table = |ratio: f64| -> Option<f64> {
        let case = basis.case?;
        let moments = if basis.action == Action::TwoWaySimplySupported {
            simply_supported(ratio, Coefficients::Tabulated)
        } else {
            restrained(own_case(design, section, case), ratio, Coefficients::Tabulated)
        };
        match (section.support.is_some(), long_edge) {
            (false, true) => Some(moments.short_midspan),
            (false, false) => Some(moments.long_midspan),
            (true, true) => moments.long_edge,
            (true, false) => moments.short_edge,
        }
    };
    let ratio = basis.span_ratio().clamp(1.0, 2.0);
    let upper = PRINTED_RATIOS.iter().position(|printed| ratio <= *printed).unwrap_or(7).max(1);
    let ratios = [PRINTED_RATIOS[upper - 1], PRINTED_RATIOS[upper]];
    let source = if basis.action == Action::TwoWaySimplySupported { "Table 3.13" } else { "Table 3.14" };
    match (table(ratios[0]), table(ratios[1])) {
        (Some(a), Some(b)) => {
            let between = a + (b - a) * (ratio - ratios[0]) / (ratios[1] - ratios[0]);
            if (between - value).abs() <= 1e-12 {
                (Coefficient::Between { ratios, values: [a, b] }, source)
            } else {
                (Coefficient::Value(value), "from analysis")
            }
        }
        _ => (Coefficient::Value(value), "from analysis"),
    }
}

/// The case that a section's coefficient comes from: an edge that carries hogging in part has its own.
fn own_case(
    design: &PanelDesign,
    section: &Section,
    case: design_engine::bs8110::coefficients::PanelCase,
) -> design_engine::bs8110::coefficients::PanelCase {
    let (Place::Side(side), Some(basis)) = (section.at, design.basis) else { return case };
    if basis.state(side) == EdgeState::Continuous {
        return case;
    }
    let long = side.span_axis() == basis.short_along;
    design_engine::bs8110::coefficients::PanelCase::new(
        case.long_discontinuous.saturating_sub(u8::from(long)),
        case.short_discontinuous.saturating_sub(u8::from(!long)),
    )
}

fn wall(submission: &Submission<'_>, design: &PanelDesign, section: &Section) -> f64 {
    let (Some(basis), Some(table), Some(beta)) =
        (design.basis, section.moment_from_coefficient_knm_m, section.coefficient)
    else {
        return 0.0;
    };
    if submission.floor.panel(design.panel).line_loads.is_empty() || beta <= 0.0 {
        return 0.0;
    }
    let n = design.loads.ultimate_kn_m2;
    let l = basis.length_m(basis.main_span);
    match basis.action {
        Action::Cantilever => table - beta * n * l * l,
        Action::OneWay => (table / (beta * l * l) - n) / submission.book.criteria.dead_load_factor,
        _ => (table / (beta * basis.lx_m * basis.lx_m) - n) / submission.book.criteria.dead_load_factor,
    }
}

/// Rows of the supports at the ends of a midspan's span, lesser coordinate first.
fn ends(
    submission: &Submission<'_>,
    design: &PanelDesign,
    section: &Section,
    support_row: &dyn Fn(PanelId, SupportId) -> Option<usize>,
) -> [(Vec<usize>, bool); 2] {
    let Some(basis) = design.basis.filter(|_| section.support.is_none()) else {
        return [(Vec::new(), false), (Vec::new(), false)];
    };
    section.bars_along.end_sides().map(|side: Side| {
        let counted = basis.state(side) == EdgeState::Continuous;
        let edge = submission.floor.panel(design.panel).edge(side);
        let carried = edge.segments.iter().filter(|segment| segment.continuous);
        (carried.filter_map(|segment| support_row(design.panel, segment.support?)).collect(), counted)
    })
}

fn shear_coefficient(
    submission: &Submission<'_>,
    design: &PanelDesign,
    section: &Section,
    hogging: bool,
) -> Option<f64> {
    let (Place::Side(side), Some(basis), true) = (section.at, design.basis, hogging) else { return None };
    if submission.floor.panel(design.panel).edge(side).state != EdgeState::Continuous {
        return None;
    }
    let nth = design
        .sections
        .iter()
        .take_while(|s| !std::ptr::eq(*s, section))
        .filter(|s| s.at == section.at && s.support.is_some())
        .count();
    let check = design
        .checks
        .iter()
        .filter(|check| check.kind == CheckKind::Shear && check.at == section.at)
        .nth(nth)?;
    let v_kn_m = check.demand * section.d_mm;
    let l = if matches!(basis.action, Action::OneWay | Action::Cantilever) {
        basis.length_m(basis.main_span)
    } else {
        basis.lx_m
    };
    Some(v_kn_m / (design.loads.ultimate_kn_m2 * l))
}

fn basic(design: &PanelDesign, section: &Section) -> Option<f64> {
    let basis = design.basis?;
    let main = match (basis.action, section.at) {
        (Action::Cantilever, Place::Side(_)) => true,
        (Action::Cantilever, _) => false,
        (_, Place::ShortMidspan) => basis.main_span == Span::Short,
        (_, Place::LongMidspan) => basis.main_span == Span::Long,
        _ => false,
    };
    let bottom = matches!(section.layer, Layer::B1 | Layer::B2) || basis.action == Action::Cantilever;
    (main && bottom).then(|| design.deflection.map(|working| working.basic)).flatten()
}
