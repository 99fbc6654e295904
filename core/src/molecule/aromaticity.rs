//! Aromaticity on the relevant rings and their fused unions, by Hückel's rule.
//!
//! A ring, or a union of up to six fused rings, of 4n + 2 pi electrons is aromatic: all its atoms, and the bonds of its
//! outline. The electrons are those of the atoms that lie in one or two of its rings; an atom inside a union does not count.
//! Unions are tried by their number of rings until every bond of the rings in question is aromatic, so that azulene's two
//! rings are aromatic together and naphthalene's each by itself.

use heapless::Vec;

use super::Element;
use super::graph::{Atom, Bond, MAX_DEGREE, Neighbour};
use super::pi_electrons;
use super::rings::RingSet;

/// Most rings of one union.
const MAX_UNION: u32 = 6;
/// The largest ring that is looked at together with others.
const MAX_FUSED_SIZE: usize = 24;
/// The largest ring in which the lone pair of oxygen or sulfur takes part, unless the atom is in a smaller ring, too: oxonin
/// is a bent polyene, azonine is aromatic.
const MAX_CHALCOGEN_RING: usize = 8;
/// Most rings of conjugated atoms, one per bit; if there are more, only the sizes are looked at that fit in whole.
const MAX_RINGS: usize = u128::BITS as usize;
/// Most unions of one number of rings; if there are more, unions of that number and above are not looked at.
const MAX_UNIONS: usize = 20_000;

/// A set of rings, one bit each.
type Rings = u128;

/// Which atoms and which bonds are aromatic.
pub(super) fn perceive<const A: usize, const B: usize>(
    atoms: &Vec<Atom, A>,
    bonds: &Vec<Bond, B>,
    neighbours: &Vec<Vec<Neighbour, MAX_DEGREE>, A>,
    rings: &RingSet<B>,
) -> (Vec<bool, A>, Vec<bool, B>) {
    let mut aromatic_bonds: Vec<bool, B> = bonds.iter().map(|_| false).collect();
    let mut aromatic_rings: Rings = 0;
    let system = PiSystem::new(atoms, bonds, neighbours, rings);
    for size in 1..=MAX_UNION {
        let open = system.unfinished(bonds, &aromatic_bonds);
        // Marks of one size count together or not at all: the order of the rings must not matter.
        let mut marked_bonds = aromatic_bonds.clone();
        let mut marked_rings = aromatic_rings;
        let mut budget = MAX_UNIONS;
        let all_tried = system.for_each_union(size, open, &mut budget, &mut |union| {
            if system.is_huckel(union) {
                marked_rings |= union;
                for (bond, mark) in bonds.iter().zip(&mut marked_bonds) {
                    *mark |= (system.rings_of_bond(bond) & union).is_power_of_two();
                }
            }
        });
        if !all_tried {
            break;
        }
        aromatic_bonds = marked_bonds;
        aromatic_rings = marked_rings;
    }
    let in_aromatic_ring = |rings: &Rings| rings & aromatic_rings != 0;
    let aromatic_atoms = system.rings_of_atom.iter().map(in_aromatic_ring).collect();
    (aromatic_atoms, aromatic_bonds)
}

/// The rings whose atoms can all take part in a pi system.
struct PiSystem<'rings, const A: usize> {
    rings: Vec<&'rings [u16], MAX_RINGS>,
    /// The pi electrons of each atom.
    electrons: Vec<Option<u8>, A>,
    /// The rings that each atom is in.
    rings_of_atom: Vec<Rings, A>,
    /// The rings that each ring is fused to: they share just one bond.
    fused: Vec<Rings, MAX_RINGS>,
}

impl<'rings, const A: usize> PiSystem<'rings, A> {
    fn new<const B: usize>(
        atoms: &Vec<Atom, A>,
        bonds: &Vec<Bond, B>,
        neighbours: &Vec<Vec<Neighbour, MAX_DEGREE>, A>,
        all_rings: &'rings RingSet<B>,
    ) -> Self {
        let mut electrons: Vec<Option<u8>, A> = atoms.iter().map(|_| None).collect();
        // A relevant ring has no chord, so a bond is in a ring when both its atoms are.
        let is_ring_bond = |ends: [u16; 2]| {
            let holds_both = |ring: &[u16]| ends.iter().all(|atom| ring.contains(atom));
            all_rings.iter().any(holds_both)
        };
        // Small rings come first: an atom is first met in the smallest of its rings.
        for (ring, &atom) in all_rings
            .iter()
            .flat_map(|r| r.iter().map(move |atom| (r, atom)))
        {
            let index = usize::from(atom);
            if let Some(slot @ None) = electrons.get_mut(index) {
                let its = pi_electrons::of_ring_atom(index, atoms, bonds, neighbours, is_ring_bond);
                let chalcogen = atoms
                    .get(index)
                    .is_some_and(|atom| matches!(atom.element, Element::O | Element::S));
                let bent = chalcogen && its == Some(2) && ring.len() > MAX_CHALCOGEN_RING;
                *slot = its.filter(|_| !bent);
            }
        }
        let rings = conjugated(all_rings, &electrons);
        let mut rings_of_atom: Vec<Rings, A> = atoms.iter().map(|_| 0).collect();
        for (number, ring) in rings.iter().enumerate() {
            for &atom in *ring {
                if let Some(set) = rings_of_atom.get_mut(usize::from(atom)) {
                    *set |= 1 << number;
                }
            }
        }
        let mut system = Self {
            fused: rings.iter().map(|_| 0).collect(),
            rings,
            electrons,
            rings_of_atom,
        };
        system.find_fused(bonds);
        system
    }

    fn find_fused(&mut self, bonds: &[Bond]) {
        let numbered = self.rings.iter().enumerate();
        let too_large = numbered
            .filter(|(_, ring)| ring.len() > MAX_FUSED_SIZE)
            .fold(0, |set: Rings, (number, _)| set | 1 << number);
        let mut shared_twice: Vec<Rings, MAX_RINGS> = self.rings.iter().map(|_| 0).collect();
        for bond in bonds {
            let sharing = self.rings_of_bond(bond) & !too_large;
            for ring in members(sharing) {
                let sets = (self.fused.get_mut(ring), shared_twice.get_mut(ring));
                if let (Some(once), Some(twice)) = sets {
                    *twice |= *once & sharing;
                    *once |= sharing;
                }
            }
        }
        for (ring, (once, twice)) in self.fused.iter_mut().zip(&shared_twice).enumerate() {
            *once &= !*twice & !(1 << ring);
        }
    }

    fn rings_of(&self, atom: u16) -> Rings {
        let rings = self.rings_of_atom.get(usize::from(atom));
        rings.copied().unwrap_or(0)
    }

    fn rings_of_bond(&self, bond: &Bond) -> Rings {
        let [first, second] = bond.atoms;
        self.rings_of(first) & self.rings_of(second)
    }

    fn fused_to(&self, ring: usize) -> Rings {
        self.fused.get(ring).copied().unwrap_or(0)
    }

    /// The rings that are fused, directly or through others, to a ring with a bond that is not aromatic yet.
    fn unfinished(&self, bonds: &[Bond], aromatic: &[bool]) -> Rings {
        let open = bonds.iter().zip(aromatic).filter(|(_, mark)| !**mark);
        let mut found = open.fold(0, |set, (bond, _)| set | self.rings_of_bond(bond));
        loop {
            let more = members(found).fold(found, |set, ring| set | self.fused_to(ring));
            if more == found {
                return found;
            }
            found = more;
        }
    }

    /// Whether the union of these rings has 4n + 2 pi electrons.
    fn is_huckel(&self, union: Rings) -> bool {
        let mut electrons = 0;
        for number in members(union) {
            for &atom in self.rings.get(number).copied().unwrap_or(&[]) {
                let its_rings = self.rings_of(atom) & union;
                // Each atom once, with the first of its rings.
                let first = its_rings.trailing_zeros() as usize == number;
                if first && its_rings.count_ones() <= 2 {
                    let its_electrons = self.electrons.get(usize::from(atom));
                    electrons += its_electrons.copied().flatten().map_or(0, u32::from);
                }
            }
        }
        electrons % 4 == 2
    }

    /// Calls `visit` once with every connected set of `size` of the `open` rings; `false` when the budget ran out.
    fn for_each_union(
        &self,
        size: u32,
        open: Rings,
        budget: &mut usize,
        visit: &mut impl FnMut(Rings),
    ) -> bool {
        members(open).all(|lowest| {
            // Sets whose lowest ring this is.
            let allowed = open & (Rings::MAX << lowest);
            let union = 1 << lowest;
            let border = self.fused_to(lowest) & allowed;
            self.grow(
                size,
                union,
                border,
                allowed & !union & !border,
                budget,
                visit,
            )
        })
    }

    /// Grows a union by rings of its `border`; rings in `beyond` were never next to it. So no union comes twice.
    fn grow(
        &self,
        size: u32,
        union: Rings,
        border: Rings,
        beyond: Rings,
        budget: &mut usize,
        visit: &mut impl FnMut(Rings),
    ) -> bool {
        if union.count_ones() == size {
            let Some(rest) = budget.checked_sub(1) else {
                return false;
            };
            *budget = rest;
            visit(union);
            return true;
        }
        let mut left = border;
        members(border).all(|ring| {
            left &= !(1 << ring);
            let reached = self.fused_to(ring) & beyond;
            self.grow(
                size,
                union | 1 << ring,
                left | reached,
                beyond & !reached,
                budget,
                visit,
            )
        })
    }
}

/// The rings of atoms that can all take part in a pi system.
fn conjugated<'rings, const B: usize>(
    rings: &'rings RingSet<B>,
    electrons: &[Option<u8>],
) -> Vec<&'rings [u16], MAX_RINGS> {
    let takes_part = |atom: &u16| matches!(electrons.get(usize::from(*atom)), Some(Some(_)));
    let mut found: Vec<&[u16], MAX_RINGS> = Vec::new();
    for ring in rings.iter().filter(|ring| ring.iter().all(takes_part)) {
        if found.push(ring).is_err() {
            found.retain(|kept| kept.len() < ring.len());
            break;
        }
    }
    found
}

fn members(rings: Rings) -> impl Iterator<Item = usize> {
    let mut left = rings;
    core::iter::from_fn(move || {
        let lowest = left.trailing_zeros();
        left &= left.checked_sub(1)?;
        Some(lowest as usize)
    })
}
