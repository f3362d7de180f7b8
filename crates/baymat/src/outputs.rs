//! Where outputs go: default names, what is refused, and the test of every place before any work.

use std::ffi::OsString;
use std::io::{self, ErrorKind};
use std::path::{Path, PathBuf};

use schedule_io::atomic::{can_write, write_whole};
use schedule_io::read::is_floor_book;

use crate::exit::Stop;
use crate::message::{Message, one_line};

/// More links than this in a row are taken for a ring.
const MOST_LINKS: usize = 40;

/// A file the command will write.
#[derive(Debug, Clone)]
pub(crate) struct Output {
    /// Where.
    pub(crate) path: PathBuf,
    /// What it is, in words.
    pub(crate) what: &'static str,
}

/// The default schedule of a book: its name and `-schedule.xlsx`, beside the file or folder.
pub(crate) fn default_schedule(book: &Path) -> PathBuf {
    // `.` and `..` have no name of their own.
    let named = match book.file_name() {
        Some(_) => book.to_owned(),
        None => book.canonicalize().unwrap_or_else(|_| book.to_owned()),
    };
    let name = if book.is_dir() { named.file_name() } else { named.file_stem() };
    let mut name = name.map_or_else(|| OsString::from("floor"), OsString::from);
    name.push("-schedule.xlsx");
    named.with_file_name(name)
}

/// Refuses a name that does not end in `.xlsx`.
pub(crate) fn refuse_other_endings(path: &Path) -> Result<(), Stop> {
    if ends_in_xlsx(path) {
        return Ok(());
    }
    let text = format!("{}: the output is an .xlsx workbook; let its name end in .xlsx", path.display());
    Err(Stop::refused(vec![Message::error(text)]))
}

/// True for a name that ends in `.xlsx`, in any case.
pub(crate) fn ends_in_xlsx(path: &Path) -> bool {
    path.extension().is_some_and(|extension| extension.eq_ignore_ascii_case("xlsx"))
}

/// Refuses outputs that would harm the book or each other, whatever `--replace` says.
pub(crate) fn refuse_clashes(book: &Path, outputs: &[Output]) -> Result<(), Stop> {
    let input = Identity::of(book);
    let mut messages = Vec::new();
    for (index, output) in outputs.iter().enumerate() {
        let identity = Identity::of(&output.path);
        let shown = output.path.display();
        if identity.same_file(&input) {
            messages.push(format!(
                "{shown}: the {} would be written over the floor book; give it another name",
                output.what
            ));
        } else if book.is_dir() && identity.lies_in(&input) {
            messages.push(format!(
                "{shown}: the {} would be written into the floor book's folder {}; put it elsewhere",
                output.what,
                book.display()
            ));
        }
        for earlier in &outputs[..index] {
            if identity.same_file(&Identity::of(&earlier.path)) {
                messages.push(format!(
                    "{shown}: the {} and the {} would be the same file; give them two names",
                    earlier.what, output.what
                ));
            }
        }
    }
    if messages.is_empty() {
        Ok(())
    } else {
        Err(Stop::refused(messages.iter().map(Message::error).collect()))
    }
}

/// Refuses to write over any floor book, whatever `--replace` says: a book cannot be made again from its outputs.
pub(crate) fn refuse_floor_books(outputs: &[Output]) -> Result<(), Stop> {
    let over_a_book = outputs.iter().filter(|output| is_floor_book(&output.path));
    let refusals: Vec<Message> = over_a_book
        .map(|output| {
            let shown = one_line(&output.path.display().to_string());
            Message::error(format!(
                "{shown}: this is a floor book, and the {} would be written over it; give another name",
                output.what
            ))
        })
        .collect();
    if refusals.is_empty() { Ok(()) } else { Err(Stop::refused(refusals)) }
}

/// Makes the folder of the tables where it is not there.
pub(crate) fn make_folder(folder: &Path) -> Result<(), Stop> {
    let refused = |error: io::Error| {
        let shown = one_line(&folder.display().to_string());
        Stop::file_trouble(vec![Message::error(format!(
            "{shown}: the folder of the tables cannot be made: {error}"
        ))])
    };
    if folder.is_dir() { Ok(()) } else { std::fs::create_dir(folder).map_err(refused) }
}

/// Tests every output's place before any work.
pub(crate) fn test_all(outputs: &[Output], replace: bool) -> Result<(), Stop> {
    let refusals: Vec<Message> = outputs
        .iter()
        .filter_map(|output| can_write(&output.path, replace).err())
        .map(|error| refusal(&error))
        .collect();
    if refusals.is_empty() { Ok(()) } else { Err(Stop::file_trouble(refusals)) }
}

/// Writes one output, whole or not at all.
pub(crate) fn write(path: &Path, bytes: &[u8], replace: bool) -> Result<(), Stop> {
    write_whole(path, bytes, replace).map_err(|error| Stop::file_trouble(vec![refusal(&error)]))
}

/// The error names the path and what is the matter; here comes what to do, where that is not plain.
fn refusal(error: &io::Error) -> Message {
    let remedy = match error.kind() {
        ErrorKind::NotFound => "; make the folder first, or write elsewhere",
        ErrorKind::PermissionDenied | ErrorKind::ReadOnlyFilesystem => "; write elsewhere",
        ErrorKind::IsADirectory | ErrorKind::InvalidInput => "; give the name of a file",
        ErrorKind::StorageFull | ErrorKind::QuotaExceeded => "; make room, or write elsewhere",
        _ => "",
    };
    Message::error(format!("{error}{remedy}"))
}

/// What makes two paths one file: the place they lead to, or the file itself.
#[derive(Debug)]
struct Identity {
    place: PathBuf,
    #[cfg(unix)]
    file: Option<(u64, u64)>,
}

impl Identity {
    fn of(path: &Path) -> Identity {
        Identity {
            place: place_of(path),
            #[cfg(unix)]
            file: std::fs::metadata(path).ok().map(|found| {
                use std::os::unix::fs::MetadataExt as _;
                (found.dev(), found.ino())
            }),
        }
    }

    fn same_file(&self, other: &Identity) -> bool {
        #[cfg(unix)]
        if self.file.is_some() && self.file == other.file {
            return true;
        }
        self.place == other.place
    }

    fn lies_in(&self, folder: &Identity) -> bool {
        self.place.starts_with(&folder.place)
    }
}

/// The place a path leads to, links followed, also where there is no file yet.
fn place_of(path: &Path) -> PathBuf {
    if let Ok(place) = path.canonicalize() {
        return place;
    }
    let mut target = path.to_owned();
    for _ in 0..MOST_LINKS {
        let Ok(next) = std::fs::read_link(&target) else { break };
        target = target.parent().unwrap_or(Path::new("")).join(next);
    }
    let folder = match target.parent() {
        Some(parent) if !parent.as_os_str().is_empty() => parent,
        _ => Path::new("."),
    };
    match (folder.canonicalize(), target.file_name()) {
        (Ok(folder), Some(name)) => folder.join(name),
        _ => std::path::absolute(&target).unwrap_or(target),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_default_schedule_stands_beside_the_book() {
        assert_eq!(default_schedule(Path::new("a/floor.xlsx")), Path::new("a/floor-schedule.xlsx"));
        assert_eq!(default_schedule(Path::new("floor.v2.xlsx")), Path::new("floor.v2-schedule.xlsx"));
    }

    #[test]
    fn the_default_schedule_of_a_folder_is_not_in_it() {
        // A test runs in its crate's folder.
        assert_eq!(default_schedule(Path::new("src/")), Path::new("src-schedule.xlsx"));
        let here = default_schedule(Path::new("."));
        assert_eq!(here.file_name().unwrap(), "baymat-schedule.xlsx");
        assert_eq!(here.parent().unwrap(), Path::new("..").canonicalize().unwrap());
    }

    #[test]
    fn a_place_is_known_before_its_file_exists() {
        let one = place_of(Path::new("src/new.xlsx"));
        let other = place_of(Path::new("src/../src/./new.xlsx"));
        assert_eq!(one, other);
        assert!(one.starts_with(Path::new("src").canonicalize().unwrap()));
    }
}
