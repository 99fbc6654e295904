//! Energies as the terms give them: along an angle, and on the atoms.

use crate::geometry::Vector;

/// Kilojoules in a thermochemical kilocalorie, exact.
pub(super) const KJ_PER_KCAL: f64 = 4.184;

/// Energy of a term at one value of its angle, with derivatives along the angle.
#[derive(Clone, Copy, Debug, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct EnergyAlongAngle {
    /// Energy above the zero of the term, kJ/mol.
    pub energy_kj_per_mol: f64,
    /// First derivative, kJ/(mol·rad); positive where a larger angle costs more.
    pub slope_kj_per_mol_rad: f64,
    /// Second derivative, kJ/(mol·rad²).
    pub curvature_kj_per_mol_rad2: f64,
}

/// Energy of a term on `N` atoms, with its gradient (the opposite of the forces).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct EnergyAndGradient<const N: usize> {
    /// Energy above the zero of the term, kJ/mol.
    pub energy_kj_per_mol: f64,
    /// Derivative with respect to each position, kJ/(mol·Å), in the order of the positions given.
    pub gradient_kj_per_mol_angstrom: [Vector; N],
}

impl<const N: usize> EnergyAndGradient<N> {
    /// Chain rule: the derivative of the energy along a coordinate times the gradient of that coordinate.
    pub(super) fn along(energy_kj_per_mol: f64, derivative: f64, gradient: [Vector; N]) -> Self {
        Self {
            energy_kj_per_mol,
            gradient_kj_per_mol_angstrom: gradient.map(|g| g * derivative),
        }
    }
}
