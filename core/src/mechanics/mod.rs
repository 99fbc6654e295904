//! Angle bend and torsion: energy along the angle, and energy with gradient on the atoms.
//!
//! [`Bend`] is one term about one centre, in any of the published forms; [`Torsion`] is one three-term Fourier
//! series about one bond. Both give kJ/mol, with slope and curvature along the angle, and from positions (Å) the
//! energy with its **gradient** (the force is its opposite).
//!
//! A bend form is quoted only inside the range it was made for; outside, the answer is
//! [`MechanicsError::AngleOutsideRange`]. In particular no term with an open-chain reference angle answers at the
//! 60 or 90 degrees of three- and four-membered rings.
//!
//! ```
//! use tautring_core::mechanics::{Bend, BendForceConstant};
//!
//! // C-C-C of propane, harmonic, opened by seven degrees: about one kilocalorie per mole.
//! let ccc = Bend::harmonic(
//!     BendForceConstant::from_mdyn_angstrom_per_rad2(1.0)?,
//!     112.0_f64.to_radians(),
//! )?;
//! let opened = ccc.energy(119.0_f64.to_radians())?;
//! assert!((opened.energy_kj_per_mol / 4.184 - 1.07).abs() < 0.005);
//! assert!(ccc.energy(60.0_f64.to_radians()).is_err());
//! # Ok::<(), tautring_core::mechanics::MechanicsError>(())
//! ```

mod bend;
mod energy;
mod error;
mod torsion;

pub use bend::{AngleRange, Bend, BendForceConstant};
pub use energy::{EnergyAlongAngle, EnergyAndGradient};
pub use error::MechanicsError;
pub use torsion::Torsion;
