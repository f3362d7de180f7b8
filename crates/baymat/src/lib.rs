//! The front of the program, as a library so that the end-to-end tests can build it too.

/// Runs the program on its arguments (the first is the program's name) and gives its exit code.
pub fn main_with(_args: impl IntoIterator<Item = std::ffi::OsString>) -> std::process::ExitCode {
    std::process::ExitCode::SUCCESS
}
