//! The published measurements: what the model was fitted to, and what its estimates are traced back to.

use std::collections::BTreeMap;
use std::fmt;

use serde::Deserialize;
use tautring_core::additivity::{Features, Property, count};
use tautring_core::molecule::MoleculeError;

use crate::structure::{Structure, diastereomer, skeleton};

/// Features of a molecule as large as the host reads.
pub type HostFeatures = Features<4096>;

/// One row of `data/measurements.csv`.
#[derive(Clone, Debug, Deserialize)]
pub struct Measurement {
    /// Name of the compound as its source gives it.
    pub name: String,
    /// Structure.
    pub smiles: String,
    /// What was measured: the enthalpy of formation of the gas (g), liquid (l) or solid (s), of vaporisation (v), of sublimation (b).
    pub phase: String,
    /// The enthalpy at 298.15 K, kJ/mol.
    pub value_kj_per_mol: f64,
    /// Standard uncertainty, kJ/mol.
    pub u_kj_per_mol: f64,
    /// Bibliography key.
    pub source: String,
    /// Kind of source.
    pub kind: String,
    /// `fit`, or why the row is not used in the fit.
    #[serde(rename = "use")]
    pub usage: String,
}

/// A measurement that the fit uses.
pub struct Row {
    /// What the source says.
    pub measurement: Measurement,
    /// What was measured.
    pub property: Property,
    /// The molecule, stereo included, by its number in [`Dataset::molecules`].
    pub molecule: usize,
    /// The molecule without stereo by its number in [`Dataset::constitutions`]: what is left out together.
    pub constitution: usize,
}

/// A measured molecule.
pub struct KnownMolecule {
    /// The structure.
    pub structure: Structure,
    /// Counted features of its gas-phase enthalpy of formation.
    pub features: Box<HostFeatures>,
    /// Canonical text of the molecule; mirror images are one.
    pub identity: String,
    /// Canonical text of the molecule without stereo and isotopes.
    pub skeleton: String,
    /// The indices of its measurements.
    pub rows: Vec<usize>,
}

/// All measurements that the fit uses.
///
/// An enthalpy of vaporisation or sublimation is used where it leads from a phase with an enthalpy of formation to one without. Where both
/// phases were measured, their difference says it already.
pub struct Dataset {
    /// The measurements in the order of the file.
    pub rows: Vec<Row>,
    /// The measured molecules.
    pub molecules: Vec<KnownMolecule>,
    /// For each constitution the indices of its measurements.
    pub constitutions: Vec<Vec<usize>>,
}

/// A row that cannot be used, and why.
#[derive(Debug)]
pub struct DatasetError {
    /// Line of the file, the header being line 1.
    pub line: usize,
    /// Name of the compound.
    pub name: String,
    /// What is wrong.
    pub reason: String,
}

impl fmt::Display for DatasetError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(
            f,
            "data/measurements.csv line {} ({}): {}",
            self.line, self.name, self.reason
        )
    }
}

impl std::error::Error for DatasetError {}

impl Dataset {
    /// Reads the rows that are marked for the fit.
    ///
    /// # Errors
    /// The first row that cannot be read or counted.
    pub fn read(csv_text: &str) -> Result<Self, DatasetError> {
        let mut fitted = Vec::new();
        // Equal texts of structures in the file mean the same molecule.
        let mut formation: BTreeMap<String, Vec<Property>> = BTreeMap::new();
        let mut reader = csv::Reader::from_reader(csv_text.as_bytes());
        for (index, record) in reader.deserialize::<Measurement>().enumerate() {
            let line = index + 2;
            let measurement = record.map_err(|e| failure(line, "", e))?;
            if measurement.usage != "fit" {
                continue;
            }
            let property = Property::from_letter(&measurement.phase).ok_or_else(|| {
                let reason = format!(
                    "there is no phase `{}`; write g, l, s, v or b",
                    measurement.phase
                );
                failure(line, &measurement.name, reason)
            })?;
            if condensed_phase(property).is_none() {
                let phases = formation.entry(measurement.smiles.clone()).or_default();
                phases.push(property);
            }
            fitted.push((line, property, measurement));
        }
        let mut data = Self {
            rows: Vec::new(),
            molecules: Vec::new(),
            constitutions: Vec::new(),
        };
        let mut molecules = BTreeMap::new();
        let mut constitutions = BTreeMap::new();
        for (line, property, measurement) in fitted {
            if let Some(condensed) = condensed_phase(property) {
                let phases = formation.get(&measurement.smiles);
                let known = |phase| phases.is_some_and(|p| p.contains(&phase));
                if known(Property::Gas) == known(condensed) {
                    continue;
                }
            }
            let fail = |reason: String| failure(line, &measurement.name, reason);
            let structure =
                Structure::from_smiles(&measurement.smiles).map_err(|e| fail(e.to_string()))?;
            let spoilt = |e: MoleculeError| fail(e.to_string());
            let identity = diastereomer(&structure.molecule).map_err(spoilt)?;
            let skeleton = skeleton(&structure.molecule).map_err(spoilt)?;
            let row = data.rows.len();
            let constitution = *constitutions.entry(skeleton.clone()).or_insert_with(|| {
                data.constitutions.push(Vec::new());
                data.constitutions.len() - 1
            });
            data.constitutions[constitution].push(row);
            let molecule = if let Some(&molecule) = molecules.get(&identity) {
                molecule
            } else {
                let features = count(&structure.molecule).map_err(|e| fail(e.to_string()))?;
                molecules.insert(identity.clone(), data.molecules.len());
                data.molecules.push(KnownMolecule {
                    structure,
                    features: Box::new(features),
                    identity,
                    skeleton,
                    rows: Vec::new(),
                });
                data.molecules.len() - 1
            };
            data.molecules[molecule].rows.push(row);
            data.rows.push(Row {
                measurement,
                property,
                molecule,
                constitution,
            });
        }
        Ok(data)
    }

    /// The molecule of a measurement.
    pub fn molecule_of(&self, row: &Row) -> &KnownMolecule {
        &self.molecules[row.molecule]
    }
}

/// For a step to the gas: the phase that it starts from.
fn condensed_phase(property: Property) -> Option<Property> {
    match property {
        Property::Vaporisation => Some(Property::Liquid),
        Property::Sublimation => Some(Property::Solid),
        Property::Gas | Property::Liquid | Property::Solid => None,
    }
}

fn failure(line: usize, name: &str, reason: impl fmt::Display) -> DatasetError {
    DatasetError {
        line,
        name: name.to_owned(),
        reason: reason.to_string(),
    }
}
