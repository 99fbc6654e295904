//! Force constant of an angle bend, in the units that tables use.

use crate::float;
use crate::mechanics::MechanicsError;
use crate::mechanics::energy::KJ_PER_KCAL;

/// Largest magnitude of a bend coefficient, kJ/mol per power of a radian.
///
/// A hundred times the stiffest bend of a molecule (a few mdyn Å/rad²): what is larger is a slip of units.
pub(in crate::mechanics) const LARGEST_COEFFICIENT: f64 = 1e5;

/// kJ/mol in 1 mdyn Å (1e-18 J) per molecule, exact since 2019: 1e-18 J times 6.02214076e23 /mol.
const KJ_PER_MOL_PER_MDYN_ANGSTROM: f64 = 602.214_076;

/// Force constant `k` of an angle bend, positive, kJ/(mol·rad²).
///
/// Tables differ in whether the energy is `½ k Δθ²` or `k Δθ²`: this is the `k` of `½ k Δθ²`, the second
/// derivative of the energy at the reference angle.
///
/// ```
/// use tautring_core::mechanics::BendForceConstant;
///
/// let k = BendForceConstant::from_mdyn_angstrom_per_rad2(1.0)?;
/// assert_eq!(k.kj_per_mol_rad2(), 602.214076);
/// assert!(BendForceConstant::from_kcal_per_mol_rad2(-100.0).is_err());
/// # Ok::<(), tautring_core::mechanics::MechanicsError>(())
/// ```
#[derive(Clone, Copy, Debug, PartialEq, PartialOrd)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct BendForceConstant(f64);

impl BendForceConstant {
    /// From kJ/(mol·rad²).
    ///
    /// # Errors
    /// [`MechanicsError::ForceConstant`] unless above 0 and at most 1e5.
    pub fn from_kj_per_mol_rad2(value: f64) -> Result<Self, MechanicsError> {
        // Written so that NaN fails it.
        if value > 0.0 && value <= LARGEST_COEFFICIENT {
            Ok(Self(value))
        } else {
            Err(MechanicsError::ForceConstant {
                value_kj_per_mol_rad2: value,
            })
        }
    }

    /// From kcal/(mol·rad²), thermochemical: 1 kcal is exactly 4.184 kJ.
    ///
    /// # Errors
    /// As [`Self::from_kj_per_mol_rad2`].
    pub fn from_kcal_per_mol_rad2(value: f64) -> Result<Self, MechanicsError> {
        Self::from_kj_per_mol_rad2(value * KJ_PER_KCAL)
    }

    /// From mdyn Å/rad² per molecule: 1 mdyn Å is exactly 602.214076 kJ/mol.
    ///
    /// # Errors
    /// As [`Self::from_kj_per_mol_rad2`].
    pub fn from_mdyn_angstrom_per_rad2(value: f64) -> Result<Self, MechanicsError> {
        Self::from_kj_per_mol_rad2(value * KJ_PER_MOL_PER_MDYN_ANGSTROM)
    }

    /// The constant, kJ/(mol·rad²).
    pub const fn kj_per_mol_rad2(self) -> f64 {
        self.0
    }
}

/// Refuses a higher coefficient that is no number of usable size.
pub(super) fn check_coefficient(power: u8, value: f64) -> Result<f64, MechanicsError> {
    // Written so that NaN fails it.
    if float::abs(value) <= LARGEST_COEFFICIENT {
        Ok(value)
    } else {
        Err(MechanicsError::BendCoefficient { power, value })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_force_constant_is_a_positive_number() {
        for bad in [0.0, -1.0, 2e5, f64::NAN, f64::INFINITY] {
            assert!(
                BendForceConstant::from_kj_per_mol_rad2(bad).is_err(),
                "{bad}"
            );
        }
    }
}
