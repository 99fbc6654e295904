//! What can be wrong with the places of atoms.

use core::fmt;

use super::distance::SMALLEST_DISTANCE_ANGSTROM;
use super::vector::LARGEST_COORDINATE_ANGSTROM;

/// Why a distance, an angle or a dihedral angle has no value or no derivative.
///
/// `position` counts the arguments of the function that was called, from 0; the messages count from 1.
#[derive(Clone, Copy, Debug, PartialEq)]
#[non_exhaustive]
pub enum GeometryError {
    /// A coordinate that is NaN, infinite or farther out than [`LARGEST_COORDINATE_ANGSTROM`].
    Coordinate {
        /// Which of the positions.
        position: usize,
        /// Which axis, `'x'`, `'y'` or `'z'`.
        axis: char,
        /// The coordinate, Å.
        value_angstrom: f64,
    },
    /// Two positions closer than [`SMALLEST_DISTANCE_ANGSTROM`].
    Coincident {
        /// The first position.
        first: usize,
        /// The second position.
        second: usize,
        /// Their distance, Å.
        distance_angstrom: f64,
    },
    /// Three positions in one line, where an angle has no derivative and a dihedral angle no value.
    Collinear {
        /// One end.
        first: usize,
        /// The middle.
        centre: usize,
        /// The other end.
        last: usize,
        /// Sine of the angle at the middle.
        sine: f64,
    },
}

impl fmt::Display for GeometryError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match *self {
            Self::Coordinate {
                position,
                axis,
                value_angstrom,
            } => write!(
                f,
                "coordinate {axis} of position {} is {value_angstrom} Å; give a finite number of at most {LARGEST_COORDINATE_ANGSTROM:e} Å",
                position + 1
            ),
            Self::Coincident {
                first,
                second,
                distance_angstrom,
            } => write!(
                f,
                "positions {} and {} are {distance_angstrom:e} Å apart; move them at least {SMALLEST_DISTANCE_ANGSTROM:e} Å apart",
                first + 1,
                second + 1
            ),
            Self::Collinear {
                first,
                centre,
                last,
                sine,
            } => write!(
                f,
                "positions {}, {} and {} lie in one line (sine of the angle {sine:e}); bend them, or use a term made for linear centres",
                first + 1,
                centre + 1,
                last + 1
            ),
        }
    }
}

impl core::error::Error for GeometryError {}

#[cfg(test)]
mod tests {
    extern crate std;

    use std::string::ToString;

    use super::*;

    #[test]
    fn messages_count_from_one_and_say_how_to_mend() {
        let error = GeometryError::Coincident {
            first: 0,
            second: 2,
            distance_angstrom: 0.0,
        };
        assert_eq!(
            error.to_string(),
            "positions 1 and 3 are 0e0 Å apart; move them at least 1e-6 Å apart"
        );
        let error = GeometryError::Coordinate {
            position: 1,
            axis: 'y',
            value_angstrom: f64::NAN,
        };
        assert!(
            error
                .to_string()
                .starts_with("coordinate y of position 2 is NaN Å")
        );
    }
}
