//! One substance: what it is, how it looks, and then what was found.

use super::bibliography::Citations;
use super::block::{Block, Column, Figure, Note, NoteKind, Table};
use super::drawing::{Drawing, StrainedSystem, StructureDrawing};
use super::entry::{Entry, Particulars};
use super::inline::{Inline, subscripted};
use super::report::{heading, particulars_table};
use super::rounding::{fixed, rounded};
use super::{blocks_from_markdown, condensed, conventions, formation, strain, thermal};
use crate::review::{Quantity, RingStrain, SubstanceReview, UNSTATED_KJ_PER_MOL};

/// Strain of a ring system from which on its bonds are marked in the drawing, kJ/mol: cyclohexane stays unmarked, cyclopentane does not.
const MARKED_FROM_KJ_PER_MOL: f64 = 20.0;

pub(super) fn blocks(index: usize, entry: &Entry, citations: &mut Citations) -> Vec<Block> {
    let particulars = &entry.particulars;
    let mut blocks = vec![heading(3, particulars.substance.as_str())];
    match &entry.finding {
        Ok(review) => {
            blocks.push(figure(index, review));
            blocks.push(identity(particulars, Some(review)));
        }
        Err(reason) => {
            blocks.push(Block::Note(Note {
                kind: NoteKind::Warning,
                paragraphs: vec![
                    Inline::new()
                        .strong("This substance could not be reviewed: ")
                        .text(reason.as_str())
                        .text(". Nothing in this report speaks of its hazard."),
                ],
            }));
            blocks.push(identity(particulars, None));
        }
    }
    if let Some(notes) = &particulars.notes {
        blocks.push(heading(4, "Notes"));
        blocks.extend(blocks_from_markdown(notes));
    }
    blocks.extend(stated(particulars));
    if let Ok(review) = &entry.finding {
        blocks.extend(formation::blocks(&review.gas, citations));
        blocks.extend(condensed::blocks(review, citations));
        blocks.extend(strain::blocks(review));
        blocks.extend(conventions::blocks(review, citations));
        blocks.extend(thermal::blocks(review));
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
    }
    blocks
}

/// Measured values in the words of the case file, whether the review can compare them or not.
fn stated(particulars: &Particulars) -> Vec<Block> {
    if particulars.measured.is_empty() {
        return Vec::new();
    }
    let rows = particulars
        .measured
        .iter()
        .map(|stated| {
            vec![
                Inline::from(stated.quantity.as_str()),
                stated.value.as_str().into(),
                stated.uncertainty.as_deref().unwrap_or("not stated").into(),
                stated.source.as_str().into(),
                stated.note.as_deref().unwrap_or("—").into(),
                if stated.compared { "yes, below" } else { "no" }.into(),
            ]
        })
        .collect();
    vec![
        heading(4, "Measured values of the case"),
        Block::Table(Table {
            caption: format!(
                "Measured values as the case file states them. Enthalpies of formation are compared with the estimate for their phase; one without a stated uncertainty counts with u = {} kJ/mol, that of a handbook value. The others are shown only.",
                fixed(UNSTATED_KJ_PER_MOL, 1)
            )
            .into(),
            columns: vec![
                Column::words("Quantity"),
                Column::numbers("Value"),
                Column::numbers("Uncertainty"),
                Column::words("Source"),
                Column::words("Remark"),
                Column::words("Compared"),
            ],
            rows,
        }),
    ]
}

fn figure(index: usize, review: &SubstanceReview) -> Block {
    let strained: Vec<_> = in_use(review)
        .filter(|(_, strain)| strain.value_kj_per_mol > MARKED_FROM_KJ_PER_MOL)
        .map(|(system, strain)| StrainedSystem {
            atoms: system.atoms.clone(),
            label: format!(
                "{} kJ/mol",
                rounded(strain.value_kj_per_mol, strain.expanded_kj_per_mol).interval()
            ),
        })
        .collect();
    let marks = match &strained[..] {
        [] => format!(
            "No ring system has a strain over {} kJ/mol.",
            fixed(MARKED_FROM_KJ_PER_MOL, 0)
        ),
        _ => format!(
            "Heavy hatched bonds: ring systems with a strain over {} kJ/mol, with their strain ± U (95 %). Small numbers: atoms as in the tables.",
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

fn identity(particulars: &Particulars, review: Option<&SubstanceReview>) -> Block {
    let mut rows = vec![(
        "Structure as given",
        Inline::new().code(particulars.structure.as_str()),
    )];
    if let Some(review) = review {
        rows.extend([
            ("Formula", subscripted(&review.formula).into()),
            (
                "Molar mass",
                format!("{} g/mol", fixed(review.molar_mass_g_per_mol, 2)).into(),
            ),
            (
                "Oxygen balance to CO₂, H₂O, N₂, SO₂ and HX",
                format!("{} %", fixed(review.oxygen_balance_percent, 1)).into(),
            ),
        ]);
    }
    rows.extend(
        particulars
            .facts
            .iter()
            .map(|(name, fact)| (name.as_str(), fact.as_str().into())),
    );
    particulars_table(
        format!("What {} is.", particulars.substance).into(),
        ["Property", "Value"],
        rows,
    )
}

/// The ring systems with the strain in use: for a molecule of one ring system the total, which follows a measured enthalpy.
pub(super) fn in_use(review: &SubstanceReview) -> impl Iterator<Item = (&RingStrain, Quantity)> {
    let strain = &review.strain;
    let alone = strain.ring_systems.len() == 1;
    strain.ring_systems.iter().map(move |system| {
        let quantity = if alone {
            strain.quantity
        } else {
            system.quantity
        };
        (system, quantity)
    })
}
