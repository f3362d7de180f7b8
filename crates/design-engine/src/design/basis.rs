//! Effective spans, short direction, action and case of every panel.

use super::openings::greatest_share_taken;
use crate::bs8110::coefficients::PanelCase;
use crate::criteria::{Criteria, SpanBasis};
use crate::floor::{Axis, Corners, EdgeState, Floor, Panel, PanelId, Side, Span, Spanning};
use crate::query::{Query, Severity};
use crate::result::{Action, Basis};

/// ly/lx above which a panel spans one way (common practice; the two-way tables end at 2).
pub const GREATEST_TWO_WAY_RATIO: f64 = 2.0;

/// An opening over this share of a span leaves no panel to design by coefficients (decision).
const GREATEST_OPENING_SHARE: f64 = 0.5;

/// What is settled for a panel, or why it is not designed.
pub(crate) type Settled = Result<Basis, String>;

/// Effective spans along x and y, m (3.4.1.2, 3.4.1.3).
fn effective_spans(panel: &Panel, criteria: &Criteria) -> [f64; 2] {
    if criteria.span_basis == SpanBasis::CentreToCentre {
        return panel.spans_m;
    }
    let smallest_bar = criteria.bar_sizes_mm.first().copied().unwrap_or(0.0);
    let d = (panel.thickness_mm - criteria.bottom_cover_mm - smallest_bar / 2.0).max(0.0);
    let reduced = [Axis::X, Axis::Y].map(|axis| {
        let span = panel.span_m(axis);
        let ends = axis.end_sides().map(|side| panel.edge(side));
        if ends.iter().any(|edge| edge.state != EdgeState::Discontinuous) {
            return span;
        }
        let bearings = ends.iter().map(|edge| edge.support_width_mm / 2.0).sum::<f64>();
        // Supports that meet leave no clear span to measure.
        if bearings < 1000.0 * span { span.min(span + (d - bearings) / 1000.0) } else { span }
    });
    // The reduction is a permission: it is not taken where it would carry a panel past the two-way tables.
    let centre_ratio = long_over_short(panel.spans_m);
    if centre_ratio <= GREATEST_TWO_WAY_RATIO + 1e-9 && long_over_short(reduced) > GREATEST_TWO_WAY_RATIO {
        panel.spans_m
    } else {
        reduced
    }
}

fn long_over_short(spans: [f64; 2]) -> f64 {
    spans[0].max(spans[1]) / spans[0].min(spans[1])
}

/// The axis between the only two supported edges, where the other two are free.
fn carries_between_opposite_edges(panel: &Panel) -> Option<Axis> {
    [Axis::X, Axis::Y].into_iter().find(|axis| {
        let free = |axis: Axis| axis.end_sides().map(|side| panel.edge(side).state == EdgeState::Free);
        free(axis.across()) == [true, true] && free(*axis) == [false, false]
    })
}

/// The axis a one-way panel carries along; none for a two-way panel.
fn one_way_axis(panel: &Panel) -> Result<Option<Axis>, String> {
    let ratio = long_over_short(panel.spans_m);
    let short = if panel.spans_m[0] <= panel.spans_m[1] { Axis::X } else { Axis::Y };
    let axis = match panel.spanning {
        Spanning::Cantilever => return Ok(None),
        Spanning::OneWay(axis) => Some(axis),
        Spanning::TwoWay if ratio > GREATEST_TWO_WAY_RATIO + 1e-9 => {
            return Err(format!(
                "stated two-way with ly/lx = {ratio:.2}: the two-way tables end at 2; leave Spanning blank"
            ));
        }
        Spanning::TwoWay => None,
        Spanning::Found => {
            carries_between_opposite_edges(panel).or((ratio > GREATEST_TWO_WAY_RATIO + 1e-9).then_some(short))
        }
    };
    let state = |side: Side| panel.edge(side).state;
    let name = |side: Side| panel.side_word(side);
    match axis {
        Some(axis) => match axis.end_sides().into_iter().find(|side| state(*side) == EdgeState::Free) {
            Some(side) => Err(format!("one-way towards its {} edge, which has no support", name(side))),
            None => Ok(Some(axis)),
        },
        None => match Side::ALL.into_iter().find(|side| state(*side) == EdgeState::Free) {
            Some(side) => {
                Err(format!("two-way with a free {} edge: outside the coefficient tables", name(side)))
            }
            None => Ok(None),
        },
    }
}

/// Number of edges at the ends of the span along an axis that do not count as continuous.
fn discontinuous_ends(states: &[EdgeState; 4], axis: Axis) -> u8 {
    axis.end_sides().into_iter().map(|side| u8::from(states[side.index()] != EdgeState::Continuous)).sum()
}

/// Edge states as they count in the panel's own case: a segment against a cantilever is no restraint of the
/// panel (its moment does not depend on the panel's load), so such an edge is not wholly continuous.
fn own_states(floor: &Floor, panel: &Panel) -> [EdgeState; 4] {
    Side::ALL.map(|side| {
        let edge = panel.edge(side);
        let cantilever = |neighbour: Option<PanelId>| {
            neighbour.is_some_and(|id| floor.panel(id).spanning == Spanning::Cantilever)
        };
        let loaded = edge.segments.iter().filter(|s| s.continuous && cantilever(s.neighbour)).count();
        let continuous = edge.segments.iter().filter(|s| s.continuous).count();
        match edge.state {
            EdgeState::Continuous if loaded == 0 || panel.spanning == Spanning::Cantilever => {
                EdgeState::Continuous
            }
            EdgeState::Continuous | EdgeState::PartlyContinuous if loaded == continuous => {
                EdgeState::Discontinuous
            }
            EdgeState::Continuous => EdgeState::PartlyContinuous,
            state => state,
        }
    })
}

/// Sum of the neighbours' spans across the ends of the span along an axis, each by its share of the edge.
fn neighbour_spans(floor: &Floor, panel: &Panel, axis: Axis) -> f64 {
    let across = panel.span_m(axis.across());
    let segments = axis.end_sides().into_iter().flat_map(|side| &panel.edge(side).segments);
    segments
        .filter(|segment| segment.continuous)
        .filter_map(|segment| Some((segment, floor.panel(segment.neighbour?))))
        .map(|(segment, neighbour)| neighbour.span_m(axis) * (segment.to - segment.from).m() / across)
        .sum()
}

/// Axis of the short span; of a square panel by the rules that keep a turned floor the same floor. The flag
/// is true where only the last of them, x, could tell.
fn short_axis(
    floor: &Floor,
    panel: &Panel,
    states: &[EdgeState; 4],
    spans: [f64; 2],
    most: Option<Axis>,
    tol: f64,
) -> (Axis, bool) {
    if (spans[0] - spans[1]).abs() > tol + 1e-9 {
        return (if spans[0] < spans[1] { Axis::X } else { Axis::Y }, false);
    }
    if panel.is_loose() {
        return (Axis::X, false);
    }
    let by_ends = discontinuous_ends(states, Axis::X).cmp(&discontinuous_ends(states, Axis::Y));
    let (x, y) = (neighbour_spans(floor, panel, Axis::X), neighbour_spans(floor, panel, Axis::Y));
    let by_neighbours = if (x - y).abs() <= 1e-9 { std::cmp::Ordering::Equal } else { x.total_cmp(&y) };
    match by_ends.then(by_neighbours) {
        std::cmp::Ordering::Greater => (Axis::X, false),
        std::cmp::Ordering::Less => (Axis::Y, false),
        std::cmp::Ordering::Equal => (most.unwrap_or(Axis::X), most.is_none()),
    }
}

/// The direction of most short spans on the floor, square and loose panels left out; none on a tie.
pub(crate) fn direction_of_most_short_spans(floor: &Floor, tolerance_m: f64) -> Option<Axis> {
    let mut counts = [0_usize; 2];
    for panel in floor.panels.iter().filter(|panel| !panel.is_loose()) {
        let [x, y] = panel.spans_m;
        if (x - y).abs() > tolerance_m + 1e-9 {
            counts[usize::from(y < x)] += 1;
        }
    }
    match counts[0].cmp(&counts[1]) {
        std::cmp::Ordering::Greater => Some(Axis::X),
        std::cmp::Ordering::Less => Some(Axis::Y),
        std::cmp::Ordering::Equal => None,
    }
}

/// Settles every panel; queries are those of this step.
pub(crate) fn settle(floor: &Floor, criteria: &Criteria) -> (Vec<Settled>, Vec<Query>) {
    let tolerance_m = criteria.plan_tolerance_mm / 1000.0;
    let most = direction_of_most_short_spans(floor, tolerance_m);
    let mut queries = Vec::new();
    let settled = floor
        .panels
        .iter()
        .map(|panel| {
            if let Some(why) = &panel.not_designed {
                return Err(why.clone());
            }
            let basis = settle_panel(floor, panel, criteria, most, tolerance_m, &mut queries);
            if let Err(why) = &basis {
                queries.push(Query::panel(
                    Severity::NotDesigned,
                    &panel.mark,
                    None,
                    why.clone(),
                    "design this panel by other means",
                ));
            }
            basis
        })
        .collect();
    (settled, queries)
}

fn settle_panel(
    floor: &Floor,
    panel: &Panel,
    criteria: &Criteria,
    most: Option<Axis>,
    tolerance_m: f64,
    queries: &mut Vec<Query>,
) -> Settled {
    let spans = effective_spans(panel, criteria);
    let states = own_states(floor, panel);
    let (short_along, by_x) = short_axis(floor, panel, &states, spans, most, tolerance_m);
    let (lx_m, ly_m) = (spans[0].min(spans[1]), spans[0].max(spans[1]));
    // The short span of a square panel that carries one way is the one that carries.
    let square = (spans[0] - spans[1]).abs() <= tolerance_m + 1e-9 && !panel.is_loose();
    let short_if_carrying = |axis: Axis| if square { axis } else { short_along };
    if greatest_share_taken(panel) > GREATEST_OPENING_SHARE + 1e-9 {
        let takes = if panel.openings.len() == 1 { "an opening takes" } else { "openings take" };
        return Err(format!("{takes} more than half of a span: what is left is not a slab on four sides"));
    }
    if panel.spanning == Spanning::Cantilever {
        let Some(root) = Side::ALL.into_iter().find(|side| states[side.index()] == EdgeState::Continuous)
        else {
            return Err("a cantilever with no edge to stand out from".to_owned());
        };
        if panel.line_loads.iter().any(|wall| wall.along == root.span_axis()) {
            return Err("a cantilever with a wall along its span: not covered by a metre strip".to_owned());
        }
        let short_along = short_if_carrying(root.span_axis());
        let main_span = if root.span_axis() == short_along { Span::Short } else { Span::Long };
        return Ok(Basis {
            short_along,
            lx_m,
            ly_m,
            action: Action::Cantilever,
            main_span,
            case: None,
            states,
        });
    }
    if let Some(axis) = one_way_axis(panel)? {
        let short_along = short_if_carrying(axis);
        let main_span = if axis == short_along { Span::Short } else { Span::Long };
        return Ok(Basis { short_along, lx_m, ly_m, action: Action::OneWay, main_span, case: None, states });
    }
    if by_x {
        let text =
            "a square panel whose edges and neighbours are alike both ways: its short span is taken along x";
        queries.push(Query::panel(Severity::Note, &panel.mark, None, text, ""));
    }
    let case = PanelCase::new(
        discontinuous_ends(&states, short_along),
        discontinuous_ends(&states, short_along.across()),
    );
    let four_discontinuous = panel.edges.iter().all(|edge| edge.state == EdgeState::Discontinuous);
    let action = if panel.corners == Corners::FreeToLift && four_discontinuous {
        Action::TwoWaySimplySupported
    } else {
        Action::TwoWayRestrained
    };
    if panel.corners == Corners::FreeToLift && !four_discontinuous && panel.corners_stated {
        queries.push(Query::panel(
            Severity::Warning,
            &panel.mark,
            Some("Corners"),
            "corners free to lift is stated, but the panel is continuous at an edge: designed by Table 3.14, which needs its corners held down",
            "hold the corners down, or state all four edges discontinuous",
        ));
    }
    Ok(Basis { short_along, lx_m, ly_m, action, main_span: Span::Short, case: Some(case), states })
}
