//! A measured value: quantity, number with unit, uncertainty with its coverage, source.

use super::unit::Enthalpy;
use super::vocabulary::vocabulary;

vocabulary! {
    /// Quantity that was measured.
    Quantity, "measured quantity" {
        /// Standard enthalpy of formation at 298.15 K; negative if the substance lies below its elements.
        EnthalpyOfFormation = "enthalpy_of_formation",
        /// Heat released on decomposition, as a calorimeter's report states it; positive if heat is released.
        Decomposition = "decomposition",
    }
}

vocabulary! {
    /// Phase in which an enthalpy of formation was measured.
    Phase, "phase" {
        /// Ideal gas.
        Gas = "gas",
        /// Liquid.
        Liquid = "liquid",
        /// Solid.
        Solid = "solid",
    }
}

vocabulary! {
    /// Sample holder of a calorimetric measurement: from one that is not sealed, vapour takes heat away unseen.
    Crucible, "kind of crucible" {
        /// Closed against the pressure of the decomposition gases.
        Sealed = "sealed",
        /// Open, pierced, or not tight.
        Unsealed = "unsealed",
        /// Not stated in the source; treated like an unsealed one.
        NotStated = "not_stated",
    }
}

vocabulary! {
    /// The number that stands after a disagreement was settled.
    Kept, "number to keep" {
        /// The measured value of this entry.
        Measured = "measured",
        /// The estimate; the measured value of this entry is set aside.
        Estimated = "estimated",
    }
}

/// A measured value with what the case file said.
#[derive(Clone, Debug, PartialEq)]
#[non_exhaustive]
pub struct Measurement {
    /// What was measured.
    pub subject: Subject,
    /// The value.
    pub value: Enthalpy,
    /// The standard uncertainty, if the source states an uncertainty; per mole or per gram as the value is.
    pub standard_uncertainty: Option<Enthalpy>,
    /// Number, uncertainty, coverage factor and unit as the case file has them.
    pub written: Written,
    /// Where the value was published or who measured it.
    pub source: String,
    /// A remark.
    pub note: Option<String>,
    /// How a disagreement with the estimate was settled.
    pub settled: Option<Settlement>,
}

/// What was measured, with what has to be known of it.
#[derive(Clone, Debug, PartialEq)]
#[non_exhaustive]
pub enum Subject {
    /// Standard enthalpy of formation at 298.15 K.
    EnthalpyOfFormation {
        /// Phase of the substance.
        phase: Phase,
    },
    /// Heat released on decomposition, positive if heat is released.
    Decomposition {
        /// How it was measured, such as "DSC, 4 K/min".
        method: String,
        /// The sample holder.
        crucible: Crucible,
        /// Onset temperature in K, with its text.
        onset: Option<Onset>,
    },
}

/// Temperature at which a decomposition was first seen.
#[derive(Clone, Debug, PartialEq)]
#[non_exhaustive]
pub struct Onset {
    /// The temperature, in K.
    pub kelvin: f64,
    /// Number and unit as the case file has them.
    pub written: String,
}

/// A measured value as it stands in the case file.
#[derive(Clone, Debug, PartialEq, Eq)]
#[non_exhaustive]
pub struct Written {
    /// The number.
    pub value: String,
    /// The expanded uncertainty.
    pub uncertainty: Option<String>,
    /// The coverage factor of the uncertainty.
    pub coverage_k: Option<String>,
    /// The unit of value and uncertainty.
    pub unit: String,
}

/// A disagreement settled by a named person.
#[derive(Clone, Debug, PartialEq, Eq)]
#[non_exhaustive]
pub struct Settlement {
    /// The number that stands.
    pub keep: Kept,
    /// Who settled it.
    pub by: String,
    /// Why.
    pub reason: String,
}
