//! The fit: from measured enthalpies to the tables of the core.

mod compact;
mod design;
mod hyperparameters;
mod inference;
mod matrix;
mod misfits;
mod tables;
pub mod thermal;
mod validation;
mod worth;

pub use compact::COMPACT_MEASUREMENTS;
pub use design::Design;
pub use hyperparameters::Hyperparameters;
pub use inference::{Posterior, search};
pub use misfits::{LeftOutValue, MISFIT_DEVIATIONS, Misfit, misfits, misfits_csv};
pub use tables::{TableError, Tables};
pub use validation::{LeftOut, Summary, chance, describe, leave_out, left_out_csv, summarise};
pub use worth::worth_of_levels;
