//! `tautring completions`: what a shell needs to complete the command line.

use std::io::{self, Write as _};

use clap::{Args, Command};
use clap_complete::Shell;

use super::outcome::{Failure, Outcome};

const EXAMPLE: &str = "\
Example:
  tautring completions bash > ~/.local/share/bash-completion/completions/tautring";

/// Write the completions of a shell to stdout.
#[derive(Args)]
#[command(after_help = EXAMPLE)]
pub(super) struct Completions {
    /// The shell.
    shell: Shell,
}

pub(super) fn write(completions: &Completions, command: &mut Command) -> Result<Outcome, Failure> {
    // The generator panics when its writer fails, so it writes to memory.
    let mut text = Vec::new();
    clap_complete::generate(completions.shell, command, "tautring", &mut text);
    io::stdout().lock().write_all(&text)?;
    Ok(Outcome::Fine)
}
