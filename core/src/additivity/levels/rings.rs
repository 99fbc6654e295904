//! Rings that are not aromatic: sizes, compositions, environments, fusion. These levels are the strain.

use heapless::Vec;

use super::composition::sorted;
use crate::additivity::Level;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::key::Key;
use crate::additivity::skeleton::{Skeleton, is_aromatic_ring, ring_bonds};

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
        let size = ring.len();
        features.add(Key::smooth(Level::RingSize, &[], size), 1.0)?;
        let family = composition(skeleton, ring);
        features.add(Key::smooth(Level::RingClass, &family, size), 1.0)?;
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
            let order = skeleton.order_token(bond);
            features.add(Key::new(Level::RingSite, &[order, rings]), 1.0)?;
        }
    }
    fusion(skeleton, features, keep)
}

/// Whether a ring lies on atoms that `keep` accepts.
fn kept(ring: &[u16], keep: &dyn Fn(usize) -> bool) -> bool {
    ring.first().is_some_and(|&atom| keep(usize::from(atom)))
}

/// The family of a ring for the smooth class level: counts of its heteroatoms by element, of its unsaturated and of its aromatic atoms.
fn composition<const A: usize, const B: usize>(
    skeleton: &Skeleton<A, B>,
    ring: &[u16],
) -> [u64; 3] {
    let mut elements = 0_u64;
    let (mut multiple, mut aromatic) = (0, 0);
    for (atom, bond) in ring_bonds(skeleton.molecule, ring) {
        if let Some(site) = skeleton.site(atom) {
            let element = site.kind.element_token();
            if element != crate::molecule::Element::C as u64 {
                // Five bits for each of the twelve elements.
                elements = elements.wrapping_add(1 << (5 * element));
            }
            aromatic += u64::from(skeleton.molecule.is_aromatic_atom(atom));
        }
        multiple += u64::from(matches!(skeleton.order_token(bond), 2 | 3));
    }
    [elements, multiple, aromatic]
}

/// Counts pairs of rings by their sizes and the number of atoms that they share.
fn fusion<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
    keep: &dyn Fn(usize) -> bool,
) -> Result<(), AdditivityError> {
    let molecule = skeleton.molecule;
    let rings: Vec<(&[u16], bool), B> = molecule
        .rings()
        .iter()
        .filter(|ring| kept(ring, keep))
        .map(|ring| (ring, is_aromatic_ring(molecule, ring)))
        .collect();
    for (i, &(first, first_aromatic)) in rings.iter().enumerate() {
        for &(second, second_aromatic) in rings.iter().skip(i + 1) {
            if first_aromatic && second_aromatic {
                continue;
            }
            let shared = first.iter().filter(|atom| second.contains(atom)).count() as u64;
            if shared > 0 {
                let token =
                    |ring: &[u16], aromatic: bool| (ring.len() as u64) << 1 | u64::from(aromatic);
                let [low, high] =
                    sorted(token(first, first_aromatic), token(second, second_aromatic));
                features.add(Key::new(Level::RingFusion, &[low, high, shared]), 1.0)?;
            }
        }
    }
    Ok(())
}
