//! Reactions that define strain: balanced for every ring molecule of the data and of the varied structures, independent of the order of the atoms, and those that
//! were published spelled out.

use std::collections::{BTreeMap, BTreeSet};

use serde::Deserialize;
use tautring_core::additivity::fitted::{FITTED, WORKSPACE};
use tautring_core::molecule::Formula;
use tautring_core::reactions::{
    Balance, Difference, ReactionClass, ReactionError, carbon_free_enthalpies, species,
};
use tautring_report::review::Reviewer;
use tautring_report::structure::{HostMolecule, MAX_ATOMS, MAX_BONDS, Structure, line_notation};
use tautring_tests::folder::{reference, top};
use tautring_tests::random::XorShift;
use tautring_tests::renumber::renumber;
use tautring_tests::table::rows;

#[derive(Deserialize)]
struct Row {
    name: String,
    smiles: String,
    phase: String,
    value_kj_per_mol: f64,
    u_kj_per_mol: f64,
    source: String,
    #[serde(rename = "use")]
    usage: String,
}

fn table() -> Vec<Row> {
    rows(&top().join("data/measurements.csv"))
}

fn molecule(smiles: &str) -> HostMolecule {
    let read = Structure::from_smiles(smiles);
    read.unwrap_or_else(|e| panic!("{smiles}: {e}")).molecule
}

#[derive(Deserialize)]
struct Varied {
    smiles: String,
    outcome: String,
}

/// Structures of the data in every phase, and the varied ones that `estimate` answers.
fn structures() -> BTreeSet<String> {
    let varied: Vec<Varied> = rows(&reference("varied.csv"));
    let varied = varied.into_iter().filter(|row| row.outcome == "answered");
    let data = table().into_iter().map(|row| row.smiles);
    data.chain(varied.map(|row| row.smiles)).collect()
}

/// Structures without a reaction, each with the reason.
const NO_REACTION: &[(&str, &str)] = &[(
    "C1=CC(=C2C=CC=C[N+]2=O)N(C=C1)[O-]",
    "opposite charges on atoms that are not neighbours come into different pieces",
)];

/// Partners of a molecule with their numbers.
fn partners(
    molecule: &HostMolecule,
    system: usize,
    class: ReactionClass,
) -> Result<Vec<(i32, HostMolecule)>, ReactionError> {
    let mut found = Vec::new();
    species::<MAX_ATOMS, MAX_BONDS, MAX_ATOMS, MAX_BONDS>(molecule, system, class, &mut |n, m| {
        found.push((n, m.clone()));
        Ok(())
    })?;
    Ok(found)
}

/// Numbers by SMILES.
fn equation(molecule: &HostMolecule, system: usize, class: ReactionClass) -> BTreeMap<String, i32> {
    let found = partners(molecule, system, class).unwrap_or_else(|e| panic!("{e}"));
    let listed = found.len();
    let equation: BTreeMap<_, _> = found
        .into_iter()
        .map(|(n, m)| (line_notation(&m), n))
        .collect();
    assert_eq!(equation.len(), listed, "a molecule is listed twice");
    equation
}

/// Atoms by element, from a SMILES that is read anew: the account does not rest on the graph that the reaction was built as.
fn enter(account: &mut BTreeMap<&'static str, i64>, number: i32, formula: &Formula) {
    for (element, count) in formula.iter() {
        *account.entry(element.symbol()).or_default() += i64::from(number) * i64::from(count);
    }
}

#[test]
fn every_ring_molecule_balances_in_every_class() {
    let smiles = structures();
    let mut balanced: BTreeMap<&str, BTreeSet<&str>> = BTreeMap::new();
    let mut refused: BTreeMap<&str, ReactionError> = BTreeMap::new();
    for smiles in &smiles {
        // Salts of the reference molecules are not one molecule.
        let Ok(structure) = Structure::from_smiles(smiles) else {
            continue;
        };
        let molecule = structure.molecule;
        for system in 0..molecule.ring_systems().len() {
            for class in ReactionClass::ALL {
                let found = match partners(&molecule, system, class) {
                    Ok(found) => found,
                    Err(ReactionError::NothingToOpen { .. }) => continue,
                    Err(error) => {
                        refused.insert(smiles, error);
                        continue;
                    }
                };
                let mut balance = Balance::new(class);
                let mut elements = BTreeMap::new();
                balance.add(-1, &molecule).expect("room");
                enter(&mut elements, -1, &molecule.formula());
                for (number, partner) in &found {
                    balance.add(*number, partner).expect("room");
                    let again = self::molecule(&line_notation(partner));
                    enter(&mut elements, *number, &again.formula());
                }
                let off: Vec<_> = balance.imbalances().collect();
                assert!(off.is_empty(), "{smiles}, {}: {off:?}", class.name());
                assert!(elements.values().all(|&n| n == 0), "{smiles}: {elements:?}");
                balanced.entry(class.name()).or_default().insert(smiles);
            }
        }
    }
    for (class, molecules) in &balanced {
        println!("{class}: {} ring molecules balance", molecules.len());
        assert!(molecules.len() >= 300, "{class}: {}", molecules.len());
    }
    let known = NO_REACTION.iter().map(|(smiles, _)| *smiles);
    assert!(refused.keys().copied().eq(known), "{refused:#?}");
}

#[test]
fn the_order_of_the_atoms_does_not_matter() {
    let mut random = XorShift::new(20_260_301);
    for smiles in [
        "C1CC2CCC1C2",
        "C1CN1C1CC1",
        "O=C1CCO1",
        "C1Cc2ccccc2C1",
        "C12C3C4C1C5C2C3C45",
        "C=C1CC1CC",
        "C1=CC2C=CC1C2",
    ] {
        let molecule = molecule(smiles);
        let all = |molecule: &HostMolecule| {
            let systems = 0..molecule.ring_systems().len();
            let each = systems.flat_map(|s| ReactionClass::ALL.map(|c| equation(molecule, s, c)));
            let mut each: Vec<_> = each.collect();
            each.sort();
            each
        };
        let expected = all(&molecule);
        for _ in 0..10 {
            assert_eq!(all(&renumber(&molecule, &mut random)), expected, "{smiles}");
        }
    }
}

/// Molecule, class, reactants beside it, products. The reactions for cyclopropane stand in `wheeler-2009` and, with the homodesmotic
/// enthalpy, in many texts; the others follow the definitions of `hehre-1970` and `george-1975` by hand.
const PUBLISHED: &[(&str, ReactionClass, &str, &str)] = &[
    ("C1CC1", ReactionClass::Isodesmic, "3 C", "3 CC"),
    ("C1CC1", ReactionClass::Homodesmotic, "3 CC", "3 CCC"),
    ("C1CC1", ReactionClass::Hyperhomodesmotic, "3 CCC", "3 CCCC"),
    ("C1CCC1", ReactionClass::Isodesmic, "4 C", "4 CC"),
    ("C1CCC1", ReactionClass::Homodesmotic, "4 CC", "4 CCC"),
    (
        "C1CO1",
        ReactionClass::Isodesmic,
        "2 C + 1 O",
        "1 CC + 2 CO",
    ),
    (
        "C1CO1",
        ReactionClass::Homodesmotic,
        "1 CC + 2 CO",
        "2 CCO + 1 COC",
    ),
    ("C1CC2CCC1C2", ReactionClass::Isodesmic, "9 C", "8 CC"),
    (
        "C1CC2CCC1C2",
        ReactionClass::Homodesmotic,
        "8 CC",
        "2 CC(C)C + 5 CCC",
    ),
    ("C1C=C1", ReactionClass::Isodesmic, "3 C", "1 C=C + 2 CC"),
    // A substituent stays: ethylcyclopropane.
    (
        "CCC1CC1",
        ReactionClass::Homodesmotic,
        "3 CC",
        "1 CCC(C)C + 2 CCC",
    ),
    // An aromatic ring stays whole: indane.
    (
        "C1Cc2ccccc2C1",
        ReactionClass::Isodesmic,
        "3 C + 1 c1ccccc1",
        "2 CC + 2 Cc1ccccc1",
    ),
];

#[test]
fn published_reactions_are_built() {
    for (smiles, class, reactants, products) in PUBLISHED {
        let side = |text: &str, sign: i32| {
            let terms: Vec<_> = text
                .split(" + ")
                .map(|term| {
                    let (number, smiles) = term.split_once(' ').expect("a number and a SMILES");
                    let number: i32 = number.parse().expect("a number");
                    (line_notation(&molecule(smiles)), sign * number)
                })
                .collect();
            terms
        };
        let expected: BTreeMap<_, _> = side(reactants, -1)
            .into_iter()
            .chain(side(products, 1))
            .collect();
        assert_eq!(
            equation(&molecule(smiles), 0, *class),
            expected,
            "{smiles}, {}",
            class.name()
        );
    }
}

#[test]
fn each_ring_system_is_opened_alone() {
    // 1-Cyclopropylaziridine, whose two ring systems are numbered by their lowest atoms.
    let molecule = molecule("C1CN1C1CC1");
    let aziridine = equation(&molecule, 0, ReactionClass::Homodesmotic);
    let cyclopropane = equation(&molecule, 1, ReactionClass::Homodesmotic);
    let ring = |equation: &BTreeMap<String, i32>| {
        let rings: Vec<_> = equation
            .keys()
            .filter(|s| s.contains('1'))
            .cloned()
            .collect();
        rings
    };
    assert_eq!(
        ring(&aziridine),
        [line_notation(&self::molecule("CN(C)C1CC1"))]
    );
    assert_eq!(
        ring(&cyclopropane),
        [line_notation(&self::molecule("CC(C)N1CC1"))]
    );
}

/// The core's own strain: the same bits for any order of the atoms, and what the report calls the estimate.
#[test]
fn the_core_gives_the_strain_of_the_report() {
    let reviewer = Reviewer::new().unwrap_or_else(|e| panic!("{e}"));
    let mut random = XorShift::new(20_260_302);
    let mut workspace = vec![0.0; WORKSPACE];
    let mut strain = |molecule: &HostMolecule, class| {
        let difference = Difference::<4096>::strain::<MAX_ATOMS, MAX_BONDS, MAX_ATOMS, MAX_BONDS>(
            molecule, 0, class,
        )
        .unwrap_or_else(|e| panic!("{e}"));
        let estimate = difference.estimate(&FITTED, &mut workspace);
        let estimate = estimate.unwrap_or_else(|e| panic!("{e}"));
        (estimate.value_kj_per_mol, estimate.u_kj_per_mol())
    };
    for smiles in ["C1CC2CCC1C2", "C1NOC1", "C1CNCCOC1", "C1SC1C", "C=C1CC1"] {
        let structure = Structure::from_smiles(smiles).unwrap_or_else(|e| panic!("{e}"));
        let review = reviewer.review(smiles, &structure, &[], false);
        let review = review.unwrap_or_else(|e| panic!("{e}"));
        for class in ReactionClass::ALL {
            let (value, u) = strain(&structure.molecule, class);
            let moved = renumber(&structure.molecule, &mut random);
            let (again, u_again) = strain(&moved, class);
            assert_eq!(value.to_bits(), again.to_bits(), "{smiles}");
            assert_eq!(u.to_bits(), u_again.to_bits(), "{smiles}");
            let mut rows = review.strain_conventions.iter();
            let row = rows.find(|row| row.convention == class.name());
            let reported = row.and_then(|row| row.estimate);
            let reported = reported.unwrap_or_else(|| panic!("{smiles}: no {}", class.name()));
            // The report solves for the weights, the core for the value: rounding errors of sums over a thousand measurements.
            assert!((reported.value_kj_per_mol - value).abs() < 1e-6, "{smiles}");
            assert!((reported.u_kj_per_mol - u).abs() < 1e-6, "{smiles}");
        }
    }
}

#[test]
fn aromatic_rings_have_nothing_to_open() {
    for smiles in ["c1ccccc1", "c1ccc2ccccc2c1", "c1cc[nH]c1"] {
        for class in ReactionClass::ALL {
            let found = partners(&molecule(smiles), 0, class);
            assert!(
                matches!(found, Err(ReactionError::NothingToOpen { system: 0 })),
                "{smiles}"
            );
        }
    }
}

/// The values without carbon in the core are those of the data.
#[test]
fn values_without_carbon_are_those_of_the_data() {
    let table = table();
    for known in carbon_free_enthalpies() {
        let same = table.iter().find(|row| {
            row.phase == "g"
                && row.usage == "reference"
                && row.source == known.source
                && row.value_kj_per_mol.to_bits() == known.value_kj_per_mol.to_bits()
        });
        let row = same.unwrap_or_else(|| panic!("{known:?} is not in the data"));
        println!("{}: {} in the data", known.name, row.name);
        assert_eq!(
            row.u_kj_per_mol.to_bits(),
            known.u_kj_per_mol.to_bits(),
            "{}",
            known.name
        );
    }
}
