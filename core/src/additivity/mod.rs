//! Additivity: enthalpies of formation as a linear model of counted features, with a full covariance.
//!
//! `y = Σ over levels l of X_l β_l + δ + ε`, with `β_l ~ N(0, τ_l² I)` (correlated between neighbouring ring sizes in the
//! smooth levels), δ a heavy-tailed deviation of the molecule and ε the heavy-tailed error of a measurement.

pub mod cholesky;
mod deviation;
mod error;
mod estimate;
mod features;
pub mod gas;
mod key;
mod level;
mod levels;
mod model;
mod prior;
mod skeleton;

pub use deviation::{CONTRIBUTIONS, Deviation, POLAR_PAIRS, RINGS, UNSATURATED};
pub use error::AdditivityError;
pub use estimate::Estimate;
pub use features::{Features, Term};
pub use key::Key;
pub use level::Level;
pub use levels::{count, count_strain};
pub use model::{MAX_LEFT_OUT, Model};
pub use prior::Prior;
