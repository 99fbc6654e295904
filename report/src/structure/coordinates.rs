//! Where a record puts the atoms of a molecule.

use tautring_core::molecule::{Atom, BondOrder, Element};

use super::configuration::{DrawnBond, Point};

/// Positions of a molecule's atoms as its record gives them.
#[derive(Clone, Debug, PartialEq)]
pub struct Coordinates {
    /// One position for each atom of the molecule, Å in three dimensions, of any scale in two.
    pub positions: Vec<[f64; 3]>,
    /// Whether they are a geometry rather than a drawing.
    pub three_dimensional: bool,
}

impl Coordinates {
    /// Positions of the atoms that stay when hydrogens become counts; none if the record has no positions.
    pub(super) fn of_heavy_atoms(
        atoms: &[Atom],
        bonds: &[DrawnBond],
        positions: &[Point],
        three_dimensional: bool,
    ) -> Option<Self> {
        // Writers without a geometry put every atom at the origin.
        if positions.len() > 1 && positions.as_flattened().iter().all(|x| x.abs() < 1e-4) {
            return None;
        }
        let stays = |index: &usize| !is_plain_hydrogen(*index, atoms, bonds);
        Some(Self {
            positions: (0..atoms.len())
                .filter(stays)
                .map(|index| positions[index])
                .collect(),
            three_dimensional,
        })
    }
}

/// The core's rule: a neutral hydrogen on a single bond to one atom that is not hydrogen.
fn is_plain_hydrogen(index: usize, atoms: &[Atom], bonds: &[DrawnBond]) -> bool {
    let atom = atoms[index];
    let mut around = bonds.iter().filter(|b| b.atoms.contains(&index));
    let (Some(bond), None) = (around.next(), around.next()) else {
        return false;
    };
    let [a, b] = bond.atoms;
    let other = if a == index { b } else { a };
    atom.element == Element::H
        && (atom.charge, atom.hydrogens, bond.order) == (0, 0, BondOrder::Single)
        && atoms[other].element != Element::H
}
