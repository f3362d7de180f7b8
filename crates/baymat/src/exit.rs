//! How a command ends: its exit code, and what it says when it stops early.

use std::process::ExitCode;

use crate::message::Message;

/// Exit codes, the same for every command. The order is the order of weight.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(crate) enum Exit {
    /// Every panel is designed and passes.
    AllPass = 0,
    /// A check fails or a panel is not designed.
    NotAllPass = 1,
    /// The book or the command line is wrong; nothing is written.
    WrongInput = 2,
    /// A file cannot be read or written, or an output exists and `--replace` is not given.
    FileTrouble = 3,
}

impl From<Exit> for ExitCode {
    fn from(exit: Exit) -> ExitCode {
        ExitCode::from(exit as u8)
    }
}

/// The reason why a command stops before its work is done.
#[derive(Debug)]
pub(crate) struct Stop {
    /// The exit code.
    pub(crate) exit: Exit,
    /// What is said, one line each.
    pub(crate) messages: Vec<Message>,
    /// A last line, such as the count of errors.
    pub(crate) closing: Option<String>,
}

impl Stop {
    /// The command line asks for something that is refused.
    pub(crate) fn refused(messages: Vec<Message>) -> Stop {
        Stop { exit: Exit::WrongInput, messages, closing: None }
    }

    /// A file cannot be read or written.
    pub(crate) fn file_trouble(messages: Vec<Message>) -> Stop {
        Stop { exit: Exit::FileTrouble, messages, closing: None }
    }
}
