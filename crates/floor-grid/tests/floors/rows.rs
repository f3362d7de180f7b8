//! Rows of a layout of which everything is found.

use design_engine::floor::{AreaLoads, Axis, Corners, Spanning, TenthMm};
use floor_grid::layout::*;

/// A layout without rows: tolerance 1 mm, supports 250 mm wide.
pub(crate) fn empty() -> Layout {
    Layout { tolerance: TenthMm(10), support_width_mm: 250.0, ..Layout::default() }
}

/// A gridline; its position in tenths of a millimetre.
pub(crate) fn gridline(name: impl Into<String>, axis: Axis, position: i64) -> Gridline {
    Gridline { name: name.into(), axis, position: TenthMm(position) }
}

/// What grid panels and loose panels have in common.
pub(crate) fn data(mark: &str) -> PanelData {
    PanelData {
        mark: mark.to_owned(),
        thickness_mm: 175.0,
        loads: AreaLoads { finishes_kn_m2: 1.2, partitions_kn_m2: 1.0, imposed_kn_m2: 3.0 },
        spanning: Spanning::Found,
        corners: Corners::HeldDown,
        corners_stated: false,
        remarks: String::new(),
    }
}

/// A panel between gridlines.
pub(crate) fn panel(mark: &str, x: [GridlineId; 2], y: [GridlineId; 2]) -> GridPanel {
    GridPanel {
        data: data(mark),
        x_from: x[0],
        x_to: x[1],
        y_from: y[0],
        y_to: y[1],
        top_level_mm: 0.0,
        stated_edges: [None; 4],
        zone: String::new(),
    }
}
