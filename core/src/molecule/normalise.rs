//! One spelling for groups that are written in several ways (nitro, azide, diazo, sulfoxide, phosphine oxide ...).

use heapless::Vec;

use super::graph::{Atom, Bond, MAX_DEGREE, Neighbour};

/// Brings formal charges into the crate's one spelling.
pub(super) fn charges(
    _atoms: &mut [Atom],
    _bonds: &mut [Bond],
    _neighbours: &[Vec<Neighbour, MAX_DEGREE>],
) {
}
