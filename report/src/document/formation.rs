//! The enthalpy of formation: measured values first, the estimate beside them, and what the estimate leans on.

use super::bibliography::Citations;
use super::block::{Block, Column, Note, NoteKind, Table};
use super::condensed::basis;
use super::evidence;
use super::inline::Inline;
use super::report::heading;
use super::rounding::{rounded, uncertainty};
use super::strain::coverage_factor;
use crate::review::{Agreement, Comparison, FormationEnthalpy, TELLING_KJ_PER_MOL};

pub(super) fn blocks(gas: &FormationEnthalpy, citations: &mut Citations) -> Vec<Block> {
    let mut blocks = vec![heading(4, "Enthalpy of formation, gas, 298.15 K")];
    if gas.comparisons.is_empty() {
        blocks.push(Block::Note(Note {
            kind: NoteKind::Caution,
            paragraphs: vec![
                match gas.carried_from {
                    Some(phase) => format!("No measured gas-phase value of this molecule was used: the number below is an estimate from its measured {phase} and an estimated step between the phases."),
                    None => "No measured value of this molecule was used: the number below is an estimate.".to_owned(),
                }
                .into(),
            ],
        }));
    } else {
        blocks.push(comparisons("gas", &gas.comparisons, citations));
        blocks.extend(
            gas.comparisons
                .iter()
                .filter_map(|comparison| verdict(comparison, citations)),
        );
    }
    blocks.push(values(gas));
    blocks.push(evidence::grade(gas));
    blocks.push(evidence::table(gas, citations));
    blocks
}

pub(super) fn comparisons(
    phase: &str,
    comparisons: &[Comparison],
    citations: &mut Citations,
) -> Block {
    let rows = comparisons
        .iter()
        .map(|comparison| {
            let measured = &comparison.measured;
            let value = rounded(
                measured.quantity.value_kj_per_mol,
                measured.quantity.u_kj_per_mol,
            );
            let blind = rounded(
                comparison.blind.value_kj_per_mol,
                comparison.blind.u_kj_per_mol,
            );
            let difference = rounded(
                comparison.difference_kj_per_mol,
                comparison.expanded_difference_kj_per_mol,
            );
            let source = Inline::new().with(citations.cite(&measured.source));
            vec![
                if measured.from_case {
                    "case file"
                } else {
                    "project data"
                }
                .into(),
                source,
                value.value.into(),
                value.uncertainty.into(),
                blind.value.into(),
                blind.uncertainty.into(),
                difference.interval().into(),
                match comparison.agreement {
                    Agreement::Agrees
                        if comparison.expanded_difference_kj_per_mol > TELLING_KJ_PER_MOL =>
                    {
                        Inline::from("not told apart: U of the difference is wide")
                    }
                    Agreement::Agrees => Inline::from("agree"),
                    Agreement::Disagrees => Inline::new().strong("disagree"),
                    Agreement::Settled => Inline::from("settled"),
                },
            ]
        })
        .collect();
    Block::Table(Table {
        caption: format!("Measured values of the molecule itself ({phase}), beside the estimate that leaves out every measurement of it in any phase. They agree when the difference is within its U (95 %).").into(),
        columns: vec![
            Column::words("From"),
            Column::words("Source"),
            Column::numbers("Measured, kJ/mol"),
            Column::numbers("u, kJ/mol"),
            Column::numbers("Estimate without it, kJ/mol"),
            Column::numbers("u, kJ/mol"),
            Column::numbers("Measured minus estimate ± U, kJ/mol"),
            Column::words("Verdict"),
        ],
        rows,
    })
}

/// What to make of a disagreement; nothing to say when they agree.
fn verdict(comparison: &Comparison, citations: &mut Citations) -> Option<Block> {
    let measured = &comparison.measured;
    let source = citations.cite(&measured.source);
    let difference = rounded(
        comparison.difference_kj_per_mol.abs(),
        comparison.expanded_difference_kj_per_mol,
    );
    let opening = Inline::new()
        .text(format!(
            "The measured value {} kJ/mol (",
            rounded(measured.quantity.value_kj_per_mol, measured.quantity.u_kj_per_mol).value
        ))
        .with(source)
        .text(format!(
            ") and the estimate {} kJ/mol differ by {} kJ/mol, more than the U = {} kJ/mol (95 %) of their difference. ",
            rounded(comparison.blind.value_kj_per_mol, comparison.blind.u_kj_per_mol).value,
            difference.value,
            difference.uncertainty
        ));
    let (hazardous, other) = if comparison.difference_kj_per_mol > 0.0 {
        ("measured value", "estimate")
    } else {
        ("estimate", "measured value")
    };
    let higher = format!(
        "The {hazardous} is the more hazardous of the two: its enthalpy of formation is the higher one, and more energy can come out than the {other} says."
    );
    let (kind, words) = match comparison.agreement {
        Agreement::Agrees => return None,
        Agreement::Disagrees => (
            NoteKind::Warning,
            opening.strong(format!(
                "{higher} Until someone settles it by name in the case file, the highest value of the table counts."
            )),
        ),
        Agreement::Settled => {
            let settled = comparison.settled_by.as_deref().unwrap_or("no words given");
            (
                NoteKind::Information,
                opening
                    .text(format!("{higher} The case file settles it and keeps the "))
                    .strong(if comparison.keeps_estimate {
                        "estimate"
                    } else {
                        "measured value"
                    })
                    .text(". ")
                    .emphasis(settled),
            )
        }
    };
    Some(Block::Note(Note {
        kind,
        paragraphs: vec![words],
    }))
}

fn values(gas: &FormationEnthalpy) -> Block {
    let used = rounded(gas.quantity.value_kj_per_mol, gas.quantity.u_kj_per_mol);
    let estimate = rounded(gas.estimate.value_kj_per_mol, gas.estimate.u_kj_per_mol);
    Block::Table(Table {
        caption: "The value that this report uses, and the additivity's estimate from all measurements that it may lean on. U (95 %) is for the true value, k = U/u.".into(),
        columns: vec![
            Column::words("Value"),
            Column::words("Basis"),
            Column::numbers("Enthalpy of formation, kJ/mol"),
            Column::numbers("u, kJ/mol"),
            Column::numbers("U, kJ/mol"),
            Column::numbers("k"),
        ],
        rows: vec![
            vec![
                Inline::new().strong("Used"),
                basis(gas).into(),
                Inline::new().strong(used.value),
                used.uncertainty.into(),
                uncertainty(gas.quantity.expanded_kj_per_mol).into(),
                coverage_factor(gas.quantity).into(),
            ],
            vec![
                "Estimate".into(),
                "estimated".into(),
                estimate.value.into(),
                estimate.uncertainty.into(),
                uncertainty(gas.estimate.expanded_kj_per_mol).into(),
                coverage_factor(gas.estimate).into(),
            ],
        ],
    })
}
