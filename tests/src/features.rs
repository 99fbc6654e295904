//! Everything an estimate is made of, as bits.

use tautring_core::additivity::{AdditivityError, Features, count};
use tautring_report::structure::HostMolecule;

/// Formula, and the counted features with their bits, or why there are none.
///
/// Two molecules with equal fingerprints have the same estimate to the last bit: nothing else enters it.
#[derive(Debug, PartialEq)]
pub struct Fingerprint {
    formula: String,
    counted: Result<Counted, AdditivityError>,
}

#[derive(Debug, PartialEq)]
struct Counted {
    terms: Vec<(u64, u64)>,
    deviation: Vec<u64>,
}

/// The fingerprint of a molecule.
pub fn fingerprint(molecule: &HostMolecule) -> Fingerprint {
    let features: Result<Features<4096>, _> = count(molecule);
    let counted = features.map(|features| Counted {
        terms: features
            .terms()
            .iter()
            .map(|term| (term.key.bits(), term.count.to_bits()))
            .collect(),
        deviation: features
            .deviation()
            .counts()
            .iter()
            .map(|count| count.to_bits())
            .collect(),
    });
    Fingerprint {
        formula: molecule.formula().to_string(),
        counted,
    }
}
