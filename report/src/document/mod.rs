//! The document: what a report says, in one model that knows nothing of Markdown, HTML or SVG.
//!
//! [`report()`] turns what the review found into a [`Document`]; the writers in [`crate::render`] turn that into files. Every number
//! that a reader sees passes through [`rounding`], and every source through [`Citations`].

mod bibliography;
mod block;
mod cautions;
mod checks;
mod compile;
mod condensed;
mod conventions;
mod drawing;
mod entry;
mod evidence;
mod formation;
mod inline;
mod inputs;
mod notes;
mod provenance;
mod report;
pub mod rounding;
mod strain;
mod substance;
mod summary;
mod thermal;

pub use bibliography::{Bibliography, Citations, Reference};
pub use block::{Align, Block, Column, Document, Figure, Note, NoteKind, Table};
pub use drawing::{Drawing, PlottedStrain, StrainPlot, StrainedSystem, StructureDrawing};
pub use entry::{Entry, Particulars, Stated};
pub use inline::{Inline, Span, subscripted};
pub use inputs::{Digest, Header, Inputs, RingReference};
pub use notes::blocks_from_markdown;
pub(crate) use notes::is_safe_url;
pub use report::report;
