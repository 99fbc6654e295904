//! One molecule, one answer: every order of the atoms and every spelling of every measured molecule gives the same bits.
//!
//! `tests/rdkit_spellings.py` makes the reference files.

use std::collections::{BTreeMap, BTreeSet};
use std::fs;

use serde::Deserialize;
use tautring_report::structure::{HostMolecule, Structure, identity};
use tautring_tests::features::{estimate, fingerprint};
use tautring_tests::folder::{reference, top};
use tautring_tests::random::XorShift;
use tautring_tests::renumber::renumber;
use tautring_tests::table::rows;

const SEED: u64 = 0x0001_b1f5_ca1e_5eed;

/// How often each molecule is renumbered.
const ORDERS: usize = 3;

#[derive(Deserialize)]
struct Measurement {
    smiles: String,
    phase: String,
}

#[derive(Deserialize)]
struct Spelling {
    smiles: String,
    kind: String,
    #[serde(rename = "spelling")]
    respelled: String,
}

fn measured() -> BTreeSet<String> {
    let table: Vec<Measurement> = rows(&top().join("data/measurements.csv"));
    let formation = table
        .into_iter()
        .filter(|row| ["g", "l", "s"].contains(&row.phase.as_str()));
    formation.map(|row| row.smiles).collect()
}

fn spellings() -> Vec<Spelling> {
    rows(&reference("spellings.csv"))
}

/// The molecule, or nothing for the ammonium halides: pairs of ions that reactions need as partners.
fn read(smiles: &str) -> Option<HostMolecule> {
    if smiles.contains('.') {
        return None;
    }
    let structure = Structure::from_smiles(smiles);
    Some(
        structure
            .unwrap_or_else(|e| panic!("{smiles}: {e}"))
            .molecule,
    )
}

#[test]
fn every_measured_molecule_is_spelled_anew() {
    let spelled: BTreeSet<String> = spellings().into_iter().map(|row| row.smiles).collect();
    let measured = measured();
    let stale: Vec<_> = spelled.symmetric_difference(&measured).collect();
    assert!(
        stale.is_empty(),
        "remake tests/reference/spellings.csv by tests/rdkit_spellings.py: {stale:?}"
    );
    let mut kinds: BTreeMap<String, usize> = BTreeMap::new();
    for row in spellings() {
        *kinds.entry(row.kind).or_default() += usize::from(row.respelled != row.smiles);
    }
    println!("spellings that differ from the given one: {kinds:?}");
    assert!(kinds["nitro"] > 50 && kinds["kekule"] > 1000);
}

/// Equal strings in the data mean the same molecule, so different strings must mean different ones.
#[test]
fn different_molecules_have_different_identities() {
    let molecules: Vec<_> = measured().iter().filter_map(|s| read(s)).collect();
    let identities: BTreeSet<String> = molecules.iter().map(identity).collect();
    assert_eq!(identities.len(), molecules.len());
}

#[test]
fn any_order_of_the_atoms_gives_the_same_bits() {
    let mut random = XorShift::new(SEED);
    let mut different = Vec::new();
    for smiles in measured() {
        let Some(molecule) = read(&smiles) else {
            continue;
        };
        let (expected, key) = (fingerprint(&molecule), identity(&molecule));
        for order in 0..ORDERS {
            let other = renumber(&molecule, &mut random);
            if fingerprint(&other) != expected || identity(&other) != key {
                different.push(format!("{smiles} order {order}"));
            }
        }
    }
    assert!(different.is_empty(), "seed {SEED:#x}: {different:#?}");
}

#[test]
fn any_spelling_gives_the_same_bits() {
    let mut different = Vec::new();
    for row in spellings() {
        let (Some(given), Some(respelled)) = (read(&row.smiles), read(&row.respelled)) else {
            continue;
        };
        // Equal features give equal uncertainties; one spelling in four is carried that far all the same.
        let carried = row.kind == "order";
        if fingerprint(&given) != fingerprint(&respelled)
            || identity(&given) != identity(&respelled)
            || carried && estimate(&given) != estimate(&respelled)
        {
            different.push(format!("{}: {} {}", row.kind, row.smiles, row.respelled));
        }
    }
    assert!(different.is_empty(), "{different:#?}");
}

#[test]
fn a_drawing_gives_the_same_bits() {
    let text = fs::read_to_string(reference("spellings.sdf")).expect("the drawings are there");
    let mut different = Vec::new();
    let mut drawings = 0;
    for record in text.split_terminator("$$$$\n") {
        let drawn = Structure::from_molfile(record).unwrap_or_else(|e| panic!("{e}\n{record}"));
        let given = read(&drawn.name).expect("single molecules are drawn");
        drawings += 1;
        if fingerprint(&given) != fingerprint(&drawn.molecule)
            || identity(&given) != identity(&drawn.molecule)
        {
            different.push(drawn.name);
        }
    }
    assert!(drawings > 140, "only {drawings} drawings");
    assert!(different.is_empty(), "{different:#?}");
}
