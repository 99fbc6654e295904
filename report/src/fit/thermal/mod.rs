//! The fit of entropies and heat capacities of the ideal gas: from published values to the tables of the core.

mod measured;
mod search;
mod tables;
mod validation;

pub use measured::{Published, PublishedRow, Quantity};
pub use search::{Posterior, search};
pub use tables::{TELLING_MEASUREMENTS, generated};
pub use validation::{Summary, describe, leave_out, summarise};
