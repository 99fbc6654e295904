//! What the program makes of bad input: a clear error, the agreed exit code, no panic, no half-written file.

use std::path::Path;

use serde_json::Value;
use tautring_tests::folder::top;
use tautring_tests::program::{Run, tautring};
use tautring_tests::scratch::Scratch;

/// A check said no.
const NO: i32 = 1;

/// The program could not run.
const COULD_NOT: i32 = 2;

const CASE: &str = r#"
[case]
title = "Two rings"
reference = "TEST-1"
date = "2026-01-01"
author = "Reactive-hazards desk"
revision = "A"

[[substance]]
id = "ring"
name = "cyclobutane"
smiles = "C1CCC1"
state = "gas"
role = "reference"
"#;

/// A structure and a word that its error must have.
fn bad_structures() -> Vec<(String, &'static str)> {
    let mut all: Vec<(String, &'static str)> = [
        ("", "empty"),
        ("   ", "empty"),
        ("C1CC", "ring"),
        ("C(C", "'('"),
        ("C1CQ1", "Q"),
        ("[Xx]", "Xx"),
        ("C[Hg]C", "Hg"),
        ("[Na+].CC(=O)[O-]", "fragments"),
        ("CCO.O", "fragments"),
        ("C[NH3+]", "charge"),
        ("[CH3]", "radical"),
        ("[CH2]", "radical"),
        ("C(C)(C)(C)(C)C", "bonds"),
        ("C>>C", "reaction"),
        ("*CC", "*"),
        ("O", "carbon"),
        ("C1CC1é", ""),
        ("\u{202e}C1CC1", ""),
        ("cyclopropane", ""),
    ]
    .map(|(smiles, word)| (smiles.to_owned(), word))
    .into();
    all.push(("C".repeat(100_000), "atoms"));
    all.push((
        format!("{}C{}", "C(".repeat(30_000), ")".repeat(30_000)),
        "",
    ));
    all.push(("C".repeat(300), "atoms"));
    all
}

fn lines(run: &Run) -> Vec<Value> {
    let parse = |line: &str| {
        serde_json::from_str(line).unwrap_or_else(|e| panic!("{e}: {line}\n{}", run.stderr))
    };
    run.stdout.lines().map(parse).collect()
}

/// The start of a text that may be very long.
fn short(text: &str) -> String {
    text.chars().take(60).collect()
}

#[test]
fn a_bad_structure_gives_input_and_error() {
    for (smiles, word) in bad_structures() {
        let run = tautring(["estimate", "--json", "--", &smiles]);
        let shown = short(&smiles);
        assert!(!run.panicked(), "{shown}: {}", short(&run.stderr));
        assert_eq!(run.code, COULD_NOT, "{shown}");
        let lines = lines(&run);
        assert_eq!(lines.len(), 1, "{shown}");
        assert_eq!(lines[0]["input"], smiles, "{shown}");
        let error = lines[0]["error"]
            .as_str()
            .unwrap_or_else(|| panic!("{shown}: no error"));
        assert!(
            error.contains(word),
            "{shown}: `{error}` does not say {word}"
        );
        assert!(lines[0].get("enthalpy_of_formation").is_none(), "{shown}");
    }
}

#[test]
fn a_bad_structure_is_told_to_a_person_too() {
    for (smiles, word) in bad_structures() {
        let run = tautring(["estimate", "--", &smiles]);
        let shown = short(&smiles);
        assert!(!run.panicked(), "{shown}: {}", short(&run.stderr));
        assert_eq!(run.code, COULD_NOT, "{shown}");
        assert!(run.stderr.contains(word), "{shown}: {}", short(&run.stderr));
        assert!(
            run.stderr.len() < 4000,
            "{shown}: {} bytes",
            run.stderr.len()
        );
    }
}

#[test]
fn the_others_are_still_done() {
    let run = tautring(["estimate", "--json", "C1CC1", "C1CQ1", "C1CCC1"]);
    assert_eq!(run.code, COULD_NOT);
    let lines = lines(&run);
    let inputs: Vec<_> = lines.iter().map(|line| line["input"].as_str()).collect();
    assert_eq!(inputs, [Some("C1CC1"), Some("C1CQ1"), Some("C1CCC1")]);
    let errors: Vec<_> = lines
        .iter()
        .map(|line| line.get("error").is_some())
        .collect();
    assert_eq!(errors, [false, true, false]);
}

#[test]
fn the_same_good_structure_ends_well() {
    let run = tautring(["estimate", "--json", "C1CC1"]);
    assert_eq!((run.code, run.stderr.as_str()), (0, ""));
}

/// Each mistake with a word of its answer. `check` says no; `report` cannot run and leaves nothing.
#[test]
fn mistakes_of_a_case_file_leave_no_file() {
    let measured = |lines: &str| {
        format!(
            "{CASE}\n[[substance.measured]]\nquantity = \"enthalpy_of_formation\"\nphase = \"gas\"\nsource = \"a notebook\"\n{lines}\n"
        )
    };
    let substance = |smiles: &str| CASE.replace("C1CCC1", smiles);
    let cases = [
        (measured("value = nan\nunit = \"kJ/mol\""), "nan"),
        (measured("value = inf\nunit = \"kJ/mol\""), "inf"),
        (measured("value = 1e300\nunit = \"kJ/mol\""), "1e300"),
        (measured("value = 28\nunit = \"furlong\""), "furlong"),
        (
            measured("value = 28\nunit = \"kJ/mol\"\nuncertainty = -1"),
            "uncertainty",
        ),
        (
            measured("value = 28\nunit = \"kJ/mol\"\nuncertainty = nan"),
            "uncertainty",
        ),
        (substance("C1CC"), "C1CC"),
        (substance("[Na+].[Cl-]"), "fragments"),
        (substance("[CH3]"), "radical"),
        (substance(&"C".repeat(5000)), "atoms"),
        (CASE.replace("2026-01-01", "2026-13-41"), "2026-13-41"),
        (
            CASE.replace("smiles = \"C1CCC1\"", "file = \"absent.mol\""),
            "absent.mol",
        ),
        (CASE.replace("[case]", "[case"), "line"),
        (String::new(), "case"),
        ("\u{0}\u{1}".to_owned(), ""),
    ];
    for (text, word) in cases {
        let scratch = Scratch::new();
        let case = scratch.write("case.toml", &text);
        let check = tautring(["check".as_ref(), case.as_os_str()]);
        let out = scratch.join("out");
        let report = tautring([
            "report".as_ref(),
            case.as_os_str(),
            "--out".as_ref(),
            out.as_os_str(),
        ]);
        for (run, code) in [(&check, NO), (&report, COULD_NOT)] {
            assert!(!run.panicked(), "{word}: {}", run.stderr);
            assert_eq!(run.code, code, "{word}: {}", run.stderr);
            assert!(run.stderr.contains(word), "{word}: {}", run.stderr);
            assert!(run.stderr.contains("case.toml"), "{word}: {}", run.stderr);
            assert_eq!(run.stdout, "", "{word}");
        }
        assert_eq!(scratch.names(), ["case.toml"], "{word}");
    }
}

#[test]
fn a_good_case_passes_the_check_and_is_reported() {
    let scratch = Scratch::new();
    let case = scratch.write("case.toml", CASE);
    let check = tautring(["check".as_ref(), case.as_os_str()]);
    assert_eq!(check.code, 0, "{}", check.stderr);
    let out = scratch.join("out");
    let report = tautring([
        "report".as_ref(),
        case.as_os_str(),
        "--out".as_ref(),
        out.as_os_str(),
    ]);
    assert_eq!(report.code, 0, "{}", report.stderr);
    let names = scratch.names();
    for name in ["out/report.md", "out/report.html", "out/report.json"] {
        assert!(
            names.iter().any(|n| n == name),
            "{name} is missing: {names:?}"
        );
    }
    assert!(names.iter().all(|name| !name.contains("tmp")), "{names:?}");
}

#[test]
fn a_missing_case_file_is_told() {
    let scratch = Scratch::new();
    let out = scratch.join("out");
    for run in [
        tautring(["check", "no/such/case.toml"]),
        tautring([
            "report".as_ref(),
            "no/such/case.toml".as_ref(),
            "--out".as_ref(),
            out.as_os_str(),
        ]),
    ] {
        assert!(!run.panicked(), "{}", run.stderr);
        assert_eq!(run.code, COULD_NOT, "{}", run.stderr);
        assert!(run.stderr.contains("no/such/case.toml"), "{}", run.stderr);
    }
    assert!(scratch.names().is_empty());
}

/// The permission bits do not bind root, so the folders are such that nobody can write into them.
#[test]
fn a_folder_that_cannot_be_written_is_told() {
    let scratch = Scratch::new();
    let case = scratch.write("case.toml", CASE);
    let below_a_file = case.join("out");
    for out in [below_a_file.as_path(), Path::new("/proc/tautring")] {
        let run = tautring([
            "report".as_ref(),
            case.as_os_str(),
            "--out".as_ref(),
            out.as_os_str(),
        ]);
        assert!(!run.panicked(), "{}", run.stderr);
        assert_eq!(run.code, COULD_NOT, "{}", run.stderr);
        assert!(
            run.stderr.contains(&*out.to_string_lossy()),
            "{}",
            run.stderr
        );
        assert_eq!(scratch.names(), ["case.toml"]);
    }
}

/// A report that cannot take its place, since a folder stands there, leaves the other files as they were.
#[test]
fn a_place_that_is_taken_is_told() {
    let scratch = Scratch::new();
    let case = scratch.write("case.toml", CASE);
    let out = scratch.join("out");
    std::fs::create_dir_all(out.join("report.html/inside")).expect("a folder");
    let run = tautring([
        "report".as_ref(),
        case.as_os_str(),
        "--out".as_ref(),
        out.as_os_str(),
    ]);
    assert!(!run.panicked(), "{}", run.stderr);
    assert_eq!(run.code, COULD_NOT, "{}", run.stderr);
    assert!(run.stderr.contains("report.html"), "{}", run.stderr);
    let names = scratch.names();
    assert!(
        names
            .iter()
            .all(|name| !name.contains("tmp") && name != "out/report.md"),
        "{names:?}"
    );
}

/// Same case, same bytes.
#[test]
fn a_report_is_the_same_when_made_again() {
    let scratch = Scratch::new();
    let case = top().join("examples/spiro_amide.toml");
    for out in ["one", "two"] {
        let out = scratch.join(out);
        let run = tautring([
            "report".as_ref(),
            case.as_os_str(),
            "--out".as_ref(),
            out.as_os_str(),
        ]);
        assert_eq!(run.code, 0, "{}", run.stderr);
    }
    for name in ["report.md", "report.html", "report.json"] {
        let [one, two] = ["one", "two"].map(|folder| {
            std::fs::read(scratch.join(folder).join(name)).expect("the report is there")
        });
        assert!(one == two, "{name} differs");
    }
}

#[test]
fn bad_arguments_are_told() {
    for arguments in [
        &["estimate"][..],
        &["no-such-command"],
        &["report", "x.toml", "--no-such-option"],
        &[],
    ] {
        let run = tautring(arguments);
        assert!(!run.panicked(), "{}", run.stderr);
        assert_eq!(run.code, COULD_NOT, "{arguments:?}: {}", run.stderr);
        assert!(!run.stderr.is_empty(), "{arguments:?}");
    }
}
