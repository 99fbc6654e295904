//! The heat capacity between its five temperatures, and its integrals in closed form.
//!
//! `Cp(t) = a₃ t⁻³ + a₂ t⁻² + a₁ t⁻¹ + a₀ + b t` with t = T/1000 K runs through all five values; t³ Cp is then a polynomial of the fourth
//! degree, so Lagrange's form gives the coefficients. Reciprocal powers bend as the heat capacity of vibrations does, towards a limit.
//!
//! # Accuracy
//! Against the 1563 correlations of the gas tables from which most of the fitted values come: largest difference between 298.15 and
//! 800 K 0.02 % of the heat capacity (median of the molecules), 0.08 % (95 of 100). Outside it is extrapolation: 0.11 and 0.43 % at
//! 273.15 K, 0.5 and 1.9 % at 250 K, 0.03 and 0.11 % at 900 K, 0.09 and 0.34 % at 1000 K.

use super::error::ThermalError;
use crate::additivity::thermal::TEMPERATURES_K;
use crate::float::ln;

/// The temperature of the enthalpies of formation and entropies, K.
pub const REFERENCE_K: f64 = TEMPERATURES_K[0];

/// The lowest temperature at which the interpolant is used, K.
pub const LOWEST_K: f64 = 250.0;

/// The highest temperature at which the interpolant is used, K.
pub const HIGHEST_K: f64 = 1000.0;

const N: usize = TEMPERATURES_K.len();

/// What each of the five heat capacities weighs in the heat capacity, the enthalpy and the entropy at a temperature.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Interpolant {
    /// The temperature, K.
    pub temperature_k: f64,
    /// Weights in Cp(T); their sum is about 1.
    pub heat_capacity: [f64; N],
    /// Weights in H(T) − H(298.15 K), the integral of Cp, K.
    pub enthalpy_k: [f64; N],
    /// Weights in S(T) − S(298.15 K), the integral of Cp/T.
    pub entropy: [f64; N],
}

impl Interpolant {
    /// The weights at a temperature.
    ///
    /// # Errors
    /// [`ThermalError::Temperature`] outside [`LOWEST_K`] to [`HIGHEST_K`].
    ///
    /// ```
    /// use tautring_core::thermal::Interpolant;
    /// let at_500 = Interpolant::at(500.0)?;
    /// // The integral of a constant heat capacity.
    /// let sum: f64 = at_500.enthalpy_k.iter().sum();
    /// assert!((sum - (500.0 - 298.15)).abs() < 1e-9);
    /// # Ok::<(), tautring_core::thermal::ThermalError>(())
    /// ```
    pub fn at(temperature_k: f64) -> Result<Self, ThermalError> {
        if !(LOWEST_K..=HIGHEST_K).contains(&temperature_k) {
            return Err(ThermalError::Temperature {
                value_k: temperature_k,
            });
        }
        let t = temperature_k / 1000.0;
        let t0 = REFERENCE_K / 1000.0;
        let mut weights = Self {
            temperature_k,
            heat_capacity: [0.0; N],
            enthalpy_k: [0.0; N],
            entropy: [0.0; N],
        };
        let slots = weights
            .heat_capacity
            .iter_mut()
            .zip(&mut weights.enthalpy_k)
            .zip(&mut weights.entropy);
        for (i, ((cp, h), s)) in slots.enumerate() {
            let a = coefficients(i);
            *cp = value(&a, t);
            *h = 1000.0 * (integral(&a, t) - integral(&a, t0));
            *s = integral_over_t(&a, t) - integral_over_t(&a, t0);
        }
        Ok(weights)
    }
}

/// Coefficients of t⁻³, t⁻², t⁻¹, 1 and t of the function that is 1 at the temperature of number `i` and 0 at the others.
fn coefficients(i: usize) -> [f64; N] {
    let own = TEMPERATURES_K.get(i).copied().unwrap_or(0.0) / 1000.0;
    let mut polynomial = [0.0; N];
    if let Some(constant) = polynomial.first_mut() {
        *constant = own * own * own;
    }
    for (j, other) in TEMPERATURES_K.into_iter().enumerate() {
        if j == i {
            continue;
        }
        let other = other / 1000.0;
        // Times (t − other) / (own − other).
        let mut lower = 0.0;
        for coefficient in &mut polynomial {
            let current = *coefficient;
            *coefficient = (lower - other * current) / (own - other);
            lower = current;
        }
    }
    polynomial
}

fn value([a3, a2, a1, a0, b]: &[f64; N], t: f64) -> f64 {
    a3 / (t * t * t) + a2 / (t * t) + a1 / t + a0 + b * t
}

/// ∫ Cp dt.
fn integral([a3, a2, a1, a0, b]: &[f64; N], t: f64) -> f64 {
    -a3 / (2.0 * t * t) - a2 / t + a1 * ln(t) + a0 * t + b * t * t / 2.0
}

/// ∫ Cp/t dt.
fn integral_over_t([a3, a2, a1, a0, b]: &[f64; N], t: f64) -> f64 {
    -a3 / (3.0 * t * t * t) - a2 / (2.0 * t * t) - a1 / t + a0 * ln(t) + b * t
}

#[cfg(test)]
mod tests {
    use super::*;

    fn sum(weights: &[f64; N], cp: impl Fn(f64) -> f64) -> f64 {
        weights
            .iter()
            .zip(TEMPERATURES_K)
            .map(|(w, t)| w * cp(t))
            .sum()
    }

    #[test]
    fn it_runs_through_the_values() {
        for (i, t) in TEMPERATURES_K.into_iter().enumerate() {
            let at = Interpolant::at(t).unwrap();
            for (j, weight) in at.heat_capacity.into_iter().enumerate() {
                let expected = f64::from(u8::from(i == j));
                assert!((weight - expected).abs() < 1e-12, "{i} {j}: {weight}");
            }
        }
    }

    #[test]
    fn integrals_agree_with_fine_sums() {
        let cp = |t: f64| 120.0 - 9000.0 / t + 0.03 * t;
        for end in [250.0, 350.0, 650.0, 950.0] {
            let at = Interpolant::at(end).unwrap();
            let steps = 20_000;
            let width = (end - REFERENCE_K) / f64::from(steps);
            let (mut h, mut s) = (0.0, 0.0);
            for k in 0..steps {
                let t = REFERENCE_K + (f64::from(k) + 0.5) * width;
                h += cp(t) * width;
                s += cp(t) / t * width;
            }
            assert!((sum(&at.enthalpy_k, cp) - h).abs() < 1e-4);
            assert!((sum(&at.entropy, cp) - s).abs() < 1e-6);
        }
    }

    #[test]
    fn temperatures_beyond_the_data_are_refused() {
        for t in [249.9, 1000.1, f64::NAN] {
            assert!(matches!(
                Interpolant::at(t),
                Err(ThermalError::Temperature { .. })
            ));
        }
    }
}
