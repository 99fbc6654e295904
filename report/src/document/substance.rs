//! One substance: what it is, how it looks, and then what was found.

use super::bibliography::Citations;
use super::block::{Block, Figure};
use super::drawing::{Drawing, StrainedSystem, StructureDrawing};
use super::inline::{Inline, subscripted};
use super::inputs::{Inputs, Particulars};
use super::report::{heading, particulars_table};
use super::rounding::{fixed, rounded};
use super::{blocks_from_markdown, formation, strain};
use crate::review::SubstanceReview;

/// Strain of a ring system from which on its bonds are marked in the drawing, kJ/mol: cyclohexane stays unmarked, cyclopentane does not.
const MARKED_FROM_KJ_PER_MOL: f64 = 20.0;

pub(super) fn blocks(
    index: usize,
    review: &SubstanceReview,
    inputs: &Inputs<'_>,
    citations: &mut Citations,
) -> Vec<Block> {
    let particulars = inputs
        .particulars
        .iter()
        .find(|particulars| particulars.substance == review.name);
    let mut blocks = vec![
        heading(3, review.name.as_str()),
        figure(index, review, inputs.coverage_factor),
        identity(review, particulars),
    ];
    if let Some(notes) = particulars.and_then(|particulars| particulars.notes.as_deref()) {
        blocks.push(heading(4, "Notes"));
        blocks.extend(blocks_from_markdown(notes));
    }
    blocks.extend(formation::blocks(&review.gas, citations));
    blocks.extend(strain::blocks(review, inputs.coverage_factor));
    if !review.flags.is_empty() {
        blocks.push(heading(4, "Flags"));
        blocks.push(Block::List {
            ordered: false,
            items: review
                .flags
                .iter()
                .map(|flag| flag.as_str().into())
                .collect(),
        });
    }
    blocks
}

fn figure(index: usize, review: &SubstanceReview, k: f64) -> Block {
    let strained: Vec<_> = review
        .strain
        .ring_systems
        .iter()
        .filter(|system| system.quantity.value_kj_per_mol > MARKED_FROM_KJ_PER_MOL)
        .map(|system| StrainedSystem {
            atoms: system.atoms.clone(),
            label: format!(
                "{} kJ/mol",
                rounded(
                    system.quantity.value_kj_per_mol,
                    k * system.quantity.u_kj_per_mol
                )
                .value
            ),
        })
        .collect();
    let marks = match &strained[..] {
        [] => format!(
            "No ring system has a strain over {} kJ/mol.",
            fixed(MARKED_FROM_KJ_PER_MOL, 0)
        ),
        _ => format!(
            "Heavy hatched bonds: ring systems with a strain over {} kJ/mol, with their strain. Small numbers: atoms as in the tables.",
            fixed(MARKED_FROM_KJ_PER_MOL, 0)
        ),
    };
    let told: Vec<_> = strained
        .iter()
        .map(|system| {
            format!(
                "atoms {}, {}",
                strain::atom_numbers(&system.atoms),
                system.label
            )
        })
        .collect();
    Block::Figure(Figure {
        id: format!("structure-{}", index + 1),
        caption: Inline::from(format!(
            "Structure of {}. {marks} Configurations are not to be read from the drawing.",
            review.name
        )),
        alternative: match &told[..] {
            [] => format!(
                "Structural formula of {}, {}; no strained ring is marked.",
                review.name, review.formula
            ),
            _ => format!(
                "Structural formula of {}, {}; marked as strained: {}.",
                review.name,
                review.formula,
                told.join("; ")
            ),
        },
        drawing: Drawing::Structure(Box::new(StructureDrawing {
            structure: review.structure.clone(),
            strained,
        })),
    })
}

fn identity(review: &SubstanceReview, particulars: Option<&Particulars>) -> Block {
    let mut rows = vec![
        (
            "Structure as given",
            Inline::new().code(review.input.as_str()),
        ),
        ("Formula", subscripted(&review.formula).into()),
        (
            "Molar mass",
            format!("{} g/mol", fixed(review.molar_mass_g_per_mol, 2)).into(),
        ),
        (
            "Oxygen balance to CO₂, H₂O, N₂, SO₂ and HX",
            format!("{} %", fixed(review.oxygen_balance_percent, 1)).into(),
        ),
    ];
    if let Some(particulars) = particulars {
        rows.extend(
            particulars
                .facts
                .iter()
                .map(|(name, fact)| (name.as_str(), fact.as_str().into())),
        );
    }
    particulars_table(
        format!("What {} is.", review.name).into(),
        ["Property", "Value"],
        rows,
    )
}
