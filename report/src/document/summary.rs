//! The summary: every substance in one table, the plot, the flags.

use tautring_core::quantities::KJ_PER_KCAL;

use super::block::{Block, Column, Figure, Note, NoteKind, Table};
use super::drawing::{Drawing, PlottedStrain, StrainPlot};
use super::inline::{Inline, subscripted};
use super::inputs::Inputs;
use super::report::heading;
use super::rounding::{fixed, rounded};
use crate::review::{Basis, SubstanceReview};

pub(super) fn blocks(inputs: &Inputs<'_>) -> Vec<Block> {
    let mut blocks = vec![heading(2, "Summary"), table(inputs)];
    blocks.extend(flags(inputs.reviews));
    blocks.extend(plot(inputs));
    blocks
}

fn table(inputs: &Inputs<'_>) -> Block {
    let k = inputs.coverage_factor;
    let rows = inputs
        .reviews
        .iter()
        .map(|review| {
            let strain = &review.strain;
            let expanded = k * strain.quantity.u_kj_per_mol;
            let gas = &review.gas;
            vec![
                Inline::from(review.name.as_str()),
                subscripted(&review.formula).into(),
                rounded(strain.quantity.value_kj_per_mol, expanded)
                    .interval()
                    .into(),
                rounded(strain.value_kcal_per_mol, expanded / KJ_PER_KCAL)
                    .interval()
                    .into(),
                rounded(strain.j_per_g, k * strain.u_j_per_g)
                    .interval()
                    .into(),
                rounded(gas.quantity.value_kj_per_mol, gas.quantity.expanded_kj_per_mol)
                    .interval()
                    .into(),
                basis_word(gas.basis).into(),
                review.flags.len().to_string().into(),
            ]
        })
        .collect();
    Block::Table(Table {
        caption: format!(
            "Strain and gas-phase enthalpy of formation at 298.15 K, each with its expanded uncertainty U (95 %, for the true value; k = {} for estimates).",
            fixed(k, 2)
        )
        .into(),
        columns: vec![
            Column::words("Substance"),
            Column::words("Formula"),
            Column::numbers("Strain ± U, kJ/mol"),
            Column::numbers("Strain ± U, kcal/mol"),
            Column::numbers("Strain ± U, J/g"),
            Column::numbers("Enthalpy of formation ± U, kJ/mol"),
            Column::words("Basis of the enthalpy"),
            Column::numbers("Flags (below)"),
        ],
        rows,
    })
}

pub(super) const fn basis_word(basis: Basis) -> &'static str {
    match basis {
        Basis::Measured => "measured",
        Basis::Estimated => "estimated",
    }
}

fn flags(reviews: &[SubstanceReview]) -> Option<Block> {
    let paragraphs: Vec<_> = reviews
        .iter()
        .flat_map(|review| {
            review.flags.iter().map(|flag| {
                Inline::new()
                    .strong(format!("{}: ", review.name))
                    .text(flag.as_str())
            })
        })
        .collect();
    (!paragraphs.is_empty()).then_some(Block::Note(Note {
        kind: NoteKind::Caution,
        paragraphs,
    }))
}

/// The plot, when a substance has a ring system of one ring: only there is "the ring size" one number.
fn plot(inputs: &Inputs<'_>) -> Option<Block> {
    let k = inputs.coverage_factor;
    let case: Vec<_> = inputs
        .reviews
        .iter()
        .flat_map(|review| {
            review
                .strain
                .ring_systems
                .iter()
                .filter_map(move |system| match system.sizes[..] {
                    [size] => Some(PlottedStrain {
                        size,
                        strain_kj_per_mol: system.quantity.value_kj_per_mol,
                        expanded_kj_per_mol: k * system.quantity.u_kj_per_mol,
                        label: review.name.clone(),
                    }),
                    _ => None,
                })
        })
        .collect();
    if case.is_empty() {
        return None;
    }
    let background = inputs
        .monocycles
        .iter()
        .map(|ring| PlottedStrain {
            size: ring.size,
            strain_kj_per_mol: ring.strain_kj_per_mol,
            expanded_kj_per_mol: k * ring.u_kj_per_mol,
            label: String::new(),
        })
        .collect();
    let told: Vec<_> = case
        .iter()
        .map(|point: &PlottedStrain| {
            let strain = rounded(point.strain_kj_per_mol, point.expanded_kj_per_mol);
            format!(
                "{}, ring of {}, {} kJ/mol",
                point.label,
                point.size,
                strain.interval()
            )
        })
        .collect();
    Some(Block::Figure(Figure {
        id: "strain-by-ring-size".to_owned(),
        caption: "Strain of the ring systems that are a single ring (filled) among the measured unsubstituted cycloalkanes (open), against ring size. Bars are the expanded uncertainty U (95 %) of the true value. Fused, bridged and spiro systems have no single ring size and stand in the tables only.".into(),
        alternative: format!("Strain against ring size. {}.", told.join("; ")),
        drawing: Drawing::StrainPlot(StrainPlot { background, case }),
    }))
}
