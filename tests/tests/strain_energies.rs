//! Strain energies by each convention against the published ones of `data/checks/strain_energies.csv`.
//!
//! Each row states its convention in words; [`CONVENTIONS`] says which of ours that is. Agreement is a band of plausibility: most rows
//! were recalled, not read, and the enthalpies behind them have been revised since.

use std::collections::BTreeMap;

use serde::Deserialize;
use tautring_report::review::{Quantity, Reviewer, SubstanceReview};
use tautring_report::structure::Structure;
use tautring_tests::folder::top;
use tautring_tests::table::rows;

#[derive(Deserialize)]
struct Row {
    molecule: String,
    smiles: String,
    #[serde(rename = "value_kJ_mol")]
    value_kj_per_mol: f64,
    convention: String,
    memory: String,
}

/// A convention of ours that a published value can have.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
enum Ours {
    GroupIncrement,
    Homologous,
    /// The homologous CH2 increment with cyclohexane as its zero.
    HomologousFromCyclohexane,
    Isodesmic,
    Homodesmotic,
}

/// How a convention of the table begins, which of ours it is, and why; `None` for one that we do not compute.
const CONVENTIONS: &[(&str, Option<Ours>, &str)] = &[
    (
        "combustion enthalpy per CH2 minus cyclohexane value",
        Some(Ours::HomologousFromCyclohexane),
        "n times a CH2 that is a sixth of cyclohexane",
    ),
    (
        "conventional, gas phase, n x unstrained CH2",
        Some(Ours::Homologous),
        "n times the CH2 of n-alkanes",
    ),
    (
        "enthalpy of formation minus three acyclic CH2",
        Some(Ours::Homologous),
        "n times the CH2 of n-alkanes",
    ),
    (
        "group-additivity ring correction",
        Some(Ours::GroupIncrement),
        "what the ring adds to the sum of groups",
    ),
    (
        "Hf(g,298) minus sum of Benson-type acyclic increments",
        Some(Ours::GroupIncrement),
        "the same, worked out by the collectors of the table, not published",
    ),
    (
        "conventional (Franklin/Wiberg)",
        Some(Ours::GroupIncrement),
        "enthalpy of formation minus Franklin's group increments",
    ),
    (
        "conventional, partly computed",
        Some(Ours::GroupIncrement),
        "the same with computed enthalpies of formation",
    ),
    (
        "conventional, ab initio QCISD(T)",
        Some(Ours::GroupIncrement),
        "the same with a computed enthalpy of formation",
    ),
    (
        "homodesmotic, computed",
        Some(Ours::Homodesmotic),
        "the reaction of the same name with computed energies",
    ),
    (
        "single-conformation strain-free increments",
        None,
        "increments of one conformation without gauche interactions: another zero, 4 to 6 kJ/mol above group increments for each C6",
    ),
];

/// Largest median difference of all rows, kJ/mol. Printed tables of one convention differ by 1 to 4 among themselves: increments of -20.6
/// and -20.7 for CH2, gauche terms in or out, enthalpies of formation that were revised.
const MEDIAN_KJ_PER_MOL: f64 = 4.0;

/// Largest median difference by convention, kJ/mol, with the reason.
const MEDIANS_KJ_PER_MOL: &[(Ours, f64, &str)] = &[
    (Ours::GroupIncrement, 4.0, "as for all rows"),
    (
        Ours::Homologous,
        1.0,
        "the CH2 of the n-alkanes is known to 0.1, a ring has up to eight",
    ),
    (
        Ours::HomologousFromCyclohexane,
        2.5,
        "printed to whole kcal/mol and kJ/mol; heats of combustion to 0.4 per CH2",
    ),
    (
        Ours::Homodesmotic,
        6.0,
        "three recalled rows with computed energies, against measured enthalpies that scatter by 10 (norbornene) and 35 (norbornadiene)",
    ),
];

/// Reactions whose enthalpy was published: molecule, convention, strain in kcal/mol, source.
const BY_REACTION: &[(&str, Ours, f64, &str)] = &[
    (
        "C1CC1",
        Ours::Homodesmotic,
        27.7,
        "Wodrich et al., Chem. Eur. J. 13 (2007) 7731, read as quoted on a page that discusses it",
    ),
    (
        "C1CC1",
        Ours::Isodesmic,
        19.2,
        "the same paper, from memory",
    ),
];

/// Largest difference from these, kJ/mol: enthalpies at 0 K and 298 K differ by 1 to 2, the figures are rounded to 0.1 kcal/mol.
const BY_REACTION_KJ_PER_MOL: f64 = 2.5;

const KJ_PER_KCAL: f64 = 4.184;

fn of(review: &SubstanceReview, ours: Ours) -> Option<Quantity> {
    let name = match ours {
        Ours::GroupIncrement => "group increment",
        Ours::Homologous | Ours::HomologousFromCyclohexane => "homologous CH2 increment",
        Ours::Isodesmic => "isodesmic (bond separation)",
        Ours::Homodesmotic => "homodesmotic",
    };
    let mut rows = review.strain_conventions.iter();
    rows.find(|row| row.convention == name)?.quantity
}

struct Bench {
    reviewer: Reviewer,
    cyclohexane: f64,
}

impl Bench {
    fn new() -> Self {
        let mut bench = Self {
            reviewer: Reviewer::new().unwrap_or_else(|e| panic!("{e}")),
            cyclohexane: 0.0,
        };
        bench.cyclohexane = bench
            .strain("C1CCCCC1", Ours::Homologous, false)
            .unwrap_or(f64::NAN);
        bench
    }

    fn strain(&self, smiles: &str, ours: Ours, blind: bool) -> Option<f64> {
        let structure = Structure::from_smiles(smiles).unwrap_or_else(|e| panic!("{smiles}: {e}"));
        let review = self.reviewer.review(smiles, &structure, &[], blind);
        let review = review.unwrap_or_else(|e| panic!("{smiles}: {e}"));
        let strain = of(&review, ours)?.value_kj_per_mol;
        let size = structure.molecule.atoms().len() as f64;
        Some(match ours {
            Ours::HomologousFromCyclohexane => strain - size / 6.0 * self.cyclohexane,
            _ => strain,
        })
    }
}

fn median(differences: &mut [f64]) -> f64 {
    differences.sort_by(f64::total_cmp);
    let n = differences.len();
    f64::midpoint(differences[(n - 1) / 2], differences[n / 2])
}

#[test]
fn published_strain_energies_of_the_same_convention_are_met() {
    let bench = Bench::new();
    let mut differences: BTreeMap<(String, bool), Vec<f64>> = BTreeMap::new();
    let mut by_convention: BTreeMap<Ours, Vec<f64>> = BTreeMap::new();
    let mut compared: [Vec<f64>; 2] = [Vec::new(), Vec::new()];
    println!("molecule | published | ours | without its own measurements | convention, as printed");
    for row in rows::<Row>(&top().join("data/checks/strain_energies.csv")) {
        let known = CONVENTIONS
            .iter()
            .find(|(text, ..)| row.convention.starts_with(text));
        let (text, ours, _) = known.unwrap_or_else(|| panic!("map `{}`", row.convention));
        let Some(ours) = *ours else { continue };
        let values = [false, true].map(|blind| bench.strain(&row.smiles, ours, blind));
        let [Some(value), Some(blind)] = values else {
            panic!("{}: no strain by {ours:?}", row.molecule);
        };
        println!(
            "{} | {:.1} | {value:.1} | {blind:.1} | {}",
            row.molecule, row.value_kj_per_mol, row.convention
        );
        let seen = if row.memory == "no" {
            "read"
        } else {
            "recalled"
        };
        for (kind, found) in [value, blind].into_iter().enumerate() {
            let difference = (found - row.value_kj_per_mol).abs();
            compared[kind].push(difference);
            if kind == 0 {
                by_convention.entry(ours).or_default().push(difference);
            }
            for key in [format!("{ours:?}, {text} ({seen})"), format!("{ours:?}")] {
                differences
                    .entry((key, kind == 1))
                    .or_default()
                    .push(difference);
            }
        }
    }
    for ((key, blind), mut values) in differences {
        let n = values.len();
        let blind = if blind {
            "without its own measurements, "
        } else {
            ""
        };
        println!(
            "{blind}{key}: median {:.2} kJ/mol, n = {n}",
            median(&mut values)
        );
    }
    let [mut used, mut blind] = compared;
    println!(
        "all, without its own measurements: median {:.2} kJ/mol",
        median(&mut blind)
    );
    let all = median(&mut used);
    println!("all: median {all:.2} kJ/mol, n = {}", used.len());
    assert!(used.len() >= 100, "{} rows", used.len());
    assert!(all <= MEDIAN_KJ_PER_MOL, "median {all:.2} kJ/mol");
    assert_eq!(by_convention.len(), MEDIANS_KJ_PER_MOL.len());
    for (ours, bound, reason) in MEDIANS_KJ_PER_MOL {
        let found = by_convention.get_mut(ours).map_or(f64::NAN, |d| median(d));
        assert!(
            found <= *bound,
            "{ours:?}: {found:.2} over {bound} ({reason})"
        );
    }
}

#[test]
fn published_enthalpies_of_reactions_are_met() {
    let bench = Bench::new();
    for &(smiles, ours, kcal, source) in BY_REACTION {
        let found = bench.strain(smiles, ours, false).unwrap_or(f64::NAN);
        let published = kcal * KJ_PER_KCAL;
        println!("{smiles} {ours:?}: {found:.1}, published {published:.1} kJ/mol ({source})");
        assert!(
            (found - published).abs() <= BY_REACTION_KJ_PER_MOL,
            "{smiles} {ours:?}"
        );
    }
}

#[test]
fn conventions_agree_where_their_zeros_do() {
    let bench = Bench::new();
    for size in 3..=8 {
        let smiles = format!("C1{}C1", "C".repeat(size - 2));
        let homologous = bench
            .strain(&smiles, Ours::Homologous, false)
            .unwrap_or(f64::NAN);
        let group = bench
            .strain(&smiles, Ours::GroupIncrement, false)
            .unwrap_or(f64::NAN);
        // Both take n CH2 away; group increments are sums of several levels, the step of a long chain is one difference of them.
        assert!(
            (homologous - group).abs() <= 0.2 * size as f64,
            "{smiles}: {homologous} {group}"
        );
    }
}
