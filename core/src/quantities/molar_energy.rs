//! Energy and enthalpy per amount of substance.

use core::ops::{Add, Div, Mul, Neg, Sub};

use super::{MolarMass, SpecificEnergy};

/// Kilojoules in a thermochemical kilocalorie, exact.
///
/// # Source
/// `green-book-2007`, section 7.2.
pub const KJ_PER_KCAL: f64 = 4.184;

/// Molar energy or enthalpy.
///
/// ```
/// use tautring_core::quantities::{MolarEnergy, MolarMass};
/// let strain = MolarEnergy::from_kcal_per_mol(27.5);
/// assert_eq!(strain.kj_per_mol(), 115.06);
/// let per_gram = strain / MolarMass::from_g_per_mol(42.081)?;
/// assert_eq!(per_gram.j_per_g().round(), 2734.0);
/// # Ok::<(), tautring_core::quantities::QuantityError>(())
/// ```
#[derive(Clone, Copy, Debug, Default, PartialEq, PartialOrd)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct MolarEnergy {
    kj_per_mol: f64,
}

impl MolarEnergy {
    /// From kJ/mol.
    pub const fn from_kj_per_mol(kj_per_mol: f64) -> Self {
        Self { kj_per_mol }
    }

    /// From thermochemical kcal/mol.
    pub const fn from_kcal_per_mol(kcal_per_mol: f64) -> Self {
        Self::from_kj_per_mol(kcal_per_mol * KJ_PER_KCAL)
    }

    /// In kJ/mol.
    pub const fn kj_per_mol(self) -> f64 {
        self.kj_per_mol
    }

    /// In thermochemical kcal/mol.
    pub const fn kcal_per_mol(self) -> f64 {
        self.kj_per_mol / KJ_PER_KCAL
    }
}

impl Add for MolarEnergy {
    type Output = Self;

    fn add(self, other: Self) -> Self {
        Self::from_kj_per_mol(self.kj_per_mol + other.kj_per_mol)
    }
}

impl Sub for MolarEnergy {
    type Output = Self;

    fn sub(self, other: Self) -> Self {
        Self::from_kj_per_mol(self.kj_per_mol - other.kj_per_mol)
    }
}

impl Neg for MolarEnergy {
    type Output = Self;

    fn neg(self) -> Self {
        Self::from_kj_per_mol(-self.kj_per_mol)
    }
}

impl Mul<f64> for MolarEnergy {
    type Output = Self;

    fn mul(self, factor: f64) -> Self {
        Self::from_kj_per_mol(self.kj_per_mol * factor)
    }
}

impl Div<MolarMass> for MolarEnergy {
    type Output = SpecificEnergy;

    fn div(self, mass: MolarMass) -> SpecificEnergy {
        SpecificEnergy::from_j_per_g(self.kj_per_mol * 1000.0 / mass.g_per_mol())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const fn kj(value: f64) -> MolarEnergy {
        MolarEnergy::from_kj_per_mol(value)
    }

    #[test]
    fn the_calorie_is_the_thermochemical_one() {
        assert_eq!(MolarEnergy::from_kcal_per_mol(1.0), kj(4.184));
        assert_eq!(kj(4.184).kcal_per_mol().to_bits(), 1.0_f64.to_bits());
    }

    #[test]
    fn arithmetic() {
        assert_eq!(kj(5.0) + kj(3.0), kj(8.0));
        assert_eq!(kj(5.0) - kj(3.0), kj(2.0));
        assert_eq!(-kj(5.0) * 2.0, kj(-10.0));
    }
}
