//! The prior: how much a feature of each level may contribute.

use super::Level;
use super::deviation::{CONTRIBUTIONS, Deviation};
use super::features::Term;
use crate::float::{exp, ln};

/// Prior standard deviations of the levels and of what additivity cannot reach.
#[derive(Clone, Copy, Debug, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct Prior {
    /// Standard deviation of one feature of each level in [`Level::ALL`], kJ/mol.
    pub tau_kj_per_mol: [f64; Level::ALL.len()],
    /// Width of the squared-exponential correlation between ring sizes, in the natural logarithm of the size.
    pub ring_width: f64,
    /// Scale of the heavy-tailed deviation of a molecule from additivity for one heavy atom of each element in
    /// [`Element::ALL`](crate::molecule::Element::ALL), then for one non-aromatic ring, one polar pair and one
    /// unsaturated atom, kJ/mol; their squares add up.
    pub deviation_kj_per_mol: [f64; CONTRIBUTIONS],
    /// Degrees of freedom of the heavy-tailed distributions.
    pub degrees_of_freedom: f64,
}

impl Prior {
    /// Prior covariance of two feature counts in kJ²/mol².
    ///
    /// Σ over levels of τ² c c′, in the smooth levels with exp(−(ln n/m)² / 2 w²) between the sizes n and m of one family of
    /// rings. Both slices have to be in ascending order of their keys.
    pub fn covariance(&self, a: &[Term], b: &[Term]) -> f64 {
        let mut total = 0.0;
        let mut rest = b;
        for term in a {
            let Some(level) = term.key.level() else {
                continue;
            };
            let tau = self.tau(level);
            if level.is_smooth() {
                for other in b.iter().filter(|t| t.key.same_family(term.key)) {
                    let correlation =
                        self.size_correlation(term.key.ring_size(), other.key.ring_size());
                    total += tau * tau * term.count * other.count * correlation;
                }
            } else {
                let before = rest.partition_point(|t| t.key < term.key);
                rest = rest.get(before..).unwrap_or(&[]);
                if let Some(other) = rest.first().filter(|t| t.key == term.key) {
                    total += tau * tau * term.count * other.count;
                }
            }
        }
        total
    }

    /// Prior standard deviation of one feature of a level, kJ/mol.
    pub fn tau(&self, level: Level) -> f64 {
        self.tau_kj_per_mol
            .get(level as usize)
            .copied()
            .unwrap_or(0.0)
    }

    /// Squared scale of a deviation from additivity, kJ²/mol².
    pub fn squared_scale(&self, deviation: &Deviation) -> f64 {
        deviation
            .counts()
            .iter()
            .zip(self.deviation_kj_per_mol)
            .fold(0.0, |sum, (count, scale)| sum + count * scale * scale)
    }

    /// Prior correlation of the strain of rings of two sizes.
    pub(super) fn size_correlation(&self, n: usize, m: usize) -> f64 {
        if n == m {
            return 1.0;
        }
        let distance = (ln(n as f64) - ln(m as f64)) / self.ring_width;
        exp(-0.5 * distance * distance)
    }
}
