//! Whether two structures are the same molecule: a text that is equal if, and only if, the graphs are.

use std::fmt::Write;

use tautring_core::molecule::{Ligand, MoleculeError};

use super::capacity::{HostBuilder, HostMolecule};

/// The canonical text of a molecule: atoms, bonds and, where stated, isotopes and configurations.
///
/// It is made for comparing and hashing, not for reading; it is the same for every spelling and every order of the atoms.
///
/// ```
/// use tautring_report::structure::{Structure, identity};
/// let one = Structure::from_smiles("OCC")?;
/// let two = Structure::from_smiles("C([H])([H])([H])CO")?;
/// assert_eq!(identity(&one.molecule), identity(&two.molecule));
/// # Ok::<(), tautring_report::structure::StructureError>(())
/// ```
pub fn identity(molecule: &HostMolecule) -> String {
    let order = molecule.canonical_order();
    let rank = |atom: u16| order.ranks[usize::from(atom)];
    let mut text = String::new();
    for &atom in &order.atoms {
        let index = usize::from(atom);
        let a = molecule.atoms()[index];
        let isotope = match a.isotope {
            0 => String::new(),
            mass => mass.to_string(),
        };
        let charge = match a.charge {
            0 => String::new(),
            charge => format!("{charge:+}"),
        };
        // Writing to a String cannot fail.
        let _ = write!(text, "{isotope}{}", a.element.symbol());
        let _ = write!(text, "H{}{charge}", a.hydrogens);
        let mut bonds: Vec<String> = molecule
            .neighbours(index)
            .iter()
            .filter(|n| rank(n.atom) < rank(atom))
            .map(|n| {
                let bond = usize::from(n.bond);
                let order = if molecule.is_aromatic_bond(bond) {
                    ':'
                } else {
                    ['-', '-', '=', '#'][usize::from(molecule.bonds()[bond].order.pairs())]
                };
                let side = double_bond(molecule, bond, &rank);
                format!("{order}{:03}{side}", rank(n.atom))
            })
            .collect();
        bonds.sort_unstable();
        text.extend(bonds);
        text.push_str(tetrahedral(molecule, atom, &rank));
        text.push(';');
    }
    text
}

/// The canonical text of a molecule without configurations and isotopes.
///
/// # Errors
/// None for a molecule that was read here; the core's errors where the graph without marks is none.
pub fn skeleton(molecule: &HostMolecule) -> Result<String, MoleculeError> {
    let mut builder = HostBuilder::new();
    for atom in molecule.atoms() {
        let mut plain = *atom;
        plain.isotope = 0;
        builder.add_atom(plain)?;
    }
    for bond in molecule.bonds() {
        let [a, b] = bond.atoms.map(usize::from);
        builder.add_bond(a, b, bond.order)?;
    }
    Ok(identity(&builder.suppress_hydrogens().finish()?))
}

/// `z` or `e` for references of the lowest rank on the same side or on opposite sides.
fn double_bond(molecule: &HostMolecule, bond: usize, rank: &impl Fn(u16) -> u16) -> &'static str {
    let bond = &molecule.bonds()[bond];
    let Some(stereo) = bond.stereo else { return "" };
    let [a, b] = bond.atoms;
    let lowest = |end: u16, other: u16| {
        let around = molecule.neighbours(usize::from(end)).iter();
        around
            .map(|n| n.atom)
            .filter(|&atom| atom != other)
            .min_by_key(|&atom| rank(atom))
    };
    let moved = (lowest(a, b) != Some(stereo.first_reference))
        != (lowest(b, a) != Some(stereo.second_reference));
    if stereo.same_side == moved { "e" } else { "z" }
}

/// `@` or `@@` for ligands in the order of their ranks, as seen from the first, anticlockwise or clockwise.
fn tetrahedral(
    molecule: &HostMolecule,
    centre: u16,
    rank: &impl Fn(u16) -> u16,
) -> &'static str {
    let Some(mark) = molecule.tetrahedral().iter().find(|m| m.centre == centre) else {
        return "";
    };
    let keys = mark.ligands.map(|ligand| match ligand {
        Ligand::Implicit => None,
        Ligand::Atom(atom) => Some(rank(atom)),
    });
    let mut odd = false;
    for (i, a) in keys.iter().enumerate() {
        odd ^= keys[i + 1..].iter().filter(|&b| a > b).count() % 2 == 1;
    }
    if mark.clockwise == odd { "@" } else { "@@" }
}
