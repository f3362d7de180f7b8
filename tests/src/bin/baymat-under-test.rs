//! The program itself, built as a binary of this package so that its tests can run it.
fn main() -> std::process::ExitCode {
    baymat::main_with(std::env::args_os())
}
