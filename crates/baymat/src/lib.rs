//! The front of the program, as a library so that the end-to-end tests can build it too.
//!
//! [`main_with`] parses, runs one command and gives the exit code. One file per command; everything that
//! is printed goes through `console`, and the environment is read in one place, `console::Surroundings`.

mod check;
mod cli;
mod completions;
mod console;
mod exit;
mod man;
mod message;
mod outputs;
mod pipeline;
mod progress;
mod schedule;
mod starter;
mod summary;
mod text_table;

use std::ffi::OsString;
use std::process::ExitCode;

use clap::Parser as _;

use cli::{Cli, Command};
use console::{Console, Surroundings};
use exit::{Exit, Stop};

/// Runs the program on its arguments (the first is the program's name) and gives its exit code.
///
/// | code | meaning |
/// |---|---|
/// | 0 | every panel is designed and passes |
/// | 1 | a check fails or a panel is not designed |
/// | 2 | the book or the command line is wrong; nothing is written |
/// | 3 | a file cannot be read or written, or an output exists and `--replace` is not given |
pub fn main_with(args: impl IntoIterator<Item = OsString>) -> ExitCode {
    let mut console = Console::new(Surroundings::read());
    let exit = match Cli::try_parse_from(args) {
        Ok(cli) => run(&cli.command, &mut console),
        Err(answer) => console.print_clap(&answer),
    };
    console.close(exit).into()
}

fn run(command: &Command, console: &mut Console) -> Exit {
    let outcome = match command {
        Command::Schedule(args) => schedule::run(args, console),
        Command::Check(args) => check::run(args, console),
        Command::Starter(args) => starter::run(args, console),
        Command::Completions(args) => {
            completions::run(args, console);
            Ok(Exit::AllPass)
        }
        Command::Man(args) => man::run(args, console),
    };
    outcome.unwrap_or_else(|stop| report(&stop, console))
}

fn report(stop: &Stop, console: &mut Console) -> Exit {
    for message in &stop.messages {
        console.say(message);
    }
    if let Some(closing) = &stop.closing {
        console.say_line(closing);
    }
    stop.exit
}
