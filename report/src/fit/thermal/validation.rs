//! How well entropies and heat capacities of what was not seen are predicted: each constitution left out in closed form.

use std::fmt::Write as _;

use tautring_core::additivity::{AdditivityError, Estimate, cholesky};
use tautring_core::molecule::Element;

use super::measured::{Published, PublishedRow};
use super::search::Posterior;
use crate::fit::chance;
use crate::fit::design::entry;

/// One value predicted from the values of other molecules.
#[derive(Clone, Copy, Debug)]
pub struct LeftOut {
    /// Index of the row.
    pub row: usize,
    /// Index of the temperature.
    pub temperature: usize,
    /// Published minus predicted, J/(mol K).
    pub error_j_per_mol_k: f64,
    /// Expanded uncertainty (95 %) of the prediction for a new published value of the same quality, J/(mol K).
    pub expanded_j_per_mol_k: f64,
}

/// Predicts each row without all rows of its constitution; the prior and the weights of the heavy tails are those of all.
///
/// # Errors
/// [`AdditivityError::NotPositiveDefinite`] when rounding has spoilt a block of the inverse.
pub fn leave_out(data: &Published, posterior: &Posterior) -> Result<Vec<LeftOut>, AdditivityError> {
    let mut result = Vec::new();
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
        for (temperature, alpha) in posterior.alpha.iter().enumerate() {
            let errors = solve(set.iter().map(|&i| alpha[i]).collect());
            let variance = posterior.shape[temperature][temperature];
            for (at, (&row, &error)) in set.iter().zip(&errors).enumerate() {
                let mut unit = vec![0.0; set.len()];
                unit[at] = 1.0;
                let published = &data.rows[row];
                let own = posterior
                    .prior
                    .squared_scale(published.features.deviation());
                let tail = own + published.u_j_per_mol_k.powi(2);
                let model = (solve(unit)[at] - posterior.noise[row]).max(0.0);
                let spread = Estimate {
                    value_kj_per_mol: 0.0,
                    model_variance: variance * model,
                    tail_variance: variance * tail,
                    tail_degrees_of_freedom: posterior.prior.degrees_of_freedom,
                };
                result.push(LeftOut {
                    row,
                    temperature,
                    error_j_per_mol_k: error,
                    // Quantiles do not ask for the unit.
                    expanded_j_per_mol_k: spread.expanded_kj_per_mol(),
                });
            }
        }
    }
    Ok(result)
}

/// Errors of a set of left-out values.
#[derive(Clone, Copy, Debug)]
pub struct Summary {
    /// How many.
    pub count: usize,
    /// Median absolute error, J/(mol K).
    pub median_j_per_mol_k: f64,
    /// Mean absolute error, J/(mol K).
    pub mean_j_per_mol_k: f64,
    /// Share of the values inside their 95 % interval.
    pub coverage: f64,
}

/// Summarises a set of left-out values; `None` for an empty one.
pub fn summarise<'a>(errors: impl IntoIterator<Item = &'a LeftOut>) -> Option<Summary> {
    let mut sizes = Vec::new();
    let mut inside = 0_usize;
    for e in errors {
        let size = e.error_j_per_mol_k.abs();
        inside += usize::from(size <= e.expanded_j_per_mol_k);
        sizes.push(size);
    }
    sizes.sort_by(f64::total_cmp);
    let count = sizes.len();
    (count > 0).then(|| Summary {
        count,
        median_j_per_mol_k: f64::midpoint(sizes[(count - 1) / 2], sizes[count / 2]),
        mean_j_per_mol_k: sizes.iter().sum::<f64>() / count as f64,
        coverage: inside as f64 / count as f64,
    })
}

/// The families whose errors are printed: name and whether a molecule belongs to it.
type Family = (&'static str, fn(&PublishedRow) -> bool);

const FAMILIES: [Family; 8] = [
    ("all", |_| true),
    ("hydrocarbons", |r| {
        !atoms(r, |e| !matches!(e, Element::C | Element::H))
    }),
    ("oxygen", |r| atoms(r, |e| e == Element::O)),
    ("nitrogen", |r| atoms(r, |e| e == Element::N)),
    ("sulfur", |r| atoms(r, |e| e == Element::S)),
    ("halogens", |r| {
        atoms(r, |e| {
            matches!(e, Element::F | Element::Cl | Element::Br | Element::I)
        })
    }),
    ("non-aromatic ring", |r| r.features.deviation()[2] > 0.0),
    ("symmetry number of four or more", |r| {
        r.features.ln_symmetry() > 1.3
    }),
];

fn atoms(row: &PublishedRow, is: fn(Element) -> bool) -> bool {
    let mut atoms = row.structure.molecule.atoms().iter();
    atoms.any(|a| is(a.element))
}

/// The table of left-out errors by temperature and family, as text.
pub fn describe(data: &Published, errors: &[LeftOut]) -> String {
    let mut text = String::new();
    for (temperature, name) in data.quantity.names().into_iter().enumerate() {
        let _ = writeln!(
            text,
            "\n{name:40}{:>6}{:>8}{:>8}{:>10}{:>16}",
            "n", "median", "mean", "coverage", "by chance"
        );
        for (family, belongs) in FAMILIES {
            let chosen = errors
                .iter()
                .filter(|e| e.temperature == temperature && belongs(&data.rows[e.row]));
            if let Some(s) = summarise(chosen) {
                let (low, high) = chance(s.count);
                let _ = writeln!(
                    text,
                    "{family:40}{:>6}{:>8.2}{:>8.2}{:>9.1}%{:>16}",
                    s.count,
                    s.median_j_per_mol_k,
                    s.mean_j_per_mol_k,
                    100.0 * s.coverage,
                    format!("{:.1}..{:.1}%", 100.0 * low, 100.0 * high),
                );
            }
        }
    }
    text
}
