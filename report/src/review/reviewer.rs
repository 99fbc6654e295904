//! Reviews one structure: estimate, measured values, evidence, strain.

use std::collections::BTreeMap;
use std::fmt;

use tautring_core::additivity::fitted::FITTED;
use tautring_core::additivity::{
    AdditivityError, Estimate, Grade, MeasuredMolecule, Model, Property, Without, count,
    count_strain,
};
use tautring_core::oxygen_balance::oxygen_balance_percent;
use tautring_core::quantities::KJ_PER_KCAL;
use tautring_core::reactions::ReactionError;
use tautring_core::strain;

use super::conventions::Subject;
use super::doubts::Doubts;
use super::evidence::Estimated;
use super::findings::{Basis, FormationEnthalpy, Quantity, RingStrain, Strain, SubstanceReview};
use super::known::Known;
use super::measured::{CaseMeasurement, choose, compare};
use super::thermal::thermal;
use super::warnings::{self, Warned};
use crate::dataset::{Dataset, DatasetError, HostFeatures};
use crate::structure::{HostMolecule, Structure, diastereomer, skeleton};

/// Name of the convention of strain, as reports and JSON give it.
const CONVENTION: &str =
    "group increments: enthalpy of formation minus the strain-free sum, gas, 298.15 K";

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
    pub(super) by_skeleton: BTreeMap<String, Vec<usize>>,
    pub(super) known: Known,
    pub(super) doubts: Doubts,
}

impl Reviewer {
    /// Reads the measurements and checks that the model's tables were made from them.
    ///
    /// # Errors
    /// [`ReviewError::Data`] when they were not.
    pub fn new() -> Result<Self, ReviewError> {
        let data = Dataset::read(MEASUREMENTS)?;
        let values = data.rows.iter().map(|r| r.measurement.value_kj_per_mol);
        if !values.eq(FITTED.values.iter().copied()) {
            return Err(ReviewError::Data(
                "data/measurements.csv is not what the tables were made from".to_owned(),
            ));
        }
        let mut by_identity: BTreeMap<String, Vec<usize>> = BTreeMap::new();
        let mut by_skeleton: BTreeMap<String, Vec<usize>> = BTreeMap::new();
        for known in &data.molecules {
            by_identity.insert(known.identity.clone(), known.rows.clone());
            let of_skeleton = by_skeleton.entry(known.skeleton.clone()).or_default();
            of_skeleton.extend(&known.rows);
        }
        Ok(Self {
            model: &FITTED,
            known: Known::of(&data),
            doubts: Doubts::new()?,
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
        let identity = diastereomer(molecule).map_err(AdditivityError::from)?;
        let same = self.by_identity.get(&identity).unwrap_or(&none);

        let [mut own_columns, mut no_columns] =
            [own.len(), 0].map(|m| vec![0.0; m * self.model.len()]);
        let without_own = Without::new(self.model, own, &mut own_columns)?;
        let with_all = Without::new(self.model, &[], &mut no_columns)?;
        let knowledge = Knowledge {
            without_own: &without_own,
            without: if blind { &without_own } else { &with_all },
            same: if blind { &[] } else { same },
            case: if blind { &[] } else { case },
        };
        let estimated = Estimated {
            features: &features,
            identity: &identity,
            skeleton: &plain,
        };
        let gas = self.formation(Property::Gas, &estimated, &knowledge)?;
        let liquid = self.formation(Property::Liquid, &estimated, &knowledge)?;
        let solid = self.formation(Property::Solid, &estimated, &knowledge)?;
        // The strain belongs to the enthalpy in use: without the measurements where these were set aside.
        let without = if gas.is_set_aside() {
            &without_own
        } else {
            knowledge.without
        };
        let strain = self.strain(molecule, &features, molar_mass, without, &gas)?;
        let strain_conventions = self.conventions(&Subject {
            molecule,
            gas: &gas,
            strain: &strain,
            without,
        })?;
        let own_rows = knowledge.same.iter();
        let own_rows = own_rows.map(|&row| &self.data.rows[row].measurement);
        let doubts = if blind {
            Vec::new()
        } else {
            let phases = own_rows.clone().map(|m| m.phase.as_str());
            self.doubts
                .curated_in(&identity, std::iter::once("g").chain(phases))
        };
        let flags = warnings::of(&Warned {
            structure,
            gas: &gas,
            misfits: own_rows.filter_map(|m| self.doubts.misfit(m)).collect(),
            doubts,
            other_configuration_measured: own.len() > same.len() && same.is_empty(),
        });
        Ok(SubstanceReview {
            name: name.to_owned(),
            input: structure.input.clone(),
            formula: formula.to_string(),
            molar_mass_g_per_mol: molar_mass,
            oxygen_balance_percent: oxygen_balance_percent(&formula),
            gas,
            liquid,
            solid,
            gas_thermal: thermal(molecule),
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
        Ok(self.model.estimate(&total, &mut self.workspace())?)
    }

    /// The enthalpy of formation in one phase.
    fn formation(
        &self,
        property: Property,
        estimated: &Estimated<'_>,
        knowledge: &Knowledge<'_>,
    ) -> Result<FormationEnthalpy, ReviewError> {
        let features = estimated.features.of(property)?;
        let without_own = knowledge.without_own;
        let blind = self
            .model
            .estimate_without(&features, without_own, &mut self.workspace())?;
        let of_property = |row: &&usize| self.data.rows[**row].property == property;
        let published: Vec<usize> = knowledge.same.iter().filter(of_property).copied().collect();
        let case = knowledge.case.iter().filter(|m| m.property == property);
        let case: Vec<&CaseMeasurement> = case.collect();
        let comparisons = compare(&self.data, &published, &case, &blind);
        let chosen = choose(&comparisons, &blind);
        // Estimate and evidence belong to the enthalpy in use: without the measurements where these were set aside.
        let set_aside = matches!(chosen, Some((_, Basis::Estimated)));
        let own = knowledge.same.first().filter(|_| !set_aside);
        let own = own.map(|&row| &self.data.rows[row]);
        let about = own.map(|row| MeasuredMolecule {
            molecule: row.molecule,
            property,
        });
        let without = if set_aside {
            without_own
        } else {
            knowledge.without
        };
        let (estimate, leaning) = self.lean(estimated, &features, about, without)?;
        let (quantity, basis) = chosen.unwrap_or((quantity_of(&estimate), Basis::Estimated));
        Ok(FormationEnthalpy {
            quantity,
            basis,
            carried_from: own
                .filter(|_| comparisons.is_empty())
                .map(|row| row.property.name()),
            grade: match basis {
                Basis::Measured => Grade::Measured,
                Basis::Estimated => Grade::of(&leaning.support),
            },
            support: leaning.support,
            estimate: quantity_of(&estimate),
            comparisons,
            evidence: leaning.evidence,
            evidence_share: leaning.share,
        })
    }

    fn strain(
        &self,
        molecule: &HostMolecule,
        features: &HostFeatures,
        molar_mass: f64,
        without: &Without<'_>,
        gas: &FormationEnthalpy,
    ) -> Result<Strain, ReviewError> {
        let mut workspace = self.workspace();
        let mut estimate = |features: &HostFeatures| {
            self.model
                .estimate_without(features, without, &mut workspace)
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
        let of_own = gas.basis == Basis::Measured || gas.carried_from.is_some();
        let enthalpy = gas.quantity;
        let total = if of_own && !ring_systems.is_empty() {
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

    pub(super) fn workspace(&self) -> Vec<f64> {
        vec![0.0; self.model.workspace_len()]
    }
}

/// What may be used for the estimates of one molecule.
struct Knowledge<'a> {
    /// All measurements but those of the constitution.
    without_own: &'a Without<'a>,
    /// The measurements that the estimates may lean on.
    without: &'a Without<'a>,
    /// The measurements of the molecule itself that may be used.
    same: &'a [usize],
    /// What the case file states of it.
    case: &'a [CaseMeasurement],
}

/// An estimate's value with its uncertainty.
pub(super) fn quantity_of(estimate: &Estimate) -> Quantity {
    Quantity {
        value_kj_per_mol: estimate.value_kj_per_mol,
        u_kj_per_mol: estimate.u_kj_per_mol(),
        expanded_kj_per_mol: estimate.expanded_kj_per_mol(),
    }
}
