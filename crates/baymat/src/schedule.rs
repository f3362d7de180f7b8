//! `baymat schedule`: design a floor book and write its schedule workbook.

use schedule_io::write::{TABLE_NAMES, WriteError, write_results, write_tables, write_workbook};

use std::path::Path;

use detailing::reissue::Register;
use schedule_io::read::{PreviousError, read_previous};

use crate::cli::ScheduleArgs;
use crate::console::Console;
use crate::exit::{Exit, Stop};
use crate::message::{Message, one_line};
use crate::outputs::{self, Output};
use crate::pipeline::{Designed, design_book};
use crate::progress::during;
use crate::summary;

pub(crate) fn run(args: &ScheduleArgs, console: &mut Console) -> Result<Exit, Stop> {
    let outputs = outputs_of(args)?;
    // A book that is not there is told as such, not as outputs without a folder.
    if args.book.exists() {
        outputs::refuse_clashes(&args.book, &outputs)?;
        outputs::refuse_floor_books(&outputs)?;
        if let Some(folder) = &args.csv {
            outputs::make_folder(folder)?;
        }
        outputs::test_all(&outputs, args.replace)?;
    }
    let show_progress = console.may_show_progress() && !args.quiet;
    let previous = args.previous.as_deref().map(previous_issue).transpose()?;
    let mut designed = design_book(&args.book, show_progress, !args.quiet)?;
    if let Some(previous) = previous {
        designed.compare_with(&previous)?;
    }
    let contents = during(show_progress, "writing", || contents(&designed, args))
        .map_err(|error| Stop::file_trouble(vec![Message::error(format!("the outputs: {error}"))]))?;
    for (output, bytes) in outputs.iter().zip(&contents) {
        outputs::write(&output.path, bytes, args.replace)?;
    }
    if !args.quiet {
        console.print(&summary::text(&designed, &outputs, console.paint()));
    }
    Ok(if designed.design.ok() { Exit::AllPass } else { Exit::NotAllPass })
}

/// The register of the issue before.
fn previous_issue(path: &Path) -> Result<Register, Stop> {
    let shown = one_line(&path.display().to_string());
    read_previous(path).map_err(|error| match error {
        PreviousError::CannotOpen(why) => Stop::file_trouble(vec![Message::error(format!(
            "{shown}: the previous issue cannot be read: {why}"
        ))]),
        PreviousError::NotOurs(why) => {
            let remedy = "give the schedule workbook of the issue before to --previous";
            Stop::refused(vec![Message::error(format!("{shown}: no previous issue: {why}; {remedy}"))])
        }
    })
}

/// The outputs in the order of writing: the workbook, then the results file and the tables if they are asked for.
fn outputs_of(args: &ScheduleArgs) -> Result<Vec<Output>, Stop> {
    let path = args.output.clone().unwrap_or_else(|| outputs::default_schedule(&args.book));
    outputs::refuse_other_endings(&path)?;
    let mut outputs = vec![Output { path, what: "schedule" }];
    if let Some(path) = args.json.clone() {
        outputs.push(Output { path, what: "results file" });
    }
    if let Some(folder) = &args.csv {
        outputs.extend(TABLE_NAMES.map(|(name, what)| Output { path: folder.join(name), what }));
    }
    Ok(outputs)
}

/// Every output's bytes, made before the first is written.
fn contents(designed: &Designed, args: &ScheduleArgs) -> Result<Vec<Vec<u8>>, WriteError> {
    let submission = designed.submission();
    let mut contents = vec![write_workbook(&submission)?];
    if args.json.is_some() {
        let mut results = Vec::new();
        write_results(&submission, &mut results)?;
        contents.push(results);
    }
    if args.csv.is_some() {
        contents.extend(write_tables(&submission)?);
    }
    Ok(contents)
}
