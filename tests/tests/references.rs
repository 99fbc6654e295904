//! Every bibliography key that is quoted stands in `data/references.bib`, and every key there is quoted.

use std::collections::{BTreeMap, BTreeSet};

use tautring_tests::folder::{files, top};

/// Columns that hold a key.
const KEY_COLUMN: &str = "source";

/// The keys, and how often each is defined.
fn bibliography() -> BTreeMap<String, usize> {
    let text = std::fs::read_to_string(top().join("data/references.bib")).expect("it is there");
    let mut keys = BTreeMap::new();
    for line in text.lines().filter(|line| line.starts_with('@')) {
        let key = line
            .split_once('{')
            .and_then(|(_, key)| key.strip_suffix(','));
        let key = key.unwrap_or_else(|| panic!("references.bib: `{line}` is no head of an entry"));
        *keys.entry(key.to_owned()).or_default() += 1;
    }
    keys
}

/// Keys in the tables of `data/`, each with the table.
fn in_tables() -> BTreeMap<String, String> {
    let mut keys = BTreeMap::new();
    for (path, text) in files("data", ".csv") {
        let mut reader = csv::Reader::from_reader(text.as_bytes());
        let header = reader.headers().expect("a header");
        let Some(column) = header.iter().position(|name| name == KEY_COLUMN) else {
            continue;
        };
        for record in reader.records() {
            let record = record.unwrap_or_else(|e| panic!("{path}: {e}"));
            // Common practice has no source.
            if !record[column].is_empty() {
                keys.insert(record[column].to_owned(), path.clone());
            }
        }
    }
    keys
}

/// Doc comments of the sources of both crates and of the checks, each with its path.
fn docs() -> Vec<(String, String)> {
    let folders = ["core/src", "report/src", "tests/src", "tests/tests"];
    let all = folders.into_iter().flat_map(|folder| files(folder, ".rs"));
    all.map(|(path, text)| {
        let comments = text.lines().filter_map(|line| {
            let line = line.trim_start();
            line.strip_prefix("///")
                .or_else(|| line.strip_prefix("//!"))
                .or(line.is_empty().then_some(""))
        });
        (path, comments.collect::<Vec<_>>().join("\n"))
    })
    .collect()
}

/// What stands between backticks in a text.
fn quoted(text: &str) -> impl Iterator<Item = &str> {
    text.split('`').skip(1).step_by(2)
}

/// Whether a quoted word looks like a key: small letters, hyphens and a number.
fn is_key(word: &str) -> bool {
    let allowed = |c: char| c.is_ascii_lowercase() || c.is_ascii_digit() || c == '-' || c == '.';
    word.starts_with(|c: char| c.is_ascii_lowercase())
        && word.chars().all(allowed)
        && word.contains('-')
        && word.contains(|c: char| c.is_ascii_digit())
}

/// Keys under a heading `# Source`, each with the file; crates are quoted there too and have no number.
fn in_sources() -> BTreeMap<String, String> {
    let mut keys = BTreeMap::new();
    for (path, text) in docs() {
        let mut inside = false;
        for line in text.lines() {
            if line.trim().is_empty() {
                inside = inside && line.starts_with(' ');
            } else if line.trim_start().starts_with('#') {
                inside = line.trim() == "# Source";
            } else if inside {
                for word in quoted(line).filter(|word| is_key(word)) {
                    keys.insert(word.to_owned(), path.clone());
                }
            }
        }
    }
    keys
}

#[test]
fn every_key_that_is_quoted_is_in_the_bibliography() {
    let known = bibliography();
    let quoted: Vec<_> = in_tables().into_iter().chain(in_sources()).collect();
    assert!(quoted.len() > 30, "only {} keys were found", quoted.len());
    let missing: Vec<_> = quoted
        .iter()
        .filter(|(key, _)| !known.contains_key(key))
        .collect();
    assert!(missing.is_empty(), "add to references.bib: {missing:#?}");
}

#[test]
fn every_key_of_the_bibliography_is_quoted_and_stands_there_once() {
    let mut used: BTreeSet<String> = in_tables().into_keys().collect();
    for (_, text) in docs() {
        used.extend(quoted(&text).map(str::to_owned));
    }
    let known = bibliography();
    let twice: Vec<_> = known.iter().filter(|(_, times)| **times > 1).collect();
    assert!(twice.is_empty(), "{twice:?}");
    let idle: Vec<_> = known.keys().filter(|key| !used.contains(*key)).collect();
    assert!(idle.is_empty(), "nothing quotes {idle:?}");
}

/// A `# Source` that names nothing says nothing.
#[test]
fn every_source_heading_names_a_key_or_a_reason() {
    let mut empty = Vec::new();
    for (path, text) in docs() {
        let mut rest = text.as_str();
        while let Some((_, after)) = rest.split_once("# Source\n") {
            let section: String = after
                .lines()
                .take_while(|line| !line.trim().is_empty())
                .collect();
            let common = section.to_lowercase().contains("common practice");
            if !common && !quoted(&section).any(is_key) {
                empty.push(format!("{path}: {section}"));
            }
            rest = after;
        }
    }
    assert!(empty.is_empty(), "{empty:#?}");
}
