//! The fit: from measured enthalpies of formation to the coefficient tables of the core.

mod inference;
mod matrices;
mod tables;
mod validation;

pub use inference::{Hyperparameters, Posterior, search};
pub use matrices::LevelMatrices;
pub use tables::{TableError, Tables};
pub use validation::{LeftOut, Summary, describe, leave_out, left_out_csv, summarise};
