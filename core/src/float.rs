//! Transcendental functions, all through `libm`, so that every machine gives the same bits.
//!
//! Nothing else in the crate calls `libm` or a `std` method of `f64` that does more than basic arithmetic.

/// Square root of `x`, correctly rounded.
pub(crate) fn sqrt(x: f64) -> f64 {
    libm::sqrt(x)
}

/// Natural exponential of `x`.
pub(crate) fn exp(x: f64) -> f64 {
    libm::exp(x)
}

/// Natural logarithm of `x`.
pub(crate) fn ln(x: f64) -> f64 {
    libm::log(x)
}
