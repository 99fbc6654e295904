//! What an estimate leans on, measurement by measurement, and the grade that follows.

use tautring_core::additivity::grade::{
    OFTEN, OUTSIDE_GROUPS, OUTSIDE_KJ_PER_MOL, OUTSIDE_LIKENESS, WELL_SUPPORTED_GROUPS,
    WELL_SUPPORTED_KJ_PER_MOL, WELL_SUPPORTED_LIKENESS,
};
use tautring_core::additivity::{Grade, Share};

use super::bibliography::Citations;
use super::block::{Block, Column, Table};
use super::inline::Inline;
use super::rounding::{fixed, rounded, uncertainty};
use crate::review::{Evidence, FormationEnthalpy, phase_word};

/// Measurements that the table of evidence lists: beyond the first dozen each moves the estimate by a few per cent of its own error.
const EVIDENCE_SHOWN: usize = 12;

/// The name of a measured compound, with a word where something speaks against its value.
fn named(evidence: &Evidence) -> Inline {
    let name = Inline::from(evidence.molecule.as_str());
    if evidence.misfit.is_some() {
        name.strong(" (misfit)")
    } else if !evidence.doubts.is_empty() {
        name.strong(" (doubtful)")
    } else {
        name
    }
}

/// The measurements with the largest weights.
pub(super) fn table(gas: &FormationEnthalpy, citations: &mut Citations) -> Block {
    let rows = gas
        .evidence
        .iter()
        .take(EVIDENCE_SHOWN)
        .map(|evidence| {
            let value = rounded(evidence.value_kj_per_mol, evidence.u_kj_per_mol);
            let error = evidence.left_out_error_kj_per_mol;
            vec![
                named(evidence),
                Inline::new().code(evidence.smiles.as_str()),
                evidence.resemblance.words.as_str().into(),
                fixed(evidence.weight, 3).into(),
                phase_word(&evidence.phase).into(),
                value.value.into(),
                value.uncertainty.into(),
                error
                    .map_or_else(|| "not known".to_owned(), |error| fixed(error, 1))
                    .into(),
                Inline::new().with(citations.cite(&evidence.source)),
            ]
        })
        .collect();
    Block::Table(Table {
        caption: format!(
            "The measurements that the estimate leans on most. A weight says how far the estimate moves, in kJ/mol, when the measured value moves by 1 kJ/mol; it may be negative. Likeness says which groups and rings of the molecule the measured compound has. The left-out error is the measured value minus what all other molecules say of it. {}",
            carried(gas)
        )
        .into(),
        columns: vec![
            Column::words("Measured compound"),
            Column::words("Structure"),
            Column::words("Likeness"),
            Column::numbers("Weight"),
            Column::words("Phase or step"),
            Column::numbers("Enthalpy, kJ/mol"),
            Column::numbers("u, kJ/mol"),
            Column::numbers("Left-out error, kJ/mol"),
            Column::words("Source"),
        ],
        rows,
    })
}

/// How much of the weight the listed measurements carry, and the others that report.json lists.
fn carried(gas: &FormationEnthalpy) -> String {
    let percent = |share: f64| fixed(100.0 * share, 0);
    let shown = gas.evidence.iter().take(EVIDENCE_SHOWN);
    let shown: f64 = shown.map(|evidence| evidence.share).sum();
    match gas.evidence.len().saturating_sub(EVIDENCE_SHOWN) {
        0 => format!(
            "Those listed carry {} % of the absolute weight.",
            percent(gas.evidence_share)
        ),
        more => format!(
            "Those listed carry {} % of the absolute weight, {more} more carry {} %; report.json lists them all.",
            percent(shown),
            percent(gas.evidence_share - shown)
        ),
    }
}

/// The grade of a value with the numbers behind it.
pub(super) fn grade(gas: &FormationEnthalpy) -> Block {
    let support = &gas.support;
    let words = Inline::from("Grade: ").strong(gas.grade.name());
    if gas.grade == Grade::Measured {
        return Block::Paragraph(words.text(", by a measurement of the molecule itself."));
    }
    let of = |share: Share| format!("{} of {}", fixed(share.shared, 0), fixed(share.of, 0));
    let rings = if support.ring_sizes.of > 0.0 {
        format!(
            " Of its rings, {} sizes, {} atoms and bonds and {} junctions occur in measured molecules.",
            of(support.ring_sizes),
            of(support.ring_atoms),
            of(support.ring_environment)
        )
    } else {
        String::new()
    };
    Block::Paragraph(words.text(format!(
        ". {} groups occur in measured molecules, {} in at least {OFTEN}.{rings} The most alike molecule in the evidence has a likeness of {} (0 nothing, 1 all features shared); U = {} kJ/mol.",
        of(support.groups),
        of(support.groups_often),
        fixed(support.closest, 2),
        uncertainty(support.expanded_kj_per_mol)
    )))
}

/// What the grades mean, in the numbers that define them.
pub(super) fn grades_explained() -> Inline {
    Inline::from("The grade of an enthalpy of formation: ")
        .strong("measured")
        .text(", the molecule itself was. ")
        .strong("Well supported")
        .text(format!(
            ", an estimate with U of at most {} kJ/mol for a molecule all of whose groups and rings were measured in other molecules, {} % of the groups in at least {OFTEN}, one of the molecules that carry it having a likeness of at least {}. ",
            fixed(WELL_SUPPORTED_KJ_PER_MOL, 0),
            fixed(100.0 * WELL_SUPPORTED_GROUPS, 0),
            fixed(WELL_SUPPORTED_LIKENESS, 1)
        ))
        .strong("Outside")
        .text(format!(
            ", an estimate for a molecule with a kind of atom, bond or ring size that no measured molecule has, or with fewer than {} % of its groups measured, or with nothing in the evidence of a likeness of {}, or with U above {} kJ/mol. ",
            fixed(100.0 * OUTSIDE_GROUPS, 0),
            fixed(OUTSIDE_LIKENESS, 1),
            fixed(OUTSIDE_KJ_PER_MOL, 0)
        ))
        .strong("Extrapolated")
        .text(", every other estimate.")
}
