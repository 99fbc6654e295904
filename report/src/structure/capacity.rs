//! How large a structure the host reads.

use tautring_core::molecule::{Molecule, MoleculeBuilder};

/// Most atoms of a structure, written hydrogens included.
pub const MAX_ATOMS: usize = 256;

/// Most bonds of a structure: a cage of [`MAX_ATOMS`] atoms fits when few of them have four neighbours in the cage.
pub const MAX_BONDS: usize = 288;

/// The core's molecule at the host's capacity.
pub type HostMolecule = Molecule<MAX_ATOMS, MAX_BONDS>;

/// The core's builder at the host's capacity.
pub(super) type HostBuilder = MoleculeBuilder<MAX_ATOMS, MAX_BONDS>;
