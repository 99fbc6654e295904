//! Valence: whether each atom has the bonds that its element and charge allow.
//!
//! The isoelectronic rule: a charged atom bonds like the neutral element with as many valence electrons. With `v` valence
//! electrons left after the charge, an atom forms `v` bonds up to four, and `8 - v` beyond (a full octet). From the third
//! period on each lone pair may be promoted into two more bonds, up to `v`: S 2, 4, 6; P 3, 5; Cl, Br, I 1, 3, 5, 7.

use heapless::Vec;

use super::Element;
use super::error::MoleculeError;
use super::graph::{Atom, Bond, MAX_DEGREE, Neighbour};

/// Closed-shell valences as a set: bit `n` stands for `n` electron pairs shared with neighbours.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Valences(u16);

impl Valences {
    /// The valences of an element with a formal charge; empty for a charge that leaves no such electrons.
    pub(super) fn of(element: Element, charge: i8) -> Self {
        let electrons = i16::from(valence_electrons(element)) - i16::from(charge);
        let Ok(electrons) = u16::try_from(electrons) else {
            return Self(0);
        };
        match (period(element), electrons) {
            (1, 1) => Self(1 << 1),
            (1, 0 | 2) => Self(1 << 0),
            (1, _) | (_, 9..) => Self(0),
            (_, ..=4) => Self(1 << electrons),
            (2, _) => Self(1 << (8 - electrons)),
            _ => (8 - electrons..=electrons)
                .step_by(2)
                .fold(Self(0), |set, bonds| Self(set.0 | 1 << bonds)),
        }
    }

    /// Whether `pairs` electron pairs are one of the valences.
    pub(super) const fn contains(self, pairs: u8) -> bool {
        pairs < 16 && self.0 & 1 << pairs != 0
    }

    /// The smallest valence that is at least `pairs`.
    fn at_least(self, pairs: u8) -> Option<u8> {
        (pairs..16).find(|&valence| self.contains(valence))
    }
}

/// Hydrogens that complete an atom whose bonds share `bond_pairs` electron pairs.
///
/// They fill the smallest valence that holds the bonds. Neutral nitrogen with four or five pairs is taken as the
/// pentavalent spelling of nitro, azide and the like, which [`MoleculeBuilder::finish`](super::MoleculeBuilder::finish)
/// rewrites. `None` when the bonds are more than any valence of the element.
///
/// ```
/// use tautring_core::molecule::{Element, implicit_hydrogens};
/// assert_eq!(implicit_hydrogens(Element::C, 0, 1), Some(3));
/// assert_eq!(implicit_hydrogens(Element::N, 1, 3), Some(1));
/// assert_eq!(implicit_hydrogens(Element::S, 0, 3), Some(1));
/// assert_eq!(implicit_hydrogens(Element::O, 0, 3), None);
/// ```
pub fn implicit_hydrogens(element: Element, charge: i8, bond_pairs: u8) -> Option<u8> {
    let pentavalent = element == Element::N && charge == 0 && matches!(bond_pairs, 4 | 5);
    let valence = if pentavalent {
        5
    } else {
        Valences::of(element, charge).at_least(bond_pairs)?
    };
    Some(valence - bond_pairs)
}

/// Electron pairs that an atom shares: its bonds by order, an aromatic mark as one, and its hydrogens.
pub(super) fn shared_pairs(atom: Atom, neighbours: &[Neighbour], bonds: &[Bond]) -> u8 {
    neighbours
        .iter()
        .filter_map(|n| bonds.get(usize::from(n.bond)))
        .fold(atom.hydrogens, |sum, bond| {
            sum.saturating_add(bond.order.pairs())
        })
}

/// Rejects atoms with too many bonds and open shells.
pub(super) fn check(
    atoms: &[Atom],
    bonds: &[Bond],
    neighbours: &[Vec<Neighbour, MAX_DEGREE>],
) -> Result<(), MoleculeError> {
    for (index, (atom, around)) in atoms.iter().zip(neighbours).enumerate() {
        let valence = shared_pairs(*atom, around, bonds);
        let valences = Valences::of(atom.element, atom.charge);
        if valences.contains(valence) {
            continue;
        }
        return Err(if valences.at_least(valence).is_some() {
            MoleculeError::OpenShell {
                atom: index,
                element: atom.element,
                valence,
            }
        } else {
            MoleculeError::ValenceExceeded {
                atom: index,
                element: atom.element,
                valence,
            }
        });
    }
    Ok(())
}

const fn valence_electrons(element: Element) -> u8 {
    match element {
        Element::H => 1,
        Element::B => 3,
        Element::C | Element::Si => 4,
        Element::N | Element::P => 5,
        Element::O | Element::S => 6,
        Element::F | Element::Cl | Element::Br | Element::I => 7,
    }
}

const fn period(element: Element) -> u8 {
    match element {
        Element::H => 1,
        Element::B | Element::C | Element::N | Element::O | Element::F => 2,
        Element::Si | Element::P | Element::S | Element::Cl => 3,
        Element::Br => 4,
        Element::I => 5,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn allowed(element: Element, charge: i8) -> Vec<u8, 16> {
        let valences = Valences::of(element, charge);
        (0..=15).filter(|&n| valences.contains(n)).collect()
    }

    fn lone(element: Element, charge: i8, hydrogens: u8) -> Result<(), MoleculeError> {
        let atom = Atom {
            element,
            charge,
            hydrogens,
            isotope: 0,
        };
        check(&[atom], &[], &[Vec::new()])
    }

    #[test]
    fn valences_follow_the_isoelectronic_rule() {
        use Element::{B, Br, C, Cl, F, H, I, N, O, P, S, Si};
        for (element, charge, expected) in [
            (H, 0, &[1][..]),
            (H, 1, &[0]),
            (H, -1, &[0]),
            (B, 0, &[3]),
            (B, -1, &[4]),
            (C, 0, &[4]),
            (C, 1, &[3]),
            (C, -1, &[3]),
            (N, 0, &[3]),
            (N, 1, &[4]),
            (N, -1, &[2]),
            (O, 0, &[2]),
            (O, 1, &[3]),
            (O, -1, &[1]),
            (F, 0, &[1]),
            (F, -1, &[0]),
            (Si, 0, &[4]),
            (Si, -2, &[2, 4, 6]),
            (P, 0, &[3, 5]),
            (P, 1, &[4]),
            (P, -1, &[2, 4, 6]),
            (S, 0, &[2, 4, 6]),
            (S, 1, &[3, 5]),
            (S, 2, &[4]),
            (Cl, 0, &[1, 3, 5, 7]),
            (Cl, 3, &[4]),
            (Br, 0, &[1, 3, 5, 7]),
            (I, 0, &[1, 3, 5, 7]),
            (C, 5, &[]),
            (C, i8::MIN, &[]),
            (I, i8::MAX, &[]),
        ] {
            assert_eq!(
                allowed(element, charge).as_slice(),
                expected,
                "{element:?} {charge:+}"
            );
        }
    }

    #[test]
    fn open_shells_and_excess_are_told_apart() {
        assert_eq!(lone(Element::C, 0, 4), Ok(()));
        assert!(matches!(
            lone(Element::C, 0, 3),
            Err(MoleculeError::OpenShell { valence: 3, .. })
        ));
        assert!(matches!(
            lone(Element::C, 0, 2),
            Err(MoleculeError::OpenShell { valence: 2, .. })
        ));
        assert!(matches!(
            lone(Element::S, 0, 3),
            Err(MoleculeError::OpenShell { .. })
        ));
        assert!(matches!(
            lone(Element::N, 0, 5),
            Err(MoleculeError::ValenceExceeded { valence: 5, .. })
        ));
        assert!(matches!(
            lone(Element::C, 0, 255),
            Err(MoleculeError::ValenceExceeded { valence: 255, .. })
        ));
        assert!(lone(Element::C, 9, 0).is_err());
    }

    #[test]
    fn hydrogens_fill_the_smallest_valence() {
        assert_eq!(implicit_hydrogens(Element::P, 0, 4), Some(1));
        assert_eq!(implicit_hydrogens(Element::N, 0, 2), Some(1));
        assert_eq!(implicit_hydrogens(Element::N, 0, 5), Some(0));
        assert_eq!(implicit_hydrogens(Element::N, 0, 6), None);
        assert_eq!(implicit_hydrogens(Element::O, -1, 1), Some(0));
        assert_eq!(implicit_hydrogens(Element::C, 1, 2), Some(1));
        assert_eq!(implicit_hydrogens(Element::Cl, 0, 1), Some(0));
        assert_eq!(implicit_hydrogens(Element::C, 0, u8::MAX), None);
    }
}
