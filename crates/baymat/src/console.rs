//! The one way out to the user: standard output and standard error, colour, and a pipe closed early.

use std::io::{self, ErrorKind, IsTerminal as _, Write};

use design_engine::query::Severity;

use crate::exit::Exit;
use crate::message::Message;

/// What the program knows of where it runs. Read here and nowhere else.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Surroundings {
    stdout_is_terminal: bool,
    stderr_is_terminal: bool,
    colour_wanted: bool,
}

impl Surroundings {
    /// Reads them. Colour is wanted unless `NO_COLOR` is set and not empty, or `TERM` is `dumb`.
    pub(crate) fn read() -> Surroundings {
        let no_color = std::env::var_os("NO_COLOR").is_some_and(|value| !value.is_empty());
        let dumb = std::env::var_os("TERM").is_some_and(|value| value == "dumb");
        Surroundings {
            stdout_is_terminal: io::stdout().is_terminal(),
            stderr_is_terminal: io::stderr().is_terminal(),
            colour_wanted: !no_color && !dumb,
        }
    }
}

/// Whether severity words are coloured.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Paint(bool);

impl Paint {
    /// No colour.
    #[cfg(test)]
    pub(crate) fn plain() -> Paint {
        Paint(false)
    }

    /// The word for a severity, coloured where colour is wanted.
    pub(crate) fn severity(self, severity: Severity) -> String {
        let word = severity.word();
        let code = match severity {
            Severity::Error => "1;31",
            Severity::NotDesigned => "1;35",
            Severity::Warning => "1;33",
            Severity::Note => "1;36",
        };
        if self.0 { format!("\u{1b}[{code}m{word}\u{1b}[0m") } else { word.to_owned() }
    }
}

/// Standard output and standard error.
pub(crate) struct Console {
    out: Box<dyn Write>,
    err: Box<dyn Write>,
    surroundings: Surroundings,
    /// Set once standard output takes no more; a reader that closed its pipe has seen enough.
    out_closed: bool,
    out_failure: Option<io::Error>,
}

impl Console {
    /// A console on the process's own streams.
    pub(crate) fn new(surroundings: Surroundings) -> Console {
        Console::on(Box::new(io::stdout()), Box::new(io::stderr()), surroundings)
    }

    fn on(out: Box<dyn Write>, err: Box<dyn Write>, surroundings: Surroundings) -> Console {
        Console { out, err, surroundings, out_closed: false, out_failure: None }
    }

    /// Paint for standard output.
    pub(crate) fn paint(&self) -> Paint {
        Paint(self.surroundings.stdout_is_terminal && self.surroundings.colour_wanted)
    }

    /// Whether progress may be shown.
    pub(crate) fn may_show_progress(&self) -> bool {
        self.surroundings.stderr_is_terminal
    }

    /// Prints to standard output.
    pub(crate) fn print(&mut self, text: &str) {
        if self.out_closed {
            return;
        }
        if let Err(error) = self.out.write_all(text.as_bytes()).and_then(|()| self.out.flush()) {
            self.out_closed = true;
            if error.kind() != ErrorKind::BrokenPipe {
                self.out_failure = Some(error);
            }
        }
    }

    /// Says a message on standard error.
    pub(crate) fn say(&mut self, message: &Message) {
        let paint = Paint(self.surroundings.stderr_is_terminal && self.surroundings.colour_wanted);
        self.say_line(&message.line(paint));
    }

    /// Says a line on standard error. Where that is closed there is nobody left to tell.
    pub(crate) fn say_line(&mut self, line: &str) {
        let _ = writeln!(self.err, "{line}");
    }

    /// Prints the parser's answer: help and version, or what is wrong with the command line.
    pub(crate) fn print_clap(&mut self, answer: &clap::Error) -> Exit {
        if answer.use_stderr() {
            let coloured = self.surroundings.stderr_is_terminal && self.surroundings.colour_wanted;
            let text = rendered(answer, coloured);
            self.say_line(text.trim_end());
            Exit::WrongInput
        } else {
            let coloured = self.surroundings.stdout_is_terminal && self.surroundings.colour_wanted;
            self.print(&rendered(answer, coloured));
            Exit::AllPass
        }
    }

    /// The exit code in the end: output that was lost, but for a closed pipe, is trouble with a file.
    pub(crate) fn close(mut self, exit: Exit) -> Exit {
        let Some(failure) = self.out_failure.take() else { return exit };
        self.say(&Message::error(format!("standard output: cannot be written: {failure}")));
        Exit::FileTrouble
    }
}

fn rendered(answer: &clap::Error, coloured: bool) -> String {
    let text = answer.render();
    let mut text = if coloured { text.ansi().to_string() } else { text.to_string() };
    if !text.ends_with('\n') {
        text.push('\n');
    }
    text
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::cell::RefCell;
    use std::rc::Rc;

    #[derive(Clone, Default)]
    struct Shared(Rc<RefCell<Vec<u8>>>);

    impl Shared {
        fn text(&self) -> String {
            String::from_utf8(self.0.borrow().clone()).unwrap()
        }
    }

    impl Write for Shared {
        fn write(&mut self, bytes: &[u8]) -> io::Result<usize> {
            self.0.borrow_mut().extend_from_slice(bytes);
            Ok(bytes.len())
        }
        fn flush(&mut self) -> io::Result<()> {
            Ok(())
        }
    }

    struct Failing(ErrorKind);

    impl Write for Failing {
        fn write(&mut self, _: &[u8]) -> io::Result<usize> {
            Err(self.0.into())
        }
        fn flush(&mut self) -> io::Result<()> {
            Ok(())
        }
    }

    fn terminal(colour_wanted: bool) -> Surroundings {
        Surroundings { stdout_is_terminal: true, stderr_is_terminal: true, colour_wanted }
    }

    #[test]
    fn colour_is_for_severity_words_on_a_terminal_that_wants_it() {
        for (surroundings, expected) in [
            (terminal(true), "\u{1b}[1;31merror\u{1b}[0m: x\n"),
            (terminal(false), "error: x\n"),
            (Surroundings { stderr_is_terminal: false, ..terminal(true) }, "error: x\n"),
        ] {
            let err = Shared::default();
            let mut console = Console::on(Box::new(io::sink()), Box::new(err.clone()), surroundings);
            console.say(&Message::error("x"));
            assert_eq!(err.text(), expected);
        }
    }

    #[test]
    fn a_closed_pipe_keeps_the_exit_code_and_says_nothing() {
        let err = Shared::default();
        let out = Failing(ErrorKind::BrokenPipe);
        let mut console = Console::on(Box::new(out), Box::new(err.clone()), terminal(false));
        console.print("summary");
        console.print("more");
        assert_eq!(console.close(Exit::NotAllPass), Exit::NotAllPass);
        assert_eq!(err.text(), "");
    }

    #[test]
    fn a_full_disk_under_standard_output_is_trouble() {
        let err = Shared::default();
        let out = Failing(ErrorKind::StorageFull);
        let mut console = Console::on(Box::new(out), Box::new(err.clone()), terminal(false));
        console.print("summary");
        assert_eq!(console.close(Exit::AllPass), Exit::FileTrouble);
        assert!(err.text().starts_with("error: standard output: cannot be written"), "{}", err.text());
    }
}
