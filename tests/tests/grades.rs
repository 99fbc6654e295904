//! The grades keep what they promise: left out, estimates of a better grade are nearer to the measured value, and each grade's intervals cover.

use std::collections::BTreeMap;
use std::fs;

use serde::Deserialize;
use tautring_core::additivity::Grade;
use tautring_core::additivity::grade::{
    OFTEN, OUTSIDE_GROUPS, OUTSIDE_KJ_PER_MOL, OUTSIDE_LIKENESS, WELL_SUPPORTED_GROUPS,
    WELL_SUPPORTED_KJ_PER_MOL, WELL_SUPPORTED_LIKENESS,
};
use tautring_report::review::Reviewer;
use tautring_report::structure::{Structure, skeleton};
use tautring_tests::folder::top;
use tautring_tests::table::rows;

/// A line of `data/left_out.csv`; without a column for it, the phase is the gas.
#[derive(Deserialize)]
struct LeftOut {
    smiles: String,
    #[serde(default = "gas")]
    phase: String,
    error_kj_per_mol: f64,
    expanded_new_measurement_kj_per_mol: f64,
}

fn gas() -> String {
    "g".to_owned()
}

/// The grades of estimates, the surest first.
const ESTIMATED: [Grade; 3] = [Grade::WellSupported, Grade::Extrapolated, Grade::Outside];

/// Nominal coverage of the intervals.
const COVERAGE: f64 = 0.95;

/// Grades whose coverage is outside the region, with the reason. Listed ones must be outside, so that the list stays true.
const KNOWN_TO_BE_OFF: &[(Grade, &str)] = &[];

/// Left-out errors of one grade.
#[derive(Default)]
struct Errors {
    sizes: Vec<f64>,
    inside: usize,
}

impl Errors {
    fn median(&self) -> f64 {
        let mut sizes = self.sizes.clone();
        sizes.sort_by(f64::total_cmp);
        f64::midpoint(sizes[(sizes.len() - 1) / 2], sizes[sizes.len() / 2])
    }

    fn mean(&self) -> f64 {
        self.sizes.iter().sum::<f64>() / self.sizes.len() as f64
    }

    fn coverage(&self) -> f64 {
        self.inside as f64 / self.sizes.len() as f64
    }

    /// The line of README.md.
    fn line(&self, grade: Grade) -> String {
        format!(
            "| {} | {} | {:.2} | {:.2} | {:.1} % |",
            grade.name(),
            self.sizes.len(),
            self.median(),
            self.mean(),
            100.0 * self.coverage()
        )
    }
}

/// The counts between which a binomial variable lies with 99 % probability: at most 0.5 % below, at most 0.5 % above.
fn region(trials: usize, probability: f64) -> std::ops::RangeInclusive<usize> {
    let mut log_density = trials as f64 * (1.0 - probability).ln();
    let mut below = Vec::with_capacity(trials + 1);
    let mut sum = 0.0;
    for successes in 0..=trials {
        sum += log_density.exp();
        below.push(sum);
        let odds = probability / (1.0 - probability);
        log_density += ((trials - successes) as f64 / (successes + 1) as f64 * odds).ln();
    }
    let low = below.iter().position(|&sum| sum > 0.005).unwrap_or(0);
    let high = below.iter().position(|&sum| sum >= 0.995).unwrap_or(trials);
    low..=high
}

#[test]
fn the_region_is_that_of_the_binomial_distribution() {
    // Summed in exact fractions: the least counts whose cumulative probability reaches 0.005 and 0.995.
    assert_eq!(region(100, 0.95), 89..=100);
    assert_eq!(region(700, 0.95), 649..=679);
    assert_eq!(region(10, 0.5), 1..=9);
}

/// Left-out errors of the gas by the grade of the estimate that leaves the molecule out.
fn by_grade() -> BTreeMap<Grade, Errors> {
    let reviewer = Reviewer::new().expect("the data belong to the tables");
    let mut grades: BTreeMap<String, Grade> = BTreeMap::new();
    let mut found: BTreeMap<Grade, Errors> = BTreeMap::new();
    for line in rows::<LeftOut>(&top().join("data/left_out.csv")) {
        if line.phase != "g" {
            continue;
        }
        let structure = Structure::from_smiles(&line.smiles).expect(&line.smiles);
        let constitution = skeleton(&structure.molecule).expect(&line.smiles);
        let grade = *grades.entry(constitution).or_insert_with(|| {
            let support = reviewer.blind_support(&structure).expect(&line.smiles);
            Grade::of(&support)
        });
        let errors = found.entry(grade).or_default();
        let size = line.error_kj_per_mol.abs();
        errors.sizes.push(size);
        errors.inside += usize::from(size <= line.expanded_new_measurement_kj_per_mol);
    }
    found
}

#[test]
fn readme_defines_the_grades_by_the_numbers_in_use() {
    let readme = fs::read_to_string(top().join("README.md")).expect("README.md");
    let words: Vec<&str> = readme.split_whitespace().collect();
    let readme = words.join(" ");
    for said in [
        format!("U is at most {WELL_SUPPORTED_KJ_PER_MOL} kJ/mol"),
        format!(
            "{:.0} % of the groups in at least {OFTEN}",
            100.0 * WELL_SUPPORTED_GROUPS
        ),
        format!("a likeness of at least {WELL_SUPPORTED_LIKENESS}"),
        format!("fewer than {:.0} % of its groups", 100.0 * OUTSIDE_GROUPS),
        format!("a likeness of {OUTSIDE_LIKENESS}"),
        format!("U is above {OUTSIDE_KJ_PER_MOL} kJ/mol"),
    ] {
        assert!(readme.contains(&said), "README.md lacks `{said}`");
    }
}

#[test]
fn better_grades_have_smaller_errors_and_every_grade_covers() {
    let found = by_grade();
    let readme = fs::read_to_string(top().join("README.md")).expect("README.md");
    let table: Vec<String> = found.iter().map(|(g, errors)| errors.line(*g)).collect();
    println!("{}", table.join("\n"));

    assert!(found.keys().eq(&ESTIMATED), "{table:?}");
    let [well, extrapolated, outside] = ESTIMATED.map(|grade| &found[&grade]);
    // The sizes differ by factors, so a factor of 1.5 is far beyond what chance does to medians of dozens of errors.
    for (better, worse) in [(well, extrapolated), (extrapolated, outside)] {
        assert!(better.sizes.len() > 30, "{table:?}");
        assert!(1.5 * better.median() < worse.median(), "{table:?}");
        assert!(1.5 * better.mean() < worse.mean(), "{table:?}");
    }
    for (&grade, errors) in &found {
        let region = region(errors.sizes.len(), COVERAGE);
        let known = KNOWN_TO_BE_OFF.iter().any(|(off, _)| *off == grade);
        // Too wide is off the mark; too narrow would be a danger, and no list excuses that.
        assert!(
            errors.inside >= *region.start(),
            "{grade:?}: {} inside, {region:?} expected",
            errors.inside
        );
        assert_eq!(
            errors.inside > *region.end(),
            known,
            "{grade:?}: {} inside, {region:?} expected; correct KNOWN_TO_BE_OFF",
            errors.inside
        );
    }
    for line in table {
        assert!(readme.contains(&line), "README.md lacks\n{line}");
    }
}
