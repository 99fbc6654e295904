//! Entropy and heat capacity of the ideal gas, as a review states them.

use serde::Serialize;
use tautring_core::additivity::thermal::{
    ENTROPY, HEAT_CAPACITY, TEMPERATURES_K, ThermalEstimate, ThermalFeatures, WORKSPACE,
};

use crate::structure::HostMolecule;

/// Entropy and heat capacity of the ideal gas; always estimates, whether or not the molecule is in the tables behind them.
#[derive(Clone, Debug, Serialize)]
pub struct GasThermal {
    /// Standard entropy at 298.15 K.
    pub entropy: ThermalValue,
    /// Heat capacity at several temperatures, ascending.
    pub heat_capacity: Vec<ThermalValue>,
    /// Symmetry number, external times internal.
    pub symmetry_number: u64,
}

/// A value at a temperature.
#[derive(Clone, Copy, Debug, Serialize)]
pub struct ThermalValue {
    /// The temperature, K.
    pub temperature_k: f64,
    /// The value, J/(mol K).
    #[serde(rename = "value")]
    pub value_j_per_mol_k: f64,
    /// Standard uncertainty, J/(mol K).
    #[serde(rename = "u")]
    pub u_j_per_mol_k: f64,
    /// Expanded uncertainty (95 %) for the true value, J/(mol K).
    #[serde(rename = "expanded")]
    pub expanded_j_per_mol_k: f64,
}

/// Entropy and heat capacity of a molecule; `None` where it is too symmetric to count or holds no carbon.
pub(super) fn thermal(molecule: &HostMolecule) -> Option<GasThermal> {
    let features: Box<ThermalFeatures<4096>> = Box::new(ThermalFeatures::of(molecule).ok()?);
    let mut workspace = vec![0.0; WORKSPACE];
    let entropy = ENTROPY.estimate(&features, &mut workspace).ok()?;
    let heat_capacity = HEAT_CAPACITY.estimate(&features, &mut workspace).ok()?;
    Some(GasThermal {
        entropy: value_at(&entropy, 0, TEMPERATURES_K[0]),
        heat_capacity: TEMPERATURES_K
            .into_iter()
            .enumerate()
            .map(|(index, t)| value_at(&heat_capacity, index, t))
            .collect(),
        symmetry_number: molecule.symmetry_number().ok()?,
    })
}

fn value_at<const N: usize>(
    estimate: &ThermalEstimate<N>,
    index: usize,
    temperature_k: f64,
) -> ThermalValue {
    let mut weights = [0.0; N];
    weights[index] = 1.0;
    ThermalValue {
        temperature_k,
        value_j_per_mol_k: estimate.values_j_per_mol_k[index],
        u_j_per_mol_k: estimate.u_j_per_mol_k(&weights),
        expanded_j_per_mol_k: estimate.expanded_j_per_mol_k(&weights),
    }
}
