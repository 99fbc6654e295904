//! Everything an estimate is made of, as bits.

use tautring_core::additivity::{Features, count};
use tautring_report::structure::HostMolecule;

/// Formula, and the counted features with their bits.
///
/// Two molecules with equal fingerprints have the same estimate to the last bit: nothing else enters it.
#[derive(Debug, PartialEq, Eq)]
pub struct Fingerprint {
    formula: String,
    terms: Vec<(u64, u64)>,
    deviation: Vec<u64>,
}

/// The features of a molecule.
///
/// # Panics
/// When the molecule has more features than the host reads.
pub fn features(molecule: &HostMolecule) -> Features<4096> {
    count(molecule).unwrap_or_else(|e| panic!("{}: {e}", molecule.formula()))
}

/// The fingerprint of a molecule.
pub fn fingerprint(molecule: &HostMolecule) -> Fingerprint {
    let features = features(molecule);
    Fingerprint {
        formula: molecule.formula().to_string(),
        terms: features
            .terms()
            .iter()
            .map(|term| (term.key.bits(), term.count.to_bits()))
            .collect(),
        deviation: features
            .deviation()
            .counts()
            .iter()
            .map(|c| c.to_bits())
            .collect(),
    }
}
