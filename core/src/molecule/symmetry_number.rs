//! The symmetry number of a molecule whose single bonds turn freely: external times internal.
//!
//! It counts the exchanges of like atoms that turning the molecule, or parts of it about single bonds, can bring about. Such an exchange keeps
//! the order of the four ligands around each tetrahedral atom and the sides of each double bond, and every exchange that does counts. Like
//! ligands that are ends (hydrogens, halogens, methyl groups) are counted atom by atom; the exchanges of the other atoms are gone through, in [`super::exchanges`].
//!
//! It rests on the graph, not on a conformer: a ring counts as it is on average (12 for cyclohexane, whose chair has 6 but two chairs), and
//! unmarked centres that a symmetry could exchange count as having the configuration that allows it. For a few cages with unmarked centres, in
//! which that choice is not free, the number may be off by a small factor: R ln 2 or so, which the uncertainty of an entropy bears.
//!
//! # Source
//! `benson-1976`.

use heapless::Vec;

use super::{Element, Molecule, MoleculeError};

/// Most ligands of an atom, lone pairs apart.
pub(super) const LIGANDS: usize = super::MAX_DEGREE;

/// A ring below this size keeps its double bonds cis whatever is exchanged.
const LARGE_RING: usize = 8;

impl<const A: usize, const B: usize> Molecule<A, B> {
    /// The symmetry number, external times internal: how many exchanges of like atoms rotations can bring about.
    ///
    /// ```
    /// use tautring_core::molecule::{Atom, BondOrder, Element, MoleculeBuilder};
    /// let methyl = Atom { element: Element::C, charge: 0, hydrogens: 3, isotope: 0 };
    /// let mut ethane = MoleculeBuilder::<2, 1>::new();
    /// let (a, b) = (ethane.add_atom(methyl)?, ethane.add_atom(methyl)?);
    /// ethane.add_bond(a, b, BondOrder::Single)?;
    /// // 6 for the molecule as a whole, 3 for one end against the other.
    /// assert_eq!(ethane.finish()?.symmetry_number()?, 18);
    /// # Ok::<(), tautring_core::molecule::MoleculeError>(())
    /// ```
    ///
    /// # Errors
    /// [`MoleculeError::TooSymmetric`] when the exchanges are too many to go through.
    pub fn symmetry_number(&self) -> Result<u64, MoleculeError> {
        let classes = self.symmetry_classes();
        let mut shape = Shape::new(self, &classes);
        let mut exchanges = 1;
        if shape.has_like_cores() {
            // So that the result is the same for every order of the atoms, whatever the configuration of unmarked centres.
            let ranks = self.canonical_order().ranks;
            let rank = |&atom: &u16| ranks.get(usize::from(atom)).copied();
            shape.centres.sort_unstable_by_key(rank);
            let mut steps = 0;
            // Orbit by orbit: where the first centre can go, then the second with the first in its place, and so on.
            for fixed in 0..=shape.centres.len() {
                let (count, images) = shape.enumerate(fixed, &mut steps)?;
                exchanges *= if fixed < shape.centres.len() {
                    images
                } else {
                    count
                };
            }
        }
        let atoms = shape.around_atoms();
        Ok(atoms.saturating_mul(exchanges))
    }
}

/// What the search needs of a molecule.
pub(super) struct Shape<'m, const A: usize, const B: usize> {
    pub(super) molecule: &'m Molecule<A, B>,
    classes: &'m [u16],
    /// Heavy atoms that are no ends, each after one of its neighbours.
    pub(super) cores: Vec<u16, A>,
    /// For each of them the earlier neighbour; the first has none.
    pub(super) parents: Vec<Option<u16>, A>,
    /// Cores whose ligands are four different ones as far as the graph around them tells, and which keep their order.
    pub(super) centres: Vec<u16, A>,
}

impl<'m, const A: usize, const B: usize> Shape<'m, A, B> {
    fn new(molecule: &'m Molecule<A, B>, classes: &'m [u16]) -> Self {
        let mut shape = Self {
            molecule,
            classes,
            cores: Vec::new(),
            parents: Vec::new(),
            centres: Vec::new(),
        };
        let is_core = |a: &usize| shape.is_heavy(*a) && !shape.is_end(*a);
        let Some(first) = (0..molecule.atoms().len()).find(is_core) else {
            return shape;
        };
        shape.enter(first, None);
        let mut at = 0;
        while let Some(&atom) = shape.cores.get(at) {
            for n in molecule.neighbours(usize::from(atom)) {
                let next = usize::from(n.atom);
                if shape.is_heavy(next) && !shape.is_end(next) && !shape.cores.contains(&n.atom) {
                    shape.enter(next, Some(atom));
                }
            }
            at += 1;
        }
        for at in 0..shape.cores.len() {
            let Some(&atom) = shape.cores.get(at) else {
                continue;
            };
            let index = usize::from(atom);
            let ligands = shape.ligands(index).len() + shape.hydrogens(index);
            if shape.is_tetrahedral(index) && !shape.has_pair(index) && ligands > 2 {
                let _ = shape.centres.push(atom);
            }
        }
        shape
    }

    /// Takes note of a core; each atom enters once, so there is room.
    fn enter(&mut self, atom: usize, parent: Option<u16>) {
        let _ = self.cores.push(atom as u16);
        let _ = self.parents.push(parent);
    }

    fn is_heavy(&self, atom: usize) -> bool {
        let atom = self.molecule.atoms().get(atom);
        atom.is_some_and(|a| a.element != Element::H)
    }

    fn hydrogens(&self, atom: usize) -> usize {
        usize::from(self.molecule.total_hydrogens(atom))
    }

    pub(super) fn class(&self, atom: usize) -> Option<u16> {
        self.classes.get(atom).copied()
    }

    fn heavy_degree(&self, atom: usize) -> usize {
        let around = self.molecule.neighbours(atom).iter();
        around
            .filter(|n| self.is_heavy(usize::from(n.atom)))
            .count()
    }

    /// Whether an atom hangs on one other, which has more, by a single bond or without hydrogens.
    fn is_end(&self, atom: usize) -> bool {
        let mut around = self.molecule.neighbours(atom).iter();
        let heavy = around.find(|n| self.is_heavy(usize::from(n.atom)));
        heavy.is_some_and(|n| {
            self.heavy_degree(atom) == 1
                && self.heavy_degree(usize::from(n.atom)) > 1
                && (self.order(usize::from(n.bond)) == 1 || self.hydrogens(atom) == 0)
        })
    }

    /// 1, 2, 3, or 4 for an aromatic bond.
    fn order(&self, bond: usize) -> u8 {
        if self.molecule.is_aromatic_bond(bond) {
            return 4;
        }
        let bond = self.molecule.bonds().get(bond);
        bond.map_or(0, |b| b.order.pairs())
    }

    pub(super) fn order_between(&self, a: usize, b: usize) -> Option<u8> {
        let mut around = self.molecule.neighbours(a).iter();
        let bond = around.find(|n| usize::from(n.atom) == b)?.bond;
        Some(self.order(usize::from(bond)))
    }

    /// Whether the ligands of an atom keep their order in space.
    fn is_tetrahedral(&self, atom: usize) -> bool {
        let around = self.molecule.neighbours(atom);
        let single = around.iter().all(|n| self.order(usize::from(n.bond)) == 1);
        let ligands = self.heavy_degree(atom) + self.hydrogens(atom);
        match self.molecule.atoms().get(atom).map(|a| a.element) {
            Some(Element::C | Element::Si) => single,
            Some(Element::N) => single && ligands > 2,
            Some(Element::P | Element::S) => ligands > 2,
            _ => false,
        }
    }

    /// Whether two ligands of an atom are ends of one kind, so that any order of its ligands can be had.
    pub(super) fn has_pair(&self, atom: usize) -> bool {
        self.hydrogens(atom) > 1 || self.like_ends(atom).any(|(_, number)| number > 1)
    }

    fn ends(&self, atom: usize) -> impl Iterator<Item = usize> {
        let around = self.molecule.neighbours(atom).iter();
        let heavy = around.map(|n| usize::from(n.atom));
        heavy.filter(|&n| self.is_heavy(n) && self.is_end(n))
    }

    /// The classes of an atom's ends, and how many there are of each.
    fn like_ends(&self, atom: usize) -> impl Iterator<Item = (usize, u64)> {
        self.ends(atom).filter_map(move |end| {
            let mut same = self
                .ends(atom)
                .filter(|&other| self.class(other) == self.class(end));
            // Each class once, at its first atom.
            (same.next() == Some(end)).then(|| (end, 1 + same.count() as u64))
        })
    }

    /// The heavy ligands of an atom in a fixed order: cores by index, then ends by class.
    pub(super) fn ligands(&self, atom: usize) -> Vec<usize, LIGANDS> {
        let around = self.molecule.neighbours(atom).iter();
        let mut ligands: Vec<usize, LIGANDS> = around
            .map(|n| usize::from(n.atom))
            .filter(|&n| self.is_heavy(n))
            .collect();
        ligands.sort_unstable_by_key(|&l| {
            (self.is_end(l), self.class(l).filter(|_| self.is_end(l)), l)
        });
        ligands
    }

    /// The same without those that a double bond leads to.
    pub(super) fn sides(&self, atom: usize) -> Vec<usize, LIGANDS> {
        let ligands = self.ligands(atom).into_iter();
        ligands
            .filter(|&l| self.order_between(atom, l) != Some(2))
            .collect()
    }

    fn has_like_cores(&self) -> bool {
        let class = |&atom: &u16| self.class(usize::from(atom));
        let mut earlier = self.cores.iter().enumerate();
        earlier.any(|(at, atom)| {
            let mut before = self.cores.iter().take(at);
            before.any(|other| class(other) == class(atom))
        })
    }

    /// The exchanges of ends, atom by atom: half of them where the order around the atom has to be kept.
    fn around_atoms(&self) -> u64 {
        let mut product: u64 = 1;
        for atom in (0..self.molecule.atoms().len()).filter(|&a| self.is_heavy(a)) {
            let ends = self.like_ends(atom).map(|(_, number)| factorial(number));
            let hydrogens = factorial(self.hydrogens(atom) as u64);
            let all = ends.fold(hydrogens, u64::saturating_mul);
            let half = self.is_tetrahedral(atom) && self.has_pair(atom);
            product = product.saturating_mul(if half { all / 2 } else { all });
        }
        let paired = self
            .rigid_bonds()
            .filter(|ends| ends.iter().any(|&e| self.has_pair(e)));
        paired.fold(product, |product, _| product / 2)
    }

    /// Double bonds, and rows of them, that keep the sides of what stands at their ends: those ends.
    pub(super) fn rigid_bonds(&self) -> impl Iterator<Item = [usize; 2]> {
        let bonds = self.molecule.bonds().iter().enumerate();
        bonds.filter_map(|(index, bond)| {
            let small_ring = self.molecule.bond_ring_sizes(index).smallest();
            if self.order(index) != 2 || small_ring.is_some_and(|size| size < LARGE_RING) {
                return None;
            }
            let [a, b] = bond.atoms.map(usize::from);
            let ends = [self.row_end(b, a), self.row_end(a, b)];
            // A row of several double bonds counts at its lower end.
            let [one, other] = ends;
            let counted = bond.atoms.contains(&(one.min(other) as u16));
            let carries = |end: usize| {
                let others = self.heavy_degree(end) + self.hydrogens(end);
                let planar = !self.is_tetrahedral(end);
                planar && others > 1
            };
            (counted && ends.into_iter().all(carries)).then_some(ends)
        })
    }

    /// The end of a row of double bonds, coming from one atom to the next.
    fn row_end(&self, from: usize, to: usize) -> usize {
        let (mut from, mut to) = (from, to);
        for _ in 0..A {
            let mut onward =
                self.molecule.neighbours(to).iter().filter(|n| {
                    usize::from(n.atom) != from && self.order(usize::from(n.bond)) == 2
                });
            match onward.next() {
                Some(n) if self.molecule.neighbours(to).len() == 2 => {
                    (from, to) = (to, usize::from(n.atom));
                }
                _ => break,
            }
        }
        to
    }
}

fn factorial(n: u64) -> u64 {
    (1..=n).product()
}
