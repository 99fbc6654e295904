//! Published values, recomputed at the moment of the report.

use super::bibliography::Citations;
use super::block::{Block, Column, Note, NoteKind, Table};
use super::inline::Inline;
use super::report::heading;
use super::rounding::as_published;
use crate::review::{CheckOutcome, CheckValue};

pub(super) fn blocks(checks: &[CheckValue], citations: &mut Citations) -> Vec<Block> {
    if checks.is_empty() {
        return Vec::new();
    }
    let off = checks
        .iter()
        .filter(|check| check.outcome == CheckOutcome::Off)
        .count();
    let mut blocks = vec![
        heading(2, "Check values"),
        "The program recomputed these published values when it made this report. Agreement shows that the program is the one that was checked; it says nothing of a substance that no one has measured.".into(),
    ];
    if off > 0 {
        blocks.push(Block::Note(Note {
            kind: NoteKind::Warning,
            paragraphs: vec![
                format!("{off} of {} check values are off. Do not use this report before that is understood.", checks.len()).into(),
            ],
        }));
    }
    blocks.push(Block::Table(Table {
        caption: "Check values: published, recomputed now, largest difference that still agrees, and why that one.".into(),
        columns: vec![
            Column::words("Quantity"),
            Column::words("Subject"),
            Column::numbers("Published"),
            Column::numbers("Recomputed"),
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

fn row(check: &CheckValue, citations: &mut Citations) -> Vec<Inline> {
    vec![
        check.quantity.as_str().into(),
        Inline::new().code(check.subject.as_str()),
        as_published(check.published).into(),
        recomputed(check).into(),
        as_published(check.tolerance).into(),
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
    super::rounding::rounded(check.computed, check.tolerance).value
}
