//! What can go wrong in an estimate.

use core::fmt;

use crate::molecule::MoleculeError;

/// Why there is no estimate.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[non_exhaustive]
pub enum AdditivityError {
    /// More different features than the capacity.
    TooManyFeatures {
        /// The capacity.
        capacity: usize,
    },
    /// The graph is not one neutral molecule.
    Molecule(MoleculeError),
    /// Counting the Kekulé structures takes more than this many steps.
    TooManyKekuleStructures {
        /// How many steps were taken.
        steps: u32,
    },
    /// The molecule holds no carbon: the data are those of organic compounds.
    NoCarbon,
    /// Storage handed in is smaller than needed.
    Storage {
        /// How many numbers are needed.
        needed: usize,
        /// How many there are.
        given: usize,
    },
    /// A matrix that ought to be positive definite is not.
    NotPositiveDefinite {
        /// The row where it shows.
        row: usize,
    },
}

impl fmt::Display for AdditivityError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match *self {
            Self::TooManyKekuleStructures { steps } => write!(
                f,
                "the aromatic system has more Kekulé structures than {steps} steps count; take a smaller model compound"
            ),
            Self::TooManyFeatures { capacity } => {
                write!(
                    f,
                    "more than {capacity} different groups and other features"
                )
            }
            Self::Molecule(error) => error.fmt(f),
            Self::NoCarbon => write!(
                f,
                "the structure holds no carbon; the estimates rest on organic compounds only"
            ),
            Self::Storage { needed, given } => {
                write!(
                    f,
                    "storage for {needed} numbers is needed, {given} were given"
                )
            }
            Self::NotPositiveDefinite { row } => {
                write!(
                    f,
                    "the covariance matrix is not positive definite at row {row}"
                )
            }
        }
    }
}

impl core::error::Error for AdditivityError {}

impl From<MoleculeError> for AdditivityError {
    fn from(error: MoleculeError) -> Self {
        Self::Molecule(error)
    }
}
