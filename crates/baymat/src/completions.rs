//! `baymat completions`: a script that completes commands and options in a shell.

use clap::CommandFactory as _;

use crate::cli::{Cli, CompletionsArgs};
use crate::console::Console;

pub(crate) fn run(args: &CompletionsArgs, console: &mut Console) {
    let mut script = Vec::new();
    clap_complete::generate(args.shell, &mut Cli::command(), "baymat", &mut script);
    console.print(&String::from_utf8_lossy(&script));
}
