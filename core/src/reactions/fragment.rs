//! Small molecules made of copies of pieces, with hydrogens where bonds were cut.

use heapless::Vec;

use super::error::ReactionError;
use super::opened_system::{Members, OpenedSystem, shared_pairs};
use crate::molecule::{
    Atom, BondOrder, DoubleBondStereo, Element, Molecule, MoleculeBuilder, MoleculeError,
};

/// A molecule in the making, of at most `S` atoms and `T` bonds.
pub(super) struct Fragment<const S: usize, const T: usize> {
    atoms: Vec<Atom, S>,
    bonds: Vec<(usize, usize, BondOrder, Option<DoubleBondStereo>), T>,
}

/// Where the atoms of a copied piece stand in the fragment.
pub(super) type Places<const A: usize> = [Option<u16>; A];

impl<const S: usize, const T: usize> Fragment<S, T> {
    pub(super) const fn new() -> Self {
        Self {
            atoms: Vec::new(),
            bonds: Vec::new(),
        }
    }

    /// Adds a copy of some atoms of the molecule and of the bonds between them, but for the single links of the opened system and the
    /// bond `without`; every bond that is not copied is capped with hydrogens.
    pub(super) fn add<const A: usize, const B: usize>(
        &mut self,
        system: &OpenedSystem<'_, A, B>,
        members: &Members<A>,
        without: Option<usize>,
    ) -> Result<Places<A>, ReactionError> {
        let molecule = system.molecule();
        let mut places: Places<A> = [None; A];
        let sources = molecule.atoms().iter().enumerate();
        for (((index, atom), slot), _) in sources
            .zip(places.iter_mut())
            .zip(members)
            .filter(|(((_, atom), _), member)| **member && atom.element != Element::H)
        {
            *slot = Some(self.atoms.len() as u16);
            let copy = Atom {
                element: atom.element,
                charge: atom.charge,
                // Bonds that are copied take theirs away again.
                hydrogens: shared_pairs(molecule, index),
                isotope: 0,
            };
            let full = MoleculeError::TooManyAtoms { capacity: S };
            self.atoms.push(copy).map_err(|_| full)?;
        }
        for (index, bond) in molecule.bonds().iter().enumerate() {
            let cut = system.is_link(index) && bond.order == BondOrder::Single;
            let [a, b] = bond.atoms.map(|end| place(&places, end));
            if let (Some(a), Some(b), false) = (a, b, cut || without == Some(index)) {
                let stereo = bond.stereo.and_then(|mark| copied(mark, &places));
                self.bond(a, b, bond.order, stereo)?;
            }
        }
        Ok(places)
    }

    /// Joins two atoms of the fragment in place of hydrogens.
    pub(super) fn join(
        &mut self,
        first: Option<u16>,
        second: Option<u16>,
        order: BondOrder,
    ) -> Result<(), ReactionError> {
        let missing = MoleculeError::NoSuchAtom { atom: S };
        let (first, second) = (first.ok_or(missing)?, second.ok_or(missing)?);
        self.bond(usize::from(first), usize::from(second), order, None)
    }

    fn bond(
        &mut self,
        first: usize,
        second: usize,
        order: BondOrder,
        stereo: Option<DoubleBondStereo>,
    ) -> Result<(), ReactionError> {
        for end in [first, second] {
            let missing = MoleculeError::NoSuchAtom { atom: end };
            let atom = self.atoms.get_mut(end).ok_or(missing)?;
            atom.hydrogens = atom.hydrogens.saturating_sub(order.pairs());
        }
        let full = MoleculeError::TooManyBonds { capacity: T };
        let bond = (first, second, order, stereo);
        Ok(self.bonds.push(bond).map_err(|_| full)?)
    }

    /// The molecule.
    pub(super) fn finish(self) -> Result<Molecule<S, T>, ReactionError> {
        let mut builder = MoleculeBuilder::new();
        for atom in self.atoms {
            builder.add_atom(atom)?;
        }
        for (first, second, order, stereo) in self.bonds {
            let bond = builder.add_bond(first, second, order)?;
            if let Some(stereo) = stereo {
                builder.set_double_bond_stereo(bond, stereo)?;
            }
        }
        let molecule = builder.finish()?;
        molecule.require_single_neutral()?;
        Ok(molecule)
    }
}

pub(super) fn place<const A: usize>(places: &Places<A>, atom: u16) -> Option<usize> {
    let place = places.get(usize::from(atom)).copied().flatten();
    place.map(usize::from)
}

/// The mark of a double bond in the fragment, if both atoms that it refers to were copied.
fn copied<const A: usize>(mark: DoubleBondStereo, places: &Places<A>) -> Option<DoubleBondStereo> {
    let to = |atom: u16| places.get(usize::from(atom)).copied().flatten();
    Some(DoubleBondStereo {
        first_reference: to(mark.first_reference)?,
        second_reference: to(mark.second_reference)?,
        same_side: mark.same_side,
    })
}
