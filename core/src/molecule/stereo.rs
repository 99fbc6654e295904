//! Stereo marks that say nothing: both configurations are the same molecule, or only one can exist.

use heapless::Vec;

use super::canonical::CanonicalOrder;
use super::centres::CentreKind;
use super::graph::{Ligand, Neighbour, TetrahedralStereo};
use super::molecule::Molecule;

/// Size of the smallest ring in which a trans double bond can be kept: trans-cyclooctene.
const SMALLEST_TRANS: usize = 8;

impl<const A: usize, const B: usize> Molecule<A, B> {
    /// Drops every stereo mark whose inversion gives the same molecule, and marks on double bonds that their ring settles.
    ///
    /// The test is the definition, not a rule of thumb: a mark is inverted alone and the two molecules are compared. So the cis and trans
    /// marks of 1,4-dimethylcyclohexane stay, and those of a CH2 group or of 2-methylbut-2-ene go.
    pub(super) fn drop_idle_stereo(&mut self) {
        for bond in 0..self.bonds().len() {
            if self.is_aromatic_bond(bond) || self.is_settled_by_ring(bond) {
                self.set_bond_stereo(bond, None);
            }
        }
        self.drop_settled_centres();
        // Marks that fall away together may leave others idle.
        while self.drop_idle_once() {}
    }

    /// Whether a double bond is cis because of its ring: below eight atoms always, in a ring of eight unless it is marked as trans.
    ///
    /// trans-Cyclooctene was made, smaller trans-cycloalkenes cannot be kept; nobody marks the cis one.
    fn is_settled_by_ring(&self, bond: usize) -> bool {
        let Some(smallest) = self.bond_ring_sizes(bond).smallest() else {
            return false;
        };
        smallest < SMALLEST_TRANS || (smallest == SMALLEST_TRANS && !self.is_trans_in_ring(bond))
    }

    /// Whether the mark of a double bond makes it trans in a ring of eight.
    fn is_trans_in_ring(&self, bond: usize) -> bool {
        let Some((bond, stereo)) = self.bonds().get(bond).and_then(|b| Some((b, b.stereo?))) else {
            return false;
        };
        let [a, b] = bond.atoms;
        self.rings().iter().any(|ring| {
            let outside = |atom: u16| !ring.contains(&atom);
            let crossed = outside(stereo.first_reference) != outside(stereo.second_reference);
            let holds = ring.len() == SMALLEST_TRANS && ring.contains(&a) && ring.contains(&b);
            holds && stereo.same_side == crossed
        })
    }

    /// Drops the marks that are idle now; whether there were any.
    fn drop_idle_once(&mut self) -> bool {
        let classes = self.symmetry_classes();
        let doubtful = |mark: &TetrahedralStereo| has_ligands_alike(mark, &classes);
        let in_doubt = self.tetrahedral().iter().any(doubtful)
            || (0..self.bonds().len()).any(|bond| self.has_ends_alike(bond, &classes));
        if !in_doubt {
            return false;
        }
        let own = self.canonical_order();
        let centres: Vec<bool, A> = self
            .tetrahedral()
            .iter()
            .enumerate()
            .map(|(mark, stereo)| doubtful(stereo) && self.idle_centre(mark, &own))
            .collect();
        let bonds: Vec<bool, B> = (0..self.bonds().len())
            .map(|bond| self.has_ends_alike(bond, &classes) && self.idle_bond(bond, &own))
            .collect();
        let mut marks = centres.iter();
        self.tetrahedral_mut()
            .retain(|_| marks.next() != Some(&true));
        for (bond, _) in bonds.iter().enumerate().filter(|(_, idle)| **idle) {
            self.set_bond_stereo(bond, None);
        }
        centres.iter().chain(&bonds).any(|&idle| idle)
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

    /// Whether a bond is marked and two neighbours at one end share a symmetry class; where none do, the mark tells.
    fn has_ends_alike(&self, bond: usize, classes: &[u16]) -> bool {
        let Some(bond) = self.bonds().get(bond).filter(|b| b.stereo.is_some()) else {
            return false;
        };
        let class = |n: &Neighbour| classes.get(usize::from(n.atom));
        bond.atoms.iter().any(|&end| {
            let others = || {
                let around = self.neighbours(usize::from(end)).iter();
                around.filter(|n| !bond.atoms.contains(&n.atom))
            };
            let mut firsts = others().enumerate();
            firsts.any(|(i, a)| others().skip(i + 1).any(|b| class(a) == class(b)))
        })
    }

    fn idle_centre(&self, mark: usize, own: &CanonicalOrder<A>) -> bool {
        let mut inverted = self.clone();
        let flip = |mark: &mut TetrahedralStereo| mark.clockwise = !mark.clockwise;
        inverted.tetrahedral_mut().get_mut(mark).map(flip).is_some() && self.is_same(own, &inverted)
    }

    fn idle_bond(&self, bond: usize, own: &CanonicalOrder<A>) -> bool {
        let Some(mut stereo) = self.bonds().get(bond).and_then(|b| b.stereo) else {
            return false;
        };
        stereo.same_side = !stereo.same_side;
        let mut inverted = self.clone();
        inverted.set_bond_stereo(bond, Some(stereo));
        self.is_same(own, &inverted)
    }

    /// Whether two molecules that differ in stereo marks alone are the same.
    fn is_same(&self, own: &CanonicalOrder<A>, other: &Self) -> bool {
        let theirs = other.canonical_order();
        own.atoms.iter().zip(&theirs.atoms).all(|(&a, &b)| {
            self.code_row(&own.ranks, usize::from(a))
                == other.code_row(&theirs.ranks, usize::from(b))
        })
    }
}

/// Whether two ligands share a symmetry class.
///
/// Where all differ the mark tells: told by the classes it is the same for every atom that a symmetry brings there, and inverting one
/// changes how many of them are of each kind.
fn has_ligands_alike(mark: &TetrahedralStereo, classes: &[u16]) -> bool {
    let class = |ligand: &Ligand| match *ligand {
        Ligand::Atom(atom) => classes.get(usize::from(atom)),
        Ligand::Implicit => None,
    };
    let mut ligands = mark.ligands.iter().enumerate();
    ligands.any(|(i, a)| {
        mark.ligands
            .iter()
            .skip(i + 1)
            .any(|b| class(a) == class(b))
    })
}
