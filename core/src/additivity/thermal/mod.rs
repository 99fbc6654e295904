//! Entropy and heat capacity of the ideal gas by the same counted features as the enthalpies, coarser and with a compact covariance only.
//!
//! `y_T = Σ over levels l of X_l β_l,T + w γ_T + δ_T`, with `β_l ~ N(0, τ_l² C)`: the temperatures of a heat capacity share one covariance up
//! to the matrix C of their covariances with each other, so one factor serves them all, and any weighted sum over temperatures has its
//! uncertainty. The counts w of the whole molecule are one, the logarithm of the molar mass, and the stereocentres. An entropy holds
//! −R ln σ beside, with the symmetry number σ, external times internal.

mod estimate;
mod features;
mod model;
mod prior;
#[expect(
    clippy::unreadable_literal,
    reason = "generated: the shortest decimals that give the same bits"
)]
mod tables;

pub use estimate::ThermalEstimate;
pub use features::{ThermalFeatures, WHOLE};
pub use model::{Telling, ThermalModel};
pub use prior::{DEVIATIONS, LEVELS, ThermalPrior};

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
