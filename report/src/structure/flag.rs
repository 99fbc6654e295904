//! Configurations that a structure leaves open although the enthalpy of formation depends on them.
//!
//! Mirror images have the same enthalpy, so that a single tetrahedral centre is no question; two or more give diastereomers. Which atoms
//! can be centres is told from symmetry classes, which overlooks rare cases (a centre that differs from its mirror image only through the
//! configuration of two otherwise equal branches).

use std::fmt;

use tautring_core::molecule::{BondOrder, CentreKind, Element};

use super::capacity::HostMolecule;

/// Size of the smallest ring in which a double bond without a mark may be either; up to eight it is cis, trans has to be marked.
const SMALLEST_OPEN_RING: usize = 9;

/// The configurations that the input of a molecule does not state; at least one.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct StereoFlag {
    /// Indices of the tetrahedral centres, of which the molecule has others.
    pub centres: Vec<usize>,
    /// Indices of the atoms of double bonds that can be cis or trans.
    pub double_bonds: Vec<[usize; 2]>,
    /// The centres, then the double bonds, by the atoms' numbers from 1, such as `C3` and `C5=C6`.
    pub labels: Vec<String>,
}

impl fmt::Display for StereoFlag {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str("configuration of ")?;
        for (index, label) in self.labels.iter().enumerate() {
            f.write_str(match index {
                0 => "",
                _ if index + 1 == self.labels.len() => " and ",
                _ => ", ",
            })?;
            f.write_str(label)?;
        }
        f.write_str(" not stated")?;
        if !self.centres.is_empty() {
            f.write_str("; diastereomers differ by a few kJ/mol, more where rings are fused")?;
        }
        if !self.double_bonds.is_empty() {
            f.write_str("; cis and trans differ by a few kJ/mol, far more in a ring")?;
        }
        Ok(())
    }
}

/// The configurations that are open and matter, if there are any.
pub(super) fn open_configurations(molecule: &HostMolecule) -> Option<StereoFlag> {
    let stated = |atom: u16| molecule.tetrahedral().iter().any(|m| m.centre == atom);
    let possible = molecule.possible_centres();
    let centres: Vec<usize> = possible
        .iter()
        .filter(|&&(atom, kind)| possible.len() > 1 && kind != CentreKind::Fixed && !stated(atom))
        .map(|&(atom, _)| usize::from(atom))
        .collect();
    let classes = molecule.symmetry_classes();
    let double_bonds: Vec<[usize; 2]> = molecule
        .bonds()
        .iter()
        .enumerate()
        .filter(|&(index, bond)| {
            bond.stereo.is_none() && can_be_cis_or_trans(molecule, &classes, index)
        })
        .map(|(_, bond)| bond.atoms.map(usize::from))
        .collect();
    let name = |atom: usize| format!("{}{}", molecule.atoms()[atom].element.symbol(), atom + 1);
    let bond_name = |[a, b]: &[usize; 2]| format!("{}={}", name(*a), name(*b));
    let labels: Vec<String> = centres
        .iter()
        .map(|&atom| name(atom))
        .chain(double_bonds.iter().map(bond_name))
        .collect();
    (!labels.is_empty()).then_some(StereoFlag {
        centres,
        double_bonds,
        labels,
    })
}

fn can_be_cis_or_trans(molecule: &HostMolecule, classes: &[u16], index: usize) -> bool {
    let bond = &molecule.bonds()[index];
    let small_ring = molecule
        .bond_ring_sizes(index)
        .smallest()
        .is_some_and(|n| n < SMALLEST_OPEN_RING);
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
