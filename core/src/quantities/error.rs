//! What can be wrong with a number that is to be a quantity.

use core::fmt;

/// Why a number is not the quantity that it is given as.
#[derive(Clone, Copy, Debug, PartialEq)]
#[non_exhaustive]
pub enum QuantityError {
    /// Infinite or not a number.
    NotFinite {
        /// The number.
        value: f64,
    },
    /// Zero or negative where only a positive number makes sense.
    NotPositive {
        /// The number.
        value: f64,
    },
    /// A negative standard uncertainty.
    NegativeUncertainty {
        /// The number.
        value: f64,
    },
}

impl fmt::Display for QuantityError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match *self {
            Self::NotFinite { value } => write!(f, "{value} is no finite number"),
            Self::NotPositive { value } => write!(f, "{value} is not positive"),
            Self::NegativeUncertainty { value } => {
                write!(f, "the standard uncertainty {value} is negative")
            }
        }
    }
}

impl core::error::Error for QuantityError {}
