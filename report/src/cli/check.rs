//! `tautring check`: judges a case file.

use std::io::{self, IsTerminal as _, Write as _};
use std::path::{Path, PathBuf};

use clap::Args;
use tautring_report::case::{self, Case};

use super::outcome::{Failure, Outcome};

const EXAMPLE: &str = "\
Example:
  tautring check examples/spiro_amide.toml

Editors that know JSON Schema check while you type: let the first line of the case file name report/schema/case.schema.json.

Exit codes: 0 fine; 1 the case file has mistakes; 2 it cannot be read.";

/// Check a case file and show every mistake with its place and how to mend it.
///
/// Syntax, keys, numbers, units and structures are judged in one go. Nothing is computed and nothing is written.
#[derive(Args)]
#[command(after_help = EXAMPLE)]
pub(super) struct Check {
    /// The case file.
    #[arg(value_name = "CASE.toml")]
    case: PathBuf,
}

impl Check {
    pub(super) fn run(&self) -> Result<Outcome, Failure> {
        let Some(case) = read_case(&self.case) else {
            return Ok(if self.case.is_file() {
                Outcome::No
            } else {
                Outcome::Incomplete
            });
        };
        let mut output = io::stdout().lock();
        writeln!(output, "{}: {}", case.reference, case.title)?;
        for substance in &case.substances {
            let molecule = &substance.structure.molecule;
            writeln!(
                output,
                "  {}: {}, {}, {}, {}",
                substance.id,
                substance.name,
                molecule.formula(),
                counted(molecule.rings().len(), "ring"),
                counted(substance.measured.len(), "measured value")
            )?;
        }
        writeln!(output, "no mistakes found")?;
        Ok(Outcome::Fine)
    }
}

/// Reads a case file; its mistakes are shown on stderr.
pub(super) fn read_case(path: &Path) -> Option<Case> {
    case::read(path)
        .inspect_err(|errors| {
            let mut stderr = io::stderr();
            let colour = stderr.is_terminal() && std::env::var_os("NO_COLOR").is_none();
            // Nobody listens if stderr is closed.
            let _ = stderr.write_all(errors.render(colour).as_bytes());
        })
        .ok()
}

fn counted(number: usize, noun: &str) -> String {
    let plural = if number == 1 { "" } else { "s" };
    format!("{number} {noun}{plural}")
}
