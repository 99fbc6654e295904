//! Conventional strain: what the ring levels of the additivity add to the strain-free sum.
//!
//! Convention: group increments. The strain-free sum is made of every level that a chain has too; the strain is made of the ring levels:
//! sizes, compositions, atoms and bonds of rings that are not aromatic, their fusion, the contacts across ring bonds and the configuration of
//! ring bonds. Its zero is a hypothetical molecule of the same groups without rings. A strain energy without its convention means
//! nothing: other conventions give other numbers.

use crate::additivity::{AdditivityError, Estimate, Features, Level, Model, count_strain};
use crate::molecule::Molecule;

/// The ring part of counted features, whose enthalpy is the strain; the molecule's deviation from additivity belongs to it.
#[must_use]
pub fn ring_part<const F: usize>(features: &Features<F>) -> Features<F> {
    features.only(Level::is_strain)
}

/// The strain-free part of counted features: the increments of the groups, without any deviation.
#[must_use]
pub fn strain_free_part<const F: usize>(features: &Features<F>) -> Features<F> {
    features.only(|level| !level.is_strain()).increments_only()
}

/// The strain of a molecule, kJ/mol.
///
/// # Errors
/// [`AdditivityError::Storage`] when `workspace` is shorter than the number of measurements.
pub fn total<const F: usize>(
    model: &Model<'_>,
    features: &Features<F>,
    workspace: &mut [f64],
) -> Result<Estimate, AdditivityError> {
    model.estimate(&ring_part(features), workspace)
}

/// The strain of one ring system, kJ/mol: the ring levels on the atoms that `in_system` accepts.
///
/// The values of all ring systems of a molecule add up to the total; each carries the whole molecule's deviation from
/// additivity, since nothing says where it sits.
///
/// # Errors
/// As for [`count_strain`] and [`total`].
pub fn of_ring_system<const A: usize, const B: usize, const F: usize>(
    model: &Model<'_>,
    molecule: &Molecule<A, B>,
    in_system: &dyn Fn(usize) -> bool,
    workspace: &mut [f64],
) -> Result<Estimate, AdditivityError> {
    let features: Features<F> = count_strain(molecule, in_system)?;
    model.estimate(&features, workspace)
}
