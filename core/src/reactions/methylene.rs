//! The homologous CH2 increment: what one CH2 more adds to a long n-alkane.

use super::error::ReactionError;
use crate::additivity::{Features, count};
use crate::molecule::{Atom, BondOrder, Element, Molecule, MoleculeBuilder};

/// Carbons of the shorter of the two n-alkanes; from here on no feature sees both ends of the chain.
const CHAIN: usize = 12;

/// Size of the ring where the molecule is a ring of CH2 groups and nothing else, the only molecules that the convention defines.
///
/// Strain = enthalpy of formation of (CH2)n minus n times the increment of CH2 in the n-alkanes.
///
/// # Source
/// `goldbook-s06037`.
pub fn methylene_ring_size<const A: usize, const B: usize>(
    molecule: &Molecule<A, B>,
) -> Option<usize> {
    let atoms = molecule.atoms();
    let methylene = |(index, atom): (usize, &Atom)| {
        atom.element == Element::C
            && atom.charge == 0
            && atom.hydrogens == 2
            && molecule.neighbours(index).len() == 2
    };
    let single = molecule
        .bonds()
        .iter()
        .all(|b| b.order == BondOrder::Single);
    let all = atoms.iter().enumerate().all(methylene);
    (all && single && molecule.fragments() == 1).then_some(atoms.len())
}

/// The increment of one CH2 in the n-alkanes: C13H28 minus C12H26, without the deviations of the two.
///
/// The deviations are of the two molecules; the increment is the limit of long chains, where they count for nothing.
///
/// # Errors
/// [`ReactionError::Additivity`] when `F` is too small.
pub fn methylene_increment<const F: usize>() -> Result<Features<F>, ReactionError> {
    let mut increment: Features<F> = count(&alkane(CHAIN + 1)?)?;
    let shorter: Features<F> = count(&alkane(CHAIN)?)?;
    increment.add_scaled(&shorter, -1.0)?;
    Ok(increment.increments_only())
}

fn alkane(carbons: usize) -> Result<Molecule<16, 16>, ReactionError> {
    let mut builder = MoleculeBuilder::new();
    for index in 0..carbons {
        let hydrogens = if index == 0 || index + 1 == carbons {
            3
        } else {
            2
        };
        builder.add_atom(Atom {
            element: Element::C,
            charge: 0,
            hydrogens,
            isotope: 0,
        })?;
        if index > 0 {
            builder.add_bond(index - 1, index, BondOrder::Single)?;
        }
    }
    Ok(builder.finish()?)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::additivity::fitted::{FITTED, WORKSPACE};

    #[test]
    #[expect(clippy::large_stack_arrays, reason = "a test has the stack of a host")]
    fn increment_is_that_of_the_n_alkanes() {
        // The Gold Book takes -62/3 = -20.67 kJ/mol; from hexane (-166.94, `atct-1.112`) to dodecane (-289.4, `crc2014`) it is -20.41, and
        // those values carry about 2 kJ/mol, 0.3 for each of the six steps.
        let increment: Features<512> = methylene_increment().unwrap();
        let estimate = FITTED.estimate(&increment, &mut [0.0; WORKSPACE]).unwrap();
        assert!(
            (estimate.value_kj_per_mol + 20.6).abs() < 0.3,
            "{estimate:?}"
        );
        assert!(estimate.u_kj_per_mol() < 0.5, "{estimate:?}");
    }

    #[test]
    fn only_rings_of_methylene() {
        assert_eq!(methylene_ring_size(&alkane(5).unwrap()), None);
    }
}
