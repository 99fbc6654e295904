//! Rings that are not aromatic: their sizes, and the environments of their atoms and bonds. These levels are the strain.

use super::composition::sorted;
use crate::additivity::Level;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::key::Key;
use crate::additivity::skeleton::{Skeleton, is_aromatic_ring};

/// Counts the ring levels on the atoms that `keep` accepts.
pub(super) fn count<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
    keep: &dyn Fn(usize) -> bool,
) -> Result<(), AdditivityError> {
    let molecule = skeleton.molecule;
    for ring in molecule.rings().iter() {
        if is_aromatic_ring(molecule, ring) || !kept(ring, keep) {
            continue;
        }
        features.add(Key::smooth(Level::RingSize, &[], ring.len()), 1.0)?;
    }
    for (_, site) in skeleton.sites().filter(|&(i, s)| s.rings != 0 && keep(i)) {
        features.add(
            Key::new(Level::RingAtom, &[site.kind.token(), site.rings]),
            1.0,
        )?;
    }
    for (bond, ends, [a, b]) in skeleton.bonds() {
        let rings = skeleton.bond_rings(bond);
        if rings != 0 && keep(ends[0]) {
            let [low, high] = sorted(a.kind.token(), b.kind.token());
            let tokens = [low, high, skeleton.order_token(bond), rings];
            features.add(Key::new(Level::RingBond, &tokens), 1.0)?;
        }
    }
    Ok(())
}

/// Whether a ring lies on atoms that `keep` accepts.
fn kept(ring: &[u16], keep: &dyn Fn(usize) -> bool) -> bool {
    ring.first().is_some_and(|&atom| keep(usize::from(atom)))
}
