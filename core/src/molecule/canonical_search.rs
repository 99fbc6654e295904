//! The search for the canonical order.
//!
//! Where refinement leaves atoms alike, one of them is singled out and refinement goes on, and of all labellings reached this way the
//! smallest wins. Automorphisms found on the way cut off branches that could only repeat an earlier code, so that cages of high symmetry
//! take about as many leaves as their symmetry has generators.
//!
//! # Source
//! `mckay-1981`.

use core::cmp::Ordering;

use heapless::Vec;

use super::canonical::CanonicalOrder;
use super::molecule::Molecule;

/// Most refinements before the search settles for the best order so far.
const MAX_REFINEMENTS: usize = 20_000;

/// Most automorphisms that are remembered; more would only save time.
const MAX_GENERATORS: usize = 48;

/// Levels of the search whose colours are kept rather than worked out again; few molecules go deeper.
const KEPT_LEVELS: usize = 16;

/// The search tree, walked depth first; a node is the list of atoms singled out on the way to it.
///
/// A digest of what is settled at each node (its trace) comes before the code when leaves are compared, so that a branch whose digest is
/// larger than that of the best one is left at once.
pub(super) struct Search<'a, const A: usize, const B: usize> {
    molecule: &'a Molecule<A, B>,
    /// Colours at the nodes on the path from the root, as far down as they are kept.
    kept: Vec<Vec<u16, A>, KEPT_LEVELS>,
    path: Vec<u16, A>,
    trace: Vec<u64, A>,
    best: Vec<u16, A>,
    best_path: Vec<u16, A>,
    best_trace: Vec<u64, A>,
    generators: Vec<Vec<u16, A>, MAX_GENERATORS>,
    refinements: usize,
}

impl<'a, const A: usize, const B: usize> Search<'a, A, B> {
    pub(super) fn new(molecule: &'a Molecule<A, B>) -> Self {
        let mut root = molecule.initial_colours(true);
        molecule.refine(&mut root, true);
        let mut kept = Vec::new();
        // The first of several places.
        let _ = kept.push(root);
        Self {
            molecule,
            kept,
            path: Vec::new(),
            trace: Vec::new(),
            best: Vec::new(),
            best_path: Vec::new(),
            best_trace: Vec::new(),
            generators: Vec::new(),
            refinements: 0,
        }
    }

    pub(super) fn run(mut self) -> CanonicalOrder<A> {
        loop {
            if let Some(ranks) = self.descend() {
                let keep = self.leaf(&ranks);
                self.path.truncate(keep);
            }
            if self.refinements > MAX_REFINEMENTS || !self.advance() {
                break;
            }
        }
        CanonicalOrder {
            atoms: inverse(&self.best),
            exact: self.refinements <= MAX_REFINEMENTS,
            ranks: self.best,
        }
    }

    /// Follows the first branch at every level down to a leaf and gives its colours, which are ranks; `None` where the branch is worse than
    /// the best.
    fn descend(&mut self) -> Option<Vec<u16, A>> {
        let mut colours = self.colours_at(self.path.len());
        self.trace.truncate(self.path.len().saturating_sub(1));
        loop {
            if self.trace.len() < self.path.len() {
                // Neither path nor trace is ever longer than the number of atoms.
                let _ = self.trace.push(self.molecule.digest(&colours));
            }
            let known = self.best_trace.get(..self.trace.len());
            if !self.best.is_empty() && self.trace.as_slice() > known.unwrap_or(&self.best_trace) {
                return None;
            }
            let Some(cell) = target_cell(&colours) else {
                return Some(colours);
            };
            let atom = colours.iter().position(|&c| c == cell)?;
            let _ = self.path.push(atom as u16);
            self.single_out(&mut colours, atom);
            if self.kept.len() == self.path.len() {
                let _ = self.kept.push(colours.clone());
            }
        }
    }

    /// Moves to the next branch that no known automorphism maps to an earlier one, going up where there is none.
    fn advance(&mut self) -> bool {
        while let Some(last) = self.path.pop() {
            let colours = self.colours_at(self.path.len());
            let cell = colours.get(usize::from(last)).copied();
            let orbits = self.orbits();
            let next = (usize::from(last) + 1..colours.len()).find(|&atom| {
                colours.get(atom).copied() == cell && orbits.get(atom).copied() == Some(atom as u16)
            });
            if let Some(atom) = next {
                let _ = self.path.push(atom as u16);
                return true;
            }
        }
        false
    }

    /// Compares a leaf with the best one; gives the length of the path from which the search goes on.
    fn leaf(&mut self, ranks: &Vec<u16, A>) -> usize {
        let order = if self.best.is_empty() {
            Ordering::Less
        } else {
            let traces = self.trace.cmp(&self.best_trace);
            traces.then_with(|| self.compare(ranks, &self.best))
        };
        match order {
            Ordering::Less => {
                self.best = ranks.clone();
                self.best_path = self.path.clone();
                self.best_trace = self.trace.clone();
                self.path.len()
            }
            Ordering::Equal => {
                let generator = automorphism(&self.best, ranks);
                let _ = self.generators.push(generator);
                // The whole branch below the parting of the ways repeats an earlier one.
                let pairs = self.best_path.iter().zip(&self.path);
                let common = pairs.take_while(|(a, b)| a == b).count();
                (common + 1).min(self.path.len())
            }
            Ordering::Greater => self.path.len(),
        }
    }

    fn compare(&self, ranks: &[u16], other: &[u16]) -> Ordering {
        let (atoms, others) = (inverse::<A>(ranks), inverse::<A>(other));
        for (&a, &b) in atoms.iter().zip(&others) {
            let row = self.molecule.code_row(ranks, usize::from(a));
            let order = row.cmp(&self.molecule.code_row(other, usize::from(b)));
            if order != Ordering::Equal {
                return order;
            }
        }
        Ordering::Equal
    }

    fn colours_at(&mut self, depth: usize) -> Vec<u16, A> {
        self.kept.truncate(depth + 1);
        let mut colours = self.kept.last().cloned().unwrap_or_default();
        for level in self.kept.len().saturating_sub(1)..depth {
            if let Some(&atom) = self.path.get(level) {
                self.single_out(&mut colours, usize::from(atom));
                if level + 1 == self.kept.len() {
                    // Deeper levels than fit are worked out again.
                    let _ = self.kept.push(colours.clone());
                }
            }
        }
        colours
    }

    /// Puts an atom before the others of its colour and refines.
    fn single_out(&mut self, colours: &mut Vec<u16, A>, atom: usize) {
        let own = colours.get(atom).copied();
        for (index, colour) in colours.iter_mut().enumerate() {
            if Some(*colour) == own && index != atom {
                *colour += 1;
            }
        }
        self.molecule.refine(colours, true);
        self.refinements += 1;
    }

    /// The lowest atom of each atom's orbit under the automorphisms that keep the path.
    fn orbits(&self) -> Vec<u16, A> {
        let mut lowest: Vec<u16, A> = (0..self.molecule.atoms().len() as u16).collect();
        let keeps = |g: &&Vec<u16, A>| {
            let fixed = |&atom: &u16| g.get(usize::from(atom)) == Some(&atom);
            self.path.iter().all(fixed)
        };
        for generator in self.generators.iter().filter(keeps) {
            for (atom, &image) in generator.iter().enumerate() {
                let one = lowest.get(atom).copied().unwrap_or(0);
                let two = lowest.get(usize::from(image)).copied().unwrap_or(0);
                let (low, high) = (one.min(two), one.max(two));
                if low != high {
                    for slot in lowest.iter_mut().filter(|slot| **slot == high) {
                        *slot = low;
                    }
                }
            }
        }
        lowest
    }
}

/// The colour of the first cell of more than one atom.
fn target_cell(colours: &[u16]) -> Option<u16> {
    let several = |&&colour: &&u16| colours.iter().filter(|&&c| c == colour).count() > 1;
    colours.iter().filter(several).min().copied()
}

/// The atoms by rank.
fn inverse<const A: usize>(ranks: &[u16]) -> Vec<u16, A> {
    let mut atoms: Vec<u16, A> = ranks.iter().copied().collect();
    for (atom, &rank) in ranks.iter().enumerate() {
        if let Some(slot) = atoms.get_mut(usize::from(rank)) {
            *slot = atom as u16;
        }
    }
    atoms
}

/// The exchange of atoms that turns one labelling into another with the same code.
fn automorphism<const A: usize>(from: &[u16], to: &[u16]) -> Vec<u16, A> {
    let images = inverse::<A>(to);
    from.iter()
        .map(|&rank| images.get(usize::from(rank)).copied().unwrap_or(rank))
        .collect()
}
