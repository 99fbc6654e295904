//! Reviews one structure: estimate, measured values, evidence, strain.

use std::collections::BTreeMap;
use std::fmt;

use tautring_core::additivity::gas::GAS;
use tautring_core::additivity::{
    AdditivityError, Estimate, MAX_LEFT_OUT, Model, count, count_strain,
};
use tautring_core::oxygen_balance::oxygen_balance_percent;
use tautring_core::quantities::KJ_PER_KCAL;
use tautring_core::reactions::ReactionError;
use tautring_core::strain;

use super::conventions::Subject;
use super::findings::{
    Basis, Evidence, FormationEnthalpy, Quantity, RingStrain, Strain, SubstanceReview,
};
use super::measured::{CaseMeasurement, choose, compare};
use super::warnings;
use crate::dataset::{Dataset, DatasetError, HostFeatures};
use crate::structure::{HostMolecule, Structure, diastereomer, skeleton};

/// Name of the convention of strain, as reports and JSON give it.
const CONVENTION: &str =
    "group increments: enthalpy of formation minus the strain-free sum, gas, 298.15 K";

/// Share of the absolute weight that the listed evidence carries together.
const EVIDENCE_SHARE: f64 = 0.8;

/// The strain of a molecule without rings that count as strained: nothing, by definition.
const NOTHING: Quantity = Quantity {
    value_kj_per_mol: 0.0,
    u_kj_per_mol: 0.0,
    expanded_kj_per_mol: 0.0,
};

/// The published measurements, one row each, as the model was fitted to them.
const MEASUREMENTS: &str = include_str!("../../../data/measurements.csv");

/// Why a structure cannot be reviewed.
#[derive(Debug)]
#[non_exhaustive]
pub enum ReviewError {
    /// The committed measurements do not belong to the committed tables.
    Data(String),
    /// The core has no estimate.
    Additivity(AdditivityError),
    /// The core has no enthalpy of a reaction.
    Reaction(ReactionError),
}

impl fmt::Display for ReviewError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Data(reason) => write!(
                f,
                "{reason}; make the tables anew with `cargo run --release --bin tautring-fit`"
            ),
            Self::Additivity(error) => error.fmt(f),
            Self::Reaction(error) => error.fmt(f),
        }
    }
}

impl std::error::Error for ReviewError {}

impl From<AdditivityError> for ReviewError {
    fn from(error: AdditivityError) -> Self {
        Self::Additivity(error)
    }
}

impl From<ReactionError> for ReviewError {
    fn from(error: ReactionError) -> Self {
        Self::Reaction(error)
    }
}

impl From<DatasetError> for ReviewError {
    fn from(error: DatasetError) -> Self {
        Self::Data(error.to_string())
    }
}

/// The model with the published measurements that it rests on.
pub struct Reviewer {
    pub(super) model: &'static Model<'static>,
    data: Dataset,
    pub(super) by_identity: BTreeMap<String, Vec<usize>>,
    by_skeleton: BTreeMap<String, Vec<usize>>,
}

impl Reviewer {
    /// Reads the measurements and checks that the model's tables were made from them.
    ///
    /// # Errors
    /// [`ReviewError::Data`] when they were not.
    pub fn new() -> Result<Self, ReviewError> {
        let data = Dataset::read(MEASUREMENTS, "g")?;
        let values = data.rows.iter().map(|row| row.value_kj_per_mol);
        if !values.eq(GAS.values.iter().copied()) {
            return Err(ReviewError::Data(
                "data/measurements.csv is not what the tables were made from".to_owned(),
            ));
        }
        let mut by_identity: BTreeMap<String, Vec<usize>> = BTreeMap::new();
        let mut by_skeleton: BTreeMap<String, Vec<usize>> = BTreeMap::new();
        for (index, row) in data.rows.iter().enumerate() {
            by_identity
                .entry(row.identity.clone())
                .or_default()
                .push(index);
            by_skeleton
                .entry(row.skeleton.clone())
                .or_default()
                .push(index);
        }
        Ok(Self {
            model: &GAS,
            data,
            by_identity,
            by_skeleton,
        })
    }

    /// The published measurements.
    pub fn data(&self) -> &Dataset {
        &self.data
    }

    /// Reviews a structure.
    ///
    /// `blind` leaves every measurement of the molecule itself out, in every configuration and isotopic form.
    ///
    /// # Errors
    /// [`ReviewError::Additivity`] when the structure is not one neutral organic molecule.
    pub fn review(
        &self,
        name: &str,
        structure: &Structure,
        case: &[CaseMeasurement],
        blind: bool,
    ) -> Result<SubstanceReview, ReviewError> {
        let molecule = &structure.molecule;
        let features: HostFeatures = count(molecule)?;
        let formula = molecule.formula();
        let molar_mass = formula.molar_mass_g_per_mol();
        let plain = skeleton(molecule).map_err(AdditivityError::from)?;
        let none = Vec::new();
        let own = self.by_skeleton.get(&plain).unwrap_or(&none);
        let same = diastereomer(molecule).map_err(AdditivityError::from)?;
        let same = self.by_identity.get(&same).unwrap_or(&none);

        let left_out: &[usize] = if blind { own } else { &[] };
        let mut weights = self.workspace(own.len());
        let without = self.model.estimate_without(&features, own, &mut weights)?;
        let estimate = self
            .model
            .estimate_without(&features, left_out, &mut weights)?;
        let (evidence, evidence_share) = self.evidence(&weights);

        let published: &[usize] = if blind { &[] } else { same };
        let case = if blind { &[] } else { case };
        let comparisons = compare(&self.data, published, case, &without);
        let chosen = choose(&comparisons, &without);
        let (quantity, basis) = chosen.unwrap_or((quantity_of(&estimate), Basis::Estimated));
        // The strain belongs to the enthalpy in use: without the measurements where these were set aside.
        let left_out = if chosen.is_some() && basis == Basis::Estimated {
            own
        } else {
            left_out
        };

        let strain = self.strain(molecule, &features, molar_mass, left_out, basis, quantity)?;
        let gas = FormationEnthalpy {
            quantity,
            basis,
            estimate: quantity_of(&estimate),
            comparisons,
            evidence,
            evidence_share,
        };
        let strain_conventions = self.conventions(&Subject {
            molecule,
            gas: &gas,
            strain: &strain,
            left_out,
        })?;
        let flags = warnings::of(
            self.model,
            structure,
            &features,
            &estimate,
            &gas.comparisons,
            own.len() > same.len() && same.is_empty(),
        );
        Ok(SubstanceReview {
            name: name.to_owned(),
            input: structure.input.clone(),
            formula: formula.to_string(),
            molar_mass_g_per_mol: molar_mass,
            oxygen_balance_percent: oxygen_balance_percent(&formula),
            gas,
            strain,
            strain_conventions,
            rings: molecule
                .rings()
                .iter()
                .map(|ring| ring.iter().map(|&atom| usize::from(atom)).collect())
                .collect(),
            flags,
            structure: structure.clone(),
        })
    }

    /// The enthalpy of a reaction from estimates: stoichiometric numbers (negative for reactants) with structures.
    ///
    /// # Errors
    /// [`ReviewError::Additivity`] when a structure is not one neutral organic molecule.
    pub fn reaction(&self, species: &[(f64, Structure)]) -> Result<Estimate, ReviewError> {
        let mut total = HostFeatures::new();
        for (number, structure) in species {
            let features: HostFeatures = count(&structure.molecule)?;
            total.add_scaled(&features, *number)?;
        }
        Ok(self.model.estimate(&total, &mut self.workspace(0))?)
    }

    fn strain(
        &self,
        molecule: &HostMolecule,
        features: &HostFeatures,
        molar_mass: f64,
        left_out: &[usize],
        basis: Basis,
        enthalpy: Quantity,
    ) -> Result<Strain, ReviewError> {
        let mut workspace = self.workspace(left_out.len());
        let mut estimate = |features: &HostFeatures| {
            self.model
                .estimate_without(features, left_out, &mut workspace)
        };
        let systems = molecule.ring_systems();
        let mut ring_systems = Vec::new();
        for number in 0..systems.len() {
            let in_system = |atom: usize| systems.of_atom(atom) == Some(number);
            let counted: HostFeatures = count_strain(molecule, &in_system)?;
            if counted.terms().is_empty() {
                continue;
            }
            let mut sizes: Vec<usize> = molecule
                .rings()
                .iter()
                .filter(|ring| ring.iter().all(|&atom| in_system(usize::from(atom))))
                .map(<[u16]>::len)
                .collect();
            sizes.sort_unstable();
            ring_systems.push(RingStrain {
                atoms: (0..molecule.atoms().len())
                    .filter(|&a| in_system(a))
                    .collect(),
                sizes,
                quantity: quantity_of(&estimate(&counted)?),
            });
        }
        let ring_levels = if ring_systems.is_empty() {
            NOTHING
        } else {
            quantity_of(&estimate(&strain::ring_part(features))?)
        };
        let total = if basis == Basis::Measured && !ring_systems.is_empty() {
            let free = quantity_of(&estimate(&strain::strain_free_part(features))?);
            Quantity {
                value_kj_per_mol: enthalpy.value_kj_per_mol - free.value_kj_per_mol,
                u_kj_per_mol: enthalpy.u_kj_per_mol.hypot(free.u_kj_per_mol),
                expanded_kj_per_mol: enthalpy.expanded_kj_per_mol.hypot(free.expanded_kj_per_mol),
            }
        } else {
            ring_levels
        };
        Ok(Strain {
            quantity: total,
            value_kcal_per_mol: total.value_kj_per_mol / KJ_PER_KCAL,
            j_per_g: 1000.0 * total.value_kj_per_mol / molar_mass,
            u_j_per_g: 1000.0 * total.u_kj_per_mol / molar_mass,
            expanded_j_per_g: 1000.0 * total.expanded_kj_per_mol / molar_mass,
            convention: CONVENTION,
            ring_levels,
            ring_systems,
        })
    }

    /// The measurements with the largest absolute weights, and the share of all that they carry.
    fn evidence(&self, weights: &[f64]) -> (Vec<Evidence>, f64) {
        let weights = &weights[..self.data.rows.len()];
        let total: f64 = weights.iter().map(|w| w.abs()).sum();
        let mut order: Vec<usize> = (0..weights.len()).collect();
        order.sort_by(|&a, &b| {
            weights[b]
                .abs()
                .total_cmp(&weights[a].abs())
                .then(a.cmp(&b))
        });
        let mut listed = Vec::new();
        let mut carried = 0.0;
        for index in order {
            if carried >= EVIDENCE_SHARE * total || weights[index] == 0.0 {
                break;
            }
            carried += weights[index].abs();
            let row = &self.data.rows[index];
            listed.push(Evidence {
                molecule: row.measurement.name.clone(),
                smiles: row.measurement.smiles.clone(),
                weight: weights[index],
                value_kj_per_mol: row.value_kj_per_mol,
                u_kj_per_mol: row.u_kj_per_mol,
                source: row.measurement.source.clone(),
            });
        }
        let share = if total > 0.0 { carried / total } else { 0.0 };
        (listed, share)
    }

    pub(super) fn workspace(&self, left_out: usize) -> Vec<f64> {
        vec![0.0; self.model.len() * (left_out.min(MAX_LEFT_OUT) + 1)]
    }
}

/// An estimate's value with its uncertainty.
pub(super) fn quantity_of(estimate: &Estimate) -> Quantity {
    Quantity {
        value_kj_per_mol: estimate.value_kj_per_mol,
        u_kj_per_mol: estimate.u_kj_per_mol(),
        expanded_kj_per_mol: estimate.expanded_kj_per_mol(),
    }
}
