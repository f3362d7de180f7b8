//! A small invented floor with a design made by hand: two rows of two panels, one of which fails and one is
//! not designed, and a loose panel. Its numbers are plausible, all different, and come from no engine.

use std::cell::Cell;

use design_engine::bs8110::coefficients::PanelCase;
use design_engine::bs8110::corners::CornerState;
use design_engine::check::{Check, CheckKind, Place};
use design_engine::criteria::{Criteria, Value};
use design_engine::floor::*;
use design_engine::query::{Query, Severity, Subject};
use design_engine::result::*;
use detailing::model::BarSchedule;
use detailing::reissue::Register;

use crate::book::{Book, CellPlace, DefaultUsed, PlacedQuery, Places};
use crate::write::Submission;

pub(super) struct Sample {
    pub(super) book: Book,
    pub(super) bars: BarSchedule,
    pub(super) register: Register,
    pub(super) floor: Floor,
    pub(super) design: FloorDesign,
    pub(super) queries: Vec<PlacedQuery>,
}

impl Sample {
    pub(super) fn new() -> Sample {
        let floor = floor();
        let design = Numbers::default().design(&floor);
        let bars = detailing::detail(&floor, &design, &criteria(&[]));
        let register = detailing::reissue::register(&floor, &bars, Vec::new(), "B");
        Sample { book: book(), register, bars, floor, design, queries: queries() }
    }

    pub(super) fn submission(&self) -> Submission<'_> {
        Submission {
            bars: &self.bars,
            register: &self.register,
            changes: None,
            book: &self.book,
            floor: &self.floor,
            design: &self.design,
            queries: &self.queries,
            version: "0.0.0",
        }
    }
}

pub(super) fn criteria(more: &[(&str, &str)]) -> Criteria {
    let mut values = vec![
        ("project", "Invented clinic & day ward"),
        ("job_number", "007"),
        ("floor", "Level 2"),
        ("drawing_number", "D-201"),
        ("revision", "B"),
        ("prepared_by", "P. Example"),
        ("checked_by", "C. Example"),
        ("date", "2031-05-06"),
    ];
    values.extend(more);
    let values: Vec<(&str, Value)> =
        values.into_iter().map(|(key, text)| (key, Value::Text(text.to_owned()))).collect();
    Criteria::new(&values).unwrap()
}

fn book() -> Book {
    Book {
        name: "invented.xlsx".to_owned(),
        criteria: criteria(&[]),
        defaults_used: vec![DefaultUsed { key: "fcu_n_mm2" }, DefaultUsed { key: "layering" }],
        layout: Default::default(),
        queries: Vec::new(),
        places: Places::default(),
    }
}

fn queries() -> Vec<PlacedQuery> {
    let in_sheet = CellPlace {
        file: "invented.xlsx".to_owned(),
        sheet: Some("Panels".to_owned()),
        row: Some(6),
        column: Some(28),
        heading: Some("North edge".to_owned()),
    };
    vec![
        PlacedQuery {
            query: Query::panel(Severity::NotDesigned, "S4", Some("North edge"), "a free edge", "support it"),
            place: Some(in_sheet),
        },
        PlacedQuery {
            query: Query::new(Severity::Warning, Subject::Support("B/1-2".to_owned()), "=loads differ", ""),
            place: None,
        },
        PlacedQuery { query: Query::new(Severity::Note, Subject::Floor, "<r>a & b</r>", ""), place: None },
    ]
}

fn segment(line: [f64; 2], neighbour: Option<usize>, support: Option<usize>, why: &str) -> Segment {
    Segment {
        from: TenthMm::from_m(line[0]),
        to: TenthMm::from_m(line[1]),
        neighbour: neighbour.map(PanelId),
        continuous: support.is_some(),
        joint: false,
        support: support.map(SupportId),
        why: why.to_owned(),
    }
}

fn edge(line: [f64; 2], shared: Option<(usize, usize)>) -> Edge {
    let (state, why) = match shared {
        Some(_) => (EdgeState::Continuous, "shared over its length; no joint; level difference 0"),
        None => (EdgeState::Discontinuous, "no panel beyond"),
    };
    let (neighbour, support) = (shared.map(|shared| shared.0), shared.map(|shared| shared.1));
    Edge {
        state,
        stated: false,
        why: why.to_owned(),
        segments: vec![segment(line, neighbour, support, why)],
        support_width_mm: 250.0,
    }
}

fn panel(mark: &str, x: [f64; 2], y: [f64; 2], thickness_mm: f64, edges: [Edge; 4]) -> Panel {
    let plan = PlanRect {
        x0: TenthMm::from_m(x[0]),
        x1: TenthMm::from_m(x[1]),
        y0: TenthMm::from_m(y[0]),
        y1: TenthMm::from_m(y[1]),
    };
    Panel {
        mark: mark.to_owned(),
        plan: Some(plan),
        spans_m: [x[1] - x[0], y[1] - y[0]],
        thickness_mm,
        loads: AreaLoads { finishes_kn_m2: 1.3, partitions_kn_m2: 0.9, imposed_kn_m2: 3.1 },
        spanning: Spanning::Found,
        corners: Corners::HeldDown,
        corners_stated: false,
        top_level_mm: 0.0,
        edges,
        chosen_bottom: [None, None],
        openings: Vec::new(),
        line_loads: Vec::new(),
        not_designed: None,
    }
}

fn support(name: &str, axis: Axis, line: [f64; 2], near: (usize, Side), far: (usize, Side)) -> Support {
    let side = |(panel, side)| SupportSide { panel: PanelId(panel), side };
    Support {
        name: Some(name.to_owned()),
        gridline: name.split('/').next().map(str::to_owned),
        axis,
        from: TenthMm::from_m(line[0]),
        to: TenthMm::from_m(line[1]),
        width_mm: 250.0,
        kind: SupportKind::Hogging,
        near: side(near),
        far: Some(side(far)),
        chosen: None,
    }
}

/// Gridlines A, B, C at 0, 5.8, 11.9 m; 1, 2, 3 at 0, 6.7, 12.1 m.
fn floor() -> Floor {
    let (ab, bc, l12, l23) = ([0.0, 5.8], [5.8, 11.9], [0.0, 6.7], [6.7, 12.1]);
    let mut s4 = panel(
        "S4",
        bc,
        l23,
        175.0,
        [edge(bc, None), edge(l23, None), edge(bc, Some((1, 3))), edge(l23, Some((2, 2)))],
    );
    s4.edges[0].state = EdgeState::Free;
    s4.edges[0].stated = true;
    s4.edges[0].why = "+ open side over the stair".to_owned();
    let mut loose = panel(
        "12",
        [0.0, 3.9],
        [0.0, 8.3],
        150.0,
        [edge([0.0, 3.9], None), edge([0.0, 8.3], None), edge([0.0, 3.9], None), edge([0.0, 8.3], None)],
    );
    loose.plan = None;
    loose.edges[Side::West.index()].state = EdgeState::Continuous;
    loose.edges[Side::West.index()].stated = true;
    loose.edges[Side::West.index()].segments[0].continuous = true;
    loose.edges[Side::West.index()].segments[0].support = Some(SupportId(4));
    let own = Support {
        name: None,
        gridline: None,
        far: None,
        ..support("-", Axis::X, [0.0, 8.3], (4, Side::West), (4, Side::West))
    };
    Floor {
        panels: vec![
            panel(
                "S1",
                ab,
                l12,
                160.0,
                [edge(ab, Some((2, 1))), edge(l12, Some((1, 0))), edge(ab, None), edge(l12, None)],
            ),
            panel(
                "S2",
                bc,
                l12,
                165.0,
                [edge(bc, Some((3, 3))), edge(l12, None), edge(bc, None), edge(l12, Some((0, 0)))],
            ),
            panel(
                "S3",
                ab,
                l23,
                170.0,
                [edge(ab, None), edge(l23, Some((3, 2))), edge(ab, Some((0, 1))), edge(l23, None)],
            ),
            s4,
            loose,
        ],
        supports: vec![
            support("B/1-2", Axis::X, l12, (0, Side::East), (1, Side::West)),
            support("2/A-B", Axis::Y, ab, (0, Side::North), (2, Side::South)),
            support("B/2-3", Axis::X, l23, (2, Side::East), (3, Side::West)),
            support("2/B-C", Axis::Y, bc, (1, Side::North), (3, Side::South)),
            own,
        ],
    }
}

/// Makes numbers that are all different.
#[derive(Default)]
struct Numbers {
    made: Cell<u32>,
}

impl Numbers {
    /// About `size`, never twice the same, with more digits than anything prints.
    fn about(&self, size: f64) -> f64 {
        self.made.set(self.made.get() + 1);
        size * (1.0 + f64::from(self.made.get()) * 0.000_731_1 + 1e-9 / 3.0)
    }

    fn some(&self, size: f64) -> Option<f64> {
        Some(self.about(size))
    }

    fn design(&self, floor: &Floor) -> FloorDesign {
        let panels = (0..floor.panels.len()).map(|index| self.panel(floor, PanelId(index))).collect();
        let supports = (0..floor.supports.len()).map(|index| self.support(floor, SupportId(index))).collect();
        FloorDesign {
            panels,
            supports,
            queries: Vec::new(),
            assumptions: vec!["Edge strips carry the bars of the middle strip.".to_owned()],
        }
    }

    fn panel(&self, floor: &Floor, id: PanelId) -> PanelDesign {
        let panel = floor.panel(id);
        let design = PanelDesign {
            panel: id,
            not_designed: None,
            basis: Some(Basis {
                short_along: if panel.spans_m[0] <= panel.spans_m[1] { Axis::X } else { Axis::Y },
                lx_m: self.about(panel.spans_m[0].min(panel.spans_m[1])),
                ly_m: self.about(panel.spans_m[0].max(panel.spans_m[1])),
                action: Action::TwoWayRestrained,
                main_span: Span::Short,
                case: Some(PanelCase { long_discontinuous: 1, short_discontinuous: 1 }),
                states: [0, 1, 2, 3].map(|index| panel.edges[index].state),
            }),
            edge_states: [0, 1, 2, 3].map(|index| panel.edges[index].state),
            loads: LoadBuildUp {
                self_weight_kn_m2: self.about(4.0),
                finishes_kn_m2: self.about(1.3),
                partitions_kn_m2: self.about(0.9),
                dead_kn_m2: self.about(6.2),
                imposed_kn_m2: self.about(3.1),
                ultimate_kn_m2: self.about(13.6),
            },
            sections: self.sections(panel),
            checks: self.checks(panel),
            corners: self.corners(panel),
            openings: self.openings(panel),
            side_loads: [0, 1, 2, 3].map(|_| Some(self.side_load())),
            total_ultimate_kn: self.about(400.0),
            bars: PanelBars::default(),
            deflection: Some(DeflectionWorking {
                basic: self.about(26.0),
                fs_n_mm2: self.about(280.0),
                modification_factor: self.about(1.2),
            }),
            governing: Some(2),
            thickness_governed_by: Some(CheckKind::Deflection),
            least_thickness_mm: (panel.mark == "S3").then(|| self.about(180.0)),
        };
        if panel.mark != "S4" {
            return design;
        }
        PanelDesign {
            not_designed: Some("its north edge is free".to_owned()),
            basis: None,
            sections: Vec::new(),
            checks: Vec::new(),
            corners: Vec::new(),
            openings: Vec::new(),
            side_loads: [None; 4],
            total_ultimate_kn: 0.0,
            deflection: None,
            governing: None,
            thickness_governed_by: None,
            ..design
        }
    }

    fn corners(&self, panel: &Panel) -> Vec<CornerDesign> {
        if panel.is_loose() {
            return Vec::new();
        }
        let four = || [0, 1, 2, 3].map(|_| self.about(180.0));
        vec![CornerDesign {
            sides: [Side::North, Side::East],
            state: CornerState::OneContinuous,
            extent_m: self.about(1.1),
            as_required_mm2_m: self.about(110.0),
            as_present_mm2_m: four(),
            as_to_add_mm2_m: four(),
        }]
    }

    /// One that cuts two layers in S1, one that moves bars in S2.
    fn openings(&self, panel: &Panel) -> Vec<OpeningDesign> {
        let cut = |layer| CutLayer {
            layer,
            bars_along: Axis::Y,
            at: Place::LongMidspan,
            bars: BarChoice { bar_mm: self.about(10.0), spacing_mm: self.about(200.0) },
            cut: self.about(4.0),
            each_side_mm2: self.about(157.0),
        };
        let layers = match panel.mark.as_str() {
            "S1" => vec![cut(Layer::B1), cut(Layer::B2)],
            "S2" => Vec::new(),
            _ => return Vec::new(),
        };
        vec![OpeningDesign {
            opening: PanelOpening {
                from_west_m: self.about(1.0),
                from_south_m: self.about(1.2),
                widths_m: [self.about(0.7), self.about(0.8)],
            },
            displaced: layers.is_empty(),
            layers,
            over_quarter_of_span: false,
            within_d_of_support: false,
        }]
    }

    fn side_load(&self) -> SideLoad {
        SideLoad {
            dead_kn_m: self.about(11.0),
            imposed_kn_m: self.about(5.0),
            ultimate_kn_m: self.about(24.0),
            loaded_share: 0.75,
        }
    }

    fn sections(&self, panel: &Panel) -> Vec<Section> {
        let mut sections = vec![
            self.section(Place::ShortMidspan, None, Layer::B1),
            self.section(Place::LongMidspan, None, Layer::B2),
        ];
        for side in Side::ALL {
            for segment in panel.edge(side).segments.iter().filter(|segment| segment.support.is_some()) {
                sections.push(self.section(Place::Side(side), segment.support, Layer::T1));
            }
        }
        if panel.mark == "S3" {
            let too_thin = &mut sections[1];
            (too_thin.z_mm, too_thin.as_bending_mm2_m, too_thin.as_required_mm2_m) = (None, None, None);
        }
        sections
    }

    fn section(&self, at: Place, support: Option<SupportId>, layer: Layer) -> Section {
        Section {
            at,
            support,
            layer,
            bars_along: Axis::X,
            coefficient: self.some(0.05),
            moment_from_coefficient_knm_m: self.some(14.0),
            moment_balanced_knm_m: self.some(15.0),
            moment_knm_m: self.some(15.5),
            d_mm: self.about(128.0),
            k: self.some(0.04),
            z_mm: self.some(120.0),
            as_bending_mm2_m: self.some(290.0),
            as_minimum_mm2_m: self.about(208.0),
            as_required_mm2_m: self.some(291.0),
            bars: BarChoice { bar_mm: 10.0, spacing_mm: 225.0 },
            as_provided_mm2_m: self.about(349.0),
            stated: false,
        }
    }

    fn checks(&self, panel: &Panel) -> Vec<Check> {
        let fails = panel.mark == "S3";
        let most = |kind, at, clause, demand, limit, unit| {
            Check::at_most(kind, at, clause, self.about(demand), self.about(limit), unit)
        };
        let mut checks = vec![
            most(CheckKind::Bending, Place::ShortMidspan, "3.4.4.4", 291.0, 349.0, "mm2/m"),
            most(
                CheckKind::Shear,
                Place::Side(Side::East),
                "3.5.5",
                if fails { 0.64 } else { 0.21 },
                0.55,
                "N/mm2",
            ),
            most(
                CheckKind::Deflection,
                Place::ShortMidspan,
                "3.5.7",
                if fails { 41.0 } else { 28.0 },
                34.0,
                "",
            ),
            most(CheckKind::BarSpacing, Place::ShortMidspan, "3.12.11.2.7", 215.0, 375.0, "mm"),
        ];
        if fails {
            checks.push(Check::not_allowed(
                CheckKind::CoverForDurability,
                Place::Panel,
                "Table 3.3",
                self.about(30.0),
                self.about(35.0),
                "N/mm2",
            ));
        }
        checks
    }

    fn support(&self, floor: &Floor, id: SupportId) -> SupportDesign {
        let support = floor.support(id);
        let designed = |side: &SupportSide| floor.panel(side.panel).mark != "S4";
        let sides: Vec<SupportSideDesign> =
            support.sides().filter(designed).map(|side| self.support_side(side.panel)).collect();
        let both = sides.len() == 2;
        SupportDesign {
            support: id,
            balanced: both,
            moment_knm_m: self.some(19.0),
            difference_pct: both.then(|| self.about(14.0)),
            load_ratio: both.then(|| self.about(0.93)),
            span_ratio: both.then(|| self.about(0.81)),
            layer: Layer::T1,
            outside_mm: 0.0,
            d_mm: self.about(129.0),
            as_bending_mm2_m: self.some(372.0),
            as_required_mm2_m: self.some(373.0),
            bars: BarChoice { bar_mm: 12.0, spacing_mm: 275.0 },
            as_provided_mm2_m: self.about(411.0),
            alternate_reversed: both,
            stated: both,
            sides,
        }
    }

    fn support_side(&self, panel: PanelId) -> SupportSideDesign {
        SupportSideDesign {
            panel,
            moment_from_coefficient_knm_m: self.some(18.0),
            midspan_before_knm_m: self.about(13.0),
            midspan_after_knm_m: self.about(13.5),
            stiffness: self.about(600_000.0),
            extension_m: self.about(1.6),
            short_extension_m: self.about(0.8),
            from_contraflexure: false,
            runs_through: false,
            distribution: None,
        }
    }
}
