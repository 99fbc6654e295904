//! The few measurements that the core keeps for uncertainties, and what leaving the others out costs.

use tautring_core::additivity::{AdditivityError, Estimate, cholesky};

use super::measured::Published;
use super::search::Posterior;
use crate::fit::compact::{factor_of, most_telling};
use crate::fit::design::entry;

/// How many measurements the uncertainties rest on; a quarter of a thousand is the most that the tables can number.
pub const TELLING_MEASUREMENTS: usize = 200;

/// The measurements kept, with the factor of their covariance matrix.
pub struct Telling {
    /// Their rows, ascending.
    pub rows: Vec<usize>,
    /// Packed lower Cholesky factor.
    pub factor: Vec<f64>,
}

impl Telling {
    /// Chooses those that tell most of all others.
    ///
    /// # Errors
    /// [`AdditivityError::NotPositiveDefinite`].
    pub fn of(posterior: &Posterior) -> Result<Self, AdditivityError> {
        let n = posterior.noise.len();
        let rows = most_telling(&posterior.covariance, n, TELLING_MEASUREMENTS);
        let factor = factor_of(&posterior.covariance, &rows)?;
        Ok(Self { rows, factor })
    }

    /// Median over the fitted molecules of u at the first temperature, J/(mol K): from all measurements, and from those kept.
    pub fn medians_j_per_mol_k(&self, data: &Published, posterior: &Posterior) -> [f64; 2] {
        let mut us = [Vec::new(), Vec::new()];
        for (i, published) in data.rows.iter().enumerate() {
            let noise = posterior.noise[i];
            let covariance = |j: usize| {
                let own = if i == j { noise } else { 0.0 };
                posterior.covariance[entry(i, j)] - own
            };
            let mut k: Vec<f64> = self.rows.iter().map(|&j| covariance(j)).collect();
            cholesky::solve_lower(&self.factor, &mut k);
            let kept = covariance(i) - cholesky::dot(&k, &k);
            let all = noise - noise * noise * posterior.inverse[entry(i, i)];
            for (list, model) in us.iter_mut().zip([all, kept]) {
                let estimate = Estimate {
                    value_kj_per_mol: 0.0,
                    model_variance: model.max(0.0),
                    tail_variance: posterior
                        .prior
                        .squared_scale(published.features.deviation()),
                    tail_degrees_of_freedom: posterior.prior.degrees_of_freedom,
                };
                // Quantiles do not ask for the unit.
                list.push(estimate.u_kj_per_mol());
            }
        }
        us.map(|mut list| {
            list.sort_by(f64::total_cmp);
            list[list.len() / 2]
        })
    }
}
