//! Generated from `data/` by `cargo run --release --bin tautring-fit-thermal`; not edited by hand.

#![cfg_attr(rustfmt, rustfmt_skip)]

use super::{Telling, ThermalModel, ThermalPrior};

pub(super) const ENTROPY_ROWS: usize = 0;
pub(super) const HEAT_CAPACITY_ROWS: usize = 0;
const PRIOR: ThermalPrior = ThermalPrior { tau_j_per_mol_k: [[0.0; 3]; 13], whole_j_per_mol_k: [0.0; 3], deviation_j_per_mol_k: [1.0; 4], degrees_of_freedom: 3.0 };
pub(super) const ENTROPY: ThermalModel<'static, 1> = ThermalModel { prior: PRIOR, keys: &[], coefficients: &[], whole: [[0.0; 1]; 3], symmetry_j_per_mol_k: 0.0, shape: [[1.0; 1]; 1], telling: Telling { starts: &[], rows: &[], counts: &[], whole: &[], factor: &[] } };
pub(super) const HEAT_CAPACITY: ThermalModel<'static, 5> = ThermalModel { prior: PRIOR, keys: &[], coefficients: &[], whole: [[0.0; 5]; 3], symmetry_j_per_mol_k: 0.0, shape: [[1.0; 5]; 5], telling: Telling { starts: &[], rows: &[], counts: &[], whole: &[], factor: &[] } };
