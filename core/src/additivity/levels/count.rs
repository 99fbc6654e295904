//! Counting a molecule on every level, and on the ring levels alone.

use super::{
    aromatic, composition, configuration, contacts, groups, paths, resonance, ring_sides, rings,
};
use crate::additivity::deviation;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::skeleton::{Skeleton, is_aromatic_ring};
use crate::molecule::{Element, Molecule};

/// Counts the features of one neutral organic molecule on every level.
///
/// # Errors
/// [`AdditivityError::Molecule`] when the graph is not one neutral molecule, [`AdditivityError::NoCarbon`],
/// [`AdditivityError::TooManyFeatures`].
pub fn count<const A: usize, const B: usize, const F: usize>(
    molecule: &Molecule<A, B>,
) -> Result<Features<F>, AdditivityError> {
    molecule.require_single_neutral()?;
    if !molecule.atoms().iter().any(|a| a.element == Element::C) {
        return Err(AdditivityError::NoCarbon);
    }
    let skeleton = Skeleton::new(molecule);
    let mut features = Features::new();
    note_deviation(&skeleton, &mut features);
    composition::count(&skeleton, &mut features)?;
    groups::count(&skeleton, &mut features)?;
    paths::geminal(&skeleton, &mut features)?;
    paths::near_pairs(&skeleton, &mut features)?;
    paths::vicinal(&skeleton, &mut features)?;
    contacts::count(&skeleton, &mut features)?;
    aromatic::count(&skeleton, &mut features)?;
    resonance::count(&skeleton, &mut features)?;
    configuration::cis(&skeleton, &mut features)?;
    strain_levels(&skeleton, &mut features, &|_| true)?;
    Ok(features)
}

/// Counts the ring levels alone, on the atoms that `keep` accepts (whole ring systems).
///
/// The counts of all ring systems of a molecule add up to those of the molecule.
///
/// # Errors
/// [`AdditivityError::Molecule`] when the graph is not one neutral molecule, [`AdditivityError::TooManyFeatures`].
pub fn count_strain<const A: usize, const B: usize, const F: usize>(
    molecule: &Molecule<A, B>,
    keep: &dyn Fn(usize) -> bool,
) -> Result<Features<F>, AdditivityError> {
    molecule.require_single_neutral()?;
    let skeleton = Skeleton::new(molecule);
    let mut features = Features::new();
    note_deviation(&skeleton, &mut features);
    strain_levels(&skeleton, &mut features, keep)?;
    Ok(features)
}

fn note_deviation<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) {
    for (_, site) in skeleton.sites() {
        features.add_deviation(site.kind.element_token() as usize);
        if !site.kind.is_saturated() {
            features.add_deviation(deviation::UNSATURATED);
        }
    }
    let molecule = skeleton.molecule;
    for ring in molecule.rings().iter() {
        if !is_aromatic_ring(molecule, ring) {
            features.add_deviation(deviation::RINGS);
        }
    }
    for _ in 0..paths::polar_pairs(skeleton) {
        features.add_deviation(deviation::POLAR_PAIRS);
    }
}

fn strain_levels<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
    keep: &dyn Fn(usize) -> bool,
) -> Result<(), AdditivityError> {
    rings::count(skeleton, features, keep)?;
    paths::ring_vicinal(skeleton, features, keep)?;
    configuration::ring(skeleton, features, keep)?;
    ring_sides::count(skeleton, features, keep)
}
