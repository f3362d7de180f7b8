//! Gridlines and panels to edges and supports of a floor.
//!
//! Positions become stations first (gridlines within the plan tolerance are one line), so that whatever
//! follows compares whole numbers; then every line is swept for the panels that meet along it, and each
//! stretch of edge is judged from both its sides. Rules and decisions: `docs/method.md`.
//!
//! ```
//! use design_engine::floor::{AreaLoads, Axis, Corners, EdgeState, Side, Spanning, TenthMm};
//! use floor_grid::layout::{Gridline, GridlineId, GridPanel, Layout, PanelData};
//!
//! let gridline = |name: &str, axis, x| Gridline { name: name.into(), axis, position: TenthMm::from_m(x) };
//! let panel = |mark: &str, x: usize| GridPanel {
//!     data: PanelData {
//!         mark: mark.into(),
//!         thickness_mm: 175.0,
//!         loads: AreaLoads { finishes_kn_m2: 1.5, partitions_kn_m2: 1.0, imposed_kn_m2: 2.5 },
//!         spanning: Spanning::Found,
//!         corners: Corners::HeldDown,
//!         corners_stated: false,
//!         remarks: String::new(),
//!     },
//!     x_from: GridlineId(x),
//!     x_to: GridlineId(x + 1),
//!     y_from: GridlineId(3),
//!     y_to: GridlineId(4),
//!     top_level_mm: 0.0,
//!     stated_edges: [None; 4],
//!     zone: String::new(),
//! };
//! let layout = Layout {
//!     gridlines: vec![
//!         gridline("1", Axis::X, 0.0),
//!         gridline("2", Axis::X, 5.4),
//!         gridline("3", Axis::X, 10.2),
//!         gridline("A", Axis::Y, 0.0),
//!         gridline("B", Axis::Y, 6.0),
//!     ],
//!     panels: vec![panel("P1", 0), panel("P2", 1)],
//!     tolerance: TenthMm(10),
//!     support_width_mm: 250.0,
//!     ..Layout::default()
//! };
//! let (floor, queries) = floor_grid::lay_out(&layout);
//! assert!(queries.is_empty());
//! assert_eq!(floor.panels[0].edge(Side::East).state, EdgeState::Continuous);
//! assert_eq!(floor.panels[0].edge(Side::East).why, "shared with P2 over 6.00 m; no joint; level difference 0");
//! assert_eq!(floor.supports[0].name.as_deref(), Some("2/A-B"));
//! ```
mod actions;
pub mod beam_loads;
mod chosen_bars;
mod edge_states;
mod gridlines;
pub mod layout;
mod loose_panels;
mod not_designed;
mod observations;
mod on_panels;
mod panels;
mod rows_on_plan;
mod shared_edges;
mod stretches;
mod supports;
mod voids;

use design_engine::floor::{Edge, Floor, Panel, PanelId};
use design_engine::query::Query;

use crate::actions::{loose_action, spans_m};
use crate::edge_states::Plan;
use crate::gridlines::Grid;
use crate::layout::{GridPanel, Layout};
use crate::panels::Placed;
use crate::stretches::Stretches;

/// Finds every edge's stretches, state and reason, and the supports that panels share.
///
/// Panels are in the order of the book (grid panels, then loose ones); supports in plan order: by axis,
/// along it, then along the line, and after them those of loose panels. Queries come in the order of
/// the work, errors included: with an error among them the floor must not be designed.
///
/// # Panics
/// If a [`layout::GridlineId`] of the layout is out of its gridlines.
#[must_use]
pub fn lay_out(layout: &Layout) -> (Floor, Vec<Query>) {
    let mut queries = Vec::new();
    let grid = Grid::new(layout, &mut queries);
    let placed = panels::place_panels(layout, &grid, &mut queries);
    let stretches = Stretches::new(layout, &grid, &mut queries);
    let meetings = shared_edges::meetings(&placed, &stretches);
    let edges = shared_edges::by_edge(&placed, &meetings);
    let mut actions = actions::actions(layout, &placed, &stretches, &meetings, &edges);
    let plan = Plan {
        layout,
        grid: &grid,
        stretches: &stretches,
        placed: &placed,
        actions: &actions,
        meetings: &meetings,
        edges: &edges,
    };
    let found = supports::edges_and_supports(&plan);
    observations::observe(&plan, &mut queries);
    actions::note_ratios(layout, &placed, &actions, &mut queries);

    let rows = layout.panels.iter().zip(&placed).zip(found.edges);
    let panels = rows.map(|((row, at), edges)| grid_panel(row, at.as_ref(), edges)).collect();
    let mut floor = Floor { panels, supports: found.supports };
    for row in &layout.loose_panels {
        let id = PanelId(floor.panels.len());
        let panel = loose_panels::loose_panel(layout, row, id, &mut floor.supports, &mut queries);
        floor.panels.push(panel);
        actions.push(loose_action(row));
    }
    on_panels::put_on_panels(layout, &mut floor, &mut queries);
    not_designed::mark_undesigned(&actions, &found.verdicts, &mut floor, &mut queries);
    chosen_bars::place_chosen_bars(layout, &mut floor, &mut queries);
    (floor, queries)
}

fn grid_panel(row: &GridPanel, at: Option<&Placed>, edges: [Edge; 4]) -> Panel {
    Panel {
        mark: row.data.mark.clone(),
        plan: at.map(|at| at.rect),
        spans_m: at.map_or([0.0; 2], spans_m),
        thickness_mm: row.data.thickness_mm,
        loads: row.data.loads,
        spanning: row.data.spanning,
        corners: row.data.corners,
        corners_stated: row.data.corners_stated,
        top_level_mm: row.top_level_mm,
        edges,
        chosen_bottom: [None; 2],
        openings: Vec::new(),
        line_loads: Vec::new(),
        not_designed: at.is_none().then(|| "its extents are wrong".to_owned()),
    }
}
