//! Structures on the host: SMILES and Molfile/SDF in, the core's molecular graph out.

mod capacity;
mod configuration;
mod coordinates;
mod error;
mod flag;
mod identity;
mod line_notation;
mod molfile;
mod outline;
mod smiles;
#[expect(
    clippy::module_inception,
    reason = "the file holds the type of that name"
)]
mod structure;

pub use capacity::{HostMolecule, MAX_ATOMS, MAX_BONDS};
pub use coordinates::Coordinates;
pub use error::StructureError;
pub use flag::StereoFlag;
pub use identity::{diastereomer, identity, skeleton};
pub use line_notation::line_notation;
pub use structure::{Structure, read_structures};
