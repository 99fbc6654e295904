//! Groups after Benson: a central atom with its hydrogens and heavy neighbours.
//!
//! # Source
//! `benson-1976`.

use heapless::Vec;

use crate::additivity::Level;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::key::{Key, mix};
use crate::additivity::skeleton::{AtomType, Site, Skeleton};
use crate::molecule::MAX_DEGREE;

/// Counts groups, with the neighbours by type and by class only.
pub(super) fn count<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) -> Result<(), AdditivityError> {
    for (atom, site) in skeleton.sites() {
        let mut atoms: Vec<usize, { MAX_DEGREE + 1 }> = Vec::new();
        let neighbours = skeleton.heavy_neighbours(atom);
        atoms.extend(
            neighbours
                .map(|(n, _)| usize::from(n.atom))
                .take(MAX_DEGREE),
        );
        atoms.extend([atom]);
        let fine = group(skeleton, atom, site, AtomType::token);
        let named = skeleton.heteroatoms(&atoms);
        features.add(Key::new(Level::Group, named, &[fine]), 1.0)?;
        let coarse = group(skeleton, atom, site, AtomType::class_token);
        let among = skeleton.heteroatoms_among(&atoms);
        features.add(Key::new(Level::GroupElements, among, &[coarse]), 1.0)?;
    }
    Ok(())
}

/// A central atom with its hydrogens and what `token` says of its heavy neighbours, whatever their order.
fn group<const A: usize, const B: usize>(
    skeleton: &Skeleton<A, B>,
    atom: usize,
    site: Site,
    token: impl Fn(AtomType) -> u64,
) -> u64 {
    let mut neighbours: Vec<u64, MAX_DEGREE> = skeleton
        .heavy_neighbours(atom)
        .map(|(n, neighbour)| {
            token(neighbour.kind) << 3 | skeleton.order_token(usize::from(n.bond))
        })
        .collect();
    neighbours.sort_unstable();
    let centre = [token(site.kind), u64::from(site.hydrogens)];
    mix(&[mix(&centre), mix(&neighbours)])
}
