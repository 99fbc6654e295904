//! Hyperparameters by marginal likelihood, with heavy-tailed errors as scale mixtures.

use std::collections::BTreeMap;

use serde::Serialize;
use tautring_core::additivity::{AdditivityError, CONTRIBUTIONS, Level, Prior, cholesky};
use tautring_core::molecule::Element;

use super::matrices::{LevelMatrices, invert, quadratic_form, trace_of_product};
use crate::dataset::Dataset;

/// What the search finds, as a record to read.
#[derive(Clone, Debug, Serialize)]
pub struct Hyperparameters {
    /// Scale of the deviation of a molecule from additivity for one heavy atom of each element and one ring, kJ/mol.
    pub deviation_kj_per_mol: BTreeMap<String, f64>,
    /// Width of the correlation between ring sizes, in the natural logarithm of the size.
    pub ring_width: f64,
    /// Degrees of freedom of deviations and errors.
    pub degrees_of_freedom: f64,
    /// Prior standard deviation of each level by its name, kJ/mol.
    pub tau_kj_per_mol: BTreeMap<String, f64>,
}

impl Hyperparameters {
    /// The hyperparameters of a prior, to three significant digits.
    pub fn of(prior: &Prior) -> Self {
        Self {
            tau_kj_per_mol: Level::ALL
                .iter()
                .map(|&l| (l.name().to_owned(), three_digits(prior.tau(l))))
                .collect(),
            ring_width: prior.ring_width,
            deviation_kj_per_mol: contribution_names()
                .zip(prior.deviation_kj_per_mol)
                .map(|(name, scale)| (name.to_owned(), three_digits(scale)))
                .collect(),
            degrees_of_freedom: prior.degrees_of_freedom,
        }
    }
}

/// Names of the contributions to the deviation from additivity: elements, then rings, polar pairs, unsaturated atoms.
fn contribution_names() -> impl Iterator<Item = &'static str> {
    Element::ALL
        .into_iter()
        .map(Element::symbol)
        .chain(["ring", "polar pair", "unsaturated atom"])
}

/// Rounds to three significant digits; the tables keep all.
fn three_digits(x: f64) -> f64 {
    format!("{x:.2e}").parse().unwrap_or(x)
}

/// The measurements conditioned on a prior.
pub struct Posterior {
    /// The prior.
    pub prior: Prior,
    /// Packed lower Cholesky factor of the covariance of the measurements.
    pub factor: Vec<f64>,
    /// K⁻¹ y.
    pub alpha: Vec<f64>,
    /// Packed K⁻¹.
    pub inverse: Vec<f64>,
    /// Variance of each measurement's error after its weight, kJ²/mol².
    pub error_variance: Vec<f64>,
    /// Variance of each molecule's deviation after its weight, kJ²/mol².
    pub deviation_variance: Vec<f64>,
    /// Logarithm of the marginal likelihood at these weights.
    pub log_likelihood: f64,
}

impl Posterior {
    fn new(
        data: &Dataset,
        matrices: &LevelMatrices,
        prior: &Prior,
        weights: &Weights,
    ) -> Result<Self, AdditivityError> {
        let n = data.rows.len();
        let mut factor = vec![0.0; cholesky::packed_len(n)];
        for (matrix, level) in matrices.by_level.iter().zip(Level::ALL) {
            let variance = prior.tau(level).powi(2);
            if variance > 0.0 {
                for (sum, x) in factor.iter_mut().zip(matrix) {
                    *sum += variance * x;
                }
            }
        }
        let deviation_variance: Vec<f64> = weights
            .molecules
            .iter()
            .zip(&data.molecules)
            .map(|(w, rows)| squared_scale(data, rows, prior) / w)
            .collect();
        let error_variance: Vec<f64> = data
            .rows
            .iter()
            .zip(&weights.rows)
            .map(|(row, w)| row.u_kj_per_mol * row.u_kj_per_mol / w)
            .collect();
        for (molecule, rows) in data.molecules.iter().enumerate() {
            for (at, &i) in rows.iter().enumerate() {
                for &j in &rows[..=at] {
                    factor[entry(i, j)] += deviation_variance[molecule];
                }
                factor[entry(i, i)] += error_variance[i];
            }
        }
        cholesky::factorise(&mut factor)?;
        let y: Vec<f64> = data.rows.iter().map(|r| r.value_kj_per_mol).collect();
        let mut alpha = y.clone();
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
            factor,
            alpha,
            inverse,
            error_variance,
            deviation_variance,
            log_likelihood,
        })
    }

    /// Expected precision weights of errors and deviations under Student's distribution.
    fn weights(&self, data: &Dataset) -> Weights {
        let nu = self.prior.degrees_of_freedom;
        let weight = |square: f64, squared_scale: f64| (nu + 1.0) / (nu + square / squared_scale);
        let rows = data
            .rows
            .iter()
            .enumerate()
            .map(|(i, row)| {
                let d = self.error_variance[i];
                let mean = d * self.alpha[i];
                let variance = d - d * d * self.inverse[entry(i, i)];
                weight(mean * mean + variance, row.u_kj_per_mol.powi(2))
            })
            .collect();
        let molecules = data
            .molecules
            .iter()
            .zip(&self.deviation_variance)
            .map(|(members, &t)| {
                let mean: f64 = t * members.iter().map(|&i| self.alpha[i]).sum::<f64>();
                let precision: f64 = members
                    .iter()
                    .flat_map(|&i| members.iter().map(move |&j| entry(i, j)))
                    .map(|at| self.inverse[at])
                    .sum();
                let squared_scale = squared_scale(data, members, &self.prior);
                weight(mean * mean + t - t * t * precision, squared_scale)
            })
            .collect();
        Weights { rows, molecules }
    }
}

/// Least deviation from additivity that one heavy atom brings, kJ/mol: elements of few measurements would else pass for exactly additive.
const LEAST_DEVIATION_KJ_PER_MOL: f64 = 0.1;

/// Squared scale of the deviation of a molecule, kJ²/mol².
fn squared_scale(data: &Dataset, members: &[usize], prior: &Prior) -> f64 {
    let first = members
        .first()
        .map(|&row| data.rows[row].features.deviation());
    first.map_or(0.0, |deviation| prior.squared_scale(deviation))
}

struct Weights {
    rows: Vec<f64>,
    molecules: Vec<f64>,
}

impl Weights {
    fn equal(data: &Dataset) -> Self {
        Self {
            rows: vec![1.0; data.rows.len()],
            molecules: vec![1.0; data.molecules.len()],
        }
    }
}

/// Where the entry of row i and column j stands in a packed lower triangle.
pub(super) fn entry(i: usize, j: usize) -> usize {
    let (low, high) = (i.min(j), i.max(j));
    cholesky::packed_len(high) + low
}

/// Finds the prior by fixed-point iteration on the marginal likelihood, alternating with the weights of the heavy tails.
///
/// Each variance component θ with matrix G moves to θ αᵀ G α / tr(K⁻¹ G), which leaves it where the likelihood's derivative
/// vanishes. `progress` hears of each round: its number and the logarithm of the likelihood.
///
/// # Errors
/// [`AdditivityError::NotPositiveDefinite`] if the iteration leaves the positive definite matrices.
pub fn search(
    data: &Dataset,
    matrices: &LevelMatrices,
    start: Prior,
    rounds: usize,
    mut progress: impl FnMut(usize, &Posterior),
) -> Result<Posterior, AdditivityError> {
    let n = data.rows.len();
    let mut prior = start;
    let mut weights = Weights::equal(data);
    for round in 0..rounds {
        let posterior = Posterior::new(data, matrices, &prior, &weights)?;
        progress(round, &posterior);
        for (tau, matrix) in prior.tau_kj_per_mol.iter_mut().zip(&matrices.by_level) {
            let trace = trace_of_product(&posterior.inverse, matrix, n);
            if *tau > 0.0 && trace > 0.0 {
                let ratio = quadratic_form(matrix, &posterior.alpha) / trace;
                *tau *= ratio.sqrt();
            }
        }
        let mut quadratic = [0.0; CONTRIBUTIONS];
        let mut trace = [0.0; CONTRIBUTIONS];
        for (members, w) in data.molecules.iter().zip(&weights.molecules) {
            let sum: f64 = members.iter().map(|&i| posterior.alpha[i]).sum();
            let precision: f64 = members
                .iter()
                .flat_map(|&i| members.iter().map(move |&j| entry(i, j)))
                .map(|at| posterior.inverse[at])
                .sum();
            let counts = data.rows[members[0]].features.deviation().counts();
            for ((q, t), count) in quadratic.iter_mut().zip(&mut trace).zip(counts) {
                *q += count * sum * sum / w;
                *t += count * precision / w;
            }
        }
        for ((scale, q), t) in prior
            .deviation_kj_per_mol
            .iter_mut()
            .zip(quadratic)
            .zip(trace)
        {
            if t > 0.0 {
                *scale = (*scale * (q / t).sqrt()).max(LEAST_DEVIATION_KJ_PER_MOL);
            }
        }
        weights = posterior.weights(data);
    }
    Posterior::new(data, matrices, &prior, &weights)
}
