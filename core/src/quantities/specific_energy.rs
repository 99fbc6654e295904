//! Energy per mass.

use super::{MolarEnergy, MolarMass};

/// Specific energy.
///
/// ```
/// use tautring_core::quantities::{MolarMass, SpecificEnergy};
/// let energy = SpecificEnergy::from_j_per_g(500.0);
/// assert_eq!(energy.kj_per_kg(), 500.0);
/// assert_eq!(energy.per_mole(MolarMass::from_g_per_mol(100.0)?).kj_per_mol(), 50.0);
/// # Ok::<(), tautring_core::quantities::QuantityError>(())
/// ```
#[derive(Clone, Copy, Debug, Default, PartialEq, PartialOrd)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct SpecificEnergy {
    j_per_g: f64,
}

impl SpecificEnergy {
    /// From J/g.
    pub const fn from_j_per_g(j_per_g: f64) -> Self {
        Self { j_per_g }
    }

    /// In J/g.
    pub const fn j_per_g(self) -> f64 {
        self.j_per_g
    }

    /// In kJ/kg: the same number as in J/g.
    pub const fn kj_per_kg(self) -> f64 {
        self.j_per_g
    }

    /// The energy of one mole.
    pub const fn per_mole(self, mass: MolarMass) -> MolarEnergy {
        MolarEnergy::from_kj_per_mol(self.j_per_g * mass.g_per_mol() / 1000.0)
    }
}
