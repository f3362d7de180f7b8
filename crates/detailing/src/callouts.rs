//! Callouts in the order of drawing offices: number, type and size, mark, spacing, layer.

use design_engine::criteria::Criteria;

use crate::model::{BarSchedule, BarSet, Use};

/// One line of a callout: the bars of one mark in a set.
#[derive(Debug, Clone, PartialEq)]
pub struct Callout {
    /// Index into [`BarSchedule::bars`].
    pub bar: usize,
    /// Number of bars.
    pub count: usize,
    /// As it is written on the plan: `24 H10-03-200 B1`.
    pub text: String,
}

/// The lines of a set's callout, one for each mark, in order of marks. `ABR`: alternate bars reversed. Where two marks
/// alternate, each has the distance between its own bars.
#[must_use]
pub fn callouts(schedule: &BarSchedule, set: &BarSet, criteria: &Criteria) -> Vec<Callout> {
    let mut by_mark: Vec<(usize, usize)> = Vec::new();
    for run in &set.runs {
        match by_mark.iter_mut().find(|(bar, _)| *bar == run.bar) {
            Some((_, count)) => *count += run.count,
            None => by_mark.push((run.bar, run.count)),
        }
    }
    by_mark.sort_unstable();
    let letter = criteria.bar_type_letter();
    by_mark
        .into_iter()
        .map(|(bar, count)| {
            let scheduled = &schedule.bars[bar];
            let spacing = spacing(set, bar).map_or_else(String::new, |mm| format!("-{mm}"));
            let mut text = format!(
                "{count} {letter}{}-{}{spacing} {}",
                scheduled.bar.size_mm,
                scheduled.mark,
                set.layer.word()
            );
            if set.alternate_reversed {
                text.push_str(" ABR");
            }
            if set.for_what == Use::Trimmer || set.for_what == Use::Diagonal {
                text = text.replace("  ", " ");
            }
            Callout { bar, count, text }
        })
        .collect()
}

/// Spacing to print beside a mark: that of the set, or twice it where the bars of the mark are every second one.
fn spacing(set: &BarSet, bar: usize) -> Option<f64> {
    let spacing = set.spacing_mm?;
    if set.alternate_reversed {
        return Some(spacing);
    }
    let runs = || set.runs.iter().filter(|run| run.bar == bar && run.count > 1);
    let alternate = runs().count() > 0 && runs().all(|run| (run.pitch_mm - 2.0 * spacing).abs() < 1e-6);
    Some(if alternate { 2.0 * spacing } else { spacing })
}
