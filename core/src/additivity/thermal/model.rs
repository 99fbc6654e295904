//! The fitted model of an entropy or a heat capacity.

use super::estimate::ThermalEstimate;
use super::features::{ThermalFeatures, WHOLE};
use super::prior::ThermalPrior;
use crate::additivity::AdditivityError;
use crate::additivity::cholesky::{dot, solve_lower};

/// Coefficients at `N` temperatures, and what some telling measurements know of their uncertainty.
#[derive(Clone, Copy, Debug)]
pub struct ThermalModel<'a, const N: usize> {
    /// The prior.
    pub prior: ThermalPrior,
    /// Keys of the features that occur in the measured molecules, ascending.
    pub keys: &'a [u64],
    /// Contribution of one of each, J/(mol K).
    pub coefficients: &'a [[f32; N]],
    /// Contribution of one unit of each count of the whole molecule, J/(mol K).
    pub whole: [[f64; N]; WHOLE],
    /// Contribution of the logarithm of the symmetry number, J/(mol K): −R or nothing.
    pub symmetry_j_per_mol_k: f64,
    /// Covariances of the temperatures with each other, that of the first with itself being 1.
    pub shape: [[f64; N]; N],
    /// The measurements that the uncertainty rests on.
    pub telling: Telling<'a>,
}

/// A part of the measurements with the factor of their covariance matrix.
///
/// More measurements only lower a variance, so the uncertainty from a part of them is never smaller than from all.
#[derive(Clone, Copy, Debug)]
pub struct Telling<'a> {
    /// For each key of the model where its entries start; one more for the end.
    pub starts: &'a [u16],
    /// Measurements in whose molecule the key occurs.
    pub rows: &'a [u8],
    /// How often it occurs there.
    pub counts: &'a [u8],
    /// The counts of the whole molecule of each measurement.
    pub whole: &'a [[f64; WHOLE]],
    /// Packed lower Cholesky factor of their covariance matrix.
    pub factor: &'a [f64],
}

impl<const N: usize> ThermalModel<'_, N> {
    /// How many numbers an estimate works in.
    pub const fn workspace_len(&self) -> usize {
        self.telling.whole.len()
    }

    /// Values and uncertainty.
    ///
    /// # Errors
    /// [`AdditivityError::Storage`] when `workspace` is shorter than [`ThermalModel::workspace_len`].
    pub fn estimate<const F: usize>(
        &self,
        features: &ThermalFeatures<F>,
        workspace: &mut [f64],
    ) -> Result<ThermalEstimate<N>, AdditivityError> {
        let (needed, given) = (self.workspace_len(), workspace.len());
        let k = workspace
            .get_mut(..needed)
            .ok_or(AdditivityError::Storage { needed, given })?;
        for (entry, row) in k.iter_mut().zip(self.telling.whole) {
            *entry = whole_covariance(&self.prior, row, features.whole());
        }
        let mut prior = whole_covariance(&self.prior, features.whole(), features.whole());
        let mut values = [self.symmetry_j_per_mol_k * features.ln_symmetry(); N];
        for (count, increments) in features.whole().iter().zip(&self.whole) {
            for (value, increment) in values.iter_mut().zip(increments) {
                *value += count * increment;
            }
        }
        for term in features.terms() {
            let variance = self.prior.variance(term.key);
            prior += variance * term.count * term.count;
            let Ok(index) = self.keys.binary_search(&term.key.bits()) else {
                continue;
            };
            for (value, &increment) in values
                .iter_mut()
                .zip(self.coefficients.get(index).into_iter().flatten())
            {
                *value += term.count * f64::from(increment);
            }
            self.telling.add_entries(index, variance * term.count, k);
        }
        solve_lower(self.telling.factor, k);
        Ok(ThermalEstimate {
            values_j_per_mol_k: values,
            // Rounding may push a variance of nothing below zero.
            model_variance: (prior - dot(k, k)).max(0.0),
            tail_variance: self.prior.squared_scale(features.deviation()),
            tail_degrees_of_freedom: self.prior.degrees_of_freedom,
            shape: self.shape,
        })
    }
}

impl Telling<'_> {
    /// Adds `factor` times the counts of the key at `index` to the measurements in whose molecule it occurs.
    fn add_entries(&self, index: usize, factor: f64, k: &mut [f64]) {
        let at = |index: usize| self.starts.get(index).map_or(0, |&s| usize::from(s));
        let (start, end) = (at(index), at(index + 1));
        let rows = self.rows.get(start..end).unwrap_or(&[]);
        let counts = self.counts.get(start..end).unwrap_or(&[]);
        for (&row, &count) in rows.iter().zip(counts) {
            if let Some(entry) = k.get_mut(usize::from(row)) {
                *entry += factor * f64::from(count);
            }
        }
    }
}

fn whole_covariance(prior: &ThermalPrior, a: &[f64; WHOLE], b: &[f64; WHOLE]) -> f64 {
    let pairs = a.iter().zip(b).zip(prior.whole_j_per_mol_k);
    pairs.fold(0.0, |sum, ((x, y), tau)| sum + tau * tau * x * y)
}
