//! The strain of each ring system by several conventions, with the reactions and the molecules that take part in them.

use std::collections::BTreeSet;

use super::bibliography::Citations;
use super::block::{Block, Column, Table};
use super::inline::{Inline, Span, subscripted};
use super::inputs::Inputs;
use super::report::heading;
use super::rounding::{rounded, uncertainty};
use super::strain::{atom_numbers, coverage_factor};
use crate::review::{ConventionStrain, Participant, SubstanceReview};

pub(super) fn blocks(review: &SubstanceReview, citations: &mut Citations) -> Vec<Block> {
    let conventions = &review.strain_conventions;
    if conventions.is_empty() {
        return Vec::new();
    }
    let mut blocks = vec![
        heading(4, "Strain by convention"),
        "The conventions are told apart under \"Conventions of strain\", below the substances. All other figures of this report use the group increments.".into(),
    ];
    for system in conventions.chunk_by(|a, b| a.atoms == b.atoms) {
        blocks.push(table(system));
    }
    blocks.extend(participants(conventions, citations));
    blocks
}

/// What the conventions mean, once for all substances; nothing where no substance has a strained ring.
pub(super) fn definitions(inputs: &Inputs, citations: &mut Citations) -> Vec<Block> {
    let mut reviews = inputs.entries.iter().flat_map(|entry| &entry.finding);
    if reviews.all(|review| review.strain_conventions.is_empty()) {
        return Vec::new();
    }
    let item = |name: &str, source: Span, words: &str| {
        Inline::new()
            .strong(name)
            .text(" (")
            .with(source)
            .text(format!("): {words}"))
    };
    vec![
        heading(2, "Conventions of strain"),
        "The conventions have different zeros, so their values differ without contradicting each other; compare like with like. By a reaction, the strain is the enthalpy of formation of the reactants, the molecule among them, minus that of the products: positive where the opened side lies lower. Each reaction opens one ring system and leaves substituents and aromatic rings as they are; the open chains are taken without configurations.".into(),
        Block::List {
            ordered: false,
            items: vec![
                item("Group increment", citations.cite("benson-1976"), "the enthalpy of formation minus the sum of what a chain of the same groups has; here fitted to measurements."),
                item("Homologous CH2 increment", citations.cite("goldbook-s06037"), "the enthalpy of formation of a ring of n CH2 groups minus n times the CH2 of the n-alkanes. Not defined for other rings."),
                item("Isodesmic, bond separation", citations.cite("hehre-1970"), "each ring bond becomes the molecule of its two atoms, and the order of the bonds is kept. Neighbouring bonds stabilise each other in chains and rings alike, and conjugation does so too; both are lost, so that even cyclohexane comes out below zero. A low value is no sign of a ring at ease."),
                item("Homodesmotic", citations.cite("george-1975"), "bonds are kept by hybridisation, atoms by hybridisation and hydrogens."),
                item("Hyperhomodesmotic", citations.cite("wheeler-2009"), "bonds are kept by hybridisation and hydrogens of both atoms. Closest to group increments, but it rests on more and larger molecules, whose measurements are poorer."),
            ],
        },
    ]
}

fn table(system: &[ConventionStrain]) -> Block {
    let atoms = system.first().map_or(&[][..], |row| &row.atoms);
    let rows = system
        .iter()
        .map(|row| {
            let reaction = row.reaction.as_ref().map_or_else(
                || Inline::from("—"),
                |reaction| Inline::new().code(reaction.replace("->", "→")),
            );
            let numbers = row.quantity.map_or_else(
                || ["—"; 4].map(Inline::from),
                |q| {
                    let value = rounded(q.value_kj_per_mol, q.u_kj_per_mol);
                    [
                        value.value,
                        value.uncertainty,
                        uncertainty(q.expanded_kj_per_mol),
                        coverage_factor(q),
                    ]
                    .map(Inline::from)
                },
            );
            let mut cells = vec![Inline::from(row.convention), reaction];
            cells.extend(numbers);
            let estimate = row
                .estimate
                .map(|q| rounded(q.value_kj_per_mol, q.expanded_kj_per_mol).interval());
            cells.push(estimate.map_or("—".into(), Inline::from));
            cells.push(row.note.as_str().into());
            cells
        })
        .collect();
    Block::Table(Table {
        caption: format!(
            "Strain of the ring system of atoms {} by convention, gas phase, 298.15 K. Structures as SMILES; the first is the molecule itself. U (95 %) is for the true value, k = U/u. The estimate is that of the additivity alone, with its covariance.",
            atom_numbers(atoms)
        )
        .into(),
        columns: vec![
            Column::words("Convention"),
            Column::words("Reaction"),
            Column::numbers("Strain, kJ/mol"),
            Column::numbers("u, kJ/mol"),
            Column::numbers("U, kJ/mol"),
            Column::numbers("k"),
            Column::numbers("Estimate ± U, kJ/mol"),
            Column::words("Rests on"),
        ],
        rows,
    })
}

/// The partners, each once.
fn participants(conventions: &[ConventionStrain], citations: &mut Citations) -> Option<Block> {
    let mut seen = BTreeSet::new();
    let rows: Vec<_> = conventions
        .iter()
        .flat_map(|row| &row.participants)
        .filter(|participant| seen.insert(participant.smiles.as_str()))
        .map(|participant| cells(participant, citations))
        .collect();
    (!rows.is_empty()).then(|| {
        Block::Table(Table {
            caption: "The other molecules of these reactions. One that was measured counts with its surest measured enthalpy of formation (gas, 298.15 K); the others are estimated together with the reaction, since their errors cancel in part.".into(),
            columns: vec![
                Column::words("Structure"),
                Column::words("Formula"),
                Column::words("Name"),
                Column::numbers("Enthalpy of formation, kJ/mol"),
                Column::numbers("u, kJ/mol"),
                Column::words("Source"),
            ],
            rows,
        })
    })
}

fn cells(participant: &Participant, citations: &mut Citations) -> Vec<Inline> {
    let mut cells = vec![
        Inline::new().code(participant.smiles.as_str()),
        subscripted(&participant.formula).into(),
        participant.name.as_deref().unwrap_or("—").into(),
    ];
    cells.extend(match (participant.measured, &participant.source) {
        (Some(measured), Some(source)) => {
            let value = rounded(measured.value_kj_per_mol, measured.u_kj_per_mol);
            [
                value.value.into(),
                value.uncertainty.into(),
                Inline::new().with(citations.cite(source)),
            ]
        }
        _ => ["estimated".into(), "—".into(), "—".into()],
    });
    cells
}
