//! What can go wrong in building a reaction.

use core::fmt;

use crate::additivity::AdditivityError;
use crate::molecule::MoleculeError;

/// Why there is no reaction, or no enthalpy of it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[non_exhaustive]
pub enum ReactionError {
    /// The ring system has no bond that a reaction could open: all of it is one aromatic system.
    NothingToOpen {
        /// Number of the ring system.
        system: usize,
    },
    /// More different molecules take part than the reaction holds.
    TooManySpecies {
        /// How many it holds.
        capacity: usize,
    },
    /// A balance has more different entries than it holds.
    TooManyEntries {
        /// How many it holds.
        capacity: usize,
    },
    /// A piece of the molecule, capped with hydrogens, is no molecule, or one larger than the capacity.
    Fragment(MoleculeError),
    /// The pieces do not add up to the molecule: multiple bonds close a ring of their own.
    Unbalanced,
    /// A molecule without carbon takes part that has no published enthalpy of formation in the crate.
    NoEnthalpy {
        /// Its heavy atoms.
        heavy_atoms: usize,
    },
    /// The additivity has no estimate.
    Additivity(AdditivityError),
}

impl fmt::Display for ReactionError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match *self {
            Self::NothingToOpen { system } => write!(
                f,
                "ring system {} is aromatic throughout and has no bond to open",
                system + 1
            ),
            Self::TooManySpecies { capacity } => {
                write!(f, "more than {capacity} different molecules take part")
            }
            Self::TooManyEntries { capacity } => {
                write!(f, "more than {capacity} kinds of atoms and bonds take part")
            }
            Self::Fragment(error) => write!(f, "a piece of the molecule: {error}"),
            Self::Unbalanced => write!(
                f,
                "multiple bonds close a ring of their own, which cannot be opened at single bonds"
            ),
            Self::NoEnthalpy { heavy_atoms } => write!(
                f,
                "a molecule of {heavy_atoms} heavy atoms without carbon takes part, whose enthalpy of formation is not known here"
            ),
            Self::Additivity(error) => error.fmt(f),
        }
    }
}

impl core::error::Error for ReactionError {}

impl From<MoleculeError> for ReactionError {
    fn from(error: MoleculeError) -> Self {
        Self::Fragment(error)
    }
}

impl From<AdditivityError> for ReactionError {
    fn from(error: AdditivityError) -> Self {
        Self::Additivity(error)
    }
}
