//! How a command ends, and what the shell is told.

use std::fmt;
use std::io::{self, ErrorKind, Write as _};
use std::process::ExitCode;

/// How a command ended that did its work.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Outcome {
    /// Fine.
    Fine,
    /// A check said no.
    No,
    /// Some of the work could not be done; the rest was.
    Incomplete,
}

/// Why a command stopped.
#[derive(Debug)]
pub(super) enum Failure {
    /// Something that the message explains.
    Said(String),
    /// stdout could not be written.
    Output(io::Error),
}

impl fmt::Display for Failure {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Said(message) => f.write_str(message),
            Self::Output(error) => write!(f, "the output cannot be written: {error}"),
        }
    }
}

impl Failure {
    /// An error with all the errors behind it.
    pub(super) fn of(error: &dyn std::error::Error) -> Self {
        let mut message = error.to_string();
        let mut source = error.source();
        while let Some(cause) = source {
            message = format!("{message} ({cause})");
            source = cause.source();
        }
        Self::Said(message)
    }
}

impl From<io::Error> for Failure {
    fn from(error: io::Error) -> Self {
        Self::Output(error)
    }
}

/// The exit code; what went wrong is said on stderr.
pub(super) fn conclude(result: Result<Outcome, Failure>) -> ExitCode {
    match result {
        Ok(Outcome::Fine) => ExitCode::SUCCESS,
        // Whoever reads the output has seen enough (`| head`).
        Err(Failure::Output(error)) if error.kind() == ErrorKind::BrokenPipe => ExitCode::SUCCESS,
        Ok(Outcome::No) => ExitCode::from(1),
        Ok(Outcome::Incomplete) => ExitCode::from(2),
        Err(failure) => {
            say(&format!("tautring: {failure}"));
            ExitCode::from(2)
        }
    }
}

/// A line on stderr; nobody listens if it is closed.
pub(super) fn say(line: &str) {
    let _ = writeln!(io::stderr(), "{line}");
}
