//! Oxygen balance: the oxygen that a substance lacks, or has left, for complete combustion.

use crate::molecule::{Element, Formula};

/// Oxygen balance in per cent of the molar mass, negative when oxygen is lacking.
///
/// 100 M(O) / M times (O − 2 C − ½ (H − X) − 2 S − 2 Si − 5/2 P − 3/2 B), X the halogens: carbon to CO2, nitrogen to N2, halogens to HX,
/// the hydrogen left to H2O, sulfur to SO2, silicon, phosphorus and boron to their highest oxides. With more halogen than hydrogen the
/// rest stays halogen.
///
/// ```
/// # use tautring_core::molecule::*;
/// # use tautring_core::oxygen_balance::oxygen_balance_percent;
/// let mut methane = MoleculeBuilder::<1, 1>::new();
/// methane.add_atom(Atom { element: Element::C, charge: 0, hydrogens: 4, isotope: 0 })?;
/// let balance = oxygen_balance_percent(&methane.finish()?.formula());
/// assert!((balance + 399.0).abs() < 0.1);
/// # Ok::<(), MoleculeError>(())
/// ```
pub fn oxygen_balance_percent(formula: &Formula) -> f64 {
    let count = |element: Element| f64::from(formula.count(element));
    let halogens = count(Element::F) + count(Element::Cl) + count(Element::Br) + count(Element::I);
    let water = (count(Element::H) - halogens).max(0.0) / 2.0;
    let lacking = 2.0 * count(Element::C)
        + water
        + 2.0 * count(Element::S)
        + 2.0 * count(Element::Si)
        + 2.5 * count(Element::P)
        + 1.5 * count(Element::B)
        - count(Element::O);
    -100.0 * Element::O.atomic_weight_g_per_mol() * lacking / formula.molar_mass_g_per_mol()
}
