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

/// Absolute value of `x`, exact.
pub(crate) fn abs(x: f64) -> f64 {
    libm::fabs(x)
}

/// Sine and cosine of `x` (radians), in this order; one argument reduction serves both.
pub(crate) fn sin_cos(x: f64) -> (f64, f64) {
    libm::sincos(x)
}

/// Angle of the point (`x`, `y`) seen from the origin, radians, from -pi to pi, both included.
///
/// Sharper than an arc cosine near 0 and pi, where a cosine no longer tells angles apart.
pub(crate) fn atan2(y: f64, x: f64) -> f64 {
    libm::atan2(y, x)
}
