//! Entropy and heat capacity of the ideal gas.

use super::block::{Block, Column, Table};
use super::inline::Inline;
use super::report::heading;
use super::rounding::{fixed, rounded, uncertainty};
use crate::review::SubstanceReview;

pub(super) fn blocks(review: &SubstanceReview) -> Vec<Block> {
    let Some(thermal) = &review.gas_thermal else {
        return Vec::new();
    };
    let entropy = [("Standard entropy", &thermal.entropy)].into_iter();
    let capacities = thermal.heat_capacity.iter();
    let rows = entropy.chain(capacities.map(|value| ("Heat capacity", value)));
    vec![
        heading(4, "Entropy and heat capacity, ideal gas"),
        Block::Table(Table {
            caption: format!(
                "Estimated from published values of other molecules and, where it is in the tables, of this one; at 1 bar; symmetry number {}. U (95 %) is for the true value. They serve reactions of gases only: a liquid or a solution has a larger heat capacity, often by half, and the batch has to be calculated with that.",
                thermal.symmetry_number
            )
            .into(),
            columns: vec![
                Column::words("Quantity"),
                Column::numbers("Temperature, K"),
                Column::numbers("Value, J/(mol K)"),
                Column::numbers("u, J/(mol K)"),
                Column::numbers("U, J/(mol K)"),
            ],
            rows: rows
                .map(|(name, value)| {
                    let printed = rounded(value.value_j_per_mol_k, value.u_j_per_mol_k);
                    vec![
                        Inline::from(name),
                        fixed(value.temperature_k, 2).into(),
                        printed.value.into(),
                        printed.uncertainty.into(),
                        uncertainty(value.expanded_j_per_mol_k).into(),
                    ]
                })
                .collect(),
        }),
    ]
}
