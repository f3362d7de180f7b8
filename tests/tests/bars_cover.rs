//! Bars of random floors against what is asked at points of the slab, found by a second, short implementation; and what no
//! bar may do.

#![allow(clippy::unwrap_used, reason = "a floor that is not as it should be must fail its test")]

mod edges_support;

use design_engine::bs8110::flexure::minimum_steel;
use design_engine::check::Place;
use design_engine::criteria::{Criteria, Value};
use design_engine::floor::{Axis, EdgeState, Floor, Layer, Panel, PanelId, Side, SupportKind};
use design_engine::result::{Action, FloorDesign, PanelDesign, SupportDesign};
use detailing::detail;
use detailing::model::{BarSchedule, Use};
use detailing::reconcile::reconcile;
use edges_support::random::{choices, config, floor};
use edges_support::{Plan, plan};
use floor_grid::lay_out;
use proptest::prelude::*;

const TOP: bool = true;
const BOTTOM: bool = false;

/// A bar where it lies: axis, face, place across, extent along, area.
struct Lying {
    axis: Axis,
    top: bool,
    across: f64,
    along: [f64; 2],
    area: f64,
}

/// Every bar by its mark, number and places; not from zones.
fn lying(schedule: &BarSchedule) -> Vec<Lying> {
    let mut bars = Vec::new();
    for set in schedule.sets.iter().filter(|set| set.for_what != Use::Diagonal) {
        for run in &set.runs {
            let bar = &schedule.bars[run.bar].bar;
            let top = matches!(set.layer, Layer::T1 | Layer::T2);
            let area = std::f64::consts::PI * bar.size_mm * bar.size_mm / 4.0;
            for index in 0..run.count {
                let along = run.along_mm;
                bars.push(Lying { axis: set.axis, top, across: run.place(index), along, area });
                // The returning leg of a corner's U-bar lies in the bottom.
                if let (Use::Corner, [_, _, Some(c), ..]) = (set.for_what, bar.shape.dimensions()) {
                    let outer = if set.side == Some(Side::West) || set.side == Some(Side::South) {
                        along[0]
                    } else {
                        along[1]
                    };
                    let inner = if (outer - along[0]).abs() < 1e-6 { outer + c } else { outer - c };
                    let along = [outer.min(inner), outer.max(inner)];
                    bars.push(Lying { axis: set.axis, top: BOTTOM, across: run.place(index), along, area });
                }
            }
        }
    }
    bars
}

/// Steel at a point, mm2/m: the mean of the nearest bars on both sides that cross there over the gap between them; bars that
/// lie side by side, as in a lap, count together.
fn there(bars: &[&Lying], across: f64, along: f64) -> f64 {
    let covering: Vec<&Lying> = bars
        .iter()
        .filter(|bar| bar.along[0] - 1.0 <= along && along <= bar.along[1] + 1.0)
        .copied()
        .collect();
    // Bars of another size among them must not count against them.
    let sizes = covering.iter().map(|bar| bar.area);
    let mut areas: Vec<f64> = sizes.collect();
    areas.sort_by(f64::total_cmp);
    areas.dedup();
    let alone = areas.into_iter().map(|area| {
        let like: Vec<&Lying> =
            covering.iter().filter(|bar| (bar.area - area).abs() < 1e-6).copied().collect();
        between(&like, across)
    });
    alone.fold(between(&covering, across), f64::max)
}

fn between(covering: &[&Lying], across: f64) -> f64 {
    let places = || covering.iter().map(|bar| bar.across);
    let below = places().filter(|at| *at <= across + 1e-6).fold(f64::NEG_INFINITY, f64::max);
    let above = places().filter(|at| *at >= across - 1e-6).fold(f64::INFINITY, f64::min);
    if !below.is_finite() || !above.is_finite() {
        return 0.0;
    }
    let area = |low: f64, high: f64| -> f64 {
        covering.iter().filter(|bar| low <= bar.across && bar.across <= high).map(|bar| bar.area).sum()
    };
    if above - below < 1e-6 {
        return f64::INFINITY;
    }
    1000.0 * f64::midpoint(area(below - 40.0, below), area(above, above + 40.0)) / (above - below)
}

struct Asker<'a> {
    floor: &'a Floor,
    design: &'a FloorDesign,
    criteria: &'a Criteria,
}

/// Extent of a panel along an axis, mm.
fn extent(panel: &Panel, axis: Axis) -> [f64; 2] {
    let plan = panel.plan.unwrap();
    let ends = if axis == Axis::X { [plan.x0, plan.x1] } else { [plan.y0, plan.y1] };
    ends.map(|end| end.m() * 1000.0)
}

/// Faces of the supports at the ends of an axis, mm; at a joint the bearing lies inside the line.
fn faces(panel: &Panel, axis: Axis) -> [f64; 2] {
    let lines = extent(panel, axis);
    [0, 1].map(|end| {
        let side = axis.end_sides()[end];
        let edge = panel.edge(side);
        let inward = if end == 0 { 1.0 } else { -1.0 };
        let joint = edge.segments.iter().any(|segment| segment.joint);
        let width = edge.support_width_mm;
        let off = match edge.state {
            EdgeState::Free => 0.0,
            _ if joint => width,
            _ => width / 2.0,
        };
        lines[end] + inward * off
    })
}

impl Asker<'_> {
    fn least(&self, panel: &Panel) -> f64 {
        minimum_steel(panel.thickness_mm, self.criteria.fy_n_mm2)
    }

    /// What the bottom asks for at a point.
    fn bottom(&self, panel: &Panel, design: &PanelDesign, axis: Axis, across: f64, along: f64) -> f64 {
        let at = [Place::ShortMidspan, Place::LongMidspan];
        let section = design
            .sections
            .iter()
            .find(|s| at.contains(&s.at) && s.bars_along == axis && matches!(s.layer, Layer::B1 | Layer::B2));
        let Some(section) = section else { return 0.0 };
        let least = self.least(panel);
        let full = section.as_required_mm2_m.unwrap_or(least);
        let [low, high] = extent(panel, axis);
        let share = |side: Side| if panel.edge(side).state == EdgeState::Continuous { 0.2 } else { 0.1 };
        let [near, far] = axis.end_sides().map(share);
        let outside = along < low + near * (high - low) || along > high - far * (high - low);
        let curtailed = self.criteria.bottom_bars == design_engine::criteria::BottomBars::AlternateCurtailed;
        let width = extent(panel, axis.across());
        let eighth = (width[1] - width[0]) / 8.0;
        let in_edge_strip = across < width[0] + eighth || across > width[1] - eighth;
        let strips = self.criteria.edge_strips == design_engine::criteria::EdgeStrips::MinimumSteel
            && design.basis.unwrap().action == Action::TwoWayRestrained;
        if strips && in_edge_strip {
            least
        } else if curtailed && outside {
            least.max(0.4 * full)
        } else {
            full
        }
    }

    /// What the top asks for at a point, for what comes in over the two sides at the ends of an axis.
    fn top(&self, id: PanelId, axis: Axis, across: f64, along: f64) -> f64 {
        let panel = self.floor.panel(id);
        let [low, high] = axis.end_sides();
        let (lines, faces) = (extent(panel, axis), faces(panel, axis));
        let from_low = self.over(id, low, across, (along - lines[0], along - faces[0]));
        from_low.max(self.over(id, high, across, (lines[1] - along, faces[1] - along)))
    }

    /// What comes in over one side, at a distance from its line and from its face, mm.
    fn over(&self, id: PanelId, side: Side, across: f64, (from_line, from_face): (f64, f64)) -> f64 {
        let (panel, design) = (self.floor.panel(id), &self.design.panels[id.0]);
        let basis = design.basis.unwrap();
        let edge = panel.edge(side);
        // Within 51 mm of the ends of a stretch its first and last bars begin.
        let inside = |segment: &&design_engine::floor::Segment| {
            segment.from.m() * 1000.0 + 51.0 <= across && across <= segment.to.m() * 1000.0 - 51.0
        };
        let Some(segment) = edge.segments.iter().find(inside) else { return 0.0 };
        let l = basis.length_m(basis.span_along(side.span_axis())) * 1000.0;
        let Some(support) = segment.support.and_then(|id| self.design.support(id)) else {
            if edge.state == EdgeState::Free
                || basis.action == Action::Cantilever
                || segment.support.is_some()
            {
                return 0.0;
            }
            let span = basis.span_along(side.span_axis());
            let Some(bottom) = design.bars.bottom[span as usize] else { return 0.0 };
            let half =
                std::f64::consts::PI * bottom.bars.bar_mm.powi(2) / 8.0 * 1000.0 / bottom.bars.spacing_mm;
            let smallest = self.criteria.bar_sizes_mm[0];
            return if from_face <= (0.15 * l).max(45.0 * smallest) {
                half.max(self.least(panel))
            } else {
                0.0
            };
        };
        // Where half of the bars go on, the one next to the end of the stretch may be one that stops.
        let clear = faces(panel, side.span_axis().across());
        let ends = [clear[0].max(segment.from.m() * 1000.0), clear[1].min(segment.to.m() * 1000.0)];
        let next_to_end = (across - ends[0]).min(ends[1] - across) < 51.0 + support.bars.spacing_mm;
        let asked = self.over_support(id, side, support, l, (from_line, from_face));
        if next_to_end && asked < 0.999 * support.as_required_mm2_m.unwrap_or(0.0) { 0.0 } else { asked }
    }

    fn over_support(
        &self,
        id: PanelId,
        side: Side,
        support: &SupportDesign,
        l: f64,
        (from_line, from_face): (f64, f64),
    ) -> f64 {
        let (panel, design) = (self.floor.panel(id), &self.design.panels[id.0]);
        let laid = self.floor.support(support.support);
        let basis = design.basis.unwrap();
        let full = support.as_required_mm2_m.unwrap_or(0.0);
        let Some(own) = support.sides.iter().find(|own| own.panel == id) else { return 0.0 };
        if basis.action == Action::Cantilever || own.runs_through {
            return full;
        }
        if laid.kind == SupportKind::Crossing {
            let lx = support
                .sides
                .iter()
                .map(|s| self.design.panels[s.panel.0].basis.unwrap().lx_m)
                .fold(f64::INFINITY, f64::min);
            return if from_face <= 300.0 * lx { self.least(panel) } else { 0.0 };
        }
        let moment = support.moment_knm_m.unwrap();
        let cantilever = laid
            .sides()
            .find(|s| self.design.panels[s.panel.0].basis.is_some_and(|b| b.action == Action::Cantilever));
        let far_moment = self.far_moment(panel, side);
        // Moment at a point over the moment at the support; steel is in proportion, safe for a falling lever arm.
        let share = |free: f64, near: f64, far: f64| {
            let at = |u: f64| (near * (1.0 - u) + far * u - 4.0 * free * u * (1.0 - u)) / near;
            let u = from_line / l;
            // Beyond the first point of contraflexure what hogs belongs to the far support.
            let beyond = (0..200).map(|i| u * f64::from(i) / 200.0).any(|before| at(before) <= 0.0);
            if beyond { 0.0 } else { at(u) }
        };
        if cantilever.is_some() {
            let root = support
                .sides
                .iter()
                .find(|s| s.panel != id)
                .and_then(|s| s.moment_from_coefficient_knm_m)
                .unwrap();
            let free = design.loads.dead_kn_m2 * l * l / 8e6;
            return (full * root / moment.max(root) * share(free, root, far_moment)).max(0.0);
        }
        let table = own.moment_from_coefficient_knm_m.unwrap_or(0.0);
        if moment > 1.1 * table * (1.0 + 1e-9) && basis.action == Action::TwoWayRestrained {
            let free = own.midspan_before_knm_m
                + f64::midpoint(self.table(design, side), self.table(design, side.opposite()));
            let far = self.counted_far(panel, design, side);
            return (full * share(free, moment, far)).max(0.0);
        }
        let greater = support.sides.iter().map(|s| {
            let b = self.design.panels[s.panel.0].basis.unwrap();
            b.length_m(b.span_along(side.span_axis())) * 1000.0
        });
        let greater = greater.fold(0.0, f64::max);
        if from_face <= (0.15 * greater).max(45.0 * support.bars.bar_mm) {
            full
        } else if from_face <= 0.3 * greater {
            full / 2.0
        } else {
            0.0
        }
    }

    /// Table moment of a panel's side as it counts in its own case.
    fn table(&self, design: &PanelDesign, side: Side) -> f64 {
        if design.basis.unwrap().state(side) != EdgeState::Continuous {
            return 0.0;
        }
        design.section(Place::Side(side)).and_then(|s| s.moment_from_coefficient_knm_m).unwrap_or(0.0)
    }

    fn counted_far(&self, panel: &Panel, design: &PanelDesign, side: Side) -> f64 {
        if design.basis.unwrap().state(side.opposite()) == EdgeState::Continuous {
            self.far_moment(panel, side)
        } else {
            0.0
        }
    }

    /// Greatest final moment over the far side.
    fn far_moment(&self, panel: &Panel, side: Side) -> f64 {
        let segments = panel.edge(side.opposite()).segments.iter().filter(|segment| segment.continuous);
        segments.filter_map(|segment| self.design.support(segment.support?)?.moment_knm_m).fold(0.0, f64::max)
    }

    /// Torsion steel asked for at a point, bottom or top.
    fn torsion(&self, panel: &Panel, design: &PanelDesign, x: f64, y: f64) -> f64 {
        let Some(basis) = design.basis.filter(|b| b.action == Action::TwoWayRestrained) else { return 0.0 };
        let bending = design
            .sections
            .iter()
            .filter(|s| s.support.is_none() && matches!(s.layer, Layer::B1 | Layer::B2));
        let greatest = bending.filter_map(|s| s.as_bending_mm2_m).fold(0.0, f64::max);
        let mut asked: f64 = 0.0;
        for (ns, ew) in [
            (Side::North, Side::East),
            (Side::North, Side::West),
            (Side::South, Side::East),
            (Side::South, Side::West),
        ] {
            let [xs, ys] = [extent(panel, Axis::X), extent(panel, Axis::Y)];
            let dx = if ew == Side::East { xs[1] - x } else { x - xs[0] };
            let dy = if ns == Side::North { ys[1] - y } else { y - ys[0] };
            if dx.max(dy) > basis.lx_m * 200.0 {
                continue;
            }
            let continuous = [(ns, ew), (ew, ns)].map(|(side, other)| {
                let segments = &panel.edge(side).segments;
                let at = if matches!(other, Side::North | Side::East) {
                    segments.last()
                } else {
                    segments.first()
                };
                let cantilever =
                    |id: PanelId| self.floor.panel(id).spanning == design_engine::floor::Spanning::Cantilever;
                at.is_some_and(|s| s.continuous && !s.neighbour.is_some_and(cantilever))
            });
            let share = [0.75, 0.375, 0.0][continuous.into_iter().filter(|c| *c).count()];
            asked = asked.max(share * greatest);
        }
        asked
    }
}

/// Whether a point is too near an opening that cuts bars for a count beside it to mean anything.
fn beside_opening(panel: &Panel, x: f64, y: f64) -> bool {
    let [x0, y0] = [Axis::X, Axis::Y].map(|axis| extent(panel, axis)[0]);
    panel.openings.iter().any(|o| {
        let (west, south) = (x0 + o.from_west_m * 1000.0, y0 + o.from_south_m * 1000.0);
        let near = |at: f64, from: f64, width: f64| at > from - 700.0 && at < from + width * 1000.0 + 700.0;
        near(x, west, o.widths_m[0]) || near(y, south, o.widths_m[1])
    })
}

/// Points where there is less steel than asked for.
fn shortfalls(
    floor: &Floor,
    design: &FloorDesign,
    schedule: &BarSchedule,
    criteria: &Criteria,
) -> Vec<String> {
    let asker = Asker { floor, design, criteria };
    let bars = lying(schedule);
    let mut short = Vec::new();
    for (index, panel) in floor.panels.iter().enumerate() {
        let of = &design.panels[index];
        // Where a check fails the steel may be less than asked: the check says so.
        if !of.ok() {
            continue;
        }
        let near = |bar: &&Lying| {
            let [a, b] = extent(panel, bar.axis.across());
            bar.across > a - 1000.0 && bar.across < b + 1000.0
        };
        let mine: Vec<&Lying> = bars.iter().filter(near).collect();
        for axis in [Axis::X, Axis::Y] {
            for top in [TOP, BOTTOM] {
                let lines: Vec<&Lying> =
                    mine.iter().filter(|bar| bar.axis == axis && bar.top == top).copied().collect();
                let clear = [faces(panel, axis), faces(panel, axis.across())];
                for across_step in 0..=20 {
                    let inner = [clear[1][0] + 51.0, clear[1][1] - 51.0];
                    let across = inner[0] + (inner[1] - inner[0]) * f64::from(across_step) / 20.0;
                    for step in 0..=24 {
                        let inner = [clear[0][0] + 26.0, clear[0][1] - 26.0];
                        let along = inner[0] + (inner[1] - inner[0]) * f64::from(step) / 24.0;
                        let (x, y) = if axis == Axis::X { (along, across) } else { (across, along) };
                        if inner[1] < inner[0] || beside_opening(panel, x, y) {
                            continue;
                        }
                        let asked = if top {
                            asker.top(PanelId(index), axis, across, along)
                        } else {
                            asker.bottom(panel, of, axis, across, along)
                        };
                        let found = there(&lines, across, along);
                        if found < 0.999 * asked {
                            short.push(format!(
                                "{} {} {} at {across:.0}, {along:.0} along: {found:.0} of {asked:.0}",
                                panel.mark,
                                if top { "top" } else { "bottom" },
                                axis.word()
                            ));
                        }
                    }
                }
                short.extend(short_of_torsion(&asker, PanelId(index), axis, &lines));
            }
        }
    }
    short
}

/// Corners where the bars over a fifth of the span hold less than the torsion steel.
fn short_of_torsion(asker: &Asker<'_>, id: PanelId, axis: Axis, lines: &[&Lying]) -> Vec<String> {
    let (panel, design) = (asker.floor.panel(id), &asker.design.panels[id.0]);
    let Some(basis) = design.basis else { return Vec::new() };
    let reach = basis.lx_m * 200.0;
    let (ends, clear) = (extent(panel, axis), faces(panel, axis.across()));
    let across = extent(panel, axis.across());
    let mut short = Vec::new();
    for end in [0, 1] {
        for beside in [0, 1] {
            // In the middle of the corner along the bars.
            let inward = |i: usize| if i == 0 { 1.0 } else { -1.0 };
            let along = ends[end] + inward(end) * (reach - 1.0);
            let zone = [clear[beside], across[beside] + inward(beside) * reach];
            let (low, high) = (zone[0].min(zone[1]), zone[0].max(zone[1]));
            let (x, y) = if axis == Axis::X {
                (along, f64::midpoint(low, high))
            } else {
                (f64::midpoint(low, high), along)
            };
            let asked = asker.torsion(panel, design, x, y);
            if asked <= 0.0 || high - low < 300.0 || beside_opening(panel, x, y) {
                continue;
            }
            let covering =
                lines.iter().filter(|bar| bar.along[0] - 1.0 <= along && along <= bar.along[1] + 1.0);
            let steel: f64 = covering
                .filter(|bar| bar.across >= low - 1.0 && bar.across <= high + 1.0)
                .map(|bar| bar.area)
                .sum();
            // A zone so short holds its bars to half a bar.
            let half_a_bar = lines.iter().map(|bar| bar.area).fold(0.0, f64::max) / 2.0;
            if (steel + half_a_bar) * 1000.0 / (high - low) < asked {
                short.push(format!(
                    "{} corner {axis:?} {end}{beside}: {:.0} of {asked:.0}",
                    panel.mark,
                    steel * 1000.0 / (high - low)
                ));
            }
        }
    }
    short
}

/// Bars that are too long, leave the slab, cross a joint or a void, or are not what the schedule says.
fn faults(floor: &Floor, schedule: &BarSchedule, criteria: &Criteria) -> Vec<String> {
    let mut faults = Vec::new();
    if let Err(error) = reconcile(schedule, criteria) {
        faults.push(error.to_string());
    }
    let mut on_plan = vec![0; schedule.bars.len()];
    for set in &schedule.sets {
        for run in &set.runs {
            on_plan[run.bar] += run.count;
        }
    }
    for (bar, count) in schedule.bars.iter().zip(on_plan) {
        if bar.count != count || count == 0 || bar.length_mm > criteria.stock_length_m * 1000.0 {
            faults.push(format!(
                "bar {}: {count} on plan, {} on the schedule, {} mm",
                bar.mark, bar.count, bar.length_mm
            ));
        }
    }
    for bar in lying(schedule) {
        let mut at = bar.along[0];
        while at <= bar.along[1] {
            let (x, y) = if bar.axis == Axis::X { (at, bar.across) } else { (bar.across, at) };
            if !floor.panels.iter().any(|panel| in_concrete(panel, x, y)) {
                faults.push(format!("a bar leaves the slab at {x:.0}, {y:.0}"));
                break;
            }
            at += 40.0;
        }
        for panel in &floor.panels {
            faults.extend(crosses_joint(panel, &bar));
        }
    }
    faults
}

/// Within a panel to the outer face of its supports, 25 mm of end cover kept at the edges of the slab.
fn in_concrete(panel: &Panel, x: f64, y: f64) -> bool {
    [(Axis::X, x), (Axis::Y, y)].into_iter().all(|(axis, at)| {
        let lines = extent(panel, axis);
        [0, 1].into_iter().all(|end| {
            let edge = panel.edge(axis.end_sides()[end]);
            let joint = edge.segments.iter().any(|s| s.joint);
            let out = match edge.state {
                EdgeState::Free => -25.0,
                _ if joint => 0.0,
                EdgeState::Continuous => edge.support_width_mm / 2.0,
                _ => edge.support_width_mm / 2.0 - 25.0,
            };
            if end == 0 { at >= lines[0] - out - 0.6 } else { at <= lines[1] + out + 0.6 }
        })
    })
}

fn crosses_joint(panel: &Panel, bar: &Lying) -> Option<String> {
    for side in bar.axis.end_sides() {
        let line = extent(panel, bar.axis)[usize::from(matches!(side, Side::North | Side::East))];
        for segment in panel.edge(side).segments.iter().filter(|segment| segment.joint) {
            let within = segment.from.m() * 1000.0 < bar.across && bar.across < segment.to.m() * 1000.0;
            if within && bar.along[0] < line - 1.0 && bar.along[1] > line + 1.0 {
                return Some(format!("a bar crosses the joint at {} {side:?}", panel.mark));
            }
        }
    }
    None
}

fn at_fault(plan: &Plan) -> bool {
    lay_out(&plan.0).1.iter().any(|query| query.severity == design_engine::query::Severity::Error)
}

fn criteria(of: u16) -> Criteria {
    let word = |text: &str| Value::Text(text.to_owned());
    let values = match of % 4 {
        0 => vec![],
        1 => vec![("top_bars", word("all full length")), ("bottom_bars", word("alternate curtailed"))],
        2 => vec![("edge_strips", word("minimum steel")), ("stock_length_m", Value::Number(6.0))],
        _ => vec![
            ("bar_sizes_mm", Value::Numbers(vec![8.0, 10.0, 12.0, 16.0, 20.0])),
            ("greatest_spacing_mm", Value::Number(200.0)),
        ],
    };
    Criteria::new(&values).unwrap()
}

proptest! {
    #![proptest_config(config(120))]

    #[test]
    fn every_point_of_a_floor_has_its_steel_and_no_bar_is_where_it_must_not_be(mut choices in choices(), of in 0..4_u16) {
        let plan = floor(&mut choices);
        prop_assume!(!at_fault(&plan));
        let criteria = criteria(of);
        let designed = plan.design_by(&criteria);
        let schedule = detail(&designed.floor, &designed.design, &criteria);
        let short = shortfalls(&designed.floor, &designed.design, &schedule, &criteria);
        prop_assert!(short.is_empty(), "{} points short: {:#?}", short.len(), &short[..short.len().min(12)]);
        let faults = faults(&designed.floor, &schedule, &criteria);
        prop_assert!(faults.is_empty(), "{:#?}", &faults[..faults.len().min(12)]);
    }
}

#[test]
fn one_bar_missing_is_found() {
    let criteria = Criteria::default();
    let designed = plan(&[0.0, 4.8, 9.6], &[0.0, 5.0, 10.4])
        .panel("A", "1-2", "A-B")
        .panel("B", "2-3", "A-B")
        .panel("C", "1-2", "B-C")
        .panel("D", "2-3", "B-C")
        .design();
    let whole = detail(&designed.floor, &designed.design, &criteria);
    assert_eq!(shortfalls(&designed.floor, &designed.design, &whole, &criteria), Vec::<String>::new());
    for for_what in [Use::Bottom, Use::OverSupport, Use::Edge] {
        let mut planted = whole.clone();
        let set = planted.sets.iter_mut().find(|set| set.for_what == for_what).unwrap();
        let run = *set.runs.iter().max_by_key(|run| run.count).unwrap();
        // Cut in two with the middle bar left out.
        let middle = run.count / 2;
        let (mut before, mut after) = (run, run);
        (before.count, before.last_mm) = (middle, run.place(middle - 1));
        (after.count, after.first_mm) = (run.count - middle - 1, run.place(middle + 1));
        set.runs.retain(|r| *r != run);
        set.runs.extend([before, after]);
        let short = shortfalls(&designed.floor, &designed.design, &planted, &criteria);
        assert!(!short.is_empty(), "{for_what:?}");
        assert!(!faults(&designed.floor, &planted, &criteria).is_empty());
    }
}
