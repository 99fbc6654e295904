//! The inverse of a packed matrix.

use tautring_core::additivity::cholesky;

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
