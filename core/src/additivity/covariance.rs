//! What measurements know of a molecule: their covariances with it, and the triangular factor that turns these into variances.

use super::Property;
use super::cholesky::{dot, solve_lower};
use super::error::AdditivityError;
use super::features::{Features, Term};
use super::key::Key;
use super::part::Part;
use super::prior::Prior;

/// Measurements with their counted features and the factor of their covariance matrix.
#[derive(Clone, Copy, Debug)]
pub struct Covariance<'a> {
    /// For each key of the model where its entries start in `molecules` and `counts`; one more for the end.
    pub starts: &'a [u32],
    /// Molecules in which the key occurs.
    pub molecules: &'a [u16],
    /// How often it occurs in them.
    pub counts: &'a [u8],
    /// What was measured: of which molecule, and which property.
    pub rows: &'a [(u16, Property)],
    /// How many molecules there are.
    pub molecule_count: usize,
    /// Packed lower Cholesky factor of the covariance matrix of the measurements, each number as little-endian bytes.
    pub factor: &'a [[u8; 8]],
}

impl Covariance<'_> {
    /// Number of measurements.
    pub const fn len(&self) -> usize {
        self.rows.len()
    }

    /// Whether there is no measurement.
    pub const fn is_empty(&self) -> bool {
        self.rows.is_empty()
    }

    /// How many numbers an estimate works in.
    pub const fn workspace_len(&self) -> usize {
        self.len() + self.molecule_count
    }

    /// The variance that the measurements take off the prior variance of features, kJ²/mol²: k(x)ᵀ K⁻¹ k(x).
    ///
    /// It only grows when measurements are added, so a part of them never gives a smaller uncertainty than all.
    ///
    /// # Errors
    /// [`AdditivityError::Storage`] when `workspace` is shorter than [`Covariance::workspace_len`].
    pub(super) fn explained<const F: usize>(
        &self,
        prior: &Prior,
        keys: &[u64],
        features: &Features<F>,
        workspace: &mut [f64],
    ) -> Result<f64, AdditivityError> {
        let (k, by_molecule) = split(workspace, self.workspace_len(), self.len())?;
        self.with_measurements(prior, keys, features.terms(), k, by_molecule);
        solve_lower(self.factor, k);
        Ok(dot(k, k))
    }

    /// Prior covariance k(x) of features with every measurement.
    pub(super) fn with_measurements(
        &self,
        prior: &Prior,
        keys: &[u64],
        terms: &[Term],
        k: &mut [f64],
        by_molecule: &mut [f64],
    ) {
        k.fill(0.0);
        for part in Part::ALL {
            let of_part = terms.iter().filter(|t| t.key.part() == part);
            if of_part.clone().next().is_none() {
                continue;
            }
            by_molecule.fill(0.0);
            for term in of_part {
                for (index, covariance) in related(prior, keys, term.key) {
                    self.add_entries(index, covariance * term.count, by_molecule);
                }
            }
            for (entry, &(molecule, property)) in k.iter_mut().zip(self.rows) {
                let coefficient = coefficient(property, part);
                if let Some(covariance) = by_molecule.get(usize::from(molecule)) {
                    *entry += coefficient * covariance;
                }
            }
        }
    }

    /// Adds `factor` times the counts of the key at `index` to the molecules in which it occurs.
    fn add_entries(&self, index: usize, factor: f64, by_molecule: &mut [f64]) {
        let start = self.starts.get(index).map_or(0, |&s| s as usize);
        let end = self.starts.get(index + 1).map_or(0, |&s| s as usize);
        let molecules = self.molecules.get(start..end).unwrap_or(&[]);
        let counts = self.counts.get(start..end).unwrap_or(&[]);
        for (&molecule, &count) in molecules.iter().zip(counts) {
            if let Some(entry) = by_molecule.get_mut(usize::from(molecule)) {
                *entry += factor * f64::from(count);
            }
        }
    }
}

/// How often a property holds a part.
pub(super) fn coefficient(property: Property, part: Part) -> f64 {
    let [gas, vaporisation, fusion] = property.coefficients();
    match part {
        Part::Gas => gas,
        Part::Vaporisation => vaporisation,
        Part::Fusion => fusion,
    }
}

/// The measured features that a feature is correlated with: index in `keys` and prior covariance.
pub(super) fn related(prior: &Prior, keys: &[u64], key: Key) -> impl Iterator<Item = (usize, f64)> {
    let tau = prior.tau(key);
    let smooth = key.level().is_some_and(super::Level::is_smooth);
    let listed = key.in_part(Part::Gas);
    let low = keys.partition_point(|&k| {
        if smooth {
            k >> 8 < listed.bits() >> 8
        } else {
            k < listed.bits()
        }
    });
    keys.iter()
        .enumerate()
        .skip(low)
        .map(|(index, &bits)| (index, Key::from_bits(bits)))
        .take_while(move |&(_, other)| {
            if smooth {
                other.same_family(listed)
            } else {
                other == listed
            }
        })
        .map(move |(index, other)| {
            let correlation = if smooth {
                prior.size_correlation(key.ring_size(), other.ring_size())
            } else {
                1.0
            };
            (index, tau * tau * correlation)
        })
}

/// The first `first` numbers of a workspace and the rest of the `needed` ones.
pub(super) fn split(
    workspace: &mut [f64],
    needed: usize,
    first: usize,
) -> Result<(&mut [f64], &mut [f64]), AdditivityError> {
    let given = workspace.len();
    let used = workspace
        .get_mut(..needed)
        .ok_or(AdditivityError::Storage { needed, given })?;
    Ok(used.split_at_mut(first.min(needed)))
}
