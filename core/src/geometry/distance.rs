//! Distance of two atoms.

use super::error::GeometryError;
use super::vector::{Vector, check_coordinates};

/// Smallest distance at which two positions count as two, Å.
///
/// Coordinate files print four decimals, so nothing closer than this was ever meant; and with bonds of this
/// length every quotient in this room is still far from underflow.
pub const SMALLEST_DISTANCE_ANGSTROM: f64 = 1e-6;

/// A distance and its derivatives.
#[derive(Clone, Copy, Debug, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct Distance {
    /// The distance, Å.
    pub distance_angstrom: f64,
    /// Its derivative with respect to each position, no unit.
    pub gradient: [Vector; 2],
}

/// Distance between two positions, Å, with its gradient.
///
/// `r = |a - b|`, `dr/da = (a - b)/r = -dr/db`.
///
/// # Errors
/// [`GeometryError::Coordinate`] for a coordinate that is no usable number; [`GeometryError::Coincident`]
/// where the direction of the gradient is lost.
///
/// ```
/// use tautring_core::geometry::{Vector, distance};
///
/// let bond = distance([Vector::new(0.0, 0.0, 1.5), Vector::ZERO])?;
/// assert_eq!(bond.distance_angstrom, 1.5);
/// assert_eq!(bond.gradient[0], Vector::new(0.0, 0.0, 1.0));
/// # Ok::<(), tautring_core::geometry::GeometryError>(())
/// ```
pub fn distance(positions: [Vector; 2]) -> Result<Distance, GeometryError> {
    check_coordinates(&positions)?;
    let [a, b] = positions;
    let bond = bond((0, a), (1, b))?;
    let direction = bond.vector * (1.0 / bond.length);
    Ok(Distance {
        distance_angstrom: bond.length,
        gradient: [direction, -direction],
    })
}

/// The vector between two positions and its length, Å.
#[derive(Clone, Copy)]
pub(super) struct Bond {
    pub(super) vector: Vector,
    pub(super) length: f64,
}

/// The vector from the position `to` to the position `from`, each with its place in the argument list.
pub(super) fn bond(from: (usize, Vector), to: (usize, Vector)) -> Result<Bond, GeometryError> {
    let vector = from.1 - to.1;
    let length = vector.norm();
    if length < SMALLEST_DISTANCE_ANGSTROM {
        return Err(GeometryError::Coincident {
            first: from.0,
            second: to.0,
            distance_angstrom: length,
        });
    }
    Ok(Bond { vector, length })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn coincident_positions_are_named() {
        let here = Vector::new(0.1, -0.2, 0.3);
        assert_eq!(
            distance([here, here]),
            Err(GeometryError::Coincident {
                first: 0,
                second: 1,
                distance_angstrom: 0.0
            })
        );
    }
}
