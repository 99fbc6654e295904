//! A substance of a report: what the case file states, and what the review found.

use serde::Serialize;
use tautring_core::quantities::MolarMass;

use super::rounding::fixed;
use crate::case::{
    Crucible, Measurement, Portion, Record, StructureSource, Subject, Substance, Vocabulary,
};
use crate::review::{CaseMeasurement, Reviewer, SubstanceReview};

/// A substance of a report.
#[derive(Clone, Debug)]
pub struct Entry {
    /// What the case file states.
    pub particulars: Particulars,
    /// What was found, or why there is nothing.
    pub finding: Result<SubstanceReview, String>,
}

/// What the case file says of a substance besides its structure.
#[derive(Clone, Debug, Default, Serialize)]
pub struct Particulars {
    /// Short name in the case file.
    pub id: String,
    /// Name of the substance.
    pub substance: String,
    /// The structure as given: a SMILES, or the path of a file.
    pub structure: String,
    /// Named facts with their units: state, amount.
    pub facts: Vec<(String, String)>,
    /// Measured values as stated.
    pub measured: Vec<Stated>,
    /// Free notes, Markdown.
    pub notes: Option<String>,
}

/// A measured value in the words of the case file.
#[derive(Clone, Debug, Serialize)]
pub struct Stated {
    /// What was measured, with the conditions.
    pub quantity: String,
    /// Number and unit.
    pub value: String,
    /// Uncertainty with its coverage factor; `None` if the source states none.
    pub uncertainty: Option<String>,
    /// Where it was published or who measured it.
    pub source: String,
    /// A remark.
    pub note: Option<String>,
    /// Whether the review compares it with the estimate.
    pub compared: bool,
}

impl Entry {
    /// Reviews a substance of a case.
    pub fn of(substance: &Substance, reviewer: &Reviewer) -> Self {
        let particulars = Particulars::of(substance);
        let measured: Vec<_> = CaseMeasurement::of(substance).collect();
        let finding = reviewer
            .review(&substance.name, &substance.structure, &measured, false)
            .map(|mut review| {
                // A structure file is named, not copied into every table.
                review.input.clone_from(&particulars.structure);
                review
            })
            .map_err(|error| error.to_string());
        Self {
            particulars,
            finding,
        }
    }
}

impl Particulars {
    fn of(substance: &Substance) -> Self {
        let mut facts = vec![
            ("State in the process", words(substance.state)),
            ("Role", words(substance.role)),
        ];
        if let Some(amount) = &substance.amount {
            let mass = substance
                .structure
                .molecule
                .formula()
                .molar_mass_g_per_mol();
            let other = MolarMass::from_g_per_mol(mass).map_or_else(
                |_| String::new(),
                |mass| match amount.portion {
                    Portion::Grams(_) => {
                        format!(" ({} mol)", in_figures(amount.portion.moles(mass)))
                    }
                    Portion::Moles(_) => format!(" ({} g)", in_figures(amount.portion.grams(mass))),
                },
            );
            facts.push(("Amount", format!("{}{other}", amount.written)));
        }
        let structure = match &substance.source {
            StructureSource::Smiles(smiles) => smiles.clone(),
            StructureSource::File { path, record, .. } => {
                let record = match record {
                    Record::Number(number) => format!("number {number}"),
                    Record::Name(name) => format!("the one called {name}"),
                };
                facts.push(("Structure of the file", record));
                path.display().to_string()
            }
        };
        Self {
            id: substance.id.clone(),
            substance: substance.name.clone(),
            structure,
            facts: facts
                .into_iter()
                .map(|(name, fact)| (name.to_owned(), fact))
                .collect(),
            measured: substance.measured.iter().map(Stated::of).collect(),
            notes: substance.notes.clone(),
        }
    }
}

impl Stated {
    fn of(measurement: &Measurement) -> Self {
        let quantity = match &measurement.subject {
            Subject::EnthalpyOfFormation { phase } => {
                format!("enthalpy of formation, {phase}, 298.15 K")
            }
            Subject::Decomposition {
                method,
                crucible,
                onset,
            } => {
                let crucible = match crucible {
                    Crucible::Sealed => "sealed crucible",
                    Crucible::Unsealed => {
                        "unsealed crucible: vapour takes heat away unseen, a lower bound"
                    }
                    Crucible::NotStated => {
                        "crucible not stated: to be read as unsealed, a lower bound"
                    }
                };
                let onset = onset
                    .as_ref()
                    .map_or_else(String::new, |onset| format!(", onset {}", onset.written));
                format!("heat released on decomposition, {method}, {crucible}{onset}")
            }
        };
        let written = &measurement.written;
        let uncertainty = written
            .uncertainty
            .as_ref()
            .zip(written.coverage_k.as_ref());
        Self {
            quantity,
            value: format!("{} {}", written.value, written.unit),
            uncertainty: uncertainty.map(|(u, k)| format!("{u} {} (k = {k})", written.unit)),
            source: measurement.source.clone(),
            note: measurement.note.clone(),
            compared: matches!(measurement.subject, Subject::EnthalpyOfFormation { .. }),
        }
    }
}

/// A word of the case file as a reader's word.
fn words(word: impl Vocabulary) -> String {
    word.word().replace('_', " ")
}

/// Three significant figures, or every digit before the point: an amount has no better known uncertainty.
fn in_figures(amount: f64) -> String {
    let decimals = (2.0 - amount.abs().log10().floor()).clamp(0.0, 9.0);
    fixed(amount, decimals as usize)
}
