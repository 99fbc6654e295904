//! The prior: how much a feature of each level may contribute.

use super::deviation::{CONTRIBUTIONS, Deviation};
use super::features::Term;
use super::key::{CLASSES, Key};
use super::{Level, Part};
use crate::float::{exp, ln};

/// Prior standard deviations of the levels and of what additivity cannot reach.
#[derive(Clone, Copy, Debug, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct Prior {
    /// Standard deviation of one feature of each of [`Part::ALL`], each level in [`Level::ALL`] and each class, kJ/mol.
    pub tau_kj_per_mol: [[[f64; CLASSES]; Level::ALL.len()]; Part::ALL.len()],
    /// Width of the squared-exponential correlation between ring sizes, in the natural logarithm of the size.
    pub ring_width: f64,
    /// Scale of the heavy-tailed deviation of a molecule from additivity for one heavy atom of each element in
    /// [`Element::ALL`](crate::molecule::Element::ALL), then for one non-aromatic ring, one polar pair and one
    /// unsaturated atom; for the vaporisation part and then for the fusion part one for the molecule and one for each of those, kJ/mol. Their squares add up.
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
            let tau = self.tau(term.key);
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

    /// Prior standard deviation of a feature, kJ/mol.
    pub fn tau(&self, key: Key) -> f64 {
        key.level().map_or(0.0, |level| {
            self.tau_of(key.part(), level)
                .get(key.class())
                .copied()
                .unwrap_or(0.0)
        })
    }

    /// Prior standard deviations of the classes of a level, kJ/mol.
    pub fn tau_of(&self, part: Part, level: Level) -> [f64; CLASSES] {
        self.tau_kj_per_mol
            .get(part as usize)
            .and_then(|levels| levels.get(level as usize))
            .copied()
            .unwrap_or([0.0; CLASSES])
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
    pub fn size_correlation(&self, n: usize, m: usize) -> f64 {
        if n == m {
            return 1.0;
        }
        let distance = (ln(n as f64) - ln(m as f64)) / self.ring_width;
        exp(-0.5 * distance * distance)
    }
}
