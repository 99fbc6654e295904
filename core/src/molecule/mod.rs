//! The molecular graph and what is perceived on it: valence, Kekulé structure, rings, aromaticity.

mod aromaticity;
mod canonical;
mod canonical_search;
mod centres;
mod cycle_families;
mod cycle_space;
mod element;
mod error;
mod exchanges;
mod formula;
mod fragments;
mod graph;
mod hydrogens;
mod kekule;
mod matching;
#[expect(
    clippy::module_inception,
    reason = "the file holds the type of that name"
)]
mod molecule;
mod normalise;
mod pi_electrons;
mod ring_systems;
mod rings;
mod spelling;
mod stereo;
mod symmetry_number;
mod valence;

pub use canonical::{CanonicalOrder, CodeRow};
pub use centres::CentreKind;
pub use element::Element;
pub use error::MoleculeError;
pub use formula::Formula;
pub use graph::{
    Atom, Bond, BondOrder, DoubleBondStereo, Ligand, MAX_DEGREE, MoleculeBuilder, Neighbour,
    TetrahedralStereo,
};
pub use molecule::Molecule;
pub use ring_systems::RingSystems;
pub use rings::{RingSet, RingSizes};
pub use valence::implicit_hydrogens;
