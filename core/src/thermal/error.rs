//! What can go wrong in a property at a temperature.

use core::fmt;

use super::interpolant::{HIGHEST_K, LOWEST_K};

/// Why there is no value.
#[derive(Clone, Copy, Debug, PartialEq)]
#[non_exhaustive]
pub enum ThermalError {
    /// A temperature that the heat capacities do not reach.
    Temperature {
        /// The temperature, K.
        value_k: f64,
    },
    /// A concentration or pressure that is no positive number.
    Amount {
        /// The number given, mol/L or bar.
        value: f64,
    },
    /// A number that is not finite, or a standard uncertainty below zero.
    NotANumber {
        /// The number.
        value: f64,
    },
}

impl fmt::Display for ThermalError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match *self {
            Self::Temperature { value_k } => write!(
                f,
                "{value_k} K is outside {LOWEST_K} to {HIGHEST_K} K, where the heat capacities hold"
            ),
            Self::Amount { value } => write!(
                f,
                "{value} is no concentration or pressure; give a number above zero"
            ),
            Self::NotANumber { value } => write!(
                f,
                "{value} given where a finite value or an uncertainty of at least zero is needed"
            ),
        }
    }
}

impl core::error::Error for ThermalError {}
