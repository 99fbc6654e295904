//! What can be measured of a molecule, in terms of the parts.

use super::Part;

/// A measurable enthalpy of a molecule at 298.15 K.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
#[repr(u8)]
pub enum Property {
    /// Enthalpy of formation of the ideal gas.
    Gas,
    /// Enthalpy of formation of the liquid.
    Liquid,
    /// Enthalpy of formation of the crystal.
    Solid,
    /// Enthalpy of vaporisation.
    Vaporisation,
    /// Enthalpy of sublimation.
    Sublimation,
}

impl Property {
    /// Every property.
    pub const ALL: [Self; 5] = [
        Self::Gas,
        Self::Liquid,
        Self::Solid,
        Self::Vaporisation,
        Self::Sublimation,
    ];

    /// How often each of [`Part::ALL`] counts.
    pub const fn coefficients(self) -> [f64; Part::ALL.len()] {
        match self {
            Self::Gas => [1.0, 0.0, 0.0],
            Self::Liquid => [1.0, -1.0, 0.0],
            Self::Solid => [1.0, -1.0, -1.0],
            Self::Vaporisation => [0.0, 1.0, 0.0],
            Self::Sublimation => [0.0, 1.0, 1.0],
        }
    }

    /// Name of the property, as reports print it.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Gas => "gas",
            Self::Liquid => "liquid",
            Self::Solid => "solid",
            Self::Vaporisation => "vaporisation",
            Self::Sublimation => "sublimation",
        }
    }

    /// The letter that data files give the property.
    pub const fn letter(self) -> &'static str {
        match self {
            Self::Gas => "g",
            Self::Liquid => "l",
            Self::Solid => "s",
            Self::Vaporisation => "v",
            Self::Sublimation => "b",
        }
    }

    /// The property that has a letter.
    pub fn from_letter(letter: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|p| p.letter() == letter)
    }
}
