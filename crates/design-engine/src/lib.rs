//! Design of reinforced concrete slab panels to BS 8110-1:1997.
//!
//! The main path is [`design_floor`]; each clause is a function of [`bs8110`]. A floor comes from gridlines by way of
//! another crate; here is one panel by hand, 4.2 x 5.6 m (invented), discontinuous on all four edges:
//!
//! ```
//! use design_engine::check::{CheckKind, Place};
//! use design_engine::criteria::Criteria;
//! use design_engine::design_floor;
//! use design_engine::floor::*;
//!
//! let edge = Edge {
//!     state: EdgeState::Discontinuous,
//!     stated: false,
//!     why: "no panel beyond".into(),
//!     segments: vec![],
//!     support_width_mm: 250.0,
//! };
//! let panel = Panel {
//!     mark: "S1".into(),
//!     plan: None,
//!     spans_m: [4.2, 5.6],
//!     thickness_mm: 175.0,
//!     loads: AreaLoads { finishes_kn_m2: 1.5, partitions_kn_m2: 1.0, imposed_kn_m2: 2.5 },
//!     spanning: Spanning::Found,
//!     corners: Corners::HeldDown,
//!     corners_stated: false,
//!     top_level_mm: 0.0,
//!     edges: [edge.clone(), edge.clone(), edge.clone(), edge],
//!     chosen_bottom: [None, None],
//!     openings: vec![],
//!     line_loads: vec![],
//!     not_designed: None,
//! };
//! let floor = Floor { panels: vec![panel], supports: vec![] };
//! let design = design_floor(&floor, &Criteria::default());
//! let panel = &design.panels[0];
//!
//! // n = 1.4 (0.175 x 24 + 1.5 + 1.0) + 1.6 x 2.5 = 13.38 kN/m2
//! assert!((panel.loads.ultimate_kn_m2 - 13.38).abs() < 1e-9);
//! // ly/lx = 1.333, case 9 of Table 3.14: .081 + .006 x 0.333 = .083; m = .083 x 13.38 x 4.2^2 = 19.59 kNm/m
//! let short = panel.section(Place::ShortMidspan).unwrap();
//! assert!((short.moment_knm_m.unwrap() - 19.59).abs() < 0.005);
//! // H10 outermost: d = 175 - 25 - 5 = 145 mm; K = 0.031, z = 0.95 d; As = 19.59e6/(434.8 x 137.75) = 327 mm2/m
//! assert_eq!((short.bars.bar_mm, short.d_mm), (10.0, 145.0));
//! assert!((short.as_bending_mm2_m.unwrap() - 327.1).abs() < 0.1);
//! // Deflection governs the bars: 4200/145 = 29.0 against 20 x a modification factor of at least 1.45
//! let deflection = panel.checks.iter().find(|check| check.kind == CheckKind::Deflection).unwrap();
//! assert!((deflection.demand - 28.97).abs() < 0.01 && deflection.ok);
//! assert!(design.ok());
//! ```

pub mod bars;
pub mod bs8110;
pub mod check;
pub mod choose;
pub mod criteria;
pub mod design;
pub mod floor;
pub mod query;
pub mod ranges;
pub mod result;
pub mod supports;

pub use design::design_floor;
