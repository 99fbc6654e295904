//! A molar energy together with how sure it is.

use super::{MolarEnergy, QuantityError};

/// A molar energy with its standard uncertainty u.
///
/// There is no sum of two of these: the uncertainty of a sum or difference depends on what the two share, so whoever
/// holds the covariance forms it.
///
/// # Source
/// `gum-2008`, 2.3.1.
#[derive(Clone, Copy, Debug, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct Uncertain {
    value: MolarEnergy,
    standard_uncertainty: MolarEnergy,
}

impl Uncertain {
    /// From value and standard uncertainty.
    ///
    /// # Errors
    /// [`QuantityError::NotFinite`], [`QuantityError::NegativeUncertainty`].
    ///
    /// ```
    /// use tautring_core::quantities::{MolarEnergy, Uncertain};
    /// let enthalpy = Uncertain::new(
    ///     MolarEnergy::from_kj_per_mol(53.3),
    ///     MolarEnergy::from_kj_per_mol(0.3),
    /// )?;
    /// assert_eq!(enthalpy.expanded_uncertainty(2.0).kj_per_mol(), 0.6);
    /// # Ok::<(), tautring_core::quantities::QuantityError>(())
    /// ```
    pub fn new(
        value: MolarEnergy,
        standard_uncertainty: MolarEnergy,
    ) -> Result<Self, QuantityError> {
        let u = standard_uncertainty.kj_per_mol();
        for number in [value.kj_per_mol(), u] {
            if !number.is_finite() {
                return Err(QuantityError::NotFinite { value: number });
            }
        }
        if u < 0.0 {
            return Err(QuantityError::NegativeUncertainty { value: u });
        }
        Ok(Self {
            value,
            standard_uncertainty,
        })
    }

    /// The value.
    pub const fn value(self) -> MolarEnergy {
        self.value
    }

    /// The standard uncertainty u.
    pub const fn standard_uncertainty(self) -> MolarEnergy {
        self.standard_uncertainty
    }

    /// The expanded uncertainty `U = k u` for a coverage factor k.
    pub fn expanded_uncertainty(self, coverage_factor: f64) -> MolarEnergy {
        self.standard_uncertainty * coverage_factor
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn uncertain(value: f64, u: f64) -> Result<Uncertain, QuantityError> {
        Uncertain::new(
            MolarEnergy::from_kj_per_mol(value),
            MolarEnergy::from_kj_per_mol(u),
        )
    }

    #[test]
    fn nonsense_is_refused() {
        assert!(uncertain(-20.6, 0.0).is_ok());
        assert!(matches!(
            uncertain(f64::NAN, 1.0),
            Err(QuantityError::NotFinite { .. })
        ));
        assert!(matches!(
            uncertain(1.0, f64::INFINITY),
            Err(QuantityError::NotFinite { .. })
        ));
        assert_eq!(
            uncertain(1.0, -1.0),
            Err(QuantityError::NegativeUncertainty { value: -1.0 })
        );
    }
}
