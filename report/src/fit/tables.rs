//! The generated tables: what the core needs of a fit.

use std::collections::BTreeMap;
use std::fmt::Write as _;

use tautring_core::additivity::{
    AdditivityError, Covariance, Key, Level, Model, Part, Prior, Property,
};

use super::compact::{COMPACT_MEASUREMENTS, factor_of, most_telling};
use super::inference::Posterior;
use crate::dataset::Dataset;

/// The parts of a [`Model`], owned.
pub struct Tables {
    prior: Prior,
    keys: Vec<u64>,
    duals: [Vec<f64>; Part::ALL.len()],
    full: Entries,
    compact: Entries,
    values: Vec<f64>,
    deviations: Vec<[f32; Part::ALL.len()]>,
}

/// The parts of a [`Covariance`], owned.
struct Entries {
    starts: Vec<u32>,
    molecules: Vec<u16>,
    counts: Vec<u8>,
    rows: Vec<(u16, Property)>,
    molecule_count: usize,
    factor: Vec<[u8; 8]>,
}

/// A feature that the tables cannot hold.
#[derive(Debug)]
pub struct TableError {
    molecule: usize,
    count: f64,
}

impl std::fmt::Display for TableError {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(
            f,
            "molecule {} counts a feature {} times; the tables hold whole numbers up to 255 in at most 65,536 molecules",
            self.molecule, self.count
        )
    }
}

impl std::error::Error for TableError {}

/// For each key the molecules that count it, and how often.
type Columns = BTreeMap<Key, Vec<(u16, u8)>>;

impl Entries {
    /// The entries of some molecules, which are numbered anew in the order of `chosen`.
    fn new(
        columns: &Columns,
        chosen: &[usize],
        rows: Vec<(u16, Property)>,
        factor: &[f64],
    ) -> Self {
        let number: BTreeMap<usize, u16> = chosen.iter().copied().zip(0..).collect();
        let mut entries = Self {
            starts: vec![0],
            molecules: Vec::new(),
            counts: Vec::new(),
            rows,
            molecule_count: chosen.len(),
            factor: factor.iter().map(|x| x.to_le_bytes()).collect(),
        };
        for column in columns.values() {
            for &(molecule, count) in column {
                if let Some(&number) = number.get(&usize::from(molecule)) {
                    entries.molecules.push(number);
                    entries.counts.push(count);
                }
            }
            entries.starts.push(entries.molecules.len() as u32);
        }
        entries
    }

    fn covariance(&self) -> Covariance<'_> {
        Covariance {
            starts: &self.starts,
            molecules: &self.molecules,
            counts: &self.counts,
            rows: &self.rows,
            molecule_count: self.molecule_count,
            factor: &self.factor,
        }
    }

    fn write(&self, source: &mut String, prefix: &str) {
        let _ = writeln!(
            source,
            "/// How many molecules there are.\npub(super) const {prefix}MOLECULE_COUNT: usize = {};\n",
            self.molecule_count
        );
        array(
            source,
            &format!("{prefix}STARTS"),
            "u32",
            "Where each key's entries start",
            20,
            self.starts.iter().map(u32::to_string),
        );
        array(
            source,
            &format!("{prefix}MOLECULES"),
            "u16",
            "Molecules in which the keys occur",
            26,
            self.molecules.iter().map(u16::to_string),
        );
        array(
            source,
            &format!("{prefix}COUNTS"),
            "u8",
            "How often they occur",
            40,
            self.counts.iter().map(u8::to_string),
        );
        array(
            source,
            &format!("{prefix}ROWS"),
            "(u16, Property)",
            "What was measured",
            8,
            self.rows.iter().map(|(m, p)| format!("({m}, {p:?})")),
        );
    }
}

impl Tables {
    /// Collects the tables.
    ///
    /// # Errors
    /// A count that is no whole number up to 255.
    pub fn new(data: &Dataset, posterior: &Posterior) -> Result<Self, Box<dyn std::error::Error>> {
        let columns = columns(data)?;
        let duals = Part::ALL.map(|part| {
            let mut of_molecule = vec![0.0; data.molecules.len()];
            for (row, alpha) in data.rows.iter().zip(&posterior.alpha) {
                let coefficient = row.property.coefficients()[part as usize];
                of_molecule[row.molecule] += coefficient * alpha;
            }
            let dual = |column: &Vec<(u16, u8)>| {
                column.iter().fold(0.0, |sum, &(molecule, count)| {
                    sum + f64::from(count) * of_molecule[usize::from(molecule)]
                })
            };
            columns.values().map(dual).collect()
        });
        let all: Vec<usize> = (0..data.molecules.len()).collect();
        let rows = data.rows.iter().map(|r| (r.molecule as u16, r.property));
        let full = Entries::new(&columns, &all, rows.collect(), &posterior.factor);
        let compact = compact(data, posterior, &columns)?;
        let tables = Self {
            prior: posterior.prior,
            keys: columns.keys().map(|k| k.bits()).collect(),
            duals,
            full,
            compact,
            values: data
                .rows
                .iter()
                .map(|r| r.measurement.value_kj_per_mol)
                .collect(),
            deviations: posterior
                .deviation_variance
                .iter()
                .map(|by_part| by_part.map(|v| v as f32))
                .collect(),
        };
        Ok(tables)
    }

    /// The tables as the core reads them.
    pub fn model(&self) -> Model<'_> {
        let [gas, vaporisation, fusion] = &self.duals;
        Model {
            prior: self.prior,
            keys: &self.keys,
            duals: [gas, vaporisation, fusion],
            covariance: self.full.covariance(),
            compact: self.compact.covariance(),
            values: &self.values,
            deviations: &self.deviations,
        }
    }

    /// The factor of all measurements as little-endian bytes.
    pub fn factor_bytes(&self) -> &[u8] {
        self.full.factor.as_flattened()
    }

    /// The factor of the compact covariance as little-endian bytes.
    pub fn compact_factor_bytes(&self) -> &[u8] {
        self.compact.factor.as_flattened()
    }

    /// The tables, but for the factor, as a Rust file of the core.
    pub fn rust_source(&self) -> String {
        let mut source = String::from(
            "//! Generated from `data/` by `cargo run --release --bin tautring-fit`; not edited by hand.\n\n",
        );
        source.push_str("#![cfg_attr(rustfmt, rustfmt_skip)]\n\n");
        source.push_str("use crate::additivity::Property::{self, Gas, Liquid, Solid, Sublimation, Vaporisation};\nuse crate::additivity::{Level, Prior};\n\n");
        let _ = writeln!(
            source,
            "/// The fitted prior.\npub(super) const PRIOR: Prior = Prior {{\n    tau_kj_per_mol: {:?},\n    ring_width: {:?},\n    deviation_kj_per_mol: {:?},\n    degrees_of_freedom: {:?},\n}};\n\nconst _: () = assert!(Level::ALL.len() == {});\n",
            self.prior.tau_kj_per_mol,
            self.prior.ring_width,
            self.prior.deviation_kj_per_mol,
            self.prior.degrees_of_freedom,
            Level::ALL.len(),
        );
        array(
            &mut source,
            "KEYS",
            "u64",
            "Keys of the measured features",
            6,
            self.keys.iter().map(|k| format!("{k:#018x}")),
        );
        let names = ["GAS_DUALS", "VAPORISATION_DUALS", "FUSION_DUALS"];
        for (name, duals) in names.into_iter().zip(&self.duals) {
            array(
                &mut source,
                name,
                "f64",
                "For each key the sum of coefficient times count times dual weight",
                6,
                duals.iter().map(|d| format!("{d:?}")),
            );
        }
        for (prefix, entries) in [("", &self.full), ("COMPACT_", &self.compact)] {
            entries.write(&mut source, prefix);
        }
        array(
            &mut source,
            "VALUES",
            "f64",
            "Measured values, kJ/mol",
            14,
            self.values.iter().map(|v| format!("{v:?}")),
        );
        array(
            &mut source,
            "DEVIATIONS",
            "[f32; 3]",
            "Variance of each molecule's deviation by part, kJ²/mol²",
            4,
            self.deviations.iter().map(|v| format!("{v:?}")),
        );
        source
    }
}

fn array(
    source: &mut String,
    name: &str,
    kind: &str,
    doc: &str,
    per_line: usize,
    items: impl ExactSizeIterator<Item = String>,
) {
    let _ = writeln!(
        source,
        "/// {doc}.\npub(super) static {name}: [{kind}; {}] = [",
        items.len()
    );
    let items: Vec<String> = items.collect();
    for line in items.chunks(per_line) {
        let _ = writeln!(source, "    {},", line.join(", "));
    }
    source.push_str("];\n\n");
}

/// For each key the molecules that count it.
fn columns(data: &Dataset) -> Result<Columns, TableError> {
    let mut columns = Columns::new();
    for (molecule, known) in data.molecules.iter().enumerate() {
        for term in known.features.terms() {
            let fail = TableError {
                molecule,
                count: term.count,
            };
            if term.count.fract() != 0.0 || !(0.0..=255.0).contains(&term.count) {
                return Err(fail);
            }
            let index = u16::try_from(molecule).map_err(|_| fail)?;
            let column = columns.entry(term.key).or_default();
            column.push((index, term.count as u8));
        }
    }
    Ok(columns)
}

/// The measurements that the compact covariance keeps, with their molecules.
fn compact(
    data: &Dataset,
    posterior: &Posterior,
    columns: &Columns,
) -> Result<Entries, AdditivityError> {
    let taken = most_telling(&posterior.covariance, data.rows.len(), COMPACT_MEASUREMENTS);
    let mut molecules: Vec<usize> = taken.iter().map(|&i| data.rows[i].molecule).collect();
    molecules.sort_unstable();
    molecules.dedup();
    let place = |molecule: usize| molecules.partition_point(|&m| m < molecule) as u16;
    let rows = taken
        .iter()
        .map(|&i| (place(data.rows[i].molecule), data.rows[i].property))
        .collect();
    let factor = factor_of(&posterior.covariance, &taken)?;
    Ok(Entries::new(columns, &molecules, rows, &factor))
}
