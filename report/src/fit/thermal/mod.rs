//! The fit of entropies and heat capacities of the ideal gas: from published values to the tables of the core.

mod measured;
mod search;
mod tables;
mod telling;
mod validation;

pub use measured::{Published, PublishedRow, Quantity};
pub use search::{Posterior, search};
pub use tables::generated;
pub use telling::{TELLING_MEASUREMENTS, Telling};
pub use validation::{Summary, describe, leave_out, summarise};
