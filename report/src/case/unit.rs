//! Units a case file may use, and their conversion into internal ones (kJ/mol, J/g, g, mol, K).

use tautring_core::quantities::{KJ_PER_KCAL, MolarEnergy, MolarMass, SpecificEnergy};

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

/// An enthalpy as it was stated: per mole, or per gram.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Enthalpy {
    /// Per mole.
    Molar(MolarEnergy),
    /// Per gram.
    Specific(SpecificEnergy),
}

/// An amount as it was stated: a mass, or an amount of substance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Portion {
    /// Mass in g.
    Grams(f64),
    /// Amount of substance in mol.
    Moles(f64),
}

impl Enthalpy {
    /// The enthalpy of one mole.
    ///
    /// ```
    /// use tautring_core::quantities::MolarMass;
    /// use tautring_report::case::EnthalpyUnit;
    ///
    /// let oxirane = MolarMass::from_g_per_mol(44.053)?;
    /// let released = EnthalpyUnit::JoulePerGram.of(1000.0).per_mole(oxirane);
    /// assert!((released.kj_per_mol() - 44.053).abs() < 1e-9);
    /// # Ok::<(), tautring_core::quantities::QuantityError>(())
    /// ```
    pub fn per_mole(self, mass: MolarMass) -> MolarEnergy {
        match self {
            Self::Molar(energy) => energy,
            Self::Specific(energy) => energy.per_mole(mass),
        }
    }
}

impl Portion {
    /// The amount of substance in mol.
    pub fn moles(self, mass: MolarMass) -> f64 {
        match self {
            Self::Grams(grams) => grams / mass.g_per_mol(),
            Self::Moles(moles) => moles,
        }
    }

    /// The mass in g.
    pub fn grams(self, mass: MolarMass) -> f64 {
        match self {
            Self::Grams(grams) => grams,
            Self::Moles(moles) => moles * mass.g_per_mol(),
        }
    }
}

impl EnthalpyUnit {
    /// So much of this unit.
    pub fn of(self, number: f64) -> Enthalpy {
        match self {
            Self::KilojoulePerMole => Enthalpy::Molar(MolarEnergy::from_kj_per_mol(number)),
            Self::KilocaloriePerMole => Enthalpy::Molar(MolarEnergy::from_kcal_per_mol(number)),
            Self::JoulePerMole => Enthalpy::Molar(MolarEnergy::from_kj_per_mol(number / 1000.0)),
            Self::JoulePerGram => Enthalpy::Specific(SpecificEnergy::from_j_per_g(number)),
            // The calorie has as many joules as the kilocalorie has kilojoules.
            Self::CaloriePerGram => {
                Enthalpy::Specific(SpecificEnergy::from_j_per_g(number * KJ_PER_KCAL))
            }
        }
    }
}

impl AmountUnit {
    /// So much of this unit.
    pub fn of(self, number: f64) -> Portion {
        match self {
            Self::Gram => Portion::Grams(number),
            Self::Kilogram => Portion::Grams(number * 1000.0),
            Self::Milligram => Portion::Grams(number / 1000.0),
            Self::Mole => Portion::Moles(number),
            Self::Millimole => Portion::Moles(number / 1000.0),
        }
    }
}

impl TemperatureUnit {
    /// So much of this unit, in K.
    pub fn kelvin(self, number: f64) -> f64 {
        match self {
            Self::Kelvin => number,
            Self::Celsius => number + CELSIUS_ZERO,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    fn kj_per_mol(unit: EnthalpyUnit, number: f64) -> f64 {
        let mass = MolarMass::from_g_per_mol(50.0).expect("a molar mass");
        unit.of(number).per_mole(mass).kj_per_mol()
    }

    #[test]
    fn converts_into_internal_units() {
        // 51.9 kcal/mol is 217.15 kJ/mol in two tables that state bicyclobutane both ways.
        let bicyclobutane = kj_per_mol(EnthalpyUnit::KilocaloriePerMole, 51.9);
        assert_relative_eq!(bicyclobutane, 217.15, epsilon = 5e-3);
        assert_relative_eq!(kj_per_mol(EnthalpyUnit::KilojoulePerMole, -52.68), -52.68);
        assert_relative_eq!(kj_per_mol(EnthalpyUnit::JoulePerMole, -52_680.0), -52.68);
        assert_relative_eq!(kj_per_mol(EnthalpyUnit::JoulePerGram, 1000.0), 50.0);
        assert_relative_eq!(kj_per_mol(EnthalpyUnit::CaloriePerGram, 1000.0), 209.2);
        assert_relative_eq!(TemperatureUnit::Celsius.kelvin(25.0), 298.15);
        assert_relative_eq!(TemperatureUnit::Kelvin.kelvin(300.0), 300.0);
    }

    #[test]
    fn turns_mass_into_moles_and_back() {
        let mass = MolarMass::from_g_per_mol(50.0).expect("a molar mass");
        for (unit, moles, grams) in [
            (AmountUnit::Gram, 0.02, 1.0),
            (AmountUnit::Kilogram, 20.0, 1000.0),
            (AmountUnit::Milligram, 2e-5, 1e-3),
            (AmountUnit::Mole, 1.0, 50.0),
            (AmountUnit::Millimole, 1e-3, 0.05),
        ] {
            assert_relative_eq!(unit.of(1.0).moles(mass), moles);
            assert_relative_eq!(unit.of(1.0).grams(mass), grams);
        }
    }
}
