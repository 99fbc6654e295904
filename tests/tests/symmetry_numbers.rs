//! Symmetry numbers of known molecules.

use std::collections::BTreeSet;

use serde::Deserialize;
use tautring_report::structure::Structure;
use tautring_tests::folder::{reference, top};
use tautring_tests::random::XorShift;
use tautring_tests::renumber::renumber;
use tautring_tests::table::rows;

/// External times internal symmetry numbers, from the point group and the rotors as in `benson-1976`; by hand.
const SYMMETRY_NUMBERS: &[(&str, u64, &str)] = &[
    ("C", 12, "Td"),
    ("CC", 18, "6 · 3"),
    ("CCC", 18, "2 · 3²"),
    ("CCCC", 18, "2 · 3²"),
    ("CC(C)C", 81, "3 · 3³"),
    ("CC(C)(C)C", 972, "12 · 3⁴"),
    ("CC(C)C(C)C", 162, "2 · 3⁴"),
    ("CC(C)(C)C(C)(C)C", 13122, "6 · 3 · 3⁶"),
    ("CCC(C)CC", 27, "3³"),
    ("C=C", 4, "D2h"),
    ("C#C", 2, "linear, like ends"),
    ("C=C=C", 4, "D2d"),
    ("C=C=O", 2, "C2v"),
    ("CC=C", 3, "3"),
    ("CC(C)=C", 18, "2 · 3²"),
    ("C/C=C/C", 18, "2 · 3²"),
    ("C/C=C\\C", 18, "2 · 3²"),
    ("CC=C(C)C", 27, "no exchange of the two methyls at one end"),
    ("CC(C)=C(C)C", 324, "4 · 3⁴"),
    ("C=CC=C", 2, "C2h, C2v"),
    ("c1ccccc1", 12, "D6h"),
    ("Cc1ccccc1", 6, "3 · 2"),
    ("Cc1ccc(C)cc1", 36, "4 · 3²"),
    ("Cc1cc(C)cc(C)c1", 162, "6 · 3³"),
    ("CC(C)(C)c1ccccc1", 162, "3 · 2 · 3³"),
    ("c1ccc(cc1)-c1ccccc1", 8, "4 · 2"),
    ("c1ccc2ccccc2c1", 4, "D2h"),
    ("C1CC1", 6, "D3h"),
    ("C1CCC1", 8, "D4h on average"),
    ("C1CCCC1", 10, "D5h on average"),
    (
        "C1CCCCC1",
        12,
        "D6h on average; the chair has 6, and there are two",
    ),
    ("CC1(C)CC1", 18, "2 · 3²"),
    ("C1CC12CC2", 4, "D2d"),
    ("C1CO1", 2, "C2v"),
    ("CC1CO1", 3, "3"),
    ("C1CC2CCC1C2", 2, "C2v"),
    ("C1CC2CCC1CC2", 6, "D3h on average"),
    ("C1C2CC12", 2, "C2v"),
    ("C12C3C4C1C5C2C3C45", 24, "Oh"),
    ("C1C2CC3CC1CC(C2)C3", 12, "Td"),
    ("C12C3C1C1C2C31", 6, "D3h"),
    ("C=C1CC1", 2, "C2v"),
    ("C1N2CCN(C1)CC2", 6, "D3h on average"),
    ("CN(C)C", 81, "3 · 3³"),
    ("CNC", 9, "3²"),
    ("CN", 3, "3"),
    ("CC(C)=O", 18, "2 · 3²"),
    ("COC", 18, "2 · 3²"),
    ("CS(C)(=O)=O", 18, "2 · 3²"),
    ("ClC(Cl)(Cl)Cl", 12, "Td"),
    ("FC(F)(F)C(F)(F)F", 18, "6 · 3"),
    ("ClCCl", 2, "C2v"),
    (
        "O[C@H](C(=O)O)[C@H](O)C(=O)O",
        2,
        "one of the pair of mirror images, C2",
    ),
    (
        "O[C@H](C(=O)O)[C@@H](O)C(=O)O",
        1,
        "meso: only a mirror exchanges the halves",
    ),
];

#[test]
fn symmetry_numbers_are_those_of_the_point_group_and_the_rotors() {
    let wrong: Vec<String> = SYMMETRY_NUMBERS
        .iter()
        .filter_map(|&(smiles, expected, why)| {
            let structure =
                Structure::from_smiles(smiles).unwrap_or_else(|e| panic!("{smiles}: {e}"));
            let found = structure.molecule.symmetry_number();
            (found != Ok(expected)).then(|| format!("{smiles}: {found:?}, not {expected} ({why})"))
        })
        .collect();
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[derive(Deserialize)]
struct Row {
    smiles: String,
}

/// Every structure of the data, and those of the varied ones that can be read, in three other orders of their atoms.
#[test]
fn symmetry_numbers_do_not_depend_on_the_order_of_the_atoms() {
    let tables = [
        top().join("data/measurements.csv"),
        top().join("data/gas_entropies.csv"),
        reference("varied.csv"),
    ];
    let all = tables.iter().flat_map(|path| rows::<Row>(path));
    let all: BTreeSet<String> = all.map(|row| row.smiles).collect();
    let mut random = XorShift::new(7);
    let mut checked = 0;
    let mut wrong = Vec::new();
    for smiles in all {
        let Ok(structure) = Structure::from_smiles(&smiles) else {
            continue;
        };
        let first = structure.molecule.symmetry_number();
        for _ in 0..3 {
            let other = renumber(&structure.molecule, &mut random).symmetry_number();
            if first.is_err() || first != other {
                wrong.push(format!("{smiles}: {first:?}, {other:?}"));
            }
        }
        checked += 1;
    }
    assert!(checked > 3000, "{checked}");
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}
