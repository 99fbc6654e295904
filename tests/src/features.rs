//! An estimate and everything that it is made of, as bits.

use tautring_core::additivity::fitted::{FITTED, WORKSPACE};
use tautring_core::additivity::{AdditivityError, Features, count};
use tautring_report::structure::HostMolecule;

/// Formula, counted features and enthalpy with their bits, or why there are none.
#[derive(Debug, PartialEq)]
pub struct Fingerprint {
    formula: String,
    counted: Result<Counted, AdditivityError>,
}

#[derive(Debug, PartialEq)]
struct Counted {
    terms: Vec<(u64, u64)>,
    deviation: Vec<u64>,
    enthalpy: u64,
}

/// Bits of the estimated enthalpy of formation and of its standard uncertainty, kJ/mol; nothing where there is no estimate.
///
/// Slower than a fingerprint by a triangular system of as many equations as there are measurements.
pub fn estimate(molecule: &HostMolecule) -> Option<(u64, u64)> {
    let features: Features<4096> = count(molecule).ok()?;
    let mut workspace = vec![0.0; WORKSPACE];
    let estimate = FITTED.estimate(&features, &mut workspace).ok()?;
    let u = estimate.u_kj_per_mol();
    Some((estimate.value_kj_per_mol.to_bits(), u.to_bits()))
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
        enthalpy: FITTED.value(&features).to_bits(),
    });
    Fingerprint {
        formula: molecule.formula().to_string(),
        counted,
    }
}
