//! Rings and aromaticity of about 700 molecules against `RDKit` and a brute-force count, and in any atom order.
//!
//! `tests/rdkit_perception.py` makes the reference file.

use std::collections::BTreeSet;

use tautring_core::molecule::{Atom, BondOrder, Element, Molecule, MoleculeBuilder};
use tautring_tests::random::XorShift;

/// How often each molecule is renumbered.
const ORDERS: u64 = 5;
const SEED: u64 = 0x005e_ed0f_0123_4567;

struct Row {
    smiles: String,
    relevant_sizes: Vec<usize>,
    symmetrised_rings: usize,
    aromatic_atoms: Vec<bool>,
    aromatic_bonds: usize,
    atoms: Vec<Atom>,
    bonds: Vec<(usize, usize, BondOrder)>,
}

fn reference() -> Vec<Row> {
    let text = include_str!("../reference/perception.csv");
    text.lines().skip(1).map(row).collect()
}

fn row(line: &str) -> Row {
    let fields: Vec<_> = line.split(',').collect();
    let [
        smiles,
        _,
        sizes,
        symmetrised,
        atom_flags,
        bond_count,
        atoms,
        bonds,
    ] = fields[..]
    else {
        panic!("eight fields: {line}");
    };
    Row {
        smiles: smiles.into(),
        relevant_sizes: sizes
            .split_whitespace()
            .map(|s| s.parse().unwrap())
            .collect(),
        symmetrised_rings: symmetrised.parse().unwrap(),
        aromatic_atoms: atom_flags.chars().map(|c| c == '1').collect(),
        aromatic_bonds: bond_count.parse().unwrap(),
        atoms: atoms.split_whitespace().map(atom).collect(),
        bonds: bonds.split_whitespace().map(bond).collect(),
    }
}

fn atom(text: &str) -> Atom {
    let mut parts = text.split(':');
    Atom {
        element: Element::from_symbol(parts.next().unwrap()).unwrap(),
        charge: parts.next().unwrap().parse().unwrap(),
        hydrogens: parts.next().unwrap().parse().unwrap(),
        isotope: 0,
    }
}

fn bond(text: &str) -> (usize, usize, BondOrder) {
    let (ends, order) = text.split_once(':').unwrap();
    let (first, second) = ends.split_once('-').unwrap();
    let order = match order {
        "1" => BondOrder::Single,
        "2" => BondOrder::Double,
        "3" => BondOrder::Triple,
        _ => panic!("bond order {order}"),
    };
    (first.parse().unwrap(), second.parse().unwrap(), order)
}

fn molecule(atoms: &[Atom], bonds: &[(usize, usize, BondOrder)]) -> Molecule<128, 160> {
    let mut builder = MoleculeBuilder::new();
    for &atom in atoms {
        builder.add_atom(atom).unwrap();
    }
    for &(first, second, order) in bonds {
        builder.add_bond(first, second, order).unwrap();
    }
    builder.finish().unwrap()
}

fn aromatic_atoms(molecule: &Molecule<128, 160>) -> Vec<bool> {
    let atoms = 0..molecule.atoms().len();
    atoms.map(|atom| molecule.is_aromatic_atom(atom)).collect()
}

#[test]
fn relevant_rings_are_those_of_the_brute_force_count() {
    for row in reference() {
        let found = molecule(&row.atoms, &row.bonds);
        let sizes: Vec<_> = found.rings().iter().map(<[u16]>::len).collect();
        assert_eq!(sizes, row.relevant_sizes, "{}", row.smiles);
    }
}

/// By definition the two sets differ: `RDKit` completes a smallest set by those rings of equal size that its search meets.
/// On these molecules they are of one size.
#[test]
fn relevant_rings_are_as_many_as_the_symmetrised_smallest_rings_of_rdkit() {
    for row in reference() {
        let relevant = molecule(&row.atoms, &row.bonds).rings().len();
        assert_eq!(relevant, row.symmetrised_rings, "{}", row.smiles);
    }
}

#[test]
fn aromaticity_is_that_of_rdkit() {
    let mut failures = Vec::new();
    for row in reference() {
        let found = molecule(&row.atoms, &row.bonds);
        let bonds = (0..row.bonds.len())
            .filter(|&bond| found.is_aromatic_bond(bond))
            .count();
        if aromatic_atoms(&found) != row.aromatic_atoms || bonds != row.aromatic_bonds {
            failures.push(format!(
                "{} {bonds} bonds, RDKit {}",
                row.smiles, row.aromatic_bonds
            ));
        }
    }
    assert!(failures.is_empty(), "{failures:#?}");
}

#[test]
fn any_atom_order_and_kekule_structure_gives_the_same_rings_and_aromatic_atoms() {
    println!("seed {SEED:#x}");
    let mut random = XorShift::new(SEED);
    for row in reference() {
        let original = molecule(&row.atoms, &row.bonds);
        let rings = ring_sets(&original, |atom| atom);
        for _ in 0..ORDERS {
            let mut order: Vec<usize> = (0..row.atoms.len()).collect();
            random.shuffle(&mut order);
            let place = |atom: usize| order.iter().position(|&old| old == atom).unwrap();
            let atoms: Vec<_> = order.iter().map(|&old| row.atoms[old]).collect();
            let mut bonds = row.bonds.clone();
            shift_double_bonds(&original, &mut bonds, &mut random);
            for (first, second, _) in &mut bonds {
                (*first, *second) = (place(*first), place(*second));
            }
            random.shuffle(&mut bonds);
            let renumbered = molecule(&atoms, &bonds);
            assert_eq!(
                ring_sets(&renumbered, |atom| order[atom]),
                rings,
                "{}",
                row.smiles
            );
            let aromatic = aromatic_atoms(&renumbered);
            for (atom, expected) in aromatic_atoms(&original).into_iter().enumerate() {
                assert_eq!(
                    aromatic[place(atom)],
                    expected,
                    "{} atom {atom}",
                    row.smiles
                );
            }
        }
    }
}

/// The rings as sets of bonds between the original atoms.
fn ring_sets(
    molecule: &Molecule<128, 160>,
    original: impl Fn(usize) -> usize,
) -> BTreeSet<BTreeSet<(usize, usize)>> {
    let ring_set = |ring: &[u16]| {
        let next = ring.iter().cycle().skip(1);
        let bonds = ring.iter().zip(next).map(|(&a, &b)| {
            let (a, b) = (original(a.into()), original(b.into()));
            (a.min(b), a.max(b))
        });
        bonds.collect()
    };
    molecule.rings().iter().map(ring_set).collect()
}

/// Exchanges single and double bonds, at random, around rings in which they alternate.
fn shift_double_bonds(
    molecule: &Molecule<128, 160>,
    bonds: &mut [(usize, usize, BondOrder)],
    random: &mut XorShift,
) {
    for ring in molecule.rings().iter() {
        let next = ring.iter().cycle().skip(1);
        let around: Vec<usize> = ring
            .iter()
            .zip(next)
            .map(|(&a, &b)| {
                let neighbours = molecule.neighbours(a.into());
                neighbours.iter().find(|n| n.atom == b).unwrap().bond.into()
            })
            .collect();
        let orders: Vec<_> = around.iter().map(|&bond| bonds[bond].2).collect();
        let alternate = orders.len() % 2 == 0
            && orders.iter().all(|&order| order != BondOrder::Triple)
            && (0..orders.len()).all(|k| orders[k] != orders[(k + 1) % orders.len()]);
        if alternate && random.coin() {
            for (k, bond) in around.iter().enumerate() {
                bonds[*bond].2 = orders[(k + 1) % orders.len()];
            }
        }
    }
}
