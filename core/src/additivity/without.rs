//! A model without some of its measurements.

use super::cholesky::{dot, factorise, packed_len, solve_lower, solve_upper};
use super::error::AdditivityError;
use super::model::Model;

/// Most measurements that can be left out.
pub const MAX_LEFT_OUT: usize = 24;

/// What it takes to leave measurements out of estimates: their columns of K⁻¹, worked out once for many estimates.
///
/// With K⁻¹ of all measurements known, that of a subset follows without a new factorisation.
#[derive(Clone, Debug)]
pub struct Without<'w> {
    /// Indices of the measurements that are left out.
    pub(super) left_out: &'w [usize],
    /// Their columns of K⁻¹, one after the other.
    pub(super) columns: &'w [f64],
    /// Their entries of α = K⁻¹ y.
    pub(super) alpha: [f64; MAX_LEFT_OUT],
    /// Packed Cholesky factor of the rows and columns of K⁻¹ that belong to them.
    pub(super) block: [f64; packed_len(MAX_LEFT_OUT)],
}

impl<'w> Without<'w> {
    /// Prepares to leave measurements out.
    ///
    /// # Errors
    /// [`AdditivityError::Storage`] when `storage` is shorter than [`Model::len`] times the number left out, or more than
    /// [`MAX_LEFT_OUT`] are left out.
    pub fn new(
        model: &Model<'_>,
        left_out: &'w [usize],
        storage: &'w mut [f64],
    ) -> Result<Self, AdditivityError> {
        let n = model.len();
        let m = left_out.len();
        if m > MAX_LEFT_OUT {
            return Err(AdditivityError::Storage {
                needed: m,
                given: MAX_LEFT_OUT,
            });
        }
        let given = storage.len();
        let columns = storage.get_mut(..n * m).ok_or(AdditivityError::Storage {
            needed: n * m,
            given,
        })?;
        let mut alpha = [0.0; MAX_LEFT_OUT];
        let mut block = [0.0; packed_len(MAX_LEFT_OUT)];
        for (i, (&row, column)) in left_out
            .iter()
            .zip(columns.chunks_exact_mut(n.max(1)))
            .enumerate()
        {
            column.fill(0.0);
            if let Some(entry) = column.get_mut(row) {
                *entry = 1.0;
            }
            solve_lower(model.covariance.factor, column);
            solve_upper(model.covariance.factor, column);
            if let Some(entry) = alpha.get_mut(i) {
                *entry = dot(column, model.values);
            }
            for (j, &other) in left_out.iter().enumerate().take(i + 1) {
                if let (Some(entry), Some(&value)) =
                    (block.get_mut(packed_len(i) + j), column.get(other))
                {
                    *entry = value;
                }
            }
        }
        factorise(block.get_mut(..packed_len(m)).unwrap_or(&mut []))?;
        Ok(Self {
            left_out,
            columns,
            alpha,
            block,
        })
    }

    /// Indices of the measurements that are left out.
    pub const fn left_out(&self) -> &[usize] {
        self.left_out
    }

    /// The part of the block that is in use.
    pub(super) fn block(&self) -> &[f64] {
        let len = packed_len(self.left_out.len());
        self.block.get(..len).unwrap_or(&[])
    }
}
