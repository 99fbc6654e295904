//! The review: every number of a report, asked of the core and kept with what it rests on.
//!
//! Nothing here computes chemistry; the core does.

mod findings;

pub use findings::{
    Agreement, Basis, CheckOutcome, CheckValue, Comparison, Evidence, FormationEnthalpy,
    MeasuredEnthalpy, Quantity, RingStrain, Strain, SubstanceReview,
};
