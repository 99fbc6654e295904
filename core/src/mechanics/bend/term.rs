//! One angle bend: its curve and the range it was made for.

use super::range::AngleRange;
use crate::float;
use crate::geometry::{Vector, angle, angle_cosine};
use crate::mechanics::{EnergyAlongAngle, EnergyAndGradient, MechanicsError};

/// An angle-bend term: a published form with its constants, valid on its range of angles.
///
/// It knows an angle, not a ring: whoever knows that an angle belongs to a three- or four-membered ring does
/// not ask it, unless the reference angle is one published for that ring.
///
/// ```
/// use tautring_core::geometry::Vector;
/// use tautring_core::mechanics::Bend;
///
/// let hoh = Bend::cubic(0.658, 103.978_f64.to_radians())?;
/// let on_atoms = hoh.energy_and_gradient([
///     Vector::new(0.76, 0.59, 0.0),
///     Vector::ZERO,
///     Vector::new(-0.76, 0.59, 0.0),
/// ])?;
/// assert!(on_atoms.energy_kj_per_mol >= 0.0);
/// # Ok::<(), tautring_core::mechanics::MechanicsError>(())
/// ```
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bend {
    curve: Curve,
    range: AngleRange,
}

/// The energy as a function of the angle.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Curve {
    /// `Δ² (a2 + a3 Δ + a4 Δ² + a5 Δ³ + a6 Δ⁴)` with `Δ = theta - reference`, kJ/mol and radians.
    Series {
        reference_rad: f64,
        coefficients: [f64; 5],
    },
    /// `k (1 + cos theta)`.
    Cosine { force_constant: f64 },
}

impl Bend {
    /// A power series from the second to the sixth power of the departure from a reference angle.
    pub(super) const fn series(
        reference_rad: f64,
        coefficients: [f64; 5],
        range: AngleRange,
    ) -> Self {
        Self {
            curve: Curve::Series {
                reference_rad,
                coefficients,
            },
            range,
        }
    }

    /// One plus cosine, times a force constant in kJ/mol.
    pub(super) const fn cosine(force_constant: f64, range: AngleRange) -> Self {
        Self {
            curve: Curve::Cosine { force_constant },
            range,
        }
    }

    /// The angles at which the term may be asked, radians.
    pub const fn range(&self) -> AngleRange {
        self.range
    }

    /// Energy at an angle (radians), kJ/mol, with first and second derivative along the angle.
    ///
    /// # Errors
    /// [`MechanicsError::AngleOutsideRange`] outside [`Self::range`] and for NaN.
    pub fn energy(&self, angle_rad: f64) -> Result<EnergyAlongAngle, MechanicsError> {
        self.range.check(angle_rad)?;
        Ok(self.curve.at(angle_rad))
    }

    /// Energy, kJ/mol, and its gradient, kJ/(mol·Å), for three positions (Å) with the centre second.
    ///
    /// Chain rule with the gradient of the angle, or, in the linear form, of its cosine, so that a straight
    /// centre has its (zero) gradient instead of none.
    ///
    /// # Errors
    /// [`MechanicsError::Geometry`] for positions without an angle or without its derivative;
    /// [`MechanicsError::AngleOutsideRange`] outside [`Self::range`].
    pub fn energy_and_gradient(
        &self,
        positions: [Vector; 3],
    ) -> Result<EnergyAndGradient<3>, MechanicsError> {
        match self.curve {
            Curve::Series { .. } => {
                let angle = angle(positions)?;
                let along = self.energy(angle.angle_rad)?;
                Ok(EnergyAndGradient::along(
                    along.energy_kj_per_mol,
                    along.slope_kj_per_mol_rad,
                    angle.gradient_rad_per_angstrom,
                ))
            }
            Curve::Cosine { force_constant } => {
                let angle = angle_cosine(positions)?;
                let along = self.energy(angle.angle_rad)?;
                Ok(EnergyAndGradient::along(
                    along.energy_kj_per_mol,
                    force_constant,
                    angle.cosine_gradient_per_angstrom,
                ))
            }
        }
    }
}

impl Curve {
    fn at(self, angle_rad: f64) -> EnergyAlongAngle {
        match self {
            Self::Series {
                reference_rad,
                coefficients: [a2, a3, a4, a5, a6],
            } => {
                let d = angle_rad - reference_rad;
                EnergyAlongAngle {
                    energy_kj_per_mol: d * d * (a2 + d * (a3 + d * (a4 + d * (a5 + d * a6)))),
                    slope_kj_per_mol_rad: d
                        * (2.0 * a2
                            + d * (3.0 * a3 + d * (4.0 * a4 + d * (5.0 * a5 + d * (6.0 * a6))))),
                    curvature_kj_per_mol_rad2: 2.0 * a2
                        + d * (6.0 * a3 + d * (12.0 * a4 + d * (20.0 * a5 + d * (30.0 * a6)))),
                }
            }
            Self::Cosine { force_constant } => {
                // 1 + cos = 2 cos² of the half angle: no cancellation near pi, never below zero.
                let (sine, cosine) = float::sin_cos(0.5 * angle_rad);
                EnergyAlongAngle {
                    energy_kj_per_mol: 2.0 * force_constant * (cosine * cosine),
                    slope_kj_per_mol_rad: -2.0 * force_constant * (sine * cosine),
                    curvature_kj_per_mol_rad2: force_constant * (sine * sine - cosine * cosine),
                }
            }
        }
    }
}
