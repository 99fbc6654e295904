//! Aromatic rings: substituents ortho, meta and para to each other; fusion.

use super::composition::sorted;
use crate::additivity::Level;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::key::Key;
use crate::additivity::skeleton::{Skeleton, is_aromatic_ring};

/// Counts aromatic rings by size, the substituent pairs on them, and how often aromatic atoms fuse rings.
pub(super) fn count<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) -> Result<(), AdditivityError> {
    for ring in skeleton.molecule.rings().iter() {
        if !is_aromatic_ring(skeleton.molecule, ring) {
            continue;
        }
        let size = ring.len();
        features.add(Key::new(Level::AromaticRing, 0, &[size as u64, 0]), 1.0)?;
        for (i, &first) in ring.iter().enumerate() {
            for (j, &second) in ring.iter().enumerate().skip(i + 1) {
                let apart = (j - i).min(size - (j - i)) as u64;
                let (first, second) = (usize::from(first), usize::from(second));
                for a in position(skeleton, ring, first).into_iter().flatten() {
                    for b in position(skeleton, ring, second).into_iter().flatten() {
                        let [low, high] = sorted(a.0, b.0);
                        let tokens = [low, high, apart, size as u64];
                        let named = skeleton.heteroatoms(&[a.1, b.1]);
                        features.add(Key::new(Level::AromaticPair, named, &tokens), 1.0)?;
                    }
                }
            }
        }
    }
    for (_, site) in skeleton.sites() {
        let fusions = site.aromatic_rings.saturating_sub(1);
        if fusions > 0 {
            let key = Key::new(Level::AromaticRing, 0, &[site.kind.class_token()]);
            features.add(key, f64::from(fusions))?;
        }
    }
    Ok(())
}

/// What stands at a position of an aromatic ring, as a token and an atom: its substituent outside the ring, and the atom itself when it is
/// no carbon.
fn position<const A: usize, const B: usize>(
    skeleton: &Skeleton<A, B>,
    ring: &[u16],
    atom: usize,
) -> [Option<(u64, usize)>; 2] {
    const RING_ATOM: u64 = 1 << 32;
    const FUSED: u64 = 1 << 33;
    let substituent = skeleton
        .heavy_neighbours(atom)
        .find(|(n, _)| !ring.contains(&n.atom))
        .map(|(n, site)| {
            let fused = skeleton.molecule.is_aromatic_bond(usize::from(n.bond));
            let token = if fused { FUSED } else { site.kind.token() };
            (token, usize::from(n.atom))
        });
    let own = skeleton
        .site(atom)
        .filter(|s| s.kind.element_token() != crate::molecule::Element::C as u64)
        .map(|s| s.kind.token() << 1 | u64::from(s.hydrogens > 0) | RING_ATOM)
        .map(|token| (token, atom));
    [substituent, own]
}
