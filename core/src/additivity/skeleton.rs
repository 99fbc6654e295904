//! What the levels count on: heavy atoms with their types, hydrogens and ring memberships.

use heapless::Vec;

use crate::molecule::{Atom, BondOrder, Element, Molecule, Neighbour};

/// Rings of this size and larger are one kind of environment; their sizes tell apart in the smooth levels.
const LARGE_RING: usize = 7;

/// Type of an atom: element, charge, aromaticity and the partners of its multiple bonds, packed into 16 bits.
///
/// A carbonyl carbon, an olefinic carbon, a nitrile carbon and an aromatic carbon are four types; an aromatic bond does not
/// count as a multiple bond.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub(super) struct AtomType(u16);

impl AtomType {
    fn of<const A: usize, const B: usize>(
        molecule: &Molecule<A, B>,
        index: usize,
        atom: Atom,
    ) -> Self {
        let mut partners = [0_u16; 2];
        let mut triple = 0;
        let multiple = molecule.neighbours(index).iter().filter_map(|n| {
            let order = molecule.bonds().get(usize::from(n.bond))?.order;
            let localised = !molecule.is_aromatic_bond(usize::from(n.bond));
            let partner = molecule.atoms().get(usize::from(n.atom))?.element as u16 + 1;
            (localised && order != BondOrder::Single).then_some((order, partner))
        });
        for (order, partner) in multiple {
            if order == BondOrder::Triple {
                triple = 1;
            }
            // The two largest partners, in descending order: independent of the order of the bonds.
            let [first, second] = partners;
            partners = if partner > first {
                [partner, first]
            } else {
                [first, second.max(partner)]
            };
        }
        let [first, second] = partners;
        let charge = atom.charge.clamp(-1, 1) + 1;
        Self(
            atom.element as u16
                | (charge as u16) << 4
                | u16::from(molecule.is_aromatic_atom(index)) << 6
                | first << 7
                | second << 11
                | triple << 15,
        )
    }

    /// The type as a token of a key.
    pub(super) fn token(self) -> u64 {
        u64::from(self.0)
    }

    /// The class as a token of a key: element, charge, aromatic or not, and whether there are double and triple bonds.
    pub(super) fn class_token(self) -> u64 {
        let double = u16::from(self.0 >> 7 & 0xf != 0) << 7;
        let second = u16::from(self.0 >> 11 & 0xf != 0) << 8;
        u64::from(self.0 & 0x807f | double | second)
    }

    /// The element alone, as a token of a key.
    pub(super) fn element_token(self) -> u64 {
        u64::from(self.0 & 0xf)
    }

    /// Whether the atom has neither multiple bonds nor aromatic ones.
    pub(super) fn is_saturated(self) -> bool {
        self.0 >> 6 == 0
    }
}

/// One heavy atom as the levels see it.
#[derive(Clone, Copy, Debug)]
pub(super) struct Site {
    /// Its type.
    pub kind: AtomType,
    /// Hydrogens on it.
    pub hydrogens: u8,
    /// Heavy neighbours.
    pub degree: u8,
    /// Sizes of its non-aromatic rings in ascending order, as digits to base 64; 0 outside such rings.
    pub rings: u64,
    /// How many aromatic rings it is in.
    pub aromatic_rings: u8,
}

/// A molecule prepared for counting.
pub(super) struct Skeleton<'m, const A: usize, const B: usize> {
    pub(super) molecule: &'m Molecule<A, B>,
    sites: Vec<Option<Site>, A>,
    bond_rings: Vec<u64, B>,
}

impl<'m, const A: usize, const B: usize> Skeleton<'m, A, B> {
    /// Prepares a molecule: hydrogens that are nodes of the graph are folded into counts.
    pub(super) fn new(molecule: &'m Molecule<A, B>) -> Self {
        let mut sites: Vec<Option<Site>, A> = molecule
            .atoms()
            .iter()
            .enumerate()
            .map(|(index, atom)| {
                (atom.element != Element::H).then(|| Site {
                    kind: AtomType::of(molecule, index, *atom),
                    hydrogens: molecule.total_hydrogens(index),
                    degree: 0,
                    rings: 0,
                    aromatic_rings: 0,
                })
            })
            .collect();
        let mut bond_rings: Vec<u64, B> = molecule.bonds().iter().map(|_| 0).collect();
        for ring in molecule.rings().iter() {
            let size = ring.len().min(LARGE_RING) as u64;
            let aromatic = is_aromatic_ring(molecule, ring);
            for (atom, bond) in ring_bonds(molecule, ring) {
                if let Some(Some(site)) = sites.get_mut(atom) {
                    if aromatic {
                        site.aromatic_rings += 1;
                    } else {
                        site.rings = site.rings << 6 | size;
                    }
                }
                if let (false, Some(rings)) = (aromatic, bond_rings.get_mut(bond)) {
                    *rings = *rings << 6 | size;
                }
            }
        }
        let mut skeleton = Self {
            molecule,
            sites,
            bond_rings,
        };
        for index in 0..molecule.atoms().len() {
            let degree = skeleton.heavy_neighbours(index).count() as u8;
            if let Some(Some(site)) = skeleton.sites.get_mut(index) {
                site.degree = degree;
            }
        }
        skeleton
    }

    /// The heavy atoms with their indices.
    pub(super) fn sites(&self) -> impl Iterator<Item = (usize, Site)> {
        self.sites
            .iter()
            .enumerate()
            .filter_map(|(i, s)| s.map(|s| (i, s)))
    }

    /// One heavy atom.
    pub(super) fn site(&self, atom: usize) -> Option<Site> {
        self.sites.get(atom).copied().flatten()
    }

    /// The heavy neighbours of an atom.
    pub(super) fn heavy_neighbours(&self, atom: usize) -> impl Iterator<Item = (Neighbour, Site)> {
        self.molecule
            .neighbours(atom)
            .iter()
            .filter_map(|&n| Some((n, self.site(usize::from(n.atom))?)))
    }

    /// The bonds between heavy atoms: index, the two atoms, the two sites.
    pub(super) fn bonds(&self) -> impl Iterator<Item = (usize, [usize; 2], [Site; 2])> {
        self.molecule
            .bonds()
            .iter()
            .enumerate()
            .filter_map(|(i, bond)| {
                let [a, b] = bond.atoms.map(usize::from);
                Some((i, [a, b], [self.site(a)?, self.site(b)?]))
            })
    }

    /// Order of a bond as a token: 1, 2, 3, or 4 for aromatic.
    pub(super) fn order_token(&self, bond: usize) -> u64 {
        if self.molecule.is_aromatic_bond(bond) {
            4
        } else {
            self.molecule
                .bonds()
                .get(bond)
                .map_or(0, |b| u64::from(b.order.pairs()))
        }
    }

    /// Sizes of a bond's non-aromatic rings, as digits to base 64; 0 outside such rings.
    pub(super) fn bond_rings(&self, bond: usize) -> u64 {
        self.bond_rings.get(bond).copied().unwrap_or(0)
    }

    /// How many heteroatoms there are among some atoms and the partners of their double and triple bonds: 0, 1, or 2 for several.
    ///
    /// So many does a feature name that tells those atoms' types.
    pub(super) fn heteroatoms(&self, atoms: &[usize]) -> usize {
        let partners = atoms.iter().flat_map(|&atom| {
            self.heavy_neighbours(atom)
                .filter(|(n, _)| matches!(self.order_token(usize::from(n.bond)), 2 | 3))
                .map(|(n, _)| usize::from(n.atom))
        });
        self.distinct_heteroatoms(atoms.iter().copied().chain(partners))
    }

    /// How many heteroatoms there are among some atoms: 0, 1, or 2 for several. So many does a feature name that tells their classes only.
    pub(super) fn heteroatoms_among(&self, atoms: &[usize]) -> usize {
        self.distinct_heteroatoms(atoms.iter().copied())
    }

    fn distinct_heteroatoms(&self, atoms: impl Iterator<Item = usize>) -> usize {
        let mut first = None;
        for atom in atoms {
            let carbon = self
                .site(atom)
                .is_none_or(|site| site.kind.element_token() == Element::C as u64);
            if carbon || first == Some(atom) {
                continue;
            }
            if first.is_some() {
                return 2;
            }
            first = Some(atom);
        }
        usize::from(first.is_some())
    }

    /// Whether a bond is in a ring of any kind.
    pub(super) fn is_ring_bond(&self, bond: usize) -> bool {
        !self.molecule.bond_ring_sizes(bond).is_empty()
    }
}

/// Whether a ring is aromatic: every atom is, and every bond but for at most one, as the shared bond of azulene.
///
/// The five-membered ring of fluoranthene, with two bonds between aromatic parts, is none.
pub(super) fn is_aromatic_ring<const A: usize, const B: usize>(
    molecule: &Molecule<A, B>,
    ring: &[u16],
) -> bool {
    let localised = ring_bonds(molecule, ring)
        .filter(|&(_, bond)| !molecule.is_aromatic_bond(bond))
        .count();
    localised <= 1
        && ring
            .iter()
            .all(|&atom| molecule.is_aromatic_atom(usize::from(atom)))
}

/// Each atom of a ring with the bond that leads to the next one.
pub(super) fn ring_bonds<const A: usize, const B: usize>(
    molecule: &Molecule<A, B>,
    ring: &[u16],
) -> impl Iterator<Item = (usize, usize)> {
    ring.iter()
        .zip(ring.iter().cycle().skip(1))
        .filter_map(|(&atom, &next)| {
            let atom = usize::from(atom);
            let bond = molecule
                .neighbours(atom)
                .iter()
                .find(|n| n.atom == next)?
                .bond;
            Some((atom, usize::from(bond)))
        })
}
