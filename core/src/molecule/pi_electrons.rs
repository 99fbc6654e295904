//! How many electrons a ring atom gives to the pi system of its rings.

use heapless::Vec;

use super::Element;
use super::graph::{Atom, Bond, BondOrder, MAX_DEGREE, Neighbour};

/// The pi electrons of a ring atom, 0, 1 or 2; `None` when the atom cannot be part of an aromatic ring.
///
/// The number follows from element, charge and number of neighbours, and from a multiple bond that leaves the rings. Where
/// in the ring the double bonds are drawn does not enter. A double bond in a ring gives 1 electron; a double bond to a more
/// electronegative atom outside gives 0 (tropone), to any other 1; a lone pair gives 2; an empty orbital of a carbocation
/// gives 0. Trivalent boron without a double bond is no part of an aromatic ring, nor is an atom with four neighbours,
/// with two multiple bonds, or above its lowest valence (a sulfone's sulfur).
///
/// `is_ring_bond` says of a bond's two atoms whether the bond lies in a ring.
pub(super) fn of_ring_atom(
    index: usize,
    atoms: &[Atom],
    bonds: &[Bond],
    neighbours: &[Vec<Neighbour, MAX_DEGREE>],
    is_ring_bond: impl Fn([u16; 2]) -> bool,
) -> Option<u8> {
    let atom = atoms.get(index)?;
    let its_bonds = || {
        let ends = neighbours.get(index).into_iter().flatten();
        ends.filter_map(|n| bonds.get(usize::from(n.bond)))
    };
    let is_multiple = |bond: &&Bond| bond.order.pairs() > 1;
    let outer = outer_electrons(atom.element);
    // Univalent elements have no place in a ring.
    let valence = lowest_valence(outer).filter(|&valence| valence > 1)?;
    let hydrogens = i16::from(atom.hydrogens);
    let degree = its_bonds().fold(hydrogens, |degree, _| degree + 1);
    let bonded = its_bonds().map(|b| i16::from(b.order.pairs())).sum::<i16>() + hydrogens;
    let charge = i16::from(atom.charge);
    if degree > 3
        || bonded > lowest_valence(outer - charge)?
        || its_bonds().filter(is_multiple).count() > 1
    {
        return None;
    }
    let lone = (outer - valence - charge).max(0);
    let mut free = valence - degree + lone;
    if its_bonds().any(|bond| bond.order == BondOrder::Triple) {
        // The second pi bond of a triple bond lies in the plane of the ring.
        free = free.min(1);
    }
    let multiple = its_bonds().find(is_multiple);
    match (free, multiple) {
        // Three stand for a lone pair in the plane and one electron out of it, as in pyridine.
        (2.., _) => Some(if free % 2 == 1 { 1 } else { 2 }),
        (_, Some(bond)) if is_ring_bond(bond.atoms) => Some(1),
        (_, Some(bond)) => {
            let other = atoms.get(bond.other(index))?.element;
            let withdraws = free < 1 || attracts_more(other, atom.element);
            Some(u8::from(!withdraws))
        }
        (1, None) if charge == 1 => Some(0),
        (_, None) => None,
    }
}

/// Whether `other` draws the electrons of a bond to `element` towards itself.
fn attracts_more(other: Element, element: Element) -> bool {
    let rank = |e| (outer_electrons(e), -i16::from(Element::atomic_number(e)));
    rank(other) > rank(element)
}

/// The lowest valence of an atom with so many outer electrons; `None` if it has no valence at all.
fn lowest_valence(outer: i16) -> Option<i16> {
    match outer {
        1..=4 => Some(outer),
        5..=7 => Some(8 - outer),
        _ => None,
    }
}

const fn outer_electrons(element: Element) -> i16 {
    match element {
        Element::H => 1,
        Element::B => 3,
        Element::C | Element::Si => 4,
        Element::N | Element::P => 5,
        Element::O | Element::S => 6,
        Element::F | Element::Cl | Element::Br | Element::I => 7,
    }
}
