//! Which measurements the compact covariance keeps.

use tautring_core::additivity::cholesky;

use super::design::entry;

/// How many measurements the compact covariance keeps; with the tables of coefficients it fits into the flash of a small controller.
pub const COMPACT_MEASUREMENTS: usize = 200;

/// The `wanted` measurements that explain most of all others, in ascending order.
///
/// One after the other is taken that lowers the sum of relative variances of all most, those taken before given.
pub(super) fn most_telling(covariance: &[f64], n: usize, wanted: usize) -> Vec<usize> {
    let mut left: Vec<f64> = (0..n)
        .flat_map(|i| (0..n).map(move |j| covariance[entry(i, j)]))
        .collect();
    let mut taken: Vec<usize> = Vec::new();
    let mut is_taken = vec![false; n];
    while taken.len() < wanted.min(n) {
        let score = |i: usize| -> f64 {
            let row = &left[i * n..(i + 1) * n];
            let explained: f64 = (0..n)
                .filter(|&j| !is_taken[j])
                .map(|j| row[j] * row[j] / left[j * n + j])
                .sum();
            explained / row[i]
        };
        let candidates = (0..n).filter(|&i| !is_taken[i]);
        let Some((best, _)) = candidates
            .map(|i| (i, score(i)))
            .max_by(|a, b| a.1.total_cmp(&b.1).then(b.0.cmp(&a.0)))
        else {
            break;
        };
        let row: Vec<f64> = left[best * n..(best + 1) * n].to_vec();
        let variance = row[best];
        for (i, &x) in row.iter().enumerate() {
            let factor = x / variance;
            if factor != 0.0 {
                for (entry, y) in left[i * n..(i + 1) * n].iter_mut().zip(&row) {
                    *entry -= factor * y;
                }
            }
        }
        taken.push(best);
        is_taken[best] = true;
    }
    taken.sort_unstable();
    taken
}

/// The packed Cholesky factor of the covariance of some of the measurements.
///
/// # Errors
/// As for [`cholesky::factorise`].
pub(super) fn factor_of(
    covariance: &[f64],
    taken: &[usize],
) -> Result<Vec<f64>, tautring_core::additivity::AdditivityError> {
    let mut packed = Vec::new();
    for (at, &i) in taken.iter().enumerate() {
        packed.extend(taken[..=at].iter().map(|&j| covariance[entry(i, j)]));
    }
    cholesky::factorise(&mut packed)?;
    Ok(packed)
}
