//! Angle bends up to the sixth power.

use super::range::{AngleRange, DEGREE, FORCE_FIELD_HALF_WIDTH_RAD};
use super::{Bend, BendForceConstant};
use crate::mechanics::MechanicsError;

/// kcal/mol per degree² and mdyn Å/rad², half the conversion of the force constant, as published with both forms.
///
/// It rests on 143.88 kcal/mol per mdyn Å, 0.04 % below the exact 143.93.
const KCAL_PER_MOL_DEGREE2: f64 = 0.021_914;

/// Factors of the second to sixth power of the departure in degrees, for the form of 1977.
const SEXTIC: [f64; 5] = [1.0, 0.0, 0.0, 0.0, 7.0e-8];

/// Factors of the second to sixth power of the departure in degrees, for the form of 1989.
const SEXTIC_SERIES: [f64; 5] = [1.0, -0.014, 5.6e-5, -7.0e-7, 9.0e-10];

impl Bend {
    /// Quadratic and sextic angle bend about a reference angle (radians), kJ/mol, from a force constant in
    /// mdyn Å/rad².
    ///
    /// `E = 4.184 · 0.021914 k Δ² (1 + 7e-8 Δ⁴)` with `Δ = theta - theta0` in **degrees**. The ½ is inside the
    /// factor; zero is at the reference angle. Opening and closing cost the same; both sides steepen.
    ///
    /// # Range
    /// 18 degrees both ways: what the field treats with open-chain reference angles (norbornane's bridge,
    /// di-tert-butylmethane). References of 100 degrees and more are not asked below 93 degrees: three- and
    /// four-membered rings have parameters of their own.
    ///
    /// # Errors
    /// [`MechanicsError::ForceConstant`] and [`MechanicsError::ReferenceAngle`] for constants out of bounds.
    ///
    /// # Source
    /// `allinger-1977`.
    ///
    /// ```
    /// use tautring_core::mechanics::Bend;
    ///
    /// let ccc = Bend::sextic(0.45, 109.5_f64.to_radians())?;
    /// let ten_degrees = ccc.energy(119.5_f64.to_radians())?.energy_kj_per_mol;
    /// assert!((ten_degrees - 4.184 * 0.021914 * 0.45 * 100.0 * 1.0007).abs() < 1e-9);
    /// # Ok::<(), tautring_core::mechanics::MechanicsError>(())
    /// ```
    pub fn sextic(
        force_constant_mdyn_angstrom_per_rad2: f64,
        reference_rad: f64,
    ) -> Result<Self, MechanicsError> {
        from_degrees(force_constant_mdyn_angstrom_per_rad2, reference_rad, SEXTIC)
    }

    /// Angle bend with all powers from the second to the sixth about a reference angle (radians), kJ/mol, from a
    /// force constant in mdyn Å/rad².
    ///
    /// `E = 4.184 · 0.021914 k Δ² (1 - 0.014 Δ + 5.6e-5 Δ² - 7e-7 Δ³ + 9e-10 Δ⁴)` with `Δ = theta - theta0` in
    /// **degrees**. The ½ is inside the factor; zero is at the reference angle. Closing is stiffer than opening.
    ///
    /// Later parameter sets of the same field carry 2.2e-8 in the last term; at 18 degrees, where it matters
    /// most in the range, that adds 0.3 % to the energy.
    ///
    /// # Range
    /// 18 degrees both ways, for the reasons of [`Bend::sextic`]. Above, the series would soon turn concave
    /// (26 degrees over the reference) and then fall again.
    ///
    /// # Errors
    /// [`MechanicsError::ForceConstant`] and [`MechanicsError::ReferenceAngle`] for constants out of bounds.
    ///
    /// # Source
    /// `allinger-yuh-lii-1989`.
    ///
    /// ```
    /// use tautring_core::mechanics::Bend;
    ///
    /// let ccc = Bend::sextic_series(0.67, 109.5_f64.to_radians())?;
    /// let closed = ccc.energy(95.0_f64.to_radians())?.energy_kj_per_mol;
    /// let opened = ccc.energy(124.0_f64.to_radians())?.energy_kj_per_mol;
    /// assert!(closed > 1.5 * opened);
    /// # Ok::<(), tautring_core::mechanics::MechanicsError>(())
    /// ```
    pub fn sextic_series(
        force_constant_mdyn_angstrom_per_rad2: f64,
        reference_rad: f64,
    ) -> Result<Self, MechanicsError> {
        from_degrees(
            force_constant_mdyn_angstrom_per_rad2,
            reference_rad,
            SEXTIC_SERIES,
        )
    }
}

/// The series in radians from factors that go with degrees.
fn from_degrees(
    force_constant_mdyn_angstrom_per_rad2: f64,
    reference_rad: f64,
    factors: [f64; 5],
) -> Result<Bend, MechanicsError> {
    let range = AngleRange::about(reference_rad, FORCE_FIELD_HALF_WIDTH_RAD)?;
    let force_constant = BendForceConstant::from_kcal_per_mol_rad2(
        2.0 * KCAL_PER_MOL_DEGREE2 * force_constant_mdyn_angstrom_per_rad2 / (DEGREE * DEGREE),
    )?;
    let mut unit = 0.5 * force_constant.kj_per_mol_rad2();
    let coefficients = factors.map(|factor| {
        let coefficient = unit * factor;
        unit /= DEGREE;
        coefficient
    });
    Ok(Bend::series(reference_rad, coefficients, range))
}
