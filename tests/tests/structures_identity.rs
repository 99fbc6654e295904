//! The canonical order on graphs that are hard for it, and the flags of open configurations.

use std::time::Instant;

use tautring_core::molecule::{Atom, BondOrder, Element, MoleculeBuilder};
use tautring_report::structure::{HostMolecule, Structure, identity};

fn flags(smiles: &str) -> Vec<String> {
    let structure = Structure::from_smiles(smiles).unwrap_or_else(|e| panic!("{smiles}: {e}"));
    structure.flag.map_or(Vec::new(), |flag| flag.labels)
}

/// The molecule with its atoms in a pseudo-random order.
fn shuffled(molecule: &HostMolecule, seed: u64) -> HostMolecule {
    let n = molecule.atoms().len();
    let mut order: Vec<usize> = (0..n).collect();
    let mut state = seed;
    for i in (1..n).rev() {
        // Knuth's multiplicative congruential step; its high bits are even enough for a shuffle.
        state = state
            .wrapping_mul(6_364_136_223_846_793_005)
            .wrapping_add(1_442_695_040_888_963_407);
        order.swap(i, (state >> 33) as usize % (i + 1));
    }
    let mut place = vec![0; n];
    let mut builder = MoleculeBuilder::new();
    for &atom in &order {
        place[atom] = builder.add_atom(molecule.atoms()[atom]).unwrap();
    }
    for bond in molecule.bonds() {
        let [a, b] = bond.atoms.map(|atom| place[usize::from(atom)]);
        builder.add_bond(a, b, bond.order).unwrap();
    }
    builder.finish().unwrap()
}

/// A saturated cage of CH groups with these bonds.
fn cage(bonds: &[(usize, usize)]) -> HostMolecule {
    let n = bonds.iter().map(|&(a, b)| a.max(b)).max().unwrap() + 1;
    let mut builder = MoleculeBuilder::new();
    for _ in 0..n {
        let atom = Atom {
            element: Element::C,
            charge: 0,
            hydrogens: 1,
            isotope: 0,
        };
        builder.add_atom(atom).unwrap();
    }
    for &(a, b) in bonds {
        builder.add_bond(a, b, BondOrder::Single).unwrap();
    }
    builder.finish().unwrap()
}

/// The truncated icosahedron: each vertex of the icosahedron becomes a five-membered ring.
fn truncated_icosahedron() -> Vec<(usize, usize)> {
    let golden = f64::midpoint(1.0, 5_f64.sqrt());
    let mut vertices = Vec::new();
    for (a, b) in [
        (1.0, golden),
        (1.0, -golden),
        (-1.0, golden),
        (-1.0, -golden),
    ] {
        vertices.extend([[0.0, a, b], [a, b, 0.0], [b, 0.0, a]]);
    }
    let adjacent = |i: usize, j: usize| {
        let squares = (0..3).map(|k| (vertices[i][k] - vertices[j][k]).powi(2));
        (squares.sum::<f64>() - 4.0).abs() < 1e-9
    };
    let directed: Vec<(usize, usize)> = (0..12)
        .flat_map(|i| (0..12).map(move |j| (i, j)))
        .filter(|&(i, j)| adjacent(i, j))
        .collect();
    let mut bonds = Vec::new();
    for (x, &(i, j)) in directed.iter().enumerate() {
        for (y, &(k, l)) in directed.iter().enumerate().skip(x + 1) {
            if (i == k && adjacent(j, l)) || (i == l && j == k) {
                bonds.push((x, y));
            }
        }
    }
    bonds
}

#[test]
fn every_order_of_the_atoms_gives_one_key() {
    let dodecahedrane = "C12C3C4C5C1C6C7C2C8C3C9C4C%10C5C6C%11C7C8C9C%10%11";
    for smiles in [
        "C12C3C4C1C5C2C3C45",
        "C12C3C1C4C5C2C5C34",
        "C1C2CC3CC1CC(C2)C3",
        dodecahedrane,
        "CC(C)(C)C(C(C)(C)C)(C(C)(C)C)C(C)(C)C",
        "FC(F)(F)C(F)(F)C(F)(F)C(F)(F)F",
        "O=C1C(=O)C(=O)C(=O)C(=O)C1=O",
    ] {
        let molecule = Structure::from_smiles(smiles).unwrap().molecule;
        assert!(molecule.canonical_order().exact);
        let own = identity(&molecule);
        for seed in 0..20 {
            assert_eq!(
                own,
                identity(&shuffled(&molecule, seed)),
                "{smiles}, seed {seed}"
            );
        }
    }
}

#[test]
fn the_sixty_atom_cage_takes_little_time() {
    let bonds = truncated_icosahedron();
    assert_eq!(bonds.len(), 90);
    let molecule = cage(&bonds);
    let start = Instant::now();
    let order = molecule.canonical_order();
    let elapsed = start.elapsed();
    assert!(order.exact);
    assert_eq!(identity(&molecule), identity(&shuffled(&molecule, 3)));
    println!("C60H60: {elapsed:?}");
}

#[test]
fn regular_graphs_that_refinement_cannot_tell_apart_differ() {
    // Two six-rings joined like a prism, against the same atoms as one Möbius ladder: all atoms alike in both.
    let ring = |n: usize| (0..n).map(move |i| (i, (i + 1) % n));
    let mut prism: Vec<_> = ring(6).collect();
    prism.extend(ring(6).map(|(a, b)| (a + 6, b + 6)));
    prism.extend((0..6).map(|i| (i, i + 6)));
    let mut moebius: Vec<_> = ring(12).collect();
    moebius.extend((0..6).map(|i| (i, i + 6)));
    assert_ne!(identity(&cage(&prism)), identity(&cage(&moebius)));
}

#[test]
fn open_configurations_are_flagged_where_they_matter() {
    for (smiles, expected) in [
        ("CC=CC", &["C2=C3"][..]),
        ("C/C=C/C", &[]),
        ("CC(C)=CC", &[]),
        ("C1CCCC=C1", &[]),
        // Up to eight ring atoms a double bond without a mark is cis.
        ("C1CCCCCC=C1", &[]),
        ("C1=CC=CC=CC=C1", &[]),
        ("C1CCCCCCC=C1", &["C8=C9"]),
        ("CC=NO", &["C2=N3"]),
        ("CC=N", &[]),
        ("CC=C=CC", &[]),
        ("CC1CO1", &[]),
        ("CC1OC1C", &["C2", "C4"]),
        ("C[C@@H]1OC1C", &["C4"]),
        ("C[C@@H]1O[C@@H]1C", &[]),
        ("CC1CCC(C)CC1", &["C2", "C5"]),
        ("CC1CCCCC1", &[]),
        ("C1CCC2CCCCC2C1", &["C4", "C9"]),
        ("C1C2CC12", &[]),
        ("C1CC2CCC1C2", &[]),
        ("CC1CC2CCC1C2", &["C2"]),
        ("CC1C2CCC1CC2", &[]),
        ("CC1C2CCC1C=C2", &["C2"]),
        ("C12C3C4C1C5C2C3C45", &[]),
        ("C1CC2CC12", &[]),
        ("CC(O)C(C)O", &["C2", "C4"]),
        ("CC(O)C(C)C=CC", &["C2", "C4", "C6=C7"]),
        // The two like CH2 of a spiro atom close a ring without another centre; the lone centre has enantiomers only.
        ("OC(=O)C1CC12CC2", &[]),
        ("CCOC(=O)C1CC12CC2", &[]),
        ("CC1CC12CC2C", &["C2", "C6"]),
        // The ring of the like ligands holds the other centre: cis or trans to the spiro atom's branches, which differ.
        ("CC1CCC2(CC1)CC2C", &["C2", "C5", "C9"]),
        ("CC1CCC2(CC1)CC2", &[]),
        // The spiro atoms would be the only partners of the alcohol's carbon, and are themselves no centres.
        ("OC1CC2(CC2)C3(CC3)C1", &[]),
    ] {
        assert_eq!(flags(smiles), expected, "{smiles}");
    }
}

#[test]
fn idle_marks_are_dropped_and_telling_ones_kept() {
    let key = |smiles: &str| identity(&Structure::from_smiles(smiles).unwrap().molecule);
    assert_eq!(key("C[C@H](C)F"), key("CC(C)F"));
    assert_eq!(key("C/C(C)=C/C"), key("CC(C)=CC"));
    assert_eq!(key("C[C@H]1CCC(C)CC1"), key("CC1CCC(C)CC1"));
    assert_ne!(key("C[C@H]1CC[C@@H](C)CC1"), key("C[C@H]1CC[C@H](C)CC1"));
    assert_eq!(key("C[C@H]1CC[C@H](C)CC1"), key("C[C@@H]1CC[C@@H](C)CC1"));
    // Xylitol and ribitol differ in the middle alone; in arabinitol the middle mark says nothing.
    assert_ne!(
        key("OC[C@H](O)[C@@H](O)[C@H](O)CO"),
        key("OC[C@H](O)[C@H](O)[C@H](O)CO")
    );
    assert_eq!(
        key("OC[C@H](O)[C@@H](O)[C@@H](O)CO"),
        key("OC[C@H](O)[C@H](O)[C@@H](O)CO")
    );
    assert_eq!(key("C1[C@H]2C[C@@H]12"), key("C1C2CC12"));
}

#[test]
fn rings_of_up_to_eight_settle_cis_double_bonds() {
    let key = |smiles: &str| identity(&Structure::from_smiles(smiles).unwrap().molecule);
    assert_eq!(key("C1=CC=CC=CC=C1"), key(r"C1=C\C=C/C=C\C=C/1"));
    assert_eq!(key("C1CCCCCC=C1"), key(r"C1CCC/C=C\CC1"));
    assert_ne!(key("C1CCCCCC=C1"), key("C1CCC/C=C/CC1"));
    // The mark may be told by a substituent outside the ring: that of the first is trans to the ring, of the second cis.
    assert_eq!(key("CC1=CCCCCCC1"), key(r"C/C1=C/CCCCCC1"));
    assert_ne!(key("CC1=CCCCCCC1"), key(r"C/C1=C\CCCCCC1"));
    assert_ne!(key("C1CCCCCCC=C1"), key(r"C1CCCC/C=C\CC1"));
}

#[test]
fn the_open_configurations_of_a_molecule_make_one_line() {
    let line = |smiles: &str| {
        let flag = Structure::from_smiles(smiles).unwrap().flag;
        flag.map(|flag| flag.to_string())
    };
    assert_eq!(
        line("CC(O)C(C)C=CC").as_deref(),
        Some(
            "configuration of C2, C4 and C6=C7 not stated; diastereomers differ by a few kJ/mol, more where rings are fused; \
             cis and trans differ by a few kJ/mol, far more in a ring"
        )
    );
    assert_eq!(
        line("CC=CC").as_deref(),
        Some(
            "configuration of C2=C3 not stated; cis and trans differ by a few kJ/mol, far more in a ring"
        )
    );
    assert_eq!(line("CCO"), None);
}

#[test]
#[ignore = "prints a time"]
fn time_of_reading() {
    let text = std::fs::read_to_string(concat!(
        env!("CARGO_MANIFEST_DIR"),
        "/reference/smiles_spellings.tsv"
    ))
    .unwrap();
    let smiles: Vec<&str> = text
        .lines()
        .skip(1)
        .flat_map(|line| line.split('\t').skip(1))
        .collect();
    let time = |what: &str, work: &dyn Fn(&str) -> usize| {
        let start = Instant::now();
        let total: usize = smiles.iter().map(|s| work(s)).sum();
        println!(
            "{what}: {:?} per SMILES of {}, {total}",
            start.elapsed() / smiles.len() as u32,
            smiles.len()
        );
    };
    time("read", &|s| {
        Structure::from_smiles(s).unwrap().molecule.atoms().len()
    });
    time("read and identify", &|s| {
        identity(&Structure::from_smiles(s).unwrap().molecule).len()
    });
}
