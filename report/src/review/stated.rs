//! The enthalpies of formation that a case file states, as the review compares them.

use tautring_core::additivity::Property;
use tautring_core::quantities::MolarMass;

use super::measured::{CaseMeasurement, Settled};
use crate::case::{Enthalpy, Kept, Phase, Subject, Substance};

impl CaseMeasurement {
    /// The enthalpies of formation of a substance, in the order of the case file.
    pub fn of(substance: &Substance) -> impl Iterator<Item = Self> {
        let formula = substance.structure.molecule.formula();
        let mass = MolarMass::from_g_per_mol(formula.molar_mass_g_per_mol());
        substance.measured.iter().filter_map(move |measurement| {
            let Subject::EnthalpyOfFormation { phase } = measurement.subject else {
                return None;
            };
            let mass = mass.ok()?;
            let molar = |enthalpy: Enthalpy| enthalpy.per_mole(mass).kj_per_mol();
            Some(Self {
                property: match phase {
                    Phase::Gas => Property::Gas,
                    Phase::Liquid => Property::Liquid,
                    Phase::Solid => Property::Solid,
                },
                value_kj_per_mol: molar(measurement.value),
                u_kj_per_mol: measurement.standard_uncertainty.map(molar),
                source: measurement.source.clone(),
                settled: measurement.settled.as_ref().map(|settled| Settled {
                    keep_measured: settled.keep == Kept::Measured,
                    reason: format!("{}: {}", settled.by, settled.reason),
                }),
            })
        })
    }
}
