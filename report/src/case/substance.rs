//! A substance of the case: what it is, in which state and amount, and what was measured of it.

use std::path::PathBuf;

use super::measurement::Measurement;
use super::unit::AmountBasis;
use super::vocabulary::vocabulary;

vocabulary! {
    /// State of a substance in the process.
    State, "state" {
        /// Gas.
        Gas = "gas",
        /// Liquid.
        Liquid = "liquid",
        /// Solid.
        Solid = "solid",
        /// Dissolved in another substance.
        Solution = "solution",
    }
}

vocabulary! {
    /// What a substance does in the process.
    Role, "role" {
        /// Goes in at the beginning.
        StartingMaterial = "starting_material",
        /// Goes in to react with the starting material.
        Reagent = "reagent",
        /// Is made and used up again.
        Intermediate = "intermediate",
        /// Is what the process is for.
        Product = "product",
        /// Is made beside the product.
        ByProduct = "by_product",
        /// Dissolves the others.
        Solvent = "solvent",
        /// Is not in the process, and stands here for comparison.
        Reference = "reference",
    }
}

/// A substance, checked.
#[derive(Clone, Debug)]
#[non_exhaustive]
pub struct Substance {
    /// Short name, unique in the case: letters, digits, `-` and `_`.
    pub id: String,
    /// Name as the report prints it.
    pub name: String,
    /// Where the structure comes from.
    pub source: StructureSource,
    /// State in the process.
    pub state: State,
    /// What it does in the process.
    pub role: Role,
    /// Amount in the process, if stated.
    pub amount: Option<Amount>,
    /// Measured values, in the order of the file.
    pub measured: Vec<Measurement>,
    /// Free remarks, Markdown.
    pub notes: Option<String>,
}

/// Where the structure of a substance comes from.
#[derive(Clone, Debug, PartialEq, Eq)]
#[non_exhaustive]
pub enum StructureSource {
    /// A SMILES in the case file.
    Smiles(String),
    /// A Molfile or SDF beside the case file.
    File {
        /// The path as the case file has it.
        path: PathBuf,
        /// Number of the record, counted from 1.
        record: usize,
        /// The whole text of the file, so that its digest is that of what was read.
        text: String,
    },
}

/// An amount, in g or mol.
#[derive(Clone, Debug, PartialEq)]
#[non_exhaustive]
pub struct Amount {
    /// Whether `value` is in g or in mol.
    pub basis: AmountBasis,
    /// The number, in g or mol.
    pub value: f64,
    /// Number and unit as the case file has them.
    pub written: String,
}

impl Amount {
    /// The amount of substance in mol.
    ///
    /// # Units
    ///
    /// `molar_mass` in g/mol.
    pub fn moles(&self, molar_mass: f64) -> f64 {
        match self.basis {
            AmountBasis::Mass => self.value / molar_mass,
            AmountBasis::Substance => self.value,
        }
    }

    /// The mass in g.
    ///
    /// # Units
    ///
    /// `molar_mass` in g/mol.
    pub fn grams(&self, molar_mass: f64) -> f64 {
        match self.basis {
            AmountBasis::Mass => self.value,
            AmountBasis::Substance => self.value * molar_mass,
        }
    }
}
