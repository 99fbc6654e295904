//! How well the model predicts what it has not seen: each constitution left out in closed form.

use std::fmt::Write as _;

use tautring_core::additivity::{AdditivityError, Estimate, Level, Property, cholesky};
use tautring_core::molecule::Element;

use super::design::entry;
use super::inference::Posterior;
use crate::dataset::{Dataset, KnownMolecule};

/// One measurement predicted from all measurements of other molecules.
#[derive(Clone, Copy, Debug)]
pub struct LeftOut {
    /// Index of the measurement.
    pub row: usize,
    /// Measured minus predicted, kJ/mol.
    pub error_kj_per_mol: f64,
    /// The prediction, for the true value.
    pub estimate: Estimate,
    /// The prediction, for a new measurement of the same quality.
    pub new_measurement: Estimate,
}

impl LeftOut {
    /// Logarithm of the predictive density of the measured value, taken as Student's with the effective degrees of freedom of Welch and
    /// Satterthwaite.
    fn score(&self) -> f64 {
        let Estimate {
            model_variance,
            tail_variance,
            tail_degrees_of_freedom,
            ..
        } = self.new_measurement;
        let nu =
            tail_degrees_of_freedom * ((model_variance + tail_variance) / tail_variance).powi(2);
        let scale = (model_variance + tail_variance).sqrt();
        let z = self.error_kj_per_mol / scale;
        libm::lgamma(f64::midpoint(nu, 1.0))
            - libm::lgamma(nu / 2.0)
            - 0.5 * (nu * std::f64::consts::PI).ln()
            - f64::midpoint(nu, 1.0) * (z * z / nu).ln_1p()
            - scale.ln()
    }
}

/// Predicts each measurement without all measurements of its constitution.
///
/// With S the left-out rows, measured minus predicted is `(K⁻¹_SS)⁻¹ α_S` and its covariance `(K⁻¹_SS)⁻¹`. The weights of the heavy
/// tails and the prior are those of all measurements.
///
/// # Errors
/// [`AdditivityError::NotPositiveDefinite`] when rounding has spoilt a block of the inverse.
pub fn leave_out(data: &Dataset, posterior: &Posterior) -> Result<Vec<LeftOut>, AdditivityError> {
    let prior = &posterior.prior;
    let mut result = Vec::with_capacity(data.rows.len());
    for set in &data.constitutions {
        let mut block = Vec::with_capacity(cholesky::packed_len(set.len()));
        for (at, &i) in set.iter().enumerate() {
            block.extend(set[..=at].iter().map(|&j| posterior.inverse[entry(i, j)]));
        }
        cholesky::factorise(&mut block)?;
        let solve = |mut b: Vec<f64>| {
            cholesky::solve_lower(&block, &mut b);
            cholesky::solve_upper(&block, &mut b);
            b
        };
        let errors = solve(set.iter().map(|&i| posterior.alpha[i]).collect());
        for (at, (&row, &error)) in set.iter().zip(&errors).enumerate() {
            let mut unit = vec![0.0; set.len()];
            unit[at] = 1.0;
            let total = solve(unit)[at];
            let measured = &data.rows[row];
            let deviations = posterior.deviation_variance[measured.molecule];
            let deviation: f64 = measured
                .property
                .coefficients()
                .iter()
                .zip(deviations)
                .map(|(c, d)| c * c * d)
                .sum();
            let model = total - posterior.error_variance[row] - deviation;
            let features = data.molecule_of(measured).features.of(measured.property)?;
            let estimate = Estimate {
                value_kj_per_mol: measured.measurement.value_kj_per_mol - error,
                model_variance: model.max(0.0),
                tail_variance: prior.squared_scale(features.deviation()),
                tail_degrees_of_freedom: prior.degrees_of_freedom,
            };
            result.push(LeftOut {
                row,
                error_kj_per_mol: error,
                estimate,
                new_measurement: estimate.of_measurement(measured.measurement.u_kj_per_mol),
            });
        }
    }
    result.sort_by_key(|l| l.row);
    Ok(result)
}

/// Errors of a set of left-out measurements.
#[derive(Clone, Copy, Debug)]
pub struct Summary {
    /// How many.
    pub count: usize,
    /// Median absolute error, kJ/mol.
    pub median_kj_per_mol: f64,
    /// Mean absolute error, kJ/mol.
    pub mean_kj_per_mol: f64,
    /// Root of the mean squared error, kJ/mol.
    pub root_mean_square_kj_per_mol: f64,
    /// Share of the measurements inside their 95 % interval.
    pub coverage: f64,
    /// Mean logarithm of the predictive density, the larger the better.
    pub score: f64,
}

/// Summarises a set of left-out measurements; `None` for an empty one.
pub fn summarise<'a>(errors: impl IntoIterator<Item = &'a LeftOut>) -> Option<Summary> {
    let mut sizes = Vec::new();
    let mut inside = 0_usize;
    let mut score = 0.0;
    for e in errors {
        score += e.score();
        let size = e.error_kj_per_mol.abs();
        inside += usize::from(size <= e.new_measurement.expanded_kj_per_mol());
        sizes.push(size);
    }
    if sizes.is_empty() {
        return None;
    }
    sizes.sort_by(f64::total_cmp);
    let count = sizes.len();
    let n = count as f64;
    Some(Summary {
        count,
        median_kj_per_mol: f64::midpoint(sizes[(count - 1) / 2], sizes[count / 2]),
        mean_kj_per_mol: sizes.iter().sum::<f64>() / n,
        root_mean_square_kj_per_mol: (sizes.iter().map(|s| s * s).sum::<f64>() / n).sqrt(),
        coverage: inside as f64 / n,
        score: score / n,
    })
}

/// The families whose left-out errors are printed: name and whether a molecule belongs to it.
type Family = (&'static str, fn(&KnownMolecule) -> bool);

const FAMILIES: [Family; 10] = [
    ("all", |_| true),
    ("hydrocarbons", is_hydrocarbon),
    ("acyclic hydrocarbons", |m| {
        is_hydrocarbon(m) && m.structure.molecule.rings().is_empty()
    }),
    ("oxygen", |m| contains(m, Element::O)),
    ("nitrogen", |m| contains(m, Element::N)),
    ("sulfur", |m| contains(m, Element::S)),
    ("halogens", |m| {
        [Element::F, Element::Cl, Element::Br, Element::I]
            .into_iter()
            .any(|e| contains(m, e))
    }),
    ("three- and four-membered rings", |m| {
        m.structure
            .molecule
            .rings()
            .iter()
            .any(|ring| ring.len() < 5)
    }),
    ("non-aromatic ring", |m| strained_rings(m) > 0.0),
    ("polycycles", |m| strained_rings(m) > 1.0),
];

fn contains(known: &KnownMolecule, element: Element) -> bool {
    let atoms = known.structure.molecule.atoms();
    atoms.iter().any(|a| a.element == element)
}

fn is_hydrocarbon(known: &KnownMolecule) -> bool {
    let atoms = known.structure.molecule.atoms();
    atoms
        .iter()
        .all(|a| [Element::C, Element::H].contains(&a.element))
}

/// How many rings are not aromatic.
fn strained_rings(known: &KnownMolecule) -> f64 {
    let terms = known.features.terms().iter();
    terms
        .filter(|t| t.key.level() == Some(Level::RingSize))
        .map(|t| t.count)
        .sum()
}

/// Standard uncertainty up to which an estimate counts as supported, kJ/mol.
const SUPPORTED_KJ_PER_MOL: f64 = 8.0;

/// The table of left-out errors by property and family, as text.
pub fn describe(data: &Dataset, errors: &[LeftOut]) -> String {
    let mut text = String::from(
        "Left-out errors, kJ/mol (each constitution predicted from all others; coverage of the 95 % interval for a new measurement, and the range in\nwhich it lies by chance in 99 of 100 cases; score = mean logarithm of the predictive density)\n",
    );
    for property in [Property::Gas, Property::Liquid, Property::Solid] {
        let _ = writeln!(
            text,
            "\n{:46}{:>6}{:>8}{:>8}{:>8}{:>10}{:>16}{:>8}",
            property.name(),
            "n",
            "median",
            "mean",
            "rms",
            "coverage",
            "by chance",
            "score"
        );
        for supported in [false, true] {
            for (name, belongs) in FAMILIES {
                let chosen = errors.iter().filter(|e| {
                    let row = &data.rows[e.row];
                    row.property == property
                        && belongs(data.molecule_of(row))
                        && (!supported || e.estimate.u_kj_per_mol() <= SUPPORTED_KJ_PER_MOL)
                });
                if let Some(s) = summarise(chosen) {
                    let mark = if supported { ", u at most 8" } else { "" };
                    let (low, high) = chance(s.count);
                    let _ = writeln!(
                        text,
                        "{:46}{:>6}{:>8.2}{:>8.2}{:>8.2}{:>9.1}%{:>16}{:>8.3}",
                        format!("{name}{mark}"),
                        s.count,
                        s.median_kj_per_mol,
                        s.mean_kj_per_mol,
                        s.root_mean_square_kj_per_mol,
                        100.0 * s.coverage,
                        format!("{:.1}..{:.1}%", 100.0 * low, 100.0 * high),
                        s.score
                    );
                }
            }
        }
    }
    text
}

/// Share that each interval ought to cover.
const COVERAGE: f64 = 0.95;

/// The shares between which `n` intervals of 95 % cover in at least 99 of 100 cases: the central region of the binomial distribution.
pub fn chance(n: usize) -> (f64, f64) {
    const OUTSIDE: f64 = 0.005;
    let logarithm = |k: usize| {
        let ln_factorial = |x: usize| libm::lgamma(x as f64 + 1.0);
        ln_factorial(n) - ln_factorial(k) - ln_factorial(n - k)
            + k as f64 * COVERAGE.ln()
            + (n - k) as f64 * (1.0 - COVERAGE).ln()
    };
    let mut below = 0.0;
    let low = (0..=n).find(|&k| {
        below += logarithm(k).exp();
        below > OUTSIDE
    });
    let mut above = 0.0;
    let high = (0..=n).rev().find(|&k| {
        above += logarithm(k).exp();
        above > OUTSIDE
    });
    let share = |k: Option<usize>| k.unwrap_or(n) as f64 / n as f64;
    (share(low), share(high))
}

/// The left-out errors as a table: one line for each measurement.
pub fn left_out_csv(data: &Dataset, errors: &[LeftOut]) -> String {
    let mut text = String::from(
        "name,smiles,phase,source,measured_kj_per_mol,predicted_kj_per_mol,error_kj_per_mol,u_kj_per_mol,expanded_new_measurement_kj_per_mol\n",
    );
    for e in errors {
        let row = &data.rows[e.row];
        let m = &row.measurement;
        let _ = writeln!(
            text,
            "\"{}\",{},{},{},{},{:.2},{:.2},{:.2},{:.2}",
            m.name,
            m.smiles,
            row.property.letter(),
            m.source,
            m.value_kj_per_mol,
            m.value_kj_per_mol - e.error_kj_per_mol,
            e.error_kj_per_mol,
            e.estimate.u_kj_per_mol(),
            e.new_measurement.expanded_kj_per_mol()
        );
    }
    text
}
