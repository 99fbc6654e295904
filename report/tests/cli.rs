//! The commands as a shell runs them: what they write where, and their exit codes.

use std::fs;
use std::io::Write as _;
use std::path::{Path, PathBuf};
use std::process::{Command, Output, Stdio};

use serde_json::Value;

fn tautring(arguments: &[&str]) -> Output {
    Command::new(env!("CARGO_BIN_EXE_tautring"))
        .args(arguments)
        .output()
        .expect("the program starts")
}

fn with_stdin(arguments: &[&str], input: &[u8]) -> Output {
    let mut child = Command::new(env!("CARGO_BIN_EXE_tautring"))
        .args(arguments)
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .expect("the program starts");
    let mut stdin = child.stdin.take().expect("a pipe");
    stdin.write_all(input).expect("the program reads");
    drop(stdin);
    child.wait_with_output().expect("the program ends")
}

fn code(output: &Output) -> Option<i32> {
    output.status.code()
}

fn stdout(output: &Output) -> &str {
    std::str::from_utf8(&output.stdout).expect("UTF-8")
}

fn stderr(output: &Output) -> &str {
    std::str::from_utf8(&output.stderr).expect("UTF-8")
}

fn objects(output: &Output) -> Vec<Value> {
    let lines = stdout(output).lines();
    lines
        .map(|line| serde_json::from_str(line).expect("one object to a line"))
        .collect()
}

fn example(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR"))
        .join("../examples")
        .join(name)
}

#[test]
fn estimate_writes_a_table_for_people() {
    let output = tautring(&["estimate", "C1CC1C1CC1", "c1ccccc1"]);
    assert_eq!(code(&output), Some(0), "{}", stderr(&output));
    let text = stdout(&output);
    for words in [
        "C₆H₁₀",
        "enthalpy of formation",
        "kcal/mol",
        "J/g",
        "ring systems            2",
        "no ring that is not aromatic",
        "no substitute for calorimetry",
    ] {
        assert!(text.contains(words), "{words} in\n{text}");
    }
    assert_eq!(stderr(&output), "");
}

#[test]
fn what_cannot_be_read_does_not_stop_the_others() {
    let output = with_stdin(
        &["estimate", "C1CQ1", "-", "[Na+].[Cl-]", "--json"],
        b"C1CC1 the small one\n\n# a remark\n\xff\nN\nC1CCC1",
    );
    assert_eq!(code(&output), Some(2));
    let found = objects(&output);
    let inputs: Vec<_> = found.iter().map(|o| o["input"].as_str().unwrap()).collect();
    assert_eq!(
        inputs,
        ["C1CQ1", "C1CC1", "\u{fffd}", "N", "C1CCC1", "[Na+].[Cl-]"]
    );
    let failed: Vec<_> = found.iter().map(|o| o["error"].is_string()).collect();
    assert_eq!(failed, [true, false, true, true, false, true]);
    assert_eq!(found[1]["name"], "the small one");
    assert!(stderr(&output).contains("4 of 6"));
}

#[test]
fn a_mistake_is_marked_under_the_smiles() {
    let output = tautring(&["estimate", "C1CQ1"]);
    assert_eq!((code(&output), stdout(&output)), (Some(2), ""));
    assert!(
        stderr(&output).contains("\n  C1CQ1\n     ^\n"),
        "{}",
        stderr(&output)
    );
}

#[test]
fn a_file_is_named_and_its_structures_are_numbered() {
    let path = example("structures/azetidine.mol");
    let path = path.to_str().unwrap();
    let found = objects(&tautring(&["estimate", path, "--json"]));
    assert_eq!(found.len(), 1);
    assert_eq!(
        (&found[0]["input"], &found[0]["record"]),
        (&path.into(), &1.into())
    );
    assert_eq!(found[0]["formula"], "C3H7N");

    // The name of a file that is not there is no SMILES.
    let output = tautring(&["estimate", "nowhere.sdf"]);
    assert_eq!(code(&output), Some(2));
    assert!(
        stderr(&output).contains("nowhere.sdf: No such file"),
        "{}",
        stderr(&output)
    );
}

#[test]
fn blind_leaves_the_molecule_out() {
    let found = objects(&tautring(&["estimate", "C1CC1", "--json", "--blind"]));
    let gas = &found[0]["enthalpy_of_formation"]["gas"];
    assert_eq!(gas["basis"], "estimated");
    assert_eq!(gas["comparisons"].as_array().map(Vec::len), Some(0));
    let evidence = found[0]["evidence"].as_array().unwrap();
    assert!(evidence.iter().all(|row| row["smiles"] != "C1CC1"));
    let seen = objects(&tautring(&["estimate", "C1CC1", "--json"]));
    assert_eq!(seen[0]["enthalpy_of_formation"]["gas"]["basis"], "measured");
}

#[test]
fn a_closed_pipe_is_no_panic() {
    let mut child = Command::new(env!("CARGO_BIN_EXE_tautring"))
        .args(["estimate", "-", "--json"])
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .expect("the program starts");
    drop(child.stdout.take());
    let mut stdin = child.stdin.take().expect("a pipe");
    // The program may have ended before it took everything.
    let _ = stdin.write_all("C1CC1\n".repeat(20).as_bytes());
    drop(stdin);
    let output = child.wait_with_output().expect("the program ends");
    assert_eq!((code(&output), stderr(&output)), (Some(0), ""));
}

#[test]
fn reports_are_the_same_bytes_wherever_they_are_made() {
    let folders = [(); 2].map(|()| tempfile::tempdir().expect("a folder"));
    let case = example("heat_store.toml");
    for folder in &folders {
        let out = folder.path().join("new/report");
        let output = tautring(&[
            "report",
            case.to_str().unwrap(),
            "--out",
            out.to_str().unwrap(),
        ]);
        assert_ne!(code(&output), Some(2), "{}", stderr(&output));
        assert_eq!(stdout(&output), "");
    }
    for file in ["report.md", "report.html", "report.json"] {
        let [one, two] = [&folders[0], &folders[1]]
            .map(|folder| fs::read_to_string(folder.path().join("new/report").join(file)).unwrap());
        assert_eq!(one, two, "{file}");
        assert!(!one.contains(folders[0].path().to_str().unwrap()));
    }
    let text = fs::read_to_string(folders[0].path().join("new/report/report.json")).unwrap();
    let report: Value = serde_json::from_str(&text).unwrap();
    let digests: Vec<_> = report["digests"]
        .as_array()
        .unwrap()
        .iter()
        .map(|digest| digest["of"].as_str().unwrap())
        .collect();
    for of in [
        "heat_store.toml",
        "data/measurements.csv",
        "core/src/additivity/fitted/factor.bin",
    ] {
        assert!(digests.contains(&of), "{of}");
    }
    assert!(
        report["monocycles"]
            .as_array()
            .is_some_and(|rings| rings.len() > 8)
    );
}

#[test]
fn a_substance_without_an_estimate_stays_in_the_report() {
    let folder = tempfile::tempdir().expect("a folder");
    let case = folder.path().join("case.toml");
    let head = "[case]\ntitle = \"t\"\nreference = \"r\"\ndate = \"2026-05-04\"\nauthor = \"a\"\nrevision = \"A\"\n";
    let substance = |id: &str, smiles: &str| {
        format!(
            "[[substance]]\nid = \"{id}\"\nname = \"{id}\"\nsmiles = \"{smiles}\"\nstate = \"gas\"\nrole = \"reagent\"\n"
        )
    };
    let text = head.to_owned() + &substance("ammonia", "N") + &substance("oxirane", "C1CO1");
    fs::write(&case, text).unwrap();
    let out = folder.path().join("out");
    let output = tautring(&[
        "report",
        case.to_str().unwrap(),
        "--out",
        out.to_str().unwrap(),
    ]);
    assert_eq!(code(&output), Some(1), "{}", stderr(&output));
    assert!(stderr(&output).contains("ammonia could not be reviewed"));
    let markdown = fs::read_to_string(out.join("report.md")).unwrap();
    assert!(markdown.contains("ammonia could not be reviewed") && markdown.contains("### oxirane"));
}

#[test]
fn a_bad_case_writes_nothing() {
    let folder = tempfile::tempdir().expect("a folder");
    let case = folder.path().join("case.toml");
    fs::write(&case, "[case]\ntitel = \"t\"\n").unwrap();
    let case = case.to_str().unwrap();
    let out = folder.path().join("out");
    let output = tautring(&["report", case, "--out", out.to_str().unwrap()]);
    assert_eq!(code(&output), Some(2));
    assert!(stderr(&output).contains("titel") && !out.exists());

    let output = tautring(&["check", case]);
    assert_eq!((code(&output), stdout(&output)), (Some(1), ""));
    assert_eq!(code(&tautring(&["check", "nowhere.toml"])), Some(2));
    let output = tautring(&["check", example("spiro_amide.toml").to_str().unwrap()]);
    assert_eq!(code(&output), Some(0));
    assert!(stdout(&output).ends_with("no mistakes found\n"));
}

#[test]
fn verify_says_no_exactly_when_a_value_is_off() {
    let output = tautring(&["verify", "--json"]);
    let checks = objects(&output);
    assert!(checks.len() > 10);
    let mut off = 0;
    for check in &checks {
        let [published, computed, difference, tolerance] =
            ["published", "computed", "difference", "tolerance"]
                .map(|key| check[key].as_f64().unwrap());
        assert!((computed - published - difference).abs() < 1e-9);
        let outside = difference.abs() > tolerance;
        assert_eq!(check["outcome"], if outside { "off" } else { "agrees" });
        off += usize::from(outside);
    }
    assert_eq!(code(&output), Some(i32::from(off > 0)));
    let table = tautring(&["verify"]);
    let agree = format!(
        "{} of {} check values agree",
        checks.len() - off,
        checks.len()
    );
    assert!(stdout(&table).contains(&agree));
}

#[test]
fn shells_and_the_manual_know_the_commands() {
    for arguments in [
        &["completions", "bash"][..],
        &["completions", "fish"],
        &["man"],
    ] {
        let output = tautring(arguments);
        assert_eq!(code(&output), Some(0));
        for command in ["estimate", "report", "check", "verify"] {
            assert!(
                stdout(&output).contains(command),
                "{arguments:?}: {command}"
            );
        }
    }
    assert_eq!(code(&tautring(&["estimate"])), Some(2));
}
