//! Pairs of atoms two and three bonds apart.

use super::composition::sorted;
use crate::additivity::Level;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::key::Key;
use crate::additivity::skeleton::{AtomType, Site, Skeleton};
use crate::molecule::{Element, Neighbour};

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
                    let atoms = [usize::from(n.atom), centre, usize::from(m.atom)];
                    let named = skeleton.heteroatoms(&atoms);
                    let tokens = [low, site.kind.token(), high];
                    features.add(Key::new(Level::Geminal, named, &tokens), 1.0)?;
                    let [low, high] = sorted(first.kind.class_token(), second.kind.class_token());
                    let tokens = [low, site.kind.class_token(), high];
                    let among = skeleton.heteroatoms_among(&atoms);
                    features.add(Key::new(Level::GeminalElements, among, &tokens), 1.0)?;
                }
            }
        }
    }
    Ok(())
}

/// Counts pairs of atoms at the ends of paths of one, two and three bonds, in chains and rings alike.
pub(super) fn near_pairs<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) -> Result<(), AdditivityError> {
    let token = |site: Site| {
        let aromatic = u64::from(site.aromatic_rings > 0);
        let [degree, hydrogens] = [site.degree, site.hydrogens].map(u64::from);
        site.kind.element_token() << 9 | aromatic << 8 | degree << 4 | hydrogens
    };
    let key = |bonds: u64, atoms: [usize; 2], [first, last]: [Site; 2]| {
        let [low, high] = sorted(token(first), token(last));
        let among = skeleton.heteroatoms_among(&atoms);
        Key::new(Level::NearPair, among, &[bonds, low, high])
    };
    for (centre, _) in skeleton.sites() {
        for (n, first) in skeleton.heavy_neighbours(centre) {
            for (m, last) in skeleton.heavy_neighbours(centre) {
                if n.atom < m.atom {
                    let ends = [n.atom, m.atom].map(usize::from);
                    features.add(key(2, ends, [first, last]), 1.0)?;
                }
            }
        }
    }
    for (_, ends, sites) in skeleton.bonds() {
        features.add(key(1, ends, sites), 1.0)?;
        for path in paths(skeleton, ends) {
            let [first, .., last] = path.atoms;
            let [first_site, .., last_site] = path.sites;
            features.add(key(3, [first, last], [first_site, last_site]), 1.0)?;
        }
    }
    Ok(())
}

/// Counts pairs of atoms three bonds apart across bonds that are in no aromatic ring.
///
/// Ring bonds count like those of a chain, so that the ring levels hold only what a chain has not.
pub(super) fn vicinal<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) -> Result<(), AdditivityError> {
    for (bond, ends, _) in skeleton.bonds() {
        if skeleton.is_ring_bond(bond) && skeleton.bond_rings(bond) == 0 {
            continue;
        }
        for path in paths(skeleton, ends) {
            let order = skeleton.order_token(bond);
            let named = skeleton.heteroatoms(&path.atoms);
            let fine = key(Level::Vicinal, named, path, order, AtomType::token);
            features.add(fine, 1.0)?;
            let among = skeleton.heteroatoms_among(&path.atoms);
            let class = AtomType::class_token;
            let coarse = key(Level::VicinalElements, among, path, order, class);
            features.add(coarse, 1.0)?;
        }
    }
    Ok(())
}

/// Counts pairs of atoms three bonds apart across bonds of non-aromatic rings, on the atoms that `keep` accepts.
///
/// How many of the outer bonds are in a ring, too, tells substituents from the ring itself.
pub(super) fn ring_vicinal<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
    keep: &dyn Fn(usize) -> bool,
) -> Result<(), AdditivityError> {
    for (bond, ends, _) in skeleton.bonds() {
        if skeleton.bond_rings(bond) == 0 || !keep(ends[0]) {
            continue;
        }
        for path in paths(skeleton, ends) {
            let order = skeleton.order_token(bond) << 2 | path.ring_bonds;
            let among = skeleton.heteroatoms_among(&path.atoms);
            let class = AtomType::class_token;
            let key = key(Level::RingVicinal, among, path, order, class);
            features.add(key, 1.0)?;
        }
    }
    Ok(())
}

/// How many paths of one, two or three bonds have a heteroatom at both ends.
pub(super) fn polar_pairs<const A: usize, const B: usize>(skeleton: &Skeleton<A, B>) -> usize {
    let polar = |site: Site| site.kind.element_token() != Element::C as u64;
    let bonded = skeleton
        .bonds()
        .filter(|(_, _, [a, b])| polar(*a) && polar(*b))
        .count();
    let geminal: usize = skeleton
        .sites()
        .map(|(centre, _)| {
            let ends = skeleton.heavy_neighbours(centre);
            let polar_ends = ends.filter(|&(_, site)| polar(site)).count();
            polar_ends * polar_ends.saturating_sub(1) / 2
        })
        .sum();
    let vicinal = skeleton
        .bonds()
        .flat_map(|(_, ends, _)| paths(skeleton, ends))
        .filter(|path| polar(path.sites[0]) && polar(path.sites[3]))
        .count();
    bonded + geminal + vicinal
}

/// A path of three bonds.
#[derive(Clone, Copy)]
struct Path {
    /// The four atoms.
    atoms: [usize; 4],
    /// The same as sites.
    sites: [Site; 4],
    /// How many of the two outer bonds are in a non-aromatic ring.
    ring_bonds: u64,
}

/// The paths of three bonds across a bond.
///
/// In a ring of three both ends are the same atom; such a path counts, so that each ring bond has one as each bond of a chain has.
fn paths<const A: usize, const B: usize>(
    skeleton: &Skeleton<A, B>,
    [a, b]: [usize; 2],
) -> impl Iterator<Item = Path> {
    let outer = move |from: usize, not: usize| {
        skeleton
            .heavy_neighbours(from)
            .filter(move |(n, _)| usize::from(n.atom) != not)
    };
    let inner = [skeleton.site(a), skeleton.site(b)];
    let in_ring = |n: Neighbour| u64::from(skeleton.bond_rings(usize::from(n.bond)) != 0);
    outer(a, b).flat_map(move |(n, first)| {
        outer(b, a).filter_map(move |(m, last)| {
            let [Some(second), Some(third)] = inner else {
                return None;
            };
            Some(Path {
                atoms: [usize::from(n.atom), a, b, usize::from(m.atom)],
                sites: [first, second, third, last],
                ring_bonds: in_ring(n) + in_ring(m),
            })
        })
    })
}

/// The key of a path, the same from both ends.
fn key(
    level: Level,
    heteroatoms: usize,
    path: Path,
    order: u64,
    token: impl Fn(AtomType) -> u64,
) -> Key {
    let [a, b, c, d] = path.sites.map(|site| token(site.kind));
    let tokens = if [a, b] <= [d, c] {
        [a, b, c, d, order]
    } else {
        [d, c, b, a, order]
    };
    Key::new(level, heteroatoms, &tokens)
}
