//! Published values against what the program computes: every row of `data/check_values.csv` and its tolerance.
//!
//! The values, their sources and the reasons of their tolerances stand in the table; `data/README.md` tells how they came about.

use serde::Deserialize;
use tautring_report::review::{CheckOutcome, Reviewer, check_values};
use tautring_tests::folder::top;
use tautring_tests::program::tautring;
use tautring_tests::table::rows;

/// Rows that are known to be off, each with the reason. A row that has come right must leave this list.
const KNOWN_TO_BE_OFF: &[(&str, &str)] = &[];

#[derive(Deserialize)]
struct Row {
    id: String,
    tolerance: f64,
    tolerance_reason: String,
    source: String,
    source_seen: String,
}

fn table() -> Vec<Row> {
    rows(&top().join("data/check_values.csv"))
}

#[test]
fn every_value_has_a_source_and_a_reason_for_its_tolerance() {
    for row in table() {
        let sourced = !row.source.is_empty() || row.source_seen == "common practice";
        assert!(sourced, "{}: no source", row.id);
        assert!(row.tolerance_reason.len() > 10, "{}: no reason", row.id);
        assert!(row.tolerance > 0.0, "{}: no tolerance", row.id);
    }
}

#[test]
fn published_values_are_met() {
    let reviewer = Reviewer::new().unwrap_or_else(|e| panic!("{e}"));
    let checked = check_values(&reviewer).unwrap_or_else(|e| panic!("{e}"));
    assert_eq!(checked.len(), table().len());
    let mut wrong = Vec::new();
    for value in checked {
        println!(
            "{}: {:.3} for {} ± {:.3} {}",
            value.id, value.computed, value.published, value.tolerance, value.unit
        );
        let off = value.outcome == CheckOutcome::Off;
        if off != KNOWN_TO_BE_OFF.iter().any(|(id, _)| *id == value.id) {
            wrong.push(format!(
                "{}: {} instead of {} ± {} {}",
                value.id, value.computed, value.published, value.tolerance, value.unit
            ));
        }
    }
    assert!(wrong.is_empty(), "{wrong:#?}");
}

/// `verify` says the same by its exit code, and names every row.
#[test]
fn verify_says_so() {
    let run = tautring(["verify"]);
    assert!(!run.panicked(), "{}", run.stderr);
    let expected = i32::from(!KNOWN_TO_BE_OFF.is_empty());
    assert_eq!(run.code, expected, "{}\n{}", run.stdout, run.stderr);
    for row in table() {
        assert!(
            run.stdout.contains(&row.id),
            "{} is not named:\n{}",
            row.id,
            run.stdout
        );
    }
}
