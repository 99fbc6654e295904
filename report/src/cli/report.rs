//! `tautring report`: from a case file to a report that can be signed.

use std::path::{Path, PathBuf};

use clap::Args;
use tautring_report::document::{Inputs, report};
use tautring_report::render::write_all;
use tautring_report::review::{CheckOutcome, Reviewer};

use super::check::read_case;
use super::outcome::{Failure, Outcome, say};

const EXAMPLE: &str = "\
Example:
  tautring report examples/spiro_amide.toml --out spiro_amide

DIR then holds report.html (one file, to be read and printed anywhere), report.md with figures/, and report.json. The same case file
gives the same bytes. Files are replaced only when all of them could be written.

Exit codes: 0 fine; 1 a substance could not be reviewed (the report says which and why) or a check value is off; 2 the case file has
mistakes or the report cannot be written.";

/// Write the strain report of a case: Markdown, HTML and JSON.
///
/// The report holds cautions, a summary, for each substance the enthalpy of formation, the strain and what both rest on, check values
/// recomputed at that moment, a bibliography, and room for signatures.
#[derive(Args)]
#[command(after_help = EXAMPLE)]
pub(super) struct Report {
    /// The case file.
    #[arg(value_name = "CASE.toml")]
    case: PathBuf,
    /// Folder for the report; made if it is not there.
    #[arg(long, value_name = "DIR")]
    out: PathBuf,
}

impl Report {
    pub(super) fn run(&self) -> Result<Outcome, Failure> {
        let Some(case) = read_case(&self.case) else {
            return Ok(Outcome::Incomplete);
        };
        let reviewer = Reviewer::new().map_err(|error| Failure::of(&error))?;
        let inputs = Inputs::of_case(&case, &file_name(&self.case), &reviewer)
            .map_err(|error| Failure::of(&error))?;
        let files =
            write_all(&report(&inputs), &inputs, &self.out).map_err(|error| Failure::of(&error))?;
        let mut outcome = Outcome::Fine;
        for entry in &inputs.entries {
            if let Err(reason) = &entry.finding {
                outcome = Outcome::No;
                say(&format!(
                    "tautring: {} could not be reviewed: {reason}",
                    entry.particulars.substance
                ));
            }
        }
        let off = |outcome: CheckOutcome| outcome == CheckOutcome::Off;
        let off = inputs.checks.iter().filter(|c| off(c.outcome)).count();
        if off > 0 {
            outcome = Outcome::No;
            say(&format!(
                "tautring: {off} check values are off; `tautring verify` shows which"
            ));
        }
        say(&format!(
            "{} of {} substances reviewed, {} flags; {} files in {}: read report.html",
            inputs.reviews().count(),
            inputs.entries.len(),
            inputs
                .reviews()
                .map(|review| review.flags.len())
                .sum::<usize>(),
            files.len(),
            self.out.display()
        ));
        Ok(outcome)
    }
}

/// The name of a file without its folder.
fn file_name(path: &Path) -> String {
    path.file_name()
        .map_or_else(String::new, |name| name.to_string_lossy().into_owned())
}
