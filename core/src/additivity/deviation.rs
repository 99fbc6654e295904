//! How far a molecule may lie from additivity: a variance that grows with what the molecule is made of.

use super::Part;
use crate::molecule::Element;

/// Number of kinds of contributions: to the gas part the elements, the non-aromatic rings, the polar pairs, the unsaturated atoms; to the
/// vaporisation and the fusion part one for the molecule and one for all that the gas part counts.
pub const CONTRIBUTIONS: usize = GAS_CONTRIBUTIONS + 4;

/// Number of kinds of contributions to the gas part.
const GAS_CONTRIBUTIONS: usize = Element::ALL.len() + 3;

/// Index of the contribution of non-aromatic rings.
pub const RINGS: usize = Element::ALL.len();

/// Index of the contribution of polar pairs: heteroatoms bonded, two or three bonds apart.
pub const POLAR_PAIRS: usize = Element::ALL.len() + 1;

/// Index of the contribution of unsaturated atoms: with a multiple or aromatic bond.
pub const UNSATURATED: usize = Element::ALL.len() + 2;

/// The part that a contribution adds to.
pub const fn part_of(contribution: usize) -> Part {
    match contribution {
        0..GAS_CONTRIBUTIONS => Part::Gas,
        GAS_CONTRIBUTIONS..VAPORISATION_END => Part::Vaporisation,
        _ => Part::Fusion,
    }
}

const VAPORISATION_END: usize = GAS_CONTRIBUTIONS + 2;

/// Counts of what adds to the variance of a molecule's deviation from additivity: heavy atoms by element, non-aromatic rings, pairs
/// of heteroatoms near each other, unsaturated atoms.
///
/// Each molecule deviates on its own, so a difference of molecules adds the counts with squared stoichiometric numbers.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Deviation {
    counts: [f64; CONTRIBUTIONS],
}

impl Default for Deviation {
    fn default() -> Self {
        Self::none()
    }
}

impl Deviation {
    /// No contribution at all.
    pub const fn none() -> Self {
        Self {
            counts: [0.0; CONTRIBUTIONS],
        }
    }

    /// The counts: elements in the order of [`Element::ALL`], rings, polar pairs, unsaturated atoms; then those of the other parts.
    pub const fn counts(&self) -> &[f64; CONTRIBUTIONS] {
        &self.counts
    }

    /// The counts of one molecule for all parts, from its counts for the gas part.
    #[must_use]
    pub fn in_every_part(&self) -> [f64; CONTRIBUTIONS] {
        self.in_parts([1.0; Part::ALL.len()]).counts
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

    /// The counts of one molecule for a property that holds each part `coefficients` times, from its counts for the gas part.
    #[must_use]
    pub(super) fn in_parts(&self, coefficients: [f64; Part::ALL.len()]) -> Self {
        let [gas, vaporisation, fusion] = coefficients.map(|c| c * c);
        let mut counts = self.counts;
        let (own, other) = counts.split_at_mut(GAS_CONTRIBUTIONS);
        let size = own.iter().fold(0.0, |sum, count| sum + count);
        let others = [vaporisation, vaporisation * size, fusion, fusion * size];
        for (count, more) in other.iter_mut().zip(others) {
            *count = more;
        }
        for count in own {
            *count *= gas;
        }
        Self { counts }
    }
}
