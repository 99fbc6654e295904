//! Configurations that a structure leaves open although the enthalpy of formation depends on them.
//!
//! Mirror images have the same enthalpy, so that a single tetrahedral centre is no question; two or more give diastereomers. Which atoms
//! can be centres is told from symmetry classes, which overlooks rare cases (a centre that differs from its mirror image only through the
//! configuration of two otherwise equal branches).

use std::fmt;

use tautring_core::molecule::{BondOrder, CentreKind, Element};

use super::capacity::HostMolecule;

/// What kind of configuration is open.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum StereoKind {
    /// A tetrahedral centre in a molecule with others.
    Tetrahedral,
    /// A double bond that can be cis or trans.
    DoubleBond,
}

/// A configuration that the input does not state.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct StereoFlag {
    /// What kind.
    pub kind: StereoKind,
    /// Indices of the centre, or of the two atoms of the double bond.
    pub atoms: Vec<usize>,
    /// The atoms with their numbers from 1, such as `C3=C4`.
    pub label: String,
}

impl fmt::Display for StereoFlag {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self.kind {
            StereoKind::Tetrahedral => write!(
                f,
                "configuration of {} not stated; diastereomers differ by a few kJ/mol, more where rings are fused",
                self.label
            ),
            StereoKind::DoubleBond => write!(
                f,
                "configuration of {} not stated; cis and trans differ by a few kJ/mol, far more in a ring",
                self.label
            ),
        }
    }
}

/// The configurations that are open and matter.
pub(super) fn open_configurations(molecule: &HostMolecule) -> Vec<StereoFlag> {
    let classes = molecule.symmetry_classes();
    let centres = molecule.possible_centres();
    let stated = |atom: usize| {
        let mut marks = molecule.tetrahedral().iter();
        marks.any(|mark| usize::from(mark.centre) == atom)
    };
    let name = |atom: usize| format!("{}{}", molecule.atoms()[atom].element.symbol(), atom + 1);
    let mut flags = Vec::new();
    if centres.len() > 1 {
        for (atom, kind) in centres {
            let atom = usize::from(atom);
            if kind != CentreKind::Fixed && !stated(atom) {
                flags.push(StereoFlag {
                    kind: StereoKind::Tetrahedral,
                    atoms: vec![atom],
                    label: name(atom),
                });
            }
        }
    }
    for (index, bond) in molecule.bonds().iter().enumerate() {
        if bond.stereo.is_none() && can_be_cis_or_trans(molecule, &classes, index) {
            let [a, b] = bond.atoms.map(usize::from);
            flags.push(StereoFlag {
                kind: StereoKind::DoubleBond,
                atoms: vec![a, b],
                label: format!("{}={}", name(a), name(b)),
            });
        }
    }
    flags
}

fn can_be_cis_or_trans(molecule: &HostMolecule, classes: &[u16], index: usize) -> bool {
    let bond = &molecule.bonds()[index];
    let small_ring = molecule
        .bond_ring_sizes(index)
        .smallest()
        .is_some_and(|n| n < 8);
    if bond.order != BondOrder::Double || small_ring || molecule.is_aromatic_bond(index) {
        return false;
    }
    let [a, b] = bond.atoms;
    let sided = |end: u16, partner: u16| {
        let atom = molecule.atoms()[usize::from(end)];
        let neighbours = molecule.neighbours(usize::from(end));
        let cumulated = neighbours
            .iter()
            .filter(|n| molecule.bonds()[usize::from(n.bond)].order != BondOrder::Single)
            .count()
            > 1;
        let others: Vec<u16> = neighbours
            .iter()
            .filter(|n| n.atom != partner)
            .map(|n| classes[usize::from(n.atom)])
            .collect();
        let supported = matches!(atom.element, Element::C | Element::N | Element::Si);
        supported
            && !cumulated
            && match others.as_slice() {
                [_] => atom.hydrogens == u8::from(atom.element != Element::N || atom.charge > 0),
                [one, two] => one != two,
                _ => false,
            }
    };
    sided(a, b) && sided(b, a)
}
