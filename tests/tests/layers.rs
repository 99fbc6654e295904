//! Imports run one way, files stay small and are named by what they hold.

use std::collections::BTreeSet;

use tautring_tests::folder::files;

/// Rooms of the core from the top down; rooms of one line are neighbours that do not know each other.
const CORE: &[&[&str]] = &[
    &["strain", "reactions", "thermal", "oxygen_balance"],
    &["additivity", "mechanics"],
    &["geometry"],
    &["molecule"],
    &["quantities", "float"],
];

/// Rooms of the report from the top down. `main` and the programs beside it call it from outside.
const REPORT: &[&[&str]] = &[
    &["cli"],
    &["render"],
    &["document"],
    &["review"],
    &["fit", "case"],
    &["dataset"],
    &["structure"],
];

/// What looks like an import and is text: the code that the fit writes for the core.
const WRITTEN_CODE: (&str, &str) = ("report/src/fit/tables.rs", "additivity");

/// Longest file, lines.
const LONGEST: usize = 400;

/// Longer files, with the reason. Generated tables are exempt as such.
const LONGER: &[(&str, &str)] = &[];

/// First words of a file that a program wrote.
const GENERATED: &str = "//! Generated from `data/`";

/// Names that say nothing of what a file holds.
const EMPTY_NAMES: [&str; 8] = [
    "common",
    "helper",
    "helpers",
    "misc",
    "types",
    "util",
    "utilities",
    "utils",
];

/// A file's code without comments and without its unit tests, which may look around.
fn code(text: &str) -> String {
    let own = text.split("#[cfg(test)]").next().unwrap_or(text);
    let lines = own
        .lines()
        .map(|line| line.split("//").next().unwrap_or(""));
    lines.collect::<Vec<_>>().join("\n")
}

/// The room of a file: its folder below `src`, or its own name.
fn room(path: &str) -> &str {
    let below = path.split_once("src/").map_or(path, |(_, below)| below);
    let first = below.split('/').next().unwrap_or(below);
    first.strip_suffix(".rs").unwrap_or(first)
}

/// Rooms that a file names by `crate::`, in lists too, or from its place in the top folder by `super::`.
fn named_rooms(path: &str, code: &str) -> BTreeSet<String> {
    let below = path.split_once("src/").map_or(path, |(_, below)| below);
    let prefixes: &[&str] = if below.contains('/') {
        &["crate::"]
    } else {
        &["crate::", "super::"]
    };
    let mut rooms = BTreeSet::new();
    for prefix in prefixes {
        for (at, _) in code.match_indices(prefix) {
            let after = &code[at + prefix.len()..];
            let list = after
                .strip_prefix('{')
                .map_or(after, |list| list.split('}').next().unwrap_or(list));
            let items: Vec<&str> = if list.len() == after.len() {
                vec![after]
            } else {
                list.split(',').collect()
            };
            for item in items {
                let end = item
                    .trim_start()
                    .find(|c: char| !c.is_ascii_lowercase() && c != '_')
                    .unwrap_or(item.trim_start().len());
                let name = &item.trim_start()[..end];
                if !name.is_empty() {
                    rooms.insert(name.to_owned());
                }
            }
        }
    }
    rooms
}

/// Imports that do not run downwards, and rooms that the ranking does not know.
fn upward(folder: &str, ranking: &[&[&str]]) -> Vec<String> {
    let rank = |room: &str| ranking.iter().position(|line| line.contains(&room));
    let mut wrong = Vec::new();
    let mut imports = 0;
    for (path, text) in files(folder, ".rs") {
        let own = room(&path);
        if ["lib", "main", "bin"].contains(&own) {
            continue;
        }
        let Some(own_rank) = rank(own) else {
            wrong.push(format!(
                "{path}: rank the room `{own}` in tests/tests/layers.rs"
            ));
            continue;
        };
        for named in named_rooms(&path, &code(&text)) {
            if (path.as_str(), named.as_str()) == WRITTEN_CODE {
                continue;
            }
            imports += 1;
            if named != own && rank(&named).is_none_or(|below| below <= own_rank) {
                wrong.push(format!("{path}: `{own}` must not name `{named}`"));
            }
        }
    }
    assert!(
        imports > 20,
        "only {imports} imports were found in {folder}"
    );
    wrong
}

#[test]
fn imports_of_the_core_run_downwards() {
    let wrong = upward("core/src", CORE);
    assert!(wrong.is_empty(), "{wrong:#?}");
}

#[test]
fn imports_of_the_report_run_downwards() {
    let wrong = upward("report/src", REPORT);
    assert!(wrong.is_empty(), "{wrong:#?}");
}

#[test]
fn lists_of_imports_are_understood() {
    let code = "use crate::{dataset::Dataset, structure};\nuse crate::case::Case;\nlet x = crate::review::one();";
    let rooms: Vec<_> = named_rooms("report/src/a/b.rs", code).into_iter().collect();
    assert_eq!(rooms, ["case", "dataset", "review", "structure"]);
}

#[test]
fn files_are_short() {
    let mut long = Vec::new();
    for (path, text) in sources() {
        let lines = text.lines().count();
        let excused = LONGER.iter().any(|(name, _)| *name == path);
        if lines > LONGEST && !excused && !text.starts_with(GENERATED) {
            long.push(format!("{path}: {lines} lines"));
        }
    }
    assert!(long.is_empty(), "{long:#?}");
}

#[test]
fn files_are_named_by_what_they_hold() {
    for (path, _) in sources() {
        let parts = path
            .split('/')
            .map(|part| part.split('.').next().unwrap_or(part));
        for part in parts {
            assert!(!EMPTY_NAMES.contains(&part), "{path}: name the concept");
        }
    }
}

/// A `mod.rs` or `lib.rs` holds docs, modules and re-exports.
#[test]
fn module_files_hold_no_code() {
    let mut wrong = Vec::new();
    for (path, text) in sources() {
        let module = path.ends_with("/mod.rs") || path.ends_with("src/lib.rs");
        let code = code(&text);
        let starts = [
            "fn ",
            "pub fn ",
            "impl ",
            "struct ",
            "pub struct ",
            "enum ",
            "pub enum ",
        ];
        if module
            && code
                .lines()
                .any(|line| starts.iter().any(|s| line.starts_with(s)))
        {
            wrong.push(path);
        }
    }
    assert!(wrong.is_empty(), "{wrong:#?}");
}

fn sources() -> Vec<(String, String)> {
    let folders = ["core", "report", "tests", "data"];
    let endings = [".rs", ".py"];
    let all = folders
        .iter()
        .flat_map(|folder| endings.iter().flat_map(|end| files(folder, end)));
    all.filter(|(path, _)| !path.contains("/target/")).collect()
}
