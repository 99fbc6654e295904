//! How far a molecule may lie from additivity: a variance that grows with what the molecule is made of.

use crate::molecule::Element;

/// Number of kinds of contributions: the elements, the non-aromatic rings, the polar pairs, the unsaturated atoms.
pub const CONTRIBUTIONS: usize = Element::ALL.len() + 3;

/// Index of the contribution of non-aromatic rings.
pub const RINGS: usize = Element::ALL.len();

/// Index of the contribution of polar pairs: heteroatoms bonded, two or three bonds apart.
pub const POLAR_PAIRS: usize = Element::ALL.len() + 1;

/// Index of the contribution of unsaturated atoms: with a multiple or aromatic bond.
pub const UNSATURATED: usize = Element::ALL.len() + 2;

/// Counts of what adds to the variance of a molecule's deviation from additivity: heavy atoms by element, non-aromatic rings, pairs
/// of heteroatoms near each other, unsaturated atoms.
///
/// Each molecule deviates on its own, so a difference of molecules adds the counts with squared stoichiometric numbers.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Deviation {
    counts: [f64; CONTRIBUTIONS],
}

impl Deviation {
    /// No contribution at all.
    pub const fn none() -> Self {
        Self {
            counts: [0.0; CONTRIBUTIONS],
        }
    }

    /// The counts, by element in the order of [`Element::ALL`], then rings, polar pairs, unsaturated atoms.
    pub const fn counts(&self) -> &[f64; CONTRIBUTIONS] {
        &self.counts
    }

    /// Counts one more of a contribution.
    pub(super) fn add_one(&mut self, contribution: usize) {
        if let Some(count) = self.counts.get_mut(contribution) {
            *count += 1.0;
        }
    }

    /// Adds the counts of another molecule that takes part with a stoichiometric number.
    pub(super) fn add_scaled(&mut self, other: &Self, factor: f64) {
        for (count, more) in self.counts.iter_mut().zip(other.counts) {
            *count += factor * factor * more;
        }
    }
}
