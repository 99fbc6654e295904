//! Misfits and doubts: the list is what the left-out errors say, and estimates that lean on a doubtful value say so.

use std::collections::BTreeMap;

use serde::Deserialize;
use serde_json::Value;
use tautring_report::fit::{LeftOutValue, MISFIT_DEVIATIONS, Misfit, misfits};
use tautring_report::review::LEANING_WEIGHT;
use tautring_tests::folder::top;
use tautring_tests::program::tautring;
use tautring_tests::table::rows;

/// A line of `data/left_out.csv`; without a column for it, the phase is the gas.
#[derive(Deserialize)]
struct LeftOut {
    name: String,
    smiles: String,
    #[serde(default = "gas")]
    phase: String,
    source: String,
    measured_kj_per_mol: f64,
    predicted_kj_per_mol: f64,
    u_kj_per_mol: f64,
}

fn gas() -> String {
    "g".to_owned()
}

#[derive(Deserialize)]
struct Measurement {
    smiles: String,
    phase: String,
    source: String,
    value_kj_per_mol: f64,
    u_kj_per_mol: f64,
}

/// Rounding of the tables to two decimals moves a deviation by no more than this, for u of 1 kJ/mol and more.
const ROUNDING: f64 = 0.05;

type Place = (String, String, String, u64);

fn left_out() -> Vec<LeftOutValue> {
    let place = |smiles: &str, phase: &str, source: &str, value: f64| -> Place {
        let words = [smiles, phase, source].map(str::to_owned);
        let [smiles, phase, source] = words;
        (smiles, phase, source, value.to_bits())
    };
    let u: BTreeMap<Place, f64> = rows::<Measurement>(&top().join("data/measurements.csv"))
        .into_iter()
        .map(|m| {
            let place = place(&m.smiles, &m.phase, &m.source, m.value_kj_per_mol);
            (place, m.u_kj_per_mol)
        })
        .collect();
    rows::<LeftOut>(&top().join("data/left_out.csv"))
        .into_iter()
        .map(|line| {
            let value = line.measured_kj_per_mol;
            let place = place(&line.smiles, &line.phase, &line.source, value);
            let u = u.get(&place);
            LeftOutValue {
                u_measured_kj_per_mol: *u.unwrap_or_else(|| panic!("no measurement {place:?}")),
                name: line.name,
                smiles: line.smiles,
                phase: line.phase,
                source: line.source,
                measured_kj_per_mol: line.measured_kj_per_mol,
                predicted_kj_per_mol: line.predicted_kj_per_mol,
                u_predicted_kj_per_mol: line.u_kj_per_mol,
            }
        })
        .collect()
}

fn listed() -> Vec<Misfit> {
    rows(&top().join("data/misfits.csv"))
}

#[test]
fn the_list_is_what_the_left_out_errors_say() {
    let of = |m: &Misfit| (m.smiles.clone(), m.phase.clone(), m.source.clone());
    let certain = |m: &&Misfit| m.standard_deviations.abs() > MISFIT_DEVIATIONS + ROUNDING;
    let said = misfits(left_out());
    let listed = listed();
    assert!(said.len() > 5, "{said:?}");
    for (some, others) in [(&said, &listed), (&listed, &said)] {
        for misfit in some.iter().filter(certain) {
            let other = others.iter().find(|other| of(other) == of(misfit));
            let other = other.unwrap_or_else(|| panic!("only in one of the lists: {misfit:?}"));
            let apart = other.standard_deviations - misfit.standard_deviations;
            let allowed = ROUNDING * misfit.standard_deviations.abs() / MISFIT_DEVIATIONS;
            assert!(apart.abs() <= allowed, "{other:?} and {misfit:?}");
        }
    }
    assert!(
        listed
            .iter()
            .all(|m| m.standard_deviations.abs() > MISFIT_DEVIATIONS)
    );
}

/// The gas estimates of structures.
fn estimates(structures: &[String], options: &[&str]) -> Vec<Value> {
    let structures = structures.iter().map(String::as_str);
    let options = ["estimate", "--json"].iter().chain(options).copied();
    let run = tautring(options.chain(["--"]).chain(structures));
    assert_eq!(run.code, 0, "{}", run.stderr);
    run.stdout
        .lines()
        .map(|line| serde_json::from_str(line).expect("JSON"))
        .collect()
}

fn flags(line: &Value) -> Vec<&str> {
    let flags = line["flags"].as_array().expect("a list");
    flags.iter().filter_map(Value::as_str).collect()
}

#[test]
fn a_misfit_itself_says_both_values() {
    let mut gas = listed();
    gas.retain(|m| m.phase == "g");
    let structures: Vec<String> = gas.iter().map(|m| m.smiles.clone()).collect();
    for (misfit, line) in gas.iter().zip(estimates(&structures, &[])) {
        let measured = format!(
            "{:.1} kJ/mol ({}, gas)",
            misfit.measured_kj_per_mol, misfit.source
        );
        let family = format!("{:.1}", misfit.predicted_kj_per_mol);
        let flags = flags(&line);
        let said = flags
            .iter()
            .any(|f| f.starts_with("misfit") && f.contains(&measured) && f.contains(&family));
        assert!(said, "{}: {flags:?}", misfit.name);
    }
    for (misfit, line) in gas.iter().zip(estimates(&structures, &["--blind"])) {
        let own = flags(&line).iter().any(|f| f.starts_with("misfit"));
        assert!(!own, "{}: left out, so nothing rests on it", misfit.name);
    }
}

#[test]
fn an_estimate_that_leans_on_a_misfit_or_a_doubtful_value_says_so() {
    // Relatives of measured molecules that are misfits or in the list of contradictions: an ester, a hexene, a norbornadiene.
    let structures = [
        "CCCCCOC=O",
        "CC(C)(C)C=CCCC",
        "CC12C=CC(C1)C=C2",
        "CC12CCC(C1)C=C2",
        "FC(F)CCF",
        "c1cnnc(C)c1",
    ]
    .map(str::to_owned);
    let mut warned = 0;
    for line in estimates(&structures, &["--blind"]) {
        let flags = flags(&line);
        for row in line["evidence"].as_array().expect("a list") {
            let leaning = row["weight"].as_f64().expect("a weight").abs() >= LEANING_WEIGHT;
            let name = row["molecule"].as_str().expect("a name");
            let warning = |word: &str| {
                let mut about = flags.iter().filter(|flag| flag.starts_with(word));
                about.any(|flag| flag.contains(name))
            };
            let misfit = !row["misfit"].is_null();
            let doubtful = row["doubts"].as_array().is_some_and(|d| !d.is_empty());
            assert!(
                !(leaning && misfit) || warning("leans on a misfit"),
                "{name}"
            );
            assert!(
                !(leaning && doubtful) || warning("leans on doubtful"),
                "{name}"
            );
            warned += usize::from(leaning && (misfit || doubtful));
        }
    }
    assert!(
        warned > 2,
        "{warned} doubtful measurements behind these estimates"
    );
}

#[test]
fn curated_doubts_are_told_of_the_molecule_and_of_what_leans_on_it() {
    let norbornadiene = &estimates(&["C1C2C=CC1C=C2".to_owned()], &[])[0];
    for word in [
        "published gas values disagree",
        "outlier",
        "phases disagree",
    ] {
        let said = flags(norbornadiene).iter().any(|flag| {
            flag.starts_with("doubtful data of the molecule itself") && flag.contains(word)
        });
        assert!(said, "{word}: {norbornadiene}");
    }
    let butane = &estimates(&["CCCC".to_owned()], &[])[0];
    assert!(flags(butane).is_empty(), "{butane}");
}
