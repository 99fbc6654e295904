//! The molecular graph: atoms, bonds, stereo marks; built once, validated, then only read.

use heapless::Vec;

use super::Element;
use super::error::MoleculeError;

/// Most neighbours that one atom may have (sulfur hexafluoride has six).
pub const MAX_DEGREE: usize = 6;

/// The order of a bond.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub enum BondOrder {
    /// One electron pair.
    Single,
    /// Two electron pairs.
    Double,
    /// Three electron pairs.
    Triple,
    /// Marked aromatic in the input; [`Molecule`](super::Molecule) replaces it by a Kekulé order.
    Aromatic,
}

impl BondOrder {
    /// Electron pairs of a localised bond; an aromatic mark counts one (its sigma bond).
    pub const fn pairs(self) -> u8 {
        match self {
            Self::Single | Self::Aromatic => 1,
            Self::Double => 2,
            Self::Triple => 3,
        }
    }
}

/// One atom of the graph.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Atom {
    /// The element.
    pub element: Element,
    /// Formal charge, elementary charges.
    pub charge: i8,
    /// Hydrogens attached that are not nodes of the graph.
    pub hydrogens: u8,
    /// Mass number, 0 for natural composition.
    pub isotope: u16,
}

/// Which side the two reference neighbours of a double bond lie on.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct DoubleBondStereo {
    /// Neighbour of the bond's first atom that the mark refers to.
    pub first_reference: u16,
    /// Neighbour of the bond's second atom that the mark refers to.
    pub second_reference: u16,
    /// Whether both references lie on the same side.
    pub same_side: bool,
}

/// One bond of the graph.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Bond {
    /// The two atoms' indices, in the order of the input.
    pub atoms: [u16; 2],
    /// The order; never [`BondOrder::Aromatic`] in a finished [`Molecule`](super::Molecule).
    pub order: BondOrder,
    /// Configuration of a double bond, if the input states one.
    pub stereo: Option<DoubleBondStereo>,
}

impl Bond {
    /// The atom at the other end of the bond from `atom`.
    pub fn other(&self, atom: usize) -> usize {
        let [a, b] = self.atoms;
        usize::from(if usize::from(a) == atom { b } else { a })
    }
}

/// A neighbour of a tetrahedral centre.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ligand {
    /// A node of the graph.
    Atom(u16),
    /// A hydrogen that is not a node, or a lone pair.
    Implicit,
}

/// Configuration of a tetrahedral centre.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct TetrahedralStereo {
    /// Index of the centre.
    pub centre: u16,
    /// The four ligands.
    pub ligands: [Ligand; 4],
    /// Whether the last three ligands run clockwise when seen from the first.
    pub clockwise: bool,
}

impl TetrahedralStereo {
    /// Whether the ligands, the one of the lowest key being looked from, run clockwise in ascending order of `key`.
    pub(crate) fn is_clockwise_by(&self, key: impl Fn(Ligand) -> u32) -> bool {
        let keys = self.ligands.map(key);
        let inversions = keys
            .iter()
            .enumerate()
            .map(|(i, a)| keys.iter().skip(i + 1).filter(|b| a > *b).count())
            .sum::<usize>();
        self.clockwise == inversions.is_multiple_of(2)
    }
}

/// One end of a bond as seen from an atom.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Neighbour {
    /// Index of the neighbouring atom.
    pub atom: u16,
    /// Index of the bond that leads there.
    pub bond: u16,
}

/// A molecular graph of at most `A` atoms and `B` bonds, before validation.
#[derive(Clone, Debug, Default)]
pub struct MoleculeBuilder<const A: usize, const B: usize> {
    pub(super) atoms: Vec<Atom, A>,
    pub(super) bonds: Vec<Bond, B>,
    pub(super) tetrahedral: Vec<TetrahedralStereo, A>,
}

impl<const A: usize, const B: usize> MoleculeBuilder<A, B> {
    /// An empty graph.
    pub const fn new() -> Self {
        Self {
            atoms: Vec::new(),
            bonds: Vec::new(),
            tetrahedral: Vec::new(),
        }
    }

    /// Adds an atom and returns its index.
    ///
    /// # Errors
    /// [`MoleculeError::TooManyAtoms`] when the capacity is used up.
    pub fn add_atom(&mut self, atom: Atom) -> Result<usize, MoleculeError> {
        let index = self.atoms.len();
        self.atoms
            .push(atom)
            .map_err(|_| MoleculeError::TooManyAtoms { capacity: A })?;
        Ok(index)
    }

    /// Adds a bond between two atoms that are there already and returns its index.
    ///
    /// # Errors
    /// [`MoleculeError::TooManyBonds`], [`MoleculeError::NoSuchAtom`], [`MoleculeError::SelfBond`],
    /// [`MoleculeError::DuplicateBond`].
    pub fn add_bond(
        &mut self,
        first: usize,
        second: usize,
        order: BondOrder,
    ) -> Result<usize, MoleculeError> {
        let (a, b) = (self.known(first)?, self.known(second)?);
        if a == b {
            return Err(MoleculeError::SelfBond { atom: first });
        }
        if self
            .bonds
            .iter()
            .any(|bond| bond.atoms == [a, b] || bond.atoms == [b, a])
        {
            return Err(MoleculeError::DuplicateBond { first, second });
        }
        let index = self.bonds.len();
        self.bonds
            .push(Bond {
                atoms: [a, b],
                order,
                stereo: None,
            })
            .map_err(|_| MoleculeError::TooManyBonds { capacity: B })?;
        Ok(index)
    }

    /// States the configuration of a double bond.
    ///
    /// # Errors
    /// [`MoleculeError::NoSuchBond`].
    pub fn set_double_bond_stereo(
        &mut self,
        bond: usize,
        stereo: DoubleBondStereo,
    ) -> Result<(), MoleculeError> {
        self.bonds
            .get_mut(bond)
            .ok_or(MoleculeError::NoSuchBond { bond })?
            .stereo = Some(stereo);
        Ok(())
    }

    /// States the configuration of a tetrahedral centre.
    ///
    /// # Errors
    /// [`MoleculeError::NoSuchAtom`], [`MoleculeError::TooManyAtoms`].
    pub fn add_tetrahedral_stereo(
        &mut self,
        stereo: TetrahedralStereo,
    ) -> Result<(), MoleculeError> {
        self.known(usize::from(stereo.centre))?;
        self.tetrahedral
            .push(stereo)
            .map_err(|_| MoleculeError::TooManyAtoms { capacity: A })
    }

    fn known(&self, atom: usize) -> Result<u16, MoleculeError> {
        if atom < self.atoms.len() {
            u16::try_from(atom).map_err(|_| MoleculeError::NoSuchAtom { atom })
        } else {
            Err(MoleculeError::NoSuchAtom { atom })
        }
    }
}
