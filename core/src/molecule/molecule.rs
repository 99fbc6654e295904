//! A validated molecule: valences right, bonds localised, rings and aromaticity perceived.

use heapless::Vec;

use super::error::MoleculeError;
use super::graph::{
    Atom, Bond, DoubleBondStereo, MAX_DEGREE, MoleculeBuilder, Neighbour, TetrahedralStereo,
};
use super::rings::{RingSet, RingSizes};
use super::{Element, aromaticity, kekule, normalise, valence};

/// A molecule of at most `A` atoms and `B` bonds.
///
/// Made by [`MoleculeBuilder::finish`], which validates; everything here only reads and cannot fail.
/// Bonds are localised (Kekulé) and charges are in one spelling, whatever the spelling of the input.
#[derive(Clone, Debug)]
pub struct Molecule<const A: usize, const B: usize> {
    atoms: Vec<Atom, A>,
    bonds: Vec<Bond, B>,
    tetrahedral: Vec<TetrahedralStereo, A>,
    neighbours: Vec<Vec<Neighbour, MAX_DEGREE>, A>,
    rings: RingSet<B>,
    atom_ring_sizes: Vec<RingSizes, A>,
    bond_ring_sizes: Vec<RingSizes, B>,
    aromatic_atoms: Vec<bool, A>,
    aromatic_bonds: Vec<bool, B>,
}

impl<const A: usize, const B: usize> MoleculeBuilder<A, B> {
    /// Validates the graph and perceives rings and aromaticity.
    ///
    /// In this order: aromatic marks become a Kekulé structure, the spellings of nitro, azide, sulfoxide and the like
    /// become one, valences are checked, the relevant rings are found, aromaticity is perceived.
    ///
    /// # Errors
    /// [`MoleculeError::Empty`], [`MoleculeError::TooManyNeighbours`], [`MoleculeError::NoKekuleStructure`],
    /// [`MoleculeError::ValenceExceeded`], [`MoleculeError::OpenShell`], [`MoleculeError::TooManyRings`].
    pub fn finish(mut self) -> Result<Molecule<A, B>, MoleculeError> {
        if self.atoms.is_empty() {
            return Err(MoleculeError::Empty);
        }
        let neighbours = adjacency(&self.atoms, &self.bonds)?;
        kekule::localise(&self.atoms, &mut self.bonds, &neighbours)?;
        normalise::charges(&mut self.atoms, &mut self.bonds, &neighbours);
        valence::check(&self.atoms, &self.bonds, &neighbours)?;
        let rings = RingSet::find(&neighbours, &self.bonds)?;
        let (atom_ring_sizes, bond_ring_sizes) = ring_sizes(&rings, &neighbours, &self.bonds);
        let (aromatic_atoms, aromatic_bonds) =
            aromaticity::perceive(&self.atoms, &self.bonds, &neighbours, &rings);
        let mut molecule = Molecule {
            atoms: self.atoms,
            bonds: self.bonds,
            tetrahedral: self.tetrahedral,
            neighbours,
            rings,
            atom_ring_sizes,
            bond_ring_sizes,
            aromatic_atoms,
            aromatic_bonds,
        };
        molecule.drop_idle_stereo();
        Ok(molecule)
    }
}

impl<const A: usize, const B: usize> Molecule<A, B> {
    /// The atoms.
    pub fn atoms(&self) -> &[Atom] {
        &self.atoms
    }

    /// The bonds.
    pub fn bonds(&self) -> &[Bond] {
        &self.bonds
    }

    /// The neighbours of an atom; none for an index that is not there.
    pub fn neighbours(&self, atom: usize) -> &[Neighbour] {
        self.neighbours.get(atom).map_or(&[], Vec::as_slice)
    }

    /// The tetrahedral centres whose configuration the input states.
    pub fn tetrahedral(&self) -> &[TetrahedralStereo] {
        &self.tetrahedral
    }

    /// The relevant rings.
    pub fn rings(&self) -> &RingSet<B> {
        &self.rings
    }

    /// The sizes of the relevant rings that an atom is in.
    pub fn atom_ring_sizes(&self, atom: usize) -> RingSizes {
        self.atom_ring_sizes.get(atom).copied().unwrap_or_default()
    }

    /// The sizes of the relevant rings that a bond is in.
    pub fn bond_ring_sizes(&self, bond: usize) -> RingSizes {
        self.bond_ring_sizes.get(bond).copied().unwrap_or_default()
    }

    /// Whether an atom is aromatic.
    pub fn is_aromatic_atom(&self, atom: usize) -> bool {
        self.aromatic_atoms.get(atom).copied().unwrap_or(false)
    }

    /// Whether a bond is aromatic.
    pub fn is_aromatic_bond(&self, bond: usize) -> bool {
        self.aromatic_bonds.get(bond).copied().unwrap_or(false)
    }

    /// The hydrogens on an atom, nodes of the graph or not.
    pub fn total_hydrogens(&self, atom: usize) -> u8 {
        let explicit = self
            .neighbours(atom)
            .iter()
            .filter(|n| self.element(n.atom) == Some(Element::H))
            .count() as u8;
        self.atoms.get(atom).map_or(0, |a| a.hydrogens) + explicit
    }

    /// The stereo marks of tetrahedral centres, to drop or invert.
    pub(super) fn tetrahedral_mut(&mut self) -> &mut Vec<TetrahedralStereo, A> {
        &mut self.tetrahedral
    }

    /// Replaces the stereo mark of a bond.
    pub(super) fn set_bond_stereo(&mut self, bond: usize, stereo: Option<DoubleBondStereo>) {
        if let Some(bond) = self.bonds.get_mut(bond) {
            bond.stereo = stereo;
        }
    }

    /// The net charge, elementary charges.
    pub fn net_charge(&self) -> i32 {
        self.atoms.iter().map(|a| i32::from(a.charge)).sum()
    }

    fn element(&self, atom: u16) -> Option<Element> {
        self.atoms.get(usize::from(atom)).map(|a| a.element)
    }
}

fn adjacency<const A: usize, const B: usize>(
    atoms: &Vec<Atom, A>,
    bonds: &Vec<Bond, B>,
) -> Result<Vec<Vec<Neighbour, MAX_DEGREE>, A>, MoleculeError> {
    let mut neighbours: Vec<Vec<Neighbour, MAX_DEGREE>, A> =
        atoms.iter().map(|_| Vec::new()).collect();
    for (index, bond) in bonds.iter().enumerate() {
        let [a, b] = bond.atoms;
        for (from, to) in [(a, b), (b, a)] {
            let atom = usize::from(from);
            let full = MoleculeError::TooManyNeighbours { atom };
            neighbours
                .get_mut(atom)
                .ok_or(MoleculeError::NoSuchAtom { atom })?
                .push(Neighbour {
                    atom: to,
                    bond: index as u16,
                })
                .map_err(|_| full)?;
        }
    }
    Ok(neighbours)
}

fn ring_sizes<const A: usize, const B: usize>(
    rings: &RingSet<B>,
    neighbours: &Vec<Vec<Neighbour, MAX_DEGREE>, A>,
    bonds: &Vec<Bond, B>,
) -> (Vec<RingSizes, A>, Vec<RingSizes, B>) {
    let mut of_atoms: Vec<RingSizes, A> = neighbours.iter().map(|_| RingSizes::default()).collect();
    let mut of_bonds: Vec<RingSizes, B> = bonds.iter().map(|_| RingSizes::default()).collect();
    for ring in rings.iter() {
        let next = ring.iter().cycle().skip(1);
        for (&atom, &following) in ring.iter().zip(next) {
            let atom = usize::from(atom);
            if let Some(sizes) = of_atoms.get_mut(atom) {
                *sizes = sizes.with(ring.len());
            }
            let bond = neighbours
                .get(atom)
                .and_then(|n| n.iter().find(|n| n.atom == following))
                .map(|n| usize::from(n.bond));
            if let Some(sizes) = bond.and_then(|bond| of_bonds.get_mut(bond)) {
                *sizes = sizes.with(ring.len());
            }
        }
    }
    (of_atoms, of_bonds)
}
