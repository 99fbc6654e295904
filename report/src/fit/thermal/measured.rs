//! The published values: rows of `data/gas_entropies.csv` and `data/gas_heat_capacities.csv` that the fit uses.

use std::collections::BTreeMap;

use tautring_core::additivity::thermal::{TEMPERATURES_K, ThermalFeatures};

use crate::structure::{Structure, skeleton};

/// Features of a molecule as large as the host reads.
type HostFeatures = ThermalFeatures<4096>;

/// What is fitted.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Quantity {
    /// Standard entropy at 298.15 K.
    Entropy,
    /// Heat capacity at [`TEMPERATURES_K`].
    HeatCapacity,
}

impl Quantity {
    /// The columns of its table that hold the values.
    const fn columns(self) -> &'static [&'static str] {
        match self {
            Self::Entropy => &["s_298_j_per_mol_k"],
            Self::HeatCapacity => &[
                "cp_298_j_per_mol_k",
                "cp_400_j_per_mol_k",
                "cp_500_j_per_mol_k",
                "cp_600_j_per_mol_k",
                "cp_800_j_per_mol_k",
            ],
        }
    }

    /// The name of each column in print.
    pub fn names(self) -> Vec<String> {
        match self {
            Self::Entropy => vec!["entropy, 298.15 K".to_owned()],
            Self::HeatCapacity => TEMPERATURES_K
                .iter()
                .map(|t| format!("heat capacity, {t} K"))
                .collect(),
        }
    }
}

/// One published row.
pub struct PublishedRow {
    /// Name of the compound.
    pub name: String,
    /// The structure.
    pub structure: Structure,
    /// What is counted of it.
    pub features: Box<HostFeatures>,
    /// The values, J/(mol K).
    pub values: Vec<f64>,
    /// Their standard uncertainty, J/(mol K).
    pub u_j_per_mol_k: f64,
}

/// The rows of one quantity.
pub struct Published {
    /// Which.
    pub quantity: Quantity,
    /// The rows in the order of the file.
    pub rows: Vec<PublishedRow>,
    /// For each constitution the indices of its rows: what is left out together.
    pub constitutions: Vec<Vec<usize>>,
    /// Rows that the file would have fitted but that lack a temperature.
    pub incomplete: usize,
}

impl Published {
    /// Reads the rows that are marked for the fit and hold every temperature.
    ///
    /// # Errors
    /// The first row that cannot be read or counted, with its line.
    pub fn read(quantity: Quantity, csv_text: &str) -> Result<Self, Box<dyn std::error::Error>> {
        let mut published = Self {
            quantity,
            rows: Vec::new(),
            constitutions: Vec::new(),
            incomplete: 0,
        };
        let mut constitutions: BTreeMap<String, usize> = BTreeMap::new();
        let mut reader = csv::Reader::from_reader(csv_text.as_bytes());
        for (index, record) in reader.deserialize::<BTreeMap<String, String>>().enumerate() {
            let line = index + 2;
            let record = record.map_err(|e| format!("line {line}: {e}"))?;
            let cell = |name: &str| record.get(name).map_or("", String::as_str);
            let fail = |reason: &dyn std::fmt::Display| format!("line {line}: {reason}");
            if cell("use") != "fit" {
                continue;
            }
            let columns = quantity.columns();
            if columns.iter().any(|column| cell(column).is_empty()) {
                published.incomplete += 1;
                continue;
            }
            let number = |name: &str| -> Result<f64, String> {
                cell(name)
                    .parse()
                    .map_err(|_| fail(&format!("`{}` is no number", cell(name))))
            };
            let structure = Structure::from_smiles(cell("smiles")).map_err(|e| fail(&e))?;
            let features = HostFeatures::of(&structure.molecule).map_err(|e| fail(&e))?;
            let plain = skeleton(&structure.molecule).map_err(|e| fail(&e))?;
            let next = published.constitutions.len();
            let constitution = *constitutions.entry(plain).or_insert(next);
            if constitution == next {
                published.constitutions.push(Vec::new());
            }
            published.constitutions[constitution].push(published.rows.len());
            published.rows.push(PublishedRow {
                name: cell("name").to_owned(),
                structure,
                features: Box::new(features),
                values: columns
                    .iter()
                    .map(|column| number(column))
                    .collect::<Result<_, _>>()?,
                u_j_per_mol_k: number("u_j_per_mol_k")?,
            });
        }
        Ok(published)
    }

    /// How many values a row has.
    pub const fn width(&self) -> usize {
        self.quantity.columns().len()
    }
}
