//! Loads on the supporting lines, after design (3.5.3.7): by gridline, for the designer of the beams.

use design_engine::floor::{Axis, EdgeState, Floor, PanelId, Side, TenthMm};
use design_engine::result::{FloorDesign, SideLoad};

use crate::layout::Layout;
use crate::panels::gridline_of;

/// Load that one panel puts on the stretch of line along one of its sides.
#[derive(Debug, Clone, PartialEq)]
pub struct BeamLoad {
    /// Gridline; none for a loose panel.
    pub gridline: Option<String>,
    /// Axis of the gridline: [`Axis::X`] stands at one x.
    pub axis: Axis,
    /// Crossing gridlines at the ends of the panel's edge; none for a loose panel.
    pub between: Option<[String; 2]>,
    /// Place of the line: position across, and the edge's ends along it.
    pub at: TenthMm,
    /// Start of the edge.
    pub from: TenthMm,
    /// End of the edge.
    pub to: TenthMm,
    /// The panel.
    pub panel: PanelId,
    /// Its side.
    pub side: Side,
    /// Load per metre over `loaded_length_m`.
    pub load: SideLoad,
    /// Loaded length about the middle of the edge, m.
    pub loaded_length_m: f64,
}

impl BeamLoad {
    /// Ultimate load on this stretch from this panel, kN.
    #[must_use]
    pub fn total_ultimate_kn(&self) -> f64 {
        self.load.ultimate_kn_m * self.loaded_length_m
    }
}

/// The loads and their reconciliation.
#[derive(Debug, Clone, PartialEq)]
pub struct BeamLoads {
    /// By gridline in plan order, then along it, then by side; loose panels last.
    pub rows: Vec<BeamLoad>,
    /// Sum of the rows, ultimate, kN.
    pub on_supports_kn: f64,
    /// Ultimate load of the designed panels, kN.
    pub on_panels_kn: f64,
}

impl BeamLoads {
    /// Difference of the two sums as a share of the panels' load; 0 for a floor without load.
    #[must_use]
    pub fn difference(&self) -> f64 {
        if self.on_panels_kn > 0.0 {
            (self.on_supports_kn - self.on_panels_kn) / self.on_panels_kn
        } else {
            0.0
        }
    }
}

/// Loads on supports from a finished design. Panels that are not designed give none.
#[must_use]
pub fn beam_loads(layout: &Layout, floor: &Floor, design: &FloorDesign) -> BeamLoads {
    let mut rows = Vec::new();
    for panel_design in &design.panels {
        for side in Side::ALL {
            let Some(load) = panel_design.side_loads[side.index()] else { continue };
            if floor.panel(panel_design.panel).edge(side).state != EdgeState::Free {
                rows.push(row(layout, floor, panel_design.panel, side, load));
            }
        }
    }
    rows.sort_by_key(|row: &BeamLoad| {
        (row.gridline.is_none(), row.axis, row.at, row.from, row.to, row.panel, row.side)
    });
    let on_supports_kn = rows.iter().map(BeamLoad::total_ultimate_kn).sum();
    let on_panels_kn = design.panels.iter().map(|panel| panel.total_ultimate_kn).sum();
    BeamLoads { rows, on_supports_kn, on_panels_kn }
}

fn row(layout: &Layout, floor: &Floor, id: PanelId, side: Side, load: SideLoad) -> BeamLoad {
    let panel = floor.panel(id);
    let axis = side.span_axis();
    let length_m = panel.span_m(axis.across());
    let names = layout.panels.get(id.0).filter(|_| panel.plan.is_some()).map(|row| {
        let name = |id| layout.gridline(id).name.clone();
        let ends = match axis {
            Axis::X => [row.y_from, row.y_to],
            Axis::Y => [row.x_from, row.x_to],
        };
        (name(gridline_of(row, side)), ends.map(name))
    });
    let (at, from, to) = match (panel.plan, side) {
        (Some(plan), Side::North) => (plan.y1, plan.x0, plan.x1),
        (Some(plan), Side::East) => (plan.x1, plan.y0, plan.y1),
        (Some(plan), Side::South) => (plan.y0, plan.x0, plan.x1),
        (Some(plan), Side::West) => (plan.x0, plan.y0, plan.y1),
        (None, _) => (TenthMm(0), TenthMm(0), TenthMm::from_m(length_m)),
    };
    let (gridline, between) = names.unzip();
    BeamLoad {
        gridline,
        axis,
        between,
        at,
        from,
        to,
        panel: id,
        side,
        load,
        loaded_length_m: length_m * load.loaded_share,
    }
}
