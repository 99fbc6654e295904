//! Evidence: every estimate lists the measurements that carry it, with how each is like the molecule.

use serde_json::Value;
use tautring_tests::program::tautring;

/// Share of the absolute weight that the evidence carries at least.
const SHARE: f64 = 0.8;

fn estimate(smiles: &str, options: &[&str]) -> Value {
    let options = ["estimate", "--json"].iter().chain(options).copied();
    let run = tautring(options.chain(["--", smiles]));
    assert_eq!(run.code, 0, "{}", run.stderr);
    serde_json::from_str(run.stdout.trim()).expect("JSON")
}

fn evidence(line: &Value) -> &[Value] {
    line["evidence"].as_array().expect("a list")
}

fn number(value: &Value) -> f64 {
    value
        .as_f64()
        .unwrap_or_else(|| panic!("no number: {value}"))
}

#[test]
fn the_evidence_carries_its_share_and_not_one_measurement_more() {
    for smiles in ["C1CO1", "CCCCCC", "O=C1CC12CC2", "c1ccccc1C#N"] {
        let line = estimate(smiles, &["--blind"]);
        let shares: Vec<f64> = evidence(&line)
            .iter()
            .map(|row| number(&row["share"]))
            .collect();
        let sum: f64 = shares.iter().sum();
        assert!(
            (sum - number(&line["evidence_share"])).abs() < 1e-9,
            "{smiles}"
        );
        assert!(sum >= SHARE, "{smiles}: {sum}");
        assert!(sum - shares.last().expect("evidence") < SHARE, "{smiles}");
        assert!(shares.is_sorted_by(|a, b| a >= b), "{smiles}");
        for row in evidence(&line) {
            assert!(number(&row["u_kj_per_mol"]) > 0.0);
            assert!(row["source"].is_string() && row["phase"].is_string());
            let words = row["resemblance"]["words"].as_str().expect("words");
            assert!(!words.is_empty(), "{row}");
            let overall = number(&row["resemblance"]["overall"]);
            assert!((0.0..=1.0).contains(&overall), "{row}");
        }
    }
}

#[test]
fn likeness_is_in_the_words_of_a_chemist() {
    // Each pair of molecules was looked at: which groups (heavy atom with its neighbours) and rings of the first has the second?
    let words = |smiles: &str, measured: &str, options: &[&str]| {
        let line = estimate(smiles, options);
        let row = evidence(&line).iter().find(|row| row["smiles"] == measured);
        let row = row.unwrap_or_else(|| panic!("{smiles} does not lean on {measured}"));
        row["resemblance"]["words"]
            .as_str()
            .expect("words")
            .to_owned()
    };
    // Ethyloxirane and methyloxirane: ring CH2, O and CH carry over; CH2 and CH3 of the ethyl group, the CH3 as C-(C)(H)3.
    assert_eq!(
        words("CCC1CO1", "CC1CO1", &["--blind"]),
        "same ring, 4 of 5 groups"
    );
    assert_eq!(words("CC1CO1", "CC1CO1", &[]), "the molecule itself");
}

#[test]
fn grades_go_from_measured_to_outside() {
    for (smiles, options, grade) in [
        ("C1CO1", &[][..], "measured"),
        // A homologue of measured chains, longer than any of them in the gas.
        ("CCCCCCCCCCCCCCCCCCC(C)C", &["--blind"], "well supported"),
        // Cubane: nothing like it but itself.
        ("C12C3C4C1C5C2C3C45", &["--blind"], "outside"),
        // No arsenic-free exotic: a boron-iodine bond that no measured molecule has.
        ("CB(I)I", &[], "outside"),
    ] {
        let line = estimate(smiles, options);
        let gas = &line["enthalpy_of_formation"]["gas"];
        assert_eq!(gas["grade"], grade, "{smiles}: {}", gas["support"]);
        let flagged = line["flags"].as_array().expect("a list").iter();
        let flagged = flagged.filter_map(Value::as_str);
        let outside = flagged
            .filter(|flag| flag.starts_with("outside the data"))
            .count();
        assert_eq!(outside, usize::from(grade == "outside"), "{smiles}");
    }
}
