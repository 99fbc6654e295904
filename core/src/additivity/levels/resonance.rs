//! Resonance: the logarithm of the number of Kekulé structures.
//!
//! Resonance energies of benzenoid hydrocarbons go with the logarithm of the number of their Kekulé structures: anthracene has four of them,
//! phenanthrene five.
//!
//! # Source
//! `swinborne-sheldrake-1975`.

use heapless::Vec;

use crate::additivity::Level;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::key::Key;
use crate::additivity::skeleton::Skeleton;
use crate::float::ln;
use crate::molecule::{BondOrder, Molecule};

/// The logarithm counts in sixty-fourths, so that it is a whole number like every other count.
const PER_UNIT: f64 = 64.0;

/// Steps of the search after which a molecule counts as too large; coronene takes some hundred.
const MAX_STEPS: u32 = 4_000_000;

/// Counts the logarithm of the number of Kekulé structures.
pub(super) fn count<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) -> Result<(), AdditivityError> {
    let structures = kekule_structures(skeleton.molecule)?;
    if structures > 1 {
        let sixty_fourths = (PER_UNIT * ln(structures as f64) + 0.5) as u32;
        let key = Key::new(Level::Resonance, 0, &[]);
        features.add(key, f64::from(sixty_fourths))?;
    }
    Ok(())
}

/// The number of ways to place the double bonds of all aromatic systems: the product of those of each system.
fn kekule_structures<const A: usize, const B: usize>(
    molecule: &Molecule<A, B>,
) -> Result<u64, AdditivityError> {
    let mut placed = [false; A];
    for (index, bond) in molecule.bonds().iter().enumerate() {
        if bond.order == BondOrder::Double && molecule.is_aromatic_bond(index) {
            for atom in bond.atoms {
                if let Some(entry) = placed.get_mut(usize::from(atom)) {
                    *entry = true;
                }
            }
        }
    }
    let mut structures = 1_u64;
    while let Some(first) = placed.iter().position(|&p| p) {
        // Each atom enters once, so the system cannot overflow.
        let mut system: Vec<usize, A> = Vec::new();
        let mut at = 0;
        enter(&mut placed, &mut system, first);
        while let Some(&atom) = system.get(at) {
            for next in aromatic_neighbours(molecule, atom) {
                enter(&mut placed, &mut system, next);
            }
            at += 1;
        }
        structures = structures.saturating_mul(matchings(molecule, &system)?);
    }
    Ok(structures)
}

/// Moves an atom from those not yet placed to a system.
fn enter<const A: usize>(placed: &mut [bool; A], system: &mut Vec<usize, A>, atom: usize) {
    if let Some(entry) = placed.get_mut(atom).filter(|p| **p) {
        *entry = false;
        let _ = system.push(atom);
    }
}

fn aromatic_neighbours<const A: usize, const B: usize>(
    molecule: &Molecule<A, B>,
    atom: usize,
) -> impl Iterator<Item = usize> {
    molecule
        .neighbours(atom)
        .iter()
        .filter(|n| molecule.is_aromatic_bond(usize::from(n.bond)))
        .map(|n| usize::from(n.atom))
}

/// An atom whose partner is being tried: the atom, how many neighbours were tried, the partner.
type Trial = (usize, usize, Option<usize>);

/// The number of ways to pair all atoms of an aromatic system with a neighbour each, by trying them one after the other.
fn matchings<const A: usize, const B: usize>(
    molecule: &Molecule<A, B>,
    system: &[usize],
) -> Result<u64, AdditivityError> {
    let mut free = [false; A];
    let set = |atom: usize, value: bool, free: &mut [bool; A]| {
        if let Some(entry) = free.get_mut(atom) {
            *entry = value;
        }
    };
    for &atom in system {
        set(atom, true, &mut free);
    }
    let first_free = |free: &[bool; A]| {
        let is_free = |atom: &usize| free.get(*atom).copied().unwrap_or(false);
        system.iter().copied().find(is_free)
    };
    let mut trials: Vec<Trial, A> = Vec::new();
    trials.extend(first_free(&free).map(|atom| (atom, 0, None)));
    let mut found = 0;
    for _ in 0..MAX_STEPS {
        let Some((atom, tried, partner)) = trials.last_mut() else {
            return Ok(found);
        };
        let atom = *atom;
        if let Some(old) = partner.take() {
            set(atom, true, &mut free);
            set(old, true, &mut free);
        }
        let next = aromatic_neighbours(molecule, atom)
            .enumerate()
            .skip(*tried)
            .find(|&(_, n)| free.get(n).copied().unwrap_or(false));
        let Some((place, new)) = next else {
            trials.pop();
            continue;
        };
        *tried = place + 1;
        *partner = Some(new);
        set(atom, false, &mut free);
        set(new, false, &mut free);
        match first_free(&free) {
            // A pair for each trial, so there are never more trials than atoms.
            Some(atom) => trials.extend([(atom, 0, None)]),
            None => found += 1,
        }
    }
    Err(AdditivityError::TooManyKekuleStructures { steps: MAX_STEPS })
}
