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
        features.add(Key::smooth(Level::RingSize, ring.len()), 1.0)?;
    }
    for (atom, site) in skeleton.sites().filter(|&(i, s)| s.rings != 0 && keep(i)) {
        let named = skeleton.heteroatoms(&[atom]);
        for size in sizes(site.rings) {
            let tokens = [site.kind.token(), size];
            features.add(Key::new(Level::RingAtom, named, &tokens), 1.0)?;
        }
        shared(features, ATOM, site.rings)?;
    }
    for (bond, ends, [a, b]) in skeleton.bonds() {
        let rings = skeleton.bond_rings(bond);
        if rings != 0 && keep(ends[0]) {
            let [low, high] = sorted(a.kind.token(), b.kind.token());
            let order = skeleton.order_token(bond);
            let named = skeleton.heteroatoms(&ends);
            for size in sizes(rings) {
                let tokens = [low, high, order, size];
                features.add(Key::new(Level::RingBond, named, &tokens), 1.0)?;
            }
            shared(features, BOND, rings)?;
        }
    }
    Ok(())
}

/// Whether a ring lies on atoms that `keep` accepts.
fn kept(ring: &[u16], keep: &dyn Fn(usize) -> bool) -> bool {
    ring.first().is_some_and(|&atom| keep(usize::from(atom)))
}

/// Tokens that tell shared atoms from shared bonds.
const ATOM: u64 = 0;
const BOND: u64 = 1;

/// Counts an atom or bond that several rings share: each pair of rings, and all together.
fn shared<const F: usize>(
    features: &mut Features<F>,
    what: u64,
    rings: u64,
) -> Result<(), AdditivityError> {
    for (i, first) in sizes(rings).enumerate() {
        for second in sizes(rings).skip(i + 1) {
            let [low, high] = sorted(first, second);
            features.add(Key::new(Level::RingJunction, 0, &[what, low, high]), 1.0)?;
        }
    }
    if sizes(rings).nth(1).is_some() {
        features.add(Key::new(Level::RingEnvironment, 0, &[what, rings]), 1.0)?;
    }
    Ok(())
}

/// The ring sizes in a number's digits to base 64.
fn sizes(rings: u64) -> impl Iterator<Item = u64> {
    (0..)
        .map(move |digit| rings >> (6 * digit) & 0x3f)
        .take(10)
        .take_while(|&size| size != 0)
}
