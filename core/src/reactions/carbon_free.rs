//! Published enthalpies of formation of the small molecules without carbon that reactions need as partners.

use crate::molecule::Element::{self, Br, Cl, F, H, I, N, O, P, S, Si};
use crate::molecule::Molecule;

/// A published enthalpy of formation, gas, 298.15 K.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PublishedEnthalpy {
    /// Name of the molecule.
    pub name: &'static str,
    /// The value, kJ/mol.
    pub value_kj_per_mol: f64,
    /// Standard uncertainty, kJ/mol.
    pub u_kj_per_mol: f64,
    /// Bibliography key.
    pub source: &'static str,
}

/// How many atoms of each element, and the molecule that this makes with closed shells and hydrogens alone: none here has isomers.
///
/// # Source
/// `atct-1.112`, the printed 95 % limits halved; `crc2014`, which prints none, with the standard uncertainty that `data/` gives its rows.
const TABLE: [(&[(Element, u32)], PublishedEnthalpy); 12] = [
    (
        &[(O, 1), (H, 2)],
        row("water", -241.822, 0.0135, "atct-1.112"),
    ),
    (
        &[(O, 2), (H, 2)],
        row("hydrogen peroxide", -135.442, 0.032, "atct-1.112"),
    ),
    (
        &[(N, 1), (H, 3)],
        row("ammonia", -45.558, 0.015, "atct-1.112"),
    ),
    (
        &[(N, 2), (H, 4)],
        row("hydrazine", 95.51, 0.095, "atct-1.112"),
    ),
    (
        &[(N, 1), (O, 1), (H, 3)],
        row("hydroxylamine", -43.48, 0.245, "atct-1.112"),
    ),
    (
        &[(F, 1), (H, 1)],
        row("hydrogen fluoride", -272.711, 0.0285, "atct-1.112"),
    ),
    (
        &[(Cl, 1), (H, 1)],
        row("hydrogen chloride", -92.173, 0.003, "atct-1.112"),
    ),
    (
        &[(Br, 1), (H, 1)],
        row("hydrogen bromide", -35.85, 0.075, "atct-1.112"),
    ),
    (
        &[(I, 1), (H, 1)],
        row("hydrogen iodide", 26.47, 0.018, "atct-1.112"),
    ),
    (
        &[(S, 1), (H, 2)],
        row("hydrogen sulfide", -20.6, 2.0, "crc2014"),
    ),
    (&[(P, 1), (H, 3)], row("phosphane", 5.4, 2.0, "crc2014")),
    (&[(Si, 1), (H, 4)], row("silane", 34.3, 2.0, "crc2014")),
];

const fn row(
    name: &'static str,
    value_kj_per_mol: f64,
    u_kj_per_mol: f64,
    source: &'static str,
) -> PublishedEnthalpy {
    PublishedEnthalpy {
        name,
        value_kj_per_mol,
        u_kj_per_mol,
        source,
    }
}

/// The published enthalpies of formation of molecules without carbon.
pub fn carbon_free_enthalpies() -> impl Iterator<Item = PublishedEnthalpy> {
    TABLE.iter().map(|(_, published)| *published)
}

/// The enthalpy of formation of a molecule without carbon, kJ/mol; `None` for one that is not in the table.
pub fn carbon_free_enthalpy<const A: usize, const B: usize>(
    molecule: &Molecule<A, B>,
) -> Option<PublishedEnthalpy> {
    let formula = molecule.formula();
    let same = |composition: &[(Element, u32)]| {
        let of = |element: Element| {
            let found = composition.iter().find(|(e, _)| *e == element);
            found.map_or(0, |(_, count)| *count)
        };
        Element::ALL.iter().all(|&e| of(e) == formula.count(e))
    };
    let mut rows = TABLE.iter();
    rows.find(|(composition, _)| same(composition))
        .map(|(_, published)| *published)
}
