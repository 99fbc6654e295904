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
mod labels;
mod layout;
mod overlap;
mod planar;
mod strain_plot;
mod structure;

pub(super) use canvas::escaped;

use crate::document::{Drawing, Figure};

/// A figure as SVG for a page that sets the colours.
pub fn svg(figure: &Figure) -> String {
    drawn(figure).inline(&figure.id, &figure.alternative)
}

/// A figure as a file of its own, on paper of its own.
pub fn svg_file(figure: &Figure) -> String {
    drawn(figure).file(&figure.id, &figure.alternative)
}

fn drawn(figure: &Figure) -> canvas::Canvas {
    match &figure.drawing {
        Drawing::Structure(drawing) => structure::draw(drawing),
        Drawing::StrainPlot(plot) => strain_plot::draw(plot),
    }
}
