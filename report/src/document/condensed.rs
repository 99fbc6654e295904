//! Enthalpies of formation of the liquid and the crystal.

use super::bibliography::Citations;
use super::block::{Block, Column, Table};
use super::formation::comparisons;
use super::inline::Inline;
use super::report::heading;
use super::rounding::{rounded, uncertainty};
use super::strain::coverage_factor;
use super::summary::basis_word;
use crate::review::{FormationEnthalpy, SubstanceReview};

pub(super) fn blocks(review: &SubstanceReview, citations: &mut Citations) -> Vec<Block> {
    let phases = [("liquid", &review.liquid), ("crystal", &review.solid)];
    let mut blocks = vec![
        heading(4, "Enthalpy of formation, liquid and crystal, 298.15 K"),
        Block::Table(Table {
            caption: "Below its melting point the liquid, above it the crystal is hypothetical: nothing here knows melting points. U (95 %) is for the true value, k = U/u.".into(),
            columns: vec![
                Column::words("Phase"),
                Column::words("Basis"),
                Column::numbers("Enthalpy of formation, kJ/mol"),
                Column::numbers("u, kJ/mol"),
                Column::numbers("U, kJ/mol"),
                Column::numbers("k"),
            ],
            rows: phases
                .iter()
                .map(|(phase, enthalpy)| {
                    let value =
                        rounded(enthalpy.quantity.value_kj_per_mol, enthalpy.quantity.u_kj_per_mol);
                    vec![
                        Inline::from(*phase),
                        basis(enthalpy).into(),
                        value.value.into(),
                        value.uncertainty.into(),
                        uncertainty(enthalpy.quantity.expanded_kj_per_mol).into(),
                        coverage_factor(enthalpy.quantity).into(),
                    ]
                })
                .collect(),
        }),
    ];
    for (phase, enthalpy) in phases {
        if !enthalpy.comparisons.is_empty() {
            blocks.push(comparisons(phase, &enthalpy.comparisons, citations));
        }
    }
    blocks
}

/// What an enthalpy of formation rests on, in words.
pub(super) fn basis(enthalpy: &FormationEnthalpy) -> String {
    match enthalpy.carried_from {
        Some(phase) => format!("estimated from its measured {phase}"),
        None => basis_word(enthalpy.basis).to_owned(),
    }
}
