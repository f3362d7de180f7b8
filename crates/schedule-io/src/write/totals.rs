//! What the floor comes to, for the cover and for the answer in words.

use design_engine::query::Severity;

use super::{Submission, words};

/// Names printed before `and so many more`.
const MOST_NAMES: usize = 15;

/// Counts and sums over a floor, in plan order.
pub(super) struct Totals<'a> {
    pub(super) panels: usize,
    pub(super) failing: Vec<&'a str>,
    pub(super) not_designed: Vec<&'a str>,
    /// Sum of the panels' areas between support centre lines.
    pub(super) area_m2: f64,
    pub(super) warnings: usize,
}

impl<'a> Totals<'a> {
    pub(super) fn of(submission: &Submission<'a>) -> Totals<'a> {
        let Submission { floor, design, .. } = *submission;
        let mut totals = Totals {
            panels: floor.panels.len(),
            failing: Vec::new(),
            not_designed: Vec::new(),
            area_m2: floor.panels.iter().map(|panel| panel.area_m2()).sum(),
            warnings: submission.queries.iter().filter(|q| q.query.severity == Severity::Warning).count(),
        };
        for panel in &design.panels {
            let mark = words::mark(floor, panel.panel);
            if panel.not_designed.is_some() {
                totals.not_designed.push(mark);
            } else if !panel.ok() {
                totals.failing.push(mark);
            }
        }
        totals
    }

    /// The floor's result in words.
    pub(super) fn result(&self) -> String {
        let mut parts = Vec::new();
        if !self.failing.is_empty() {
            parts.push(format!("FAILS: {}", words::listed(&self.failing, MOST_NAMES)));
        }
        if !self.not_designed.is_empty() {
            parts.push(format!("NOT DESIGNED: {}", words::listed(&self.not_designed, MOST_NAMES)));
        }
        if parts.is_empty() {
            parts.push("PASS: every panel passes every check".to_owned());
        }
        match self.warnings {
            0 => {}
            1 => parts.push("1 warning to be read on the Queries sheet".to_owned()),
            count => parts.push(format!("{count} warnings to be read on the Queries sheet")),
        }
        parts.join("; ")
    }
}

/// How many queries of each severity there are.
pub(super) fn queries_by_severity(submission: &Submission<'_>) -> Vec<(Severity, usize)> {
    [Severity::Error, Severity::NotDesigned, Severity::Warning, Severity::Note]
        .into_iter()
        .map(|severity| {
            let count = submission.queries.iter().filter(|placed| placed.query.severity == severity).count();
            (severity, count)
        })
        .collect()
}
