//! Whether a reaction keeps what its class promises to keep.

use heapless::Vec;

use super::class::ReactionClass;
use super::error::ReactionError;
use crate::molecule::{BondOrder, Element, Molecule};

/// Most different entries of a balance.
const MAX_ENTRIES: usize = 256;

/// A heavy atom as a class of reactions sees it.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Kind {
    /// The element.
    pub element: Element,
    /// Its π bonds, which stand for its hybridisation (0 sp3, 1 sp2, 2 sp), where the class tells these apart; one for aromaticity.
    pub pi_bonds: Option<u8>,
    /// Its hydrogens, where the class tells these apart.
    pub hydrogens: Option<u8>,
}

/// Something of which a balanced reaction has as much on one side as on the other.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Entry {
    /// Atoms of an element, hydrogen included.
    Element(Element),
    /// Heavy atoms of a kind.
    Atom(Kind),
    /// Bonds between heavy atoms, the lower kind first; aromatic ones as such.
    Bond(Kind, Kind, BondOrder),
}

/// The account of a reaction: products count positive, reactants negative.
#[derive(Clone, Debug)]
pub struct Balance {
    class: ReactionClass,
    entries: Vec<(Entry, i64), MAX_ENTRIES>,
}

impl Balance {
    /// An empty account of what a class keeps.
    ///
    /// All keep the elements and the bonds by elements and order. Homodesmotic reactions keep the bonds by hybridisation, too, and the
    /// atoms by hybridisation and hydrogens; hyperhomodesmotic ones the bonds by hybridisation and hydrogens.
    pub const fn new(class: ReactionClass) -> Self {
        Self {
            class,
            entries: Vec::new(),
        }
    }

    /// Enters a molecule with its stoichiometric number.
    ///
    /// # Errors
    /// [`ReactionError::TooManyEntries`].
    pub fn add<const A: usize, const B: usize>(
        &mut self,
        number: i32,
        molecule: &Molecule<A, B>,
    ) -> Result<(), ReactionError> {
        let number = i64::from(number);
        for (element, count) in molecule.formula().iter() {
            self.enter(Entry::Element(element), number * i64::from(count))?;
        }
        let [atoms, [bond_pi, bond_hydrogens]] = match self.class {
            ReactionClass::Isodesmic => [[false, false], [false, false]],
            ReactionClass::Homodesmotic => [[true, true], [true, false]],
            ReactionClass::Hyperhomodesmotic => [[true, true], [true, true]],
        };
        for atom in 0..molecule.atoms().len() {
            if let Some(kind) = kind(molecule, atom, atoms) {
                self.enter(Entry::Atom(kind), number)?;
            }
        }
        for (index, bond) in molecule.bonds().iter().enumerate() {
            // Which bonds of an aromatic ring are double is a choice.
            let order = if molecule.is_aromatic_bond(index) {
                BondOrder::Aromatic
            } else {
                bond.order
            };
            let ends = bond
                .atoms
                .map(|end| kind(molecule, usize::from(end), [bond_pi, bond_hydrogens]));
            if let [Some(a), Some(b)] = ends {
                self.enter(Entry::Bond(a.min(b), a.max(b), order), number)?;
            }
        }
        Ok(())
    }

    /// What does not balance, and by how much the products have more of it.
    pub fn imbalances(&self) -> impl Iterator<Item = (Entry, i64)> {
        self.entries
            .iter()
            .copied()
            .filter(|&(_, count)| count != 0)
    }

    /// Whether everything balances.
    pub fn is_balanced(&self) -> bool {
        self.imbalances().next().is_none()
    }

    fn enter(&mut self, entry: Entry, number: i64) -> Result<(), ReactionError> {
        if let Some(known) = self.entries.iter_mut().find(|(e, _)| *e == entry) {
            known.1 += number;
            return Ok(());
        }
        let full = ReactionError::TooManyEntries {
            capacity: MAX_ENTRIES,
        };
        self.entries.push((entry, number)).map_err(|_| full)
    }
}

/// The kind of a heavy atom, with its π bonds and its hydrogens where `told` says so.
fn kind<const A: usize, const B: usize>(
    molecule: &Molecule<A, B>,
    atom: usize,
    told: [bool; 2],
) -> Option<Kind> {
    let element = molecule.atoms().get(atom)?.element;
    let [with_pi, with_hydrogens] = told;
    let bonds = molecule.neighbours(atom).iter();
    let pi_bonds = bonds
        .filter(|n| !molecule.is_aromatic_bond(usize::from(n.bond)))
        .filter_map(|n| molecule.bonds().get(usize::from(n.bond)))
        .fold(u8::from(molecule.is_aromatic_atom(atom)), |sum, bond| {
            sum + bond.order.pairs() - 1
        });
    (element != Element::H).then(|| Kind {
        element,
        pi_bonds: with_pi.then_some(pi_bonds),
        hydrogens: with_hydrogens.then(|| molecule.total_hydrogens(atom)),
    })
}
