//! A panel on plan in mm: its lines, support faces and the limits of its bars.

use design_engine::floor::{Axis, EdgeState, Panel, Segment, Side, TenthMm};

/// A position on plan, mm.
pub(crate) fn mm(position: TenthMm) -> f64 {
    position.m() * 1000.0
}

/// One side of a panel on plan.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct SideLine {
    /// The gridline, or the panel's line.
    pub(crate) line: f64,
    /// Face of the support inside the panel.
    pub(crate) face: f64,
    /// Centre of the bearing.
    pub(crate) centre: f64,
    /// The furthest that concrete of the slab reaches.
    pub(crate) outer: f64,
    /// 1 where coordinates grow out of the panel, -1 where they grow into it.
    pub(crate) outward: f64,
}

impl SideLine {
    /// The furthest that a bar may reach, its end cover kept.
    pub(crate) fn bar_limit(&self, cover_mm: f64) -> f64 {
        self.outer - self.outward * cover_mm
    }

    /// A place so far past the support face into the panel.
    pub(crate) fn inward(&self, from_face_mm: f64) -> f64 {
        self.face - self.outward * from_face_mm
    }
}

/// A panel on plan; a loose panel lies with its south-west corner at 0, 0.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Slab<'a> {
    pub(crate) panel: &'a Panel,
}

impl<'a> Slab<'a> {
    pub(crate) fn new(panel: &'a Panel) -> Slab<'a> {
        Slab { panel }
    }

    /// Extent between its lines along an axis.
    pub(crate) fn extent(&self, axis: Axis) -> [f64; 2] {
        match (self.panel.plan, axis) {
            (Some(plan), Axis::X) => [mm(plan.x0), mm(plan.x1)],
            (Some(plan), Axis::Y) => [mm(plan.y0), mm(plan.y1)],
            (None, axis) => [0.0, self.panel.span_m(axis) * 1000.0],
        }
    }

    pub(crate) fn side(&self, side: Side) -> SideLine {
        let extent = self.extent(side.span_axis());
        let high = matches!(side, Side::North | Side::East);
        let (line, outward) = if high { (extent[1], 1.0) } else { (extent[0], -1.0) };
        let edge = self.panel.edge(side);
        let width = edge.support_width_mm;
        if edge.state == EdgeState::Free {
            return SideLine { line, face: line, centre: line, outer: line, outward };
        }
        if edge.segments.iter().any(|segment| segment.joint) {
            // The panel bears on its own half of the support, and the slab ends on the joint.
            let (face, centre) = (line - outward * width, line - outward * width / 2.0);
            return SideLine { line, face, centre, outer: line, outward };
        }
        SideLine {
            line,
            face: line - outward * width / 2.0,
            centre: line,
            outer: line + outward * width / 2.0,
            outward,
        }
    }

    /// Clear extent between support faces along an axis.
    pub(crate) fn clear(&self, axis: Axis) -> [f64; 2] {
        axis.end_sides().map(|side| self.side(side).face)
    }

    /// Extent of a segment of a side; a loose panel's is the whole side.
    pub(crate) fn segment(&self, side: Side, segment: &Segment) -> [f64; 2] {
        if self.panel.is_loose() {
            return self.extent(side.span_axis().across());
        }
        [mm(segment.from), mm(segment.to)]
    }

    /// A stretch along a side with its ends at support faces where they are the panel's corners.
    pub(crate) fn between_faces(&self, side: Side, stretch: [f64; 2]) -> [f64; 2] {
        let axis = side.span_axis().across();
        let (extent, clear) = (self.extent(axis), self.clear(axis));
        [0, 1].map(|end| if (stretch[end] - extent[end]).abs() < 0.05 { clear[end] } else { stretch[end] })
    }
}
