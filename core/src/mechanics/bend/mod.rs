//! Angle bend: the energy of one angle at one centre.
//!
//! [`Bend`] is the term; each published form is one of its constructors, in a file of its own:
//!
//! | constructor | energy | has the ½ | source |
//! | --- | --- | --- | --- |
//! | [`Bend::harmonic`] | quadratic | yes | `wilson-decius-cross-1955` |
//! | [`Bend::cubic`] | quadratic, cubic | yes | `halgren-1996` |
//! | [`Bend::quartic`] | quadratic to quartic, free coefficients | no | `maple-1994` |
//! | [`Bend::sextic`] | quadratic, sextic | in the factor | `allinger-1977` |
//! | [`Bend::sextic_series`] | quadratic to sextic | in the factor | `allinger-yuh-lii-1989` |
//! | [`Bend::linear`] | cosine, for linear centres | no | `halgren-1996` |
//!
//! Zero of the energy is at the reference angle (at pi for the linear form).

mod cubic;
mod force_constant;
mod harmonic;
mod linear;
mod quartic;
mod range;
mod sextic;
mod term;

pub use force_constant::BendForceConstant;
pub(super) use force_constant::LARGEST_COEFFICIENT;
pub use range::AngleRange;
pub use term::Bend;
