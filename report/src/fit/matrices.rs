//! Covariance matrices of the measurements, one for each level, packed by rows of the lower triangle.

use tautring_core::additivity::{CONTRIBUTIONS, Level, Prior, cholesky};

use crate::dataset::Dataset;

/// Prior covariance matrices of the measurements for a prior variance of 1 in each level.
pub struct LevelMatrices {
    /// One packed lower triangle for each level in [`Level::ALL`].
    pub by_level: Vec<Vec<f64>>,
}

impl LevelMatrices {
    /// Computes the matrices.
    pub fn new(data: &Dataset, ring_width: f64) -> Self {
        let by_level = Level::ALL
            .iter()
            .map(|&level| {
                let mut tau = [0.0; Level::ALL.len()];
                tau[level as usize] = 1.0;
                let prior = Prior {
                    tau_kj_per_mol: tau,
                    ring_width,
                    deviation_kj_per_mol: [0.0; CONTRIBUTIONS],
                    degrees_of_freedom: f64::INFINITY,
                };
                let counted: Vec<_> = data
                    .rows
                    .iter()
                    .map(|row| row.features.only(|l| l == level))
                    .collect();
                let mut packed = Vec::with_capacity(cholesky::packed_len(counted.len()));
                for (i, a) in counted.iter().enumerate() {
                    packed.extend(
                        counted[..=i]
                            .iter()
                            .map(|b| prior.covariance(a.terms(), b.terms())),
                    );
                }
                packed
            })
            .collect();
        Self { by_level }
    }
}

/// The inverse of a matrix from its packed Cholesky factor, as a packed lower triangle.
pub(super) fn invert(factor: &[f64], n: usize) -> Vec<f64> {
    let mut columns: Vec<Vec<f64>> = vec![Vec::new(); n];
    let threads = std::thread::available_parallelism().map_or(1, usize::from);
    let chunk = n.div_ceil(threads * 8).max(1);
    let work = std::sync::Mutex::new(columns.chunks_mut(chunk).enumerate());
    std::thread::scope(|scope| {
        for _ in 0..threads {
            scope.spawn(|| {
                let next = || work.lock().ok()?.next();
                while let Some((index, chunk_columns)) = next() {
                    for (offset, column) in chunk_columns.iter_mut().enumerate() {
                        let j = index * chunk + offset;
                        let mut b = vec![0.0; n];
                        b[j] = 1.0;
                        cholesky::solve_lower(factor, &mut b);
                        cholesky::solve_upper(factor, &mut b);
                        // Row j of the lower triangle is column j up to the diagonal.
                        b.truncate(j + 1);
                        *column = b;
                    }
                }
            });
        }
    });
    columns.concat()
}

/// Sum over all entries of the elementwise product of two symmetric packed matrices: the trace of their product.
pub(super) fn trace_of_product(a: &[f64], b: &[f64], n: usize) -> f64 {
    let total = cholesky::dot(a, b);
    let diagonal: f64 = (0..n)
        .map(|i| cholesky::packed_len(i + 1) - 1)
        .map(|at| a[at] * b[at])
        .sum();
    2.0 * total - diagonal
}

/// vᵀ M v for a symmetric packed matrix.
pub(super) fn quadratic_form(packed: &[f64], v: &[f64]) -> f64 {
    let mut total = 0.0;
    for (i, &x) in v.iter().enumerate() {
        let row = &packed[cholesky::packed_len(i)..cholesky::packed_len(i + 1)];
        total += x * (2.0 * cholesky::dot(&row[..i], &v[..i]) + row[i] * x);
    }
    total
}
