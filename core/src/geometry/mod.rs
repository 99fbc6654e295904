//! Distance, angle and dihedral angle of atoms in space, each with its derivatives.
//!
//! Positions are [`Vector`]s in ångström. Every function gives the value and the analytic first derivatives
//! with respect to all coordinates, in the order of its arguments. Where the value or its derivative does not
//! exist (coincident atoms, atoms in one line), the answer is a [`GeometryError`] that names the positions;
//! nothing is clamped and no result is ever NaN.
//!
//! ```
//! use tautring_core::geometry::{Vector, angle};
//!
//! let water = [
//!     Vector::new(0.7572, 0.5865, 0.0),
//!     Vector::new(0.0, 0.0, 0.0),
//!     Vector::new(-0.7572, 0.5865, 0.0),
//! ];
//! let hoh = angle(water)?;
//! assert!((hoh.angle_rad.to_degrees() - 104.5).abs() < 0.1);
//! # Ok::<(), tautring_core::geometry::GeometryError>(())
//! ```

mod angle;
mod dihedral;
mod distance;
mod error;
mod vector;

pub use angle::{Angle, AngleCosine, angle, angle_cosine};
pub use dihedral::{Dihedral, dihedral};
pub use distance::{Distance, SMALLEST_DISTANCE_ANGSTROM, distance};
pub use error::GeometryError;
pub use vector::{LARGEST_COORDINATE_ANGSTROM, Vector};
