//! What entropies and heat capacities count of a molecule, or of a difference of molecules.

use super::prior::{DEVIATIONS, LEVELS};
use crate::additivity::{AdditivityError, Features, POLAR_PAIRS, RINGS, Term, count};
use crate::float::ln;
use crate::molecule::{Element, Molecule};

/// Counts of the whole molecule: one, the logarithm of the molar mass in g/mol, its stereocentres.
pub const WHOLE: usize = 3;

/// The counted features with what belongs to the molecule as a whole.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct ThermalFeatures<const F: usize> {
    features: Features<F>,
    whole: [f64; WHOLE],
    ln_symmetry: f64,
    deviation: [f64; DEVIATIONS],
}

impl<const F: usize> ThermalFeatures<F> {
    /// Counts the features of one neutral organic molecule.
    ///
    /// # Errors
    /// As for [`count`](crate::additivity::count), and
    /// [`MoleculeError::TooSymmetric`](crate::molecule::MoleculeError::TooSymmetric).
    pub fn of<const A: usize, const B: usize>(
        molecule: &Molecule<A, B>,
    ) -> Result<Self, AdditivityError> {
        let all: Features<F> = count(molecule)?;
        let counts = all.deviation().counts();
        let heavy = counts.iter().take(Element::ALL.len()).sum();
        let of = |index: usize| counts.get(index).copied().unwrap_or(0.0);
        let mass = molecule.formula().molar_mass_g_per_mol();
        let centres = molecule.possible_centres().len() as f64;
        Ok(Self {
            deviation: [1.0, heavy, of(RINGS), of(POLAR_PAIRS)],
            features: all.only(|level| LEVELS.contains(&level)),
            whole: [1.0, ln(mass), centres],
            ln_symmetry: ln(molecule.symmetry_number()? as f64),
        })
    }

    /// Adds `factor` times another molecule: reactants with negative, products with positive stoichiometric numbers.
    ///
    /// A molecule has to be added once with its whole number, since its deviation counts with the number squared.
    ///
    /// # Errors
    /// [`AdditivityError::TooManyFeatures`] when the capacity is used up.
    pub fn add_scaled<const G: usize>(
        &mut self,
        other: &ThermalFeatures<G>,
        factor: f64,
    ) -> Result<(), AdditivityError> {
        self.features.add_scaled(&other.features, factor)?;
        for (own, more) in self.whole.iter_mut().zip(other.whole) {
            *own += factor * more;
        }
        self.ln_symmetry += factor * other.ln_symmetry;
        for (own, more) in self.deviation.iter_mut().zip(other.deviation) {
            *own += factor * factor * more;
        }
        Ok(())
    }

    /// The terms in ascending order of their keys.
    pub fn terms(&self) -> &[Term] {
        self.features.terms()
    }

    /// The counts of the whole molecule.
    pub const fn whole(&self) -> &[f64; WHOLE] {
        &self.whole
    }

    /// Logarithm of the symmetry number.
    pub const fn ln_symmetry(&self) -> f64 {
        self.ln_symmetry
    }

    /// What adds to the variance of the deviation from additivity.
    pub const fn deviation(&self) -> &[f64; DEVIATIONS] {
        &self.deviation
    }

    /// The same without any molecule's deviation from additivity, as the increment of one more unit of a chain.
    #[must_use]
    pub fn increments_only(mut self) -> Self {
        self.deviation = [0.0; DEVIATIONS];
        self
    }
}
