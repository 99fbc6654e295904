//! The fitted models of entropy and heat capacity.

use super::model::ThermalModel;
use super::tables;

/// Gas constant R, J/(mol K); exact.
///
/// # Source
/// `bipm-2019`.
pub const GAS_CONSTANT_J_PER_MOL_K: f64 = 8.314_462_618_153_24;

/// Temperatures of the heat capacities, K.
pub const TEMPERATURES_K: [f64; 5] = [298.15, 400.0, 500.0, 600.0, 800.0];

/// How many numbers an estimate of either works in.
pub const WORKSPACE: usize = if tables::ENTROPY_ROWS > tables::HEAT_CAPACITY_ROWS {
    tables::ENTROPY_ROWS
} else {
    tables::HEAT_CAPACITY_ROWS
};

/// The standard entropy of the ideal gas at 298.15 K and 1 bar, J/(mol K).
pub static ENTROPY: ThermalModel<'static, 1> = tables::ENTROPY;

/// The heat capacity of the ideal gas at constant pressure at [`TEMPERATURES_K`], J/(mol K).
pub static HEAT_CAPACITY: ThermalModel<'static, { TEMPERATURES_K.len() }> = tables::HEAT_CAPACITY;
