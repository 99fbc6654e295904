//! Kekulé structures: aromatic marks turned into localised double bonds.
//!
//! An atom of the aromatic system takes part in one double bond inside it when its sigma bonds (an aromatic bond counts
//! one) and hydrogens fall one short of a closed-shell valence: benzene's CH, pyridine's N, the N+ of a pyridinium, the O+
//! of a pyrylium. Others bring a lone pair, a gap or a double bond that points outwards and take none: pyrrole's NH,
//! furan's O, thiophene's S, a carbonyl C, B. The double bonds are a perfect matching of the first kind along aromatic bonds.

use heapless::Vec;

use super::Element;
use super::error::MoleculeError;
use super::graph::{Atom, Bond, BondOrder, MAX_DEGREE, Neighbour};
use super::matching::Matching;
use super::valence::{Valences, shared_pairs};

/// Replaces every aromatic mark by a single or double bond.
///
/// # Errors
/// [`MoleculeError::NoKekuleStructure`] with an atom that no matching can serve together with all others.
pub(super) fn localise<const A: usize, const B: usize>(
    atoms: &Vec<Atom, A>,
    bonds: &mut Vec<Bond, B>,
    neighbours: &Vec<Vec<Neighbour, MAX_DEGREE>, A>,
) -> Result<(), MoleculeError> {
    if bonds.iter().all(|bond| bond.order != BondOrder::Aromatic) {
        return Ok(());
    }
    let wanting: Vec<bool, A> = atoms
        .iter()
        .zip(neighbours)
        .map(|(atom, around)| {
            around.iter().any(|n| is_aromatic(bonds, n.bond))
                && lacks_one_pair(*atom, shared_pairs(*atom, around, bonds))
        })
        .collect();
    let wants = |atom: &u16| wanting.get(usize::from(*atom)) == Some(&true);
    let vertices = (0..u16::MAX).take(atoms.len()).filter(wants);
    let matching: Matching<A> = Matching::maximum(vertices.clone(), |atom| {
        neighbours
            .get(usize::from(atom))
            .into_iter()
            .flatten()
            .filter(|n| is_aromatic(bonds, n.bond) && wants(&n.atom))
            .map(|n| n.atom)
    });
    if let Some(atom) = vertices
        .clone()
        .find(|&atom| matching.partner(atom).is_none())
    {
        return Err(MoleculeError::NoKekuleStructure {
            atom: usize::from(atom),
        });
    }
    for bond in bonds.iter_mut() {
        if bond.order == BondOrder::Aromatic {
            let [first, second] = bond.atoms;
            bond.order = if matching.partner(first) == Some(second) {
                BondOrder::Double
            } else {
                BondOrder::Single
            };
        }
    }
    Ok(())
}

fn is_aromatic(bonds: &[Bond], bond: u16) -> bool {
    bonds
        .get(usize::from(bond))
        .is_some_and(|bond| bond.order == BondOrder::Aromatic)
}

fn lacks_one_pair(atom: Atom, pairs: u8) -> bool {
    // The uncharged spelling of an N-oxide, n(=O), makes five with the ring's double bond; `normalise` rewrites it.
    let pentavalent = atom.element == Element::N && atom.charge == 0 && pairs == 4;
    let valences = Valences::of(atom.element, atom.charge);
    pentavalent || (!valences.contains(pairs) && valences.contains(pairs.saturating_add(1)))
}

#[cfg(test)]
mod tests {
    use super::super::graph::MoleculeBuilder;
    use super::*;
    use BondOrder::{Aromatic, Double, Single};

    type Builder = MoleculeBuilder<64, 96>;

    const fn atom(element: Element, charge: i8, hydrogens: u8) -> Atom {
        Atom {
            element,
            charge,
            hydrogens,
            isotope: 0,
        }
    }

    const CH: Atom = atom(Element::C, 0, 1);
    const C: Atom = atom(Element::C, 0, 0);

    fn graph(atoms: &[Atom], bonds: &[(usize, usize, BondOrder)]) -> Builder {
        let mut builder = Builder::new();
        for &atom in atoms {
            builder.add_atom(atom).unwrap();
        }
        for &(a, b, order) in bonds {
            builder.add_bond(a, b, order).unwrap();
        }
        builder
    }

    fn ring(atoms: &[Atom]) -> Builder {
        let n = atoms.len();
        let bonds: Vec<_, 64> = (0..n).map(|i| (i, (i + 1) % n, Aromatic)).collect();
        graph(atoms, &bonds)
    }

    /// How many double bonds, after checking that the valences are right.
    fn doubles(builder: Builder) -> Result<usize, MoleculeError> {
        let molecule = builder.finish()?;
        assert!(molecule.bonds().iter().all(|b| b.order != Aromatic));
        Ok(molecule
            .bonds()
            .iter()
            .filter(|b| b.order == Double)
            .count())
    }

    #[test]
    fn six_membered_rings() {
        assert_eq!(doubles(ring(&[CH; 6])), Ok(3));
        for hetero in [
            atom(Element::N, 0, 0),
            atom(Element::N, 1, 1),
            atom(Element::O, 1, 0),
            atom(Element::S, 1, 0),
            atom(Element::P, 0, 0),
            atom(Element::B, -1, 1),
        ] {
            assert_eq!(doubles(ring(&[hetero, CH, CH, CH, CH, CH])), Ok(3));
        }
    }

    #[test]
    fn five_membered_rings_need_a_lone_pair() {
        for hetero in [
            atom(Element::N, 0, 1),
            atom(Element::N, -1, 0),
            atom(Element::O, 0, 0),
            atom(Element::S, 0, 0),
            atom(Element::P, 0, 1),
            atom(Element::B, 0, 1),
            atom(Element::C, -1, 1),
        ] {
            assert_eq!(doubles(ring(&[hetero, CH, CH, CH, CH])), Ok(2));
        }
        let without_hydrogen = ring(&[atom(Element::N, 0, 0), CH, CH, CH, CH]);
        assert!(matches!(
            doubles(without_hydrogen),
            Err(MoleculeError::NoKekuleStructure { .. })
        ));
    }

    #[test]
    fn outward_double_bonds() {
        // Pyridin-2-one, thiophene 1-oxide, pyridine N-oxide in the uncharged spelling.
        let oxygen = atom(Element::O, 0, 0);
        let ring_bonds = |n: usize| (0..n).map(move |i| (i, (i + 1) % n, Aromatic));
        let mut bonds: Vec<_, 8> = ring_bonds(6).collect();
        bonds.push((1, 6, Double)).unwrap();
        let pyridone = [atom(Element::N, 0, 1), C, CH, CH, CH, CH, oxygen];
        assert_eq!(doubles(graph(&pyridone, &bonds)), Ok(3));

        let mut bonds: Vec<_, 8> = ring_bonds(5).collect();
        bonds.push((0, 5, Double)).unwrap();
        let oxide = [atom(Element::S, 0, 0), CH, CH, CH, CH, oxygen];
        assert_eq!(doubles(graph(&oxide, &bonds)), Ok(3));

        let mut bonds: Vec<_, 8> = ring_bonds(6).collect();
        bonds.push((0, 6, Double)).unwrap();
        let oxide = [atom(Element::N, 0, 0), CH, CH, CH, CH, CH, oxygen];
        let molecule = graph(&oxide, &bonds).finish().unwrap();
        assert_eq!(molecule.bonds()[6].order, Single);
        assert_eq!(molecule.atoms()[0].charge, 1);
    }

    #[test]
    fn azulene_and_a_methylene_inside_the_marks() {
        let mut atoms = [CH; 10];
        atoms[0] = C;
        atoms[4] = C;
        let mut bonds: Vec<_, 16> = (0..10).map(|i| (i, (i + 1) % 10, Aromatic)).collect();
        bonds.push((0, 4, Aromatic)).unwrap();
        assert_eq!(doubles(graph(&atoms, &bonds)), Ok(5));
        // Cyclopentadiene with all bonds marked: its CH2 has no pair to give or take.
        let methylene = atom(Element::C, 0, 2);
        assert_eq!(doubles(ring(&[methylene, CH, CH, CH, CH])), Ok(2));
    }

    /// The sixty vertices of the truncated icosahedron: one for each directed edge of the icosahedron.
    fn fullerene_60() -> Builder {
        // Icosahedron: poles 0 and 11, upper ring 1..=5, lower ring 6..=10; neighbours of each in cyclic order.
        let around = |v: usize| -> [usize; 5] {
            let up = |k: usize| 1 + k % 5;
            let low = |k: usize| 6 + k % 5;
            match v {
                0 => [1, 2, 3, 4, 5],
                11 => [10, 9, 8, 7, 6],
                1..=5 => {
                    let k = v - 1;
                    [0, up(k + 4), low(k + 4), low(k), up(k + 1)]
                }
                _ => {
                    let k = v - 6;
                    [11, low(k + 1), up(k + 1), up(k), low(k + 4)]
                }
            }
        };
        let index = |v: usize, w: usize| 5 * v + around(v).iter().position(|&x| x == w).unwrap();
        let mut builder = Builder::new();
        for _ in 0..60 {
            builder.add_atom(C).unwrap();
        }
        for v in 0..12 {
            for (k, &w) in around(v).iter().enumerate() {
                builder
                    .add_bond(5 * v + k, 5 * v + (k + 1) % 5, Aromatic)
                    .unwrap();
                if v < w {
                    builder
                        .add_bond(index(v, w), index(w, v), Aromatic)
                        .unwrap();
                }
            }
        }
        builder
    }

    #[test]
    fn fullerene() {
        assert_eq!(doubles(fullerene_60()), Ok(30));
    }

    #[test]
    fn odd_systems_are_named() {
        assert!(matches!(
            doubles(ring(&[CH; 7])),
            Err(MoleculeError::NoKekuleStructure { .. })
        ));
        assert_eq!(
            doubles(ring(&[atom(Element::C, 1, 1), CH, CH, CH, CH, CH, CH])),
            Ok(3)
        );
    }
}
