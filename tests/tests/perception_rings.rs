//! Relevant rings of cages and polycycles whose rings can be counted by hand.

use std::collections::BTreeMap;

use tautring_core::molecule::{Atom, BondOrder, Element, Molecule, MoleculeBuilder};

/// Room for a ladder of 128 rungs: 256 atoms, 382 bonds.
type Polycycle = Molecule<256, 400>;

/// The two atoms of each bond.
type Bonds = Vec<(usize, usize)>;

/// How many rings there are of each size, by size.
type Census = [(usize, usize)];

/// A hydrocarbon skeleton; where an atom has three bonds or fewer the rest are hydrogens.
fn skeleton(bonds: &[(usize, usize)]) -> Polycycle {
    builder(bonds).finish().unwrap()
}

fn builder(bonds: &[(usize, usize)]) -> MoleculeBuilder<256, 400> {
    let atoms = 1 + bonds.iter().map(|&(a, b)| a.max(b)).max().unwrap();
    let mut builder = MoleculeBuilder::new();
    for atom in 0..atoms {
        let degree = bonds
            .iter()
            .filter(|&&(a, b)| a == atom || b == atom)
            .count();
        let hydrogens = 4 - degree as u8;
        builder
            .add_atom(Atom {
                element: Element::C,
                charge: 0,
                hydrogens,
                isotope: 0,
            })
            .unwrap();
    }
    for &(a, b) in bonds {
        builder.add_bond(a, b, BondOrder::Single).unwrap();
    }
    builder
}

/// Bonds around the corners in turn.
fn cycle(corners: &[usize]) -> Bonds {
    let next = corners.iter().cycle().skip(1);
    corners.iter().copied().zip(next.copied()).collect()
}

/// Bridges of the given lengths between atoms 0 and 1: the bicyclo and propellane skeletons.
fn bridged(bridges: &[usize]) -> Bonds {
    let mut bonds = Vec::new();
    let mut next = 2;
    for &length in bridges {
        let mut last = 0;
        for atom in next..next + length {
            bonds.push((last, atom));
            last = atom;
        }
        bonds.push((last, 1));
        next += length;
    }
    bonds
}

/// Two equal polygons, one over the other: prismane, cubane, pentaprismane ...
fn prism(n: usize) -> Bonds {
    let lower: Vec<_> = (0..n).collect();
    let upper: Vec<_> = (n..2 * n).collect();
    [
        cycle(&lower),
        cycle(&upper),
        lower.into_iter().zip(upper).collect(),
    ]
    .concat()
}

/// Fused four-membered rings in a row.
fn ladder(rungs: usize) -> Bonds {
    let rails = (0..rungs - 1).flat_map(|k| [(2 * k, 2 * k + 2), (2 * k + 1, 2 * k + 3)]);
    rails
        .chain((0..rungs).map(|k| (2 * k, 2 * k + 1)))
        .collect()
}

/// A cage of three bonds per atom in the notation of Lederberg, Coxeter and Frucht: a Hamiltonian cycle with jumps.
fn frucht(jumps: &[isize], repeats: usize) -> Bonds {
    let n = jumps.len() * repeats;
    let mut bonds = cycle(&(0..n).collect::<Vec<_>>());
    for (atom, jump) in jumps.iter().cycle().take(n).enumerate() {
        let other = (atom + n).saturating_add_signed(*jump) % n;
        if atom < other {
            bonds.push((atom, other));
        }
    }
    bonds
}

/// The truncated icosahedron: one atom per ordered pair of neighbouring corners of an icosahedron.
fn buckminsterfullerene() -> Bonds {
    // Corners: 0 on top, 1 to 5 around it, 6 to 10 around the bottom, 11 below.
    let mut edges = Vec::new();
    for k in 0..5 {
        let right = (k + 1) % 5;
        edges.extend([(0, 1 + k), (1 + k, 1 + right), (1 + k, 6 + k)]);
        edges.extend([(1 + k, 6 + right), (6 + k, 6 + right), (6 + k, 11)]);
    }
    let arcs: Vec<_> = edges.iter().flat_map(|&(a, b)| [(a, b), (b, a)]).collect();
    let joined = |a, b| arcs.contains(&(a, b));
    let mut bonds = Vec::new();
    for (i, &(a, b)) in arcs.iter().enumerate() {
        for (j, &(c, d)) in arcs.iter().enumerate().skip(i + 1) {
            // Along an edge, or around a corner between edges that share a face.
            if (a, b) == (d, c) || a == c && joined(b, d) {
                bonds.push((i, j));
            }
        }
    }
    bonds
}

/// How many rings there are of each size.
fn census(molecule: &Polycycle) -> BTreeMap<usize, usize> {
    let mut census = BTreeMap::new();
    for ring in molecule.rings().iter() {
        *census.entry(ring.len()).or_default() += 1;
    }
    census
}

#[test]
fn cages_have_the_rings_that_a_model_shows() {
    let adamantane = vec![
        (0, 4),
        (0, 5),
        (0, 6),
        (1, 4),
        (1, 7),
        (1, 8),
        (2, 5),
        (2, 7),
        (2, 9),
        (3, 6),
        (3, 8),
        (3, 9),
    ];
    // Norbornadiene's two double bonds joined into a four-membered ring.
    let quadricyclane = vec![
        (0, 1),
        (1, 2),
        (2, 3),
        (3, 4),
        (4, 5),
        (5, 0),
        (0, 6),
        (3, 6),
        (1, 5),
        (2, 4),
    ];
    let tetrahedrane = [prism(3)[..3].to_vec(), vec![(0, 6), (1, 6), (2, 6)]].concat();
    let tetrahedrane: Vec<_> = tetrahedrane
        .into_iter()
        .map(|(a, b)| (a.min(3), b.min(3)))
        .collect();
    #[rustfmt::skip]
    let cases: [(&str, Bonds, &Census); 21] = [
        ("cyclotetradecane", cycle(&(0..14).collect::<Vec<_>>()), &[(14, 1)]),
        ("bicyclo[1.1.0]butane", bridged(&[1, 1, 0]), &[(3, 2)]),
        ("bicyclo[2.1.0]pentane", bridged(&[2, 1, 0]), &[(3, 1), (4, 1)]),
        ("bicyclo[1.1.1]pentane", bridged(&[1, 1, 1]), &[(4, 3)]),
        ("[1.1.1]propellane", bridged(&[1, 1, 1, 0]), &[(3, 3)]),
        ("[2.2.2]propellane", bridged(&[2, 2, 2, 0]), &[(4, 3)]),
        ("bicyclo[2.1.1]hexane", bridged(&[2, 1, 1]), &[(4, 1), (5, 2)]),
        ("norbornane", bridged(&[2, 2, 1]), &[(5, 2)]),
        ("bicyclo[2.2.2]octane", bridged(&[2, 2, 2]), &[(6, 3)]),
        ("bicyclo[3.2.1]octane", bridged(&[3, 2, 1]), &[(5, 1), (6, 1)]),
        ("spiropentane", vec![(0, 1), (1, 2), (2, 0), (0, 3), (3, 4), (4, 0)], &[(3, 2)]),
        ("tetrahedrane", tetrahedrane, &[(3, 4)]),
        ("prismane", prism(3), &[(3, 2), (4, 3)]),
        ("cubane", prism(4), &[(4, 6)]),
        ("pentaprismane", prism(5), &[(4, 5), (5, 2)]),
        ("quadricyclane", quadricyclane, &[(3, 2), (4, 1), (5, 2)]),
        ("adamantane", adamantane, &[(6, 4)]),
        ("dodecahedrane", frucht(&[10, 7, 4, -4, -7, 10, -4, 7, -7, 4], 2), &[(5, 12)]),
        ("buckminsterfullerene skeleton", buckminsterfullerene(), &[(5, 12), (6, 20)]),
        ("the longest ladderane", ladder(128), &[(4, 127)]),
        ("the widest ring", cycle(&(0..256).collect::<Vec<_>>()), &[(256, 1)]),
    ];
    for (name, bonds, expected) in cases {
        let found: Vec<_> = census(&skeleton(&bonds)).into_iter().collect();
        assert_eq!(found, expected, "{name}");
    }
}

#[test]
fn a_linked_pair_of_rings_is_two_systems_and_a_spiro_pair_one() {
    let linked = skeleton(&[(0, 1), (1, 2), (2, 0), (2, 3), (3, 4), (4, 5), (5, 3)]);
    assert_eq!(linked.ring_systems().len(), 2);
    let spiro = skeleton(&[(0, 1), (1, 2), (2, 0), (2, 3), (3, 4), (4, 2)]);
    assert_eq!(spiro.ring_systems().len(), 1);
}

/// Prints times; run with `--ignored --nocapture` on an optimised build.
#[test]
#[ignore = "prints times"]
fn time_of_perception() {
    let steroid = vec![
        (0, 1),
        (1, 2),
        (2, 3),
        (3, 4),
        (4, 5),
        (5, 0),
        (4, 6),
        (6, 7),
        (7, 8),
        (8, 9),
        (9, 5),
        (8, 10),
        (10, 11),
        (11, 12),
        (12, 13),
        (13, 9),
        (12, 14),
        (14, 15),
        (15, 16),
        (16, 13),
        (12, 17),
        (5, 18),
    ];
    for (name, bonds) in [
        ("gonane with two methyl groups", steroid),
        ("ladder of 128 rungs", ladder(128)),
        ("buckminsterfullerene skeleton", buckminsterfullerene()),
        ("ring of 256", cycle(&(0..256).collect::<Vec<_>>())),
    ] {
        let repeats = 100;
        let builder = builder(&bonds);
        let start = std::time::Instant::now();
        for _ in 0..repeats {
            std::hint::black_box(builder.clone().finish().unwrap());
        }
        println!("{name}: {:?}", start.elapsed() / repeats);
    }
}
