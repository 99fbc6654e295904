//! Cubic angle bend.

use super::range::{AngleRange, FORCE_FIELD_HALF_WIDTH_RAD};
use super::{Bend, BendForceConstant};
use crate::mechanics::MechanicsError;

/// kcal/mol in 1 mdyn Å as published with the form; the exact value is 143.932619, 8e-7 of it more.
const KCAL_PER_MOL_PER_MDYN_ANGSTROM: f64 = 143.9325;

/// Cubic-bend constant, 1/rad.
const CUBIC_PER_RAD: f64 = -0.4;

/// A tabulated force constant (mdyn Å/rad²) with the conversion published with the form.
pub(super) fn tabulated(mdyn_angstrom_per_rad2: f64) -> Result<BendForceConstant, MechanicsError> {
    BendForceConstant::from_kcal_per_mol_rad2(
        KCAL_PER_MOL_PER_MDYN_ANGSTROM * mdyn_angstrom_per_rad2,
    )
}

impl Bend {
    /// Cubic angle bend about a reference angle (radians), kJ/mol, from a force constant in mdyn Å/rad².
    ///
    /// `E = 4.184 · 143.9325 · ½ k Δ² (1 + cb Δ)` with `Δ = theta - theta0` in radians and `cb = -0.4 / rad`.
    /// The ½ is there; zero is at the reference angle. Closing is stiffer than opening.
    ///
    /// The same constant is also printed as -0.007 per degree, which is -0.4011 per radian: at 18 degrees that
    /// makes a difference of 0.04 % of the energy.
    ///
    /// # Range
    /// 18 degrees both ways: what the field treats with open-chain reference angles (norbornane's bridge,
    /// di-tert-butylmethane). References of 100 degrees and more are not asked below 93 degrees: the field gives
    /// three- and four-membered rings reference angles of their own, and with such a reference the form may be
    /// asked about it. The cubic alone would turn concave 47.7 degrees above the reference.
    ///
    /// # Errors
    /// [`MechanicsError::ForceConstant`] and [`MechanicsError::ReferenceAngle`] for constants out of bounds.
    ///
    /// # Source
    /// `halgren-1996`, equation for angle bending.
    ///
    /// ```
    /// use tautring_core::mechanics::Bend;
    ///
    /// let ccc = Bend::cubic(0.851, 109.608_f64.to_radians())?;
    /// let closed = ccc.energy(99.608_f64.to_radians())?.energy_kj_per_mol;
    /// let opened = ccc.energy(119.608_f64.to_radians())?.energy_kj_per_mol;
    /// assert!(closed > opened);
    /// # Ok::<(), tautring_core::mechanics::MechanicsError>(())
    /// ```
    pub fn cubic(
        force_constant_mdyn_angstrom_per_rad2: f64,
        reference_rad: f64,
    ) -> Result<Self, MechanicsError> {
        let range = AngleRange::about(reference_rad, FORCE_FIELD_HALF_WIDTH_RAD)?;
        let half = 0.5 * tabulated(force_constant_mdyn_angstrom_per_rad2)?.kj_per_mol_rad2();
        Ok(Self::series(
            reference_rad,
            [half, half * CUBIC_PER_RAD, 0.0, 0.0, 0.0],
            range,
        ))
    }
}
