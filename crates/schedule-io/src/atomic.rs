//! Whole files or none: an output is written beside its place and renamed when whole.
//!
//! The file in the making is called `.NAME.baymat-part` and some letters; one that an earlier run had to
//! leave behind (a power cut, a full disk) is removed by the next run that writes the same file.

use std::ffi::{OsStr, OsString};
use std::io::{Error, ErrorKind, Result, Write};
use std::path::{Path, PathBuf};

use tempfile::{Builder, NamedTempFile};

/// More links than this in a row are taken for a ring.
const MOST_LINKS: usize = 40;
/// A longer name is cut in the name of its part file, since file systems stop at 255 bytes.
const LONGEST_NAME_BYTES: usize = 180;

/// Tests, before any work is done, whether [`write_whole`] could write `path`.
///
/// # Errors
/// [`ErrorKind::AlreadyExists`] where the file exists and `replace` is false; otherwise where the folder is
/// missing or refuses new files, or `path` is a folder or no plain file. Each names the path.
pub fn can_write(path: &Path, replace: bool) -> Result<()> {
    let place = Place::of(path, replace)?;
    place.part_file().map(drop)
}

/// Writes `bytes` to `path`, whole or not at all. A symbolic link stays and its target is written.
/// A file that is replaced keeps its permissions.
///
/// # Errors
/// Those of [`can_write`], and where the file system refuses; `path` is then as it was.
pub fn write_whole(path: &Path, bytes: &[u8], replace: bool) -> Result<()> {
    let place = Place::of(path, replace)?;
    place.remove_leftovers();
    let mut part = place.part_file()?;
    if let Some(permissions) = &place.permissions {
        part.as_file().set_permissions(permissions.clone()).map_err(|e| named(path, &e))?;
    }
    part.write_all(bytes).and_then(|()| part.as_file().sync_all()).map_err(|e| named(path, &e))?;
    place.rename(part, replace)?;
    sync_folder(&place.folder);
    Ok(())
}

/// Where a file goes: links followed, folder and name apart.
struct Place<'a> {
    asked: &'a Path,
    target: PathBuf,
    folder: PathBuf,
    name: OsString,
    /// Of the file to be replaced.
    permissions: Option<std::fs::Permissions>,
}

impl<'a> Place<'a> {
    fn of(asked: &'a Path, replace: bool) -> Result<Place<'a>> {
        let target = follow_links(asked)?;
        let name = target
            .file_name()
            .ok_or_else(|| refused(ErrorKind::InvalidInput, asked, "is not the name of a file"))?
            .to_owned();
        let folder = match target.parent() {
            Some(parent) if !parent.as_os_str().is_empty() => parent.to_owned(),
            _ => PathBuf::from("."),
        };
        if !folder.is_dir() {
            let what = format!("there is no folder {}", folder.display());
            return Err(refused(ErrorKind::NotFound, asked, &what));
        }
        let permissions = match std::fs::metadata(&target) {
            Ok(found) if found.is_dir() => {
                return Err(refused(ErrorKind::IsADirectory, asked, "is a folder"));
            }
            Ok(found) if !found.is_file() => {
                return Err(refused(ErrorKind::InvalidInput, asked, "is not a plain file"));
            }
            Ok(_) if !replace => return Err(exists(asked)),
            Ok(found) => Some(found.permissions()),
            Err(error) if error.kind() == ErrorKind::NotFound => None,
            Err(error) => return Err(named(asked, &error)),
        };
        Ok(Place { asked, target, folder, name, permissions })
    }

    fn part_prefix(&self) -> OsString {
        let mut prefix = OsString::from(".");
        if self.name.len() <= LONGEST_NAME_BYTES {
            prefix.push(&self.name);
        } else {
            let name = self.name.to_string_lossy();
            prefix.push(&name[..name.floor_char_boundary(LONGEST_NAME_BYTES)]);
        }
        prefix.push(".baymat-part");
        prefix
    }

    fn part_file(&self) -> Result<NamedTempFile> {
        let prefix = self.part_prefix();
        let mut builder = Builder::new();
        builder.prefix(&prefix);
        #[cfg(unix)]
        builder.permissions(std::os::unix::fs::PermissionsExt::from_mode(0o666));
        builder.tempfile_in(&self.folder).map_err(|error| {
            let kind = error.kind();
            let why = match kind {
                ErrorKind::PermissionDenied => "no permission to write".to_owned(),
                _ => error.to_string(),
            };
            refused(kind, self.asked, &format!("the folder {} takes no file: {why}", self.folder.display()))
        })
    }

    /// What cannot be removed stays: it does no harm.
    fn remove_leftovers(&self) {
        let prefix = self.part_prefix();
        let Ok(entries) = std::fs::read_dir(&self.folder) else { return };
        for entry in entries.flatten() {
            let is_leftover = starts_with(&entry.file_name(), &prefix)
                && entry.file_type().is_ok_and(|file_type| file_type.is_file());
            if is_leftover {
                let _ = std::fs::remove_file(entry.path());
            }
        }
    }

    fn rename(&self, part: NamedTempFile, replace: bool) -> Result<()> {
        let outcome = if replace { part.persist(&self.target) } else { part.persist_noclobber(&self.target) };
        let failure = match outcome {
            Ok(_) => return Ok(()),
            Err(failure) => failure,
        };
        if failure.error.kind() == ErrorKind::AlreadyExists {
            return Err(exists(self.asked));
        }
        // File systems without hard links know no renaming that refuses an existing name.
        if !replace && !self.target.exists() {
            return failure.file.persist(&self.target).map(drop).map_err(|e| named(self.asked, &e.error));
        }
        Err(named(self.asked, &failure.error))
    }
}

fn follow_links(path: &Path) -> Result<PathBuf> {
    let mut target = path.to_owned();
    for _ in 0..MOST_LINKS {
        let is_link = std::fs::symlink_metadata(&target).is_ok_and(|found| found.file_type().is_symlink());
        if !is_link {
            return Ok(target);
        }
        let next = std::fs::read_link(&target).map_err(|e| named(path, &e))?;
        target = target.parent().unwrap_or(Path::new("")).join(next);
    }
    Err(refused(ErrorKind::InvalidInput, path, "is a link that leads back to itself"))
}

fn starts_with(name: &OsStr, prefix: &OsStr) -> bool {
    name.as_encoded_bytes().starts_with(prefix.as_encoded_bytes())
}

fn refused(kind: ErrorKind, path: &Path, what: &str) -> Error {
    Error::new(kind, format!("{}: {what}", path.display()))
}

fn named(path: &Path, error: &Error) -> Error {
    refused(error.kind(), path, &error.to_string())
}

fn exists(path: &Path) -> Error {
    refused(ErrorKind::AlreadyExists, path, "exists already; it is replaced only with --replace")
}

/// Makes the new name outlast a power cut, where the system offers that.
fn sync_folder(folder: &Path) {
    #[cfg(unix)]
    if let Ok(folder) = std::fs::File::open(folder) {
        let _ = folder.sync_all();
    }
    #[cfg(not(unix))]
    let _ = folder;
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::fs;

    fn names(folder: &Path) -> Vec<String> {
        let mut names: Vec<String> = fs::read_dir(folder)
            .unwrap()
            .map(|entry| entry.unwrap().file_name().into_string().unwrap())
            .collect();
        names.sort();
        names
    }

    #[test]
    fn a_new_file_is_whole_and_alone() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("out.xlsx");
        can_write(&path, false).unwrap();
        assert!(names(folder.path()).is_empty(), "the test of a place leaves nothing behind");
        write_whole(&path, b"whole", false).unwrap();
        assert_eq!(fs::read(&path).unwrap(), b"whole");
        assert_eq!(names(folder.path()), ["out.xlsx"]);
    }

    #[test]
    fn an_existing_file_stays_unless_it_may_be_replaced() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("out.xlsx");
        fs::write(&path, b"issued").unwrap();
        for refusal in [can_write(&path, false), write_whole(&path, b"new", false)] {
            let refusal = refusal.unwrap_err();
            assert_eq!(refusal.kind(), ErrorKind::AlreadyExists);
            assert!(refusal.to_string().contains("out.xlsx: exists already"), "{refusal}");
        }
        assert_eq!(fs::read(&path).unwrap(), b"issued");
        can_write(&path, true).unwrap();
        assert_eq!(fs::read(&path).unwrap(), b"issued", "the test of a place changes nothing");
        write_whole(&path, b"new", true).unwrap();
        assert_eq!(fs::read(&path).unwrap(), b"new");
        assert_eq!(names(folder.path()), ["out.xlsx"]);
    }

    #[test]
    fn a_file_that_appears_after_the_test_of_its_place_is_not_overwritten() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("out.xlsx");
        let place = Place::of(&path, false).unwrap();
        let mut part = place.part_file().unwrap();
        part.write_all(b"new").unwrap();
        fs::write(&path, b"somebody else's").unwrap();
        assert_eq!(place.rename(part, false).unwrap_err().kind(), ErrorKind::AlreadyExists);
        assert_eq!(fs::read(&path).unwrap(), b"somebody else's");
        assert_eq!(names(folder.path()), ["out.xlsx"]);
    }

    #[test]
    fn leftovers_of_the_same_file_are_removed_and_others_stay() {
        let folder = tempfile::tempdir().unwrap();
        for name in [".out.xlsx.baymat-partAb12", ".other.xlsx.baymat-partAb12", ".out.xlsx.swp"] {
            fs::write(folder.path().join(name), b"half").unwrap();
        }
        write_whole(&folder.path().join("out.xlsx"), b"whole", false).unwrap();
        assert_eq!(names(folder.path()), [".other.xlsx.baymat-partAb12", ".out.xlsx.swp", "out.xlsx"]);
    }

    #[test]
    fn a_missing_folder_and_a_folder_in_place_of_the_file_are_named() {
        let folder = tempfile::tempdir().unwrap();
        let missing = can_write(&folder.path().join("no/out.xlsx"), false).unwrap_err();
        assert_eq!(missing.kind(), ErrorKind::NotFound);
        assert!(missing.to_string().contains("there is no folder"), "{missing}");
        for replace in [false, true] {
            let a_folder = write_whole(folder.path(), b"", replace).unwrap_err();
            assert_eq!(a_folder.kind(), ErrorKind::IsADirectory);
        }
        assert_eq!(can_write(Path::new("/"), true).unwrap_err().kind(), ErrorKind::InvalidInput);
    }

    #[test]
    fn a_name_at_the_length_limit_can_be_written() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join(format!("{}.xlsx", "ö".repeat(124)));
        write_whole(&path, b"whole", false).unwrap();
        assert_eq!(fs::read(&path).unwrap(), b"whole");
    }

    #[cfg(unix)]
    mod unix {
        use super::*;
        use std::os::unix::fs::{PermissionsExt, symlink};

        #[test]
        fn a_link_stays_and_its_target_is_replaced() {
            let folder = tempfile::tempdir().unwrap();
            fs::create_dir(folder.path().join("store")).unwrap();
            let target = folder.path().join("store/real.xlsx");
            fs::write(&target, b"old").unwrap();
            let link = folder.path().join("out.xlsx");
            symlink("store/real.xlsx", &link).unwrap();
            assert_eq!(write_whole(&link, b"new", false).unwrap_err().kind(), ErrorKind::AlreadyExists);
            write_whole(&link, b"new", true).unwrap();
            assert!(fs::symlink_metadata(&link).unwrap().file_type().is_symlink());
            assert_eq!(fs::read(&target).unwrap(), b"new");
            assert_eq!(names(&folder.path().join("store")), ["real.xlsx"]);
        }

        #[test]
        fn a_link_to_nothing_makes_its_target_and_a_ring_is_refused() {
            let folder = tempfile::tempdir().unwrap();
            let link = folder.path().join("out.xlsx");
            symlink("later.xlsx", &link).unwrap();
            write_whole(&link, b"new", false).unwrap();
            assert_eq!(fs::read(folder.path().join("later.xlsx")).unwrap(), b"new");
            symlink("a", folder.path().join("b")).unwrap();
            symlink("b", folder.path().join("a")).unwrap();
            assert_eq!(
                can_write(&folder.path().join("a"), true).unwrap_err().kind(),
                ErrorKind::InvalidInput
            );
        }

        #[test]
        fn a_replaced_file_keeps_its_permissions_and_a_new_one_is_not_private() {
            let folder = tempfile::tempdir().unwrap();
            let path = folder.path().join("out.xlsx");
            fs::write(folder.path().join("plain"), b"").unwrap();
            let mode = |path: &Path| fs::metadata(path).unwrap().permissions().mode() & 0o777;
            write_whole(&path, b"new", false).unwrap();
            assert_eq!(mode(&path), mode(&folder.path().join("plain")));
            fs::set_permissions(&path, fs::Permissions::from_mode(0o640)).unwrap();
            write_whole(&path, b"newer", true).unwrap();
            assert_eq!(mode(&path), 0o640);
        }

        #[test]
        fn a_device_is_never_replaced() {
            let refusal = can_write(Path::new("/dev/null"), true).unwrap_err();
            assert!(refusal.to_string().contains("is not a plain file"), "{refusal}");
        }
    }
}
