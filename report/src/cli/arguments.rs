//! The commands and their words.

use std::process::ExitCode;

use clap::{CommandFactory, Parser, Subcommand};

use super::check::Check;
use super::completions::Completions;
use super::estimate::Estimate;
use super::outcome::{Failure, Outcome, conclude};
use super::report::Report;
use super::verify::Verify;
use super::{completions, man};

const EXIT_CODES: &str = "\
Exit codes: 0 fine; 1 a check said no; 2 something could not be run (a structure that cannot be read, a file that is not there).

An estimate is no substitute for calorimetry. Local codes and the judgement of a licensed practitioner decide.";

/// Strain energies and enthalpies of formation of ring molecules, with uncertainties and the measurements they rest on.
///
/// Estimates come from an additivity that was fitted to published enthalpies of formation, vaporisation and sublimation at 298.15 K. Every number carries
/// its uncertainty, and every estimate the list of measured compounds that it leans on.
#[derive(Parser)]
#[command(name = "tautring", version, after_help = EXIT_CODES, arg_required_else_help = true)]
struct Arguments {
    #[command(subcommand)]
    command: Command,
}

#[derive(Subcommand)]
enum Command {
    Estimate(Estimate),
    Report(Report),
    Check(Check),
    Verify(Verify),
    Completions(Completions),
    /// Write the manual page, in roff, to stdout.
    Man,
}

/// Reads the command line and does what it says.
pub(crate) fn run() -> ExitCode {
    conclude(match Arguments::parse().command {
        Command::Estimate(estimate) => estimate.run(),
        Command::Report(report) => report.run(),
        Command::Check(check) => check.run(),
        Command::Verify(verify) => verify.run(),
        Command::Completions(completions) => with_command(|c| completions::write(&completions, c)),
        Command::Man => with_command(man::write),
    })
}

fn with_command(
    write: impl FnOnce(&mut clap::Command) -> Result<Outcome, Failure>,
) -> Result<Outcome, Failure> {
    write(&mut Arguments::command())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_arguments_are_consistent() {
        Arguments::command().debug_assert();
    }

    #[test]
    fn every_command_has_an_example_in_its_help() {
        for command in Arguments::command().get_subcommands() {
            let name = command.get_name();
            let help = command.clone().render_long_help().to_string();
            let machinery = matches!(name, "man");
            assert!(machinery || help.contains("Example"), "{name}");
        }
    }
}
