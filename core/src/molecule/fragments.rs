//! Connected fragments, and whether a graph is the one neutral molecule that an enthalpy of formation is defined for.

use heapless::Vec;

use super::{Molecule, MoleculeError};

impl<const A: usize, const B: usize> Molecule<A, B> {
    /// How many connected fragments the graph has.
    pub fn fragments(&self) -> usize {
        let mut reached = [false; A];
        // An atom enters the stack once, so the stack cannot overflow.
        let mut stack: Vec<usize, A> = Vec::new();
        let mut fragments = 0;
        for start in 0..self.atoms().len() {
            if first_visit(&mut reached, start) {
                fragments += 1;
                let _ = stack.push(start);
            }
            while let Some(atom) = stack.pop() {
                for neighbour in self.neighbours(atom) {
                    let atom = usize::from(neighbour.atom);
                    if first_visit(&mut reached, atom) {
                        let _ = stack.push(atom);
                    }
                }
            }
        }
        fragments
    }

    /// Asks for a single molecule without a net charge.
    ///
    /// # Errors
    /// [`MoleculeError::Disconnected`] for salts, solvates and mixtures, [`MoleculeError::Charged`] for ions.
    pub fn require_single_neutral(&self) -> Result<(), MoleculeError> {
        let fragments = self.fragments();
        if fragments > 1 {
            return Err(MoleculeError::Disconnected { fragments });
        }
        match self.net_charge() {
            0 => Ok(()),
            charge => Err(MoleculeError::Charged { charge }),
        }
    }
}

fn first_visit(reached: &mut [bool], atom: usize) -> bool {
    reached
        .get_mut(atom)
        .is_some_and(|seen| !core::mem::replace(seen, true))
}

#[cfg(test)]
mod tests {
    use super::super::{Atom, BondOrder, Element, MoleculeBuilder};
    use super::*;

    fn graph(atoms: &[(Element, i8, u8)], bonds: &[(usize, usize)]) -> Molecule<8, 8> {
        let mut builder = MoleculeBuilder::new();
        for &(element, charge, hydrogens) in atoms {
            builder
                .add_atom(Atom {
                    element,
                    charge,
                    hydrogens,
                    isotope: 0,
                })
                .unwrap();
        }
        for &(a, b) in bonds {
            builder.add_bond(a, b, BondOrder::Single).unwrap();
        }
        builder.finish().unwrap()
    }

    #[test]
    fn one_neutral_molecule_passes() {
        let cyclopropane = graph(&[(Element::C, 0, 2); 3], &[(0, 1), (1, 2), (2, 0)]);
        assert_eq!(cyclopropane.fragments(), 1);
        assert_eq!(cyclopropane.require_single_neutral(), Ok(()));
    }

    #[test]
    fn salts_and_ions_do_not() {
        let salt = graph(&[(Element::N, 1, 4), (Element::Cl, -1, 0)], &[]);
        assert_eq!(
            salt.require_single_neutral(),
            Err(MoleculeError::Disconnected { fragments: 2 })
        );
        let methoxide = graph(&[(Element::O, -1, 0), (Element::C, 0, 3)], &[(0, 1)]);
        assert_eq!(
            methoxide.require_single_neutral(),
            Err(MoleculeError::Charged { charge: -1 })
        );
    }
}
