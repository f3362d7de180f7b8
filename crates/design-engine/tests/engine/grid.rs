//! Floors for the tests, built straight from the engine's types: rows and columns of panels, voids, joints,
//! stated edges; and the same floor turned or mirrored.

use design_engine::floor::{
    AreaLoads, Axis, Corners, Edge, EdgeState, Floor, Panel, PanelId, PlanRect, Segment, Side, Spanning,
    Support, SupportId, SupportKind, SupportSide, TenthMm,
};
use design_engine::result::{FloorDesign, PanelDesign, SupportDesign};

/// What may differ from panel to panel.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Cell {
    pub(crate) mark: String,
    pub(crate) thickness_mm: f64,
    pub(crate) loads: AreaLoads,
    pub(crate) spanning: Spanning,
    pub(crate) corners: Corners,
    pub(crate) top_level_mm: f64,
    /// Stated edges, in the order of [`Side::ALL`].
    pub(crate) stated: [Option<EdgeState>; 4],
}

/// Rows and columns of panels; columns run from west to east, rows from south to north.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Grid {
    pub(crate) columns: Vec<f64>,
    pub(crate) rows: Vec<f64>,
    /// By row, then by column; none is a void.
    cells: Vec<Option<Cell>>,
    /// Edges with a movement joint.
    joints: Vec<(usize, usize, Side)>,
    pub(crate) width_mm: f64,
}

/// What a panel's side comes to.
#[derive(Debug, Clone, Copy, PartialEq)]
enum Verdict {
    /// Hogging moment is carried across.
    Carries,
    /// Bars cross, no moment is claimed.
    Crosses,
    /// Nothing crosses.
    Ends(EdgeState),
}

/// Plan sides after a quarter turn to the left: east becomes north.
pub(crate) fn turned_side(side: Side) -> Side {
    match side {
        Side::East => Side::North,
        Side::North => Side::West,
        Side::West => Side::South,
        Side::South => Side::East,
    }
}

/// Plan sides seen in a mirror along the north line: east becomes west.
pub(crate) fn mirrored_side(side: Side) -> Side {
    if side.span_axis() == Axis::X { side.opposite() } else { side }
}

impl Grid {
    /// Panels `A1`, `B1`, ... (column letter, row number) of 150 mm, 1.5 + 1.0 + 2.5 kN/m2; spans in m.
    pub(crate) fn new(columns: &[f64], rows: &[f64]) -> Grid {
        let mut cells = Vec::new();
        for row in 1..=rows.len() {
            for column in b'A'..b'A' + u8::try_from(columns.len()).unwrap() {
                cells.push(Some(Cell {
                    mark: format!("{}{row}", char::from(column)),
                    thickness_mm: 150.0,
                    loads: AreaLoads { finishes_kn_m2: 1.5, partitions_kn_m2: 1.0, imposed_kn_m2: 2.5 },
                    spanning: Spanning::Found,
                    corners: Corners::HeldDown,
                    top_level_mm: 0.0,
                    stated: [None; 4],
                }));
            }
        }
        Grid { columns: columns.to_vec(), rows: rows.to_vec(), cells, joints: Vec::new(), width_mm: 250.0 }
    }

    /// One panel with its edges stated north, east, south, west: `c` continuous, `d` discontinuous, `f` free.
    pub(crate) fn panel(x_m: f64, y_m: f64, edges: &str) -> Grid {
        let states: Vec<EdgeState> = edges
            .chars()
            .map(|letter| match letter {
                'c' => EdgeState::Continuous,
                'd' => EdgeState::Discontinuous,
                'f' => EdgeState::Free,
                other => panic!("no edge state {other}"),
            })
            .collect();
        Grid::new(&[x_m], &[y_m]).with("A1", |cell| {
            cell.stated = std::array::from_fn(|side| Some(states[side]));
        })
    }

    /// Marks of the panels that are there, row by row.
    pub(crate) fn marks(&self) -> Vec<String> {
        self.cells.iter().flatten().map(|cell| cell.mark.clone()).collect()
    }

    /// Changes one panel.
    pub(crate) fn with(mut self, mark: &str, change: impl FnOnce(&mut Cell)) -> Grid {
        let cell = self.cells.iter_mut().flatten().find(|cell| cell.mark == mark);
        change(cell.unwrap_or_else(|| panic!("no panel {mark}")));
        self
    }

    /// Changes every panel.
    pub(crate) fn with_all(mut self, change: impl FnMut(&mut Cell)) -> Grid {
        self.cells.iter_mut().flatten().for_each(change);
        self
    }

    /// Takes a panel out.
    pub(crate) fn void(mut self, mark: &str) -> Grid {
        for cell in &mut self.cells {
            if cell.as_ref().is_some_and(|cell| cell.mark == mark) {
                *cell = None;
            }
        }
        self
    }

    /// A movement joint on a side of a panel.
    pub(crate) fn joint(mut self, mark: &str, side: Side) -> Grid {
        let index = self.cells.iter().position(|cell| cell.as_ref().is_some_and(|cell| cell.mark == mark));
        let index = index.unwrap();
        let (column, row) = (index % self.columns.len(), index / self.columns.len());
        self.joints.push((column, row, side));
        if let Some((column, row)) = self.beyond(column, row, side) {
            self.joints.push((column, row, side.opposite()));
        }
        self
    }

    fn at(&self, column: usize, row: usize) -> Option<&Cell> {
        self.cells[row * self.columns.len() + column].as_ref()
    }

    fn beyond(&self, column: usize, row: usize, side: Side) -> Option<(usize, usize)> {
        let (column, row) = match side {
            Side::North => (column, row + 1),
            Side::South => (column, row.checked_sub(1)?),
            Side::East => (column + 1, row),
            Side::West => (column.checked_sub(1)?, row),
        };
        (column < self.columns.len() && row < self.rows.len()).then_some((column, row))
    }

    /// The same floor turned a quarter to the left.
    pub(crate) fn turned(&self) -> Grid {
        let (width, height) = (self.columns.len(), self.rows.len());
        let columns: Vec<f64> = self.rows.iter().rev().copied().collect();
        let moved = |column: usize, row: usize| (height - 1 - row, column);
        self.moved(columns, self.columns.clone(), height, width, moved, turned_side, Axis::across)
    }

    /// The same floor seen in a mirror along the north line.
    pub(crate) fn mirrored(&self) -> Grid {
        let (width, height) = (self.columns.len(), self.rows.len());
        let columns: Vec<f64> = self.columns.iter().rev().copied().collect();
        let moved = |column: usize, row: usize| (width - 1 - column, row);
        self.moved(columns, self.rows.clone(), width, height, moved, mirrored_side, |axis| axis)
    }

    #[expect(clippy::too_many_arguments, reason = "what a movement of the plan is made of")]
    fn moved(
        &self,
        columns: Vec<f64>,
        rows: Vec<f64>,
        width: usize,
        height: usize,
        to: impl Fn(usize, usize) -> (usize, usize),
        side_to: fn(Side) -> Side,
        axis_to: fn(Axis) -> Axis,
    ) -> Grid {
        let mut cells = vec![None; width * height];
        for (index, cell) in self.cells.iter().enumerate() {
            let (column, row) = to(index % self.columns.len(), index / self.columns.len());
            cells[row * width + column] = cell.clone().map(|mut cell| {
                if let Spanning::OneWay(axis) = cell.spanning {
                    cell.spanning = Spanning::OneWay(axis_to(axis));
                }
                for side in Side::ALL {
                    cell.stated[side_to(side).index()] = self.stated_at(index, side);
                }
                cell
            });
        }
        let joints = self
            .joints
            .iter()
            .map(|&(column, row, side)| {
                let (column, row) = to(column, row);
                (column, row, side_to(side))
            })
            .collect();
        Grid { columns, rows, cells, joints, width_mm: self.width_mm }
    }

    fn stated_at(&self, index: usize, side: Side) -> Option<EdgeState> {
        self.cells[index].as_ref().and_then(|cell| cell.stated[side.index()])
    }

    /// The axis of a one-way panel.
    fn one_way(&self, column: usize, row: usize) -> Option<Axis> {
        let (x, y) = (self.columns[column], self.rows[row]);
        let cell = self.at(column, row)?;
        match cell.spanning {
            Spanning::OneWay(axis) => Some(axis),
            Spanning::Found if x.max(y) / x.min(y) > 2.0 + 1e-9 => {
                Some(if x < y { Axis::X } else { Axis::Y })
            }
            _ => None,
        }
    }

    /// The floor; panels in the order of their marks, so that a moved floor keeps each panel's index.
    pub(crate) fn build(&self) -> Floor {
        let mut places: Vec<(usize, usize)> = (0..self.rows.len())
            .flat_map(|row| (0..self.columns.len()).map(move |column| (column, row)))
            .filter(|&(column, row)| self.at(column, row).is_some())
            .collect();
        places.sort_by_key(|&(column, row)| &self.at(column, row).unwrap().mark);
        let mut floor = Floor::default();
        for &(column, row) in &places {
            floor.panels.push(self.panel_at(column, row));
        }
        for (index, &(column, row)) in places.iter().enumerate() {
            for side in Side::ALL {
                let far = self.beyond(column, row, side);
                let far = far.and_then(|place| places.iter().position(|known| *known == place)).map(PanelId);
                self.lay_edge(&mut floor, PanelId(index), (column, row), side, far);
            }
        }
        floor
    }

    fn panel_at(&self, column: usize, row: usize) -> Panel {
        let cell = self.at(column, row).unwrap();
        let start = |lengths: &[f64], index: usize| TenthMm::from_m(lengths[..index].iter().sum());
        let plan = PlanRect {
            x0: start(&self.columns, column),
            x1: start(&self.columns, column + 1),
            y0: start(&self.rows, row),
            y1: start(&self.rows, row + 1),
        };
        let empty = Edge {
            state: EdgeState::Discontinuous,
            stated: false,
            why: String::new(),
            segments: Vec::new(),
            support_width_mm: self.width_mm,
        };
        Panel {
            mark: cell.mark.clone(),
            plan: Some(plan),
            spans_m: [plan.length_m(Axis::X), plan.length_m(Axis::Y)],
            thickness_mm: cell.thickness_mm,
            loads: cell.loads,
            spanning: cell.spanning,
            corners: cell.corners,
            corners_stated: cell.corners == Corners::FreeToLift,
            top_level_mm: cell.top_level_mm,
            edges: [empty.clone(), empty.clone(), empty.clone(), empty],
            chosen_bottom: [None; 2],
            openings: Vec::new(),
            line_loads: Vec::new(),
            not_designed: None,
        }
    }

    /// What a panel's side comes to: a stated edge wins; else it carries hogging to a neighbour that takes it, with no
    /// joint and a step in the top of at most 25 mm; bars only cross beside the side of a one-way panel.
    fn verdict(&self, (column, row): (usize, usize), side: Side) -> Verdict {
        let cell = self.at(column, row).unwrap();
        if let Some(state) = cell.stated[side.index()] {
            return if state == EdgeState::Continuous { Verdict::Carries } else { Verdict::Ends(state) };
        }
        let ends = Verdict::Ends(EdgeState::Discontinuous);
        let Some(place) = self.beyond(column, row, side) else { return ends };
        let Some(other) = self.at(place.0, place.1) else { return ends };
        let refuses =
            other.stated[side.opposite().index()].is_some_and(|state| state != EdgeState::Continuous);
        let step = (cell.top_level_mm - other.top_level_mm).abs() > 25.0;
        if refuses || step || self.joints.contains(&(column, row, side)) {
            return ends;
        }
        let beside =
            |place: (usize, usize)| self.one_way(place.0, place.1).is_some_and(|way| way != side.span_axis());
        if beside((column, row)) || beside(place) { Verdict::Crosses } else { Verdict::Carries }
    }

    /// One edge of a panel. A support that both sides carry over is shared, its near panel west or south of it.
    fn lay_edge(
        &self,
        floor: &mut Floor,
        id: PanelId,
        place: (usize, usize),
        side: Side,
        neighbour: Option<PanelId>,
    ) {
        let verdict = self.verdict(place, side);
        let beyond = self.beyond(place.0, place.1, side).filter(|_| neighbour.is_some());
        let shared = beyond.is_some_and(|beyond| self.verdict(beyond, side.opposite()) == verdict);
        let plan = floor.panel(id).plan.unwrap();
        let (from, to) = if side.span_axis() == Axis::X { (plan.y0, plan.y1) } else { (plan.x0, plan.x1) };
        let kind = match verdict {
            Verdict::Carries => Some(SupportKind::Hogging),
            Verdict::Crosses if shared => Some(SupportKind::Crossing),
            _ => None,
        };
        let support = kind.map(|kind| {
            let own = SupportSide { panel: id, side };
            let other = neighbour.filter(|_| shared);
            let other = other.map(|panel| SupportSide { panel, side: side.opposite() });
            let (near, far) = match other {
                Some(other) if matches!(side, Side::West | Side::South) => (other, Some(own)),
                other => (own, other),
            };
            if let Some(known) = floor.supports.iter().position(|s| (s.near, s.far) == (near, far)) {
                return SupportId(known);
            }
            let mark = |side: SupportSide| floor.panel(side.panel).mark.clone();
            let name = far.map(|far| {
                let (one, other) = (mark(near), mark(far));
                if one < other { format!("{one}/{other}") } else { format!("{other}/{one}") }
            });
            floor.supports.push(Support {
                name,
                gridline: None,
                axis: side.span_axis(),
                from,
                to,
                width_mm: self.width_mm,
                kind,
                near,
                far,
                chosen: None,
            });
            SupportId(floor.supports.len() - 1)
        });
        let edge = &mut floor.panels[id.0].edges[side.index()];
        edge.state = match verdict {
            Verdict::Carries => EdgeState::Continuous,
            Verdict::Crosses => EdgeState::Discontinuous,
            Verdict::Ends(state) => state,
        };
        edge.stated = self.at(place.0, place.1).unwrap().stated[side.index()].is_some();
        edge.segments = vec![Segment {
            from,
            to,
            neighbour,
            continuous: verdict == Verdict::Carries,
            joint: false,
            support,
            why: String::new(),
        }];
    }
}

/// The index of a panel.
pub(crate) fn id_of(floor: &Floor, mark: &str) -> PanelId {
    PanelId(floor.panels.iter().position(|panel| panel.mark == mark).unwrap())
}

/// A panel's design by its mark.
pub(crate) fn panel_design<'a>(floor: &Floor, design: &'a FloorDesign, mark: &str) -> &'a PanelDesign {
    &design.panels[id_of(floor, mark).0]
}

/// The support on a side of a panel.
pub(crate) fn support_on(floor: &Floor, mark: &str, side: Side) -> SupportId {
    floor.panel(id_of(floor, mark)).edge(side).segments[0].support.unwrap()
}

/// The design of the support on a side of a panel.
pub(crate) fn support_design<'a>(
    floor: &Floor,
    design: &'a FloorDesign,
    mark: &str,
    side: Side,
) -> &'a SupportDesign {
    design.support(support_on(floor, mark, side)).unwrap()
}
