//! Configuration of double bonds and rings.

use super::composition::sorted;
use crate::additivity::Level;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::key::Key;
use crate::additivity::skeleton::{Site, Skeleton};
use crate::molecule::{DoubleBondStereo, Neighbour};

/// Counts substituents on one side of double bonds in chains.
pub(super) fn cis<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) -> Result<(), AdditivityError> {
    for (bond, ends, stereo) in stated(skeleton) {
        if skeleton.is_ring_bond(bond) {
            continue;
        }
        for [(n, first), (m, second)] in pairs(skeleton, ends) {
            if same_side(stereo, n.atom, m.atom) {
                let tokens = [first, second].map(|s| s.kind.token() << 3 | u64::from(s.degree));
                let [low, high] = sorted(tokens[0], tokens[1]);
                let ends = [n.atom, m.atom].map(usize::from);
                let named = skeleton.heteroatoms(&ends);
                features.add(Key::new(Level::Cis, named, &[low, high]), 1.0)?;
            }
        }
    }
    Ok(())
}

/// Counts trans double bonds in rings.
pub(super) fn ring<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
    keep: &dyn Fn(usize) -> bool,
) -> Result<(), AdditivityError> {
    for (bond, ends, stereo) in stated(skeleton) {
        let Some(size) = skeleton.molecule.bond_ring_sizes(bond).smallest() else {
            continue;
        };
        if !keep(ends[0]) {
            continue;
        }
        let in_ring = |n: Neighbour| skeleton.is_ring_bond(usize::from(n.bond));
        let trans = pairs(skeleton, ends)
            .any(|[(n, _), (m, _)]| in_ring(n) && in_ring(m) && !same_side(stereo, n.atom, m.atom));
        if trans {
            features.add(Key::new(Level::RingConfiguration, 0, &[size as u64]), 1.0)?;
        }
    }
    Ok(())
}

/// The double bonds whose configuration is stated: bond, its atoms, the configuration.
fn stated<const A: usize, const B: usize>(
    skeleton: &Skeleton<A, B>,
) -> impl Iterator<Item = (usize, [usize; 2], DoubleBondStereo)> {
    skeleton.bonds().filter_map(|(bond, ends, _)| {
        let stereo = skeleton.molecule.bonds().get(bond)?.stereo?;
        Some((bond, ends, stereo))
    })
}

/// A heavy neighbour of one end of a double bond with one of the other end.
fn pairs<const A: usize, const B: usize>(
    skeleton: &Skeleton<A, B>,
    [a, b]: [usize; 2],
) -> impl Iterator<Item = [(Neighbour, Site); 2]> {
    let outer = move |from: usize, not: usize| {
        skeleton
            .heavy_neighbours(from)
            .filter(move |(n, _)| usize::from(n.atom) != not)
    };
    outer(a, b).flat_map(move |first| outer(b, a).map(move |second| [first, second]))
}

/// Whether two neighbours of the double bond's ends lie on the same side.
fn same_side(stereo: DoubleBondStereo, first: u16, second: u16) -> bool {
    let crossed = (first != stereo.first_reference) ^ (second != stereo.second_reference);
    stereo.same_side ^ crossed
}
