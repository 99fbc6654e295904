//! The range of angles that a bend form was made for.

use core::f64::consts::PI;

use super::super::MechanicsError;

/// Radians in a degree.
pub(super) const DEGREE: f64 = PI / 180.0;

/// How far from its reference angle a force-field form goes, both ways.
///
/// The fields that published these forms fit open chains and rings of five and more with one set of
/// references, and give three- and four-membered rings references of their own. The largest departures that they
/// take with open-chain references are the one-carbon bridge of norbornane (closed by 16 to 18 degrees) and the
/// centre of di-tert-butylmethane (opened by 16 to 18 degrees). Both figures are from memory; the papers name no
/// limit in degrees.
pub(super) const FORCE_FIELD_HALF_WIDTH_RAD: f64 = 18.0 * DEGREE;

/// Sharpest angle that an open-chain reference is asked at.
///
/// The bridge of norbornane has 93 to 96 degrees and is the sharpest angle outside small rings at a first-row
/// centre; the angles of oxetane, azetidine and cyclobutane lie below 93 degrees (from memory). Without this, a
/// reference of 107 degrees at oxygen would reach into oxetane.
const SHARPEST_OPEN_CHAIN_RAD: f64 = 93.0 * DEGREE;

/// References from here on are those of first-row centres; the heavier ones (sulfur, phosphorus) lie below and
/// reach 92 degrees without any ring.
const OPEN_CHAIN_REFERENCE_RAD: f64 = 100.0 * DEGREE;

/// A closed range of angles, radians.
///
/// ```
/// use tautring_core::mechanics::{Bend, BendForceConstant};
///
/// let k = BendForceConstant::from_mdyn_angstrom_per_rad2(1.0)?;
/// let range = Bend::harmonic(k, 112.0_f64.to_radians())?.range();
/// assert!(range.contains(100.0_f64.to_radians()));
/// assert!(!range.contains(90.0_f64.to_radians()));
/// assert!(!range.contains(f64::NAN));
/// # Ok::<(), tautring_core::mechanics::MechanicsError>(())
/// ```
#[derive(Clone, Copy, Debug, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct AngleRange {
    lowest_rad: f64,
    highest_rad: f64,
}

impl AngleRange {
    /// The range from one angle to another, both included, radians.
    pub(super) const fn new(lowest_rad: f64, highest_rad: f64) -> Self {
        Self {
            lowest_rad,
            highest_rad,
        }
    }

    /// The range of a form about a reference angle that is checked here: the half-width both ways, no further
    /// down than the sharpest open-chain angle where the reference is an open-chain one, no further up than pi.
    pub(super) fn about(reference_rad: f64, half_width_rad: f64) -> Result<Self, MechanicsError> {
        // Written so that NaN fails it.
        let usable = reference_rad > 0.0 && reference_rad < PI;
        if !usable {
            return Err(MechanicsError::ReferenceAngle {
                angle_rad: reference_rad,
            });
        }
        let floor = if reference_rad >= OPEN_CHAIN_REFERENCE_RAD {
            SHARPEST_OPEN_CHAIN_RAD
        } else {
            0.0
        };
        Ok(Self::new(
            (reference_rad - half_width_rad).max(floor),
            (reference_rad + half_width_rad).min(PI),
        ))
    }

    /// Smallest angle of the range, radians.
    pub const fn lowest_rad(self) -> f64 {
        self.lowest_rad
    }

    /// Largest angle of the range, radians.
    pub const fn highest_rad(self) -> f64 {
        self.highest_rad
    }

    /// Whether an angle (radians) lies in the range; the ends do, NaN does not.
    pub fn contains(self, angle_rad: f64) -> bool {
        angle_rad >= self.lowest_rad && angle_rad <= self.highest_rad
    }

    /// Refuses an angle outside the range.
    pub(super) fn check(self, angle_rad: f64) -> Result<(), MechanicsError> {
        if self.contains(angle_rad) {
            Ok(())
        } else {
            Err(MechanicsError::AngleOutsideRange {
                angle_rad,
                range: self,
            })
        }
    }
}
