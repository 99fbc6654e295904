//! Entropy and heat capacity of the ideal gas by the same counted features as the enthalpies, coarser and with a compact covariance only.
//!
//! `y_T = Σ over levels l of X_l β_l,T + w γ_T + δ_T`, with `β_l ~ N(0, τ_l² C)`: the temperatures of a heat capacity share one covariance up
//! to the matrix C of their covariances with each other, so one factor serves them all, and any weighted sum over temperatures has its
//! uncertainty. The counts w of the whole molecule are one, the logarithm of the molar mass, and the stereocentres. An entropy holds
//! −R ln σ beside, with the symmetry number σ, external times internal.
//!
//! The tables take 460 kB, of which 322 kB are the factors of the 200 measurements of either quantity that the uncertainties rest on. From all
//! measurements u would be smaller: the medians stand in `data/thermal_left_out.txt`.

mod estimate;
mod features;
mod fitted;
mod model;
mod prior;
#[expect(
    clippy::unreadable_literal,
    reason = "generated: the shortest decimals that give the same bits"
)]
mod tables;

pub use estimate::ThermalEstimate;
pub use features::{ThermalFeatures, WHOLE};
pub use fitted::{ENTROPY, GAS_CONSTANT_J_PER_MOL_K, HEAT_CAPACITY, TEMPERATURES_K, WORKSPACE};
pub use model::{Telling, ThermalModel};
pub use prior::{DEVIATIONS, LEVELS, ThermalPrior};
