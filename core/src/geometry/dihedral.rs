//! Dihedral angle of four atoms.

use core::f64::consts::PI;

use super::angle::normal;
use super::distance::bond;
use super::error::GeometryError;
use super::vector::{Vector, check_coordinates};
use crate::float;

/// A dihedral angle and its derivatives.
#[derive(Clone, Copy, Debug, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct Dihedral {
    /// The dihedral angle, radians, above -pi and up to pi.
    pub dihedral_rad: f64,
    /// Its derivative with respect to each position, radians per ångström.
    pub gradient_rad_per_angstrom: [Vector; 4],
}

/// Dihedral angle of four positions about the line from the second to the third, radians, with its gradient.
///
/// Sign after IUPAC: seen along the central bond, with the first atom in front, a clockwise turn from the front
/// bond to the back bond counts positive. Zero is cis (eclipsed, the ends on the same side), pi is trans.
///
/// With `F = a - b`, `G = b - c`, `H = d - c`, `A = F x G`, `B = H x G`:
/// `omega = atan2((B x A) . G / |G|, A . B)`,
/// `domega/da = -(|G|/A^2) A`, `domega/dd = (|G|/B^2) B`, with
/// `S = (F.G)/(A^2 |G|) A - (H.G)/(B^2 |G|) B`: `domega/db = -domega/da + S`, `domega/dc = -domega/dd - S`.
/// No sine of `omega` is divided by, so planar arrangements are as good as any.
///
/// # Errors
/// [`GeometryError::Coordinate`] for a coordinate that is no usable number; [`GeometryError::Coincident`] where
/// neighbours in the chain coincide; [`GeometryError::Collinear`] where an outer bond lies along the central one
/// (sine below a millionth), since there is no dihedral angle then.
///
/// # Source
/// `blondel-karplus-1996`, equations for the derivatives without singularity.
///
/// ```
/// use tautring_core::geometry::{Vector, dihedral};
///
/// // Looking down the z axis from above: the front atom up (+y), the back atom to the right (+x).
/// let quarter = dihedral([
///     Vector::new(0.0, 1.0, 1.0),
///     Vector::new(0.0, 0.0, 1.0),
///     Vector::new(0.0, 0.0, 0.0),
///     Vector::new(1.0, 0.0, 0.0),
/// ])?;
/// assert_eq!(quarter.dihedral_rad, core::f64::consts::FRAC_PI_2);
/// # Ok::<(), tautring_core::geometry::GeometryError>(())
/// ```
pub fn dihedral(positions: [Vector; 4]) -> Result<Dihedral, GeometryError> {
    check_coordinates(&positions)?;
    let [a, b, c, d] = positions;
    let front = bond((0, a), (1, b))?;
    let central = bond((1, b), (2, c))?;
    let back = bond((3, d), (2, c))?;
    let (front_normal, front_area) = normal(front, central, [0, 1, 2])?;
    let (back_normal, back_area) = normal(back, central, [1, 2, 3])?;

    let sine_part = back_normal.cross(front_normal).dot(central.vector) * (1.0 / central.length);
    let cosine_part = front_normal.dot(back_normal);
    let wrapped = float::atan2(sine_part, cosine_part);
    // A sine of -0, or one too small to see, lands on -pi: the same arrangement as pi.
    let dihedral_rad = if wrapped <= -PI { PI } else { wrapped };

    let front_unit = front_normal * (1.0 / (front_area * front_area));
    let back_unit = back_normal * (1.0 / (back_area * back_area));
    let first = -(front_unit * central.length);
    let last = back_unit * central.length;
    let shear = front_unit * (front.vector.dot(central.vector) / central.length)
        - back_unit * (back.vector.dot(central.vector) / central.length);
    Ok(Dihedral {
        dihedral_rad,
        gradient_rad_per_angstrom: [first, shear - first, -(shear + last), last],
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    const B: Vector = Vector::new(0.0, 0.0, 1.0);
    const C: Vector = Vector::ZERO;

    #[test]
    fn trans_is_pi_whichever_zero_the_sine_has() {
        for (x, y) in [(1.0, 0.0), (0.0, 1.0), (-1.0, 0.0), (0.6, -0.8)] {
            let trans = [Vector::new(x, y, 1.5), B, C, Vector::new(-x, -y, -0.5)];
            let found = dihedral(trans).map(|d| d.dihedral_rad);
            assert_eq!(found, Ok(PI));
        }
    }

    #[test]
    fn mirror_image_has_the_opposite_sign() {
        let right = dihedral([
            Vector::new(0.0, 1.0, 1.5),
            B,
            C,
            Vector::new(0.7, 0.7, -0.4),
        ]);
        let left = dihedral([
            Vector::new(0.0, 1.0, 1.5),
            B,
            C,
            Vector::new(-0.7, 0.7, -0.4),
        ]);
        assert_eq!(right.map(|d| d.dihedral_rad), left.map(|d| -d.dihedral_rad));
        assert!(right.is_ok_and(|d| d.dihedral_rad > 0.0));
    }

    #[test]
    fn an_outer_bond_along_the_central_one_is_named() {
        let found = dihedral([
            Vector::new(1.0, 0.0, 1.0),
            B,
            C,
            Vector::new(0.0, 0.0, -2.0),
        ]);
        assert_eq!(
            found,
            Err(GeometryError::Collinear {
                first: 1,
                centre: 2,
                last: 3,
                sine: 0.0
            })
        );
    }
}
