//! Figures as SVG.
//!
//! Lines and letters take the colour of the surrounding text, what is strained the custom property `--strain`: both work on light and on
//! dark paper, and patterns carry the meaning where there is no colour.

mod assembly;
mod bonds;
mod cage;
mod canvas;
mod clearance;
mod crowding;
mod figure;
mod labels;
mod layout;
mod overlap;
mod planar;
mod strain_plot;
mod structure;

pub(super) use canvas::escaped;
pub use figure::{svg, svg_file};
