//! The fitted model: value, uncertainty and weights of the measurements for a molecule or a difference of molecules.

use super::Property;
use super::cholesky::{dot, solve_lower, solve_upper};
use super::covariance::{Covariance, coefficient, related, split};
use super::error::AdditivityError;
use super::estimate::Estimate;
use super::features::Features;
use super::key::Key;
use super::part::Part;
use super::prior::Prior;
use super::without::{MAX_LEFT_OUT, Without};

/// A fitted additivity: a prior and the measurements that it was conditioned on.
///
/// With K the covariance matrix of the n measurements (features, deviations, errors) and α = K⁻¹ y, every number follows:
/// value k(x)ᵀ α, variance k(x, x) − k(x)ᵀ K⁻¹ k(x), weights K⁻¹ k(x).
#[derive(Clone, Copy, Debug)]
pub struct Model<'a> {
    /// The prior.
    pub prior: Prior,
    /// Keys of the features that occur in the measured molecules, ascending, as those of the gas part.
    pub keys: &'a [u64],
    /// For each of [`Part::ALL`] and each key the sum over measurements of coefficient times count times α.
    pub duals: [&'a [f64]; Part::ALL.len()],
    /// All measurements.
    pub covariance: Covariance<'a>,
    /// A part of the measurements that knows most of what all know, for small memories.
    pub compact: Covariance<'a>,
    /// The measured values, kJ/mol.
    pub values: &'a [f64],
    /// For each measured molecule the variance of its deviation from additivity in each of [`Part::ALL`] after the fit, kJ²/mol².
    pub deviations: &'a [[f32; Part::ALL.len()]],
}

/// A molecule that was measured, and what of it is to be estimated.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct MeasuredMolecule {
    /// Index of the molecule in the model.
    pub molecule: usize,
    /// What is estimated.
    pub property: Property,
}

impl Model<'_> {
    /// Number of measurements.
    pub const fn len(&self) -> usize {
        self.values.len()
    }

    /// Whether the model rests on no measurement.
    pub const fn is_empty(&self) -> bool {
        self.values.is_empty()
    }

    /// How many numbers an estimate works in.
    pub const fn workspace_len(&self) -> usize {
        self.covariance.workspace_len()
    }

    /// The enthalpy that features stand for, kJ/mol.
    pub fn value<const F: usize>(&self, features: &Features<F>) -> f64 {
        features.terms().iter().fold(0.0, |sum, term| {
            sum + term.count * self.coefficient(term.key)
        })
    }

    /// The contribution of one feature, kJ/mol; 0 for one that was never measured.
    pub fn coefficient(&self, key: Key) -> f64 {
        let duals = match key.part() {
            Part::Gas => self.duals[0],
            Part::Vaporisation => self.duals[1],
            Part::Fusion => self.duals[2],
        };
        related(&self.prior, self.keys, key).fold(0.0, |sum, (index, covariance)| {
            sum + covariance * duals.get(index).copied().unwrap_or(0.0)
        })
    }

    /// Value and uncertainty.
    ///
    /// # Errors
    /// [`AdditivityError::Storage`] when `workspace` is shorter than [`Model::workspace_len`].
    pub fn estimate<const F: usize>(
        &self,
        features: &Features<F>,
        workspace: &mut [f64],
    ) -> Result<Estimate, AdditivityError> {
        let explained = self
            .covariance
            .explained(&self.prior, self.keys, features, workspace)?;
        Ok(self.assemble(features, self.value(features), explained))
    }

    /// The same value with an uncertainty that takes a part of the measurements to work out, and is never smaller.
    ///
    /// # Errors
    /// [`AdditivityError::Storage`] when `workspace` is shorter than [`Covariance::workspace_len`] of `compact`.
    pub fn estimate_compact<const F: usize>(
        &self,
        features: &Features<F>,
        workspace: &mut [f64],
    ) -> Result<Estimate, AdditivityError> {
        let explained = self
            .compact
            .explained(&self.prior, self.keys, features, workspace)?;
        Ok(self.assemble(features, self.value(features), explained))
    }

    /// Value and uncertainty without some of the measurements.
    ///
    /// # Errors
    /// [`AdditivityError::Storage`] when `workspace` is shorter than [`Model::workspace_len`].
    pub fn estimate_without<const F: usize>(
        &self,
        features: &Features<F>,
        without: &Without<'_>,
        workspace: &mut [f64],
    ) -> Result<Estimate, AdditivityError> {
        let k = self.covariances(features, workspace)?;
        let mut value = self.value(features);
        for (&row, alpha) in without.left_out.iter().zip(without.alpha) {
            if let Some(entry) = k.get_mut(row) {
                value -= *entry * alpha;
                *entry = 0.0;
            }
        }
        let mut storage = [0.0; MAX_LEFT_OUT];
        let projected = storage.get_mut(..without.left_out.len()).unwrap_or(&mut []);
        let columns = without.columns.chunks_exact(self.len().max(1));
        for (p, column) in projected.iter_mut().zip(columns) {
            *p = dot(column, k);
        }
        solve_lower(self.covariance.factor, k);
        solve_lower(without.block(), projected);
        let explained = dot(k, k) - dot(projected, projected);
        solve_upper(without.block(), projected);
        value -= dot(projected, &without.alpha);
        Ok(self.assemble(features, value, explained))
    }

    /// Value and uncertainty without some of the measurements, and the weights of the others.
    ///
    /// The weights stand in the first [`Model::len`] numbers of `workspace`; the value is their sum times the measured values.
    ///
    /// # Errors
    /// As for [`Model::estimate_without`].
    pub fn weigh_without<const F: usize>(
        &self,
        features: &Features<F>,
        without: &Without<'_>,
        workspace: &mut [f64],
    ) -> Result<Estimate, AdditivityError> {
        let weights = self.covariances(features, workspace)?;
        let (value, explained) = self.condition(without, weights);
        Ok(self.assemble(features, value, explained))
    }

    /// Value and uncertainty of a property of a molecule that was itself measured in another, and the weights of all measurements.
    ///
    /// A molecule's deviation from additivity is the same in every phase, so its own measurements tell more than additivity does: a measured
    /// liquid leaves of the gas only the vaporisation to estimate. `features` are those of the property.
    ///
    /// # Errors
    /// As for [`Model::estimate_without`].
    pub fn estimate_measured<const F: usize>(
        &self,
        features: &Features<F>,
        about: MeasuredMolecule,
        without: &Without<'_>,
        workspace: &mut [f64],
    ) -> Result<Estimate, AdditivityError> {
        let weights = self.covariances(features, workspace)?;
        let deviation = self.deviations.get(about.molecule).copied();
        let deviation = deviation.unwrap_or_default().map(f64::from);
        let wanted = about.property.coefficients();
        // What the nearest own measurement does not have in common with the property keeps the heavy tails.
        let mut apart = f64::INFINITY;
        let mut prior = 0.0;
        for (d, w) in deviation.iter().zip(wanted) {
            prior += d * w * w;
        }
        for (row, (entry, &(molecule, property))) in
            weights.iter_mut().zip(self.covariance.rows).enumerate()
        {
            if usize::from(molecule) != about.molecule || without.left_out.contains(&row) {
                continue;
            }
            let mut differs = 0.0;
            for (part, (d, w)) in Part::ALL.into_iter().zip(deviation.iter().zip(wanted)) {
                let own = coefficient(property, part);
                *entry += d * w * own;
                differs += d * (w - own) * (w - own);
            }
            apart = apart.min(differs);
        }
        let (value, explained) = self.condition(without, weights);
        let additive = self.assemble(features, value, explained);
        if apart.is_infinite() {
            return Ok(additive);
        }
        let increments = self.prior.covariance(features.terms(), features.terms());
        let total = (increments + prior - explained).max(0.0);
        let tail_variance = apart.min(total);
        Ok(Estimate {
            model_variance: total - tail_variance,
            tail_variance,
            ..additive
        })
    }

    /// Prior covariances of features with the measurements, in the first numbers of a workspace.
    fn covariances<'w, const F: usize>(
        &self,
        features: &Features<F>,
        workspace: &'w mut [f64],
    ) -> Result<&'w mut [f64], AdditivityError> {
        let (k, by_molecule) = split(workspace, self.workspace_len(), self.len())?;
        self.covariance
            .with_measurements(&self.prior, self.keys, features.terms(), k, by_molecule);
        Ok(k)
    }

    /// Turns covariances with the measurements into weights of those that are not left out; value and explained variance.
    fn condition(&self, without: &Without<'_>, weights: &mut [f64]) -> (f64, f64) {
        let factor = self.covariance.factor;
        for &row in without.left_out {
            if let Some(entry) = weights.get_mut(row) {
                *entry = 0.0;
            }
        }
        solve_lower(factor, weights);
        let mut explained = dot(weights, weights);
        solve_upper(factor, weights);
        let mut storage = [0.0; MAX_LEFT_OUT];
        let projected = storage.get_mut(..without.left_out.len()).unwrap_or(&mut []);
        for (p, &row) in projected.iter_mut().zip(without.left_out) {
            *p = weights.get(row).copied().unwrap_or(0.0);
        }
        solve_lower(without.block(), projected);
        explained -= dot(projected, projected);
        solve_upper(without.block(), projected);
        for (&p, column) in projected
            .iter()
            .zip(without.columns.chunks_exact(self.len().max(1)))
        {
            for (weight, &value) in weights.iter_mut().zip(column) {
                *weight -= p * value;
            }
        }
        for &row in without.left_out {
            if let Some(entry) = weights.get_mut(row) {
                *entry = 0.0;
            }
        }
        (dot(weights, self.values), explained)
    }

    fn assemble<const F: usize>(
        &self,
        features: &Features<F>,
        value: f64,
        explained: f64,
    ) -> Estimate {
        let prior = self.prior.covariance(features.terms(), features.terms());
        Estimate {
            value_kj_per_mol: value,
            // Rounding may push a variance of nothing below zero.
            model_variance: (prior - explained).max(0.0),
            tail_variance: self.prior.squared_scale(features.deviation()),
            tail_degrees_of_freedom: self.prior.degrees_of_freedom,
        }
    }
}
