//! The size of a workbook's parts when unpacked, looked up before anything is unpacked.
//!
//! A workbook is a zip archive; its central directory at the end lists every part with both sizes.

/// Why the directory of an archive cannot be used.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum NoDirectory {
    /// The end of the archive is missing or its directory makes no sense.
    Damaged,
    /// The archive is of the kind for very large files.
    Large,
}

const END: &[u8] = b"PK\x05\x06";
const ENTRY: &[u8] = b"PK\x01\x02";
/// Length of the end record without its comment, and the longest comment.
const END_LENGTH: usize = 22;
const LONGEST_COMMENT: usize = 65_535;

/// Sum of the unpacked sizes that the directory states, bytes.
pub(crate) fn stated_size(bytes: &[u8]) -> Result<u64, NoDirectory> {
    let earliest = bytes.len().saturating_sub(END_LENGTH + LONGEST_COMMENT);
    let tail = &bytes[earliest..];
    let end =
        tail.windows(END.len()).rposition(|window| window == END).ok_or(NoDirectory::Damaged)? + earliest;
    let (entries, offset) = (two(bytes, end + 10)?, four(bytes, end + 16)?);
    if entries == u32::from(u16::MAX) || offset == u32::MAX {
        return Err(NoDirectory::Large);
    }
    let mut at = usize::try_from(offset).map_err(|_| NoDirectory::Damaged)?;
    let mut total: u64 = 0;
    for _ in 0..entries {
        if bytes.get(at..at.saturating_add(ENTRY.len())) != Some(ENTRY) {
            return Err(NoDirectory::Damaged);
        }
        total += u64::from(four(bytes, at + 24)?);
        let names = two(bytes, at + 28)? + two(bytes, at + 30)? + two(bytes, at + 32)?;
        at += 46 + usize::try_from(names).map_err(|_| NoDirectory::Damaged)?;
    }
    Ok(total)
}

fn two(bytes: &[u8], at: usize) -> Result<u32, NoDirectory> {
    let part = bytes.get(at..at.saturating_add(2)).ok_or(NoDirectory::Damaged)?;
    Ok(u32::from(part[0]) | u32::from(part[1]) << 8)
}

fn four(bytes: &[u8], at: usize) -> Result<u32, NoDirectory> {
    Ok(two(bytes, at)? | two(bytes, at.saturating_add(2))? << 16)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::limits::UNPACKED_BYTES;

    fn workbook() -> Vec<u8> {
        let mut book = rust_xlsxwriter::Workbook::new();
        book.add_worksheet().write(0, 0, "some text").unwrap();
        book.save_to_buffer().unwrap()
    }

    #[test]
    fn the_stated_size_is_that_of_the_unpacked_parts() {
        let bytes = workbook();
        let size = stated_size(&bytes).unwrap();
        assert!(size > bytes.len() as u64 && size < 100_000, "{size}");
    }

    #[test]
    fn a_part_that_claims_gigabytes_is_over_the_limit() {
        let mut bytes = workbook();
        let entry = bytes.windows(4).position(|window| window == ENTRY).unwrap();
        bytes[entry + 24..entry + 28].copy_from_slice(&[0xff, 0xff, 0xff, 0x7f]);
        assert!(stated_size(&bytes).unwrap() > UNPACKED_BYTES);
    }

    #[test]
    fn a_file_cut_short_has_no_directory() {
        let bytes = workbook();
        for length in [0, 10, bytes.len() / 2, bytes.len() - 10] {
            assert_eq!(stated_size(&bytes[..length]), Err(NoDirectory::Damaged), "{length}");
        }
    }
}
