//! Top bars at discontinuous edges (3.12.10.3.2).

use super::fixed::Fixed;
use super::view::View;
use crate::bs8110::curtailment::{round_up_50, top_extents};
use crate::bs8110::flexure::{minimum_steel, steel_area};
use crate::choose::nominal_bars;
use crate::floor::{Axis, EdgeState, Layer, Panel, Side};
use crate::result::{EdgeBars, PanelBars};

/// The top bars at each side that is discontinuous over some stretch without bars of a support: half of the bottom steel in
/// that direction and the minimum, to max(0.15 l, 45 sizes) past the face.
pub(crate) fn edge_bars(
    view: &View<'_>,
    panel: &Panel,
    fixed: &Fixed,
    t1_axis: Axis,
    t1_mm: f64,
    bars: &PanelBars,
) -> [Option<EdgeBars>; 4] {
    let criteria = view.criteria;
    Side::ALL.map(|side| {
        let edge = panel.edge(side);
        let bare = edge.segments.iter().any(|segment| segment.support.is_none());
        if edge.state == EdgeState::Free || !bare {
            return None;
        }
        let axis = side.span_axis();
        let bottom = bars.bottom[fixed.basis.span_along(axis) as usize]?.bars;
        let layer = if axis == t1_axis { Layer::T1 } else { Layer::T2 };
        let outside_mm = if layer == Layer::T1 { 0.0 } else { t1_mm };
        let least = minimum_steel(fixed.thickness_mm, criteria.fy_n_mm2);
        let as_required_mm2_m = (steel_area(bottom.bar_mm, bottom.spacing_mm) / 2.0).max(least);
        let cover = criteria.top_cover_mm + outside_mm;
        let bars = nominal_bars(criteria, as_required_mm2_m, bottom.bar_mm, fixed.thickness_mm, cover)?;
        let l_mm = fixed.basis.length_m(fixed.basis.span_along(axis)) * 1000.0;
        let extension_m = round_up_50(top_extents(l_mm, bars.bar_mm).0) / 1000.0;
        Some(EdgeBars { bars, as_required_mm2_m, extension_m, layer, outside_mm })
    })
}
