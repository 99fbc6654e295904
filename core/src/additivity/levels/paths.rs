//! Pairs of atoms two and three bonds apart.

use super::composition::sorted;
use crate::additivity::Level;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::key::Key;
use crate::additivity::skeleton::{AtomType, Site, Skeleton};

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
                    let [low, high] = sorted(first.kind.class_token(), second.kind.class_token());
                    let tokens = [low, site.kind.class_token(), high];
                    features.add(Key::new(Level::GeminalElements, &tokens), 1.0)?;
                }
            }
        }
    }
    Ok(())
}

/// Counts pairs of atoms at the ends of paths of two and three bonds, in chains and rings alike.
pub(super) fn next_nearest<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) -> Result<(), AdditivityError> {
    let token = |site: Site| site.kind.element_token() << 4 | u64::from(site.hydrogens);
    let key = |bonds: u64, first: Site, last: Site| {
        let [low, high] = sorted(token(first), token(last));
        Key::new(Level::NextNearest, &[bonds, low, high])
    };
    for (centre, _) in skeleton.sites() {
        for (n, first) in skeleton.heavy_neighbours(centre) {
            for (m, last) in skeleton.heavy_neighbours(centre) {
                if n.atom < m.atom {
                    features.add(key(2, first, last), 1.0)?;
                }
            }
        }
    }
    for (_, ends, _) in skeleton.bonds() {
        for [first, _, _, last] in paths(skeleton, ends, |_| true) {
            features.add(key(3, first, last), 1.0)?;
        }
    }
    Ok(())
}

/// Counts pairs of atoms three bonds apart across bonds that are in no ring.
pub(super) fn vicinal<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) -> Result<(), AdditivityError> {
    for (bond, ends, _) in skeleton.bonds() {
        if skeleton.is_ring_bond(bond) {
            continue;
        }
        for path in paths(skeleton, ends, |_| true) {
            let order = skeleton.order_token(bond);
            features.add(key(Level::Vicinal, path, order, AtomType::token), 1.0)?;
            features.add(
                key(Level::VicinalElements, path, order, AtomType::class_token),
                1.0,
            )?;
        }
    }
    Ok(())
}

/// Counts pairs of substituents on adjacent atoms of non-aromatic rings, on the atoms that `keep` accepts.
pub(super) fn ring_vicinal<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
    keep: &dyn Fn(usize) -> bool,
) -> Result<(), AdditivityError> {
    for (bond, ends, _) in skeleton.bonds() {
        if skeleton.bond_rings(bond) == 0 || !keep(ends[0]) {
            continue;
        }
        let outside = |bond: usize| skeleton.bond_rings(bond) == 0;
        for path in paths(skeleton, ends, outside) {
            let order = skeleton.order_token(bond);
            features.add(
                key(Level::RingVicinal, path, order, AtomType::class_token),
                1.0,
            )?;
        }
    }
    Ok(())
}

/// The sites along the paths of three bonds across a bond, over outer bonds that `through` accepts.
fn paths<const A: usize, const B: usize>(
    skeleton: &Skeleton<A, B>,
    [a, b]: [usize; 2],
    through: impl Fn(usize) -> bool + Copy,
) -> impl Iterator<Item = [Site; 4]> {
    let outer = move |from: usize, not: usize| {
        skeleton
            .heavy_neighbours(from)
            .filter(move |(n, _)| usize::from(n.atom) != not && through(usize::from(n.bond)))
    };
    let inner = [skeleton.site(a), skeleton.site(b)];
    outer(a, b).flat_map(move |(n, first)| {
        outer(b, a).filter_map(move |(m, last)| {
            let [Some(second), Some(third)] = inner else {
                return None;
            };
            (n.atom != m.atom).then_some([first, second, third, last])
        })
    })
}

/// The key of a path, the same from both ends.
fn key(level: Level, path: [Site; 4], order: u64, token: impl Fn(AtomType) -> u64) -> Key {
    let [a, b, c, d] = path.map(|site| token(site.kind));
    let tokens = if [a, b] <= [d, c] {
        [a, b, c, d, order]
    } else {
        [d, c, b, a, order]
    };
    Key::new(level, &tokens)
}
