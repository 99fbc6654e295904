//! The generated tables: what the core needs of the fits.

use std::collections::BTreeMap;
use std::error::Error;
use std::fmt::Write as _;

use tautring_core::additivity::thermal::WHOLE;
use tautring_core::additivity::{Key, Level};

use super::measured::{Published, Quantity};
use super::search::Posterior;
use crate::fit::compact::{factor_of, most_telling};

/// How many measurements the uncertainties rest on; more would cost flash and lower them little.
pub const TELLING_MEASUREMENTS: usize = 150;

/// The Rust file of the core from the fits of both quantities.
///
/// # Errors
/// A count that the tables cannot hold, or a covariance that is not positive definite.
pub fn generated(fits: &[(&Published, &Posterior)]) -> Result<String, Box<dyn Error>> {
    let mut source = String::from(
        "//! Generated from `data/` by `cargo run --release --bin tautring-fit-thermal`; not edited by hand.\n\n#![cfg_attr(rustfmt, rustfmt_skip)]\n\nuse super::{Telling, ThermalModel, ThermalPrior};\n\n",
    );
    let _ = writeln!(
        source,
        "const _: () = assert!(super::super::Level::ALL.len() == {});\n",
        Level::ALL.len()
    );
    for (data, posterior) in fits {
        write(&mut source, data, posterior)?;
    }
    Ok(source)
}

fn write(
    source: &mut String,
    data: &Published,
    posterior: &Posterior,
) -> Result<(), Box<dyn Error>> {
    let name = match data.quantity {
        Quantity::Entropy => "ENTROPY",
        Quantity::HeatCapacity => "HEAT_CAPACITY",
    };
    let width = data.width();
    let prior = &posterior.prior;
    let mut columns: BTreeMap<Key, Vec<(usize, f64)>> = BTreeMap::new();
    for (row, published) in data.rows.iter().enumerate() {
        for term in published.features.terms() {
            columns.entry(term.key).or_default().push((row, term.count));
        }
    }
    let coefficient = |variance: f64, column: &[(usize, f64)]| -> Vec<f32> {
        let of = |alpha: &Vec<f64>| -> f64 {
            let sum: f64 = column.iter().map(|&(row, count)| count * alpha[row]).sum();
            variance * sum
        };
        posterior.alpha.iter().map(|a| of(a) as f32).collect()
    };
    let mut whole = Vec::new();
    for count in 0..WHOLE {
        let column: Vec<(usize, f64)> = data
            .rows
            .iter()
            .enumerate()
            .map(|(row, r)| (row, r.features.whole()[count]))
            .collect();
        let variance = prior.whole_j_per_mol_k[count].powi(2);
        let as_printed = coefficient(variance, &column).into_iter().map(f64::from);
        whole.push(as_printed.collect::<Vec<_>>());
    }
    let taken = most_telling(&posterior.covariance, data.rows.len(), TELLING_MEASUREMENTS);
    let number: BTreeMap<usize, usize> = taken.iter().copied().zip(0..).collect();
    let factor = factor_of(&posterior.covariance, &taken)?;
    let (mut starts, mut rows, mut counts) = (vec![0], Vec::new(), Vec::new());
    for column in columns.values() {
        for (row, count) in column {
            if let Some(&row) = number.get(row) {
                if count.fract() != 0.0 || !(0.0..=255.0).contains(count) {
                    return Err(format!("a feature counted {count} times").into());
                }
                rows.push(u8::try_from(row)?);
                counts.push(*count as u8);
            }
        }
        starts.push(u16::try_from(rows.len())?);
    }
    let _ = writeln!(
        source,
        "/// How many measurements the uncertainty of `{name}` rests on.\npub(super) const {name}_ROWS: usize = {};\n",
        taken.len()
    );
    let keys = columns.keys().map(|k| format!("{:#018x}", k.bits()));
    array(source, name, "KEYS", "u64", 6, keys);
    let coefficients = columns
        .iter()
        .map(|(key, column)| format!("{:?}", coefficient(prior.variance(*key), column)));
    array(
        source,
        name,
        "COEFFICIENTS",
        &format!("[f32; {width}]"),
        2,
        coefficients,
    );
    array(
        source,
        name,
        "STARTS",
        "u16",
        24,
        starts.iter().map(u16::to_string),
    );
    array(
        source,
        name,
        "ENTRY_ROWS",
        "u8",
        40,
        rows.iter().map(u8::to_string),
    );
    array(
        source,
        name,
        "COUNTS",
        "u8",
        40,
        counts.iter().map(u8::to_string),
    );
    let of_whole = taken
        .iter()
        .map(|&row| format!("{:?}", data.rows[row].features.whole()));
    array(
        source,
        name,
        "WHOLE",
        &format!("[f64; {WHOLE}]"),
        4,
        of_whole,
    );
    array(
        source,
        name,
        "FACTOR",
        "f64",
        6,
        factor.iter().map(|x| format!("{x:?}")),
    );
    let _ = writeln!(
        source,
        "pub(super) const {name}: ThermalModel<'static, {width}> = ThermalModel {{\n    prior: ThermalPrior {{\n        tau_j_per_mol_k: {:?},\n        whole_j_per_mol_k: {:?},\n        deviation_j_per_mol_k: {:?},\n        degrees_of_freedom: {:?},\n    }},\n    keys: &{name}_KEYS,\n    coefficients: &{name}_COEFFICIENTS,\n    whole: {whole:?},\n    symmetry_j_per_mol_k: {:?},\n    shape: {:?},\n    telling: Telling {{\n        starts: &{name}_STARTS,\n        rows: &{name}_ENTRY_ROWS,\n        counts: &{name}_COUNTS,\n        whole: &{name}_WHOLE,\n        factor: &{name}_FACTOR,\n    }},\n}};\n",
        prior.tau_j_per_mol_k,
        prior.whole_j_per_mol_k,
        prior.deviation_j_per_mol_k,
        prior.degrees_of_freedom,
        posterior.symmetry_j_per_mol_k,
        posterior.shape,
    );
    Ok(())
}

fn array(
    source: &mut String,
    quantity: &str,
    name: &str,
    kind: &str,
    per_line: usize,
    items: impl Iterator<Item = String>,
) {
    let items: Vec<String> = items.collect();
    let _ = writeln!(
        source,
        "static {quantity}_{name}: [{kind}; {}] = [",
        items.len()
    );
    for line in items.chunks(per_line) {
        let _ = writeln!(source, "    {},", line.join(", "));
    }
    source.push_str("];\n\n");
}
