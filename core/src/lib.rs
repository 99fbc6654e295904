//! Strain energies of ring molecules: additivity of enthalpies of formation, angle bend and torsion.
//!
//! `no_std`, no `alloc`, no `unsafe`; nothing in here can panic. Storage is inside the types (capacities are
//! const generics) or handed in by the caller. Every number is the same 64 bits on every machine.
//!
//! Layers, imports run downwards only:
//!
//! 1. [`strain`]: conventional strain of a molecule and of each of its ring systems; [`reactions`]: reactions that define strain;
//!    [`thermal`]: reactions at other temperatures, ceiling temperature
//! 2. [`additivity`], [`mechanics`]: enthalpies of formation with uncertainties; angle bend and torsion
//! 3. [`geometry`]: distance, angle and dihedral with derivatives
//! 4. [`molecule`]: elements, the molecular graph, rings, aromaticity; [`oxygen_balance`]
//! 5. [`quantities`], `float`: units; transcendental functions

#![no_std]

pub mod additivity;
mod float;
pub mod geometry;
pub mod mechanics;
pub mod molecule;
pub mod oxygen_balance;
pub mod quantities;
pub mod reactions;
pub mod strain;
pub mod thermal;

/// Version of this crate, for reports that state what made their numbers.
pub const VERSION: &str = env!("CARGO_PKG_VERSION");
