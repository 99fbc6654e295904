//! `tautring verify`: published values, recomputed.

use std::io::{self, Write as _};

use clap::Args;
use serde_json::json;
use tautring_report::document::rounding::{as_published, rounded, uncertainty};
use tautring_report::review::{CheckOutcome, CheckValue, Reviewer, check_values};

use super::outcome::{Failure, Outcome};

const EXAMPLE: &str = "\
Example:
  tautring verify

Exit codes: 0 every value agrees; 1 one is off; 2 one could not be recomputed.";

/// Recompute published values and compare: published, recomputed, difference, tolerance and why that one, source.
///
/// Agreement shows that this program is the one that was checked. It says nothing of a substance that no one has measured.
#[derive(Args)]
#[command(after_help = EXAMPLE)]
pub(super) struct Verify {
    /// Write one JSON object to a line, in place of the table.
    #[arg(long)]
    json: bool,
}

impl Verify {
    pub(super) fn run(&self) -> Result<Outcome, Failure> {
        let reviewer = Reviewer::new().map_err(|error| Failure::of(&error))?;
        let checks = check_values(&reviewer).map_err(|error| Failure::of(&error))?;
        let mut output = io::stdout().lock();
        let off = checks
            .iter()
            .filter(|check| check.outcome == CheckOutcome::Off)
            .count();
        for check in &checks {
            if self.json {
                let mut object =
                    serde_json::to_value(check).map_err(|error| Failure::of(&error))?;
                object["difference"] = json!(check.computed - check.published);
                writeln!(output, "{object}")?;
            } else {
                writeln!(output, "{}\n", lines(check))?;
            }
        }
        if !self.json {
            writeln!(
                output,
                "{} of {} check values agree",
                checks.len() - off,
                checks.len()
            )?;
        }
        Ok(if off == 0 { Outcome::Fine } else { Outcome::No })
    }
}

fn lines(check: &CheckValue) -> String {
    let verdict = match check.outcome {
        CheckOutcome::Agrees => "agrees",
        CheckOutcome::Off => "OFF",
    };
    let number = |value: f64| rounded(value, check.tolerance).value;
    format!(
        "{verdict:<7} {}: {}, {}\n  published {:>9}   recomputed {:>9}   difference {:>7}   tolerance {:>6} {}\n  tolerance: {}\n  source: {}",
        check.id,
        check.quantity,
        check.subject,
        as_published(check.published),
        number(check.computed),
        number(check.computed - check.published),
        uncertainty(check.tolerance),
        check.unit,
        check.tolerance_reason,
        source(check)
    )
}

/// The source of a check value and how it was seen, such as `goldbook-s06037 (seen)` or `common practice`.
fn source(check: &CheckValue) -> String {
    match (check.source.as_str(), check.source_seen.as_str()) {
        ("", seen) => seen.to_owned(),
        (key, "yes") => format!("{key} (seen)"),
        (key, seen) => format!("{key} ({seen})"),
    }
}
