//! Kekulé structures: aromatic marks turned into localised double bonds.

use heapless::Vec;

use super::error::MoleculeError;
use super::graph::{Atom, Bond, MAX_DEGREE, Neighbour};

/// Replaces every aromatic mark by a single or double bond.
pub(super) fn localise(
    _atoms: &[Atom],
    _bonds: &mut [Bond],
    _neighbours: &[Vec<Neighbour, MAX_DEGREE>],
) -> Result<(), MoleculeError> {
    Ok(())
}
