//! Small floors on gridlines, laid out and designed. Every number in them is invented.
#![allow(dead_code, reason = "each test file uses its part")]
#![allow(clippy::unwrap_used, reason = "a helper of tests may panic as they do")]

pub(crate) mod moved;
pub(crate) mod random;

use design_engine::check::{Check, CheckKind, Place};
use design_engine::criteria::{Criteria, Value};
use design_engine::design_floor;
use design_engine::floor::{AreaLoads, Axis, Corners, Floor, Panel, PanelId, Side, Spanning, TenthMm};
use design_engine::query::{Query, Severity, Subject};
use design_engine::result::{FloorDesign, PanelDesign, Section, SupportDesign};
use floor_grid::beam_loads::{BeamLoads, beam_loads};
use floor_grid::lay_out;
use floor_grid::layout::*;

/// gk and n of a panel as [`Plan::panel`] makes it: 0.175 x 24 + 1.5 + 1.0; 1.4 x 6.7 + 1.6 x 2.5 kN/m2.
pub(crate) const G: f64 = 6.7;
pub(crate) const N: f64 = 13.38;

/// Fails where two numbers differ by more than a tolerance.
#[track_caller]
pub(crate) fn close(computed: f64, expected: f64, tolerance: f64) {
    assert!((computed - expected).abs() <= tolerance, "computed {computed}, expected {expected}");
}

/// Fails where two numbers differ by more than a billionth of the larger.
#[track_caller]
pub(crate) fn same(computed: f64, expected: f64) {
    close(computed, expected, 1e-9 * computed.abs().max(expected.abs()));
}

pub(crate) fn criteria(key: &str, value: Value) -> Criteria {
    Criteria::new(&[(key, value)]).unwrap()
}

/// A layout in the making: X gridlines 1, 2, 3 from the west, Y gridlines A, B, C from the south.
#[derive(Clone)]
pub(crate) struct Plan(pub(crate) Layout);

/// Gridlines at these positions, m.
pub(crate) fn plan(x: &[f64], y: &[f64]) -> Plan {
    let line = |name: String, axis, at: f64| Gridline { name, axis, position: TenthMm::from_m(at) };
    let letters = ('A'..='Z').map(String::from);
    let gridlines = (1..)
        .zip(x)
        .map(|(number, at)| line(number.to_string(), Axis::X, *at))
        .chain(letters.zip(y).map(|(letter, at)| line(letter, Axis::Y, *at)))
        .collect();
    Plan(Layout { gridlines, tolerance: TenthMm(10), support_width_mm: 250.0, ..Layout::default() })
}

impl Plan {
    fn line(&self, name: &str) -> GridlineId {
        GridlineId(self.0.gridlines.iter().position(|line| line.name == name).unwrap())
    }

    /// `1-3` or `A-B`.
    fn ends(&self, between: &str) -> [GridlineId; 2] {
        let (from, to) = between.split_once('-').unwrap();
        [self.line(from), self.line(to)]
    }

    /// A panel of 175 mm between gridlines such as `1-2`, `A-C`.
    pub(crate) fn panel(mut self, mark: &str, x: &str, y: &str) -> Plan {
        let ([x_from, x_to], [y_from, y_to]) = (self.ends(x), self.ends(y));
        self.0.panels.push(GridPanel {
            data: PanelData {
                mark: mark.to_owned(),
                thickness_mm: 175.0,
                loads: AreaLoads { finishes_kn_m2: 1.5, partitions_kn_m2: 1.0, imposed_kn_m2: 2.5 },
                spanning: Spanning::Found,
                corners: Corners::HeldDown,
                corners_stated: false,
                remarks: String::new(),
            },
            x_from,
            x_to,
            y_from,
            y_to,
            top_level_mm: 0.0,
            stated_edges: [None; 4],
            zone: String::new(),
        });
        self
    }

    pub(crate) fn with(mut self, mark: &str, change: impl FnOnce(&mut GridPanel)) -> Plan {
        change(self.0.panels.iter_mut().find(|panel| panel.data.mark == mark).unwrap());
        self
    }

    pub(crate) fn stated(self, mark: &str, side: Side, edge: StatedEdge) -> Plan {
        self.with(mark, |panel| panel.stated_edges[side.index()] = Some(edge))
    }

    pub(crate) fn spanning(self, mark: &str, spanning: Spanning) -> Plan {
        self.with(mark, |panel| panel.data.spanning = spanning)
    }

    pub(crate) fn imposed(self, mark: &str, kn_m2: f64) -> Plan {
        self.with(mark, |panel| panel.data.loads.imposed_kn_m2 = kn_m2)
    }

    fn stretch(&self, gridline: &str, between: &str) -> Stretch {
        let [from, to] = self.ends(between);
        Stretch { gridline: self.line(gridline), from: Some(from), to: Some(to) }
    }

    pub(crate) fn joint(mut self, gridline: &str, between: &str) -> Plan {
        let stretch = self.stretch(gridline, between);
        self.0.joints.push(Joint { stretch, remark: String::new() });
        self
    }

    /// Nothing under a stretch of a gridline.
    pub(crate) fn unsupported(mut self, gridline: &str, between: &str) -> Plan {
        let stretch = self.stretch(gridline, between);
        let (kind, remark) = (LineSupportKind::None, String::new());
        self.0.supports.push(LineSupport { stretch, kind, width_mm: 250.0, remark });
        self
    }

    /// A hole: its south-west corner from the panel's, and its widths, m.
    pub(crate) fn opening(mut self, mark: &str, corner: [f64; 2], widths: [f64; 2]) -> Plan {
        self.0.openings.push(Opening {
            panel: mark.to_owned(),
            from_west_m: corner[0],
            from_south_m: corner[1],
            width_x_m: widths[0],
            width_y_m: widths[1],
            remark: String::new(),
        });
        self
    }

    pub(crate) fn wall(
        mut self,
        mark: &str,
        along: Axis,
        offset_m: f64,
        ends: [f64; 2],
        load_kn_m: f64,
    ) -> Plan {
        let [from_m, to_m] = ends;
        let (panel, remark) = (mark.to_owned(), String::new());
        self.0.wall_loads.push(WallLoad { panel, along, offset_m, from_m, to_m, load_kn_m, remark });
        self
    }

    pub(crate) fn design(&self) -> Designed {
        self.design_by(&Criteria::default())
    }

    /// Lays out, fails on an error, designs.
    #[track_caller]
    pub(crate) fn design_by(&self, criteria: &Criteria) -> Designed {
        let (floor, mut queries) = lay_out(&self.0);
        let errors: Vec<&Query> = queries.iter().filter(|query| query.severity == Severity::Error).collect();
        assert!(errors.is_empty(), "{errors:?}");
        let design = design_floor(&floor, criteria);
        queries.extend(design.queries.iter().cloned());
        Designed { layout: self.0.clone(), floor, queries, design }
    }
}

/// A laid out and designed floor.
pub(crate) struct Designed {
    pub(crate) layout: Layout,
    pub(crate) floor: Floor,
    /// Those of the layout, then those of the design.
    pub(crate) queries: Vec<Query>,
    pub(crate) design: FloorDesign,
}

impl Designed {
    #[track_caller]
    pub(crate) fn id(&self, mark: &str) -> PanelId {
        PanelId(self.floor.panels.iter().position(|panel| panel.mark == mark).unwrap())
    }

    #[track_caller]
    pub(crate) fn laid(&self, mark: &str) -> &Panel {
        self.floor.panel(self.id(mark))
    }

    #[track_caller]
    pub(crate) fn panel(&self, mark: &str) -> &PanelDesign {
        &self.design.panels[self.id(mark).0]
    }

    #[track_caller]
    pub(crate) fn case(&self, mark: &str) -> usize {
        self.panel(mark).basis.unwrap().case.unwrap().number()
    }

    #[track_caller]
    pub(crate) fn section(&self, mark: &str, at: Place) -> &Section {
        self.panel(mark).section(at).unwrap_or_else(|| panic!("{mark} has no section at {at:?}"))
    }

    /// The design moment of a section.
    #[track_caller]
    pub(crate) fn moment(&self, mark: &str, at: Place) -> f64 {
        self.section(mark, at).moment_knm_m.unwrap()
    }

    /// The supports along a side, by their start.
    pub(crate) fn supports(&self, mark: &str, side: Side) -> Vec<&SupportDesign> {
        let segments = &self.laid(mark).edge(side).segments;
        segments.iter().filter_map(|segment| self.design.support(segment.support?)).collect()
    }

    /// The only support along a side.
    #[track_caller]
    pub(crate) fn support(&self, mark: &str, side: Side) -> &SupportDesign {
        let [only] = self.supports(mark, side)[..] else { panic!("not one support {side:?} of {mark}") };
        only
    }

    /// The moment a support has from the coefficient of one panel.
    #[track_caller]
    pub(crate) fn coefficient_moment(&self, support: &SupportDesign, mark: &str) -> f64 {
        let id = self.id(mark);
        let side = support.sides.iter().find(|side| side.panel == id).unwrap();
        side.moment_from_coefficient_knm_m.unwrap()
    }

    /// All checks of a kind at a place.
    pub(crate) fn checks(&self, mark: &str, kind: CheckKind, at: Place) -> Vec<&Check> {
        self.panel(mark).checks.iter().filter(|check| check.kind == kind && check.at == at).collect()
    }

    pub(crate) fn beam_loads(&self) -> BeamLoads {
        beam_loads(&self.layout, &self.floor, &self.design)
    }

    /// Whether a query of a weight names a panel and has these words.
    pub(crate) fn says(&self, mark: &str, severity: Severity, words: &str) -> bool {
        let about = |query: &&Query| match &query.subject {
            Subject::Panel { mark: named, .. } | Subject::Edge { mark: named, .. } => named == mark,
            _ => query.text.contains(mark),
        };
        let mut said = self.queries.iter().filter(about);
        said.any(|query| query.severity == severity && query.text.contains(words))
    }
}
