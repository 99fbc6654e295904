//! The prior of entropies and heat capacities.

use super::features::WHOLE;
use crate::additivity::{CLASSES, Key, Level};

/// The levels that count: those of a bond and of what stands near, and rings.
pub const LEVELS: [Level; 13] = [
    Level::Element,
    Level::Atom,
    Level::BondElements,
    Level::Bond,
    Level::GroupElements,
    Level::Group,
    Level::GeminalElements,
    Level::NearPair,
    Level::VicinalElements,
    Level::AromaticPair,
    Level::RingSize,
    Level::RingAtom,
    Level::RingJunction,
];

/// What adds to the variance of a molecule's deviation: the molecule, its heavy atoms, its non-aromatic rings, its polar pairs.
pub const DEVIATIONS: usize = 4;

/// Prior standard deviations; of a heat capacity those at the first temperature.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ThermalPrior {
    /// Of one feature of each of [`LEVELS`] and each class, J/(mol K).
    pub tau_j_per_mol_k: [[f64; CLASSES]; LEVELS.len()],
    /// Of one unit of each count of the whole molecule, J/(mol K).
    pub whole_j_per_mol_k: [f64; WHOLE],
    /// Scale of the heavy-tailed deviation of a molecule by what brings it, J/(mol K). Their squares add up.
    pub deviation_j_per_mol_k: [f64; DEVIATIONS],
    /// Degrees of freedom of the deviation.
    pub degrees_of_freedom: f64,
}

impl ThermalPrior {
    /// Prior variance of a feature, J²/(mol² K²); 0 for one of a level that does not count.
    pub fn variance(&self, key: Key) -> f64 {
        let place = key
            .level()
            .and_then(|level| LEVELS.iter().position(|&l| l == level));
        let tau = place
            .and_then(|place| self.tau_j_per_mol_k.get(place)?.get(key.class()))
            .copied()
            .unwrap_or(0.0);
        tau * tau
    }

    /// Squared scale of a deviation, J²/(mol² K²).
    pub fn squared_scale(&self, counts: &[f64; DEVIATIONS]) -> f64 {
        counts
            .iter()
            .zip(self.deviation_j_per_mol_k)
            .fold(0.0, |sum, (count, scale)| sum + count * scale * scale)
    }
}
