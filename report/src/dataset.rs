//! The published measurements: what the model was fitted to, and what its estimates are traced back to.

use std::collections::BTreeMap;
use std::fmt;

use serde::Deserialize;
use tautring_core::additivity::{Features, count};
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
    /// Phase: g, l or s.
    pub phase: String,
    /// Enthalpy of formation at 298.15 K, kJ/mol.
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

/// A measurement with its counted features.
pub struct Row {
    /// What the source says.
    pub measurement: Measurement,
    /// Counted features.
    pub features: HostFeatures,
    /// The value, kJ/mol.
    pub value_kj_per_mol: f64,
    /// Standard uncertainty, kJ/mol.
    pub u_kj_per_mol: f64,
    /// The molecule, stereo included.
    pub molecule: usize,
    /// The molecule without stereo: what is left out together.
    pub constitution: usize,
    /// Canonical text of the molecule; mirror images are one.
    pub identity: String,
    /// Canonical text of the molecule without stereo and isotopes.
    pub skeleton: String,
    /// The structure.
    pub structure: Structure,
}

/// All measurements of one phase that the fit uses.
pub struct Dataset {
    /// The measurements in the order of the file.
    pub rows: Vec<Row>,
    /// For each molecule the indices of its measurements.
    pub molecules: Vec<Vec<usize>>,
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
    /// Reads the rows of one phase that are marked for the fit.
    ///
    /// # Errors
    /// The first row that cannot be read or counted.
    pub fn read(csv_text: &str, phase: &str) -> Result<Self, DatasetError> {
        let mut data = Self {
            rows: Vec::new(),
            molecules: Vec::new(),
            constitutions: Vec::new(),
        };
        let mut molecules = BTreeMap::new();
        let mut constitutions = BTreeMap::new();
        let mut reader = csv::Reader::from_reader(csv_text.as_bytes());
        for (index, record) in reader.deserialize::<Measurement>().enumerate() {
            let line = index + 2;
            let fail = |name: &str, reason: String| DatasetError {
                line,
                name: name.to_owned(),
                reason,
            };
            let measurement = record.map_err(|e| fail("", e.to_string()))?;
            if measurement.usage != "fit" || measurement.phase != phase {
                continue;
            }
            let structure = Structure::from_smiles(&measurement.smiles)
                .map_err(|e| fail(&measurement.name, e.to_string()))?;
            let features: HostFeatures =
                count(&structure.molecule).map_err(|e| fail(&measurement.name, e.to_string()))?;
            let row = data.rows.len();
            let spoilt = |e: MoleculeError| fail(&measurement.name, e.to_string());
            let identity = diastereomer(&structure.molecule).map_err(spoilt)?;
            let skeleton = skeleton(&structure.molecule).map_err(spoilt)?;
            let molecule = assign(&mut molecules, &identity, &mut data.molecules, row);
            let constitution = assign(&mut constitutions, &skeleton, &mut data.constitutions, row);
            data.rows.push(Row {
                value_kj_per_mol: measurement.value_kj_per_mol,
                u_kj_per_mol: measurement.u_kj_per_mol,
                measurement,
                features,
                molecule,
                constitution,
                identity,
                skeleton,
                structure,
            });
        }
        Ok(data)
    }
}

/// The number of the set that `key` names, with `row` added to it.
fn assign(
    known: &mut BTreeMap<String, usize>,
    key: &str,
    sets: &mut Vec<Vec<usize>>,
    row: usize,
) -> usize {
    let set = *known.entry(key.to_owned()).or_insert_with(|| {
        sets.push(Vec::new());
        sets.len() - 1
    });
    sets[set].push(row);
    set
}
