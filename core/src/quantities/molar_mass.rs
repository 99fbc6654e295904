//! Mass per amount of substance.

use super::QuantityError;

/// Molar mass: finite and positive.
#[derive(Clone, Copy, Debug, PartialEq, PartialOrd)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct MolarMass {
    g_per_mol: f64,
}

impl MolarMass {
    /// From g/mol.
    ///
    /// # Errors
    /// [`QuantityError::NotFinite`], [`QuantityError::NotPositive`].
    ///
    /// ```
    /// use tautring_core::quantities::MolarMass;
    /// assert_eq!(MolarMass::from_g_per_mol(18.015)?.g_per_mol(), 18.015);
    /// assert!(MolarMass::from_g_per_mol(0.0).is_err());
    /// # Ok::<(), tautring_core::quantities::QuantityError>(())
    /// ```
    pub const fn from_g_per_mol(g_per_mol: f64) -> Result<Self, QuantityError> {
        if !g_per_mol.is_finite() {
            return Err(QuantityError::NotFinite { value: g_per_mol });
        }
        if g_per_mol <= 0.0 {
            return Err(QuantityError::NotPositive { value: g_per_mol });
        }
        Ok(Self { g_per_mol })
    }

    /// In g/mol.
    pub const fn g_per_mol(self) -> f64 {
        self.g_per_mol
    }
}
