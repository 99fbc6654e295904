//! A ring system taken apart into units and links.

use heapless::Vec;

use crate::molecule::{BondOrder, Element, Molecule};

/// Which atoms of the molecule a piece holds.
pub(super) type Members<const A: usize> = [bool; A];

/// A ring system of a molecule as units joined by links.
///
/// A unit is an atom, or atoms that only make sense together: an aromatic system, neighbours of opposite charge (N⁺–O⁻), a sulfur or
/// phosphorus of higher valence with the atoms that it holds by multiple bonds. A link is a ring bond of the system between two units.
pub(super) struct OpenedSystem<'m, const A: usize, const B: usize> {
    molecule: &'m Molecule<A, B>,
    /// For each atom the lowest atom of its unit.
    units: Vec<u16, A>,
    in_system: Members<A>,
    links: Vec<u16, B>,
}

impl<'m, const A: usize, const B: usize> OpenedSystem<'m, A, B> {
    pub(super) fn new(molecule: &'m Molecule<A, B>, system: usize) -> Self {
        let systems = molecule.ring_systems();
        let mut in_system = [false; A];
        for (atom, slot) in in_system.iter_mut().enumerate() {
            *slot = systems.of_atom(atom) == Some(system);
        }
        let mut opened = Self {
            molecule,
            units: units(molecule),
            in_system,
            links: Vec::new(),
        };
        opened.links = (0..molecule.bonds().len())
            .filter(|&bond| opened.joins_units(bond))
            .map(|bond| bond as u16)
            .collect();
        opened
    }

    pub(super) fn molecule(&self) -> &'m Molecule<A, B> {
        self.molecule
    }

    /// The links, as bonds of the molecule.
    pub(super) fn links(&self) -> impl Iterator<Item = usize> {
        self.links.iter().map(|&link| usize::from(link))
    }

    /// The units of the system, each by the lowest of its atoms that is in the system.
    pub(super) fn units(&self) -> impl Iterator<Item = usize> {
        (0..self.units.len()).filter(|&atom| {
            let own = |&other: &usize| self.is_in(other) && self.unit(other) == self.unit(atom);
            self.is_in(atom) && !(0..atom).any(|other| own(&other))
        })
    }

    /// The links of the unit of an atom: bond, end in the unit, other end.
    pub(super) fn links_of(&self, unit: usize) -> impl Iterator<Item = (usize, usize, usize)> {
        self.links().filter_map(move |link| {
            let [a, b] = self.ends(link)?;
            if self.unit(a) == self.unit(unit) {
                Some((link, a, b))
            } else if self.unit(b) == self.unit(unit) {
                Some((link, b, a))
            } else {
                None
            }
        })
    }

    /// The two ends of a bond.
    pub(super) fn ends(&self, bond: usize) -> Option<[usize; 2]> {
        let bond = self.molecule.bonds().get(bond)?;
        Some(bond.atoms.map(usize::from))
    }

    pub(super) fn is_link(&self, bond: usize) -> bool {
        self.links.contains(&(bond as u16))
    }

    /// The bare unit of an atom.
    pub(super) fn bare(&self, atom: usize) -> Members<A> {
        self.closure(atom, |_, _| false)
    }

    /// The unit of an atom with its substituents, whole.
    pub(super) fn with_substituents(&self, atom: usize) -> Members<A> {
        self.closure(atom, |bond, to| !self.is_link(bond) && !self.is_in(to))
    }

    /// The unit at the far end of a link with what multiple bonds other than the link tie to it.
    pub(super) fn beyond(&self, link: usize, far_end: usize) -> Members<A> {
        self.closure(far_end, |bond, _| {
            bond != link && self.order(bond) != BondOrder::Single
        })
    }

    pub(super) fn order(&self, bond: usize) -> BondOrder {
        let bond = self.molecule.bonds().get(bond);
        bond.map_or(BondOrder::Single, |b| b.order)
    }

    /// The unit of an atom and all units that bonds reach which `follow` accepts (bond, atom at its far end).
    fn closure(&self, atom: usize, follow: impl Fn(usize, usize) -> bool) -> Members<A> {
        let mut members = [false; A];
        self.add_unit(&mut members, atom);
        let has = |members: &Members<A>, atom: usize| members.get(atom) == Some(&true);
        loop {
            let reached = (0..self.molecule.bonds().len()).find_map(|bond| {
                let [a, b] = self.ends(bond)?;
                let to = match (has(&members, a), has(&members, b)) {
                    (true, false) => b,
                    (false, true) => a,
                    _ => return None,
                };
                let heavy = self.molecule.atoms().get(to)?.element != Element::H;
                (heavy && follow(bond, to)).then_some(to)
            });
            match reached {
                Some(to) => self.add_unit(&mut members, to),
                None => return members,
            }
        }
    }

    fn add_unit(&self, members: &mut Members<A>, atom: usize) {
        for (other, slot) in members.iter_mut().enumerate().take(self.units.len()) {
            *slot |= self.unit(other) == self.unit(atom);
        }
    }

    fn unit(&self, atom: usize) -> Option<u16> {
        self.units.get(atom).copied()
    }

    fn is_in(&self, atom: usize) -> bool {
        self.in_system.get(atom) == Some(&true)
    }

    fn joins_units(&self, bond: usize) -> bool {
        let in_ring = !self.molecule.bond_ring_sizes(bond).is_empty();
        let apart = self
            .ends(bond)
            .is_some_and(|[a, b]| self.is_in(a) && self.is_in(b) && self.unit(a) != self.unit(b));
        in_ring && apart
    }
}

/// For each atom the lowest atom of its unit.
fn units<const A: usize, const B: usize>(molecule: &Molecule<A, B>) -> Vec<u16, A> {
    let mut units: Vec<u16, A> = (0..molecule.atoms().len()).map(|a| a as u16).collect();
    loop {
        let mut settled = true;
        for (index, bond) in molecule.bonds().iter().enumerate() {
            if !is_welded(molecule, index) {
                continue;
            }
            let [a, b] = bond.atoms.map(usize::from);
            let lower = units.get(a).min(units.get(b)).copied().unwrap_or(0);
            for end in [a, b] {
                if let Some(unit) = units.get_mut(end).filter(|unit| **unit != lower) {
                    *unit = lower;
                    settled = false;
                }
            }
        }
        if settled {
            return units;
        }
    }
}

/// Whether the two atoms of a bond belong to one unit.
fn is_welded<const A: usize, const B: usize>(molecule: &Molecule<A, B>, bond: usize) -> bool {
    let Some(found) = molecule.bonds().get(bond) else {
        return false;
    };
    let charge = |atom: u16| {
        let atom = molecule.atoms().get(usize::from(atom));
        atom.map_or(0, |a| a.charge.signum())
    };
    let [a, b] = found.atoms;
    let opposite = charge(a) * charge(b) < 0;
    let multiple = found.order != BondOrder::Single;
    let high = [a, b].iter().any(|&end| is_hypervalent(molecule, end));
    molecule.is_aromatic_bond(bond) || opposite || (multiple && high)
}

/// Whether an atom has more bonds than the lowest valence of its element.
fn is_hypervalent<const A: usize, const B: usize>(molecule: &Molecule<A, B>, atom: u16) -> bool {
    let atom = usize::from(atom);
    let lowest = match molecule.atoms().get(atom).map(|a| a.element) {
        Some(Element::S) => 2,
        Some(Element::P) => 3,
        Some(Element::Cl | Element::Br | Element::I) => 1,
        _ => return false,
    };
    shared_pairs(molecule, atom) > lowest
}

/// Electron pairs that an atom shares with hydrogens and heavy neighbours.
pub(super) fn shared_pairs<const A: usize, const B: usize>(
    molecule: &Molecule<A, B>,
    atom: usize,
) -> u8 {
    let hydrogens = molecule.atoms().get(atom).map_or(0, |a| a.hydrogens);
    let around = molecule.neighbours(atom).iter();
    around
        .filter_map(|n| molecule.bonds().get(usize::from(n.bond)))
        .fold(hydrogens, |sum, bond| sum + bond.order.pairs())
}
