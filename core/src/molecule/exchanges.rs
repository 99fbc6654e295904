//! The exchanges of like atoms that rotations can bring about, gone through one by one.

use heapless::Vec;

use super::MoleculeError;
use super::graph::{Bond, BondOrder, Ligand, TetrahedralStereo};
use super::symmetry_number::{LIGANDS, Shape};

/// Steps after which the search gives up; a cage of twenty like atoms takes some ten thousand.
const MAX_STEPS: u32 = 2_000_000;

impl<const A: usize, const B: usize> Shape<'_, A, B> {
    /// Goes through the exchanges of cores that leave the first `fixed` centres in place: how many there are, and to how many places they
    /// bring the next centre.
    pub(super) fn enumerate(
        &self,
        fixed: usize,
        steps: &mut u32,
    ) -> Result<(u64, u64), MoleculeError> {
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
                // No rotation swaps ligands around an atom that stays where it is.
                _ => to != centre || kept,
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
        let between = |bond: &&Bond| {
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
