//! Quantities with their units. Inside the crate energies are kJ/mol, angles radians, molar masses g/mol; conversions
//! happen here and nowhere else.

mod angle;
mod error;
mod molar_energy;
mod molar_mass;
mod specific_energy;
mod uncertain;

pub use angle::Angle;
pub use error::QuantityError;
pub use molar_energy::{KJ_PER_KCAL, MolarEnergy};
pub use molar_mass::MolarMass;
pub use specific_energy::SpecificEnergy;
pub use uncertain::Uncertain;
