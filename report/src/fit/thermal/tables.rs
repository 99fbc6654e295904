//! The generated tables: what the core needs of the fits.

use std::collections::BTreeMap;
use std::error::Error;
use std::fmt::Write as _;

use tautring_core::additivity::thermal::WHOLE;
use tautring_core::additivity::{Key, Level};

use super::measured::{Published, Quantity};
use super::search::Posterior;
use super::telling::Telling;

/// The Rust file of the core from the fits of both quantities.
///
/// # Errors
/// A count that the tables cannot hold, or a covariance that is not positive definite.
pub fn generated(fits: &[(&Published, &Posterior, &Telling)]) -> Result<String, Box<dyn Error>> {
    let mut source = String::from(
        "//! Generated from `data/` by `cargo run --release --bin tautring-fit-thermal`; not edited by hand.\n\n#![cfg_attr(rustfmt, rustfmt_skip)]\n\nuse super::{Telling, ThermalModel, ThermalPrior};\n\n",
    );
    let _ = writeln!(
        source,
        "const _: () = assert!(super::super::Level::ALL.len() == {});\n",
        Level::ALL.len()
    );
    for (data, posterior, telling) in fits {
        write(&mut source, data, posterior, telling)?;
    }
    Ok(source)
}

/// For each key the rows that count it, and how often.
type Columns = BTreeMap<Key, Vec<(usize, f64)>>;

fn write(
    source: &mut String,
    data: &Published,
    posterior: &Posterior,
    telling: &Telling,
) -> Result<(), Box<dyn Error>> {
    let name = match data.quantity {
        Quantity::Entropy => "ENTROPY",
        Quantity::HeatCapacity => "HEAT_CAPACITY",
    };
    let width = data.width();
    let prior = &posterior.prior;
    let mut columns = Columns::new();
    for (row, published) in data.rows.iter().enumerate() {
        for term in published.features.terms() {
            columns.entry(term.key).or_default().push((row, term.count));
        }
    }
    let entries = Entries::new(&columns, telling)?;
    let _ = writeln!(
        source,
        "/// How many measurements the uncertainty of `{name}` rests on.\npub(super) const {name}_ROWS: usize = {};\n",
        telling.rows.len()
    );
    let mut put = |what: &str, kind: &str, per_line: usize, items: Vec<String>| {
        array(source, &format!("{name}_{what}"), kind, per_line, &items);
    };
    let keys = columns.keys().map(|k| format!("{:#018x}", k.bits()));
    put("KEYS", "u64", 6, keys.collect());
    let of_keys = columns.iter().map(|(key, column)| {
        let variance = prior.variance(*key);
        format!("{:?}", coefficients(posterior, variance, column))
    });
    let kind = format!("[f32; {width}]");
    put("COEFFICIENTS", &kind, 2, of_keys.collect());
    put("STARTS", "u16", 24, texts(&entries.starts));
    put("ENTRY_ROWS", "u8", 40, texts(&entries.rows));
    put("COUNTS", "u8", 40, texts(&entries.counts));
    let kept = telling.rows.iter();
    let of_whole = kept.map(|&row| format!("{:?}", data.rows[row].features.whole()));
    let kind = format!("[f64; {WHOLE}]");
    put("WHOLE", &kind, 4, of_whole.collect());
    let factor = telling.factor.iter().map(|x| format!("{x:?}"));
    put("FACTOR", "f64", 6, factor.collect());
    let whole = whole(data, posterior);
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

/// The contribution of a feature at each temperature: its prior covariance with the values, times their dual weights.
fn coefficients(posterior: &Posterior, variance: f64, column: &[(usize, f64)]) -> Vec<f32> {
    let of = |alpha: &Vec<f64>| -> f64 {
        let sum: f64 = column.iter().map(|&(row, count)| count * alpha[row]).sum();
        variance * sum
    };
    posterior.alpha.iter().map(|a| of(a) as f32).collect()
}

/// The same for the counts of the whole molecule.
fn whole(data: &Published, posterior: &Posterior) -> Vec<Vec<f64>> {
    let of = |count: usize| {
        let rows = data.rows.iter().enumerate();
        let column: Vec<(usize, f64)> = rows
            .map(|(row, r)| (row, r.features.whole()[count]))
            .collect();
        let variance = posterior.prior.whole_j_per_mol_k[count].powi(2);
        let printed = coefficients(posterior, variance, &column);
        printed.into_iter().map(f64::from).collect()
    };
    (0..WHOLE).map(of).collect()
}

/// Which of the measurements kept count each key, and how often.
struct Entries {
    starts: Vec<u16>,
    rows: Vec<u8>,
    counts: Vec<u8>,
}

impl Entries {
    fn new(columns: &Columns, telling: &Telling) -> Result<Self, Box<dyn Error>> {
        let number: BTreeMap<usize, usize> = telling.rows.iter().copied().zip(0..).collect();
        let mut entries = Self {
            starts: vec![0],
            rows: Vec::new(),
            counts: Vec::new(),
        };
        for column in columns.values() {
            for (row, count) in column {
                let Some(&row) = number.get(row) else {
                    continue;
                };
                if count.fract() != 0.0 || !(0.0..=255.0).contains(count) {
                    return Err(format!("a feature counted {count} times").into());
                }
                entries.rows.push(u8::try_from(row)?);
                entries.counts.push(*count as u8);
            }
            entries.starts.push(u16::try_from(entries.rows.len())?);
        }
        Ok(entries)
    }
}

fn texts<T: ToString>(numbers: &[T]) -> Vec<String> {
    numbers.iter().map(T::to_string).collect()
}

fn array(source: &mut String, name: &str, kind: &str, per_line: usize, items: &[String]) {
    let _ = writeln!(source, "static {name}: [{kind}; {}] = [", items.len());
    for line in items.chunks(per_line) {
        let _ = writeln!(source, "    {},", line.join(", "));
    }
    source.push_str("];\n\n");
}
