//! Whole reports, written and read back. The numbers are invented: only the writing is tested.

use std::fs;

use tautring_core::additivity::{Grade, Share, Support};

use super::{contract, html, json, markdown, write_all};
use crate::document::{Digest, Entry, Header, Inputs, Particulars, RingReference, Stated, report};
use crate::review::{
    Agreement, Basis, CheckOutcome, CheckValue, Comparison, ConventionStrain, Evidence,
    FormationEnthalpy, MeasuredEnthalpy, Participant, Quantity, Resemblance, RingStrain, Sameness,
    Strain, SubstanceReview,
};
use crate::structure::Structure;

fn quantity(value_kj_per_mol: f64, u_kj_per_mol: f64) -> Quantity {
    Quantity {
        value_kj_per_mol,
        u_kj_per_mol,
        expanded_kj_per_mol: 2.5 * u_kj_per_mol,
    }
}

fn comparison(measured: f64, agreement: Agreement, from_case: bool) -> Comparison {
    let blind = quantity(54.9, 1.8);
    Comparison {
        measured: MeasuredEnthalpy {
            quantity: quantity(measured, 0.3),
            source: if from_case {
                "Laboratory | report *7*"
            } else {
                "crc2014"
            }
            .to_owned(),
            from_case,
        },
        blind,
        difference_kj_per_mol: measured - blind.value_kj_per_mol,
        expanded_difference_kj_per_mol: 3.9,
        agreement,
        settled_by: (agreement == Agreement::Settled)
            .then(|| "The safety office: wrong sample.".to_owned()),
        keeps_estimate: true,
    }
}

fn convention(convention: &'static str, reaction: Option<&str>) -> ConventionStrain {
    ConventionStrain {
        convention,
        atoms: vec![0, 1, 2],
        reaction: reaction.map(str::to_owned),
        quantity: reaction.map(|_| quantity(115.5, 0.6)),
        estimate: reaction.map(|_| quantity(120.4, 4.5)),
        basis: reaction.map(|_| Basis::Measured),
        participants: vec![Participant {
            number: -3,
            smiles: "CC".to_owned(),
            formula: "C2H6".to_owned(),
            name: Some("Ethane".to_owned()),
            basis: Basis::Measured,
            measured: Some(quantity(-84.0, 0.1)),
            source: Some("crc2014".to_owned()),
        }],
        note: "a note".to_owned(),
    }
}

const fn share(shared: f64, of: f64) -> Share {
    Share { shared, of }
}

const fn support() -> Support {
    Support {
        composition: share(9.0, 9.0),
        groups: share(3.0, 3.0),
        groups_often: share(3.0, 3.0),
        aromatic_rings: share(0.0, 0.0),
        ring_sizes: share(1.0, 1.0),
        ring_atoms: share(6.0, 6.0),
        ring_environment: share(0.0, 0.0),
        closest: 0.8,
        expanded_kj_per_mol: 1.9,
    }
}

fn formation(comparisons: Vec<Comparison>) -> FormationEnthalpy {
    FormationEnthalpy {
        quantity: quantity(53.52, 0.3),
        carried_from: None,
        basis: if comparisons.is_empty() {
            Basis::Estimated
        } else {
            Basis::Measured
        },
        grade: if comparisons.is_empty() {
            Grade::WellSupported
        } else {
            Grade::Measured
        },
        support: support(),
        estimate: quantity(53.9, 0.7),
        comparisons,
        evidence: vec![Evidence {
            molecule: "Methylcyclopropane <cis>".to_owned(),
            smiles: "CC1CC1".to_owned(),
            weight: -0.412,
            share: 0.81,
            phase: "g".to_owned(),
            value_kj_per_mol: 24.3,
            u_kj_per_mol: 0.9,
            source: "crc2014".to_owned(),
            resemblance: Resemblance {
                sameness: Sameness::Another,
                words: "same ring, 2 of 3 groups".to_owned(),
                overall: 0.8,
                groups: share(2.0, 3.0),
                neighbours: share(3.0, 3.0),
                aromatic_rings: share(0.0, 0.0),
                ring_sizes: share(1.0, 1.0),
                ring_atoms: share(6.0, 6.0),
                ring_environment: share(0.0, 0.0),
            },
            left_out_error_kj_per_mol: Some(-2.34),
            misfit: None,
            doubts: vec!["two sources | differ".to_owned()],
        }],
        evidence_share: 0.81,
    }
}

fn review(name: &str, smiles: &str, comparisons: Vec<Comparison>) -> SubstanceReview {
    let structure = Structure::from_smiles(smiles).unwrap();
    let rings: Vec<Vec<usize>> = structure
        .molecule
        .rings()
        .iter()
        .map(|ring| ring.iter().copied().map(usize::from).collect())
        .collect();
    let mut atoms = rings.concat();
    atoms.sort_unstable();
    atoms.dedup();
    SubstanceReview {
        name: name.to_owned(),
        input: smiles.to_owned(),
        formula: "C3H6".to_owned(),
        molar_mass_g_per_mol: 42.081,
        oxygen_balance_percent: -342.2,
        gas: formation(comparisons),
        liquid: formation(Vec::new()),
        solid: formation(Vec::new()),
        gas_thermal: None,
        strain: Strain {
            quantity: quantity(115.6, 1.3),
            value_kcal_per_mol: 27.63,
            j_per_g: 2747.0,
            u_j_per_g: 31.0,
            expanded_j_per_g: 77.0,
            convention: "group increments, sum of the ring levels",
            ring_levels: quantity(115.2, 1.0),
            ring_systems: vec![RingStrain {
                atoms,
                sizes: rings.iter().map(Vec::len).collect(),
                quantity: quantity(115.6, 1.3),
            }],
        },
        strain_conventions: vec![
            convention("homodesmotic", Some("C1CC1 + 3 CC -> 3 CCC")),
            convention("homologous CH2 increment", None),
        ],
        rings,
        flags: vec!["No measured condensed-phase value.".to_owned()],
        structure,
    }
}

fn sample() -> Inputs {
    let cyclopropane = review(
        "Cyclopropane",
        "C1CC1",
        vec![
            comparison(53.5, Agreement::Agrees, false),
            comparison(70.0, Agreement::Disagrees, true),
            comparison(20.0, Agreement::Settled, true),
        ],
    );
    let cubane = review("Cubane", "C12C3C4C1C5C2C3C45", Vec::new());
    let entry = |name: &str, finding| Entry {
        particulars: Particulars {
            substance: name.to_owned(),
            facts: vec![("Amount".to_owned(), "1.2 kg".to_owned())],
            measured: vec![Stated {
                quantity: "heat released on decomposition".to_owned(),
                value: "1200 J/g".to_owned(),
                uncertainty: None,
                source: "Laboratory".to_owned(),
                note: None,
                compared: false,
            }],
            notes: Some("Kept *cold*.".to_owned()),
            ..Particulars::default()
        },
        finding,
    };
    Inputs {
        header: Header {
            title: "Ring <openings> & others".to_owned(),
            reference: "T-1".to_owned(),
            date: "2026-03-01".to_owned(),
            author: "A. Writer".to_owned(),
            revision: "2".to_owned(),
            notes: Some(
                "# Loud\n\n<script>alert(1)</script>\n\n[x](javascript:alert(1))".to_owned(),
            ),
        },
        entries: vec![
            entry("Cyclopropane", Ok(cyclopropane)),
            entry("Cubane", Ok(cubane)),
            entry("Ammonia", Err("no carbon".to_owned())),
        ],
        checks: vec![CheckValue {
            id: "strain-cyclopropane".to_owned(),
            quantity: "strain energy".to_owned(),
            subject: "C1CC1".to_owned(),
            published: 115.0,
            unit: "kJ/mol".to_owned(),
            computed: 117.9,
            tolerance: 2.5,
            tolerance_reason: "rounded to the nearest 5".to_owned(),
            source: "goldbook-s06037".to_owned(),
            source_seen: "yes".to_owned(),
            outcome: CheckOutcome::Off,
        }],
        monocycles: vec![RingReference {
            size: 4,
            strain_kj_per_mol: 110.0,
            expanded_kj_per_mol: 1.0,
            source: "crc2014".to_owned(),
        }],
        digests: vec![Digest::new("case file", b"title")],
        versions: vec![("tautring".to_owned(), "0.1.0".to_owned())],
    }
}

#[test]
fn the_same_inputs_give_the_same_bytes() {
    let folders = [(); 2].map(|()| {
        let sample = sample();
        let folder = tempfile::tempdir().unwrap();
        let files = write_all(&report(&sample), &sample, folder.path()).unwrap();
        assert!(files.iter().all(|file| file.starts_with(folder.path())));
        let contents: Vec<_> = files
            .iter()
            .map(|file| {
                (
                    file.strip_prefix(folder.path()).unwrap().to_owned(),
                    fs::read(file).unwrap(),
                )
            })
            .collect();
        // Nothing temporary stays behind.
        let left = fs::read_dir(folder.path()).unwrap().count()
            + fs::read_dir(folder.path().join("figures")).unwrap().count();
        assert_eq!(left, files.len() + 1);
        contents
    });
    assert_eq!(folders[0], folders[1]);
    assert_eq!(folders[0].len(), 6);
}

#[test]
fn the_more_hazardous_of_two_is_named() {
    let text = markdown(&report(&sample()));
    assert!(text.contains("The measured value is the more hazardous of the two"));
    assert!(text.contains("The estimate is the more hazardous of the two"));
    assert!(text.contains("differ by 15.1 kJ/mol, more than the U = 3.9 kJ/mol (95 %)"));
    assert!(text.contains(
        "The case file settles it and keeps the **estimate**. *The safety office: wrong sample.*"
    ));
    assert!(text.contains("Laboratory \\| report \\*7\\*"));
    assert!(text.contains("1 of 1 check values are off"));
}

#[test]
fn the_page_needs_nothing_and_runs_nothing() {
    let document = report(&sample());
    let page = html(&document, &markdown(&document)).unwrap();
    for bad in ["<script", "javascript:", "src=", "@import", "url("] {
        assert!(!page.contains(bad), "{bad}");
    }
    for good in [
        "<title>Ring &lt;openings&gt; &amp; others</title>",
        "lang=\"en-GB\"",
        "<h2 id=\"bibliography\">",
        "href=\"#bibliography\"",
        "<aside class=\"note warning\">",
        "<figcaption><strong>Figure 1.</strong>",
    ] {
        assert!(page.contains(good), "{good}");
    }
    assert_eq!(page.matches("<svg").count(), document.figures().count());
    assert_eq!(
        page.matches("<caption>").count(),
        page.matches("<table>").count()
    );
    assert_eq!(headings_out_of_order(&page), None);
}

/// The first heading that is more than one level below the one before it.
fn headings_out_of_order(page: &str) -> Option<String> {
    let mut before = 0;
    for heading in page.split("<h").skip(1) {
        let Some(level) = heading.chars().next().and_then(|c| c.to_digit(10)) else {
            continue;
        };
        if level > before + 1 {
            return Some(heading.chars().take(60).collect());
        }
        before = level;
    }
    None
}

#[test]
fn json_holds_the_keys_that_other_programs_rely_on() {
    let sample = sample();
    let keys = contract(sample.reviews().next().unwrap());
    let names: Vec<_> = keys
        .as_object()
        .unwrap()
        .keys()
        .map(String::as_str)
        .collect();
    assert_eq!(
        names,
        [
            "input",
            "formula",
            "molar_mass_g_per_mol",
            "enthalpy_of_formation",
            "gas_entropy_j_per_mol_k",
            "gas_heat_capacity_j_per_mol_k",
            "symmetry_number",
            "strain",
            "strain_conventions",
            "rings",
            "account",
            "openings",
            "decomposition",
            "oxygen_balance_percent",
            "evidence",
            "evidence_share",
            "flags"
        ]
    );
    assert_eq!(keys["enthalpy_of_formation"]["gas"]["basis"], "measured");
    assert_eq!(keys["rings"][0]["size"], 3);
    assert_eq!(keys["strain_conventions"][0]["value_kj_per_mol"], 115.5);
    assert!(keys["strain_conventions"][1]["value_kj_per_mol"].is_null());
    assert!(keys["account"]["bend_kj_per_mol"].is_null());

    let report: serde_json::Value = serde_json::from_str(&json(&sample).unwrap()).unwrap();
    assert_eq!(
        report["substances"][0]["enthalpy_of_formation"]["gas"]["comparisons"][1]["agreement"],
        "disagrees"
    );
    assert_eq!(report["substances"][2]["error"], "no carbon");
    assert_eq!(report["digests"][0]["sha256"].as_str().unwrap().len(), 64);
}

#[test]
fn a_place_that_cannot_be_written_is_named() {
    let sample = sample();
    let folder = tempfile::tempdir().unwrap();
    // A file where the folder should be: this fails for every user, even one that may write everywhere.
    let taken = folder.path().join("taken");
    fs::write(&taken, "before").unwrap();
    let error = write_all(&report(&sample), &sample, &taken).unwrap_err();
    assert!(error.to_string().contains("taken"), "{error}");
    assert_eq!(fs::read_to_string(&taken).unwrap(), "before");
}
