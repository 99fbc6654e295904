//! Molecular formula and molar mass.

use core::fmt;

use super::{Element, Molecule};

/// How many atoms of each element a molecule has, hydrogens included.
///
/// Displays in the order of Hill: carbon, hydrogen, then the other symbols by the alphabet; all by the alphabet where
/// there is no carbon. The net charge is not part of it. Isotopic labels show in the mass only.
///
/// # Source
/// `hill-1900`.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash)]
pub struct Formula {
    /// Atoms of natural isotopic composition, in the order of [`Element::ALL`].
    natural: [u32; Element::ALL.len()],
    /// Atoms with a stated mass number.
    labelled: [u32; Element::ALL.len()],
    /// The sum of the stated mass numbers.
    labelled_nucleons: u32,
}

impl Formula {
    /// Atoms of an element.
    pub fn count(&self, element: Element) -> u32 {
        let at = |counts: &[u32]| counts.get(element as usize).copied().unwrap_or(0);
        at(&self.natural) + at(&self.labelled)
    }

    /// The elements that occur, in the order of Hill, with their counts.
    pub fn iter(&self) -> impl Iterator<Item = (Element, u32)> {
        use Element::{B, Br, C, Cl, F, H, I, N, O, P, S, Si};
        let order = if self.count(C) > 0 {
            [C, H, B, Br, Cl, F, I, N, O, P, S, Si]
        } else {
            [B, Br, C, Cl, F, H, I, N, O, P, S, Si]
        };
        order
            .into_iter()
            .map(|element| (element, self.count(element)))
            .filter(|&(_, count)| count > 0)
    }

    /// Molar mass, g/mol.
    ///
    /// Standard atomic weights for atoms of natural composition. An atom with an isotopic label counts with its mass
    /// number: no nuclide of these elements is further from it than 0.1 g/mol.
    ///
    /// # Source
    /// `ciaaw-2021`.
    pub fn molar_mass_g_per_mol(&self) -> f64 {
        Element::ALL
            .iter()
            .zip(self.natural)
            .fold(f64::from(self.labelled_nucleons), |mass, (e, count)| {
                mass + f64::from(count) * e.atomic_weight_g_per_mol()
            })
    }

    fn add(&mut self, element: Element, isotope: u16, count: u8) {
        let counts = if isotope == 0 {
            &mut self.natural
        } else {
            &mut self.labelled
        };
        if let Some(total) = counts.get_mut(element as usize) {
            *total += u32::from(count);
        }
        self.labelled_nucleons += u32::from(isotope) * u32::from(count);
    }
}

impl fmt::Display for Formula {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        for (element, count) in self.iter() {
            f.write_str(element.symbol())?;
            if count > 1 {
                write!(f, "{count}")?;
            }
        }
        Ok(())
    }
}

impl<const A: usize, const B: usize> Molecule<A, B> {
    /// The molecular formula.
    ///
    /// ```
    /// use tautring_core::molecule::{Atom, BondOrder, Element, MoleculeBuilder};
    /// let mut builder: MoleculeBuilder<8, 8> = MoleculeBuilder::new();
    /// for (element, hydrogens) in [(Element::C, 2), (Element::C, 2), (Element::O, 0)] {
    ///     builder.add_atom(Atom { element, charge: 0, hydrogens, isotope: 0 })?;
    /// }
    /// for (first, second) in [(0, 1), (1, 2), (2, 0)] {
    ///     builder.add_bond(first, second, BondOrder::Single)?;
    /// }
    /// let oxirane = builder.finish()?;
    /// assert_eq!(oxirane.formula().to_string(), "C2H4O");
    /// assert!((oxirane.formula().molar_mass_g_per_mol() - 44.053).abs() < 1e-9);
    /// # Ok::<(), tautring_core::molecule::MoleculeError>(())
    /// ```
    pub fn formula(&self) -> Formula {
        let mut formula = Formula::default();
        for atom in self.atoms() {
            formula.add(atom.element, atom.isotope, 1);
            formula.add(Element::H, 0, atom.hydrogens);
        }
        formula
    }
}

#[cfg(test)]
mod tests {
    use core::fmt::Write as _;

    use heapless::String;

    use super::*;

    fn formula(counts: &[(Element, u8)]) -> Formula {
        let mut formula = Formula::default();
        for &(element, count) in counts {
            formula.add(element, 0, count);
        }
        formula
    }

    fn shown(formula: &Formula) -> String<32> {
        let mut text = String::new();
        write!(text, "{formula}").unwrap();
        text
    }

    #[test]
    fn elements_know_their_place() {
        for (index, element) in Element::ALL.into_iter().enumerate() {
            assert_eq!(element as usize, index);
        }
    }

    #[test]
    fn order_of_hill() {
        use Element::{Br, C, Cl, H, N, O, S};
        let with_carbon = [(S, 1), (Cl, 1), (H, 4), (Br, 1), (C, 2)];
        assert_eq!(shown(&formula(&with_carbon)), "C2H4BrClS");
        assert_eq!(shown(&formula(&[(H, 3), (N, 1)])), "H3N");
        assert_eq!(shown(&formula(&[(H, 1), (Cl, 1), (O, 4)])), "ClHO4");
    }

    #[test]
    fn molar_masses() {
        // Sums of the abridged standard atomic weights (CIAAW 2021) by hand.
        let benzene = formula(&[(Element::C, 6), (Element::H, 6)]);
        assert!((benzene.molar_mass_g_per_mol() - 78.114).abs() < 1e-9);
        let mut chloroform = formula(&[(Element::C, 1), (Element::Cl, 3)]);
        chloroform.add(Element::H, 2, 1);
        assert!((chloroform.molar_mass_g_per_mol() - 120.361).abs() < 1e-9);
        assert_eq!(chloroform.count(Element::H), 1);
        assert_eq!(shown(&chloroform), "CHCl3");
    }

    #[test]
    fn same_bits_in_any_order() {
        let mut counts = [
            (Element::C, 7),
            (Element::H, 9),
            (Element::N, 3),
            (Element::Br, 1),
            (Element::S, 2),
            (Element::I, 1),
        ];
        let expected = formula(&counts).molar_mass_g_per_mol().to_bits();
        let mut state = 0x9E37_79B9_7F4A_7C15_u64;
        for _ in 0..100 {
            state ^= state << 13;
            state ^= state >> 7;
            state ^= state << 17;
            counts.swap((state % 6) as usize, (state >> 32) as usize % 6);
            let shuffled = formula(&counts);
            assert_eq!(shuffled.molar_mass_g_per_mol().to_bits(), expected);
            assert_eq!(shown(&shuffled), "C7H9BrIN3S2");
        }
    }
}
