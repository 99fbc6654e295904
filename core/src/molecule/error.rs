//! What can be wrong with a molecular graph.

use core::fmt;

use super::Element;

/// Why a graph is not a molecule that the crate can work with.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[non_exhaustive]
pub enum MoleculeError {
    /// More atoms than the capacity.
    TooManyAtoms {
        /// The capacity.
        capacity: usize,
    },
    /// More bonds than the capacity.
    TooManyBonds {
        /// The capacity.
        capacity: usize,
    },
    /// An atom with more neighbours than any element has.
    TooManyNeighbours {
        /// Index of the atom.
        atom: usize,
    },
    /// More rings than the capacity of the ring set.
    TooManyRings {
        /// The capacity.
        capacity: usize,
    },
    /// More exchanges of like atoms than can be gone through.
    TooSymmetric {
        /// How many steps were taken.
        steps: u32,
    },
    /// A reference to an atom that is not there.
    NoSuchAtom {
        /// The index.
        atom: usize,
    },
    /// A reference to a bond that is not there.
    NoSuchBond {
        /// The index.
        bond: usize,
    },
    /// A bond from an atom to itself.
    SelfBond {
        /// Index of the atom.
        atom: usize,
    },
    /// Two bonds between the same atoms.
    DuplicateBond {
        /// Index of the first atom.
        first: usize,
        /// Index of the second atom.
        second: usize,
    },
    /// No atoms at all.
    Empty,
    /// An atom with more bonds than its valence allows.
    ValenceExceeded {
        /// Index of the atom.
        atom: usize,
        /// Its element.
        element: Element,
        /// Its bonds counted with their order, hydrogens included.
        valence: u8,
    },
    /// An atom with fewer bonds than its valence asks for: a radical or carbene.
    OpenShell {
        /// Index of the atom.
        atom: usize,
        /// Its element.
        element: Element,
        /// Its bonds counted with their order, hydrogens included.
        valence: u8,
    },
    /// Aromatic marks that no Kekulé structure satisfies.
    NoKekuleStructure {
        /// Index of an atom that stays without a double bond.
        atom: usize,
    },
    /// Several fragments where one molecule is asked for.
    Disconnected {
        /// How many fragments.
        fragments: usize,
    },
    /// A molecule that carries a net charge where a neutral one is asked for.
    Charged {
        /// The net charge, elementary charges.
        charge: i32,
    },
}

impl fmt::Display for MoleculeError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match *self {
            Self::TooManyAtoms { capacity } => write!(f, "more than {capacity} atoms"),
            Self::TooManyBonds { capacity } => write!(f, "more than {capacity} bonds"),
            Self::TooManyNeighbours { atom } => {
                write!(f, "atom {} has too many neighbours", atom + 1)
            }
            Self::TooManyRings { capacity } => write!(f, "more than {capacity} relevant rings"),
            Self::TooSymmetric { steps } => write!(
                f,
                "the symmetry number takes more than {steps} steps; take a smaller model compound"
            ),
            Self::NoSuchAtom { atom } => write!(f, "there is no atom {}", atom + 1),
            Self::NoSuchBond { bond } => write!(f, "there is no bond {}", bond + 1),
            Self::SelfBond { atom } => write!(f, "atom {} is bonded to itself", atom + 1),
            Self::DuplicateBond { first, second } => {
                write!(f, "atoms {} and {} are bonded twice", first + 1, second + 1)
            }
            Self::Empty => write!(f, "the structure has no atoms"),
            Self::ValenceExceeded {
                atom,
                element,
                valence,
            } => write!(
                f,
                "atom {} ({}) has {valence} bonds, more than its valence allows",
                atom + 1,
                element.symbol()
            ),
            Self::OpenShell {
                atom,
                element,
                valence,
            } => write!(
                f,
                "atom {} ({}) has {valence} bonds, fewer than its valence asks for: radicals and carbenes are not supported",
                atom + 1,
                element.symbol()
            ),
            Self::NoKekuleStructure { atom } => write!(
                f,
                "the aromatic marks around atom {} allow no Kekulé structure (a hydrogen such as [nH] may be missing)",
                atom + 1
            ),
            Self::Disconnected { fragments } => write!(
                f,
                "the structure has {fragments} separate fragments; give each as a substance of its own"
            ),
            Self::Charged { charge } => write!(
                f,
                "the structure carries a net charge of {charge:+}; give the neutral molecule"
            ),
        }
    }
}

impl core::error::Error for MoleculeError {}
