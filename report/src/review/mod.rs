//! The review: every number of a report, asked of the core and kept with what it rests on.
//!
//! Nothing here computes chemistry; the core does.

mod check_values;
mod conventions;
mod doubts;
mod evidence;
mod findings;
mod known;
mod measured;
mod reviewer;
mod stated;
mod thermal;
mod warnings;

pub use check_values::{CheckValueError, check_values};
pub use findings::{
    Agreement, Basis, CheckOutcome, CheckValue, Comparison, ConventionStrain, Evidence,
    FormationEnthalpy, MeasuredEnthalpy, Participant, Quantity, Resemblance, RingStrain, Sameness,
    Strain, SubstanceReview, TELLING_KJ_PER_MOL, phase_word,
};
pub use measured::{CaseMeasurement, Settled, UNSTATED_KJ_PER_MOL};
pub use reviewer::{ReviewError, Reviewer};
pub use thermal::{GasThermal, ThermalValue};
pub use warnings::LEANING_WEIGHT;
