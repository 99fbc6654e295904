//! Counting: one file for each kind of level.

mod aromatic;
mod composition;
mod configuration;
mod contacts;
mod count;
mod groups;
mod paths;
mod resonance;
mod ring_sides;
mod rings;

pub use count::{count, count_strain};
