//! The command line: one file for each command.
//!
//! Data goes to stdout, talk to stderr. Exit code 0 means fine, 1 that a check said no, 2 that something could not be run.

mod arguments;
mod card;
mod check;
mod completions;
mod estimate;
mod given;
mod man;
mod outcome;
mod report;
mod verify;

pub(crate) use arguments::run;
