//! Units a case file may use, and their conversion into internal ones (kJ/mol, J/g, g, mol, K).

use tautring_core::quantities::KJ_PER_KCAL;

use super::vocabulary::vocabulary;

/// Zero of the Celsius scale in kelvin, exact by definition.
const CELSIUS_ZERO: f64 = 273.15;

vocabulary! {
    /// Unit of an enthalpy, per mole or per gram.
    EnthalpyUnit, "unit of an enthalpy" {
        /// Kilojoules per mole.
        KilojoulePerMole = "kJ/mol",
        /// Thermochemical kilocalories per mole (4.184 kJ/mol).
        KilocaloriePerMole = "kcal/mol",
        /// Joules per mole.
        JoulePerMole = "J/mol",
        /// Joules per gram.
        JoulePerGram = "J/g",
        /// Thermochemical calories per gram (4.184 J/g).
        CaloriePerGram = "cal/g",
    }
}

vocabulary! {
    /// Unit of an amount: of mass, or of substance.
    AmountUnit, "unit of an amount" {
        /// Grams.
        Gram = "g",
        /// Kilograms.
        Kilogram = "kg",
        /// Milligrams.
        Milligram = "mg",
        /// Moles.
        Mole = "mol",
        /// Millimoles.
        Millimole = "mmol",
    }
}

vocabulary! {
    /// Unit of a temperature.
    TemperatureUnit, "unit of a temperature" {
        /// Kelvin.
        Kelvin = "K",
        /// Degrees Celsius.
        Celsius = "°C",
    }
}

/// What an enthalpy is counted on, with the internal unit of its number.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Basis {
    /// Per mole, in kJ/mol.
    Molar,
    /// Per gram, in J/g.
    Specific,
}

/// What an amount counts, with the internal unit of its number.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum AmountBasis {
    /// Mass, in g.
    Mass,
    /// Amount of substance, in mol.
    Substance,
}

impl EnthalpyUnit {
    /// What the unit is counted on.
    pub fn basis(self) -> Basis {
        match self {
            Self::KilojoulePerMole | Self::KilocaloriePerMole | Self::JoulePerMole => Basis::Molar,
            Self::JoulePerGram | Self::CaloriePerGram => Basis::Specific,
        }
    }

    /// A number in this unit, in kJ/mol or J/g as [`EnthalpyUnit::basis`] says.
    pub fn convert(self, value: f64) -> f64 {
        match self {
            Self::KilojoulePerMole | Self::JoulePerGram => value,
            Self::KilocaloriePerMole | Self::CaloriePerGram => value * KJ_PER_KCAL,
            Self::JoulePerMole => value / 1000.0,
        }
    }
}

impl AmountUnit {
    /// What the unit counts.
    pub fn basis(self) -> AmountBasis {
        match self {
            Self::Gram | Self::Kilogram | Self::Milligram => AmountBasis::Mass,
            Self::Mole | Self::Millimole => AmountBasis::Substance,
        }
    }

    /// A number in this unit, in g or mol as [`AmountUnit::basis`] says.
    pub fn convert(self, value: f64) -> f64 {
        match self {
            Self::Gram | Self::Mole => value,
            Self::Kilogram => value * 1000.0,
            Self::Milligram | Self::Millimole => value / 1000.0,
        }
    }
}

impl TemperatureUnit {
    /// A number in this unit, in K.
    pub fn convert(self, value: f64) -> f64 {
        match self {
            Self::Kelvin => value,
            Self::Celsius => value + CELSIUS_ZERO,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    #[test]
    fn converts_into_internal_units() {
        // 51.9 kcal/mol is 217.15 kJ/mol in two tables that state bicyclobutane both ways.
        assert_relative_eq!(
            EnthalpyUnit::KilocaloriePerMole.convert(51.9),
            217.15,
            epsilon = 5e-3
        );
        assert_relative_eq!(EnthalpyUnit::JoulePerMole.convert(-52_680.0), -52.68);
        assert_relative_eq!(EnthalpyUnit::CaloriePerGram.convert(1.0), 4.184);
        assert_relative_eq!(AmountUnit::Kilogram.convert(2.5), 2500.0);
        assert_relative_eq!(AmountUnit::Millimole.convert(20.0), 0.02);
        assert_relative_eq!(TemperatureUnit::Celsius.convert(25.0), 298.15);
    }

    #[test]
    fn knows_molar_from_specific() {
        assert_eq!(EnthalpyUnit::CaloriePerGram.basis(), Basis::Specific);
        assert_eq!(EnthalpyUnit::JoulePerMole.basis(), Basis::Molar);
        assert_eq!(AmountUnit::Millimole.basis(), AmountBasis::Substance);
    }
}
