//! Structures against `RDKit`: stereo marks, spellings, Molfiles. The reference files are written by `tests/rdkit_molfiles.py`.

use std::collections::{BTreeMap, BTreeSet};
use std::fs;
use std::path::PathBuf;

use tautring_core::molecule::{Ligand, TetrahedralStereo};
use tautring_report::structure::{Structure, identity, skeleton};

fn reference(name: &str) -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR"))
        .join("reference")
        .join(name)
}

fn table(name: &str) -> Vec<Vec<String>> {
    let text = fs::read_to_string(reference(name)).unwrap();
    let lines = text.lines().filter(|line| !line.starts_with('#'));
    lines
        .map(|line| line.split('\t').map(str::to_owned).collect())
        .collect()
}

fn key(smiles: &str) -> String {
    identity(
        &Structure::from_smiles(smiles)
            .unwrap_or_else(|e| panic!("{smiles}: {e}"))
            .molecule,
    )
}

/// Whether the mark is clockwise for its ligands in this order.
fn clockwise_in(mark: &TetrahedralStereo, order: &[Ligand]) -> bool {
    let place = |ligand: &Ligand| order.iter().position(|o| o == ligand).unwrap();
    let places = mark.ligands.map(|l| place(&l));
    let swaps = (0..4)
        .map(|i| (i + 1..4).filter(|&j| places[i] > places[j]).count())
        .sum::<usize>();
    mark.clockwise ^ (swaps % 2 == 1)
}

#[test]
fn stereo_marks_are_those_of_rdkit() {
    let mut expected: BTreeMap<String, usize> = BTreeMap::new();
    // Random spellings repeat.
    let rows: BTreeSet<Vec<String>> = table("stereo_marks.tsv").into_iter().collect();
    for row in rows {
        let [smiles, kind, atoms, mark] = row.try_into().unwrap();
        *expected.entry(smiles.clone()).or_default() += 1;
        let molecule = Structure::from_smiles(&smiles).unwrap().molecule;
        let atoms: Vec<u16> = atoms.split(',').map(|a| a.parse().unwrap()).collect();
        if kind == "tetrahedral" {
            let ours = molecule.tetrahedral().iter().find(|m| m.centre == atoms[0]);
            let ours = ours.unwrap_or_else(|| panic!("{smiles}: no mark on atom {}", atoms[0]));
            // RDKit sees the first neighbour first and an implicit hydrogen last.
            let mut order: Vec<Ligand> = atoms[1..].iter().map(|&a| Ligand::Atom(a)).collect();
            order.resize(4, Ligand::Implicit);
            assert_eq!(
                clockwise_in(ours, &order),
                mark == "clockwise",
                "{smiles} atom {}",
                atoms[0]
            );
        } else {
            let [a, b, one, two] = atoms[..] else {
                panic!("{smiles}")
            };
            let (index, bond) = molecule
                .bonds()
                .iter()
                .enumerate()
                .find(|(_, d)| d.atoms == [a, b] || d.atoms == [b, a])
                .unwrap();
            let mut rings = molecule.rings().iter();
            let in_ring = rings.any(|ring| [a, b, one, two].iter().all(|a| ring.contains(a)));
            if in_ring && molecule.bond_ring_sizes(index).contains(8) && mark == "same" {
                // RDKit keeps the mark of a cis double bond in a ring of eight; here the ring settles it.
                assert_eq!(bond.stereo, None, "{smiles}");
                *expected.entry(smiles).or_default() -= 1;
                continue;
            }
            let ours = bond
                .stereo
                .unwrap_or_else(|| panic!("{smiles}: no mark on the double bond"));
            let references = [ours.first_reference, ours.second_reference];
            let turned = references.iter().filter(|&&r| r != one && r != two).count() == 1;
            assert_eq!(ours.same_side ^ turned, mark == "same", "{smiles}");
        }
    }
    for (smiles, count) in expected {
        let molecule = Structure::from_smiles(&smiles).unwrap().molecule;
        let double = molecule
            .bonds()
            .iter()
            .filter(|b| b.stereo.is_some())
            .count();
        assert_eq!(molecule.tetrahedral().len() + double, count, "{smiles}");
    }
}

#[test]
fn every_spelling_is_one_molecule_and_no_two_molecules_are_one() {
    let mut seen: BTreeMap<String, String> = BTreeMap::new();
    for row in table("smiles_spellings.tsv") {
        let own = key(&row[1]);
        for spelling in &row[2..] {
            assert_eq!(own, key(spelling), "{}: {spelling}", row[0]);
        }
        if let Some(other) = seen.insert(own, row[0].clone()) {
            panic!("{other} and {} have one key", row[0]);
        }
    }
    assert!(seen.len() > 30);
}

#[test]
fn molfiles_are_the_molecules_of_their_smiles() {
    for row in table("smiles_spellings.tsv") {
        let own = key(&row[1]);
        for form in ["flat.v2000", "flat.v3000", "solid"] {
            let text =
                fs::read_to_string(reference(&format!("molfiles/{}.{form}.mol", row[0]))).unwrap();
            let read =
                Structure::from_molfile(&text).unwrap_or_else(|e| panic!("{} {form}: {e}", row[0]));
            assert_eq!(identity(&read.molecule), own, "{} {form}", row[0]);
            assert_eq!(read.name, row[0]);
            let coordinates = read.coordinates.unwrap();
            assert_eq!(coordinates.positions.len(), read.molecule.atoms().len());
            assert_eq!(coordinates.three_dimensional, form == "solid");
        }
    }
}

#[test]
fn the_skeleton_forgets_configurations_and_isotopes() {
    let plain = |smiles: &str| skeleton(&Structure::from_smiles(smiles).unwrap().molecule).unwrap();
    assert_eq!(plain("C/C=C/C"), plain("C/C=C\\C"));
    assert_eq!(plain("[2H]C1CO1"), plain("C1CO1"));
    assert_eq!(plain("[13CH2]1CO1"), plain("C1CO1"));
    assert_eq!(plain("C[C@H]1CO1"), plain("C[C@@H]1CO1"));
    assert_ne!(plain("C1CO1"), plain("CC=O"));
    assert_ne!(key("C/C=C/C"), key("C/C=C\\C"));
}
