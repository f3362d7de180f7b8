//! `baymat starter`: a floor book to fill in.

use schedule_io::starter::starter_book;

use crate::cli::StarterArgs;
use crate::console::Console;
use crate::exit::{Exit, Stop};
use crate::message::{Message, one_line};
use crate::outputs::{self, Output};

pub(crate) fn run(args: &StarterArgs, console: &mut Console) -> Result<Exit, Stop> {
    outputs::refuse_other_endings(&args.out)?;
    let output = Output { path: args.out.clone(), what: "starter floor book" };
    let bytes = starter_book()
        .map_err(|error| Stop::file_trouble(vec![Message::error(format!("starter floor book: {error}"))]))?;
    // An untouched starter may be written again; a book somebody has filled in may not.
    if std::fs::read(&output.path).is_ok_and(|there| there != bytes) {
        outputs::refuse_floor_books(std::slice::from_ref(&output))?;
    }
    outputs::test_all(std::slice::from_ref(&output), args.replace)?;
    outputs::write(&output.path, &bytes, args.replace)?;
    let shown = one_line(&output.path.display().to_string());
    console.print(&format!(
        "Starter floor book: {shown}\n\
         Overwrite its two sample panels and the gridlines, fill in Criteria, save, then:\n  \
         baymat check {shown}\n  \
         baymat schedule {shown}\n"
    ));
    Ok(Exit::AllPass)
}
