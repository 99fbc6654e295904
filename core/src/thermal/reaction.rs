//! Enthalpy, entropy and Gibbs energy of a reaction of ideal gases at a temperature.

use super::error::ThermalError;
use super::interpolant::{Interpolant, REFERENCE_K};
use crate::additivity::Estimate;
use crate::additivity::thermal::{TEMPERATURES_K, ThermalEstimate};
use crate::float::sqrt;

/// What is known of a reaction: differences, products minus reactants, each from one set of features so that what is shared cancels.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ReactionGas {
    /// Enthalpy of reaction at 298.15 K, kJ/mol.
    pub enthalpy: Estimate,
    /// Entropy of reaction at 298.15 K, J/(mol K).
    pub entropy: ThermalEstimate<1>,
    /// Change of the heat capacity, J/(mol K).
    pub heat_capacity: ThermalEstimate<{ TEMPERATURES_K.len() }>,
}

/// A value with its standard uncertainty u and its expanded uncertainty U (95 %), in the unit that the name of the field says.
#[derive(Clone, Copy, Debug, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct Interval {
    /// The value.
    pub value: f64,
    /// Standard uncertainty.
    pub u: f64,
    /// Expanded uncertainty, 95 %.
    pub expanded: f64,
}

/// A reaction of ideal gases at 1 bar and a temperature.
#[derive(Clone, Copy, Debug, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct AtTemperature {
    /// The temperature, K.
    pub temperature_k: f64,
    /// Standard enthalpy of reaction, kJ/mol.
    pub enthalpy_kj_per_mol: Interval,
    /// Standard entropy of reaction, J/(mol K).
    pub entropy_j_per_mol_k: Interval,
    /// Standard Gibbs energy of reaction, kJ/mol.
    pub gibbs_energy_kj_per_mol: Interval,
}

impl ReactionGas {
    /// The reaction at a temperature.
    ///
    /// `ΔH(T) = ΔH + ∫ΔCp dT`, `ΔS(T) = ΔS + ∫ΔCp/T dT`, `ΔG(T) = ΔH(T) − T ΔS(T)`, the integrals from 298.15 K. Enthalpy, entropy and heat
    /// capacity are taken as independent; in the Gibbs energy the two integrals nearly cancel, and so do their uncertainties.
    ///
    /// # Errors
    /// [`ThermalError::Temperature`] as for [`Interpolant::at`].
    pub fn at(&self, temperature_k: f64) -> Result<AtTemperature, ThermalError> {
        let weights = Interpolant::at(temperature_k)?;
        let heating = self.heat_capacity.weighted_sum(&weights.enthalpy_k);
        let mut gibbs_weights = weights.enthalpy_k;
        let mut entropy_weights = [0.0; TEMPERATURES_K.len()];
        for ((w, own), s) in gibbs_weights
            .iter_mut()
            .zip(&mut entropy_weights)
            .zip(weights.entropy)
        {
            *w -= temperature_k * s;
            *own = REFERENCE_K * s;
        }
        let gibbs = self.heat_capacity.weighted_sum(&gibbs_weights);
        let turmoil = self.entropy.weighted_sum(&[-temperature_k]);
        // In kJ/mol at 298.15 K, then back: one kind of estimate serves both.
        let own = self.entropy.weighted_sum(&[REFERENCE_K]);
        let warmed = self.heat_capacity.weighted_sum(&entropy_weights);
        let per_kelvin = 1000.0 / REFERENCE_K;
        let entropy = combined(&[own, warmed]);
        Ok(AtTemperature {
            temperature_k,
            enthalpy_kj_per_mol: combined(&[self.enthalpy, heating]),
            entropy_j_per_mol_k: Interval {
                value: per_kelvin * entropy.value,
                u: per_kelvin * entropy.u,
                expanded: per_kelvin * entropy.expanded,
            },
            gibbs_energy_kj_per_mol: combined(&[self.enthalpy, turmoil, gibbs]),
        })
    }
}

/// The sum of independent estimates.
fn combined(parts: &[Estimate]) -> Interval {
    let (mut value, mut u, mut expanded) = (0.0, 0.0, 0.0);
    for part in parts {
        value += part.value_kj_per_mol;
        u += part.u_kj_per_mol() * part.u_kj_per_mol();
        expanded += part.expanded_kj_per_mol() * part.expanded_kj_per_mol();
    }
    Interval {
        value,
        u: sqrt(u),
        expanded: sqrt(expanded),
    }
}
