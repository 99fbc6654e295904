//! Additivity: enthalpies of formation in three phases as a linear model of counted features, with a full covariance.
//!
//! `y = Σ over levels l of X_l β_l + δ + ε`, with `β_l ~ N(0, τ_l² I)` (correlated between neighbouring ring sizes in the
//! smooth levels), δ a heavy-tailed deviation of the molecule and ε the heavy-tailed error of a measurement. The gas has such a sum of its own;
//! the liquid lies lower by a second one, the vaporisation, and the crystal by a third, the fusion. All three are fitted jointly.

pub mod cholesky;
mod covariance;
mod deviation;
mod error;
mod estimate;
mod features;
pub mod fitted;
pub mod grade;
mod key;
mod level;
mod levels;
mod likeness;
mod model;
mod part;
mod prior;
mod property;
mod skeleton;
pub mod thermal;
mod without;

pub use covariance::Covariance;
pub use deviation::{CONTRIBUTIONS, Deviation, POLAR_PAIRS, RINGS, UNSATURATED, part_of};
pub use error::AdditivityError;
pub use estimate::Estimate;
pub use features::{Features, Term};
pub use grade::{Grade, Support};
pub use key::{CLASSES, Key};
pub use level::Level;
pub use levels::{count, count_strain};
pub use likeness::{Family, Likeness, Share};
pub use model::{MeasuredMolecule, Model};
pub use part::Part;
pub use prior::Prior;
pub use property::Property;
pub use without::{MAX_LEFT_OUT, Without};
