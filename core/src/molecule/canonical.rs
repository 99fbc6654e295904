//! A canonical order of the atoms: the same for every order in which they were given.
//!
//! Here are its parts: colours that tell atoms apart by their surroundings, and the code by which labellings are compared. The code holds
//! bonds and stereo marks, so that the order is exact, not a hash of colours: cubane and cuneane differ. [`super::canonical_search`] looks
//! for the labelling with the smallest code.

use heapless::Vec;

use super::canonical_search::Search;
use super::graph::{Bond, BondOrder, Ligand, MAX_DEGREE, TetrahedralStereo};
use super::molecule::Molecule;

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

    pub(super) fn initial_colours(&self, stereo: bool) -> Vec<u16, A> {
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
    pub(super) fn refine(&self, colours: &mut Vec<u16, A>, stereo: bool) {
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

    /// A digest of a colouring: its cells, and the rows of all atoms that are alone in their cells together with their neighbours.
    pub(super) fn digest(&self, colours: &[u16]) -> u64 {
        let mut sizes = [0_u16; A];
        for &colour in colours {
            if let Some(size) = sizes.get_mut(usize::from(colour)) {
                *size += 1;
            }
        }
        let colour = |atom: usize| colours.get(atom).copied().unwrap_or(0);
        let alone = |atom: usize| sizes.get(usize::from(colour(atom))) == Some(&1);
        (0..colours.len())
            .map(|atom| {
                let mut digest = stir(0, u64::from(colour(atom)));
                let around = self.neighbours(atom);
                if alone(atom) && around.iter().all(|n| alone(usize::from(n.atom))) {
                    let row = self.code_row(colours, atom);
                    digest = stir(digest, u64::from(row.centre));
                    for code in row.bonds {
                        digest = stir(digest, u64::from(code));
                    }
                }
                digest
            })
            // A sum does not depend on the order of the atoms.
            .fold(0, u64::wrapping_add)
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

/// Stirs a digest with one more number (the finaliser of `SplitMix64`).
const fn stir(digest: u64, number: u64) -> u64 {
    let mut x = (digest ^ number).wrapping_add(0x9e37_79b9_7f4a_7c15);
    x = (x ^ (x >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
    x = (x ^ (x >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
    x ^ (x >> 31)
}

/// 1 or 2 for the two configurations, told by the ligands in order of rank, implicit ones first.
fn tetrahedral_code(mark: &TetrahedralStereo, rank: &impl Fn(u16) -> u16) -> u8 {
    let clockwise = mark.is_clockwise_by(|ligand| match ligand {
        Ligand::Implicit => 0,
        Ligand::Atom(atom) => u32::from(rank(atom)) + 1,
    });
    if clockwise { 1 } else { 2 }
}

fn count_cells(colours: &[u16]) -> usize {
    // A cell's colour is the number of atoms before it, so that each cell has one atom whose colour equals its place.
    (0..colours.len())
        .filter(|&place| colours.iter().any(|&c| usize::from(c) == place))
        .count()
}
