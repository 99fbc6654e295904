//! What speaks against single measurements: misfits, and doubts that the collection of the data has noted.

use std::collections::BTreeMap;
use std::fmt;

use serde::Deserialize;
use serde::de::DeserializeOwned;

use super::findings::phase_word;
use super::reviewer::ReviewError;
use crate::dataset::Measurement;
use crate::fit::Misfit;
use crate::structure::{Structure, diastereomer};

const LEFT_OUT: &str = include_str!("../../../data/left_out.csv");
const MISFITS: &str = include_str!("../../../data/misfits.csv");
const COLLECTED: &str = include_str!("../../../data/enthalpies_strained.csv");
const CONTRADICTIONS: &str = include_str!("../../../data/contradictions.csv");

/// One measurement among all: structure, phase, source and value as `data/measurements.csv` writes them.
type Place = (String, String, String, u64);

fn place(smiles: &str, phase: &str, source: &str, value: f64) -> Place {
    let words = [smiles, phase, source].map(str::to_owned);
    let [smiles, phase, source] = words;
    (smiles, phase, source, value.to_bits())
}

/// What is known against the measurements.
pub(super) struct Doubts {
    errors: BTreeMap<Place, f64>,
    misfits: BTreeMap<Place, Misfit>,
    /// By canonical text of the molecule and phase.
    curated: BTreeMap<(String, String), Vec<String>>,
}

impl Doubts {
    /// Reads the tables.
    ///
    /// # Errors
    /// [`ReviewError::Data`] for a line that does not fit or a structure that does not read.
    pub(super) fn new() -> Result<Self, ReviewError> {
        let errors = rows::<LeftOutLine>("data/left_out.csv", LEFT_OUT)?
            .into_iter()
            .map(|line| {
                let value = line.measured_kj_per_mol;
                let place = place(&line.smiles, &line.phase, &line.source, value);
                (place, line.error_kj_per_mol)
            })
            .collect();
        let misfits = rows::<Misfit>("data/misfits.csv", MISFITS)?
            .into_iter()
            .map(|m| {
                let place = place(&m.smiles, &m.phase, &m.source, m.measured_kj_per_mol);
                (place, m)
            })
            .collect();
        Ok(Self {
            errors,
            misfits,
            curated: curated()?,
        })
    }

    /// Measured minus predicted when the molecule is left out, kJ/mol.
    pub(super) fn left_out_error(&self, measurement: &Measurement) -> Option<f64> {
        self.errors.get(&of(measurement)).copied()
    }

    /// The misfit that a measurement is.
    pub(super) fn misfit(&self, measurement: &Measurement) -> Option<&Misfit> {
        self.misfits.get(&of(measurement))
    }

    /// What the collection of the data has noted against the values of a molecule in some phases, each once, in a few words.
    pub(super) fn curated_in<'a>(
        &self,
        identity: &str,
        phases: impl Iterator<Item = &'a str>,
    ) -> Vec<String> {
        let mut told: Vec<String> = Vec::new();
        for doubt in phases.flat_map(|phase| self.curated(identity, phase)) {
            if !told.contains(doubt) {
                told.push(doubt.clone());
            }
        }
        told
    }

    /// What the collection of the data has noted against the values of a molecule in a phase, each in a few words.
    pub(super) fn curated(&self, identity: &str, phase: &str) -> &[String] {
        let key = (identity.to_owned(), phase.to_owned());
        self.curated.get(&key).map_or(&[], Vec::as_slice)
    }
}

fn of(measurement: &Measurement) -> Place {
    place(
        &measurement.smiles,
        &measurement.phase,
        &measurement.source,
        measurement.value_kj_per_mol,
    )
}

#[derive(Deserialize)]
struct LeftOutLine {
    smiles: String,
    /// Absent where the fit knows the gas alone.
    #[serde(default = "gas")]
    phase: String,
    source: String,
    measured_kj_per_mol: f64,
    error_kj_per_mol: f64,
}

fn gas() -> String {
    "g".to_owned()
}

/// A line of the collection.
#[derive(Deserialize)]
struct Collected {
    quantity: String,
    smiles: String,
    value: f64,
    phase: String,
    cross_check: String,
    flag: String,
    note: String,
}

/// Values that disagree with values which are themselves no training data: nothing is held against the former.
const AGAINST_UNSCREENED_ONLY: &str = "disagree>4 only";

/// A doubt that says nothing against a gas value.
const CONDENSED_ONLY: &str = "liquid below solid";

impl Collected {
    /// Whether a flag speaks against the values of its phase; the collection writes it beside every phase of the molecule.
    fn is_told(&self, flag: &str) -> bool {
        let of_other_phases = flag == CONDENSED_ONLY && self.phase == "g";
        !flag.is_empty() && !flag.starts_with(AGAINST_UNSCREENED_ONLY) && !of_other_phases
    }

    /// What the line says against the values of its molecule.
    fn doubts(&self) -> Vec<String> {
        let phase = phase_word(&self.phase);
        let mut doubts = Vec::new();
        for flag in self.flag.split('|').map(str::trim) {
            if flag == "DISAGREE>4" {
                let range = self.cross_check.split_once("range ");
                let range = range.and_then(|(_, after)| after.split(' ').next());
                let range =
                    range.map_or_else(String::new, |r| format!(": {}", r.replace("..", " to ")));
                doubts.push(format!(
                    "published {phase} values disagree by more than 4 kJ/mol{range}"
                ));
            } else if self.is_told(flag) {
                doubts.push(flag.to_owned());
            }
        }
        if let Some(reason) = self.note.strip_prefix("OUTLIER ") {
            let reason = reason.split(',').next().unwrap_or(reason);
            doubts.push(format!(
                "the {phase} value {} is called an outlier {reason}",
                self.value
            ));
        }
        doubts
    }
}

/// A line of the list of phases that disagree.
#[derive(Deserialize)]
struct Contradiction {
    smiles: String,
    step: String,
    values: String,
    reason: String,
}

impl Contradiction {
    /// The phases and steps whose values are in doubt.
    fn phases(&self) -> &'static [&'static str] {
        match self.step.as_str() {
            "v" => &["g", "l", "v"],
            "b" => &["g", "s", "b"],
            _ => &["l", "s", "v", "b"],
        }
    }
}

/// The curated doubts by molecule and phase, each once.
fn curated() -> Result<BTreeMap<(String, String), Vec<String>>, ReviewError> {
    let mut found: BTreeMap<(String, String), Vec<String>> = BTreeMap::new();
    let mut note = |smiles: &str, phase: &str, doubt: String| -> Result<(), ReviewError> {
        let doubts = found
            .entry((identity(smiles)?, phase.to_owned()))
            .or_default();
        if !doubts.contains(&doubt) {
            doubts.push(doubt);
        }
        Ok(())
    };
    for line in rows::<Collected>("data/enthalpies_strained.csv", COLLECTED)? {
        if line.quantity.starts_with("standard enthalpy of formation") && !line.smiles.is_empty() {
            for doubt in line.doubts() {
                note(&line.smiles, &line.phase, doubt)?;
            }
        }
    }
    for line in rows::<Contradiction>("data/contradictions.csv", CONTRADICTIONS)? {
        if !line.reason.starts_with("no contradiction") {
            for phase in line.phases() {
                let doubt = format!("phases disagree: {}; {}", line.values, line.reason);
                note(&line.smiles, phase, doubt)?;
            }
        }
    }
    Ok(found)
}

fn identity(smiles: &str) -> Result<String, ReviewError> {
    let fail = |e: &dyn fmt::Display| ReviewError::Data(format!("{smiles} in data/: {e}"));
    let structure = Structure::from_smiles(smiles).map_err(|e| fail(&e))?;
    diastereomer(&structure.molecule).map_err(|e| fail(&e))
}

fn rows<Row: DeserializeOwned>(file: &str, text: &str) -> Result<Vec<Row>, ReviewError> {
    csv::Reader::from_reader(text.as_bytes())
        .deserialize()
        .collect::<Result<_, _>>()
        .map_err(|e| ReviewError::Data(format!("{file}: {e}")))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn flags_of_the_collection_become_words() {
        let line = |flag: &str, note: &str| Collected {
            quantity: String::new(),
            smiles: String::new(),
            value: 212.5,
            phase: "g".to_owned(),
            cross_check: "4 usable source(s); range 212.5..247.6 (spread 35.1)".to_owned(),
            flag: flag.to_owned(),
            note: note.to_owned(),
        };
        let note = "OUTLIER (old network version), see other rows of this molecule";
        assert_eq!(
            line("DISAGREE>4 | liquid below solid", note).doubts(),
            [
                "published gas values disagree by more than 4 kJ/mol: 212.5 to 247.6",
                "the gas value 212.5 is called an outlier (old network version)"
            ]
        );
        let only = "disagree>4 only with averaged/calculated/estimated/memory rows";
        assert!(line(only, "value used in an example").doubts().is_empty());
    }

    #[test]
    fn norbornadiene_has_the_doubts_of_both_tables() {
        let doubts = curated().expect("the tables read");
        let key = (identity("C1C2C=CC1C=C2").expect("it reads"), "g".to_owned());
        let doubts = doubts.get(&key).expect("doubts");
        for word in ["disagree by more", "outlier", "phases disagree"] {
            assert!(
                doubts.iter().any(|d| d.contains(word)),
                "{word}: {doubts:?}"
            );
        }
    }
}
