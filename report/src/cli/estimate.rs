//! `tautring estimate`: enthalpy of formation and strain of structures.

use std::io::{self, Write};

use clap::Args;
use serde_json::{Value, json};
use tautring_report::render::contract;
use tautring_report::review::{Reviewer, SubstanceReview};
use tautring_report::structure::StructureError;

use super::card::{LEGEND, card};
use super::given::{Given, given};
use super::outcome::{Failure, Outcome, say};

const EXAMPLES: &str = "\
Examples:
  tautring estimate C1CO1                  oxirane, as a table
  tautring estimate C1CC1 C1CCC1 --json    two cycloalkanes, one JSON object to a line
  tautring estimate route.sdf              every structure of an SDF
  tautring estimate --blind C1CC1          as if cyclopropane had never been measured
  cut -f1 list.tsv | tautring estimate -   SMILES from another program

Exit codes: 0 fine; 2 a structure could not be read or estimated (the others are still written).";

/// Estimate the enthalpies of formation (gas, liquid, crystal) and the ring strain of structures.
///
/// For each structure: formula and molar mass; the enthalpy of formation at 298.15 K with its expanded uncertainty U (95 %), measured
/// values beside the estimate that was made without them; the strain in kJ/mol, kcal/mol and J/g, in total and for each ring system; the
/// measured compounds that the estimate leans on, with weights and sources; and what is doubtful.
#[derive(Args)]
#[command(after_help = EXAMPLES)]
pub(super) struct Estimate {
    /// SMILES; or a Molfile, an SDF or a list of SMILES (one to a line, a name after it); or - for SMILES lines on stdin.
    #[arg(required = true, value_name = "STRUCTURE")]
    structures: Vec<String>,
    /// Write one JSON object to a line, numbers with all their digits, in place of the table.
    #[arg(long)]
    json: bool,
    /// Leave out every measurement of the molecule itself, in every configuration and isotopic form: what the estimate would be if nobody
    /// had measured it.
    #[arg(long)]
    blind: bool,
}

impl Estimate {
    pub(super) fn run(&self) -> Result<Outcome, Failure> {
        let reviewer = Reviewer::new().map_err(|error| Failure::of(&error))?;
        let mut output = io::stdout().lock();
        let (mut written, mut failed) = (0, 0);
        for given in self.structures.iter().flat_map(|argument| given(argument)) {
            match self.review(&reviewer, &given) {
                Ok(review) if self.json => {
                    writeln!(output, "{}", object(&given, &review))?;
                }
                Ok(review) => writeln!(output, "{}", card(&given.place(), &review))?,
                Err(reason) => {
                    failed += 1;
                    if self.json {
                        writeln!(output, "{}", unreadable(&given, &reason))?;
                    } else {
                        say(&format!("tautring: {}", complaint(&given, &reason)));
                    }
                    continue;
                }
            }
            written += 1;
        }
        if written > 0 && !self.json {
            writeln!(output, "{LEGEND}")?;
        }
        output.flush()?;
        if failed == 0 {
            return Ok(Outcome::Fine);
        }
        let total = written + failed;
        say(&format!(
            "tautring: {failed} of {total} structures could not be estimated"
        ));
        Ok(Outcome::Incomplete)
    }

    fn review(&self, reviewer: &Reviewer, given: &Given) -> Result<SubstanceReview, String> {
        let structure = given.structure.as_ref().map_err(ToString::to_string)?;
        let name = if structure.name.is_empty() {
            &given.input
        } else {
            &structure.name
        };
        let mut review = reviewer
            .review(name, structure, &[], self.blind)
            .map_err(|error| error.to_string())?;
        review.input.clone_from(&given.input);
        Ok(review)
    }
}

fn object(given: &Given, review: &SubstanceReview) -> Value {
    let mut object = contract(review);
    object["name"] = json!(review.name);
    if let Some(record) = given.record {
        object["record"] = json!(record);
    }
    object
}

fn unreadable(given: &Given, reason: &str) -> Value {
    let mut object = json!({ "input": given.input, "error": reason });
    if let Some(record) = given.record {
        object["record"] = json!(record);
    }
    object
}

/// Longest SMILES that is shown with its mistake marked.
const SHOWN: usize = 100;

/// The reason, with the offending part of a SMILES marked under it.
fn complaint(given: &Given, reason: &str) -> String {
    if let Err(StructureError::File { .. }) = given.structure {
        // The reason names the file already.
        return reason.to_owned();
    }
    let short: String = given.place().chars().take(SHOWN).collect();
    let message = format!("{short}: {reason}");
    let span = given
        .structure
        .as_ref()
        .err()
        .and_then(StructureError::span);
    let marked = span.and_then(|span| {
        let before = given.input.get(..span.start)?.chars().count();
        let marked = given.input.get(span)?.chars().count().max(1);
        (given.input.len() <= SHOWN).then(|| {
            format!(
                "\n  {}\n  {}{}",
                given.input,
                " ".repeat(before),
                "^".repeat(marked)
            )
        })
    });
    message + marked.as_deref().unwrap_or_default()
}
