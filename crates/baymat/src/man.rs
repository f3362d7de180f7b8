//! `baymat man`: the manual page of the program or of one command.

use std::io::{self, Write};

use clap::CommandFactory as _;
use clap_mangen::Man;

use crate::cli::{Cli, ManArgs};
use crate::console::Console;
use crate::exit::{Exit, Stop};
use crate::message::Message;

pub(crate) fn run(args: &ManArgs, console: &mut Console) -> Result<Exit, Stop> {
    let mut program = Cli::command().disable_help_subcommand(true);
    program.build();
    let command = match &args.command {
        None => program,
        Some(name) => named(&program, name)?,
    };
    let mut page = Vec::new();
    write_page(command, &mut page)
        .map_err(|e| Stop::file_trouble(vec![Message::error(format!("manual page: {e}"))]))?;
    console.print(&String::from_utf8_lossy(&page));
    Ok(Exit::AllPass)
}

fn named(program: &clap::Command, name: &str) -> Result<clap::Command, Stop> {
    program.find_subcommand(name).cloned().ok_or_else(|| {
        let known: Vec<&str> = program.get_subcommands().map(clap::Command::get_name).collect();
        let text = format!("man: there is no command \"{name}\"; the commands are {}", known.join(", "));
        Stop::refused(vec![Message::error(text)])
    })
}

fn write_page(command: clap::Command, page: &mut dyn Write) -> io::Result<()> {
    let after = command.get_after_long_help().map(ToString::to_string).unwrap_or_default();
    let has_commands = command.has_subcommands();
    let man = Man::new(command).source(concat!("baymat ", env!("CARGO_PKG_VERSION")));
    let mut page = page;
    man.render_title(&mut page)?;
    man.render_name_section(&mut page)?;
    man.render_synopsis_section(&mut page)?;
    man.render_description_section(&mut page)?;
    man.render_options_section(&mut page)?;
    if has_commands {
        man.render_subcommands_section(&mut page)?;
    }
    write_as_printed(&after, page)
}

/// Blocks of text that begin with a heading and a colon, as sections whose lines stay as they are.
fn write_as_printed(text: &str, page: &mut dyn Write) -> io::Result<()> {
    for block in text.split("\n\n") {
        let Some((heading, lines)) = block.split_once(":\n") else { continue };
        writeln!(page, ".SH \"{}\"\n.nf", heading.to_uppercase())?;
        for line in lines.lines() {
            writeln!(page, "{}", line.trim_start().replace('\\', "\\e").replace('-', "\\-"))?;
        }
        writeln!(page, ".fi")?;
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn examples_and_exit_codes_are_sections_of_their_own() {
        let mut page = Vec::new();
        write_as_printed("Examples:\n  baymat man > a.1\n  b --c\n\nExit codes:\n  0  well", &mut page)
            .unwrap();
        let expected = ".SH \"EXAMPLES\"\n.nf\nbaymat man > a.1\nb \\-\\-c\n.fi\n.SH \"EXIT CODES\"\n.nf\n0  well\n.fi\n";
        assert_eq!(String::from_utf8(page).unwrap(), expected);
    }
}
