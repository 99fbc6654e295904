//! Case files and structures in; strain reports out.
//!
//! Layers, imports run downwards only:
//!
//! 1. [`render`]: Markdown, HTML, JSON, figures
//! 2. [`document`]: the one model of a report
//! 3. [`review`]: every number, asked of the core
//! 4. [`fit`]: from measurements to the core's tables
//! 5. [`dataset`], [`case`], [`structure`]: published measurements, case files, structures

pub mod case;
pub mod dataset;
pub mod document;
pub mod fit;
pub mod render;
pub mod review;
pub mod structure;
