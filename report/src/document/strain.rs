//! The strain of a substance: per ring system and in total.

use tautring_core::quantities::{MolarEnergy, MolarMass};

use super::block::{Block, Column, Table};
use super::inline::Inline;
use super::report::heading;
use super::rounding::{fixed, rounded, uncertainty};
use crate::review::{Basis, Quantity, SubstanceReview};

pub(super) fn blocks(review: &SubstanceReview) -> Vec<Block> {
    let strain = &review.strain;
    let mut blocks = vec![
        heading(4, "Strain"),
        Block::Paragraph(
            Inline::from("A strain energy means nothing without its convention. The one here: ")
                .emphasis(strain.convention)
                .text("; the zero is a hypothetical molecule of the same groups without rings."),
        ),
    ];
    if strain.ring_systems.is_empty() {
        blocks.push("The molecule has no ring that counts as strained by this convention: aromatic rings do not, and there is no other.".into());
        return blocks;
    }
    blocks.push(table(review));
    if review.gas.basis == Basis::Measured {
        let [sum, measured] = [strain.ring_levels, strain.quantity]
            .map(|q| rounded(q.value_kj_per_mol, q.expanded_kj_per_mol).interval());
        blocks.push(Block::Paragraph(
            Inline::from("The total, ")
                .strong(format!("{measured} kJ/mol"))
                .text(" (± U, 95 %), is the measured enthalpy of formation that this report uses, minus the strain-free sum. The ring levels of the additivity alone give ")
                .strong(format!("{sum} kJ/mol"))
                .text("; the difference is what is peculiar to this molecule, or an error of the measurement."),
        ));
    }
    blocks
}

/// `1, 2, 3` for the atoms 0, 1, 2.
pub(super) fn atom_numbers(atoms: &[usize]) -> String {
    let numbers: Vec<_> = atoms.iter().map(|atom| (atom + 1).to_string()).collect();
    numbers.join(", ")
}

fn table(review: &SubstanceReview) -> Block {
    let strain = &review.strain;
    let mass = MolarMass::from_g_per_mol(review.molar_mass_g_per_mol).ok();
    let numbers = |system: &[usize]| -> Inline { atom_numbers(system).into() };
    let mut rows: Vec<_> = strain
        .ring_systems
        .iter()
        .map(|system| {
            let sizes: Vec<_> = system.sizes.iter().map(ToString::to_string).collect();
            row(
                [numbers(&system.atoms), sizes.join(", ").into()],
                system.quantity,
                mass,
            )
        })
        .collect();
    let levels = [Inline::from("All, by the ring levels"), Inline::from("—")];
    rows.push(row(levels, strain.ring_levels, mass));
    if review.gas.basis == Basis::Measured {
        let total = [
            Inline::new().strong("Total, from the measured enthalpy"),
            Inline::from("—"),
        ];
        rows.push(row(total, strain.quantity, mass));
    }
    Block::Table(Table {
        caption: "Strain per ring system and in total, gas phase, 298.15 K. U (95 %) is for the true value, k = U/u. Ring systems share uncertainty, so the u of the total is not the root of the sum of squares.".into(),
        columns: vec![
            Column::words("Ring system, atoms"),
            Column::words("Ring sizes"),
            Column::numbers("Strain, kJ/mol"),
            Column::numbers("u, kJ/mol"),
            Column::numbers("U, kJ/mol"),
            Column::numbers("k"),
            Column::numbers("Strain ± U, kcal/mol"),
            Column::numbers("Strain ± U, J/g"),
        ],
        rows,
    })
}

fn row(name: [Inline; 2], quantity: Quantity, mass: Option<MolarMass>) -> Vec<Inline> {
    let value = rounded(quantity.value_kj_per_mol, quantity.u_kj_per_mol);
    let [energy, expanded] =
        [quantity.value_kj_per_mol, quantity.expanded_kj_per_mol].map(MolarEnergy::from_kj_per_mol);
    let per_gram = mass.map_or_else(
        || "—".to_owned(),
        |mass| {
            let [energy, expanded] = [energy, expanded].map(|e| (e / mass).j_per_g());
            rounded(energy, expanded).interval()
        },
    );
    let mut cells = Vec::from(name);
    cells.extend([
        value.value.into(),
        value.uncertainty.into(),
        uncertainty(quantity.expanded_kj_per_mol).into(),
        coverage_factor(quantity).into(),
        rounded(energy.kcal_per_mol(), expanded.kcal_per_mol())
            .interval()
            .into(),
        per_gram.into(),
    ]);
    cells
}

/// The coverage factor k of a value, U/u.
pub(super) fn coverage_factor(quantity: Quantity) -> String {
    fixed(quantity.expanded_kj_per_mol / quantity.u_kj_per_mol, 2)
}
