//! The same molecule with its atoms, bonds and stereo marks in another order.

use tautring_core::molecule::{Ligand, MoleculeBuilder, TetrahedralStereo};
use tautring_report::structure::HostMolecule;

use crate::random::XorShift;

/// Renumbers a molecule at random.
///
/// # Panics
/// When the core refuses the renumbered molecule.
pub fn renumber(molecule: &HostMolecule, random: &mut XorShift) -> HostMolecule {
    let mut order: Vec<usize> = (0..molecule.atoms().len()).collect();
    random.shuffle(&mut order);
    let mut place = vec![0_u16; order.len()];
    let mut builder = MoleculeBuilder::new();
    for &atom in &order {
        let index = builder.add_atom(molecule.atoms()[atom]).expect("an atom");
        place[atom] = index as u16;
    }
    let mut bonds = molecule.bonds().to_vec();
    random.shuffle(&mut bonds);
    for bond in bonds {
        let mut ends = bond.atoms.map(|atom| place[usize::from(atom)]);
        let mut stereo = bond.stereo.map(|mut mark| {
            mark.first_reference = place[usize::from(mark.first_reference)];
            mark.second_reference = place[usize::from(mark.second_reference)];
            mark
        });
        if random.coin() {
            ends.reverse();
            if let Some(mark) = &mut stereo {
                std::mem::swap(&mut mark.first_reference, &mut mark.second_reference);
            }
        }
        let index = builder
            .add_bond(ends[0].into(), ends[1].into(), bond.order)
            .expect("a bond");
        if let Some(mark) = stereo {
            builder.set_double_bond_stereo(index, mark).expect("a mark");
        }
    }
    for mark in molecule.tetrahedral() {
        let moved = turned(mark, &place, random);
        builder.add_tetrahedral_stereo(moved).expect("a mark");
    }
    builder.finish().expect("the same molecule")
}

/// The same configuration with its ligands in another order.
fn turned(mark: &TetrahedralStereo, place: &[u16], random: &mut XorShift) -> TetrahedralStereo {
    let mut moved = *mark;
    moved.centre = place[usize::from(mark.centre)];
    moved.ligands = mark.ligands.map(|ligand| match ligand {
        Ligand::Atom(atom) => Ligand::Atom(place[usize::from(atom)]),
        other @ Ligand::Implicit => other,
    });
    for first in 0..3 {
        if random.coin() {
            moved.ligands.swap(first, first + 1);
            moved.clockwise = !moved.clockwise;
        }
    }
    moved
}
