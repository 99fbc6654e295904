//! A figure of the document as SVG.

use super::canvas::Canvas;
use super::{strain_plot, structure};
use crate::document::{Drawing, Figure};

/// A figure as SVG for a page that sets the colours.
pub fn svg(figure: &Figure) -> String {
    drawn(figure).inline(&figure.id, &figure.alternative)
}

/// A figure as a file of its own, on paper of its own.
pub fn svg_file(figure: &Figure) -> String {
    drawn(figure).file(&figure.id, &figure.alternative)
}

fn drawn(figure: &Figure) -> Canvas {
    match &figure.drawing {
        Drawing::Structure(drawing) => structure::draw(drawing),
        Drawing::StrainPlot(plot) => strain_plot::draw(plot),
    }
}
