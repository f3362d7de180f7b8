//! The state of every stretch of every edge, with its reason in words, and the supports that follow.

use design_engine::floor::{Edge, EdgeState, PanelId, Segment, Side, SupportId, SupportKind, TenthMm};

use crate::actions::{Action, STEP_MM};
use crate::gridlines::{Grid, millimetres};
use crate::layout::{Layout, StatedEdge};
use crate::panels::{Placed, gridline_of};
use crate::shared_edges::Meeting;
use crate::stretches::{Run, Stretches};

/// What one panel's side of a meeting comes to.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Verdict {
    /// Hogging moment is carried across.
    Continuous,
    /// Bars cross, no moment is claimed.
    Crossing,
    /// Supported only.
    Discontinuous,
    /// Nothing under it.
    Free,
}

/// All that the state of an edge is judged from.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Plan<'a> {
    pub(crate) layout: &'a Layout,
    pub(crate) grid: &'a Grid,
    pub(crate) stretches: &'a Stretches,
    pub(crate) placed: &'a [Option<Placed>],
    pub(crate) actions: &'a [Action],
    pub(crate) meetings: &'a [Meeting],
    /// Meetings along each panel's edges.
    pub(crate) edges: &'a [[Vec<usize>; 4]],
}

/// A panel's side at a meeting.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) struct Party {
    pub(crate) panel: PanelId,
    pub(crate) side: Side,
}

impl Plan<'_> {
    pub(crate) fn mark(&self, panel: PanelId) -> &str {
        &self.layout.panels[panel.0].data.mark
    }

    pub(crate) fn stated(&self, party: Party) -> Option<StatedEdge> {
        self.layout.panels[party.panel.0].stated_edges[party.side.index()]
    }

    pub(crate) fn action(&self, panel: PanelId) -> Action {
        self.actions[panel.0]
    }

    /// How much higher the top of one panel stands than another's, mm.
    pub(crate) fn step_mm(&self, one: PanelId, other: PanelId) -> f64 {
        let level = |panel: PanelId| self.layout.panels[panel.0].top_level_mm;
        (level(one) - level(other)).abs()
    }

    /// Both parties of a meeting, near then far.
    pub(crate) fn parties(&self, meeting: &Meeting) -> [Option<Party>; 2] {
        meeting.sides().map(|at| at.map(|(panel, side)| Party { panel, side }))
    }

    /// What a party's stretch of edge comes to, and why. A stated edge wins over the layout.
    pub(crate) fn judge(&self, meeting: &Meeting, me: Party, other: Option<Party>) -> (Verdict, String) {
        let stated = match self.stated(me) {
            None => return self.found(meeting, me, other),
            Some(StatedEdge::Continuous) => Verdict::Continuous,
            Some(StatedEdge::Discontinuous) => Verdict::Discontinuous,
            Some(StatedEdge::Free) => Verdict::Free,
        };
        (stated, stated_why(&self.layout.panels[me.panel.0].data.remarks))
    }

    /// What the layout makes of an edge that the book does not state.
    fn found(&self, meeting: &Meeting, me: Party, other: Option<Party>) -> (Verdict, String) {
        let over = self.over(meeting, me);
        if !meeting.held {
            return (Verdict::Free, format!("no support{over} (Supports sheet)"));
        }
        if self.action(me.panel).frees(me.side) {
            return (Verdict::Free, "free edge of a cantilever".to_owned());
        }
        let Some(other) = other else { return (Verdict::Discontinuous, format!("no panel beyond{over}")) };
        if let Some(obstacle) = self.obstacle(meeting, me, other) {
            return (Verdict::Discontinuous, format!("{obstacle}{over}"));
        }
        let (mark, length) = (self.mark(other.panel), self.length_m(meeting, me));
        let theirs_beside = self.action(other.panel).beside_span(other.side);
        if theirs_beside || self.action(me.panel).beside_span(me.side) {
            let beside = if theirs_beside {
                format!("beside the side of one-way panel {mark}")
            } else {
                format!("along the panel's own span, beside {mark}")
            };
            return (Verdict::Crossing, format!("{beside}{over}; bars cross, no moment claimed"));
        }
        let gap = match self.gap(meeting) {
            TenthMm(0) => String::new(),
            gap => format!("; gap {} within tolerance", millimetres(gap)),
        };
        let step_mm = self.step_mm(me.panel, other.panel);
        let step = if step_mm > 0.0 { step_words(step_mm) } else { "0".to_owned() };
        let why = format!("shared with {mark} over {length:.2} m; no joint; level difference {step}{gap}");
        (Verdict::Continuous, why)
    }

    /// What keeps bars from crossing to the neighbour, or moment from being claimed there.
    fn obstacle(&self, meeting: &Meeting, me: Party, other: Party) -> Option<String> {
        let mark = self.mark(other.panel);
        if meeting.joint {
            return Some(format!("movement joint on gridline {}", self.line_name(me)));
        }
        let step_mm = self.step_mm(me.panel, other.panel);
        if step_mm > STEP_MM + 1e-9 {
            return Some(format!("level difference {} (over {STEP_MM})", step_words(step_mm)));
        }
        match self.stated(other) {
            Some(StatedEdge::Discontinuous) => return Some(format!("{mark} states its edge discontinuous")),
            Some(StatedEdge::Free) => return Some(format!("{mark} states its edge free")),
            Some(StatedEdge::Continuous) | None => {}
        }
        if self.action(other.panel).frees(other.side) {
            return Some(format!("beside the free edge of cantilever {mark}"));
        }
        let beside =
            self.action(me.panel).beside_span(me.side) || self.action(other.panel).beside_span(other.side);
        (beside && self.stated(other).is_some())
            .then(|| format!("{mark} states its edge continuous; no moment claimed here"))
    }

    /// ` over 2.50 m` on an edge of several stretches; nothing where it is the whole edge.
    fn over(&self, meeting: &Meeting, me: Party) -> String {
        if self.edges[me.panel.0][me.side.index()].len() > 1 {
            format!(" over {:.2} m", self.length_m(meeting, me))
        } else {
            String::new()
        }
    }

    fn length_m(&self, meeting: &Meeting, me: Party) -> f64 {
        let (from, to) = self.extent(meeting, me);
        (to - from).m()
    }

    /// Positions of a party's stretch: its own ends where it ends there, else those of the stations.
    pub(crate) fn extent(&self, meeting: &Meeting, me: Party) -> (TenthMm, TenthMm) {
        let along = meeting.line.axis.across();
        let at = self.placed[me.panel.0];
        let end = |station, which: usize| match at {
            Some(at) if at.stations(along)[which] == station => at.ends(along)[which],
            _ => self.grid.position(self.layout, along, station),
        };
        (end(meeting.run.from, 0), end(meeting.run.to, 1))
    }

    /// Distance from the near panel's edge to the far panel's, within tolerance.
    pub(crate) fn gap(&self, meeting: &Meeting) -> TenthMm {
        let [Some(near), Some(far)] = self.parties(meeting) else { return TenthMm(0) };
        match (self.placed[near.panel.0], self.placed[far.panel.0]) {
            (Some(one), Some(two)) => two.position(far.side) - one.position(near.side),
            _ => TenthMm(0),
        }
    }

    /// Name of the gridline that a party's edge lies on.
    pub(crate) fn line_name(&self, me: Party) -> &str {
        let id = gridline_of(&self.layout.panels[me.panel.0], me.side);
        &self.layout.gridline(id).name
    }

    /// The support that the verdicts on a meeting's two sides call for, and the party that has it alone.
    pub(crate) fn support_kind(verdicts: [Option<Verdict>; 2]) -> Option<(SupportKind, Owners)> {
        use Verdict::{Continuous, Crossing};
        match verdicts {
            [Some(Continuous), Some(Continuous)] => Some((SupportKind::Hogging, Owners::Both)),
            [Some(Continuous), _] => Some((SupportKind::Hogging, Owners::Near)),
            [_, Some(Continuous)] => Some((SupportKind::Hogging, Owners::Far)),
            [Some(Crossing), Some(Crossing)] => Some((SupportKind::Crossing, Owners::Both)),
            _ => None,
        }
    }

    /// A panel's edge from its segments and their verdicts.
    pub(crate) fn edge(&self, me: Party, segments: Vec<Segment>, verdicts: &[Verdict]) -> Edge {
        let stated = self.stated(me);
        let width = self.placed[me.panel.0].map_or(self.layout.support_width_mm, |at| {
            let [from, to] = at.run(me.side);
            self.stretches.width_mm(at.line(me.side), Run { from, to })
        });
        Edge {
            state: state_of(verdicts),
            stated: stated.is_some(),
            why: joined(&segments),
            segments,
            support_width_mm: width,
        }
    }
}

/// Who has a support.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Owners {
    Both,
    Near,
    Far,
}

/// A level difference as it is printed, to 0.1 mm.
pub(crate) fn step_words(step_mm: f64) -> String {
    millimetres(TenthMm::from_m(step_mm / 1000.0))
}

/// The reason of a stated edge: the row's remark.
pub(crate) fn stated_why(remark: &str) -> String {
    match remark.trim() {
        "" => "stated in the book".to_owned(),
        remark => format!("stated in the book: {remark}"),
    }
}

/// State of a whole edge. A stretch without support counts as not continuous unless all of it is so.
fn state_of(verdicts: &[Verdict]) -> EdgeState {
    let all = |wanted| verdicts.iter().all(|verdict| *verdict == wanted);
    if all(Verdict::Free) {
        EdgeState::Free
    } else if all(Verdict::Continuous) {
        EdgeState::Continuous
    } else if verdicts.contains(&Verdict::Continuous) {
        EdgeState::PartlyContinuous
    } else {
        EdgeState::Discontinuous
    }
}

/// The reasons of an edge's segments, each once where neighbours agree.
fn joined(segments: &[Segment]) -> String {
    let mut reasons: Vec<&str> = segments.iter().map(|segment| segment.why.as_str()).collect();
    reasons.dedup();
    reasons.join(" | ")
}

/// A segment of an edge.
pub(crate) fn segment(
    (from, to): (TenthMm, TenthMm),
    neighbour: Option<PanelId>,
    joint: bool,
    (verdict, why): (Verdict, String),
    support: Option<SupportId>,
) -> Segment {
    Segment { from, to, neighbour, continuous: verdict == Verdict::Continuous, joint, support, why }
}
