//! The strain that a reaction defines, as features of the additivity.

use super::carbon_free::carbon_free_enthalpy;
use super::class::ReactionClass;
use super::error::ReactionError;
use super::species::species;
use crate::additivity::{AdditivityError, Estimate, Features, Model, count};
use crate::molecule::{Element, Molecule};

/// A difference of enthalpies of formation: what the additivity estimates of it, and what published values give.
///
/// The uncertainty of what all molecules share cancels in the estimate, since the features are subtracted before.
#[derive(Clone, Debug, Default)]
pub struct Difference<const F: usize> {
    features: Features<F>,
    published_kj_per_mol: f64,
    published_variance: f64,
}

impl<const F: usize> Difference<F> {
    /// The strain of a ring system: minus the enthalpy of the reaction that opens it.
    ///
    /// Strain = enthalpies of formation of the reactants, the molecule among them, minus those of the products.
    ///
    /// # Units
    /// The estimate is in kJ/mol, positive where the open side lies lower.
    ///
    /// # Errors
    /// Those of [`species`] and [`Difference::add`].
    pub fn strain<const A: usize, const B: usize, const S: usize, const T: usize>(
        molecule: &Molecule<A, B>,
        system: usize,
        class: ReactionClass,
    ) -> Result<Self, ReactionError> {
        let mut strain = Self::default();
        strain.add(1.0, molecule)?;
        species::<A, B, S, T>(molecule, system, class, &mut |number, fragment| {
            strain.add(-f64::from(number), fragment)
        })?;
        Ok(strain)
    }

    /// Adds a molecule `number` times: by its features, or by its published enthalpy where it holds no carbon.
    ///
    /// A molecule has to be added once with its whole number, since its deviation from additivity counts with the number squared.
    ///
    /// # Errors
    /// [`ReactionError::NoEnthalpy`], [`ReactionError::Additivity`].
    pub fn add<const A: usize, const B: usize>(
        &mut self,
        number: f64,
        molecule: &Molecule<A, B>,
    ) -> Result<(), ReactionError> {
        if molecule.atoms().iter().any(|a| a.element == Element::C) {
            let features: Features<F> = count(molecule)?;
            return Ok(self.features.add_scaled(&features, number)?);
        }
        let published = carbon_free_enthalpy(molecule).ok_or(ReactionError::NoEnthalpy {
            heavy_atoms: molecule.atoms().len(),
        })?;
        self.add_published(number, published.value_kj_per_mol, published.u_kj_per_mol);
        Ok(())
    }

    /// Adds a molecule `number` times by its published enthalpy of formation, kJ/mol, which is taken as independent of the estimates.
    pub fn add_published(&mut self, number: f64, value_kj_per_mol: f64, u_kj_per_mol: f64) {
        self.published_kj_per_mol += number * value_kj_per_mol;
        self.published_variance += number * number * u_kj_per_mol * u_kj_per_mol;
    }

    /// Adds features `number` times.
    ///
    /// # Errors
    /// [`ReactionError::Additivity`] when `F` is too small.
    pub fn add_features(
        &mut self,
        number: f64,
        features: &Features<F>,
    ) -> Result<(), ReactionError> {
        Ok(self.features.add_scaled(features, number)?)
    }

    /// What is estimated.
    pub const fn features(&self) -> &Features<F> {
        &self.features
    }

    /// Value and uncertainty, kJ/mol.
    ///
    /// # Errors
    /// [`AdditivityError::Storage`] as for [`Model::estimate`].
    pub fn estimate(
        &self,
        model: &Model<'_>,
        workspace: &mut [f64],
    ) -> Result<Estimate, AdditivityError> {
        Ok(self.with_published(model.estimate(&self.features, workspace)?))
    }

    /// An estimate of the features with the published part added.
    #[must_use]
    pub fn with_published(&self, mut estimate: Estimate) -> Estimate {
        estimate.value_kj_per_mol += self.published_kj_per_mol;
        estimate.model_variance += self.published_variance;
        estimate
    }
}
