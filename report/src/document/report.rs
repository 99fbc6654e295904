//! The strain report, put together in the order in which a reviewer reads it.

use super::bibliography::{Bibliography, Citations};
use super::block::{Block, Column, Document, Table};
use super::inline::Inline;
use super::inputs::Inputs;
use super::{blocks_from_markdown, cautions, checks, conventions, provenance, substance, summary};

/// The strain report of a case.
///
/// The same inputs give the same document: no clock, no machine, no chance comes into it.
pub fn report(inputs: &Inputs) -> Document {
    let mut citations = Citations::new(Bibliography::of_project());
    let mut blocks = vec![front(inputs)];
    blocks.extend(checks::warning(&inputs.checks));
    blocks.extend(cautions::blocks());
    blocks.extend(summary::blocks(inputs));
    if let Some(notes) = &inputs.header.notes {
        blocks.push(heading(2, "Notes of the case"));
        blocks.extend(blocks_from_markdown(notes));
    }
    blocks.push(heading(2, "Substances"));
    for (index, entry) in inputs.entries.iter().enumerate() {
        blocks.extend(substance::blocks(index, entry, &mut citations));
    }
    blocks.extend(conventions::definitions(inputs, &mut citations));
    blocks.extend(checks::blocks(&inputs.checks, &mut citations));
    blocks.extend(sign_off());
    blocks.extend(provenance::bibliography(&citations));
    blocks.extend(provenance::blocks(inputs));
    Document {
        title: inputs.header.title.clone(),
        blocks,
    }
}

pub(super) fn heading(level: u8, text: impl Into<Inline>) -> Block {
    Block::Heading {
        level,
        text: text.into(),
    }
}

/// A table of two columns, a name and what it stands for.
pub(super) fn particulars_table(
    caption: Inline,
    heads: [&str; 2],
    rows: Vec<(&str, Inline)>,
) -> Block {
    Block::Table(Table {
        caption,
        columns: heads.map(Column::words).to_vec(),
        rows: rows
            .into_iter()
            .map(|(name, value)| vec![Inline::from(name), value])
            .collect(),
    })
}

fn front(inputs: &Inputs) -> Block {
    let header = &inputs.header;
    let rows = [
        ("Reference", &header.reference),
        ("Revision", &header.revision),
        ("Date", &header.date),
        ("Author", &header.author),
    ];
    particulars_table(
        "The case, as its file states it.".into(),
        ["Item", "Entry"],
        rows.into_iter()
            .filter(|(_, entry)| !entry.is_empty())
            .map(|(name, entry)| (name, Inline::from(entry.as_str())))
            .collect(),
    )
}

fn sign_off() -> Vec<Block> {
    vec![
        heading(2, "Sign-off"),
        "Whoever signs has read the cautions and every flag, and has settled or accepted each disagreement by name.".into(),
        Block::Table(Table {
            caption: "Signatures, to be filled in by hand.".into(),
            columns: ["Part", "Name", "Date", "Signature"].map(Column::words).to_vec(),
            rows: ["Prepared by", "Checked by", "Approved by"]
                .map(|part| vec![Inline::from(part), Inline::new(), Inline::new(), Inline::new()])
                .to_vec(),
        }),
    ]
}

impl From<&str> for Block {
    fn from(text: &str) -> Self {
        Self::Paragraph(text.into())
    }
}
