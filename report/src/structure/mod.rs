//! Structures on the host: SMILES and Molfile/SDF in, the core's molecular graph out.

mod capacity;
mod error;
mod outline;
mod smiles;
#[expect(
    clippy::module_inception,
    reason = "the file holds the type of that name"
)]
mod structure;

pub use capacity::{HostMolecule, MAX_ATOMS, MAX_BONDS};
pub use error::StructureError;
pub use structure::Structure;
