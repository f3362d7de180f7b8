//! A designed panel with what every part of detailing asks of it.

use design_engine::check::Place;
use design_engine::criteria::Criteria;
use design_engine::floor::{Axis, Floor, Layer, PanelId, Side, Span, SupportId};
use design_engine::result::{FloorDesign, PanelDesign, Section, SupportDesign};

use crate::drafts::{Hole, SetDraft};
use crate::model::{BarSet, Use};
use crate::slab::Slab;

/// The floor being detailed.
#[derive(Clone, Copy)]
pub(crate) struct Context<'a> {
    pub(crate) floor: &'a Floor,
    pub(crate) design: &'a FloorDesign,
    pub(crate) criteria: &'a Criteria,
}

impl<'a> Context<'a> {
    /// A panel, where it is designed.
    pub(crate) fn panel(&self, id: PanelId) -> Option<PanelContext<'a>> {
        let design = &self.design.panels[id.0];
        let designed = design.not_designed.is_none() && design.basis.is_some();
        designed.then(|| PanelContext {
            floor_design: self.design,
            design,
            slab: Slab::new(self.floor.panel(id)),
            criteria: self.criteria,
        })
    }
}

/// A designed panel.
#[derive(Clone, Copy)]
pub(crate) struct PanelContext<'a> {
    pub(crate) floor_design: &'a FloorDesign,
    pub(crate) design: &'a PanelDesign,
    pub(crate) slab: Slab<'a>,
    pub(crate) criteria: &'a Criteria,
}

impl<'a> PanelContext<'a> {
    pub(crate) fn id(&self) -> PanelId {
        self.design.panel
    }

    /// The bottom section of a span.
    pub(crate) fn midspan(&self, span: Span) -> Option<&'a Section> {
        let at = if span == Span::Short { Place::ShortMidspan } else { Place::LongMidspan };
        self.design.sections.iter().find(|section| {
            section.at == at && section.support.is_none() && matches!(section.layer, Layer::B1 | Layer::B2)
        })
    }

    pub(crate) fn support(&self, id: SupportId) -> Option<&'a SupportDesign> {
        self.floor_design.support(id)
    }

    /// Holes that cut bars along an axis.
    pub(crate) fn holes(&self, axis: Axis) -> Vec<Hole> {
        let cover = self.criteria.bottom_cover_mm;
        self.cut_openings()
            .map(|rect| {
                let wide = |axis: Axis| {
                    let [a, b] = rect[axis as usize];
                    [a - cover, b + cover]
                };
                Hole { across: wide(axis.across()), along: wide(axis) }
            })
            .collect()
    }

    /// Openings that cut bars, as extents along x and y, mm on plan.
    pub(crate) fn cut_openings(&self) -> impl Iterator<Item = [[f64; 2]; 2]> + '_ {
        let corner = [Axis::X, Axis::Y].map(|axis| self.slab.extent(axis)[0]);
        self.design.openings.iter().filter(|opening| !opening.displaced).map(move |design| {
            let opening = &design.opening;
            let from = [corner[0] + opening.from_west_m * 1000.0, corner[1] + opening.from_south_m * 1000.0];
            [0, 1].map(|axis| [from[axis], from[axis] + opening.widths_m[axis] * 1000.0])
        })
    }

    /// A set of this panel, no bars yet.
    pub(crate) fn draft(
        &self,
        for_what: Use,
        layer: Layer,
        axis: Axis,
        spacing_mm: Option<f64>,
        words: &str,
    ) -> SetDraft {
        let set = BarSet {
            for_what,
            panel: self.id(),
            side: None,
            supports: Vec::new(),
            layer,
            axis,
            spacing_mm,
            alternate_reversed: false,
            cantilever: false,
            words: words.to_owned(),
            runs: Vec::new(),
        };
        SetDraft { set, runs: Vec::new() }
    }

    /// Size of the bottom bars outside those along an axis, mm.
    pub(crate) fn bottom_outside_mm(&self, axis: Axis) -> f64 {
        let basis = self.design.basis;
        let bars = |axis: Axis| {
            let span = basis?.span_along(axis);
            Some((self.midspan(span)?, self.design.bars.bottom[span as usize]?))
        };
        match (bars(axis), bars(axis.across())) {
            (Some((own, _)), Some((_, other))) if own.layer == Layer::B2 => other.bars.bar_mm,
            _ => 0.0,
        }
    }

    /// Designed supports of a side over a stretch that reaches a place along it.
    pub(crate) fn support_at(&self, side: Side, along: f64) -> Option<&'a SupportDesign> {
        let edge = self.slab.panel.edge(side);
        let covers = |segment: &&design_engine::floor::Segment| {
            let [from, to] = self.slab.segment(side, segment);
            from - 1.0 <= along && along <= to + 1.0
        };
        edge.segments.iter().filter(covers).find_map(|segment| self.support(segment.support?))
    }
}
