//! A graph while its charges and bond orders are redrawn: what the rules of [`normalise`](super::normalise) ask and do.

use heapless::Vec;

use super::Element;
use super::graph::{Atom, Bond, BondOrder, MAX_DEGREE, Neighbour};
use super::valence::{Valences, shared_pairs};

/// The graph while its charges and bond orders are redrawn.
pub(super) struct Spelling<'a> {
    pub(super) atoms: &'a mut [Atom],
    pub(super) bonds: &'a mut [Bond],
    pub(super) neighbours: &'a [Vec<Neighbour, MAX_DEGREE>],
}

/// A bond as seen from one of its atoms, with the atom at the other end.
#[derive(Clone, Copy)]
pub(super) struct Branch {
    pub(super) atom: usize,
    pub(super) bond: usize,
    pub(super) order: BondOrder,
    pub(super) element: Element,
    pub(super) charge: i8,
}

impl Spelling<'_> {
    /// Whether an atom has a closed-shell valence with this `charge` and `more` pairs than now.
    pub(super) fn fits(&self, atom: usize, charge: i8, more: i8) -> bool {
        let (Some(node), Some(around)) = (self.atoms.get(atom), self.neighbours.get(atom)) else {
            return false;
        };
        shared_pairs(*node, around, self.bonds)
            .checked_add_signed(more)
            .is_some_and(|pairs| Valences::of(node.element, charge).contains(pairs))
    }

    pub(super) fn element(&self, atom: usize) -> Option<Element> {
        self.atoms.get(atom).map(|a| a.element)
    }

    pub(super) fn charge(&self, atom: usize) -> Option<i8> {
        self.atoms.get(atom).map(|a| a.charge)
    }

    pub(super) fn is_neutral(&self, atom: usize) -> bool {
        self.charge(atom) == Some(0)
    }

    /// Neighbours and hydrogens.
    pub(super) fn ligands(&self, atom: usize) -> usize {
        let hydrogens = self.atoms.get(atom).map_or(0, |a| a.hydrogens);
        self.neighbours.get(atom).map_or(0, |n| n.len()) + usize::from(hydrogens)
    }

    pub(super) fn branches(&self, atom: usize) -> impl Iterator<Item = Branch> {
        let around = self.neighbours.get(atom).into_iter().flatten();
        around.filter_map(|n| {
            let (atom, bond) = (usize::from(n.atom), usize::from(n.bond));
            let node = self.atoms.get(atom)?;
            Some(Branch {
                atom,
                bond,
                order: self.bonds.get(bond)?.order,
                element: node.element,
                charge: node.charge,
            })
        })
    }

    /// The branch that holds a negative charge best among those that `accept` lets through.
    pub(super) fn best(
        &self,
        atom: usize,
        accept: impl Fn(&Self, &Branch) -> bool,
    ) -> Option<Branch> {
        self.branches(atom)
            .filter(|branch| accept(self, branch))
            .max_by_key(|branch| self.preference(branch))
    }

    /// How well the atom of a branch holds a negative charge: by electronegativity, then by having few ligands.
    pub(super) fn preference(&self, branch: &Branch) -> (u8, core::cmp::Reverse<usize>) {
        // The order of Pauling's scale; only the order counts.
        let rank = match branch.element {
            Element::F => 9,
            Element::O => 8,
            Element::Cl => 7,
            Element::N => 6,
            Element::Br => 5,
            Element::I => 4,
            Element::S => 3,
            Element::C => 2,
            Element::H | Element::P | Element::B | Element::Si => 1,
        };
        (rank, core::cmp::Reverse(self.ligands(branch.atom)))
    }

    pub(super) fn add_charge(&mut self, atom: usize, more: i8) {
        if let Some(atom) = self.atoms.get_mut(atom) {
            atom.charge = atom.charge.saturating_add(more);
        }
    }

    pub(super) fn raise_order(&mut self, branch: Branch) {
        self.set_order(
            branch.bond,
            match branch.order {
                BondOrder::Single => BondOrder::Double,
                _ => BondOrder::Triple,
            },
        );
    }

    pub(super) fn lower_order(&mut self, branch: Branch) {
        self.set_order(
            branch.bond,
            match branch.order {
                BondOrder::Triple => BondOrder::Double,
                _ => BondOrder::Single,
            },
        );
    }

    /// Sets the order; a configuration that the input stated for another order means nothing any more.
    pub(super) fn set_order(&mut self, bond: usize, order: BondOrder) {
        if let Some(bond) = self.bonds.get_mut(bond) {
            bond.order = order;
            bond.stereo = None;
        }
    }
}
