//! Quartic angle bend.

use super::force_constant::check_coefficient;
use super::range::{AngleRange, FORCE_FIELD_HALF_WIDTH_RAD};
use super::{Bend, BendForceConstant};
use crate::mechanics::MechanicsError;

impl Bend {
    /// Quartic angle bend about a reference angle (radians), kJ/mol, from coefficients `[K2, K3, K4]` in kJ/mol
    /// per rad², rad³, rad⁴.
    ///
    /// `E = K2 Δ² + K3 Δ³ + K4 Δ⁴` with `Δ = theta - theta0`. There is **no ½**: `K2` is half the second
    /// derivative. Zero is at the reference angle.
    ///
    /// # Range
    /// 18 degrees both ways, as the other force-field forms; references of 100 degrees and more are not asked
    /// below 93 degrees. The published alkane set was fitted to cyclopropane, too, but together with its
    /// cross terms, and the coefficients here are the caller's.
    ///
    /// # Errors
    /// [`MechanicsError::ReferenceAngle`], [`MechanicsError::ForceConstant`] (for `2 K2`) and
    /// [`MechanicsError::BendCoefficient`] for constants out of bounds; [`MechanicsError::ConcaveBend`] where
    /// the second derivative is not positive on the whole range.
    ///
    /// # Source
    /// `maple-1994`, the diagonal angle term.
    ///
    /// ```
    /// use tautring_core::mechanics::{Bend, MechanicsError};
    ///
    /// let reference = 110.0_f64.to_radians();
    /// let term = Bend::quartic([170.0, -40.0, 20.0], reference)?;
    /// assert_eq!(term.energy(reference)?.curvature_kj_per_mol_rad2, 340.0);
    /// assert!(matches!(
    ///     Bend::quartic([170.0, -400.0, 0.0], reference),
    ///     Err(MechanicsError::ConcaveBend { .. })
    /// ));
    /// # Ok::<(), tautring_core::mechanics::MechanicsError>(())
    /// ```
    pub fn quartic(coefficients: [f64; 3], reference_rad: f64) -> Result<Self, MechanicsError> {
        let [quadratic, cubic, quartic] = coefficients;
        let range = AngleRange::about(reference_rad, FORCE_FIELD_HALF_WIDTH_RAD)?;
        BendForceConstant::from_kj_per_mol_rad2(2.0 * quadratic)?;
        check_coefficient(3, cubic)?;
        check_coefficient(4, quartic)?;
        let term = Self::series(reference_rad, [quadratic, cubic, quartic, 0.0, 0.0], range);

        // The second derivative is a parabola in Δ: its least value is at an end or at the vertex.
        let vertex_rad = if quartic > 0.0 {
            reference_rad - cubic / (4.0 * quartic)
        } else {
            reference_rad
        };
        let suspects = [range.lowest_rad(), vertex_rad, range.highest_rad()];
        for angle_rad in suspects.into_iter().filter(|&a| range.contains(a)) {
            let curvature_kj_per_mol_rad2 = term.energy(angle_rad)?.curvature_kj_per_mol_rad2;
            if curvature_kj_per_mol_rad2 <= 0.0 {
                return Err(MechanicsError::ConcaveBend {
                    angle_rad,
                    curvature_kj_per_mol_rad2,
                });
            }
        }
        Ok(term)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_dip_of_the_curvature_between_the_ends_is_seen() {
        // 2 K2 + 6 K3 Δ + 12 K4 Δ² with roots at +5 and +7 degrees, positive at both ends of the range.
        let (low, high) = (5.0_f64.to_radians(), 7.0_f64.to_radians());
        let quartic = 1000.0;
        let coefficients = [
            6.0 * quartic * low * high,
            -2.0 * quartic * (low + high),
            quartic,
        ];
        let found = Bend::quartic(coefficients, 110.0_f64.to_radians());
        assert!(
            matches!(found, Err(MechanicsError::ConcaveBend { angle_rad, .. })
                if (angle_rad.to_degrees() - 116.0).abs() < 1e-9),
            "{found:?}"
        );
    }

    #[test]
    fn bad_coefficients_are_named() {
        let reference = 110.0_f64.to_radians();
        assert!(matches!(
            Bend::quartic([100.0, 0.0, f64::NAN], reference),
            Err(MechanicsError::BendCoefficient { power: 4, .. })
        ));
        assert!(matches!(
            Bend::quartic([f64::NAN, 0.0, 0.0], reference),
            Err(MechanicsError::ForceConstant { .. })
        ));
        assert!(matches!(
            Bend::quartic([100.0, 0.0, 0.0], 110.0),
            Err(MechanicsError::ReferenceAngle { .. })
        ));
    }
}
