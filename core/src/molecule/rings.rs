//! The relevant cycles of a graph, a set that does not depend on the order of the atoms.
//!
//! A cycle is relevant when it is no sum (over GF(2), of bond sets) of strictly shorter cycles. The set is unique: cubane
//! has six four-membered rings, whichever atom comes first.
//!
//! # Source
//! `vismara-1997`.

use core::cmp::Ordering;

use heapless::Vec;

use super::cycle_families::ShortestPaths;
use super::cycle_space::{CycleBasis, CyclicGraph};
use super::error::MoleculeError;
use super::graph::{Bond, MAX_DEGREE, Neighbour};

/// Ring sizes as a set: bit `n` stands for size `n`; sizes from 63 on share the last bit.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct RingSizes(u64);

impl RingSizes {
    /// Whether the set is empty.
    pub const fn is_empty(self) -> bool {
        self.0 == 0
    }

    /// Whether the set holds `size`.
    pub const fn contains(self, size: usize) -> bool {
        self.0 & Self::bit(size) != 0
    }

    /// The set with `size` added.
    #[must_use]
    pub const fn with(self, size: usize) -> Self {
        Self(self.0 | Self::bit(size))
    }

    /// The smallest size, if there is one.
    pub const fn smallest(self) -> Option<usize> {
        if self.0 == 0 {
            None
        } else {
            Some(self.0.trailing_zeros() as usize)
        }
    }

    /// The sizes in ascending order.
    pub fn iter(self) -> impl Iterator<Item = usize> {
        (0..64).filter(move |&size| self.contains(size))
    }

    const fn bit(size: usize) -> u64 {
        1 << if size < 63 { size } else { 63 }
    }
}

/// The relevant cycles of a molecule of at most `B` bonds: at most `B` rings with `8 B` ring atoms together.
///
/// Rings come by size, then by their atoms' sorted indices. Each starts at its lowest atom and runs to the lower of that
/// atom's two neighbours in the ring. A relevant cycle has no chord: two ring atoms are bonded only along the ring.
#[derive(Clone, Debug)]
pub struct RingSet<const B: usize> {
    /// Ring atoms in ring order, one ring after the other.
    atoms: [[u16; 8]; B],
    /// Where each ring ends in `atoms`.
    ends: Vec<u32, B>,
}

impl<const B: usize> RingSet<B> {
    /// Finds the relevant cycles of the graph, by size, each with its atoms in ring order.
    ///
    /// # Errors
    /// [`MoleculeError::TooManyRings`] when they do not fit, or above 128 independent cycles.
    pub(super) fn find(
        neighbours: &[Vec<Neighbour, MAX_DEGREE>],
        bonds: &[Bond],
    ) -> Result<Self, MoleculeError> {
        let mut set = Self {
            atoms: [[0; 8]; B],
            ends: Vec::new(),
        };
        let graph = CyclicGraph::<B>::new(neighbours, bonds)?;
        let mut basis = CycleBasis::new();
        let mut size = 3;
        // Nothing is relevant beyond the size at which the shorter cycles span everything.
        while basis.rank() < graph.cyclomatic_number() {
            basis.next_size();
            let Some(next_size) = set.find_of_size(size, &graph, &mut basis)? else {
                break;
            };
            size = next_size;
        }
        Ok(set)
    }

    /// How many rings.
    pub fn len(&self) -> usize {
        self.ends.len()
    }

    /// Whether there is no ring.
    pub fn is_empty(&self) -> bool {
        self.ends.is_empty()
    }

    /// The rings, smallest first, each as its atoms' indices in ring order.
    pub fn iter(&self) -> impl Iterator<Item = &[u16]> {
        let mut start = 0;
        self.ends.iter().map(move |&end| {
            let end = end as usize;
            let ring = self.atoms.as_flattened().get(start..end).unwrap_or(&[]);
            start = end;
            ring
        })
    }

    /// Adds the relevant cycles of one size and returns the next size that a cycle may have.
    fn find_of_size(
        &mut self,
        size: usize,
        graph: &CyclicGraph<B>,
        basis: &mut CycleBasis,
    ) -> Result<Option<usize>, MoleculeError> {
        let first_atom = self.atom_count();
        let mut next_size = None;
        for root in 0..graph.len() {
            let paths = ShortestPaths::below(graph, root as u16);
            for family in paths.families() {
                let its_size = paths.size(family);
                if its_size > size {
                    next_size = Some(next_size.map_or(its_size, |next: usize| next.min(its_size)));
                }
                if its_size != size {
                    continue;
                }
                let prototype = paths.prototype(family);
                if prototype.is_some_and(|cycle| basis.is_relevant(graph.chords(&cycle))) {
                    paths.for_each_cycle(family, |cycle| {
                        let mut ring: Vec<u16, B> = cycle.iter().map(|&v| graph.atom(v)).collect();
                        start_at_lowest(&mut ring);
                        self.insert(&ring, first_atom)
                    })?;
                }
            }
        }
        Ok(next_size)
    }

    /// Inserts a ring in order among those of its size, which start at `first_atom`.
    fn insert(&mut self, ring: &[u16], first_atom: usize) -> Result<(), MoleculeError> {
        let full = MoleculeError::TooManyRings { capacity: B };
        let start = self.atom_count();
        let end = start + ring.len();
        let flat = self.atoms.as_flattened_mut();
        flat.get_mut(start..end).ok_or(full)?.copy_from_slice(ring);
        self.ends.push(end as u32).map_err(|_| full)?;
        let later = flat
            .get(first_atom..start)
            .unwrap_or(&[])
            .rchunks_exact(ring.len())
            .take_while(|other| compare(ring, other).is_lt())
            .count();
        if let Some(tail) = flat.get_mut(start - later * ring.len()..end) {
            tail.rotate_right(ring.len());
        }
        Ok(())
    }

    fn atom_count(&self) -> usize {
        self.ends.last().map_or(0, |&end| end as usize)
    }
}

/// Turns a ring so that it starts at its lowest atom and goes on to the lower neighbour.
fn start_at_lowest(ring: &mut [u16]) {
    let lowest = ring.iter().enumerate().min_by_key(|(_, atom)| **atom);
    let position = lowest.map_or(0, |(position, _)| position);
    ring.rotate_left(position);
    if ring.get(1) > ring.last() {
        ring.reverse();
        ring.rotate_right(1);
    }
}

/// Orders two rings of one size by their sorted atoms, then by ring order.
fn compare(ring: &[u16], other: &[u16]) -> Ordering {
    let lowest_only_in = |here: &[u16], there: &[u16]| {
        let only = here.iter().filter(|atom| !there.contains(atom));
        only.min().copied().unwrap_or(u16::MAX)
    };
    // Both start at their lowest atom, which nearly always decides.
    ring.first()
        .cmp(&other.first())
        .then_with(|| lowest_only_in(ring, other).cmp(&lowest_only_in(other, ring)))
        .then_with(|| ring.cmp(other))
}

#[cfg(test)]
mod tests {
    use super::super::{Atom, BondOrder, Element, Molecule, MoleculeBuilder};
    use super::*;

    fn carbons<const A: usize, const B: usize>(
        bonds: impl IntoIterator<Item = (usize, usize)>,
    ) -> Result<Molecule<A, B>, MoleculeError> {
        let mut builder = MoleculeBuilder::<A, B>::new();
        let mut count = 0;
        for (a, b) in bonds {
            while count <= a.max(b) {
                count = 1 + builder.add_atom(Atom {
                    element: Element::C,
                    charge: 0,
                    hydrogens: 4,
                    isotope: 0,
                })?;
            }
            builder.add_bond(a, b, BondOrder::Single)?;
        }
        for bond in 0..builder.bonds.len() {
            for atom in builder.bonds[bond].atoms {
                builder.atoms[usize::from(atom)].hydrogens -= 1;
            }
        }
        builder.finish()
    }

    #[test]
    fn a_chain_has_no_ring() {
        let chain = carbons::<8, 8>([(0, 1), (1, 2), (1, 3)]).unwrap();
        assert!(chain.rings().is_empty());
        assert!(chain.ring_systems().is_empty());
    }

    #[test]
    fn rings_come_by_size_and_atoms() {
        // Cyclopropane linked to norbornane.
        let molecule = carbons::<16, 16>([
            (0, 1),
            (1, 2),
            (2, 0),
            (2, 9),
            (9, 3),
            (9, 5),
            (9, 8),
            (3, 4),
            (5, 6),
            (4, 7),
            (6, 7),
            (8, 7),
        ])
        .unwrap();
        let rings = molecule.rings();
        assert!(
            rings
                .iter()
                .eq([&[0, 1, 2][..], &[3, 4, 7, 8, 9], &[5, 6, 7, 8, 9]])
        );
        assert_eq!(molecule.ring_systems().len(), 2);
        assert_eq!(molecule.ring_systems().of_atom(9), Some(1));
        assert!(molecule.ring_systems().atoms(0).eq(0..3));
    }

    #[test]
    fn too_many_rings_are_an_error() {
        // Eight six-membered rings, linked through opposite corners into a necklace: 2^8 equal ways around.
        let necklace = (0..8).flat_map(|k| {
            let corner = 6 * k;
            let bonds = [(0, 1), (1, 2), (2, 5), (0, 3), (3, 4), (4, 5), (5, 6)];
            bonds.map(|(a, b)| (corner + a, (corner + b) % 48))
        });
        let error = carbons::<48, 64>(necklace).unwrap_err();
        assert_eq!(error, MoleculeError::TooManyRings { capacity: 64 });
    }
}
