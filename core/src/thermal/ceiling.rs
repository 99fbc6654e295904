//! The temperature at which monomer and long chains are in equilibrium: ceiling or floor of a polymerisation.
//!
//! For one unit added to a long chain, with the standard enthalpy ΔH° and entropy ΔS° of that step and the monomer at an activity a,
//! `ΔG = ΔH° − T (ΔS° + R ln a)` vanishes at `T = ΔH° / (ΔS° + R ln a)`. Above a ceiling, or below a floor, no long chain lasts.
//!
//! ΔH° and ΔS° are taken as constant between the temperature they are given at and the one found. Gas-phase estimates go with the gas:
//! for a liquid monomer and a condensed polymer the entropies of condensation of both, some 85 to 120 J/(mol K) for the monomer by itself, are
//! needed beside, and nothing here estimates them.
//!
//! # Source
//! `dainton-ivin-1948`, `dainton-ivin-1958`, from memory.

use super::error::ThermalError;
use super::reaction::Interval;
use crate::additivity::thermal::GAS_CONSTANT_J_PER_MOL_K;
use crate::float::{ln, sqrt};

/// What the standard enthalpy and entropy of the step refer to, with the amount of monomer at equilibrium.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum StandardState {
    /// Ideal gases at 1 bar, chains included; the monomer at this partial pressure, bar.
    Gas {
        /// Partial pressure of the monomer, bar.
        pressure_bar: f64,
    },
    /// Solution at 1 mol/L, ideal; the monomer at this concentration, mol/L.
    Solution {
        /// Concentration of the monomer, mol/L.
        concentration_mol_per_l: f64,
    },
    /// Pure liquid monomer and pure polymer; no correction.
    Pure,
}

/// On which side of the temperature chains last.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Equilibrium {
    /// Chains last below it.
    Ceiling(EquilibriumTemperature),
    /// Chains last above it.
    Floor(EquilibriumTemperature),
    /// Chains last at every temperature.
    Always,
    /// Chains last at no temperature.
    Never,
}

/// The temperature of equilibrium.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct EquilibriumTemperature {
    /// The temperature, K.
    pub value_k: f64,
    /// Its standard uncertainty to first order, K; where it is no small part of the value, whether there is such a temperature at all is in doubt.
    pub u_k: f64,
}

/// The ceiling or floor temperature from enthalpy (kJ/mol) and entropy (J/(mol K)) of the addition of one unit.
///
/// `u² = (u(ΔH)/D)² + (T u(ΔS)/D)²` with D = ΔS° + R ln a.
///
/// # Errors
/// [`ThermalError::Amount`], [`ThermalError::NotANumber`].
///
/// ```
/// use tautring_core::thermal::{Equilibrium, Interval, StandardState, equilibrium_temperature};
/// let exact = |value| Interval { value, u: 0.0, expanded: 0.0 };
/// let ceiling = equilibrium_temperature(exact(-35.0), exact(-110.0), StandardState::Pure)?;
/// assert!(matches!(ceiling, Equilibrium::Ceiling(t) if (t.value_k - 318.2).abs() < 0.1));
/// # Ok::<(), tautring_core::thermal::ThermalError>(())
/// ```
pub fn equilibrium_temperature(
    enthalpy_kj_per_mol: Interval,
    entropy_j_per_mol_k: Interval,
    state: StandardState,
) -> Result<Equilibrium, ThermalError> {
    let activity = match state {
        StandardState::Gas { pressure_bar } => pressure_bar,
        StandardState::Solution {
            concentration_mol_per_l,
        } => concentration_mol_per_l,
        StandardState::Pure => 1.0,
    };
    if !(activity > 0.0 && activity.is_finite()) {
        return Err(ThermalError::Amount { value: activity });
    }
    for Interval { value, u, .. } in [enthalpy_kj_per_mol, entropy_j_per_mol_k] {
        if !value.is_finite() {
            return Err(ThermalError::NotANumber { value });
        }
        if !(u >= 0.0 && u.is_finite()) {
            return Err(ThermalError::NotANumber { value: u });
        }
    }
    let enthalpy = 1000.0 * enthalpy_kj_per_mol.value;
    let entropy = entropy_j_per_mol_k.value + GAS_CONSTANT_J_PER_MOL_K * ln(activity);
    if enthalpy <= 0.0 && entropy >= 0.0 {
        return Ok(Equilibrium::Always);
    }
    if enthalpy >= 0.0 && entropy <= 0.0 {
        return Ok(Equilibrium::Never);
    }
    let value_k = enthalpy / entropy;
    let by_enthalpy = 1000.0 * enthalpy_kj_per_mol.u / entropy;
    let by_entropy = value_k * entropy_j_per_mol_k.u / entropy;
    let temperature = EquilibriumTemperature {
        value_k,
        u_k: sqrt(by_enthalpy * by_enthalpy + by_entropy * by_entropy),
    };
    Ok(if enthalpy < 0.0 {
        Equilibrium::Ceiling(temperature)
    } else {
        Equilibrium::Floor(temperature)
    })
}
