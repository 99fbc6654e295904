//! Cholesky factorisation and triangular solves in storage that the caller hands in.
//!
//! Matrices are packed by rows of the lower triangle: row `i` holds `i + 1` numbers. Sums run in eight fixed lanes, so the
//! result is the same to the last bit on every machine and a processor with vector registers still uses them.
//! A factor may be numbers in memory or little-endian bytes read in place, as a table in flash is.

use super::error::AdditivityError;
use crate::float::sqrt;

/// How many numbers the packed lower triangle of an `n` by `n` matrix holds.
pub const fn packed_len(n: usize) -> usize {
    n * (n + 1) / 2
}

/// An entry of a factor.
pub trait Entry: Copy {
    /// The number.
    fn number(self) -> f64;
}

impl Entry for f64 {
    fn number(self) -> f64 {
        self
    }
}

impl Entry for [u8; 8] {
    fn number(self) -> f64 {
        f64::from_le_bytes(self)
    }
}

/// Row `i` of a packed lower triangle, empty when it is not there.
fn row<T>(packed: &[T], i: usize) -> &[T] {
    packed.get(packed_len(i)..packed_len(i + 1)).unwrap_or(&[])
}

/// Dot product over the shorter of two slices, in eight fixed lanes.
pub fn dot<T: Entry>(a: &[T], b: &[f64]) -> f64 {
    const LANES: usize = 8;
    let n = a.len().min(b.len());
    let (a, b) = (a.get(..n).unwrap_or(&[]), b.get(..n).unwrap_or(&[]));
    let (a_lanes, b_lanes) = (a.chunks_exact(LANES), b.chunks_exact(LANES));
    let tail: f64 = a_lanes
        .remainder()
        .iter()
        .zip(b_lanes.remainder())
        .fold(0.0, |sum, (x, y)| sum + x.number() * y);
    let mut sums = [0.0; LANES];
    for (x, y) in a_lanes.zip(b_lanes) {
        for ((sum, x), y) in sums.iter_mut().zip(x).zip(y) {
            *sum += x.number() * y;
        }
    }
    sums.iter().fold(tail, |total, sum| total + sum)
}

/// Replaces the packed lower triangle of a positive definite matrix by its Cholesky factor L, with L Lᵀ the matrix.
///
/// # Errors
/// [`AdditivityError::NotPositiveDefinite`] with the row where a pivot is not positive.
pub fn factorise(packed: &mut [f64]) -> Result<(), AdditivityError> {
    let mut i = 0;
    while packed_len(i + 1) <= packed.len() {
        let (done, rest) = packed.split_at_mut(packed_len(i));
        let (current, _) = rest.split_at_mut(i + 1);
        for j in 0..i {
            let pivot_row = row(done, j);
            let Some((&pivot, pivot_rest)) = pivot_row.split_last() else {
                continue;
            };
            let sum = dot(current.get(..j).unwrap_or(&[]), pivot_rest);
            if let Some(entry) = current.get_mut(j) {
                *entry = (*entry - sum) / pivot;
            }
        }
        if let Some((diagonal, before)) = current.split_last_mut() {
            let square = *diagonal - dot(before, before);
            if square > 0.0 {
                *diagonal = sqrt(square);
            } else {
                return Err(AdditivityError::NotPositiveDefinite { row: i });
            }
        }
        i += 1;
    }
    Ok(())
}

/// Replaces `b` by the solution of L x = b.
pub fn solve_lower<T: Entry>(factor: &[T], b: &mut [f64]) {
    for i in 0..b.len() {
        let (solved, rest) = b.split_at_mut(i);
        if let (Some(entry), Some((&pivot, before))) =
            (rest.first_mut(), row(factor, i).split_last())
        {
            *entry = (*entry - dot(before, solved)) / pivot.number();
        }
    }
}

/// Replaces `b` by the solution of Lᵀ x = b.
pub fn solve_upper<T: Entry>(factor: &[T], b: &mut [f64]) {
    for i in (0..b.len()).rev() {
        let (before, rest) = b.split_at_mut(i);
        if let (Some(entry), Some((&pivot, factors))) =
            (rest.first_mut(), row(factor, i).split_last())
        {
            let x = *entry / pivot.number();
            *entry = x;
            for (value, l) in before.iter_mut().zip(factors) {
                *value -= l.number() * x;
            }
        }
    }
}
