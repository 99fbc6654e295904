//! Angle at an atom between two others.

use super::distance::{Bond, bond};
use super::error::GeometryError;
use super::vector::{Vector, check_coordinates};
use crate::float;

/// Smallest sine at which three positions do not count as lying in one line.
///
/// Rounding of the coordinates (1e-16 of a bond) turns the normal of the plane by 1e-16 divided by the sine:
/// at this sine ten digits of its direction are left, and every digit of a derivative is one of the normal.
const SMALLEST_SINE: f64 = 1e-6;

/// An angle at a centre and its derivatives.
#[derive(Clone, Copy, Debug, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct Angle {
    /// The angle, radians, between 0 and pi.
    pub angle_rad: f64,
    /// Its derivative with respect to each position, radians per ångström.
    pub gradient_rad_per_angstrom: [Vector; 3],
}

/// The cosine of an angle at a centre and its derivatives.
#[derive(Clone, Copy, Debug, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct AngleCosine {
    /// The angle, radians, from 0 to pi, both included.
    pub angle_rad: f64,
    /// Derivative of its cosine with respect to each position, 1/Å.
    pub cosine_gradient_per_angstrom: [Vector; 3],
}

/// Angle at the second of three positions, radians, with its gradient.
///
/// With `u = a - b`, `v = c - b`, `w = u x v`: `theta = atan2(|w|, u . v)`,
/// `dtheta/da = (u x w)/(|u|^2 |w|)`, `dtheta/dc = (w x v)/(|v|^2 |w|)`, `dtheta/db = -(dtheta/da + dtheta/dc)`.
///
/// # Errors
/// [`GeometryError::Coordinate`] for a coordinate that is no usable number; [`GeometryError::Coincident`] where
/// an end lies on the centre; [`GeometryError::Collinear`] where the angle is within a millionth of a radian of
/// 0 or pi, since the derivative has no direction there (use [`angle_cosine`] at linear centres).
///
/// # Source
/// `wilson-decius-cross-1955`, chapter 4 (the s vectors of valence-angle bending).
///
/// ```
/// use tautring_core::geometry::{Vector, angle};
///
/// let corner = angle([
///     Vector::new(1.0, 0.0, 0.0),
///     Vector::ZERO,
///     Vector::new(0.0, 2.0, 0.0),
/// ])?;
/// assert_eq!(corner.angle_rad, core::f64::consts::FRAC_PI_2);
/// // The longer arm moves the angle half as much per ångström.
/// assert_eq!(corner.gradient_rad_per_angstrom[2], Vector::new(-0.5, 0.0, 0.0));
/// # Ok::<(), tautring_core::geometry::GeometryError>(())
/// ```
pub fn angle(positions: [Vector; 3]) -> Result<Angle, GeometryError> {
    let [u, v] = arms(positions)?;
    let (normal, area) = normal(u, v, [0, 1, 2])?;
    let first = u.vector.cross(normal) * (1.0 / (u.length * u.length * area));
    let last = normal.cross(v.vector) * (1.0 / (v.length * v.length * area));
    Ok(Angle {
        angle_rad: float::atan2(area, u.vector.dot(v.vector)),
        gradient_rad_per_angstrom: [first, -(first + last), last],
    })
}

/// Angle at the second of three positions, radians, with the gradient of its **cosine**, 1/Å.
///
/// The gradient of the cosine exists where the angle's does not: at 0 and pi it is zero. With `u`, `v` as in
/// [`angle`]: `dcos/da = (v/|v| - cos u/|u|)/|u|`, likewise for `c`, and `b` takes the opposite of their sum.
///
/// # Errors
/// [`GeometryError::Coordinate`] for a coordinate that is no usable number; [`GeometryError::Coincident`] where
/// an end lies on the centre.
///
/// ```
/// use tautring_core::geometry::{Vector, angle_cosine};
///
/// let line = angle_cosine([
///     Vector::new(1.2, 0.0, 0.0),
///     Vector::ZERO,
///     Vector::new(-1.4, 0.0, 0.0),
/// ])?;
/// assert_eq!(line.angle_rad, core::f64::consts::PI);
/// assert_eq!(line.cosine_gradient_per_angstrom[0], Vector::ZERO);
/// # Ok::<(), tautring_core::geometry::GeometryError>(())
/// ```
pub fn angle_cosine(positions: [Vector; 3]) -> Result<AngleCosine, GeometryError> {
    let [u, v] = arms(positions)?;
    let projection = u.vector.dot(v.vector);
    let cosine = projection / (u.length * v.length);
    let along_u = u.vector * (1.0 / u.length);
    let along_v = v.vector * (1.0 / v.length);
    let first = (along_v - along_u * cosine) * (1.0 / u.length);
    let last = (along_u - along_v * cosine) * (1.0 / v.length);
    Ok(AngleCosine {
        angle_rad: float::atan2(u.vector.cross(v.vector).norm(), projection),
        cosine_gradient_per_angstrom: [first, -(first + last), last],
    })
}

/// The two arms of an angle, from its centre outwards.
fn arms(positions: [Vector; 3]) -> Result<[Bond; 2], GeometryError> {
    check_coordinates(&positions)?;
    let [a, b, c] = positions;
    Ok([bond((0, a), (1, b))?, bond((2, c), (1, b))?])
}

/// The vector product of two arms and its length, Å²; `places` are the positions that an error names.
pub(super) fn normal(u: Bond, v: Bond, places: [usize; 3]) -> Result<(Vector, f64), GeometryError> {
    let normal = u.vector.cross(v.vector);
    let area = normal.norm();
    let sine = area / (u.length * v.length);
    if sine < SMALLEST_SINE {
        let [first, centre, last] = places;
        return Err(GeometryError::Collinear {
            first,
            centre,
            last,
            sine,
        });
    }
    Ok((normal, area))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_line_has_an_angle_but_no_derivative_of_it() {
        let line = [
            Vector::new(0.1, 0.2, 0.3),
            Vector::new(0.2, 0.4, 0.6),
            Vector::new(0.3, 0.6, 0.9),
        ];
        assert!(matches!(
            angle(line),
            Err(GeometryError::Collinear {
                first: 0,
                centre: 1,
                last: 2,
                ..
            })
        ));
        assert!(angle_cosine(line).is_ok());
    }

    #[test]
    fn an_end_on_the_centre_is_named() {
        let here = Vector::new(1.0, 1.0, 1.0);
        assert_eq!(
            angle([Vector::ZERO, here, here]),
            Err(GeometryError::Coincident {
                first: 2,
                second: 1,
                distance_angstrom: 0.0
            })
        );
    }
}
