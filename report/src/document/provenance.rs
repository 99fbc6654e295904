//! Where everything came from: the bibliography, digests, versions.

use super::bibliography::Citations;
use super::block::{Block, Column, Table};
use super::inline::Inline;
use super::inputs::Inputs;
use super::report::{heading, particulars_table};

pub(super) fn bibliography(citations: &Citations) -> Vec<Block> {
    let items: Vec<_> = citations
        .references()
        .map(|reference| {
            reference
                .formatted()
                .text(" Key: ")
                .code(reference.key.as_str())
                .text(".")
        })
        .collect();
    if items.is_empty() {
        return Vec::new();
    }
    vec![
        heading(2, "Bibliography"),
        "In the order of citation. \"From memory\" means that the source was recalled and not opened.".into(),
        Block::List { ordered: true, items },
    ]
}

pub(super) fn blocks(inputs: &Inputs<'_>) -> Vec<Block> {
    vec![
        heading(2, "Provenance"),
        "The same case file, tables and program give this report again, byte for byte.".into(),
        particulars_table(
            "Programs that made the numbers.".into(),
            ["Program", "Version"],
            inputs
                .versions
                .iter()
                .map(|(name, version)| (name.as_str(), version.as_str().into()))
                .collect(),
        ),
        Block::Table(Table {
            caption: "SHA-256 digests of what was read.".into(),
            columns: ["File", "SHA-256"].map(Column::words).to_vec(),
            rows: inputs
                .digests
                .iter()
                .map(|digest| {
                    vec![
                        Inline::from(digest.of.as_str()),
                        Inline::new().code(digest.sha256.as_str()),
                    ]
                })
                .collect(),
        }),
    ]
}
