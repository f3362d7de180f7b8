//! The program: parse, run, exit code.
fn main() -> std::process::ExitCode {
    baymat::main_with(std::env::args_os())
}
