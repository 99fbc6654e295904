//! A canonical order of the atoms: the same for every order in which they were given.
//!
//! Colour refinement splits the atoms by their surroundings; where atoms stay alike, one of them is singled out and refinement goes on,
//! and of all labellings reached this way the smallest code wins. The code holds bonds and stereo marks, so that the order is exact, not a
//! hash of colours: cubane and cuneane differ. Automorphisms found on the way cut off branches that could only repeat an earlier code, so
//! that cages of high symmetry take about as many leaves as their symmetry has generators.
//!
//! # Source
//! `mckay-1981`.

use core::cmp::Ordering;

use heapless::Vec;

use super::graph::{Bond, BondOrder, Ligand, MAX_DEGREE, TetrahedralStereo};
use super::molecule::Molecule;

/// Most refinements before the search settles for the best order so far.
const MAX_REFINEMENTS: usize = 20_000;

/// Most automorphisms that are remembered; more would only save time.
const MAX_GENERATORS: usize = 48;

/// What distinguishes an atom at one step of the refinement: its colour and, sorted, its bonds and neighbours' colours.
type Surroundings = (u16, [u32; MAX_DEGREE]);

/// One atom's row in the code of a labelled molecule; the rows by rank tell the molecule completely, but for elements and charges.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct CodeRow {
    /// One entry for each neighbour, ascending, then `u32::MAX`: its rank times 256, plus 16 times the bond (1, 2, 3, aromatic 4), plus 1
    /// or 2 for the configuration of a double bond.
    pub bonds: [u32; MAX_DEGREE],
    /// 1 or 2 for the configuration of a tetrahedral centre, 0 where none is stated.
    pub centre: u8,
}

/// The canonical order of a molecule's atoms.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct CanonicalOrder<const A: usize> {
    /// Atom indices by rank.
    pub atoms: Vec<u16, A>,
    /// Rank of each atom.
    pub ranks: Vec<u16, A>,
    /// Whether the search was complete; if not, another order of the input may give another rank.
    pub exact: bool,
}

impl<const A: usize, const B: usize> Molecule<A, B> {
    /// Ranks the atoms in an order that does not depend on the order of the input.
    ///
    /// Elements, charges, hydrogens, isotopes, bonds (aromatic ones alike) and stereo marks all count.
    ///
    /// ```
    /// use tautring_core::molecule::{Atom, BondOrder, Element, MoleculeBuilder};
    /// let atom = |element, hydrogens| Atom { element, charge: 0, hydrogens, isotope: 0 };
    /// let mut methanol = MoleculeBuilder::<4, 4>::new();
    /// let o = methanol.add_atom(atom(Element::O, 1))?;
    /// let c = methanol.add_atom(atom(Element::C, 3))?;
    /// methanol.add_bond(o, c, BondOrder::Single)?;
    /// let order = methanol.finish()?.canonical_order();
    /// assert_eq!(order.atoms.as_slice(), [1, 0]);
    /// # Ok::<(), tautring_core::molecule::MoleculeError>(())
    /// ```
    pub fn canonical_order(&self) -> CanonicalOrder<A> {
        Search::new(self).run()
    }

    /// Classes of atoms with the same surroundings; stereo marks do not count.
    ///
    /// Atoms that a symmetry exchanges share a class. In rare regular graphs atoms that no symmetry exchanges share one too.
    pub fn symmetry_classes(&self) -> Vec<u16, A> {
        let mut colours = self.initial_colours(false);
        self.refine(&mut colours, false);
        colours
    }

    fn initial_colours(&self, stereo: bool) -> Vec<u16, A> {
        let key = |atom: usize| {
            let marked = stereo && self.tetrahedral_mark(atom).is_some();
            self.atoms().get(atom).map(|a| {
                (
                    a.element,
                    a.charge,
                    a.hydrogens,
                    a.isotope,
                    self.neighbours(atom).len(),
                    self.is_aromatic_atom(atom),
                    marked,
                )
            })
        };
        let keys: Vec<_, A> = (0..self.atoms().len()).map(key).collect();
        let colour = |own| keys.iter().filter(|other| *other < own).count() as u16;
        keys.iter().map(colour).collect()
    }

    /// Splits colours until atoms of one colour have the same surroundings.
    fn refine(&self, colours: &mut Vec<u16, A>, stereo: bool) {
        let mut cells = count_cells(colours);
        while cells < colours.len() {
            let mut order: Vec<(Surroundings, u16), A> = (0..colours.len())
                .map(|atom| (self.surroundings(colours, atom, stereo), atom as u16))
                .collect();
            order.sort_unstable();
            let mut previous = None;
            let mut colour = 0;
            for (rank, (own, atom)) in order.iter().enumerate() {
                if previous != Some(own) {
                    colour = rank as u16;
                    previous = Some(own);
                }
                if let Some(slot) = colours.get_mut(usize::from(*atom)) {
                    *slot = colour;
                }
            }
            let now = count_cells(colours);
            if now == cells {
                return;
            }
            cells = now;
        }
    }

    fn surroundings(&self, colours: &[u16], atom: usize, stereo: bool) -> Surroundings {
        let mut around = [u32::MAX; MAX_DEGREE];
        for (slot, n) in around.iter_mut().zip(self.neighbours(atom)) {
            let bond = usize::from(n.bond);
            let colour = colours.get(usize::from(n.atom)).copied().unwrap_or(0);
            let marked = stereo && self.bonds().get(bond).is_some_and(|b| b.stereo.is_some());
            *slot = self.bond_kind(bond) << 17 | u32::from(marked) << 16 | u32::from(colour);
        }
        around.sort_unstable();
        (colours.get(atom).copied().unwrap_or(0), around)
    }

    fn bond_kind(&self, bond: usize) -> u32 {
        if self.is_aromatic_bond(bond) {
            return 4;
        }
        match self.bonds().get(bond).map(|b| b.order) {
            Some(BondOrder::Double) => 2,
            Some(BondOrder::Triple) => 3,
            _ => 1,
        }
    }

    fn tetrahedral_mark(&self, atom: usize) -> Option<&TetrahedralStereo> {
        self.tetrahedral()
            .iter()
            .find(|mark| usize::from(mark.centre) == atom)
    }

    /// The row of the code that belongs to one atom when the atoms have these ranks.
    pub fn code_row(&self, ranks: &[u16], atom: usize) -> CodeRow {
        let rank = |atom: u16| ranks.get(usize::from(atom)).copied().unwrap_or(0);
        let mut bonds = [u32::MAX; MAX_DEGREE];
        for (slot, n) in bonds.iter_mut().zip(self.neighbours(atom)) {
            let bond = usize::from(n.bond);
            let side = self
                .bonds()
                .get(bond)
                .map_or(0, |b| self.double_bond_code(b, &rank));
            *slot = u32::from(rank(n.atom)) << 8 | self.bond_kind(bond) << 4 | side;
        }
        bonds.sort_unstable();
        let centre = self
            .tetrahedral_mark(atom)
            .map_or(0, |mark| tetrahedral_code(mark, &rank));
        CodeRow { bonds, centre }
    }

    /// 1 or 2 for the two configurations, told by the lowest-ranking neighbour at each end.
    fn double_bond_code(&self, bond: &Bond, rank: &impl Fn(u16) -> u16) -> u32 {
        let Some(stereo) = bond.stereo else { return 0 };
        let [a, b] = bond.atoms;
        let lowest = |end: u16, other: u16| {
            self.neighbours(usize::from(end))
                .iter()
                .map(|n| n.atom)
                .filter(|&atom| atom != other)
                .min_by_key(|&atom| rank(atom))
        };
        let moved = (lowest(a, b) != Some(stereo.first_reference))
            != (lowest(b, a) != Some(stereo.second_reference));
        if stereo.same_side == moved { 1 } else { 2 }
    }
}

/// 1 or 2 for the two configurations, told by the ligands in order of rank, implicit ones first.
fn tetrahedral_code(mark: &TetrahedralStereo, rank: &impl Fn(u16) -> u16) -> u8 {
    let keys = mark.ligands.map(|ligand| match ligand {
        Ligand::Implicit => 0,
        Ligand::Atom(atom) => u32::from(rank(atom)) + 1,
    });
    let inversions = keys
        .iter()
        .enumerate()
        .map(|(i, a)| keys.iter().skip(i + 1).filter(|b| a > *b).count())
        .sum::<usize>();
    if mark.clockwise == inversions.is_multiple_of(2) {
        1
    } else {
        2
    }
}

fn count_cells(colours: &[u16]) -> usize {
    // A cell's colour is the number of atoms before it, so that each cell has one atom whose colour equals its place.
    (0..colours.len())
        .filter(|&place| colours.iter().any(|&c| usize::from(c) == place))
        .count()
}

/// The search tree, walked depth first; a node is the list of atoms singled out on the way to it.
struct Search<'a, const A: usize, const B: usize> {
    molecule: &'a Molecule<A, B>,
    root: Vec<u16, A>,
    path: Vec<u16, A>,
    first: Vec<u16, A>,
    best: Vec<u16, A>,
    first_path: Vec<u16, A>,
    best_path: Vec<u16, A>,
    generators: Vec<Vec<u16, A>, MAX_GENERATORS>,
    refinements: usize,
}

impl<'a, const A: usize, const B: usize> Search<'a, A, B> {
    fn new(molecule: &'a Molecule<A, B>) -> Self {
        let mut root = molecule.initial_colours(true);
        molecule.refine(&mut root, true);
        Self {
            molecule,
            root,
            path: Vec::new(),
            first: Vec::new(),
            best: Vec::new(),
            first_path: Vec::new(),
            best_path: Vec::new(),
            generators: Vec::new(),
            refinements: 0,
        }
    }

    fn run(mut self) -> CanonicalOrder<A> {
        loop {
            let colours = self.descend();
            let keep = self.leaf(&colours);
            self.path.truncate(keep);
            if self.refinements > MAX_REFINEMENTS || !self.advance() {
                break;
            }
        }
        let exact = self.refinements <= MAX_REFINEMENTS;
        let mut atoms: Vec<u16, A> = self.best.clone();
        for (atom, &rank) in self.best.iter().enumerate() {
            if let Some(slot) = atoms.get_mut(usize::from(rank)) {
                *slot = atom as u16;
            }
        }
        CanonicalOrder {
            atoms,
            ranks: self.best,
            exact,
        }
    }

    /// Follows the first branch at every level down to a leaf and gives its colours, which are ranks.
    fn descend(&mut self) -> Vec<u16, A> {
        let mut colours = self.colours_at(self.path.len());
        while let Some(cell) = target_cell(&colours) {
            let Some(atom) = colours.iter().position(|&c| c == cell) else {
                break;
            };
            // A path is never longer than the number of atoms.
            let _ = self.path.push(atom as u16);
            self.single_out(&mut colours, atom);
        }
        colours
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

    /// Compares a leaf with the first and the best one; gives the length of the path from which the search goes on.
    fn leaf(&mut self, ranks: &Vec<u16, A>) -> usize {
        if self.best.is_empty() {
            self.first = ranks.clone();
            self.best = ranks.clone();
            self.first_path = self.path.clone();
            self.best_path = self.path.clone();
            return self.path.len();
        }
        let to_best = self.compare(ranks, &self.best);
        let twin = if to_best == Ordering::Equal {
            Some((&self.best, &self.best_path))
        } else if self.compare(ranks, &self.first) == Ordering::Equal {
            Some((&self.first, &self.first_path))
        } else {
            None
        };
        if let Some((other, path)) = twin {
            let common = path
                .iter()
                .zip(&self.path)
                .take_while(|(a, b)| a == b)
                .count();
            let generator = automorphism(other, ranks);
            let _ = self.generators.push(generator);
            // The whole branch below the parting of the ways repeats an earlier one.
            return (common + 1).min(self.path.len());
        }
        if to_best == Ordering::Less {
            self.best = ranks.clone();
            self.best_path = self.path.clone();
        }
        self.path.len()
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
        let mut colours = self.root.clone();
        for level in 0..depth {
            if let Some(&atom) = self.path.get(level) {
                self.single_out(&mut colours, usize::from(atom));
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
        let mut lowest: Vec<u16, A> = (0..self.root.len() as u16).collect();
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
