//! What `tautring estimate --json` promises other programs, on 500 varied structures.
//!
//! `tests/rdkit_varied.py` makes the reference file.

use serde::Deserialize;
use serde_json::Value;
use tautring_tests::folder::reference;
use tautring_tests::program::{Run, tautring};
use tautring_tests::table::rows;

#[derive(Deserialize)]
struct Row {
    smiles: String,
    kind: String,
    outcome: String,
    formula: String,
}

/// Structures that one run is given; a command line has a limit.
const PER_RUN: usize = 100;

/// Enthalpies and strains beyond this are no molecule's, kJ/mol: the largest of the data set is within ±4000.
const BELIEVABLE_KJ_PER_MOL: f64 = 20_000.0;

fn estimates(blind: bool) -> Vec<(Row, Value)> {
    let table: Vec<Row> = rows(&reference("varied.csv"));
    assert_eq!(table.len(), 500);
    let mut found = Vec::new();
    let mut given = table.into_iter().peekable();
    while given.peek().is_some() {
        let some: Vec<Row> = given.by_ref().take(PER_RUN).collect();
        let structures = some.iter().map(|row| row.smiles.as_str());
        let options: &[&str] = if blind {
            &["estimate", "--json", "--blind", "--"]
        } else {
            &["estimate", "--json", "--"]
        };
        let run = tautring(options.iter().copied().chain(structures));
        assert!(!run.panicked(), "{}", run.stderr);
        let refused = some.iter().any(|row| row.outcome == "refused");
        assert_eq!(run.code, if refused { 2 } else { 0 }, "{}", run.stderr);
        found.extend(some.into_iter().zip(lines(&run)));
    }
    assert_eq!(found.len(), 500, "one line for each structure");
    found
}

fn lines(run: &Run) -> Vec<Value> {
    let parse = |line| serde_json::from_str(line).unwrap_or_else(|e| panic!("{e}: {line}"));
    run.stdout.lines().map(parse).collect()
}

/// What is wrong with a line for a structure that is to be answered.
struct Complaints<'a> {
    line: &'a Value,
    found: Vec<String>,
}

impl<'a> Complaints<'a> {
    fn about(line: &'a Value) -> Self {
        Self {
            line,
            found: Vec::new(),
        }
    }

    fn demand(&mut self, holds: bool, what: &str) {
        if !holds {
            self.found.push(what.to_owned());
        }
    }

    /// The finite number at a path such as `/strain/j_per_g`.
    fn number(&mut self, path: &str) -> f64 {
        let number = self.line.pointer(path).and_then(Value::as_f64);
        self.demand(number.is_some_and(f64::is_finite), path);
        number.unwrap_or(0.0)
    }

    fn text(&mut self, path: &str) -> &'a str {
        let text = self.line.pointer(path).and_then(Value::as_str);
        self.demand(text.is_some_and(|text| !text.is_empty()), path);
        text.unwrap_or("")
    }

    fn list(&mut self, path: &str) -> &'a [Value] {
        let list = self.line.pointer(path).and_then(Value::as_array);
        self.demand(list.is_some(), path);
        list.map_or(&[], Vec::as_slice)
    }
}

/// Keys and types of `DESIGN` for what this version computes: the gas phase, strain, rings, evidence, flags.
fn complaints(row: &Row, line: &Value, blind: bool) -> Vec<String> {
    let mut c = Complaints::about(line);
    let formula = c.text("/formula");
    c.demand(
        formula == row.formula,
        &format!("formula {formula}, RDKit {}", row.formula),
    );
    let mass = c.number("/molar_mass_g_per_mol");
    c.demand(mass > 10.0, "a molar mass");
    let enthalpy = c.number("/enthalpy_of_formation/gas/value_kj_per_mol");
    c.demand(
        enthalpy.abs() < BELIEVABLE_KJ_PER_MOL,
        "a believable enthalpy",
    );
    let u = c.number("/enthalpy_of_formation/gas/u_kj_per_mol");
    c.demand(u > 0.0, "an uncertainty");
    let basis = c.text("/enthalpy_of_formation/gas/basis");
    let bases: &[&str] = if blind {
        &["estimated"]
    } else {
        &["measured", "estimated"]
    };
    c.demand(bases.contains(&basis), &format!("basis {basis}"));
    let grade = c.text("/enthalpy_of_formation/gas/grade");
    let grades: &[&str] = match basis {
        "measured" => &["measured"],
        _ => &["well supported", "extrapolated", "outside"],
    };
    c.demand(grades.contains(&grade), &format!("grade {grade}"));

    let strain = c.number("/strain/value_kj_per_mol");
    c.demand(
        c.line.pointer("/strain/u_kj_per_mol").is_some(),
        "/strain/u_kj_per_mol",
    );
    c.number("/strain/u_kj_per_mol");
    let per_gram = c.number("/strain/j_per_g");
    let expected = 1000.0 * strain / mass;
    c.demand(
        (per_gram - expected).abs() <= 1e-9 * expected.abs(),
        "strain per gram = strain / molar mass",
    );
    c.text("/strain/convention");
    for row in c.list("/strain_conventions") {
        let named = row["convention"].is_string() && row["note"].is_string();
        let both = row["value_kj_per_mol"].is_number() == row["u_kj_per_mol"].is_number();
        let positive = row["u_kj_per_mol"].as_f64().is_none_or(|u| u > 0.0);
        let reaction = row["reaction"].as_str();
        let arrow = reaction.is_none_or(|text| text.contains(" -> "));
        c.demand(named && both && positive && arrow, "strain_conventions[]");
    }

    for ring in c.list("/rings") {
        let atoms = ring["atoms"].as_array().map_or(0, Vec::len) as u64;
        let whole = ring["atoms"]
            .as_array()
            .is_some_and(|a| a.iter().all(Value::is_u64));
        c.demand(
            whole && atoms >= 3 && ring["size"] == atoms,
            "rings[].atoms, rings[].size",
        );
    }
    c.number("/oxygen_balance_percent");
    for key in ["value", "u"] {
        let found = c.number(&format!("/gas_entropy_j_per_mol_k/{key}"));
        c.demand(found > 0.0, "gas_entropy_j_per_mol_k");
    }
    let capacities = c.list("/gas_heat_capacity_j_per_mol_k");
    c.demand(capacities.len() == 5, "gas_heat_capacity_j_per_mol_k");
    for entry in capacities {
        let positive = |key: &str| entry[key].as_f64().is_some_and(|x| x > 0.0);
        let good = positive("temperature_k") && positive("value") && positive("u");
        c.demand(good, "gas_heat_capacity_j_per_mol_k[]");
    }
    let evidence = c.list("/evidence");
    c.demand(!evidence.is_empty(), "evidence");
    for entry in evidence {
        let good = entry["molecule"].is_string() && entry["source"].is_string();
        c.demand(
            good && entry["weight"].as_f64().is_some_and(f64::is_finite),
            "evidence[]",
        );
    }
    let weights: Vec<f64> = evidence
        .iter()
        .filter_map(|e| e["weight"].as_f64())
        .collect();
    c.demand(
        weights.is_sorted_by(|a, b| a.abs() >= b.abs()),
        "evidence by absolute weight",
    );
    for flag in c.list("/flags") {
        c.demand(flag.is_string(), "flags[]");
    }
    c.found
}

fn hold_the_contract(blind: bool) {
    let mut wrong = Vec::new();
    for (row, line) in estimates(blind) {
        assert_eq!(
            line["input"], row.smiles,
            "lines come in the order of the arguments"
        );
        let error = line.get("error").and_then(Value::as_str);
        let found = match (row.outcome.as_str(), error) {
            ("answered", None) => complaints(&row, &line, blind),
            ("answered", Some(error)) => vec![format!("refused: {error}")],
            (_, Some(error))
                if !error.is_empty() && line.get("enthalpy_of_formation").is_none() =>
            {
                continue;
            }
            _ => vec!["answered or left without a reason".to_owned()],
        };
        if !found.is_empty() {
            wrong.push(format!("{} ({}): {found:?}", row.smiles, row.kind));
        }
    }
    assert!(wrong.is_empty(), "{} of 500: {wrong:#?}", wrong.len());
}

#[test]
fn estimates_hold_the_contract() {
    hold_the_contract(false);
}

#[test]
fn blind_estimates_hold_the_contract() {
    hold_the_contract(true);
}

/// Without its own measurement cyclopropane is an estimate: another number, and less sure.
#[test]
fn blind_leaves_the_molecule_out() {
    let gas = |options: &[&str]| {
        let run = tautring(options);
        assert_eq!(run.code, 0, "{}", run.stderr);
        let line = lines(&run).remove(0);
        let number = |key| {
            line["enthalpy_of_formation"]["gas"][key]
                .as_f64()
                .expect("a number")
        };
        let named = line["evidence"].as_array().expect("a list").iter();
        let own = named.filter(|e| {
            e["molecule"]
                .as_str()
                .is_some_and(|m| m.eq_ignore_ascii_case("cyclopropane"))
        });
        (
            number("value_kj_per_mol"),
            number("u_kj_per_mol"),
            own.count(),
        )
    };
    let seen = gas(&["estimate", "--json", "C1CC1"]);
    let blind = gas(&["estimate", "--json", "--blind", "C1CC1"]);
    assert!(seen.2 >= 1 && blind.2 == 0, "{seen:?} {blind:?}");
    assert!(blind.1 > seen.1, "{seen:?} {blind:?}");
    assert!((blind.0 - seen.0).abs() > 1e-6, "{seen:?} {blind:?}");
}
