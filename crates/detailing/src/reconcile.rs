//! Before anything is written: bars on the notes, on the schedule and counted from geometry agree, and masses add up.

use crate::callouts::callouts;
use crate::marks::mass_of;
use crate::model::BarSchedule;
use design_engine::criteria::Criteria;

/// What does not agree.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum ReconcileError {
    /// A mark's numbers.
    #[error("bar {mark}: {scheduled} on the bending schedule, {noted} on the notes, {placed} on plan")]
    Count {
        /// The mark.
        mark: String,
        /// On the bending schedule.
        scheduled: usize,
        /// On the notes.
        noted: usize,
        /// By their places.
        placed: usize,
    },
    /// A mark's shape.
    #[error("bar {mark} cannot be bent: {fault}")]
    Shape {
        /// The mark.
        mark: String,
        /// Why.
        fault: String,
    },
    /// A bar that is too long.
    #[error("bar {mark} is {length_mm} mm long, stock is {stock_mm} mm")]
    TooLong {
        /// The mark.
        mark: String,
        /// Its length.
        length_mm: f64,
        /// The stock length.
        stock_mm: f64,
    },
    /// A mark's mass, or a total.
    #[error("{what}: {one} kg against {other} kg")]
    Mass {
        /// Of what.
        what: String,
        /// One way.
        one: f64,
        /// The other.
        other: f64,
    },
    /// Two marks for one bar, or two bars with one mark.
    #[error("bars {0} and {1}: one bar must have one mark")]
    Marks(String, String),
}

/// Checks a schedule against itself.
///
/// # Errors
/// The first thing that does not agree, with the bar's mark.
pub fn reconcile(schedule: &BarSchedule, criteria: &Criteria) -> Result<(), ReconcileError> {
    let mut noted = vec![0; schedule.bars.len()];
    let mut placed = vec![0; schedule.bars.len()];
    for set in &schedule.sets {
        for callout in callouts(schedule, set, criteria) {
            noted[callout.bar] += callout.count;
        }
        for run in &set.runs {
            placed[run.bar] += places(run);
        }
    }
    let stock_mm = criteria.stock_length_m * 1000.0;
    let mut total = 0.0;
    for (index, bar) in schedule.bars.iter().enumerate() {
        let mark = || bar.mark.clone();
        if bar.count != noted[index] || bar.count != placed[index] {
            let (scheduled, noted, placed) = (bar.count, noted[index], placed[index]);
            return Err(ReconcileError::Count { mark: mark(), scheduled, noted, placed });
        }
        if let Err(fault) = bar.bar.shape.check(bar.bar.size_mm) {
            return Err(ReconcileError::Shape { mark: mark(), fault: fault.to_string() });
        }
        if bar.length_mm > stock_mm + 1e-6 {
            return Err(ReconcileError::TooLong { mark: mark(), length_mm: bar.length_mm, stock_mm });
        }
        same_mass(&format!("bar {}", bar.mark), bar.mass_kg, mass_of(bar))?;
        total += bar.mass_kg;
    }
    let by_size: f64 = schedule.quantities.steel_kg_by_size.iter().map(|(_, kg)| kg).sum();
    let by_use: f64 = schedule.quantities.steel_kg_by_use.iter().map(|(_, kg)| kg).sum();
    same_mass("all steel", schedule.quantities.steel_kg, total)?;
    same_mass("steel by size", by_size, total)?;
    same_mass("steel by use", by_use, total)?;
    unlike_marks(schedule)
}

/// Bars of a run counted from where they lie.
fn places(run: &crate::model::Run) -> usize {
    let mut count = 1;
    let mut at = run.first_mm;
    while run.pitch_mm > 0.0 && at < run.last_mm - 1e-3 {
        at += run.pitch_mm;
        count += 1;
    }
    count
}

fn same_mass(what: &str, one: f64, other: f64) -> Result<(), ReconcileError> {
    if (one - other).abs() <= 1e-9 * one.abs().max(other.abs()).max(1.0) {
        Ok(())
    } else {
        Err(ReconcileError::Mass { what: what.to_owned(), one, other })
    }
}

fn unlike_marks(schedule: &BarSchedule) -> Result<(), ReconcileError> {
    let mut keys: Vec<_> =
        schedule.bars.iter().map(|bar| (crate::marks::BarKey::of(&bar.bar), bar.mark.as_str())).collect();
    keys.sort();
    let mut marks: Vec<&str> = keys.iter().map(|(_, mark)| *mark).collect();
    marks.sort_unstable();
    let twice = keys.windows(2).find(|pair| pair[0].0 == pair[1].0).map(|pair| (pair[0].1, pair[1].1));
    let shared = marks.windows(2).find(|pair| pair[0] == pair[1]).map(|pair| (pair[0], pair[1]));
    match twice.or(shared) {
        Some((one, other)) => Err(ReconcileError::Marks(one.to_owned(), other.to_owned())),
        None => Ok(()),
    }
}
