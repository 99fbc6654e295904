//! Pairs of atoms two and three bonds apart.

use super::composition::sorted;
use crate::additivity::Level;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::key::Key;
use crate::additivity::skeleton::{Site, Skeleton};

/// Counts pairs of atoms two bonds apart.
pub(super) fn geminal<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) -> Result<(), AdditivityError> {
    for (centre, site) in skeleton.sites() {
        for (n, first) in skeleton.heavy_neighbours(centre) {
            for (m, second) in skeleton.heavy_neighbours(centre) {
                if n.atom < m.atom {
                    let [low, high] = sorted(first.kind.token(), second.kind.token());
                    let key = Key::new(Level::Geminal, &[low, site.kind.token(), high]);
                    features.add(key, 1.0)?;
                }
            }
        }
    }
    Ok(())
}

/// Counts pairs of atoms three bonds apart across bonds that are in no ring.
pub(super) fn vicinal<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) -> Result<(), AdditivityError> {
    across(skeleton, features, Level::Vicinal, |bond, _| {
        !skeleton.is_ring_bond(bond)
    })
}

/// Counts pairs of atoms three bonds apart across bonds of non-aromatic rings.
pub(super) fn ring_vicinal<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
    keep: &dyn Fn(usize) -> bool,
) -> Result<(), AdditivityError> {
    across(skeleton, features, Level::RingVicinal, |bond, atom| {
        skeleton.bond_rings(bond) != 0 && keep(atom)
    })
}

/// Counts vicinal pairs across the bonds that `chosen` accepts (bond and its first atom).
fn across<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
    level: Level,
    chosen: impl Fn(usize, usize) -> bool,
) -> Result<(), AdditivityError> {
    for (bond, [a, b], [site_a, site_b]) in skeleton.bonds() {
        if !chosen(bond, a) {
            continue;
        }
        for (n, first) in skeleton
            .heavy_neighbours(a)
            .filter(|(n, _)| usize::from(n.atom) != b)
        {
            for (m, second) in skeleton
                .heavy_neighbours(b)
                .filter(|(m, _)| usize::from(m.atom) != a)
            {
                if n.atom == m.atom {
                    continue;
                }
                let [in_first, in_second] =
                    [n, m].map(|x| skeleton.bond_rings(usize::from(x.bond)) != 0);
                let forward = end(first, site_a, in_first);
                let backward = end(second, site_b, in_second);
                let [low, high] = if forward <= backward {
                    [forward, backward]
                } else {
                    [backward, forward]
                };
                let tokens = [low[0], low[1], high[1], high[0], skeleton.order_token(bond)];
                features.add(Key::new(level, &tokens), 1.0)?;
            }
        }
    }
    Ok(())
}

/// One half of a vicinal path: the outer atom, with a mark when its bond is in a ring, and the inner one.
fn end(outer: Site, inner: Site, inside: bool) -> [u64; 2] {
    [
        outer.kind.token() << 1 | u64::from(inside),
        inner.kind.token(),
    ]
}
