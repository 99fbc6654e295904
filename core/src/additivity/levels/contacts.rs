//! Crowding that no rotation avoids: substituents of branched atoms that stand five atoms apart.
//!
//! # Source
//! `benson-1976`, the 1,5 hydrogen repulsion, here counted between the branched atoms that cause it.

use super::composition::sorted;
use crate::additivity::Level;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::key::Key;
use crate::additivity::skeleton::{Site, Skeleton};

/// Counts 1,5 contacts.
pub(super) fn count<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) -> Result<(), AdditivityError> {
    for (middle, site) in skeleton.sites() {
        for (n, first) in skeleton.heavy_neighbours(middle) {
            for (m, second) in skeleton.heavy_neighbours(middle) {
                if n.atom < m.atom && is_branched(first) && is_branched(second) {
                    let [low, high] = sorted(u64::from(first.degree), u64::from(second.degree));
                    let in_ring = u64::from(
                        skeleton.is_ring_bond(usize::from(n.bond))
                            && skeleton.is_ring_bond(usize::from(m.bond)),
                    );
                    let tokens = [low, high, in_ring, site.kind.token()];
                    let named = skeleton.heteroatoms(&[middle]);
                    features.add(Key::new(Level::OneFive, named, &tokens), 1.0)?;
                }
            }
        }
    }
    Ok(())
}

fn is_branched(site: Site) -> bool {
    site.kind.is_saturated() && site.degree >= 3
}
