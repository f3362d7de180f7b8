//! The command line: commands, options, their help.

use std::path::PathBuf;

use clap::{Args, Parser, Subcommand};

/// Exit codes as every long help prints them.
const EXIT_CODES: &str = "Exit codes:
  0  every panel is designed and passes
  1  a check fails or a panel is not designed
  2  the book or the command line is wrong; nothing is written
  3  a file cannot be read or written, or an output exists and --replace is not given";

const ABOUT_LONG: &str = "Turns a floor book (gridlines, panels, loads, criteria: one .xlsx workbook or a \
folder of CSV files) into a reinforcement schedule workbook for solid concrete slabs to BS 8110-1:1997.

Results are for review by a qualified engineer. Local codes, national rules and licensed practice govern. \
There is no warranty.";

const EXAMPLES: &str = "Examples:
  baymat starter floor.xlsx       make a floor book to fill in
  baymat schedule floor.xlsx      design it and write floor-schedule.xlsx";

const SCHEDULE_EXAMPLES: &str = "Examples:
  baymat schedule floor.xlsx
  baymat schedule floor-csv -o level-2.xlsx --json level-2.json --csv level-2 --replace";

const CHECK_EXAMPLES: &str = "Examples:
  baymat check floor.xlsx
  baymat check floor-csv --quiet && echo \"every panel passes\"";

const STARTER_EXAMPLES: &str = "Examples:
  baymat starter floor.xlsx
  baymat starter level-2/floor.xlsx";

const COMPLETIONS_EXAMPLES: &str = "Examples:
  baymat completions bash > ~/.local/share/bash-completion/completions/baymat
  baymat completions fish > ~/.config/fish/completions/baymat.fish";

const MAN_EXAMPLES: &str = "Examples:
  baymat man > baymat.1
  baymat man schedule > baymat-schedule.1";

/// Help that ends in examples; the long help adds the exit codes.
fn with_codes(examples: &str) -> String {
    format!("{examples}\n\n{EXIT_CODES}")
}

/// Reinforced concrete slab floors: a floor book in, a reinforcement schedule workbook out.
#[derive(Debug, Parser)]
#[command(
    name = "baymat",
    bin_name = "baymat",
    version,
    about,
    long_about = ABOUT_LONG,
    max_term_width = 100,
    arg_required_else_help = true,
    after_help = EXAMPLES,
    after_long_help = with_codes(EXAMPLES)
)]
pub(crate) struct Cli {
    #[command(subcommand)]
    pub(crate) command: Command,
}

/// The commands.
#[derive(Debug, Subcommand)]
pub(crate) enum Command {
    /// Design a floor book and write its schedule workbook
    #[command(after_help = SCHEDULE_EXAMPLES, after_long_help = with_codes(SCHEDULE_EXAMPLES))]
    Schedule(ScheduleArgs),
    /// Read a floor book and print every edge with its reason, and all queries
    #[command(after_help = CHECK_EXAMPLES, after_long_help = with_codes(CHECK_EXAMPLES))]
    Check(CheckArgs),
    /// Write a floor book to fill in, with two sample panels to overwrite
    #[command(after_help = STARTER_EXAMPLES, after_long_help = with_codes(STARTER_EXAMPLES))]
    Starter(StarterArgs),
    /// Print a script that completes commands and options in a shell
    #[command(after_help = COMPLETIONS_EXAMPLES, after_long_help = with_codes(COMPLETIONS_EXAMPLES))]
    Completions(CompletionsArgs),
    /// Print the manual page of the program or of one command
    #[command(after_help = MAN_EXAMPLES, after_long_help = with_codes(MAN_EXAMPLES))]
    Man(ManArgs),
}

#[derive(Debug, Args)]
pub(crate) struct ScheduleArgs {
    /// The floor book: a .xlsx workbook, or a folder of CSV files
    pub(crate) book: PathBuf,
    /// The schedule workbook [default: the book's name and -schedule.xlsx, beside the book]
    #[arg(short, long, value_name = "OUT.xlsx")]
    pub(crate) output: Option<PathBuf>,
    /// Also write the results, unrounded, for other programs
    #[arg(long, value_name = "FILE")]
    pub(crate) json: Option<PathBuf>,
    /// Also write bending schedule, drawing notes and quantities as CSV files into this folder
    #[arg(long, value_name = "DIR")]
    pub(crate) csv: Option<PathBuf>,
    /// The schedule workbook of the issue before: its bar marks are kept, and changes are listed
    #[arg(long, value_name = "OLD.xlsx")]
    pub(crate) previous: Option<PathBuf>,
    /// Write over outputs that exist; a floor book is never written over
    #[arg(long)]
    pub(crate) replace: bool,
    /// Print no summary, only errors
    #[arg(short, long)]
    pub(crate) quiet: bool,
}

#[derive(Debug, Args)]
pub(crate) struct CheckArgs {
    /// The floor book: a .xlsx workbook, or a folder of CSV files
    pub(crate) book: PathBuf,
    /// Print only errors
    #[arg(short, long)]
    pub(crate) quiet: bool,
}

#[derive(Debug, Args)]
pub(crate) struct StarterArgs {
    /// The floor book to make
    #[arg(value_name = "OUT.xlsx")]
    pub(crate) out: PathBuf,
    /// Write over the file if it exists
    #[arg(long)]
    pub(crate) replace: bool,
}

#[derive(Debug, Args)]
pub(crate) struct CompletionsArgs {
    /// The shell
    pub(crate) shell: clap_complete::Shell,
}

#[derive(Debug, Args)]
pub(crate) struct ManArgs {
    /// The command [default: the program as a whole]
    pub(crate) command: Option<String>,
}

#[cfg(test)]
mod tests {
    use super::*;
    use clap::CommandFactory as _;

    #[test]
    fn the_command_line_is_consistent() {
        Cli::command().debug_assert();
    }

    #[test]
    fn every_command_has_two_examples_and_the_exit_codes() {
        for command in Cli::command().get_subcommands() {
            let long = command.get_after_long_help().unwrap().to_string();
            let examples = long.lines().filter(|line| line.starts_with("  baymat ")).count();
            assert_eq!(examples, 2, "{}", command.get_name());
            assert!(long.contains("  3  a file cannot be read or written"), "{}", command.get_name());
        }
    }
}
