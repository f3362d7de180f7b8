//! Sheet `Supports`: one row per support with top bars, shared or of one panel alone.

use design_engine::check::{CheckKind, Place};
use design_engine::floor::{Support, SupportKind, SupportSide};
use design_engine::result::{PanelDesign, SupportDesign, SupportSideDesign};
use rust_xlsxwriter::Worksheet;

use super::column::{Cell, Column};
use super::look::Tone;
use super::sink::lay_down;
use super::{Submission, WriteError, words};

pub(super) const NAME: &str = "Supports";
const FROZEN_COLUMNS: u16 = 2;

pub(super) struct SupportRow<'a> {
    submission: Submission<'a>,
    support: &'a Support,
    design: &'a SupportDesign,
}

impl<'a> SupportRow<'a> {
    /// Its first or second side.
    fn side(&self, index: usize) -> Option<SupportSide> {
        self.support.sides().nth(index)
    }

    /// The design of a side, where that panel was designed.
    fn designed_side(&self, index: usize) -> Option<&'a SupportSideDesign> {
        words::side_of(self.design, self.side(index)?.panel)
    }

    fn mark(&self, index: usize) -> Option<&'a str> {
        self.side(index).map(|side| words::mark(self.submission.floor, side.panel))
    }

    /// The designs of its sides' panels; they stand in the order of the floor.
    fn panel_designs(&self) -> impl Iterator<Item = (SupportSide, &'a PanelDesign)> {
        let panels = &self.submission.design.panels;
        self.support.sides().filter_map(|side| Some((side, panels.get(side.panel.0)?)))
    }

    /// The greater K of its two sides.
    fn k(&self) -> Option<f64> {
        self.panel_designs()
            .flat_map(|(_, panel)| &panel.sections)
            .filter(|section| section.support == Some(self.design.support))
            .filter_map(|section| section.k)
            .reduce(f64::max)
    }

    /// Checks that fail at the edges it lies on, each with its panel.
    fn failing(&self) -> Vec<String> {
        let mut failing = Vec::new();
        for (side, panel) in self.panel_designs() {
            let mark = words::mark(self.submission.floor, side.panel);
            for kind in CheckKind::ALL {
                let at = Place::Side(side.side);
                if panel.checks.iter().any(|check| check.kind == kind && check.at == at && !check.ok) {
                    failing.push(format!("{} ({mark})", kind.word()));
                }
            }
        }
        failing
    }

    fn not_designed(&self) -> Vec<&'a str> {
        self.panel_designs()
            .filter(|(_, panel)| panel.not_designed.is_some())
            .map(|(side, _)| words::mark(self.submission.floor, side.panel))
            .collect()
    }

    fn passes(&self) -> bool {
        self.failing().is_empty() && self.not_designed().is_empty()
    }

    fn result(&self) -> String {
        let (failing, not_designed) = (self.failing(), self.not_designed());
        let mut result =
            if failing.is_empty() { "passes".to_owned() } else { format!("FAILS: {}", failing.join(", ")) };
        if !not_designed.is_empty() {
            result.push_str(&format!("; NOT DESIGNED: {}", not_designed.join(", ")));
        }
        result
    }
}

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    let rows = submission.design.supports.iter().map(|design| {
        let support = submission.floor.support(design.support);
        let row = SupportRow { submission: *submission, support, design };
        let tone = if row.passes() { Tone::Plain } else { Tone::Marked };
        (tone, row)
    });
    lay_down(worksheet, NAME, &columns(), FROZEN_COLUMNS, rows)
}

pub(super) fn columns<'a>() -> Vec<Column<'a, SupportRow<'a>>> {
    [place(), moments(), midspans(), bars(), extents()].into_iter().flatten().collect()
}

fn place<'a>() -> Vec<Column<'a, SupportRow<'a>>> {
    let mut columns = vec![
        Column::mark("Support", |r: &SupportRow<'_>| words::support_name(r.submission.floor, r.support))
            .wide(13.0)
            .means("gridline and the two crossing gridlines; of one panel alone: its panel and edge"),
        Column::words("Result", 16.0, SupportRow::result)
            .means("`passes`, or the checks that fail at the edges it lies on, each with its panel; panels not designed"),
    ];
    let where_it_lies = vec![
        Column::mark("Gridline", |r: &SupportRow<'a>| r.support.gridline.as_deref())
            .wide(7.5)
            .key("gridline")
            .means("gridline it lies on"),
        Column::number("From", "m", 3, |r: &SupportRow<'_>| r.support.from.m())
            .key("from_m")
            .means("start along the gridline"),
        Column::number("To", "m", 3, |r: &SupportRow<'_>| r.support.to.m())
            .key("to_m")
            .means("end along the gridline"),
        Column::number("Length", "m", 3, |r: &SupportRow<'_>| r.support.length_m())
            .key("length_m")
            .means("length of the support"),
        Column::mark("Panel 1", |r: &SupportRow<'a>| r.mark(0))
            .wide(8.0)
            .key("panels/0")
            .means("panel on the west or south side, or the only one"),
        Column::mark("Panel 2", |r: &SupportRow<'a>| r.mark(1))
            .wide(8.0)
            .key("panels/1")
            .means("panel on the other side"),
    ];
    columns.extend(Column::group("Place", where_it_lies));
    columns
}

fn moments<'a>() -> Vec<Column<'a, SupportRow<'a>>> {
    let from_coefficient = |heading, index: usize| {
        Column::number(heading, "kNm/m", 2, move |r: &SupportRow<'_>| {
            r.designed_side(index)?.moment_from_coefficient_knm_m
        })
        .key(format!("moments_from_coefficient_knm_m/{index}"))
        .means("support moment of that panel from its own coefficient, before balancing")
    };
    let columns = vec![
        from_coefficient("Panel 1", 0),
        from_coefficient("Panel 2", 1),
        Column::number("Difference", "%", 1, |r: &SupportRow<'_>| r.design.difference_pct)
            .wide(9.0)
            .key("difference_pct")
            .means("difference of the two, in percent of the larger"),
        Column::short("Balanced", 8.0, |r: &SupportRow<'_>| {
            r.hogging().then_some(yes_or_no(r.design.balanced))
        })
        .means("`yes` where the difference is above the threshold and the moments were balanced (3.5.3.6)"),
        Column::number("Design", "kNm/m", 2, |r: &SupportRow<'_>| r.design.moment_knm_m)
            .key("moment_knm_m")
            .means("design moment; blank where bars cross beside a one-way panel and no moment is claimed"),
        Column::number("Loads ratio", "", 2, |r: &SupportRow<'_>| r.design.load_ratio)
            .wide(6.5)
            .key("load_ratio")
            .means("lesser over greater ultimate load of the two panels (3.5.3.5)"),
        Column::number("Spans ratio", "", 2, |r: &SupportRow<'_>| r.design.span_ratio)
            .wide(6.5)
            .key("span_ratio")
            .means("lesser over greater span across the support (3.5.3.5)"),
    ];
    Column::group("Support moments", columns)
}

impl SupportRow<'_> {
    fn hogging(&self) -> bool {
        self.support.kind == SupportKind::Hogging
    }
}

fn yes_or_no(yes: bool) -> &'static str {
    if yes { "yes" } else { "no" }
}

fn midspans<'a>() -> Vec<Column<'a, SupportRow<'a>>> {
    let midspan = |heading, array: &str, index: usize, value: fn(&SupportSideDesign) -> f64, meaning| {
        Column::number(heading, "kNm/m", 2, move |r: &SupportRow<'_>| r.designed_side(index).map(value))
            .key(format!("{array}/{index}"))
            .means(meaning)
    };
    let (before, after) = ("midspans_before_knm_m", "midspans_after_knm_m");
    const BEFORE: &str = "midspan moment of that panel across the support, before balancing";
    const AFTER: &str = "the same after balancing; the design takes the greater";
    let columns = vec![
        midspan("Panel 1 before", before, 0, |side| side.midspan_before_knm_m, BEFORE),
        midspan("Panel 1 after", after, 0, |side| side.midspan_after_knm_m, AFTER),
        midspan("Panel 2 before", before, 1, |side| side.midspan_before_knm_m, BEFORE),
        midspan("Panel 2 after", after, 1, |side| side.midspan_after_knm_m, AFTER),
        Column::words("Raised in", 8.0, |r: &SupportRow<'_>| {
            words::midspans_raised(r.submission.floor, r.design).join(", ")
        })
        .means("panels whose midspan moment rose by balancing"),
    ];
    Column::group("Midspan moments across it", columns)
}

fn bars<'a>() -> Vec<Column<'a, SupportRow<'a>>> {
    let columns = vec![
        Column::number("d", "mm", 1, |r: &SupportRow<'_>| r.design.d_mm)
            .wide(6.2)
            .key("d_mm")
            .means("effective depth: the lesser of the two sides"),
        Column::number("K", "", 3, SupportRow::k)
            .wide(6.5)
            .means("M/(b d2 fcu), the greater of the two sides"),
        Column::number("Steel required", "mm2/m", 0, |r: &SupportRow<'_>| {
            r.design.as_required_mm2_m.map_or(Cell::from("too thin"), Cell::Number)
        })
        .wide(8.2)
        .key("as_required_mm2_m")
        .means("the greater of bending and minimum steel; `too thin` where K exceeds K'"),
        Column::words("Bars", 12.0, |r: &SupportRow<'_>| {
            let SupportDesign { bars, layer, stated, .. } = *r.design;
            words::bars(&r.submission.book.criteria, bars, layer, stated)
        })
        .means("bars in words: type and size, spacing, layer; `stated` where the book chose them"),
        Column::number("Size", "mm", 0, |r: &SupportRow<'_>| r.design.bars.bar_mm)
            .wide(5.0)
            .key("bar_mm")
            .means("bar size"),
        Column::number("Spacing", "mm", 0, |r: &SupportRow<'_>| r.design.bars.spacing_mm)
            .key("spacing_mm")
            .means("spacing centre to centre"),
        Column::short("Layer", 6.0, |r: &SupportRow<'_>| r.design.layer.word())
            .key("layer")
            .means("layer of the bars"),
        Column::number("Steel provided", "mm2/m", 0, |r: &SupportRow<'_>| r.design.as_provided_mm2_m)
            .wide(8.2)
            .key("as_provided_mm2_m")
            .means("steel area of the bars"),
    ];
    Column::group("Top bars", columns)
}

fn extents<'a>() -> Vec<Column<'a, SupportRow<'a>>> {
    let reach = |heading, array: &str, index: usize, value: fn(&SupportSideDesign) -> f64, meaning| {
        Column::number(heading, "m", 2, move |r: &SupportRow<'_>| r.designed_side(index).map(value))
            .wide(7.2)
            .key(format!("{array}/{index}"))
            .means(meaning)
    };
    let (long, short) = ("extension_m", "short_extension_m");
    const LONG: &str =
        "how far the bars that go furthest reach into that panel, past the face of the support";
    const SHORT: &str = "how far the alternate bars reach";
    let columns = vec![
        reach("Panel 1 long", long, 0, |side| side.extension_m, LONG),
        reach("Panel 1 short", short, 0, |side| side.short_extension_m, SHORT),
        reach("Panel 2 long", long, 1, |side| side.extension_m, LONG),
        reach("Panel 2 short", short, 1, |side| side.short_extension_m, SHORT),
        Column::words("Arrangement", 12.5, |r: &SupportRow<'_>| {
            if r.design.alternate_reversed { "alternate reversed" } else { "all full length" }
        })
        .means("alternate bars reversed, or all bars the full extent"),
    ];
    Column::group("Reach past the support face", columns)
}
