//! Hyperparameters by marginal likelihood, with heavy-tailed errors as scale mixtures.

use tautring_core::additivity::{AdditivityError, CONTRIBUTIONS, Part, Prior, cholesky, part_of};

use super::design::{Design, entry};
use super::matrix::invert;
use crate::dataset::Dataset;

/// How many features' worth of belief the starting variances carry.
///
/// A variance that few features speak of stays near where it starts instead of running to zero or away; of 0, 1 and 3 the last predicts best when
/// a quarter of the constitutions is kept from the search, too.
const BELIEF: f64 = 3.0;

/// Least deviation from additivity that one heavy atom brings, kJ/mol: elements of few measurements would else pass for exactly additive.
const LEAST_DEVIATION_KJ_PER_MOL: f64 = 0.1;

/// The measurements conditioned on a prior.
pub struct Posterior {
    /// The prior.
    pub prior: Prior,
    /// Packed covariance matrix of the measurements.
    pub covariance: Vec<f64>,
    /// Its packed lower Cholesky factor.
    pub factor: Vec<f64>,
    /// K⁻¹ y.
    pub alpha: Vec<f64>,
    /// Packed K⁻¹.
    pub inverse: Vec<f64>,
    /// Variance of each measurement's error after its weight, kJ²/mol².
    pub error_variance: Vec<f64>,
    /// Variance of each molecule's deviation in each part after its weight, kJ²/mol².
    pub deviation_variance: Vec<[f64; Part::ALL.len()]>,
    /// Logarithm of the marginal likelihood at these weights.
    pub log_likelihood: f64,
}

impl Posterior {
    fn new(
        data: &Dataset,
        design: &Design,
        scales: &Scales,
        prior: &Prior,
        weights: &Weights,
    ) -> Result<Self, AdditivityError> {
        let deviation_variance = weights
            .molecules
            .iter()
            .zip(scales.squared(prior))
            .map(|(w, squared)| std::array::from_fn(|part| squared[part] / w[part]))
            .collect();
        let error_variance = data
            .rows
            .iter()
            .zip(&weights.rows)
            .map(|(row, w)| row.measurement.u_kj_per_mol.powi(2) / w)
            .collect();
        Self::condition(data, design, prior, error_variance, deviation_variance)
    }

    /// The measurements conditioned on another prior of the features, with errors and deviations as they are.
    ///
    /// # Errors
    /// [`AdditivityError::NotPositiveDefinite`].
    pub fn with_features(
        &self,
        data: &Dataset,
        design: &Design,
        prior: &Prior,
    ) -> Result<Self, AdditivityError> {
        let errors = self.error_variance.clone();
        Self::condition(data, design, prior, errors, self.deviation_variance.clone())
    }

    fn condition(
        data: &Dataset,
        design: &Design,
        prior: &Prior,
        error_variance: Vec<f64>,
        deviation_variance: Vec<[f64; Part::ALL.len()]>,
    ) -> Result<Self, AdditivityError> {
        let n = data.rows.len();
        let mut covariance = design.covariance(prior);
        for (known, variance) in data.molecules.iter().zip(&deviation_variance) {
            for (at, &i) in known.rows.iter().enumerate() {
                for &j in &known.rows[..=at] {
                    let (a, b) = (design.coefficients[i], design.coefficients[j]);
                    covariance[entry(i, j)] += a
                        .iter()
                        .zip(b)
                        .zip(variance)
                        .map(|((x, y), v)| x * y * v)
                        .sum::<f64>();
                }
                covariance[entry(i, i)] += error_variance[i];
            }
        }
        let mut factor = covariance.clone();
        cholesky::factorise(&mut factor)?;
        let mut alpha: Vec<f64> = data
            .rows
            .iter()
            .map(|r| r.measurement.value_kj_per_mol)
            .collect();
        cholesky::solve_lower(&factor, &mut alpha);
        let fit = cholesky::dot(&alpha, &alpha);
        cholesky::solve_upper(&factor, &mut alpha);
        let log_determinant: f64 = (0..n)
            .map(|i| 2.0 * factor[cholesky::packed_len(i + 1) - 1].ln())
            .sum();
        let log_likelihood =
            -0.5 * (fit + log_determinant + n as f64 * (2.0 * std::f64::consts::PI).ln());
        let inverse = invert(&factor, n);
        Ok(Self {
            prior: *prior,
            covariance,
            factor,
            alpha,
            inverse,
            error_variance,
            deviation_variance,
            log_likelihood,
        })
    }

    /// Expected precision weights of the errors under Student's distribution.
    fn row_weights(&self, data: &Dataset) -> Vec<f64> {
        data.rows
            .iter()
            .enumerate()
            .map(|(i, row)| {
                let d = self.error_variance[i];
                let mean = d * self.alpha[i];
                let variance = d - d * d * self.inverse[entry(i, i)];
                self.weight(mean * mean + variance, row.measurement.u_kj_per_mol.powi(2))
            })
            .collect()
    }

    fn weight(&self, square: f64, squared_scale: f64) -> f64 {
        let nu = self.prior.degrees_of_freedom;
        (nu + 1.0) / (nu + square / squared_scale)
    }
}

struct Weights {
    rows: Vec<f64>,
    molecules: Vec<[f64; Part::ALL.len()]>,
}

/// What adds to the deviations of the molecules, in every part.
struct Scales {
    counts: Vec<[f64; CONTRIBUTIONS]>,
}

impl Scales {
    fn new(data: &Dataset) -> Self {
        Self {
            counts: data
                .molecules
                .iter()
                .map(|m| m.features.deviation().in_every_part())
                .collect(),
        }
    }

    /// Squared scale of each molecule's deviation in each part, kJ²/mol².
    fn squared(&self, prior: &Prior) -> impl Iterator<Item = [f64; Part::ALL.len()]> {
        self.counts.iter().map(|counts| {
            let mut by_part = [0.0; Part::ALL.len()];
            for (contribution, (count, scale)) in
                counts.iter().zip(prior.deviation_kj_per_mol).enumerate()
            {
                by_part[part_of(contribution) as usize] += count * scale * scale;
            }
            by_part
        })
    }
}

/// Finds the prior by fixed-point iteration on the marginal likelihood, alternating with the weights of the heavy tails.
///
/// Each variance θ of features with matrix G moves to (θ² αᵀ G α + b θ₀) / (θ tr(K⁻¹ G) + b), with its start θ₀ and the belief b in it; without
/// belief that leaves it where the likelihood's derivative vanishes. `progress` hears of each round: its number and the logarithm of the
/// likelihood.
///
/// # Errors
/// [`AdditivityError::NotPositiveDefinite`] if the iteration leaves the positive definite matrices.
pub fn search(
    data: &Dataset,
    design: &Design,
    start: Prior,
    rounds: usize,
    mut progress: impl FnMut(usize, &Posterior),
) -> Result<Posterior, AdditivityError> {
    let scales = Scales::new(data);
    let mut prior = start;
    let mut weights = Weights {
        rows: vec![1.0; data.rows.len()],
        molecules: vec![[1.0; Part::ALL.len()]; data.molecules.len()],
    };
    for round in 0..rounds {
        let posterior = Posterior::new(data, design, &scales, &prior, &weights)?;
        progress(round, &posterior);
        weights.rows = posterior.row_weights(data);
        for part in Part::ALL {
            let inverse = design.by_molecules(part, &posterior.inverse);
            let alpha = design.of_molecules(part, &posterior.alpha);
            for component in design.components.iter().filter(|c| c.part == part) {
                let at = |p: &Prior| p.tau_of(part, component.level)[component.class].powi(2);
                let (theta, first) = (at(&prior), at(&start));
                if theta == 0.0 {
                    continue;
                }
                let mut quadratic = 0.0;
                let mut trace = 0.0;
                for column in &component.columns {
                    let mut sum = 0.0;
                    for (i, &(m, a)) in column.iter().enumerate() {
                        sum += a * alpha[m];
                        let row = cholesky::packed_len(m);
                        let before: f64 =
                            column[..i].iter().map(|&(k, b)| b * inverse[row + k]).sum();
                        trace += a * (2.0 * before + a * inverse[row + m]);
                    }
                    quadratic += sum * sum;
                }
                let known = (theta * trace).max(0.0);
                let moved = (theta * theta * quadratic + BELIEF * first) / (known + BELIEF);
                prior.tau_kj_per_mol[part as usize][component.level as usize][component.class] =
                    moved.sqrt();
            }
            let mut quadratic = [0.0; CONTRIBUTIONS];
            let mut trace = [0.0; CONTRIBUTIONS];
            for (m, counts) in scales.counts.iter().enumerate() {
                let w = weights.molecules[m][part as usize];
                for (contribution, count) in counts.iter().enumerate() {
                    if part_of(contribution) == part {
                        quadratic[contribution] += count * alpha[m] * alpha[m] / w;
                        trace[contribution] += count * inverse[entry(m, m)] / w;
                    }
                }
            }
            let squared: Vec<f64> = scales
                .squared(&posterior.prior)
                .map(|by_part| by_part[part as usize])
                .collect();
            for (m, squared) in squared.into_iter().enumerate() {
                let t = posterior.deviation_variance[m][part as usize];
                let mean = t * alpha[m];
                let square = mean * mean + t - t * t * inverse[entry(m, m)];
                weights.molecules[m][part as usize] = posterior.weight(square, squared);
            }
            for (contribution, scale) in prior.deviation_kj_per_mol.iter_mut().enumerate() {
                let (q, t) = (quadratic[contribution], trace[contribution]);
                if part_of(contribution) == part && t > 0.0 {
                    *scale = (*scale * (q / t).sqrt()).max(LEAST_DEVIATION_KJ_PER_MOL);
                }
            }
        }
    }
    Posterior::new(data, design, &scales, &prior, &weights)
}
