//! Formula, rings and aromatic atoms of every measured molecule, read from its SMILES, against `RDKit`.
//!
//! `tests/rdkit_data_set.py` makes the reference file.

use std::collections::BTreeSet;

use serde::Deserialize;
use tautring_report::structure::{HostMolecule, Structure};
use tautring_tests::folder::{reference, top};
use tautring_tests::table::rows;

/// Formulas that `RDKit` orders otherwise: without carbon Hill's order is the alphabet, where Br, Cl and F stand before H.
const ORDERED_OTHERWISE: [(&str, &str); 3] = [("BrH", "HBr"), ("ClH", "HCl"), ("FH", "HF")];

#[derive(Deserialize)]
struct Measurement {
    smiles: String,
    phase: String,
}

#[derive(Deserialize)]
struct Row {
    smiles: String,
    formula: String,
    /// Rings of a smallest set.
    rings: usize,
    /// Rings of `RDKit`'s symmetrised set.
    symmetrised_rings: usize,
    aromatic_atoms: String,
}

/// The reference rows of single molecules, with the molecules; four ammonium halides are pairs of ions.
fn molecules() -> Vec<(Row, HostMolecule)> {
    let table: Vec<Row> = rows(&reference("data_set.csv"));
    let single = table.into_iter().filter(|row| !row.smiles.contains('.'));
    single
        .map(|row| {
            let structure = Structure::from_smiles(&row.smiles);
            let molecule = structure
                .unwrap_or_else(|e| panic!("{}: {e}", row.smiles))
                .molecule;
            (row, molecule)
        })
        .collect()
}

fn differing(found: impl Fn(&Row, &HostMolecule) -> (String, String)) -> Vec<String> {
    let differs = |(row, molecule): &(Row, HostMolecule)| {
        let (ours, theirs) = found(row, molecule);
        (ours != theirs).then(|| format!("{}: {ours}, RDKit {theirs}", row.smiles))
    };
    molecules().iter().filter_map(differs).collect()
}

#[test]
fn every_measured_molecule_is_in_the_reference_file() {
    let measured: Vec<Measurement> = rows(&top().join("data/measurements.csv"));
    let formation = measured
        .into_iter()
        .filter(|row| ["g", "l", "s"].contains(&row.phase.as_str()));
    let measured: BTreeSet<String> = formation.map(|row| row.smiles).collect();
    let table: Vec<Row> = rows(&reference("data_set.csv"));
    let known: BTreeSet<String> = table.into_iter().map(|row| row.smiles).collect();
    let stale: Vec<_> = known.symmetric_difference(&measured).collect();
    assert!(
        stale.is_empty(),
        "remake tests/reference/data_set.csv by tests/rdkit_data_set.py: {stale:?}"
    );
    assert!(molecules().len() > 1400);
}

#[test]
fn formulas_are_those_of_rdkit() {
    let different = differing(|row, molecule| {
        let ours = molecule.formula().to_string();
        let same = ORDERED_OTHERWISE.contains(&(&ours, &row.formula));
        let theirs = if same { &ours } else { &row.formula };
        (ours.clone(), theirs.clone())
    });
    assert!(different.is_empty(), "{different:#?}");
}

/// Euler's relation: rings of a smallest set = bonds - atoms + 1.
#[test]
fn smallest_rings_are_as_many_as_those_of_rdkit() {
    let different = differing(|row, molecule| {
        let rings = molecule.bonds().len() + 1 - molecule.atoms().len();
        (rings.to_string(), row.rings.to_string())
    });
    assert!(different.is_empty(), "{different:#?}");
}

/// By definition the two sets differ: `RDKit` completes a smallest set by those rings of equal size that its search meets.
/// On these molecules they are of one size.
#[test]
fn relevant_rings_are_as_many_as_the_symmetrised_smallest_rings_of_rdkit() {
    let different = differing(|row, molecule| {
        let rings = molecule.rings().len();
        (rings.to_string(), row.symmetrised_rings.to_string())
    });
    assert!(different.is_empty(), "{different:#?}");
}

#[test]
fn aromatic_atoms_are_those_of_rdkit() {
    let different = differing(|row, molecule| {
        let atoms = 0..molecule.atoms().len();
        let flags = atoms.map(|atom| {
            if molecule.is_aromatic_atom(atom) {
                '1'
            } else {
                '0'
            }
        });
        (flags.collect(), row.aromatic_atoms.clone())
    });
    assert!(different.is_empty(), "{different:#?}");
}
