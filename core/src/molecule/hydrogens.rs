//! Hydrogens as counts on their neighbours: the one form that graphs with and without hydrogen nodes are brought to.

use heapless::Vec;

use super::Element;
use super::graph::{Bond, BondOrder, DoubleBondStereo, Ligand, MoleculeBuilder, TetrahedralStereo};

impl<const A: usize, const B: usize> MoleculeBuilder<A, B> {
    /// Turns every plain hydrogen node into a count on its neighbour; the other atoms close ranks in their order.
    ///
    /// A hydrogen stays a node when it is charged, has not exactly one neighbour (bridges, lone atoms), is bonded to
    /// hydrogen, or by more than a single bond. Isotopic labels of the others are lost: no enthalpy here depends on them.
    ///
    /// Configurations keep their meaning. A double bond whose mark refers to such a hydrogen refers to the other
    /// neighbour on that end with the side turned over; where there is none (imines `C=N-H`) the mark goes. Of a
    /// tetrahedral centre the hydrogen becomes [`Ligand::Implicit`]; a centre with two of them is none.
    pub fn suppress_hydrogens(&mut self) {
        let plain: Vec<Option<u16>, A> = (0..self.atoms.len())
            .map(|atom| self.carrier(atom))
            .collect();
        let mut next = 0;
        let moved: Vec<Option<u16>, A> = plain
            .iter()
            .map(|carrier| {
                carrier.is_none().then(|| {
                    next += 1;
                    next - 1
                })
            })
            .collect();
        let new_index = |atom: u16| moved.get(usize::from(atom)).copied().flatten();

        let bonds: Vec<Bond, B> = self
            .bonds
            .iter()
            .filter_map(|bond| {
                let [first, second] = bond.atoms;
                Some(Bond {
                    atoms: [new_index(first)?, new_index(second)?],
                    order: bond.order,
                    stereo: bond
                        .stereo
                        .and_then(|stereo| self.without_hydrogens(bond, stereo, new_index)),
                })
            })
            .collect();
        let tetrahedral = self
            .tetrahedral
            .iter()
            .filter_map(|stereo| {
                let ligands = stereo.ligands.map(|ligand| match ligand {
                    Ligand::Atom(atom) => new_index(atom).map_or(Ligand::Implicit, Ligand::Atom),
                    Ligand::Implicit => Ligand::Implicit,
                });
                let implicit = ligands.iter().filter(|&&l| l == Ligand::Implicit).count();
                let centre = new_index(stereo.centre).filter(|_| implicit < 2)?;
                Some(TetrahedralStereo {
                    centre,
                    ligands,
                    clockwise: stereo.clockwise,
                })
            })
            .collect();

        for carrier in plain.iter().flatten() {
            if let Some(atom) = self.atoms.get_mut(usize::from(*carrier)) {
                atom.hydrogens = atom.hydrogens.saturating_add(1);
            }
        }
        let mut stays = moved.iter().map(Option::is_some);
        self.atoms.retain(|_| stays.next().unwrap_or(true));
        self.bonds = bonds;
        self.tetrahedral = tetrahedral;
    }

    /// The atom that a plain hydrogen sits on; `None` for every atom that stays a node.
    fn carrier(&self, atom: usize) -> Option<u16> {
        let node = self.atoms.get(atom)?;
        if node.element != Element::H || node.charge != 0 || node.hydrogens != 0 {
            return None;
        }
        let mut around = self.bonds_of(atom);
        let bond = around.next().filter(|b| b.order == BondOrder::Single)?;
        let carrier = bond.other(atom);
        let element = self.atoms.get(carrier)?.element;
        (around.next().is_none() && element != Element::H).then_some(carrier as u16)
    }

    fn bonds_of(&self, atom: usize) -> impl Iterator<Item = &Bond> {
        let is_end = move |end: &u16| usize::from(*end) == atom;
        self.bonds
            .iter()
            .filter(move |bond| bond.atoms.iter().any(is_end))
    }

    /// The same configuration in new indices, with references that stay nodes, if there are any.
    fn without_hydrogens(
        &self,
        bond: &Bond,
        stereo: DoubleBondStereo,
        new_index: impl Fn(u16) -> Option<u16>,
    ) -> Option<DoubleBondStereo> {
        let [first, second] = bond.atoms;
        // The reference itself, or the other substituent of that end; and whether it is the other one.
        let substitute = |end: u16, reference: u16| match new_index(reference) {
            Some(reference) => Some((reference, false)),
            None => self
                .bonds_of(usize::from(end))
                .map(|b| b.other(usize::from(end)) as u16)
                .filter(|&atom| atom != first && atom != second)
                .find_map(&new_index)
                .map(|atom| (atom, true)),
        };
        let (first_reference, first_turned) = substitute(first, stereo.first_reference)?;
        let (second_reference, second_turned) = substitute(second, stereo.second_reference)?;
        Some(DoubleBondStereo {
            first_reference,
            second_reference,
            same_side: stereo.same_side ^ first_turned ^ second_turned,
        })
    }
}

#[cfg(test)]
mod tests {
    use super::super::Atom;
    use super::*;
    use Element::{B, C, Cl, F, H, O};

    type Builder = MoleculeBuilder<16, 16>;

    fn graph(elements: &[Element], bonds: &[(usize, usize, BondOrder)]) -> Builder {
        let mut builder = Builder::new();
        for &element in elements {
            builder
                .add_atom(Atom {
                    element,
                    charge: 0,
                    hydrogens: 0,
                    isotope: 0,
                })
                .unwrap();
        }
        for &(a, b, order) in bonds {
            builder.add_bond(a, b, order).unwrap();
        }
        builder
    }

    const fn single(a: usize, b: usize) -> (usize, usize, BondOrder) {
        (a, b, BondOrder::Single)
    }

    #[test]
    fn hydrogens_become_counts_wherever_they_stand() {
        // Methanol with its hydrogens first, last and in between.
        let mut builder = graph(
            &[H, C, H, O, H, H],
            &[
                single(0, 1),
                single(1, 2),
                single(1, 3),
                single(3, 4),
                single(1, 5),
            ],
        );
        builder.suppress_hydrogens();
        let kept: Vec<_, 4> = builder
            .atoms
            .iter()
            .map(|a| (a.element, a.hydrogens))
            .collect();
        assert_eq!(kept, [(C, 3), (O, 1)]);
        assert_eq!(builder.bonds.len(), 1);
        assert_eq!(builder.bonds[0].atoms, [0, 1]);
    }

    #[test]
    fn dihydrogen_bridges_and_ions_stay() {
        let mut dihydrogen = graph(&[H, H], &[single(0, 1)]);
        dihydrogen.suppress_hydrogens();
        assert_eq!(dihydrogen.atoms.len(), 2);

        let mut bridge = graph(&[B, H, B, H], &[single(0, 1), single(1, 2), single(2, 3)]);
        bridge.suppress_hydrogens();
        assert_eq!(bridge.atoms.len(), 3);

        let mut proton = graph(&[H, O], &[]);
        proton.atoms[0].charge = 1;
        proton.suppress_hydrogens();
        assert_eq!(proton.atoms.len(), 2);
    }

    /// F-C(H)=C(H)-Cl, atoms H F C C Cl H, with references given.
    fn fluorochloroethene(first: u16, second: u16, same_side: bool) -> Builder {
        let mut builder = graph(
            &[H, F, C, C, Cl, H],
            &[
                single(0, 2),
                single(1, 2),
                (2, 3, BondOrder::Double),
                single(3, 4),
                single(3, 5),
            ],
        );
        let stereo = DoubleBondStereo {
            first_reference: first,
            second_reference: second,
            same_side,
        };
        builder.set_double_bond_stereo(2, stereo).unwrap();
        builder
    }

    #[test]
    fn sides_turn_over_with_the_reference() {
        // All four describe F and Cl on the same side; afterwards F is 0, the carbons 1 and 2, Cl 3.
        for (first, second, same_side) in [(1, 4, true), (0, 4, false), (1, 5, false), (0, 5, true)]
        {
            let mut builder = fluorochloroethene(first, second, same_side);
            builder.suppress_hydrogens();
            let expected = DoubleBondStereo {
                first_reference: 0,
                second_reference: 3,
                same_side: true,
            };
            let stereo = builder.bonds.iter().find_map(|b| b.stereo);
            assert_eq!(stereo, Some(expected));
        }
    }

    #[test]
    fn a_mark_without_another_reference_goes() {
        let mut ethene = graph(
            &[C, C, H, H, H, H],
            &[
                (0, 1, BondOrder::Double),
                single(0, 2),
                single(0, 3),
                single(1, 4),
                single(1, 5),
            ],
        );
        let stereo = DoubleBondStereo {
            first_reference: 2,
            second_reference: 4,
            same_side: true,
        };
        ethene.set_double_bond_stereo(0, stereo).unwrap();
        ethene.suppress_hydrogens();
        assert_eq!(ethene.bonds.len(), 1);
        assert_eq!(ethene.bonds[0].stereo, None);
    }

    #[test]
    fn tetrahedral_hydrogens_become_implicit() {
        let centre = |ligands: [u16; 4]| TetrahedralStereo {
            centre: 1,
            ligands: ligands.map(Ligand::Atom),
            clockwise: true,
        };
        let bonds = [single(0, 1), single(1, 2), single(1, 3), single(1, 4)];
        let mut chiral = graph(&[H, C, F, Cl, O], &bonds);
        chiral.add_tetrahedral_stereo(centre([2, 0, 3, 4])).unwrap();
        chiral.suppress_hydrogens();
        let expected = TetrahedralStereo {
            centre: 0,
            ligands: [
                Ligand::Atom(1),
                Ligand::Implicit,
                Ligand::Atom(2),
                Ligand::Atom(3),
            ],
            clockwise: true,
        };
        assert_eq!(chiral.tetrahedral, [expected]);

        let mut achiral = graph(&[H, C, F, H, O], &bonds);
        achiral
            .add_tetrahedral_stereo(centre([2, 0, 3, 4]))
            .unwrap();
        achiral.suppress_hydrogens();
        assert!(achiral.tetrahedral.is_empty());
    }
}
