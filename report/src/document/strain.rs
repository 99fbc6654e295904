//! The strain of a substance: per ring system and in total.

use tautring_core::quantities::KJ_PER_KCAL;

use super::block::{Block, Column, Table};
use super::inline::Inline;
use super::report::heading;
use super::rounding::{rounded, uncertainty};
use crate::review::{RingStrain, SubstanceReview};

pub(super) fn blocks(review: &SubstanceReview, k: f64) -> Vec<Block> {
    let strain = &review.strain;
    let mut blocks = vec![
        heading(4, "Strain"),
        Block::Paragraph(
            Inline::from("A strain energy means nothing without its convention. The one here: ")
                .emphasis(strain.convention)
                .text("."),
        ),
    ];
    if strain.ring_systems.is_empty() {
        blocks.push("The molecule has no ring that counts as strained by this convention: aromatic rings do not, and there is no other.".into());
    }
    blocks.push(table(review, k));
    if let Some(other) = strain.measured_minus_strain_free {
        blocks.push(Block::Paragraph(
            format!(
                "From the measured enthalpy of formation: measured minus strain-free sum is {} kJ/mol (± U, 95 %, for the true value), where the table gives {} kJ/mol.",
                rounded(other.value_kj_per_mol, k * other.u_kj_per_mol).interval(),
                rounded(strain.quantity.value_kj_per_mol, k * strain.quantity.u_kj_per_mol).interval()
            )
            .into(),
        ));
    }
    blocks
}

/// `1, 2, 3` for the atoms 0, 1, 2.
pub(super) fn atom_numbers(atoms: &[usize]) -> String {
    let numbers: Vec<_> = atoms.iter().map(|atom| (atom + 1).to_string()).collect();
    numbers.join(", ")
}

fn table(review: &SubstanceReview, k: f64) -> Block {
    let strain = &review.strain;
    let mut rows: Vec<_> = strain
        .ring_systems
        .iter()
        .map(|system| row(system, k))
        .collect();
    let value = rounded(
        strain.quantity.value_kj_per_mol,
        strain.quantity.u_kj_per_mol,
    );
    let per_gram = rounded(strain.j_per_g, k * strain.u_j_per_g);
    let expanded = k * strain.quantity.u_kj_per_mol;
    rows.push(vec![
        Inline::new().strong("Total"),
        Inline::from("—"),
        Inline::new().strong(value.value),
        value.uncertainty.into(),
        uncertainty(expanded).into(),
        rounded(strain.value_kcal_per_mol, expanded / KJ_PER_KCAL)
            .interval()
            .into(),
        per_gram.interval().into(),
    ]);
    Block::Table(Table {
        caption: "Strain per ring system and in total, gas phase, 298.15 K. U (95 %) is for the true value. Ring systems share uncertainty, so the u of the total is not the root of the sum of squares.".into(),
        columns: vec![
            Column::words("Ring system, atoms"),
            Column::words("Ring sizes"),
            Column::numbers("Strain, kJ/mol"),
            Column::numbers("u, kJ/mol"),
            Column::numbers("U, kJ/mol"),
            Column::numbers("Strain ± U, kcal/mol"),
            Column::numbers("Strain ± U, J/g"),
        ],
        rows,
    })
}

fn row(system: &RingStrain, k: f64) -> Vec<Inline> {
    let quantity = system.quantity;
    let value = rounded(quantity.value_kj_per_mol, quantity.u_kj_per_mol);
    let expanded = k * quantity.u_kj_per_mol;
    let sizes: Vec<_> = system.sizes.iter().map(ToString::to_string).collect();
    vec![
        atom_numbers(&system.atoms).into(),
        sizes.join(", ").into(),
        value.value.into(),
        value.uncertainty.into(),
        uncertainty(expanded).into(),
        rounded(
            quantity.value_kj_per_mol / KJ_PER_KCAL,
            expanded / KJ_PER_KCAL,
        )
        .interval()
        .into(),
        "—".into(),
    ]
}
