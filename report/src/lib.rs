//! Case files and structures in; strain reports out.
//!
//! Layers, imports run downwards only: the command line, the renderers, the document, the review (which calls the core), case files and
//! structures.

pub mod case;
pub mod dataset;
pub mod fit;
pub mod review;
pub mod structure;
