//! What can be wrong with a bend or torsion term, or with asking it.

use core::fmt;

use super::bend::{AngleRange, LARGEST_COEFFICIENT};
use super::torsion::LARGEST_BARRIER_KJ_PER_MOL;
use crate::geometry::GeometryError;

/// Why a term cannot be built or gives no energy.
#[derive(Clone, Copy, Debug, PartialEq)]
#[non_exhaustive]
pub enum MechanicsError {
    /// A bend is asked at an angle that its form was not made for (or at NaN).
    AngleOutsideRange {
        /// The angle asked for, radians.
        angle_rad: f64,
        /// The range of the term.
        range: AngleRange,
    },
    /// A reference angle that is not between 0 and pi.
    ReferenceAngle {
        /// The angle given, radians.
        angle_rad: f64,
    },
    /// A bend force constant that is not a positive number of usable size.
    ForceConstant {
        /// The constant as it would enter the energy, kJ/(mol·rad²).
        value_kj_per_mol_rad2: f64,
    },
    /// A higher bend coefficient that is no number of usable size.
    BendCoefficient {
        /// The power of the angle difference that it multiplies.
        power: u8,
        /// The coefficient, kJ/mol per radian to that power.
        value: f64,
    },
    /// Bend coefficients that make the term concave inside its range.
    ConcaveBend {
        /// Where, radians.
        angle_rad: f64,
        /// The second derivative there, kJ/(mol·rad²).
        curvature_kj_per_mol_rad2: f64,
    },
    /// A torsion barrier that is no number of usable size.
    TorsionBarrier {
        /// The fold of the barrier: 1, 2 or 3.
        fold: u8,
        /// The barrier, kJ/mol.
        value_kj_per_mol: f64,
    },
    /// A torsion is asked at a dihedral angle that is NaN or infinite.
    DihedralNotFinite {
        /// The angle asked for, radians.
        dihedral_rad: f64,
    },
    /// The positions have no angle, or none with a derivative.
    Geometry(GeometryError),
}

impl From<GeometryError> for MechanicsError {
    fn from(error: GeometryError) -> Self {
        Self::Geometry(error)
    }
}

impl fmt::Display for MechanicsError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match *self {
            Self::AngleOutsideRange { angle_rad, range } => write!(
                f,
                "the bend term was made for {:.1} to {:.1} degrees and says nothing at {:.1}; small rings and strongly bent centres need terms or references of their own",
                range.lowest_rad().to_degrees(),
                range.highest_rad().to_degrees(),
                angle_rad.to_degrees()
            ),
            Self::ReferenceAngle { angle_rad } => write!(
                f,
                "the reference angle is {angle_rad} rad; give one between 0 and pi (radians, not degrees)"
            ),
            Self::ForceConstant {
                value_kj_per_mol_rad2,
            } => write!(
                f,
                "the bend force constant is {value_kj_per_mol_rad2} kJ/(mol rad^2); give one above 0 and up to {LARGEST_COEFFICIENT:e} (1 mdyn Å/rad^2 is 602.2)"
            ),
            Self::BendCoefficient { power, value } => write!(
                f,
                "the bend coefficient of power {power} is {value} kJ/(mol rad^{power}); give a number of magnitude up to {LARGEST_COEFFICIENT:e}"
            ),
            Self::ConcaveBend {
                angle_rad,
                curvature_kj_per_mol_rad2,
            } => write!(
                f,
                "the bend coefficients give a curvature of {curvature_kj_per_mol_rad2:.1} kJ/(mol rad^2) at {:.1} degrees, inside the range; check signs and units of the cubic and quartic coefficients",
                angle_rad.to_degrees()
            ),
            Self::TorsionBarrier {
                fold,
                value_kj_per_mol,
            } => write!(
                f,
                "the torsion barrier V{fold} is {value_kj_per_mol} kJ/mol; give a number of magnitude up to {LARGEST_BARRIER_KJ_PER_MOL:e}"
            ),
            Self::DihedralNotFinite { dihedral_rad } => write!(
                f,
                "the dihedral angle is {dihedral_rad}; give a finite number of radians"
            ),
            Self::Geometry(error) => error.fmt(f),
        }
    }
}

impl core::error::Error for MechanicsError {}
