//! One spelling for groups that are written in several ways (nitro, azide, diazo, sulfoxide, phosphine oxide ...).
//!
//! | rule | from | to | groups |
//! | --- | --- | --- | --- |
//! | dative | `D-A`, both one pair off | `[D+]-[A-]` | isocyanide, CO, amine oxide, amine borane |
//! | divalent carbon | `X=[C]` | `[X+]#[C-]` | isocyanide, carbon monoxide |
//! | pentavalent nitrogen | `N(=Y)`, five pairs | `[N+]-[Y-]` | nitro, azide, diazo, nitrone, amine oxide |
//! | dipole | `[X-]-[N+]=Y`, Y more electronegative | `X=[N+]-[Y-]` | azide, diazo, nitrone, nitrile oxide |
//! | onium | `[Z+]-[X-]`, Z can take a pair | `Z=X` | sulfoxide, sulfone, phosphine oxide, perchlorate, ylide, tropone |
//!
//! A rule applies only where every atom that it touches then has a closed-shell valence, and each lowers, in this order:
//! the number of atoms without one, the sum of absolute charges, how badly the negative charges sit. So the rules come to
//! an end, and running them again changes nothing. Choices go by electronegativity and number of ligands, never by index.
//! Opposite charges on atoms that are not neighbours stay (amino acids, betaines, sydnones), and so do neighbours that
//! cannot share another pair (ammonium ylides, amine boranes).

use heapless::Vec;

use super::Element;
use super::graph::{Atom, Bond, BondOrder, MAX_DEGREE, Neighbour};
use super::spelling::{Branch, Spelling};

/// Brings formal charges into the crate's one spelling.
pub(super) fn charges(
    atoms: &mut [Atom],
    bonds: &mut [Bond],
    neighbours: &[Vec<Neighbour, MAX_DEGREE>],
) {
    let mut spelling = Spelling {
        atoms,
        bonds,
        neighbours,
    };
    // One rule after the other over the whole graph, from the first again after each change: which rule comes first
    // then depends on the table, not on the atoms.
    while Spelling::RULES
        .iter()
        .any(|rule| (0..spelling.atoms.len()).any(|atom| rule(&mut spelling, atom)))
    {}
}

impl Spelling<'_> {
    /// Each looks at one atom and says whether it changed anything.
    const RULES: [fn(&mut Self, usize) -> bool; 5] = [
        Self::dative,
        Self::divalent_carbon,
        Self::pentavalent_nitrogen,
        Self::dipole,
        Self::onium,
    ];

    /// `D-A` where donor and acceptor lack just the charges of a dative bond.
    fn dative(&mut self, donor: usize) -> bool {
        let lone_pair = matches!(
            self.element(donor),
            Some(Element::N | Element::O | Element::P | Element::S)
        );
        if !lone_pair
            || !self.is_neutral(donor)
            || self.fits(donor, 0, 0)
            || !self.fits(donor, 1, 0)
        {
            return false;
        }
        let acceptor = self.best(donor, |graph, b| {
            b.charge == 0 && !graph.fits(b.atom, 0, 0) && graph.fits(b.atom, -1, 0)
        });
        let Some(acceptor) = acceptor else {
            return false;
        };
        self.add_charge(donor, 1);
        self.add_charge(acceptor.atom, -1);
        true
    }

    /// `X=[C]` with nothing else on the carbon.
    fn divalent_carbon(&mut self, carbon: usize) -> bool {
        if self.element(carbon) != Some(Element::C)
            || !self.is_neutral(carbon)
            || !self.fits(carbon, -1, 1)
        {
            return false;
        }
        let partner = self.best(carbon, |graph, b| {
            b.order == BondOrder::Double
                && matches!(b.element, Element::N | Element::O)
                && b.charge == 0
                && graph.fits(b.atom, 1, 1)
        });
        let Some(partner) = partner else {
            return false;
        };
        self.set_order(partner.bond, BondOrder::Triple);
        self.add_charge(carbon, -1);
        self.add_charge(partner.atom, 1);
        true
    }

    /// `N(=Y)` with five pairs on the nitrogen.
    fn pentavalent_nitrogen(&mut self, nitrogen: usize) -> bool {
        if self.element(nitrogen) != Some(Element::N)
            || !self.is_neutral(nitrogen)
            || !self.fits(nitrogen, 1, -1)
        {
            return false;
        }
        let acceptor = self.acceptor(nitrogen);
        let Some(acceptor) = acceptor else {
            return false;
        };
        self.lower_order(acceptor);
        self.add_charge(nitrogen, 1);
        self.add_charge(acceptor.atom, -1);
        true
    }

    /// `[X-]-[N+]=Y` with the negative charge on the worse end.
    fn dipole(&mut self, nitrogen: usize) -> bool {
        if self.element(nitrogen) != Some(Element::N)
            || self.charge(nitrogen) != Some(1)
            || !self.fits(nitrogen, 1, 0)
        {
            return false;
        }
        let acceptor = self.acceptor(nitrogen);
        let Some(acceptor) = acceptor else {
            return false;
        };
        let donor = self
            .branches(nitrogen)
            .filter(|b| {
                b.charge == -1
                    && matches!(b.order, BondOrder::Single | BondOrder::Double)
                    && self.fits(b.atom, 1 + b.charge, 1)
                    && self.preference(b) < self.preference(&acceptor)
            })
            .min_by_key(|b| self.preference(b));
        let Some(donor) = donor else {
            return false;
        };
        self.raise_order(donor);
        self.lower_order(acceptor);
        self.add_charge(donor.atom, 1);
        self.add_charge(acceptor.atom, -1);
        true
    }

    /// The neutral end of a multiple bond that takes a pair from the nitrogen.
    ///
    /// Where the nitrogen has more than two ligands only a terminal atom can be that end: between others the choice
    /// would hang on which Kekulé structure a ring is drawn in.
    fn acceptor(&self, nitrogen: usize) -> Option<Branch> {
        let linear = self.ligands(nitrogen) == 2;
        self.best(nitrogen, |graph, b| {
            // A neutral carbon with a triple bond has a substituent or a hydrogen that a nitrogen there has not: C-N#CH
            // is an isocyanide with a hydrogen too many, no dipole.
            let opens = b.order == BondOrder::Double
                || (b.order == BondOrder::Triple && b.element != Element::C);
            opens
                && b.charge == 0
                && (linear || graph.ligands(b.atom) == 1)
                && graph.fits(b.atom, -1, -1)
        })
    }

    /// `[Z+]-[X-]` where both can share one more pair.
    fn onium(&mut self, cation: usize) -> bool {
        let Some(charge) = self.charge(cation).filter(|&charge| charge > 0) else {
            return false;
        };
        if !self.fits(cation, charge - 1, 1) {
            return false;
        }
        let anion = self.best(cation, |graph, b| {
            b.charge < 0
                && matches!(b.order, BondOrder::Single | BondOrder::Double)
                && graph.fits(b.atom, b.charge + 1, 1)
        });
        let Some(anion) = anion else {
            return false;
        };
        self.raise_order(anion);
        self.add_charge(cation, -1);
        self.add_charge(anion.atom, 1);
        true
    }
}

#[cfg(test)]
mod tests {
    use super::super::{Molecule, MoleculeBuilder, MoleculeError};
    use super::*;

    type Found = Result<Molecule<16, 16>, MoleculeError>;

    /// A graph in the test's shorthand: atoms as "symbol charge hydrogens", bonds as "from to order".
    fn graph(atoms: &str, bonds: &str, order: &[usize]) -> Found {
        let mut builder = MoleculeBuilder::<16, 16>::new();
        let list: Vec<&str, 16> = atoms.split(", ").collect();
        for &position in order {
            let mut parts = list[position].split(' ');
            builder.add_atom(Atom {
                element: Element::from_symbol(parts.next().unwrap()).unwrap(),
                charge: parts.next().unwrap().parse().unwrap(),
                hydrogens: parts.next().unwrap().parse().unwrap(),
                isotope: 0,
            })?;
        }
        let place = |atom: &str| {
            let atom: usize = atom.parse().unwrap();
            order.iter().position(|&x| x == atom).unwrap()
        };
        for bond in bonds.split(", ") {
            let mut parts = bond.split(' ');
            builder.add_bond(
                place(parts.next().unwrap()),
                place(parts.next().unwrap()),
                match parts.next().unwrap() {
                    "1" => BondOrder::Single,
                    "2" => BondOrder::Double,
                    "3" => BondOrder::Triple,
                    _ => BondOrder::Aromatic,
                },
            )?;
        }
        builder.finish()
    }

    /// What does not depend on the order of the atoms: element, charge, hydrogens and bond orders of each, sorted.
    fn signature(molecule: &Molecule<16, 16>) -> Vec<(Element, i8, u8, [u8; 4]), 16> {
        let mut signature: Vec<_, 16> = (0..molecule.atoms().len())
            .map(|index| {
                let atom = molecule.atoms()[index];
                let mut around = [0; 4];
                for n in molecule.neighbours(index) {
                    let pairs = molecule.bonds()[usize::from(n.bond)].order.pairs();
                    around[usize::from(pairs)] += 1;
                }
                (atom.element, atom.charge, atom.hydrogens, around)
            })
            .collect();
        signature.sort_unstable();
        signature
    }

    /// Name, one spelling, the crate's spelling; by line, each graph as its atoms and its bonds.
    const SPELLINGS: &str = "\
nitro; C 0 3, N 0 0, O 0 0, O 0 0; 0 1 1, 1 2 2, 1 3 2; C 0 3, N 1 0, O 0 0, O -1 0; 0 1 1, 1 2 2, 1 3 1
nitro, no charges drawn; C 0 3, N 0 0, O 0 0, O 0 0; 0 1 1, 1 2 2, 1 3 1; C 0 3, N 1 0, O 0 0, O -1 0; 0 1 1, 1 2 2, 1 3 1
azide, pentavalent; C 0 3, N 0 0, N 0 0, N 0 0; 0 1 1, 1 2 2, 2 3 3; C 0 3, N 0 0, N 1 0, N -1 0; 0 1 1, 1 2 2, 2 3 2
azide, diazonium; C 0 3, N -1 0, N 1 0, N 0 0; 0 1 1, 1 2 1, 2 3 3; C 0 3, N 0 0, N 1 0, N -1 0; 0 1 1, 1 2 2, 2 3 2
diazo, pentavalent; C 0 2, N 0 0, N 0 0; 0 1 2, 1 2 3; C 0 2, N 1 0, N -1 0; 0 1 2, 1 2 2
diazo, carbanion; C -1 2, N 1 0, N 0 0; 0 1 1, 1 2 3; C 0 2, N 1 0, N -1 0; 0 1 2, 1 2 2
nitrous oxide; N -1 0, N 1 0, O 0 0; 0 1 2, 1 2 2; N 0 0, N 1 0, O -1 0; 0 1 3, 1 2 1
pyridine N-oxide; N 0 0, C 0 1, C 0 1, C 0 1, C 0 1, C 0 1, O 0 0; 0 1 2, 1 2 1, 2 3 2, 3 4 1, 4 5 2, 0 5 1, 0 6 2; N 1 0, C 0 1, C 0 1, C 0 1, C 0 1, C 0 1, O -1 0; 0 1 2, 1 2 1, 2 3 2, 3 4 1, 4 5 2, 0 5 1, 0 6 1
amine oxide; N 0 0, C 0 3, C 0 3, C 0 3, O 0 0; 0 1 1, 0 2 1, 0 3 1, 0 4 2; N 1 0, C 0 3, C 0 3, C 0 3, O -1 0; 0 1 1, 0 2 1, 0 3 1, 0 4 1
nitrone; C -1 2, N 1 0, C 0 3, O 0 0; 0 1 1, 1 2 1, 1 3 2; C 0 2, N 1 0, C 0 3, O -1 0; 0 1 2, 1 2 1, 1 3 1
nitrile oxide; C 0 3, C 0 0, N 0 0, O 0 0; 0 1 1, 1 2 3, 2 3 2; C 0 3, C 0 0, N 1 0, O -1 0; 0 1 1, 1 2 3, 2 3 1
isocyanide, uncharged; C 0 3, N 0 0, C 0 0; 0 1 1, 1 2 3; C 0 3, N 1 0, C -1 0; 0 1 1, 1 2 3
isocyanide, divalent; C 0 3, N 0 0, C 0 0; 0 1 1, 1 2 2; C 0 3, N 1 0, C -1 0; 0 1 1, 1 2 3
carbon monoxide; C 0 0, O 0 0; 0 1 2; C -1 0, O 1 0; 0 1 3
sulfoxide; S 1 0, C 0 3, C 0 3, O -1 0; 0 1 1, 0 2 1, 0 3 1; S 0 0, C 0 3, C 0 3, O 0 0; 0 1 1, 0 2 1, 0 3 2
sulfone; S 2 0, C 0 3, C 0 3, O -1 0, O -1 0; 0 1 1, 0 2 1, 0 3 1, 0 4 1; S 0 0, C 0 3, C 0 3, O 0 0, O 0 0; 0 1 1, 0 2 1, 0 3 2, 0 4 2
phosphine oxide; P 1 0, C 0 3, C 0 3, C 0 3, O -1 0; 0 1 1, 0 2 1, 0 3 1, 0 4 1; P 0 0, C 0 3, C 0 3, C 0 3, O 0 0; 0 1 1, 0 2 1, 0 3 1, 0 4 2
sulfilimine; S 1 0, C 0 3, C 0 3, N -1 1; 0 1 1, 0 2 1, 0 3 1; S 0 0, C 0 3, C 0 3, N 0 1; 0 1 1, 0 2 1, 0 3 2
perchloric acid; Cl 3 0, O 0 1, O -1 0, O -1 0, O -1 0; 0 1 1, 0 2 1, 0 3 1, 0 4 1; Cl 0 0, O 0 1, O 0 0, O 0 0, O 0 0; 0 1 1, 0 2 2, 0 3 2, 0 4 2
amine borane; N 0 3, B 0 3; 0 1 1; N 1 3, B -1 3; 0 1 1
glycine, zwitterion; N 1 3, C 0 2, C 0 0, O 0 0, O -1 0; 0 1 1, 1 2 1, 2 3 2, 2 4 1; N 1 3, C 0 2, C 0 0, O 0 0, O -1 0; 0 1 1, 1 2 1, 2 3 2, 2 4 1
tropone; C 1 0, C 0 1, C 0 1, C 0 1, C 0 1, C 0 1, C 0 1, O -1 0; 0 1 1, 1 2 2, 2 3 1, 3 4 2, 4 5 1, 5 6 2, 0 6 1, 0 7 1; C 0 0, C 0 1, C 0 1, C 0 1, C 0 1, C 0 1, C 0 1, O 0 0; 0 1 1, 1 2 2, 2 3 1, 3 4 2, 4 5 1, 5 6 2, 0 6 1, 0 7 2
sulfoxide, no charges drawn; S 0 0, C 0 3, C 0 3, O 0 0; 0 1 1, 0 2 1, 0 3 1; S 0 0, C 0 3, C 0 3, O 0 0; 0 1 1, 0 2 1, 0 3 2
phosphonium ylide; P 1 0, C 0 3, C 0 3, C 0 3, C -1 2; 0 1 1, 0 2 1, 0 3 1, 0 4 1; P 0 0, C 0 3, C 0 3, C 0 3, C 0 2; 0 1 1, 0 2 1, 0 3 1, 0 4 2
ammonium ylide stays; N 1 0, C 0 3, C 0 3, C 0 3, C -1 2; 0 1 1, 0 2 1, 0 3 1, 0 4 1; N 1 0, C 0 3, C 0 3, C 0 3, C -1 2; 0 1 1, 0 2 1, 0 3 1, 0 4 1
nitrile imine; C -1 1, N 1 0, N 0 1; 0 1 2, 1 2 2; C 0 1, N 1 0, N -1 1; 0 1 3, 1 2 1";

    #[test]
    fn spellings_meet_whatever_the_order_of_the_atoms() {
        let mut state = 0x2545_F491_4F6C_DD1D_u64;
        for line in SPELLINGS.lines() {
            let fields: Vec<&str, 5> = line.split("; ").collect();
            let [name, atoms, bonds, settled_atoms, settled_bonds] = fields.into_array().unwrap();
            let mut order: Vec<usize, 16> = (0..atoms.split(", ").count()).collect();
            let from = graph(atoms, bonds, &order).unwrap();
            let to = graph(settled_atoms, settled_bonds, &order).unwrap();
            let expected: Vec<i8, 16> = settled_atoms
                .split(", ")
                .map(|atom| atom.split(' ').nth(1).unwrap().parse().unwrap())
                .collect();
            let charges: Vec<i8, 16> = to.atoms().iter().map(|a| a.charge).collect();
            assert_eq!(charges, expected, "{name}: the settled spelling moved");
            assert_eq!(signature(&from), signature(&to), "{name}");
            let mut again = MoleculeBuilder::<16, 16>::new();
            for &atom in from.atoms() {
                again.add_atom(atom).unwrap();
            }
            for bond in from.bonds() {
                let [a, b] = bond.atoms.map(usize::from);
                again.add_bond(a, b, bond.order).unwrap();
            }
            let again = again.finish().unwrap();
            assert_eq!(again.atoms(), from.atoms(), "{name} changes again");
            assert_eq!(again.bonds(), from.bonds(), "{name} changes again");
            for _ in 0..20 {
                for i in (1..order.len()).rev() {
                    state ^= state << 13;
                    state ^= state >> 7;
                    state ^= state << 17;
                    order.swap(i, (state % (i as u64 + 1)) as usize);
                }
                let shuffled = graph(atoms, bonds, &order).unwrap();
                assert_eq!(signature(&shuffled), signature(&to), "{name} {order:?}");
            }
        }
    }

    #[test]
    fn what_no_rule_mends_is_an_error() {
        // Tetramethylammonium without its charge; methyl radical pair; nitrogen dioxide.
        let ammonium = graph(
            "N 0 0, C 0 3, C 0 3, C 0 3, C 0 3",
            "0 1 1, 0 2 1, 0 3 1, 0 4 1",
            &[0, 1, 2, 3, 4],
        );
        assert!(matches!(
            ammonium,
            Err(MoleculeError::ValenceExceeded { atom: 0, .. })
        ));
        let diradical = graph("C 0 2, C 0 2", "0 1 1", &[0, 1]);
        assert!(matches!(diradical, Err(MoleculeError::OpenShell { .. })));
        let dioxide = graph("N 0 0, O 0 0, O 0 0", "0 1 2, 0 2 1", &[0, 1, 2]);
        assert!(matches!(
            dioxide,
            Err(MoleculeError::OpenShell { atom: 2, .. })
        ));
    }
}
