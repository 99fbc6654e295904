//! Plane angle.

use core::f64::consts::PI;
use core::ops::{Add, Neg, Sub};

/// A plane angle; nothing is wrapped.
///
/// ```
/// use tautring_core::quantities::Angle;
/// let right = Angle::from_degrees(90.0);
/// assert!((right.radians() - core::f64::consts::FRAC_PI_2).abs() < 1e-15);
/// assert!((Angle::from_radians(0.5).degrees() - 28.647_889_756_541_16).abs() < 1e-13);
/// ```
#[derive(Clone, Copy, Debug, Default, PartialEq, PartialOrd)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct Angle {
    radians: f64,
}

impl Angle {
    /// From radians.
    pub const fn from_radians(radians: f64) -> Self {
        Self { radians }
    }

    /// From degrees.
    pub const fn from_degrees(degrees: f64) -> Self {
        Self::from_radians(degrees * (PI / 180.0))
    }

    /// In radians.
    pub const fn radians(self) -> f64 {
        self.radians
    }

    /// In degrees.
    pub const fn degrees(self) -> f64 {
        self.radians * (180.0 / PI)
    }
}

impl Add for Angle {
    type Output = Self;

    fn add(self, other: Self) -> Self {
        Self::from_radians(self.radians + other.radians)
    }
}

impl Sub for Angle {
    type Output = Self;

    fn sub(self, other: Self) -> Self {
        Self::from_radians(self.radians - other.radians)
    }
}

impl Neg for Angle {
    type Output = Self;

    fn neg(self) -> Self {
        Self::from_radians(-self.radians)
    }
}
