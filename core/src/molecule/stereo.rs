//! Stereo marks that say nothing: both configurations are the same molecule, or only one can exist.

use core::cmp::Ordering;

use heapless::Vec;

use super::centres::CentreKind;
use super::graph::{Ligand, TetrahedralStereo};
use super::molecule::Molecule;

impl<const A: usize, const B: usize> Molecule<A, B> {
    /// Drops every stereo mark whose inversion gives the same molecule, and marks on double bonds of rings below eight.
    ///
    /// The test is the definition, not a rule of thumb: a mark is inverted alone and the two molecules are compared. So the cis and trans
    /// marks of 1,4-dimethylcyclohexane stay, and those of a CH2 group or of 2-methylbut-2-ene go.
    pub(super) fn drop_idle_stereo(&mut self) {
        for bond in 0..self.bonds().len() {
            let small = self.bond_ring_sizes(bond).smallest().is_some_and(|n| n < 8);
            if small || self.is_aromatic_bond(bond) {
                self.set_bond_stereo(bond, None);
            }
        }
        self.drop_settled_centres();
        // Marks that fall away together may leave others idle.
        loop {
            let centres: Vec<bool, A> = (0..self.tetrahedral().len())
                .map(|mark| self.idle_centre(mark))
                .collect();
            let bonds: Vec<bool, B> = (0..self.bonds().len())
                .map(|bond| self.idle_bond(bond))
                .collect();
            if !centres.iter().chain(&bonds).any(|&idle| idle) {
                return;
            }
            let mut marks = centres.iter();
            self.tetrahedral_mut()
                .retain(|_| marks.next() != Some(&true));
            for (bond, _) in bonds.iter().enumerate().filter(|(_, idle)| **idle) {
                self.set_bond_stereo(bond, None);
            }
        }
    }

    /// Drops marks that the rings settle: of bridgeheads, unless a free centre of the same ring system is told relative to them.
    fn drop_settled_centres(&mut self) {
        if self.tetrahedral().is_empty() {
            return;
        }
        let centres = self.possible_centres();
        let systems = self.ring_systems();
        let system = |atom: u16| systems.of_atom(usize::from(atom));
        let settled = |mark: &TetrahedralStereo| {
            let listed = |&(atom, _): &(u16, CentreKind)| atom == mark.centre;
            let free = |&(atom, kind): &(u16, CentreKind)| {
                kind != CentreKind::Fixed && system(atom) == system(mark.centre)
            };
            self.is_rigid_junction(usize::from(mark.centre))
                && (!centres.iter().any(listed) || !centres.iter().any(free))
        };
        let keep: Vec<bool, A> = self.tetrahedral().iter().map(|m| !settled(m)).collect();
        let mut keep = keep.iter();
        self.tetrahedral_mut()
            .retain(|_| keep.next() == Some(&true));
    }

    fn idle_centre(&self, mark: usize) -> bool {
        let implicit = |mark: &TetrahedralStereo| {
            mark.ligands
                .iter()
                .filter(|ligand| **ligand == Ligand::Implicit)
                .count()
        };
        if self.tetrahedral().get(mark).map(implicit) > Some(1) {
            return true;
        }
        let mut inverted = self.clone();
        let flip = |mark: &mut TetrahedralStereo| mark.clockwise = !mark.clockwise;
        inverted.tetrahedral_mut().get_mut(mark).map(flip).is_some() && self.same_as(&inverted)
    }

    fn idle_bond(&self, bond: usize) -> bool {
        let Some(mut stereo) = self.bonds().get(bond).and_then(|b| b.stereo) else {
            return false;
        };
        stereo.same_side = !stereo.same_side;
        let mut inverted = self.clone();
        inverted.set_bond_stereo(bond, Some(stereo));
        self.same_as(&inverted)
    }

    /// Whether two molecules that differ in stereo marks alone are the same.
    fn same_as(&self, other: &Self) -> bool {
        let (ours, theirs) = (self.canonical_order(), other.canonical_order());
        ours.atoms.iter().zip(&theirs.atoms).all(|(&a, &b)| {
            let row = self.code_row(&ours.ranks, usize::from(a));
            row.cmp(&other.code_row(&theirs.ranks, usize::from(b))) == Ordering::Equal
        })
    }
}
