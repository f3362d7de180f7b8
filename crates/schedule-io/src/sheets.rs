//! The sheets of a floor book and their columns: one table that drives the reader, the starter book and
//! the description of the floor book.

use design_engine::criteria::SETTINGS;
use design_engine::floor::{Axis, Corners, Side, Spanning};
use design_engine::ranges::{
    BAR_SIZES_MM, DEAD_KN_M2, IMPOSED_KN_M2, LINE_LOAD_KN_M, POSITION_M, Range, SPACING_MM, SPAN_M,
    SUPPORT_WIDTH_MM, THICKNESS_MM, TOP_LEVEL_MM, WITHIN_PANEL_M,
};
use floor_grid::layout::{ChosenPosition, LineSupportKind, StatedEdge};

/// What a column holds.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Holds {
    /// A name that the row gives, such as a panel's mark.
    Name,
    /// The name of a gridline of an axis, or of either.
    Gridline(Option<Axis>),
    /// The mark of a panel.
    Mark,
    /// A number in a range.
    Number(Range),
    /// A number above zero, up to a limit.
    Above0(f64),
    /// One of some numbers.
    OneOf(&'static [f64]),
    /// One of some words.
    Words(&'static [&'static str]),
    /// Any text.
    Text,
    /// The value of a criteria item, which says itself what is allowed.
    ItemValue,
}

impl Holds {
    /// What is allowed, in words, for messages and input notes.
    #[must_use]
    pub fn describe(&self) -> String {
        match self {
            Holds::Name => "a name of up to 40 characters".to_owned(),
            Holds::Gridline(None) => "the name of a gridline".to_owned(),
            Holds::Gridline(Some(Axis::X)) => "the name of an X gridline".to_owned(),
            Holds::Gridline(Some(Axis::Y)) => "the name of a Y gridline".to_owned(),
            Holds::Mark => "the mark of a panel".to_owned(),
            Holds::Number(range) => range.describe(),
            Holds::Above0(greatest) => format!("above 0, up to {greatest}"),
            Holds::OneOf(values) => {
                format!("one of {}", values.iter().map(f64::to_string).collect::<Vec<_>>().join(", "))
            }
            Holds::Words(words) => words.join(" | "),
            Holds::Text => "any text".to_owned(),
            Holds::ItemValue => "what the item allows".to_owned(),
        }
    }
}

/// A column of a sheet.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Column {
    /// Heading without its unit.
    pub heading: &'static str,
    /// Unit as the heading prints it in brackets; empty where there is none.
    pub unit: &'static str,
    /// What its cells hold.
    pub holds: Holds,
    /// Whether the column must be there; see also [`Column::every_row`].
    pub required: bool,
    /// What it is for, and what a blank means.
    pub note: &'static str,
}

impl Column {
    const fn new(heading: &'static str, unit: &'static str, holds: Holds, note: &'static str) -> Column {
        Column { heading, unit, holds, required: false, note }
    }

    const fn required(mut self) -> Column {
        self.required = true;
        self
    }

    /// Whether every row must fill it: an item of the criteria may be left without a value.
    #[must_use]
    pub fn every_row(&self) -> bool {
        self.required && self.holds != Holds::ItemValue
    }

    /// Heading as it is printed, with the unit in brackets.
    #[must_use]
    pub fn title(&self) -> String {
        title(self.heading, self.unit)
    }
}

/// A name with its unit in brackets, where it has one.
#[must_use]
pub fn title(name: &str, unit: &str) -> String {
    if unit.is_empty() { name.to_owned() } else { format!("{name} ({unit})") }
}

/// A sheet of the floor book.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Sheet {
    /// Name of the sheet in a workbook.
    pub name: &'static str,
    /// Name of the file in a folder of CSV files.
    pub csv: &'static str,
    /// What a row of it is.
    pub about: &'static str,
    /// Its columns in their order.
    pub columns: &'static [Column],
}

impl Sheet {
    /// The column with a heading.
    #[must_use]
    pub fn column(&self, heading: &str) -> Option<&'static Column> {
        self.columns.iter().find(|column| column.heading == heading)
    }
}

/// Words of a column beside what each stands for.
pub(crate) struct Words<T: 'static, const N: usize> {
    pub(crate) words: [&'static str; N],
    pub(crate) mean: [T; N],
}

pub(crate) static AXES: Words<Axis, 2> = Words { words: ["X", "Y"], mean: [Axis::X, Axis::Y] };
pub(crate) static SPANNING: Words<Spanning, 4> = Words {
    words: ["two-way", "one-way x", "one-way y", "cantilever"],
    mean: [Spanning::TwoWay, Spanning::OneWay(Axis::X), Spanning::OneWay(Axis::Y), Spanning::Cantilever],
};
/// A loose panel's short span is laid along x.
pub(crate) static LOOSE_SPANNING: Words<Spanning, 4> = Words {
    words: ["two-way", "one-way short", "one-way long", "cantilever"],
    mean: [Spanning::TwoWay, Spanning::OneWay(Axis::X), Spanning::OneWay(Axis::Y), Spanning::Cantilever],
};
pub(crate) static CORNERS: Words<Corners, 2> =
    Words { words: ["held down", "free to lift"], mean: [Corners::HeldDown, Corners::FreeToLift] };
pub(crate) static EDGES: Words<StatedEdge, 3> = Words {
    words: ["continuous", "discontinuous", "free"],
    mean: [StatedEdge::Continuous, StatedEdge::Discontinuous, StatedEdge::Free],
};
pub(crate) static KINDS: Words<LineSupportKind, 3> = Words {
    words: ["beam", "wall", "none"],
    mean: [LineSupportKind::Beam, LineSupportKind::Wall, LineSupportKind::None],
};
/// The first six are for panels on gridlines, the first two and the last four for loose panels.
pub(crate) static POSITIONS: Words<(ChosenPosition, Option<bool>), 10> = Words {
    words: [
        "short bottom",
        "long bottom",
        "north top",
        "east top",
        "south top",
        "west top",
        "long edge 1 top",
        "long edge 2 top",
        "short edge 1 top",
        "short edge 2 top",
    ],
    mean: [
        (ChosenPosition::ShortBottom, None),
        (ChosenPosition::LongBottom, None),
        (ChosenPosition::Top(Side::North), Some(false)),
        (ChosenPosition::Top(Side::East), Some(false)),
        (ChosenPosition::Top(Side::South), Some(false)),
        (ChosenPosition::Top(Side::West), Some(false)),
        (ChosenPosition::Top(Side::West), Some(true)),
        (ChosenPosition::Top(Side::East), Some(true)),
        (ChosenPosition::Top(Side::South), Some(true)),
        (ChosenPosition::Top(Side::North), Some(true)),
    ],
};

const FROM_CRITERIA: &str = "blank: from Criteria";
const EDGE: &str = "blank: found from the layout; a stated edge wins and the remark is its reason";
const LOOSE_EDGE: &str = "blank: discontinuous";

const THICKNESS: Column = Column::new("Thickness", "mm", Holds::Number(THICKNESS_MM), FROM_CRITERIA);
const FINISHES: Column = Column::new("Finishes", "kN/m2", Holds::Number(DEAD_KN_M2), FROM_CRITERIA);
const PARTITIONS: Column = Column::new("Partitions", "kN/m2", Holds::Number(DEAD_KN_M2), FROM_CRITERIA);
const IMPOSED: Column = Column::new("Imposed", "kN/m2", Holds::Number(IMPOSED_KN_M2), FROM_CRITERIA);
const CORNERS_COLUMN: Column = Column::new(
    "Corners",
    "",
    Holds::Words(&CORNERS.words),
    "free to lift: only where all four edges are discontinuous",
);
const REMARKS: Column = Column::new("Remarks", "", Holds::Text, "repeated in the schedule");
const REMARK: Column = Column::new("Remark", "", Holds::Text, "");

const fn edge(heading: &'static str) -> Column {
    Column::new(heading, "", Holds::Words(&EDGES.words), EDGE)
}

const fn loose_edge(heading: &'static str) -> Column {
    Column::new(heading, "", Holds::Words(&EDGES.words), LOOSE_EDGE)
}

const fn gridline(heading: &'static str, axis: Option<Axis>, note: &'static str) -> Column {
    Column::new(heading, "", Holds::Gridline(axis), note)
}

/// The `Criteria` sheet; its items are [`SETTINGS`].
pub static CRITERIA: Sheet = Sheet {
    name: "Criteria",
    csv: "criteria.csv",
    about: "one setting of the floor",
    columns: &[
        Column::new("Item", "", Holds::Name, "an item of the list").required(),
        Column::new("Value", "", Holds::ItemValue, "blank: the default").required(),
        Column::new("Unit", "", Holds::Text, "blank: the unit of the list"),
        REMARK,
    ],
};

/// The `Gridlines` sheet.
pub static GRIDLINES: Sheet = Sheet {
    name: "Gridlines",
    csv: "gridlines.csv",
    about: "one gridline",
    columns: &[
        Column::new("Gridline", "", Holds::Name, "its name, unique among all gridlines").required(),
        Column::new(
            "Axis",
            "",
            Holds::Words(&AXES.words),
            "X: stands at that x, runs north; Y: stands at that y, runs east",
        )
        .required(),
        Column::new("Position", "m", Holds::Number(POSITION_M), "x or y of the line").required(),
    ],
};

/// The `Panels` sheet.
pub static PANELS: Sheet = Sheet {
    name: "Panels",
    csv: "panels.csv",
    about: "one panel between two X gridlines and two Y gridlines",
    columns: &[
        Column::new("Panel", "", Holds::Name, "its mark, unique over Panels and Loose panels").required(),
        gridline("X from", Some(Axis::X), "west side").required(),
        gridline("X to", Some(Axis::X), "east side").required(),
        gridline("Y from", Some(Axis::Y), "south side").required(),
        gridline("Y to", Some(Axis::Y), "north side").required(),
        THICKNESS,
        FINISHES,
        PARTITIONS,
        IMPOSED,
        Column::new("Spanning", "", Holds::Words(&SPANNING.words), "blank: decided from the spans and edges"),
        CORNERS_COLUMN,
        Column::new("Top level", "mm", Holds::Number(TOP_LEVEL_MM), "against the floor's datum; blank: 0"),
        edge("North edge"),
        edge("East edge"),
        edge("South edge"),
        edge("West edge"),
        REMARKS,
        Column::new(
            "Zone",
            "",
            Holds::Name,
            "panels of one zone share a thickness in the comparison of options; may be left out",
        ),
    ],
};

/// The `Joints` sheet.
pub static JOINTS: Sheet = Sheet {
    name: "Joints",
    csv: "joints.csv",
    about: "one movement joint along a gridline",
    columns: &[
        gridline("Gridline", None, "where the joint lies").required(),
        gridline("From", None, "crossing gridline; blank: its whole length"),
        gridline("To", None, "crossing gridline; blank: its whole length"),
        REMARK,
    ],
};

/// The `Supports` sheet.
pub static SUPPORTS: Sheet = Sheet {
    name: "Supports",
    csv: "supports.csv",
    about: "what stands under a stretch of a gridline",
    columns: &[
        gridline("Gridline", None, "where it stands").required(),
        gridline("From", None, "crossing gridline; blank: its whole length"),
        gridline("To", None, "crossing gridline; blank: its whole length"),
        Column::new("Kind", "", Holds::Words(&KINDS.words), "none: the edges on it are free").required(),
        Column::new("Width", "mm", Holds::Number(SUPPORT_WIDTH_MM), FROM_CRITERIA),
        REMARK,
    ],
};

/// The `Openings` sheet.
pub static OPENINGS: Sheet = Sheet {
    name: "Openings",
    csv: "openings.csv",
    about: "one rectangular opening in a panel",
    columns: &[
        Column::new("Panel", "", Holds::Mark, "the panel it is in").required(),
        Column::new(
            "From west",
            "m",
            Holds::Number(WITHIN_PANEL_M),
            "its west side from the panel's west edge",
        )
        .required(),
        Column::new(
            "From south",
            "m",
            Holds::Number(WITHIN_PANEL_M),
            "its south side from the panel's south edge",
        )
        .required(),
        Column::new("Width x", "m", Holds::Above0(WITHIN_PANEL_M.greatest), "along x").required(),
        Column::new("Width y", "m", Holds::Above0(WITHIN_PANEL_M.greatest), "along y").required(),
        REMARK,
    ],
};

/// The `Wall loads` sheet.
pub static WALL_LOADS: Sheet = Sheet {
    name: "Wall loads",
    csv: "wall_loads.csv",
    about: "one wall standing on a panel; its load is characteristic and permanent",
    columns: &[
        Column::new("Panel", "", Holds::Mark, "the panel it stands on").required(),
        Column::new("Along", "", Holds::Words(&AXES.words), "direction it runs along").required(),
        Column::new(
            "Offset",
            "m",
            Holds::Number(WITHIN_PANEL_M),
            "from the west edge (along y) or the south edge (along x)",
        )
        .required(),
        Column::new("From", "m", Holds::Number(WITHIN_PANEL_M), "its start along the wall").required(),
        Column::new("To", "m", Holds::Above0(WITHIN_PANEL_M.greatest), "its end along the wall").required(),
        Column::new("Load", "kN/m", Holds::Number(LINE_LOAD_KN_M), "weight of a metre of wall").required(),
        REMARK,
    ],
};

/// The `Loose panels` sheet.
pub static LOOSE_PANELS: Sheet = Sheet {
    name: "Loose panels",
    csv: "loose_panels.csv",
    about: "one panel of a list without gridlines; its support moments are not balanced",
    columns: &[
        Column::new("Panel", "", Holds::Name, "its mark, unique over Panels and Loose panels").required(),
        Column::new("Short span", "m", Holds::Number(SPAN_M), "centre to centre of supports").required(),
        Column::new("Long span", "m", Holds::Number(SPAN_M), "not less than the short span").required(),
        loose_edge("Long edge 1"),
        loose_edge("Long edge 2"),
        loose_edge("Short edge 1"),
        loose_edge("Short edge 2"),
        THICKNESS,
        FINISHES,
        PARTITIONS,
        IMPOSED,
        Column::new(
            "Spanning",
            "",
            Holds::Words(&LOOSE_SPANNING.words),
            "blank: decided from the spans and edges",
        ),
        CORNERS_COLUMN,
        REMARKS,
    ],
};

/// The `Chosen bars` sheet.
pub static CHOSEN_BARS: Sheet = Sheet {
    name: "Chosen bars",
    csv: "chosen_bars.csv",
    about: "the engineer's own choice of bars for one place: checked, never changed",
    columns: &[
        Column::new("Panel", "", Holds::Mark, "the panel").required(),
        Column::new(
            "Position",
            "",
            Holds::Words(&POSITIONS.words),
            "the long and short edges are those of loose panels",
        )
        .required(),
        Column::new("Size", "mm", Holds::OneOf(BAR_SIZES_MM), "bar size").required(),
        Column::new("Spacing", "mm", Holds::Number(SPACING_MM), "centre to centre").required(),
        REMARK,
    ],
};

/// Every sheet of a floor book, in the order of the book.
pub static SHEETS: [&Sheet; 9] =
    [&CRITERIA, &GRIDLINES, &PANELS, &JOINTS, &SUPPORTS, &OPENINGS, &WALL_LOADS, &LOOSE_PANELS, &CHOSEN_BARS];

/// Sheet of instructions that a book may carry and the reader passes over.
pub const READ_ME: &str = "Read me";

/// The sheets, their columns and the criteria items as Markdown tables, for the description of the floor
/// book.
#[must_use]
pub fn describe_sheets() -> String {
    let mut out = String::new();
    for sheet in SHEETS {
        out += &format!("## {} (`{}`)\n\nA row is {}.\n\n", sheet.name, sheet.csv, sheet.about);
        out += "| column | must be filled | allowed | note |\n|---|---|---|---|\n";
        for column in sheet.columns {
            let must = if column.every_row() { "yes" } else { "" };
            let allowed = column.holds.describe().replace(" | ", ", ");
            out += &format!("| {} | {must} | {allowed} | {} |\n", column.title(), column.note);
        }
        out += "\n";
    }
    out += "## Criteria items\n\n| item | default | allowed | meaning |\n|---|---|---|---|\n";
    for setting in SETTINGS {
        let default = crate::starter::value_text(&setting.default_value());
        let allowed = setting.allowed.describe().replace(" | ", ", ");
        out += &format!(
            "| {} | {default} | {allowed} | {} |\n",
            title(setting.item, setting.unit),
            setting.meaning
        );
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    fn plain(text: &str) -> String {
        text.chars().filter(|c| !c.is_whitespace()).flat_map(char::to_lowercase).collect()
    }

    #[test]
    fn csv_files_are_named_after_their_sheets() {
        for sheet in SHEETS {
            assert_eq!(sheet.csv, format!("{}.csv", sheet.name.to_lowercase().replace(' ', "_")));
        }
    }

    #[test]
    fn headings_and_items_differ_in_more_than_case_and_spaces() {
        let distinct = |names: Vec<&str>| {
            let mut plain: Vec<String> = names.iter().map(|name| plain(name)).collect();
            plain.sort();
            plain.dedup();
            assert_eq!(plain.len(), names.len(), "{names:?}");
        };
        for sheet in SHEETS {
            distinct(sheet.columns.iter().map(|column| column.heading).collect());
        }
        distinct(SHEETS.iter().map(|sheet| sheet.name).collect());
        distinct(SETTINGS.iter().map(|setting| setting.item).collect());
    }

    #[test]
    fn the_description_names_every_column_and_item_with_what_is_allowed() {
        let text = describe_sheets();
        assert!(text.contains("| Thickness (mm) |  | 75 to 1000 | blank: from Criteria |"), "{text}");
        assert!(text.contains("| X from | yes | the name of an X gridline | west side |"), "{text}");
        assert!(text.contains("| Cube strength fcu (N/mm2) | 30 | 20 to 60 |"), "{text}");
        for sheet in SHEETS {
            assert!(sheet.columns.iter().all(|column| text.contains(&format!("| {} |", column.title()))));
        }
        assert!(
            SETTINGS
                .iter()
                .all(|setting| text.contains(&format!("| {} |", title(setting.item, setting.unit))))
        );
        // A bar in a cell would break the table.
        assert!(text.lines().filter(|line| line.starts_with('|')).all(|line| line.matches('|').count() == 5));
    }
}
