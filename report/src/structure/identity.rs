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
    builder.suppress_hydrogens();
    Ok(identity(&builder.finish()?))
}
