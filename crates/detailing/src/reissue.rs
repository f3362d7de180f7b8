//! A reissue: marks of unchanged bars stay, changed bars get new numbers, dropped ones stay known, and every change has its
//! reason.

use std::collections::{BTreeMap, BTreeSet};

use design_engine::floor::{Floor, PanelId};

use crate::inputs::{GOVERNING_CHECK, Inputs, differences};
use crate::marks::BarKey;
use crate::model::{Bar, BarSchedule};
use crate::notes::{panels_of_bars, place_words, places};

/// Reasons named for one change before `and so many more`.
const MOST_REASONS: usize = 3;
/// Panels kept of one bar: reasons need no more.
const MOST_PANELS: usize = 200;
/// Bytes of text kept in a cell; a workbook's cell holds 32,767 units.
const LONGEST_TEXT: usize = 30_000;

/// A mark that was ever used.
#[derive(Debug, Clone, PartialEq)]
pub struct RegisteredBar {
    /// The mark.
    pub mark: String,
    /// The bar.
    pub bar: Bar,
    /// Number on the floor; 0 where dropped.
    pub count: usize,
    /// Mass of all, kg; 0 where dropped.
    pub mass_kg: f64,
    /// True where no bar of the floor has it any more.
    pub dropped: bool,
    /// Letter of the revision that last changed it; empty since the first issue.
    pub revision: String,
    /// Where it lies, with numbers.
    pub place: String,
    /// Marks of the panels it depends on.
    pub panels: Vec<String>,
}

/// Everything a reissue must know of an issue.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Register {
    /// Revision letter of the issue; empty on a first one.
    pub revision: String,
    /// Every mark ever used, in order of fixing, dropped ones last.
    pub bars: Vec<RegisteredBar>,
    /// What the design depends on: the criteria, then each panel.
    pub inputs: Vec<Inputs>,
}

/// What a change is.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum ChangeKind {
    /// An input that differs.
    Input,
    /// Another check governs a panel.
    Check,
    /// A mark that is new.
    NewBar,
    /// A mark whose number or places differ.
    ChangedBar,
    /// A mark that no bar has any more.
    DroppedBar,
    /// A dropped mark whose bar is needed again.
    ReturnedBar,
}

impl ChangeKind {
    /// The words printed for it.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            ChangeKind::Input => "input",
            ChangeKind::Check => "check",
            ChangeKind::NewBar => "bar new",
            ChangeKind::ChangedBar => "bar changed",
            ChangeKind::DroppedBar => "bar dropped",
            ChangeKind::ReturnedBar => "bar again",
        }
    }
}

/// One change between two issues.
#[derive(Debug, Clone, PartialEq)]
pub struct Change {
    /// What it is.
    pub kind: ChangeKind,
    /// The bar mark, or what the input belongs to.
    pub subject: String,
    /// Before.
    pub before: String,
    /// After.
    pub after: String,
    /// Difference in mass, kg; none for inputs.
    pub difference_kg: Option<f64>,
    /// Why.
    pub why: String,
}

/// Why a floor cannot be reissued.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum ReissueError {
    /// No letter for what changed.
    #[error(
        "{changes} changes against the previous issue, but Revision is blank: give this issue a letter in Criteria"
    )]
    NoLetter {
        /// Number of changes.
        changes: usize,
    },
    /// The letter of the issue before.
    #[error(
        "{changes} changes against the previous issue, but Revision is still `{letter}`: give this issue a new letter in Criteria"
    )]
    SameLetter {
        /// Number of changes.
        changes: usize,
        /// The letter.
        letter: String,
    },
}

/// The register of a schedule as first issued.
#[must_use]
pub fn register(floor: &Floor, schedule: &BarSchedule, inputs: Vec<Inputs>, revision: &str) -> Register {
    let places = places(schedule);
    let panels = panels_of_bars(floor, schedule);
    let bars = schedule
        .bars
        .iter()
        .enumerate()
        .map(|(index, bar)| RegisteredBar {
            mark: bar.mark.clone(),
            bar: bar.bar,
            count: bar.count,
            mass_kg: bar.mass_kg,
            dropped: false,
            revision: bar.revision.clone(),
            place: cut(place_words(floor, &places[index], usize::MAX)),
            panels: panels[index].iter().take(MOST_PANELS).map(|id| floor.panel(*id).mark.clone()).collect(),
        })
        .collect();
    Register { revision: revision.to_owned(), bars, inputs }
}

/// Text that a cell holds, whatever program wrote it.
fn cut(mut text: String) -> String {
    if text.len() > LONGEST_TEXT {
        let end = (0..=LONGEST_TEXT).rev().find(|at| text.is_char_boundary(*at)).unwrap_or(0);
        text.truncate(end);
    }
    text
}

/// Gives a schedule the marks and letters that follow from the issue before, and says what changed. Returns the new
/// register.
///
/// # Errors
/// Where something changed and the revision letter is blank or that of the issue before.
pub fn reissue(
    floor: &Floor,
    schedule: &mut BarSchedule,
    old: &Register,
    inputs: Vec<Inputs>,
    revision: &str,
) -> Result<(Register, Vec<Change>), ReissueError> {
    keep_marks(schedule, old);
    let mut new = register(floor, schedule, inputs, revision);
    let input_changes = input_changes(old, &new);
    let reasons = Reasons::new(floor, &input_changes);
    let by_mark: BTreeMap<&str, &RegisteredBar> =
        old.bars.iter().map(|bar| (bar.mark.as_str(), bar)).collect();
    let mut changes: Vec<Change> = input_changes.clone();
    for (bar, scheduled) in new.bars.iter_mut().zip(&mut schedule.bars) {
        let before = by_mark.get(bar.mark.as_str()).copied();
        match change_of(bar, before, &reasons) {
            Some(change) => {
                bar.revision = revision.to_owned();
                changes.push(change);
            }
            None => bar.revision = before.map_or_else(String::new, |before| before.revision.clone()),
        }
        scheduled.revision = bar.revision.clone();
    }
    let kept: BTreeSet<String> = new.bars.iter().map(|bar| bar.mark.clone()).collect();
    for before in old.bars.iter().filter(|bar| !kept.contains(&bar.mark)) {
        let mut dropped = before.clone();
        if !before.dropped {
            changes.push(dropped_bar(before, &reasons));
            dropped = RegisteredBar {
                dropped: true,
                count: 0,
                mass_kg: 0.0,
                revision: revision.to_owned(),
                ..before.clone()
            };
        }
        new.bars.push(dropped);
    }
    let count = changes.len();
    match (count, revision) {
        (0, _) => {}
        (changes, "") => return Err(ReissueError::NoLetter { changes }),
        (changes, letter) if letter == old.revision => {
            return Err(ReissueError::SameLetter { changes, letter: letter.to_owned() });
        }
        _ => {}
    }
    Ok((new, changes))
}

/// The same bar keeps its mark, also a dropped one; others get numbers never used.
fn keep_marks(schedule: &mut BarSchedule, old: &Register) {
    let known: BTreeMap<BarKey, &str> =
        old.bars.iter().map(|bar| (BarKey::of(&bar.bar), bar.mark.as_str())).collect();
    let number = |mark: &str| mark.parse::<u64>().unwrap_or(0);
    let mut next = old.bars.iter().map(|bar| number(&bar.mark)).max().unwrap_or(0);
    let width = old.bars.iter().map(|bar| bar.mark.len()).max().unwrap_or(2).max(2);
    for bar in &mut schedule.bars {
        bar.mark = match known.get(&BarKey::of(&bar.bar)) {
            Some(mark) => (*mark).to_owned(),
            None => {
                next += 1;
                format!("{next:0width$}")
            }
        };
    }
}

fn input_changes(old: &Register, new: &Register) -> Vec<Change> {
    differences(&old.inputs, &new.inputs)
        .into_iter()
        .map(|difference| Change {
            kind: if difference.item == GOVERNING_CHECK { ChangeKind::Check } else { ChangeKind::Input },
            subject: difference.subject,
            before: difference.before,
            after: difference.after,
            difference_kg: None,
            why: difference.item,
        })
        .collect()
}

fn numbered(bar: &RegisteredBar) -> String {
    format!("{} no.: {}", bar.count, bar.place)
}

/// What changed of a bar's row; none where nothing did.
fn change_of(bar: &RegisteredBar, before: Option<&RegisteredBar>, reasons: &Reasons<'_>) -> Option<Change> {
    let why = || reasons.of(&bar.panels);
    let change = |kind, old: String, kg: f64| Change {
        kind,
        subject: bar.mark.clone(),
        before: old,
        after: numbered(bar),
        difference_kg: Some(bar.mass_kg - kg),
        why: why(),
    };
    match before {
        None => Some(change(ChangeKind::NewBar, String::new(), 0.0)),
        Some(before) if before.dropped => Some(change(ChangeKind::ReturnedBar, "dropped".to_owned(), 0.0)),
        Some(before) if before.count != bar.count || before.place != bar.place => {
            Some(change(ChangeKind::ChangedBar, numbered(before), before.mass_kg))
        }
        Some(_) => None,
    }
}

fn dropped_bar(before: &RegisteredBar, reasons: &Reasons<'_>) -> Change {
    Change {
        kind: ChangeKind::DroppedBar,
        subject: before.mark.clone(),
        before: numbered(before),
        after: "dropped".to_owned(),
        difference_kg: Some(-before.mass_kg),
        why: reasons.of(&before.panels),
    }
}

/// Reasons by the panels that inputs belong to.
struct Reasons<'a> {
    inputs: Vec<&'a Change>,
    neighbours: BTreeMap<&'a str, BTreeSet<&'a str>>,
}

impl<'a> Reasons<'a> {
    fn new(floor: &'a Floor, inputs: &'a [Change]) -> Reasons<'a> {
        let mut neighbours: BTreeMap<&str, BTreeSet<&str>> = BTreeMap::new();
        let mark = |id: PanelId| floor.panel(id).mark.as_str();
        for support in &floor.supports {
            if let Some(far) = support.far {
                let (a, b) = (mark(support.near.panel), mark(far.panel));
                neighbours.entry(a).or_default().insert(b);
                neighbours.entry(b).or_default().insert(a);
            }
        }
        Reasons {
            inputs: inputs.iter().filter(|change| change.kind == ChangeKind::Input).collect(),
            neighbours,
        }
    }

    /// Changed inputs of the panels themselves; else of panels that share a support with them, of those around these and so
    /// on; else of the criteria and panels that went.
    fn of(&self, panels: &[String]) -> String {
        let mut near: BTreeSet<&str> = panels.iter().map(String::as_str).collect();
        loop {
            let found: Vec<&Change> =
                self.inputs.iter().copied().filter(|input| near.contains(input.subject.as_str())).collect();
            if !found.is_empty() {
                return listed(&found);
            }
            let wider: BTreeSet<&str> = near
                .iter()
                .flat_map(|mark| self.neighbours.get(mark).into_iter().flatten())
                .copied()
                .collect();
            let before = near.len();
            near.extend(wider);
            if near.len() == before {
                break;
            }
        }
        listed(&self.inputs)
    }
}

/// `S2 imposed_kn_m2 2.5 to 4`.
fn listed(inputs: &[&Change]) -> String {
    let one = |input: &&Change| {
        format!("{} {} {} to {}", input.subject, input.why, or_none(&input.before), or_none(&input.after))
    };
    let mut words: Vec<String> = inputs.iter().take(MOST_REASONS).map(one).collect();
    if inputs.len() > MOST_REASONS {
        words.push(format!("and {} more inputs", inputs.len() - MOST_REASONS));
    }
    if words.is_empty() {
        "no input differs: another version of the program".to_owned()
    } else {
        words.join(", ")
    }
}

fn or_none(value: &str) -> &str {
    if value.is_empty() { "none" } else { value }
}
