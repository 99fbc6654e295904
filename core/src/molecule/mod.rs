//! The molecular graph and what is perceived on it: valence, Kekulé structure, rings, aromaticity.

mod aromaticity;
mod cycle_families;
mod cycle_space;
mod element;
mod error;
mod graph;
mod kekule;
#[expect(
    clippy::module_inception,
    reason = "the file holds the type of that name"
)]
mod molecule;
mod normalise;
mod pi_electrons;
mod ring_systems;
mod rings;
mod valence;

pub use element::Element;
pub use error::MoleculeError;
pub use graph::{
    Atom, Bond, BondOrder, DoubleBondStereo, Ligand, MAX_DEGREE, MoleculeBuilder, Neighbour,
    TetrahedralStereo,
};
pub use molecule::Molecule;
pub use ring_systems::RingSystems;
pub use rings::{RingSet, RingSizes};
