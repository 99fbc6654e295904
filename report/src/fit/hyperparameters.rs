//! What the search finds, as a record to read.

use std::collections::BTreeMap;

use serde::Serialize;
use tautring_core::additivity::{Level, Part, Prior};
use tautring_core::molecule::Element;

/// The hyperparameters of a prior, to three significant digits.
#[derive(Clone, Debug, Serialize)]
pub struct Hyperparameters {
    /// Width of the correlation between ring sizes, in the natural logarithm of the size.
    pub ring_width: f64,
    /// Degrees of freedom of deviations and errors.
    pub degrees_of_freedom: f64,
    /// Scale of the deviation of a molecule from additivity by what brings it, kJ/mol.
    pub deviation_kj_per_mol: BTreeMap<String, f64>,
    /// By part and level: prior standard deviation of a feature without, with one and with several heteroatoms, kJ/mol.
    pub tau_kj_per_mol: BTreeMap<String, BTreeMap<String, Vec<f64>>>,
}

impl Hyperparameters {
    /// The record of a prior.
    pub fn of(prior: &Prior) -> Self {
        let levels = |part: Part| {
            Level::ALL
                .into_iter()
                .filter(|&level| part.has(level))
                .map(|level| {
                    let classes = prior.tau_of(part, level).map(three_digits);
                    (level.name().to_owned(), classes.to_vec())
                })
                .collect()
        };
        Self {
            ring_width: prior.ring_width,
            degrees_of_freedom: prior.degrees_of_freedom,
            deviation_kj_per_mol: contribution_names()
                .zip(prior.deviation_kj_per_mol)
                .map(|(name, scale)| (name.to_owned(), three_digits(scale)))
                .collect(),
            tau_kj_per_mol: Part::ALL
                .into_iter()
                .map(|part| (part.name().to_owned(), levels(part)))
                .collect(),
        }
    }
}

/// Names of the contributions to the deviation from additivity, in the order of the prior.
fn contribution_names() -> impl Iterator<Item = &'static str> {
    Element::ALL.into_iter().map(Element::symbol).chain([
        "ring",
        "polar pair",
        "unsaturated atom",
        "vaporisation, molecule",
        "vaporisation, each of the above",
        "fusion, molecule",
        "fusion, each of the above",
    ])
}

/// Rounds to three significant digits; the tables keep all.
fn three_digits(x: f64) -> f64 {
    format!("{x:.2e}").parse().unwrap_or(x)
}
