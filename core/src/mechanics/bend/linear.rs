//! Cosine angle bend for linear centres.

use core::f64::consts::PI;

use super::Bend;
use super::cubic::tabulated;
use super::range::{AngleRange, DEGREE};
use crate::mechanics::MechanicsError;

/// Sharpest angle at a centre that still counts as linear.
const LOWEST_RAD: f64 = 150.0 * DEGREE;

impl Bend {
    /// Angle bend of a linear centre (alkyne, nitrile, allene), kJ/mol, from a force constant in mdyn Å/rad².
    ///
    /// `E = 4.184 · 143.9325 · k (1 + cos theta)`. There is no ½ in front of the cosine; since
    /// `1 + cos theta = ½ (theta - pi)²` for small departures, `k` is the second derivative at pi all the same.
    /// Zero is at pi. Slope and gradient vanish at pi, so a straight centre is no degenerate geometry here.
    ///
    /// # Range
    /// 150 to 180 degrees: down to the strained but isolable cycloalkynes (cyclooctyne has about 158 degrees,
    /// from memory). There the cosine is at most 2.3 % softer than a parabola. The bound is ours; the paper names
    /// none.
    ///
    /// # Errors
    /// [`MechanicsError::ForceConstant`] for a constant out of bounds.
    ///
    /// # Source
    /// `halgren-1996`, equation for angle bending at linear centres.
    ///
    /// ```
    /// use tautring_core::geometry::Vector;
    /// use tautring_core::mechanics::Bend;
    ///
    /// let ccc = Bend::linear(0.4)?;
    /// let straight = ccc.energy_and_gradient([
    ///     Vector::new(0.0, 0.0, 1.5),
    ///     Vector::ZERO,
    ///     Vector::new(0.0, 0.0, -1.25),
    /// ])?;
    /// assert!(straight.energy_kj_per_mol < 1e-12);
    /// # Ok::<(), tautring_core::mechanics::MechanicsError>(())
    /// ```
    pub fn linear(force_constant_mdyn_angstrom_per_rad2: f64) -> Result<Self, MechanicsError> {
        let force_constant = tabulated(force_constant_mdyn_angstrom_per_rad2)?;
        Ok(Self::cosine(
            force_constant.kj_per_mol_rad2(),
            AngleRange::new(LOWEST_RAD, PI),
        ))
    }
}
