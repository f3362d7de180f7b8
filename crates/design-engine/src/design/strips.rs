//! One-way strips: which coefficients each one-way panel takes.

use super::basis::Settled;
use crate::bs8110::loads;
use crate::bs8110::one_way::{
    GREATEST_IMPOSED_KN_M2, GREATEST_IMPOSED_TO_DEAD, GREATEST_VARIATION, LEAST_BAY_M2, OneWayCoefficients,
    SIMPLY_SUPPORTED, table_3_12,
};
use crate::criteria::Criteria;
use crate::floor::{Axis, EdgeState, Floor, PanelId, Side};
use crate::result::Action;

/// A one-way panel's place in its strip.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct StripPlace {
    pub(crate) coefficients: OneWayCoefficients,
}

/// What lies beyond one end of a one-way panel in its direction of span.
enum Beyond {
    Simple,
    /// Stated continuous with nothing known beyond: continuous with its support.
    Stated,
    Panel(PanelId),
    Unfit(String),
}

fn axis_of_one_way(settled: &Settled) -> Option<Axis> {
    settled.as_ref().ok().filter(|b| b.action == Action::OneWay).map(|b| b.axis_of(b.main_span))
}

fn beyond(floor: &Floor, settled: &[Settled], id: PanelId, side: Side) -> Beyond {
    let panel = floor.panel(id);
    let edge = panel.edge(side);
    if edge.state != EdgeState::Continuous {
        return Beyond::Simple;
    }
    let [segment] = edge.segments.as_slice() else {
        return Beyond::Unfit(format!("its {} edge meets more than one panel", panel.side_word(side)));
    };
    let Some(neighbour) =
        segment.neighbour.filter(|_| segment.support.is_some_and(|s| floor.support(s).far.is_some()))
    else {
        return Beyond::Stated;
    };
    let other = floor.panel(neighbour);
    if axis_of_one_way(&settled[neighbour.0]) != Some(side.span_axis()) {
        return Beyond::Unfit(format!(
            "it is continuous with {}, which does not span the same one way; such strips are not designed yet",
            other.mark
        ));
    }
    if other.edge(side.opposite()).segments.len() != 1 {
        return Beyond::Unfit(format!("{} meets more than one panel on one edge", other.mark));
    }
    Beyond::Panel(neighbour)
}

/// Coefficients of every one-way panel; for the others none. A strip outside Table 3.12 gives its reason.
pub(crate) fn coefficients(
    floor: &Floor,
    settled: &[Settled],
    criteria: &Criteria,
) -> Vec<Option<Result<StripPlace, String>>> {
    let mut places: Vec<Option<Result<StripPlace, String>>> = vec![None; floor.panels.len()];
    for start in (0..floor.panels.len()).map(PanelId) {
        let Some(axis) = axis_of_one_way(&settled[start.0]) else { continue };
        if places[start.0].is_none() {
            let (strip, ends) = walk(floor, settled, start, axis);
            for (index, id) in strip.iter().enumerate() {
                places[id.0] = Some(place(floor, settled, criteria, &strip, &ends, index));
            }
        }
    }
    places
}

/// The strip through a panel, lesser coordinate first, and what ends it.
fn walk(floor: &Floor, settled: &[Settled], start: PanelId, axis: Axis) -> (Vec<PanelId>, [Beyond; 2]) {
    let [low, high] = axis.end_sides();
    let mut strip = vec![start];
    let end = |side: Side, strip: &mut Vec<PanelId>| loop {
        let last = strip[strip.len() - 1];
        match beyond(floor, settled, last, side) {
            Beyond::Panel(next) => strip.push(next),
            other => return other,
        }
    };
    let first_end = end(low, &mut strip);
    strip.reverse();
    let last_end = end(high, &mut strip);
    (strip, [first_end, last_end])
}

fn place(
    floor: &Floor,
    settled: &[Settled],
    criteria: &Criteria,
    strip: &[PanelId],
    ends: &[Beyond; 2],
    index: usize,
) -> Result<StripPlace, String> {
    for end in ends {
        if let Beyond::Unfit(why) = end {
            return Err(format!("one-way: {why}"));
        }
    }
    let continuous = [&ends[0], &ends[1]].map(|end| matches!(end, Beyond::Stated));
    if strip.len() == 1 && continuous == [false, false] {
        return Ok(StripPlace { coefficients: SIMPLY_SUPPORTED });
    }
    outside_table_3_12(floor, settled, criteria, strip).map_or_else(
        || Ok(StripPlace { coefficients: table_3_12(index, strip.len(), continuous) }),
        |why| Err(format!("a one-way strip outside Table 3.12 ({why}); other strips are not designed yet")),
    )
}

/// Why Table 3.12 does not hold for a strip; none where it does.
fn outside_table_3_12(
    floor: &Floor,
    settled: &[Settled],
    criteria: &Criteria,
    strip: &[PanelId],
) -> Option<String> {
    if strip.len() < 3 {
        return Some(format!("{} span(s) of at least three", strip.len()));
    }
    let spread = |values: &[f64]| {
        let greatest = values.iter().copied().fold(0.0, f64::max);
        let least = values.iter().copied().fold(f64::INFINITY, f64::min);
        (greatest - least) / greatest
    };
    let basis = |id: &PanelId| settled[id.0].as_ref().ok();
    let spans: Vec<f64> = strip.iter().filter_map(|id| basis(id).map(|b| b.length_m(b.main_span))).collect();
    let builds: Vec<_> = strip
        .iter()
        .map(|id| floor.panel(*id))
        .map(|panel| loads::build_up(panel.thickness_mm, &panel.loads, criteria))
        .collect();
    if spread(&spans) > GREATEST_VARIATION + 1e-9 {
        return Some("spans differ by more than 15 %".to_owned());
    }
    if spread(&builds.iter().map(|b| b.ultimate_kn_m2).collect::<Vec<_>>()) > GREATEST_VARIATION + 1e-9 {
        return Some("loads differ by more than 15 %".to_owned());
    }
    let thickness = |id: &PanelId| floor.panel(*id).thickness_mm;
    if strip.iter().any(|id| (thickness(id) - thickness(&strip[0])).abs() > 1e-9) {
        return Some("thicknesses differ".to_owned());
    }
    let failing =
        |what: &str, bad: Option<usize>| bad.map(|i| format!("{}: {what}", floor.panel(strip[i]).mark));
    let area = |id: &PanelId| floor.panel(*id).area_m2();
    failing("bay not over 30 m2", strip.iter().position(|id| area(id) <= LEAST_BAY_M2))
        .or_else(|| {
            let heavy = |b: &crate::result::LoadBuildUp| {
                b.imposed_kn_m2 > GREATEST_IMPOSED_TO_DEAD * b.dead_kn_m2 + 1e-9
            };
            failing("Qk/Gk over 1.25", builds.iter().position(heavy))
        })
        .or_else(|| {
            let over = builds.iter().position(|b| b.imposed_kn_m2 > GREATEST_IMPOSED_KN_M2 + 1e-9);
            failing("imposed load over 5 kN/m2", over)
        })
}
