//! The counted features of a molecule, or of a difference of molecules.

use heapless::Vec;

use super::Level;
use super::error::AdditivityError;
use super::key::Key;

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
    molecules: f64,
}

impl<const F: usize> Features<F> {
    /// No features.
    pub const fn new() -> Self {
        Self {
            terms: Vec::new(),
            molecules: 0.0,
        }
    }

    /// The sum of the squared stoichiometric numbers of the molecules counted: 1 for one molecule.
    ///
    /// Each molecule deviates from additivity on its own, so the variances of the deviations add up with it.
    pub const fn molecules(&self) -> f64 {
        self.molecules
    }

    /// Takes note of one molecule.
    pub(super) const fn add_molecule(&mut self) {
        self.molecules += 1.0;
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
        self.molecules += factor * factor * other.molecules;
        other
            .terms
            .iter()
            .try_for_each(|t| self.add(t.key, factor * t.count))
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
        self.molecules = 0.0;
        self
    }
}
