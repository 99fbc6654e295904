//! The generated tables: what the core needs of a fit.

use std::collections::BTreeMap;
use std::fmt::Write as _;

use tautring_core::additivity::{Key, Level, Model, Prior};

use super::inference::Posterior;
use crate::dataset::Dataset;

/// The parts of a [`Model`], owned.
pub struct Tables {
    prior: Prior,
    keys: Vec<u64>,
    duals: Vec<f64>,
    starts: Vec<u32>,
    rows: Vec<u16>,
    counts: Vec<u8>,
    values: Vec<f64>,
    factor: Vec<[u8; 8]>,
}

/// A feature that the tables cannot hold.
#[derive(Debug)]
pub struct TableError {
    row: usize,
    count: f64,
}

impl std::fmt::Display for TableError {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(
            f,
            "measurement {} counts a feature {} times; the tables hold whole numbers up to 255 in at most 65,536 measurements",
            self.row, self.count
        )
    }
}

impl std::error::Error for TableError {}

impl Tables {
    /// Collects the tables.
    ///
    /// # Errors
    /// A count that is no whole number up to 255.
    pub fn new(data: &Dataset, posterior: &Posterior) -> Result<Self, TableError> {
        let mut columns: BTreeMap<Key, Vec<(u16, u8)>> = BTreeMap::new();
        for (i, row) in data.rows.iter().enumerate() {
            for term in row.features.terms() {
                let fail = TableError {
                    row: i,
                    count: term.count,
                };
                if term.count.fract() != 0.0 || !(0.0..=255.0).contains(&term.count) {
                    return Err(fail);
                }
                let index = u16::try_from(i).map_err(|_| fail)?;
                columns
                    .entry(term.key)
                    .or_default()
                    .push((index, term.count as u8));
            }
        }
        let mut tables = Self {
            prior: posterior.prior,
            keys: columns.keys().map(|k| k.bits()).collect(),
            duals: Vec::new(),
            starts: vec![0],
            rows: Vec::new(),
            counts: Vec::new(),
            values: data.rows.iter().map(|r| r.value_kj_per_mol).collect(),
            factor: posterior.factor.iter().map(|x| x.to_le_bytes()).collect(),
        };
        for entries in columns.values() {
            let dual = entries.iter().fold(0.0, |sum, &(row, count)| {
                sum + f64::from(count) * posterior.alpha[usize::from(row)]
            });
            tables.duals.push(dual);
            tables.rows.extend(entries.iter().map(|e| e.0));
            tables.counts.extend(entries.iter().map(|e| e.1));
            tables.starts.push(tables.rows.len() as u32);
        }
        Ok(tables)
    }

    /// The tables as the core reads them.
    pub fn model(&self) -> Model<'_> {
        Model {
            prior: self.prior,
            keys: &self.keys,
            duals: &self.duals,
            starts: &self.starts,
            rows: &self.rows,
            counts: &self.counts,
            values: &self.values,
            factor: &self.factor,
        }
    }

    /// The factor as little-endian bytes.
    pub fn factor_bytes(&self) -> &[u8] {
        self.factor.as_flattened()
    }

    /// The tables, but for the factor, as a Rust file of the core.
    pub fn rust_source(&self) -> String {
        let mut source = String::from(
            "//! Generated from `data/` by `cargo run --release --bin tautring-fit`; not edited by hand.\n\n",
        );
        source.push_str("#![cfg_attr(rustfmt, rustfmt_skip)]\n\n");
        source.push_str("use crate::additivity::{Level, Prior};\n\n");
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
        array(
            &mut source,
            "DUALS",
            "f64",
            "For each key the sum of count times dual weight",
            6,
            self.duals.iter().map(|d| format!("{d:?}")),
        );
        array(
            &mut source,
            "STARTS",
            "u32",
            "Where each key's entries start",
            20,
            self.starts.iter().map(u32::to_string),
        );
        array(
            &mut source,
            "ROWS",
            "u16",
            "Measurements in which the keys occur",
            26,
            self.rows.iter().map(u16::to_string),
        );
        array(
            &mut source,
            "COUNTS",
            "u8",
            "How often they occur",
            40,
            self.counts.iter().map(u8::to_string),
        );
        array(
            &mut source,
            "VALUES",
            "f64",
            "Measured values, kJ/mol",
            14,
            self.values.iter().map(|v| format!("{v:?}")),
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
