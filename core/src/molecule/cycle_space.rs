//! The part of a graph that carries cycles, and sums of its cycles over GF(2).
//!
//! A spanning forest leaves as many bonds over as there are independent cycles, the chords. A sum of cycles is fixed by
//! the chords in it, so one bit per chord stands for the whole bond set.

use heapless::Vec;

use super::error::MoleculeError;
use super::graph::{Bond, MAX_DEGREE, Neighbour};

/// Most independent cycles (cyclomatic number), one per bit of a sum of cycles.
const MAX_INDEPENDENT: usize = u128::BITS as usize;

/// One end of a bond of the cyclic part, as seen from a vertex.
#[derive(Clone, Copy)]
pub(super) struct Link {
    /// The vertex that it leads to.
    pub(super) vertex: u16,
    /// Which chord the bond is; `None` for a bond of the spanning forest.
    chord: Option<u8>,
}

/// What is left of a graph when chains that end nowhere are pruned: rings and the links between them.
///
/// Every vertex has at least two bonds here, so `B` bonds bound the number of vertices, too. Vertices keep the order of
/// the atoms.
pub(super) struct CyclicGraph<const B: usize> {
    atoms: Vec<u16, B>,
    links: Vec<Vec<Link, MAX_DEGREE>, B>,
    cyclomatic_number: usize,
}

impl<const B: usize> CyclicGraph<B> {
    /// Prunes the graph and numbers its chords.
    ///
    /// # Errors
    /// [`MoleculeError::TooManyRings`] above 128 independent cycles.
    pub(super) fn new(
        neighbours: &[Vec<Neighbour, MAX_DEGREE>],
        bonds: &[Bond],
    ) -> Result<Self, MoleculeError> {
        let cyclic = prune::<B>(neighbours);
        let cyclic_bonds = || {
            let kept = bonds.iter().zip(cyclic).filter(|&(_, kept)| kept);
            kept.map(|(bond, _)| bond.atoms)
        };
        let mut atoms: Vec<u16, B> = Vec::new();
        for (atom, its) in neighbours.iter().enumerate() {
            if its.iter().any(|n| is_kept(&cyclic, *n)) {
                atoms
                    .push(atom as u16)
                    .map_err(|_| MoleculeError::TooManyRings { capacity: B })?;
            }
        }
        let mut graph = Self {
            links: atoms.iter().map(|_| Vec::new()).collect(),
            atoms,
            cyclomatic_number: 0,
        };
        let mut tree = Forest::<B>::new();
        for [first, second] in cyclic_bonds() {
            let (Ok(a), Ok(b)) = (
                graph.atoms.binary_search(&first),
                graph.atoms.binary_search(&second),
            ) else {
                continue;
            };
            let chord = if tree.join(a, b) {
                None
            } else {
                Some(graph.next_chord()?)
            };
            for (from, to) in [(a, b), (b, a)] {
                let link = Link {
                    vertex: to as u16,
                    chord,
                };
                if let Some(links) = graph.links.get_mut(from) {
                    links
                        .push(link)
                        .map_err(|_| MoleculeError::TooManyNeighbours { atom: from })?;
                }
            }
        }
        Ok(graph)
    }

    /// How many vertices.
    pub(super) fn len(&self) -> usize {
        self.atoms.len()
    }

    /// How many independent cycles.
    pub(super) fn cyclomatic_number(&self) -> usize {
        self.cyclomatic_number
    }

    /// The atom that a vertex stands for.
    pub(super) fn atom(&self, vertex: u16) -> u16 {
        self.atoms
            .get(usize::from(vertex))
            .copied()
            .unwrap_or_default()
    }

    /// The bonds of a vertex.
    pub(super) fn links(&self, vertex: u16) -> &[Link] {
        self.links
            .get(usize::from(vertex))
            .map_or(&[], Vec::as_slice)
    }

    /// A cycle, given as its vertices in order, as the set of its chords.
    pub(super) fn chords(&self, cycle: &[u16]) -> u128 {
        let next = cycle.iter().cycle().skip(1);
        cycle.iter().zip(next).fold(0, |sum, (&from, &to)| {
            let link = self.links(from).iter().find(|link| link.vertex == to);
            match link.and_then(|link| link.chord) {
                Some(chord) => sum ^ 1_u128.unbounded_shl(chord.into()),
                None => sum,
            }
        })
    }

    fn next_chord(&mut self) -> Result<u8, MoleculeError> {
        if self.cyclomatic_number == MAX_INDEPENDENT {
            return Err(MoleculeError::TooManyRings {
                capacity: MAX_INDEPENDENT,
            });
        }
        let chord = self.cyclomatic_number as u8;
        self.cyclomatic_number += 1;
        Ok(chord)
    }
}

/// A basis of the sums of cycles seen so far, which tells relevant cycles from the others.
pub(super) struct CycleBasis {
    /// Each row lacks the lowest bits of the rows before it.
    rows: Vec<u128, MAX_INDEPENDENT>,
    /// How many rows come from cycles shorter than those being tested.
    shorter: usize,
}

impl CycleBasis {
    pub(super) const fn new() -> Self {
        Self {
            rows: Vec::new(),
            shorter: 0,
        }
    }

    /// How many independent cycles were seen.
    pub(super) fn rank(&self) -> usize {
        self.rows.len()
    }

    /// Starts on longer cycles: all that were seen until now are shorter than what follows.
    pub(super) fn next_size(&mut self) {
        self.shorter = self.rows.len();
    }

    /// Whether a cycle is no sum of shorter ones; if so it is taken into the basis.
    pub(super) fn is_relevant(&mut self, chords: u128) -> bool {
        let (shorter, same) = self
            .rows
            .split_at_checked(self.shorter)
            .unwrap_or((&self.rows, &[]));
        let remainder = reduce(shorter, chords);
        if remainder == 0 {
            return false;
        }
        let remainder = reduce(same, remainder);
        if remainder != 0 {
            // Independent rows of 128 bits cannot be more than 128.
            let _ = self.rows.push(remainder);
        }
        true
    }
}

fn reduce(rows: &[u128], vector: u128) -> u128 {
    rows.iter().fold(vector, |rest, &row| {
        let lowest = row & row.wrapping_neg();
        if rest & lowest == 0 { rest } else { rest ^ row }
    })
}

/// Marks the bonds that stay when atoms with a single bond are taken away again and again.
fn prune<const B: usize>(neighbours: &[Vec<Neighbour, MAX_DEGREE>]) -> [bool; B] {
    let mut kept = [true; B];
    for start in 0..neighbours.len() {
        let mut atom = start;
        loop {
            let mut left = neighbours
                .get(atom)
                .into_iter()
                .flatten()
                .filter(|n| is_kept(&kept, **n));
            let (Some(&only), None) = (left.next(), left.next()) else {
                break;
            };
            if let Some(bond) = kept.get_mut(usize::from(only.bond)) {
                *bond = false;
            }
            atom = usize::from(only.atom);
        }
    }
    kept
}

fn is_kept(kept: &[bool], neighbour: Neighbour) -> bool {
    kept.get(usize::from(neighbour.bond)) == Some(&true)
}

/// A spanning forest that grows bond by bond.
struct Forest<const B: usize> {
    /// Each vertex's parent plus one; 0 for a root.
    parents: [u16; B],
}

impl<const B: usize> Forest<B> {
    const fn new() -> Self {
        Self { parents: [0; B] }
    }

    /// Joins the trees of two vertices; `false` if they are one tree already.
    fn join(&mut self, first: usize, second: usize) -> bool {
        let (first, second) = (self.root(first), self.root(second));
        if first == second {
            return false;
        }
        // The higher root hangs below the lower one.
        let (low, high) = (first.min(second), first.max(second));
        if let Some(parent) = self.parents.get_mut(high) {
            *parent = low as u16 + 1;
        }
        true
    }

    fn root(&self, vertex: usize) -> usize {
        let mut root = vertex;
        while let Some(&parent @ 1..) = self.parents.get(root) {
            root = usize::from(parent) - 1;
        }
        root
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_cycle_is_relevant_beside_its_equals_but_not_as_a_sum_of_shorter_ones() {
        let mut basis = CycleBasis::new();
        assert!(basis.is_relevant(0b0011));
        assert!(basis.is_relevant(0b0110));
        assert!(
            basis.is_relevant(0b0101),
            "the sum of two cycles of its own size"
        );
        assert_eq!(basis.rank(), 2);
        basis.next_size();
        assert!(!basis.is_relevant(0b0101));
        assert!(basis.is_relevant(0b1101));
    }
}
