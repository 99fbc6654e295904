//! The prior of entropies and heat capacities by marginal likelihood, with heavy-tailed deviations as scale mixtures.

use std::collections::BTreeMap;

use tautring_core::additivity::thermal::{DEVIATIONS, LEVELS, ThermalPrior, WHOLE};
use tautring_core::additivity::{AdditivityError, CLASSES, Key, cholesky};

use super::measured::Published;
use crate::fit::design::entry;
use crate::fit::matrix::invert;

/// How many features' worth of belief the starting variances carry, as for the enthalpies.
const BELIEF: f64 = 3.0;

/// Least deviation that one contribution may come down to, J/(mol K).
const LEAST_DEVIATION_J_PER_MOL_K: f64 = 0.02;

/// One prior variance with the columns it belongs to: for each feature the rows that count it, in ascending order, and how often.
struct Component {
    place: Place,
    columns: Vec<Vec<(usize, f64)>>,
}

/// Where in the prior a variance stands.
#[derive(Clone, Copy)]
enum Place {
    Level(usize, usize),
    Whole(usize),
}

impl Place {
    fn tau(self, prior: &mut ThermalPrior) -> &mut f64 {
        match self {
            Self::Level(level, class) => &mut prior.tau_j_per_mol_k[level][class],
            Self::Whole(count) => &mut prior.whole_j_per_mol_k[count],
        }
    }
}

/// The published values conditioned on a prior.
pub struct Posterior {
    /// The prior.
    pub prior: ThermalPrior,
    /// What of each value the symmetry number brings, for one unit of its logarithm, J/(mol K).
    pub symmetry_j_per_mol_k: f64,
    /// Packed covariance matrix of the rows at the first temperature.
    pub covariance: Vec<f64>,
    /// For each temperature K⁻¹ y.
    pub alpha: Vec<Vec<f64>>,
    /// Packed K⁻¹.
    pub inverse: Vec<f64>,
    /// Variance of each row's deviation and error after its weight, J²/(mol² K²).
    pub noise: Vec<f64>,
    /// Covariances of the temperatures with each other, that of the first with itself being 1.
    pub shape: Vec<Vec<f64>>,
    /// Logarithm of the marginal likelihood of the first temperature at these weights.
    pub log_likelihood: f64,
}

/// Finds the prior by fixed-point iteration, alternating with the weights of the heavy tails.
///
/// As for the enthalpies, each variance θ with matrix G moves to `(θ² q + b θ₀)/(θ tr(K⁻¹ G) + b)`, where q is the mean over the
/// temperatures c of `α_cᵀ G α_c / C_cc`: each temperature speaks for itself, since the small differences between neighbouring ones are
/// rounding and would drown the rest.
///
/// # Errors
/// [`AdditivityError::NotPositiveDefinite`] if the iteration leaves the positive definite matrices.
pub fn search(
    data: &Published,
    start: &ThermalPrior,
    symmetry_j_per_mol_k: f64,
    rounds: usize,
    mut progress: impl FnMut(usize, &Posterior),
) -> Result<Posterior, AdditivityError> {
    let components = components(data);
    let scale = |prior: &ThermalPrior| -> Vec<f64> {
        data.rows
            .iter()
            .map(|r| prior.squared_scale(r.features.deviation()) + r.u_j_per_mol_k.powi(2))
            .collect()
    };
    let mut prior = *start;
    let mut weights = vec![1.0; data.rows.len()];
    for round in 0.. {
        let scales = scale(&prior);
        let noise: Vec<f64> = scales.iter().zip(&weights).map(|(s, w)| s / w).collect();
        let posterior = condition(data, &components, &prior, symmetry_j_per_mol_k, noise)?;
        progress(round, &posterior);
        if round == rounds {
            return Ok(posterior);
        }
        let Posterior { alpha, inverse, .. } = &posterior;
        let width = alpha.len() as f64;
        let per_temperature = |square: &dyn Fn(&[f64]) -> f64| -> f64 {
            let terms = alpha.iter().zip(&posterior.shape).enumerate();
            terms.map(|(c, (a, row))| square(a) / row[c]).sum::<f64>() / width
        };
        for component in &components {
            let theta = component.place.tau(&mut prior).powi(2);
            let first = component.place.tau(&mut start.clone()).powi(2);
            if theta == 0.0 {
                continue;
            }
            let mut trace = 0.0;
            for column in &component.columns {
                for (at, &(i, a)) in column.iter().enumerate() {
                    let row = &inverse[cholesky::packed_len(i)..];
                    let before: f64 = column[..at].iter().map(|&(j, b)| b * row[j]).sum();
                    trace += a * (2.0 * before + a * row[i]);
                }
            }
            let quadratic = per_temperature(&|a| {
                let sums = component.columns.iter().map(|column| {
                    let sum: f64 = column.iter().map(|&(i, count)| count * a[i]).sum();
                    sum * sum
                });
                sums.sum()
            });
            let known = (theta * trace).max(0.0);
            let moved = (theta * theta * quadratic + BELIEF * first) / (known + BELIEF);
            *component.place.tau(&mut prior) = moved.sqrt();
        }
        for contribution in 0..DEVIATIONS {
            let count = |i: usize| data.rows[i].features.deviation()[contribution] / weights[i];
            let trace: f64 = (0..weights.len())
                .map(|i| count(i) * inverse[entry(i, i)])
                .sum();
            let quadratic = per_temperature(&|a| {
                let squares = a.iter().enumerate().map(|(i, x)| count(i) * x * x);
                squares.sum()
            });
            if trace > 0.0 {
                let deviation = &mut prior.deviation_j_per_mol_k[contribution];
                *deviation =
                    (*deviation * (quadratic / trace).sqrt()).max(LEAST_DEVIATION_J_PER_MOL_K);
            }
        }
        let nu = prior.degrees_of_freedom;
        weights = (0..weights.len())
            .map(|i| {
                let noise = posterior.noise[i];
                let mean = per_temperature(&|a| (noise * a[i]).powi(2));
                let square = mean + noise - noise * noise * inverse[entry(i, i)];
                (nu + 1.0) / (nu + square / scales[i])
            })
            .collect();
    }
    unreachable!("the loop ends at the last round")
}

fn components(data: &Published) -> Vec<Component> {
    let mut columns: BTreeMap<Key, Vec<(usize, f64)>> = BTreeMap::new();
    let mut whole: [Vec<(usize, f64)>; WHOLE] = Default::default();
    for (row, published) in data.rows.iter().enumerate() {
        for term in published.features.terms() {
            columns.entry(term.key).or_default().push((row, term.count));
        }
        for (column, &count) in whole.iter_mut().zip(published.features.whole()) {
            if count != 0.0 {
                column.push((row, count));
            }
        }
    }
    let mut components = Vec::new();
    for (place, level) in LEVELS.into_iter().enumerate() {
        for class in 0..CLASSES {
            let of_component = |key: &Key| key.level() == Some(level) && key.class() == class;
            let chosen = columns.iter().filter(|(key, _)| of_component(key));
            let chosen: Vec<_> = chosen.map(|(_, column)| column.clone()).collect();
            if !chosen.is_empty() {
                components.push(Component {
                    place: Place::Level(place, class),
                    columns: chosen,
                });
            }
        }
    }
    for (count, column) in whole.into_iter().enumerate() {
        components.push(Component {
            place: Place::Whole(count),
            columns: vec![column],
        });
    }
    components
}

fn condition(
    data: &Published,
    components: &[Component],
    prior: &ThermalPrior,
    symmetry_j_per_mol_k: f64,
    noise: Vec<f64>,
) -> Result<Posterior, AdditivityError> {
    let n = data.rows.len();
    let mut covariance = vec![0.0; cholesky::packed_len(n)];
    for component in components {
        let variance = component.place.tau(&mut prior.clone()).powi(2);
        for column in &component.columns {
            for (at, &(i, a)) in column.iter().enumerate() {
                let row = cholesky::packed_len(i);
                for &(j, b) in &column[..=at] {
                    covariance[row + j] += variance * a * b;
                }
            }
        }
    }
    for (i, noise) in noise.iter().enumerate() {
        covariance[entry(i, i)] += noise;
    }
    let mut factor = covariance.clone();
    cholesky::factorise(&mut factor)?;
    let mut whitened = Vec::new();
    let mut alpha = Vec::new();
    for c in 0..data.width() {
        let value =
            |r: &super::PublishedRow| r.values[c] - symmetry_j_per_mol_k * r.features.ln_symmetry();
        let mut y: Vec<f64> = data.rows.iter().map(value).collect();
        cholesky::solve_lower(&factor, &mut y);
        whitened.push(y.clone());
        cholesky::solve_upper(&factor, &mut y);
        alpha.push(y);
    }
    let fit = cholesky::dot(&whitened[0], &whitened[0]);
    let shape = whitened
        .iter()
        .map(|a| whitened.iter().map(|b| cholesky::dot(a, b) / fit).collect())
        .collect();
    let log_determinant: f64 = (0..n).map(|i| 2.0 * factor[entry(i, i)].ln()).sum();
    let log_likelihood =
        -0.5 * (fit + log_determinant + n as f64 * (2.0 * std::f64::consts::PI).ln());
    let inverse = invert(&factor, n);
    Ok(Posterior {
        prior: *prior,
        symmetry_j_per_mol_k,
        covariance,
        alpha,
        inverse,
        noise,
        shape,
        log_likelihood,
    })
}
