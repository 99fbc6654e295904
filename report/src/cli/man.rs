//! `tautring man`: the manual page.

use std::io::{self, Write as _};

use clap::Command;
use clap_mangen::Man;

use super::outcome::{Failure, Outcome};

/// The page of the program, then those of its commands.
pub(super) fn write(command: &mut Command) -> Result<Outcome, Failure> {
    command.build();
    let mut text = Vec::new();
    Man::new(command.clone()).render(&mut text)?;
    for part in command
        .get_subcommands()
        .filter(|part| part.get_name() != "help")
    {
        let man = Man::new(
            part.clone()
                .bin_name(format!("tautring {}", part.get_name())),
        );
        man.render_synopsis_section(&mut text)?;
        man.render_description_section(&mut text)?;
        man.render_options_section(&mut text)?;
        man.render_extra_section(&mut text)?;
    }
    io::stdout().lock().write_all(&text)?;
    Ok(Outcome::Fine)
}
