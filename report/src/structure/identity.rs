//! Whether two structures are the same molecule: a text that is equal if, and only if, the graphs are.

use std::fmt::Write;

use tautring_core::molecule::MoleculeError;

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
    let mut text = String::new();
    for (rank, &atom) in order.atoms.iter().enumerate() {
        let index = usize::from(atom);
        let a = molecule.atoms()[index];
        if a.isotope != 0 {
            text.push_str(&a.isotope.to_string());
        }
        text.push_str(a.element.symbol());
        text.push('H');
        text.push_str(&a.hydrogens.to_string());
        if a.charge != 0 {
            // Writing to a String cannot fail.
            let _ = write!(text, "{:+}", a.charge);
        }
        let row = molecule.code_row(&order.ranks, index);
        // The other half of the bonds stands in the rows of higher ranks.
        for code in row
            .bonds
            .into_iter()
            .filter(|code| (code >> 8) < rank as u32)
        {
            text.push(['?', '-', '=', '#', ':'][(code >> 4 & 0xf) as usize]);
            text.push_str(&(code >> 8).to_string());
            text.push_str(["", "e", "z"][(code & 0xf) as usize]);
        }
        text.push_str(["", "@", "@@"][usize::from(row.centre)]);
        text.push(';');
    }
    text
}

/// The canonical text of what an enthalpy of formation belongs to: mirror images and isotopes are one, diastereomers are not.
///
/// A lone tetrahedral centre is no diastereomer, so its mark does not count.
///
/// # Errors
/// None for a molecule that was read here; the core's errors where the graph without marks is none.
///
/// ```
/// use tautring_report::structure::{Structure, diastereomer};
/// let named = Structure::from_smiles("C[C@H](N)C(=O)O")?;
/// let plain = Structure::from_smiles("CC(N)C(=O)O")?;
/// assert_eq!(diastereomer(&named.molecule), diastereomer(&plain.molecule));
/// # Ok::<(), tautring_report::structure::StructureError>(())
/// ```
pub fn diastereomer(molecule: &HostMolecule) -> Result<String, MoleculeError> {
    let marked = |turned: bool| {
        let mut builder = unmarked(molecule)?;
        for (index, bond) in molecule.bonds().iter().enumerate() {
            if let Some(stereo) = bond.stereo {
                builder.set_double_bond_stereo(index, stereo)?;
            }
        }
        let marks = molecule.tetrahedral();
        for mark in marks.iter().filter(|_| marks.len() > 1) {
            let mut mark = *mark;
            mark.clockwise ^= turned;
            builder.add_tetrahedral_stereo(mark)?;
        }
        builder.suppress_hydrogens();
        Ok(identity(&builder.finish()?))
    };
    Ok(marked(false)?.min(marked(true)?))
}

/// The canonical text of a molecule without configurations and isotopes.
///
/// # Errors
/// None for a molecule that was read here; the core's errors where the graph without marks is none.
pub fn skeleton(molecule: &HostMolecule) -> Result<String, MoleculeError> {
    let mut builder = unmarked(molecule)?;
    builder.suppress_hydrogens();
    Ok(identity(&builder.finish()?))
}

/// The bare graph: atoms of natural composition and bonds.
fn unmarked(molecule: &HostMolecule) -> Result<HostBuilder, MoleculeError> {
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
    Ok(builder)
}
