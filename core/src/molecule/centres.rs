//! Which atoms can be tetrahedral stereocentres.
//!
//! Told from symmetry classes, which overlooks a centre that differs from its mirror image only through the configuration of two
//! otherwise equal branches.

use heapless::Vec;

use super::graph::{BondOrder, MAX_DEGREE};
use super::molecule::Molecule;

/// Two rings fused at a bond are joined cis without saying so up to this sum of their sizes; trans-bicyclo\[4.1.0\]heptane (9) was made.
const ALWAYS_CIS: usize = 8;

/// How an atom can be a tetrahedral centre.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum CentreKind {
    /// Four different ligands.
    Different,
    /// Two ligands alike that close a ring: cis or trans to another centre of that ring.
    AcrossRing,
    /// A bridgehead or a fusion of small rings whose four ligands differ; the rings leave its configuration no choice.
    Fixed,
}

impl<const A: usize, const B: usize> Molecule<A, B> {
    /// The atoms that can be tetrahedral centres, by index.
    pub fn possible_centres(&self) -> Vec<(u16, CentreKind), A> {
        let classes = self.symmetry_classes();
        let mut centres: Vec<(u16, CentreKind), A> = (0..self.atoms().len())
            .filter_map(|atom| Some((atom as u16, self.centre_kind(&classes, atom)?)))
            .collect();
        // An atom that is struck out may have been the only partner of another.
        loop {
            let kept: Vec<(u16, CentreKind), A> = centres
                .iter()
                .filter(|&&(atom, kind)| {
                    kind != CentreKind::AcrossRing || self.has_partner(&classes, &centres, atom)
                })
                .copied()
                .collect();
            if kept.len() == centres.len() {
                return kept;
            }
            centres = kept;
        }
    }

    /// Whether a ring through one of an atom's two like ligands holds another centre: cis or trans to what, otherwise?
    ///
    /// The other ring of a spiro atom does not count: that of a spiro\[2.2\]pentane with one substituent is no centre. Like ligands may
    /// also lie in two fused rings, as in decalin, whose junction atoms are each other's partners.
    fn has_partner(&self, classes: &[u16], centres: &[(u16, CentreKind)], atom: u16) -> bool {
        let around = self.neighbours(usize::from(atom));
        let class = |ligand: u16| classes.get(usize::from(ligand));
        let has_like = |ligand: u16| {
            let mut others = around.iter().filter(|n| n.atom != ligand);
            others.any(|n| class(n.atom) == class(ligand))
        };
        let through_like = |ring: &[u16]| {
            let mut branches = around.iter().filter(|n| ring.contains(&n.atom));
            ring.contains(&atom) && branches.any(|n| has_like(n.atom))
        };
        let other = |ring: &[u16]| centres.iter().any(|&(a, _)| a != atom && ring.contains(&a));
        let mut rings = self.rings().iter();
        rings.any(|ring| through_like(ring) && other(ring))
    }

    fn centre_kind(&self, classes: &[u16], atom: usize) -> Option<CentreKind> {
        let a = self.atoms().get(atom)?;
        let neighbours = self.neighbours(atom);
        let single = |bond: u16| {
            let bond = self.bonds().get(usize::from(bond));
            bond.is_some_and(|b| b.order == BondOrder::Single)
        };
        let four = neighbours.len() + usize::from(a.hydrogens) == 4 && a.hydrogens < 2;
        if !four || !neighbours.iter().all(|n| single(n.bond)) {
            return None;
        }
        let ligands: Vec<(Option<&u16>, bool), MAX_DEGREE> = neighbours
            .iter()
            .map(|n| {
                let ring = !self.bond_ring_sizes(usize::from(n.bond)).is_empty();
                (classes.get(usize::from(n.atom)), ring)
            })
            .collect();
        let (mut alike, mut alike_in_ring) = (0, 0);
        for (i, (class, ring)) in ligands.iter().enumerate() {
            for (other, other_ring) in ligands.iter().skip(i + 1) {
                alike += usize::from(class == other);
                alike_in_ring += usize::from(class == other && *ring && *other_ring);
            }
        }
        match (alike, alike_in_ring, self.is_rigid_junction(atom)) {
            (0, _, true) => Some(CentreKind::Fixed),
            (0, _, false) => Some(CentreKind::Different),
            (1, 1, false) => Some(CentreKind::AcrossRing),
            _ => None,
        }
    }

    /// Whether rings meet at an atom in a way that settles its configuration: all but two larger rings that share one bond.
    pub(super) fn is_rigid_junction(&self, atom: usize) -> bool {
        let in_ring = |bond: u16| !self.bond_ring_sizes(usize::from(bond)).is_empty();
        let ring_bonds = self
            .neighbours(atom)
            .iter()
            .filter(|n| in_ring(n.bond))
            .count();
        let holds = |ring: &&[u16]| ring.iter().any(|&a| usize::from(a) == atom);
        let mut rings = self.rings().iter().filter(holds);
        match (rings.next(), rings.next(), rings.next()) {
            _ if ring_bonds < 3 => false,
            (Some(one), Some(two), None) => {
                let shared = one.iter().filter(|a| two.contains(a)).count();
                shared > 2 || (shared == 2 && one.len() + two.len() <= ALWAYS_CIS)
            }
            _ => true,
        }
    }
}
