//! From a case to everything that its report is made from.

use tautring_core::additivity::fitted::FITTED;

use super::entry::Entry;
use super::inputs::{Digest, Header, Inputs, RingReference};
use crate::case::{Case, StructureSource};
use crate::review::{Agreement, Basis, CheckValueError, Reviewer, check_values};
use crate::structure::Structure;

/// Sizes of the measured cycloalkanes that may stand behind the plot.
const CYCLOALKANES: core::ops::RangeInclusive<usize> = 3..=15;

/// What numbers and flags are made from, besides the case, as it was built into the program.
const TABLES: [(&str, &[u8]); 8] = [
    (
        "core/src/additivity/fitted/tables.rs",
        include_bytes!("../../../core/src/additivity/fitted/tables.rs"),
    ),
    (
        "data/measurements.csv",
        include_bytes!("../../../data/measurements.csv"),
    ),
    (
        "data/left_out.csv",
        include_bytes!("../../../data/left_out.csv"),
    ),
    (
        "data/misfits.csv",
        include_bytes!("../../../data/misfits.csv"),
    ),
    (
        "data/enthalpies_strained.csv",
        include_bytes!("../../../data/enthalpies_strained.csv"),
    ),
    (
        "data/contradictions.csv",
        include_bytes!("../../../data/contradictions.csv"),
    ),
    (
        "data/check_values.csv",
        include_bytes!("../../../data/check_values.csv"),
    ),
    (
        "data/references.bib",
        include_bytes!("../../../data/references.bib"),
    ),
];

impl Inputs {
    /// Reviews every substance of a case and recomputes the check values.
    ///
    /// `file` is what the report calls the case file: its name without the folder, so that the report does not depend on where it was
    /// made.
    ///
    /// # Errors
    /// A check value that cannot be recomputed. A substance without an estimate is no error: its entry says why.
    pub fn of_case(case: &Case, file: &str, reviewer: &Reviewer) -> Result<Self, CheckValueError> {
        Ok(Self {
            header: Header {
                title: case.title.clone(),
                reference: case.reference.clone(),
                date: case.date.to_string(),
                author: case.author.clone(),
                revision: case.revision.clone(),
                notes: case.notes.clone(),
            },
            entries: case
                .substances
                .iter()
                .map(|substance| Entry::of(substance, reviewer))
                .collect(),
            checks: check_values(reviewer)?,
            monocycles: CYCLOALKANES
                .filter_map(|size| monocycle(reviewer, size))
                .collect(),
            digests: digests(case, file),
            versions: vec![
                (
                    "tautring-report".to_owned(),
                    env!("CARGO_PKG_VERSION").to_owned(),
                ),
                (
                    "tautring-core".to_owned(),
                    tautring_core::VERSION.to_owned(),
                ),
            ],
        })
    }
}

/// The strain of the unsubstituted cycloalkane of this size, where it was measured.
fn monocycle(reviewer: &Reviewer, size: usize) -> Option<RingReference> {
    let structure = Structure::from_smiles(&format!("C1{}1", "C".repeat(size - 1))).ok()?;
    let review = reviewer.review("", &structure, &[], false).ok()?;
    let strain = review.strain.quantity;
    let used = |value: f64| value.to_bits() == review.gas.quantity.value_kj_per_mol.to_bits();
    let measured = review
        .gas
        .comparisons
        .into_iter()
        .find(|c| used(c.measured.quantity.value_kj_per_mol))?;
    // A point that disagrees with all other rings would draw a maximum that nobody has seen confirmed.
    let sound = measured.agreement == Agreement::Agrees;
    (sound && review.gas.basis == Basis::Measured).then_some(RingReference {
        size,
        strain_kj_per_mol: strain.value_kj_per_mol,
        expanded_kj_per_mol: strain.expanded_kj_per_mol,
        source: measured.measured.source,
    })
}

/// Digests of the case file, the structure files that it names, and the tables.
fn digests(case: &Case, file: &str) -> Vec<Digest> {
    let mut digests = vec![Digest::new(file, case.text.as_bytes())];
    for substance in &case.substances {
        if let StructureSource::File { path, text, .. } = &substance.source {
            let name = path.display().to_string();
            if digests.iter().all(|digest| digest.of != name) {
                digests.push(Digest::new(&name, text.as_bytes()));
            }
        }
    }
    digests.extend(TABLES.map(|(name, bytes)| Digest::new(name, bytes)));
    // The factor is in the core already; its words are the bytes of the file.
    digests.push(Digest::new(
        "core/src/additivity/fitted/factor.bin",
        FITTED.covariance.factor.as_flattened(),
    ));
    digests
}
