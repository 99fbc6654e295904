//! The counted features of a molecule, or of a difference of molecules.

use heapless::Vec;

use super::deviation::Deviation;
use super::error::AdditivityError;
use super::key::Key;
use super::{Level, Part, Property};

/// How often a feature occurs.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Term {
    /// Which feature.
    pub key: Key,
    /// How often; in a difference of molecules it may be negative or broken.
    pub count: f64,
}

/// Feature counts in ascending order of their keys, at most `F` different ones.
///
/// The order makes every sum over them the same to the last bit, whatever the order of the atoms.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Features<const F: usize> {
    terms: Vec<Term, F>,
    deviation: Deviation,
}

impl<const F: usize> Features<F> {
    /// No features.
    pub const fn new() -> Self {
        Self {
            terms: Vec::new(),
            deviation: Deviation::none(),
        }
    }

    /// What adds to the variance of the deviation from additivity.
    pub const fn deviation(&self) -> &Deviation {
        &self.deviation
    }

    /// Takes note of one more contribution to the deviation.
    pub(super) fn add_deviation(&mut self, contribution: usize) {
        self.deviation.add_one(contribution);
    }

    /// The terms in ascending order of their keys.
    pub fn terms(&self) -> &[Term] {
        &self.terms
    }

    /// Counts a feature `count` more times.
    ///
    /// # Errors
    /// [`AdditivityError::TooManyFeatures`] when the capacity is used up.
    pub fn add(&mut self, key: Key, count: f64) -> Result<(), AdditivityError> {
        match self.terms.binary_search_by_key(&key, |t| t.key) {
            Ok(at) => {
                if let Some(term) = self.terms.get_mut(at) {
                    term.count += count;
                }
                Ok(())
            }
            Err(at) => self
                .terms
                .insert(at, Term { key, count })
                .map_err(|_| AdditivityError::TooManyFeatures { capacity: F }),
        }
    }

    /// Adds `factor` times the counts of `other`: reactants with negative, products with positive stoichiometric numbers.
    ///
    /// # Errors
    /// [`AdditivityError::TooManyFeatures`] when the capacity is used up.
    pub fn add_scaled<const G: usize>(
        &mut self,
        other: &Features<G>,
        factor: f64,
    ) -> Result<(), AdditivityError> {
        self.deviation.add_scaled(&other.deviation, factor);
        other
            .terms
            .iter()
            .try_for_each(|t| self.add(t.key, factor * t.count))
    }

    /// The features of another property of the molecule whose gas-phase enthalpy these features stand for.
    ///
    /// # Errors
    /// [`AdditivityError::TooManyFeatures`] when the capacity is used up.
    pub fn of(&self, property: Property) -> Result<Self, AdditivityError> {
        let coefficients = property.coefficients();
        let mut features = Self {
            terms: Vec::new(),
            deviation: self.deviation.in_parts(coefficients),
        };
        for (part, coefficient) in Part::ALL.into_iter().zip(coefficients) {
            for term in &self.terms {
                if coefficient != 0.0 && term.key.level().is_some_and(|level| part.has(level)) {
                    features.add(term.key.in_part(part), coefficient * term.count)?;
                }
            }
        }
        Ok(features)
    }

    /// Only the terms of the levels that `keep` accepts.
    #[must_use]
    pub fn only(&self, keep: impl Fn(Level) -> bool) -> Self {
        let mut kept = self.clone();
        kept.terms.retain(|t| t.key.level().is_some_and(&keep));
        kept
    }

    /// The same terms as a bare sum of increments, with no molecule's deviation from additivity.
    #[must_use]
    pub fn increments_only(mut self) -> Self {
        self.deviation = Deviation::default();
        self
    }
}
