//! One-way strips: which coefficients each one-way panel takes.

use super::basis::Settled;
use super::fixed::one_way_walls;
use crate::bs8110::loads;
use crate::bs8110::one_way::{
    GREATEST_IMPOSED_KN_M2, GREATEST_IMPOSED_TO_DEAD, GREATEST_VARIATION, LEAST_BAY_M2, OneWayCoefficients,
    SIMPLY_SUPPORTED, table_3_12,
};
use crate::bs8110::strip::{StripSpan, analyse};
use crate::criteria::Criteria;
use crate::floor::{Axis, EdgeState, Floor, PanelId, Side};
use crate::result::{Action, LoadBuildUp};

/// Support moment and shear at an end of a strip as multiples of n l2 and n l.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct EndCoefficients {
    pub(crate) moment: f64,
    pub(crate) shear: f64,
    /// How far hogging reaches into the span, as a share of it.
    pub(crate) reach: f64,
}

/// A one-way panel's place in its strip.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct StripPlace {
    pub(crate) coefficients: OneWayCoefficients,
    /// The same at a strip's end that carries hogging only over a part or from a cantilever, from the case with that
    /// end built in; lesser coordinate first.
    pub(crate) made_continuous: [Option<EndCoefficients>; 2],
    /// True where the values come from analysis and not from a table.
    pub(crate) analysed: bool,
}

/// What lies beyond one end of a one-way panel in its direction of span.
#[derive(Debug, Clone)]
enum Beyond {
    Simple,
    /// Simple in its own case, but hogging is carried over a part of the edge or from a cantilever.
    InPart,
    /// Stated continuous with nothing known beyond: continuous with its support.
    Stated,
    /// Two-way panels: built in, released later.
    TwoWay,
    Panel(PanelId),
    Unfit(String),
}

fn axis_of_one_way(settled: &Settled) -> Option<Axis> {
    settled.as_ref().ok().filter(|b| b.action == Action::OneWay).map(|b| b.axis_of(b.main_span))
}

fn beyond(floor: &Floor, settled: &[Settled], id: PanelId, side: Side) -> Beyond {
    let panel = floor.panel(id);
    let edge = panel.edge(side);
    let Ok(basis) = &settled[id.0] else { return Beyond::Simple };
    if basis.state(side) != EdgeState::Continuous {
        let carries = edge.segments.iter().any(|segment| segment.continuous);
        return if carries { Beyond::InPart } else { Beyond::Simple };
    }
    let shared = |s: &crate::floor::Segment| s.support.is_some_and(|s| floor.support(s).far.is_some());
    let neighbours: Vec<PanelId> =
        edge.segments.iter().filter(|s| shared(s)).filter_map(|s| s.neighbour).collect();
    let Some(first) = neighbours.first() else { return Beyond::Stated };
    let along = |id: &PanelId| axis_of_one_way(&settled[id.0]) == Some(side.span_axis());
    if !neighbours.iter().any(along) {
        return Beyond::TwoWay;
    }
    let whole = edge.segments.len() == 1 && floor.panel(*first).edge(side.opposite()).segments.len() == 1;
    if whole {
        return Beyond::Panel(*first);
    }
    let marks: Vec<&str> = neighbours.iter().map(|id| floor.panel(*id).mark.as_str()).collect();
    Beyond::Unfit(format!(
        "its {} edge and that of {} do not match: a strip must run through panels of one width",
        panel.side_word(side),
        marks.join(", ")
    ))
}

/// Coefficients of every one-way panel; for the others none. A strip that cannot be designed gives its reason.
pub(crate) fn coefficients(
    floor: &Floor,
    settled: &[Settled],
    criteria: &Criteria,
) -> Vec<Option<Result<StripPlace, String>>> {
    let mut places: Vec<Option<Result<StripPlace, String>>> = vec![None; floor.panels.len()];
    for start in (0..floor.panels.len()).map(PanelId) {
        let Some(axis) = axis_of_one_way(&settled[start.0]) else { continue };
        if places[start.0].is_none() {
            let (panels, ends) = walk(floor, settled, start, axis);
            let strip = Strip::new(floor, settled, criteria, panels, ends);
            for (id, place) in strip.panels.iter().zip(strip.places()) {
                places[id.0] = Some(place);
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

/// A strip with what its analysis needs.
struct Strip<'a> {
    floor: &'a Floor,
    panels: Vec<PanelId>,
    ends: [Beyond; 2],
    builds: Vec<LoadBuildUp>,
    spans: Vec<StripSpan>,
}

impl<'a> Strip<'a> {
    fn new(
        floor: &'a Floor,
        settled: &[Settled],
        criteria: &Criteria,
        panels: Vec<PanelId>,
        ends: [Beyond; 2],
    ) -> Strip<'a> {
        let build = |id: &PanelId| {
            let panel = floor.panel(*id);
            loads::build_up(panel.thickness_mm, &panel.loads, criteria)
        };
        let builds: Vec<LoadBuildUp> = panels.iter().map(build).collect();
        let span = |(id, build): (&PanelId, &LoadBuildUp)| {
            let panel = floor.panel(*id);
            let walls = settled[id.0].as_ref().map_or(0.0, |basis| one_way_walls(panel, basis));
            StripSpan {
                l_m: settled[id.0].as_ref().map_or(1.0, |b| b.length_m(b.main_span)),
                h_mm: panel.thickness_mm,
                ultimate_kn_m2: build.ultimate_kn_m2 + criteria.dead_load_factor * walls,
                least_kn_m2: build.dead_kn_m2 + walls,
            }
        };
        let spans = panels.iter().zip(&builds).map(span).collect();
        Strip { floor, panels, ends, builds, spans }
    }

    fn places(&self) -> Vec<Result<StripPlace, String>> {
        let unfit = self.ends.iter().find_map(|end| match end {
            Beyond::Unfit(why) => Some(why),
            _ => None,
        });
        if let Some(why) = unfit {
            return vec![Err(format!("one-way: {why}")); self.panels.len()];
        }
        let built_in = [0, 1].map(|end| matches!(self.ends[end], Beyond::Stated | Beyond::TwoWay));
        let table = self.in_table_3_12().then(|| {
            let stated = [0, 1].map(|end| matches!(self.ends[end], Beyond::Stated));
            (0..self.panels.len()).map(|i| table_3_12(i, self.panels.len(), stated)).collect::<Vec<_>>()
        });
        let analysed = table.is_none();
        let coefficients = table.unwrap_or_else(|| self.envelope(built_in));
        let made = [0, 1].map(|end| {
            matches!(self.ends[end], Beyond::InPart).then(|| {
                let mut built_in = built_in;
                built_in[end] = true;
                let all = self.analysis(built_in);
                let own = if end == 0 { all[0] } else { all[all.len() - 1] };
                EndCoefficients {
                    moment: own.ends[end],
                    shear: own.shears[end],
                    reach: own.hogging_reach[end],
                }
            })
        });
        let last = self.panels.len() - 1;
        let place = |(i, coefficients)| {
            Ok(StripPlace {
                coefficients,
                made_continuous: [made[0].filter(|_| i == 0), made[1].filter(|_| i == last)],
                analysed,
            })
        };
        coefficients.into_iter().enumerate().map(place).collect()
    }

    /// Coefficients with the ends that meet two-way panels built in. Their release turns these ends: the interior
    /// supports take the greater of the ends built in and the ends simple.
    fn envelope(&self, built_in: [bool; 2]) -> Vec<OneWayCoefficients> {
        let mut coefficients = self.analysis(built_in);
        let turning = [0, 1].map(|end| matches!(self.ends[end], Beyond::TwoWay));
        let last = self.panels.len() - 1;
        if last == 0 || turning == [false, false] {
            return coefficients;
        }
        let turned = self.analysis([0, 1].map(|end| built_in[end] && !turning[end]));
        for (i, (own, turned)) in coefficients.iter_mut().zip(turned).enumerate() {
            for end in 0..2 {
                let at_strip_end = (end == 0 && i == 0) || (end == 1 && i == last);
                if !at_strip_end {
                    own.ends[end] = own.ends[end].max(turned.ends[end]);
                    own.shears[end] = own.shears[end].max(turned.shears[end]);
                    own.hogging_reach[end] = own.hogging_reach[end].max(turned.hogging_reach[end]);
                }
            }
        }
        coefficients
    }

    /// Coefficients from elastic analysis with the reduction of 3.5.2.3.
    fn analysis(&self, built_in: [bool; 2]) -> Vec<OneWayCoefficients> {
        if self.panels.len() == 1 && built_in == [false, false] {
            return vec![SIMPLY_SUPPORTED];
        }
        let forces = analyse(&self.spans, built_in, self.single_load_case());
        self.spans
            .iter()
            .zip(forces)
            .map(|(span, forces)| {
                let unit = span.ultimate_kn_m2 * span.l_m;
                OneWayCoefficients {
                    midspan: forces.sagging_knm_m / (unit * span.l_m),
                    ends: forces.ends_knm_m.map(|m| m / (unit * span.l_m)),
                    shears: forces.shears_kn_m.map(|v| v / unit),
                    midspan_hogging: forces.midspan_hogging_knm_m / (unit * span.l_m),
                    hogging_reach: forces.hogging_reach,
                }
            })
            .collect()
    }

    /// Whether the single load case of 3.5.2.3 is enough for every panel.
    fn single_load_case(&self) -> bool {
        self.panels.iter().zip(&self.builds).all(|(id, build)| {
            self.floor.panel(*id).area_m2() > LEAST_BAY_M2
                && build.imposed_kn_m2 <= GREATEST_IMPOSED_TO_DEAD * build.dead_kn_m2 + 1e-9
                && build.imposed_kn_m2 <= GREATEST_IMPOSED_KN_M2 + 1e-9
        })
    }

    /// Whether Table 3.12 holds: three or more spans, spans and loads within 15 %, one thickness, the single load
    /// case allowed, and no two-way panel at its ends.
    fn in_table_3_12(&self) -> bool {
        let spread = |value: fn(&StripSpan) -> f64| {
            let greatest = self.spans.iter().map(value).fold(0.0, f64::max);
            let least = self.spans.iter().map(value).fold(f64::INFINITY, f64::min);
            (greatest - least) / greatest
        };
        self.panels.len() >= 3
            && spread(|span| span.l_m) <= GREATEST_VARIATION + 1e-9
            && spread(|span| span.ultimate_kn_m2) <= GREATEST_VARIATION + 1e-9
            && spread(|span| span.h_mm) <= 1e-9
            && self.single_load_case()
            && !self.ends.iter().any(|end| matches!(end, Beyond::TwoWay))
    }
}
