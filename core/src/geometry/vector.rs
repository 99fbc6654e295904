//! Vectors in three dimensions, with a fixed order of operations.

use core::ops::{Add, Mul, Neg, Sub};

use super::error::GeometryError;
use crate::float;

/// Largest magnitude of a coordinate that counts as one, Å.
///
/// A tenth of a millimetre: beyond any molecule, and small enough that no product in this room overflows
/// and that a bond still has nine digits.
pub const LARGEST_COORDINATE_ANGSTROM: f64 = 1e6;

/// A vector in three dimensions: a position (Å), a difference of positions (Å) or a gradient (unit named where
/// it appears).
///
/// Sums run x, y, z, always.
///
/// ```
/// use tautring_core::geometry::Vector;
///
/// let bond = Vector::new(1.0, 2.0, 2.0) - Vector::from([0.0, 0.0, 0.0]);
/// assert_eq!(bond.norm(), 3.0);
/// assert_eq!(bond.cross(bond), Vector::ZERO);
/// ```
#[derive(Clone, Copy, Debug, Default, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct Vector {
    /// Component along x.
    pub x: f64,
    /// Component along y.
    pub y: f64,
    /// Component along z.
    pub z: f64,
}

impl Vector {
    /// The vector of no length.
    pub const ZERO: Self = Self::new(0.0, 0.0, 0.0);

    /// The vector with these components.
    pub const fn new(x: f64, y: f64, z: f64) -> Self {
        Self { x, y, z }
    }

    /// Scalar product: (`x x' + y y'`) + `z z'`.
    pub fn dot(self, other: Self) -> f64 {
        self.x * other.x + self.y * other.y + self.z * other.z
    }

    /// Vector product, right-handed.
    #[must_use]
    pub fn cross(self, other: Self) -> Self {
        Self::new(
            self.y * other.z - self.z * other.y,
            self.z * other.x - self.x * other.z,
            self.x * other.y - self.y * other.x,
        )
    }

    /// Length, in the unit of the components.
    pub fn norm(self) -> f64 {
        float::sqrt(self.dot(self))
    }
}

impl From<[f64; 3]> for Vector {
    fn from([x, y, z]: [f64; 3]) -> Self {
        Self::new(x, y, z)
    }
}

impl From<Vector> for [f64; 3] {
    fn from(vector: Vector) -> Self {
        [vector.x, vector.y, vector.z]
    }
}

impl Add for Vector {
    type Output = Self;

    fn add(self, other: Self) -> Self {
        Self::new(self.x + other.x, self.y + other.y, self.z + other.z)
    }
}

impl Sub for Vector {
    type Output = Self;

    fn sub(self, other: Self) -> Self {
        Self::new(self.x - other.x, self.y - other.y, self.z - other.z)
    }
}

impl Neg for Vector {
    type Output = Self;

    fn neg(self) -> Self {
        Self::new(-self.x, -self.y, -self.z)
    }
}

impl Mul<f64> for Vector {
    type Output = Self;

    fn mul(self, factor: f64) -> Self {
        Self::new(self.x * factor, self.y * factor, self.z * factor)
    }
}

/// Refuses NaN, infinities and coordinates beyond [`LARGEST_COORDINATE_ANGSTROM`].
pub(super) fn check_coordinates(positions: &[Vector]) -> Result<(), GeometryError> {
    for (position, vector) in positions.iter().enumerate() {
        for (axis, value_angstrom) in [('x', vector.x), ('y', vector.y), ('z', vector.z)] {
            // Written so that NaN fails it.
            let usable = float::abs(value_angstrom) <= LARGEST_COORDINATE_ANGSTROM;
            if !usable {
                return Err(GeometryError::Coordinate {
                    position,
                    axis,
                    value_angstrom,
                });
            }
        }
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn vector_product_is_right_handed() {
        let x = Vector::new(1.0, 0.0, 0.0);
        let y = Vector::new(0.0, 1.0, 0.0);
        assert_eq!(x.cross(y), Vector::new(0.0, 0.0, 1.0));
    }

    #[test]
    fn bad_coordinates_are_named() {
        for bad in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY, 2e6, -2e6] {
            let found = check_coordinates(&[Vector::ZERO, Vector::new(0.0, 0.0, bad)]);
            assert!(
                matches!(
                    found,
                    Err(GeometryError::Coordinate {
                        position: 1,
                        axis: 'z',
                        ..
                    })
                ),
                "{bad} gave {found:?}"
            );
        }
    }
}
