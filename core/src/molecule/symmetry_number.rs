//! The symmetry number of a molecule whose single bonds turn freely: external times internal.
//!
//! It counts the exchanges of like atoms that turning the molecule, or parts of it about single bonds, can bring about. Such an exchange keeps
//! the order of the four ligands around each tetrahedral atom and the sides of each double bond, and every exchange that does counts. Like
//! ligands that are ends (hydrogens, halogens, methyl groups) are counted atom by atom; the exchanges of the other atoms are enumerated.
//!
//! It rests on the graph, not on a conformer: a ring counts as it is on average (12 for cyclohexane, whose chair has 6 but two chairs), and
//! unmarked centres that a symmetry could exchange count as having the configuration that allows it.
//!
//! # Source
//! `benson-1976`.

use heapless::Vec;

use super::graph::{BondOrder, Ligand, TetrahedralStereo};
use super::{Element, Molecule, MoleculeError};

/// Steps after which the search gives up; buckminsterfullerene takes some ten thousand.
const MAX_STEPS: u32 = 2_000_000;

/// Most ligands of an atom, lone pairs apart.
const LIGANDS: usize = super::MAX_DEGREE;

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
        let shape = Shape::new(self, &classes);
        let mut exchanges = 1;
        if shape.has_like_cores() {
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
struct Shape<'m, const A: usize, const B: usize> {
    molecule: &'m Molecule<A, B>,
    classes: &'m [u16],
    /// Heavy atoms that are no ends, each after one of its neighbours.
    cores: Vec<u16, A>,
    /// For each of them the earlier neighbour; the first has none.
    parents: Vec<Option<u16>, A>,
    /// Cores whose ligands are four different ones as far as the graph around them tells, and which keep their order.
    centres: Vec<u16, A>,
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

    fn class(&self, atom: usize) -> Option<u16> {
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

    fn order_between(&self, a: usize, b: usize) -> Option<u8> {
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
    fn has_pair(&self, atom: usize) -> bool {
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
    fn ligands(&self, atom: usize) -> Vec<usize, LIGANDS> {
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
    fn sides(&self, atom: usize) -> Vec<usize, LIGANDS> {
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
    fn rigid_bonds(&self) -> impl Iterator<Item = [usize; 2]> {
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

    /// Goes through the exchanges of cores that leave the first `fixed` centres in place: how many there are, and to how many places they
    /// bring the next centre.
    fn enumerate(&self, fixed: usize, steps: &mut u32) -> Result<(u64, u64), MoleculeError> {
        let next_centre = self.centres.get(fixed).copied();
        let mut reached = [false; A];
        let mut count = 0_u64;
        let mut image = [u16::MAX; A];
        let mut tried: Vec<usize, A> = Vec::new();
        let _ = tried.push(0);
        while let Some(depth) = tried.len().checked_sub(1) {
            *steps += 1;
            if *steps > MAX_STEPS {
                return Err(MoleculeError::TooSymmetric { steps: MAX_STEPS });
            }
            let atom = self.cores.get(depth).map_or(0, |&a| usize::from(a));
            let from = tried.last().copied().unwrap_or(0);
            let mut left = (from..).map_while(|at| Some((at, self.candidate(depth, at, &image)?)));
            let Some((at, to)) = left.find(|&(_, to)| self.fits(depth, to, &image)) else {
                tried.pop();
                continue;
            };
            if let Some(last) = tried.last_mut() {
                *last = at + 1;
            }
            if let Some(slot) = image.get_mut(atom) {
                *slot = to;
            }
            if depth + 1 < self.cores.len() {
                let _ = tried.push(0);
            } else if self.is_proper(&image, fixed) {
                count += 1;
                let to = next_centre.and_then(|c| image.get(usize::from(c)));
                if let Some(place) = to.and_then(|&to| reached.get_mut(usize::from(to))) {
                    *place = true;
                }
            }
        }
        let places = reached.iter().filter(|r| **r).count() as u64;
        Ok((count, places))
    }

    /// The place to try as number `at` for the core at a depth of the search.
    fn candidate(&self, depth: usize, at: usize, image: &[u16]) -> Option<u16> {
        match self.parents.get(depth).copied().flatten() {
            Some(parent) => {
                let parent = image.get(usize::from(parent)).copied()?;
                let around = self.molecule.neighbours(usize::from(parent));
                around.get(at).map(|n| n.atom)
            }
            None => self.cores.get(at).copied(),
        }
    }

    /// Whether the core at a depth can go to a place: like it, free, and bonded to the images of its earlier neighbours as it is to them.
    fn fits(&self, depth: usize, to: u16, image: &[u16]) -> bool {
        let Some(&atom) = self.cores.get(depth) else {
            return false;
        };
        let earlier = self.cores.get(..depth).unwrap_or(&[]);
        let (atom, to) = (usize::from(atom), usize::from(to));
        self.class(atom) == self.class(to)
            && earlier.iter().all(|&other| {
                let Some(&place) = image.get(usize::from(other)) else {
                    return false;
                };
                let (other, place) = (usize::from(other), usize::from(place));
                place != to && self.order_between(atom, other) == self.order_between(to, place)
            })
    }

    /// Whether an exchange of cores leaves the first `fixed` centres in place and keeps configurations.
    fn is_proper(&self, image: &[u16], fixed: usize) -> bool {
        let at = |atom: usize| image.get(atom).map(|&to| usize::from(to));
        self.centres.iter().enumerate().all(|(number, &centre)| {
            let centre = usize::from(centre);
            let Some(to) = at(centre) else {
                return false;
            };
            let kept = keeps_order(&self.ligands(centre), &self.ligands(to), image);
            let marks = [centre, to].map(|atom| self.handedness(atom));
            let in_place = number >= fixed || to == centre;
            let ordered = match marks {
                [Some(one), Some(other)] => kept == (one == other),
                _ => number >= fixed || kept,
            };
            in_place && ordered
        }) && self.rigid_bonds().all(|[a, b]| {
            let (Some(to_a), Some(to_b)) = (at(a), at(b)) else {
                return true;
            };
            let in_place = [to_a, to_b] == [a, b] || [to_a, to_b] == [b, a];
            let sides = [[a, b], [to_a, to_b]].map(|ends| self.same_side(ends));
            let kept = |from, to| keeps_order(&self.sides(from), &self.sides(to), image);
            let alike = kept(a, to_a) == kept(b, to_b);
            let paired = self.has_pair(a) || self.has_pair(b);
            match sides {
                _ if paired => true,
                [Some(one), Some(other)] => alike == (one == other),
                _ => alike || !in_place,
            }
        })
    }

    /// On which side the marked configuration of an atom has its ligands, taken in their fixed order.
    fn handedness(&self, atom: usize) -> Option<bool> {
        let of_atom = |mark: &&TetrahedralStereo| usize::from(mark.centre) == atom;
        let mark = self.molecule.tetrahedral().iter().find(of_atom)?;
        let ligands = self.ligands(atom);
        Some(mark.is_clockwise_by(|ligand| match ligand {
            Ligand::Atom(a) => {
                let place = ligands.iter().position(|&l| l == usize::from(a));
                place.map_or(LIGANDS as u32, |p| p as u32)
            }
            Ligand::Implicit => LIGANDS as u32,
        }))
    }

    /// Whether the first ligands at the two ends of a marked double bond stand on one side.
    fn same_side(&self, [a, b]: [usize; 2]) -> Option<bool> {
        let between = |bond: &&super::Bond| {
            bond.order == BondOrder::Double && {
                let ends = bond.atoms.map(usize::from);
                ends == [a, b] || ends == [b, a]
            }
        };
        let bond = self.molecule.bonds().iter().find(between)?;
        let stereo = bond.stereo?;
        let is_first = |end: u16, reference: u16| {
            self.sides(usize::from(end)).first() == Some(&usize::from(reference))
        };
        let [one, two] = bond.atoms;
        let moved = is_first(one, stereo.first_reference) != is_first(two, stereo.second_reference);
        Some(stereo.same_side != moved)
    }
}

/// Whether ligands come to those of the image in the same order, or in one that an even number of swaps makes the same.
fn keeps_order(here: &[usize], there: &[usize], image: &[u16]) -> bool {
    let place = |&ligand: &usize| {
        let goes_to = image.get(ligand).map(|&l| usize::from(l));
        there.iter().position(|&l| Some(l) == goes_to)
    };
    // Ends have no image here: they are alike in number and class, and stand behind the cores.
    let places: Vec<usize, LIGANDS> = here.iter().filter_map(place).collect();
    let inversions: usize = places
        .iter()
        .enumerate()
        .map(|(i, a)| places.iter().skip(i + 1).filter(|b| a > *b).count())
        .sum();
    inversions.is_multiple_of(2)
}

fn factorial(n: u64) -> u64 {
    (1..=n).product()
}
