//! Running the program and looking at how it ended.
#![allow(dead_code, reason = "each test file uses its part")]
#![allow(clippy::unwrap_used, reason = "a helper of tests may panic as they do")]

use std::ffi::OsStr;
use std::path::Path;
use std::process::{Command, Output};

/// The program, with nothing of the tester's own environment that changes what it prints.
pub(crate) fn program() -> Command {
    let mut command = Command::new(env!("CARGO_BIN_EXE_baymat-under-test"));
    command.env_remove("NO_COLOR").env_remove("TERM").env("COLUMNS", "100");
    command
}

/// Runs the program in a folder.
pub(crate) fn run_in(folder: &Path, args: &[impl AsRef<OsStr>]) -> Ended {
    Ended(program().current_dir(folder).args(args).output().unwrap())
}

/// How a run ended.
#[derive(Debug)]
pub(crate) struct Ended(pub(crate) Output);

impl Ended {
    pub(crate) fn code(&self) -> i32 {
        self.0.status.code().unwrap_or_else(|| panic!("ended by a signal: {self:?}"))
    }

    pub(crate) fn out(&self) -> &str {
        std::str::from_utf8(&self.0.stdout).unwrap()
    }

    pub(crate) fn err(&self) -> &str {
        std::str::from_utf8(&self.0.stderr).unwrap()
    }

    /// Asserts the exit code, with everything printed in the message of a failure.
    #[track_caller]
    pub(crate) fn ends_with(self, code: i32) -> Ended {
        assert_eq!(self.code(), code, "stdout:\n{}\nstderr:\n{}", self.out(), self.err());
        self
    }

    /// Asserts that standard output says all of these.
    #[track_caller]
    pub(crate) fn prints(self, texts: &[&str]) -> Ended {
        for text in texts {
            assert!(self.out().contains(text), "no \"{text}\" in stdout:\n{}", self.out());
        }
        self
    }

    /// Asserts that standard error says all of these.
    #[track_caller]
    pub(crate) fn says(self, texts: &[&str]) -> Ended {
        for text in texts {
            assert!(self.err().contains(text), "no \"{text}\" in stderr:\n{}", self.err());
        }
        self
    }

    /// Asserts that nothing is on standard output.
    #[track_caller]
    pub(crate) fn prints_nothing(self) -> Ended {
        assert_eq!(self.out(), "");
        self
    }

    /// Asserts that nothing is on standard error.
    #[track_caller]
    pub(crate) fn says_nothing(self) -> Ended {
        assert_eq!(self.err(), "");
        self
    }
}
