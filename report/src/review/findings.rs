//! What a review finds for one substance. Units are in the names; `u` is a standard uncertainty.

use serde::Serialize;
use tautring_core::additivity::{Grade, Share, Support};

use crate::fit::Misfit;

use super::thermal::GasThermal;

/// A value with its uncertainty, kJ/mol.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct Quantity {
    /// The value, kJ/mol.
    pub value_kj_per_mol: f64,
    /// Standard uncertainty, kJ/mol.
    pub u_kj_per_mol: f64,
    /// Expanded uncertainty (95 %), kJ/mol, for the true value; the coverage factor is its ratio to `u_kj_per_mol` and differs from
    /// value to value.
    pub expanded_kj_per_mol: f64,
}

/// What a reported value rests on.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Basis {
    /// Published or case-file measurements of the molecule itself.
    Measured,
    /// The additivity.
    Estimated,
}

/// A measured enthalpy of formation of the molecule itself.
#[derive(Clone, Debug, Serialize)]
pub struct MeasuredEnthalpy {
    /// The value with its standard uncertainty.
    #[serde(flatten)]
    pub quantity: Quantity,
    /// Bibliography key of a published value, or the source text of the case file.
    pub source: String,
    /// Whether the case file states it (else it comes from the data of the project).
    pub from_case: bool,
}

/// How a measured value agrees with the estimate that leaves it out.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Agreement {
    /// They differ by no more than their combined expanded uncertainty.
    Agrees,
    /// They differ by more; the more hazardous of the two is used until someone settles it.
    Disagrees,
    /// They differ by more, and the case file says which is right and why.
    Settled,
}

/// Expanded uncertainty of a difference beyond which "it agrees" tells nothing, kJ/mol: of the size of a hydrogen bond or two, and of
/// errors that the literature of strained molecules has seen.
pub const TELLING_KJ_PER_MOL: f64 = 40.0;

/// A measured value beside the estimate made without it.
#[derive(Clone, Debug, Serialize)]
pub struct Comparison {
    /// The measured value.
    pub measured: MeasuredEnthalpy,
    /// The estimate without any measurement of the molecule.
    pub blind: Quantity,
    /// Measured minus estimated, kJ/mol.
    pub difference_kj_per_mol: f64,
    /// Combined expanded uncertainty (95 %) of the difference, kJ/mol.
    pub expanded_difference_kj_per_mol: f64,
    /// The verdict.
    pub agreement: Agreement,
    /// What the case file says when it settles a disagreement: by whom and why.
    pub settled_by: Option<String>,
    /// Whether the case file settles it in favour of the estimate.
    pub keeps_estimate: bool,
}

/// The enthalpy of formation in one phase at 298.15 K.
#[derive(Clone, Debug, Serialize)]
pub struct FormationEnthalpy {
    /// The value that the report uses.
    #[serde(flatten)]
    pub quantity: Quantity,
    /// What it rests on.
    pub basis: Basis,
    /// Where the molecule was measured in other phases only: in which, so that the estimate has only the step between the phases to find.
    pub carried_from: Option<&'static str>,
    /// How far to trust it.
    pub grade: Grade,
    /// What the grade was made from.
    pub support: Support,
    /// The estimate of the additivity; it leans on the molecule's own measurements where there are any and nobody asked to leave them out.
    pub estimate: Quantity,
    /// The molecule's own measurements beside the estimate made without them.
    pub comparisons: Vec<Comparison>,
    /// The measurements that the estimate leans on, by absolute weight, until they carry 80 % of it.
    pub evidence: Vec<Evidence>,
    /// Share of the absolute weight that `evidence` carries.
    pub evidence_share: f64,
}

impl FormationEnthalpy {
    /// Whether the molecule was measured, but the estimate made without these measurements is used.
    pub fn is_set_aside(&self) -> bool {
        !self.comparisons.is_empty() && self.basis == Basis::Estimated
    }
}

/// A measurement that an estimate leans on.
#[derive(Clone, Debug, Serialize)]
pub struct Evidence {
    /// Name of the compound.
    pub molecule: String,
    /// Its structure.
    pub smiles: String,
    /// Its weight in the estimate: kJ/mol of estimate for one kJ/mol of measured value.
    pub weight: f64,
    /// The share of all absolute weight that it carries.
    pub share: f64,
    /// Phase of the enthalpy of formation, `g`, `l` or `s`; `v` for a vaporisation, `b` for a sublimation.
    pub phase: String,
    /// The measured value, kJ/mol.
    pub value_kj_per_mol: f64,
    /// Its standard uncertainty, kJ/mol.
    pub u_kj_per_mol: f64,
    /// Bibliography key.
    pub source: String,
    /// How the compound is like the molecule.
    pub resemblance: Resemblance,
    /// Measured minus predicted when the compound itself is left out, kJ/mol.
    pub left_out_error_kj_per_mol: Option<f64>,
    /// What its family says of it, if the value is a misfit.
    pub misfit: Option<Misfit>,
    /// What the collection of the data has noted against the value.
    pub doubts: Vec<String>,
}

/// The phase of an enthalpy of formation, or the step between phases, in a word.
pub fn phase_word(phase: &str) -> &str {
    match phase {
        "g" => "gas",
        "l" => "liquid",
        "s" => "solid",
        "v" => "vaporisation",
        "b" => "sublimation",
        other => other,
    }
}

/// Whether a measured compound is the molecule that is estimated.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Sameness {
    /// The molecule itself or its mirror image.
    Itself,
    /// The same constitution, the configuration another or not stated.
    Constitution,
    /// Another molecule.
    Another,
}

/// How a measured compound is like the molecule that is estimated: which of the molecule's features it has.
#[derive(Clone, Debug, Serialize)]
pub struct Resemblance {
    /// Whether it is the molecule.
    pub sameness: Sameness,
    /// In a few words.
    pub words: String,
    /// As one number, from 0 to 1.
    pub overall: f64,
    /// Groups.
    pub groups: Share,
    /// Pairs of atoms two and three bonds apart.
    pub neighbours: Share,
    /// Aromatic rings with their patterns of substitution.
    pub aromatic_rings: Share,
    /// Sizes of the other rings.
    pub ring_sizes: Share,
    /// Atoms and bonds of the other rings.
    pub ring_atoms: Share,
    /// What several rings share, and configurations in rings.
    pub ring_environment: Share,
}

/// The strain of one ring system.
#[derive(Clone, Debug, Serialize)]
pub struct RingStrain {
    /// Atoms of the ring system, indices from 0 in the order of the input.
    pub atoms: Vec<usize>,
    /// Sizes of its relevant rings, ascending.
    pub sizes: Vec<usize>,
    /// Its strain.
    #[serde(flatten)]
    pub quantity: Quantity,
}

/// The strain of a molecule.
#[derive(Clone, Debug, Serialize)]
pub struct Strain {
    /// The enthalpy of formation that the review uses, minus the strain-free sum; without a measured one that is the sum of the ring
    /// levels. Nothing for a molecule without a ring that counts as strained.
    #[serde(flatten)]
    pub quantity: Quantity,
    /// The same, kcal/mol (thermochemical).
    pub value_kcal_per_mol: f64,
    /// The same per mass, J/g.
    pub j_per_g: f64,
    /// Standard uncertainty per mass, J/g.
    pub u_j_per_g: f64,
    /// Expanded uncertainty (95 %) per mass, J/g.
    pub expanded_j_per_g: f64,
    /// Name of the convention.
    pub convention: &'static str,
    /// Sum of the ring levels, which is the strain by the additivity alone.
    pub ring_levels: Quantity,
    /// The strain of each ring system, by the ring levels.
    pub ring_systems: Vec<RingStrain>,
}

/// The strain of one ring system by one convention.
#[derive(Clone, Debug, Serialize)]
pub struct ConventionStrain {
    /// Name of the convention.
    pub convention: &'static str,
    /// Atoms of the ring system, indices from 0 in the order of the input.
    pub atoms: Vec<usize>,
    /// The reaction whose negative enthalpy is the strain, in SMILES without configurations; `None` for a sum of increments.
    pub reaction: Option<String>,
    /// The strain, from measured enthalpies of formation where there are any; `None` where the convention does not define one.
    pub quantity: Option<Quantity>,
    /// The strain by the additivity alone, with its covariance.
    pub estimate: Option<Quantity>,
    /// Whether all of `quantity` is measured.
    pub basis: Option<Basis>,
    /// The molecules of the reaction beside the molecule itself.
    pub participants: Vec<Participant>,
    /// What the value rests on, or why there is none.
    pub note: String,
}

/// A molecule that takes part in a reaction.
#[derive(Clone, Debug, Serialize)]
pub struct Participant {
    /// Stoichiometric number: negative for those that react with the molecule, positive for products.
    pub number: i32,
    /// Its structure, without configurations.
    pub smiles: String,
    /// Formula in Hill order.
    pub formula: String,
    /// Its name, if its enthalpy was measured.
    pub name: Option<String>,
    /// What its enthalpy rests on.
    pub basis: Basis,
    /// Its measured enthalpy of formation, if there is one; otherwise it is estimated together with the rest of the reaction.
    pub measured: Option<Quantity>,
    /// Bibliography key of the measured enthalpy.
    pub source: Option<String>,
}

/// All that is found for one substance.
#[derive(Clone, Debug, Serialize)]
pub struct SubstanceReview {
    /// Name in the case file, or the structure as given.
    pub name: String,
    /// The structure as given.
    pub input: String,
    /// Formula in Hill order.
    pub formula: String,
    /// Molar mass, g/mol.
    pub molar_mass_g_per_mol: f64,
    /// Oxygen balance to CO2, H2O, N2, SO2 and HX, %.
    pub oxygen_balance_percent: f64,
    /// Gas-phase enthalpy of formation.
    pub gas: FormationEnthalpy,
    /// Enthalpy of formation of the liquid; below the melting point of a supercooled one.
    pub liquid: FormationEnthalpy,
    /// Enthalpy of formation of the crystal.
    pub solid: FormationEnthalpy,
    /// Entropy and heat capacity of the ideal gas, if they can be estimated.
    pub gas_thermal: Option<GasThermal>,
    /// Strain.
    pub strain: Strain,
    /// The strain of each ring system by several conventions.
    pub strain_conventions: Vec<ConventionStrain>,
    /// Relevant rings: atoms in ring order, indices from 0.
    pub rings: Vec<Vec<usize>>,
    /// Plain-language warnings, most important first.
    pub flags: Vec<String>,
    /// The structure itself, for drawing.
    #[serde(skip)]
    pub structure: crate::structure::Structure,
}

/// A published value that the program recomputes.
#[derive(Clone, Debug, Serialize)]
pub struct CheckValue {
    /// Short name.
    pub id: String,
    /// What is checked.
    pub quantity: String,
    /// Molecule or reaction.
    pub subject: String,
    /// The published value.
    pub published: f64,
    /// Unit of it.
    pub unit: String,
    /// The value recomputed now.
    pub computed: f64,
    /// Largest difference that still agrees.
    pub tolerance: f64,
    /// Why that one.
    pub tolerance_reason: String,
    /// Bibliography key, or `common practice`.
    pub source: String,
    /// How the source was seen.
    pub source_seen: String,
    /// The verdict.
    pub outcome: CheckOutcome,
}

/// Whether a recomputed value agrees with the published one.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum CheckOutcome {
    /// Within the tolerance.
    Agrees,
    /// Outside it.
    Off,
}
