//! What the figures show; how it is drawn is the renderer's business.

use crate::structure::Structure;

/// The content of a figure.
#[derive(Clone, Debug)]
pub enum Drawing {
    /// A structural formula; the molecular graph is large.
    Structure(Box<StructureDrawing>),
    /// Strain against ring size.
    StrainPlot(StrainPlot),
}

/// A structural formula with its strained rings marked.
#[derive(Clone, Debug)]
pub struct StructureDrawing {
    /// The structure.
    pub structure: Structure,
    /// The ring systems whose bonds are marked.
    pub strained: Vec<StrainedSystem>,
}

/// A ring system to be marked.
#[derive(Clone, Debug)]
pub struct StrainedSystem {
    /// Its atoms, indices from 0.
    pub atoms: Vec<usize>,
    /// What stands beside it.
    pub label: String,
}

/// Strain against ring size.
#[derive(Clone, Debug)]
pub struct StrainPlot {
    /// Measured cycloalkanes, the background.
    pub background: Vec<PlottedStrain>,
    /// The monocyclic ring systems of the case.
    pub case: Vec<PlottedStrain>,
}

/// A point of the plot.
#[derive(Clone, Debug, PartialEq)]
pub struct PlottedStrain {
    /// Atoms in the ring.
    pub size: usize,
    /// Strain, kJ/mol.
    pub strain_kj_per_mol: f64,
    /// Expanded uncertainty (95 %), kJ/mol.
    pub expanded_kj_per_mol: f64,
    /// What stands beside it; nothing for the background.
    pub label: String,
}
