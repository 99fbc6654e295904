//! Published values, recomputed at the moment of the report.

use super::bibliography::Citations;
use super::block::{Block, Column, Note, NoteKind, Table};
use super::inline::Inline;
use super::report::heading;
use super::rounding::{as_published, rounded, uncertainty};
use crate::review::{CheckOutcome, CheckValue};

pub(super) fn blocks(checks: &[CheckValue], citations: &mut Citations) -> Vec<Block> {
    if checks.is_empty() {
        return Vec::new();
    }
    let mut blocks = vec![
        heading(2, "Check values"),
        "The program recomputed these published values when it made this report. Agreement shows that the program is the one that was checked; it says nothing of a substance that no one has measured.".into(),
    ];
    blocks.push(Block::Table(Table {
        caption: "Check values: published, recomputed now, largest difference that still agrees, and why that one.".into(),
        columns: vec![
            Column::words("Quantity"),
            Column::words("Subject"),
            Column::numbers("Published"),
            Column::numbers("Recomputed"),
            Column::numbers("Difference"),
            Column::numbers("Tolerance"),
            Column::words("Unit"),
            Column::words("Verdict"),
            Column::words("Source"),
            Column::words("Seen"),
            Column::words("Reason of the tolerance"),
        ],
        rows: checks.iter().map(|check| row(check, citations)).collect(),
    }));
    blocks
}

/// A warning when a check value is off: it stands where nobody can miss it.
pub(super) fn warning(checks: &[CheckValue]) -> Option<Block> {
    let off = checks
        .iter()
        .filter(|check| check.outcome == CheckOutcome::Off)
        .count();
    (off > 0).then(|| {
        Block::Note(Note {
            kind: NoteKind::Warning,
            paragraphs: vec![
                format!(
                    "{off} of {} check values are off (section Check values). Do not use this report before that is understood.",
                    checks.len()
                )
                .into(),
            ],
        })
    })
}

fn row(check: &CheckValue, citations: &mut Citations) -> Vec<Inline> {
    vec![
        check.quantity.as_str().into(),
        Inline::new().code(check.subject.as_str()),
        as_published(check.published).into(),
        recomputed(check).into(),
        rounded(check.computed - check.published, check.tolerance)
            .value
            .into(),
        uncertainty(check.tolerance).into(),
        check.unit.as_str().into(),
        match check.outcome {
            CheckOutcome::Agrees => Inline::from("agrees"),
            CheckOutcome::Off => Inline::new().strong("off"),
        },
        Inline::new().with(citations.cite(&check.source)),
        check.source_seen.as_str().into(),
        check.tolerance_reason.as_str().into(),
    ]
}

/// The recomputed value to a tenth of the tolerance, so that the verdict can be followed.
fn recomputed(check: &CheckValue) -> String {
    rounded(check.computed, check.tolerance).value
}
