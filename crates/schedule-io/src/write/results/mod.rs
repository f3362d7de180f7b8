//! The results file: every number of the design, unrounded, for other programs (`docs/results-file.md`).
//!
//! Keys stand in the order of that page and end in their unit; what does not apply is `null`. Parts that no
//! design makes yet are left out.

mod bars;
mod loads;
mod panels;
mod supports;

use std::io::Write;

use design_engine::criteria::{Criteria, SETTINGS, Value};
use serde::{Serialize, Serializer};

use super::numbers::{Finite, write_document};
use super::title_block::PROGRAM;
use super::{Submission, WriteError, words};

/// Name and version of the file's form.
const FORMAT: &str = "baymat-results/1";

/// Writes the results file.
pub(super) fn write(submission: &Submission<'_>, out: &mut dyn Write) -> Result<(), WriteError> {
    write_document(&document(submission), out)
}

fn document<'a>(submission: &'a Submission<'a>) -> Document<'a> {
    Document {
        format: FORMAT,
        program: Program { name: PROGRAM, version: submission.version },
        book: &submission.book.name,
        ok: submission.design.ok(),
        criteria: CriteriaResult(&submission.book.criteria),
        defaults_used: submission.book.defaults_used.iter().map(|default| default.key).collect(),
        assumptions: &submission.design.assumptions,
        panels: Each(submission, panels::each),
        supports: Each(submission, supports::each),
        bars: Each(submission, bars::each),
        quantities: bars::quantities(submission),
        edge_segments: Each(submission, panels::each_segment),
        corners: Each(submission, loads::each_corner),
        beam_loads: Each(submission, loads::each_beam_load),
        beam_loads_total: loads::beam_loads_total(submission),
        openings: Each(submission, loads::each_opening),
        queries: Each(submission, each_query),
    }
}

#[derive(Serialize)]
struct Document<'a> {
    format: &'static str,
    program: Program<'a>,
    book: &'a str,
    ok: bool,
    criteria: CriteriaResult<'a>,
    defaults_used: Vec<&'static str>,
    assumptions: &'a [String],
    panels: Each<'a, panels::PanelResult<'a>>,
    supports: Each<'a, supports::SupportResult<'a>>,
    bars: Each<'a, bars::BarResult<'a>>,
    quantities: bars::QuantitiesResult,
    edge_segments: Each<'a, panels::SegmentResult<'a>>,
    corners: Each<'a, loads::CornerResult<'a>>,
    beam_loads: Each<'a, loads::BeamLoadResult<'a>>,
    beam_loads_total: loads::BeamLoadsTotal,
    openings: Each<'a, loads::OpeningResult<'a>>,
    queries: Each<'a, QueryResult<'a>>,
}

#[derive(Serialize)]
struct Program<'a> {
    name: &'static str,
    version: &'a str,
}

/// The rows of one kind, boxed since each kind walks the submission in its own way.
type Rows<'a, T> = Box<dyn Iterator<Item = T> + 'a>;

/// An array whose values are made one at a time while it is written.
struct Each<'a, T>(&'a Submission<'a>, fn(&'a Submission<'a>) -> Rows<'a, T>);

impl<T: Serialize> Serialize for Each<'_, T> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.collect_seq(self.1(self.0))
    }
}

/// Every setting by its key, as resolved.
struct CriteriaResult<'a>(&'a Criteria);

impl Serialize for CriteriaResult<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.collect_map(
            SETTINGS.iter().map(|setting| (setting.key, SettingResult::from(self.0.value(setting)))),
        )
    }
}

/// A setting's value.
#[derive(Serialize)]
#[serde(untagged)]
enum SettingResult {
    Blank(()),
    Number(Finite),
    Numbers(Vec<Finite>),
    Text(String),
}

impl From<Value> for SettingResult {
    fn from(value: Value) -> Self {
        match value {
            Value::Blank => SettingResult::Blank(()),
            Value::Number(number) => SettingResult::Number(Finite(number)),
            Value::Numbers(numbers) => SettingResult::Numbers(numbers.into_iter().map(Finite).collect()),
            Value::Text(text) => SettingResult::Text(text),
        }
    }
}

#[derive(Serialize)]
struct QueryResult<'a> {
    severity: &'static str,
    panel: Option<&'a str>,
    about: String,
    place: Option<String>,
    text: &'a str,
    remedy: Option<&'a str>,
}

fn each_query<'a>(submission: &'a Submission<'a>) -> Rows<'a, QueryResult<'a>> {
    Box::new(submission.queries.iter().map(move |placed| QueryResult {
        severity: placed.query.severity.word(),
        panel: placed.query.panel_mark(),
        about: words::about(submission.floor, &placed.query),
        place: words::query_place(placed),
        text: &placed.query.text,
        remedy: Some(placed.query.remedy.as_str()).filter(|remedy| !remedy.is_empty()),
    }))
}
