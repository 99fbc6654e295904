//! Groups after Benson, pairs of them, and groups with all the groups around them.
//!
//! # Source
//! `benson-1976` for the groups; the two wider levels extend the same idea.

use heapless::Vec;

use super::composition::sorted;
use crate::additivity::Level;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::key::{Key, mix};
use crate::additivity::skeleton::{AtomType, Site, Skeleton};
use crate::molecule::MAX_DEGREE;

/// Counts groups, group pairs and shells.
pub(super) fn count<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) -> Result<(), AdditivityError> {
    let groups: Vec<u64, A> = (0..skeleton.molecule.atoms().len())
        .map(|atom| {
            skeleton
                .site(atom)
                .map_or(0, |site| group(skeleton, atom, site, AtomType::token))
        })
        .collect();
    let group_of = |atom: usize| groups.get(atom).copied().unwrap_or(0);
    for (atom, site) in skeleton.sites() {
        features.add(Key::new(Level::Group, &[group_of(atom)]), 1.0)?;
        let coarse = group(skeleton, atom, site, AtomType::class_token);
        features.add(Key::new(Level::GroupElements, &[coarse]), 1.0)?;
        let shell = around(group_of(atom), skeleton, atom, |n, bond| {
            mix(&[group_of(n), skeleton.order_token(bond)])
        });
        features.add(Key::new(Level::Shell, &[shell]), 1.0)?;
    }
    for (bond, [a, b], _) in skeleton.bonds() {
        let [low, high] = sorted(group_of(a), group_of(b));
        let key = Key::new(Level::GroupPair, &[low, high, skeleton.order_token(bond)]);
        features.add(key, 1.0)?;
    }
    Ok(())
}

/// A central atom with its hydrogens and what `token` says of its heavy neighbours.
fn group<const A: usize, const B: usize>(
    skeleton: &Skeleton<A, B>,
    atom: usize,
    site: Site,
    token: impl Fn(AtomType) -> u64,
) -> u64 {
    let centre = mix(&[token(site.kind), u64::from(site.hydrogens)]);
    around(centre, skeleton, atom, |n, bond| {
        let kind = skeleton.site(n).map_or(0, |s| token(s.kind));
        kind << 3 | skeleton.order_token(bond)
    })
}

/// A centre with what `token` says of each of its heavy neighbours, whatever their order.
fn around<const A: usize, const B: usize>(
    centre: u64,
    skeleton: &Skeleton<A, B>,
    atom: usize,
    token: impl Fn(usize, usize) -> u64,
) -> u64 {
    let mut tokens: Vec<u64, MAX_DEGREE> = skeleton
        .heavy_neighbours(atom)
        .map(|(n, _)| token(usize::from(n.atom), usize::from(n.bond)))
        .collect();
    tokens.sort_unstable();
    mix(&[centre, mix(&tokens)])
}
