//! The fitted model: value, uncertainty and weights of the measurements for a molecule or a difference of molecules.

use super::cholesky::{dot, factorise, packed_len, solve_lower, solve_upper};
use super::error::AdditivityError;
use super::estimate::Estimate;
use super::features::{Features, Term};
use super::key::Key;
use super::prior::Prior;

/// Most measurements that can be left out of one estimate.
pub const MAX_LEFT_OUT: usize = 12;

/// A fitted additivity: a prior and the measurements that it was conditioned on.
///
/// With K the covariance matrix of the n measurements (features, deviations, errors) and α = K⁻¹ y, every number follows:
/// value k(x)ᵀ α, variance k(x, x) − k(x)ᵀ K⁻¹ k(x), weights K⁻¹ k(x).
#[derive(Clone, Copy, Debug)]
pub struct Model<'a> {
    /// The prior.
    pub prior: Prior,
    /// Keys of the features that occur in the measurements, ascending.
    pub keys: &'a [u64],
    /// For each key the sum over measurements of count times α.
    pub duals: &'a [f64],
    /// For each key where its entries start in `rows` and `counts`; one more for the end.
    pub starts: &'a [u32],
    /// Measurements in which the key occurs.
    pub rows: &'a [u16],
    /// How often it occurs in them.
    pub counts: &'a [u8],
    /// The measured values, kJ/mol.
    pub values: &'a [f64],
    /// Packed lower Cholesky factor of K, each number as little-endian bytes.
    pub factor: &'a [[u8; 8]],
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

    /// The enthalpy that features stand for, kJ/mol.
    pub fn value<const F: usize>(&self, features: &Features<F>) -> f64 {
        features.terms().iter().fold(0.0, |sum, term| {
            sum + term.count * self.coefficient(term.key)
        })
    }

    /// The contribution of one feature, kJ/mol; 0 for one that was never measured.
    pub fn coefficient(&self, key: Key) -> f64 {
        self.related(key).fold(0.0, |sum, (index, covariance)| {
            sum + covariance * self.duals.get(index).copied().unwrap_or(0.0)
        })
    }

    /// Value and uncertainty.
    ///
    /// # Errors
    /// [`AdditivityError::Storage`] when `workspace` is shorter than [`Model::len`].
    pub fn estimate<const F: usize>(
        &self,
        features: &Features<F>,
        workspace: &mut [f64],
    ) -> Result<Estimate, AdditivityError> {
        let k = take(workspace, self.len(), self.len())?.0;
        self.covariances(features.terms(), k);
        solve_lower(self.factor, k);
        Ok(self.assemble(features, self.value(features), dot(k, k)))
    }

    /// Value and uncertainty without some of the measurements, and the weights of the others.
    ///
    /// The weights stand in the first [`Model::len`] numbers of `workspace`; the value is their sum times the measured values.
    /// With K⁻¹ of all measurements known, those of a subset follow without a new factorisation.
    ///
    /// # Errors
    /// [`AdditivityError::Storage`] when `workspace` is shorter than [`Model::len`] times one more than the number left
    /// out, or more than [`MAX_LEFT_OUT`] are left out.
    pub fn estimate_without<const F: usize>(
        &self,
        features: &Features<F>,
        left_out: &[usize],
        workspace: &mut [f64],
    ) -> Result<Estimate, AdditivityError> {
        let n = self.len();
        let m = left_out.len();
        if m > MAX_LEFT_OUT {
            return Err(AdditivityError::Storage {
                needed: m,
                given: MAX_LEFT_OUT,
            });
        }
        let (weights, columns) = take(workspace, n * (m + 1), n)?;
        self.covariances(features.terms(), weights);
        for &row in left_out {
            if let Some(entry) = weights.get_mut(row) {
                *entry = 0.0;
            }
        }
        // Weights of the subset lose exactly what they weigh after the projection, so k is kept for the variance.
        let mut projected = [0.0; MAX_LEFT_OUT];
        let mut block = [0.0; packed_len(MAX_LEFT_OUT)];
        solve_lower(self.factor, weights);
        let mut explained = dot(weights, weights);
        solve_upper(self.factor, weights);
        for (i, (&row, column)) in left_out
            .iter()
            .zip(columns.chunks_exact_mut(n.max(1)))
            .enumerate()
        {
            column.fill(0.0);
            if let Some(entry) = column.get_mut(row) {
                *entry = 1.0;
            }
            solve_lower(self.factor, column);
            solve_upper(self.factor, column);
            if let (Some(p), Some(&w)) = (projected.get_mut(i), weights.get(row)) {
                *p = w;
            }
            for (j, &other) in left_out.iter().enumerate().take(i + 1) {
                if let (Some(entry), Some(&value)) =
                    (block.get_mut(packed_len(i) + j), column.get(other))
                {
                    *entry = value;
                }
            }
        }
        let block = block.get_mut(..packed_len(m)).unwrap_or(&mut []);
        let projected = projected.get_mut(..m).unwrap_or(&mut []);
        factorise(block)?;
        solve_lower(block, projected);
        explained -= dot(projected, projected);
        solve_upper(block, projected);
        for (&p, column) in projected.iter().zip(columns.chunks_exact(n.max(1))) {
            for (weight, &value) in weights.iter_mut().zip(column) {
                *weight -= p * value;
            }
        }
        for &row in left_out {
            if let Some(entry) = weights.get_mut(row) {
                *entry = 0.0;
            }
        }
        Ok(self.assemble(features, dot(weights, self.values), explained))
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

    /// Prior covariance of features with every measurement.
    fn covariances(&self, terms: &[Term], k: &mut [f64]) {
        k.fill(0.0);
        for term in terms {
            for (index, covariance) in self.related(term.key) {
                let start = self.starts.get(index).map_or(0, |&s| s as usize);
                let end = self.starts.get(index + 1).map_or(0, |&s| s as usize);
                let rows = self.rows.get(start..end).unwrap_or(&[]);
                let counts = self.counts.get(start..end).unwrap_or(&[]);
                for (&row, &count) in rows.iter().zip(counts) {
                    if let Some(entry) = k.get_mut(usize::from(row)) {
                        *entry += covariance * term.count * f64::from(count);
                    }
                }
            }
        }
    }

    /// The measured features that a feature is correlated with: index and prior covariance.
    fn related(&self, key: Key) -> impl Iterator<Item = (usize, f64)> {
        let level = key.level();
        let tau = level.map_or(0.0, |l| self.prior.tau(l));
        let smooth = level.is_some_and(super::Level::is_smooth);
        let low = self.keys.partition_point(|&k| {
            if smooth {
                k >> 8 < key.bits() >> 8
            } else {
                k < key.bits()
            }
        });
        self.keys
            .iter()
            .enumerate()
            .skip(low)
            .map(|(index, &bits)| (index, Key::from_bits(bits)))
            .take_while(move |&(_, other)| {
                if smooth {
                    other.same_family(key)
                } else {
                    other == key
                }
            })
            .map(move |(index, other)| {
                let correlation = if smooth {
                    self.prior
                        .size_correlation(key.ring_size(), other.ring_size())
                } else {
                    1.0
                };
                (index, tau * tau * correlation)
            })
    }
}

/// The first `first` numbers of a workspace and the rest, when it holds `needed`.
fn take(
    workspace: &mut [f64],
    needed: usize,
    first: usize,
) -> Result<(&mut [f64], &mut [f64]), AdditivityError> {
    let given = workspace.len();
    if given < needed {
        return Err(AdditivityError::Storage { needed, given });
    }
    Ok(workspace.split_at_mut(first))
}
