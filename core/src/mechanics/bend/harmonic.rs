//! Harmonic angle bend.

use super::range::{AngleRange, DEGREE};
use super::{Bend, BendForceConstant};
use crate::mechanics::MechanicsError;

/// How far from its reference angle the harmonic form goes, both ways.
const HALF_WIDTH_RAD: f64 = 15.0 * DEGREE;

impl Bend {
    /// Harmonic angle bend about a reference angle (radians): `E = ½ k (theta - theta0)²`, kJ/mol.
    ///
    /// The ½ is there: `k` is the second derivative. Zero is at the reference angle.
    ///
    /// # Range
    /// 15 degrees both ways: up to there it stays within a quarter of the published anharmonic series
    /// ([`Bend::sextic_series`]; 18 % below it at -15, 25 % above it at +15 degrees). It is the small-vibration
    /// form; no paper gives a limit in degrees, so the bound is ours. References of 100 degrees and more are not
    /// asked below 93 degrees, where four-membered rings begin.
    ///
    /// # Errors
    /// [`MechanicsError::ReferenceAngle`] unless the reference is between 0 and pi.
    ///
    /// # Source
    /// `wilson-decius-cross-1955`, chapter 8 (valence force field).
    ///
    /// ```
    /// use tautring_core::mechanics::{Bend, BendForceConstant};
    ///
    /// let k = BendForceConstant::from_mdyn_angstrom_per_rad2(1.0)?;
    /// let ccc = Bend::harmonic(k, 112.0_f64.to_radians())?;
    /// let closed = ccc.energy(100.0_f64.to_radians())?;
    /// assert!((closed.energy_kj_per_mol / 4.184 - 3.16).abs() < 0.005);
    /// # Ok::<(), tautring_core::mechanics::MechanicsError>(())
    /// ```
    pub fn harmonic(
        force_constant: BendForceConstant,
        reference_rad: f64,
    ) -> Result<Self, MechanicsError> {
        let range = AngleRange::about(reference_rad, HALF_WIDTH_RAD)?;
        let half = 0.5 * force_constant.kj_per_mol_rad2();
        Ok(Self::series(
            reference_rad,
            [half, 0.0, 0.0, 0.0, 0.0],
            range,
        ))
    }
}
