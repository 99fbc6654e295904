//! Reactions in the ideal gas at temperatures other than 298.15 K, and the ceiling temperature of a polymerisation.
//!
//! Everything is gas to gas: a condensed phase needs heat capacities and entropies of its own, which nothing here estimates.

mod ceiling;
mod error;
mod interpolant;
mod reaction;

pub use ceiling::{Equilibrium, EquilibriumTemperature, StandardState, equilibrium_temperature};
pub use error::ThermalError;
pub use interpolant::{HIGHEST_K, Interpolant, LOWEST_K, REFERENCE_K};
pub use reaction::{AtTemperature, Interval, ReactionGas};
